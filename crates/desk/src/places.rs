//! Sites and equipment, and what a place knows for a form.

use std::collections::BTreeMap;

use dewledger_checks::pressure;
use dewledger_ledger::{Body, EquipmentId, Head, Kind, RecordId, SiteId, VisitId, Within};
use dewledger_properties::atmosphere;
use dewledger_quantities::{Elevation, Entry, Kind as Quantities, Quantity, Unit, read, show};
use serde::{Deserialize, Serialize};

use crate::bench::Bench;
use crate::clock;
use crate::desk::{Asked, VERSION};
use crate::entries;
use crate::form_view::{Around, unit_view};
use crate::reply::{EquipmentRow, EquipmentView, Fault, FaultCode, Reply, SiteRow, SiteView};
use crate::request::{Place, Typed, TypedReading, TypedValue};
use crate::visits;

/// A site's body.
#[derive(Debug, Clone, Default, PartialEq, Serialize, Deserialize)]
pub(crate) struct SiteBody {
    /// Elevation as typed, and what it was read as.
    pub(crate) elevation: TypedValue,
    pub(crate) elevation_m: Option<f64>,
    #[serde(default)]
    pub(crate) note: String,
}

/// A piece of equipment's body.
#[derive(Debug, Clone, Default, PartialEq, Serialize, Deserialize)]
pub(crate) struct EquipmentBody {
    pub(crate) class: String,
    #[serde(default)]
    pub(crate) note: String,
}

/// Equipment as typed.
pub(crate) struct EquipmentTyped {
    pub(crate) tag: String,
    pub(crate) class: String,
    pub(crate) note: String,
}

pub(crate) fn site_id(text: &str) -> Result<SiteId, Fault> {
    text.parse().map_err(|_| Fault::not_found("That site"))
}

pub(crate) fn equipment_id(text: &str) -> Result<EquipmentId, Fault> {
    text.parse().map_err(|_| Fault::not_found("That equipment"))
}

pub(crate) fn visit_id(text: &str) -> Result<VisitId, Fault> {
    text.parse().map_err(|_| Fault::not_found("That visit"))
}

/// Bodies are this version's JSON; one that is not is shown with what can be read of it.
pub(crate) fn body<T: Default + serde::de::DeserializeOwned>(head: &Head) -> T {
    serde_json::from_str(&head.body.text).unwrap_or_default()
}

pub(crate) fn json(value: &impl Serialize) -> Result<String, Fault> {
    serde_json::to_string(value)
        .map_err(|error| Fault::new(FaultCode::BadRequest, error.to_string()))
}

fn site_head(at: &Asked<'_>, site: &str) -> Result<Head, Fault> {
    Ok(at.state.ledger.head(RecordId::Site(site_id(site)?))?)
}

/// "AH-2, Haldry Fork School".
pub(crate) fn in_words(at: &Asked<'_>, place: &Place) -> Result<String, Fault> {
    let mut parts = Vec::new();
    if let Some(equipment) = &place.equipment {
        parts.push(at.state.ledger.head(RecordId::Equipment(equipment_id(equipment)?))?.body.title);
    }
    if let Some(site) = &place.site {
        parts.push(site_head(at, site)?.body.title);
    }
    Ok(parts.join(", "))
}

/// What surrounds a form at a place: its name, its pressure, the last visit's readings.
pub(crate) fn around(
    at: &Asked<'_>,
    place: &Place,
    check: &str,
    but: Option<&str>,
) -> Result<Around, Fault> {
    let invented = match &place.site {
        Some(site) => site_head(at, site)?.body.invented,
        None => false,
    };
    let last = match &place.equipment {
        Some(equipment) => last_filed(at, equipment, check, but)?,
        None => None,
    };
    let (was, before) = match last {
        Some((typed, when)) => (
            typed
                .readings
                .into_iter()
                .map(|(key, reading)| (key, (reading, when.clone())))
                .collect(),
            typed.requirements.into_iter().map(|asked| (asked, when.clone())).collect(),
        ),
        None => (BTreeMap::new(), Vec::new()),
    };
    Ok(Around {
        place: in_words(at, place)?,
        invented,
        pressure_known: place.site.is_some(),
        was,
        before,
        bench: Bench::at(at, place)?,
        now: at.now,
    })
}

/// What was typed for the newest entry of this check on this equipment, and its day.
fn last_filed(
    at: &Asked<'_>,
    equipment: &str,
    check: &str,
    but: Option<&str>,
) -> Result<Option<(Typed, String)>, Fault> {
    for head in at.state.ledger.list(Kind::Entry, Within::Equipment(equipment_id(equipment)?))? {
        if head.withdrawn || but == Some(head.record.to_string().as_str()) {
            continue;
        }
        let Some(filed) = entries::filed(&head) else { continue };
        if filed.check == check {
            return Ok(Some((filed.typed, clock::day(head.at, at.now))));
        }
    }
    Ok(None)
}

