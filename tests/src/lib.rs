//! Shared means of the tests: the built programs, a driver of the real window and of a browser of a phone's shape,
//! and the hand that types and taps.

#![expect(
    clippy::missing_panics_doc,
    reason = "means of tests: what does not work fails the test where it stands"
)]

mod driver;
mod hand;
mod process;

pub use driver::{Driver, has_chromium};
pub use hand::Hand;
pub use process::{Ended, program};
