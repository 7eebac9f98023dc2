//! Results drawn from an answer: headline, groups, book constants, what decides the ±, notes, working, states.

use dewledger_checks::book_constants;
use dewledger_checks::doubt::COVERAGE_95;
use dewledger_properties::MoistAir;
use dewledger_quantities::{Amount, Kind, Quantity, Share, Unit, UnitChoice, show, show_with};

use crate::answer::{Answer, StoredFigure, StoredVersus};
use crate::drawn::StoredStateDoubt;
use crate::places::capital;
use crate::reply::{
    CautionView, DriverView, Drivers, Headline, MarkView, MinorView, NoteView, PlusMinusView,
    ResultGroup, ResultRow, SplitView, StateView, StepView, Tone, ValueView, Versus, VersusPart,
};

/// Said beside every group that shows a ±.
const COVERAGE: &str = "± holds 95 times in 100";
/// Sources shown one by one; the rest are summed.
const MOST_DRIVERS: usize = 6;

/// A value in the reader's units; the magnitude where its label says the sign.
fn value(amount: Amount, half_width_si: Option<f64>, units: &UnitChoice) -> ValueView {
    let unit = units.get(amount.kind());
    let shown = match half_width_si {
        Some(half_width) if half_width > 0.0 => show_with(amount, half_width, unit).0,
        _ => show(amount, unit),
    };
    ValueView {
        number: shown.number,
        unit: unit.symbol.to_owned(),
        si: amount.si(),
        si_unit: amount.kind().si_suffix().to_owned(),
    }
}

/// The amount as it is shown: without its sign where the label says it.
fn shown(figure: &StoredFigure) -> Option<Amount> {
    let amount = figure.value.as_ref()?.amount();
    Some(if figure.label_lost.is_some() {
        Amount::new(amount.kind(), amount.si().abs())
    } else {
        amount
    })
}

fn label(figure: &StoredFigure) -> String {
    let lost = figure.value.as_ref().is_some_and(|value| value.si < 0.0);
    match (&figure.label_lost, lost) {
        (Some(label), true) => label.clone(),
        _ => figure.label.clone(),
    }
}

/// The value of a figure; `si` keeps the sign.
fn value_of(figure: &StoredFigure, units: &UnitChoice) -> Option<ValueView> {
    let view = value(shown(figure)?, figure.half_width_si, units);
    Some(ValueView { si: figure.value.as_ref()?.si, ..view })
}

/// Both ends of an interval as shown: to the second digit of its width, and in the sign that the label says.
fn ends(figure: &StoredFigure, low: f64, high: f64, unit: &'static Unit) -> (String, String) {
    let Some(value) = &figure.value else { return (String::new(), String::new()) };
    let (low, high) = match (&figure.label_lost, value.si < 0.0) {
        (Some(_), true) => (-high, -low),
        _ => (low, high),
    };
    let half = 0.5 * (high - low);
    let end = |si: f64| show_with(Amount::new(value.amount().kind(), si), half, unit).0.number;
    (end(low), end(high))
}

fn plus_minus(figure: &StoredFigure, drawn: bool, units: &UnitChoice) -> Option<PlusMinusView> {
    let amount = figure.value.as_ref()?.amount();
    if !figure.unknown.is_empty() {
        return Some(PlusMinusView {
            text: "± not\u{a0}known".to_owned(),
            si: None,
            interval: None,
            pending: false,
            missing: Some(figure.unknown.join("; ")),
        });
    }
    let unit = units.get(amount.kind());
    let view = |text: String| PlusMinusView {
        text,
        si: figure.half_width_si,
        interval: None,
        pending: false,
        missing: None,
    };
    if let Some((low, high)) = figure.interval_si {
        let (low, high) = ends(figure, low, high, unit);
        let says = format!("{low} to {high}, lopsided");
        return Some(PlusMinusView { interval: Some(says.clone()), ..view(says) });
    }
    if let Some(half_width) = figure.half_width_si {
        let (_, width) = show_with(amount, half_width, unit);
        return Some(view(format!("± {}", width.number)));
    }
    if !figure.wants_draws {
        return None;
    }
    Some(if drawn {
        view("no interval can be given".to_owned())
    } else {
        PlusMinusView { pending: true, ..view("± being worked out".to_owned()) }
    })
}

fn row(figure: &StoredFigure, drawn: bool, units: &UnitChoice) -> ResultRow {
    ResultRow {
        key: figure.key.clone(),
        label: label(figure),
        condition: figure.condition.as_ref().map(|condition| condition.say(units)),
        value: value_of(figure, units),
        plus_minus: plus_minus(figure, drawn, units),
        withheld: figure.withheld.as_ref().map(|why| why.say(units)),
        strong: figure.role == "headline",
    }
}

