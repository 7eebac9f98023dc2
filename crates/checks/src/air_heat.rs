//! Heat moved by the air: how much heat and water did this air gain or lose?
//!
//! `q = m (h2 - h1)` per mass of dry air, the air's own enthalpy change: no assumption about the condensate.
//! `duty = m [(h2 - h1) - (W2 - W1) h_w]` books the water's own enthalpy; it is what compares with a water side.
//! Sensible and latent are split as in [`crate::split`]. Positive = gained by the air.
//! Source: steady first law and moisture balance per mass of dry air; ASHRAE Handbook—Fundamentals,
//! psychrometrics chapter, for the same balances (from memory).

use std::collections::BTreeMap;

use dewledger_properties::{MoistAir, water};
use dewledger_quantities::{
    AirFlow, CondensateFlow, DryAirFlow, EnthalpyDifference, HumidityRatioDifference, Kind,
    MoistureFlow, Power, Pressure, ProcessSlope, Quantity, Ratio, Sentence, StandardAirFlow,
    TemperatureInterval, ThermodynamicTemperature, WaterEnthalpy, difference,
};

use crate::book_constants;
use crate::check::{About, Check, Group};
use crate::doubt::Doubt;
use crate::drawn::{Line, LineKind};
use crate::flow_block::{Flow, FlowBlock, STANDARD_DENSITY_IP, STANDARD_DENSITY_SI};
use crate::form::{Mark, Section};
use crate::given::Given;
use crate::outcome::{
    Caution, Change, Figure, Missing, Note, Offer, Outcome, Role, StatePoint, Step,
};
use crate::pressure;
use crate::process::{Process, classify};
use crate::refusal::{Refusal, Stop, both};
use crate::split::{Split, split};
use crate::state_block::{Point, Read};
use crate::water_state::{self, WaterStream};

/// The check.
pub struct AirHeat;

const ABOUT: About = About {
    id: "air_heat",
    label: "Heat moved by the air",
    question: "How much heat and water did this air gain or lose?",
    takes: "two air states and a flow",
    group: Group::Air,
};

/// Entering point.
pub(crate) const ENTERING: Point<'static> = Point { prefix: "entering", name: "entering" };
/// Leaving point.
pub(crate) const LEAVING: Point<'static> = Point { prefix: "leaving", name: "leaving" };
/// The flow between them.
pub(crate) const FLOW: FlowBlock<'static> = FlowBlock {
    prefix: "flow",
    places: &[
        ("actual_entering", "Actual, as the air enters"),
        ("actual_leaving", "Actual, as the air leaves"),
    ],
    plane: true,
};

const RESULTS: &str = "Results";
const WATER: &str = "Water in the air";
const AIR: &str = "The air";

/// Floors below which a difference is not resolved where no ± is stated (field practice).
pub(crate) const FLOOR_K: f64 = 0.2;
/// The same for the humidity ratio, kg/kg (0.35 gr/lb).
pub(crate) const FLOOR_W: f64 = 5e-5;
/// The same for the wet bulb, K.
const FLOOR_WB_K: f64 = 0.3;

pub(crate) const CAUTIONS: &[Caution] = &[
    Caution {
        title: "Rotating parts and live heaters behind doors",
        says: "Fans, belts and dampers start by themselves; heater elements may be live. Isolate, lock and tag before \
               reaching in. Doors on the pressure side fly open, on the suction side they trap.",
    },
    Caution {
        title: "Reading ports",
        says: "Ports of ducts under pressure blow dust. Leave the plant in its control mode. Local rules, the maker’s \
               instructions and licensed people come first.",
    },
];

/// What the calculation takes, typed.
#[derive(Debug, Clone)]
pub struct Inputs {
    /// Air as it enters.
    pub entering: MoistAir,
    /// Air as it leaves.
    pub leaving: MoistAir,
    /// Dry air that passes; none while it is not read.
    pub dry_air: Option<DryAirFlow>,
    /// The water that leaves or joins; none where it is not known.
    pub water: Option<WaterEnthalpy>,
}

