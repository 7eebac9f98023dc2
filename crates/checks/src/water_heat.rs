//! Heat moved by the water: how much heat does this water carry?
//!
//! `Q = V rho(t at the meter) (h(t2) - h(t1))`, positive = gained by the water; water or glycol, see [`crate::water_side`]. Beside it
//! the book's factor: 500 Btu/(h gpm °F) or 4.19 kW/(L/s K), which is plain water near room temperature. With an
//! electrical input the kW a ton and the coefficient of performance; with a pump's pressure rise the heat that it adds,
//! `V dp / eta`. Source: steady energy balance; IAPWS SR6-08; Melinder (2010).

mod pump;

use std::collections::BTreeMap;

use dewledger_quantities::{Power, Quantity, Sentence, Share, WaterConstant};

use crate::check::{About, Check, Group};
use crate::doubt::{Doubt, Term};
use crate::form::{Choice, ChoiceItem, Section};
use crate::given::Given;
use crate::outcome::{Caution, Change, Figure, Note, Offer, Outcome, Role, Step, Versus};
use crate::plant_power;
use crate::refusal::Stop;
use crate::water_side::{Fluid, Water, WaterSide, judge_rise};

/// The check.
pub struct WaterHeat;

const ABOUT: About = About {
    id: "water_heat",
    label: "Heat moved by the water",
    question: "How much heat does this water carry?",
    takes: "a water flow and two temperatures, water or glycol",
    group: Group::Water,
};

const WATER: WaterSide<'static> = WaterSide { prefix: "water", whose: "" };
const EXPECTED: &str = "water.expected";
const RESULTS: &str = "Heat";
const FLUID: &str = "The water";
const PLANT: &str = "Electrical input";

/// The book's 500 in J/(m³ K): Btu/h for each US gallon per minute and °F.
const BOOK_IP: f64 = 500.0 * 1_055.055_852_62 / 3600.0 / 6.309_019_64e-5 * 1.8;
/// The book's 4.19 in J/(m³ K): kW for each litre per second and kelvin (common practice).
const BOOK_SI: f64 = 4.19e6;

const CAUTIONS: &[Caution] = &[
    Caution {
        title: "Hot water under pressure",
        says: "Open no well, plug or strainer under pressure. Pipes of hot water burn; a plug of a test point can fly out.",
    },
    plant_power::LIVE_TERMINALS,
    Caution {
        title: "Glycol",
        says: "Ethylene glycol is poisonous and tastes sweet. Let none go to ground or drain; gloves and eyes covered.",
    },
    Caution {
        title: "Whose judgement",
        says: "Local rules, the maker’s instructions and licensed people come first.",
    },
];

impl Check for WaterHeat {
    fn about(&self) -> &'static About {
        &ABOUT
    }

    fn form(&self, given: &Given) -> Vec<Section> {
        let mut items = WATER.items(given);
        items.push(
            ChoiceItem::new(
                EXPECTED,
                "This water should",
                Some("not_said"),
                vec![
                    Choice::new("not_said", "Not said"),
                    Choice::helped("warm", "Warm up", "Chilled water in a coil, a condenser"),
                    Choice::helped("cool", "Cool down", "Hot water in a coil, an evaporator"),
                ],
            )
            .help("Said, swapped temperatures are noticed")
            .into(),
        );
        vec![
            Section::new("water", "The water", items),
            Section::new("power", "Electrical input", plant_power::items(given, false)).seldom(),
            Section::new("pump", "The pump", pump::items(given)).seldom(),
        ]
    }

    fn solve(&self, given: &Given) -> Result<Outcome, Stop> {
        let water = WATER.read(given)?;
        let mut outcome = Outcome { cautions: CAUTIONS, ..Outcome::default() };
        results(&water, &mut outcome);
        reversed(given, &water, &mut outcome);
        if given.reading(plant_power::INPUT).is_some() {
            match plant_power::read(given)? {
                Ok(input) => {
                    let moved = Power::from_si(water.heat.si().abs());
                    plant_power::report(moved, &input, PLANT, &mut outcome);
                }
                Err(missing) => outcome.waits.push(missing),
            }
        }
        pump::report(given, &water, &mut outcome)?;
        outcome.notes.extend(water.notes);
        outcome.steps.splice(0..0, water.steps);
        Ok(outcome)
    }

    fn terms(&self, _: &Given) -> Vec<Term> {
        // No air in it: the pressure here decides nothing.
        Vec::new()
    }

    fn judge(&self, _: &Given, outcome: &Outcome, doubts: &BTreeMap<String, Doubt>) -> Vec<Note> {
        judge_rise(outcome, doubts, "rise", "heat").into_iter().collect()
    }
}

