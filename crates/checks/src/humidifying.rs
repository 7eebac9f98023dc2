//! Humidifying and evaporative cooling: what does adding water do to this air?
//!
//! Steam: `W2 = W1 + dW`, `h2 = h1 + dW h_st`, then t from (h, W); its slope on the chart is `h_st`, nearly isothermal.
//! Wet steam `h = x h_g + (1 - x) h_f`. Adiabatic: saturation effectiveness `eps = (t1 - t2)/(t1 - t_wb1)`; `W2` from
//! `h2 - h1 = (W2 - W1) h_w(t_w)`; with recirculated water `t_w` is the wet bulb and the wet bulb stays. Beyond saturation
//! the rest is fog. Bleed: evaporation over (cycles - 1). Source: steady balances of dry air, water and energy.

mod evaporative;
mod steam;

use dewledger_properties::{MoistAir, settle};
use dewledger_quantities::{
    Enthalpy, HumidityRatio, Kind, MoistureFlow, Power, Quantity, Sentence, WaterEnthalpy,
};

use crate::check::{About, Check, Group};
use crate::drawn::{Line, LineKind};
use crate::flow_block::{Flow, FlowBlock};
use crate::form::{Choice, ChoiceItem, Item, Mark, Section};
use crate::given::Given;
use crate::outcome::{Caution, Figure, Note, Outcome, Role, StatePoint};
use crate::pressure;
use crate::refusal::{Refusal, Stop};
use crate::state_block::{Point, Read};

/// The check.
pub struct Humidifying;

const ABOUT: About = About {
    id: "humidifying",
    label: "Humidifying and evaporative cooling",
    question: "What does adding this water do to the air?",
    takes: "an air state, and steam or wetted media",
    group: Group::Air,
};

const ENTERING: Point<'static> = Point { prefix: "entering", name: "entering" };
const FLOW: FlowBlock<'static> = FlowBlock {
    prefix: "flow",
    places: &[("actual_entering", "Actual, as the air enters")],
    plane: false,
};
const BY: &str = "method.by";
const RESULTS: &str = "Leaving air";
const WATER: &str = "Water";

/// Practice limit of the relative humidity in a duct (field practice).
const DUCT_LIMIT: f64 = 0.90;

const CAUTIONS: &[Caution] = &[
    Caution {
        title: "Steam",
        says: "Steam and hot surfaces burn. No boiler additives may reach air that people breathe. Isolate, let cool and \
               vent before opening.",
    },
    Caution {
        title: "Growth in warm water",
        says: "Standing and sprayed water between 20 and 50 °C grows Legionella. Drain, clean and disinfect by the local \
               code. Local rules, the maker’s instructions and licensed people come first.",
    },
];

/// Air after water was added, typed.
#[derive(Debug, Clone)]
pub struct Humidified {
    /// The leaving air, saturated where there is fog.
    pub air: MoistAir,
    /// Water added per dry air.
    pub added: HumidityRatio,
    /// Enthalpy of air and fog together.
    pub enthalpy: Enthalpy,
    /// Fog per dry air.
    pub fog: HumidityRatio,
}

/// Adds water of an enthalpy to air; fog where it is more than the air can hold.
///
/// # Errors
///
/// What the properties refuse of the mixture.
pub fn add(
    air: &MoistAir,
    added: HumidityRatio,
    of: WaterEnthalpy,
) -> Result<Humidified, dewledger_properties::AirError> {
    let water = HumidityRatio::from_si(air.humidity_ratio().si() + added.si());
    let enthalpy = Enthalpy::from_si(air.enthalpy().si() + added.si() * of.si());
    let mixed = settle(enthalpy, water, air.pressure())?;
    let fog = HumidityRatio::from_si(mixed.liquid.si() + mixed.ice.si());
    Ok(Humidified { air: mixed.air, added, enthalpy, fog })
}

