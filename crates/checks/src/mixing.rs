//! Mixing: what comes of two to eight air streams?
//!
//! `W = sum(m_i W_i) / m`, `h = sum(m_i h_i) / m` per mass of dry air (no heat loss, equal pressure), then the
//! temperature from `h(T, p, W) = h`. Where that is more water than saturated air holds, the rest is fog: liquid,
//! ice, or both at the triple point. Real cold fog is often supercooled droplets; the ice branch then reads too
//! warm, by 0.33 K per g/kg of fog. Source: steady balances of dry air, water and energy.

use dewledger_properties::{MoistAir, settle};
use dewledger_quantities::{
    AirFlow, DryAirFlow, Enthalpy, HumidityRatio, Kind, MoistureFlow, Quantity, Sentence, Share,
    TemperatureInterval, ThermodynamicTemperature,
};

use crate::check::{About, Check, Group};
use crate::drawn::{Line, LineKind};
use crate::flow_block::{Flow, FlowBlock};
use crate::form::{Mark, ReadingItem, Repeat, Section, count};
use crate::given::Given;
use crate::outcome::{Caution, Figure, Missing, Note, Outcome, Role, StatePoint, Step};
use crate::pressure;
use crate::refusal::{Refusal, Stop};
use crate::state_block::{Point, Read};

/// The check.
pub struct Mixing;

const ABOUT: About = About {
    id: "mixing",
    label: "Mixing",
    question: "What comes of mixing these air streams?",
    takes: "two to eight air states with their flows",
    group: Group::Air,
};

/// The choice that holds how many streams there are.
const COUNT: &str = "streams";
const LEAST: usize = 2;
const MOST: usize = 8;
const MIXED: &str = "mixed.dry_bulb";
const RESULTS: &str = "Mixed air";
const SHARES: &str = "Shares";

const PREFIXES: [&str; MOST] =
    ["stream1", "stream2", "stream3", "stream4", "stream5", "stream6", "stream7", "stream8"];
const NAMES: [&str; MOST] = [
    "first stream’s",
    "second stream’s",
    "third stream’s",
    "fourth stream’s",
    "fifth stream’s",
    "sixth stream’s",
    "seventh stream’s",
    "eighth stream’s",
];
const FLOWS: [&str; MOST] = [
    "stream1_flow",
    "stream2_flow",
    "stream3_flow",
    "stream4_flow",
    "stream5_flow",
    "stream6_flow",
    "stream7_flow",
    "stream8_flow",
];
const PLACES: &[(&str, &str)] = &[("actual", "Actual, at this state")];

const CAUTIONS: &[Caution] = &[
    Caution {
        title: "Freezing",
        says: "A mean of 5 °C can hide a −10 °C streak on the coil. Freeze protection must see the coldest spot; never \
               test by blocking it, and never force outdoor dampers in cold weather without someone watching the coil.",
    },
    Caution {
        title: "Dampers and fans",
        says: "They start by themselves. Isolate before reaching in. Local rules, the maker’s instructions and licensed \
               people come first.",
    },
];

/// One stream, typed.
#[derive(Debug, Clone)]
pub struct Stream {
    /// Its state.
    pub air: MoistAir,
    /// Its dry air; may be zero.
    pub dry_air: DryAirFlow,
}

/// What comes of it, typed.
#[derive(Debug, Clone)]
pub struct Results {
    /// All the dry air.
    pub dry_air: DryAirFlow,
    /// Water in all its forms per dry air.
    pub water: HumidityRatio,
    /// Enthalpy of air and fog together per dry air.
    pub enthalpy: Enthalpy,
    /// The air, saturated where there is fog.
    pub air: MoistAir,
    /// Liquid fog per dry air.
    pub liquid: HumidityRatio,
    /// Ice fog per dry air.
    pub ice: HumidityRatio,
}

/// The calculation; the flows must not all be zero.
///
/// # Errors
///
/// What the properties refuse of the mixture.
pub fn solve(streams: &[Stream]) -> Result<Results, dewledger_properties::AirError> {
    let m: f64 = streams.iter().map(|stream| stream.dry_air.si()).sum();
    let mean = |of: &dyn Fn(&MoistAir) -> f64| {
        streams.iter().map(|stream| stream.dry_air.si() * of(&stream.air)).sum::<f64>() / m
    };
    let water = HumidityRatio::from_si(mean(&|air| air.humidity_ratio().si()));
    let enthalpy = Enthalpy::from_si(mean(&|air| air.enthalpy().si()));
    let pressure = mean(&|air| air.pressure().si());
    let mixed = settle(enthalpy, water, dewledger_quantities::Pressure::from_si(pressure))?;
    Ok(Results {
        dry_air: DryAirFlow::from_si(m),
        water,
        enthalpy,
        air: mixed.air,
        liquid: mixed.liquid,
        ice: mixed.ice,
    })
}

