//! Energy recovery: how much of what leaves does this exchanger bring back?
//!
//! Effectiveness `eps_x = m2 (x1 - x2) / (m_min (x1 - x3))`, `m_min = min(m2, m3)`, x the dry bulb (sensible), the humidity
//! ratio (latent), the enthalpy (total); 1 outdoor air entering, 2 supply leaving, 3 return entering, 4 exhaust leaving
//! (definition of ANSI/AHRI 1060 and ANSI/ASHRAE 84, from memory). Of unequal flows it refers to the smaller one and
//! is not comparable with a rating at equal flows. Less the exhaust that is carried over: `x2* = (x2 - EATR x3)/(1 -
//! EATR)`, EATR `= (c2 - c1)/(c3 - c1)` from CO2. With 4 the balances of heat and of water are held apart: heat can close
//! where water does not.

use std::collections::BTreeMap;

use dewledger_properties::{Humidity, MoistAir, saturation_humidity_ratio};
use dewledger_quantities::{
    Amount, DryAirFlow, HumidityRatio, Kind, MoistureFlow, Power, Pressure, Quantity, Ratio,
    Sentence, Share, TemperatureInterval, ThermodynamicTemperature,
};

use crate::check::{About, Check, Group};
use crate::doubt::Doubt;
use crate::drawn::{Line, LineKind};
use crate::flow_block::{Flow, FlowBlock};
use crate::form::{Choice, ChoiceItem, Item, Mark, ReadingItem, Section, Shape};
use crate::given::Given;
use crate::outcome::{Caution, Figure, Missing, Note, Outcome, Role, StatePoint, Step};
use crate::pressure;
use crate::refusal::{Refusal, Stop};
use crate::split::split;
use crate::state_block::{Point, Read};

/// The check.
pub struct Recovery;

const ABOUT: About = About {
    id: "recovery",
    label: "Energy recovery",
    question: "How much of what leaves does this exchanger bring back?",
    takes: "the air at three or four corners, and both flows",
    group: Group::Air,
};

const OUTDOOR: Point<'static> = Point { prefix: "outdoor", name: "outdoor" };
const SUPPLY: Point<'static> = Point { prefix: "supply", name: "supply" };
const RETURN: Point<'static> = Point { prefix: "return", name: "return" };
const EXHAUST: Point<'static> = Point { prefix: "exhaust", name: "exhaust" };
const SUPPLY_FLOW: FlowBlock<'static> = FlowBlock {
    prefix: "supply_flow",
    places: &[("actual_supply", "Actual, as it is supplied")],
    plane: false,
};
const RETURN_FLOW: FlowBlock<'static> = FlowBlock {
    prefix: "return_flow",
    places: &[("actual_return", "Actual, in the return")],
    plane: false,
};
const DEVICE: &str = "device.kind";
const TRANSFER_BY: &str = "transfer.by";
const TRANSFER: &str = "transfer.ratio";
const CO2: [&str; 3] = ["transfer.co2_outdoor", "transfer.co2_supply", "transfer.co2_return"];

const EFFECT: &str = "Effectiveness";
const MOVED: &str = "Recovered";
const BALANCE: &str = "Do both sides agree?";

/// Differences between the two entering airs below which an effectiveness says nothing, K, kg/kg, J/kg.
const LEAST: [f64; 3] = [2.0, 5e-4, 2000.0];
/// Below this difference, K, small errors count.
const BETTER_FROM_K: f64 = 6.0;
/// More carry-over than this is unusual (field practice).
const LARGE_TRANSFER: f64 = 0.10;

const CAUTIONS: &[Caution] = &[
    Caution {
        title: "Rotor and belts",
        says: "The rotor turns and starts by itself. Isolate and lock before reaching in. A frozen exchanger may collapse: \
               do not chip at it.",
    },
    Caution {
        title: "What the exhaust carries",
        says: "Carry-over brings exhaust back to people. Exhaust from toilets, laboratories and isolation rooms is for the \
               person in charge of it. Local rules, the maker’s instructions and licensed people come first.",
    },
];

