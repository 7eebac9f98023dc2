//! Entries: checks filed, opened again, corrected, withdrawn.

use std::sync::atomic::AtomicBool;

use dewledger_checks::form::Item;
use dewledger_ledger::{Body, Head, Kind, RecordId, ResultRow as LedgerRow, Within};
use dewledger_quantities::{Kind as Quantities, Unit, UnitChoice};
use serde::{Deserialize, Serialize};

use crate::answer::Answer;
use crate::bench::{self, Bench};
use crate::clock;
use crate::desk::{Asked, VERSION};
use crate::drafts::{self, Kept, check, draft_id};
use crate::drawn;
use crate::form_view::{Around, check_name, work, work_with_draws};
use crate::places::{self, equipment_id, json, site_id, visit_id};
use crate::reply::{
    EntryRow, EntryView, Fault, FaultCode, Filed, ReadingRow, Reply, RevisionRow, Solved, Stage,
};
use crate::request::{Place, Typed, TypedProbe, TypedSpot, TypedTake};
use crate::requirements;
use crate::result_view;
use crate::typed::read_check;
use crate::visits;

/// An entry's body: what was typed, what came out.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub(crate) struct FiledBody {
    pub(crate) check: String,
    pub(crate) typed: Typed,
    pub(crate) readings: Vec<FiledReading>,
    pub(crate) answer: Answer,
}

/// A reading as it was typed, with its name and what it was read as.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub(crate) struct FiledReading {
    pub(crate) key: String,
    pub(crate) name: String,
    pub(crate) text: String,
    pub(crate) unit: String,
    pub(crate) quantity: String,
    pub(crate) si: f64,
    pub(crate) half_width_si: Option<f64>,
    #[serde(default)]
    pub(crate) plus_minus: Option<String>,
    /// Without a ± of its own its doubt was covered otherwise.
    #[serde(default)]
    pub(crate) covered: bool,
    /// What it was read with: accuracy as it stood then.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub(crate) probe: Option<FiledProbe>,
    /// What the side-by-side run found was taken off this.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub(crate) before_si: Option<f64>,
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub(crate) spot: Option<TypedSpot>,
    #[serde(default, skip_serializing_if = "Vec::is_empty")]
    pub(crate) takes: Vec<TypedTake>,
}

/// A probe as it stood when an entry was filed.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub(crate) struct FiledProbe {
    pub(crate) id: String,
    pub(crate) label: String,
    pub(crate) typed: TypedProbe,
}

/// The body of an entry; none where another version wrote what this one cannot read.
pub(crate) fn filed(head: &Head) -> Option<FiledBody> {
    serde_json::from_str(&head.body.text).ok()
}

fn record(entry: &str) -> Result<RecordId, Fault> {
    Ok(RecordId::Entry(entry.parse().map_err(|_| Fault::not_found("That entry"))?))
}

fn place_of(body: &Body) -> Place {
    Place {
        site: body.site.map(|site| site.to_string()),
        equipment: body.equipment.map(|equipment| equipment.to_string()),
        visit: body.visit.map(|visit| visit.to_string()),
    }
}

/// Works a check out; stores nothing.
pub(crate) fn solve(
    at: &Asked<'_>,
    id: &str,
    typed: &Typed,
    place: &Place,
) -> Result<Reply, Fault> {
    let check = check(id)?;
    let around = places::around(at, place, id, None)?;
    Ok(Reply::Solved(Box::new(work(check, typed, &around, &at.state.units).solved)))
}

/// What `draw` works on, taken from the ledger before the long work begins.
pub(crate) struct Drawing {
    check: &'static dyn dewledger_checks::Check,
    around: Around,
    units: UnitChoice,
}

/// Gets ready for draws.
pub(crate) fn drawing(at: &Asked<'_>, id: &str, place: &Place) -> Result<Drawing, Fault> {
    Ok(Drawing {
        check: check(id)?,
        around: places::around(at, place, id, None)?,
        units: at.state.units.clone(),
    })
}