/// What it gives, typed. Positive is gained by the air.
#[derive(Debug, Clone, PartialEq)]
pub struct Results {
    /// Change of the dry bulb.
    pub delta_t: TemperatureInterval,
    /// Change of the humidity ratio.
    pub delta_w: HumidityRatioDifference,
    /// Change of the enthalpy and its two parts.
    pub split: Split,
    /// Heat, when the flow is known.
    pub heat: Option<Heat>,
}

/// Heat and water moved.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Heat {
    /// The air's own enthalpy change.
    pub total: Power,
    /// By temperature.
    pub sensible: Power,
    /// By moisture.
    pub latent: Power,
    /// Water gained by the air.
    pub moisture: MoistureFlow,
    /// What the surface exchanged once the water's own enthalpy is booked; none where the water is not known.
    pub duty: Option<Power>,
    /// Latent part less the water's own enthalpy.
    pub latent_net: Option<Power>,
}

/// The calculation.
#[must_use]
pub fn solve(inputs: &Inputs) -> Results {
    let parts = split(&inputs.entering, &inputs.leaving);
    let delta_w = inputs.leaving.humidity_ratio().si() - inputs.entering.humidity_ratio().si();
    let heat = inputs.dry_air.map(|dry_air| {
        let m = dry_air.si();
        let moisture = m * delta_w;
        let water = inputs.water.map(|water| moisture * water.si());
        Heat {
            total: Power::from_si(m * parts.total.si()),
            sensible: Power::from_si(m * parts.sensible.si()),
            latent: Power::from_si(m * parts.latent.si()),
            moisture: MoistureFlow::from_si(moisture),
            duty: water.map(|water| Power::from_si(m * parts.total.si() - water)),
            latent_net: water.map(|water| Power::from_si(m * parts.latent.si() - water)),
        }
    });
    Results {
        delta_t: difference(inputs.leaving.dry_bulb(), inputs.entering.dry_bulb()),
        delta_w: HumidityRatioDifference::from_si(delta_w),
        split: parts,
        heat,
    }
}

/// The readings of a process: two states and a flow.
pub(crate) struct Readings {
    pub(crate) here: pressure::Here,
    pub(crate) entering: Read,
    pub(crate) leaving: Read,
    pub(crate) flow: Result<Flow, Missing>,
}

/// The sections that ask for them.
pub(crate) fn sections(given: &Given, flow_required: bool) -> Vec<Section> {
    let mut sections = vec![
        pressure::section(given),
        Section::new("entering", "Entering air", ENTERING.items(given)).marked(Mark::ENTERING),
        Section::new("leaving", "Leaving air", LEAVING.items(given)).marked(Mark::LEAVING),
        Section::new("flow", "Air flow", FLOW.items(given, flow_required)),
    ];
    if FLOW.at_plane(given) {
        let mut items = FLOW.plane_point().items(given);
        items.push(FLOW.plane_point().duct_pressure("Pressure in the duct there"));
        sections.push(Section::new("plane", "Air at the measuring plane", items));
    }
    sections.push(
        Section::new("water", "Water that leaves or joins", water_state::items(given)).seldom(),
    );
    sections.push(
        Section::new(
            "duct",
            "Pressure in the duct",
            vec![
                ENTERING.duct_pressure("At the entering point"),
                LEAVING.duct_pressure("At the leaving point"),
            ],
        )
        .beside("against the room")
        .seldom(),
    );
    sections
}

/// Reads them.
pub(crate) fn read(given: &Given) -> Result<Readings, Stop> {
    let (here, ((entering, leaving), flow)) = pressure::with(given, |here| {
        let states = both(ENTERING.read(given, here), LEAVING.read(given, here));
        let (entering, leaving) = match states {
            Ok(states) => states,
            Err(stop) => return Err(missing_flow_too(given, stop)),
        };
        let at = [("actual_entering", &entering.air), ("actual_leaving", &leaving.air)];
        let flow = FLOW.read(given, here, &at)?;
        Ok(((entering, leaving), flow))
    })?;
    Ok(Readings { here, entering, leaving, flow })
}

/// Names the flow beside the states that are missing, so that a person is asked for everything at once.
fn missing_flow_too(given: &Given, stop: Stop) -> Stop {
    match stop {
        Stop::Waits(mut missing) => {
            let key = FLOW.rate_key(given);
            if given.reading(&key).is_none() {
                missing.push(Missing::new(key, "the air flow"));
            }
            Stop::Waits(missing)
        }
        refused @ Stop::Refused(_) => refused,
    }
}

