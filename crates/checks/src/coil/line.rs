//! The line through two states and where it meets saturation.
//!
//! `k = (W1 - W2)/(T1 - T2)`, `g(T) = W_s(T, p) - W2 - k (T - T2)`. `W_s` is convex but for its slope, which drops by 12 % where
//! ice turns to liquid. Where `W_s' = k` the line is nearest; beyond that it cannot meet saturation if `g > 0` there. Of two
//! meetings the apparatus dew point is the one first met from the leaving state (own derivation).

use dewledger_properties::{MoistAir, saturation_humidity_ratio};
use dewledger_quantities::{HumidityRatio, Pressure, Quantity, Ratio, ThermodynamicTemperature};

/// Where ice turns to liquid, K.
const TRIPLE_K: f64 = 273.16;
/// As cold as moist air is worked out for, K.
const COLDEST_K: f64 = 213.16;

/// Where a coil's line meets saturation.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Meeting {
    /// At this state; how steep saturation is there against the line, nearest to it (1 is tangent).
    At {
        /// Apparatus dew point.
        dry_bulb: ThermodynamicTemperature,
        /// Humidity ratio there.
        humidity_ratio: HumidityRatio,
        /// Slope of saturation at the meeting over the line's.
        steepness: Ratio,
    },
    /// Nowhere: the line passes saturation by.
    Nowhere {
        /// Where it comes nearest.
        nearest: ThermodynamicTemperature,
    },
}

fn saturated(t: f64, p: Pressure) -> f64 {
    saturation_humidity_ratio(ThermodynamicTemperature::from_si(t), p)
        .map_or(f64::NAN, Quantity::si)
}

/// Slope of saturation, per K, on the side of `t` that is asked for near the triple point.
fn slope(t: f64, p: Pressure, liquid: bool) -> f64 {
    const STEP: f64 = 1e-3;
    let (low, high) = if liquid {
        (f64::max(t - STEP, TRIPLE_K), t + STEP)
    } else {
        (t - STEP, f64::min(t + STEP, TRIPLE_K - 1e-9))
    };
    (saturated(high, p) - saturated(low, p)) / (high - low)
}

/// Where the slope of saturation is `k`, between two temperatures of one branch; none where it is not.
fn where_slope_is(k: f64, low: f64, high: f64, p: Pressure, liquid: bool) -> Option<f64> {
    let off = |t: f64| slope(t, p, liquid) - k;
    let (mut low, mut high) = (low, high);
    if low >= high || off(low) > 0.0 || off(high) < 0.0 {
        return None;
    }
    for _ in 0..60 {
        let middle = 0.5 * (low + high);
        if off(middle) > 0.0 {
            high = middle;
        } else {
            low = middle;
        }
    }
    Some(0.5 * (low + high))
}

/// Where the line through both states meets saturation, coming from the leaving one. Entering must be warmer and not
/// drier than leaving.
#[must_use]
pub fn meeting(entering: &MoistAir, leaving: &MoistAir) -> Meeting {
    let p = leaving.pressure();
    let (t1, t2) = (entering.dry_bulb().si(), leaving.dry_bulb().si());
    let (w1, w2) = (entering.humidity_ratio().si(), leaving.humidity_ratio().si());
    let k = (w1 - w2) / (t1 - t2);
    let above = |t: f64| saturated(t, p) - w2 - k * (t - t2);
    let at = |t: f64| {
        let steepness = slope(t, p, t >= TRIPLE_K) / k;
        Meeting::At {
            dry_bulb: ThermodynamicTemperature::from_si(t),
            humidity_ratio: HumidityRatio::from_si(saturated(t, p)),
            steepness: Ratio::from_si(steepness),
        }
    };
    if above(t2) <= 0.0 {
        return at(t2);
    }
    // Where saturation runs alongside the line: on the liquid branch first.
    let nearest = where_slope_is(k, TRIPLE_K, t2.max(TRIPLE_K), p, true)
        .filter(|t| above(*t) <= 0.0 || t2 >= TRIPLE_K && slope(TRIPLE_K, p, true) <= k)
        .or_else(|| where_slope_is(k, COLDEST_K, t2.min(TRIPLE_K - 1e-6), p, false));
    let nearest = match nearest {
        Some(nearest) => nearest,
        // Steeper than saturation at the leaving state: the line runs away from it.
        None if slope(t2, p, t2 >= TRIPLE_K) < k => {
            return Meeting::Nowhere { nearest: leaving.dry_bulb() };
        }
        // Flatter than saturation anywhere: it meets it before the cold end.
        None => COLDEST_K,
    };
    if above(nearest) > 0.0 {
        // The bend at the triple point may still lie below the line.
        if nearest < TRIPLE_K && t2 > TRIPLE_K && above(TRIPLE_K) <= 0.0 {
            return at(root(above, TRIPLE_K, t2));
        }
        return Meeting::Nowhere { nearest: ThermodynamicTemperature::from_si(nearest) };
    }
    at(root(above, nearest, t2))
}

/// The root between a temperature where the line is above saturation and one where it is below.
fn root(above: impl Fn(f64) -> f64, low: f64, high: f64) -> f64 {
    let (mut low, mut high) = (low, high);
    for _ in 0..80 {
        let middle = 0.5 * (low + high);
        if above(middle) > 0.0 {
            high = middle;
        } else {
            low = middle;
        }
    }
    0.5 * (low + high)
}

/// The share of the air that would pass untouched, were the rest to leave at this temperature.
#[must_use]
pub fn bypass(entering: &MoistAir, leaving: &MoistAir, surface: ThermodynamicTemperature) -> Ratio {
    let (t1, t2) = (entering.dry_bulb().si(), leaving.dry_bulb().si());
    Ratio::from_si((t2 - surface.si()) / (t1 - surface.si()))
}

/// The bypass factor at another mass flow: `exp(ln BF (m'/m)^(n - 1))`, with the air side's conductance as `m^n`.
#[must_use]
pub fn at_flow(bypass: Ratio, flow_ratio: Ratio, exponent: Ratio) -> Ratio {
    let bypass = bypass.si().max(1e-12);
    Ratio::from_si((bypass.ln() * flow_ratio.si().powf(exponent.si() - 1.0)).exp())
}
