//! The kinds of quantity of the trade.
//!
//! A [`Kind`] says what a number means, which is more than its dimension: a relative humidity and a share are
//! both plain ratios, a duct's gauge pressure and the pressure of the air both pascals, and an enthalpy of moist
//! air has another zero in IP units while an enthalpy difference has not.

/// Declares [`Kind`] with its identifiers and labels in one table.
macro_rules! kinds {
    ($($(#[$doc:meta])* $variant:ident, $id:literal, $label:literal, $si:literal, $sign:ident;)*) => {
        /// What a number means. The table in `kind.rs` is the list; each kind's stored SI unit stands beside it.
        #[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
        pub enum Kind { $($(#[$doc])* $variant,)* }

        impl Kind {
            /// Every kind, in the order in which a person is shown them.
            pub const ALL: &'static [Kind] = &[$(Kind::$variant,)*];

            /// Identifier in files, requests and command lines; never changes.
            #[must_use]
            pub const fn id(self) -> &'static str {
                match self { $(Kind::$variant => $id,)* }
            }

            /// Name on screen, in the trade's words, lower case.
            #[must_use]
            pub const fn label(self) -> &'static str {
                match self { $(Kind::$variant => $label,)* }
            }

            /// The SI unit in which values of this kind are stored, as a suffix of keys (`heat_w`, `flow_m3_s`).
            #[must_use]
            pub const fn si_suffix(self) -> &'static str {
                match self { $(Kind::$variant => $si,)* }
            }

            /// Whether a value below zero can be typed (in some unit), so that a sign key is wanted.
            #[must_use]
            pub const fn signed(self) -> bool {
                match self { $(Kind::$variant => kinds!(@sign $sign),)* }
            }

            /// The kind with this identifier.
            #[must_use]
            pub fn from_id(id: &str) -> Option<Kind> {
                Self::ALL.iter().copied().find(|kind| kind.id() == id)
            }
        }
    };
    (@sign signed) => { true };
    (@sign plain) => { false };
}

kinds! {
    /// Temperature on a scale: dry bulb, wet bulb, dew point, water. Stored in kelvin.
    Temperature, "temperature", "temperature", "k", signed;
    /// Difference of two temperatures; also the ± of a temperature. Stored in kelvin.
    TemperatureDifference, "temperature_difference", "temperature difference", "k", signed;
    /// Relative humidity, 0 to 1, over liquid water unless a name says over ice.
    RelativeHumidity, "relative_humidity", "relative humidity", "ratio", plain;
    /// Mass of water vapour per mass of dry air. Stored in kg/kg of dry air.
    HumidityRatio, "humidity_ratio", "humidity ratio", "kg_kg", plain;
    /// Difference of two humidity ratios. Stored in kg/kg of dry air.
    HumidityRatioDifference, "humidity_ratio_difference", "humidity ratio difference", "kg_kg", signed;
    /// Specific enthalpy of moist air per mass of dry air; zero for dry air at 0 °C (SI) or 0 °F (IP). Stored in J/kg, SI zero.
    Enthalpy, "enthalpy", "enthalpy of moist air", "j_kg", signed;
    /// Difference of two specific enthalpies. Stored in J/kg.
    EnthalpyDifference, "enthalpy_difference", "enthalpy difference", "j_kg", signed;
    /// Specific enthalpy of water, ice or steam; zero for liquid at the triple point in every unit. Stored in J/kg.
    WaterEnthalpy, "water_enthalpy", "enthalpy of water or steam", "j_kg", signed;
    /// Heat added per mass of water added, the slope of a process on a psychrometric chart. Stored in J/kg.
    ProcessSlope, "process_slope", "heat per mass of water", "j_kg", signed;
    /// Volume of moist air per mass of dry air. Stored in m³/kg of dry air.
    SpecificVolume, "specific_volume", "specific volume", "m3_kg", plain;
    /// Density. Stored in kg/m³.
    Density, "density", "density", "kg_m3", plain;
    /// Specific heat capacity, per mass of dry air where it is air's. Stored in J/(kg K).
    SpecificHeat, "specific_heat", "specific heat", "j_kg_k", plain;
    /// Actual volume flow of air at a stated place. Stored in m³/s.
    AirFlow, "air_flow", "air flow, actual", "m3_s", plain;
    /// Flow of standard air: a mass flow written as the volume at a stated standard density. Stored in m³/s.
    StandardAirFlow, "standard_air_flow", "air flow, standard", "m3_s", plain;
    /// Mass flow of dry air. Stored in kg/s.
    DryAirFlow, "dry_air_flow", "dry-air mass flow", "kg_s", plain;
    /// Volume flow of water or of a coolant in a pipe. Stored in m³/s.
    WaterFlow, "water_flow", "water flow", "m3_s", plain;
    /// Volume of water drained or evaporated in a time. Stored in m³/s.
    CondensateFlow, "condensate_flow", "condensate by volume", "m3_s", signed;
    /// Mass of water drained, added or evaporated in a time. Stored in kg/s.
    MoistureFlow, "moisture_flow", "moisture by mass", "kg_s", signed;
    /// Mass of water or of a coolant that passes in a pipe in a time. Stored in kg/s.
    WaterMassFlow, "water_mass_flow", "water by mass", "kg_s", plain;
    /// Power, heat flow. Stored in W.
    Power, "power", "heat or power", "w", signed;
    /// Energy, an amount of heat. Stored in J.
    Energy, "energy", "energy", "j", signed;
    /// Power per floor area. Stored in W/m².
    PowerPerArea, "power_per_area", "heat per area", "w_m2", signed;
    /// Heat per length of a pipe. Stored in W/m.
    PowerPerLength, "power_per_length", "heat per length", "w_m", signed;
    /// Heat per area and temperature difference at a surface. Stored in W/(m² K).
    FilmCoefficient, "film_coefficient", "film coefficient", "w_m2_k", plain;
    /// Thermal conductivity of a material. Stored in W/(m K).
    ThermalConductivity, "thermal_conductivity", "thermal conductivity", "w_m_k", plain;
    /// Absolute pressure of the air: a barometer's. Stored in Pa.
    Pressure, "pressure", "pressure of the air", "pa", plain;
    /// Gauge pressure, pressure difference, velocity pressure. Stored in Pa.
    PressureDifference, "pressure_difference", "pressure difference", "pa", signed;
    /// Vapour pressure of the water in the air. Stored in Pa.
    VapourPressure, "vapour_pressure", "vapour pressure", "pa", plain;
    /// Height above sea level. Stored in m.
    Elevation, "elevation", "elevation", "m", signed;
    /// A length, a duct's side. Stored in m.
    Length, "length", "length", "m", plain;
    /// An area. Stored in m².
    Area, "area", "area", "m2", plain;
    /// A volume of water in a vessel. Stored in m³.
    WaterVolume, "water_volume", "volume of water", "m3", plain;
    /// A volume of a room. Stored in m³.
    RoomVolume, "room_volume", "volume of a room", "m3", plain;
    /// A side of a room. Stored in m.
    RoomLength, "room_length", "side of a room", "m", plain;
    /// How often a flow fills a room's volume in a time. Stored in 1/s.
    AirChanges, "air_changes", "air changes", "per_s", plain;
    /// A volume of fuel gas, as its meter counts it. Stored in m³.
    FuelVolume, "fuel_volume", "volume of gas", "m3", plain;
    /// Heat that a volume of fuel gas gives, at a stated pressure and temperature. Stored in J/m³.
    HeatingValue, "heating_value", "heating value", "j_m3", plain;
    /// Mass of water. Stored in kg.
    Mass, "mass", "mass", "kg", plain;
    /// Velocity of air. Stored in m/s.
    Velocity, "velocity", "velocity", "m_s", signed;
    /// A span of time. Stored in s.
    Duration, "duration", "time", "s", plain;
    /// A share, a factor, an efficiency; 1 is all.
    Ratio, "ratio", "ratio", "ratio", signed;
    /// A share shown in per cent: an error, a part of a whole.
    Share, "share", "share", "ratio", signed;
    /// Mole fraction of a gas in air, as CO2. Stored as a ratio.
    MoleFraction, "mole_fraction", "mole fraction", "ratio", plain;
    /// Electric potential difference. Stored in V.
    Voltage, "voltage", "voltage", "v", plain;
    /// Electric current. Stored in A.
    Current, "current", "current", "a", plain;
    /// Heat per volume flow and temperature difference, the book's 1.08. Stored in J/(m³ K).
    SensibleConstant, "sensible_constant", "sensible constant", "j_m3_k", plain;
    /// Mass of dry air per volume of air, the book's 4.5. Stored in kg/m³.
    TotalConstant, "total_constant", "total constant", "kg_m3", plain;
    /// Heat per volume flow and humidity-ratio difference, the book's 4840. Stored in J/m³.
    LatentConstant, "latent_constant", "latent constant", "j_m3", plain;
    /// Heat per volume flow of water and temperature difference, the book's 500. Stored in J/(m³ K).
    WaterConstant, "water_constant", "water constant", "j_m3_k", plain;
    /// Electrical input for each cooling that it gives, the trade's kW a ton. Stored in W/W.
    InputPerCooling, "input_per_cooling", "input per cooling", "ratio", plain;
}

impl Kind {
    /// The kind of a difference of two values of this kind, which is also the kind of its ±.
    #[must_use]
    pub const fn difference(self) -> Kind {
        // Not a match: all kinds but three are their own difference.
        if matches!(self, Kind::Temperature) {
            Kind::TemperatureDifference
        } else if matches!(self, Kind::HumidityRatio) {
            Kind::HumidityRatioDifference
        } else if matches!(self, Kind::Enthalpy) {
            Kind::EnthalpyDifference
        } else {
            self
        }
    }
}

#[cfg(test)]
mod tests {
    use super::Kind;

    #[test]
    fn every_identifier_is_its_own_and_leads_back() {
        for kind in Kind::ALL {
            assert_eq!(Kind::from_id(kind.id()), Some(*kind));
            assert_eq!(Kind::ALL.iter().filter(|other| other.id() == kind.id()).count(), 1);
        }
    }
}