impl Drawing {
    /// Works the check out with draws; needs the ledger no more.
    pub(crate) fn work(&self, typed: &Typed, stop: &AtomicBool) -> Reply {
        match work_with_draws(self.check, typed, &self.around, &self.units, stop) {
            Some(worked) => Reply::Solved(Box::new(worked.solved)),
            None => Reply::Overtaken {},
        }
    }
}

/// Every reading with its unit written beside it, so that a later choice of units does not change what it says.
fn readings(
    kept: &Kept,
    units: &UnitChoice,
    bench: &Bench,
) -> Result<(Typed, Vec<FiledReading>), Fault> {
    let check = check(&kept.check)?;
    let read = read_check(check, &kept.typed, units, bench);
    if let Some((field, message)) = read.errors.iter().next() {
        return Err(Fault::at(field.clone(), message.says.clone()));
    }
    let mut typed = kept.typed.clone();
    let mut rows = Vec::new();
    for section in &read.sections {
        for item in &section.items {
            let Item::Reading(item) = item else { continue };
            let key = item.key.as_ref();
            let Some(reading) = read.given.reading(key) else { continue };
            let Some(entry) = typed.readings.get_mut(key) else { continue };
            let unit = reading.unit.map_or("", |unit| unit.id);
            entry.unit = Some(unit.to_owned());
            let with = read.with.get(key);
            let probe = with.and_then(|with| bench.probe(with.probe.as_deref()?));
            if crate::read_with::asked_of(item) {
                entry.probe = Some(probe.map(|probe| probe.id.clone()).unwrap_or_default());
            }
            let plus_minus =
                entry.plus_minus.as_ref().filter(|pm| !pm.text.trim().is_empty()).map(|pm| {
                    let unit = crate::typed::plus_minus_unit(item, Some(entry), units);
                    let percent = pm.text.trim_end().ends_with('%');
                    if percent {
                        format!("± {}", pm.text.trim())
                    } else {
                        format!("± {}\u{a0}{}", pm.text.trim(), unit.symbol)
                    }
                });
            rows.push(FiledReading {
                key: key.to_owned(),
                name: format!("{}, {}", section.title, item.label.to_lowercase()),
                text: as_typed(entry, reading, with),
                unit: unit.to_owned(),
                quantity: reading.amount.kind().id().to_owned(),
                si: reading.amount.si(),
                half_width_si: reading.half_width_si,
                plus_minus,
                covered: item.covered,
                probe: probe.map(|probe| FiledProbe {
                    id: probe.id.clone(),
                    label: probe.label.clone(),
                    typed: probe.typed.clone(),
                }),
                before_si: with.and_then(|with| with.before_si),
                spot: entry.spot.clone(),
                takes: entry.takes.clone(),
            });
        }
    }
    // What the form no longer asks for (another humidity was picked) was not part of the result.
    typed.readings.retain(|key, _| rows.iter().any(|row| row.key == *key));
    Ok((typed, rows))
}

/// A reading as it was typed, or the mean of its takes.
fn as_typed(
    typed: &crate::request::TypedReading,
    reading: &dewledger_checks::Reading,
    with: Option<&crate::read_with::With>,
) -> String {
    let mean = with.and_then(|with| with.mean_si);
    match (mean, reading.unit) {
        (Some(si), Some(unit)) => {
            let amount = dewledger_quantities::Amount::new(reading.amount.kind(), si);
            dewledger_quantities::show(amount, unit).number
        }
        _ => typed.text.trim().to_owned(),
    }
}