fn point(index: usize) -> Point<'static> {
    Point { prefix: PREFIXES[index], name: NAMES[index] }
}

fn flow_block(index: usize) -> FlowBlock<'static> {
    FlowBlock { prefix: FLOWS[index], places: PLACES, plane: false }
}

impl Check for Mixing {
    fn about(&self) -> &'static About {
        &ABOUT
    }

    fn form(&self, given: &Given) -> Vec<Section> {
        let count = count(given, COUNT, LEAST, MOST);
        let mut sections = vec![pressure::section(given)];
        for (index, prefix) in PREFIXES.into_iter().enumerate().take(count) {
            let mut items = point(index).items(given);
            items.extend(flow_block(index).items(given, true));
            let title = format!("Stream {}", index + 1);
            let mut section = Section::new(prefix, title, items).marked(Mark::stream(index + 1));
            if index + 1 == count {
                section.repeat = Some(Repeat {
                    choice: COUNT.into(),
                    count,
                    least: LEAST,
                    most: MOST,
                    add: Some("Add a stream".into()),
                    remove: Some("Take this stream away".into()),
                });
            }
            sections.push(section);
        }
        sections.push(
            Section::new(
                "mixed",
                "Mixed air as read",
                vec![
                    ReadingItem::optional(MIXED, "Dry bulb", Kind::Temperature)
                        .help("Only compared with what is worked out")
                        .into(),
                ],
            )
            .marked(Mark::MIXED)
            .seldom(),
        );
        sections.push(
            Section::new(
                "duct",
                "Pressure in the plenum",
                (0..count).map(|index| point(index).duct_pressure(DUCT_LABELS[index])).collect(),
            )
            .beside("against the room")
            .seldom(),
        );
        sections
    }

    fn solve(&self, given: &Given) -> Result<Outcome, Stop> {
        let count = count(given, COUNT, LEAST, MOST);
        let (here, read) = pressure::with(given, |here| read_streams(given, here, count))?;
        one_plenum(&read)?;
        let streams: Vec<Stream> = read
            .iter()
            .map(|(read, flow)| Stream { air: read.air, dry_air: flow.dry_air })
            .collect();
        let total: f64 = streams.iter().map(|stream| stream.dry_air.si()).sum();
        if total <= 0.0 {
            return Err(Refusal::new(
                flow_block(0).rate_key(given),
                "no_flow_to_mix",
                Sentence::new("Give at least two flows above zero."),
            )
            .into());
        }
        let results = solve(&streams).map_err(|error| {
            Stop::from(Refusal::new(
                point(0).key("dry_bulb"),
                "mixture_out_of_range",
                Sentence::new("The mixture is outside what moist air is worked out for ({w0}).")
                    .word(error.to_string()),
            ))
        })?;
        let mut outcome = Outcome { cautions: CAUTIONS, ..Outcome::default() };
        figures(&streams, &results, &mut outcome);
        outcome.steps = steps(&read, &results);
        outcome.notes.extend(here.notes.iter().cloned());
        for (index, (read, _)) in read.iter().enumerate() {
            outcome.notes.extend(read.notes.iter().cloned());
            if read.saturated {
                outcome.saturated.push(PREFIXES[index].to_owned());
            }
        }
        judge(given, &streams, &results, &mut outcome);
        for (index, (read, _)) in read.iter().enumerate() {
            outcome.states.push(StatePoint {
                key: PREFIXES[index].into(),
                label: format!("Stream {}", index + 1).into(),
                mark: Some(Mark::stream(index + 1)),
                air: read.air,
            });
        }
        outcome.states.push(StatePoint {
            key: "mixed".into(),
            label: "Mixed air".into(),
            mark: Some(Mark::MIXED),
            air: results.air,
        });
        outcome.lines = lines(&streams, &results);
        outcome.pressure =
            Some(Sentence::new("{0}, {s0}").with(here.pressure.amount()).nested(here.source));
        Ok(outcome)
    }
}

/// The line between two streams, or from each of several to the mixture; and, where there is fog, from the mixture as it
/// would be with all its water as vapour to the air that is left of it.
fn lines(streams: &[Stream], results: &Results) -> Vec<Line> {
    let clear =
        MoistAir::unchecked_from_enthalpy(results.enthalpy, results.water, results.air.pressure())
            .unwrap_or(results.air);
    let mixing = |from: MoistAir, to: MoistAir| Line { from, to, kind: LineKind::Mixing };
    let mut lines: Vec<Line> = match streams {
        [one, other] => vec![mixing(one.air, other.air)],
        several => several.iter().map(|stream| mixing(stream.air, clear)).collect(),
    };
    if results.liquid.si() + results.ice.si() > 0.0 {
        lines.push(Line { from: clear, to: results.air, kind: LineKind::Process });
    }
    lines
}

