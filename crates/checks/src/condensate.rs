//! Condensate: does the drain agree with the air side?
//!
//! From states `m_w = m (W1 − W2)`; from a vessel `m_w = V rho(t_w) / time`. What is missing follows from the rest:
//! a vessel and two states give an air flow that no traverse has seen, `m = m_w / (W1 − W2)`. Repeated fills that
//! rise at each fill by more than their ± are one filling coil: no mean is offered then.
//! Source: moisture balance per mass of dry air; liquid water by IAPWS SR6-08.

use std::collections::BTreeMap;

use dewledger_properties::{MoistAir, water};
use dewledger_quantities::{
    AirFlow, CondensateFlow, DryAirFlow, HumidityRatio, Kind, Mass, MassDensity, MoistureFlow,
    Power, Pressure, Quantity, Ratio, Sentence, ThermodynamicTemperature, Time, WaterVolume,
};

use crate::air_heat::{ENTERING, FLOOR_W, FLOW, LEAVING};
use crate::check::{About, Check, Group};
use crate::doubt::Doubt;
use crate::flow_block::Flow;
use crate::form::{Mark, ReadingItem, Repeat, Section};
use crate::given::Given;
use crate::outcome::{
    Caution, Change, Figure, Missing, Note, Offer, Outcome, Role, StatePoint, Step,
};
use crate::pressure;
use crate::refusal::{Refusal, Stop, both};
use crate::split::split;
use crate::state_block::{Point, Read};

/// The check.
pub struct Condensate;

const ABOUT: About = About {
    id: "condensate",
    label: "Condensate",
    question: "Does the drain agree with the air side?",
    takes: "two air states and a flow, or timed fills, or both",
    group: Group::Air,
};

const FILLS: &str = "fills";
const BINS: &str = "bins";
const MOST_FILLS: usize = 6;
const MOST_BINS: usize = 24;
const WATER_TEMPERATURE: &str = "drain.water_temperature";
const STATES: &str = "By the air states";
const DRAIN: &str = "By the drain";
const TOGETHER: &str = "Together";
const SEASON: &str = "Over the season";

/// Net latent heat of a vessel of condensate without any air state, J/kg, ± 10 kJ/kg.
const LATENT_NET: f64 = 2.48e6;

const CAUTIONS: &[Caution] = &[
    Caution {
        title: "Pans, traps and drains",
        says: "A draw-through unit is under suction: a trap that lost its water drains nothing and breathes drain air. \
               Do not open pans with the fan running. Slippery floor; condensate is not drinking water; gloves.",
    },
    Caution {
        title: "Growth in standing water",
        says: "Do not blow, splash or breathe mist from pans and traps; numbers here say nothing about growth. Local \
               rules, the maker’s instructions and licensed people come first.",
    },
];

fn count(given: &Given, choice: &str, least: usize, most: usize) -> usize {
    given.choice(choice).and_then(|count| count.parse().ok()).unwrap_or(least).clamp(least, most)
}

fn fill_key(number: usize, of: &str) -> String {
    format!("fill{number}.{of}")
}

fn bin_key(number: usize, of: &str) -> String {
    format!("bin{number}.{of}")
}