/// Both streams, typed: states at the corners, dry air of each side.
#[derive(Debug, Clone)]
pub struct Streams {
    /// Outdoor air entering.
    pub outdoor: MoistAir,
    /// Supply air leaving.
    pub supply: MoistAir,
    /// Return air entering.
    pub back: MoistAir,
    /// Dry air supplied.
    pub supplied: DryAirFlow,
    /// Dry air returned.
    pub returned: DryAirFlow,
}

/// Sensible, latent and total effectiveness, dimensionless; not finite where the entering airs are alike.
#[must_use]
pub fn effectiveness(streams: &Streams) -> [Ratio; 3] {
    let least = streams.supplied.si().min(streams.returned.si());
    let share = streams.supplied.si() / least;
    let of = |x: &dyn Fn(&MoistAir) -> f64| {
        let (one, two, three) = (x(&streams.outdoor), x(&streams.supply), x(&streams.back));
        Ratio::from_si(share * (one - two) / (one - three))
    };
    [
        of(&|air| air.dry_bulb().si()),
        of(&|air| air.humidity_ratio().si()),
        of(&|air| air.enthalpy().si()),
    ]
}

/// The supply air as it would be without the exhaust that is carried over into it.
#[must_use]
pub fn without_transfer(value: f64, returned: f64, transfer: Ratio) -> f64 {
    (value - transfer.si() * returned) / (1.0 - transfer.si())
}

/// How far the straight line between two airs comes to saturation: the largest `W / W_s` along it.
#[must_use]
pub fn nearest_to_saturation(one: &MoistAir, other: &MoistAir) -> f64 {
    let mix = |of: &dyn Fn(&MoistAir) -> f64, share: f64| of(one) + share * (of(other) - of(one));
    (0..=200)
        .filter_map(|step| {
            let share = f64::from(step) / 200.0;
            let t = ThermodynamicTemperature::from_si(mix(&|air| air.dry_bulb().si(), share));
            let w = mix(&|air| air.humidity_ratio().si(), share);
            Some(w / saturation_humidity_ratio(t, one.pressure()).ok()?.si())
        })
        .fold(0.0, f64::max)
}

/// Devices that move moisture too.
fn moves_moisture(given: &Given) -> Option<bool> {
    given.choice(DEVICE).map(|device| device == "moist_wheel")
}

fn mark(letter: char, shape: Shape) -> Mark {
    Mark { letter, shape }
}

