//! Three routes of one coil: do air, water and drain agree on what it moves?
//!
//! Air, less the water's own enthalpy: `m ((h1 - h2) - (W1 - W2) h_f)`. Water: `rho V dh`. Drain: `m (h(t1, W2) - h(t2, W2)) + m_c
//! (h_v - h_f)`. All sources of doubt move all three together: air and drain share the flow and the dry bulbs. A closure
//! is held against its own doubt: closing to nothing is no merit, missing by 5 % no fault. The mean is of least variance
//! at one size of uncertainty; where the three disagree, readings are tested, not routes (own derivation; generalised
//! least squares).

use std::collections::BTreeMap;

use dewledger_properties::{MoistAir, water};
use dewledger_quantities::{
    Amount, CondensateFlow, DryAirFlow, Kind, MoistureFlow, Power, Quantity, Ratio, Sentence,
    Share, ThermodynamicTemperature,
};

use crate::check::{About, Check, Group};
use crate::doubt::{Doubt, terms};
use crate::drawn::{Line, LineKind};
use crate::flow_block::FlowBlock;
use crate::form::{Mark, ReadingItem, Section};
use crate::given::{Given, Moved};
use crate::least_variance::{Effects, together};
use crate::outcome::{Caution, Figure, Missing, Note, Outcome, Role, StatePoint, Step};
use crate::pressure;
use crate::refusal::{Refusal, Stop, both};
use crate::state_block::{Point, Read};
use crate::water_side::WaterSide;

/// The check.
pub struct CoilBalance;

const ABOUT: About = About {
    id: "coil_balance",
    label: "Three routes of one coil",
    question: "Do air, water and drain agree on what this coil moves?",
    takes: "the air side of a cooling coil with its water, its drain, or both",
    group: Group::Whole,
};

const ENTERING: Point<'static> = Point { prefix: "entering", name: "entering" };
const LEAVING: Point<'static> = Point { prefix: "leaving", name: "leaving" };
const FLOW: FlowBlock<'static> = FlowBlock {
    prefix: "flow",
    places: &[
        ("actual_leaving", "Actual, as the air leaves"),
        ("actual_entering", "Actual, as the air enters"),
    ],
    plane: false,
};
const WATER: WaterSide<'static> = WaterSide { prefix: "water", whose: "" };
const DRAIN: &str = "drain.rate";
const DRAIN_T: &str = "drain.temperature";
const ROUTES: &str = "Heat removed, route by route";
const CLOSURE: &str = "Between the routes";

const CAUTIONS: &[Caution] = &[
    Caution {
        title: "At the coil",
        says: "Fans and belts start by themselves; pans and traps are under suction and slippery; ports of ducts under \
               pressure blow dust. Isolate before reaching in.",
    },
    Caution {
        title: "Live parts and pipes",
        says: "Test plugs and strainers are under pressure and may scald. Local rules, the maker’s instructions and licensed \
               people come first.",
    },
];

/// One route.
#[derive(Debug, Clone, Copy, PartialEq)]
struct Route {
    key: &'static str,
    label: &'static str,
    /// Within a sentence: "air".
    name: &'static str,
    heat: Power,
}

/// What was read of the coil.
struct Coil {
    entering: Read,
    leaving: Read,
    dry_air: DryAirFlow,
}