/// The one figure that counts.
pub(crate) fn headline(answer: &Answer, waits: Option<&str>, units: &UnitChoice) -> Headline {
    let Some(figure) = answer.headline() else { return no_headline(waits) };
    Headline {
        says: label(figure),
        key: figure.key.clone(),
        value: value_of(figure, units),
        plus_minus: plus_minus(figure, answer.draws.is_some(), units),
        also: also(figure, units),
        why_not: if figure.value.is_some() {
            None
        } else {
            waits.map(str::to_owned).or_else(|| figure.withheld.as_ref().map(|why| why.say(units)))
        },
        split: split(answer),
        minor: minor(answer, units),
    }
}

/// A dash, and what it waits for.
pub(crate) fn no_headline(waits: Option<&str>) -> Headline {
    Headline {
        says: "Result".to_owned(),
        key: String::new(),
        value: None,
        plus_minus: None,
        also: None,
        why_not: waits.map(str::to_owned),
        split: Vec::new(),
        minor: Vec::new(),
    }
}

/// A cooling load in refrigeration tons as well, unless that is its unit.
fn also(figure: &StoredFigure, units: &UnitChoice) -> Option<String> {
    let amount = figure.value.as_ref()?.amount();
    let ton = Unit::find("ton")?;
    let wanted =
        amount.kind() == Kind::Power && amount.si() < -1000.0 && units.get(Kind::Power).id != "ton";
    wanted.then(|| show(Amount::new(Kind::Power, amount.si().abs()), ton).text())
}

/// Sensible and latent as parts of a bar, where both have the sign of the total.
fn split(answer: &Answer) -> Vec<SplitView> {
    let part = |role: &str| {
        answer.figures.iter().find(|figure| figure.role == role)?.value.as_ref().map(|v| v.si)
    };
    let (Some(sensible), Some(latent)) = (part("sensible_part"), part("latent_part")) else {
        return Vec::new();
    };
    let total = sensible + latent;
    if sensible * latent < 0.0 || total == 0.0 {
        return Vec::new();
    }
    vec![
        SplitView { label: "sensible".to_owned(), share: sensible / total, moist: false },
        SplitView { label: "latent".to_owned(), share: latent / total, moist: true },
    ]
}

/// The small line under the headline.
fn minor(answer: &Answer, units: &UnitChoice) -> Vec<MinorView> {
    let view = |figure: &StoredFigure, label: String| {
        let text = in_words(figure, units).unwrap_or_else(|| "–".to_owned());
        MinorView { label, text }
    };
    let mut minor = Vec::new();
    // The bar says what the parts are of; where they oppose each other there is none, and each says its own sign.
    let split = !split(answer).is_empty();
    for figure in &answer.figures {
        let short = match (figure.role.as_str(), figure.key.as_str()) {
            ("sensible_part", _) if split => "sensible".to_owned(),
            ("latent_part", _) if split => "latent".to_owned(),
            ("sensible_part" | "latent_part", _) => label(figure).to_lowercase(),
            ("minor", "shr") => "SHR".to_owned(),
            ("minor", _) => label(figure).to_lowercase(),
            _ => continue,
        };
        minor.push(view(figure, short));
    }
    minor
}

/// All results by group; what is of use to few stands folded at the end.
pub(crate) fn groups(answer: &Answer, units: &UnitChoice) -> Vec<ResultGroup> {
    let mut groups: Vec<ResultGroup> = Vec::new();
    let mut further = Vec::new();
    for figure in &answer.figures {
        let row = row(figure, answer.draws.is_some(), units);
        if figure.role == "detail" {
            further.push(row);
            continue;
        }
        match groups.iter_mut().find(|group| group.title == figure.group) {
            Some(group) => group.rows.push(row),
            None => groups.push(ResultGroup {
                title: figure.group.clone(),
                aside: None,
                folded: false,
                rows: vec![row],
            }),
        }
    }
    if let Some(first) = groups.first_mut() {
        first.aside = Some(COVERAGE.to_owned());
    }
    if !further.is_empty() {
        groups.push(ResultGroup {
            title: "Further results".to_owned(),
            aside: None,
            folded: true,
            rows: further,
        });
    }
    groups
}

