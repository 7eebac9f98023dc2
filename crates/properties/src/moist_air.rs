//! A state of moist air.

use dewledger_quantities::{
    Enthalpy, HumidityRatio, MassDensity, Pressure, Quantity, Ratio, RelativeHumidity,
    SpecificHeatCapacity, SpecificVolume, ThermodynamicTemperature, VapourPressure,
};

use crate::constants::{EPSILON, TRIPLE_K, humidity_ratio, mole_fraction};
use crate::dew_point;
use crate::enhancement::Phase;
use crate::error::AirError;
use crate::fitted;
use crate::humidity::{Humidity, Wick};
use crate::mixture::{entropy, mixture};
use crate::saturated;
use crate::wet_bulb::{self, WetBulb};

/// Moist air at a dry bulb, a pressure and a humidity ratio: everything else follows.
///
/// Per mass of dry air. Range: −60 to 90 °C, 40 to 135 kPa. Source: ASHRAE RP-1485 (real gas).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct MoistAir {
    t: f64,
    p: f64,
    /// Logarithm of pressure, as the fits take it.
    z: f64,
    w: f64,
    h: f64,
    v: f64,
}

/// Most water that is worked out, kg/kg: above boiling there is no saturation to stop at.
const WETTEST: f64 = 2.0;
/// A typed humidity ratio may exceed saturation by rounding.
const ROUNDING: f64 = 1e-9;

pub(crate) fn in_temperature_range(t: ThermodynamicTemperature) -> Result<(), AirError> {
    if (213.15..=363.15).contains(&t.si()) {
        Ok(())
    } else {
        Err(AirError::TemperatureOutOfRange { got: t })
    }
}

pub(crate) fn in_pressure_range(p: Pressure) -> Result<(), AirError> {
    if (40_000.0..=135_000.0).contains(&p.si()) {
        Ok(())
    } else {
        Err(AirError::PressureOutOfRange { got: p })
    }
}

impl MoistAir {
    /// Air of a dry bulb and one humidity.
    ///
    /// # Errors
    ///
    /// [`AirError`] where no such air can be.
    pub fn new(
        dry_bulb: ThermodynamicTemperature,
        humidity: Humidity,
        pressure: Pressure,
    ) -> Result<MoistAir, AirError> {
        in_temperature_range(dry_bulb)?;
        in_pressure_range(pressure)?;
        let (t, p) = (dry_bulb.si(), pressure.si());
        let z = fitted::scaled_pressure(p);
        let w = match humidity {
            Humidity::RelativeHumidity(rh) => by_relative_humidity(t, p, z, rh, Phase::Liquid)?,
            Humidity::RelativeHumidityOverIce(rh) => {
                by_relative_humidity(t, p, z, rh, saturated::phase(t))?
            }
            Humidity::WetBulb(wet_bulb, wick) => by_wet_bulb(dry_bulb, wet_bulb, wick, p, z)?,
            Humidity::DewPoint(dew_point) => {
                by_dew_point(dry_bulb, dew_point, p, z, Phase::Liquid)?
            }
            Humidity::FrostPoint(frost_point) => {
                if frost_point.si() > TRIPLE_K {
                    return Err(AirError::FrostPointAboveFreezing { got: frost_point });
                }
                by_dew_point(dry_bulb, frost_point, p, z, Phase::Ice)?
            }
            Humidity::HumidityRatio(w) => below_saturation(t, p, z, w)?.si(),
            Humidity::Enthalpy(h) => by_enthalpy(t, p, z, h)?,
        };
        if w > WETTEST {
            return Err(AirError::TooMuchWater);
        }
        Ok(Self::at(t, p, z, w))
    }

    /// Saturated air: over ice below 0.01 °C.
    ///
    /// # Errors
    ///
    /// As [`crate::saturation_humidity_ratio`].
    pub fn saturated(
        dry_bulb: ThermodynamicTemperature,
        pressure: Pressure,
    ) -> Result<MoistAir, AirError> {
        let w = crate::saturation_humidity_ratio(dry_bulb, pressure)?;
        Ok(Self::unchecked(dry_bulb, w, pressure))
    }

