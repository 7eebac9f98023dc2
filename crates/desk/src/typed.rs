//! From what was typed to what a check is given: each text is read once, here.

use std::collections::BTreeMap;

use dewledger_checks::form::{Item, ReadingItem, Section};
use dewledger_checks::{Check, Given, Reading};
use dewledger_quantities::{
    Entry, PlusMinus, ReadError, Unit, UnitChoice, read, read_plus_minus, show,
};

use crate::bench::Bench;
use crate::read_with::{self, With};
use crate::reply::{Act, Change, Message};
use crate::request::{Typed, TypedReading, TypedValue};

/// What was typed, read: what a check is given, and what could not be read.
pub(crate) struct Readout {
    pub(crate) given: Given,
    pub(crate) sections: Vec<Section>,
    /// Why a text is no number, by key of the reading, with both numbers where it could be two.
    pub(crate) errors: BTreeMap<String, Message>,
    /// "read as 17.1", by key of the reading.
    pub(crate) echoes: BTreeMap<String, String>,
    /// What each was read with, where and how often, by key of the reading.
    pub(crate) with: BTreeMap<String, With>,
}

/// Asks of a form, which may change with what is given: the check's own, or the visit's.
pub(crate) type Form<'a> = dyn Fn(&Given) -> Vec<Section> + 'a;

/// Reads a check's form.
pub(crate) fn read_check(
    check: &dyn Check,
    typed: &Typed,
    units: &UnitChoice,
    bench: &Bench,
) -> Readout {
    read_form(&|given| check.form(given), typed, units, bench)
}

/// Reads any form. Kinds of readings depend on choices and on other readings, so a second pass follows the first.
pub(crate) fn read_form(
    form: &Form<'_>,
    typed: &Typed,
    units: &UnitChoice,
    bench: &Bench,
) -> Readout {
    let mut given = Given::default();
    for (key, value) in &typed.choices {
        given.choose(key, value);
    }
    let mut readout = pass(form(&given), &given, typed, units, bench);
    let sections = form(&readout.given);
    if sections != readout.sections {
        readout = pass(sections, &given, typed, units, bench);
        readout.sections = form(&readout.given);
    }
    readout
}

fn pass(
    sections: Vec<Section>,
    choices: &Given,
    typed: &Typed,
    units: &UnitChoice,
    bench: &Bench,
) -> Readout {
    let mut readout = Readout {
        given: choices.clone(),
        sections: Vec::new(),
        errors: BTreeMap::new(),
        echoes: BTreeMap::new(),
        with: BTreeMap::new(),
    };
    for section in &sections {
        for item in &section.items {
            let Item::Reading(item) = item else { continue };
            let key = item.key.as_ref();
            let Some(reading) = typed.readings.get(key) else { continue };
            match read_one(item, reading, typed, units, bench) {
                Ok(Some(one)) => {
                    readout.given.put(key, one.reading);
                    readout.with.insert(key.to_owned(), one.with);
                    if let Some(echo) = one.echo {
                        readout.echoes.insert(key.to_owned(), echo);
                    }
                }
                Ok(None) => {}
                Err(says) => {
                    readout.errors.insert(key.to_owned(), says);
                }
            }
        }
    }
    read_with::together(&mut readout.with);
    for (key, with) in &readout.with {
        if !with.parts.is_empty() {
            readout.given.doubt_by(key, with.parts.clone());
        }
    }
    readout.sections = sections;
    readout
}

/// The unit that a reading is typed in: its own, else the one chosen for its quantity.
pub(crate) fn unit_of(
    item: &ReadingItem,
    reading: Option<&TypedReading>,
    units: &UnitChoice,
) -> &'static Unit {
    reading
        .and_then(|reading| reading.unit.as_deref())
        .and_then(Unit::find)
        .filter(|unit| unit.measures(item.kind))
        .unwrap_or_else(|| units.get(item.kind))
}

/// The unit that a ± is typed in: its own, else the difference of the reading's unit, else the one chosen.
pub(crate) fn plus_minus_unit(
    item: &ReadingItem,
    reading: Option<&TypedReading>,
    units: &UnitChoice,
) -> &'static Unit {
    let difference = item.kind.difference();
    let own = reading
        .and_then(|reading| reading.plus_minus.as_ref())
        .and_then(|plus_minus| plus_minus.unit.as_deref())
        .and_then(Unit::find)
        .filter(|unit| unit.measures(difference));
    own.unwrap_or_else(|| {
        let unit = unit_of(item, reading, units);
        if unit.measures(difference) {
            return unit;
        }
        unit.for_difference(item.kind).unwrap_or_else(|| units.get(difference))
    })
}

