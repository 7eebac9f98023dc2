//! What stands beside a reading: instrument, place, the parts of its ±, its takes.

use dewledger_checks::form::{Item, ReadingItem, Section};
use dewledger_checks::part::{Part, Source, half_width};
use dewledger_checks::takes::Steadiness;
use dewledger_ledger::At;
use dewledger_quantities::{Amount, Kind, Unit, UnitChoice, show};

use crate::bench::Bench;
use crate::clock;
use crate::form_view::unit_view;
use crate::instruments::show_width;
use crate::read_with::{With, asked_of};
use crate::reply::{OptionView, PartView, ReadWith, TakeRow, TakesView, UsualSpot};
use crate::request::{Typed, TypedReading, TypedSpot, TypedValue};

const HELD: &[(&str, &str, &str)] = &[
    ("", "Not said", ""),
    ("point", "At one point", "In a duct with layers often worse than the instrument"),
    ("grid", "Over a grid of points", "The mean is typed; their spread says how sure it is"),
    ("averaging", "By an averaging element", "A long sensor across the duct"),
];

/// Usual figures for what a place adds to a temperature: common practice. Label, held, K.
const USUAL: &[(&str, &str, &str)] = &[
    ("One point in a straight duct", "point", "0.3"),
    ("One point in mixed air", "point", "1.5"),
    ("Averaging element in mixed air", "averaging", "0.5"),
    ("Sensor strapped to a pipe", "point", "0.7"),
];

fn option(value: &str, label: &str, help: &str) -> OptionView {
    OptionView {
        value: value.to_owned(),
        label: label.to_owned(),
        help: (!help.is_empty()).then(|| help.to_owned()),
    }
}

/// The form around a reading.
pub(crate) struct Beside<'a> {
    pub(crate) sections: &'a [Section],
    pub(crate) typed: &'a Typed,
    pub(crate) bench: &'a Bench,
    pub(crate) units: &'a UnitChoice,
    pub(crate) now: At,
}

/// Everything beside a reading; none for definitions and settings.
pub(crate) fn view(
    beside: &Beside<'_>,
    item: &ReadingItem,
    with: Option<&With>,
    unit: &'static Unit,
) -> Option<ReadWith> {
    if !asked_of(item) {
        return None;
    }
    let Beside { typed, bench, units, .. } = *beside;
    let key = item.key.as_ref();
    let reading = typed.readings.get(key);
    let probe = bench.used(key, item.kind, typed);
    let blank = With::default();
    let with = with.unwrap_or(&blank);
    let difference = item.kind.difference();
    let width_unit = unit.for_difference(item.kind).unwrap_or_else(|| units.get(difference));
    let mut probes = vec![option("", "No instrument named", "")];
    probes.extend(
        bench
            .probes
            .iter()
            .filter(|other| other.can_read(item.kind))
            .filter(|other| !other.withdrawn || probe.is_some_and(|probe| probe.id == other.id))
            .map(|probe| option(&probe.id, &probe.label, "")),
    );
    let value = with.mean_si.or(with.before_si);
    Some(ReadWith {
        probe: probe.map(|probe| probe.id.clone()),
        label: probe.map_or_else(|| "no instrument named".to_owned(), |probe| probe.label.clone()),
        probes,
        spot: reading.and_then(|reading| reading.spot.clone()).unwrap_or_default(),
        held: HELD.iter().map(|(value, label, help)| option(value, label, help)).collect(),
        spread_unit: unit_view(width_unit),
        usual: usual(item.kind),
        parts: parts(&with.parts, Amount::new(difference, value.unwrap_or(0.0)), width_unit),
        corrected: with.before_si.map(|before| {
            format!(
                "{} as read; what the side-by-side run found is taken off",
                show(Amount::new(item.kind, before), unit).text()
            )
        }),
        takes: takes(beside, item, with, reading, unit),
    })
}