/// The largest addition that leaves the air at or below this relative humidity; by bisection, the humidity rises with
/// the addition.
#[must_use]
pub fn largest_addition(air: &MoistAir, of: WaterEnthalpy, limit: f64) -> Option<HumidityRatio> {
    let humidity = |added: f64| -> Option<f64> {
        let h = Enthalpy::from_si(air.enthalpy().si() + added * of.si());
        let w = HumidityRatio::from_si(air.humidity_ratio().si() + added);
        match MoistAir::from_enthalpy_and_humidity_ratio(h, w, air.pressure()) {
            Ok(then) => Some(then.relative_humidity().si()),
            Err(_) => None,
        }
    };
    if humidity(0.0)? >= limit {
        return Some(HumidityRatio::from_si(0.0));
    }
    let (mut low, mut high) = (0.0, 1e-3);
    while humidity(high).is_some_and(|then| then < limit) && high < 0.2 {
        low = high;
        high *= 2.0;
    }
    for _ in 0..80 {
        let middle = 0.5 * (low + high);
        if humidity(middle).is_some_and(|then| then < limit) {
            low = middle;
        } else {
            high = middle;
        }
    }
    Some(HumidityRatio::from_si(0.5 * (low + high)))
}

fn is_steam(given: &Given) -> bool {
    given.choice_or(BY, "steam") == "steam"
}

impl Check for Humidifying {
    fn about(&self) -> &'static About {
        &ABOUT
    }

    fn form(&self, given: &Given) -> Vec<Section> {
        let by: Item = ChoiceItem::new(
            BY,
            "Water is added by",
            Some("steam"),
            vec![
                Choice::helped("steam", "Steam", "Nearly no change of temperature"),
                Choice::helped(
                    "evaporative",
                    "Wetted media or spray",
                    "The air cools as it takes up water",
                ),
            ],
        )
        .into();
        let mut sections = vec![
            pressure::section(given),
            Section::new("entering", "Entering air", ENTERING.items(given)).marked(Mark::ENTERING),
            Section::new("method", "How", vec![by]),
        ];
        sections.extend(if is_steam(given) {
            steam::sections(given)
        } else {
            evaporative::sections(given)
        });
        sections.push(
            Section::new("flow", "Air flow", FLOW.items(given, false))
                .beside("without it, per dry air"),
        );
        sections
    }

    fn solve(&self, given: &Given) -> Result<Outcome, Stop> {
        let (here, read) = pressure::with(given, |here| ENTERING.read(given, here))?;
        let flow = FLOW.read(given, here.pressure, &[("actual_entering", &read.air)])?;
        let flow = match flow {
            Ok(flow) => Some(flow),
            Err(missing) if given.reading(&FLOW.rate_key(given)).is_some() => {
                return Err(Stop::Waits(vec![missing]));
            }
            Err(_) => None,
        };
        let mut outcome = Outcome { cautions: CAUTIONS, ..Outcome::default() };
        let done = if is_steam(given) {
            steam::solve(given, here.pressure, &read, flow.as_ref(), &mut outcome)?
        } else {
            evaporative::solve(given, &read, flow.as_ref(), &mut outcome)?
        };
        judge(&read, &done, &mut outcome);
        if let Some(flow) = &flow {
            outcome.steps.insert(0, flow.step.clone());
        }
        outcome.notes.extend(here.notes);
        outcome.notes.extend(read.notes.iter().cloned());
        if read.saturated {
            outcome.saturated.push(ENTERING.prefix.to_owned());
        }
        states(&read, &done, &mut outcome);
        outcome.pressure =
            Some(Sentence::new("{0}, {s0}").with(here.pressure.amount()).nested(here.source));
        Ok(outcome)
    }
}