impl Check for AirHeat {
    fn about(&self) -> &'static About {
        &ABOUT
    }

    fn form(&self, given: &Given) -> Vec<Section> {
        sections(given, true)
    }

    fn solve(&self, given: &Given) -> Result<Outcome, Stop> {
        let readings = read(given)?;
        let (entering, leaving) = (&readings.entering.air, &readings.leaving.air);
        let removed = leaving.humidity_ratio().si() < entering.humidity_ratio().si();
        let water = water_state::read(given, leaving, removed)?;
        cannot_hold_its_water(given, entering, leaving)?;
        let results = solve(&Inputs {
            entering: *entering,
            leaving: *leaving,
            dry_air: readings.flow.as_ref().ok().map(|flow| flow.dry_air),
            water: water.as_ref().map(|water| water.enthalpy),
        });
        let process = classify(given, entering, leaving, FLOOR_K, FLOOR_W, FLOOR_WB_K);
        let mut outcome = Outcome { cautions: CAUTIONS, ..Outcome::default() };
        figures(given, &readings, &results, water.as_ref(), &mut outcome);
        air_figures(&readings, &results, &mut outcome);
        outcome.steps = steps(&readings, &results, water.as_ref());
        outcome.notes.extend(readings.here.notes.iter().cloned());
        outcome.notes.extend(readings.entering.notes.iter().cloned());
        outcome.notes.extend(readings.leaving.notes.iter().cloned());
        judge(&readings, &results, process, &mut outcome);
        if let (Ok(flow), Some(_)) = (&readings.flow, results.heat) {
            let versus =
                book_constants::versus(given, entering, leaving, flow, water.as_ref(), None);
            outcome.versus = versus;
        }
        if let Err(missing) = &readings.flow {
            outcome.waits.push(missing.clone());
        }
        finish(readings, &mut outcome);
        outcome
            .notes
            .insert(0, Note::remark("process", Sentence::new("{w0}.").word(process.name())));
        Ok(outcome)
    }

    fn judge(&self, _: &Given, outcome: &Outcome, doubts: &BTreeMap<String, Doubt>) -> Vec<Note> {
        let mut notes = Vec::new();
        if let (Some(latent), Some(doubt)) = (outcome.amount("latent"), doubts.get("latent"))
            && let Some(half_width) = doubt.half_width_si
            && latent.si().abs() < half_width
        {
            let lead =
                Sentence::new("The latent part is not determined: its ± is larger than itself.");
            notes.push(Note::remark("latent_not_determined", lead).because(Sentence::new(
                "The total can still be good. A finer wet bulb, or the drain, would tell the latent part.",
            )));
        }
        notes
    }
}

/// States, saturation and pressure line, the same for each check on a process.
pub(crate) fn finish(readings: Readings, outcome: &mut Outcome) {
    for (key, saturated) in
        [("entering", readings.entering.saturated), ("leaving", readings.leaving.saturated)]
    {
        if saturated {
            outcome.saturated.push(key.to_owned());
        }
    }
    let point = |key: &'static str, label: &'static str, mark, air| StatePoint {
        key: key.into(),
        label: label.into(),
        mark: Some(mark),
        air,
    };
    outcome.states.push(point("entering", "Entering air", Mark::ENTERING, readings.entering.air));
    outcome.states.push(point("leaving", "Leaving air", Mark::LEAVING, readings.leaving.air));
    outcome.lines.push(Line {
        from: readings.entering.air,
        to: readings.leaving.air,
        kind: LineKind::Process,
    });
    outcome.pressure = Some(
        Sentence::new("{0}, {s0}")
            .with(readings.here.pressure.amount())
            .nested(readings.here.source),
    );
}

