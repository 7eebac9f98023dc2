//! What is asked of results, and the answers: *meets*, *falls short* or *goes over*, *cannot be told*.

use std::collections::BTreeMap;

use dewledger_checks::doubt::{Doubt, Drawn, Worked};
use dewledger_checks::form::Item;
use dewledger_checks::verdict::{
    Answer, Asked, Decides, USUAL_RISK, Verdict, judge, normalised_error,
};
use dewledger_checks::{Figure, Label};
use dewledger_quantities::{
    Amount, Entry, Kind, PlusMinus, Quantity, Sentence, Share, Unit, UnitChoice, read,
    read_plus_minus,
};
use serde::{Deserialize, Serialize};

use crate::answer::Words;
use crate::form_view::unit_view;
use crate::probe::number;
use crate::reply::{
    BeforeView, ConditionView, FieldError, Message, OptionView, RequirableView, RequirementsView,
    VerdictView,
};
use crate::request::{TypedRequirement, TypedValue};
use crate::typed::Readout;

/// A verdict as it is stored.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub(crate) struct StoredVerdict {
    pub(crate) asked: Words,
    pub(crate) answer: Option<String>,
    pub(crate) says: Option<Words>,
    pub(crate) met: Option<f64>,
    pub(crate) decides: Vec<Words>,
    pub(crate) share: Option<Words>,
    pub(crate) why_not: Option<Words>,
    /// What is wrong with it as typed; such a requirement is not filed.
    #[serde(skip)]
    pub(crate) errors: Vec<FieldError>,
}

/// Directions: identifier, label, help.
const DIRECTIONS: &[(&str, &str, &str)] = &[
    ("at_least", "At least", ""),
    ("at_most", "At most", ""),
    ("between", "Between two limits", ""),
    ("within", "Nominal, with a tolerance", "A figure and how far it may be missed either way"),
];

/// A requirement that has been read.
struct ReadRequirement {
    asked: Asked,
    risk: f64,
    /// Half-width of the requirement itself.
    own_si: Option<f64>,
    /// The figure that a share is taken of.
    nominal_si: f64,
    /// It was stated as a figure with a tolerance, not as two limits.
    nominal: bool,
    words: Sentence,
}

/// Whether a figure's magnitude is what a person speaks of: heat removed is typed as a positive number.
fn flipped(figure: &Figure) -> bool {
    matches!(figure.label, Label::Signed { .. })
        && figure.amount.is_some_and(|amount| amount.si() < 0.0)
}

fn label(figure: &Figure) -> String {
    match &figure.label {
        Label::Plain(label) => label.to_string(),
        Label::Signed { lost, .. } if flipped(figure) => (*lost).to_owned(),
        Label::Signed { gained, .. } => (*gained).to_owned(),
    }
}

/// Answers to all that is asked. `drawn` where draws were made.
pub(crate) fn verdicts(
    worked: &Worked,
    drawn: Option<&Drawn>,
    read: &Readout,
    typed: &[TypedRequirement],
    units: &UnitChoice,
) -> Vec<StoredVerdict> {
    typed.iter().map(|typed| one(worked, drawn, read, typed, units)).collect()
}

/// A requirement without an answer.
fn unanswered(asked: Words, why_not: Option<Sentence>, errors: Vec<FieldError>) -> StoredVerdict {
    StoredVerdict {
        asked,
        answer: None,
        says: None,
        met: None,
        decides: Vec::new(),
        share: None,
        why_not: why_not.as_ref().map(Words::of),
        errors,
    }
}

