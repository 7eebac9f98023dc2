//! Chiller heat balance: does the condenser give up what evaporator and compressor put in?
//!
//! `Q_evaporator + P = Q_condenser`, where `P` is the power that goes into the refrigerant: all that a hermetic motor takes,
//! what an open motor gives at its shaft (its loss goes to the room). The misfit `d = Q_condenser - Q_evaporator - P` is held
//! against its own ±, `E = |d|/U(d)`; about 5 % of closure is usual (common practice), but the ± decides. Both water
//! sides as in [`crate::water_side`]. Source: steady energy balance; normalised error of ISO/IEC 17043 (quoted from memory).

use std::collections::BTreeMap;

use dewledger_quantities::{Kind, Power, Quantity, Sentence, Share};

use crate::check::{About, Check, Group};
use crate::doubt::{Doubt, Term};
use crate::form::{Choice, ChoiceItem, Item, ReadingItem, Section};
use crate::given::Given;
use crate::outcome::{Caution, Change, Figure, Missing, Note, Offer, Outcome, Role, Step};
use crate::plant_power::{self, Input};
use crate::refusal::{Refusal, Stop};
use crate::water_side::{Water, WaterSide, judge_rise};

/// The check.
pub struct ChillerBalance;

const ABOUT: About = About {
    id: "chiller_balance",
    label: "Chiller heat balance",
    question: "Does the condenser give up what evaporator and compressor put in?",
    takes: "both water sides and the electrical input",
    group: Group::Water,
};

const EVAPORATOR: WaterSide<'static> = WaterSide { prefix: "evaporator", whose: "evaporator’s " };
const CONDENSER: WaterSide<'static> = WaterSide { prefix: "condenser", whose: "condenser’s " };
const MOTOR: &str = "motor.kind";
const EFFICIENCY: &str = "motor.efficiency";
const BALANCE: &str = "The balance";
const SIDES: &str = "Both sides";

/// Closure, as a share of the condenser's heat, that careful readings usually reach (common practice).
const USUAL: f64 = 0.05;

const CAUTIONS: &[Caution] = &[
    plant_power::LIVE_TERMINALS,
    Caution {
        title: "Machine rooms",
        says: "Refrigerant displaces air: heed the room’s alarm and leave when it sounds. Open no part of the refrigerant’s \
               circuit. Shafts and couplings start by themselves; hearing protection.",
    },
    Caution {
        title: "Water under pressure",
        says: "Open no well or plug under pressure. Condenser water may carry legionella: breathe no spray.",
    },
    Caution {
        title: "Whose judgement",
        says: "Local rules, the maker’s instructions and licensed people come first.",
    },
];

/// Power that goes into the refrigerant, W: all of a hermetic motor's, an open motor's at its shaft.
/// `open` is the efficiency of an open motor, above 0 to 1.
#[must_use]
pub fn into_refrigerant(input: Power, open: Option<Share>) -> Power {
    Power::from_si(input.si() * open.map_or(1.0, Share::si))
}

/// What the condenser gives up beyond what goes in, W. All three as positive figures.
#[must_use]
pub fn misfit(cooling: Power, refrigerant: Power, rejected: Power) -> Power {
    Power::from_si(rejected.si() - (cooling.si() + refrigerant.si()))
}

