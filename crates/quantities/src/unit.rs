//! The units, in one table.
//!
//! Identifiers are our own and never change; symbols are the trade's, for the screen; UCUM codes stand beside
//! them. Factors are exact by definition and composed from base definitions, never copied as products: the inch
//! (25.4 mm), the pound (0.453 592 37 kg), the US gallon (231 in³), the Btu of the International Table (1 055.055 852 62 J), the ton of
//! refrigeration (12 000 Btu/h) as in NIST SP 811; mercury at 0 °C and water at 4 °C as conventional columns.

use crate::Kind;

/// A unit of measurement. Values of a kind are `si = value * factor + offset` in its stored SI unit.
#[derive(Debug, PartialEq)]
pub struct Unit {
    /// Identifier in files, requests and CSV headers.
    pub id: &'static str,
    /// Symbol on screen.
    pub symbol: &'static str,
    /// Name, as read aloud.
    pub name: &'static str,
    /// UCUM code, case sensitive.
    pub ucum: &'static str,
    /// What it measures, its scale for each, and the decimals that a field instrument resolves.
    measures: &'static [Scale],
    /// Further spellings that a person may type with a number, lower case, without spaces.
    spellings: &'static [&'static str],
}

/// How a unit measures one kind.
#[derive(Debug, PartialEq)]
struct Scale {
    kind: Kind,
    factor: f64,
    offset: f64,
    decimals: u8,
}

const fn scale(kind: Kind, factor: f64, decimals: u8) -> Scale {
    Scale { kind, factor, offset: 0.0, decimals }
}

const fn shifted(kind: Kind, factor: f64, offset: f64, decimals: u8) -> Scale {
    Scale { kind, factor, offset, decimals }
}

/// J, International Table British thermal unit (NIST SP 811).
const BTU: f64 = 1_055.055_852_62;
/// kg, avoirdupois pound (exact, 1959).
const POUND: f64 = 0.453_592_37;
/// kg, grain: a 7000th of a pound.
const GRAIN: f64 = POUND / 7000.0;
/// m, foot (exact).
const FOOT: f64 = 0.3048;
/// m, inch (exact).
const INCH: f64 = 0.0254;
/// m³, cubic foot.
const CUBIC_FOOT: f64 = FOOT * FOOT * FOOT;
/// m³, US gallon: 231 cubic inches.
const GALLON: f64 = 231.0 * INCH * INCH * INCH;
/// m³/s, cubic foot a minute.
const CFM: f64 = CUBIC_FOOT / 60.0;
/// s, an hour.
const HOUR: f64 = 3600.0;
/// m/s², standard gravity (exact, CGPM 1901).
const GRAVITY: f64 = 9.806_65;
/// Pa, pound-force per square inch.
const PSI: f64 = POUND * GRAVITY / (INCH * INCH);
/// Pa, inch of mercury of 13 595.1 kg/m³ (0 °C, conventional).
const INCH_OF_MERCURY: f64 = INCH * 13_595.1 * GRAVITY;
/// Pa, inch of water of 1000 kg/m³ (4 °C, conventional).
const INCH_OF_WATER: f64 = INCH * 1000.0 * GRAVITY;
/// K, a Fahrenheit step.
const FAHRENHEIT: f64 = 5.0 / 9.0;
/// J/kg, Btu a pound.
const BTU_PER_POUND: f64 = BTU / POUND;
/// Enthalpy of dry air at 0 °C on the scale that is zero at 0 °F, in Btu/lb (ASHRAE RP-1485, 101.325 kPa).
const ENTHALPY_ZERO: f64 = 7.6857;

macro_rules! units {
    ($($id:literal $symbol:literal $name:literal $ucum:literal [$($scale:expr),*] [$($spelling:literal),*];)*) => {
        /// Every unit, in the order in which sheets list them.
        static UNITS: &[Unit] = &[$(Unit {
            id: $id, symbol: $symbol, name: $name, ucum: $ucum,
            measures: &[$($scale),*], spellings: &[$($spelling),*],
        },)*];
    };
}

