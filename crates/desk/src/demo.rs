//! The invented demo site: a school that does not exist, with two visits, so that a newcomer sees a filled app.

use std::collections::BTreeMap;

use dewledger_ledger::{At, Body, Kind, RecordId};

use crate::classes;
use crate::desk::{Asked, VERSION};
use crate::drafts::Kept;
use crate::entries;
use crate::instruments::InstrumentBody;
use crate::places::{EquipmentBody, SiteBody, json};
use crate::reply::Fault;
use crate::request::{Place, Typed, TypedReading, TypedValue};
use crate::visits::VisitBody;

const DAY_MS: i64 = 24 * 3600 * 1000;

/// Key, text, unit, ± and its unit.
type Reading = (&'static str, &'static str, &'static str, Option<(&'static str, &'static str)>);

const FLOW: Option<(&str, &str)> = Some(("4 %", "L/s"));

fn typed(choices: &[(&str, &str)], readings: &[Reading]) -> Typed {
    let choices: BTreeMap<String, String> =
        choices.iter().map(|(key, value)| ((*key).to_owned(), (*value).to_owned())).collect();
    let readings = readings
        .iter()
        .map(|(key, text, unit, plus_minus)| {
            let reading = TypedReading {
                text: (*text).to_owned(),
                unit: Some((*unit).to_owned()),
                plus_minus: plus_minus.map(|(text, unit)| TypedValue {
                    text: text.to_owned(),
                    unit: Some(unit.to_owned()),
                }),
                ..TypedReading::default()
            };
            ((*key).to_owned(), reading)
        })
        .collect();
    Typed { choices, readings, ..Typed::default() }
}

/// Says which probe read the bulbs of a form.
fn read_with(mut typed: Typed, psychrometer: &str) -> Typed {
    for (key, reading) in &mut typed.readings {
        let probe = if key.ends_with(".dry_bulb") {
            1
        } else if key.ends_with(".wet_bulb") {
            2
        } else {
            continue;
        };
        reading.probe = Some(format!("{psychrometer}/{probe}"));
    }
    typed
}

/// The psychrometer that everything at the site was read with.
fn psychrometer(at: &mut Asked<'_>, when: At) -> Result<String, Fault> {
    let class = "aspirated_psychrometer";
    let mut typed = classes::typed(class).ok_or_else(|| Fault::not_found("That class"))?;
    typed.name = "Psychrometer 2".to_owned();
    typed.serial = "invented-0217".to_owned();
    typed.note = "Invented example.".to_owned();
    for (index, probe) in typed.probes.iter_mut().enumerate() {
        probe.id = Some((index + 1).to_string());
    }
    let body = Body {
        title: typed.name.clone(),
        invented: true,
        app_version: VERSION.to_owned(),
        text: json(&InstrumentBody { typed })?,
        ..Body::default()
    };
    Ok(at.state.ledger.file(Kind::Instrument, when, &body, None)?.record.to_string())
}

/// Adds the site with its equipment, visits and entries, each at its moment.
pub(crate) fn add(at: &mut Asked<'_>) -> Result<(), Fault> {
    let now = at.now;
    let ago = |days: i64, minutes: i64| At { ms: now.ms - days * DAY_MS + minutes * 60_000, ..now };
    let invented = |title: &str, text: String| Body {
        title: title.to_owned(),
        invented: true,
        app_version: VERSION.to_owned(),
        text,
        ..Body::default()
    };
    let site_body = json(&SiteBody {
        elevation: TypedValue { text: "1620".to_owned(), unit: Some("m".to_owned()) },
        elevation_m: Some(1620.0),
        note: "Invented example: no such school exists.".to_owned(),
    })?;
    let site = at.state.ledger.file(
        Kind::Site,
        ago(75, -60),
        &invented("Haldry Fork School", site_body),
        None,
    )?;
    let RecordId::Site(site) = site.record else { return Err(Fault::not_found("The demo site")) };
    let mut equipment = Vec::new();
    for (tag, class) in [
        ("AH-1", "Air handler, hall"),
        ("AH-2", "Air handler, east classrooms"),
        ("FC-14", "Fan coil, library"),
    ] {
        let body = json(&EquipmentBody { class: class.to_owned(), note: String::new() })?;
        let body = Body { site: Some(site), ..invented(tag, body) };
        let revision = at.state.ledger.file(Kind::Equipment, ago(75, -50), &body, None)?;
        equipment.push(revision.record.to_string());
    }
    let visit = |at: &mut Asked<'_>,
                 days,
                 people: &str,
                 running: &str,
                 typed: Typed|
     -> Result<Place, Fault> {
        let began = ago(days, -45);
        let body = json(&VisitBody {
            started_ms: began.ms,
            people: people.to_owned(),
            running: running.to_owned(),
            typed,
            runs: Vec::new(),
        })?;
        let body = Body { site: Some(site), ..invented("Haldry Fork School", body) };
        let revision = at.state.ledger.file(Kind::Visit, began, &body, None)?;
        Ok(Place {
            site: Some(site.to_string()),
            equipment: None,
            visit: Some(revision.record.to_string()),
        })
    };
    let psychrometer = psychrometer(at, ago(75, -40))?;
    let spring = visit(
        at,
        74,
        "M. Ovrane",
        "Cooling valve 62 %, supply fan 44 Hz, outdoor damper at minimum",
        typed(
            &[("pressure.by", "elevation")],
            &[
                ("pressure.elevation", "1620", "m", None),
                ("outdoor.dry_bulb", "21.5", "degC", None),
                ("outdoor.relative_humidity", "38", "%", None),
            ],
        ),
    )?;
    let summer = visit(
        at,
        2,
        "M. Ovrane, I. Tesk",
        "Cooling valve 71 %, supply fan 44 Hz, outdoor damper at minimum",
        typed(
            &[("pressure.by", "read")],
            &[
                ("pressure.read", "83.41", "kPa", Some(("0.1", "kPa"))),
                ("pressure.elevation", "1620", "m", None),
                ("outdoor.dry_bulb", "31.2", "degC", None),
                ("outdoor.relative_humidity", "24", "%", None),
            ],
        ),
    )?;
    let coil = |flow: &'static str, air: [&'static str; 4]| {
        typed(
            &[("pressure.by", "elevation"), ("flow.basis", "actual_leaving")],
            &[
                ("pressure.elevation", "1620", "m", None),
                ("entering.dry_bulb", air[0], "degC", None),
                ("entering.wet_bulb", air[1], "degC", None),
                ("leaving.dry_bulb", air[2], "degC", None),
                ("leaving.wet_bulb", air[3], "degC", None),
                ("flow.rate", flow, "L/s", FLOW),
            ],
        )
    };
    let mixing = typed(
        &[
            ("pressure.by", "elevation"),
            ("stream1_flow.basis", "actual"),
            ("stream2_flow.basis", "actual"),
            ("stream1.humidity_by", "relative_humidity"),
            ("stream2.humidity_by", "relative_humidity"),
        ],
        &[
            ("pressure.elevation", "1620", "m", None),
            ("stream1.dry_bulb", "24.4", "degC", None),
            ("stream1.relative_humidity", "42", "%", Some(("2", "%"))),
            ("stream1_flow.rate", "1890", "L/s", FLOW),
            ("stream2.dry_bulb", "31.2", "degC", None),
            ("stream2.relative_humidity", "24", "%", Some(("2", "%"))),
            ("stream2_flow.rate", "520", "L/s", FLOW),
        ],
    );
    let drain = typed(
        &[("pressure.by", "elevation"), ("flow.basis", "actual_leaving"), ("fills", "2")],
        &[
            ("pressure.elevation", "1620", "m", None),
            ("entering.dry_bulb", "26.4", "degC", None),
            ("entering.wet_bulb", "17.1", "degC", None),
            ("leaving.dry_bulb", "12.6", "degC", None),
            ("leaving.wet_bulb", "11.4", "degC", None),
            ("flow.rate", "2360", "L/s", FLOW),
            ("fill1.volume", "4.0", "L", Some(("0.05", "L"))),
            ("fill1.time", "1225", "s", Some(("3", "s"))),
            ("fill2.volume", "4.0", "L", Some(("0.05", "L"))),
            ("fill2.time", "1240", "s", Some(("3", "s"))),
        ],
    );
    let air = typed(
        &[("pressure.by", "elevation")],
        &[
            ("pressure.elevation", "1620", "m", None),
            ("air.dry_bulb", "24.1", "degC", None),
            ("air.wet_bulb", "15.6", "degC", None),
        ],
    );
    let filings = [
        (&spring, 1, 74, 0, "air_heat", coil("2410", ["26.9", "17.4", "12.9", "11.9"])),
        (&spring, 2, 74, 20, "air_state", air),
        (&summer, 1, 2, 0, "air_heat", coil("2360", ["26.4", "17.1", "12.6", "11.4"])),
        (&summer, 1, 2, 25, "mixing", mixing),
        (&summer, 1, 2, 50, "condensate", drain),
    ];
    for (place, which, days, minutes, check, typed) in filings {
        let place = Place { equipment: equipment.get(which).cloned(), ..place.clone() };
        let mut then = Asked { state: &mut *at.state, now: ago(days, minutes) };
        entries::file(
            &mut then,
            None,
            Kept {
                check: check.to_owned(),
                typed: read_with(typed, &psychrometer),
                place,
                corrects: None,
            },
        )?;
    }
    Ok(())
}
