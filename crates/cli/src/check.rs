//! `dewledger check`: one check from words on the command line, or JSON requests line by line.

use std::collections::BTreeSet;
use std::io::{self, BufRead, IsTerminal, Write};
use std::path::{Path, PathBuf};
use std::process::ExitCode;

use clap::ValueEnum;
use dewledger_desk::{
    Desk, FieldView, Place, Preset, Reply, Request, Solved, Stage, Typed, TypedReading,
    TypedRequirement, TypedValue,
};

use crate::clock;
use crate::readable;

/// Units of a readable answer.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(crate) enum Units {
    /// Inch-pound.
    Ip,
    /// SI.
    Si,
}

/// One check as asked for on the command line.
pub(crate) struct One {
    pub(crate) check: String,
    pub(crate) fields: Vec<String>,
    pub(crate) requirements: Vec<String>,
    pub(crate) units: Units,
    pub(crate) working: bool,
    pub(crate) ledger: Option<PathBuf>,
}

/// A desk, and the throw-away ledger behind it where none was named.
struct Opened {
    desk: Desk,
    throw_away: Option<PathBuf>,
}

impl Drop for Opened {
    fn drop(&mut self) {
        if let Some(folder) = &self.throw_away {
            // A folder that cannot be removed lies in the system's temporary place and goes with it.
            let _ = std::fs::remove_dir_all(folder);
        }
    }
}

fn open(ledger: Option<&Path>) -> Result<Opened, String> {
    let (path, throw_away) = match ledger {
        Some(path) => (path.to_owned(), None),
        None => {
            let mut random = [0_u8; 8];
            getrandom::fill(&mut random).map_err(|error| error.to_string())?;
            let name = format!("dewledger-{:016x}", u64::from_le_bytes(random));
            let folder = std::env::temp_dir().join(name);
            (folder.join("ledger.dewledger"), Some(folder))
        }
    };
    let desk = Desk::open(&path, clock::system()).map_err(|error| error.to_string())?;
    Ok(Opened { desk, throw_away })
}

fn fail(says: &str) -> ExitCode {
    eprintln!("dewledger check: {says}");
    ExitCode::from(2)
}

/// Lists the checks.
pub(crate) fn list() -> ExitCode {
    let opened = match open(None) {
        Ok(opened) => opened,
        Err(says) => return fail(&says),
    };
    let Ok(Reply::Checks { checks }) = opened.desk.handle(Request::Checks {}) else {
        return fail("the checks cannot be listed");
    };
    let width = checks.iter().map(|check| check.id.len()).max().unwrap_or(0);
    let mut out = io::stdout().lock();
    for check in checks {
        let row = format!("{:width$}  {}: {}", check.id, check.label, check.takes);
        if writeln!(out, "{row}").is_err() {
            break;
        }
    }
    ExitCode::SUCCESS
}

/// Answers JSON requests, one a line, until the input ends.
pub(crate) fn answer_lines(ledger: Option<&Path>) -> ExitCode {
    if io::stdin().is_terminal() {
        eprintln!(
            "dewledger check reads JSON requests, one a line (end with Ctrl-D); see dewledger check --help"
        );
    }
    let opened = match open(ledger) {
        Ok(opened) => opened,
        Err(says) => return fail(&says),
    };
    let mut status = ExitCode::SUCCESS;
    let mut out = io::stdout().lock();
    for line in io::stdin().lock().lines() {
        let line = match line {
            Ok(line) if line.trim().is_empty() => continue,
            Ok(line) => line,
            Err(error) => return fail(&error.to_string()),
        };
        let answer = opened.desk.answer(&line);
        if answer.starts_with("{\"fault\"") {
            status = ExitCode::from(1);
        }
        if writeln!(out, "{answer}").and_then(|()| out.flush()).is_err() {
            break;
        }
    }
    status
}

/// Splits `key=value` words. Each stands among both choices and readings: the form takes what it knows. A value may carry its ± behind the sign: `80 F ± 0.5`.
fn typed(fields: &[String]) -> Result<Typed, String> {
    let mut typed = Typed::default();
    for field in fields {
        let (key, value) =
            field.split_once('=').ok_or_else(|| format!("“{field}” is not FIELD=VALUE"))?;
        let (text, plus_minus) = match value.split_once('±').or_else(|| value.split_once("+-")) {
            Some((text, width)) => {
                (text.trim(), Some(TypedValue { text: width.trim().to_owned(), unit: None }))
            }
            None => (value.trim(), None),
        };
        typed.choices.insert(key.to_owned(), value.trim().to_owned());
        typed.readings.insert(
            key.to_owned(),
            TypedReading { text: text.to_owned(), plus_minus, ..TypedReading::default() },
        );
    }
    Ok(typed)
}

