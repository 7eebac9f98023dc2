//! An answer as it is stored: everything that came out, in SI, with its sentences still open for the reader's units.
//!
//! The live form and a filed entry are drawn from the same structure, so that an entry looks years later as it did
//! when it was filed, in whatever units are then in use.

use dewledger_checks::doubt::{Doubt, Worked};
use dewledger_checks::form::{Mark, Shape};
use dewledger_checks::{
    Figure, Label, Missing, Note, Offer, Role, StatePoint, Step, Versus, Weight,
};
use dewledger_properties::MoistAir;
use dewledger_quantities::{
    Amount, HumidityRatio, Kind, Pressure, Quantity, Sentence, ThermodynamicTemperature, UnitChoice,
};
use serde::{Deserialize, Serialize};

use crate::drawn::{StoredCurve, StoredLine, StoredStateDoubt, StoredTable};
use crate::reply::{Act, Change};
use crate::requirements::StoredVerdict;

/// A stored answer.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub(crate) struct Answer {
    pub(crate) figures: Vec<StoredFigure>,
    pub(crate) waits: Vec<StoredMissing>,
    pub(crate) notes: Vec<StoredNote>,
    pub(crate) cautions: Vec<(String, String)>,
    pub(crate) steps: Vec<StoredStep>,
    pub(crate) states: Vec<StoredState>,
    pub(crate) versus: Vec<StoredVersus>,
    pub(crate) pressure: Option<Words>,
    /// The pressure that its chart is drawn for.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub(crate) pressure_pa: Option<f64>,
    #[serde(default, skip_serializing_if = "Vec::is_empty")]
    pub(crate) lines: Vec<StoredLine>,
    #[serde(default, skip_serializing_if = "Vec::is_empty")]
    pub(crate) curves: Vec<StoredCurve>,
    #[serde(default, skip_serializing_if = "Vec::is_empty")]
    pub(crate) tables: Vec<StoredTable>,
    /// What was asked of it, and the answers.
    #[serde(default, skip_serializing_if = "Vec::is_empty")]
    pub(crate) verdicts: Vec<StoredVerdict>,
    /// The draws behind its intervals.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub(crate) draws: Option<StoredDraws>,
}

/// What draws were made, so that they can be made again.
#[derive(Debug, Clone, Copy, PartialEq, Serialize, Deserialize)]
pub(crate) struct StoredDraws {
    pub(crate) seed: u64,
    pub(crate) made: usize,
    pub(crate) saturated: f64,
}

/// A stored amount.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub(crate) struct StoredAmount {
    pub(crate) quantity: String,
    pub(crate) si: f64,
}

impl StoredAmount {
    pub(crate) fn of(amount: Amount) -> Self {
        Self { quantity: amount.kind().id().to_owned(), si: amount.si() }
    }

    /// The amount; a quantity that this version does not know is shown as a plain ratio.
    pub(crate) fn amount(&self) -> Amount {
        Amount::new(Kind::from_id(&self.quantity).unwrap_or(Kind::Ratio), self.si)
    }
}

/// A stored sentence.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub(crate) struct Words {
    template: String,
    #[serde(default, skip_serializing_if = "Vec::is_empty")]
    amounts: Vec<StoredAmount>,
    #[serde(default, skip_serializing_if = "Vec::is_empty")]
    words: Vec<String>,
    #[serde(default, skip_serializing_if = "Vec::is_empty")]
    nested: Vec<Words>,
}

impl Words {
    pub(crate) fn of(sentence: &Sentence) -> Self {
        Self {
            template: sentence.template().to_owned(),
            amounts: sentence.amounts().iter().map(|amount| StoredAmount::of(*amount)).collect(),
            words: sentence.words().iter().map(ToString::to_string).collect(),
            nested: sentence.sentences().iter().map(Words::of).collect(),
        }
    }

    fn sentence(&self) -> Sentence {
        let mut sentence = Sentence::new(self.template.clone());
        for amount in &self.amounts {
            sentence = sentence.with(amount.amount());
        }
        for word in &self.words {
            sentence = sentence.word(word.clone());
        }
        for nested in &self.nested {
            sentence = sentence.nested(nested.sentence());
        }
        sentence
    }

    pub(crate) fn say(&self, units: &UnitChoice) -> String {
        self.sentence().say(units)
    }
}