use Kind::{
    AirFlow, Area, CondensateFlow, Current, Density, DryAirFlow, Duration, Elevation, Energy,
    Enthalpy, EnthalpyDifference, HumidityRatio, HumidityRatioDifference, LatentConstant, Length,
    Mass, MoistureFlow, MoleFraction, Power, PowerPerArea, Pressure, PressureDifference,
    ProcessSlope, Ratio, RelativeHumidity, RoomVolume, SensibleConstant, Share, SpecificHeat,
    SpecificVolume, StandardAirFlow, Temperature, TemperatureDifference, TotalConstant,
    VapourPressure, Velocity, Voltage, WaterEnthalpy, WaterFlow, WaterVolume,
};

units! {
    "degC" "°C" "degrees Celsius" "Cel" [shifted(Temperature, 1.0, 273.15, 1)] ["c", "degc", "celsius"];
    "degF" "°F" "degrees Fahrenheit" "[degF]" [shifted(Temperature, FAHRENHEIT, 273.15 - 32.0 * FAHRENHEIT, 1)] ["f", "degf", "fahrenheit"];
    "K" "K" "kelvin" "K" [scale(Temperature, 1.0, 2), scale(TemperatureDifference, 1.0, 1)] ["k", "kelvin"];
    "degF_difference" "°F difference" "Fahrenheit degrees of difference" "[degF]" [scale(TemperatureDifference, FAHRENHEIT, 1)] ["°f", "f", "degf"];

    "%" "%" "per cent" "%" [scale(RelativeHumidity, 0.01, 1), scale(Share, 0.01, 1), scale(Ratio, 0.01, 1)] ["percent", "%rh", "rh"];
    "1" "" "as a plain number" "1" [scale(Ratio, 1.0, 2), scale(Share, 1.0, 3), scale(RelativeHumidity, 1.0, 3), scale(MoleFraction, 1.0, 6)] [];

    "gr/lb" "gr/lb" "grains per pound of dry air" "[gr]/[lb_av]" [scale(HumidityRatio, GRAIN / POUND, 1), scale(HumidityRatioDifference, GRAIN / POUND, 1)] ["grains/lb", "gr"];
    "lb/lb" "lb/lb" "pounds per pound of dry air" "[lb_av]/[lb_av]" [scale(HumidityRatio, 1.0, 5), scale(HumidityRatioDifference, 1.0, 5)] [];
    "g/kg" "g/kg" "grams per kilogram of dry air" "g/kg" [scale(HumidityRatio, 1e-3, 2), scale(HumidityRatioDifference, 1e-3, 2)] [];
    "kg/kg" "kg/kg" "kilograms per kilogram of dry air" "kg/kg" [scale(HumidityRatio, 1.0, 5), scale(HumidityRatioDifference, 1.0, 5)] [];

    "Btu/lb" "Btu/lb" "Btu per pound of dry air" "[Btu_IT]/[lb_av]" [
        shifted(Enthalpy, BTU_PER_POUND, -ENTHALPY_ZERO * BTU_PER_POUND, 2), scale(EnthalpyDifference, BTU_PER_POUND, 2),
        scale(WaterEnthalpy, BTU_PER_POUND, 1), scale(ProcessSlope, BTU_PER_POUND, 0)] ["btu/lb"];
    "kJ/kg" "kJ/kg" "kilojoules per kilogram of dry air" "kJ/kg" [
        scale(Enthalpy, 1e3, 1), scale(EnthalpyDifference, 1e3, 2), scale(WaterEnthalpy, 1e3, 1), scale(ProcessSlope, 1e3, 0)] ["kj/kg"];
    "J/kg" "J/kg" "joules per kilogram of dry air" "J/kg" [
        scale(Enthalpy, 1.0, 0), scale(EnthalpyDifference, 1.0, 0), scale(WaterEnthalpy, 1.0, 0), scale(ProcessSlope, 1.0, 0)] ["j/kg"];

    "ft3/lb" "ft³/lb" "cubic feet per pound of dry air" "[cft_i]/[lb_av]" [scale(SpecificVolume, CUBIC_FOOT / POUND, 2)] ["ft3/lb", "cuft/lb"];
    "m3/kg" "m³/kg" "cubic metres per kilogram of dry air" "m3/kg" [scale(SpecificVolume, 1.0, 3)] ["m3/kg"];
    "lb/ft3" "lb/ft³" "pounds per cubic foot" "[lb_av]/[cft_i]" [scale(Density, POUND / CUBIC_FOOT, 4)] ["lb/ft3", "lb/cuft"];
    "kg/m3" "kg/m³" "kilograms per cubic metre" "kg/m3" [scale(Density, 1.0, 3), scale(TotalConstant, 1.0, 3)] ["kg/m3"];
    "Btu/lb.F" "Btu/(lb·°F)" "Btu per pound and degree Fahrenheit" "[Btu_IT]/([lb_av].[degF])" [scale(SpecificHeat, BTU_PER_POUND * 1.8, 4)] ["btu/lb/f"];
    "kJ/kg.K" "kJ/(kg·K)" "kilojoules per kilogram and kelvin" "kJ/(kg.K)" [scale(SpecificHeat, 1e3, 4)] ["kj/kg/k"];

    "cfm" "cfm" "cubic feet per minute" "[cft_i]/min" [scale(AirFlow, CFM, 0), scale(StandardAirFlow, CFM, 0)] ["scfm", "acfm"];
    "ft3/min" "ft³/min" "cubic feet per minute" "[cft_i]/min" [scale(AirFlow, CFM, 0), scale(StandardAirFlow, CFM, 0)] ["ft3/min", "cuft/min"];
    "L/s" "L/s" "litres per second" "L/s" [
        scale(AirFlow, 1e-3, 0), scale(StandardAirFlow, 1e-3, 0), scale(WaterFlow, 1e-3, 2), scale(CondensateFlow, 1e-3, 4)] ["l/s", "lps"];
    "m3/s" "m³/s" "cubic metres per second" "m3/s" [
        scale(AirFlow, 1.0, 3), scale(StandardAirFlow, 1.0, 3), scale(WaterFlow, 1.0, 5), scale(CondensateFlow, 1.0, 7)] ["m3/s"];
    "m3/h" "m³/h" "cubic metres per hour" "m3/h" [
        scale(AirFlow, 1.0 / HOUR, 0), scale(StandardAirFlow, 1.0 / HOUR, 0), scale(WaterFlow, 1.0 / HOUR, 2)] ["m3/h", "cmh"];
    "gal/min" "gal/min (US)" "US gallons per minute" "[gal_us]/min" [scale(WaterFlow, GALLON / 60.0, 1)] ["gal/min", "gpm"];
    "gal/h" "gal/h (US)" "US gallons per hour" "[gal_us]/h" [scale(CondensateFlow, GALLON / HOUR, 2), scale(WaterFlow, GALLON / HOUR, 1)] ["gal/h", "gph"];
    "L/h" "L/h" "litres per hour" "L/h" [scale(CondensateFlow, 1e-3 / HOUR, 2), scale(WaterFlow, 1e-3 / HOUR, 0)] ["l/h"];
    "lb/h" "lb/h" "pounds per hour" "[lb_av]/h" [scale(DryAirFlow, POUND / HOUR, 0), scale(MoistureFlow, POUND / HOUR, 1)] ["lb/hr"];
    "kg/h" "kg/h" "kilograms per hour" "kg/h" [scale(DryAirFlow, 1.0 / HOUR, 0), scale(MoistureFlow, 1.0 / HOUR, 2)] ["kg/hr"];
    "kg/s" "kg/s" "kilograms per second" "kg/s" [scale(DryAirFlow, 1.0, 3), scale(MoistureFlow, 1.0, 5)] [];

    "kBtu/h" "kBtu/h" "thousand Btu per hour" "k[Btu_IT]/h" [scale(Power, 1e3 * BTU / HOUR, 1)] ["kbtu/h", "kbtu/hr"];
    "Btu/h" "Btu/h" "Btu per hour" "[Btu_IT]/h" [scale(Power, BTU / HOUR, 0)] ["btu/h", "btu/hr"];
    "ton" "refrigeration tons" "refrigeration tons" "12.k[Btu_IT]/h" [scale(Power, 12_000.0 * BTU / HOUR, 2)] ["ton", "tons", "tr"];
    "kW" "kW" "kilowatts" "kW" [scale(Power, 1e3, 1)] ["kw"];
    "W" "W" "watts" "W" [scale(Power, 1.0, 0)] ["w"];
    "kWh" "kWh" "kilowatt hours" "kW.h" [scale(Energy, 1e3 * HOUR, 1)] ["kwh"];
    "MJ" "MJ" "megajoules" "MJ" [scale(Energy, 1e6, 1)] ["mj"];
    "kBtu" "kBtu" "thousand Btu" "k[Btu_IT]" [scale(Energy, 1e3 * BTU, 1)] ["kbtu"];
    "Btu/h.ft2" "Btu/(h·ft²)" "Btu per hour and square foot" "[Btu_IT]/(h.[sft_i])" [scale(PowerPerArea, BTU / HOUR / (FOOT * FOOT), 1)] ["btu/h/ft2"];
    "W/m2" "W/m²" "watts per square metre" "W/m2" [scale(PowerPerArea, 1.0, 1)] ["w/m2"];

    "kPa" "kPa" "kilopascals" "kPa" [scale(Pressure, 1e3, 2), scale(PressureDifference, 1e3, 3), scale(VapourPressure, 1e3, 3)] ["kpa"];
    "hPa" "hPa" "hectopascals" "hPa" [scale(Pressure, 100.0, 1), scale(PressureDifference, 100.0, 2), scale(VapourPressure, 100.0, 2)] ["hpa"];
    "mbar" "mbar" "millibars" "mbar" [scale(Pressure, 100.0, 1), scale(VapourPressure, 100.0, 2)] ["mb"];
    "Pa" "Pa" "pascals" "Pa" [scale(Pressure, 1.0, 0), scale(PressureDifference, 1.0, 1), scale(VapourPressure, 1.0, 0)] ["pa"];
    "inHg" "inHg (0 °C)" "inches of mercury at 0 degrees Celsius" "[in_i'Hg]" [scale(Pressure, INCH_OF_MERCURY, 2), scale(VapourPressure, INCH_OF_MERCURY, 4)] ["inhg", "inhg(0°c)", "\"hg"];
    "psi" "psi" "pounds-force per square inch" "[psi]" [scale(Pressure, PSI, 3), scale(PressureDifference, PSI, 4), scale(VapourPressure, PSI, 4)] ["psia"];
    "inH2O" "in. of water (4 °C)" "inches of water at 4 degrees Celsius" "[in_i'H2O]" [scale(PressureDifference, INCH_OF_WATER, 3)] ["in.ofwater", "inh2o", "inwc", "inwg", "in.w.g."];

    "ft" "ft" "feet" "[ft_i]" [scale(Elevation, FOOT, 0), scale(Length, FOOT, 2)] ["feet", "'"];
    "m" "m" "metres" "m" [scale(Elevation, 1.0, 0), scale(Length, 1.0, 3)] ["metre", "metres"];
    "in" "in" "inches" "[in_i]" [scale(Length, INCH, 2)] ["inch", "inches", "\""];
    "mm" "mm" "millimetres" "mm" [scale(Length, 1e-3, 0)] [];
    "ft2" "ft²" "square feet" "[sft_i]" [scale(Area, FOOT * FOOT, 1)] ["ft2", "sqft"];
    "m2" "m²" "square metres" "m2" [scale(Area, 1.0, 2)] ["m2"];
    "gal" "gal (US)" "US gallons" "[gal_us]" [scale(WaterVolume, GALLON, 2)] ["gal"];
    "L" "L" "litres" "L" [scale(WaterVolume, 1e-3, 2)] ["l", "litre", "litres"];
    "mL" "mL" "millilitres" "mL" [scale(WaterVolume, 1e-6, 0)] ["ml"];
    "ft3" "ft³" "cubic feet" "[cft_i]" [scale(RoomVolume, CUBIC_FOOT, 0)] ["ft3", "cuft"];
    "m3" "m³" "cubic metres" "m3" [scale(RoomVolume, 1.0, 1)] ["m3"];
    "lb" "lb" "pounds" "[lb_av]" [scale(Mass, POUND, 2)] ["lbs"];
    "kg" "kg" "kilograms" "kg" [scale(Mass, 1.0, 3)] [];
    "fpm" "ft/min" "feet per minute" "[ft_i]/min" [scale(Velocity, FOOT / 60.0, 0)] ["ft/min"];
    "m/s" "m/s" "metres per second" "m/s" [scale(Velocity, 1.0, 2)] [];
    "s" "s" "seconds" "s" [scale(Duration, 1.0, 0)] ["sec"];
    "min" "min" "minutes" "min" [scale(Duration, 60.0, 2)] ["mins"];
    "h" "h" "hours" "h" [scale(Duration, HOUR, 2)] ["hr", "hours"];
    "ppm" "ppm" "parts per million" "[ppm]" [scale(MoleFraction, 1e-6, 0)] [];
    "V" "V" "volts" "V" [scale(Voltage, 1.0, 1)] ["v"];
    "A" "A" "amperes" "A" [scale(Current, 1.0, 1)] ["a"];

    "Btu/h.cfm.F" "Btu/(h·cfm·°F)" "Btu per hour, cfm and degree Fahrenheit" "[Btu_IT]/(h.([cft_i]/min).[degF])" [scale(SensibleConstant, BTU / HOUR / CFM * 1.8, 3)] [];
    "W/(L/s).K" "W/(L/s·K)" "watts per litre per second and kelvin" "W/((L/s).K)" [scale(SensibleConstant, 1e3, 3)] [];
    "lb/h.cfm" "lb/h per cfm" "pounds per hour per cfm" "([lb_av]/h)/([cft_i]/min)" [scale(TotalConstant, POUND / HOUR / CFM, 3)] [];
    "Btu/h.cfm.(lb/lb)" "Btu/h per cfm per lb/lb" "Btu per hour per cfm per pound per pound" "[Btu_IT]/h/([cft_i]/min)" [scale(LatentConstant, BTU / HOUR / CFM, 0)] [];
    "Btu/h.cfm.(gr/lb)" "Btu/h per cfm per gr/lb" "Btu per hour per cfm per grain per pound" "[Btu_IT]/h/([cft_i]/min)/([gr]/[lb_av])" [scale(LatentConstant, BTU / HOUR / CFM * POUND / GRAIN, 4)] [];
    "W/(L/s).(g/kg)" "W/(L/s) per g/kg" "watts per litre per second per gram per kilogram" "W/(L/s)/(g/kg)" [scale(LatentConstant, 1e6, 3)] [];
}