/// What a place knows of a form that is not yet begun: the pressure of the visit, else the elevation of the site.
pub(crate) fn known_of(at: &Asked<'_>, place: &Place) -> Result<Typed, Fault> {
    let mut typed = Typed::default();
    if let Some(visit) = &place.visit {
        let head = at.state.ledger.head(RecordId::Visit(visit_id(visit)?))?;
        let known = body::<visits::VisitBody>(&head).typed;
        let pressure = |key: &String| key.starts_with("pressure.");
        typed.choices.extend(known.choices.into_iter().filter(|(key, _)| pressure(key)));
        typed.readings.extend(known.readings.into_iter().filter(|(key, _)| pressure(key)));
    }
    let elevation_there = typed
        .readings
        .get(pressure::ELEVATION)
        .is_some_and(|reading| !reading.text.trim().is_empty());
    if let Some(site) = place.site.as_ref().filter(|_| !elevation_there) {
        let known: SiteBody = body(&site_head(at, site)?);
        if known.elevation_m.is_some() {
            typed.readings.insert(
                pressure::ELEVATION.to_owned(),
                TypedReading {
                    text: known.elevation.text,
                    unit: known.elevation.unit,
                    ..TypedReading::default()
                },
            );
        }
    }
    Ok(typed)
}

fn site_row(at: &Asked<'_>, head: &Head) -> Result<SiteRow, Fault> {
    let known: SiteBody = body(head);
    let RecordId::Site(id) = head.record else { return Err(Fault::not_found("That site")) };
    let mut says = Vec::new();
    if let Some(m) = known.elevation_m {
        says.push(
            show(Elevation::from_si(m).amount(), at.state.units.get(Quantities::Elevation)).text(),
        );
    }
    match at.state.ledger.list(Kind::Visit, Within::Site(id))?.first() {
        Some(visit) => {
            says.push(format!("last visit {}", clock::day(visits::started(visit), at.now)));
        }
        None => says.push("no visit yet".to_owned()),
    }
    Ok(SiteRow {
        site: head.record.to_string(),
        name: head.body.title.clone(),
        says: says.join(", "),
        invented: head.body.invented,
    })
}

pub(crate) fn site_rows(at: &Asked<'_>) -> Result<Vec<SiteRow>, Fault> {
    let mut rows = Vec::new();
    for head in at.state.ledger.list(Kind::Site, Within::Everything)? {
        if !head.withdrawn {
            rows.push(site_row(at, &head)?);
        }
    }
    Ok(rows)
}

pub(crate) fn sites(at: &Asked<'_>) -> Result<Reply, Fault> {
    let mut sites = site_rows(at)?;
    sites.sort_by_key(|site| site.name.to_lowercase());
    Ok(Reply::Sites { sites })
}

pub(crate) fn site(at: &Asked<'_>, site: &str) -> Result<Reply, Fault> {
    let id = site_id(site)?;
    let head = site_head(at, site)?;
    let known: SiteBody = body(&head);
    let units = &at.state.units;
    let says = match known.elevation_m.map(Elevation::from_si) {
        Some(elevation) => {
            let height = show(elevation.amount(), units.get(Quantities::Elevation)).text();
            match atmosphere::pressure_at(elevation) {
                Ok(pressure) => {
                    let pressure = show(pressure.amount(), units.get(Quantities::Pressure)).text();
                    format!("{height}, air near {pressure} by the standard atmosphere")
                }
                Err(_) => height,
            }
        }
        None => "Elevation not known".to_owned(),
    };
    let mut equipment = Vec::new();
    for head in at.state.ledger.list(Kind::Equipment, Within::Site(id))? {
        if !head.withdrawn {
            equipment.push(equipment_row(at, &head)?);
        }
    }
    equipment.sort_by_key(|row| row.tag.to_lowercase());
    let unit = known
        .elevation
        .unit
        .as_deref()
        .and_then(Unit::find)
        .unwrap_or_else(|| units.get(Quantities::Elevation));
    Ok(Reply::Site(SiteView {
        site: site.to_owned(),
        name: head.body.title.clone(),
        says,
        elevation_text: known.elevation.text,
        elevation_unit: unit_view(unit),
        elevation_units: Unit::of(Quantities::Elevation).map(unit_view).collect(),
        note: known.note,
        invented: head.body.invented,
        equipment,
        visits: visits::rows(at, id)?,
        entries: entries::rows(at, Within::Site(id), 50)?,
    }))
}