impl Check for Recovery {
    fn about(&self) -> &'static About {
        &ABOUT
    }

    fn form(&self, given: &Given) -> Vec<Section> {
        let corner = |point: Point<'static>, title: &'static str, aside, letter, shape| {
            Section::new(point.prefix, title, point.items(given))
                .marked(mark(letter, shape))
                .beside(aside)
        };
        let mut exhaust =
            corner(EXHAUST, "Exhaust air", "as it leaves the exchanger", 'X', Shape::Square);
        exhaust.seldom = true;
        for item in &mut exhaust.items {
            if let Item::Reading(item) = item {
                item.required = false;
            }
        }
        vec![
            pressure::section(given),
            Section::new("device", "The exchanger", vec![device().into()]),
            corner(OUTDOOR, "Outdoor air", "as it enters the exchanger", 'O', Shape::Circle),
            corner(SUPPLY, "Supply air", "as it leaves the exchanger", 'S', Shape::Triangle),
            corner(RETURN, "Return air", "as it enters the exchanger", 'R', Shape::Diamond),
            exhaust,
            Section::new("supply_flow", "Supply flow", SUPPLY_FLOW.items(given, false)),
            Section::new("return_flow", "Return flow", RETURN_FLOW.items(given, false)),
            Section::new("transfer", "Carry-over", transfer_items(given)).seldom(),
        ]
    }

    fn solve(&self, given: &Given) -> Result<Outcome, Stop> {
        let Some(moist) = moves_moisture(given) else {
            let mut missing = Missing::new(DEVICE, "what kind of exchanger it is");
            missing.asks = Some(Sentence::new("Does it move moisture as well as heat?"));
            return Err(Stop::Waits(vec![missing]));
        };
        let (here, corners) = pressure::with(given, |here| Corners::read(given, here, moist))?;
        let flows = read_flows(given, here.pressure, &corners)?;
        let mut outcome = Outcome { cautions: CAUTIONS, ..Outcome::default() };
        let equal = DryAirFlow::from_si(1.0);
        let streams = Streams {
            outdoor: corners.outdoor.air,
            supply: corners.supply.air,
            back: corners.back.air,
            supplied: flows.as_ref().map_or(equal, |(supply, _)| supply.dry_air),
            returned: flows.as_ref().map_or(equal, |(_, back)| back.dry_air),
        };
        let transfer = read_transfer(given)?;
        effects(given, &streams, &corners, moist, transfer, &mut outcome);
        match &flows {
            Some((supply, back)) => {
                outcome.steps.push(supply.step.clone());
                outcome.steps.push(back.step.clone());
                moved(&streams, &corners, &mut outcome);
            }
            None => {
                let why = Sentence::new("both flows are needed");
                outcome.push(Figure::withheld("total", "Heat recovered, total", why, MOVED));
                outcome.notes.push(Note::remark(
                    "equal_flows",
                    Sentence::new(
                        "Equal flows are assumed: without both flows nothing else is known.",
                    ),
                ));
            }
        }
        judge(given, &streams, &corners, moist, transfer, &mut outcome);
        outcome.notes.extend(here.notes);
        corners.finish(&mut outcome);
        outcome.pressure =
            Some(Sentence::new("{0}, {s0}").with(here.pressure.amount()).nested(here.source));
        Ok(outcome)
    }

    fn judge(&self, _: &Given, outcome: &Outcome, doubts: &BTreeMap<String, Doubt>) -> Vec<Note> {
        let mut notes = Vec::new();
        for (key, what) in [("gap_heat", "heat"), ("gap_water", "water")] {
            let (Some(gap), Some(doubt)) = (outcome.amount(key), doubts.get(key)) else { continue };
            let Some(half_width) = doubt.half_width_si else { continue };
            let gap_size = Amount::new(gap.kind(), gap.si().abs());
            let width = Amount::new(gap.kind(), half_width);
            notes.push(if gap.si().abs() <= half_width {
                Note::remark(
                    format!("{key}_closes"),
                    Sentence::new("The two sides agree in {w0}: {0} apart, ± {1} of it is the readings’.")
                        .with(gap_size)
                        .with(width)
                        .word(what),
                )
            } else {
                Note::unusual(
                    format!("{key}_open"),
                    DEVICE,
                    Sentence::new("The two sides differ in {w0} by {0}, more than the ± {1} that the readings allow.")
                        .with(gap_size)
                        .with(width)
                        .word(what),
                )
                .because(Sentence::new(
                    "Wheels lie in layers across the face: take a grid at every corner, all four within ten minutes. A leak, a purge or a fan between point and exchanger does it too.",
                ))
            });
        }
        notes
    }
}

fn device() -> ChoiceItem {
    ChoiceItem::new(
        DEVICE,
        "It is a",
        None,
        vec![
            Choice::new("plates", "Plate exchanger"),
            Choice::helped(
                "dry_wheel",
                "Wheel for heat alone",
                "Moves moisture only where it condenses",
            ),
            Choice::new("moist_wheel", "Wheel for heat and moisture"),
            Choice::new("run_around", "Run-around coil"),
            Choice::new("heat_pipe", "Heat pipe"),
        ],
    )
}