/// A stored result.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub(crate) struct StoredFigure {
    pub(crate) key: String,
    pub(crate) label: String,
    /// Said instead when the air loses; then the magnitude is shown.
    pub(crate) label_lost: Option<String>,
    pub(crate) value: Option<StoredAmount>,
    pub(crate) withheld: Option<Words>,
    pub(crate) condition: Option<Words>,
    pub(crate) role: String,
    pub(crate) group: String,
    pub(crate) half_width_si: Option<f64>,
    /// Low and high end, where an interval stands instead of a half-width.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub(crate) interval_si: Option<(f64, f64)>,
    /// First order does not stand for it.
    #[serde(default, skip_serializing_if = "std::ops::Not::not")]
    pub(crate) wants_draws: bool,
    pub(crate) shares: Vec<(String, f64)>,
    pub(crate) unknown: Vec<String>,
}

/// A stored missing reading.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub(crate) struct StoredMissing {
    pub(crate) key: String,
    pub(crate) name: String,
    pub(crate) asks: Option<Words>,
}

/// A stored note.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub(crate) struct StoredNote {
    pub(crate) code: String,
    pub(crate) weight: String,
    pub(crate) field: Option<String>,
    pub(crate) lead: Words,
    pub(crate) reason: Option<Words>,
    /// Offers belong to the form, not to the record.
    #[serde(skip)]
    pub(crate) acts: Vec<Act>,
}

/// A stored step of the working.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub(crate) struct StoredStep {
    pub(crate) title: String,
    pub(crate) formula: String,
    pub(crate) numbers: Words,
    pub(crate) source: String,
}

/// A stored air state.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub(crate) struct StoredState {
    pub(crate) key: String,
    pub(crate) label: String,
    pub(crate) mark: Option<(String, String)>,
    pub(crate) dry_bulb_k: f64,
    pub(crate) pressure_pa: f64,
    pub(crate) humidity_ratio_kg_kg: f64,
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub(crate) doubt: Option<StoredStateDoubt>,
}

impl StoredState {
    pub(crate) fn air(&self) -> MoistAir {
        MoistAir::unchecked(
            ThermodynamicTemperature::from_si(self.dry_bulb_k),
            HumidityRatio::from_si(self.humidity_ratio_kg_kg),
            Pressure::from_si(self.pressure_pa),
        )
    }
}

/// A stored book figure.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub(crate) struct StoredVersus {
    pub(crate) figure: String,
    pub(crate) title: Words,
    pub(crate) book: StoredAmount,
    pub(crate) error: f64,
    pub(crate) parts: Vec<(String, f64)>,
    pub(crate) reason: Words,
}

/// Letter and outline of a place, as text.
pub(crate) fn mark(mark: Mark) -> (String, String) {
    let shape = match mark.shape {
        Shape::Circle => "circle",
        Shape::Square => "square",
        Shape::Triangle => "triangle",
        Shape::HangingTriangle => "hanging_triangle",
        Shape::Diamond => "diamond",
    };
    (mark.letter.to_string(), shape.to_owned())
}

/// An offer as an act of the form.
pub(crate) fn act(offer: &Offer, units: &UnitChoice) -> Act {
    use dewledger_checks::Change as From;
    let changes = offer
        .changes
        .iter()
        .map(|change| match change {
            From::Choose(key, value) => {
                Change::Choose { key: key.to_string(), value: value.to_string() }
            }
            From::Unit(key, unit) => {
                Change::Unit { key: key.to_string(), unit: (*unit).to_owned() }
            }
            From::Swap(one, other) => {
                Change::Swap { one: one.to_string(), other: other.to_string() }
            }
            From::Move(from, to) => Change::Move { from: from.to_string(), to: to.to_string() },
            From::Clear(key) => Change::Clear { key: key.to_string() },
        })
        .collect();
    Act { label: offer.label.say(units), changes }
}

fn role(role: Role) -> &'static str {
    match role {
        Role::Headline => "headline",
        Role::SensiblePart => "sensible_part",
        Role::LatentPart => "latent_part",
        Role::Minor => "minor",
        Role::Plain => "plain",
        Role::Detail => "detail",
    }
}