impl Check for Condensate {
    fn about(&self) -> &'static About {
        &ABOUT
    }

    fn form(&self, given: &Given) -> Vec<Section> {
        let mut sections = vec![
            pressure::section(given),
            Section::new("entering", "Entering air", ENTERING.items(given)).marked(Mark::ENTERING),
            Section::new("leaving", "Leaving air", LEAVING.items(given)).marked(Mark::LEAVING),
            Section::new("flow", "Air flow", FLOW.items(given, false)).beside("if read"),
        ];
        if FLOW.at_plane(given) {
            let mut items = FLOW.plane_point().items(given);
            items.push(FLOW.plane_point().duct_pressure("Pressure in the duct there"));
            sections.push(Section::new("plane", "Air at the measuring plane", items));
        }
        sections.extend(fill_sections(given));
        sections.push(
            Section::new(
                "drain",
                "Water in the vessel",
                vec![
                    ReadingItem::optional(
                        WATER_TEMPERATURE,
                        "Water temperature",
                        Kind::Temperature,
                    )
                    .help("Blank is taken as the leaving wet bulb: 0.1 % of the volume")
                    .into(),
                ],
            )
            .seldom(),
        );
        sections.extend(bin_sections(given));
        sections
    }

    fn solve(&self, given: &Given) -> Result<Outcome, Stop> {
        let states = pressure::with(given, |here| {
            both(ENTERING.read(given, here), LEAVING.read(given, here))
        });
        let fills = read_fills(given)?;
        let states = match states {
            Ok((here, (entering, leaving))) => Some((here, entering, leaving)),
            Err(refused @ Stop::Refused(_)) => return Err(refused),
            Err(Stop::Waits(missing)) => {
                let begun = ["entering", "leaving"].iter().any(|point| begun(given, point));
                if begun || fills.is_empty() {
                    return Err(Stop::Waits(with_fills(missing, &fills)));
                }
                None
            }
        };
        let mut outcome = Outcome { cautions: CAUTIONS, ..Outcome::default() };
        let drained =
            drain(given, states.as_ref().map(|(_, _, leaving)| leaving), &fills, &mut outcome)?;
        match states {
            None => by_drain_alone(drained, &mut outcome),
            Some((here, entering, leaving)) => {
                let at = [("actual_entering", &entering.air), ("actual_leaving", &leaving.air)];
                let flow = FLOW.read(given, here.pressure, &at)?;
                let flow_given = given.reading(&FLOW.rate_key(given)).is_some();
                if drained.is_none() && !flow_given {
                    return Err(Stop::Waits(with_fills(
                        vec![Missing::new(FLOW.rate_key(given), "the air flow")],
                        &fills,
                    )));
                }
                if let Err(missing) = &flow
                    && flow_given
                {
                    outcome.waits.push(missing.clone());
                }
                let flow = flow.ok();
                dries(&entering, &leaving, drained)?;
                by_states(given, &entering.air, &leaving.air, flow.as_ref(), drained, &mut outcome);
                seasons(given, &leaving.air, flow.as_ref(), &mut outcome)?;
                outcome.notes.extend(here.notes.iter().cloned());
                finish(&here, entering, leaving, &mut outcome);
            }
        }
        headline(&mut outcome);
        Ok(outcome)
    }

    fn judge(&self, _: &Given, outcome: &Outcome, doubts: &BTreeMap<String, Doubt>) -> Vec<Note> {
        let (Some(ratio), Some(doubt)) = (outcome.amount("ratio"), doubts.get("ratio")) else {
            return Vec::new();
        };
        let Some(half_width) = doubt.half_width_si else { return Vec::new() };
        let lead = if (ratio.si() - 1.0).abs() <= half_width {
            Sentence::new("Drain and air side agree within what the readings allow.")
        } else {
            let largest = doubt
                .shares
                .first()
                .map_or_else(|| "the readings".to_owned(), |(source, _)| source.clone());
            Sentence::new("Drain and air side differ by more than their ±. Take again first: {w0}.")
                .word(largest.to_lowercase())
        };
        vec![Note::remark("drain_against_air", lead)]
    }
}

/// Whether anything stands at a point.
fn begun(given: &Given, point: &str) -> bool {
    let prefix = format!("{point}.");
    given.readings().any(|(key, _)| key.starts_with(&prefix))
}

/// Offers the fills as the other way, where none was read.
fn with_fills(mut missing: Vec<Missing>, fills: &[Fill]) -> Vec<Missing> {
    if fills.is_empty() {
        missing.push(Missing::new(fill_key(1, "volume"), "or a timed fill of the drain"));
    }
    missing
}

