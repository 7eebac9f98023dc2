//! Fan and motor heat: by how much does this fan warm the air?
//!
//! Air power `V dp_t`; shaft power is that over the fan's efficiency; motor input the shaft's over drive and motor. What
//! reaches the air: the motor in the stream all its input; the motor outside with the belt inside, the shaft over the
//! drive; all of the drive outside, the shaft alone. Rise from `h(t + dT) - h(t) = P/m` at constant humidity ratio.
//! From pressure alone, without a flow: `dT = dp_t v / (c_p eta)`. Total pressure across the fan; what is lost
//! downstream warms nothing further, since throttling leaves the enthalpy. Source: steady energy balance.

use dewledger_properties::MoistAir;
use dewledger_quantities::{
    AirFlow, DryAirFlow, Kind, Power, PressureDifference, Quantity, Ratio, Sentence,
    TemperatureInterval,
};

use crate::check::{About, Check, Group};
use crate::drawn::{Line, LineKind};
use crate::flow_block::{Flow, FlowBlock};
use crate::form::{Choice, ChoiceItem, Item, Mark, ReadingItem, Section};
use crate::given::Given;
use crate::outcome::{Caution, Figure, Missing, Note, Outcome, Role, StatePoint, Step};
use crate::pressure;
use crate::refusal::{Refusal, Stop};
use crate::state_block::{Point, Read};

/// The check.
pub struct FanHeat;

const ABOUT: About = About {
    id: "fan_heat",
    label: "Fan and motor heat",
    question: "By how much does this fan warm the air?",
    takes: "the air, and total pressure with efficiencies or electrical power",
    group: Group::Air,
};

const AIR: Point<'static> = Point { prefix: "entering", name: "entering" };
const FLOW: FlowBlock<'static> = FlowBlock {
    prefix: "flow",
    places: &[("actual_entering", "Actual, as the air enters the fan")],
    plane: false,
};
const BY: &str = "fan.by";
const PLACE: &str = "fan.motor";
const PRESSURE: &str = "fan.total_pressure";
const POWER: &str = "fan.power";
const FAN: &str = "fan.efficiency";
const DRIVE: &str = "fan.drive_efficiency";
const MOTOR: &str = "fan.motor_efficiency";
const RESULTS: &str = "Into the air";
const POWERS: &str = "Powers";

const CAUTIONS: &[Caution] = &[
    Caution {
        title: "Live terminals and moving belts",
        says: "Clamp on only if you are competent and allowed to. Isolate and lock before a guard comes off: fans turn in \
               a draught and start by themselves.",
    },
    Caution {
        title: "Whose judgement",
        says: "Local rules, the maker’s instructions and licensed people come first.",
    },
];

/// Where the motor and its drive stand.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum MotorPlace {
    /// Motor and drive in the air stream.
    InStream,
    /// The motor outside, its belt inside.
    BeltInside,
    /// Motor and drive outside.
    Outside,
}

/// Efficiencies of the chain, dimensionless, 0.1 to 1.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Chain {
    /// Air power over shaft power, with total pressure.
    pub fan: Ratio,
    /// Shaft power over what the motor gives.
    pub drive: Ratio,
    /// What the motor gives over what it takes.
    pub motor: Ratio,
}

/// Powers along the chain.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Powers {
    /// Given to the air as pressure.
    pub air: Power,
    /// At the fan's shaft.
    pub shaft: Power,
    /// Taken by the motor.
    pub motor: Power,
    /// What of it ends up as heat of the air.
    pub heat: Power,
}

/// Powers from an actual flow at the fan and the total pressure across it.
#[must_use]
pub fn powers(
    flow: AirFlow,
    total_pressure: PressureDifference,
    chain: Chain,
    place: MotorPlace,
) -> Powers {
    let air = flow.si() * total_pressure.si();
    let shaft = air / chain.fan.si();
    let motor = shaft / (chain.drive.si() * chain.motor.si());
    let heat = match place {
        MotorPlace::InStream => motor,
        MotorPlace::BeltInside => shaft / chain.drive.si(),
        MotorPlace::Outside => shaft,
    };
    let power = Power::from_si;
    Powers { air: power(air), shaft: power(shaft), motor: power(motor), heat: power(heat) }
}

