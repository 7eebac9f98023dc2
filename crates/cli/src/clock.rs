//! The clock of this machine: the one place where the command reads it.

use dewledger_desk::Clock;

/// The system's clock.
pub(crate) fn system() -> Clock {
    #[expect(clippy::disallowed_methods, reason = "a program's shell owns the clock")]
    Clock::new(jiff::ZonedDateTime::now)
}