fn fill_sections(given: &Given) -> Vec<Section> {
    let count = count(given, FILLS, 1, MOST_FILLS);
    (1..=count)
        .map(|number| {
            let mut section = Section::new(
                format!("fill{number}"),
                format!("Fill {number} of the drain"),
                vec![
                    ReadingItem::optional(fill_key(number, "volume"), "Volume", Kind::WaterVolume)
                        .into(),
                    ReadingItem::optional(fill_key(number, "time"), "Time to fill", Kind::Duration)
                        .into(),
                ],
            );
            if number == count {
                section.repeat = Some(Repeat {
                    choice: FILLS.into(),
                    count,
                    least: 1,
                    most: MOST_FILLS,
                    add: Some("Add a fill".into()),
                    remove: Some("Take this fill away".into()),
                });
            }
            section
        })
        .collect()
}

fn bin_sections(given: &Given) -> Vec<Section> {
    let count = count(given, BINS, 0, MOST_BINS);
    let repeat = |add: &'static str| Repeat {
        choice: BINS.into(),
        count,
        least: 0,
        most: MOST_BINS,
        add: Some(add.into()),
        remove: Some("Take this state away".into()),
    };
    if count == 0 {
        let mut section = Section::new("season", "Over a season", Vec::new()).seldom();
        section.repeat = Some(repeat("Add an outdoor state with its hours"));
        return vec![section];
    }
    (1..=count)
        .map(|number| {
            let mut section = Section::new(
                format!("bin{number}"),
                format!("Outdoor state {number}"),
                vec![
                    ReadingItem::wanted(bin_key(number, "hours"), "Hours", Kind::Duration)
                        .covered()
                        .into(),
                    ReadingItem::wanted(
                        bin_key(number, "humidity_ratio"),
                        "Humidity ratio",
                        Kind::HumidityRatio,
                    )
                    .into(),
                ],
            );
            if number == count {
                section.repeat = Some(repeat("Add a state"));
            }
            section
        })
        .collect()
}

/// One timed fill.
struct Fill {
    number: usize,
    volume: WaterVolume,
    time: Time,
    /// Relative 95 % half-width of its rate: typed, else 1 % of volume and 2 s (field practice).
    half_width: f64,
}

fn read_fills(given: &Given) -> Result<Vec<Fill>, Stop> {
    let mut fills = Vec::new();
    for number in 1..=count(given, FILLS, 1, MOST_FILLS) {
        let (volume_key, time_key) = (fill_key(number, "volume"), fill_key(number, "time"));
        let volume: Option<WaterVolume> = given.quantity(&volume_key);
        let time: Option<Time> = given.quantity(&time_key);
        let (volume, time) = match (volume, time) {
            (None, None) => continue,
            (None, Some(_)) => return Err(Stop::waits(volume_key, "the volume of the fill")),
            (Some(_), None) => return Err(Stop::waits(time_key, "the time of the fill")),
            (Some(volume), Some(time)) => (volume, time),
        };
        if !(0.05e-3..=0.2).contains(&volume.si()) {
            return Err(Refusal::new(
                volume_key,
                "fill_volume_out_of_range",
                Sentence::new(
                    "A fill of {0} is outside 0.05 to 200 L. Check the number and its unit.",
                )
                .with(volume.amount()),
            )
            .into());
        }
        if !(30.0..=86_400.0).contains(&time.si()) {
            return Err(Refusal::new(
                time_key,
                "fill_time_out_of_range",
                Sentence::new("A filling time of {0} is outside 30 s to 24 h. A shorter one times the hand, not the drain.")
                    .with(time.amount()),
            )
            .into());
        }
        let half = |key: &str, unstated: f64| {
            given.reading(key).and_then(|r| r.half_width_si).unwrap_or(unstated)
        };
        let half_width = (half(&volume_key, 0.01 * volume.si()) / volume.si())
            .hypot(half(&time_key, 2.0) / time.si());
        fills.push(Fill { number, volume, time, half_width });
    }
    Ok(fills)
}

/// How repeated fills run.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Run {
    /// Within their ±, or without order.
    Even,
    /// Each larger than the one before, the last by more than the ±.
    Rising,
    /// Each smaller than the one before, the last by more than the ±.
    Falling,
}

