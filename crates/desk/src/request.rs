//! What the screens, the terminal and scripts may ask. One request type; its JSON Schema stands in `docs/desk.schema.json`.

mod chart;
mod doubt;
mod instrument;

use std::collections::BTreeMap;

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

pub use chart::{ChartGesture, ChartLook, ChartOf, ChartPlace, ChartPoint, ChartWindow};
pub use doubt::{TypedRequirement, TypedRun, TypedRunRow, TypedSpot, TypedTake};
pub use instrument::{TypedBand, TypedInstrument, TypedProbe};

/// One request. Its kind is the member `ask`.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(tag = "ask", rename_all = "snake_case", deny_unknown_fields)]
pub enum Request {
    /// The first screen: drafts, sites and the newest entries.
    Overview {},
    /// The checks there are.
    Checks {},
    /// Works a check out from what is typed so far. Stores nothing.
    Solve {
        /// Identifier of the check, as `air_heat`.
        check: String,
        /// What is typed so far.
        typed: Typed,
        /// Where the check is made; for last visit's figures beside the fields.
        #[serde(default)]
        place: Place,
    },
    /// Works a check out with draws where first order does not stand. Takes up to a second; a newer `solve` or `draw`
    /// ends it, and the reply is then `overtaken`.
    Draw {
        /// Identifier of the check.
        check: String,
        /// What is typed so far.
        typed: Typed,
        /// Where the check is made.
        #[serde(default)]
        place: Place,
    },
    /// The psychrometric chart of a form or an entry, as it is looked at, and what is read at its cross. Stores nothing.
    Chart {
        /// Whose chart.
        of: ChartOf,
        /// How it is looked at.
        look: ChartLook,
    },
    /// Opens a new form, with what the place already knows (pressure here). Stores nothing until a draft is kept.
    Start {
        /// Identifier of the check.
        check: String,
        /// Where it is made; may be empty and chosen when filing.
        #[serde(default)]
        place: Place,
    },
    /// Keeps what is typed so far on the disk.
    KeepDraft {
        /// The draft to keep over; none for a new one.
        #[serde(default)]
        draft: Option<String>,
        /// Identifier of the check.
        check: String,
        /// What is typed so far.
        typed: Typed,
        /// Where the check is made.
        #[serde(default)]
        place: Place,
        /// The entry that this draft corrects.
        #[serde(default)]
        corrects: Option<String>,
    },
    /// Opens a kept draft.
    OpenDraft {
        /// The draft.
        draft: String,
    },
    /// Sets a draft aside. It can be brought back for a while.
    DiscardDraft {
        /// The draft.
        draft: String,
    },
    /// Brings a discarded draft back.
    RestoreDraft {
        /// The draft.
        draft: String,
    },
    /// Files the check in the ledger. The reply comes after the commit returned.
    File {
        /// The draft that this was, removed in the same transaction.
        #[serde(default)]
        draft: Option<String>,
        /// Identifier of the check.
        check: String,
        /// What was typed.
        typed: Typed,
        /// Where; a site is wanted.
        place: Place,
        /// The entry that this corrects: a new revision of it.
        #[serde(default)]
        corrects: Option<String>,
    },
    /// Opens a filed entry's readings as a form, to correct it.
    Correct {
        /// The entry.
        entry: String,
    },
    /// Withdraws an entry: a revision that says so; nothing is erased.
    WithdrawEntry {
        /// The entry.
        entry: String,
    },
    /// Brings a withdrawn entry back.
    RestoreEntry {
        /// The entry.
        entry: String,
    },
    /// All sites.
    Sites {},
    /// One site: its equipment, visits and entries.
    Site {
        /// The site.
        site: String,
    },
    /// Adds a site, or revises one.
    SaveSite {
        /// The site to revise; none to add.
        #[serde(default)]
        site: Option<String>,
        /// Name of the site.
        name: String,
        /// Elevation as typed; blank is not known.
        elevation: TypedValue,
        /// Anything worth knowing.
        #[serde(default)]
        note: String,
    },
    /// One piece of equipment and its entries.
    Equipment {
        /// The equipment.
        equipment: String,
    },
    /// Adds equipment to a site, or revises it.
    SaveEquipment {
        /// The equipment to revise; none to add.
        #[serde(default)]
        equipment: Option<String>,
        /// Its site.
        site: String,
        /// Its tag, as on the drawing.
        tag: String,
        /// What it is, as air handler.
        class: String,
        /// Anything worth knowing.
        #[serde(default)]
        note: String,
    },
    /// One visit and its entries.
    Visit {
        /// The visit.
        visit: String,
    },
    /// Starts a visit, or revises one.
    SaveVisit {
        /// The visit to revise; none to start one now.
        #[serde(default)]
        visit: Option<String>,
        /// Its site.
        site: String,
        /// Who is there.
        #[serde(default)]
        people: String,
        /// How the equipment was running: valve, damper, fan, stages.
        #[serde(default)]
        running: String,
        /// Pressure here and outdoor air, as a form (see the reply's sections).
        typed: Typed,
    },
    /// The form of a visit, blank or as it stands.
    VisitForm {
        /// The visit to revise; none for a new one.
        #[serde(default)]
        visit: Option<String>,
        /// Its site.
        site: String,
        /// What is typed so far; none for the form as it stands.
        #[serde(default)]
        typed: Option<Typed>,
    },
    /// The register of instruments.
    Instruments {},
    /// An instrument as a form: as it stands, a new one of a class, or what is typed so far. Stores nothing.
    InstrumentForm {
        /// The instrument; none for a new one.
        #[serde(default)]
        instrument: Option<String>,
        /// The class that a new one starts from.
        #[serde(default)]
        class: Option<String>,
        /// What is typed so far.
        #[serde(default)]
        typed: Option<TypedInstrument>,
    },
    /// Adds an instrument, or revises it. What was filed with it keeps the accuracy of its day.
    SaveInstrument {
        /// The instrument to revise; none to add.
        #[serde(default)]
        instrument: Option<String>,
        /// As typed.
        typed: TypedInstrument,
    },
    /// Takes an instrument out of use, or brings it back.
    WithdrawInstrument {
        /// The instrument.
        instrument: String,
        /// Out of use.
        withdrawn: bool,
    },
    /// Probes side by side: one of the visit's runs, a new one, or what is typed so far. Stores nothing.
    RunForm {
        /// The visit.
        visit: String,
        /// Which of its runs; none for a new one.
        #[serde(default)]
        index: Option<usize>,
        /// What is typed so far.
        #[serde(default)]
        typed: Option<TypedRun>,
    },
    /// Keeps a run of probes side by side with its visit.
    SaveRun {
        /// The visit.
        visit: String,
        /// Which of its runs to replace; none to add one.
        #[serde(default)]
        index: Option<usize>,
        /// As typed.
        typed: TypedRun,
    },
    /// One filed entry, as it was filed.
    Entry {
        /// The entry.
        entry: String,
    },
    /// Adds the invented demo site with two visits.
    AddDemo {},
    /// The units in use and those that can be chosen.
    Units {},
    /// Chooses the unit of one quantity.
    ChooseUnit {
        /// Identifier of the quantity, as `temperature`.
        quantity: String,
        /// Identifier of the unit, as `degF`.
        unit: String,
    },
    /// Chooses the units of all quantities at once.
    ChoosePreset {
        /// `ip` or `si`.
        preset: Preset,
    },
    /// The appearance in use.
    Appearance {},
    /// Chooses the appearance.
    ChooseAppearance {
        /// The theme.
        theme: Theme,
    },
    /// Where the ledger is, the versions, the limits of the app.
    About {},
}