/// Typed humidity ratios that are the same while the leaving air is below the entering dew point.
fn cannot_hold_its_water(
    given: &Given,
    entering: &MoistAir,
    leaving: &MoistAir,
) -> Result<(), Stop> {
    let typed =
        |point: &str| given.choice(&format!("{point}.humidity_by")) == Some("humidity_ratio");
    if typed("entering")
        && typed("leaving")
        && (entering.humidity_ratio().si() - leaving.humidity_ratio().si()).abs() < 1e-12
        && entering.dew_point().is_ok_and(|dew| leaving.dry_bulb().si() < dew.si())
    {
        let says =
            Sentence::new("Air at {0} cannot still hold that water. Read the leaving humidity.")
                .with(leaving.dry_bulb().amount());
        return Err(
            Refusal::new(LEAVING.key("humidity_ratio"), "cannot_hold_its_water", says).into()
        );
    }
    Ok(())
}

/// Heat and water as results.
fn figures(
    given: &Given,
    readings: &Readings,
    results: &Results,
    water: Option<&WaterStream>,
    outcome: &mut Outcome,
) {
    let Some(heat) = results.heat else {
        outcome.push(
            Figure::withheld(
                "total",
                "Heat moved, total",
                Sentence::new("waits for the air flow"),
                RESULTS,
            )
            .role(Role::Headline),
        );
        return;
    };
    let figure = |key, label, amount| Figure::new(key, label, amount, RESULTS);
    outcome.push(
        figure("total", "Total", heat.total.amount())
            .signed("Heat added, total", "Heat removed, total")
            .role(Role::Headline),
    );
    outcome.push(
        figure("sensible", "Sensible", heat.sensible.amount())
            .signed("Sensible, added", "Sensible, removed")
            .role(Role::SensiblePart),
    );
    outcome.push(
        figure("latent", "Latent", heat.latent.amount())
            .signed("Latent, added", "Latent, removed")
            .on_condition(Sentence::new("air side: with the enthalpy of the water itself"))
            .role(Role::LatentPart),
    );
    outcome.push(sensible_heat_ratio(given, results, heat));
    if let (Some(duty), Some(net), Some(water)) = (heat.duty, heat.latent_net, water) {
        outcome.push(
            figure("duty", "Duty", duty.amount())
                .signed("Duty: heat given by the surface", "Duty: heat taken by the surface")
                .on_condition(
                    Sentence::new(
                        "less the water’s own enthalpy: {s0}; compare a water side with this",
                    )
                    .nested(water.source.clone()),
                ),
        );
        outcome.push(
            figure("latent_net", "Latent less the water’s own enthalpy", net.amount())
                .signed("Latent less the water, added", "Latent less the water, removed")
                .role(Role::Detail),
        );
    }
    moisture_figures(given, readings.leaving.air.pressure(), results, heat, water, outcome);
}

/// The share of sensible heat, or why there is none.
fn sensible_heat_ratio(given: &Given, results: &Results, heat: Heat) -> Figure {
    let resolved = |value: f64, key: &str, floor: f64| value.abs() >= given.floor(key, floor);
    let (sensible, latent) = (heat.sensible.si(), heat.latent.si());
    let withheld = |why| {
        Figure::withheld("shr", "Sensible heat ratio", Sentence::new(why), RESULTS)
            .role(Role::Minor)
    };
    if !resolved(results.delta_t.si(), "delta_t", FLOOR_K) {
        return withheld("the temperature change is not resolved");
    }
    if !resolved(results.delta_w.si(), "delta_w", FLOOR_W) {
        return withheld("the moisture change is not resolved");
    }
    if sensible.signum() * latent.signum() < 0.0 {
        return withheld("sensible and latent oppose");
    }
    let ratio = Ratio::from_si(sensible / heat.total.si());
    Figure::new("shr", "Sensible heat ratio", ratio.amount(), RESULTS).role(Role::Minor)
}

