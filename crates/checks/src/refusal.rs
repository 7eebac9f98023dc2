//! Why a check gives no results: it waits, or a reading cannot be.

use dewledger_quantities::Sentence;

use crate::form::Text;
use crate::outcome::{Missing, Offer};

/// Why there are no results.
#[derive(Debug, Clone, PartialEq)]
pub enum Stop {
    /// Readings are missing.
    Waits(Vec<Missing>),
    /// A reading is impossible.
    Refused(Box<Refusal>),
}

/// An impossible reading: which field, what is wrong, what mends it.
#[derive(Debug, Clone, PartialEq)]
pub struct Refusal {
    /// Key of the field.
    pub field: Text,
    /// Identifier, for tests and programs.
    pub code: &'static str,
    /// What is wrong and what would mend it, in plain sentences.
    pub says: Sentence,
    /// What one tap could do.
    pub offers: Vec<Offer>,
}

impl Refusal {
    /// A refusal without offers.
    pub fn new(field: impl Into<Text>, code: &'static str, says: Sentence) -> Self {
        Self { field: field.into(), code, says, offers: Vec::new() }
    }

    /// With what one tap could do.
    #[must_use]
    pub fn offering(mut self, offer: Offer) -> Self {
        self.offers.push(offer);
        self
    }
}

impl From<Refusal> for Stop {
    fn from(refusal: Refusal) -> Self {
        Stop::Refused(Box::new(refusal))
    }
}

impl Stop {
    /// Waits for one reading.
    pub fn waits(key: impl Into<Text>, name: impl Into<Text>) -> Self {
        Stop::Waits(vec![Missing::new(key, name)])
    }
}

/// Both, or all that is missing for both. A refusal comes before a wait: it is what a person must mend.
///
/// # Errors
///
/// The refusal of either, else the missing readings of both.
pub fn both<A, B>(one: Result<A, Stop>, other: Result<B, Stop>) -> Result<(A, B), Stop> {
    match (one, other) {
        (Ok(one), Ok(other)) => Ok((one, other)),
        (Err(Stop::Refused(refusal)), _) | (_, Err(Stop::Refused(refusal))) => {
            Err(Stop::Refused(refusal))
        }
        (Err(Stop::Waits(mut one)), Err(Stop::Waits(other))) => {
            one.extend(other);
            Err(Stop::Waits(one))
        }
        (Err(Stop::Waits(missing)), Ok(_)) | (Ok(_), Err(Stop::Waits(missing))) => {
            Err(Stop::Waits(missing))
        }
    }
}
