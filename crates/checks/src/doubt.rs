//! Doubt of results: solving again around the readings.
//!
//! First-order propagation (JCGM 100:2008, 5.1.3 note 2): each source moves what it touches by its own standard
//! uncertainty up and down, and half the difference is its contribution; the step is the uncertainty, so nothing
//! is tuned. Where one side is beyond saturation the other side is taken alone. Shares are by source, so they add
//! up to one and are never negative. A reading without a stated ± makes every result it touches "not known".

use std::collections::BTreeMap;

use dewledger_quantities::Kind;

use crate::check::Check;
use crate::form::Item;
use crate::given::{Given, Moved, Reading};
use crate::outcome::{Note, Outcome};
use crate::refusal::Stop;

/// Half-width of a 95 % interval over the standard uncertainty of a normal distribution.
pub const COVERAGE_95: f64 = 1.959_964;

/// One source of doubt: what it moves by one standard uncertainty. A source may touch several readings, as the
/// calibration of a shared probe does.
#[derive(Debug, Clone, PartialEq)]
pub struct Term {
    /// What it is, for the list of what decides a ±.
    pub source: String,
    /// What it moves, in stored SI units.
    pub moves: Vec<(Moved, f64)>,
}

impl Term {
    /// A source that moves one value worked out on the way by `u`, its standard uncertainty in SI.
    pub fn worked_out(source: impl Into<String>, moved: Moved, u: f64) -> Self {
        Self { source: source.into(), moves: vec![(moved, u)] }
    }
}

/// The doubt of one result.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Doubt {
    /// Standard uncertainty from the sources that are known, in stored SI units.
    pub u_si: f64,
    /// Half-width of the 95 % interval; none while a source is not known.
    pub half_width_si: Option<f64>,
    /// Sources with their shares of the variance, largest first, adding up to one.
    pub shares: Vec<(String, f64)>,
    /// Readings that it depends on and that carry no ±.
    pub unknown: Vec<String>,
}

/// A check worked out, with the doubt of its results.
#[derive(Debug, Clone)]
pub struct Worked {
    /// The answer.
    pub outcome: Outcome,
    /// Doubt by key of the result.
    pub doubts: BTreeMap<String, Doubt>,
}

/// Works a check out and carries the doubt of its readings through.
///
/// # Errors
///
/// As [`Check::solve`].
pub fn work_out(check: &dyn Check, given: &Given) -> Result<Worked, Stop> {
    let first = check.solve(given)?;
    let doubts = doubts(check, given, &first);
    // With the doubt known, a difference counts as resolved by that doubt instead of the floor for unstated ±.
    let mut informed = given.clone();
    for (key, doubt) in &doubts {
        if doubt.half_width_si.is_some() {
            informed.set_floor(key, 2.0 * doubt.u_si);
        }
    }
    let mut outcome = check.solve(&informed)?;
    let notes: Vec<Note> = check.judge(&informed, &outcome, &doubts);
    outcome.notes.extend(notes);
    outcome.notes.sort_by_key(|note| note.weight);
    Ok(Worked { outcome, doubts })
}

/// Names of readings by key, from the form ("Entering air, wet bulb"), and whether their doubt is covered.
fn names(check: &dyn Check, given: &Given) -> BTreeMap<String, (String, bool)> {
    let mut names = BTreeMap::new();
    for section in check.form(given) {
        for item in section.items {
            if let Item::Reading(reading) = item {
                let name = format!("{}, {}", section.title, reading.label.to_lowercase());
                names.insert(reading.key.into_owned(), (name, reading.covered));
            }
        }
    }
    names
}