/// Where a check is made.
#[derive(Debug, Clone, Default, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields)]
pub struct Place {
    /// The site.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub site: Option<String>,
    /// The equipment at that site.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub equipment: Option<String>,
    /// The visit.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub visit: Option<String>,
}

/// A form as typed.
#[derive(Debug, Clone, Default, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields)]
pub struct Typed {
    /// Choices made, by key: `flow.basis` → `actual_entering`.
    #[serde(default)]
    pub choices: BTreeMap<String, String>,
    /// Readings by key: `entering.dry_bulb` → text and unit. A blank or missing one is not read.
    #[serde(default)]
    pub readings: BTreeMap<String, TypedReading>,
    /// Codes of unusual notes that the person has said to be right.
    #[serde(default)]
    pub accepted: Vec<String>,
    /// What is asked of its results.
    #[serde(default, skip_serializing_if = "Vec::is_empty")]
    pub requirements: Vec<TypedRequirement>,
}

/// One reading as typed.
#[derive(Debug, Clone, Default, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields)]
pub struct TypedReading {
    /// The text, exactly as typed; it may carry a unit of its own.
    pub text: String,
    /// The unit beside it; none means the unit chosen for its quantity.
    #[serde(default)]
    pub unit: Option<String>,
    /// Its ± (95 %), as typed; none or blank is not known.
    #[serde(default)]
    pub plus_minus: Option<TypedValue>,
    /// The probe that it was read with, as `instrument/probe`; none is the one used last for it, an empty text none at all.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub probe: Option<String>,
    /// How the probe was held; none is not said.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub spot: Option<TypedSpot>,
    /// Its takes; with any, their mean is the reading, whatever `text` says.
    #[serde(default, skip_serializing_if = "Vec::is_empty")]
    pub takes: Vec<TypedTake>,
    /// Key of the reading to whose time this one is brought, from takes before and after it (A-B-A).
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub at_time_of: Option<String>,
}

/// A number with its unit, as typed.
#[derive(Debug, Clone, Default, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields)]
pub struct TypedValue {
    /// The text, exactly as typed.
    pub text: String,
    /// The unit beside it; none means the unit chosen for its quantity.
    #[serde(default)]
    pub unit: Option<String>,
}

/// A set of units chosen at once.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "snake_case")]
pub enum Preset {
    /// Inch-pound units.
    Ip,
    /// SI units.
    Si,
}

/// How the screens look.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "snake_case")]
pub enum Theme {
    /// As the system says.
    System,
    /// Paper: for outdoors and in doubt.
    Light,
    /// Slate: for the dark.
    Dark,
    /// Black on white, thick lines.
    Contrast,
}