    /// Air of this humidity ratio without asking whether it can hold it: metastable states inside solvers.
    /// The caller keeps it near the physical range.
    #[must_use]
    pub fn unchecked(
        dry_bulb: ThermodynamicTemperature,
        w: HumidityRatio,
        pressure: Pressure,
    ) -> MoistAir {
        let p = pressure.si();
        Self::at(dry_bulb.si(), p, fitted::scaled_pressure(p), w.si())
    }

    /// Air of this enthalpy and humidity ratio, not foggy; see [`crate::settle`] for air that may be.
    ///
    /// # Errors
    ///
    /// [`AirError::AboveSaturation`] where it would be foggy, and the ranges.
    pub fn from_enthalpy_and_humidity_ratio(
        h: Enthalpy,
        w: HumidityRatio,
        pressure: Pressure,
    ) -> Result<MoistAir, AirError> {
        in_pressure_range(pressure)?;
        let t = temperature_of(h.si(), w.si(), pressure.si())?;
        in_temperature_range(ThermodynamicTemperature::from_si(t))?;
        let z = fitted::scaled_pressure(pressure.si());
        below_saturation(t, pressure.si(), z, w)?;
        Ok(Self::at(t, pressure.si(), z, w.si()))
    }

    /// Air of this enthalpy and humidity ratio, all its water as vapour, without asking whether it can hold it: where a
    /// mixture would lie before it turns to fog.
    ///
    /// # Errors
    ///
    /// [`AirError::PressureOutOfRange`], or [`AirError::TemperatureOutOfRange`] where the temperature is outside −60 to
    /// 90 °C.
    pub fn unchecked_from_enthalpy(
        h: Enthalpy,
        w: HumidityRatio,
        pressure: Pressure,
    ) -> Result<MoistAir, AirError> {
        in_pressure_range(pressure)?;
        let t = ThermodynamicTemperature::from_si(temperature_of(h.si(), w.si(), pressure.si())?);
        in_temperature_range(t)?;
        Ok(Self::unchecked(t, w, pressure))
    }

    fn at(t: f64, p: f64, z: f64, w: f64) -> MoistAir {
        let mixed = mixture(&fitted::lanes(t), t, p, w);
        MoistAir { t, p, z, w, h: mixed.enthalpy, v: mixed.volume }
    }

    /// Dry bulb.
    #[must_use]
    pub fn dry_bulb(&self) -> ThermodynamicTemperature {
        ThermodynamicTemperature::from_si(self.t)
    }

    /// Absolute pressure.
    #[must_use]
    pub fn pressure(&self) -> Pressure {
        Pressure::from_si(self.p)
    }

    /// Mass of water per mass of dry air.
    #[must_use]
    pub fn humidity_ratio(&self) -> HumidityRatio {
        HumidityRatio::from_si(self.w)
    }

    /// Enthalpy per mass of dry air.
    #[must_use]
    pub fn enthalpy(&self) -> Enthalpy {
        Enthalpy::from_si(self.h)
    }

    /// Volume per mass of dry air.
    #[must_use]
    pub fn specific_volume(&self) -> SpecificVolume {
        SpecificVolume::from_si(self.v)
    }

    /// Density of the moist air, `(1 + W) / v`.
    #[must_use]
    pub fn density(&self) -> MassDensity {
        MassDensity::from_si((1.0 + self.w) / self.v)
    }

    /// Relative humidity over liquid water, also below freezing.
    #[must_use]
    pub fn relative_humidity(&self) -> RelativeHumidity {
        self.relative_to(Phase::Liquid)
    }

    /// Relative humidity over ice below 0.01 °C, the ordinary one above.
    #[must_use]
    pub fn relative_humidity_over_ice(&self) -> RelativeHumidity {
        self.relative_to(saturated::phase(self.t))
    }

    fn relative_to(&self, over: Phase) -> RelativeHumidity {
        let vapour = mole_fraction(self.w) * self.p;
        RelativeHumidity::from_si(vapour / saturated::pressure(self.t, self.p, self.z, over))
    }

    /// Dew point over liquid water.
    ///
    /// # Errors
    ///
    /// [`AirError::TooDryForDewPoint`] below about −60 °C.
    pub fn dew_point(&self) -> Result<ThermodynamicTemperature, AirError> {
        dew_point::over_liquid(mole_fraction(self.w) * self.p, self.p, self.z)
            .map(ThermodynamicTemperature::from_si)
    }

