//! The doubt of air states: how far off a state may be, dry bulb and humidity ratio together.
//!
//! The two are worked out from the same readings, so they do not err apart from each other: a dry bulb read too high beside
//! a right wet bulb makes the humidity ratio too low. The covariance of both is carried through from the same sources as the
//! doubt of the results (JCGM 102:2011, 6.2).

use std::collections::BTreeMap;

use dewledger_quantities::Quantity;

use super::first_order::{Effect, Sides};
use crate::outcome::{Outcome, StatePoint};

/// The doubt of one air state to first order.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct StateDoubt {
    /// Standard uncertainty of the dry bulb, K; none while a reading that it depends on carries no ±.
    pub dry_bulb_k: Option<f64>,
    /// Standard uncertainty of the humidity ratio, kg/kg; none while a reading that it depends on carries no ±.
    pub humidity_ratio_kg_kg: Option<f64>,
    /// How far the two err together, −1 to 1; 0 where one of them is certain or not known.
    pub correlation: f64,
}

/// Variances and covariance as they add up.
#[derive(Debug, Clone, Copy)]
struct Sums {
    dry_bulb: f64,
    humidity_ratio: f64,
    both: f64,
    dry_bulb_known: bool,
    humidity_ratio_known: bool,
}

/// The doubt of all states, source by source.
pub(super) struct Scatter(BTreeMap<String, Sums>);

impl Scatter {
    pub(super) fn of(outcome: &Outcome) -> Self {
        let none = Sums {
            dry_bulb: 0.0,
            humidity_ratio: 0.0,
            both: 0.0,
            dry_bulb_known: true,
            humidity_ratio_known: true,
        };
        Self(outcome.states.iter().map(|state| (state.key.to_string(), none)).collect())
    }

    /// Adds what one source does to each state.
    pub(super) fn add(&mut self, central: &Outcome, sides: &Sides) {
        for state in &central.states {
            let (dry_bulb, humidity_ratio) = moves(state, sides);
            if let Some(sums) = self.0.get_mut(state.key.as_ref()) {
                sums.dry_bulb += dry_bulb * dry_bulb;
                sums.humidity_ratio += humidity_ratio * humidity_ratio;
                sums.both += dry_bulb * humidity_ratio;
            }
        }
    }

    /// Notes which states move with a reading that carries no ±.
    pub(super) fn unknown(&mut self, central: &Outcome, sides: &Sides) {
        for state in &central.states {
            let (dry_bulb, humidity_ratio) = moves(state, sides);
            if let Some(sums) = self.0.get_mut(state.key.as_ref()) {
                sums.dry_bulb_known &= dry_bulb == 0.0;
                sums.humidity_ratio_known &= humidity_ratio == 0.0;
            }
        }
    }

    pub(super) fn finish(self) -> BTreeMap<String, StateDoubt> {
        let of = |sums: Sums| {
            let known = sums.dry_bulb_known && sums.humidity_ratio_known;
            let scale = (sums.dry_bulb * sums.humidity_ratio).sqrt();
            let correlated = known && scale > 0.0;
            StateDoubt {
                dry_bulb_k: sums.dry_bulb_known.then(|| sums.dry_bulb.sqrt()),
                humidity_ratio_kg_kg: sums.humidity_ratio_known.then(|| sums.humidity_ratio.sqrt()),
                correlation: if correlated { (sums.both / scale).clamp(-1.0, 1.0) } else { 0.0 },
            }
        };
        self.0.into_iter().map(|(key, sums)| (key, of(sums))).collect()
    }
}

/// By how much a source moves a state: dry bulb in K, humidity ratio in kg/kg.
fn moves(state: &StatePoint, sides: &Sides) -> (f64, f64) {
    let of = |value: fn(&StatePoint) -> f64| {
        let same = |side: &Outcome| side.states.iter().find(|s| s.key == state.key).map(value);
        sides.effect(value(state), same).map_or(0.0, |Effect { by, .. }| by)
    };
    (of(|s| s.air.dry_bulb().si()), of(|s| s.air.humidity_ratio().si()))
}