fn transfer_items(given: &Given) -> Vec<Item> {
    let mut items: Vec<Item> = vec![
        ChoiceItem::new(
            TRANSFER_BY,
            "Carry-over known from",
            Some("none"),
            vec![
                Choice::helped("none", "Not known", "Gross figures only"),
                Choice::new("ratio", "Its ratio"),
                Choice::helped("co2", "CO2 at three corners", "One analyser moved through them"),
            ],
        )
        .into(),
    ];
    match given.choice(TRANSFER_BY) {
        Some("ratio") => items
            .push(ReadingItem::wanted(TRANSFER, "Exhaust carried over (EATR)", Kind::Share).into()),
        Some("co2") => {
            for (key, label) in
                CO2.into_iter().zip(["CO2 outdoors", "CO2 in the supply", "CO2 in the return"])
            {
                items.push(ReadingItem::wanted(key, label, Kind::MoleFraction).into());
            }
        }
        _ => {}
    }
    items
}

/// The corners as read.
struct Corners {
    outdoor: Read,
    supply: Read,
    back: Read,
    exhaust: Option<Read>,
    /// The supply's humidity was not read; it is taken as the outdoor air's, or not known.
    supply_dry_only: bool,
}

impl Corners {
    fn read(given: &Given, here: Pressure, moist: bool) -> Result<Self, Stop> {
        let begun = |point: Point<'_>, of: &str| given.reading(&point.key(of)).is_some();
        let outdoor = OUTDOOR.read(given, here);
        let back = RETURN.read(given, here);
        let supply = SUPPLY.read(given, here);
        let dry_only = matches!(&supply, Err(Stop::Waits(missing)) if missing.len() == 1)
            && begun(SUPPLY, "dry_bulb");
        let supply = match (&outdoor, supply) {
            (Ok(outdoor), Err(Stop::Waits(_))) if dry_only => Ok(as_dry(given, here, outdoor)?),
            (_, supply) => supply,
        };
        let mut missing = Vec::new();
        let mut take = |corner: Result<Read, Stop>| match corner {
            Ok(read) => Ok(Some(read)),
            Err(Stop::Waits(more)) => {
                missing.extend(more);
                Ok(None)
            }
            Err(refused) => Err(refused),
        };
        let (outdoor, supply, back) = (take(outdoor)?, take(supply)?, take(back)?);
        let (Some(outdoor), Some(supply), Some(back)) = (outdoor, supply, back) else {
            return Err(Stop::Waits(missing));
        };
        let exhaust =
            if begun(EXHAUST, "dry_bulb") { Some(EXHAUST.read(given, here)) } else { None };
        let exhaust = match exhaust {
            Some(Ok(read)) => Some(read),
            Some(Err(Stop::Refused(refusal))) => return Err(Stop::Refused(refusal)),
            Some(Err(Stop::Waits(_))) | None => None,
        };
        Ok(Self { outdoor, supply, back, exhaust, supply_dry_only: dry_only && moist })
    }