/// Files a check; the commit has returned when this does.
pub(crate) fn file(at: &mut Asked<'_>, draft: Option<String>, kept: Kept) -> Result<Reply, Fault> {
    let Some(site) = kept.place.site.clone() else {
        return Err(Fault::at(
            "site",
            "Say at which site this was read. A site can be added on the spot.",
        ));
    };
    let about = check(&kept.check)?.about();
    let site_head = at.state.ledger.head(RecordId::Site(site_id(&site)?))?;
    let around = places::around(at, &kept.place, &kept.check, kept.corrects.as_deref())?;
    let (typed, readings) = readings(&kept, &at.state.units, &around.bench)?;
    // What is filed is final: draws are made now where they are wanted.
    let never = AtomicBool::new(false);
    let check = check(&kept.check)?;
    let worked = work_with_draws(check, &typed, &around, &at.state.units, &never)
        .unwrap_or_else(|| work(check, &typed, &around, &at.state.units));
    if let Some(wrong) = worked
        .answer
        .iter()
        .flat_map(|answer| &answer.verdicts)
        .find_map(|verdict| verdict.errors.first())
    {
        return Err(Fault::at("requirements", format!("A requirement: {}", wrong.says)));
    }
    let answer = worked
        .answer
        .filter(|answer| answer.headline().is_some_and(|figure| figure.value.is_some()));
    let Some(answer) = answer else {
        let why =
            worked.solved.headline.why_not.unwrap_or_else(|| "it has no result yet".to_owned());
        return Err(Fault::new(FaultCode::NotSolved, format!("Nothing to file yet: {why}.")));
    };
    let visit = match &kept.place.visit {
        Some(visit) => Some(visit_id(visit)?),
        None => visits::today(at, site_id(&site)?)?.as_deref().map(visit_id).transpose()?,
    };
    let results = answer
        .figures
        .iter()
        .filter_map(|figure| {
            let value = figure.value.as_ref()?;
            Some(LedgerRow {
                key: figure.key.clone(),
                quantity: value.quantity.clone(),
                si: value.si,
                half_width_si: figure.half_width_si,
            })
        })
        .collect();
    let used: Vec<(String, Quantities, Option<String>)> = readings
        .iter()
        .filter(|reading| !reading.covered)
        .filter_map(|reading| {
            let kind = Quantities::from_id(&reading.quantity)?;
            Some((reading.key.clone(), kind, reading.probe.as_ref().map(|probe| probe.id.clone())))
        })
        .collect();
    let text = json(&FiledBody { check: kept.check.clone(), typed, readings, answer })?;
    let body = Body {
        site: Some(site_id(&site)?),
        equipment: kept.place.equipment.as_deref().map(equipment_id).transpose()?,
        visit,
        title: about.label.to_owned(),
        invented: site_head.body.invented,
        app_version: VERSION.to_owned(),
        text,
        results,
    };
    let from = draft.as_deref().map(draft_id).transpose()?;
    let revision = match &kept.corrects {
        None => at.state.ledger.file(Kind::Entry, at.now, &body, from)?,
        Some(entry) => {
            let head = at.state.ledger.head(record(entry)?)?;
            at.state.ledger.revise(&head, at.now, &body, from)?
        }
    };
    bench::remember(at, used.into_iter())?;
    Ok(Reply::Filed(Filed {
        entry: revision.record.to_string(),
        says: format!("Filed {}", clock::time(at.now)),
        place: places::in_words(at, &kept.place)?,
    }))
}

/// Opens a filed entry's readings as a form.
pub(crate) fn correct(at: &Asked<'_>, entry: &str) -> Result<Reply, Fault> {
    let head = at.state.ledger.head(record(entry)?)?;
    let filed = filed(&head).ok_or_else(|| Fault::not_found("What was typed then"))?;
    let kept = Kept {
        check: filed.check,
        typed: filed.typed,
        place: place_of(&head.body),
        corrects: Some(entry.to_owned()),
    };
    drafts::opened(at, None, kept)
}

pub(crate) fn withdraw(at: &mut Asked<'_>, entry: &str, withdrawn: bool) -> Result<Reply, Fault> {
    let head = at.state.ledger.head(record(entry)?)?;
    if head.withdrawn != withdrawn {
        at.state.ledger.withdraw(&head, at.now, withdrawn)?;
    }
    let says = if withdrawn { "Withdrawn; it stays in the history" } else { "Brought back" };
    Ok(Reply::Done { says: says.to_owned() })
}

