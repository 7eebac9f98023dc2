//! What the desk answers: finished text beside every SI value, so that a screen computes nothing.

mod chart;
mod doubt;
mod instrument;

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

pub use chart::{CellView, ChartView, CrossView, CurveView, ShapeView, TableView};
pub use doubt::{
    BeforeView, ConditionView, PartView, ReadWith, RequirableView, RequirementsView, RunRow,
    RunView, TakeRow, TakesView, UsualSpot, VerdictView,
};
pub use instrument::{FieldError, InstrumentForm, InstrumentRow, InstrumentsView, ProbeForm};

use crate::request::{Place, Preset, Theme, Typed};

/// One reply. Its kind is the member `reply`.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(tag = "reply", rename_all = "snake_case")]
pub enum Reply {
    /// To `overview`, `add_demo`.
    Overview(Overview),
    /// To `checks`.
    Checks {
        /// In the order of the screen.
        checks: Vec<CheckName>,
    },
    /// To `solve`.
    Solved(Box<Solved>),
    /// To `chart`.
    Chart(Box<ChartView>),
    /// To `start`, `open_draft`, `restore_draft`, `correct`.
    Form(Box<FormOpened>),
    /// To `keep_draft`.
    DraftKept {
        /// The draft's identity from now on.
        draft: String,
        /// When, as `14:07`.
        at: String,
    },
    /// To `discard_draft`, `withdraw_entry`, `restore_entry`.
    Done {
        /// What happened, in words.
        says: String,
    },
    /// To `file`; the commit has returned.
    Filed(Filed),
    /// To `sites`.
    Sites {
        /// By name.
        sites: Vec<SiteRow>,
    },
    /// To `site`, `save_site`.
    Site(SiteView),
    /// To `equipment`, `save_equipment`.
    Equipment(EquipmentView),
    /// To `visit`, `save_visit`.
    Visit(VisitView),
    /// To `visit_form`.
    VisitForm(VisitFormView),
    /// To `entry`.
    Entry(Box<EntryView>),
    /// To `units`, `choose_unit`, `choose_preset`.
    Units(UnitsView),
    /// To `appearance`, `choose_appearance`.
    Appearance {
        /// The theme in use.
        theme: Theme,
    },
    /// To `draw`, when a newer request ended it.
    Overtaken {},
    /// To `instruments`, `withdraw_instrument`.
    Instruments(InstrumentsView),
    /// To `instrument_form`.
    InstrumentForm(Box<InstrumentForm>),
    /// To `save_instrument`.
    InstrumentSaved {
        /// The instrument.
        instrument: String,
        /// What happened, in words.
        says: String,
    },
    /// To `run_form`.
    Run(Box<RunView>),
    /// To `about`.
    About(About),
}

/// Why there is no reply: branch on `code`, mark `field`, show `message`.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct Fault {
    /// What it is, for programs.
    pub code: FaultCode,
    /// The key of the field it concerns.
    pub field: Option<String>,
    /// What to show a person.
    pub message: String,
}

/// The faults that a screen or a script tells apart.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "snake_case")]
pub enum FaultCode {
    /// The request cannot be read.
    BadRequest,
    /// What it names does not exist (check, unit, entry, site).
    NotFound,
    /// A field must be mended first; see `field`.
    Field,
    /// The check has no results yet and cannot be filed.
    NotSolved,
    /// The ledger is newer than this app, foreign, or damaged; nothing was written.
    LedgerRefused,
    /// The disk refused; nothing was filed and the form is kept.
    NotStored,
}

/// The first screen.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct Overview {
    /// Nothing is in the ledger yet: offer the demo site.
    pub empty: bool,
    /// What happened when the ledger was opened, when a person should know: set aside as damaged, migrated.
    pub ledger_note: Option<String>,
    /// Unfinished forms, newest first.
    pub drafts: Vec<DraftRow>,
    /// The site visited last, with its open visit: where a check started now would belong.
    pub here: Option<Here>,
    /// Newest entries.
    pub entries: Vec<EntryRow>,
    /// Sites by last visit.
    pub sites: Vec<SiteRow>,
}

