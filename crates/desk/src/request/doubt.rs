//! What is said of a reading beside its number, and what is asked of a result.

use std::collections::BTreeMap;

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use super::TypedValue;

/// How a probe was held.
#[derive(Debug, Clone, Default, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields)]
pub struct TypedSpot {
    /// `point`, `grid` or `averaging`.
    pub held: String,
    /// How many points a grid has.
    #[serde(default)]
    pub points: String,
    /// Standard deviation of the points of a grid; blank is not known.
    #[serde(default)]
    pub spread: TypedValue,
    /// What the place adds by itself (95 %); blank is not known.
    #[serde(default)]
    pub plus_minus: TypedValue,
}

/// One take of a reading.
#[derive(Debug, Clone, Default, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields)]
pub struct TypedTake {
    /// The text, in the unit of the reading unless it carries one.
    pub text: String,
    /// When, as `2026-12-01T14:05:20Z`; blank is now.
    #[serde(default)]
    pub at: String,
}

/// What is asked of a result.
#[derive(Debug, Clone, Default, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields)]
pub struct TypedRequirement {
    /// Key of the result.
    pub figure: String,
    /// `at_least`, `at_most`, `between` or `within` (a nominal figure and a tolerance).
    pub direction: String,
    /// The limit, the lower one of two, or the nominal figure.
    pub value: TypedValue,
    /// The upper limit, or the tolerance.
    #[serde(default)]
    pub other: TypedValue,
    /// Where it comes from: drawing, schedule, specification.
    #[serde(default)]
    pub source: String,
    /// Accepted risk of a wrong "meets", in per cent; blank is 5.
    #[serde(default)]
    pub risk: String,
    /// The ± of the requirement itself, where a maker states one; then it is only said whether the two disagree.
    #[serde(default)]
    pub plus_minus: TypedValue,
    /// What the readings would have to be for it to hold, by key: the conditions of a rating. Empty: it holds as read.
    #[serde(default, skip_serializing_if = "BTreeMap::is_empty")]
    pub conditions: BTreeMap<String, TypedValue>,
}

/// Several probes held in the same air.
#[derive(Debug, Clone, Default, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields)]
pub struct TypedRun {
    /// Identifier of the quantity, as `temperature`.
    pub quantity: String,
    /// `start` or `end` of the visit.
    pub when: String,
    /// The probe that the others are held against; none is the mean of all.
    #[serde(default)]
    pub against: Option<String>,
    /// Readings of this visit are corrected by what was found.
    #[serde(default)]
    pub apply: bool,
    /// What each probe showed.
    #[serde(default)]
    pub rows: Vec<TypedRunRow>,
}

/// What one probe showed.
#[derive(Debug, Clone, Default, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields)]
pub struct TypedRunRow {
    /// The probe, as `instrument/probe`.
    pub probe: String,
    /// What it showed.
    pub value: TypedValue,
}