/// Judges the rates of repeated fills; `rates` with their absolute half-widths, in one unit.
#[must_use]
pub fn run(rates: &[(f64, f64)]) -> Run {
    let (Some(first), Some(last)) = (rates.first(), rates.last()) else { return Run::Even };
    let beyond = (last.0 - first.0).abs() > first.1.hypot(last.1);
    let all = |test: fn(f64, f64) -> bool| rates.windows(2).all(|pair| test(pair[0].0, pair[1].0));
    if rates.len() < 2 || !beyond {
        Run::Even
    } else if all(|before, after| after > before) {
        Run::Rising
    } else if all(|before, after| after < before) {
        Run::Falling
    } else {
        Run::Even
    }
}

/// The drained rate, with its fills as results; none without fills, or while the coil is still filling.
fn drain(
    given: &Given,
    leaving: Option<&Read>,
    fills: &[Fill],
    outcome: &mut Outcome,
) -> Result<Option<MoistureFlow>, Stop> {
    if fills.is_empty() {
        return Ok(None);
    }
    let typed: Option<ThermodynamicTemperature> = given.quantity(WATER_TEMPERATURE);
    if let Some(t) = typed
        && !(273.15..=313.15).contains(&t.si())
    {
        let says = Sentence::new(
            "Condensate of {0} is outside 0 to 40 °C. Check the number and its unit.",
        );
        return Err(Refusal::new(
            WATER_TEMPERATURE,
            "water_temperature_out_of_range",
            says.with(t.amount()),
        )
        .into());
    }
    // Without a reading the leaving wet bulb, or 12 °C: the density moves by 0.1 % at most.
    let assumed = leaving
        .and_then(|leaving| leaving.air.wet_bulb().ok())
        .map_or(ThermodynamicTemperature::from_si(285.15), dewledger_properties::WetBulb::reading);
    let t = typed.unwrap_or(assumed);
    // Pressure moves the density by a hundred-thousandth; without an air state the standard one does.
    let pressure = leaving.map_or(Pressure::from_si(1e5), |leaving| leaving.air.pressure());
    let density = water::density(t, pressure).unwrap_or_else(|_| MassDensity::from_si(999.5));
    let rates: Vec<(f64, f64)> = fills
        .iter()
        .map(|fill| {
            let rate = fill.volume.si() / fill.time.si();
            (rate, rate * fill.half_width)
        })
        .collect();
    for (fill, (rate, _)) in fills.iter().zip(&rates) {
        outcome.push(Figure::new(
            format!("fill_{}", fill.number),
            format!("Fill {}", fill.number),
            CondensateFlow::from_si(*rate).amount(),
            DRAIN,
        ));
        if fill.volume.si() < 0.5e-3 || fill.time.si() < 300.0 {
            let lead = Sentence::new("Fill {w0} is short: {0} in {1}.")
                .word(fill.number.to_string())
                .with(fill.volume.amount())
                .with(fill.time.amount());
            let reason = Sentence::new(
                "Half a litre and five minutes make a second of the watch and a few drops small.",
            );
            outcome.notes.push(
                Note::unusual(
                    format!("fill{}.short", fill.number),
                    fill_key(fill.number, "time"),
                    lead,
                )
                .because(reason),
            );
        }
    }
    match run(&rates) {
        Run::Rising => {
            outcome.notes.push(
                Note::unusual("still_rising", fill_key(1, "volume"), Sentence::new("The coil or the pan is still filling: wait and fill again."))
                    .because(Sentence::new("Each fill is quicker than the one before, by more than its ±. No mean is given.")),
            );
            return Ok(None);
        }
        Run::Falling => {
            outcome.notes.push(
                Note::unusual(
                    "falling",
                    fill_key(1, "volume"),
                    Sentence::new(
                        "The drain is running out: each fill is slower than the one before.",
                    ),
                )
                .because(Sentence::new(
                    "The pan is emptying or the load is falling. No mean is given.",
                )),
            );
            return Ok(None);
        }
        Run::Even => {}
    }
    let volume: f64 = fills.iter().map(|fill| fill.volume.si()).sum();
    let time: f64 = fills.iter().map(|fill| fill.time.si()).sum();
    let rate = MoistureFlow::from_si(volume * density.si() / time);
    outcome.push(Figure::new(
        "drain_volume",
        "Drained",
        CondensateFlow::from_si(volume / time).amount(),
        DRAIN,
    ));
    outcome.push(Figure::new("drain", "Drained, by mass", rate.amount(), DRAIN));
    let daily = WaterVolume::from_si(volume / time * 86_400.0);
    outcome.push(
        Figure::new("drain_daily", "In a day at this rate", daily.amount(), DRAIN)
            .role(Role::Detail),
    );
    outcome.steps.push(Step::new(
        "Drained",
        "m_w = V rho / time",
        Sentence::new("{0} × {1} ÷ {2} = {3}")
            .with(WaterVolume::from_si(volume).amount())
            .with(density.amount())
            .with(Time::from_si(time).amount())
            .with(rate.amount()),
        "density of liquid water by IAPWS SR6-08; fills weighed by time",
    ));
    Ok(Some(rate))
}