fn one(
    worked: &Worked,
    drawn: Option<&Drawn>,
    read: &Readout,
    typed: &TypedRequirement,
    units: &UnitChoice,
) -> StoredVerdict {
    let raw = || Words::of(&Sentence::new("{w0}").word(typed.value.text.trim().to_owned()));
    let figure = worked.outcome.figure(&typed.figure);
    let Some((figure, amount)) = figure.and_then(|figure| Some((figure, figure.amount?))) else {
        let why = Sentence::new("It waits for the result that it is about.");
        return unanswered(raw(), Some(why), Vec::new());
    };
    let requirement = match read_requirement(figure, amount.kind(), typed, units) {
        Ok(requirement) => requirement,
        Err(errors) => return unanswered(raw(), None, errors),
    };
    let asked = Words::of(&requirement.words);
    let conditions = match conditions(read, typed, units) {
        Ok(conditions) => conditions,
        Err(errors) => return unanswered(asked, None, errors),
    };
    if let Some(why) = conditions.differ {
        return unanswered(asked, Some(why), Vec::new());
    }
    let doubt = worked.doubts.get(typed.figure.as_str()).cloned().unwrap_or_default();
    let sign = if flipped(figure) { -1.0 } else { 1.0 };
    let value = sign * amount.si();
    let sorted = drawn.and_then(|drawn| drawn.sorted.get(&typed.figure)).map(|sorted| {
        let mut sorted: Vec<f64> = sorted.iter().map(|si| sign * si).collect();
        sorted.sort_by(f64::total_cmp);
        sorted
    });
    let share = share(&requirement, value, amount.kind(), conditions.agree);
    let Some(verdict) =
        judge(value, &doubt, sorted.as_deref(), requirement.asked, requirement.risk)
    else {
        let mut stored =
            unanswered(asked, Some(why_no_answer(&doubt, drawn.is_some())), Vec::new());
        stored.share = share.as_ref().map(Words::of);
        return stored;
    };
    StoredVerdict {
        asked,
        answer: Some(answer_id(verdict.answer).to_owned()),
        says: Some(Words::of(&says(&verdict, &requirement, value, amount.kind(), &doubt))),
        met: Some(verdict.met),
        decides: decides(verdict.decides.as_ref()).iter().map(Words::of).collect(),
        share: share.as_ref().map(Words::of),
        why_not: None,
        errors: Vec::new(),
    }
}

fn why_no_answer(doubt: &Doubt, drawn: bool) -> Sentence {
    if let Some(first) = doubt.unknown.first() {
        return Sentence::new(
            "Its ± is not known: say what was used for {w0}, or type a ± beside it.",
        )
        .word(first.clone());
    }
    if doubt.wants_draws && !drawn {
        return Sentence::new("Its ± is being worked out.");
    }
    if doubt.wants_draws {
        return Sentence::new("No interval can be given for it, so nothing can be told.");
    }
    Sentence::new("No reading that it depends on carries a ±: say what each was read with.")
}

fn answer_id(answer: Answer) -> &'static str {
    match answer {
        Answer::Meets => "meets",
        Answer::FallsShort => "falls_short",
        Answer::GoesOver => "goes_over",
        Answer::CannotBeTold => "cannot_be_told",
    }
}

fn word(answer: &str) -> &'static str {
    match answer {
        "meets" => "Meets",
        "falls_short" => "Falls short",
        "goes_over" => "Goes over",
        _ => "Cannot be told with these readings",
    }
}

