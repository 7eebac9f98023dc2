//! Sources of doubt, one by one: what each moves.

use std::collections::BTreeMap;

use crate::given::{Given, Moved};
use crate::part::Source;

/// One source of doubt: what it moves by one standard uncertainty. A source may touch several readings, as the
/// calibration of a shared probe does.
#[derive(Debug, Clone, PartialEq)]
pub struct Term {
    /// What it is, for the list of what decides a ±.
    pub source: String,
    /// What it moves, in stored SI units.
    pub moves: Vec<(Moved, f64)>,
    /// Degrees of freedom; infinite where it is no estimate from repeats.
    pub freedom: f64,
}

impl Term {
    /// A source that moves one value worked out on the way by `u`, its standard uncertainty in SI.
    pub fn worked_out(source: impl Into<String>, moved: Moved, u: f64) -> Self {
        Self { source: source.into(), moves: vec![(moved, u)], freedom: f64::INFINITY }
    }

    fn of_reading(source: String, key: &str, u_si: f64, freedom: f64) -> Self {
        Self { source, moves: vec![(Moved::Reading(key.to_owned()), u_si)], freedom }
    }
}

/// The terms of the readings of `names` (key and name) that carry a ±: one for each part that is a reading's own, one
/// for each source that several share.
pub(super) fn of_readings(given: &Given, names: &BTreeMap<String, (String, bool)>) -> Vec<Term> {
    let mut terms = Vec::new();
    let mut shared: BTreeMap<&str, Term> = BTreeMap::new();
    for (key, reading) in given.readings() {
        // A reading that the form no longer asks for (another humidity was picked) moves nothing.
        let Some((name, _)) = names.get(key) else { continue };
        let parts = given.parts(key);
        if let (Some(half_width), []) = (reading.half_width_si, parts) {
            let u = half_width / super::COVERAGE_95;
            terms.push(Term::of_reading(name.clone(), key, u, f64::INFINITY));
        }
        for part in parts {
            let source = match &part.source {
                Source::Shared { id, name } => {
                    let term = shared.entry(id.as_str()).or_insert_with(|| Term {
                        source: name.clone(),
                        moves: Vec::new(),
                        freedom: part.freedom,
                    });
                    term.moves.push((Moved::Reading(key.to_owned()), part.u_si));
                    continue;
                }
                // A ± typed by hand is all there is to say of it.
                Source::Own if parts.len() == 1 => name.clone(),
                Source::Own => format!("{name}: the reading itself"),
                Source::Scatter => format!("{name}: scatter of its takes"),
                Source::Place => format!("{name}: where it was held"),
            };
            terms.push(Term::of_reading(source, key, part.u_si, part.freedom));
        }
    }
    terms.extend(shared.into_values());
    terms
}
