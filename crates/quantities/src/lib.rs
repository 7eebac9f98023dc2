//! Kinds of quantity and their units: what a person may type, reading it, showing it.
//!
//! Inside Dewledger every number with a meaning is a [`Quantity`]: a `uom` type, or a newtype over one where two
//! meanings share a dimension. An [`Amount`] is the same thing known by [`Kind`] at run time, for forms and tables.

mod amount;
mod choice;
mod decimal;
mod kind;
mod number;
mod plus_minus;
mod quantity;
mod read;
mod sentence;
mod show;
mod unit;

pub use amount::Amount;
pub use choice::{Preset, UnitChoice, WrongUnit};
pub use kind::Kind;
pub use plus_minus::{PlusMinus, read_plus_minus};
pub use quantity::{
    AirChanges, AirFlow, CondensateFlow, DryAirFlow, Elevation, Enthalpy, EnthalpyDifference,
    FuelVolume, HeatingValue, HumidityRatio, HumidityRatioDifference, InputPerCooling,
    LatentConstant, Mass, MoistureFlow, MoleFraction, PressureDifference, ProcessSlope, Quantity,
    RelativeHumidity, RoomLength, RoomVolume, SensibleConstant, Share, StandardAirFlow,
    TotalConstant, VapourPressure, WaterConstant, WaterEnthalpy, WaterFlow, WaterMassFlow,
    WaterVolume, difference,
};
pub use read::{Entry, ReadError, Typed, read};
pub use sentence::Sentence;
pub use show::{Shown, plain, show, show_to, show_with};
pub use unit::Unit;
pub use uom::si::f64::{
    Area, ElectricCurrent, ElectricPotential, Energy, HeatFluxDensity, HeatTransfer, Length,
    LinearPowerDensity, MassDensity, Power, Pressure, Ratio, SpecificHeatCapacity, SpecificVolume,
    TemperatureInterval, ThermalConductivity, ThermodynamicTemperature, Time, Velocity, Volume,
};
