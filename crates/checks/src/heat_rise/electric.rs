//! Electric power: single phase, three phase, leg by leg.

use dewledger_quantities::{
    ElectricCurrent, ElectricPotential, Kind, Power, Quantity, Ratio, Sentence, Share,
};

use super::POWER;
use crate::form::{Item, ReadingItem};
use crate::given::Given;
use crate::outcome::{Figure, Missing, Note, Outcome, Step};
use crate::refusal::{Refusal, Stop};

/// Keys of one leg: volts, amperes, power factor.
struct Leg {
    volts: &'static str,
    amperes: &'static str,
    factor: &'static str,
    labels: [&'static str; 3],
}

const LEGS: [Leg; 3] = [
    Leg {
        volts: "power.leg1_voltage",
        amperes: "power.leg1_current",
        factor: "power.leg1_factor",
        labels: ["Leg 1, voltage to neutral", "Leg 1, current", "Leg 1, power factor"],
    },
    Leg {
        volts: "power.leg2_voltage",
        amperes: "power.leg2_current",
        factor: "power.leg2_factor",
        labels: ["Leg 2, voltage to neutral", "Leg 2, current", "Leg 2, power factor"],
    },
    Leg {
        volts: "power.leg3_voltage",
        amperes: "power.leg3_current",
        factor: "power.leg3_factor",
        labels: ["Leg 3, voltage to neutral", "Leg 3, current", "Leg 3, power factor"],
    },
];
const ONE: [Leg; 1] = [Leg {
    volts: "power.voltage",
    amperes: "power.current",
    factor: "power.factor",
    labels: ["Voltage", "Current", "Power factor"],
}];
const FACTOR_HELP: &str = "A heating element is 1; anything else as its meter shows";
/// Above this unbalance of the currents something may be open (common practice).
const UNBALANCE: f64 = 0.10;

fn legs(by: &str) -> &'static [Leg] {
    if by == "legs" { &LEGS } else { &ONE }
}

pub(super) fn items(by: &str) -> Vec<Item> {
    let three = by == "three_phase";
    legs(by)
        .iter()
        .flat_map(|leg| {
            let [volts, amperes, factor] = leg.labels;
            let volts = if three { "Voltage, line to line" } else { volts };
            [
                ReadingItem::wanted(leg.volts, volts, Kind::Voltage).into(),
                ReadingItem::wanted(leg.amperes, amperes, Kind::Current).into(),
                ReadingItem::wanted(leg.factor, factor, Kind::Ratio).help(FACTOR_HELP).into(),
            ]
        })
        .collect()
}

/// Real power of one leg, or of all where it is balanced.
#[must_use]
pub(super) fn real_power(
    volts: ElectricPotential,
    amperes: ElectricCurrent,
    factor: Ratio,
    three_phase: bool,
) -> Power {
    let phases = if three_phase { 3.0_f64.sqrt() } else { 1.0 };
    Power::from_si(phases * volts.si() * amperes.si() * factor.si())
}

pub(super) fn power(given: &Given, by: &str, outcome: &mut Outcome) -> Result<Power, Stop> {
    let three = by == "three_phase";
    let mut missing = Vec::new();
    let (mut powers, mut currents) = (Vec::new(), Vec::new());
    for leg in legs(by) {
        let (volts, amperes, factor) =
            (given.quantity(leg.volts), given.quantity(leg.amperes), given.quantity(leg.factor));
        let (Some(volts), Some(amperes), Some(factor)) = (volts, amperes, factor) else {
            for (key, label) in [leg.volts, leg.amperes, leg.factor].into_iter().zip(leg.labels) {
                if given.reading(key).is_none() {
                    missing.push(Missing::new(key, format!("the {}", label.to_lowercase())));
                }
            }
            continue;
        };
        if !given.is_drawn() {
            check(leg, volts, amperes, factor, given)?;
        }
        powers.push(real_power(volts, amperes, factor, three));
        currents.push(amperes);
    }
    if !missing.is_empty() {
        return Err(Stop::Waits(missing));
    }
    let power = Power::from_si(powers.iter().map(|power| power.si()).sum());
    if by == "legs" {
        unbalance(&powers, &currents, outcome);
    }
    outcome.steps.push(Step::new(
        "Electric power",
        match by {
            "legs" => "P = sum V_LN I PF",
            "three_phase" => "P = sqrt(3) V_LL I PF",
            _ => "P = V I PF",
        },
        Sentence::new("P = {0}").with(power.amount()),
        "real power; volt-amperes are more where the power factor is below 1",
    ));
    Ok(power)
}

fn check(
    leg: &Leg,
    volts: ElectricPotential,
    amperes: ElectricCurrent,
    factor: Ratio,
    given: &Given,
) -> Result<(), Stop> {
    let wrong = |key: &'static str, code, says: Sentence| Err(Refusal::new(key, code, says).into());
    if !(1.0..=1000.0).contains(&volts.si()) {
        return wrong(
            leg.volts,
            "voltage_out_of_range",
            Sentence::new("{0} is outside 1 to 1 000 V. Check the number and its unit.")
                .with(volts.amount()),
        );
    }
    if !(0.0..=5000.0).contains(&amperes.si()) {
        return wrong(
            leg.amperes,
            "current_out_of_range",
            Sentence::new("{0} is outside 0 to 5 000 A. Check the number and its unit.")
                .with(amperes.amount()),
        );
    }
    // A factor of 1 may read a little more within its ±.
    let over = given.reading(leg.factor).and_then(|reading| reading.half_width_si).unwrap_or(0.0);
    if !(0.05..=1.0 + over).contains(&factor.si()) {
        return wrong(
            leg.factor,
            "power_factor_out_of_range",
            Sentence::new("A power factor of {0} is outside 0.05 to 1. A heating element is 1.")
                .with(factor.amount()),
        );
    }
    Ok(())
}

/// Legs apart: an open element shows in its current.
fn unbalance(powers: &[Power], currents: &[ElectricCurrent], outcome: &mut Outcome) {
    for (number, power) in powers.iter().enumerate() {
        let label = format!("Leg {}", number + 1);
        outcome.push(Figure::new(format!("leg_{}", number + 1), label, power.amount(), POWER));
    }
    #[expect(clippy::cast_precision_loss, reason = "three legs")]
    let mean = currents.iter().map(|current| current.si()).sum::<f64>() / currents.len() as f64;
    if mean <= 0.0 {
        return;
    }
    let unbalance =
        currents.iter().map(|current| (current.si() - mean).abs()).fold(0.0, f64::max) / mean;
    let share = Share::from_si(unbalance);
    outcome.push(Figure::new("unbalance", "Unbalance of the currents", share.amount(), POWER));
    if unbalance > UNBALANCE {
        outcome.notes.push(
            Note::unusual(
                "unbalance",
                LEGS[0].amperes,
                Sentence::new(
                    "One leg carries less: an element, fuse or contactor leg may be open.",
                ),
            )
            .because(Sentence::new("Have it checked by a qualified person.")),
        );
    }
}