impl Check for CoilBalance {
    fn about(&self) -> &'static About {
        &ABOUT
    }

    fn form(&self, given: &Given) -> Vec<Section> {
        let mut water = WATER.items(given);
        for item in &mut water {
            if let crate::form::Item::Reading(item) = item {
                item.required = false;
            }
        }
        vec![
            pressure::section(given),
            Section::new("entering", "Entering air", ENTERING.items(given))
                .marked(Mark::ENTERING)
                .beside("before the coil"),
            Section::new("leaving", "Leaving air", LEAVING.items(given))
                .marked(Mark::LEAVING)
                .beside("after the coil, before the fan"),
            Section::new("flow", "Air flow", FLOW.items(given, true)),
            Section::new("water", "The coil’s water", water),
            Section::new(
                "drain",
                "The drain",
                vec![
                    ReadingItem::optional(DRAIN, "Water drained", Kind::CondensateFlow)
                        .help(
                            "By timed fills of five minutes or more, on a coil that is wet through",
                        )
                        .into(),
                    ReadingItem::optional(DRAIN_T, "Its temperature", Kind::Temperature)
                        .help("Blank is the leaving wet bulb")
                        .covered()
                        .into(),
                ],
            ),
        ]
    }

    fn solve(&self, given: &Given) -> Result<Outcome, Stop> {
        let (here, coil) = pressure::with(given, |here| read(given, here))?;
        let routes = routes(given, &coil)?;
        if routes.len() < 2 {
            return Err(Stop::Waits(vec![
                Missing::new(WATER.key("rate"), "the coil’s water"),
                Missing::new(DRAIN, "or what it drains"),
            ]));
        }
        let mut outcome = Outcome { cautions: CAUTIONS, ..Outcome::default() };
        for route in &routes {
            outcome.push(Figure::new(route.key, route.label, route.heat.amount(), ROUTES));
        }
        gaps(&routes, &mut outcome);
        self.mean(given, &routes, &mut outcome);
        outcome.steps.extend(steps(&coil, &routes));
        if let Ok(water) = WATER.read(given) {
            outcome.notes.extend(water.notes);
            outcome.steps.extend(water.steps);
        }
        judge(given, &coil, &routes, &mut outcome);
        outcome.notes.extend(here.notes);
        finish(coil, &mut outcome);
        outcome.pressure =
            Some(Sentence::new("{0}, {s0}").with(here.pressure.amount()).nested(here.source));
        Ok(outcome)
    }

    fn judge(&self, _: &Given, outcome: &Outcome, doubts: &BTreeMap<String, Doubt>) -> Vec<Note> {
        let mut notes = Vec::new();
        for (key, names) in PAIRS {
            let (Some(gap), Some(doubt)) = (outcome.amount(key), doubts.get(*key)) else {
                continue;
            };
            let Some(half_width) = doubt.half_width_si else { continue };
            let size = Amount::new(gap.kind(), gap.si().abs());
            let width = Amount::new(gap.kind(), half_width);
            let agrees = size.si() <= half_width;
            let lead = if agrees {
                Sentence::new("{w0} agree within what the readings allow: {0} apart, ± {1}.")
            } else {
                Sentence::new("{w0} differ by {0}, more than the ± {1} that the readings allow.")
            };
            let lead = lead.with(size).with(width).word(*names);
            notes.push(if agrees {
                Note::remark(format!("{key}_closes"), lead)
            } else {
                Note::unusual(format!("{key}_open"), FLOW.rate_key(&Given::default()), lead)
            });
        }
        notes
    }
}

/// Keys of the gaps, and the two routes in words.
const PAIRS: &[(&str, &str)] = &[
    ("gap_air_water", "Air and water"),
    ("gap_air_drain", "Air and drain"),
    ("gap_water_drain", "Water and drain"),
];

fn read(given: &Given, here: dewledger_quantities::Pressure) -> Result<Coil, Stop> {
    let states = both(ENTERING.read(given, here), LEAVING.read(given, here));
    let (entering, leaving) = match states {
        Ok(states) => states,
        Err(Stop::Waits(mut missing)) => {
            let key = FLOW.rate_key(given);
            if given.reading(&key).is_none() {
                missing.push(Missing::new(key, "the air flow"));
            }
            return Err(Stop::Waits(missing));
        }
        Err(refused) => return Err(refused),
    };
    let at = [("actual_entering", &entering.air), ("actual_leaving", &leaving.air)];
    let flow = FLOW.read(given, here, &at)?.map_err(|missing| Stop::Waits(vec![missing]))?;
    Ok(Coil { dry_air: flow.dry_air, entering, leaving })
}

