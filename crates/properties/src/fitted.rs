//! Temperature functions made quick: piecewise polynomials through the published equations.
//!
//! Nothing here is a source of its own. At first use the exact equations (virials, ideal enthalpies, liquid water,
//! sublimation pressure, enhancement factor) are evaluated at Chebyshev nodes of segments 12.5 K wide, and the
//! polynomial through the nodes stands for them in between. The tests hold it to the exact equations at 1e-9 of
//! each mixture property, a thousand times finer than the equations agree with experiment.

use std::sync::OnceLock;

use crate::enhancement::{Phase, log_factor};
use crate::ideal;
use crate::liquid;
use crate::saturation;
use crate::virial::virials;

/// Width of a segment, K.
const WIDTH: f64 = 12.5;
/// Lower end of the first segment, K.
const LOWEST: f64 = 170.0;
/// Number of segments: up to 395 K.
const SEGMENTS: usize = 18;
/// Polynomial terms by temperature.
const TERMS: usize = 7;
/// Polynomial terms by pressure, in the logarithm of pressure.
const PRESSURE_TERMS: usize = 6;
/// Pressures that the enhancement factor is fitted over, Pa: site pressures with duct pressures added.
const PRESSURES: (f64, f64) = (40_000.0, 135_000.0);

/// Values at one temperature. The first fourteen are the virials and their slopes.
const LANES: usize = 18;
pub(crate) type Lanes = [f64; LANES];
/// Indices into [`Lanes`].
pub(crate) const BAA: usize = 0;
pub(crate) const BAW: usize = 1;
pub(crate) const BWW: usize = 2;
pub(crate) const CAAA: usize = 3;
pub(crate) const CAAW: usize = 4;
pub(crate) const CAWW: usize = 5;
pub(crate) const CWWW: usize = 6;
/// Slopes stand this far behind their coefficient.
pub(crate) const SLOPE: usize = 7;
pub(crate) const AIR_ENTHALPY: usize = 14;
pub(crate) const WATER_ENTHALPY: usize = 15;
pub(crate) const LIQUID_ENTHALPY: usize = 16;
pub(crate) const LIQUID_ENTHALPY_BY_PRESSURE: usize = 17;

struct Segment {
    lanes: [Lanes; TERMS],
    ice_log_pressure: [f64; TERMS],
    liquid_log_factor: [[f64; PRESSURE_TERMS]; TERMS],
    ice_log_factor: [[f64; PRESSURE_TERMS]; TERMS],
}

/// The values by the published equations themselves.
pub(crate) fn exact(t: f64) -> Lanes {
    let v = virials(t);
    // Liquid water is asked for from the triple point up; its equation has a pole at 232 K.
    let (enthalpy, by_pressure) = if t > 250.0 {
        let liquid = liquid::liquid(t);
        (liquid.enthalpy, liquid.enthalpy_by_pressure)
    } else {
        (0.0, 0.0)
    };
    [
        v.baa,
        v.baw,
        v.bww,
        v.caaa,
        v.caaw,
        v.caww,
        v.cwww,
        v.dbaa,
        v.dbaw,
        v.dbww,
        v.dcaaa,
        v.dcaaw,
        v.dcaww,
        v.dcwww,
        ideal::air_enthalpy(t),
        ideal::water_enthalpy(t),
        enthalpy,
        by_pressure,
    ]
}

/// The values at `t`, K: fitted within the segments, exact beyond them.
pub(crate) fn lanes(t: f64) -> Lanes {
    let Some((segment, u)) = segment(t) else { return exact(t) };
    let mut sum = segment.lanes[TERMS - 1];
    for term in segment.lanes[..TERMS - 1].iter().rev() {
        for (sum, term) in sum.iter_mut().zip(term) {
            *sum = *sum * u + term;
        }
    }
    sum
}

/// Pressure as the fits take it, from Pa: −1 to 1 over the fitted range, in the logarithm.
pub(crate) fn scaled_pressure(p: f64) -> f64 {
    let (low, high) = (PRESSURES.0.ln(), PRESSURES.1.ln());
    (2.0 * p.ln() - low - high) / (high - low)
}