fn results(water: &Water, outcome: &mut Outcome) {
    outcome.push(
        Figure::new("heat", "Heat", water.heat.amount(), RESULTS)
            .signed("Heat gained by the water", "Heat given by the water")
            .role(Role::Headline),
    );
    outcome.push(
        Figure::new("rise", "Temperature change", water.rise.amount(), RESULTS)
            .signed("The water warms by", "The water cools by")
            .role(Role::Minor),
    );
    outcome.push(Figure::new("mass_flow", "Mass flow", water.mass_flow.amount(), FLUID));
    outcome.push(
        Figure::new("factor", "Heat for each flow and degree", water.factor.amount(), FLUID)
            .on_condition(Sentence::new("of the flow at its meter")),
    );
    outcome.push(
        Figure::new("density", "Density at the meter", water.density.amount(), FLUID)
            .role(Role::Detail),
    );
    outcome.push(
        Figure::new("heat_capacity", "Mean heat capacity", water.heat_capacity.amount(), FLUID)
            .role(Role::Detail),
    );
    if let Fluid::Glycol(_, strength) = water.fluid {
        let share = Share::from_si(strength.si());
        outcome.push(Figure::new("mass_share", "Glycol by mass", share.amount(), FLUID));
        outcome.push(Figure::new(
            "freezes_at",
            "The mixture freezes at",
            water.fluid.freezing().amount(),
            FLUID,
        ));
    }
    outcome.steps.push(Step::new(
        "Factor",
        "rho c_p",
        Sentence::new("{0} × {1} = {2}")
            .with(water.density.amount())
            .with(water.heat_capacity.amount())
            .with(water.factor.amount()),
        "density at the meter, mean heat capacity between the two temperatures",
    ));
    outcome.versus.push(versus(water));
}

/// What the book's factor would have said, and how much of its error is the temperature, how much the glycol.
fn versus(water: &Water) -> Versus {
    let (book, title) = if water.inch_pound {
        (BOOK_IP, Sentence::new("Heat by 500"))
    } else {
        (BOOK_SI, Sentence::new("Heat by 4.19"))
    };
    let here = water.factor.si();
    // Plain water at these temperatures; above −20 °C there always is some.
    let plain = plain_factor(water).map_or(here, WaterConstant::si);
    let mut parts = vec![("temperature", book / plain - 1.0)];
    if matches!(water.fluid, Fluid::Glycol(..)) {
        parts.push(("glycol", book / here - book / plain));
    }
    Versus {
        figure: "heat",
        title,
        book: Power::from_si(book * water.flow.si() * water.rise.si()).amount(),
        error: book / here - 1.0,
        parts,
        reason: Sentence::new("The book figure is plain water near room temperature."),
    }
}

fn plain_factor(water: &Water) -> Option<WaterConstant> {
    let density = Fluid::Water.density(water.meter)?;
    let capacity = Fluid::Water.mean_heat_capacity(water.entering, water.leaving)?.si();
    Some(WaterConstant::from_si(density.si() * capacity))
}

fn reversed(given: &Given, water: &Water, outcome: &mut Outcome) {
    let lead = match given.choice_or(EXPECTED, "not_said") {
        "warm" if water.rise.si() < 0.0 => {
            Sentence::new("This water should warm up, and it cools from {0} to {1}.")
        }
        "cool" if water.rise.si() > 0.0 => {
            Sentence::new("This water should cool down, and it warms from {0} to {1}.")
        }
        _ => return,
    };
    let (entering, leaving) = (WATER.key("entering"), WATER.key("leaving"));
    outcome.notes.push(
        Note::unusual(
            "reversed",
            leaving.clone(),
            lead.with(water.entering.amount()).with(water.leaving.amount()),
        )
        .because(Sentence::new("Are the two temperatures, or supply and return, swapped?"))
        .offering(Offer::new("Swap the two", vec![Change::Swap(entering.into(), leaving.into())])),
    );
}
