//! Air that may hold more water than it can: settled into saturated air and fog.

use dewledger_quantities::{Enthalpy, HumidityRatio, Pressure, Quantity, ThermodynamicTemperature};

use crate::constants::TRIPLE_K;
use crate::enhancement::Phase;
use crate::error::AirError;
use crate::fitted;
use crate::ice;
use crate::liquid;
use crate::mixture::mixture;
use crate::moist_air::{MoistAir, in_pressure_range, in_temperature_range, temperature_of};
use crate::saturated;

/// Air with the fog in it, per mass of dry air.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Mixed {
    /// The air, saturated where there is fog.
    pub air: MoistAir,
    /// Liquid fog.
    pub liquid: HumidityRatio,
    /// Ice fog.
    pub ice: HumidityRatio,
}

/// Air of an enthalpy and a total of water in all forms: clear, or saturated with the rest as liquid or ice.
///
/// Liquid where its root lies at or above the triple point, ice where its root lies below, both at the triple
/// point in between. Real cold fog is often supercooled droplets, cooler than the ice branch says.
///
/// # Errors
///
/// The ranges of temperature and pressure; negative water.
pub fn settle(h: Enthalpy, w: HumidityRatio, pressure: Pressure) -> Result<Mixed, AirError> {
    in_pressure_range(pressure)?;
    let (h, w, p) = (h.si(), w.si(), pressure.si());
    let z = fitted::scaled_pressure(p);
    let none = HumidityRatio::default();
    if w < 0.0 {
        return Err(AirError::AboveSaturation { got: HumidityRatio::from_si(w), limit: none });
    }
    let t = temperature_of(h, w, p)?;
    let at = |t: f64, w: f64| {
        MoistAir::unchecked(
            ThermodynamicTemperature::from_si(t),
            HumidityRatio::from_si(w),
            pressure,
        )
    };
    let clear = saturated::ratio(t, p, z, saturated::phase(t)).is_none_or(|limit| w <= limit);
    if clear {
        in_temperature_range(ThermodynamicTemperature::from_si(t))?;
        return Ok(Mixed { air: at(t, w), liquid: none, ice: none });
    }
    // Enthalpy of saturated air with the rest condensed, less what there is: increasing in t.
    let residual = |t: f64, phase: Phase| {
        let saturated = saturated::ratio(t, p, z, phase).unwrap_or(w).min(w);
        let condensed = match phase {
            Phase::Liquid => liquid::enthalpy(t, p),
            Phase::Ice => ice::enthalpy(t, p),
        };
        mixture(&fitted::lanes(t), t, p, saturated).enthalpy + (w - saturated) * condensed - h
    };
    let phase = if residual(TRIPLE_K, Phase::Liquid) <= 0.0 {
        Phase::Liquid
    } else if residual(TRIPLE_K, Phase::Ice) > 0.0 {
        Phase::Ice
    } else {
        return Ok(at_triple_point(h, w, p, z, at(TRIPLE_K, 0.0)));
    };
    let bracket = match phase {
        Phase::Liquid => (TRIPLE_K, 363.15),
        Phase::Ice => (200.0, TRIPLE_K),
    };
    let t = bisect(|t| residual(t, phase), bracket);
    in_temperature_range(ThermodynamicTemperature::from_si(t))?;
    let vapour = saturated::ratio(t, p, z, phase).unwrap_or(w).min(w);
    let fog = HumidityRatio::from_si(w - vapour);
    let (liquid, ice) = if phase == Phase::Liquid { (fog, none) } else { (none, fog) };
    Ok(Mixed { air: at(t, vapour), liquid, ice })
}

/// Liquid and ice together at the triple point, shared by the enthalpy.
fn at_triple_point(h: f64, w: f64, p: f64, z: f64, dry: MoistAir) -> Mixed {
    let vapour = saturated::ratio(TRIPLE_K, p, z, Phase::Liquid).unwrap_or(0.0).min(w);
    let air = MoistAir::unchecked(dry.dry_bulb(), HumidityRatio::from_si(vapour), dry.pressure());
    let fog = w - vapour;
    let (liquid, ice) = (liquid::enthalpy(TRIPLE_K, p), ice::enthalpy(TRIPLE_K, p));
    let share =
        if fog > 0.0 { ((h - air.enthalpy().si()) / fog - ice) / (liquid - ice) } else { 0.0 };
    let share = share.clamp(0.0, 1.0);
    Mixed {
        air,
        liquid: HumidityRatio::from_si(share * fog),
        ice: HumidityRatio::from_si((1.0 - share) * fog),
    }
}

/// The root of an increasing function within a bracket, by Illinois steps, to 1e-10 K.
fn bisect(f: impl Fn(f64) -> f64, (mut low, mut high): (f64, f64)) -> f64 {
    let (mut f_low, mut f_high) = (f(low), f(high));
    let mut t = low;
    for _ in 0..80 {
        t = if f_high > f_low {
            low - f_low * (high - low) / (f_high - f_low)
        } else {
            0.5 * (low + high)
        };
        if !(t > low && t < high) {
            t = 0.5 * (low + high);
        }
        let value = f(t);
        if value.abs() < 1e-8 || high - low < 1e-10 {
            break;
        }
        if value < 0.0 {
            low = t;
            f_low = value;
            f_high *= 0.5;
        } else {
            high = t;
            f_high = value;
            f_low *= 0.5;
        }
    }
    t
}