/// The site and visit that a person is probably at.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct Here {
    /// Where.
    pub place: Place,
    /// The site's name.
    pub site: String,
    /// One line: visit, pressure.
    pub says: String,
    /// Invented example data.
    pub invented: bool,
}

/// A check in a list.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct CheckName {
    /// Identifier, as `air_heat`.
    pub id: String,
    /// Label, as "Heat moved by the air".
    pub label: String,
    /// What a person wants to know.
    pub question: String,
    /// What it takes, in a line: "two air states, a flow".
    pub takes: String,
    /// Air, water or whole equipment.
    pub group: String,
}

/// An unfinished form.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct DraftRow {
    /// Its identity.
    pub draft: String,
    /// The check's label.
    pub label: String,
    /// Where and when: "AH-2, Haldry Fork School, 14:05".
    pub says: String,
}

/// A form with its texts, ready to type in.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct FormOpened {
    /// The draft behind it, when one is kept.
    pub draft: Option<String>,
    /// The entry that it corrects.
    pub corrects: Option<String>,
    /// Where it is made.
    pub place: Place,
    /// What is typed.
    pub typed: Typed,
    /// The form worked out.
    pub solved: Solved,
}

/// How far a check has come.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "snake_case")]
pub enum Stage {
    /// Readings are missing; some results may stand already.
    Waiting,
    /// A reading is impossible: no results.
    Refused,
    /// All results stand.
    Solved,
}

/// A check worked out.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct Solved {
    /// Which check.
    pub check: CheckName,
    /// One line under the title: equipment, site, pressure here and where it is from.
    pub subtitle: String,
    /// Invented example data.
    pub invented: bool,
    /// The form, in order.
    pub sections: Vec<SectionView>,
    /// How far it has come.
    pub stage: Stage,
    /// "waits for air flow", when something is missing.
    pub waits: Option<String>,
    /// The one figure that counts.
    pub headline: Headline,
    /// Further results.
    pub groups: Vec<ResultGroup>,
    /// What the book constants would have said.
    pub versus: Vec<Versus>,
    /// What decides the headline's ±.
    pub drivers: Drivers,
    /// Remarks on single readings and on the whole, in order of weight.
    pub notes: Vec<NoteView>,
    /// Safety, always visible.
    pub cautions: Vec<CautionView>,
    /// Formula with numbers put in.
    pub working: Vec<StepView>,
    /// The air states as a table, the equal of the chart; with any, there is a chart to ask for.
    pub states: Vec<StateView>,
    /// Results over a range.
    pub curves: Vec<CurveView>,
    /// Tables that are results in themselves.
    pub tables: Vec<TableView>,
    /// What is asked of the results, and the answers.
    pub requirements: RequirementsView,
    /// Some ± waits for draws: ask `draw` when typing rests.
    pub wants_draws: bool,
}

/// One part of a form.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct SectionView {
    /// Key, the prefix of its fields: `entering`.
    pub key: String,
    /// "Entering air".
    pub title: String,
    /// A word at the right of the title: "before the coil".
    pub aside: Option<String>,
    /// Letter and shape of its place.
    pub mark: Option<MarkView>,
    /// Folded at first, since its fields have been answered for (pressure of the visit) or are seldom wanted; `summary` says what stands.
    pub folded: bool,
    /// One line that stands for the folded section: "83.43 kPa, standard atmosphere at 1609 m".
    pub summary: Option<String>,
    /// Its fields.
    pub fields: Vec<FieldView>,
    /// What its readings come to: "W 10.4 g/kg, h 53.3 kJ/kg".
    pub readout: Option<String>,
    /// Acts of the section: add a stream, remove this one.
    pub acts: Vec<Act>,
}

