//! The table of units: identifier, symbol, spoken name, UCUM code, what each measures, how it may be typed.
//!
//! Factors are composed from exact definitions, never copied as products. `docs/units.md` is made from this table.

use super::Scale;
use crate::Kind::{
    AirChanges, AirFlow, Area, CondensateFlow, Current, Density, DryAirFlow, Duration, Elevation,
    Energy, Enthalpy, EnthalpyDifference, FilmCoefficient, FuelVolume, HeatingValue, HumidityRatio,
    HumidityRatioDifference, InputPerCooling, LatentConstant, Length, Mass, MoistureFlow,
    MoleFraction, Power, PowerPerArea, PowerPerLength, Pressure, PressureDifference, ProcessSlope,
    Ratio, RelativeHumidity, RoomLength, RoomVolume, SensibleConstant, Share, SpecificHeat,
    SpecificVolume, StandardAirFlow, Temperature, TemperatureDifference, ThermalConductivity,
    TotalConstant, VapourPressure, Velocity, Voltage, WaterConstant, WaterEnthalpy, WaterFlow,
    WaterMassFlow, WaterVolume,
};
use crate::{Kind, Unit};

const fn scale(kind: Kind, factor: f64, decimals: u8) -> Scale {
    Scale { kind, factor, offset: 0.0, decimals, also: &[] }
}

const fn shifted(kind: Kind, factor: f64, offset: f64, decimals: u8) -> Scale {
    Scale { kind, factor, offset, decimals, also: &[] }
}

impl Scale {
    /// With spellings that mean this unit for this kind only.
    const fn also(self, also: &'static [&'static str]) -> Self {
        Self { also, ..self }
    }
}

/// J, British thermal unit of the International Table (5th International Conference on the Properties of Steam, 1956).
const BTU: f64 = 1_055.055_852_62;
/// kg, avoirdupois pound (exact, international yard and pound agreement, 1959).
const POUND: f64 = 0.453_592_37;
/// kg, grain: a 7000th of a pound.
const GRAIN: f64 = POUND / 7000.0;
/// m, foot (exact, 1959).
const FOOT: f64 = 0.3048;
/// m, inch (exact, 1959).
const INCH: f64 = 0.0254;
/// m³, cubic foot.
const CUBIC_FOOT: f64 = FOOT * FOOT * FOOT;
/// m³, US gallon: 231 cubic inches.
const GALLON: f64 = 231.0 * INCH * INCH * INCH;
/// s, a minute.
const MINUTE: f64 = 60.0;
/// s, an hour.
const HOUR: f64 = 3600.0;
/// m³/s, cubic foot a minute.
const CFM: f64 = CUBIC_FOOT / MINUTE;
/// m³, litre.
const LITRE: f64 = 1e-3;
/// m/s², standard gravity (exact, CGPM 1901).
const GRAVITY: f64 = 9.806_65;
/// Pa, pound-force per square inch.
const PSI: f64 = POUND * GRAVITY / (INCH * INCH);
/// Pa, inch of mercury of 13 595.1 kg/m³: the conventional column at 0 °C.
const INCH_OF_MERCURY: f64 = INCH * 13_595.1 * GRAVITY;
/// Pa, inch of water of 1000 kg/m³: the conventional column at 4 °C.
const INCH_OF_WATER: f64 = INCH * 1000.0 * GRAVITY;
/// K, a Fahrenheit step.
const FAHRENHEIT: f64 = 5.0 / 9.0;
/// J/kg, Btu a pound.
const BTU_PER_POUND: f64 = BTU / POUND;
/// W, Btu an hour.
const BTU_PER_HOUR: f64 = BTU / HOUR;
/// Btu/lb, enthalpy of dry air at 0 °C and 101.325 kPa on the scale that is zero at 0 °F: what IP adds to the SI zero
/// (moist-air formulation of ASHRAE research project 1485).
const ENTHALPY_ZERO: f64 = 7.6857;