/// The air after it has taken up this power at constant humidity ratio.
///
/// # Errors
///
/// What the properties refuse of it.
pub fn warmed(
    air: &MoistAir,
    dry_air: DryAirFlow,
    heat: Power,
) -> Result<MoistAir, dewledger_properties::AirError> {
    let enthalpy =
        dewledger_quantities::Enthalpy::from_si(air.enthalpy().si() + heat.si() / dry_air.si());
    MoistAir::from_enthalpy_and_humidity_ratio(enthalpy, air.humidity_ratio(), air.pressure())
}

fn place(given: &Given) -> Option<MotorPlace> {
    match given.choice(PLACE)? {
        "in_stream" => Some(MotorPlace::InStream),
        "belt_inside" => Some(MotorPlace::BeltInside),
        "outside" => Some(MotorPlace::Outside),
        _ => None,
    }
}

fn by_power(given: &Given) -> bool {
    given.choice_or(BY, "pressure") == "power"
}

impl Check for FanHeat {
    fn about(&self) -> &'static About {
        &ABOUT
    }

    fn form(&self, given: &Given) -> Vec<Section> {
        vec![
            pressure::section(given),
            Section::new("entering", "Air at the fan", AIR.items(given))
                .marked(Mark::ENTERING)
                .beside("as it enters the fan"),
            Section::new("flow", "Air flow", FLOW.items(given, by_power(given))),
            Section::new("fan", "The fan", fan_items(given)),
        ]
    }

    fn solve(&self, given: &Given) -> Result<Outcome, Stop> {
        let (here, read) = pressure::with(given, |here| AIR.read(given, here))?;
        let flow = match FLOW.read(given, here.pressure, &[("actual_entering", &read.air)])? {
            Ok(flow) => Some(flow),
            Err(missing) if by_power(given) || given.reading(&FLOW.rate_key(given)).is_some() => {
                return Err(Stop::Waits(vec![missing]));
            }
            Err(_) => None,
        };
        let mut outcome = Outcome { cautions: CAUTIONS, ..Outcome::default() };
        if by_power(given) {
            electrical(given, &read, flow.as_ref(), &mut outcome)?;
        } else {
            pressed(given, &read, flow.as_ref(), &mut outcome)?;
        }
        outcome.notes.extend(here.notes);
        outcome.notes.extend(read.notes.iter().cloned());
        if read.saturated {
            outcome.saturated.push(AIR.prefix.to_owned());
        }
        outcome.pressure =
            Some(Sentence::new("{0}, {s0}").with(here.pressure.amount()).nested(here.source));
        Ok(outcome)
    }
}