/// Reads what is asked, in the words and the sign of the figure as it stands.
fn read_requirement(
    figure: &Figure,
    kind: Kind,
    typed: &TypedRequirement,
    units: &UnitChoice,
) -> Result<ReadRequirement, Vec<FieldError>> {
    let mut errors = Vec::new();
    let mut wrong = |field: &str, says: String| {
        errors.push(FieldError { field: field.to_owned(), says });
    };
    let mut value = |field: &str, typed: &TypedValue| -> Option<Amount> {
        match read(kind, &typed.text, unit(kind, typed, units)) {
            Ok(Entry::Read(number)) => Some(number.amount),
            Ok(Entry::NotRead) => {
                wrong(field, "Type the figure that is asked for.".to_owned());
                None
            }
            Err(error) => {
                wrong(field, error.to_string());
                None
            }
        }
    };
    let first = value("value", &typed.value);
    let second = (typed.direction == "between").then(|| value("other", &typed.other)).flatten();
    let mut width = |field: &str, typed: &TypedValue| -> Option<f64> {
        let nominal = first.map_or(0.0, |amount| amount.si().abs());
        match read_plus_minus(kind, &typed.text, unit(kind, typed, units)) {
            Ok(Some(PlusMinus::Absolute(width))) => Some(width),
            Ok(Some(PlusMinus::Relative(share))) => Some(share * nominal),
            Ok(None) => None,
            Err(error) => {
                wrong(field, error.to_string());
                None
            }
        }
    };
    let tolerance = if typed.direction == "within" { width("other", &typed.other) } else { None };
    let own_si = width("plus_minus", &typed.plus_minus);
    let risk = match number(&typed.risk) {
        Ok(None) => USUAL_RISK,
        Ok(Some(risk)) if risk > 0.0 && risk < 50.0 => risk / 100.0,
        Ok(Some(_)) => {
            wrong("risk", "The risk lies between 0 and 50 %.".to_owned());
            USUAL_RISK
        }
        Err(says) => {
            wrong("risk", says);
            USUAL_RISK
        }
    };
    if typed.direction == "within" && tolerance.is_none() {
        wrong("other", "Type how far the figure may be missed.".to_owned());
    }
    if let (Some(low), Some(high)) = (first, second)
        && low.si() >= high.si()
    {
        wrong("other", "The upper limit must lie above the lower one.".to_owned());
    }
    let Some(first) = first.filter(|_| errors.is_empty()) else { return Err(errors) };
    let source = typed.source.trim();
    let name = label(figure);
    let words = |template: &'static str| {
        let template =
            if source.is_empty() { template.to_owned() } else { format!("{template}, by {{w1}}") };
        Sentence::new(template).word(name.clone()).word(source.to_owned())
    };
    let (asked, words) = match (typed.direction.as_str(), second, tolerance) {
        ("between", Some(second), _) => (
            Asked::Between(first.si(), second.si()),
            words("{w0}: between {0} and {1}").with(first).with(second),
        ),
        ("within", _, Some(tolerance)) => (
            Asked::Between(first.si() - tolerance, first.si() + tolerance),
            words("{w0}: {0} within ± {1}")
                .with(first)
                .with(Amount::new(kind.difference(), tolerance)),
        ),
        ("at_most", ..) => (Asked::AtMost(first.si()), words("{w0}: at most {0}").with(first)),
        _ => (Asked::AtLeast(first.si()), words("{w0}: at least {0}").with(first)),
    };
    let nominal = typed.direction == "within";
    Ok(ReadRequirement { asked, risk, own_si, nominal_si: first.si(), nominal, words })
}

fn unit(kind: Kind, typed: &TypedValue, units: &UnitChoice) -> &'static Unit {
    typed
        .unit
        .as_deref()
        .and_then(Unit::find)
        .filter(|unit| unit.measures(kind) || unit.measures(kind.difference()) || unit.id == "%")
        .unwrap_or_else(|| units.get(kind))
}

/// Today's readings beside the conditions of a rating.
struct Conditions {
    /// Conditions are typed, and today's readings agree with them.
    agree: bool,
    /// The first that does not.
    differ: Option<Sentence>,
}

/// How far a reading may lie from a condition where its ± says less: common practice.
fn allowance(kind: Kind, condition: Amount) -> f64 {
    if kind == Kind::Temperature {
        0.5
    } else if kind == Kind::RelativeHumidity {
        0.03
    } else {
        0.05 * condition.si().abs()
    }
}

fn conditions(
    readout: &Readout,
    typed: &TypedRequirement,
    units: &UnitChoice,
) -> Result<Conditions, Vec<FieldError>> {
    let names = names(readout);
    let mut conditions = Conditions { agree: false, differ: None };
    for (key, condition) in &typed.conditions {
        let Some((name, kind)) = names.get(key.as_str()) else { continue };
        let amount = match read(*kind, &condition.text, unit(*kind, condition, units)) {
            Ok(Entry::Read(number)) => number.amount,
            Ok(Entry::NotRead) => continue,
            Err(error) => {
                let field = format!("conditions.{key}");
                return Err(vec![FieldError { field, says: error.to_string() }]);
            }
        };
        let Some(reading) = readout.given.reading(key) else {
            conditions.differ = Some(
                Sentence::new("The requirement holds at {w0} {0}; that was not read today.")
                    .with(amount)
                    .word(name.to_lowercase()),
            );
            return Ok(conditions);
        };
        let allowed = allowance(*kind, amount).max(reading.half_width_si.unwrap_or(0.0));
        if (reading.amount.si() - amount.si()).abs() > allowed {
            conditions.differ = Some(
                Sentence::new(
                    "The requirement holds at {w0} {0}; these readings were taken at {1}.",
                )
                .with(amount)
                .with(reading.amount)
                .word(name.to_lowercase()),
            );
            return Ok(conditions);
        }
        conditions.agree = true;
    }
    Ok(conditions)
}

