//! Properties of moist air, water, glycols and the standard atmosphere.
//!
//! Moist air is a mixture of real dry air and real water with a virial equation to third order and an enhancement
//! factor at saturation: the formulation of ASHRAE RP-1485 (Herrmann, Kretzschmar, Gatley, HVAC&R Research 15(5),
//! 961, 2009; bibliography from memory). Everything is per mass of dry air. Pure functions of typed quantities: no
//! state but tables made from the equations at first use, no I/O, no panic, no number that is not a number.
//!
//! # Example
//!
//! ```
//! use dewledger_properties::{Humidity, MoistAir, Wick, atmosphere};
//! use dewledger_quantities::{Elevation, Quantity, ThermodynamicTemperature};
//!
//! let pressure = atmosphere::pressure_at(Elevation::from_si(2250.0))?;
//! let dry_bulb = ThermodynamicTemperature::from_si(273.15 + 24.0);
//! let wet_bulb = ThermodynamicTemperature::from_si(273.15 + 15.5);
//! let air = MoistAir::new(dry_bulb, Humidity::WetBulb(wet_bulb, Wick::NotSaid), pressure)?;
//! assert!((air.humidity_ratio().si() - 0.011_056).abs() < 1e-6);
//! # Ok::<(), Box<dyn std::error::Error>>(())
//! ```

pub mod atmosphere;
pub mod glycol;
pub mod water;

mod constants;
mod dew_point;
mod enhancement;
mod error;
mod fitted;
mod fog;
mod humidity;
mod ice;
mod ideal;
mod liquid;
mod mixture;
mod moist_air;
mod saturated;
mod saturation;
mod virial;
mod wet_bulb;

pub use error::AirError;
pub use fog::{Mixed, settle};
pub use humidity::{Humidity, Wick};
pub use moist_air::{MoistAir, lowest_wet_bulb};
pub use saturated::{saturation_humidity_ratio, saturation_humidity_ratio_over_liquid};
pub use wet_bulb::WetBulb;