/// What decides the headline's ±, by source.
pub(crate) fn drivers(answer: &Answer, units: &UnitChoice) -> Drivers {
    let aside = "share of the result’s ±".to_owned();
    let none = |says: Option<String>| Drivers { aside: aside.clone(), rows: Vec::new(), says };
    let Some(figure) = answer.headline() else { return none(None) };
    if figure.value.is_none() {
        return none(None);
    }
    if !figure.unknown.is_empty() {
        let says = match figure.unknown.as_slice() {
            [one] => format!(
                "No ± is given for {}: type one beside it and the result gets its own.",
                uncapital(one)
            ),
            many => format!(
                "No ± is given for {} readings, {} first: type one beside each and the result gets its own.",
                many.len(),
                uncapital(&many[0])
            ),
        };
        return none(Some(says));
    }
    let view = |label: String, share: f64| DriverView { label, share, text: percent(share) };
    let mut rows: Vec<DriverView> = figure
        .shares
        .iter()
        .take(MOST_DRIVERS)
        .map(|(source, share)| view(capital(source), *share))
        .collect();
    let rest: f64 = figure.shares.iter().skip(MOST_DRIVERS).map(|(_, share)| share).sum();
    if rest > 0.0 {
        rows.push(view("All others".to_owned(), rest));
    }
    let says = figure.shares.first().zip(figure.half_width_si).zip(figure.value.as_ref()).map(
        |(((source, share), half_width), value)| {
            // Half the ± of the largest source leaves a quarter of its variance.
            let better = half_width * (1.0 - 0.75 * share).sqrt();
            let unit = units.get(value.amount().kind());
            let width = |half_width| show_with(value.amount(), half_width, unit).1.text();
            format!(
                // A source may begin with the name that the team gave an instrument: it stays as it was given.
                "Half the ± of “{}” would bring ±\u{a0}{} down to ±\u{a0}{}.",
                capital(source),
                width(half_width),
                width(better),
            )
        },
    );
    Drivers { aside, rows, says }
}

fn uncapital(text: &str) -> String {
    let mut characters = text.chars();
    characters
        .next()
        .map_or_else(String::new, |first| first.to_lowercase().chain(characters).collect())
}

/// "a, b and c".
pub(crate) fn list(names: &[String]) -> String {
    let names: Vec<String> = names.iter().map(|name| uncapital(name)).collect();
    match names.split_last() {
        None => String::new(),
        Some((last, [])) => last.clone(),
        Some((last, rest)) => format!("{} and {last}", rest.join(", ")),
    }
}

fn percent(share: f64) -> String {
    show(
        Share::from_si(share).amount(),
        Unit::find("%").unwrap_or(UnitChoice::si().get(Kind::Share)),
    )
    .text()
    .replace(".0\u{a0}%", "\u{a0}%")
}

/// What the book constants would have said.
pub(crate) fn versus(answer: &Answer, units: &UnitChoice) -> Vec<Versus> {
    answer.versus.iter().map(|versus| one_versus(answer, versus, units)).collect()
}

fn one_versus(answer: &Answer, versus: &StoredVersus, units: &UnitChoice) -> Versus {
    let figure = answer.figures.iter().find(|figure| figure.key == versus.figure);
    let book = versus.book.amount();
    let magnitude = Amount::new(book.kind(), book.si().abs());
    let here = figure.and_then(|figure| figure.value.as_ref()).map_or(0.0, |value| value.si.abs());
    let gap = Amount::new(book.kind(), (magnitude.si() - here).abs());
    let unit = units.get(book.kind());
    let direction = if magnitude.si() >= here { "too high" } else { "too low" };
    let half_width =
        figure.filter(|figure| figure.unknown.is_empty()).and_then(|figure| figure.half_width_si);
    Versus {
        title: versus.title.say(units),
        reason: versus.reason.say(units),
        book: value(magnitude, None, units),
        gap: format!("{} {direction}, {}", show(gap, unit).text(), percent(versus.error.abs())),
        verdict: half_width
            .filter(|_| here > 0.0)
            .map(|half_width| book_constants::verdict(versus.error, half_width / here).to_owned()),
        parts: versus
            .parts
            .iter()
            .filter(|(_, part)| part.abs() >= 5e-5)
            .map(|(cause, part)| VersusPart {
                label: cause.clone(),
                text: format!("{}{}", if *part > 0.0 { "+" } else { "" }, percent(*part)),
                share: *part,
            })
            .collect(),
    }
}

/// Remarks, the heaviest first.
pub(crate) fn notes(answer: &Answer, accepted: &[String], units: &UnitChoice) -> Vec<NoteView> {
    answer
        .notes
        .iter()
        .map(|note| NoteView {
            code: note.code.clone(),
            tone: match note.weight.as_str() {
                "unusual" => Tone::Unusual,
                "within" => Tone::Within,
                _ => Tone::Remark,
            },
            field: note.field.clone(),
            lead: note.lead.say(units),
            reason: note.reason.as_ref().map(|reason| reason.say(units)),
            acts: note.acts.clone(),
            accepted: accepted.contains(&note.code),
        })
        .collect()
}