macro_rules! units {
    ($($id:literal $symbol:literal $name:literal $ucum:literal [$($scale:expr),* $(,)?] [$($spelling:literal),*];)*) => {
        /// Every unit, in the order in which sheets list them.
        pub(super) static UNITS: &[Unit] = &[$(Unit {
            id: $id, symbol: $symbol, name: $name, ucum: $ucum,
            measures: &[$($scale),*], spellings: &[$($spelling),*],
        },)*];
    };
}

// Spellings are compared in the normal form of `spelling.rs`: case, spaces, full stops and brackets do not count, and
// "hr", "lbs", "cu ft", "per", "deg" are known. An identifier and a symbol are spellings by themselves.
units! {
    "degC" "°C" "degrees Celsius" "Cel" [shifted(Temperature, 1.0, 273.15, 1)] ["C", "Celsius"];
    "degF" "°F" "degrees Fahrenheit" "[degF]"
        [shifted(Temperature, FAHRENHEIT, 273.15 - 32.0 * FAHRENHEIT, 1)] ["F", "Fahrenheit"];
    "K" "K" "kelvin" "K" [
        scale(Temperature, 1.0, 2),
        scale(TemperatureDifference, 1.0, 1).also(&["°C", "C", "Celsius", "°C difference"]),
    ] ["kelvin", "°K"];
    "degF_difference" "°F difference" "Fahrenheit degrees of difference" "[degR]"
        [scale(TemperatureDifference, FAHRENHEIT, 1)] ["°F", "F", "Fahrenheit"];

    "%" "%" "per cent" "%" [
        scale(RelativeHumidity, 0.01, 1).also(&["% RH", "RH"]), scale(Share, 0.01, 1), scale(Ratio, 0.01, 1),
    ] ["per cent"];
    "1" "" "as a plain number" "1"
        [scale(Ratio, 1.0, 2), scale(Share, 1.0, 3), scale(RelativeHumidity, 1.0, 3), scale(MoleFraction, 1.0, 6)] [];

    "gr/lb" "gr/lb" "grains per pound of dry air" "[gr]/[lb_av]"
        [scale(HumidityRatio, GRAIN / POUND, 1), scale(HumidityRatioDifference, GRAIN / POUND, 1)]
        ["grains/lb", "grains per pound", "gpp"];
    "lb/lb" "lb/lb" "pounds per pound of dry air" "[lb_av]/[lb_av]"
        [scale(HumidityRatio, 1.0, 5), scale(HumidityRatioDifference, 1.0, 5)] [];
    "g/kg" "g/kg" "grams per kilogram of dry air" "g/kg"
        [scale(HumidityRatio, 1e-3, 2), scale(HumidityRatioDifference, 1e-3, 2)] [];
    "kg/kg" "kg/kg" "kilograms per kilogram of dry air" "kg/kg"
        [scale(HumidityRatio, 1.0, 5), scale(HumidityRatioDifference, 1.0, 5)] [];

    // On moist air the pound and the kilogram are of dry air; on water and steam they are of water.
    "Btu/lb" "Btu/lb" "Btu per pound" "[Btu_IT]/[lb_av]" [
        shifted(Enthalpy, BTU_PER_POUND, -ENTHALPY_ZERO * BTU_PER_POUND, 2), scale(EnthalpyDifference, BTU_PER_POUND, 2),
        scale(WaterEnthalpy, BTU_PER_POUND, 1), scale(ProcessSlope, BTU_PER_POUND, 0),
    ] [];
    "kJ/kg" "kJ/kg" "kilojoules per kilogram" "kJ/kg" [
        scale(Enthalpy, 1e3, 1), scale(EnthalpyDifference, 1e3, 2), scale(WaterEnthalpy, 1e3, 1), scale(ProcessSlope, 1e3, 0),
    ] [];
    "J/kg" "J/kg" "joules per kilogram" "J/kg" [
        scale(Enthalpy, 1.0, 0), scale(EnthalpyDifference, 1.0, 0), scale(WaterEnthalpy, 1.0, 0), scale(ProcessSlope, 1.0, 0),
    ] [];

    "ft3/lb" "ft³/lb" "cubic feet per pound of dry air" "[cft_i]/[lb_av]" [scale(SpecificVolume, CUBIC_FOOT / POUND, 2)] [];
    "m3/kg" "m³/kg" "cubic metres per kilogram of dry air" "m3/kg" [scale(SpecificVolume, 1.0, 3)] [];
    "lb/ft3" "lb/ft³" "pounds per cubic foot" "[lb_av]/[cft_i]" [scale(Density, POUND / CUBIC_FOOT, 4)] [];
    "kg/m3" "kg/m³" "kilograms per cubic metre" "kg/m3" [scale(Density, 1.0, 3), scale(TotalConstant, 1.0, 3)] [];
    "Btu/lb.F" "Btu/(lb·°F)" "Btu per pound and degree Fahrenheit" "[Btu_IT]/([lb_av].[degR])"
        [scale(SpecificHeat, BTU_PER_POUND / FAHRENHEIT, 4)] ["Btu/lb/F", "Btu/lb/°F"];
    "kJ/kg.K" "kJ/(kg·K)" "kilojoules per kilogram and kelvin" "kJ/(kg.K)" [scale(SpecificHeat, 1e3, 4)] ["kJ/kg/K"];

    "cfm" "cfm" "cubic feet per minute" "[cft_i]/min"
        [scale(AirFlow, CFM, 0).also(&["acfm"]), scale(StandardAirFlow, CFM, 0).also(&["scfm"])] [];
    "ft3/min" "ft³/min" "cubic feet per minute" "[cft_i]/min" [scale(AirFlow, CFM, 0), scale(StandardAirFlow, CFM, 0)] [];
    "L/s" "L/s" "litres per second" "L/s" [
        scale(AirFlow, LITRE, 0), scale(StandardAirFlow, LITRE, 0), scale(WaterFlow, LITRE, 2), scale(CondensateFlow, LITRE, 4),
    ] ["lps"];
    "m3/s" "m³/s" "cubic metres per second" "m3/s" [
        scale(AirFlow, 1.0, 3), scale(StandardAirFlow, 1.0, 3), scale(WaterFlow, 1.0, 5), scale(CondensateFlow, 1.0, 7),
    ] [];
    "m3/h" "m³/h" "cubic metres per hour" "m3/h"
        [scale(AirFlow, 1.0 / HOUR, 0), scale(StandardAirFlow, 1.0 / HOUR, 0), scale(WaterFlow, 1.0 / HOUR, 2)] ["cmh"];
    "gal/min" "gal/min (US)" "US gallons per minute" "[gal_us]/min" [scale(WaterFlow, GALLON / MINUTE, 1)] ["gpm", "US gpm", "US gal/min"];
    "gal/h" "gal/h (US)" "US gallons per hour" "[gal_us]/h"
        [scale(CondensateFlow, GALLON / HOUR, 2), scale(WaterFlow, GALLON / HOUR, 1)] ["gph", "US gph", "US gal/h"];
    "L/min" "L/min" "litres per minute" "L/min" [scale(WaterFlow, LITRE / MINUTE, 1), scale(CondensateFlow, LITRE / MINUTE, 3)] ["lpm"];
    "L/h" "L/h" "litres per hour" "L/h" [scale(CondensateFlow, LITRE / HOUR, 2), scale(WaterFlow, LITRE / HOUR, 0)] [];
    "lb/h" "lb/h" "pounds per hour" "[lb_av]/h" [scale(DryAirFlow, POUND / HOUR, 0), scale(MoistureFlow, POUND / HOUR, 1), scale(WaterMassFlow, POUND / HOUR, 0)] [];
    "kg/h" "kg/h" "kilograms per hour" "kg/h" [scale(DryAirFlow, 1.0 / HOUR, 0), scale(MoistureFlow, 1.0 / HOUR, 2), scale(WaterMassFlow, 1.0 / HOUR, 0)] [];
    "kg/s" "kg/s" "kilograms per second" "kg/s" [scale(DryAirFlow, 1.0, 3), scale(MoistureFlow, 1.0, 5), scale(WaterMassFlow, 1.0, 3)] [];

    "kBtu/h" "kBtu/h" "thousand Btu per hour" "10*3.[Btu_IT]/h" [scale(Power, 1e3 * BTU_PER_HOUR, 1)] ["kBtuh"];
    "Btu/h" "Btu/h" "Btu per hour" "[Btu_IT]/h" [scale(Power, BTU_PER_HOUR, 0)] ["Btuh"];
    "ton" "refrigeration tons" "refrigeration tons" "12000.[Btu_IT]/h" [scale(Power, 12_000.0 * BTU_PER_HOUR, 2)]
        ["tons", "TR", "refrigeration ton", "tons of refrigeration", "ton of refrigeration"];
    "kW" "kW" "kilowatts" "kW" [scale(Power, 1e3, 1)] [];
    "W" "W" "watts" "W" [scale(Power, 1.0, 0)] ["watt", "watts"];
    "kWh" "kWh" "kilowatt hours" "kW.h" [scale(Energy, 1e3 * HOUR, 1)] [];
    "MJ" "MJ" "megajoules" "MJ" [scale(Energy, 1e6, 1)] [];
    "kBtu" "kBtu" "thousand Btu" "10*3.[Btu_IT]" [scale(Energy, 1e3 * BTU, 1)] [];
    "Btu/h.ft2" "Btu/(h·ft²)" "Btu per hour and square foot" "[Btu_IT]/(h.[sft_i])"
        [scale(PowerPerArea, BTU_PER_HOUR / (FOOT * FOOT), 1)] ["Btu/h/ft2"];
    "W/m2" "W/m²" "watts per square metre" "W/m2" [scale(PowerPerArea, 1.0, 1)] [];
    "Btu/h.ft" "Btu/(h·ft)" "Btu per hour and foot" "[Btu_IT]/(h.[ft_i])"
        [scale(PowerPerLength, BTU_PER_HOUR / FOOT, 1)] ["Btu/h/ft"];
    "W/m" "W/m" "watts per metre" "W/m" [scale(PowerPerLength, 1.0, 1)] [];
    "Btu/h.ft2.F" "Btu/(h·ft²·°F)" "Btu per hour, square foot and degree Fahrenheit" "[Btu_IT]/(h.[sft_i].[degR])"
        [scale(FilmCoefficient, BTU_PER_HOUR / (FOOT * FOOT) / FAHRENHEIT, 2)] ["Btu/h/ft2/F"];
    "W/m2.K" "W/(m²·K)" "watts per square metre and kelvin" "W/(m2.K)" [scale(FilmCoefficient, 1.0, 1)] ["W/m2/K"];
    "Btu.in/h.ft2.F" "Btu·in/(h·ft²·°F)" "Btu inches per hour, square foot and degree Fahrenheit"
        "[Btu_IT].[in_i]/(h.[sft_i].[degR])"
        [scale(ThermalConductivity, BTU_PER_HOUR / (12.0 * FOOT) / FAHRENHEIT, 2)] ["Btu in/h ft2 F"];
    "Btu/h.ft.F" "Btu/(h·ft·°F)" "Btu per hour, foot and degree Fahrenheit" "[Btu_IT]/(h.[ft_i].[degR])"
        [scale(ThermalConductivity, BTU_PER_HOUR / FOOT / FAHRENHEIT, 4)] ["Btu/h/ft/F"];
    "W/m.K" "W/(m·K)" "watts per metre and kelvin" "W/(m.K)" [scale(ThermalConductivity, 1.0, 3)] ["W/m/K"];

    "kPa" "kPa" "kilopascals" "kPa" [scale(Pressure, 1e3, 2), scale(PressureDifference, 1e3, 3), scale(VapourPressure, 1e3, 3)] [];
    "hPa" "hPa" "hectopascals" "hPa" [scale(Pressure, 100.0, 1), scale(PressureDifference, 100.0, 2), scale(VapourPressure, 100.0, 2)] [];
    "mbar" "mbar" "millibars" "mbar" [scale(Pressure, 100.0, 1), scale(PressureDifference, 100.0, 2), scale(VapourPressure, 100.0, 2)] ["mb"];
    "Pa" "Pa" "pascals" "Pa" [scale(Pressure, 1.0, 0), scale(PressureDifference, 1.0, 1), scale(VapourPressure, 1.0, 0)] [];
    "inHg" "inHg (0 °C)" "inches of mercury at 0 degrees Celsius" "[in_i'Hg]"
        [scale(Pressure, INCH_OF_MERCURY, 2), scale(VapourPressure, INCH_OF_MERCURY, 4)]
        ["in. Hg", "\"Hg", "in. of mercury", "inches of mercury", "inches Hg"];
    "psi" "psi" "pounds-force per square inch" "[psi]" [
        scale(Pressure, PSI, 3).also(&["psia"]), scale(PressureDifference, PSI, 4).also(&["psig", "psid"]),
        scale(VapourPressure, PSI, 4).also(&["psia"]),
    ] [];
    "inH2O" "in. of water (4 °C)" "inches of water at 4 degrees Celsius" "[in_i'H2O]" [scale(PressureDifference, INCH_OF_WATER, 3)]
        ["in. of water", "inches of water", "in. w.c.", "in. w.g.", "\"wc", "\"wg", "iwc", "iwg", "\"H2O", "in. water"];

    "ft" "ft" "feet" "[ft_i]" [scale(Elevation, FOOT, 0), scale(Length, FOOT, 2), scale(RoomLength, FOOT, 2)] ["feet", "foot", "'"];
    "m" "m" "metres" "m" [scale(Elevation, 1.0, 0), scale(Length, 1.0, 3), scale(RoomLength, 1.0, 2)] ["metre", "metres", "meter", "meters"];
    "in" "in" "inches" "[in_i]" [scale(Length, INCH, 2)] ["inch", "inches", "\""];
    "mm" "mm" "millimetres" "mm" [scale(Length, 1e-3, 0)] [];
    "ft2" "ft²" "square feet" "[sft_i]" [scale(Area, FOOT * FOOT, 1)] ["square feet"];
    "m2" "m²" "square metres" "m2" [scale(Area, 1.0, 2)] [];
    "gal" "gal (US)" "US gallons" "[gal_us]" [scale(WaterVolume, GALLON, 2)] ["US gal", "gallon", "gallons"];
    "L" "L" "litres" "L" [scale(WaterVolume, LITRE, 2)] ["litre", "litres", "liter", "liters"];
    "mL" "mL" "millilitres" "mL" [scale(WaterVolume, 1e-3 * LITRE, 0)] [];
    "ft3" "ft³" "cubic feet" "[cft_i]" [scale(RoomVolume, CUBIC_FOOT, 0), scale(FuelVolume, CUBIC_FOOT, 2)] ["cubic feet"];
    "m3" "m³" "cubic metres" "m3" [scale(RoomVolume, 1.0, 1), scale(FuelVolume, 1.0, 3)] [];
    "changes/h" "changes/h" "changes an hour" "1/h" [scale(AirChanges, 1.0 / HOUR, 2)] ["/h", "per hour", "ach"];
    "Btu/ft3" "Btu/ft³" "Btu per cubic foot" "[Btu_IT]/[cft_i]" [scale(HeatingValue, BTU / CUBIC_FOOT, 0)] [];
    "MJ/m3" "MJ/m³" "megajoules per cubic metre" "MJ/m3" [scale(HeatingValue, 1e6, 2)] [];
    "kWh/m3" "kWh/m³" "kilowatt hours per cubic metre" "kW.h/m3" [scale(HeatingValue, 1e3 * HOUR, 2)] [];
    "lb" "lb" "pounds" "[lb_av]" [scale(Mass, POUND, 2)] ["pound", "pounds"];
    "kg" "kg" "kilograms" "kg" [scale(Mass, 1.0, 3)] [];
    "fpm" "ft/min" "feet per minute" "[ft_i]/min" [scale(Velocity, FOOT / MINUTE, 0)] ["feet per minute"];
    "m/s" "m/s" "metres per second" "m/s" [scale(Velocity, 1.0, 2)] [];
    "s" "s" "seconds" "s" [scale(Duration, 1.0, 0)] ["sec", "second", "seconds"];
    "min" "min" "minutes" "min" [scale(Duration, MINUTE, 2)] ["mins", "minute", "minutes"];
    "h" "h" "hours" "h" [scale(Duration, HOUR, 2)] ["hr", "hrs", "hour", "hours"];
    "ppm" "ppm" "parts per million" "[ppm]" [scale(MoleFraction, 1e-6, 0)] ["parts per million"];
    "V" "V" "volts" "V" [scale(Voltage, 1.0, 1)] ["volt", "volts"];
    "A" "A" "amperes" "A" [scale(Current, 1.0, 1)] ["amp", "amps"];

    "Btu/h.cfm.F" "Btu/(h·cfm·°F)" "Btu per hour, cfm and degree Fahrenheit" "[Btu_IT]/(h.([cft_i]/min).[degR])"
        [scale(SensibleConstant, BTU_PER_HOUR / CFM / FAHRENHEIT, 3)] [];
    "W/(L/s).K" "W/(L/s·K)" "watts per litre per second and kelvin" "W/((L/s).K)" [scale(SensibleConstant, 1.0 / LITRE, 3)] [];
    "lb/h.cfm" "lb/h per cfm" "pounds per hour per cfm" "([lb_av]/h)/([cft_i]/min)" [scale(TotalConstant, POUND / HOUR / CFM, 3)] [];
    "Btu/h.cfm.(lb/lb)" "Btu/h per cfm per lb/lb" "Btu per hour per cfm per pound per pound" "[Btu_IT]/h/([cft_i]/min)"
        [scale(LatentConstant, BTU_PER_HOUR / CFM, 0)] [];
    "Btu/h.cfm.(gr/lb)" "Btu/h per cfm per gr/lb" "Btu per hour per cfm per grain per pound" "[Btu_IT]/h/([cft_i]/min)/([gr]/[lb_av])"
        [scale(LatentConstant, BTU_PER_HOUR / CFM * POUND / GRAIN, 4)] [];
    "W/(L/s).(g/kg)" "W/(L/s) per g/kg" "watts per litre per second per gram per kilogram" "W/(L/s)/(g/kg)"
        [scale(LatentConstant, 1.0 / LITRE / 1e-3, 3)] [];
    "Btu/h.(gal/min).F" "Btu/(h·(gal/min)·°F)" "Btu per hour, gallon per minute and degree Fahrenheit"
        "[Btu_IT]/(h.([gal_us]/min).[degR])" [scale(WaterConstant, BTU_PER_HOUR / (GALLON / MINUTE) / FAHRENHEIT, 1)] [];
    "kW/(L/s).K" "kW/(L/s·K)" "kilowatts per litre per second and kelvin" "kW/((L/s).K)"
        [scale(WaterConstant, 1e3 / LITRE, 3)] [];
    "kW/ton" "kW/ton" "kilowatts a refrigeration ton" "kW/(12000.[Btu_IT]/h)"
        [scale(InputPerCooling, 1e3 / (12_000.0 * BTU_PER_HOUR), 3)] ["kW per ton"];
    "kW/kW" "kW/kW" "kilowatts a kilowatt of cooling" "kW/kW" [scale(InputPerCooling, 1.0, 4)] [];
}
