//! A form drawn from its sections, what was typed, and what the check answered.

use std::collections::BTreeMap;

use std::sync::atomic::AtomicBool;

use dewledger_checks::doubt::{DRAWS, Drawn, SEED, Worked, draw, work_out};
use dewledger_checks::form::{ChoiceItem, Item, ReadingItem, Section};
use dewledger_checks::state_block::readout;
use dewledger_checks::{Check, Missing, Refusal, Stop, pressure};
use dewledger_ledger::At;
use dewledger_quantities::{Quantity, Unit, UnitChoice, show};

use crate::answer::{Answer, StoredDraws, act, mark};
use crate::bench::Bench;
use crate::reply::{
    Act, Change, CheckName, ChoiceView, FieldView, MarkView, Message, NoteView, OptionView,
    ReadingView, SectionView, Solved, Stage, Tone, UnitView, WasView,
};
use crate::request::{Typed, TypedRequirement};
use crate::typed::{Readout, is_begun, plus_minus_unit, read_check, unit_of};
use crate::{drawn, remarks, requirements, result_view, with_view};

/// What surrounds a form.
#[derive(Debug, Clone)]
pub(crate) struct Around {
    /// "AH-2, Haldry Fork School".
    pub(crate) place: String,
    /// Invented example data.
    pub(crate) invented: bool,
    /// The pressure came with the place: its section stands folded.
    pub(crate) pressure_known: bool,
    /// Last visit's readings by key, with their day.
    pub(crate) was: BTreeMap<String, (crate::request::TypedReading, String)>,
    /// What was asked of the same check on the same equipment before, with the day.
    pub(crate) before: Vec<(TypedRequirement, String)>,
    /// The instruments at hand.
    pub(crate) bench: Bench,
    /// When.
    pub(crate) now: At,
}

impl Around {
    /// Nothing but the instruments.
    pub(crate) fn bare(bench: Bench, now: At) -> Self {
        Self {
            place: String::new(),
            invented: false,
            pressure_known: false,
            was: BTreeMap::new(),
            before: Vec::new(),
            bench,
            now,
        }
    }
}

/// A check worked out, and the answer behind it for filing.
pub(crate) struct WorkedForm {
    pub(crate) solved: Solved,
    pub(crate) answer: Option<Answer>,
}

pub(crate) fn check_name(check: &dyn Check) -> CheckName {
    let about = check.about();
    CheckName {
        id: about.id.to_owned(),
        label: about.label.to_owned(),
        question: about.question.to_owned(),
        takes: about.takes.to_owned(),
        group: about.group.title().to_owned(),
    }
}

pub(crate) fn unit_view(unit: &Unit) -> UnitView {
    UnitView { id: unit.id.to_owned(), symbol: unit.symbol.to_owned(), name: unit.name.to_owned() }
}

/// Works a check out to first order and draws it.
pub(crate) fn work(
    check: &dyn Check,
    typed: &Typed,
    around: &Around,
    units: &UnitChoice,
) -> WorkedForm {
    let read = read_check(check, typed, units, &around.bench);
    let result = work_out(check, &read.given);
    put_together(check, typed, around, units, &read, result, None)
}

/// The same, with draws where first order does not stand. None when `stop` was set meanwhile.
pub(crate) fn work_with_draws(
    check: &dyn Check,
    typed: &Typed,
    around: &Around,
    units: &UnitChoice,
    stop: &AtomicBool,
) -> Option<WorkedForm> {
    let read = read_check(check, typed, units, &around.bench);
    let mut result = work_out(check, &read.given);
    let mut drawn = None;
    if let Ok(worked) = &mut result
        && worked.wants_draws()
    {
        let made = draw(check, &worked.informed, &worked.draw_keys(), DRAWS, stop)?;
        worked.settle(&made);
        worked.outcome.notes.extend(remarks::of_draws(&made));
        drawn = Some(made);
    }
    Some(put_together(check, typed, around, units, &read, result, drawn.as_ref()))
}