/// Readings that a condition can name: "Entering air, dry bulb".
fn names(readout: &Readout) -> BTreeMap<&str, (String, Kind)> {
    let mut names = BTreeMap::new();
    for section in &readout.sections {
        for item in &section.items {
            if let Item::Reading(item) = item
                && crate::read_with::asked_of(item)
            {
                let name = format!("{}, {}", section.title, item.label.to_lowercase());
                names.insert(item.key.as_ref(), (name, item.kind));
            }
        }
    }
    names
}

/// A share of a design figure, or why none is given: only heat is spoken of so.
fn share(
    requirement: &ReadRequirement,
    value: f64,
    kind: Kind,
    like_for_like: bool,
) -> Option<Sentence> {
    let band = matches!(requirement.asked, Asked::Between(..)) && !requirement.nominal;
    if kind != Kind::Power || requirement.nominal_si == 0.0 || band {
        return None;
    }
    let nominal = Amount::new(kind, requirement.nominal_si);
    Some(if like_for_like {
        Sentence::new("{0} of {1}, at the conditions that it holds at.")
            .with(Share::from_si(value / requirement.nominal_si).amount())
            .with(nominal)
    } else {
        Sentence::new(
            "No share of {0} is given: the conditions that it holds at are not typed beside it.",
        )
        .with(nominal)
    })
}

fn says(
    verdict: &Verdict,
    requirement: &ReadRequirement,
    value: f64,
    kind: Kind,
    doubt: &Doubt,
) -> Sentence {
    let amount = Amount::new(kind, value);
    let difference = |si: f64| Amount::new(kind.difference(), si.abs());
    if let (Some(own), Some(half_width)) = (requirement.own_si, doubt.half_width_si) {
        let error = normalised_error(value, half_width, requirement.nominal_si, own);
        let template = if error <= 1.0 {
            "Read {0}: with the ± of both, {1} and {2}, the two do not disagree. That does not show that the figure is met."
        } else {
            "Read {0}: that disagrees with it by more than the ± of both, {1} and {2}."
        };
        return Sentence::new(template)
            .with(amount)
            .with(difference(half_width))
            .with(difference(own));
    }
    if verdict.never {
        return Sentence::new(
            "The band is narrower than what these instruments could ever show. Read {0}.",
        )
        .with(amount);
    }
    let limit = match requirement.asked {
        Asked::AtLeast(limit) | Asked::AtMost(limit) => limit,
        Asked::Between(low, high) => {
            if (value - low).abs() < (value - high).abs() {
                low
            } else {
                high
            }
        }
    };
    let Some(guard) = verdict.guard_si else {
        return Sentence::new("Read {0}. Its interval is lopsided: the share of draws decides.")
            .with(amount);
    };
    let side = if value >= limit { "above" } else { "below" };
    let enough = (value - limit).abs() >= guard;
    let template = if enough {
        "Read {0}, {1} {w0} the limit; {2} is needed to say so."
    } else {
        "Read {0}, {1} {w0} the limit; {2} would be needed to say so."
    };
    Sentence::new(template)
        .with(amount)
        .with(difference(value - limit))
        .with(difference(guard))
        .word(side)
}

