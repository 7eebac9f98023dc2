//! What a check is.

use std::collections::BTreeMap;

use crate::doubt::{Doubt, Term};
use crate::form::Section;
use crate::given::Given;
use crate::outcome::{Note, Outcome};
use crate::refusal::Stop;

/// One calculation from readings to results. Screen, command line, ±, history and report all come from it.
pub trait Check: Sync {
    /// Name and purpose.
    fn about(&self) -> &'static About;

    /// What it asks for. May depend on what is given: a wet bulb below zero asks for the state of the wick.
    fn form(&self, given: &Given) -> Vec<Section>;

    /// The calculation: a pure function of what is given.
    ///
    /// # Errors
    ///
    /// [`Stop::Waits`] when nothing can be said yet, [`Stop::Refused`] when a reading cannot be.
    fn solve(&self, given: &Given) -> Result<Outcome, Stop>;

    /// Sources of doubt beyond the ± of single readings: values worked out on the way that have one of their own.
    fn terms(&self, given: &Given) -> Vec<Term> {
        crate::pressure::terms(given)
    }

    /// Remarks that need the doubt of the results: a part that is smaller than its own ±.
    fn judge(
        &self,
        given: &Given,
        outcome: &Outcome,
        doubts: &BTreeMap<String, Doubt>,
    ) -> Vec<Note> {
        let _ = (given, outcome, doubts);
        Vec::new()
    }
}

/// Name and purpose of a check.
#[derive(Debug, PartialEq, Eq)]
pub struct About {
    /// Identifier everywhere: file, request, form, history.
    pub id: &'static str,
    /// Label.
    pub label: &'static str,
    /// What a person wants to know.
    pub question: &'static str,
    /// What it takes, in a line.
    pub takes: &'static str,
    /// Where it stands in the list.
    pub group: Group,
}

/// Where a check stands in the list.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Group {
    /// The air side.
    Air,
    /// The water side and plant.
    Water,
    /// Whole equipment and buildings.
    Whole,
}

impl Group {
    /// Title in the list.
    #[must_use]
    pub const fn title(self) -> &'static str {
        match self {
            Group::Air => "Air",
            Group::Water => "Water and plant",
            Group::Whole => "Whole equipment",
        }
    }
}
