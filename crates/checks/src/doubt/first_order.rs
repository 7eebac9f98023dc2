//! First-order propagation around the readings.

use std::collections::BTreeMap;

use dewledger_quantities::Kind;

use super::{CURVED, Doubt, Term, combine, term};
use crate::check::Check;
use crate::form::Item;
use crate::given::{Given, Moved, Reading};
use crate::outcome::Outcome;

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

/// Every source of doubt of what is given.
#[must_use]
pub fn terms(check: &dyn Check, given: &Given) -> Vec<Term> {
    let mut terms = check.terms(given);
    terms.extend(term::of_readings(given, &names(check, given)));
    terms
}

/// What one source does to one result.
struct Effect {
    /// Contribution to its standard uncertainty, with its sign.
    by: f64,
    /// `|f(+) + f(-) - 2 f|`; 0 where one side was taken alone.
    bend: f64,
    /// Neither side alone tells how the result moves.
    broken: bool,
}

/// The doubt of every result of `outcome`.
pub(super) fn doubts(
    check: &dyn Check,
    given: &Given,
    outcome: &Outcome,
) -> BTreeMap<String, Doubt> {
    let names = names(check, given);
    let keys = outcome.figures.iter().filter(|figure| figure.amount.is_some());
    let mut doubts: BTreeMap<String, Doubt> =
        keys.map(|figure| (figure.key.to_string(), Doubt::default())).collect();
    for (key, reading) in given.readings() {
        let Some((source, covered)) = names.get(key) else { continue };
        if *covered || reading.half_width_si.is_some() {
            continue;
        }
        let probe = Term {
            source: source.clone(),
            moves: vec![(Moved::Reading(key.to_owned()), probing_step(reading))],
            freedom: f64::INFINITY,
        };
        for (figure, effect) in effects(check, given, outcome, &probe) {
            if effect.by != 0.0
                && let Some(doubt) = doubts.get_mut(&figure)
            {
                doubt.unknown.push(source.clone());
            }
        }
    }
    let mut parts: BTreeMap<String, Vec<(f64, f64)>> = BTreeMap::new();
    for term in &terms(check, given) {
        for (figure, effect) in effects(check, given, outcome, term) {
            if let Some(doubt) = doubts.get_mut(&figure) {
                doubt.shares.push((term.source.clone(), effect.by * effect.by));
                doubt.curvature += effect.bend;
                doubt.wants_draws |= effect.broken;
                parts.entry(figure).or_default().push((effect.by, term.freedom));
            }
        }
    }
    for (key, doubt) in &mut doubts {
        finish(doubt, parts.remove(key).unwrap_or_default());
    }
    doubts
}

fn finish(doubt: &mut Doubt, parts: Vec<(f64, f64)>) {
    let combined = combine(parts);
    doubt.u_si = combined.u;
    doubt.freedom = combined.freedom;
    if combined.u > 0.0 {
        doubt.curvature /= 2.0 * combined.u;
        doubt.wants_draws |= doubt.curvature > CURVED;
        for (_, part) in &mut doubt.shares {
            *part /= combined.u * combined.u;
        }
    }
    // Two parts of one source (offset and gain of a probe) are one line.
    let mut by_source: BTreeMap<String, f64> = BTreeMap::new();
    for (source, share) in doubt.shares.drain(..) {
        *by_source.entry(source).or_insert(0.0) += share;
    }
    doubt.shares = by_source.into_iter().filter(|(_, share)| *share > 0.0).collect();
    doubt.shares.sort_by(|one, other| other.1.total_cmp(&one.1));
    let known = doubt.unknown.is_empty() && combined.u > 0.0 && !doubt.wants_draws;
    doubt.half_width_si = known.then_some(combined.k * combined.u);
}

/// What one standard uncertainty of `term` does to each result that can still be worked out beside it.
fn effects(
    check: &dyn Check,
    given: &Given,
    central: &Outcome,
    term: &Term,
) -> Vec<(String, Effect)> {
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
    let (up_flat, down_flat) = (saturated(&up), saturated(&down));
    let (use_up, use_down) = match (up_flat, down_flat) {
        (true, false) if down.is_some() => (false, true),
        (false, true) if up.is_some() => (true, false),
        _ => (up.is_some(), down.is_some()),
    };
    let both_flat = up_flat && down_flat;
    central
        .figures
        .iter()
        .filter_map(|figure| {
            let middle = figure.amount?.si();
            let at = |side: &Option<Outcome>| Some(side.as_ref()?.amount(&figure.key)?.si());
            let up = if use_up { at(&up) } else { None };
            let down = if use_down { at(&down) } else { None };
            let effect = match (up, down) {
                (Some(up), Some(down)) => Effect {
                    by: 0.5 * (up - down),
                    bend: (up + down - 2.0 * middle).abs(),
                    // Saturated here and on both sides: how it moves is not seen from here.
                    broken: both_flat,
                },
                (Some(up), None) => Effect { by: up - middle, bend: 0.0, broken: false },
                (None, Some(down)) => Effect { by: middle - down, bend: 0.0, broken: false },
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