/// What would decide, one sentence each.
fn decides(decides: Option<&Decides>) -> Vec<Sentence> {
    match decides {
        None => Vec::new(),
        Some(Decides::AnyOf(any)) => any
            .iter()
            .take(3)
            .map(|(source, factor)| {
                Sentence::new("This would decide it: {w0}, with its part of the ± brought down to {0} of what it is.")
                    .with(Share::from_si(*factor).amount())
                    .word(source.clone())
            })
            .collect(),
        Some(Decides::Together(sources)) => vec![
            Sentence::new(
                "No single reading would decide it. At least these would have to improve together: {w0}.",
            )
            .word(sources.join("; ")),
        ],
        Some(Decides::Nothing) => {
            vec![Sentence::new("The result lies on the limit: no better reading would decide it.")]
        }
    }
}

/// A stored verdict in the reader's units.
pub(crate) fn view(index: usize, stored: &StoredVerdict, units: &UnitChoice) -> VerdictView {
    let chance = stored.met.map(|met| {
        let percent = Unit::find("%").map_or_else(String::new, |unit| {
            dewledger_quantities::show(Share::from_si(met).amount(), unit).text()
        });
        match met {
            met if met > 0.999 => "more than 99.9\u{a0}% likely to be met".to_owned(),
            met if met < 0.001 => "less than 0.1\u{a0}% likely to be met".to_owned(),
            _ => format!("{percent} likely to be met"),
        }
    });
    VerdictView {
        index,
        answer: stored.answer.clone(),
        word: stored.answer.as_deref().map(|answer| word(answer).to_owned()),
        asked: stored.asked.say(units),
        says: stored.says.as_ref().map(|says| says.say(units)),
        chance,
        decides: stored.decides.iter().map(|says| says.say(units)).collect(),
        share: stored.share.as_ref().map(|share| share.say(units)),
        why_not: stored
            .why_not
            .as_ref()
            .map(|why| Message { says: why.say(units), acts: Vec::new() }),
        errors: stored.errors.clone(),
    }
}

/// Everything around the requirements of a form.
pub(crate) fn all(
    figures: &[Figure],
    verdicts: &[StoredVerdict],
    before: &[(TypedRequirement, String)],
    read: &Readout,
    units: &UnitChoice,
) -> RequirementsView {
    let requirable = figures
        .iter()
        .filter_map(|figure| {
            let kind = figure.amount?.kind();
            let unit = units.get(kind);
            Some(RequirableView {
                figure: figure.key.to_string(),
                label: label(figure),
                unit: unit_view(unit),
                units: Unit::of(kind).map(unit_view).collect(),
                width_unit: unit_view(unit.for_difference(kind).unwrap_or(unit)),
            })
        })
        .collect();
    let option = |(value, label, help): &(&str, &str, &str)| OptionView {
        value: (*value).to_owned(),
        label: (*label).to_owned(),
        help: (!help.is_empty()).then(|| (*help).to_owned()),
    };
    RequirementsView {
        figures: requirable,
        directions: DIRECTIONS.iter().map(option).collect(),
        verdicts: verdicts.iter().enumerate().map(|(i, v)| view(i, v, units)).collect(),
        before: before
            .iter()
            .map(|(typed, when)| before_view(figures, typed, when, units))
            .collect(),
        conditions: names(read)
            .into_iter()
            .map(|(key, (label, kind))| ConditionView {
                key: key.to_owned(),
                label,
                unit: unit_view(units.get(kind)),
                units: Unit::of(kind).map(unit_view).collect(),
            })
            .collect(),
    }
}

fn before_view(
    figures: &[Figure],
    typed: &TypedRequirement,
    when: &str,
    units: &UnitChoice,
) -> BeforeView {
    let words = figures.iter().find(|figure| figure.key == typed.figure).and_then(|figure| {
        let kind = figure.amount?.kind();
        read_requirement(figure, kind, typed, units).ok().map(|read| read.words.say(units))
    });
    let words = words.unwrap_or_else(|| {
        let direction = DIRECTIONS.iter().find(|(id, ..)| *id == typed.direction);
        let direction = direction.map_or("", |(_, label, _)| label).to_lowercase();
        format!("{} {direction} {}", typed.figure, typed.value.text)
    });
    BeforeView { says: format!("{words}, asked on {when}"), requirement: typed.clone() }
}