fn fan_items(given: &Given) -> Vec<Item> {
    let mut items: Vec<Item> = vec![
        ChoiceItem::new(
            BY,
            "Known from",
            Some("pressure"),
            vec![
                Choice::helped(
                    "pressure",
                    "Pressure",
                    "Total pressure across the fan and its efficiency",
                ),
                Choice::helped(
                    "power",
                    "Electrical power",
                    "What the motor takes, by a power meter",
                ),
            ],
        )
        .into(),
        ChoiceItem::new(
            PLACE,
            "The motor stands",
            None,
            vec![
                Choice::helped("in_stream", "In the air stream", "All that it takes warms the air"),
                Choice::helped(
                    "belt_inside",
                    "Outside, belt inside",
                    "The motor’s own loss stays outside",
                ),
                Choice::helped(
                    "outside",
                    "Outside with its drive",
                    "Only the shaft’s power comes in",
                ),
            ],
        )
        .into(),
    ];
    if by_power(given) {
        items.push(
            ReadingItem::wanted(POWER, "Power that the motor takes", Kind::Power)
                .help("Watts, not volt-amperes")
                .into(),
        );
    } else {
        items.push(
            ReadingItem::wanted(
                PRESSURE,
                "Total pressure across the fan",
                Kind::PressureDifference,
            )
            .into(),
        );
        items.push(
            ReadingItem::wanted(FAN, "Efficiency of the fan", Kind::Share)
                .help("With total pressure, from its maker at this point")
                .into(),
        );
    }
    if place(given) != Some(MotorPlace::Outside) || by_power(given) {
        items.push(
            ReadingItem::optional(DRIVE, "Efficiency of the drive", Kind::Share)
                .assuming(dewledger_quantities::Share::from_si(1.0).amount())
                .help("Belt or gear; a direct drive is 100 %")
                .covered()
                .into(),
        );
    }
    let motor_matters = match place(given) {
        Some(MotorPlace::InStream) => !by_power(given),
        Some(MotorPlace::BeltInside | MotorPlace::Outside) => by_power(given),
        None => false,
    };
    if motor_matters {
        items.push(
            ReadingItem::wanted(MOTOR, "Efficiency of the motor", Kind::Share)
                .help("And of its speed drive, where that is in the stream")
                .into(),
        );
    }
    items
}

/// An efficiency as read: none while it is not.
fn efficiency(given: &Given, key: &'static str) -> Result<Option<Ratio>, Stop> {
    let Some(share): Option<dewledger_quantities::Share> = given.quantity(key) else {
        return Ok(None);
    };
    if (0.1..=1.0).contains(&share.si()) {
        return Ok(Some(Ratio::from_si(share.si())));
    }
    Err(Refusal::new(
        key,
        "efficiency_out_of_range",
        Sentence::new(
            "An efficiency of {0} is outside 10 to 100 %. Check the number and its unit.",
        )
        .with(share.amount()),
    )
    .into())
}

fn asked_place(given: &Given) -> Result<MotorPlace, Stop> {
    place(given).ok_or_else(|| {
        let mut missing = Missing::new(PLACE, "where the motor stands");
        missing.asks = Some(Sentence::new("Does the motor stand in the air stream?"));
        Stop::Waits(vec![missing])
    })
}