/// The enhancement factor at K and Pa; `z` is [`scaled_pressure`] of `p`, worked out once for many temperatures.
pub(crate) fn factor(t: f64, p: f64, z: f64, phase: Phase) -> f64 {
    match segment(t) {
        Some((segment, u)) if z.abs() <= 1.0 => {
            let terms = match phase {
                Phase::Liquid => &segment.liquid_log_factor,
                Phase::Ice => &segment.ice_log_factor,
            };
            let mut by_pressure = terms[TERMS - 1];
            for term in terms[..TERMS - 1].iter().rev() {
                for (sum, term) in by_pressure.iter_mut().zip(term) {
                    *sum = *sum * u + term;
                }
            }
            let log = by_pressure.iter().rev().fold(0.0, |sum, c| sum * z + c);
            // e^x for x below 0.01: five terms leave 1e-13.
            1.0 + log * (1.0 + log * (0.5 + log * (1.0 / 6.0 + log * (1.0 / 24.0))))
        }
        _ => log_factor(t, p, phase, &virials(t)).exp(),
    }
}

/// `ln(p / 611.657 Pa)` over ice at K.
pub(crate) fn ice_log_pressure(t: f64) -> f64 {
    match segment(t) {
        Some((segment, u)) => segment.ice_log_pressure.iter().rev().fold(0.0, |sum, c| sum * u + c),
        None => saturation::over_ice_log(t),
    }
}

/// The segment that holds `t` and the place within it, −1 to 1.
fn segment(t: f64) -> Option<(&'static Segment, f64)> {
    let at = (t - LOWEST) * (1.0 / WIDTH);
    if !(at >= 0.0 && at < SEGMENTS as f64) {
        return None;
    }
    #[expect(
        clippy::cast_possible_truncation,
        clippy::cast_sign_loss,
        reason = "0 <= at < SEGMENTS was tested"
    )]
    let index = at as usize;
    let u = 2.0 * (at - index as f64) - 1.0;
    table().get(index).map(|segment| (segment, u))
}

fn table() -> &'static [Segment] {
    static TABLE: OnceLock<Vec<Segment>> = OnceLock::new();
    TABLE.get_or_init(|| (0..SEGMENTS).map(fit).collect())
}

fn fit(index: usize) -> Segment {
    let middle = LOWEST + WIDTH * (index as f64 + 0.5);
    let at = nodes::<TERMS>().map(|u| middle + 0.5 * WIDTH * u);
    let values = at.map(exact);
    let mut lanes = [[0.0; LANES]; TERMS];
    for lane in 0..LANES {
        let coefficients = monomials(values.map(|values| values[lane]));
        for (term, coefficient) in lanes.iter_mut().zip(coefficients) {
            term[lane] = coefficient;
        }
    }
    let ice = at.map(saturation::over_ice_log);
    // Each branch only where it is used, with the segment that holds the triple point in both.
    let branch = |phase, wanted: bool| {
        if !wanted {
            return [[0.0; PRESSURE_TERMS]; TERMS];
        }
        let by_temperature = at.map(|t| by_pressure(t, phase));
        let mut terms = [[0.0; PRESSURE_TERMS]; TERMS];
        for power in 0..PRESSURE_TERMS {
            let coefficients = monomials(by_temperature.map(|row| row[power]));
            for (term, coefficient) in terms.iter_mut().zip(coefficients) {
                term[power] = coefficient;
            }
        }
        terms
    };
    Segment {
        lanes,
        ice_log_pressure: monomials(ice),
        liquid_log_factor: branch(Phase::Liquid, middle + 0.5 * WIDTH > 273.16),
        ice_log_factor: branch(Phase::Ice, middle - 0.5 * WIDTH < 273.16),
    }
}

/// `ln f` as a polynomial of the scaled pressure, at one temperature.
fn by_pressure(t: f64, phase: Phase) -> [f64; PRESSURE_TERMS] {
    let v = virials(t);
    let (low, high) = (PRESSURES.0.ln(), PRESSURES.1.ln());
    let values = nodes::<PRESSURE_TERMS>().map(|z| {
        let p = (0.5 * (low + high) + 0.5 * (high - low) * z).exp();
        log_factor(t, p, phase, &v)
    });
    monomials(values)
}