fn by_drain_alone(drained: Option<MoistureFlow>, outcome: &mut Outcome) {
    let Some(drained) = drained else { return };
    let latent = Power::from_si(drained.si() * LATENT_NET);
    outcome.push(
        Figure::new(
            "latent_net_drain",
            "Latent heat removed, by the drain alone",
            latent.amount(),
            DRAIN,
        )
        .on_condition(Sentence::new(
            "at 2 480 kJ/kg (1 066 Btu/lb) net, assumed; the air states make it exact",
        )),
    );
}

/// Air that does not dry gives no condensate.
fn dries(entering: &Read, leaving: &Read, drained: Option<MoistureFlow>) -> Result<(), Stop> {
    let drop = entering.air.humidity_ratio().si() - leaving.air.humidity_ratio().si();
    if drop > 0.0 {
        return Ok(());
    }
    let key = LEAVING.key(leaving.by);
    let swap = |of: &str| Change::Swap(ENTERING.key(of).into(), LEAVING.key(of).into());
    let mut changes = vec![swap("dry_bulb"), swap(entering.by)];
    if leaving.by != entering.by {
        changes.push(swap(leaving.by));
        changes.push(Change::Choose(ENTERING.key("humidity_by").into(), leaving.by.into()));
        changes.push(Change::Choose(LEAVING.key("humidity_by").into(), entering.by.into()));
    }
    let says = if drained.is_some() {
        Sentence::new(
            "Leaving humidity ratio {0} is not below entering {1}, yet water came. Swap the two points, or check the leaving humidity.",
        )
    } else {
        Sentence::new(
            "Leaving humidity ratio {0} is not below entering {1}: this air gives no condensate. Swap the two points, or check the leaving humidity.",
        )
    };
    Err(Refusal::new(
        key,
        "not_condensing",
        says.with(leaving.air.humidity_ratio().amount())
            .with(entering.air.humidity_ratio().amount()),
    )
    .offering(Offer::new("Swap entering and leaving", changes))
    .into())
}