/// By total pressure and efficiencies; with a flow the powers too.
fn pressed(
    given: &Given,
    read: &Read,
    flow: Option<&Flow>,
    outcome: &mut Outcome,
) -> Result<(), Stop> {
    let pressure: Option<PressureDifference> = given.quantity(PRESSURE);
    let fan = efficiency(given, FAN)?;
    let motor = efficiency(given, MOTOR)?;
    let drive = efficiency(given, DRIVE)?.unwrap_or_else(|| Ratio::from_si(1.0));
    let mut missing = Vec::new();
    if pressure.is_none() {
        missing.push(Missing::new(PRESSURE, "the total pressure across the fan"));
    }
    if fan.is_none() {
        missing.push(Missing::new(FAN, "the fan’s efficiency"));
    }
    let place = match asked_place(given) {
        Ok(place) => place,
        Err(Stop::Waits(more)) => {
            missing.extend(more);
            return Err(Stop::Waits(missing));
        }
        Err(refused) => return Err(refused),
    };
    if place == MotorPlace::InStream && motor.is_none() {
        missing.push(Missing::new(MOTOR, "the motor’s efficiency"));
    }
    let (Some(pressure), Some(fan), true) = (pressure, fan, missing.is_empty()) else {
        return Err(Stop::Waits(missing));
    };
    if !(10.0..=5000.0).contains(&pressure.si()) {
        return Err(Refusal::new(
            PRESSURE,
            "total_pressure_out_of_range",
            Sentence::new(
                "A total pressure of {0} is outside 10 to 5 000 Pa. Check the number and its unit.",
            )
            .with(pressure.amount()),
        )
        .into());
    }
    let chain = Chain { fan, drive, motor: motor.unwrap_or_else(|| Ratio::from_si(1.0)) };
    // Per cubic metre that passes the rise is the same whatever passes.
    let volume = AirFlow::from_si(
        flow.map_or(1.0, |flow| flow.dry_air.si() * read.air.specific_volume().si()),
    );
    let powers = powers(volume, pressure, chain, place);
    let dry_air = DryAirFlow::from_si(volume.si() / read.air.specific_volume().si());
    rise(read, dry_air, powers.heat, outcome)?;
    let cp = read.air.heat_capacity();
    let ideal = pressure.si() * read.air.specific_volume().si() / cp.si();
    outcome.push(
        Figure::new(
            "rise_ideal",
            "Rise by the pressure alone",
            TemperatureInterval::from_si(ideal).amount(),
            RESULTS,
        )
        .on_condition(Sentence::new("were every efficiency 100 %"))
        .role(Role::Detail),
    );
    outcome.steps.insert(
        0,
        Step::new(
            "Rise from pressure",
            "dT = dp_t v / (c_p eta)",
            Sentence::new("{0} × {1} ÷ {2} = {3} at an efficiency of 1")
                .with(pressure.amount())
                .with(read.air.specific_volume().amount())
                .with(cp.amount())
                .with(TemperatureInterval::from_si(ideal).amount()),
            "needs no flow; total pressure, since throttling downstream warms nothing further",
        ),
    );
    if let Some(flow) = flow {
        let figure = |key, label, amount| Figure::new(key, label, amount, POWERS);
        outcome.push(figure("heat", "Heat into the air", powers.heat.amount()));
        outcome.push(figure("air_power", "Given to the air as pressure", powers.air.amount()));
        outcome.push(figure("shaft_power", "At the shaft", powers.shaft.amount()));
        outcome.push(figure("motor_input", "Taken by the motor", powers.motor.amount()));
        outcome
            .push(figure("dry_air", "Dry-air mass flow", flow.dry_air.amount()).role(Role::Detail));
        outcome.steps.push(flow.step.clone());
        outcome.steps.push(chain_step(powers, chain, place));
    }
    Ok(())
}

fn chain_step(powers: Powers, chain: Chain, place: MotorPlace) -> Step {
    let share = |ratio: Ratio| dewledger_quantities::Share::from_si(ratio.si()).amount();
    let formula = match place {
        MotorPlace::InStream => "P = V dp_t / (eta_fan eta_drive eta_motor)",
        MotorPlace::BeltInside => "P = V dp_t / (eta_fan eta_drive)",
        MotorPlace::Outside => "P = V dp_t / eta_fan",
    };
    Step::new(
        "Heat into the air",
        formula,
        Sentence::new("air power {0}, fan {1}, drive {2}, motor {3}: {4}")
            .with(powers.air.amount())
            .with(share(chain.fan))
            .with(share(chain.drive))
            .with(share(chain.motor))
            .with(powers.heat.amount()),
        "steady energy balance; what the motor loses outside stays outside",
    )
}