/// The doubt of every result of `outcome`.
fn doubts(check: &dyn Check, given: &Given, outcome: &Outcome) -> BTreeMap<String, Doubt> {
    let names = names(check, given);
    let name = |key: &str| names.get(key).cloned();
    let mut doubts: BTreeMap<String, Doubt> = outcome
        .figures
        .iter()
        .filter(|figure| figure.amount.is_some())
        .map(|figure| (figure.key.to_string(), Doubt::default()))
        .collect();
    let mut terms = check.terms(given);
    for (key, reading) in given.readings() {
        // A reading that the form no longer asks for (another humidity was picked) moves nothing.
        let Some((source, covered)) = name(key) else { continue };
        match reading.half_width_si {
            Some(half_width) => terms.push(Term {
                source,
                moves: vec![(Moved::Reading(key.to_owned()), half_width / COVERAGE_95)],
            }),
            None if covered => {}
            None => {
                let probe = Term {
                    source: source.clone(),
                    moves: vec![(Moved::Reading(key.to_owned()), probing_step(reading))],
                };
                for (figure, effect) in effects(check, given, outcome, &probe) {
                    if effect != 0.0
                        && let Some(doubt) = doubts.get_mut(&figure)
                    {
                        doubt.unknown.push(source.clone());
                    }
                }
            }
        }
    }
    for term in &terms {
        for (figure, effect) in effects(check, given, outcome, term) {
            if let Some(doubt) = doubts.get_mut(&figure) {
                doubt.shares.push((term.source.clone(), effect * effect));
            }
        }
    }
    for doubt in doubts.values_mut() {
        let variance: f64 = doubt.shares.iter().map(|(_, part)| part).sum();
        doubt.u_si = variance.sqrt();
        if variance > 0.0 {
            for (_, part) in &mut doubt.shares {
                *part /= variance;
            }
        }
        doubt.shares.retain(|(_, share)| *share > 0.0);
        doubt.shares.sort_by(|one, other| other.1.total_cmp(&one.1));
        doubt.half_width_si =
            (doubt.unknown.is_empty() && variance > 0.0).then_some(COVERAGE_95 * doubt.u_si);
    }
    doubts
}

/// What one standard uncertainty of `term` does to each result that can still be worked out beside it.
fn effects(check: &dyn Check, given: &Given, central: &Outcome, term: &Term) -> Vec<(String, f64)> {
    let side = |sign: f64| {
        let moves: Vec<(Moved, f64)> =
            term.moves.iter().map(|(what, by)| (what.clone(), sign * by)).collect();
        check.solve(&given.moved(&moves)).ok()
    };
    let (up, down) = (side(1.0), side(-1.0));
    let saturated = |side: &Option<Outcome>| {
        side.as_ref().is_some_and(|side| {
            side.saturated.iter().any(|point| !central.saturated.contains(point))
                || (!central.saturated.is_empty() && side.saturated == central.saturated)
        })
    };
    // One side beyond saturation is flat: the other side alone tells how the result moves.
    let (use_up, use_down) = match (saturated(&up), saturated(&down)) {
        (true, false) if down.is_some() => (false, true),
        (false, true) if up.is_some() => (true, false),
        _ => (up.is_some(), down.is_some()),
    };
    central
        .figures
        .iter()
        .filter_map(|figure| {
            let middle = figure.amount?.si();
            let at = |side: &Option<Outcome>| Some(side.as_ref()?.amount(&figure.key)?.si());
            let up = if use_up { at(&up) } else { None };
            let down = if use_down { at(&down) } else { None };
            let effect = match (up, down) {
                (Some(up), Some(down)) => 0.5 * (up - down),
                (Some(up), None) => up - middle,
                (None, Some(down)) => middle - down,
                (None, None) => return None,
            };
            Some((figure.key.to_string(), effect))
        })
        .collect()
}

/// A step small enough to stay physical and large enough to be seen, for asking only whether a result depends on
/// a reading.
fn probing_step(reading: &Reading) -> f64 {
    let value = reading.amount.si();
    if reading.amount.kind() == Kind::Temperature { 1e-3 } else { (value.abs() * 1e-5).max(1e-9) }
}
