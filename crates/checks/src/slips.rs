//! Slips that would explain readings which do not fit: exactly six, tried one at a time, offered and never applied.
//!
//! Entering and leaving swapped, outdoor and return swapped, °F typed for °C, cfm for L/s, inches of water for Pa, a
//! sea-level pressure typed for the one here. A slip is offered where the readings are refused and would not be with
//! it, or where an unusual reading would be usual with it and nothing new would be.

use std::collections::BTreeSet;

use crate::check::Check;
use crate::form::Item;
use crate::given::Given;
use crate::outcome::{Change, Offer, Outcome, Weight};
use crate::pressure;
use crate::refusal::Stop;

/// A slip that would make the readings fit.
#[derive(Debug, Clone, PartialEq)]
pub struct Slip {
    /// What it would change.
    pub offer: Offer,
    /// Codes of the unusual notes that would go; empty where a refusal would.
    pub clears: Vec<String>,
}

/// Points that are taken for each other: prefixes of their keys, and the label of the offer.
const SWAPS: &[(&str, &str, &str)] = &[
    ("entering", "leaving", "Swap entering and leaving"),
    ("outdoor", "return", "Swap outdoor and return"),
];

/// A unit that stands for another one: typed, meant, label.
const UNITS: &[(&str, &str, &str)] = &[
    ("degC", "degF", "It was typed in °F"),
    ("L/s", "cfm", "It was typed in cfm"),
    ("Pa", "inH2O", "It was typed in in. of water"),
];

/// The slips that would make these readings fit; `result` is what they come to as they stand.
#[must_use]
pub fn find(check: &dyn Check, given: &Given, result: &Result<Outcome, Stop>) -> Vec<Slip> {
    let now = match result {
        Ok(outcome) => unusual(outcome),
        Err(Stop::Refused(_)) => BTreeSet::new(),
        Err(Stop::Waits(_)) => return Vec::new(),
    };
    let refused = result.is_err();
    if !refused && now.is_empty() {
        return Vec::new();
    }
    candidates(check, given)
        .into_iter()
        .filter_map(|offer| {
            let outcome = check.solve(&given.changed(&offer.changes)).ok()?;
            let then = unusual(&outcome);
            let fits = if refused { then.is_empty() } else { then.is_subset(&now) && then != now };
            fits.then(|| Slip { offer, clears: now.difference(&then).cloned().collect() })
        })
        .collect()
}

/// Puts the slips beside what they would explain: the refusal, or the first note that would go. An offer that stands
/// there already is not made twice.
pub fn offer(check: &dyn Check, given: &Given, result: &mut Result<Outcome, Stop>) {
    for slip in find(check, given, result) {
        let offers = match result {
            Err(Stop::Refused(refusal)) => Some(&mut refusal.offers),
            Ok(outcome) => outcome
                .notes
                .iter_mut()
                .find(|note| slip.clears.iter().any(|code| *code == note.code))
                .map(|note| &mut note.offers),
            Err(Stop::Waits(_)) => None,
        };
        let Some(offers) = offers else { continue };
        let same = |other: &Offer| {
            other.label == slip.offer.label
                || (other.changes.len() == slip.offer.changes.len()
                    && other.changes.iter().all(|change| slip.offer.changes.contains(change)))
        };
        if !offers.iter().any(same) {
            offers.push(slip.offer);
        }
    }
}

fn unusual(outcome: &Outcome) -> BTreeSet<String> {
    let unusual = outcome.notes.iter().filter(|note| note.weight == Weight::Unusual);
    unusual.map(|note| note.code.to_string()).collect()
}

/// What could have slipped in this form as it stands.
fn candidates(check: &dyn Check, given: &Given) -> Vec<Offer> {
    let form = check.form(given);
    let mut offers = Vec::new();
    for (one, other, label) in SWAPS {
        let has = |key: &str| form.iter().any(|section| section.key == key);
        if has(one) && has(other) {
            offers.push(Offer::new(label, swap(given, one, other)));
        }
    }
    for (typed, meant, label) in UNITS {
        let keys = |items: &[Item]| -> Vec<Change> {
            items
                .iter()
                .filter_map(|item| match item {
                    Item::Reading(item) => Some(item.key.clone()),
                    Item::Choice(_) => None,
                })
                .filter(|key| {
                    let unit = given.reading(key).and_then(|reading| reading.unit);
                    unit.is_some_and(|unit| unit.id == *typed)
                })
                .map(|key| Change::Unit(key, meant))
                .collect()
        };
        let mut all = Vec::new();
        for section in &form {
            let changes = keys(&section.items);
            if !changes.is_empty() {
                offers.push(Offer::new(label, changes.clone()));
                all.extend(changes);
            }
        }
        // One instrument, one habit: the same slip may run through the whole form.
        if offers.last().is_some_and(|offer| offer.changes.len() < all.len()) {
            offers.push(Offer::new(label, all));
        }
    }
    if given.choice(pressure::BY) == Some("read") && given.reading(pressure::READ).is_some() {
        offers.push(Offer::new(
            "It is a sea-level pressure",
            vec![
                Change::Move(pressure::READ.into(), pressure::SEA_LEVEL.into()),
                Change::Choose(pressure::BY.into(), "sea_level".into()),
            ],
        ));
    }
    offers
}