/// The leaving air, its water, and the heat that came with it.
fn results(read: &Read, done: &Humidified, flow: Option<&Flow>, outcome: &mut Outcome) {
    let figure = |key, label, amount| Figure::new(key, label, amount, RESULTS);
    let air = &done.air;
    outcome.push(figure("dry_bulb", "Dry bulb", air.dry_bulb().amount()).role(Role::Minor));
    outcome.push(
        figure("relative_humidity", "Relative humidity", air.relative_humidity().amount())
            .role(Role::Minor),
    );
    outcome.push(figure("humidity_ratio", "Humidity ratio", air.humidity_ratio().amount()));
    outcome.push(figure("enthalpy", "Enthalpy", done.enthalpy.amount()));
    outcome.push(figure(
        "change_of_dry_bulb",
        "Change of dry bulb",
        dewledger_quantities::difference(air.dry_bulb(), read.air.dry_bulb()).amount(),
    ));
    if done.fog.si() > 0.0 {
        outcome.push(figure("fog", "Fog", done.fog.amount()));
    }
    let figure = |key, label, amount| Figure::new(key, label, amount, WATER);
    outcome.push(figure("added", "Water added per dry air", done.added.amount()));
    let Some(flow) = flow else { return };
    let m = flow.dry_air.si();
    outcome.push(figure(
        "water",
        "Water added",
        MoistureFlow::from_si(m * done.added.si()).amount(),
    ));
    outcome.push(figure(
        "heat",
        "Heat that came with it",
        Power::from_si(m * (done.enthalpy.si() - read.air.enthalpy().si())).amount(),
    ));
    if done.fog.si() > 0.0 {
        outcome.push(figure("fog_flow", "Fog", MoistureFlow::from_si(m * done.fog.si()).amount()));
    }
    outcome.push(figure("dry_air", "Dry-air mass flow", flow.dry_air.amount()).role(Role::Detail));
}

/// Makes the first of these the headline.
fn headline(outcome: &mut Outcome, order: &[&str]) {
    let key = order.iter().find(|key| outcome.amount(key).is_some());
    if let Some(figure) =
        key.and_then(|key| outcome.figures.iter_mut().find(|figure| figure.key == *key))
    {
        figure.role = Role::Headline;
    }
}

fn judge(read: &Read, done: &Humidified, outcome: &mut Outcome) {
    let humidity = done.air.relative_humidity();
    if done.fog.si() > 0.0 {
        outcome.notes.push(
            Note::unusual(
                "fog",
                BY,
                Sentence::new("The air cannot hold it: {0} of water is fog.")
                    .with(done.fog.amount()),
            )
            .because(Sentence::new(
                "It wets filters, casing and floor until something warms the air.",
            )),
        );
    } else if humidity.si() > DUCT_LIMIT {
        outcome.notes.push(
            Note::unusual(
                "duct_limit",
                BY,
                Sentence::new(
                    "Leaving air of {0} is above the 90 % that practice allows in a duct.",
                )
                .with(humidity.amount()),
            )
            .because(Sentence::new(
                "Drops reach the next elbow, filter or coil before they are taken up.",
            )),
        );
    }
    if read.air.relative_humidity().si() > 0.70 {
        outcome.notes.push(Note::unusual(
            "humid_already",
            ENTERING.key("dry_bulb"),
            Sentence::new("The entering air is at {0} already: is there anything to humidify?")
                .with(read.air.relative_humidity().amount()),
        ));
    }
}

fn states(read: &Read, done: &Humidified, outcome: &mut Outcome) {
    let point = |key: &'static str, label: &'static str, mark, air| StatePoint {
        key: key.into(),
        label: label.into(),
        mark: Some(mark),
        air,
    };
    outcome.states.push(point("entering", "Entering air", Mark::ENTERING, read.air));
    outcome.states.push(point("leaving", "Leaving air", Mark::LEAVING, done.air));
    outcome.lines.push(Line { from: read.air, to: done.air, kind: LineKind::Process });
}

/// The properties refuse the mixture.
fn out_of_range(error: &dewledger_properties::AirError) -> Stop {
    Refusal::new(
        ENTERING.key("dry_bulb"),
        "mixture_out_of_range",
        Sentence::new("The humidified air is outside what moist air is worked out for ({w0}).")
            .word(error.to_string()),
    )
    .into()
}

/// A temperature of water, in range.
fn water_temperature(
    given: &Given,
    key: &'static str,
) -> Result<Option<dewledger_quantities::ThermodynamicTemperature>, Stop> {
    let Some(t): Option<dewledger_quantities::ThermodynamicTemperature> = given.quantity(key)
    else {
        return Ok(None);
    };
    if (273.15..=373.15).contains(&t.si()) {
        return Ok(Some(t));
    }
    Err(Refusal::new(
        key,
        "water_temperature_out_of_range",
        Sentence::new(
            "Water at {0} is outside 0 to 100 °C (32 to 212 °F). Check the number and its unit.",
        )
        .with(t.amount()),
    )
    .into())
}

/// A reading of a kind that is a share.
const SHARE: Kind = Kind::Share;
