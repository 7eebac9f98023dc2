//! Liquid water and steam, for water sides, condensate and humidifiers.

use dewledger_quantities::{
    MassDensity, Pressure, Quantity, Ratio, SpecificHeatCapacity, ThermodynamicTemperature,
    WaterEnthalpy,
};

use crate::constants::{M_WATER, R_MIXTURE};
use crate::fitted::{self, BWW, CWWW, SLOPE, WATER_ENTHALPY};
use crate::liquid;
use crate::saturation;

/// Why there is no such water.
#[derive(Debug, Clone, Copy, PartialEq, thiserror::Error)]
pub enum WaterError {
    /// Outside −20 to 110 °C, where the liquid equation holds.
    #[error("liquid water at {} K is outside 253.15 to 383.15 K", .got.si())]
    TemperatureOutOfRange {
        /// As given.
        got: ThermodynamicTemperature,
    },
    /// Steam outside 1 to 500 kPa.
    #[error("steam at {} Pa is outside 1 000 to 500 000 Pa", .got.si())]
    PressureOutOfRange {
        /// As given.
        got: Pressure,
    },
    /// Dryness outside 0 to 1.
    #[error("dryness {} is outside 0 to 1", .got.si())]
    DrynessOutOfRange {
        /// As given.
        got: Ratio,
    },
}

fn in_range(t: ThermodynamicTemperature) -> Result<f64, WaterError> {
    if (253.15..=383.15).contains(&t.si()) {
        Ok(t.si())
    } else {
        Err(WaterError::TemperatureOutOfRange { got: t })
    }
}

/// Density at a pressure, kg/m³. Range: −20 to 110 °C. Source: IAPWS SR6-08(2011).
///
/// # Errors
///
/// [`WaterError::TemperatureOutOfRange`].
pub fn density(t: ThermodynamicTemperature, p: Pressure) -> Result<MassDensity, WaterError> {
    Ok(MassDensity::from_si(1.0 / liquid::volume(in_range(t)?, p.si())))
}

/// Specific enthalpy at a pressure, J/kg, zero at the triple point. Range: −20 to 110 °C. Source: IAPWS SR6-08(2011).
///
/// # Errors
///
/// [`WaterError::TemperatureOutOfRange`].
pub fn enthalpy(t: ThermodynamicTemperature, p: Pressure) -> Result<WaterEnthalpy, WaterError> {
    Ok(WaterEnthalpy::from_si(liquid::enthalpy(in_range(t)?, p.si())))
}

/// Isobaric heat capacity at 0.1 MPa, J/(kg K). Range: −20 to 110 °C. Source: IAPWS SR6-08(2011).
///
/// # Errors
///
/// [`WaterError::TemperatureOutOfRange`].
pub fn heat_capacity(t: ThermodynamicTemperature) -> Result<SpecificHeatCapacity, WaterError> {
    Ok(SpecificHeatCapacity::from_si(liquid::liquid(in_range(t)?).heat_capacity))
}

/// Pressure at which water boils, Pa. Range: 0 to 374 °C. Source: IAPWS R7-97(2012), region 4.
#[must_use]
pub fn saturation_pressure(t: ThermodynamicTemperature) -> Pressure {
    Pressure::from_si(saturation::over_liquid(t.si()))
}

/// Temperature at which water boils, K. Range: 611 Pa to 22 MPa. Source: IAPWS R7-97(2012), region 4.
#[must_use]
pub fn saturation_temperature(p: Pressure) -> ThermodynamicTemperature {
    ThermodynamicTemperature::from_si(saturation::liquid_temperature(p.si()))
}

/// Enthalpy of saturated steam of a dryness, J/kg: the virial equation for the vapour (3e-5 of IAPWS-95 at 1 atm,
/// 7e-5 at 3 bar), IAPWS SR6-08 for the liquid, extrapolated above 110 °C for the small wet part.
///
/// # Errors
///
/// [`WaterError`] outside 1 to 500 kPa absolute or 0 to 1 of dryness.
pub fn steam_enthalpy(p: Pressure, dryness: Ratio) -> Result<WaterEnthalpy, WaterError> {
    if !(1e3..=5e5).contains(&p.si()) {
        return Err(WaterError::PressureOutOfRange { got: p });
    }
    if !(0.0..=1.0).contains(&dryness.si()) {
        return Err(WaterError::DrynessOutOfRange { got: dryness });
    }
    let t = saturation::liquid_temperature(p.si());
    let lanes = fitted::lanes(t);
    let rt = R_MIXTURE * t;
    let (b, c) = (lanes[BWW], lanes[CWWW]);
    let mut v = rt / p.si() + b;
    for _ in 0..12 {
        v = rt / p.si() * (1.0 + b / v + c / (v * v));
    }
    let residual =
        rt * ((b - t * lanes[SLOPE + BWW]) / v + (c - 0.5 * t * lanes[SLOPE + CWWW]) / (v * v));
    let vapour = (lanes[WATER_ENTHALPY] + residual) / M_WATER;
    let liquid = liquid::enthalpy(t, p.si());
    Ok(WaterEnthalpy::from_si(dryness.si() * vapour + (1.0 - dryness.si()) * liquid))
}