fn figure(figure: &Figure, doubt: Option<&Doubt>) -> StoredFigure {
    let (label, label_lost) = match &figure.label {
        Label::Plain(label) => (label.to_string(), None),
        Label::Signed { gained, lost } => ((*gained).to_owned(), Some((*lost).to_owned())),
    };
    StoredFigure {
        key: figure.key.to_string(),
        label,
        label_lost,
        value: figure.amount.map(StoredAmount::of),
        withheld: figure.withheld.as_ref().map(Words::of),
        condition: figure.condition.as_ref().map(Words::of),
        role: role(figure.role).to_owned(),
        group: figure.group.to_owned(),
        half_width_si: doubt.and_then(|doubt| doubt.half_width_si),
        interval_si: doubt
            .and_then(|doubt| doubt.interval)
            .map(|interval| (interval.low_si, interval.high_si)),
        wants_draws: doubt.is_some_and(|doubt| doubt.wants_draws),
        shares: doubt.map(|doubt| doubt.shares.clone()).unwrap_or_default(),
        unknown: doubt.map(|doubt| doubt.unknown.clone()).unwrap_or_default(),
    }
}

fn missing(missing: &Missing) -> StoredMissing {
    StoredMissing {
        key: missing.key.to_string(),
        name: missing.name.to_string(),
        asks: missing.asks.as_ref().map(Words::of),
    }
}

fn note(note: &Note, units: &UnitChoice) -> StoredNote {
    let weight = match note.weight {
        Weight::Unusual => "unusual",
        Weight::Within => "within",
        Weight::Remark => "remark",
    };
    StoredNote {
        code: note.code.to_string(),
        weight: weight.to_owned(),
        field: note.field.as_ref().map(ToString::to_string),
        lead: Words::of(&note.lead),
        reason: note.reason.as_ref().map(Words::of),
        acts: note.offers.iter().map(|offer| act(offer, units)).collect(),
    }
}

fn step(step: &Step) -> StoredStep {
    StoredStep {
        title: step.title.to_string(),
        formula: step.formula.to_owned(),
        numbers: Words::of(&step.numbers),
        source: step.source.to_owned(),
    }
}

fn state(state: &StatePoint, worked: &Worked) -> StoredState {
    StoredState {
        key: state.key.to_string(),
        label: state.label.to_string(),
        mark: state.mark.map(mark),
        dry_bulb_k: state.air.dry_bulb().si(),
        pressure_pa: state.air.pressure().si(),
        humidity_ratio_kg_kg: state.air.humidity_ratio().si(),
        doubt: worked.state_doubts.get(state.key.as_ref()).map(StoredStateDoubt::of),
    }
}

fn versus(versus: &Versus) -> StoredVersus {
    StoredVersus {
        figure: versus.figure.to_owned(),
        title: Words::of(&versus.title),
        book: StoredAmount::of(versus.book),
        error: versus.error,
        parts: versus.parts.iter().map(|(cause, part)| ((*cause).to_owned(), *part)).collect(),
        reason: Words::of(&versus.reason),
    }
}

impl Answer {
    /// What a check answered; offers are put into words in these units.
    pub(crate) fn of(worked: &Worked, units: &UnitChoice) -> Self {
        let outcome = &worked.outcome;
        Self {
            figures: outcome
                .figures
                .iter()
                .map(|f| figure(f, worked.doubts.get(f.key.as_ref())))
                .collect(),
            waits: outcome.waits.iter().map(missing).collect(),
            notes: outcome.notes.iter().map(|n| note(n, units)).collect(),
            cautions: outcome
                .cautions
                .iter()
                .map(|c| (c.title.to_owned(), c.says.to_owned()))
                .collect(),
            steps: outcome.steps.iter().map(step).collect(),
            states: outcome.states.iter().map(|s| state(s, worked)).collect(),
            versus: outcome.versus.iter().map(versus).collect(),
            pressure: outcome.pressure.as_ref().map(Words::of),
            pressure_pa: dewledger_checks::pressure::here(&worked.informed)
                .ok()
                .map(|here| here.pressure.si()),
            lines: outcome.lines.iter().map(StoredLine::of).collect(),
            curves: outcome.curves.iter().filter_map(StoredCurve::of).collect(),
            tables: outcome.tables.iter().map(StoredTable::of).collect(),
            verdicts: Vec::new(),
            draws: None,
        }
    }

    /// The one figure that counts.
    pub(crate) fn headline(&self) -> Option<&StoredFigure> {
        self.figures.iter().find(|figure| figure.role == "headline")
    }
}
