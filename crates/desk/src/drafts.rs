//! Drafts: half-typed forms.

use dewledger_checks::find;
use dewledger_ledger::DraftId;
use serde::{Deserialize, Serialize};

use crate::bench::Bench;
use crate::clock;
use crate::desk::Asked;
use crate::form_view::work;
use crate::places;
use crate::reply::{DraftRow, Fault, FaultCode, FormOpened, Reply};
use crate::request::{Place, Typed};
use crate::typed::spelt_out;

/// A form as it is kept.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub(crate) struct Kept {
    pub(crate) check: String,
    pub(crate) typed: Typed,
    #[serde(default)]
    pub(crate) place: Place,
    #[serde(default)]
    pub(crate) corrects: Option<String>,
}

/// The check of an identifier.
pub(crate) fn check(id: &str) -> Result<&'static dyn dewledger_checks::Check, Fault> {
    find(id).ok_or_else(|| Fault::new(FaultCode::NotFound, format!("There is no check “{id}”.")))
}

pub(crate) fn draft_id(text: &str) -> Result<DraftId, Fault> {
    text.parse().map_err(|_| Fault::not_found("That draft"))
}

/// A form of a kept or filed state, drawn.
pub(crate) fn opened(at: &Asked<'_>, draft: Option<String>, kept: Kept) -> Result<Reply, Fault> {
    let check = check(&kept.check)?;
    let around = places::around(at, &kept.place, &kept.check, kept.corrects.as_deref())?;
    let solved = work(check, &kept.typed, &around, &at.state.units).solved;
    Ok(Reply::Form(Box::new(FormOpened {
        draft,
        corrects: kept.corrects,
        place: kept.place,
        typed: kept.typed,
        solved,
    })))
}

/// A new form, with what the place knows.
pub(crate) fn start(at: &Asked<'_>, id: &str, place: Place) -> Result<Reply, Fault> {
    check(id)?;
    let typed = places::known_of(at, &place)?;
    opened(at, None, Kept { check: id.to_owned(), typed, place, corrects: None })
}

pub(crate) fn keep(at: &mut Asked<'_>, draft: Option<String>, kept: Kept) -> Result<Reply, Fault> {
    let check = check(&kept.check)?;
    let title = check.about().label;
    let bench = Bench::at(at, &kept.place)?;
    let typed = spelt_out(&|given| check.form(given), kept.typed, &at.state.units, &bench);
    let kept = Kept { typed, ..kept };
    let id = draft.as_deref().map(draft_id).transpose()?;
    let text = serde_json::to_string(&kept)
        .map_err(|error| Fault::new(FaultCode::BadRequest, error.to_string()))?;
    let id = at.state.ledger.keep_draft(id, at.now, title, &text)?;
    Ok(Reply::DraftKept { draft: id.to_string(), at: clock::time(at.now) })
}

fn read(text: &str) -> Result<Kept, Fault> {
    serde_json::from_str(text).map_err(|_| {
        Fault::new(
            FaultCode::NotFound,
            "This draft was kept by another version and cannot be opened.",
        )
    })
}

pub(crate) fn open(at: &Asked<'_>, draft: &str) -> Result<Reply, Fault> {
    let kept = read(&at.state.ledger.draft(draft_id(draft)?)?.text)?;
    opened(at, Some(draft.to_owned()), kept)
}

pub(crate) fn discard(at: &mut Asked<'_>, draft: &str) -> Result<Reply, Fault> {
    at.state.ledger.discard_draft(draft_id(draft)?, at.now)?;
    Ok(Reply::Done { says: "Draft discarded".to_owned() })
}

pub(crate) fn restore(at: &mut Asked<'_>, draft: &str) -> Result<Reply, Fault> {
    let kept = read(&at.state.ledger.restore_draft(draft_id(draft)?)?.text)?;
    opened(at, Some(draft.to_owned()), kept)
}

/// Drafts for the first screen.
pub(crate) fn rows(at: &Asked<'_>) -> Result<Vec<DraftRow>, Fault> {
    let mut rows = Vec::new();
    for draft in at.state.ledger.drafts()? {
        let Ok(kept) = read(&draft.text) else { continue };
        let when =
            dewledger_ledger::At { ms: draft.kept_ms, utc_offset_min: at.now.utc_offset_min };
        let time = if clock::same_day(when, at.now) {
            clock::time(when)
        } else {
            format!("{}, {}", clock::day(when, at.now), clock::time(when))
        };
        let place = places::in_words(at, &kept.place)?;
        let says = if place.is_empty() { time } else { format!("{place}, {time}") };
        rows.push(DraftRow { draft: draft.id.to_string(), label: draft.title, says });
    }
    Ok(rows)
}
