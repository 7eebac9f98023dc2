//! The application without a window: one request type, one reply type, one [`Desk::handle`].
//!
//! A request carries what a person typed; a reply carries finished text beside every SI value, so that a screen
//! computes and parses nothing. The only crate that knows JSON. No window, no socket.

mod answer;
mod bench;
mod chart;
mod classes;
mod clock;
mod demo;
mod desk;
mod drafts;
mod drawn;
mod entries;
mod fault;
mod form_view;
mod instruments;
mod overview;
mod places;
mod probe;
mod read_with;
mod remarks;
mod reply;
mod request;
mod requirements;
mod result_view;
mod runs;
mod typed;
mod units;
mod visits;
mod with_view;

pub mod air_rows;

pub use clock::Clock;
pub use desk::{Desk, OpenFault, VERSION, fault_json};
pub use fault::schema;
pub use reply::*;
pub use request::*;