impl Check for ChillerBalance {
    fn about(&self) -> &'static About {
        &ABOUT
    }

    fn form(&self, given: &Given) -> Vec<Section> {
        let mut power = plant_power::items(given, true);
        power.push(
            ChoiceItem::new(
                MOTOR,
                "The motor is",
                None,
                vec![
                    Choice::helped(
                        "hermetic",
                        "Hermetic",
                        "Cooled by the refrigerant: all goes in",
                    ),
                    Choice::helped("open", "Open", "With a shaft: its loss goes to the room"),
                ],
            )
            .into(),
        );
        if given.choice(MOTOR) == Some("open") {
            power.push(Item::from(
                ReadingItem::wanted(EFFICIENCY, "Efficiency of the motor", Kind::Share)
                    .help("With its speed drive, where that stands in the room"),
            ));
        }
        vec![
            Section::new("evaporator", "Evaporator", EVAPORATOR.items(given))
                .beside("chilled water"),
            Section::new("power", "Electrical input", power),
            Section::new("condenser", "Condenser", CONDENSER.items(given))
                .beside("condenser water"),
        ]
    }

    fn solve(&self, given: &Given) -> Result<Outcome, Stop> {
        let evaporator = EVAPORATOR.read(given).and_then(|water| expect(given, &EVAPORATOR, water));
        let condenser = CONDENSER.read(given).and_then(|water| expect(given, &CONDENSER, water));
        let input = plant_power::read(given)?;
        let (evaporator, condenser) = match (evaporator, condenser) {
            (Err(refused @ Stop::Refused(_)), _) | (_, Err(refused @ Stop::Refused(_))) => {
                return Err(refused);
            }
            (Err(Stop::Waits(mut missing)), condenser) => {
                missing.extend(input.err());
                if let Err(Stop::Waits(more)) = condenser {
                    missing.extend(more);
                }
                return Err(Stop::Waits(missing));
            }
            (Ok(evaporator), condenser) => (evaporator, condenser),
        };
        let mut outcome = Outcome { cautions: CAUTIONS, ..Outcome::default() };
        let cooling = Power::from_si(-evaporator.heat.si());
        let refrigerant = match &input {
            Ok(input) => power_into_refrigerant(given, input)?,
            Err(missing) => Err(vec![missing.clone()]),
        };
        let condenser = match condenser {
            Ok(condenser) => Ok(condenser),
            Err(Stop::Waits(missing)) => Err(missing),
            Err(refused) => return Err(refused),
        };
        match (&refrigerant, &condenser) {
            (Ok(refrigerant), Ok(condenser)) => {
                balance(cooling, refrigerant, condenser, &mut outcome);
            }
            (refrigerant, condenser) => {
                outcome.waits.extend(refrigerant.as_ref().err().into_iter().flatten().cloned());
                outcome.waits.extend(condenser.as_ref().err().into_iter().flatten().cloned());
            }
        }
        side(&evaporator, "cooling", "Cooling of the evaporator", -1.0, &mut outcome);
        if let Ok(condenser) = condenser {
            side(&condenser, "rejected", "Heat given to the condenser’s water", 1.0, &mut outcome);
            add_water(condenser, "Condenser", &mut outcome);
        }
        if let Ok(input) = &input {
            plant_power::report(cooling, input, SIDES, &mut outcome);
        }
        add_water(evaporator, "Evaporator", &mut outcome);
        Ok(outcome)
    }

    fn terms(&self, _: &Given) -> Vec<Term> {
        // No air in it: the pressure here decides nothing.
        Vec::new()
    }

    fn judge(&self, _: &Given, outcome: &Outcome, doubts: &BTreeMap<String, Doubt>) -> Vec<Note> {
        let mut notes: Vec<Note> = Vec::new();
        notes.extend(judge_rise(outcome, doubts, "cooling_change", "cooling"));
        notes.extend(judge_rise(outcome, doubts, "rejected_change", "rejected"));
        notes.extend(judge_misfit(outcome, doubts));
        notes
    }
}

/// An evaporator cools its water, a condenser warms it; anything else is a swap.
fn expect(given: &Given, side: &WaterSide<'_>, water: Water) -> Result<Water, Stop> {
    let evaporator = side.prefix == EVAPORATOR.prefix;
    let wrong = if evaporator { water.rise.si() > 0.0 } else { water.rise.si() < 0.0 };
    if !wrong || given.is_drawn() {
        return Ok(water);
    }
    let (entering, leaving) = (side.key("entering"), side.key("leaving"));
    let says = if evaporator {
        "The evaporator’s water leaves at {1}, warmer than the {0} it enters at: this cools nothing. Swap the two, or read again."
    } else {
        "The condenser’s water leaves at {1}, colder than the {0} it enters at: it takes up nothing. Swap the two, or read again."
    };
    Err(Refusal::new(
        leaving.clone(),
        "reversed",
        Sentence::new(says).with(water.entering.amount()).with(water.leaving.amount()),
    )
    .offering(Offer::new("Swap the two", vec![Change::Swap(entering.into(), leaving.into())]))
    .into())
}

/// What of the input goes into the refrigerant; else what is missing for it.
fn power_into_refrigerant(
    given: &Given,
    input: &Input,
) -> Result<Result<Power, Vec<Missing>>, Stop> {
    if !input.circuit_alone {
        let mut missing = Missing::new(plant_power::INPUT, "the compressor’s own electrical input");
        missing.asks = Some(Sentence::new(
            "Water pumps and fans do not heat the refrigerant: read the compressor’s own input for the balance.",
        ));
        return Ok(Err(vec![missing]));
    }
    match given.choice(MOTOR) {
        Some("hermetic") => Ok(Ok(into_refrigerant(input.power, None))),
        Some("open") => {
            let Some(efficiency) = given.quantity::<Share>(EFFICIENCY) else {
                return Ok(Err(vec![Missing::new(EFFICIENCY, "the motor’s efficiency")]));
            };
            if !(0.5..=1.0).contains(&efficiency.si()) && !given.is_drawn() {
                return Err(Refusal::new(
                    EFFICIENCY,
                    "efficiency_out_of_range",
                    Sentence::new("A motor’s efficiency of {0} is outside 50 to 100 %. Check the number and its unit.")
                        .with(efficiency.amount()),
                )
                .into());
            }
            Ok(Ok(into_refrigerant(input.power, Some(efficiency))))
        }
        _ => {
            let mut missing = Missing::new(MOTOR, "whether the motor is hermetic or open");
            missing.asks =
                Some(Sentence::new("Is the motor inside the refrigerant, or open with a shaft?"));
            Ok(Err(vec![missing]))
        }
    }
}

