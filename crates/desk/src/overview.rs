//! The first screen.

use dewledger_ledger::{Event, Kind, RecordId, Within};
use dewledger_quantities::{Elevation, Kind as Quantities, Quantity, show};

use crate::desk::Asked;
use crate::reply::{Fault, Here, Overview, Reply};
use crate::request::Place;
use crate::{drafts, entries, places, visits};

pub(crate) fn overview(at: &mut Asked<'_>, event: &Event) -> Result<Reply, Fault> {
    Ok(Reply::Overview(Overview {
        empty: at.state.ledger.is_empty()?,
        ledger_note: note(event),
        drafts: drafts::rows(at)?,
        here: here(at)?,
        entries: entries::rows(at, Within::Everything, 12)?,
        sites: places::site_rows(at)?,
    }))
}

/// What happened to the ledger's file, when a person should know.
fn note(event: &Event) -> Option<String> {
    match event {
        Event::Fresh | Event::Existing => None,
        Event::Migrated { copy } => Some(format!(
            "The ledger was brought up to date. A copy of the old one stands at {}.",
            copy.display()
        )),
        Event::SetAside { damaged, salvaged } => Some(format!(
            "The ledger was damaged and was set aside at {}. {} records and {} drafts could be read and were carried over.",
            damaged.display(),
            salvaged.records,
            salvaged.drafts
        )),
    }
}

/// The site visited last: today's visit if there is one.
fn here(at: &Asked<'_>) -> Result<Option<Here>, Fault> {
    let mut newest = at.state.ledger.list(Kind::Visit, Within::Everything)?;
    newest.retain(|visit| !visit.withdrawn);
    newest.sort_by_key(|visit| std::cmp::Reverse(visits::started(visit).ms));
    let site = match newest.first().and_then(|visit| visit.body.site) {
        Some(site) => Some(site),
        None => at
            .state
            .ledger
            .list(Kind::Site, Within::Everything)?
            .iter()
            .find(|site| !site.withdrawn)
            .and_then(|site| match site.record {
                RecordId::Site(id) => Some(id),
                RecordId::Equipment(_)
                | RecordId::Visit(_)
                | RecordId::Entry(_)
                | RecordId::Instrument(_) => None,
            }),
    };
    let Some(site) = site else { return Ok(None) };
    let head = at.state.ledger.head(RecordId::Site(site))?;
    let today = visits::today(at, site)?;
    let mut says = vec![match &today {
        Some(_) => "Visit of today".to_owned(),
        None => "No visit begun today".to_owned(),
    }];
    match &today {
        Some(visit) => says.extend(visits::pressure_line(at, visit)?),
        None => says.extend(visits::elevation_of(&head).map(|m| {
            show(Elevation::from_si(m).amount(), at.state.units.get(Quantities::Elevation)).text()
        })),
    }
    Ok(Some(Here {
        place: Place { site: Some(site.to_string()), equipment: None, visit: today },
        site: head.body.title,
        says: says.join(", "),
        invented: head.body.invented,
    }))
}
