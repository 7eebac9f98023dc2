//! The checks: from readings to results, with their doubt, their working and their forms.
//!
//! One file a check. Each says what it asks ([`Check::form`]) and how it answers ([`Check::solve`]); screen, command
//! line, ±, history and report come from that one definition. Pure functions: no I/O, no JSON, no clock.

mod check;
mod given;
mod least_variance;
mod outcome;
mod refusal;

pub mod doubt;
pub mod drawn;
pub mod form;
pub mod part;
pub mod slips;
pub mod statement;
pub mod takes;
pub mod verdict;

pub mod flow_block;
pub mod plant_power;
pub mod pressure;
pub mod process;
pub mod split;
pub mod state_block;
pub mod water_side;
pub mod water_state;

pub mod air_heat;
pub mod air_state;
pub mod book_constants;
pub mod chiller_balance;
pub mod coil;
pub mod coil_balance;
pub mod condensate;
pub mod economizer;
pub mod fan_heat;
pub mod heat_rise;
pub mod humidifying;
pub mod mixing;
pub mod outdoor_share;
pub mod recovery;
pub mod room_air;
pub mod surface;
pub mod traverse;
pub mod water_heat;

pub use check::{About, Check, Group};
pub use given::{Given, Moved, Reading};
pub use outcome::{
    Caution, Change, Figure, Label, Missing, Note, Offer, Outcome, Role, StatePoint, Step, Versus,
    Weight,
};
pub use refusal::{Refusal, Stop, both};

/// Every check, in the order in which a person is shown them. A new check is one file and one line here.
pub static ALL: &[&dyn Check] = &[
    &air_heat::AirHeat,
    &air_state::AirState,
    &book_constants::BookConstants,
    &mixing::Mixing,
    &outdoor_share::OutdoorShare,
    &coil::Coil,
    &condensate::Condensate,
    &recovery::Recovery,
    &humidifying::Humidifying,
    &heat_rise::HeatRise,
    &fan_heat::FanHeat,
    &surface::Surface,
    &traverse::Traverse,
    &room_air::RoomAir,
    &water_heat::WaterHeat,
    &coil_balance::CoilBalance,
    &chiller_balance::ChillerBalance,
    &economizer::Economizer,
];

/// The check with this identifier.
#[must_use]
pub fn find(id: &str) -> Option<&'static dyn Check> {
    ALL.iter().copied().find(|check| check.about().id == id)
}
