//! Typed quantities: uom types where the dimension says it all, newtypes where two meanings share a dimension.

use std::marker::PhantomData;

use uom::si::f64::{
    Area, AvailableEnergy, ElectricCurrent, ElectricPotential, Energy, Frequency, HeatFluxDensity,
    HeatTransfer, Length, LinearPowerDensity, MassDensity, MassRate, Power, Pressure, Ratio,
    SpecificHeatCapacity, SpecificVolume, TemperatureInterval, ThermalConductivity,
    ThermodynamicTemperature, Time, Velocity, Volume, VolumeRate,
};

use crate::{Amount, Kind};

/// A quantity known to the compiler by its meaning. Its value crosses to and from a bare number only through the
/// SI unit that [`Kind::si_suffix`] names.
pub trait Quantity: Copy {
    /// What the number means.
    const KIND: Kind;

    /// From the stored SI unit of [`Self::KIND`].
    #[must_use]
    fn from_si(si: f64) -> Self;

    /// In the stored SI unit of [`Self::KIND`].
    #[must_use]
    fn si(self) -> f64;

    /// The same value, known by kind.
    #[must_use]
    fn amount(self) -> Amount {
        Amount::new(Self::KIND, self.si())
    }
}

macro_rules! plain {
    ($($type:ident => $kind:ident;)*) => {$(
        impl Quantity for $type {
            const KIND: Kind = Kind::$kind;
            fn from_si(si: f64) -> Self {
                Self { dimension: PhantomData, units: PhantomData, value: si }
            }
            fn si(self) -> f64 {
                self.value
            }
        }
    )*};
}

plain! {
    ThermodynamicTemperature => Temperature;
    TemperatureInterval => TemperatureDifference;
    SpecificVolume => SpecificVolume;
    MassDensity => Density;
    SpecificHeatCapacity => SpecificHeat;
    Power => Power;
    Energy => Energy;
    HeatFluxDensity => PowerPerArea;
    LinearPowerDensity => PowerPerLength;
    HeatTransfer => FilmCoefficient;
    ThermalConductivity => ThermalConductivity;
    Pressure => Pressure;
    Length => Length;
    Area => Area;
    Velocity => Velocity;
    Time => Duration;
    Ratio => Ratio;
    ElectricPotential => Voltage;
    ElectricCurrent => Current;
}

macro_rules! newtypes {
    ($($(#[$doc:meta])* $name:ident($inner:ident) => $kind:ident;)*) => {$(
        $(#[$doc])*
        #[derive(Debug, Clone, Copy, PartialEq, PartialOrd, Default)]
        pub struct $name(pub $inner);

        impl Quantity for $name {
            const KIND: Kind = Kind::$kind;
            fn from_si(si: f64) -> Self {
                Self($inner { dimension: PhantomData, units: PhantomData, value: si })
            }
            fn si(self) -> f64 {
                self.0.value
            }
        }
    )*};
}

newtypes! {
    /// Relative humidity, 1 is saturated; over liquid water unless the name beside it says over ice.
    RelativeHumidity(Ratio) => RelativeHumidity;
    /// Mass of water vapour per mass of dry air, kg/kg.
    HumidityRatio(Ratio) => HumidityRatio;
    /// Difference of two humidity ratios, kg/kg.
    HumidityRatioDifference(Ratio) => HumidityRatioDifference;
    /// Enthalpy of moist air per mass of dry air, J/kg, zero for dry air at 0 °C and 101.325 kPa and liquid water at the triple point.
    Enthalpy(AvailableEnergy) => Enthalpy;
    /// Difference of two enthalpies, J/kg.
    EnthalpyDifference(AvailableEnergy) => EnthalpyDifference;
    /// Enthalpy of liquid water, ice or steam, J/kg, zero for liquid at the triple point.
    WaterEnthalpy(AvailableEnergy) => WaterEnthalpy;
    /// Heat added per mass of water added, J/kg.
    ProcessSlope(AvailableEnergy) => ProcessSlope;
    /// Actual volume flow of air at a stated place, m³/s.
    AirFlow(VolumeRate) => AirFlow;
    /// Flow of standard air, m³/s at a stated standard density.
    StandardAirFlow(VolumeRate) => StandardAirFlow;
    /// Mass flow of dry air, kg/s.
    DryAirFlow(MassRate) => DryAirFlow;
    /// Volume flow of water or coolant in a pipe, m³/s.
    WaterFlow(VolumeRate) => WaterFlow;
    /// Volume of drained water per time, m³/s.
    CondensateFlow(VolumeRate) => CondensateFlow;
    /// Mass of water per time, kg/s; positive when the air gains it.
    MoistureFlow(MassRate) => MoistureFlow;
    /// Mass flow of water or coolant in a pipe, kg/s.
    WaterMassFlow(MassRate) => WaterMassFlow;
    /// Gauge pressure or pressure difference, Pa.
    PressureDifference(Pressure) => PressureDifference;
    /// Vapour pressure of the water in the air, Pa.
    VapourPressure(Pressure) => VapourPressure;
    /// Height above sea level, m.
    Elevation(Length) => Elevation;
    /// Volume of water in a vessel, m³.
    WaterVolume(Volume) => WaterVolume;
    /// Volume of a room, m³.
    RoomVolume(Volume) => RoomVolume;
    /// A side of a room, m.
    RoomLength(Length) => RoomLength;
    /// How often a flow fills a room's volume in a time, 1/s.
    AirChanges(Frequency) => AirChanges;
    /// A volume of fuel gas, m³ as its meter counts it.
    FuelVolume(Volume) => FuelVolume;
    /// A share of a whole or an error, shown in per cent; 1 is 100 %.
    Share(Ratio) => Share;
    /// Electrical input over the cooling that it gives, W/W.
    InputPerCooling(Ratio) => InputPerCooling;
    /// Mole fraction of a gas, 1 is all.
    MoleFraction(Ratio) => MoleFraction;
    /// Mass of water, kg.
    Mass(UomMass) => Mass;
}

use uom::si::f64::Mass as UomMass;

macro_rules! composed {
    ($($(#[$doc:meta])* $name:ident => $kind:ident;)*) => {$(
        $(#[$doc])*
        #[derive(Debug, Clone, Copy, PartialEq, PartialOrd, Default)]
        pub struct $name { si: f64 }

        impl Quantity for $name {
            const KIND: Kind = Kind::$kind;
            fn from_si(si: f64) -> Self {
                Self { si }
            }
            fn si(self) -> f64 {
                self.si
            }
        }
    )*};
}

composed! {
    /// Heat per volume flow and temperature difference, J/(m³ K): the book's 1.08.
    SensibleConstant => SensibleConstant;
    /// Dry air per volume of air, kg/m³: the book's 4.5.
    TotalConstant => TotalConstant;
    /// Heat per volume flow and humidity-ratio difference, J/m³: the book's 4840.
    LatentConstant => LatentConstant;
    /// Heat per volume flow of water and temperature difference, J/(m³ K): the book's 500.
    WaterConstant => WaterConstant;
    /// Heat of a volume of fuel gas, J/m³ at a stated pressure and temperature.
    HeatingValue => HeatingValue;
}

/// `warm - cool` as an interval. uom has no subtraction of two absolute temperatures; this is the one place for it.
#[must_use]
pub fn difference(
    warm: ThermodynamicTemperature,
    cool: ThermodynamicTemperature,
) -> TemperatureInterval {
    TemperatureInterval::from_si(warm.si() - cool.si())
}