/// Safety.
pub(crate) fn cautions(answer: &Answer) -> Vec<CautionView> {
    answer
        .cautions
        .iter()
        .map(|(title, says)| CautionView { title: title.clone(), says: says.clone() })
        .collect()
}

/// Formulas with numbers put in.
pub(crate) fn working(answer: &Answer, units: &UnitChoice) -> Vec<StepView> {
    let view = |step: &crate::answer::StoredStep| StepView {
        title: step.title.clone(),
        formula: step.formula.clone(),
        numbers: step.numbers.say(units),
        source: step.source.clone(),
    };
    answer.steps.iter().map(view).collect()
}

/// The air states as a table.
pub(crate) fn states(answer: &Answer, units: &UnitChoice) -> Vec<StateView> {
    let view = |state: &crate::answer::StoredState| StateView {
        label: state.label.clone(),
        mark: state.mark.clone().map(|(letter, shape)| MarkView { letter, shape }),
        rows: state_rows(&state.air(), state.doubt, units),
    };
    answer.states.iter().map(view).collect()
}

/// A value with nothing beside it.
pub(crate) fn plain_row(key: &str, label: &str, amount: Amount, units: &UnitChoice) -> ResultRow {
    ResultRow {
        key: key.to_owned(),
        label: label.to_owned(),
        condition: None,
        value: Some(value(amount, None, units)),
        plus_minus: None,
        withheld: None,
        strong: false,
    }
}

/// A state in full, with the ± of its two coordinates where it is known.
pub(crate) fn state_rows(
    air: &MoistAir,
    doubt: Option<StoredStateDoubt>,
    units: &UnitChoice,
) -> Vec<ResultRow> {
    let row = |key: &str, label: &str, amount: Amount| plain_row(key, label, amount, units);
    let doubt = doubt.map(StoredStateDoubt::doubt);
    let within = |row: ResultRow, amount: Amount, u: Option<f64>| match u.filter(|u| *u > 0.0) {
        None => row,
        Some(u) => {
            let half_width = COVERAGE_95 * u;
            let width = show_with(amount, half_width, units.get(amount.kind())).1;
            ResultRow {
                value: Some(value(amount, Some(half_width), units)),
                plus_minus: Some(PlusMinusView {
                    text: format!("± {}", width.number),
                    si: Some(half_width),
                    interval: None,
                    pending: false,
                    missing: None,
                }),
                ..row
            }
        }
    };
    let (dry_bulb, humidity_ratio) = (air.dry_bulb().amount(), air.humidity_ratio().amount());
    let mut rows = vec![
        within(
            row("dry_bulb", "Dry bulb", dry_bulb),
            dry_bulb,
            doubt.and_then(|doubt| doubt.dry_bulb_k),
        ),
        within(
            row("humidity_ratio", "Humidity ratio", humidity_ratio),
            humidity_ratio,
            doubt.and_then(|doubt| doubt.humidity_ratio_kg_kg),
        ),
        row("relative_humidity", "Relative humidity", air.relative_humidity().amount()),
    ];
    if let Ok(wet_bulb) = air.wet_bulb() {
        rows.push(row("wet_bulb", "Wet bulb", wet_bulb.reading().amount()));
    }
    if let Ok(dew_point) = air.dew_point() {
        rows.push(row("dew_point", "Dew point", dew_point.amount()));
    }
    rows.push(row("enthalpy", "Enthalpy", air.enthalpy().amount()));
    rows.push(row("specific_volume", "Specific volume", air.specific_volume().amount()));
    rows
}

/// A figure's value and unit, without the sign that its label says; none where it is withheld.
pub(crate) fn in_words(figure: &StoredFigure, units: &UnitChoice) -> Option<String> {
    let view = value(shown(figure)?, figure.half_width_si, units);
    Some(if view.unit.is_empty() {
        view.number
    } else {
        format!("{}\u{a0}{}", view.number, view.unit)
    })
}

/// "Heat removed, total 41.3 kW ± 3.1", for lists.
pub(crate) fn in_a_line(answer: &Answer, units: &UnitChoice) -> String {
    let Some(figure) = answer.headline() else { return String::new() };
    let Some(view) = value_of(figure, units) else { return format!("{}: –", label(figure)) };
    let number = if view.unit.is_empty() {
        view.number
    } else {
        format!("{}\u{a0}{}", view.number, view.unit)
    };
    let tail = plus_minus(figure, answer.draws.is_some(), units)
        .filter(|plus_minus| plus_minus.si.is_some() || plus_minus.interval.is_some())
        .map_or_else(String::new, |plus_minus| match plus_minus.interval {
            Some(interval) => format!(" ({interval})"),
            None => format!(" {}", plus_minus.text),
        });
    format!("{}: {number}{tail}", label(figure))
}