fn by_states(
    given: &Given,
    entering: &MoistAir,
    leaving: &MoistAir,
    flow: Option<&Flow>,
    drained: Option<MoistureFlow>,
    outcome: &mut Outcome,
) {
    let drop = entering.humidity_ratio().si() - leaving.humidity_ratio().si();
    let typed: Option<ThermodynamicTemperature> = given.quantity(WATER_TEMPERATURE);
    let t = typed.or_else(|| leaving.wet_bulb().ok().map(dewledger_properties::WetBulb::reading));
    let water_enthalpy =
        t.and_then(|t| water::enthalpy(t, leaving.pressure()).ok()).map_or(0.0, Quantity::si);
    let density =
        t.and_then(|t| water::density(t, leaving.pressure()).ok()).map_or(999.5, Quantity::si);
    // Latent heat of a kilogram of water on the air side, by the same split as everywhere.
    let per_water = split(entering, leaving).latent.si() / -drop;
    let resolved = drop.abs() >= given.floor("delta_w", FLOOR_W);
    outcome.push(Figure::new(
        "delta_w",
        "Drop of humidity ratio",
        HumidityRatio::from_si(drop).amount(),
        STATES,
    ));
    if let Some(flow) = flow {
        let rate = MoistureFlow::from_si(flow.dry_air.si() * drop);
        let volume = CondensateFlow::from_si(rate.si() / density);
        outcome.push(Figure::new("states_volume", "Condensate", volume.amount(), STATES));
        outcome.push(Figure::new("states", "Condensate, by mass", rate.amount(), STATES));
        outcome.push(
            Figure::new("dry_air", "Dry-air mass flow", flow.dry_air.amount(), STATES)
                .role(Role::Detail),
        );
        let daily = WaterVolume::from_si(volume.si() * 86_400.0);
        outcome.push(Figure::new("states_daily", "In a day at this rate", daily.amount(), STATES));
        let air_side = Power::from_si(rate.si() * per_water);
        let net = Power::from_si(rate.si() * (per_water - water_enthalpy));
        outcome.push(Figure::new(
            "latent_air",
            "Latent heat removed, air side",
            air_side.amount(),
            STATES,
        ));
        outcome.push(Figure::new(
            "latent_net",
            "Latent less the water’s own enthalpy",
            net.amount(),
            STATES,
        ));
        outcome.steps.push(flow.step.clone());
        outcome.steps.push(Step::new(
            "Condensate",
            "m_w = m (W1 - W2)",
            Sentence::new("{0} × {1} = {2}")
                .with(flow.dry_air.amount())
                .with(HumidityRatio::from_si(drop).amount())
                .with(rate.amount()),
            "moisture balance per mass of dry air",
        ));
    }
    let Some(drained) = drained else { return };
    let net = Power::from_si(drained.si() * (per_water - water_enthalpy));
    outcome.push(Figure::new("latent_net_drain", "Latent heat removed, net", net.amount(), DRAIN));
    let air_side = Power::from_si(drained.si() * per_water);
    outcome.push(
        Figure::new("latent_air_drain", "Latent heat removed, air side", air_side.amount(), DRAIN)
            .role(Role::Detail),
    );
    if !resolved {
        let why = Sentence::new("the drop of humidity ratio is not resolved by these readings");
        outcome.push(Figure::withheld(
            "flow_from_drain",
            "Air flow that this drain asks for",
            why,
            TOGETHER,
        ));
        return;
    }
    let dry_air = DryAirFlow::from_si(drained.si() / drop);
    let volume = AirFlow::from_si(dry_air.si() * leaving.specific_volume().si());
    outcome.push(
        Figure::new(
            "flow_from_drain",
            "Air flow that this drain asks for",
            volume.amount(),
            TOGETHER,
        )
        .on_condition(Sentence::new("actual, as it leaves; no traverse needed")),
    );
    outcome.push(
        Figure::new("dry_air_from_drain", "As dry air", dry_air.amount(), TOGETHER)
            .role(Role::Detail),
    );
    outcome.steps.push(Step::new(
        "Air flow from the drain",
        "m = m_w / (W1 - W2)",
        Sentence::new("{0} ÷ {1} = {2}")
            .with(drained.amount())
            .with(HumidityRatio::from_si(drop).amount())
            .with(dry_air.amount()),
        "independent of any traverse",
    ));
    let Some(flow) = flow else { return };
    let ratio = drained.si() / (flow.dry_air.si() * drop);
    outcome.push(Figure::new(
        "ratio",
        "Drain over air side",
        Ratio::from_si(ratio).amount(),
        TOGETHER,
    ));
    let w2 =
        HumidityRatio::from_si(entering.humidity_ratio().si() - drained.si() / flow.dry_air.si());
    outcome.push(
        Figure::new(
            "w2_from_drain",
            "Leaving humidity ratio that this drain asks for",
            w2.amount(),
            TOGETHER,
        )
        .role(Role::Detail),
    );
    if ratio < 0.9 {
        outcome.notes.push(
            Note::unusual("drain_low", fill_key(1, "volume"), Sentence::new("The drain carries less than the air gives up."))
                .because(Sentence::new("Coil or pan still filling, carry-over, a lost trap, or a cycling coil that dries between runs; or the leaving humidity read low, or the flow read high.")),
        );
    } else if ratio > 1.1 {
        outcome.notes.push(
            Note::unusual("drain_high", fill_key(1, "volume"), Sentence::new("The drain carries more than the air gives up."))
                .because(Sentence::new("Another coil’s water in this drain, or a pan emptying; or the leaving humidity read high, or the flow read low.")),
        );
    }
    outcome.notes.push(
        Note::remark("steady_coil", Sentence::new("A coil takes 20 to 40 minutes to be wet through."))
            .because(Sentence::new("Fill for longer than a compressor’s or a pump’s cycle; mind rain and humidifier water on the drain.")),
    );
}

