//! Condensate: does the drain agree with the air side?
//!
//! From states `m_w = m (W1 − W2)`; from a vessel `m_w = V rho(t_w) / time`. What is missing follows from the rest:
//! a vessel and two states give an air flow that no traverse has seen, `m = m_w / (W1 − W2)`. Repeated fills that
//! rise at each fill by more than their ± are one filling coil: no mean is offered then.
//! Source: moisture balance per mass of dry air; liquid water by IAPWS SR6-08.

use std::collections::BTreeMap;

use dewledger_properties::{MoistAir, water};
use dewledger_quantities::{
    AirFlow, CondensateFlow, DryAirFlow, HumidityRatio, Kind, MoistureFlow, Power, Quantity, Ratio,
    Sentence, ThermodynamicTemperature, WaterVolume,
};

use crate::air_heat::{ENTERING, FLOOR_W, FLOW, LEAVING, swap_points};
mod fills;
mod season;

pub use fills::{Run, run};

use fills::{Fill, drain, fill_key, fill_sections, read_fills};
use season::{bin_sections, seasons};

use crate::check::{About, Check, Group};
use crate::doubt::Doubt;
use crate::drawn::{Line, LineKind};
use crate::flow_block::Flow;
use crate::form::{Mark, ReadingItem, Section};
use crate::given::Given;
use crate::outcome::{Caution, Figure, Missing, Note, Offer, Outcome, Role, StatePoint, Step};
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

const WATER_TEMPERATURE: &str = "drain.water_temperature";
const STATES: &str = "By the air states";
const DRAIN: &str = "By the drain";
const TOGETHER: &str = "Together";

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
    .offering(Offer::new("Swap entering and leaving", swap_points(entering, leaving)))
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
    outcome.lines.push(Line { from: entering.air, to: leaving.air, kind: LineKind::Process });
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
