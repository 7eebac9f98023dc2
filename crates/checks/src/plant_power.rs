//! Electrical input of a plant beside the heat that it moves: what the reading covers, kW a ton, coefficient of performance.

use dewledger_quantities::{InputPerCooling, Kind, Power, Quantity, Ratio, Sentence};

use crate::form::{Choice, ChoiceItem, Item, ReadingItem};
use crate::given::Given;
use crate::outcome::{Caution, Figure, Missing, Outcome, Role, Step};
use crate::refusal::{Refusal, Stop};

/// Electrical input as read.
pub const INPUT: &str = "power.input";
/// What that reading covers.
pub const COVERS: &str = "power.covers";

/// Work on live terminals.
pub const LIVE_TERMINALS: Caution = Caution {
    title: "Live terminals",
    says: "Clamp on only if you are competent and allowed to. Covers stay on where they can.",
};

/// What an electrical reading covers: value, label, as a condition.
const COVERED: [(&str, &str, &str); 4] = [
    ("compressor", "The compressor alone", "of the compressor alone"),
    ("compressor_and_oil", "Compressor and oil pump", "with the oil pump"),
    ("with_pumps", "Water pumps too", "with the water pumps"),
    ("with_pumps_and_fans", "Water pumps and fans too", "with water pumps and fans"),
];

/// Electrical input as read, and what it covers.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Input {
    /// Taken from the mains.
    pub power: Power,
    /// All of it drives the refrigerant's circuit: neither water pumps nor fans are in it.
    pub circuit_alone: bool,
    /// What it covers, as a condition of a result.
    covers: &'static str,
}

/// What is asked.
#[must_use]
pub fn items(given: &Given, wanted: bool) -> Vec<Item> {
    let mut power = ReadingItem::optional(INPUT, "Electrical input", Kind::Power)
        .help("Watts, not volt-amperes: a single-phase guess of a three-phase load is no reading");
    power.required = wanted;
    let mut items: Vec<Item> = vec![power.into()];
    if wanted || given.reading(INPUT).is_some() {
        let options = COVERED.iter().map(|(value, label, _)| Choice::new(value, *label)).collect();
        items.push(ChoiceItem::new(COVERS, "The reading covers", None, options).into());
    }
    items
}

/// The input; the inner result says what is missing.
///
/// # Errors
///
/// Refuses a power that is not above zero.
pub fn read(given: &Given) -> Result<Result<Input, Missing>, Stop> {
    let Some(power) = given.quantity::<Power>(INPUT) else {
        return Ok(Err(Missing::new(INPUT, "the electrical input")));
    };
    if power.si() <= 0.0 {
        return Err(Refusal::new(
            INPUT,
            "input_not_above_zero",
            Sentence::new(
                "An electrical input of {0} drives nothing. Read it again, or leave it blank.",
            )
            .with(power.amount()),
        )
        .into());
    }
    let covered = COVERED.iter().find(|(value, ..)| given.choice(COVERS) == Some(*value));
    let Some((value, _, covers)) = covered else {
        let mut missing = Missing::new(COVERS, "what the electrical reading covers");
        missing.asks = Some(
            Sentence::new("Is {0} the compressor alone, or are pumps and fans in it?")
                .with(power.amount()),
        );
        return Ok(Err(missing));
    };
    let circuit_alone = matches!(*value, "compressor" | "compressor_and_oil");
    Ok(Ok(Input { power, circuit_alone, covers }))
}

/// Electrical input for each cooling, W/W, and the coefficient of performance, its inverse.
#[must_use]
pub fn ratios(cooling: Power, input: Power) -> (InputPerCooling, Ratio) {
    (InputPerCooling::from_si(input.si() / cooling.si()), Ratio::from_si(cooling.si() / input.si()))
}

/// Adds both ratios, each with what the reading covers. `moved` is the heat moved, without its sign.
pub fn report(moved: Power, input: &Input, group: &'static str, outcome: &mut Outcome) {
    let (per_cooling, performance) = ratios(moved, input.power);
    let covers = || Sentence::new("Input {w0}").word(input.covers);
    outcome.push(
        Figure::new(
            "input_per_cooling",
            "Electrical input per cooling",
            per_cooling.amount(),
            group,
        )
        .on_condition(covers())
        .role(Role::Minor),
    );
    outcome.push(
        Figure::new("performance", "Coefficient of performance", performance.amount(), group)
            .on_condition(covers())
            .role(Role::Minor),
    );
    outcome.steps.push(Step::new(
        "Coefficient of performance",
        "COP = Q / P",
        Sentence::new("{0} ÷ {1} = {2}; {3}")
            .with(moved.amount())
            .with(input.power.amount())
            .with(performance.amount())
            .with(per_cooling.amount()),
        "by definition; it holds for what the electrical reading covers",
    ));
}
