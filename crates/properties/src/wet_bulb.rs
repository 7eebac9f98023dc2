//! Thermodynamic wet bulb, and the humidity ratio from it.
//!
//! The root of `h + (W_s(T_b) - W) h_c - h_s(T_b) = 0`, with the enthalpy of liquid water above the triple point
//! and of ice below. That enthalpy jumps by 333 kJ/kg there, so that near freezing both branches can have a root:
//! the wick tells which, and only the person sees the wick.

use dewledger_quantities::{Quantity, ThermodynamicTemperature};

use crate::constants::{EPSILON, TRIPLE_K};
use crate::enhancement::Phase;
use crate::error::AirError;
use crate::fitted::{self, LIQUID_ENTHALPY, LIQUID_ENTHALPY_BY_PRESSURE, Lanes};
use crate::ice;
use crate::mixture::mixture;
use crate::saturated;
use crate::saturation;

/// The wet bulb, one for each state of the wick that this air allows. At least one is there.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct WetBulb {
    /// With a wet wick.
    pub liquid: Option<ThermodynamicTemperature>,
    /// With an iced wick.
    pub ice: Option<ThermodynamicTemperature>,
}

impl WetBulb {
    /// What a thermometer shows that nobody looked at: liquid where liquid can be, else ice.
    ///
    /// # Panics
    ///
    /// Never: one of the two is always there.
    #[must_use]
    pub fn reading(self) -> ThermodynamicTemperature {
        self.liquid.or(self.ice).expect("a wet bulb has at least one root")
    }
}

/// Steps of the exact equation at most; two are the rule.
const STEPS: usize = 30;
/// A step this small, K, leaves an error of a millionth of it: the secant converges faster than linearly.
const SMALL_STEP: f64 = 3e-4;

/// Air whose wet bulb is sought: Pa, its scaled logarithm, kg/kg, J/kg, K.
pub(crate) struct Air {
    pub(crate) p: f64,
    pub(crate) z: f64,
    pub(crate) w: f64,
    pub(crate) h: f64,
    pub(crate) t: f64,
}

/// Enthalpy of the condensed phase, J/kg.
fn condensate(t: f64, p: f64, phase: Phase, lanes: &Lanes) -> f64 {
    match phase {
        Phase::Liquid => lanes[LIQUID_ENTHALPY] + (p - 1e5) * lanes[LIQUID_ENTHALPY_BY_PRESSURE],
        Phase::Ice => ice::enthalpy(t, p),
    }
}

/// The residual at a trial wet bulb and its slope (approximate); both decrease toward the right of the root.
fn residual(air: &Air, t: f64, phase: Phase) -> (f64, f64) {
    let lanes = fitted::lanes(t);
    let pure = saturated::pure_pressure(t, phase);
    let vapour = fitted::factor(t, air.p, air.z, phase) * pure;
    let w = EPSILON * vapour / (air.p - vapour);
    let h_c = condensate(t, air.p, phase, &lanes);
    let h_s = mixture(&lanes, t, air.p, w).enthalpy;
    let rise = w * (1.0 + w / EPSILON) * log_slope(t, phase);
    let slope = -(1006.0 + 1860.0 * w) - rise * (2.501e6 + 1860.0 * (t - 273.15) - h_c);
    (air.h + (w - air.w) * h_c - h_s, slope)
}

/// `d ln p_ws / dT`, 1/K, by Clapeyron with a linear latent heat: good to a few parts in a thousand.
fn log_slope(t: f64, phase: Phase) -> f64 {
    let latent = match phase {
        Phase::Liquid => 2.5009e6 - 2380.0 * (t - 273.15),
        Phase::Ice => 2.834e6,
    };
    latent / (461.523 * t * t)
}

/// The wet bulb of the ideal psychrometric equation on one branch, for a first guess: Newton from the right, where
/// the equation is concave, so that every step stays on the right.
fn first_guess(air: &Air, phase: Phase) -> f64 {
    let boiling = saturation::liquid_temperature(air.p);
    let mut t = air.t.min(boiling - 3.0);
    if phase == Phase::Ice {
        t = t.min(TRIPLE_K);
    }
    for _ in 0..20 {
        let vapour = 1.0044 * saturated::pure_pressure(t, phase);
        let w = EPSILON * vapour / (air.p - vapour);
        let c = t - 273.15;
        let h_c = match phase {
            Phase::Liquid => 4190.0 * c,
            Phase::Ice => -333_400.0 + 2100.0 * c,
        };
        let residual = air.h + (w - air.w) * h_c - (1006.0 * c + w * (2.501e6 + 1860.0 * c));
        let rise = w * (1.0 + w / EPSILON) * log_slope(t, phase);
        let step = residual / (1006.0 + 1860.0 * w + rise * (2.501e6 + 1860.0 * c - h_c));
        t += step;
        if step.abs() < 0.1 {
            break;
        }
    }
    t
}

