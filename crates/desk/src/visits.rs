//! Visits: one stay at a site, with the pressure there and the outdoor air.

use dewledger_checks::form::{Item, ReadingItem, Section};
use dewledger_checks::{Given, Stop, pressure};
use dewledger_ledger::{At, Body, Head, Kind, RecordId, SiteId, Within};
use dewledger_quantities::{Kind as Quantities, Quantity, show};
use serde::{Deserialize, Serialize};

use crate::answer::act;
use crate::bench::Bench;
use crate::clock;
use crate::desk::{Asked, VERSION};
use crate::entries;
use crate::form_view::{Around, sections};
use crate::places::{self, SiteBody, body, json, site_id, visit_id};
use crate::reply::{
    Fault, NoteView, Reply, ResultRow, Tone, ValueView, VisitFormView, VisitRow, VisitView,
};
use crate::request::{Place, Typed};
use crate::runs::{self, KeptRun};
use crate::typed::{read_form, spelt_out};

/// A visit's body.
#[derive(Debug, Clone, Default, PartialEq, Serialize, Deserialize)]
pub(crate) struct VisitBody {
    #[serde(default)]
    pub(crate) started_ms: i64,
    #[serde(default)]
    pub(crate) people: String,
    #[serde(default)]
    pub(crate) running: String,
    #[serde(default)]
    pub(crate) typed: Typed,
    /// Probes run side by side.
    #[serde(default, skip_serializing_if = "Vec::is_empty")]
    pub(crate) runs: Vec<KeptRun>,
}

/// A visit as typed.
pub(crate) struct VisitTyped {
    pub(crate) people: String,
    pub(crate) running: String,
    pub(crate) typed: Typed,
}

const OUTDOOR_T: &str = "outdoor.dry_bulb";
const OUTDOOR_RH: &str = "outdoor.relative_humidity";

/// Pressure here and outdoor air.
fn visit_sections(given: &Given) -> Vec<Section> {
    let outdoor: Vec<Item> = vec![
        ReadingItem::optional(OUTDOOR_T, "Dry bulb", Quantities::Temperature).into(),
        ReadingItem::optional(OUTDOOR_RH, "Relative humidity", Quantities::RelativeHumidity).into(),
    ];
    vec![
        pressure::section(given),
        Section::new("outdoor", "Outdoor air", outdoor).beside("at the intake, not on the roof"),
    ]
}

/// When a visit began.
pub(crate) fn started(head: &Head) -> At {
    let known: VisitBody = body(head);
    if known.started_ms > 0 { At { ms: known.started_ms, ..head.at } } else { head.at }
}

fn head(at: &Asked<'_>, visit: &str) -> Result<Head, Fault> {
    Ok(at.state.ledger.head(RecordId::Visit(visit_id(visit)?))?)
}

/// Visits of a site, newest first.
pub(crate) fn rows(at: &Asked<'_>, site: SiteId) -> Result<Vec<VisitRow>, Fault> {
    let mut heads = at.state.ledger.list(Kind::Visit, Within::Site(site))?;
    heads.retain(|head| !head.withdrawn);
    heads.sort_by_key(|head| std::cmp::Reverse(started(head).ms));
    let mut rows = Vec::new();
    for head in heads {
        let known: VisitBody = body(&head);
        let RecordId::Visit(id) = head.record else { continue };
        let began = started(&head);
        let open = clock::same_day(began, at.now);
        let count = at
            .state
            .ledger
            .list(Kind::Entry, Within::Visit(id))?
            .iter()
            .filter(|entry| !entry.withdrawn)
            .count();
        let mut says = Vec::new();
        if !known.people.is_empty() {
            says.push(known.people.clone());
        }
        let read = read_form(&visit_sections, &known.typed, &at.state.units, &Bench::default());
        if let Some(reading) = read.given.reading(OUTDOOR_T) {
            let outside = show(reading.amount, at.state.units.get(Quantities::Temperature)).text();
            says.push(format!("{outside} outside"));
        }
        let day = clock::day(began, at.now);
        rows.push(VisitRow {
            visit: head.record.to_string(),
            when: if open { format!("{day}, today") } else { day },
            says: says.join(". "),
            count: if count == 1 { "1 entry".to_owned() } else { format!("{count} entries") },
            open,
        });
    }
    Ok(rows)
}

/// Today's visit at a site, if one was begun.
pub(crate) fn today(at: &Asked<'_>, site: SiteId) -> Result<Option<String>, Fault> {
    let row = rows(at, site)?.into_iter().find(|row| row.open);
    Ok(row.map(|row| row.visit))
}