const DUCT_LABELS: [&str; MOST] = [
    "At stream 1",
    "At stream 2",
    "At stream 3",
    "At stream 4",
    "At stream 5",
    "At stream 6",
    "At stream 7",
    "At stream 8",
];

/// Every stream, or all that is missing of any; a refusal comes first.
fn read_streams(
    given: &Given,
    here: dewledger_quantities::Pressure,
    count: usize,
) -> Result<Vec<(Read, Flow)>, Stop> {
    let mut streams = Vec::with_capacity(count);
    let mut missing: Vec<Missing> = Vec::new();
    for (index, name) in NAMES.into_iter().enumerate().take(count) {
        let block = flow_block(index);
        match point(index).read(given, here) {
            Ok(read) => match read_flow(&block, given, here, &read)? {
                Ok(flow) => streams.push((read, flow)),
                Err(wanted) => missing.push(wanted),
            },
            Err(Stop::Waits(wanted)) => {
                missing.extend(wanted);
                let key = block.rate_key(given);
                if given.reading(&key).is_none() {
                    missing.push(Missing::new(key, format!("the {name} flow")));
                }
            }
            Err(refused) => return Err(refused),
        }
    }
    if missing.is_empty() { Ok(streams) } else { Err(Stop::Waits(missing)) }
}

/// A stream's flow; here a flow of zero is a stream that is shut off, not a mistake.
fn read_flow(
    block: &FlowBlock<'_>,
    given: &Given,
    here: dewledger_quantities::Pressure,
    read: &Read,
) -> Result<Result<Flow, Missing>, Stop> {
    let key = block.rate_key(given);
    match given.reading(&key) {
        Some(reading) if reading.amount.si() == 0.0 => Ok(Ok(Flow {
            dry_air: DryAirFlow::from_si(0.0),
            basis: crate::flow_block::Basis::DryAir,
            inch_pound: false,
            step: Step::new("Dry-air mass flow", "m", Sentence::new("shut off"), "a flow of zero"),
        })),
        _ => block.read(given, here, &[("actual", &read.air)]),
    }
}

/// One plenum has one pressure.
fn one_plenum(read: &[(Read, Flow)]) -> Result<(), Stop> {
    let pressures = || read.iter().map(|(read, _)| read.air.pressure().si());
    let spread = pressures().fold(f64::MIN, f64::max) - pressures().fold(f64::MAX, f64::min);
    if spread > 2000.0 {
        return Err(Refusal::new(
            point(0).key("duct_pressure"),
            "two_pressures_in_one_plenum",
            Sentence::new(
                "These duct pressures differ by {0}: one plenum has one pressure. Check them.",
            )
            .with(dewledger_quantities::Amount::new(Kind::PressureDifference, spread)),
        )
        .into());
    }
    Ok(())
}

fn figures(streams: &[Stream], results: &Results, outcome: &mut Outcome) {
    let figure = |key, label, amount| Figure::new(key, label, amount, RESULTS);
    let air = &results.air;
    let m = results.dry_air.si();
    let volume = AirFlow::from_si(m * air.specific_volume().si());
    outcome
        .push(figure("dry_bulb", "Mixed dry bulb", air.dry_bulb().amount()).role(Role::Headline));
    outcome.push(
        figure("humidity_ratio", "Humidity ratio", air.humidity_ratio().amount()).role(Role::Minor),
    );
    outcome.push(
        figure("relative_humidity", "Relative humidity", air.relative_humidity().amount())
            .role(Role::Minor),
    );
    outcome.push(figure("enthalpy", "Enthalpy", results.enthalpy.amount()).role(Role::Minor));
    if let Ok(wet_bulb) = air.wet_bulb() {
        outcome.push(figure("wet_bulb", "Wet bulb", wet_bulb.reading().amount()));
    }
    outcome.push(figure("specific_volume", "Specific volume", air.specific_volume().amount()));
    outcome.push(figure("dry_air", "Dry-air mass flow", results.dry_air.amount()));
    outcome.push(figure("flow", "Actual flow, mixed", volume.amount()));
    let fog = results.liquid.si() + results.ice.si();
    if fog > 0.0 {
        outcome.push(figure("water_total", "Water in all forms", results.water.amount()));
        outcome.push(figure("fog", "Fog", HumidityRatio::from_si(fog).amount()));
        outcome.push(figure("fog_flow", "Fog", MoistureFlow::from_si(fog * m).amount()));
    }
    let volumes: f64 =
        streams.iter().map(|stream| stream.dry_air.si() * stream.air.specific_volume().si()).sum();
    let mut by_volume = 0.0;
    for (index, stream) in streams.iter().enumerate() {
        let share = stream.dry_air.si() / m;
        let volume_share = stream.dry_air.si() * stream.air.specific_volume().si() / volumes;
        by_volume += volume_share * stream.air.dry_bulb().si();
        let number = index + 1;
        outcome.push(Figure::new(
            format!("share_mass_{number}"),
            format!("Stream {number}, of the dry air"),
            Share::from_si(share).amount(),
            SHARES,
        ));
        outcome.push(
            Figure::new(
                format!("share_volume_{number}"),
                format!("Stream {number}, of the volume"),
                Share::from_si(volume_share).amount(),
                SHARES,
            )
            .role(Role::Detail),
        );
        outcome.push(
            Figure::new(
                format!("dry_air_{number}"),
                format!("Stream {number}, dry air"),
                stream.dry_air.amount(),
                SHARES,
            )
            .role(Role::Detail),
        );
    }
    outcome.push(
        Figure::new(
            "dry_bulb_by_volume",
            "Dry bulb, had volumes been weighed",
            ThermodynamicTemperature::from_si(by_volume).amount(),
            SHARES,
        )
        .on_condition(Sentence::new("wrong where the streams differ in density"))
        .role(Role::Detail),
    );
}

