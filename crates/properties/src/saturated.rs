//! Saturated air: how much water it holds.

use dewledger_quantities::{HumidityRatio, Pressure, Quantity, ThermodynamicTemperature};

use crate::constants::{TRIPLE_K, humidity_ratio};
use crate::enhancement::Phase;
use crate::error::AirError;
use crate::fitted;
use crate::moist_air::{in_pressure_range, in_temperature_range};
use crate::saturation;

/// Pure saturation pressure over `phase`, Pa.
pub(crate) fn pure_pressure(t: f64, phase: Phase) -> f64 {
    match phase {
        Phase::Liquid => saturation::over_liquid(t),
        Phase::Ice => 611.657 * fitted::ice_log_pressure(t).exp(),
    }
}

/// The phase that condenses at `t`: ice below the triple point.
pub(crate) fn phase(t: f64) -> Phase {
    if t < TRIPLE_K { Phase::Ice } else { Phase::Liquid }
}

/// Partial pressure of vapour in saturated air, Pa: `f p_ws`, or `p_ws` alone above boiling.
pub(crate) fn pressure(t: f64, p: f64, z: f64, over: Phase) -> f64 {
    let pure = pure_pressure(t, over);
    // The factor is that of the phase that is stable at t: over supercooled liquid too.
    let factor = fitted::factor(t, p, z, phase(t));
    if factor * pure >= p { pure } else { factor.max(1.0) * pure }
}

/// Humidity ratio of saturated air; none above boiling.
pub(crate) fn ratio(t: f64, p: f64, z: f64, over: Phase) -> Option<f64> {
    let vapour = pressure(t, p, z, over);
    (vapour < p).then(|| humidity_ratio(vapour / p))
}

/// Humidity ratio of saturated air at K and Pa: over ice below 0.01 °C, over liquid water above.
///
/// Range: −60 to 90 °C, 40 to 135 kPa, below boiling. Source: ASHRAE RP-1485.
///
/// # Errors
///
/// [`AirError::TemperatureOutOfRange`], [`AirError::PressureOutOfRange`], or [`AirError::TooMuchWater`] above boiling.
pub fn saturation_humidity_ratio(
    t: ThermodynamicTemperature,
    p: Pressure,
) -> Result<HumidityRatio, AirError> {
    over(t, p, phase(t.si()))
}

/// The same over liquid water, also where it is supercooled.
///
/// # Errors
///
/// As [`saturation_humidity_ratio`].
pub fn saturation_humidity_ratio_over_liquid(
    t: ThermodynamicTemperature,
    p: Pressure,
) -> Result<HumidityRatio, AirError> {
    over(t, p, Phase::Liquid)
}

fn over(t: ThermodynamicTemperature, p: Pressure, over: Phase) -> Result<HumidityRatio, AirError> {
    in_temperature_range(t)?;
    in_pressure_range(p)?;
    let z = fitted::scaled_pressure(p.si());
    ratio(t.si(), p.si(), z, over).map(HumidityRatio::from_si).ok_or(AirError::TooMuchWater)
}
