//! Instruments and their probes, as typed.

use std::collections::BTreeMap;

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

/// An instrument as typed.
#[derive(Debug, Clone, Default, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields)]
pub struct TypedInstrument {
    /// What the team calls it.
    #[serde(default)]
    pub name: String,
    /// Its serial number.
    #[serde(default)]
    pub serial: String,
    /// Anything worth knowing.
    #[serde(default)]
    pub note: String,
    /// Its probes; an instrument that reads one thing has one.
    #[serde(default)]
    pub probes: Vec<TypedProbe>,
}

/// A probe, or the one channel of an instrument without any.
#[derive(Debug, Clone, Default, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields)]
pub struct TypedProbe {
    /// Its identity within the instrument; none for a new one.
    #[serde(default)]
    pub id: Option<String>,
    /// What it is called: "wet bulb".
    #[serde(default)]
    pub name: String,
    /// Its own serial number.
    #[serde(default)]
    pub serial: String,
    /// Identifier of the quantity that it reads, as `temperature`.
    #[serde(default)]
    pub quantity: String,
    /// The unit that its accuracy is stated in.
    #[serde(default)]
    pub unit: String,
    /// When it was calibrated last, as `2026-03-01`.
    #[serde(default)]
    pub calibrated: String,
    /// When it is due, as `2027-03-01`.
    #[serde(default)]
    pub due: String,
    /// Bands of its accuracy statement, the narrowest first.
    #[serde(default)]
    pub bands: Vec<TypedBand>,
    /// The upper end of its range, in its unit.
    #[serde(default)]
    pub range: String,
    /// The step of its display, in its unit.
    #[serde(default)]
    pub resolution: String,
    /// `limits`, `ninety_five` or `one_sigma`; none is limits.
    #[serde(default)]
    pub coverage: String,
    /// Share of the statement that is calibration, in per cent; blank is 80.
    #[serde(default)]
    pub calibration_share: String,
    /// Seconds until it shows a change.
    #[serde(default)]
    pub response: String,
    /// How it reads what it reads: `flow` → `actual` or `standard_1.2`, `wet_bulb` → `measured` or `sea_level`.
    #[serde(default)]
    pub reads: BTreeMap<String, String>,
}

/// One band of an accuracy statement, as printed.
#[derive(Debug, Clone, Default, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields)]
pub struct TypedBand {
    /// Up to this reading; blank in the last one.
    #[serde(default)]
    pub up_to: String,
    /// ± this much, in the probe's unit.
    #[serde(default)]
    pub absolute: String,
    /// ± this many per cent of the reading.
    #[serde(default)]
    pub of_reading: String,
    /// ± this many per cent of the range.
    #[serde(default)]
    pub of_range: String,
    /// ± this many steps of the display.
    #[serde(default)]
    pub counts: String,
    /// The greater of the fixed part and the share of the reading counts, not their sum.
    #[serde(default)]
    pub greater: bool,
}