/// A requirement in words: "total at least 48 kW", "latent between 9 and 10 kW", "share within 20 % +- 5 %".
fn requirement(words: &str) -> Result<TypedRequirement, String> {
    let bad = || {
        format!(
            "“{words}” is no requirement: write \"total at least 48 kW\", \"at most\", \"between 40 and 50 kW\" or \"within 50 kW +- 5 %\""
        )
    };
    let (figure, rest) = words.trim().split_once(' ').ok_or_else(bad)?;
    let value = |text: &str| TypedValue { text: text.trim().to_owned(), unit: None };
    let (direction, value, other) = if let Some(limit) = rest.strip_prefix("at least ") {
        ("at_least", value(limit), TypedValue::default())
    } else if let Some(limit) = rest.strip_prefix("at most ") {
        ("at_most", value(limit), TypedValue::default())
    } else if let Some((low, high)) =
        rest.strip_prefix("between ").and_then(|rest| rest.split_once(" and "))
    {
        // "40 and 50 kW": the unit behind the second counts for both.
        let unit = high.trim_start_matches(|c: char| c.is_ascii_digit() || " .,-−+".contains(c));
        let bare = low.trim().ends_with(|c: char| c.is_ascii_digit());
        let low = if bare { format!("{} {unit}", low.trim()) } else { low.to_owned() };
        ("between", value(&low), value(high))
    } else {
        let within = rest.strip_prefix("within ").ok_or_else(bad)?;
        let (nominal, tolerance) =
            within.split_once('±').or_else(|| within.split_once("+-")).ok_or_else(bad)?;
        ("within", value(nominal), value(tolerance))
    };
    Ok(TypedRequirement {
        figure: figure.to_owned(),
        direction: direction.to_owned(),
        value,
        other,
        ..TypedRequirement::default()
    })
}

/// Works out one check and prints it for a person.
pub(crate) fn one(asked: &One) -> ExitCode {
    let opened = match open(asked.ledger.as_deref()) {
        Ok(opened) => opened,
        Err(says) => return fail(&says),
    };
    let mut typed = match typed(&asked.fields) {
        Ok(typed) => typed,
        Err(says) => return fail(&says),
    };
    for asked in &asked.requirements {
        match requirement(asked) {
            Ok(requirement) => typed.requirements.push(requirement),
            Err(says) => return fail(&says),
        }
    }
    // In a named ledger the person's own units stand; a throw-away one is told which.
    if asked.ledger.is_none() {
        let preset = if asked.units == Units::Ip { Preset::Ip } else { Preset::Si };
        if let Err(fault) = opened.desk.handle(Request::ChoosePreset { preset }) {
            return fail(&fault.message);
        }
    }
    // Nobody types on meanwhile: results that want draws get them at once.
    let request = Request::Draw { check: asked.check.clone(), typed, place: Place::default() };
    let solved = match opened.desk.handle(request) {
        Ok(Reply::Solved(solved)) => solved,
        Ok(_) => return fail("the desk answered another question"),
        Err(fault) => return fail(&fault.message),
    };
    if let Some(unknown) = unknown_field(&solved, &asked.fields) {
        return fail(&format!(
            "this check asks for no “{unknown}”; dewledger check {} shows its fields",
            asked.check
        ));
    }
    let mut out = io::stdout().lock();
    let text = if asked.fields.is_empty() {
        readable::form(&solved)
    } else {
        readable::answer(&solved, asked.working)
    };
    let _ = out.write_all(text.as_bytes());
    match solved.stage {
        Stage::Solved => ExitCode::SUCCESS,
        Stage::Waiting | Stage::Refused if asked.fields.is_empty() => ExitCode::SUCCESS,
        Stage::Waiting | Stage::Refused => ExitCode::from(1),
    }
}

/// The first word that names neither a reading nor a choice of the form.
fn unknown_field(solved: &Solved, fields: &[String]) -> Option<String> {
    let mut known: BTreeSet<&str> = BTreeSet::new();
    for section in &solved.sections {
        for field in &section.fields {
            match field {
                FieldView::Reading(reading) => {
                    known.insert(&reading.key);
                    if let Some(pick) = &reading.pick {
                        known.insert(&pick.key);
                    }
                }
                FieldView::Choice(choice) => {
                    known.insert(&choice.key);
                }
            }
        }
        for act in &section.acts {
            for change in &act.changes {
                if let dewledger_desk::Change::Choose { key, .. } = change {
                    known.insert(key);
                }
            }
        }
    }
    fields
        .iter()
        .filter_map(|field| field.split_once('='))
        .map(|(key, _)| key)
        .find(|key| !known.contains(key))
        .map(str::to_owned)
}
