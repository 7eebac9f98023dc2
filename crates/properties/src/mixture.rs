//! The mixture of real dry air and water vapour: volume and enthalpy from the virial equation to third order.

use crate::constants::{M_AIR, M_WATER, R_MIXTURE, mole_fraction, per_dry_air};
use crate::fitted::{
    AIR_ENTHALPY, BAA, BAW, BWW, CAAA, CAAW, CAWW, CWWW, Lanes, SLOPE, WATER_ENTHALPY,
};
use crate::ideal;

/// Enthalpy, J/kg, and volume, m³/kg, per mass of dry air.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Mixture {
    pub(crate) enthalpy: f64,
    pub(crate) volume: f64,
}

/// Coefficients of the mixture at a mole fraction of vapour: B, C and their slopes.
struct Coefficients {
    b: f64,
    c: f64,
    db: f64,
    dc: f64,
}

fn coefficients(lanes: &Lanes, x: f64) -> Coefficients {
    let y = 1.0 - x;
    let (yy, xy2, xx) = (y * y, 2.0 * x * y, x * x);
    let second = |at: usize| yy * lanes[at + BAA] + xy2 * lanes[at + BAW] + xx * lanes[at + BWW];
    let third = |at: usize| {
        yy * (y * lanes[at + CAAA] + 3.0 * x * lanes[at + CAAW])
            + xx * (3.0 * y * lanes[at + CAWW] + x * lanes[at + CWWW])
    };
    Coefficients { b: second(0), c: third(0), db: second(SLOPE), dc: third(SLOPE) }
}

/// Molar volume, m³/mol: the root of `v = (RT/p)(1 + B/v + C/v²)` by Newton steps from `RT/p + B`.
fn molar_volume(ideal: f64, b: f64, c: f64) -> f64 {
    let mut v = ideal + b;
    for _ in 0..3 {
        let i = 1.0 / v;
        let residual = v - ideal * (1.0 + i * (b + c * i));
        let slope = 1.0 + ideal * i * i * (b + 2.0 * c * i);
        v -= residual / slope;
    }
    v
}

/// Enthalpy and volume at K, Pa and kg/kg, also somewhat above saturation.
pub(crate) fn mixture(lanes: &Lanes, t: f64, p: f64, w: f64) -> Mixture {
    let x = mole_fraction(w);
    let k = coefficients(lanes, x);
    let rt = R_MIXTURE * t;
    let v = molar_volume(rt / p, k.b, k.c);
    let i = 1.0 / v;
    let residual = rt * i * ((k.b - t * k.db) + (k.c - 0.5 * t * k.dc) * i);
    let molar = (1.0 - x) * lanes[AIR_ENTHALPY] + x * lanes[WATER_ENTHALPY] + residual;
    let scale = per_dry_air(w, x);
    Mixture { enthalpy: molar * scale, volume: v * scale }
}

/// Entropy at K, Pa and kg/kg, J/(kg K) per mass of dry air.
pub(crate) fn entropy(lanes: &Lanes, t: f64, p: f64, w: f64) -> f64 {
    let x = mole_fraction(w);
    let y = 1.0 - x;
    let k = coefficients(lanes, x);
    let v = molar_volume(R_MIXTURE * t / p, k.b, k.c);
    let air_volume = molar_volume(crate::constants::R_AIR * t / p, lanes[BAA], lanes[CAAA]);
    let log = |part: f64| if part > 0.0 { part * part.ln() } else { 0.0 };
    let residual = (k.b + t * k.db) / v + (k.c + t * k.dc) / (2.0 * v * v) + log(y) + log(x);
    let molar = 0.023_664_274_95
        + y * ideal::air_entropy(t, air_volume)
        + if x > 0.0 { x * ideal::water_entropy(t, p) } else { 0.0 }
        - R_MIXTURE * residual;
    molar * (1.0 + w) / (y * M_AIR + x * M_WATER)
}