/// Letter and shape of a place, the same on chart, form and report.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct MarkView {
    /// One capital letter.
    pub letter: String,
    /// `circle`, `square`, `triangle`, `hanging_triangle`, `diamond`.
    pub shape: String,
}

/// A field of a form.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(tag = "field", rename_all = "snake_case")]
pub enum FieldView {
    /// A number to type.
    Reading(Box<ReadingView>),
    /// One of several to choose.
    Choice(ChoiceView),
}

/// A number to type.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ReadingView {
    /// Its key: `entering.dry_bulb`.
    pub key: String,
    /// "Dry bulb".
    pub label: String,
    /// When the property itself can be chosen: the choice drawn in place of the label.
    pub pick: Option<ChoiceView>,
    /// For screen readers: "Entering air, dry bulb, in degrees Celsius".
    pub name: String,
    /// The text as typed.
    pub text: String,
    /// The unit it is typed in.
    pub unit: UnitView,
    /// All units of its quantity.
    pub units: Vec<UnitView>,
    /// Can go below zero: draw the sign key.
    pub signed: bool,
    /// Must be read for the headline.
    pub required: bool,
    /// A line of help under the label.
    pub help: Option<String>,
    /// What is used when it stays blank, a constant of the method: "14.0 °C, assumed".
    pub assumed: Option<String>,
    /// "read as 17.1", when a comma was typed or a unit was typed with the number.
    pub read_as: Option<String>,
    /// Last visit's reading at the same place, for a pull button.
    pub was: Option<WasView>,
    /// Its ±: "± 0.3 K" or "± not known".
    pub plus_minus: String,
    /// The ± as typed.
    pub plus_minus_text: String,
    /// The unit of the ± as typed.
    pub plus_minus_unit: UnitView,
    /// The units that a ± can be typed in.
    pub plus_minus_units: Vec<UnitView>,
    /// What is wrong with it, when it is wrong by itself or refused by the check.
    pub error: Option<Message>,
    /// An unusual note stands on it.
    pub unusual: bool,
    /// What it was read with, where, and how often; none for definitions and settings.
    pub with: Option<Box<ReadWith>>,
}

/// A sentence with what could be done about it.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct Message {
    /// What is wrong and what mends it.
    pub says: String,
    /// One tap each.
    pub acts: Vec<Act>,
}

/// Last visit's reading.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct WasView {
    /// As typed then.
    pub text: String,
    /// Its unit.
    pub unit: UnitView,
    /// When: "3 May".
    pub when: String,
}

/// One of several to choose.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ChoiceView {
    /// Its key: `flow.basis`.
    pub key: String,
    /// "Flow is".
    pub label: String,
    /// The value chosen or standing by default; none must be chosen.
    pub value: Option<String>,
    /// In the order of the sheet.
    pub options: Vec<OptionView>,
    /// A line of help.
    pub help: Option<String>,
    /// What is wrong with it.
    pub error: Option<Message>,
}

/// One option.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct OptionView {
    /// Identifier.
    pub value: String,
    /// Label.
    pub label: String,
    /// A line of help.
    pub help: Option<String>,
}

/// A unit.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct UnitView {
    /// Identifier, as `degC`.
    pub id: String,
    /// Symbol, as "°C".
    pub symbol: String,
    /// Name read aloud, as "degrees Celsius".
    pub name: String,
}

/// One tap that changes what is typed.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct Act {
    /// "Swap the two".
    pub label: String,
    /// Applied in order to what is typed.
    pub changes: Vec<Change>,
}

