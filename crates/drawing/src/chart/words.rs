//! The chart in words, for whoever does not see it.

use dewledger_checks::drawn::{Line, LineKind};
use dewledger_quantities::{Amount, Quantity, UnitChoice, show};

use super::process::{ends, mixtures};
use super::{Chart, State};
use crate::cross::{Cross, read};
use crate::plot::Plot;
use crate::window::Place;

pub(super) fn says(chart: &Chart<'_>, plot: &Plot) -> String {
    let units = chart.units;
    let window = &plot.window;
    let mut sentences = vec![format!(
        "Psychrometric chart at {}: dry bulb from {} to {}, humidity ratio from {} to {}.",
        text(chart.pressure.amount(), units),
        text(window.coldest.amount(), units),
        text(window.warmest.amount(), units),
        text(window.driest.amount(), units),
        text(window.wettest.amount(), units),
    )];
    for state in chart.states {
        let letter = state.mark.map_or_else(String::new, |mark| format!("{}, ", mark.letter));
        let outside = if window.holds(&state.place) { "" } else { ", outside of what is shown" };
        sentences.push(format!(
            "{letter}{}: dry bulb {}, humidity ratio {}{outside}.",
            state.label,
            text(state.place.dry_bulb.amount(), units),
            text(state.place.humidity_ratio.amount(), units),
        ));
    }
    sentences.extend(chart.lines.iter().map(|line| of_line(line, chart)));
    if let Some(legs) = &chart.legs {
        sentences.push(format!("Sensible {}, latent {}.", legs.sensible, legs.latent));
    }
    sentences.join(" ")
}

fn of_line(line: &Line, chart: &Chart<'_>) -> String {
    let [from, to] = ends(line).map(|place| name(&place, chart));
    match line.kind {
        LineKind::Process => format!("The air goes from {from} to {to}."),
        LineKind::CarriedOn => format!("The line is carried on from {from} to {to}."),
        LineKind::Mixing => {
            let foggy = mixtures(line)
                .iter()
                .any(|place| matches!(read(place, chart.pressure), Cross::Fog { .. }));
            let fog = if foggy { ", part of which is fog" } else { "" };
            format!("Mixtures lie on the line from {from} to {to}{fog}.")
        }
    }
}

/// The name of the state at a place, or its two values.
fn name(place: &Place, chart: &Chart<'_>) -> String {
    let here = |state: &&State| {
        (state.place.dry_bulb.si() - place.dry_bulb.si()).abs() < 1e-6
            && (state.place.humidity_ratio.si() - place.humidity_ratio.si()).abs() < 1e-9
    };
    match chart.states.iter().find(here) {
        Some(State { label, mark: Some(mark), .. }) => format!("{}, {label}", mark.letter),
        Some(State { label, mark: None, .. }) => label.clone(),
        None => format!(
            "{} and {}",
            text(place.dry_bulb.amount(), chart.units),
            text(place.humidity_ratio.amount(), chart.units)
        ),
    }
}

fn text(amount: Amount, units: &UnitChoice) -> String {
    show(amount, units.get(amount.kind())).text()
}
