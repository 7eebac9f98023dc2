//! Dew point over liquid water and frost point over ice: where `f(T, p) p_ws(T) = x p`.

use crate::constants::TRIPLE_K;
use crate::enhancement::Phase;
use crate::error::AirError;
use crate::fitted;
use crate::saturated::phase;
use crate::saturation;

/// Coldest dew point over supercooled water, K: the extrapolated curve is not followed further.
pub(crate) const COLDEST_DEW_POINT: f64 = 213.15;
/// Coldest frost point, K.
pub(crate) const COLDEST_FROST_POINT: f64 = 173.15;

/// Dew point over liquid water, K, of a vapour pressure, Pa.
pub(crate) fn over_liquid(vapour: f64, p: f64, z: f64) -> Result<f64, AirError> {
    // Far below the coldest dew point; the exact limit is asked of the result.
    if vapour < 1.0 {
        return Err(AirError::TooDryForDewPoint);
    }
    // Each pass leaves a thousandth of the error: f hardly changes along the curve.
    let mut t = saturation::liquid_temperature(vapour / 1.0044);
    for _ in 0..2 {
        t = saturation::liquid_temperature(vapour / fitted::factor(t, p, z, phase(t)).max(1.0));
    }
    if t < COLDEST_DEW_POINT { Err(AirError::TooDryForDewPoint) } else { Ok(t) }
}

/// Frost point over ice, K; above the triple point the dew point.
pub(crate) fn over_ice(vapour: f64, p: f64, z: f64) -> Result<f64, AirError> {
    if vapour < 1e-3 {
        return Err(AirError::TooDryForDewPoint);
    }
    let triple = fitted::factor(TRIPLE_K, p, z, Phase::Ice) * 611.657;
    if vapour >= triple {
        return over_liquid(vapour, p, z);
    }
    let wanted = (vapour / 611.657).ln();
    // Magnus form over ice for a first guess; then steps in 1/T, in which the curve is nearly straight.
    let magnus = wanted / 22.46;
    let mut t = 273.15 + 272.62 * magnus / (1.0 - magnus);
    for after in 1..=12 {
        let log = fitted::ice_log_pressure(t) + fitted::factor(t, p, z, Phase::Ice).ln();
        let step = (wanted - log) * 461.523 * t / 2.834e6;
        t /= 1.0 - step;
        if step.abs() * t < 1e-5 {
            return if t < COLDEST_FROST_POINT { Err(AirError::TooDryForDewPoint) } else { Ok(t) };
        }
        if !t.is_finite() || after == 12 {
            return Err(AirError::NotConverged { after, residual: step * t });
        }
    }
    Ok(t)
}
