//! What the tests of the checks share: worked cases from a file, readings in SI, sentences of refusals.

#![allow(dead_code, reason = "each test takes what it needs")]

use dewledger_checks::{Check, Given, Note, Outcome, Reading, Stop, find};
use dewledger_quantities::{Amount, Kind, Unit, UnitChoice};
use serde_json::Value;

/// A worked case of a file: its inputs and both routes to its results.
pub(crate) struct Case {
    id: String,
    value: Value,
}

impl Case {
    pub(crate) fn of(file: &str, id: &str) -> Self {
        let all: Value = serde_json::from_str(file).expect("the file is JSON");
        let cases = all["cases"].as_array().expect("it holds cases");
        let value = cases.iter().find(|case| case["id"] == id);
        Self { id: id.to_owned(), value: value.unwrap_or_else(|| panic!("no case {id}")).clone() }
    }

    pub(crate) fn input(&self, name: &str) -> f64 {
        self.value["inputs"][name]
            .as_f64()
            .unwrap_or_else(|| panic!("{}: no input {name}", self.id))
    }

    pub(crate) fn kelvin(&self, name: &str) -> f64 {
        self.input(name) + 273.15
    }

    /// Holds results against both routes: figure, output name, factor and offset from SI, relative and absolute
    /// tolerance.
    pub(crate) fn hold(&self, outcome: &Outcome, rows: &[(&str, &str, f64, f64, f64, f64)]) {
        for (figure, name, factor, offset, relative, absolute) in rows {
            let ours = si(outcome, figure) * factor + offset;
            for route in ["outputs", "second_route_CoolProp"] {
                let routes = &self.value[route];
                if routes.is_null() && route != "outputs" {
                    continue;
                }
                let theirs = routes[name].as_f64();
                let theirs = theirs.unwrap_or_else(|| panic!("{}: no {name} in {route}", self.id));
                let allowed = absolute + relative * theirs.abs();
                assert!(
                    (ours - theirs).abs() <= allowed,
                    "{}, {figure} against {name} of {route}: {ours}, {theirs}",
                    self.id
                );
            }
        }
    }
}

/// A result in its stored SI unit.
pub(crate) fn si(outcome: &Outcome, figure: &str) -> f64 {
    outcome.amount(figure).unwrap_or_else(|| panic!("no figure {figure}")).si()
}

/// Readings in SI and choices, put together.
pub(crate) fn given(choices: &[(&str, &str)], readings: &[(&str, Kind, f64)]) -> Given {
    let mut given = Given::default();
    for (key, value) in choices {
        given.choose(*key, *value);
    }
    for (key, kind, si) in readings {
        given.put(*key, Reading::new(Amount::new(*kind, *si)));
    }
    given
}

/// With a reading typed in a unit.
pub(crate) fn typed(given: &mut Given, key: &str, kind: Kind, unit: &str, number: f64) {
    let unit = Unit::find(unit).expect("it is a unit");
    let si = unit.to_si(kind, number).expect("it measures the kind");
    given.put(key, Reading { unit: Some(unit), ..Reading::new(Amount::new(kind, si)) });
}

pub(crate) fn solve(id: &str, given: &Given) -> Outcome {
    check(id).solve(given).unwrap_or_else(|stop| panic!("{id}: {stop:?}"))
}

pub(crate) fn check(id: &str) -> &'static dyn Check {
    find(id).expect("it is one of the checks")
}

/// The field, code and sentence (in SI units) of a refusal.
pub(crate) fn refused(id: &str, given: &Given) -> (String, &'static str, String) {
    match check(id).solve(given) {
        Err(Stop::Refused(refusal)) => {
            let says = refusal.says.say(&UnitChoice::si()).replace('\u{a0}', " ");
            (refusal.field.to_string(), refusal.code, says)
        }
        other => panic!("{id} does not refuse: {other:?}"),
    }
}

/// What is missing, by key.
pub(crate) fn waits(id: &str, given: &Given) -> Vec<String> {
    match check(id).solve(given) {
        Err(Stop::Waits(missing)) => missing.iter().map(|one| one.key.to_string()).collect(),
        other => panic!("{id} does not wait: {other:?}"),
    }
}

/// A note by its code.
pub(crate) fn note<'a>(outcome: &'a Outcome, code: &str) -> &'a Note {
    let found = outcome.notes.iter().find(|note| note.code == code);
    found.unwrap_or_else(|| {
        let codes: Vec<&str> = outcome.notes.iter().map(|note| note.code.as_ref()).collect();
        panic!("no note {code}: {codes:?}")
    })
}

/// A sentence in SI units, its spaces plain.
pub(crate) fn say(sentence: &dewledger_quantities::Sentence) -> String {
    sentence.say(&UnitChoice::si()).replace('\u{a0}', " ")
}

/// Why a result is withheld.
pub(crate) fn withheld(outcome: &Outcome, figure: &str) -> String {
    let figure = outcome.figure(figure).unwrap_or_else(|| panic!("no figure {figure}"));
    say(figure.withheld.as_ref().expect("it is withheld"))
}
