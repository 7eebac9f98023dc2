//! Which unit each quantity is shown in: a choice per quantity, with two presets.

use std::collections::BTreeMap;

use crate::{Kind, Unit};

/// The units that a person works in.
#[derive(Debug, Clone, PartialEq)]
pub struct UnitChoice {
    units: BTreeMap<Kind, &'static Unit>,
}

/// Kind, IP unit, SI unit.
const PRESETS: &[(Kind, &str, &str)] = &[
    (Kind::Temperature, "degF", "degC"),
    (Kind::TemperatureDifference, "degF_difference", "K"),
    (Kind::RelativeHumidity, "%", "%"),
    (Kind::HumidityRatio, "gr/lb", "g/kg"),
    (Kind::HumidityRatioDifference, "gr/lb", "g/kg"),
    (Kind::Enthalpy, "Btu/lb", "kJ/kg"),
    (Kind::EnthalpyDifference, "Btu/lb", "kJ/kg"),
    (Kind::WaterEnthalpy, "Btu/lb", "kJ/kg"),
    (Kind::ProcessSlope, "Btu/lb", "kJ/kg"),
    (Kind::SpecificVolume, "ft3/lb", "m3/kg"),
    (Kind::Density, "lb/ft3", "kg/m3"),
    (Kind::SpecificHeat, "Btu/lb.F", "kJ/kg.K"),
    (Kind::AirFlow, "cfm", "L/s"),
    (Kind::StandardAirFlow, "cfm", "L/s"),
    (Kind::DryAirFlow, "lb/h", "kg/s"),
    (Kind::WaterFlow, "gal/min", "L/s"),
    (Kind::CondensateFlow, "gal/h", "L/h"),
    (Kind::MoistureFlow, "lb/h", "kg/h"),
    (Kind::WaterMassFlow, "lb/h", "kg/s"),
    (Kind::Power, "kBtu/h", "kW"),
    (Kind::Energy, "kBtu", "kWh"),
    (Kind::PowerPerArea, "Btu/h.ft2", "W/m2"),
    (Kind::PowerPerLength, "Btu/h.ft", "W/m"),
    (Kind::FilmCoefficient, "Btu/h.ft2.F", "W/m2.K"),
    (Kind::ThermalConductivity, "Btu.in/h.ft2.F", "W/m.K"),
    (Kind::Pressure, "inHg", "kPa"),
    (Kind::PressureDifference, "inH2O", "Pa"),
    (Kind::VapourPressure, "inHg", "kPa"),
    (Kind::Elevation, "ft", "m"),
    (Kind::Length, "in", "mm"),
    (Kind::Area, "ft2", "m2"),
    (Kind::WaterVolume, "gal", "L"),
    (Kind::RoomVolume, "ft3", "m3"),
    (Kind::RoomLength, "ft", "m"),
    (Kind::AirChanges, "changes/h", "changes/h"),
    (Kind::FuelVolume, "ft3", "m3"),
    (Kind::HeatingValue, "Btu/ft3", "MJ/m3"),
    (Kind::Mass, "lb", "kg"),
    (Kind::Velocity, "fpm", "m/s"),
    (Kind::Duration, "s", "s"),
    (Kind::Ratio, "1", "1"),
    (Kind::Share, "%", "%"),
    (Kind::MoleFraction, "ppm", "ppm"),
    (Kind::Voltage, "V", "V"),
    (Kind::Current, "A", "A"),
    (Kind::SensibleConstant, "Btu/h.cfm.F", "W/(L/s).K"),
    (Kind::TotalConstant, "lb/h.cfm", "kg/m3"),
    (Kind::LatentConstant, "Btu/h.cfm.(lb/lb)", "W/(L/s).(g/kg)"),
    (Kind::WaterConstant, "Btu/h.(gal/min).F", "kW/(L/s).K"),
    (Kind::InputPerCooling, "kW/ton", "kW/kW"),
];

/// A choice of all units at once.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Preset {
    /// Inch-pound units.
    Ip,
    /// SI units.
    Si,
}

/// The unit cannot measure the quantity.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[error("{unit} does not measure {kind}")]
pub struct WrongUnit {
    /// The unit's identifier.
    pub unit: &'static str,
    /// The quantity's name.
    pub kind: &'static str,
}

impl UnitChoice {
    /// Inch-pound units.
    #[must_use]
    pub fn ip() -> Self {
        Self::of(Preset::Ip)
    }

    /// SI units.
    #[must_use]
    pub fn si() -> Self {
        Self::of(Preset::Si)
    }

    /// The units of a preset.
    #[must_use]
    pub fn of(preset: Preset) -> Self {
        let units = PRESETS
            .iter()
            .filter_map(|(kind, ip, si)| {
                let id = match preset {
                    Preset::Ip => ip,
                    Preset::Si => si,
                };
                Some((*kind, Unit::find(id)?))
            })
            .collect();
        Self { units }
    }

    /// The preset that this choice is, unless units were chosen quantity by quantity.
    #[must_use]
    pub fn preset(&self) -> Option<Preset> {
        [Preset::Ip, Preset::Si].into_iter().find(|preset| *self == Self::of(*preset))
    }

    /// The unit of a kind.
    ///
    /// # Panics
    ///
    /// Never: a test holds that every kind stands in the presets.
    #[must_use]
    pub fn get(&self, kind: Kind) -> &'static Unit {
        self.units.get(&kind).copied().expect("every kind stands in the presets")
    }

    /// Chooses the unit of a kind.
    ///
    /// # Errors
    ///
    /// [`WrongUnit`] where the unit does not measure the kind.
    pub fn set(&mut self, kind: Kind, unit: &'static Unit) -> Result<(), WrongUnit> {
        if !unit.measures(kind) {
            return Err(WrongUnit { unit: unit.id, kind: kind.label() });
        }
        self.units.insert(kind, unit);
        Ok(())
    }

    /// All choices, in the order of the kinds.
    pub fn iter(&self) -> impl Iterator<Item = (Kind, &'static Unit)> {
        self.units.iter().map(|(kind, unit)| (*kind, *unit))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn presets_name_a_unit_for_every_kind() {
        for kind in Kind::ALL {
            assert!(UnitChoice::ip().get(*kind).measures(*kind));
            assert!(UnitChoice::si().get(*kind).measures(*kind));
        }
    }

    #[test]
    fn units_can_be_mixed_quantity_by_quantity() {
        let mut choice = UnitChoice::si();
        choice.set(Kind::AirFlow, Unit::find("cfm").unwrap()).unwrap();
        assert_eq!(
            (choice.get(Kind::AirFlow).id, choice.get(Kind::Temperature).id),
            ("cfm", "degC")
        );
        assert_eq!(choice.preset(), None);
        choice.set(Kind::AirFlow, Unit::find("L/s").unwrap()).unwrap();
        assert_eq!(choice.preset(), Some(Preset::Si));
        assert_eq!(UnitChoice::ip().preset(), Some(Preset::Ip));
        let refused = choice.set(Kind::AirFlow, Unit::find("degC").unwrap()).unwrap_err();
        assert_eq!(refused.to_string(), "degC does not measure air flow, actual");
        assert_eq!(choice.preset(), Some(Preset::Si));
    }
}