/// Temperature of what drains: read, or the leaving wet bulb.
fn drain_temperature(given: &Given, leaving: &MoistAir) -> ThermodynamicTemperature {
    given
        .quantity(DRAIN_T)
        .or_else(|| leaving.wet_bulb().ok().map(dewledger_properties::WetBulb::reading))
        .unwrap_or_else(|| leaving.dry_bulb())
}

/// Every route that was read: air always, water and drain where they were.
fn routes(given: &Given, coil: &Coil) -> Result<Vec<Route>, Stop> {
    let (one, two) = (&coil.entering.air, &coil.leaving.air);
    let m = coil.dry_air.si();
    let t = drain_temperature(given, two);
    let h_f = water::enthalpy(t, two.pressure()).map_or(0.0, Quantity::si);
    let dried = one.humidity_ratio().si() - two.humidity_ratio().si();
    let air = m * ((one.enthalpy().si() - two.enthalpy().si()) - dried * h_f);
    let mut routes =
        vec![Route { key: "air", label: "By the air", name: "air", heat: Power::from_si(air) }];
    if WATER.begun(given) {
        let heat = WATER.read(given)?.heat;
        routes.push(Route { key: "water", label: "By the water", name: "water", heat });
    }
    if let Some(drained) = given.quantity::<CondensateFlow>(DRAIN) {
        if drained.si() < 0.0 {
            return Err(Refusal::new(
                DRAIN,
                "drain_below_zero",
                Sentence::new("A drain of {0} runs uphill. Check the number.")
                    .with(drained.amount()),
            )
            .into());
        }
        if dried < -given.floor("delta_w", 5e-5) && !given.is_drawn() {
            return Err(Refusal::new(
                DRAIN,
                "drain_without_drying",
                Sentence::new("Water came, and yet the air leaves with more of it than it brought. Swap the two points, or check the leaving humidity."),
            )
            .into());
        }
        let density = water::density(t, two.pressure()).map_or(999.5, Quantity::si);
        let cooled = |air: &MoistAir| {
            MoistAir::unchecked(air.dry_bulb(), two.humidity_ratio(), two.pressure())
                .enthalpy()
                .si()
        };
        let vapour = if dried.abs() > 1e-6 {
            (one.enthalpy().si() - cooled(one)) / dried
        } else {
            2.5009e6 + 1.86e3 * (one.dry_bulb().si() - 273.15)
        };
        let rate = MoistureFlow::from_si(drained.si() * density);
        let heat = m * (cooled(one) - cooled(two)) + rate.si() * (vapour - h_f);
        routes.push(Route {
            key: "drain",
            label: "By the drain",
            name: "drain",
            heat: Power::from_si(heat),
        });
    }
    Ok(routes)
}

/// Differences of the routes, pair by pair.
fn gaps(routes: &[Route], outcome: &mut Outcome) {
    for (index, one) in routes.iter().enumerate() {
        for other in routes.iter().skip(index + 1) {
            let gap = Power::from_si(one.heat.si() - other.heat.si());
            outcome.push(Figure::new(
                format!("gap_{}_{}", one.key, other.key),
                format!("{} less {}", capital(one.name), other.name),
                gap.amount(),
                CLOSURE,
            ));
        }
    }
}

fn capital(word: &str) -> String {
    let mut letters = word.chars();
    letters.next().map_or_else(String::new, |first| first.to_uppercase().chain(letters).collect())
}

impl CoilBalance {
    /// The mean of the routes where every ± is known; else the air route stands alone.
    fn mean(&self, given: &Given, routes: &[Route], outcome: &mut Outcome) {
        let kept: Option<Vec<f64>> =
            routes.iter().map(|route| given.kept(&format!("weight.{}", route.key))).collect();
        let weights = match kept {
            Some(weights) => Some(weights),
            None => self.weigh(given, routes, outcome),
        };
        let Some(weights) = weights else {
            let why = Sentence::new("the ± of every reading is needed to weigh the routes");
            outcome.figures.insert(
                0,
                Figure::withheld("mean", "Heat removed, all routes", why, ROUTES)
                    .role(Role::Headline),
            );
            return;
        };
        let mean: f64 =
            weights.iter().zip(routes).map(|(weight, route)| weight * route.heat.si()).sum();
        outcome.figures.insert(
            0,
            Figure::new("mean", "Heat removed, all routes", Power::from_si(mean).amount(), ROUTES)
                .role(Role::Headline),
        );
        suspects(given, outcome);
    }