/// Water gained or lost, by mass and volume.
fn moisture_figures(
    given: &Given,
    pressure: Pressure,
    results: &Results,
    heat: Heat,
    water: Option<&WaterStream>,
    outcome: &mut Outcome,
) {
    outcome.push(
        Figure::new("moisture", "Water", heat.moisture.amount(), WATER)
            .signed("Water gained", "Water lost"),
    );
    let drained_at: Option<ThermodynamicTemperature> = water.and_then(|water| water.temperature);
    if let Some(density) = drained_at.and_then(|t| water::density(t, pressure).ok())
        && heat.moisture.si() < 0.0
    {
        let volume = CondensateFlow::from_si(-heat.moisture.si() / density.si());
        outcome.push(
            Figure::new("condensate", "Condensate", volume.amount(), WATER)
                .on_condition(Sentence::new("if the drain carries all of it")),
        );
    }
    if results.delta_w.si().abs() >= given.floor("delta_w", FLOOR_W) {
        let slope = ProcessSlope::from_si(results.split.total.si() / results.delta_w.si());
        outcome.push(
            Figure::new("slope", "Heat per mass of water", slope.amount(), WATER)
                .role(Role::Detail),
        );
    }
}

/// Changes of the air and its flows.
fn air_figures(readings: &Readings, results: &Results, outcome: &mut Outcome) {
    let figure = |key, label, amount| Figure::new(key, label, amount, AIR);
    outcome.push(figure("delta_t", "Change of dry bulb", results.delta_t.amount()));
    outcome.push(figure("delta_w", "Change of humidity ratio", results.delta_w.amount()));
    outcome.push(figure("delta_h", "Change of enthalpy", results.split.total.amount()));
    let Ok(flow) = &readings.flow else { return };
    let m = flow.dry_air.si();
    outcome.push(figure("dry_air", "Dry-air mass flow", flow.dry_air.amount()));
    let at = |read: &Read| AirFlow::from_si(m * read.air.specific_volume().si()).amount();
    outcome.push(figure("flow_entering", "Actual flow entering", at(&readings.entering)));
    outcome.push(figure("flow_leaving", "Actual flow leaving", at(&readings.leaving)));
    let density = if flow.inch_pound { STANDARD_DENSITY_IP } else { STANDARD_DENSITY_SI };
    let standard = StandardAirFlow::from_si(m / density);
    outcome.push(
        figure("flow_standard", "As standard air", standard.amount()).on_condition(
            Sentence::new("dry air of {0}")
                .with(dewledger_quantities::Amount::new(Kind::Density, density)),
        ),
    );
}

/// Remarks on the process as a whole.
fn judge(readings: &Readings, results: &Results, process: Process, outcome: &mut Outcome) {
    let cooling = matches!(process, Process::CoolingAndDehumidifying | Process::SensibleCooling);
    let leaving = &readings.leaving.air;
    if process == Process::CoolingAndHumidifying {
        outcome.notes.push(
            Note::unusual(
                "water_gained_while_cooling",
                "leaving.humidity_by",
                Sentence::new("The air gained water while it was cooled."),
            )
            .because(Sentence::new(
                "A cooling coil cannot do that: look for carry-over, a wet probe, or a wet bulb worked out for sea level.",
            )),
        );
    }
    if process == Process::CoolingAndDehumidifying && leaving.relative_humidity().si() < 0.80 {
        outcome.notes.push(
            Note::unusual(
                "leaving_dry",
                "leaving.humidity_by",
                Sentence::new("The leaving air is at {0}, dry for a coil that takes water out.")
                    .with(leaving.relative_humidity().amount()),
            )
            .because(Sentence::new("Reheat, bypass, fan heat at this point, or the probe.")),
        );
    }
    let drop = -results.delta_t.si();
    if (cooling && drop > 17.0) || results.delta_t.si() > 60.0 {
        outcome.notes.push(Note::unusual(
            "large_change",
            "leaving.dry_bulb",
            Sentence::new(
                "A change of {0} is large for one coil. Check both readings and their units.",
            )
            .with(results.delta_t.amount()),
        ));
    }
    if let (true, Some(heat), Ok(flow)) = (cooling, results.heat, &readings.flow) {
        let volume = flow.dry_air.si() * readings.entering.air.specific_volume().si();
        let per_kilowatt = volume * 1000.0 / (-heat.total.si() / 1000.0);
        if !(15.0..=80.0).contains(&per_kilowatt) {
            outcome.notes.push(
                Note::unusual(
                    "flow_per_load",
                    FLOW.rate_key(&Given::default()),
                    Sentence::new("{0} of air for {1} of cooling is outside what coils do.")
                        .with(AirFlow::from_si(volume).amount())
                        .with(Power::from_si(-heat.total.si()).amount()),
                )
                .because(Sentence::new(
                    "Comfort coils move 30 to 80 L/s for a kilowatt (220 to 600 cfm a refrigeration ton), outdoor-air coils from 15. Check the flow’s unit.",
                )),
            );
        }
    }
    if process.gains_heat() && results.split.total.si() > 0.0 && entering_looks_cooled(readings) {
        outcome.notes.push(
            Note::remark(
                "perhaps_swapped",
                Sentence::new("Read the other way round this would be a cooling coil."),
            )
            .because(Sentence::new("If the points were taken in the wrong order, swap them."))
            .offering(Offer::new(
                "Swap entering and leaving",
                swap_points(&readings.entering, &readings.leaving),
            )),
        );
    }
}