fn put_together(
    check: &dyn Check,
    typed: &Typed,
    around: &Around,
    units: &UnitChoice,
    read: &Readout,
    mut result: Result<Worked, Stop>,
    drawn: Option<&Drawn>,
) -> WorkedForm {
    let mut verdicts = Vec::new();
    if let Ok(worked) = &mut result {
        worked.outcome.notes.extend(remarks::of_readings(read, &around.bench, around.now));
        worked.outcome.notes.sort_by_key(|note| note.weight);
        verdicts = requirements::verdicts(worked, drawn, read, &typed.requirements, units);
    }
    let figures =
        result.as_ref().map(|worked| worked.outcome.figures.as_slice()).unwrap_or_default();
    let requirements = requirements::all(figures, &verdicts, &around.before, read, units);
    let wants_draws = drawn.is_none() && result.as_ref().is_ok_and(Worked::wants_draws);
    let (answer, waits, refusal) = match &result {
        Ok(worked) => {
            let mut answer = Answer::of(worked, units);
            answer.verdicts = verdicts;
            answer.draws = drawn.map(|drawn| StoredDraws {
                seed: SEED,
                made: drawn.made,
                saturated: drawn.saturated,
            });
            (Some(answer), worked.outcome.waits.clone(), None)
        }
        Err(Stop::Waits(missing)) => (None, missing.clone(), None),
        Err(Stop::Refused(refusal)) => (None, Vec::new(), Some(refusal.as_ref())),
    };
    let waits_says = says_waits(&waits, read);
    let stage = match (&answer, refusal) {
        (_, Some(_)) => Stage::Refused,
        (Some(_), None) if waits.is_empty() => Stage::Solved,
        _ => Stage::Waiting,
    };
    let sections = sections(read, typed, around, units, &waits, refusal, answer.as_ref());
    let pressure = pressure::here(&read.given).ok();
    let air = pressure.map(|here| {
        let amount = show(here.pressure.amount(), units.get(here.pressure.amount().kind())).text();
        format!("Air at {amount}, {}", uncapital(&here.source.say(units)))
    });
    let subtitle = [Some(around.place.clone()).filter(|place| !place.is_empty()), air]
        .into_iter()
        .flatten()
        .collect::<Vec<_>>()
        .join(". ");
    let mut notes = answer
        .as_ref()
        .map(|answer| result_view::notes(answer, &typed.accepted, units))
        .unwrap_or_default();
    offer_acceptance(&mut notes);
    if let Some(refusal) = refusal {
        notes.insert(0, refused(refusal, units));
    }
    let why = refusal
        .map(|_| "waits until the reading marked below is mended".to_owned())
        .or_else(|| waits_says.clone());
    let solved = Solved {
        check: check_name(check),
        subtitle,
        invented: around.invented,
        sections,
        stage,
        waits: waits_says,
        headline: answer.as_ref().map_or_else(
            || result_view::no_headline(why.as_deref()),
            |answer| result_view::headline(answer, why.as_deref(), units),
        ),
        groups: answer
            .as_ref()
            .map(|answer| result_view::groups(answer, units))
            .unwrap_or_default(),
        versus: answer
            .as_ref()
            .map(|answer| result_view::versus(answer, units))
            .unwrap_or_default(),
        drivers: answer.as_ref().map_or_else(
            || crate::reply::Drivers { aside: String::new(), rows: Vec::new(), says: None },
            |answer| result_view::drivers(answer, units),
        ),
        notes,
        cautions: answer.as_ref().map(result_view::cautions).unwrap_or_default(),
        working: answer
            .as_ref()
            .map(|answer| result_view::working(answer, units))
            .unwrap_or_default(),
        states: answer
            .as_ref()
            .map(|answer| result_view::states(answer, units))
            .unwrap_or_default(),
        curves: answer.as_ref().map(|answer| drawn::curves(answer, units)).unwrap_or_default(),
        tables: answer.as_ref().map(|answer| drawn::tables(answer, units)).unwrap_or_default(),
        requirements,
        wants_draws,
    };
    WorkedForm { solved, answer }
}

/// An unusual note can be said to be right.
fn offer_acceptance(notes: &mut [NoteView]) {
    for note in notes {
        if note.tone == Tone::Unusual && !note.accepted {
            note.acts.push(Act {
                label: "It is right".to_owned(),
                changes: vec![Change::Accept { code: note.code.clone() }],
            });
        }
    }
}

fn refused(refusal: &Refusal, units: &UnitChoice) -> NoteView {
    NoteView {
        code: refusal.code.to_owned(),
        tone: Tone::Impossible,
        field: Some(refusal.field.to_string()),
        lead: refusal.says.say(units),
        reason: None,
        acts: refusal.offers.iter().map(|offer| act(offer, units)).collect(),
        accepted: false,
    }
}

fn says_waits(waits: &[Missing], read: &Readout) -> Option<String> {
    let unread: Vec<String> = read
        .errors
        .keys()
        .filter_map(|key| waits.iter().find(|missing| missing.key == key.as_str()))
        .map(|missing| missing.name.to_string())
        .collect();
    if let Some(name) = unread.first() {
        return Some(format!("{name} cannot be read: see its field"));
    }
    let names: Vec<String> = waits.iter().map(|missing| missing.name.to_string()).collect();
    match names.len() {
        0 => None,
        1..=3 => Some(format!("waits for {}", result_view::list(&names))),
        more => Some(format!("waits for {}, {} and {} more", names[0], names[1], more - 2)),
    }
}

