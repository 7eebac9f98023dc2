//! What a reading's ± is made of, takes, verdicts, and probes side by side.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use super::{Message, OptionView, UnitView};
use crate::request::{TypedRequirement, TypedRun, TypedSpot};

/// Beside a reading: what it was read with, where, and how often.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ReadWith {
    /// The probe in use, as `instrument/probe`; none where no instrument is named.
    pub probe: Option<String>,
    /// Its name, or "no instrument named".
    pub label: String,
    /// Probes that can read it; the first option, with an empty value, is none.
    pub probes: Vec<OptionView>,
    /// How it was held, as typed.
    pub spot: TypedSpot,
    /// Ways of holding it.
    pub held: Vec<OptionView>,
    /// The unit of a spread or a ± of the place.
    pub spread_unit: UnitView,
    /// Usual figures for the place, common practice: one tap each, never applied unasked.
    pub usual: Vec<UsualSpot>,
    /// What the ± is made of, with half-widths: calibration, the reading itself, its place, scatter.
    pub parts: Vec<PartView>,
    /// "13.4 °C as read, 13.2 °C after the side-by-side run".
    pub corrected: Option<String>,
    /// Takes.
    pub takes: TakesView,
}

/// A usual figure for what a place adds.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct UsualSpot {
    /// "Duct, ± 0.3 K, common practice".
    pub label: String,
    /// What it would type.
    pub spot: TypedSpot,
}

/// One part of a reading's ±.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct PartView {
    /// "Calibration, shared with other readings of this probe".
    pub label: String,
    /// "± 0.18 K".
    pub text: String,
}

/// The takes of a reading.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct TakesView {
    /// In the order they were made.
    pub rows: Vec<TakeRow>,
    /// "13.20", what stands in the field; none without takes.
    pub mean: Option<String>,
    /// "Mean of 4 takes in 60 s: 13.20 °C, scatter 0.08 K"; none without takes.
    pub says: Option<String>,
    /// `steady`, `drifting`, `hunting` or `not_judged`; none without takes.
    pub steadiness: Option<String>,
    /// "Steady", "Drifting", "Hunting", "Not judged".
    pub word: Option<String>,
    /// Readings whose time this one can be brought to (A-B-A); the first option, with an empty value, is none.
    pub at_time_of: Vec<OptionView>,
    /// The one chosen.
    pub at_time_of_value: String,
}

/// One take.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct TakeRow {
    /// As typed.
    pub text: String,
    /// "14:05:20".
    pub at: String,
    /// What is wrong with it.
    pub error: Option<String>,
}

/// What is asked of a check's results, and the answers.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct RequirementsView {
    /// Results that something can be asked of.
    pub figures: Vec<RequirableView>,
    /// Directions, in the order of the sheet.
    pub directions: Vec<OptionView>,
    /// One for each requirement typed, in the same order.
    pub verdicts: Vec<VerdictView>,
    /// Requirements that this equipment was held to before: one tap takes one over.
    pub before: Vec<BeforeView>,
    /// Readings that the conditions of a rating can name.
    pub conditions: Vec<ConditionView>,
}

/// A result that something can be asked of.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct RequirableView {
    /// Its key.
    pub figure: String,
    /// "Heat removed, total".
    pub label: String,
    /// The unit chosen for it.
    pub unit: UnitView,
    /// All units of its quantity.
    pub units: Vec<UnitView>,
    /// The unit of a tolerance: its difference's.
    pub width_unit: UnitView,
}

/// A requirement that was typed on an earlier entry of this equipment.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct BeforeView {
    /// "Total at least 48 kW (schedule M-601), asked on 3 November".
    pub says: String,
    /// What it types.
    pub requirement: TypedRequirement,
}

/// A reading that the conditions of a rating can name.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ConditionView {
    /// Its key.
    pub key: String,
    /// "Entering air, dry bulb".
    pub label: String,
    /// The unit chosen for it.
    pub unit: UnitView,
    /// All units of its quantity.
    pub units: Vec<UnitView>,
}

/// One requirement and its answer.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct VerdictView {
    /// Which one of those typed.
    pub index: usize,
    /// `meets`, `falls_short`, `goes_over`, `cannot_be_told`, or none where it cannot be held against it yet.
    pub answer: Option<String>,
    /// "Meets", "Falls short", "Goes over", "Cannot be told".
    pub word: Option<String>,
    /// "Total at least 48.0 kW, by schedule M-601".
    pub asked: String,
    /// "50.2 ± 2.8 kW is above it by 2.2 kW; 2.4 kW would be needed."
    pub says: Option<String>,
    /// "94 % likely to be met".
    pub chance: Option<String>,
    /// What would decide, where it cannot be told: one sentence each.
    pub decides: Vec<String>,
    /// A share of the design figure, or why none is given.
    pub share: Option<String>,
    /// Why there is no answer: the ± is not known, draws are still running, the conditions differ.
    pub why_not: Option<Message>,
    /// What is wrong with the requirement as typed: `value`, `other`, `risk`, `conditions.entering.dry_bulb`.
    pub errors: Vec<super::FieldError>,
}

/// A run of probes side by side, worked out.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct RunView {
    /// Which one of the visit's.
    pub index: Option<usize>,
    /// As typed.
    pub typed: TypedRun,
    /// "Temperature, at the start, 14:05".
    pub title: String,
    /// One for each probe that can read the quantity.
    pub rows: Vec<RunRow>,
    /// Quantities that two or more probes can read.
    pub quantities: Vec<OptionView>,
    /// What it comes to, or what is missing.
    pub says: String,
}

/// One probe in a run.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct RunRow {
    /// The probe.
    pub probe: String,
    /// Its name.
    pub label: String,
    /// As typed.
    pub text: String,
    /// The unit it is typed in.
    pub unit: UnitView,
    /// "0.3 K above" what it is held against; none while it is not read.
    pub offset: Option<String>,
    /// Further apart than both accuracies allow: it wants calibration.
    pub too_far: bool,
    /// What is wrong with the text.
    pub error: Option<String>,
}