    /// Frost point over ice; above 0.01 °C the dew point.
    ///
    /// # Errors
    ///
    /// [`AirError::TooDryForDewPoint`] below about −100 °C.
    pub fn frost_point(&self) -> Result<ThermodynamicTemperature, AirError> {
        dew_point::over_ice(mole_fraction(self.w) * self.p, self.p, self.z)
            .map(ThermodynamicTemperature::from_si)
    }

    /// Thermodynamic wet bulb: one for a wet wick, one for an iced one, where they exist.
    ///
    /// # Errors
    ///
    /// [`AirError::NotConverged`], which the tests have not seen over the whole range.
    pub fn wet_bulb(&self) -> Result<WetBulb, AirError> {
        wet_bulb::wet_bulb(&wet_bulb::Air { p: self.p, z: self.z, w: self.w, h: self.h, t: self.t })
    }

    /// Partial pressure of the vapour, `x p`.
    #[must_use]
    pub fn vapour_pressure(&self) -> VapourPressure {
        VapourPressure::from_si(mole_fraction(self.w) * self.p)
    }

    /// Humidity ratio over that of saturated air (over ice below 0.01 °C); zero above boiling.
    #[must_use]
    pub fn degree_of_saturation(&self) -> Ratio {
        let saturated = saturated::ratio(self.t, self.p, self.z, saturated::phase(self.t));
        Ratio::from_si(saturated.map_or(0.0, |saturated| self.w / saturated))
    }

    /// Heat capacity per mass of dry air at constant humidity ratio: `(h(T+δ) − h(T−δ)) / 2δ`, δ = 5 mK.
    #[must_use]
    pub fn heat_capacity(&self) -> SpecificHeatCapacity {
        let step = 5e-3;
        let h = |t: f64| mixture(&fitted::lanes(t), t, self.p, self.w).enthalpy;
        SpecificHeatCapacity::from_si((h(self.t + step) - h(self.t - step)) / (2.0 * step))
    }

    /// Entropy per mass of dry air, J/(kg K); zero for dry air at 0 °C and 101.325 kPa and for liquid at the triple point.
    #[must_use]
    pub fn entropy(&self) -> SpecificHeatCapacity {
        SpecificHeatCapacity::from_si(entropy(&fitted::lanes(self.t), self.t, self.p, self.w))
    }
}

/// The wet bulb of bone-dry air: nothing reads lower.
///
/// Outside the range of the equations it is the dry bulb itself.
#[must_use]
pub fn lowest_wet_bulb(
    dry_bulb: ThermodynamicTemperature,
    pressure: Pressure,
) -> ThermodynamicTemperature {
    let dry = MoistAir::unchecked(dry_bulb, HumidityRatio::default(), pressure);
    dry.wet_bulb().map_or(dry_bulb, WetBulb::reading)
}

fn by_relative_humidity(
    t: f64,
    p: f64,
    z: f64,
    rh: RelativeHumidity,
    over: Phase,
) -> Result<f64, AirError> {
    if !(0.0..=1.0).contains(&rh.si()) {
        return Err(AirError::RelativeHumidityOutOfRange { got: rh });
    }
    let x = rh.si() * saturated::pressure(t, p, z, over) / p;
    if x >= WETTEST / (EPSILON + WETTEST) {
        Err(AirError::TooMuchWater)
    } else {
        Ok(humidity_ratio(x))
    }
}

fn by_dew_point(
    dry_bulb: ThermodynamicTemperature,
    point: ThermodynamicTemperature,
    p: f64,
    z: f64,
    over: Phase,
) -> Result<f64, AirError> {
    if point.si() > dry_bulb.si() {
        return Err(AirError::DewPointAboveDryBulb { dew_point: point, dry_bulb });
    }
    let t = point.si();
    let lowest = if over == Phase::Ice {
        dew_point::COLDEST_FROST_POINT
    } else {
        dew_point::COLDEST_DEW_POINT
    };
    if t < lowest {
        return Err(AirError::TooDryForDewPoint);
    }
    let vapour = saturated::pressure(t, p, z, over);
    if vapour >= p { Err(AirError::TooMuchWater) } else { Ok(humidity_ratio(vapour / p)) }
}