/// Chebyshev nodes of the first kind.
fn nodes<const N: usize>() -> [f64; N] {
    std::array::from_fn(|i| (std::f64::consts::PI * (i as f64 + 0.5) / N as f64).cos())
}

/// Coefficients of the powers of u of the polynomial through values at [`nodes`].
fn monomials<const N: usize>(values: [f64; N]) -> [f64; N] {
    let mut sum = [0.0; N];
    let mut previous = [0.0; N];
    let mut current = [0.0; N];
    current[0] = 1.0;
    for k in 0..N {
        let weight: f64 = values
            .iter()
            .enumerate()
            .map(|(i, value)| {
                value * (std::f64::consts::PI * k as f64 * (i as f64 + 0.5) / N as f64).cos()
            })
            .sum::<f64>()
            * if k == 0 { 1.0 } else { 2.0 }
            / N as f64;
        for (sum, power) in sum.iter_mut().zip(current) {
            *sum += weight * power;
        }
        // T_{k+1} = 2 u T_k - T_{k-1}; T_1 = u.
        let mut next = [0.0; N];
        for power in 0..N - 1 {
            next[power + 1] = if k == 0 { current[power] } else { 2.0 * current[power] };
        }
        if k > 0 {
            for (next, previous) in next.iter_mut().zip(previous) {
                *next -= previous;
            }
        }
        previous = current;
        current = next;
    }
    sum
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn fits_follow_the_published_equations() {
        // Relative to what each value contributes: to the scale of its own lane, except for the coefficients of
        // water vapour in the cold, which weigh nothing where there is none.
        let mut t = 200.3;
        while t < 380.0 {
            let (fitted, exact) = (lanes(t), exact(t));
            for (lane, (fitted, exact)) in fitted.iter().zip(exact).enumerate() {
                let cold_water = matches!(lane, BWW | CAWW | CWWW | 9 | 12 | 13);
                let scale = match lane {
                    AIR_ENTHALPY | WATER_ENTHALPY | LIQUID_ENTHALPY => 1e4,
                    // Near its zero (60 °C) the coefficient of dry air is held absolutely.
                    BAA => 1e-5,
                    _ => exact.abs(),
                };
                let allowed = if cold_water && t < 273.0 { 3e-6 } else { 1e-8 };
                if lane == LIQUID_ENTHALPY || lane == LIQUID_ENTHALPY_BY_PRESSURE {
                    if t > 273.16 {
                        assert!(
                            (fitted - exact).abs() <= 1e-7 * scale.max(1e-4),
                            "lane {lane} at {t}"
                        );
                    }
                } else {
                    assert!(
                        (fitted - exact).abs() <= allowed * scale,
                        "lane {lane} at {t}: {fitted} {exact}"
                    );
                }
            }
            t += 1.7;
        }
    }

    #[test]
    fn the_enhancement_factor_follows_its_equation() {
        for p in [41_000.0, 55_000.0, 83_000.0, 101_325.0, 130_000.0] {
            let z = scaled_pressure(p);
            let mut t: f64 = 203.0;
            while t < 368.0 {
                let phase = if t < 273.16 { Phase::Ice } else { Phase::Liquid };
                let s =
                    if t < 273.16 { saturation::over_ice(t) } else { saturation::over_liquid(t) };
                if s < 0.98 * p {
                    let exact = log_factor(t, p, phase, &virials(t)).exp();
                    assert!((factor(t, p, z, phase) / exact - 1.0).abs() < 3e-8, "{t} K {p} Pa");
                }
                t += 2.3;
            }
        }
    }

    #[test]
    fn sublimation_pressure_follows_its_equation() {
        for step in 0..300 {
            let t = 180.0 + 0.31 * f64::from(step);
            assert!((ice_log_pressure(t) - saturation::over_ice_log(t)).abs() < 1e-10);
        }
    }
}