    fn finish(self, outcome: &mut Outcome) {
        let lines = [(&self.outdoor, &self.supply)]
            .into_iter()
            .chain(self.exhaust.as_ref().map(|exhaust| (&self.back, exhaust)));
        for (from, to) in lines {
            outcome.lines.push(Line { from: from.air, to: to.air, kind: LineKind::Process });
        }
        let corners = [
            (OUTDOOR, "Outdoor air", mark('O', Shape::Circle), Some(self.outdoor)),
            (SUPPLY, "Supply air", mark('S', Shape::Triangle), Some(self.supply)),
            (RETURN, "Return air", mark('R', Shape::Diamond), Some(self.back)),
            (EXHAUST, "Exhaust air", mark('X', Shape::Square), self.exhaust),
        ];
        for (point, label, mark, read) in corners {
            let point: Point<'static> = point;
            let Some(read) = read else { continue };
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
}

/// A supply whose humidity was not read, with the outdoor air's: what a device that moves no moisture leaves it.
fn as_dry(given: &Given, here: Pressure, outdoor: &Read) -> Result<Read, Stop> {
    let dry_bulb: ThermodynamicTemperature = given
        .quantity(&SUPPLY.key("dry_bulb"))
        .ok_or_else(|| Stop::waits(SUPPLY.key("dry_bulb"), "the supply dry bulb"))?;
    let humidity = Humidity::HumidityRatio(outdoor.air.humidity_ratio());
    let air = MoistAir::new(dry_bulb, humidity, here).map_err(|_| {
        Refusal::new(
            SUPPLY.key("dry_bulb"),
            "supply_below_saturation",
            Sentence::new("At {0} the supply would hold less water than the outdoor air brings: read its humidity.")
                .with(dry_bulb.amount()),
        )
    })?;
    Ok(Read { air, saturated: false, notes: Vec::new(), by: "humidity_ratio" })
}

type Flows = Option<(Flow, Flow)>;

fn read_flows(given: &Given, here: Pressure, corners: &Corners) -> Result<Flows, Stop> {
    let supply = SUPPLY_FLOW.read(given, here, &[("actual_supply", &corners.supply.air)])?;
    let back = RETURN_FLOW.read(given, here, &[("actual_return", &corners.back.air)])?;
    match (supply, back) {
        (Ok(supply), Ok(back)) => Ok(Some((supply, back))),
        (one, other) => {
            // One flow with its basis unsaid is asked about; none at all is equal flows.
            for (block, flow) in [(SUPPLY_FLOW, one.err()), (RETURN_FLOW, other.err())] {
                if let Some(missing) = flow
                    && given.reading(&block.rate_key(given)).is_some()
                {
                    return Err(Stop::Waits(vec![missing]));
                }
            }
            Ok(None)
        }
    }
}

/// Exhaust carried over: typed, or from CO2.
fn read_transfer(given: &Given) -> Result<Option<Ratio>, Stop> {
    let transfer = match given.choice(TRANSFER_BY) {
        Some("ratio") => given.quantity::<Share>(TRANSFER).map(|share| (TRANSFER, share.si())),
        Some("co2") => {
            let read = CO2.map(|key| given.reading(key).map(|reading| reading.amount.si()));
            let [Some(outdoor), Some(supply), Some(back)] = read else { return Ok(None) };
            if back - outdoor < 1e-4 && !given.is_drawn() {
                return Err(Refusal::new(
                    CO2[2],
                    "co2_too_close",
                    Sentence::new("Return and outdoor CO2 are less than 100 ppm apart: too little to tell the carry-over."),
                )
                .into());
            }
            Some((CO2[1], (supply - outdoor) / (back - outdoor)))
        }
        _ => None,
    };
    let Some((key, transfer)) = transfer else { return Ok(None) };
    if (-0.02..=0.25).contains(&transfer) || given.is_drawn() {
        return Ok(Some(Ratio::from_si(transfer)));
    }
    Err(Refusal::new(
        key,
        "transfer_out_of_range",
        Sentence::new("A carry-over of {0} is outside 0 to 25 %. Check the readings; above that the exchanger is open to the exhaust.")
            .with(Share::from_si(transfer).amount()),
    )
    .into())
}

const KEYS: [[&str; 3]; 3] = [
    ["sensible_effectiveness", "Sensible", "net_sensible_effectiveness"],
    ["latent_effectiveness", "Latent", "net_latent_effectiveness"],
    ["total_effectiveness", "Total", "net_total_effectiveness"],
];

/// What withholds each effectiveness.
fn withheld(given: &Given, streams: &Streams, corners: &Corners) -> [Option<Sentence>; 3] {
    let (one, three) = (&streams.outdoor, &streams.back);
    let apart = [
        one.dry_bulb().si() - three.dry_bulb().si(),
        one.humidity_ratio().si() - three.humidity_ratio().si(),
        one.enthalpy().si() - three.enthalpy().si(),
    ];
    let small = |index: usize| !given.is_drawn() && apart[index].abs() < LEAST[index];
    let no_humidity = || Some(Sentence::new("the supply’s humidity was not read"));
    let words = [
        "outdoor and return are less than 2 K apart",
        "outdoor and return are less than 0.5 g/kg apart",
        "outdoor and return are less than 2 kJ/kg apart",
    ];
    let mut why = [0, 1, 2].map(|index| small(index).then(|| Sentence::new(words[index])));
    if corners.supply_dry_only {
        why[1] = no_humidity();
        why[2] = no_humidity();
    }
    why
}

fn effects(
    given: &Given,
    streams: &Streams,
    corners: &Corners,
    moist: bool,
    transfer: Option<Ratio>,
    outcome: &mut Outcome,
) {
    let effects = effectiveness(streams);
    let why = withheld(given, streams, corners);
    let headline = if moist && why[2].is_none() { 2 } else { 0 };
    for (index, (effect, why)) in effects.iter().zip(why.clone()).enumerate() {
        let [key, label, _] = KEYS[index];
        let role = if index == headline { Role::Headline } else { Role::Minor };
        let figure = match why {
            Some(why) => Figure::withheld(key, format!("{label} effectiveness"), why, EFFECT),
            None => Figure::new(
                key,
                format!("{label} effectiveness"),
                Share::from_si(effect.si()).amount(),
                EFFECT,
            ),
        };
        outcome.push(figure.role(role));
    }
    if let Some(transfer) = transfer {
        outcome.push(Figure::new(
            "transfer",
            "Exhaust carried over",
            Share::from_si(transfer.si()).amount(),
            EFFECT,
        ));
        net(streams, transfer, &why, outcome);
    }
    let (one, two, three) = (&streams.outdoor, &streams.supply, &streams.back);
    outcome.steps.push(Step::new(
        "Effectiveness",
        "eps = m2 (x1 - x2) / (m_min (x1 - x3))",
        Sentence::new("t: {0}, {1}, {2}; W: {3}, {4}, {5}")
            .with(one.dry_bulb().amount())
            .with(two.dry_bulb().amount())
            .with(three.dry_bulb().amount())
            .with(one.humidity_ratio().amount())
            .with(two.humidity_ratio().amount())
            .with(three.humidity_ratio().amount()),
        "on the smaller flow of dry air; a rating holds at equal flows",
    ));
}

/// Effectiveness less what is carried over.
fn net(streams: &Streams, transfer: Ratio, why: &[Option<Sentence>; 3], outcome: &mut Outcome) {
    let least = streams.supplied.si().min(streams.returned.si());
    let share = streams.supplied.si() / least;
    let values: [fn(&MoistAir) -> f64; 3] =
        [|air| air.dry_bulb().si(), |air| air.humidity_ratio().si(), |air| air.enthalpy().si()];
    for ((of, [_, label, key]), why) in values.into_iter().zip(KEYS).zip(why) {
        if why.is_some() {
            continue;
        }
        let (one, three) = (of(&streams.outdoor), of(&streams.back));
        let two = without_transfer(of(&streams.supply), three, transfer);
        let effect = Share::from_si(share * (one - two) / (one - three));
        let label = format!("{label}, without the carry-over");
        outcome.push(Figure::new(key, label, effect.amount(), EFFECT));
    }
}

/// Heat and water moved, and both sides against each other.
fn moved(streams: &Streams, corners: &Corners, outcome: &mut Outcome) {
    let m = streams.supplied.si();
    let parts = split(&streams.outdoor, &streams.supply);
    let power = |part: f64| Power::from_si(m * part);
    let figure = |key, label, amount| Figure::new(key, label, amount, MOVED);
    let water = m * (streams.supply.humidity_ratio().si() - streams.outdoor.humidity_ratio().si());
    if corners.supply_dry_only {
        outcome.push(
            figure("sensible", "Sensible heat", power(parts.sensible.si()).amount())
                .signed("Sensible, added to the supply", "Sensible, removed from the supply"),
        );
        return;
    }
    outcome.push(
        figure("total", "Heat recovered, total", power(parts.total.si()).amount())
            .signed("Heat added to the supply, total", "Heat removed from the supply, total"),
    );
    outcome.push(
        figure("sensible", "Sensible", power(parts.sensible.si()).amount())
            .signed("Sensible, added", "Sensible, removed"),
    );
    outcome.push(
        figure("latent", "Latent", power(parts.latent.si()).amount())
            .signed("Latent, added", "Latent, removed"),
    );
    outcome.push(
        figure("moisture", "Water", MoistureFlow::from_si(water).amount())
            .signed("Water added to the supply", "Water removed from the supply"),
    );
    outcome.push(
        figure("supply_dry_air", "Dry air supplied", streams.supplied.amount()).role(Role::Detail),
    );
    outcome.push(
        figure("return_dry_air", "Dry air returned", streams.returned.amount()).role(Role::Detail),
    );
    let Some(exhaust) = &corners.exhaust else { return };
    balance(streams, exhaust, m * parts.total.si(), water, outcome);
}

fn balance(streams: &Streams, exhaust: &Read, heat: f64, water: f64, outcome: &mut Outcome) {
    let back = streams.returned.si();
    let given_up = back * (streams.back.enthalpy().si() - exhaust.air.enthalpy().si());
    let dried = back * (streams.back.humidity_ratio().si() - exhaust.air.humidity_ratio().si());
    let figure = |key, label, amount| Figure::new(key, label, amount, BALANCE);
    outcome.push(
        figure("exhaust_side", "Heat given up by the exhaust", Power::from_si(given_up).amount())
            .signed("Heat given up by the exhaust", "Heat taken up by the exhaust"),
    );
    outcome.push(figure(
        "gap_heat",
        "Heat, supply side less exhaust side",
        Power::from_si(heat - given_up).amount(),
    ));
    let relative =
        |one: f64, other: f64| Share::from_si((one - other) / (0.5 * (one + other)).abs());
    outcome.push(
        figure("gap_heat_share", "The same, of their mean", relative(heat, given_up).amount())
            .role(Role::Detail),
    );
    outcome.push(figure(
        "exhaust_moisture",
        "Water given up by the exhaust",
        MoistureFlow::from_si(dried).amount(),
    ));
    outcome.push(figure(
        "gap_water",
        "Water, supply side less exhaust side",
        MoistureFlow::from_si(water - dried).amount(),
    ));
    outcome.steps.push(Step::new(
        "Both sides",
        "m2 (h2 - h1) - m3 (h3 - h4),  m2 (W2 - W1) - m3 (W3 - W4)",
        Sentence::new("heat {0} against {1}, water {2} against {3}")
            .with(Power::from_si(heat).amount())
            .with(Power::from_si(given_up).amount())
            .with(MoistureFlow::from_si(water).amount())
            .with(MoistureFlow::from_si(dried).amount()),
        "each by itself: heat can close where water does not",
    ));
}

fn judge(
    given: &Given,
    streams: &Streams,
    corners: &Corners,
    moist: bool,
    transfer: Option<Ratio>,
    outcome: &mut Outcome,
) {
    let (one, two, three) = (&streams.outdoor, &streams.supply, &streams.back);
    let apart = TemperatureInterval::from_si((one.dry_bulb().si() - three.dry_bulb().si()).abs());
    if apart.si() >= LEAST[0] && apart.si() < BETTER_FROM_K {
        outcome.notes.push(
            Note::unusual(
                "close_streams",
                OUTDOOR.key("dry_bulb"),
                Sentence::new("Outdoor and return are only {0} apart.").with(apart.amount()),
            )
            .because(Sentence::new(
                "Small errors count for much: come back on a colder or a hotter day.",
            )),
        );
    }
    let effects = effectiveness(streams);
    let why = withheld(given, streams, corners);
    for (index, effect) in effects.iter().enumerate() {
        let outside = !(-0.02..=1.02).contains(&effect.si());
        if why[index].is_none() && outside && (index != 1 || moist) {
            let [key, label, _] = KEYS[index];
            outcome.notes.push(
                Note::unusual(
                    format!("{key}_outside"),
                    SUPPLY.key("dry_bulb"),
                    Sentence::new("{w0} effectiveness {0} is outside 0 to 100 %.")
                        .with(Share::from_si(effect.si()).amount())
                        .word(label),
                )
                .because(Sentence::new("A corner is taken for another one, a fan stands between point and exchanger, or it leaks.")),
            );
        }
    }
    let change =
        HumidityRatio::from_si((two.humidity_ratio().si() - one.humidity_ratio().si()).abs());
    if !moist && change.si() > LEAST[1] {
        outcome.notes.push(
            Note::unusual(
                "moisture_in_a_dry_device",
                SUPPLY.key(corners.supply.by),
                Sentence::new("The supply’s moisture changes by {0} in a device that moves none.")
                    .with(change.amount()),
            )
            .because(Sentence::new(
                "Carry-over, condensation, or two humidity readings that disagree.",
            )),
        );
    }
    if transfer.is_some_and(|transfer| transfer.si() > LARGE_TRANSFER) {
        outcome.notes.push(
            Note::unusual(
                "large_transfer",
                TRANSFER_BY,
                Sentence::new("More than a tenth of the exhaust comes back."),
            )
            .because(Sentence::new(
                "Purge, seals and the pressures at the four corners decide that.",
            )),
        );
    }
    if (streams.supplied.si() / streams.returned.si() - 1.0).abs() > 0.05 {
        outcome.notes.push(Note::remark(
            "unequal_flows",
            Sentence::new("The flows are unequal: effectiveness refers to the smaller one and is not comparable with a rating at equal flows."),
        ));
    }
    frost(one, three, moist, outcome);
}

/// Water or frost within the exchanger.
fn frost(outdoor: &MoistAir, back: &MoistAir, moist: bool, outcome: &mut Outcome) {
    if moist {
        let nearest = nearest_to_saturation(outdoor, back);
        outcome.push(
            Figure::new(
                "line_saturation",
                "Nearest to saturation between the entering airs",
                Share::from_si(nearest).amount(),
                EFFECT,
            )
            .role(Role::Detail),
        );
        if outdoor.dry_bulb().si() < 273.15 && nearest > 1.0 {
            outcome.notes.push(
                Note::unusual(
                    "frost_in_the_rotor",
                    OUTDOOR.key("dry_bulb"),
                    Sentence::new("Between these two airs the line crosses saturation: water or frost forms in the rotor."),
                )
                .because(Sentence::new("Pressure across it rises and effectiveness falls while it does.")),
            );
        }
        return;
    }
    // The coldest plate lies near the middle of outdoor and exhaust air; without that, of outdoor and return.
    let coldest = 0.5 * (outdoor.dry_bulb().si() + back.dry_bulb().si());
    if let Ok(dew_point) = back.dew_point()
        && outdoor.dry_bulb().si() < back.dry_bulb().si()
        && (outdoor.dry_bulb().si() < 273.15 || dew_point.si() > coldest)
    {
        let lead = if outdoor.dry_bulb().si() < 273.15 && dew_point.si() > outdoor.dry_bulb().si() {
            Sentence::new(
                "The return’s dew point is {0}: water condenses on the cold side, and below freezing it is frost.",
            )
        } else if dew_point.si() > coldest {
            Sentence::new("The return’s dew point is {0}: water condenses on the cold side.")
        } else {
            return;
        };
        outcome.notes.push(
            Note::remark("water_on_the_plates", lead.with(dew_point.amount())).because(
                Sentence::new("Watch the drain, the pressure across it, and its frost protection."),
            ),
        );
    }
}