fn usual(kind: Kind) -> Vec<UsualSpot> {
    if kind != Kind::Temperature {
        return Vec::new();
    }
    USUAL
        .iter()
        .map(|(label, held, width)| UsualSpot {
            label: format!("{label}: ± {width} K, common practice"),
            spot: TypedSpot {
                held: (*held).to_owned(),
                plus_minus: TypedValue { text: (*width).to_owned(), unit: Some("K".to_owned()) },
                ..TypedSpot::default()
            },
        })
        .collect()
}

/// What the ± is made of, with 95 % half-widths: parts of one source together.
fn parts(parts: &[Part], amount: Amount, unit: &'static Unit) -> Vec<PartView> {
    let shared = |part: &Part| matches!(part.source, Source::Shared { .. });
    let line = |label: &str, which: &dyn Fn(&Part) -> bool| {
        let those: Vec<Part> = parts.iter().filter(|part| which(part)).cloned().collect();
        let half_width = half_width(&those)?;
        let text = show_width(Amount::new(amount.kind(), half_width), half_width, unit);
        Some(PartView { label: label.to_owned(), text })
    };
    [
        line("Calibration, shared with other readings of this probe", &shared),
        line("The reading itself", &|part| part.source == Source::Own),
        line("Where it was held", &|part| part.source == Source::Place),
        line("Scatter of the takes", &|part| part.source == Source::Scatter),
    ]
    .into_iter()
    .flatten()
    .collect()
}

fn takes(
    beside: &Beside<'_>,
    item: &ReadingItem,
    with: &With,
    reading: Option<&TypedReading>,
    unit: &'static Unit,
) -> TakesView {
    let rows = reading.map(|reading| reading.takes.as_slice()).unwrap_or_default();
    let rows = rows
        .iter()
        .enumerate()
        .map(|(index, take)| TakeRow {
            text: take.text.clone(),
            at: clock::second(&take.at, beside.now).unwrap_or_default(),
            error: with.wrong.get(&index).cloned(),
        })
        .collect();
    let says = with.summary().map(|summary| {
        let mean =
            show(Amount::new(item.kind, with.mean_si.unwrap_or(summary.mean_si)), unit).text();
        let count = if summary.count == 1 {
            "One take".to_owned()
        } else {
            format!("{} takes", summary.count)
        };
        let brought =
            reading.is_some_and(|r| r.at_time_of.as_deref().is_some_and(|k| !k.is_empty()));
        let what = if brought { "at the other’s time" } else { "mean" };
        let difference = item.kind.difference();
        let scatter =
            summary.scatter_si.zip(unit.for_difference(item.kind)).map(|(scatter, unit)| {
                format!(", scatter {}", show(Amount::new(difference, scatter), unit).text())
            });
        format!(
            "{count} in {:.0} s: {what} {mean}{}",
            summary.lasted_s,
            scatter.unwrap_or_default()
        )
    });
    let steadiness = with.steadiness.map(|steadiness| match steadiness {
        Steadiness::Steady => ("steady", "Steady"),
        Steadiness::Drifting => ("drifting", "Drifting"),
        Steadiness::Hunting => ("hunting", "Hunting"),
        Steadiness::NotJudged => ("not_judged", "Not judged"),
    });
    let mut at_time_of = vec![option("", "The mean of its takes", "")];
    for section in beside.sections {
        for other in &section.items {
            let Item::Reading(other) = other else { continue };
            let taken =
                beside.typed.readings.get(other.key.as_ref()).is_some_and(|r| !r.takes.is_empty());
            if taken && other.key != item.key {
                let name = format!("{}, {}", section.title, other.label.to_lowercase());
                at_time_of.push(option(&other.key, &format!("At the time of: {name}"), ""));
            }
        }
    }
    TakesView {
        rows,
        mean: with.mean_si.map(|si| show(Amount::new(item.kind, si), unit).number),
        says,
        steadiness: steadiness.map(|(id, _)| id.to_owned()),
        word: steadiness.map(|(_, word)| word.to_owned()),
        at_time_of,
        at_time_of_value: reading
            .and_then(|reading| reading.at_time_of.clone())
            .unwrap_or_default(),
    }
}