/// Water over a season from hours with their outdoor humidity; states that would dry give nothing and are counted.
fn seasons(
    given: &Given,
    leaving: &MoistAir,
    flow: Option<&Flow>,
    outcome: &mut Outcome,
) -> Result<(), Stop> {
    let Some(flow) = flow else { return Ok(()) };
    let count = count(given, BINS, 0, MOST_BINS);
    let (mut total, mut dry, mut any) = (0.0, 0, false);
    for number in 1..=count {
        let hours: Option<Time> = given.quantity(&bin_key(number, "hours"));
        let w: Option<HumidityRatio> = given.quantity(&bin_key(number, "humidity_ratio"));
        let (Some(hours), Some(w)) = (hours, w) else { continue };
        if hours.si() > 8784.0 * 3600.0 {
            let says = Sentence::new("{0} is more than a year has.").with(hours.amount());
            return Err(Refusal::new(bin_key(number, "hours"), "more_than_a_year", says).into());
        }
        any = true;
        let drop = (w.si() - leaving.humidity_ratio().si()).max(0.0);
        if drop <= 0.0 {
            dry += 1;
        }
        let water = Mass::from_si(hours.si() * flow.dry_air.si() * drop);
        total += water.si();
        outcome.push(Figure::new(
            format!("bin_{number}"),
            format!("Outdoor state {number}"),
            water.amount(),
            SEASON,
        ));
    }
    if any {
        outcome.push(Figure::new("season", "All of them", Mass::from_si(total).amount(), SEASON));
        let t = leaving.wet_bulb().ok().map(dewledger_properties::WetBulb::reading);
        let density =
            t.and_then(|t| water::density(t, leaving.pressure()).ok()).map_or(999.5, Quantity::si);
        outcome.push(Figure::new(
            "season_volume",
            "By volume",
            WaterVolume::from_si(total / density).amount(),
            SEASON,
        ));
        if dry > 0 {
            outcome.notes.push(
                Note::remark(
                    "dry_bins",
                    Sentence::new("{w0} of these outdoor states give no water.")
                        .word(dry.to_string()),
                )
                .because(Sentence::new(
                    "Drier air than the coil leaves is not netted against the rest.",
                )),
            );
        }
    }
    Ok(())
}

/// The one figure that counts: what both routes make possible.
fn headline(outcome: &mut Outcome) {
    let order = ["ratio", "flow_from_drain", "states_volume", "drain_volume"];
    let key = order.iter().find(|key| outcome.amount(key).is_some());
    if let Some(figure) =
        key.and_then(|key| outcome.figures.iter_mut().find(|figure| figure.key == *key))
    {
        figure.role = Role::Headline;
    } else {
        let why = Sentence::new("the fills do not settle yet");
        outcome.push(Figure::withheld("drain_volume", "Drained", why, DRAIN).role(Role::Headline));
    }
    for key in ["states_volume", "drain_volume", "latent_net"] {
        if let Some(figure) = outcome
            .figures
            .iter_mut()
            .find(|figure| figure.key == key && figure.role == Role::Plain)
        {
            figure.role = Role::Minor;
        }
    }
}

fn finish(here: &pressure::Here, entering: Read, leaving: Read, outcome: &mut Outcome) {
    for (point, label, mark, read) in [
        (ENTERING, "Entering air", Mark::ENTERING, entering),
        (LEAVING, "Leaving air", Mark::LEAVING, leaving),
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
    outcome.pressure =
        Some(Sentence::new("{0}, {s0}").with(here.pressure.amount()).nested(here.source.clone()));
}