fn uncapital(text: &str) -> String {
    let mut characters = text.chars();
    characters
        .next()
        .map_or_else(String::new, |first| first.to_lowercase().chain(characters).collect())
}

/// Draws the sections of a form.
pub(crate) fn sections(
    read: &Readout,
    typed: &Typed,
    around: &Around,
    units: &UnitChoice,
    waits: &[Missing],
    refusal: Option<&Refusal>,
    answer: Option<&Answer>,
) -> Vec<SectionView> {
    let draw = Draw { read, typed, around, units, waits, refusal, answer };
    read.sections.iter().map(|section| draw.section(section)).collect()
}

/// What a section is drawn from.
struct Draw<'a> {
    read: &'a Readout,
    typed: &'a Typed,
    around: &'a Around,
    units: &'a UnitChoice,
    waits: &'a [Missing],
    refusal: Option<&'a Refusal>,
    answer: Option<&'a Answer>,
}

impl Draw<'_> {
    fn section(&self, section: &Section) -> SectionView {
        let begun =
            section.reading_keys().any(|key| self.typed.readings.get(key).is_some_and(is_begun));
        let troubled = self.refusal.is_some_and(|refusal| self.holds(section, &refusal.field))
            || section.reading_keys().any(|key| self.read.errors.contains_key(key));
        let pressure = section.key == "pressure";
        let here = if pressure { pressure::here(&self.read.given).ok() } else { None };
        let folded = !troubled
            && ((section.seldom && !begun)
                || (pressure && self.around.pressure_known && here.is_some()));
        let summary = here.map(|here| {
            let amount =
                show(here.pressure.amount(), self.units.get(here.pressure.amount().kind())).text();
            format!("{amount}, {}", uncapital(&here.source.say(self.units)))
        });
        SectionView {
            key: section.key.to_string(),
            title: section.title.to_string(),
            aside: section.aside.as_ref().map(ToString::to_string),
            mark: section.mark.map(mark).map(|(letter, shape)| MarkView { letter, shape }),
            folded,
            summary,
            fields: section.items.iter().map(|item| self.field(section, item)).collect(),
            readout: self.readout(section),
            acts: acts(section),
        }
    }

    fn holds(&self, section: &Section, key: &str) -> bool {
        section.items.iter().any(|item| match item {
            Item::Reading(reading) => {
                reading.key == key || reading.pick.as_ref().is_some_and(|pick| pick.key == key)
            }
            Item::Choice(choice) => choice.key == key,
        })
    }

    /// What the readings of a point come to.
    fn readout(&self, section: &Section) -> Option<String> {
        let stored = self
            .answer
            .and_then(|answer| answer.states.iter().find(|state| state.key == section.key));
        let air = match stored {
            Some(state) => state.air(),
            None => readout(&self.read.given, &section.key)?,
        };
        let said = |amount: dewledger_quantities::Amount| {
            show(amount, self.units.get(amount.kind())).text()
        };
        Some(format!(
            "W {}, h {}, {} RH",
            said(air.humidity_ratio().amount()),
            said(air.enthalpy().amount()),
            said(air.relative_humidity().amount())
        ))
    }

    fn field(&self, section: &Section, item: &Item) -> FieldView {
        match item {
            Item::Reading(item) => FieldView::Reading(Box::new(self.reading(section, item))),
            Item::Choice(item) => FieldView::Choice(self.choice(item)),
        }
    }

    fn reading(&self, section: &Section, item: &ReadingItem) -> ReadingView {
        let key = item.key.as_ref();
        let typed = self.typed.readings.get(key);
        let unit = unit_of(item, typed, self.units);
        let unusual = self.answer.is_some_and(|answer| {
            answer.notes.iter().any(|note| {
                note.weight == "unusual"
                    && note.field.as_deref() == Some(key)
                    && !self.typed.accepted.contains(&note.code)
            })
        });
        let half_width = self.read.given.reading(key).and_then(|reading| reading.half_width_si);
        let width_unit = plus_minus_unit(item, typed, self.units);
        let plus_minus = match (half_width, item.covered) {
            (Some(half_width), _) => {
                let amount = dewledger_quantities::Amount::new(item.kind.difference(), half_width);
                format!("± {}", show(amount, width_unit).text())
            }
            (None, true) => String::new(),
            (None, false) => "± not\u{a0}known".to_owned(),
        };
        let percent = Unit::find("%").filter(|_| item.kind.difference() == item.kind);
        let mut width_units: Vec<&Unit> = Unit::of(item.kind.difference()).collect();
        width_units.extend(percent.filter(|percent| !width_units.contains(percent)));
        let in_percent = typed
            .and_then(|typed| typed.plus_minus.as_ref())
            .is_some_and(|plus_minus| plus_minus.unit.as_deref() == Some("%"));
        let typed_width_unit = percent.filter(|_| in_percent).unwrap_or(width_unit);
        ReadingView {
            key: key.to_owned(),
            label: item.label.to_string(),
            pick: item.pick.as_ref().map(|pick| self.choice(pick)),
            name: format!("{}, {}, in {}", section.title, item.label.to_lowercase(), unit.name),
            text: typed.map(|typed| typed.text.clone()).unwrap_or_default(),
            unit: unit_view(unit),
            units: Unit::of(item.kind).map(unit_view).collect(),
            signed: item.kind.signed(),
            required: item.required,
            help: item.help.as_ref().map(ToString::to_string),
            assumed: item.assumed.map(|amount| {
                format!("{}, assumed", show(amount, self.units.get(amount.kind())).text())
            }),
            read_as: self.read.echoes.get(key).cloned(),
            was: self.around.was.get(key).and_then(|(reading, when)| {
                let unit = reading.unit.as_deref().and_then(Unit::find)?;
                let view = WasView {
                    text: reading.text.clone(),
                    unit: unit_view(unit),
                    when: when.clone(),
                };
                (unit.measures(item.kind) && !view.text.trim().is_empty()).then_some(view)
            }),
            plus_minus,
            plus_minus_text: typed
                .and_then(|typed| typed.plus_minus.as_ref())
                .map(|plus_minus| plus_minus.text.clone())
                .unwrap_or_default(),
            plus_minus_unit: unit_view(typed_width_unit),
            plus_minus_units: width_units.into_iter().map(unit_view).collect(),
            error: self.error(key),
            unusual,
            with: with_view::view(
                &with_view::Beside {
                    sections: &self.read.sections,
                    typed: self.typed,
                    bench: &self.around.bench,
                    units: self.units,
                    now: self.around.now,
                },
                item,
                self.read.with.get(key),
                unit,
            )
            .map(Box::new),
        }
    }

    fn choice(&self, item: &ChoiceItem) -> ChoiceView {
        let value = self.typed.choices.get(item.key.as_ref()).cloned();
        let value = value.filter(|value| item.options.iter().any(|option| option.value == value));
        ChoiceView {
            key: item.key.to_string(),
            label: item.label.to_string(),
            value: value.or_else(|| item.default.map(str::to_owned)),
            options: item
                .options
                .iter()
                .map(|option| OptionView {
                    value: option.value.to_owned(),
                    label: option.label.to_string(),
                    help: option.help.as_ref().map(ToString::to_string),
                })
                .collect(),
            help: item.help.as_ref().map(ToString::to_string),
            error: self.error(&item.key),
        }
    }

    /// What stands against a field: its text is no number, the check refuses it, or a question hangs on it.
    fn error(&self, key: &str) -> Option<Message> {
        if let Some(message) = self.read.errors.get(key) {
            return Some(message.clone());
        }
        if let Some(refusal) = self.refusal.filter(|refusal| refusal.field == key) {
            return Some(Message {
                says: refusal.says.say(self.units),
                acts: refusal.offers.iter().map(|offer| act(offer, self.units)).collect(),
            });
        }
        let asks = self.waits.iter().find(|missing| missing.key == key)?.asks.as_ref()?;
        Some(Message { says: asks.say(self.units), acts: Vec::new() })
    }
}

/// Adding a repeated part, and taking the last one away with what stands in it.
fn acts(section: &Section) -> Vec<Act> {
    let Some(repeat) = &section.repeat else { return Vec::new() };
    let choose =
        |count: usize| Change::Choose { key: repeat.choice.to_string(), value: count.to_string() };
    let mut acts = Vec::new();
    if let Some(label) = repeat.add.as_ref().filter(|_| repeat.count < repeat.most) {
        acts.push(Act { label: label.to_string(), changes: vec![choose(repeat.count + 1)] });
    }
    if let Some(label) = repeat.remove.as_ref().filter(|_| repeat.count > repeat.least) {
        let mut changes: Vec<Change> =
            section.reading_keys().map(|key| Change::Clear { key: key.to_owned() }).collect();
        changes.push(choose(repeat.count - 1));
        acts.push(Act { label: label.to_string(), changes });
    }
    acts
}