/// The text of a ± with its per cent sign, where it was typed beside that unit and is a share of the reading.
fn plus_minus_text(item: &ReadingItem, plus_minus: &TypedValue) -> String {
    let text = plus_minus.text.trim_end();
    let share = plus_minus.unit.as_deref() == Some("%")
        && Unit::find("%").is_some_and(|unit| !unit.measures(item.kind.difference()));
    if share && !text.is_empty() && !text.ends_with('%') {
        return format!("{text} %");
    }
    plus_minus.text.clone()
}

/// The sentence, and both numbers as taps where the text could be either.
fn message(item: &ReadingItem, unit: &Unit, error: &ReadError) -> Message {
    let mut acts = Vec::new();
    if let ReadError::Ambiguous { one, other, .. } = error {
        for text in [one, other] {
            acts.push(Act {
                label: format!("It is {text}"),
                changes: vec![Change::Type {
                    key: item.key.to_string(),
                    text: text.clone(),
                    unit: unit.id.to_owned(),
                }],
            });
        }
    }
    Message { says: error.to_string(), acts }
}

/// The same, with the unit of every reading written beside it, so that a later choice of units does not change what
/// it says. Blank readings are left out.
pub(crate) fn spelt_out(
    form: &Form<'_>,
    mut typed: Typed,
    units: &UnitChoice,
    bench: &Bench,
) -> Typed {
    let read = read_form(form, &typed, units, bench);
    for section in &read.sections {
        for item in &section.items {
            let Item::Reading(item) = item else { continue };
            let key = item.key.as_ref();
            let unit = unit_of(item, typed.readings.get(key), units);
            let probe = bench.used(key, item.kind, &typed).map(|probe| probe.id.clone());
            if let Some(reading) = typed.readings.get_mut(key) {
                reading.unit = Some(unit.id.to_owned());
                // A form opened again must not take up a probe that came to hand since.
                if read_with::asked_of(item) && read.given.reading(key).is_some() {
                    reading.probe = Some(probe.unwrap_or_default());
                }
            }
        }
    }
    typed.readings.retain(|_, reading| is_begun(reading));
    typed
}

/// Whether anything of a reading is typed.
pub(crate) fn is_begun(reading: &TypedReading) -> bool {
    let doubted = reading.plus_minus.as_ref().is_some_and(|width| !width.text.trim().is_empty());
    doubted || !reading.text.trim().is_empty() || !reading.takes.is_empty()
}

/// A reading, read.
struct One {
    reading: Reading,
    with: With,
    echo: Option<String>,
}

fn read_one(
    item: &ReadingItem,
    typed: &TypedReading,
    form: &Typed,
    units: &UnitChoice,
    bench: &Bench,
) -> Result<Option<One>, Message> {
    let unit = unit_of(item, Some(typed), units);
    let mut with = With::of(item, typed, form, unit, bench)?;
    let (amount, unit, echo) = match with.mean_si {
        Some(si) => (dewledger_quantities::Amount::new(item.kind, si), unit, None),
        None => {
            let number = match read(item.kind, &typed.text, unit)
                .map_err(|error| message(item, unit, &error))?
            {
                Entry::NotRead => return Ok(None),
                Entry::Read(number) => number,
            };
            let echo = (number.comma || number.unit_typed)
                .then(|| format!("read as {}", show(number.amount, number.unit).text()));
            (number.amount, number.unit, echo)
        }
    };
    let half_width = plus_minus(item, typed, units, amount.si())?;
    let amount = with.finish(item, typed, amount, half_width, unit, bench)?;
    let reading = Reading { amount, unit: Some(unit), half_width_si: half_width };
    Ok(Some(One { reading, with, echo }))
}

/// The typed ± as a half-width in stored SI.
fn plus_minus(
    item: &ReadingItem,
    typed: &TypedReading,
    units: &UnitChoice,
    value_si: f64,
) -> Result<Option<f64>, Message> {
    let Some(plus_minus) = &typed.plus_minus else { return Ok(None) };
    let unit = plus_minus_unit(item, Some(typed), units);
    let text = plus_minus_text(item, plus_minus);
    match read_plus_minus(item.kind, &text, unit) {
        Ok(None) => Ok(None),
        Ok(Some(PlusMinus::Absolute(half_width))) => Ok(Some(half_width)),
        Ok(Some(PlusMinus::Relative(share))) => Ok(Some(share * value_si.abs())),
        Err(error) => Err(Message { says: format!("The ±: {error}"), acts: Vec::new() }),
    }
}
