//! What a check answers: results, notes, cautions, the working, the states behind it.

use std::collections::BTreeMap;

use dewledger_properties::MoistAir;
use dewledger_quantities::{Amount, Sentence};

use crate::drawn::{Curve, Line, Table};
use crate::form::{Mark, Text};

/// The answer of a check.
#[derive(Debug, Clone, Default)]
pub struct Outcome {
    /// Results, the headline first.
    pub figures: Vec<Figure>,
    /// Readings still missing for some of them.
    pub waits: Vec<Missing>,
    /// Remarks.
    pub notes: Vec<Note>,
    /// Safety, always shown.
    pub cautions: &'static [Caution],
    /// The working.
    pub steps: Vec<Step>,
    /// Air states behind it.
    pub states: Vec<StatePoint>,
    /// Lines between states, for the chart.
    pub lines: Vec<Line>,
    /// Results over a range.
    pub curves: Vec<Curve>,
    /// Tables that are results in themselves.
    pub tables: Vec<Table>,
    /// Values that stay as they are while the readings are moved for its doubt: weights found from that doubt.
    pub kept: BTreeMap<String, f64>,
    /// Keys of the points that were taken as saturated within their ±.
    pub saturated: Vec<String>,
    /// Where the pressure comes from, for the line under the title.
    pub pressure: Option<Sentence>,
    /// What book constants would have said.
    pub versus: Vec<Versus>,
}

impl Outcome {
    /// The result at `key`.
    #[must_use]
    pub fn figure(&self, key: &str) -> Option<&Figure> {
        self.figures.iter().find(|figure| figure.key == key)
    }

    /// The value of the result at `key`; none when withheld.
    #[must_use]
    pub fn amount(&self, key: &str) -> Option<Amount> {
        self.figure(key).and_then(|figure| figure.amount)
    }

    /// Adds a result.
    pub fn push(&mut self, figure: Figure) {
        self.figures.push(figure);
    }
}

/// One result.
#[derive(Debug, Clone, PartialEq)]
pub struct Figure {
    /// Key, without a unit: `total`.
    pub key: Text,
    /// Its label.
    pub label: Label,
    /// The value, positive = gained by the air; none when withheld.
    pub amount: Option<Amount>,
    /// Why it is withheld.
    pub withheld: Option<Sentence>,
    /// A line below the label.
    pub condition: Option<Sentence>,
    /// How it is shown.
    pub role: Role,
    /// The group that it belongs to.
    pub group: &'static str,
}

impl Figure {
    /// A result.
    pub fn new(
        key: impl Into<Text>,
        label: impl Into<Text>,
        amount: Amount,
        group: &'static str,
    ) -> Self {
        Self {
            key: key.into(),
            label: Label::Plain(label.into()),
            amount: Some(amount),
            withheld: None,
            condition: None,
            role: Role::Plain,
            group,
        }
    }

    /// A result that cannot be given, and why.
    pub fn withheld(
        key: impl Into<Text>,
        label: impl Into<Text>,
        why: Sentence,
        group: &'static str,
    ) -> Self {
        Self {
            key: key.into(),
            label: Label::Plain(label.into()),
            amount: None,
            withheld: Some(why),
            condition: None,
            role: Role::Plain,
            group,
        }
    }

    /// Said in words instead of a sign: `gained` where positive, `lost` where negative, the magnitude shown.
    #[must_use]
    pub fn signed(mut self, gained: &'static str, lost: &'static str) -> Self {
        self.label = Label::Signed { gained, lost };
        self
    }

    /// With a line below its label.
    #[must_use]
    pub fn on_condition(mut self, condition: Sentence) -> Self {
        self.condition = Some(condition);
        self
    }

    /// Shown so.
    #[must_use]
    pub fn role(mut self, role: Role) -> Self {
        self.role = role;
        self
    }
}

/// A label, or two for the two signs.
#[derive(Debug, Clone, PartialEq)]
pub enum Label {
    /// One label, the sign shown.
    Plain(Text),
    /// A label for each sign, the magnitude shown.
    Signed {
        /// When the air gains.
        gained: &'static str,
        /// When the air loses.
        lost: &'static str,
    },
}

/// How a result is shown.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Role {
    /// The one figure that counts.
    Headline,
    /// Its dry part, drawn solid.
    SensiblePart,
    /// Its moist part, drawn dotted.
    LatentPart,
    /// In the small line under the headline.
    Minor,
    /// A row.
    Plain,
    /// A row that is of use to few: folded.
    Detail,
}

/// A reading still missing.
#[derive(Debug, Clone, PartialEq)]
pub struct Missing {
    /// Its key.
    pub key: Text,
    /// Its name in a sentence: "entering wet bulb".
    pub name: Text,
    /// A question to put at its field, where the field alone does not say enough.
    pub asks: Option<Sentence>,
}