/// A change of what is typed.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(tag = "change", rename_all = "snake_case")]
pub enum Change {
    /// Chooses a value.
    Choose {
        /// Key of the choice.
        key: String,
        /// Its value.
        value: String,
    },
    /// Sets a reading's text and unit.
    Type {
        /// Key of the reading.
        key: String,
        /// The text.
        text: String,
        /// The unit.
        unit: String,
    },
    /// Says that the number typed is in this unit.
    Unit {
        /// Key of the reading.
        key: String,
        /// The unit.
        unit: String,
    },
    /// Exchanges two readings, texts with their units and ±.
    Swap {
        /// Key of one.
        one: String,
        /// Key of the other.
        other: String,
    },
    /// Moves a reading to another key (it was a dew point, not a wet bulb).
    Move {
        /// From this key.
        from: String,
        /// To this key.
        to: String,
    },
    /// Clears a reading.
    Clear {
        /// Key of the reading.
        key: String,
    },
    /// Says that an unusual reading is right.
    Accept {
        /// Code of the note.
        code: String,
    },
}

/// A value as shown, with its SI value beside.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ValueView {
    /// "41.3", with a true minus and no-break spaces.
    pub number: String,
    /// "kW"; empty for plain ratios.
    pub unit: String,
    /// The value in SI.
    pub si: f64,
    /// Unit of `si`, as a suffix of keys: `w`, `k`, `kg_kg`.
    pub si_unit: String,
}

/// A ± as shown.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct PlusMinusView {
    /// "± 3.1" in the unit of its value, or "± not known".
    pub text: String,
    /// The 95 % half-width in SI; none when not known, and where an interval stands instead.
    pub si: Option<f64>,
    /// "31.2 to 47.9, lopsided": stands instead of a ± that would mislead.
    pub interval: Option<String>,
    /// Draws are wanted before it can be said: ask `draw`.
    pub pending: bool,
    /// The readings whose ± is missing.
    pub missing: Option<String>,
}

/// The one figure that counts.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct Headline {
    /// "Heat removed, total".
    pub says: String,
    /// Key of the figure; empty while there is none.
    pub key: String,
    /// The figure; none is drawn as a dash.
    pub value: Option<ValueView>,
    /// Its ±.
    pub plus_minus: Option<PlusMinusView>,
    /// A second figure in small: "11.7 refrigeration tons".
    pub also: Option<String>,
    /// Why it is withheld or waits.
    pub why_not: Option<String>,
    /// Sensible and latent as parts of a bar, when they have one sign.
    pub split: Vec<SplitView>,
    /// The small line under the bar: sensible, latent, SHR.
    pub minor: Vec<MinorView>,
}

/// One part of a split bar.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct SplitView {
    /// "sensible".
    pub label: String,
    /// Its part of the whole, 0 to 1.
    pub share: f64,
    /// Drawn dotted: it is about water.
    pub moist: bool,
}

/// A small figure under the headline.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct MinorView {
    /// "sensible".
    pub label: String,
    /// Its value, or a dash.
    pub text: String,
}

/// A group of results.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ResultGroup {
    /// "Results".
    pub title: String,
    /// At the right of the title: "± holds 95 times in 100".
    pub aside: Option<String>,
    /// Folded at first.
    pub folded: bool,
    /// The rows.
    pub rows: Vec<ResultRow>,
}

/// One result.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ResultRow {
    /// Key, as `total_w` without its unit: `total`.
    pub key: String,
    /// "Total".
    pub label: String,
    /// A line below the label: "if the drain carries all of it".
    pub condition: Option<String>,
    /// The value; none when withheld.
    pub value: Option<ValueView>,
    /// Its ±; none where a ± makes no sense.
    pub plus_minus: Option<PlusMinusView>,
    /// Why it is withheld.
    pub withheld: Option<String>,
    /// Drawn bold, double-ruled.
    pub strong: bool,
}

/// A book figure beside the measured one.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct Versus {
    /// "Book constants would say".
    pub title: String,
    /// "Same readings with 1.08, made for sea level …"
    pub reason: String,
    /// The book's figure, struck through.
    pub book: ValueView,
    /// "8.2 kW too high, 20 %".
    pub gap: String,
    /// Whether it matters against the ±; none without a ±.
    pub verdict: Option<String>,
    /// What makes the gap: signed parts that add up to it.
    pub parts: Vec<VersusPart>,
}