fn equipment_row(at: &Asked<'_>, head: &Head) -> Result<EquipmentRow, Fault> {
    let known: EquipmentBody = body(head);
    let RecordId::Equipment(id) = head.record else {
        return Err(Fault::not_found("That equipment"));
    };
    let last = match at.state.ledger.last_entry_at(id)? {
        Some(when) if clock::same_day(when, at.now) => "last read today".to_owned(),
        Some(when) => format!("last read {}", clock::day(when, at.now)),
        None => "never read".to_owned(),
    };
    let says = if known.class.is_empty() {
        capital(&last)
    } else {
        format!("{}. {}", known.class, capital(&last))
    };
    Ok(EquipmentRow { equipment: head.record.to_string(), tag: head.body.title.clone(), says })
}

pub(crate) fn capital(text: &str) -> String {
    let mut characters = text.chars();
    characters
        .next()
        .map_or_else(String::new, |first| first.to_uppercase().chain(characters).collect())
}

pub(crate) fn save_site(
    at: &mut Asked<'_>,
    site: Option<&str>,
    name: &str,
    elevation: &TypedValue,
    note: &str,
) -> Result<Reply, Fault> {
    let name = name.trim();
    if name.is_empty() {
        return Err(Fault::at("name", "A site needs a name, as people call it."));
    }
    if name.chars().count() > 200 {
        return Err(Fault::at("name", "A name of up to 200 characters is enough."));
    }
    let unit = elevation
        .unit
        .as_deref()
        .and_then(Unit::find)
        .filter(|unit| unit.measures(Quantities::Elevation))
        .unwrap_or_else(|| at.state.units.get(Quantities::Elevation));
    let read = read(Quantities::Elevation, &elevation.text, unit)
        .map_err(|error| Fault::at("elevation", error.to_string()))?;
    let (elevation_m, used) = match read {
        Entry::NotRead => (None, unit),
        Entry::Read(typed) => (Some(typed.amount.si()), typed.unit),
    };
    if let Some(m) = elevation_m
        && !(-430.0..=5000.0).contains(&m)
    {
        return Err(Fault::at(
            "elevation",
            "Elevations run from −430 to 5 000 m here. Check the number and its unit.",
        ));
    }
    let text = json(&SiteBody {
        elevation: TypedValue {
            text: elevation.text.trim().to_owned(),
            unit: Some(used.id.to_owned()),
        },
        elevation_m,
        note: note.trim().to_owned(),
    })?;
    let new =
        Body { title: name.to_owned(), app_version: VERSION.to_owned(), text, ..Body::default() };
    let revision = match site {
        None => at.state.ledger.file(Kind::Site, at.now, &new, None)?,
        Some(id) => {
            let head = site_head(at, id)?;
            let new = Body { invented: head.body.invented, ..new };
            at.state.ledger.revise(&head, at.now, &new, None)?
        }
    };
    self::site(at, &revision.record.to_string())
}

pub(crate) fn equipment(at: &Asked<'_>, equipment: &str) -> Result<Reply, Fault> {
    let id = equipment_id(equipment)?;
    let head = at.state.ledger.head(RecordId::Equipment(id))?;
    let known: EquipmentBody = body(&head);
    let site = head.body.site.map(|site| site.to_string());
    let place = Place { site: site.clone(), equipment: Some(equipment.to_owned()), visit: None };
    let site = match &site {
        Some(site) => site_head(at, site)?.body.title,
        None => String::new(),
    };
    Ok(Reply::Equipment(EquipmentView {
        place,
        tag: head.body.title.clone(),
        class: known.class,
        note: known.note,
        site,
        invented: head.body.invented,
        entries: entries::rows(at, Within::Equipment(id), 100)?,
    }))
}

pub(crate) fn save_equipment(
    at: &mut Asked<'_>,
    equipment: Option<&str>,
    site: &str,
    typed: &EquipmentTyped,
) -> Result<Reply, Fault> {
    let tag = typed.tag.trim();
    if tag.is_empty() {
        return Err(Fault::at("tag", "Equipment needs a tag, as on its nameplate or drawing."));
    }
    if tag.chars().count() > 200 {
        return Err(Fault::at("tag", "A tag of up to 200 characters is enough."));
    }
    let owner = site_head(at, site)?;
    let text = json(&EquipmentBody {
        class: typed.class.trim().to_owned(),
        note: typed.note.trim().to_owned(),
    })?;
    let new = Body {
        site: Some(site_id(site)?),
        title: tag.to_owned(),
        invented: owner.body.invented,
        app_version: VERSION.to_owned(),
        text,
        ..Body::default()
    };
    let revision = match equipment {
        None => at.state.ledger.file(Kind::Equipment, at.now, &new, None)?,
        Some(id) => {
            let head = at.state.ledger.head(RecordId::Equipment(equipment_id(id)?))?;
            at.state.ledger.revise(&head, at.now, &new, None)?
        }
    };
    self::equipment(at, &revision.record.to_string())
}
