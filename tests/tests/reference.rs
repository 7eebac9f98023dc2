//! Every check against CoolProp alone at inputs of our own, through the desk as a screen would ask.
//! Data and their sources: `tests/reference/README.md`.

#![expect(clippy::unwrap_used, reason = "a reference that cannot be read fails the test")]

use std::collections::BTreeMap;

use dewledger_desk::{Clock, Desk, Place, Reply, Request, Typed, TypedReading};
use serde_json::Value;

fn desk(folder: &tempfile::TempDir) -> Desk {
    let clock =
        Clock::new(|| jiff::Timestamp::UNIX_EPOCH.to_zoned_datetime(jiff::tz::TimeZone::UTC));
    Desk::open(&folder.path().join("ledger.dewledger"), clock).unwrap()
}

fn typed(case: &Value) -> Typed {
    let mut typed = Typed::default();
    for (key, value) in case["choices"].as_object().unwrap() {
        typed.choices.insert(key.clone(), value.as_str().unwrap().to_owned());
    }
    for (key, value) in case["readings"].as_object().unwrap() {
        // A number as a program writes it; more than three decimals are never ambiguous.
        let text = format!("{:.9}", value[0].as_f64().unwrap());
        let unit = Some(value[1].as_str().unwrap().to_owned());
        typed.readings.insert(key.clone(), TypedReading { text, unit, ..TypedReading::default() });
    }
    typed
}

#[test]
fn every_check_agrees_with_coolprop_at_other_inputs() {
    let folder = tempfile::tempdir().unwrap();
    let desk = desk(&folder);
    let all: Value = serde_json::from_str(include_str!("../reference/checks.json")).unwrap();
    let mut seen: BTreeMap<String, usize> = BTreeMap::new();
    for case in all["cases"].as_array().unwrap() {
        let (check, title) = (case["check"].as_str().unwrap(), case["title"].as_str().unwrap());
        let request =
            Request::Solve { check: check.to_owned(), typed: typed(case), place: Place::default() };
        let Reply::Solved(solved) = desk.handle(request).unwrap() else {
            unreachable!("solve answers solved")
        };
        let rows: Vec<_> = solved.groups.iter().flat_map(|group| &group.rows).collect();
        for (key, expected) in case["results"].as_object().unwrap() {
            let row = rows.iter().find(|row| row.key == *key);
            let ours = row.and_then(|row| row.value.as_ref()).map(|value| value.si);
            let ours =
                ours.unwrap_or_else(|| unreachable!("{title}: no {key}; {:?}", solved.waits));
            let number = |index: usize| expected[index].as_f64().unwrap();
            let (theirs, allowed) = (number(0), number(2) + number(1) * number(0).abs());
            assert!((ours - theirs).abs() <= allowed, "{title}, {key}: {ours} against {theirs}");
        }
        *seen.entry(check.to_owned()).or_insert(0) += 1;
    }
    let checks: Vec<&str> = dewledger_checks::ALL.iter().map(|check| check.about().id).collect();
    for check in checks {
        assert!(seen.contains_key(check), "no outside case for {check}");
    }
}