fn judge(given: &Given, streams: &[Stream], results: &Results, outcome: &mut Outcome) {
    let fog = results.liquid.si() + results.ice.si();
    if fog > 0.0 {
        let mut note = Note::unusual(
            "fog",
            "streams",
            Sentence::new("The mixture is foggy: {0} of water is more than the air holds.")
                .with(HumidityRatio::from_si(fog).amount()),
        );
        note.reason = Some(if results.ice.si() > 0.0 {
            Sentence::new(
                "Counted as ice. Cold fog is often supercooled droplets; the air is then cooler than said here, by 0.33 K for each g/kg of fog.",
            )
        } else {
            Sentence::new(
                "It wets filters, casing and floor downstream until something warms the air.",
            )
        });
        outcome.notes.push(note);
    }
    let mixed = results.air.dry_bulb();
    if mixed.si() < 278.15 {
        outcome.notes.push(
            Note::unusual(
                "mixed_near_freezing",
                "streams",
                Sentence::new("The mixed air is at {0}.").with(mixed.amount()),
            )
            .because(Sentence::new(
                "A water coil behind it can freeze where the streams lie in layers.",
            )),
        );
    } else if streams
        .iter()
        .any(|stream| stream.air.dry_bulb().si() < 273.15 && stream.dry_air.si() > 0.0)
    {
        outcome.notes.push(
            Note::remark("stream_below_freezing", Sentence::new("One stream is below freezing."))
                .because(Sentence::new(
                    "Mixed air comes in layers: a water coil behind it sees the coldest one.",
                )),
        );
    }
    let read: Option<ThermodynamicTemperature> = given.quantity(MIXED);
    if let Some(read) = read {
        let off = TemperatureInterval::from_si(read.si() - mixed.si());
        let allowed = given.reading(MIXED).and_then(|reading| reading.half_width_si).unwrap_or(1.5);
        if off.si().abs() > allowed {
            outcome.notes.push(
                Note::unusual("mixed_differs", MIXED, Sentence::new("Read {0}, worked out {1}.").with(read.amount()).with(mixed.amount()))
                    .because(Sentence::new("Mixed air comes in layers: take a grid of at least nine points, and check the flows.")),
            );
        }
    }
}

fn steps(read: &[(Read, Flow)], results: &Results) -> Vec<Step> {
    let mut steps: Vec<Step> = read
        .iter()
        .enumerate()
        .map(|(index, (read, flow))| {
            Step::new(
                format!("Stream {}", index + 1),
                flow.step.formula,
                Sentence::new("m = {0}, W = {1}, h = {2}")
                    .with(flow.dry_air.amount())
                    .with(read.air.humidity_ratio().amount())
                    .with(read.air.enthalpy().amount()),
                flow.step.source,
            )
        })
        .collect();
    steps.push(Step::new(
        "Mixture",
        "W = Σ m W / Σ m,  h = Σ m h / Σ m",
        Sentence::new("m = {0}, W = {1}, h = {2}")
            .with(results.dry_air.amount())
            .with(results.water.amount())
            .with(results.enthalpy.amount()),
        "weighed by dry air; no heat lost on the way",
    ));
    steps.push(Step::new(
        "Mixed dry bulb",
        "h(t, p, W) = h, solved for t",
        Sentence::new("t = {0}").with(results.air.dry_bulb().amount()),
        "real-gas moist air; beyond saturation the rest is fog at the same enthalpy",
    ));
    steps
}