impl Unit {
    /// The unit with this identifier.
    #[must_use]
    pub fn find(id: &str) -> Option<&'static Unit> {
        UNITS.iter().find(|unit| unit.id == id)
    }

    /// Every unit.
    #[must_use]
    pub fn all() -> &'static [Unit] {
        UNITS
    }

    /// The units of a kind, in the order in which a sheet lists them.
    pub fn of(kind: Kind) -> impl Iterator<Item = &'static Unit> {
        UNITS.iter().filter(move |unit| unit.measures(kind))
    }

    /// Whether it measures this kind.
    #[must_use]
    pub fn measures(&self, kind: Kind) -> bool {
        self.scale(kind).is_some()
    }

    /// From a value in this unit to the stored SI unit of the kind; none where it does not measure it.
    #[must_use]
    pub fn to_si(&self, kind: Kind, value: f64) -> Option<f64> {
        self.scale(kind).map(|scale| value * scale.factor + scale.offset)
    }

    /// From the stored SI unit of the kind to a value in this unit; none where it does not measure it.
    #[must_use]
    pub fn from_si(&self, kind: Kind, si: f64) -> Option<f64> {
        self.scale(kind).map(|scale| (si - scale.offset) / scale.factor)
    }

    /// A width (a ±, a difference) from stored SI to this unit of `kind`: the factor without the offset.
    #[must_use]
    pub fn width_from_si(&self, kind: Kind, si: f64) -> Option<f64> {
        self.scale(kind).map(|scale| si / scale.factor)
    }

    /// Decimals that a field instrument resolves in this unit.
    #[must_use]
    pub(crate) fn decimals(&self, kind: Kind) -> u8 {
        self.scale(kind).map_or(3, |scale| scale.decimals)
    }

    /// Whether a person may have meant it by `typed`, lower case and without spaces, after a number of this kind.
    #[must_use]
    pub(crate) fn is_spelt(&self, typed: &str) -> bool {
        let plain = |text: &str| text.to_lowercase().replace([' ', '\u{a0}'], "");
        plain(self.id) == typed || plain(self.symbol) == typed || self.spellings.contains(&typed)
    }

    fn scale(&self, kind: Kind) -> Option<&Scale> {
        self.measures.iter().find(|scale| scale.kind == kind)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn identifiers_are_their_own() {
        for unit in Unit::all() {
            assert_eq!(
                Unit::all().iter().filter(|other| other.id == unit.id).count(),
                1,
                "{}",
                unit.id
            );
        }
    }

    #[test]
    fn every_kind_has_a_unit() {
        for kind in Kind::ALL {
            assert!(Unit::of(*kind).next().is_some(), "{kind:?}");
        }
    }

    /// Factors against NIST SP 811 (2008) appendix B.8, as printed there, to its seven digits.
    #[test]
    fn factors_are_those_of_nist_sp_811() {
        let cases = [
            ("cfm", Kind::AirFlow, 4.719_474e-4),
            ("Btu/h", Kind::Power, 2.930_711e-1),
            ("ton", Kind::Power, 3.516_853e3),
            ("Btu/lb", Kind::EnthalpyDifference, 2.326e3),
            ("Btu/lb.F", Kind::SpecificHeat, 4.1868e3),
            ("lb/ft3", Kind::Density, 1.601_846e1),
            ("psi", Kind::Pressure, 6.894_757e3),
            ("gal/min", Kind::WaterFlow, 6.309_020e-5),
            ("fpm", Kind::Velocity, 5.08e-3),
            ("Btu/h.ft2", Kind::PowerPerArea, 3.154_591),
            // SP 811 prints 3.386 389 E+03 for the conventional inch of mercury, 2.490 889 E+02 for water's.
            ("inHg", Kind::Pressure, 3.386_389e3),
            ("inH2O", Kind::PressureDifference, 2.490_889e2),
        ];
        for (id, kind, factor) in cases {
            let unit = Unit::find(id).unwrap();
            let one = unit.to_si(kind, 1.0).unwrap() - unit.to_si(kind, 0.0).unwrap();
            assert!((one / factor - 1.0).abs() < 3e-7, "{id}: {one} against {factor}");
        }
    }

    #[test]
    fn temperatures_meet_at_their_fixed_points() {
        let celsius = Unit::find("degC").unwrap();
        let fahrenheit = Unit::find("degF").unwrap();
        for (c, f) in [(0.0, 32.0), (100.0, 212.0), (-40.0, -40.0)] {
            let a = celsius.to_si(Kind::Temperature, c).unwrap();
            let b = fahrenheit.to_si(Kind::Temperature, f).unwrap();
            assert!((a - b).abs() < 1e-10);
        }
    }

    #[test]
    fn enthalpy_of_moist_air_has_two_zeros_and_its_differences_one() {
        let unit = Unit::find("Btu/lb").unwrap();
        assert!((unit.from_si(Kind::Enthalpy, 0.0).unwrap() - 7.6857).abs() < 1e-12);
        assert!(unit.from_si(Kind::EnthalpyDifference, 0.0).unwrap().abs() < 1e-12);
        assert!(unit.from_si(Kind::WaterEnthalpy, 0.0).unwrap().abs() < 1e-12);
    }
}