pub(crate) fn visit(at: &Asked<'_>, visit: &str) -> Result<Reply, Fault> {
    let head = head(at, visit)?;
    let known: VisitBody = body(&head);
    let site = head.body.site.ok_or_else(|| Fault::not_found("The site of that visit"))?;
    let site_head = at.state.ledger.head(RecordId::Site(site))?;
    let began = started(&head);
    let units = &at.state.units;
    let read = read_form(&visit_sections, &known.typed, units, &Bench::default());
    let row = |key: &str,
               label: &str,
               amount: dewledger_quantities::Amount,
               condition: Option<String>| {
        let shown = show(amount, units.get(amount.kind()));
        ResultRow {
            key: key.to_owned(),
            label: label.to_owned(),
            condition,
            value: Some(ValueView {
                number: shown.number.clone(),
                unit: shown.unit.symbol.to_owned(),
                si: amount.si(),
                si_unit: amount.kind().si_suffix().to_owned(),
            }),
            plus_minus: None,
            withheld: None,
            strong: false,
        }
    };
    let mut rows = Vec::new();
    if let Ok(here) = pressure::here(&read.given) {
        rows.push(row(
            "pressure",
            "Pressure here",
            here.pressure.amount(),
            Some(here.source.say(units)),
        ));
    }
    for (key, label) in [(OUTDOOR_T, "Outdoor dry bulb"), (OUTDOOR_RH, "Outdoor relative humidity")]
    {
        if let Some(reading) = read.given.reading(key) {
            rows.push(row(key, label, reading.amount, None));
        }
    }
    let RecordId::Visit(id) = head.record else { return Err(Fault::not_found("That visit")) };
    Ok(Reply::Visit(VisitView {
        place: Place {
            site: Some(site.to_string()),
            equipment: None,
            visit: Some(visit.to_owned()),
        },
        site: site_head.body.title,
        when: format!("{}, {}", clock::full_day(began), clock::time(began)),
        runs: runs::rows(at, &known),
        people: known.people,
        running: known.running,
        rows,
        invented: head.body.invented,
        open: clock::same_day(began, at.now),
        entries: entries::rows(at, Within::Visit(id), 100)?,
    }))
}

pub(crate) fn form(
    at: &Asked<'_>,
    visit: Option<&str>,
    site: &str,
    typed: Option<Typed>,
) -> Result<Reply, Fault> {
    let site_head = at.state.ledger.head(RecordId::Site(site_id(site)?))?;
    let known: VisitBody = match visit {
        Some(visit) => body(&head(at, visit)?),
        None => VisitBody {
            typed: places::known_of(
                at,
                &Place { site: Some(site.to_owned()), ..Place::default() },
            )?,
            ..VisitBody::default()
        },
    };
    let typed = typed.unwrap_or_else(|| known.typed.clone());
    let bench = Bench::at(at, &Place::default())?;
    let read = read_form(&visit_sections, &typed, &at.state.units, &bench);
    let here = pressure::here(&read.given);
    let refusal = match &here {
        Err(Stop::Refused(refusal)) => Some(refusal.as_ref()),
        _ => None,
    };
    let notes = match &here {
        Ok(here) => here
            .notes
            .iter()
            .map(|note| NoteView {
                code: note.code.to_string(),
                tone: if note.weight == dewledger_checks::Weight::Unusual {
                    Tone::Unusual
                } else {
                    Tone::Remark
                },
                field: note.field.as_ref().map(ToString::to_string),
                lead: note.lead.say(&at.state.units),
                reason: note.reason.as_ref().map(|reason| reason.say(&at.state.units)),
                acts: note.offers.iter().map(|offer| act(offer, &at.state.units)).collect(),
                accepted: typed.accepted.iter().any(|code| *code == note.code),
            })
            .collect(),
        Err(_) => Vec::new(),
    };
    let sections =
        sections(&read, &typed, &Around::bare(bench, at.now), &at.state.units, &[], refusal, None);
    Ok(Reply::VisitForm(VisitFormView {
        visit: visit.map(str::to_owned),
        site: site.to_owned(),
        site_name: site_head.body.title,
        people: known.people,
        running: known.running,
        typed,
        sections,
        notes,
    }))
}

pub(crate) fn save(
    at: &mut Asked<'_>,
    visit: Option<&str>,
    site: &str,
    typed: VisitTyped,
) -> Result<Reply, Fault> {
    let bench = Bench::at(at, &Place::default())?;
    let read = read_form(&visit_sections, &typed.typed, &at.state.units, &bench);
    if let Some((field, message)) = read.errors.iter().next() {
        return Err(Fault::at(field.clone(), message.says.clone()));
    }
    if let Err(Stop::Refused(refusal)) = pressure::here(&read.given) {
        return Err(Fault::at(refusal.field.to_string(), refusal.says.say(&at.state.units)));
    }
    let id = site_id(site)?;
    let owner = at.state.ledger.head(RecordId::Site(id))?;
    let before = visit.map(|visit| head(at, visit)).transpose()?;
    let started_ms = before.as_ref().map_or(at.now.ms, |head| started(head).ms);
    let text = json(&VisitBody {
        started_ms,
        people: typed.people.trim().to_owned(),
        running: typed.running.trim().to_owned(),
        typed: spelt_out(&visit_sections, typed.typed, &at.state.units, &bench),
        runs: before.as_ref().map(|head| body::<VisitBody>(head).runs).unwrap_or_default(),
    })?;
    let new = Body {
        site: Some(id),
        title: owner.body.title.clone(),
        invented: owner.body.invented,
        app_version: VERSION.to_owned(),
        text,
        ..Body::default()
    };
    let revision = match before {
        None => at.state.ledger.file(Kind::Visit, at.now, &new, None)?,
        Some(head) => at.state.ledger.revise(&head, at.now, &new, None)?,
    };
    self::visit(at, &revision.record.to_string())
}

/// What a site's elevation is, in SI.
pub(crate) fn elevation_of(head: &Head) -> Option<f64> {
    body::<SiteBody>(head).elevation_m
}

/// The pressure of a visit in a line.
pub(crate) fn pressure_line(at: &Asked<'_>, visit: &str) -> Result<Option<String>, Fault> {
    let known: VisitBody = body(&head(at, visit)?);
    let read = read_form(&visit_sections, &known.typed, &at.state.units, &Bench::default());
    Ok(pressure::here(&read.given).ok().map(|here| {
        let amount = here.pressure.amount();
        let text = show(amount, at.state.units.get(amount.kind())).text();
        format!("air at {text}")
    }))
}
