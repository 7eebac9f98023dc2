//! A moment, as it is stored.

/// A moment with the offset of the clock on the wall where it was.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct At {
    /// Milliseconds since 1970-01-01 UTC.
    pub ms: i64,
    /// Minutes that local time was ahead of UTC.
    pub utc_offset_min: i32,
}
