//! Doubt of results: how far they can be trusted, and what decides it.
//!
//! First order (JCGM 100:2008, 5.1.3 note 2): each source moves what it touches by its own standard uncertainty up and
//! down, and half the difference is its contribution; the step is the uncertainty, so nothing is tuned. Shares are by
//! source, so they add up to one and are never negative. A reading without a stated ± makes every result that it
//! touches "not known". Where the first order does not hold, draws (JCGM 101:2008) give an interval instead.

mod combine;
mod draws;
mod first_order;
mod states;
mod term;

use std::collections::BTreeMap;

pub use combine::{Combined, combine, quantile};
pub use draws::{DRAWS, Drawn, Interval, SEED, draw};
pub use first_order::terms;
pub use states::StateDoubt;
pub use term::Term;

use crate::check::Check;
use crate::given::Given;
use crate::outcome::{Note, Outcome};
use crate::refusal::Stop;
use crate::slips;

/// Half-width of a 95 % interval over the standard uncertainty of a normal distribution.
pub const COVERAGE_95: f64 = 1.959_963_984_540_054;

/// From this curvature on the first order does not stand by itself (a choice of this project).
pub const CURVED: f64 = 0.05;

/// The doubt of one result.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Doubt {
    /// Standard uncertainty from the sources that are known, in stored SI units.
    pub u_si: f64,
    /// Effective degrees of freedom (Welch-Satterthwaite, JCGM 100:2008 G.4); infinite where nothing was repeated.
    pub freedom: f64,
    /// Half-width of the 95 % interval; none while a source is not known, and where an interval stands instead.
    pub half_width_si: Option<f64>,
    /// The interval, where a half-width on both sides would mislead.
    pub interval: Option<Interval>,
    /// Sources with their shares of the variance, largest first, adding up to one.
    pub shares: Vec<(String, f64)>,
    /// Readings that it depends on and that carry no ±.
    pub unknown: Vec<String>,
    /// How curved it is over its own doubt: `sum |f(+) + f(-) - 2 f| / (2 u)`.
    pub curvature: f64,
    /// The first order does not stand by itself; draws decide.
    pub wants_draws: bool,
}

/// A check worked out, with the doubt of its results.
#[derive(Debug, Clone)]
pub struct Worked {
    /// The answer.
    pub outcome: Outcome,
    /// Doubt by key of the result.
    pub doubts: BTreeMap<String, Doubt>,
    /// Doubt by key of the air state.
    pub state_doubts: BTreeMap<String, StateDoubt>,
    /// What was given, with what is resolved by the known doubt.
    pub informed: Given,
}

/// Works a check out and carries the doubt of its readings through to first order. Results that first order does not
/// fit are left without a ± until [`Worked::settle`].
///
/// # Errors
///
/// As [`Check::solve`].
pub fn work_out(check: &dyn Check, given: &Given) -> Result<Worked, Stop> {
    let mut first = check.solve(given);
    if first.is_err() {
        slips::offer(check, given, &mut first);
    }
    let first = first?;
    let mut informed = given.clone();
    informed.keep(&first.kept);
    let (doubts, state_doubts) = first_order::doubts(check, &informed, &first);
    // With the doubt known, a difference counts as resolved by that doubt instead of the floor for unstated ±.
    for (key, doubt) in &doubts {
        if doubt.unknown.is_empty() && doubt.u_si > 0.0 {
            informed.set_floor(key, 2.0 * doubt.u_si);
        }
    }
    let mut result = check.solve(&informed);
    slips::offer(check, &informed, &mut result);
    let mut outcome = result?;
    let notes: Vec<Note> = check.judge(&informed, &outcome, &doubts);
    outcome.notes.extend(notes);
    outcome.notes.sort_by_key(|note| note.weight);
    Ok(Worked { outcome, doubts, state_doubts, informed })
}

impl Worked {
    /// Whether some result waits for draws.
    #[must_use]
    pub fn wants_draws(&self) -> bool {
        self.doubts.values().any(|doubt| doubt.wants_draws && doubt.unknown.is_empty())
    }

    /// Results that draws have to be made for.
    #[must_use]
    pub fn draw_keys(&self) -> Vec<String> {
        self.doubts
            .iter()
            .filter(|(_, doubt)| doubt.wants_draws && doubt.unknown.is_empty())
            .map(|(key, _)| key.clone())
            .collect()
    }

    /// Puts what the draws say in place of what first order could not: the ± where both agree (JCGM 101:2008, clause
    /// 8), else the interval.
    pub fn settle(&mut self, drawn: &Drawn) {
        for (key, doubt) in &mut self.doubts {
            if !doubt.wants_draws || !doubt.unknown.is_empty() {
                continue;
            }
            let (Some(value), Some(interval)) =
                (self.outcome.amount(key), drawn.intervals.get(key).copied())
            else {
                continue;
            };
            let half_width = combine::quantile(doubt.freedom) * doubt.u_si;
            if interval.is_empty() {
                // It does not depend on what is in doubt.
                doubt.wants_draws = false;
            } else if doubt.u_si > 0.0 && interval.agrees(value.si(), half_width, doubt.u_si) {
                doubt.half_width_si = Some(half_width);
            } else {
                doubt.interval = Some(interval);
            }
        }
    }
}