/// By what the motor takes.
fn electrical(
    given: &Given,
    read: &Read,
    flow: Option<&Flow>,
    outcome: &mut Outcome,
) -> Result<(), Stop> {
    let taken: Option<Power> = given.quantity(POWER);
    let drive = efficiency(given, DRIVE)?.unwrap_or_else(|| Ratio::from_si(1.0));
    let motor = efficiency(given, MOTOR)?;
    let place = asked_place(given);
    let mut missing = Vec::new();
    if taken.is_none() {
        missing.push(Missing::new(POWER, "the power that the motor takes"));
    }
    let place = match place {
        Ok(place) => place,
        Err(Stop::Waits(more)) => {
            missing.extend(more);
            return Err(Stop::Waits(missing));
        }
        Err(refused) => return Err(refused),
    };
    if place != MotorPlace::InStream && motor.is_none() {
        missing.push(Missing::new(MOTOR, "the motor’s efficiency"));
    }
    let (Some(taken), Some(flow), true) = (taken, flow, missing.is_empty()) else {
        return Err(Stop::Waits(missing));
    };
    if !(10.0..=1e6).contains(&taken.si()) {
        return Err(Refusal::new(
            POWER,
            "power_out_of_range",
            Sentence::new(
                "A fan that takes {0} is outside 10 W to 1 MW. Check the number and its unit.",
            )
            .with(taken.amount()),
        )
        .into());
    }
    let motor = motor.unwrap_or_else(|| Ratio::from_si(1.0));
    let share = match place {
        MotorPlace::InStream => 1.0,
        MotorPlace::BeltInside => motor.si(),
        MotorPlace::Outside => motor.si() * drive.si(),
    };
    let heat = Power::from_si(taken.si() * share);
    rise(read, flow.dry_air, heat, outcome)?;
    let figure = |key, label, amount| Figure::new(key, label, amount, POWERS);
    outcome.push(figure("heat", "Heat into the air", heat.amount()));
    outcome.push(figure("motor_input", "Taken by the motor", taken.amount()));
    outcome.push(figure("dry_air", "Dry-air mass flow", flow.dry_air.amount()).role(Role::Detail));
    outcome.steps.insert(0, flow.step.clone());
    Ok(())
}

/// The rise, and the air behind the fan.
fn rise(read: &Read, dry_air: DryAirFlow, heat: Power, outcome: &mut Outcome) -> Result<(), Stop> {
    let after = warmed(&read.air, dry_air, heat).map_err(|error| {
        Stop::from(Refusal::new(
            AIR.key("dry_bulb"),
            "warmed_out_of_range",
            Sentence::new(
                "The air behind the fan is outside what moist air is worked out for ({w0}).",
            )
            .word(error.to_string()),
        ))
    })?;
    let rise = TemperatureInterval::from_si(after.dry_bulb().si() - read.air.dry_bulb().si());
    outcome.push(
        Figure::new("rise", "Rise of the dry bulb", rise.amount(), RESULTS).role(Role::Headline),
    );
    outcome.push(
        Figure::new("leaving", "Dry bulb behind the fan", after.dry_bulb().amount(), RESULTS)
            .role(Role::Minor),
    );
    outcome.push(
        Figure::new(
            "leaving_humidity",
            "Relative humidity behind the fan",
            after.relative_humidity().amount(),
            RESULTS,
        )
        .role(Role::Detail),
    );
    outcome.steps.push(Step::new(
        "Rise",
        "h(t + dT, W) - h(t, W) = P / m",
        Sentence::new("P = {0}, m = {1}: {2}")
            .with(heat.amount())
            .with(dry_air.amount())
            .with(rise.amount()),
        "real-gas moist air at constant humidity ratio",
    ));
    if rise.si() > 5.0 {
        outcome.notes.push(
            Note::unusual(
                "large_rise",
                PRESSURE,
                Sentence::new("A fan that warms the air by {0} is unusual.").with(rise.amount()),
            )
            .because(Sentence::new("Check the pressure’s unit, the efficiency, and the flow.")),
        );
    }
    outcome.notes.push(
        Note::remark("counted_once", Sentence::new("Count this heat once."))
            .because(Sentence::new("A supply temperature read behind the fan holds it already.")),
    );
    let point = |key: &'static str, label: &'static str, mark, air| StatePoint {
        key: key.into(),
        label: label.into(),
        mark: Some(mark),
        air,
    };
    outcome.states.push(point("entering", "Air at the fan", Mark::ENTERING, read.air));
    outcome.states.push(point("leaving", "Air behind the fan", Mark::LEAVING, after));
    outcome.lines.push(Line { from: read.air, to: after, kind: LineKind::Process });
    Ok(())
}