fn balance(cooling: Power, refrigerant: &Power, condenser: &Water, outcome: &mut Outcome) {
    let rejected = condenser.heat;
    let apart = misfit(cooling, *refrigerant, rejected);
    outcome.push(
        Figure::new("misfit", "Misfit", apart.amount(), BALANCE)
            .signed(
                "The condenser gives up more than goes in, by",
                "The condenser gives up less than goes in, by",
            )
            .role(Role::Headline),
    );
    let share = Share::from_si(apart.si() / rejected.si());
    if rejected.si() > 0.0 {
        outcome.push(
            Figure::new(
                "closure",
                "Misfit as a share of the condenser’s heat",
                share.amount(),
                BALANCE,
            )
            .on_condition(Sentence::new("About 5 % is usual; the ± decides"))
            .role(Role::Minor),
        );
    }
    let into = Power::from_si(cooling.si() + refrigerant.si());
    outcome.push(Figure::new(
        "goes_in",
        "Evaporator and compressor together",
        into.amount(),
        BALANCE,
    ));
    outcome.push(Figure::new(
        "refrigerant_power",
        "Power into the refrigerant",
        refrigerant.amount(),
        BALANCE,
    ));
    outcome.steps.push(Step::new(
        "The balance",
        "d = Q_condenser - (Q_evaporator + P)",
        Sentence::new("{0} − ({1} + {2}) = {3}")
            .with(rejected.amount())
            .with(cooling.amount())
            .with(refrigerant.amount())
            .with(apart.amount()),
        "steady; heat through the shells and an oil cooler of its own are not counted",
    ));
    if share.si().abs() > USUAL {
        outcome.notes.push(
            Note::remark(
                "closure",
                Sentence::new("The two sides are {0} apart; about 5 % is usual.")
                    .with(Share::from_si(share.si().abs()).amount()),
            )
            .because(Sentence::new(
                "Was the plant steady, and were all readings taken within minutes?",
            )),
        );
    }
}

fn side(water: &Water, key: &'static str, label: &'static str, sign: f64, outcome: &mut Outcome) {
    outcome.push(Figure::new(key, label, Power::from_si(sign * water.heat.si()).amount(), SIDES));
    let (change, name) = if key == "cooling" {
        ("cooling_change", "The evaporator’s water changes by")
    } else {
        ("rejected_change", "The condenser’s water changes by")
    };
    outcome.push(Figure::new(change, name, water.rise.amount(), SIDES).role(Role::Detail));
}

/// A side's remarks and its working, under its own name.
fn add_water(water: Water, name: &'static str, outcome: &mut Outcome) {
    outcome.notes.extend(water.notes);
    let steps = water.steps.into_iter().map(|step| Step {
        title: format!("{name}: {}", step.title.to_lowercase()).into(),
        ..step
    });
    outcome.steps.splice(0..0, steps);
}

/// Whether both sides agree within the ± of their difference.
fn judge_misfit(outcome: &Outcome, doubts: &BTreeMap<String, Doubt>) -> Option<Note> {
    let apart = outcome.amount("misfit")?;
    let within = doubts.get("misfit")?.half_width_si?;
    let error = apart.si().abs() / within;
    let size = Power::from_si(apart.si().abs()).amount();
    let allowed = Power::from_si(within).amount();
    let number = format!("{error:.2}");
    let note = if error <= 1.0 {
        Note::remark(
            "agrees",
            Sentence::new(
                "Both sides agree within what the readings allow: {0} apart, ± {1} (E = {w0}).",
            )
            .with(size)
            .with(allowed)
            .word(number),
        )
    } else {
        Note::remark(
            "disagrees",
            Sentence::new("The two sides do not agree: {0} apart, more than the ± {1} of the readings (E = {w0}).")
                .with(size)
                .with(allowed)
                .word(number),
        )
        .because(Sentence::new(
            "Take again what decides the ±; see that the plant is steady, what the electrical reading covers, and where the \
             motor’s loss goes.",
        ))
    };
    Some(note)
}