/// The root on one branch, near `guess`.
fn root(air: &Air, phase: Phase, guess: f64) -> Result<f64, AirError> {
    let mut t = guess;
    let (mut f, mut slope) = residual(air, t, phase);
    let mut step = -f / slope;
    for after in 1..=STEPS {
        let before = (t, f);
        t += step;
        let (value, approximate) = residual(air, t, phase);
        f = value;
        // The secant is the better slope once the step is small; far away the approximate one is the safer.
        slope = if step.abs() > 1e-9 && step.abs() < 2.0 {
            (f - before.1) / (t - before.0)
        } else {
            approximate
        };
        if slope.is_nan() || slope >= 0.0 {
            slope = approximate;
        }
        let last = step;
        step = (-f / slope).clamp(-20.0, 20.0);
        if step.abs() < SMALL_STEP && last.abs() < 2.0 {
            return Ok(t + step);
        }
        if !t.is_finite() {
            return Err(AirError::NotConverged { after, residual: f });
        }
    }
    Err(AirError::NotConverged { after: STEPS, residual: step })
}

/// Both wet bulbs where they exist.
pub(crate) fn wet_bulb(air: &Air) -> Result<WetBulb, AirError> {
    let to = ThermodynamicTemperature::from_si;
    // Far from freezing the branch is plain from the guess; near it both are asked.
    let guess = first_guess(air, Phase::Liquid);
    if guess > TRIPLE_K + 2.0 {
        return Ok(WetBulb { liquid: Some(to(root(air, Phase::Liquid, guess)?)), ice: None });
    }
    let liquid = if guess > TRIPLE_K - 4.0 && residual(air, TRIPLE_K, Phase::Liquid).0 >= 0.0 {
        Some(to(root(air, Phase::Liquid, guess.max(TRIPLE_K))?.max(TRIPLE_K)))
    } else {
        None
    };
    let ice = if residual(air, TRIPLE_K, Phase::Ice).0 <= 0.0 {
        Some(to(root(air, Phase::Ice, first_guess(air, Phase::Ice))?.min(TRIPLE_K)))
    } else {
        None
    };
    match (liquid, ice) {
        // The two residuals leave no gap; rounding at the very edge must not leave one either.
        (None, None) => Ok(WetBulb { liquid: Some(to(TRIPLE_K)), ice: None }),
        (liquid, ice) => Ok(WetBulb { liquid, ice }),
    }
}

/// The humidity ratio of air at `t` whose wet bulb on `phase` is `wet`: K, Pa. May come out below zero.
pub(crate) fn humidity_ratio(
    t: f64,
    wet: f64,
    p: f64,
    z: f64,
    phase: Phase,
) -> Result<f64, AirError> {
    let lanes = fitted::lanes(wet);
    let vapour = fitted::factor(wet, p, z, phase) * saturated::pure_pressure(wet, phase);
    if vapour >= p {
        return Err(AirError::TooMuchWater);
    }
    let w_s = EPSILON * vapour / (p - vapour);
    let h_c = condensate(wet, p, phase, &lanes);
    let h_s = mixture(&lanes, wet, p, w_s).enthalpy;
    let air = fitted::lanes(t);
    // h(t, p, W) - W h_c is nearly linear in W: a secant from the ideal slope closes in a few steps.
    let target = h_s - w_s * h_c;
    let residual = |w: f64| mixture(&air, t, p, w).enthalpy - w * h_c - target;
    let mut slope = 2.501e6 + 1860.0 * (t - 273.15) - h_c;
    let mut w = 0.0;
    let mut f = residual(w);
    for after in 1..=STEPS {
        let step = -f / slope;
        let before = f;
        w += step;
        f = residual(w);
        if (f / slope).abs() < 1e-13 {
            return Ok(w - f / slope);
        }
        if step.abs() > 1e-12 {
            slope = (f - before) / step;
        }
        if !w.is_finite() {
            return Err(AirError::NotConverged { after, residual: f });
        }
    }
    Err(AirError::NotConverged { after: STEPS, residual: f / slope })
}