/// One part of a gap.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct VersusPart {
    /// "pressure".
    pub label: String,
    /// "+21.6 %".
    pub text: String,
    /// Signed, in shares of the figure here.
    pub share: f64,
}

/// What decides a ±.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct Drivers {
    /// "share of the total's ±".
    pub aside: String,
    /// By source, largest first; adds up to 1.
    pub rows: Vec<DriverView>,
    /// One sentence: what a better reading would buy, or why there is no ±.
    pub says: Option<String>,
}

/// One source of doubt.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct DriverView {
    /// "Entering wet bulb".
    pub label: String,
    /// 0 to 1.
    pub share: f64,
    /// "46 %".
    pub text: String,
}

/// The weight of a note.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize, Deserialize, JsonSchema)]
#[serde(rename_all = "snake_case")]
pub enum Tone {
    /// Cannot be: no results.
    Impossible,
    /// Computed, but looks wrong; can be accepted.
    Unusual,
    /// Accepted within its ±.
    Within,
    /// Worth knowing.
    Remark,
}

/// A note.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct NoteView {
    /// What it is, for `accept` and for programs.
    pub code: String,
    /// Its weight.
    pub tone: Tone,
    /// The field it stands on.
    pub field: Option<String>,
    /// The lead sentence.
    pub lead: String,
    /// The reason.
    pub reason: Option<String>,
    /// At most three acts.
    pub acts: Vec<Act>,
    /// The person has said that it is right.
    pub accepted: bool,
}

/// A caution.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct CautionView {
    /// "Rotating parts".
    pub title: String,
    /// The text.
    pub says: String,
}

/// One step of the working.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct StepView {
    /// What it gives: "Dry-air mass flow".
    pub title: String,
    /// The formula in symbols.
    pub formula: String,
    /// The formula with the numbers put in, and the result.
    pub numbers: String,
    /// Convention and source.
    pub source: String,
}

/// An air state in full.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct StateView {
    /// "Entering air".
    pub label: String,
    /// Letter and shape.
    pub mark: Option<MarkView>,
    /// Its properties, in a fixed order.
    pub rows: Vec<ResultRow>,
}

/// A check filed.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct Filed {
    /// The entry.
    pub entry: String,
    /// "Filed 14:20".
    pub says: String,
    /// Where it stands: "AH-2, Haldry Fork School".
    pub place: String,
}

/// A site in a list.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct SiteRow {
    /// The site.
    pub site: String,
    /// Its name.
    pub name: String,
    /// Elevation, last visit.
    pub says: String,
    /// Invented example data.
    pub invented: bool,
}

/// An entry in a list.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct EntryRow {
    /// The entry.
    pub entry: String,
    /// The check's label.
    pub label: String,
    /// Where and when.
    pub says: String,
    /// Its headline: "Heat removed 41.3 kW ± 3.1".
    pub figure: String,
    /// Withdrawn.
    pub withdrawn: bool,
    /// Invented example data.
    pub invented: bool,
}

/// A site.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct SiteView {
    /// The site.
    pub site: String,
    /// Its name.
    pub name: String,
    /// Elevation and the pressure that follows from it.
    pub says: String,
    /// The elevation as typed.
    pub elevation_text: String,
    /// The unit it was typed in.
    pub elevation_unit: UnitView,
    /// The units that it can be typed in.
    pub elevation_units: Vec<UnitView>,
    /// Anything worth knowing.
    pub note: String,
    /// Invented example data.
    pub invented: bool,
    /// Its equipment.
    pub equipment: Vec<EquipmentRow>,
    /// Its visits, newest first.
    pub visits: Vec<VisitRow>,
    /// Its entries, newest first.
    pub entries: Vec<EntryRow>,
}

/// Equipment in a list.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct EquipmentRow {
    /// The equipment.
    pub equipment: String,
    /// Its tag.
    pub tag: String,
    /// What it is, when it was last read.
    pub says: String,
}

