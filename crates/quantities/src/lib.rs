//! Kinds of quantity and their units: what a person may type, reading it, showing it.
//!
//! Inside Dewledger every number with a meaning is a [`Quantity`]: a `uom` type, or a newtype over one where two
//! meanings share a dimension. An [`Amount`] is the same thing known by [`Kind`] at run time, for forms and tables.

mod amount;
mod choice;
mod kind;
mod quantity;
mod read;
mod sentence;
mod show;
mod unit;

pub use amount::Amount;
pub use choice::{UnitChoice, WrongUnit};
pub use kind::Kind;
pub use quantity::{
    AirFlow, CondensateFlow, DryAirFlow, Elevation, Enthalpy, EnthalpyDifference, HumidityRatio,
    HumidityRatioDifference, LatentConstant, Mass, MoistureFlow, MoleFraction, PressureDifference,
    ProcessSlope, Quantity, RelativeHumidity, RoomVolume, SensibleConstant, Share, StandardAirFlow,
    TotalConstant, VapourPressure, WaterEnthalpy, WaterFlow, WaterVolume, difference,
};
pub use read::{Entry, PlusMinus, ReadError, Typed, read, read_plus_minus};
pub use sentence::Sentence;
pub use show::{Shown, plain, show, show_with};
pub use unit::Unit;
pub use uom::si::f64::{
    Area, ElectricCurrent, ElectricPotential, Energy, HeatFluxDensity, Length, MassDensity, Power,
    Pressure, Ratio, SpecificHeatCapacity, SpecificVolume, TemperatureInterval,
    ThermodynamicTemperature, Time, Velocity, Volume,
};