/// Air that enters nearly saturated and leaves warmer with more water: the picture of a coil read backwards.
fn entering_looks_cooled(readings: &Readings) -> bool {
    let (entering, leaving) = (&readings.entering.air, &readings.leaving.air);
    entering.relative_humidity().si() > 0.80
        && entering.dry_bulb().si() < 293.15
        && leaving.humidity_ratio().si() > entering.humidity_ratio().si()
}

/// The changes that exchange both points.
pub(crate) fn swap_points(entering: &Read, leaving: &Read) -> Vec<Change> {
    let swap = |of: &str| Change::Swap(ENTERING.key(of).into(), LEAVING.key(of).into());
    let mut changes = vec![swap("dry_bulb"), swap(entering.by)];
    if leaving.by != entering.by {
        changes.push(swap(leaving.by));
        changes.push(Change::Choose(ENTERING.key("humidity_by").into(), leaving.by.into()));
        changes.push(Change::Choose(LEAVING.key("humidity_by").into(), entering.by.into()));
    }
    changes
}

/// Formulas with the numbers put in.
fn steps(readings: &Readings, results: &Results, water: Option<&WaterStream>) -> Vec<Step> {
    let mut steps = Vec::new();
    for (title, read) in [("Entering air", &readings.entering), ("Leaving air", &readings.leaving)]
    {
        let numbers = Sentence::new("W = {0}, h = {1}, v = {2}")
            .with(read.air.humidity_ratio().amount())
            .with(read.air.enthalpy().amount())
            .with(read.air.specific_volume().amount());
        steps.push(Step::new(
            title,
            "W, h, v at (t, p)",
            numbers,
            "real-gas moist air, ASHRAE RP-1485, per mass of dry air",
        ));
    }
    let Ok(flow) = &readings.flow else { return steps };
    steps.push(flow.step.clone());
    let Some(heat) = results.heat else { return steps };
    let times = |change: EnthalpyDifference, heat: Power| {
        Sentence::new("{0} × {1} = {2}")
            .with(flow.dry_air.amount())
            .with(change.amount())
            .with(heat.amount())
    };
    steps.push(Step::new(
        "Total heat",
        "q = m (h2 - h1)",
        times(results.split.total, heat.total),
        "the air’s own enthalpy change; positive = gained",
    ));
    steps.push(Step::new(
        "Sensible heat",
        "q_s = m [ (h(t2,W1) - h1) + (h2 - h(t1,W2)) ] / 2",
        times(results.split.sensible, heat.sensible),
        "mean of the two ways round the corner of the chart: the same whichever end is first",
    ));
    steps.push(Step::new(
        "Latent heat",
        "q_l = m [ (h(t1,W2) - h1) + (h2 - h(t2,W1)) ] / 2",
        times(results.split.latent, heat.latent),
        "air side; sensible and latent add up to the total exactly",
    ));
    if let (Some(water), Some(duty)) = (water, heat.duty) {
        let numbers = Sentence::new("{0} − ({1}) × {2} = {3}; {s0}")
            .with(heat.total.amount())
            .with(heat.moisture.amount())
            .with(water.enthalpy.amount())
            .with(duty.amount())
            .nested(water.source.clone());
        steps.push(Step::new(
            "Duty",
            "q_d = q - m (W2 - W1) h_w",
            numbers,
            "books the water stream’s own enthalpy; this compares with a water side",
        ));
    }
    steps
}