/// A visit in a list.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct VisitRow {
    /// The visit.
    pub visit: String,
    /// "14 July, today".
    pub when: String,
    /// People, outdoor air.
    pub says: String,
    /// "5 entries".
    pub count: String,
    /// It is today's.
    pub open: bool,
}

/// Equipment.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct EquipmentView {
    /// Where it is.
    pub place: Place,
    /// Its tag.
    pub tag: String,
    /// What it is.
    pub class: String,
    /// Anything worth knowing.
    pub note: String,
    /// Its site's name.
    pub site: String,
    /// Invented example data.
    pub invented: bool,
    /// Its entries, newest first.
    pub entries: Vec<EntryRow>,
}

/// A visit.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct VisitView {
    /// Where it is.
    pub place: Place,
    /// Its site's name.
    pub site: String,
    /// "14 July 2026, 14:05".
    pub when: String,
    /// Who was there.
    pub people: String,
    /// How the equipment was running.
    pub running: String,
    /// Pressure here, outdoor air.
    pub rows: Vec<ResultRow>,
    /// Probes run side by side: index, title, and what was found.
    pub runs: Vec<OptionView>,
    /// Invented example data.
    pub invented: bool,
    /// It is today's: checks can be started in it.
    pub open: bool,
    /// Its entries, newest first.
    pub entries: Vec<EntryRow>,
}

/// The form of a visit.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct VisitFormView {
    /// The visit; none is a new one.
    pub visit: Option<String>,
    /// Its site.
    pub site: String,
    /// The site's name.
    pub site_name: String,
    /// Who is there.
    pub people: String,
    /// How the equipment is running.
    pub running: String,
    /// What is typed.
    pub typed: Typed,
    /// Pressure here, outdoor air.
    pub sections: Vec<SectionView>,
    /// Notes on them.
    pub notes: Vec<NoteView>,
}

/// A filed entry as it was filed.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct EntryView {
    /// The entry.
    pub entry: String,
    /// Where.
    pub place: Place,
    /// "AH-2, Haldry Fork School, 14 July 2026".
    pub says: String,
    /// "Filed 14:20 by version 0.1.0".
    pub filed: String,
    /// Invented example data.
    pub invented: bool,
    /// Withdrawn.
    pub withdrawn: bool,
    /// What came out then, in today's units; its sections hold what was typed.
    pub solved: Solved,
    /// What was typed, as typed.
    pub readings: Vec<ReadingRow>,
    /// Earlier and side-by-side revisions.
    pub revisions: Vec<RevisionRow>,
}

/// A reading of a filed entry.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ReadingRow {
    /// Section and label: "Entering air, dry bulb".
    pub label: String,
    /// As typed, with its unit.
    pub text: String,
    /// Its ±.
    pub plus_minus: String,
    /// Instrument, place and takes, in a line.
    pub with: Option<String>,
}

/// A revision of an entry.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct RevisionRow {
    /// "14:20, first", "15:02, corrected".
    pub says: String,
    /// Its headline.
    pub figure: String,
    /// It stands now.
    pub current: bool,
}

/// The units in use.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct UnitsView {
    /// The preset that they equal, if one.
    pub preset: Option<Preset>,
    /// By quantity.
    pub rows: Vec<UnitsRow>,
}

/// The unit of one quantity.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct UnitsRow {
    /// Identifier of the quantity.
    pub quantity: String,
    /// "temperature".
    pub label: String,
    /// The unit in use.
    pub chosen: UnitView,
    /// All units of it.
    pub units: Vec<UnitView>,
    /// An everyday value in the unit in use: "21.0 °C".
    pub example: String,
}

/// About the app.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct About {
    /// The app's version.
    pub version: String,
    /// Where the ledger is.
    pub ledger: String,
    /// Limits and cautions, one paragraph each.
    pub says: Vec<String>,
}
