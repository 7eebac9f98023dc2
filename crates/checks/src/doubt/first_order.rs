//! First-order propagation around the readings.

use std::collections::BTreeMap;

use dewledger_quantities::Kind;

use super::{CURVED, Doubt, StateDoubt, Term, combine, states::Scatter, term};
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
pub(super) struct Effect {
    /// Contribution to its standard uncertainty, with its sign.
    pub(super) by: f64,
    /// `|f(+) + f(-) - 2 f|`; 0 where one side was taken alone.
    bend: f64,
    /// Neither side alone tells how the result moves.
    broken: bool,
}

/// The doubt of every result and of every state of `outcome`.
pub(super) fn doubts(
    check: &dyn Check,
    given: &Given,
    outcome: &Outcome,
) -> (BTreeMap<String, Doubt>, BTreeMap<String, StateDoubt>) {
    let names = names(check, given);
    let mut scatter = Scatter::of(outcome);
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
        let sides = Sides::of(check, given, outcome, &probe);
        scatter.unknown(outcome, &sides);
        for (figure, effect) in sides.effects(outcome) {
            if effect.by != 0.0
                && let Some(doubt) = doubts.get_mut(&figure)
            {
                doubt.unknown.push(source.clone());
            }
        }
    }
    let mut parts: BTreeMap<String, Vec<(f64, f64)>> = BTreeMap::new();
    for term in &terms(check, given) {
        let sides = Sides::of(check, given, outcome, term);
        scatter.add(outcome, &sides);
        for (figure, effect) in sides.effects(outcome) {
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
    (doubts, scatter.finish())
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

/// The check worked out on both sides of one source of doubt.
pub(super) struct Sides {
    up: Option<Outcome>,
    down: Option<Outcome>,
    /// Saturated here and on both sides: how a result moves is not seen from here.
    both_flat: bool,
}

impl Sides {
    /// One standard uncertainty of `term` up and down, where the check can still be worked out.
    fn of(check: &dyn Check, given: &Given, central: &Outcome, term: &Term) -> Self {
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
        let both_flat = up_flat && down_flat;
        match (up_flat, down_flat) {
            (true, false) if down.is_some() => Self { up: None, down, both_flat },
            (false, true) if up.is_some() => Self { up, down: None, both_flat },
            _ => Self { up, down, both_flat },
        }
    }

    /// What the source does to the value `at` of the outcome, which is `middle` at the readings; none where neither side
    /// has it.
    pub(super) fn effect(
        &self,
        middle: f64,
        at: impl Fn(&Outcome) -> Option<f64>,
    ) -> Option<Effect> {
        let up = self.up.as_ref().and_then(&at);
        let down = self.down.as_ref().and_then(&at);
        match (up, down) {
            (Some(up), Some(down)) => Some(Effect {
                by: 0.5 * (up - down),
                bend: (up + down - 2.0 * middle).abs(),
                broken: self.both_flat,
            }),
            (Some(up), None) => Some(Effect { by: up - middle, bend: 0.0, broken: false }),
            (None, Some(down)) => Some(Effect { by: middle - down, bend: 0.0, broken: false }),
            (None, None) => None,
        }
    }

    /// What the source does to each result that can still be worked out beside it.
    fn effects(&self, central: &Outcome) -> Vec<(String, Effect)> {
        central
            .figures
            .iter()
            .filter_map(|figure| {
                let middle = figure.amount?.si();
                let effect = self.effect(middle, |side| Some(side.amount(&figure.key)?.si()))?;
                Some((figure.key.to_string(), effect))
            })
            .collect()
    }
}

/// A step small enough to stay physical and large enough to be seen, for asking only whether a result depends on
/// a reading.
fn probing_step(reading: &Reading) -> f64 {
    let value = reading.amount.si();
    if reading.amount.kind() == Kind::Temperature { 1e-3 } else { (value.abs() * 1e-5).max(1e-9) }
}
