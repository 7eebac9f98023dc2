//! Pressure of the air at an elevation.
//!
//! ISO 2533:1975: `p = 101 325 (1 − 0.0065 z / 288.15)^n` with n = g / (R L) in full, z geopotential.

use dewledger_quantities::{
    Elevation, HumidityRatio, Pressure, Quantity, ThermodynamicTemperature,
};

/// Sea-level pressure of the standard atmosphere, Pa.
const P_0: f64 = 101_325.0;
/// Sea-level temperature, K.
const T_0: f64 = 288.15;
/// Lapse, K/m.
const LAPSE: f64 = 0.0065;
/// Standard gravity, m/s².
const G: f64 = 9.806_65;
/// Specific gas constant of the standard atmosphere, J/(kg K).
const R: f64 = 287.052_87;
/// g / (R L).
const EXPONENT: f64 = G / (R * LAPSE);

/// What the standard atmosphere is not used for.
#[derive(Debug, Clone, Copy, PartialEq, thiserror::Error)]
pub enum AtmosphereError {
    /// Outside −430 to 5000 m.
    #[error("elevation {} m is outside -430 to 5000 m", .got.si())]
    ElevationOutOfRange {
        /// As given.
        got: Elevation,
    },
    /// No pressure at sea level.
    #[error("{} Pa is no pressure at sea level", .got.si())]
    PressureOutOfRange {
        /// As given.
        got: Pressure,
    },
    /// No outdoor temperature.
    #[error("outdoor temperature {} K is outside 203 to 333 K", .got.si())]
    TemperatureOutOfRange {
        /// As given.
        got: ThermodynamicTemperature,
    },
}

fn height(z: Elevation) -> Result<f64, AtmosphereError> {
    // Half a metre of slack for elevations typed in feet.
    if (-430.5..=5000.5).contains(&z.si()) {
        Ok(z.si())
    } else {
        Err(AtmosphereError::ElevationOutOfRange { got: z })
    }
}

/// Pressure of the standard atmosphere. Range: −430 to 5000 m. Source: ISO 2533:1975.
///
/// # Errors
///
/// [`AtmosphereError::ElevationOutOfRange`].
pub fn pressure_at(z: Elevation) -> Result<Pressure, AtmosphereError> {
    Ok(Pressure::from_si(P_0 * (1.0 - LAPSE * height(z)? / T_0).powf(EXPONENT)))
}

/// Pressure here from an altimeter setting: the exact inverse of the setting's definition (ICAO standard atmosphere).
///
/// # Errors
///
/// [`AtmosphereError`] for an elevation or a setting that cannot be.
pub fn from_altimeter_setting(
    setting: Pressure,
    z: Elevation,
) -> Result<Pressure, AtmosphereError> {
    let z = height(z)?;
    if !(50_000.0..=130_000.0).contains(&setting.si()) {
        return Err(AtmosphereError::PressureOutOfRange { got: setting });
    }
    let ratio = (setting.si() / P_0).powf(1.0 / EXPONENT) - LAPSE * z / T_0;
    Ok(Pressure::from_si(P_0 * ratio.powf(EXPONENT)))
}

/// Pressure here from a sea-level pressure: `p = P0 exp(−g z / (R T_v))`, with the mean temperature of the column
/// from a lapse of 6.5 K/km and its virtual part from the outdoor humidity. Weather services reduce in other ways
/// too (12 h means, plateau terms): about 0.3 % a kilometre.
///
/// # Errors
///
/// [`AtmosphereError`] for an elevation, pressure or temperature that cannot be.
pub fn from_sea_level_pressure(
    sea_level: Pressure,
    z: Elevation,
    outdoor: ThermodynamicTemperature,
    outdoor_moisture: HumidityRatio,
) -> Result<Pressure, AtmosphereError> {
    let z = height(z)?;
    if !(50_000.0..=130_000.0).contains(&sea_level.si()) {
        return Err(AtmosphereError::PressureOutOfRange { got: sea_level });
    }
    if !(203.0..=333.0).contains(&outdoor.si()) {
        return Err(AtmosphereError::TemperatureOutOfRange { got: outdoor });
    }
    let w = outdoor_moisture.si();
    let column = (outdoor.si() + 0.5 * LAPSE * z) * (1.0 + 0.6078 * w / (1.0 + w));
    Ok(Pressure::from_si(sea_level.si() * (-G * z / (R * column)).exp()))
}

#[cfg(test)]
mod tests {
    use super::*;

    /// ISO 2533:1975 / ICAO Doc 7488, geopotential height, Pa, recomputed from the defining constants.
    #[test]
    fn the_standard_atmosphere_is_iso_2533() {
        let table = [
            (0.0, 101_325.0),
            (500.0, 95_460.8),
            (1000.0, 89_874.6),
            (1500.0, 84_556.0),
            (2000.0, 79_495.2),
            (2500.0, 74_682.5),
            (3000.0, 70_108.5),
            (4000.0, 61_640.2),
            (5000.0, 54_019.9),
        ];
        for (z, p) in table {
            let ours = pressure_at(Elevation::from_si(z)).unwrap().si();
            assert!((ours - p).abs() < 0.06, "{z} m: {ours}");
        }
    }

    #[test]
    fn an_altimeter_setting_of_the_standard_leads_back_to_it() {
        let z = Elevation::from_si(1609.344);
        let here = from_altimeter_setting(Pressure::from_si(P_0), z).unwrap();
        assert!((here.si() - pressure_at(z).unwrap().si()).abs() < 1e-6);
    }

    #[test]
    fn what_cannot_be_is_refused() {
        assert!(pressure_at(Elevation::from_si(6000.0)).is_err());
        assert!(from_altimeter_setting(Pressure::from_si(1e4), Elevation::from_si(0.0)).is_err());
    }
}