    /// Finds weights and suspects from all sources of doubt, and keeps them.
    fn weigh(&self, given: &Given, routes: &[Route], outcome: &mut Outcome) -> Option<Vec<f64>> {
        let known = given.readings().all(|(key, reading)| {
            reading.half_width_si.is_some()
                || key.starts_with("pressure.")
                || key.ends_with("density")
                || key == DRAIN_T
                || key.starts_with("water.strength")
        });
        if !known {
            return None;
        }
        let here = pressure::here(given).ok()?.pressure;
        let heats = |given: &Given| -> Option<Vec<f64>> {
            let routes = routes_of(given, here)?;
            Some(routes.iter().map(|route| route.heat.si()).collect())
        };
        let middle: Vec<f64> = routes.iter().map(|route| route.heat.si()).collect();
        let mut sources = Vec::new();
        for term in terms(self, given) {
            let side = |sign: f64| {
                let moves: Vec<(Moved, f64)> =
                    term.moves.iter().map(|(what, by)| (what.clone(), sign * by)).collect();
                heats(&given.moved(&moves)).filter(|heats| heats.len() == middle.len())
            };
            let effect: Vec<f64> = match (side(1.0), side(-1.0)) {
                (Some(up), Some(down)) => {
                    up.iter().zip(&down).map(|(up, down)| 0.5 * (up - down)).collect()
                }
                (Some(up), None) => {
                    up.iter().zip(&middle).map(|(up, middle)| up - middle).collect()
                }
                (None, Some(down)) => {
                    middle.iter().zip(&down).map(|(middle, down)| middle - down).collect()
                }
                (None, None) => continue,
            };
            sources.push((term.source, effect));
        }
        let found = together(&middle, &Effects { sources })?;
        for (route, weight) in routes.iter().zip(&found.weights) {
            outcome.kept.insert(format!("weight.{}", route.key), *weight);
        }
        outcome.kept.insert("chi2".to_owned(), found.chi2);
        if found.disagree() {
            for suspect in &found.suspects {
                outcome.kept.insert(format!("suspect.{}", suspect.source), suspect.shift);
            }
        }
        Some(found.weights)
    }
}

fn routes_of(given: &Given, here: dewledger_quantities::Pressure) -> Option<Vec<Route>> {
    let coil = read(given, here).ok()?;
    routes(given, &coil).ok()
}

/// Says which readings would explain it, the least shift first.
fn suspects(given: &Given, outcome: &mut Outcome) {
    let all: Vec<(String, f64)> = given
        .all_kept()
        .map(|(what, value)| (what.to_owned(), value))
        .chain(outcome.kept.iter().map(|(what, value)| (what.clone(), *value)))
        .collect();
    if let Some((_, chi2)) = all.iter().find(|(what, _)| what == "chi2") {
        outcome.push(
            Figure::new(
                "chi2",
                "How far the routes are apart, in their doubt",
                Ratio::from_si(*chi2).amount(),
                CLOSURE,
            )
            .role(Role::Detail),
        );
    }
    let mut named: Vec<(String, f64)> = all
        .into_iter()
        .filter_map(|(what, shift)| Some((what.strip_prefix("suspect.")?.to_owned(), shift)))
        .collect();
    named.sort_by(|one, other| one.1.total_cmp(&other.1));
    named.dedup_by(|one, other| one.0 == other.0);
    let Some(first) = named.first().cloned() else { return };
    let names: Vec<&str> = named.iter().map(|(name, _)| name.as_str()).collect();
    let lead = if names.len() == 1 {
        Sentence::new("The routes disagree. Take again: {w0}.").word(first.0)
    } else {
        Sentence::new(
            "The routes disagree. Any of these would explain it, the least error first: {w0}.",
        )
        .word(names.join("; "))
    };
    let mut note = Note::unusual("routes_disagree", FLOW.rate_key(given), lead);
    if names.len() > 1 {
        note = note.because(Sentence::new(
            "These readings alone cannot tell which. Take the first again.",
        ));
    }
    outcome.notes.push(note);
}