impl Missing {
    /// A missing reading.
    pub fn new(key: impl Into<Text>, name: impl Into<Text>) -> Self {
        Self { key: key.into(), name: name.into(), asks: None }
    }
}

/// A remark that stands beside the results.
#[derive(Debug, Clone, PartialEq)]
pub struct Note {
    /// Identifier, for accepting it.
    pub code: Text,
    /// How heavy it is.
    pub weight: Weight,
    /// The field it stands on.
    pub field: Option<Text>,
    /// What.
    pub lead: Sentence,
    /// Why, and what mends it.
    pub reason: Option<Sentence>,
    /// What one tap could do.
    pub offers: Vec<Offer>,
}

impl Note {
    /// A reading that is computed but looks wrong; a person can say that it is right.
    pub fn unusual(code: impl Into<Text>, field: impl Into<Text>, lead: Sentence) -> Self {
        Self {
            code: code.into(),
            weight: Weight::Unusual,
            field: Some(field.into()),
            lead,
            reason: None,
            offers: Vec::new(),
        }
    }

    /// Worth knowing; nothing to accept.
    pub fn remark(code: impl Into<Text>, lead: Sentence) -> Self {
        Self {
            code: code.into(),
            weight: Weight::Remark,
            field: None,
            lead,
            reason: None,
            offers: Vec::new(),
        }
    }

    /// Accepted as it is because it lies within its ±.
    pub fn within(code: impl Into<Text>, field: impl Into<Text>, lead: Sentence) -> Self {
        Self { weight: Weight::Within, ..Self::unusual(code, field, lead) }
    }

    /// With why.
    #[must_use]
    pub fn because(mut self, reason: Sentence) -> Self {
        self.reason = Some(reason);
        self
    }

    /// With what one tap could do.
    #[must_use]
    pub fn offering(mut self, offer: Offer) -> Self {
        self.offers.push(offer);
        self
    }
}

/// How heavy a note is.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Weight {
    /// Computed, but looks wrong.
    Unusual,
    /// Accepted within its ±.
    Within,
    /// Worth knowing.
    Remark,
}

/// A change of the form that one tap makes; offered, never applied.
#[derive(Debug, Clone, PartialEq)]
pub struct Offer {
    /// "Swap the two".
    pub label: Sentence,
    /// Applied in order.
    pub changes: Vec<Change>,
}

impl Offer {
    /// An offer with a fixed label.
    #[must_use]
    pub fn new(label: &'static str, changes: Vec<Change>) -> Self {
        Self { label: Sentence::new(label), changes }
    }
}

/// A change of what is typed.
#[derive(Debug, Clone, PartialEq)]
pub enum Change {
    /// Chooses a value.
    Choose(Text, Text),
    /// Says that the number typed is in this unit (its identifier).
    Unit(Text, &'static str),
    /// Exchanges two readings.
    Swap(Text, Text),
    /// Moves a reading to another key.
    Move(Text, Text),
    /// Clears a reading.
    Clear(Text),
}

/// A caution: where the work can hurt someone.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Caution {
    /// What it is about.
    pub title: &'static str,
    /// What to mind.
    pub says: &'static str,
}

/// One step of the working.
#[derive(Debug, Clone, PartialEq)]
pub struct Step {
    /// What it gives.
    pub title: Text,
    /// In symbols.
    pub formula: &'static str,
    /// With the numbers put in.
    pub numbers: Sentence,
    /// Convention and source.
    pub source: &'static str,
}

impl Step {
    /// One step.
    pub fn new(
        title: impl Into<Text>,
        formula: &'static str,
        numbers: Sentence,
        source: &'static str,
    ) -> Self {
        Self { title: title.into(), formula, numbers, source }
    }
}

/// An air state with its place.
#[derive(Debug, Clone)]
pub struct StatePoint {
    /// Prefix of its readings.
    pub key: Text,
    /// "Entering air".
    pub label: Text,
    /// Letter and shape.
    pub mark: Option<Mark>,
    /// The state.
    pub air: MoistAir,
}

/// A book figure beside the one here.
#[derive(Debug, Clone, PartialEq)]
pub struct Versus {
    /// Key of the figure that it stands beside.
    pub figure: &'static str,
    /// "Sensible, by 1.08".
    pub title: Sentence,
    /// What the book would have said, with the sign of the figure.
    pub book: Amount,
    /// Relative error of the book, `book / here - 1`.
    pub error: f64,
    /// Signed parts that add up to the error.
    pub parts: Vec<(&'static str, f64)>,
    /// Why, in a sentence.
    pub reason: Sentence,
}
