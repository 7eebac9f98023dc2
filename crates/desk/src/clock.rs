//! The clock, which the shell owns, and moments in words.

use std::sync::Arc;

use dewledger_ledger::At;
use jiff::tz::{Offset, TimeZone};
use jiff::{Timestamp, ZonedDateTime};

/// Tells the time where the app runs. Tests bring their own.
#[derive(Clone)]
pub struct Clock(Arc<dyn Fn() -> ZonedDateTime + Send + Sync>);

impl Clock {
    /// A clock that asks `now` each time.
    pub fn new(now: impl Fn() -> ZonedDateTime + Send + Sync + 'static) -> Self {
        Self(Arc::new(now))
    }

    /// Now, as the ledger stores it.
    pub(crate) fn at(&self) -> At {
        let now = (self.0)();
        At { ms: now.timestamp().as_millisecond(), utc_offset_min: now.offset().seconds() / 60 }
    }
}

impl std::fmt::Debug for Clock {
    fn fmt(&self, formatter: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        formatter.write_str("Clock")
    }
}

/// A moment on the clock of the wall where it was.
fn local(at: At) -> ZonedDateTime {
    let offset = Offset::from_seconds(at.utc_offset_min * 60).unwrap_or(Offset::UTC);
    let timestamp = Timestamp::from_millisecond(at.ms).unwrap_or(Timestamp::UNIX_EPOCH);
    timestamp.to_zoned_datetime(TimeZone::fixed(offset))
}

/// "14:20".
pub(crate) fn time(at: At) -> String {
    local(at).strftime("%H:%M").to_string()
}

/// "14 July", or "14 July 2025" in another year than `now`.
pub(crate) fn day(at: At, now: At) -> String {
    let (at, now) = (local(at), local(now));
    let format = if at.year() == now.year() { "%-d %B" } else { "%-d %B %Y" };
    at.strftime(format).to_string()
}

/// "14 July 2026".
pub(crate) fn full_day(at: At) -> String {
    local(at).strftime("%-d %B %Y").to_string()
}

/// Whether both are on one day of the calendar.
pub(crate) fn same_day(one: At, other: At) -> bool {
    local(one).date() == local(other).date()
}

/// The day of the calendar.
pub(crate) fn date(at: At) -> jiff::civil::Date {
    local(at).date()
}

/// "14:20:05", of a moment written as `2026-12-01T14:20:05Z`; none where it is not.
pub(crate) fn second(text: &str, now: At) -> Option<String> {
    let at = At { ms: moment_ms(text)?, ..now };
    Some(local(at).strftime("%H:%M:%S").to_string())
}

/// Milliseconds since the epoch of a moment written as `2026-12-01T14:20:05Z`.
pub(crate) fn moment_ms(text: &str) -> Option<i64> {
    text.trim().parse::<Timestamp>().ok().map(Timestamp::as_millisecond)
}