fn judge(given: &Given, coil: &Coil, routes: &[Route], outcome: &mut Outcome) {
    if let Some(water) = routes.iter().find(|route| route.key == "water")
        && water.heat.si() < 0.0
    {
        outcome.notes.push(
            Note::unusual(
                "water_cools",
                WATER.key("leaving"),
                Sentence::new(
                    "This water cools down in a cooling coil: its two temperatures look swapped.",
                ),
            )
            .because(Sentence::new("Or it is a heating coil: the other check is for that.")),
        );
    }
    let leaving = coil.leaving.air.relative_humidity();
    if given.reading(DRAIN).is_some() {
        outcome.notes.push(
            Note::remark("drain_reads_low", Sentence::new("A pan that still fills, or drops carried over, make the drain read low, never high."))
                .because(Sentence::new("A coil takes 20 to 40 minutes to be wet through.")),
        );
        let low = routes
            .iter()
            .find(|route| route.key == "drain")
            .is_some_and(|drain| drain.heat.si() < 0.97 * routes[0].heat.si());
        if low && leaving.si() > 0.97 {
            outcome.notes.push(Note::unusual(
                "carried_over",
                LEAVING.key("dry_bulb"),
                Sentence::new(
                    "The drain is low and the air leaves at {0}: drops are carried over.",
                )
                .with(leaving.amount()),
            ));
        }
    }
    outcome.notes.push(Note::remark(
        "closure",
        Sentence::new("Closing to nothing is no merit, and missing by 5 % no fault: what counts is the ± of the difference."),
    ));
}

fn steps(coil: &Coil, routes: &[Route]) -> Vec<Step> {
    let mut steps = vec![Step::new(
        "Air",
        "m ((h1 - h2) - (W1 - W2) h_f)",
        Sentence::new("m = {0}, h {1} to {2}: {3}")
            .with(coil.dry_air.amount())
            .with(coil.entering.air.enthalpy().amount())
            .with(coil.leaving.air.enthalpy().amount())
            .with(routes[0].heat.amount()),
        "what the water must take: the air’s total less what drains with it",
    )];
    for route in &routes[1..] {
        let (formula, source) = if route.key == "water" {
            ("rho V (h_l - h_e)", "liquid at its own temperatures")
        } else {
            (
                "m (h(t1, W2) - h(t2, W2)) + m_c (h_v - h_f)",
                "cooling of the dry air, and the water that came",
            )
        };
        let share = Share::from_si(route.heat.si() / routes[0].heat.si());
        steps.push(Step::new(
            capital(route.name),
            formula,
            Sentence::new("{0}, {1} of the air’s").with(route.heat.amount()).with(share.amount()),
            source,
        ));
    }
    steps
}

fn finish(coil: Coil, outcome: &mut Outcome) {
    outcome.lines.push(Line {
        from: coil.entering.air,
        to: coil.leaving.air,
        kind: LineKind::Process,
    });
    for (point, label, mark, read) in [
        (ENTERING, "Entering air", Mark::ENTERING, coil.entering),
        (LEAVING, "Leaving air", Mark::LEAVING, coil.leaving),
    ] {
        let point: Point<'static> = point;
        if read.saturated {
            outcome.saturated.push(point.prefix.to_owned());
        }
        outcome.notes.extend(read.notes);
        outcome.states.push(StatePoint {
            key: point.prefix.into(),
            label: label.into(),
            mark: Some(mark),
            air: read.air,
        });
    }
}
