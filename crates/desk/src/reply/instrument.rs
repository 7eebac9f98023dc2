//! The register of instruments.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use super::{OptionView, UnitView};
use crate::request::TypedInstrument;

/// The register.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct InstrumentsView {
    /// By name.
    pub instruments: Vec<InstrumentRow>,
    /// Starting entries by class, their figures common practice: the instrument's own paper overrides them.
    pub classes: Vec<OptionView>,
    /// A sentence above the classes.
    pub says: String,
}

/// One instrument in a list.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct InstrumentRow {
    /// Its identity.
    pub instrument: String,
    /// Its name.
    pub name: String,
    /// Serial and probes, in a line.
    pub says: String,
    /// "calibration due 3 March", "overdue since …"; none when no date is known.
    pub due: Option<String>,
    /// A calibration is overdue.
    pub overdue: bool,
    /// Taken out of use.
    pub withdrawn: bool,
    /// Invented example data.
    pub invented: bool,
}

/// An instrument as a form, with what its statement comes to.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct InstrumentForm {
    /// The instrument; none for a new one.
    pub instrument: Option<String>,
    /// As it stands.
    pub typed: TypedInstrument,
    /// One for each probe.
    pub probes: Vec<ProbeForm>,
    /// What is wrong, with the place: `name`, `probes.0.bands.1.absolute`.
    pub errors: Vec<FieldError>,
    /// Taken out of use.
    pub withdrawn: bool,
    /// The quantities that a probe can read.
    pub quantities: Vec<OptionView>,
    /// What the width of a statement can mean.
    pub coverages: Vec<OptionView>,
}

/// What surrounds one probe's fields.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ProbeForm {
    /// Units of its quantity.
    pub units: Vec<UnitView>,
    /// What the ± of its statement is typed in: "°C".
    pub unit: String,
    /// Ways of reading that matter for its quantity: key, label, options.
    pub reads: Vec<super::ChoiceView>,
    /// "± 0.2 °C at 20 °C (95 %), of which ± 0.18 °C is calibration".
    pub comes_to: Option<String>,
}

/// Something wrong with a field that is no reading.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct FieldError {
    /// Its place.
    pub field: String,
    /// What is wrong and what mends it.
    pub says: String,
}