/// Entries in a list, newest first.
pub(crate) fn rows(at: &Asked<'_>, within: Within, most: usize) -> Result<Vec<EntryRow>, Fault> {
    // A few more than are shown: two corrections made apart are one row.
    let heads =
        at.state.ledger.newest(Kind::Entry, within, u32::try_from(most + 8).unwrap_or(u32::MAX))?;
    let mut rows: Vec<EntryRow> = Vec::new();
    for head in heads {
        if rows.len() >= most {
            break;
        }
        // Two corrections made apart are one entry in a list; its page shows both.
        if rows.last().is_some_and(|row| row.entry == head.record.to_string()) {
            continue;
        }
        let when = clock::day(head.at, at.now);
        let mut place = place_of(&head.body);
        if matches!(within, Within::Site(_) | Within::Visit(_)) {
            place.site = None;
        }
        if matches!(within, Within::Equipment(_)) {
            place = Place::default();
        }
        let words = places::in_words(at, &place)?;
        rows.push(EntryRow {
            entry: head.record.to_string(),
            label: head.body.title.clone(),
            says: if words.is_empty() { when } else { format!("{words}, {when}") },
            figure: filed(&head)
                .map(|filed| result_view::in_a_line(&filed.answer, &at.state.units))
                .unwrap_or_default(),
            withdrawn: head.withdrawn,
            invented: head.body.invented,
        });
    }
    Ok(rows)
}

/// A filed entry as it was filed, in today's units.
pub(crate) fn entry(at: &Asked<'_>, entry: &str) -> Result<Reply, Fault> {
    let record = record(entry)?;
    let heads = at.state.ledger.heads(record)?;
    let Some(head) = heads.first() else { return Err(Fault::not_found("That entry")) };
    let Some(filed) = filed(head) else {
        return Err(Fault::new(
            FaultCode::NotFound,
            "This entry was filed by another version and cannot be shown.",
        ));
    };
    let units = &at.state.units;
    let place = place_of(&head.body);
    let words = places::in_words(at, &place)?;
    let pressure =
        filed.answer.pressure.as_ref().map(|pressure| format!("Air at {}", pressure.say(units)));
    let solved = Solved {
        check: check(&filed.check)
            .map(check_name)
            .unwrap_or_else(|_| unknown(&filed.check, &head.body.title)),
        subtitle: [Some(words.clone()).filter(|words| !words.is_empty()), pressure]
            .into_iter()
            .flatten()
            .collect::<Vec<_>>()
            .join(". "),
        invented: head.body.invented,
        sections: Vec::new(),
        stage: if filed.answer.waits.is_empty() { Stage::Solved } else { Stage::Waiting },
        waits: None,
        headline: result_view::headline(&filed.answer, None, units),
        groups: result_view::groups(&filed.answer, units),
        versus: result_view::versus(&filed.answer, units),
        drivers: result_view::drivers(&filed.answer, units),
        notes: result_view::notes(&filed.answer, &filed.typed.accepted, units),
        cautions: result_view::cautions(&filed.answer),
        working: result_view::working(&filed.answer, units),
        states: result_view::states(&filed.answer, units),
        curves: drawn::curves(&filed.answer, units),
        tables: drawn::tables(&filed.answer, units),
        requirements: crate::reply::RequirementsView {
            figures: Vec::new(),
            directions: Vec::new(),
            verdicts: filed
                .answer
                .verdicts
                .iter()
                .enumerate()
                .map(|(index, verdict)| requirements::view(index, verdict, units))
                .collect(),
            before: Vec::new(),
            conditions: Vec::new(),
        },
        wants_draws: false,
    };
    let history = at.state.ledger.history(record)?;
    let first = history.first().map_or(head.at, |revision| revision.at);
    let mut says = format!("Filed {} by version {}", clock::time(head.at), head.body.app_version);
    if history.len() > 1 {
        says = format!(
            "Filed {}, revised {} by version {}",
            clock::time(first),
            clock::time(head.at),
            head.body.app_version
        );
    }
    Ok(Reply::Entry(Box::new(EntryView {
        entry: entry.to_owned(),
        says: if words.is_empty() {
            clock::full_day(first)
        } else {
            format!("{words}, {}", clock::full_day(first))
        },
        place,
        filed: says,
        invented: head.body.invented,
        withdrawn: head.withdrawn,
        readings: filed.readings.iter().map(reading_row).collect(),
        revisions: revisions(&history, &heads, units),
        solved,
    })))
}