/// Exchanges all that stands at two points.
fn swap(given: &Given, one: &str, other: &str) -> Vec<Change> {
    let mut changes = Vec::new();
    let mut done = BTreeSet::new();
    for (key, _) in given.readings() {
        let Some((prefix, of)) = key.split_once('.') else { continue };
        if (prefix == one || prefix == other) && done.insert(of.to_owned()) {
            changes
                .push(Change::Swap(format!("{one}.{of}").into(), format!("{other}.{of}").into()));
        }
    }
    for of in ["humidity_by", "wick"] {
        let key = |point: &str| format!("{point}.{of}");
        let default = if of == "wick" { "not_said" } else { "wet_bulb" };
        let (a, b) = (given.choice_or(&key(one), default), given.choice_or(&key(other), default));
        if a != b {
            changes.push(Change::Choose(key(one).into(), b.to_owned().into()));
            changes.push(Change::Choose(key(other).into(), a.to_owned().into()));
        }
    }
    changes
}

#[cfg(test)]
mod tests {
    use dewledger_quantities::{Amount, Kind, Unit};

    use super::*;
    use crate::given::Reading;

    fn put(given: &mut Given, key: &str, kind: Kind, unit: &str, number: f64) {
        let unit = Unit::find(unit).unwrap();
        let amount = Amount::new(kind, unit.to_si(kind, number).unwrap());
        given.put(key, Reading { unit: Some(unit), ..Reading::new(amount) });
    }

    fn coil(unit: &str, air: [f64; 4]) -> Given {
        let mut given = Given::default();
        given.choose("pressure.by", "read");
        given.choose("flow.basis", "actual_leaving");
        put(&mut given, "pressure.read", Kind::Pressure, "kPa", 83.4);
        put(&mut given, "pressure.elevation", Kind::Elevation, "m", 1609.0);
        put(&mut given, "flow.rate", Kind::AirFlow, "L/s", 4700.0);
        let keys =
            ["entering.dry_bulb", "entering.wet_bulb", "leaving.dry_bulb", "leaving.wet_bulb"];
        for (key, number) in keys.into_iter().zip(air) {
            put(&mut given, key, Kind::Temperature, unit, number);
        }
        given
    }

    fn labels(id: &str, given: &Given) -> Vec<String> {
        let check = crate::find(id).unwrap();
        let found = find(check, given, &check.solve(given));
        found.iter().map(|slip| slip.offer.label.template().to_owned()).collect()
    }

    #[test]
    fn nothing_is_offered_where_everything_fits() {
        assert_eq!(labels("air_heat", &coil("degC", [26.7, 16.7, 12.8, 11.7])), [""; 0]);
    }

    #[test]
    fn fahrenheit_typed_for_celsius() {
        // 80 °F is beyond any air in °C together with 62 °C of wet bulb: it is refused or unusual, and fits in °F.
        let found = labels("air_heat", &coil("degC", [80.0, 62.0, 55.0, 53.0]));
        assert!(found.contains(&"It was typed in °F".to_owned()), "{found:?}");
    }

    #[test]
    fn a_sea_level_figure_typed_for_the_pressure_here() {
        let mut given = coil("degC", [26.7, 16.7, 12.8, 11.7]);
        put(&mut given, "pressure.read", Kind::Pressure, "kPa", 101.5);
        put(&mut given, "pressure.outdoor_temperature", Kind::Temperature, "degC", 20.0);
        let found = labels("air_heat", &given);
        assert!(found.contains(&"It is a sea-level pressure".to_owned()), "{found:?}");
    }

    #[test]
    fn entering_and_leaving_swapped() {
        // A drain that runs while the air seems to pick water up.
        let mut given = coil("degC", [12.8, 11.7, 26.7, 16.7]);
        put(&mut given, "fill1.volume", Kind::WaterVolume, "L", 4.0);
        put(&mut given, "fill1.time", Kind::Duration, "s", 2200.0);
        let found = labels("condensate", &given);
        assert_eq!(found, ["Swap entering and leaving"]);
    }

    #[test]
    fn an_offer_makes_what_it_says() {
        let check = crate::find("condensate").unwrap();
        let mut given = coil("degC", [12.8, 11.7, 26.7, 16.7]);
        put(&mut given, "fill1.volume", Kind::WaterVolume, "L", 4.0);
        put(&mut given, "fill1.time", Kind::Duration, "s", 2200.0);
        let found = find(check, &given, &check.solve(&given));
        let mended = check.solve(&given.changed(&found[0].offer.changes));
        assert!(mended.is_ok(), "{mended:?}");
    }
}