fn by_wet_bulb(
    dry_bulb: ThermodynamicTemperature,
    wet_bulb: ThermodynamicTemperature,
    wick: Wick,
    p: f64,
    z: f64,
) -> Result<f64, AirError> {
    if wet_bulb.si() > dry_bulb.si() {
        return Err(AirError::WetBulbAboveDryBulb { wet_bulb, dry_bulb });
    }
    in_temperature_range(wet_bulb)
        .map_err(|_| AirError::TemperatureOutOfRange { got: wet_bulb })?;
    let (t, wet) = (dry_bulb.si(), wet_bulb.si());
    let phase = match wick {
        Wick::Wet if wet < TRIPLE_K => return Err(AirError::NoLiquidRoot { wet_bulb }),
        Wick::Iced if wet > TRIPLE_K => return Err(AirError::NoIceRoot { wet_bulb }),
        Wick::Wet => Phase::Liquid,
        Wick::Iced => Phase::Ice,
        Wick::NotSaid => saturated::phase(wet),
    };
    let w = wet_bulb::humidity_ratio(t, wet, p, z, phase)?;
    if w < -1e-9 {
        let lowest = lowest_wet_bulb(dry_bulb, Pressure::from_si(p));
        return Err(AirError::DrierThanBoneDry { wet_bulb, lowest });
    }
    Ok(w.max(0.0))
}

/// The humidity ratio, when the air can hold it: over liquid water below freezing, where supersaturation over ice is real.
fn below_saturation(t: f64, p: f64, z: f64, w: HumidityRatio) -> Result<HumidityRatio, AirError> {
    let limit = saturated::ratio(t, p, z, Phase::Liquid).unwrap_or(WETTEST);
    if w.si() >= 0.0 && w.si() <= limit * (1.0 + ROUNDING) {
        Ok(w)
    } else {
        Err(AirError::AboveSaturation { got: w, limit: HumidityRatio::from_si(limit) })
    }
}

fn by_enthalpy(t: f64, p: f64, z: f64, h: Enthalpy) -> Result<f64, AirError> {
    let lanes = fitted::lanes(t);
    let of = |w: f64| mixture(&lanes, t, p, w).enthalpy;
    let limit = saturated::ratio(t, p, z, Phase::Liquid).unwrap_or(WETTEST);
    let (lowest, highest) = (of(0.0), of(limit));
    let slack = 1e-6 * (highest - lowest);
    if !(lowest - slack..=highest + slack).contains(&h.si()) {
        return Err(AirError::EnthalpyOutOfRange {
            got: h,
            lowest: Enthalpy::from_si(lowest),
            highest: Enthalpy::from_si(highest),
        });
    }
    // Nearly linear in W: a secant from the ends.
    let mut w = limit * (h.si() - lowest) / (highest - lowest);
    let mut slope = (highest - lowest) / limit;
    let mut f = of(w) - h.si();
    for _ in 0..20 {
        let step = -f / slope;
        if step.abs() < 1e-14 {
            break;
        }
        let before = f;
        w += step;
        f = of(w) - h.si();
        if step.abs() > 1e-11 {
            slope = (f - before) / step;
        }
    }
    Ok(w.clamp(0.0, limit))
}

/// Temperature, K, of an enthalpy at a humidity ratio, whether or not the air can hold it.
pub(crate) fn temperature_of(h: f64, w: f64, p: f64) -> Result<f64, AirError> {
    let mut t = 273.15 + (h - 2.501e6 * w) / (1006.0 + 1860.0 * w);
    for after in 1..=30 {
        t = t.clamp(180.0, 395.0);
        let f = mixture(&fitted::lanes(t), t, p, w).enthalpy - h;
        let step = -f / (1006.0 + 1860.0 * w);
        t += step;
        if step.abs() < 1e-9 {
            return Ok(t);
        }
        if !t.is_finite() {
            return Err(AirError::NotConverged { after, residual: step });
        }
    }
    Err(AirError::TemperatureOutOfRange { got: ThermodynamicTemperature::from_si(t) })
}
