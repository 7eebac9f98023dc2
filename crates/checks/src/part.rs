//! The parts of one reading's doubt: its own, its place's, its scatter's, and what it shares with other readings.

/// One part of a reading's doubt.
#[derive(Debug, Clone, PartialEq)]
pub struct Part {
    /// Where it comes from.
    pub source: Source,
    /// Standard uncertainty in the stored SI unit of the reading; its sign says which way a shared source moves it.
    pub u_si: f64,
    /// Degrees of freedom; infinite where it is no estimate from repeats.
    pub freedom: f64,
}

impl Part {
    /// A part that is no estimate from repeats.
    #[must_use]
    pub const fn certain(source: Source, u_si: f64) -> Self {
        Self { source, u_si, freedom: f64::INFINITY }
    }
}

/// Where a part of a reading's doubt comes from.
#[derive(Debug, Clone, PartialEq, Eq, PartialOrd, Ord)]
pub enum Source {
    /// Its own, new at each reading.
    Own,
    /// Scatter of its takes.
    Scatter,
    /// Where the probe was held.
    Place,
    /// Shared with every reading that has a part of this identity: a probe's calibration.
    Shared {
        /// Identity.
        id: String,
        /// Name, for the list of what decides a ±.
        name: String,
    },
}

impl Source {
    /// A shared source.
    pub fn shared(id: impl Into<String>, name: impl Into<String>) -> Self {
        Source::Shared { id: id.into(), name: name.into() }
    }
}

/// Half-width of the 95 % interval of a reading with these parts alone, in its stored SI unit.
#[must_use]
pub fn half_width(parts: &[Part]) -> Option<f64> {
    let combined = crate::doubt::combine(parts.iter().map(|part| (part.u_si, part.freedom)));
    (combined.u > 0.0).then_some(combined.k * combined.u)
}