fn unknown(id: &str, label: &str) -> crate::reply::CheckName {
    crate::reply::CheckName {
        id: id.to_owned(),
        label: label.to_owned(),
        question: String::new(),
        takes: String::new(),
        group: String::new(),
    }
}

/// "Stem thermometer, wet bulb; grid of 9 points; 4 takes".
fn read_with_words(reading: &FiledReading) -> Option<String> {
    let mut parts = Vec::new();
    if let Some(probe) = &reading.probe {
        let serial = probe.typed.serial.trim();
        let serial = if serial.is_empty() { String::new() } else { format!(" (serial {serial})") };
        parts.push(format!("{}{serial}", probe.label));
    }
    match reading.spot.as_ref().map(|spot| (spot.held.as_str(), spot.points.trim())) {
        Some(("grid", "")) => parts.push("over a grid".to_owned()),
        Some(("grid", points)) => parts.push(format!("grid of {points} points")),
        Some(("point", _)) => parts.push("at one point".to_owned()),
        Some(("averaging", _)) => parts.push("averaging element".to_owned()),
        _ => {}
    }
    match reading.takes.len() {
        0 => {}
        1 => parts.push("one take".to_owned()),
        many => parts.push(format!("mean of {many} takes")),
    }
    if reading.before_si.is_some() {
        parts.push("corrected by the side-by-side run".to_owned());
    }
    (!parts.is_empty()).then(|| parts.join("; "))
}

fn reading_row(reading: &FiledReading) -> ReadingRow {
    let symbol = Unit::find(&reading.unit).map_or("", |unit| unit.symbol);
    // A unit typed with the number is part of the text already.
    let typed_with_unit =
        reading.text.ends_with(|c: char| c.is_alphabetic() || matches!(c, '%' | '°' | '²' | '³'));
    let text = if typed_with_unit || symbol.is_empty() {
        reading.text.clone()
    } else {
        format!("{}\u{a0}{symbol}", reading.text)
    };
    ReadingRow {
        label: reading.name.clone(),
        text,
        plus_minus: reading.plus_minus.clone().unwrap_or_else(|| plus_minus_words(reading)),
        with: read_with_words(reading),
    }
}

/// The ± of a reading whose ± was not typed.
fn plus_minus_words(reading: &FiledReading) -> String {
    let (Some(half_width), Some(unit), Some(kind)) =
        (reading.half_width_si, Unit::find(&reading.unit), Quantities::from_id(&reading.quantity))
    else {
        return if reading.covered { String::new() } else { "± not\u{a0}known".to_owned() };
    };
    let width_unit = unit.for_difference(kind).unwrap_or(unit);
    let amount = dewledger_quantities::Amount::new(kind.difference(), half_width);
    crate::instruments::show_width(amount, half_width, width_unit)
}

fn revisions(history: &[Head], heads: &[Head], units: &UnitChoice) -> Vec<RevisionRow> {
    history
        .iter()
        .enumerate()
        .map(|(index, revision)| {
            let what = if revision.withdrawn {
                "withdrawn"
            } else if index == 0 {
                "first"
            } else if history[..index]
                .iter()
                .any(|before| Some(before.id) == revision.parent && before.withdrawn)
            {
                "brought back"
            } else {
                "corrected"
            };
            RevisionRow {
                says: format!(
                    "{}, {}, {what}",
                    clock::full_day(revision.at),
                    clock::time(revision.at)
                ),
                figure: filed(revision)
                    .map(|filed| result_view::in_a_line(&filed.answer, units))
                    .unwrap_or_default(),
                current: heads.iter().any(|head| head.id == revision.id),
            }
        })
        .collect()
}
