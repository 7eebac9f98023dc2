//! Air flow by temperature rise: how much air takes up this power?
//!
//! `m = P / (h(t2, p, W) - h(t1, p, W))` at constant humidity ratio; actual flow at each end `V = m v`. Electric power: single
//! phase `V I PF`, three phase `sqrt(3) V_LL I PF`, by leg `sum V_LN I PF`. Fuel by a clocked meter: volume a turn over
//! seconds a turn, times the heating value, times `(p_m/p_base)(T_base/T_m)`, times the efficiency that the analyser
//! printed. Source: steady energy balance; definitions of electric power; the ideal-gas law for the meter.

mod electric;
mod fuel;

use std::collections::BTreeMap;

use dewledger_properties::{Humidity, MoistAir};
use dewledger_quantities::{
    AirFlow, DryAirFlow, HumidityRatio, Kind, Power, Pressure, Quantity, Sentence, StandardAirFlow,
    TemperatureInterval, ThermodynamicTemperature,
};

use crate::check::{About, Check, Group};
use crate::doubt::{Doubt, Term};
use crate::drawn::{Line, LineKind};
use crate::flow_block::STANDARD_DENSITY_SI;
use crate::form::{Choice, ChoiceItem, Item, Mark, ReadingItem, Section};
use crate::given::{Given, Moved};
use crate::outcome::{
    Caution, Change, Figure, Note, Offer, Outcome, Role, StatePoint, Step, Versus,
};
use crate::pressure;
use crate::refusal::{Refusal, Stop};
use crate::state_block::{Point, Read};

/// The check.
pub struct HeatRise;

const ABOUT: About = About {
    id: "heat_rise",
    label: "Air flow by temperature rise",
    question: "How much air takes up this power?",
    takes: "a known power and the temperatures before and after",
    group: Group::Air,
};

const ENTERING: Point<'static> = Point { prefix: "entering", name: "entering" };
const LEAVING: &str = "leaving.dry_bulb";
const BY: &str = "power.by";
const KNOWN: &str = "power.known";
const OTHER: &str = "other.power";
const RESULTS: &str = "The air";
const POWER: &str = "Power";

/// Humidity ratio that stands in where none was read, kg/kg, and its half-width: 0.7 % of the result.
const ASSUMED_W: f64 = 0.006;
const ASSUMED_W_HALF_WIDTH: f64 = 0.004;
const HUMIDITY: &str = "entering humidity";
/// Rises that can be worked with, K.
const RISE_K: std::ops::RangeInclusive<f64> = 2.0..=90.0;
/// Below this rise, K, two ± 0.3 K thermometers leave more than 5 %.
const SMALL_RISE_K: f64 = 8.0;
/// The book's 1.08 in J/(m³ K): Btu/h for each cfm and °F.
const BOOK: f64 = 1.08 * 1_055.055_852_62 / 3600.0 / 4.719_474_432e-4 * 1.8;

const CAUTIONS: &[Caution] = &[
    Caution {
        title: "Live terminals",
        says: "Clamp on only if you are competent and allowed to. Limit switches stay in circuit. Elements and casing are hot.",
    },
    Caution {
        title: "Burners",
        says: "Carbon monoxide, spillage, or a rise above the nameplate: stop, shut off, leave, and call. This app gives no \
               verdict on combustion. Local rules, the maker’s instructions and licensed people come first.",
    },
];

/// Dry air that takes up a power between two temperatures at constant humidity ratio.
#[must_use]
pub fn dry_air(entering: &MoistAir, leaving: &MoistAir, power: Power) -> DryAirFlow {
    DryAirFlow::from_si(power.si() / (leaving.enthalpy().si() - entering.enthalpy().si()))
}

impl Check for HeatRise {
    fn about(&self) -> &'static About {
        &ABOUT
    }

    fn form(&self, given: &Given) -> Vec<Section> {
        let mut entering = ENTERING.items(given);
        for item in entering.iter_mut().skip(1) {
            if let Item::Reading(item) = item {
                item.required = false;
                item.help = Some("Blank is taken as 6 g/kg, give or take 4".into());
            }
        }
        let mut sections = vec![
            pressure::section(given),
            Section::new("entering", "Entering air", entering).marked(Mark::ENTERING),
            Section::new(
                "leaving",
                "Leaving air",
                vec![
                    ReadingItem::wanted(LEAVING, "Dry bulb", Kind::Temperature)
                        .help("By a grid, out of sight of elements or exchanger")
                        .into(),
                ],
            )
            .marked(Mark::LEAVING),
            Section::new("power", "Power into the air", power_items(given)),
        ];
        if given.choice(BY) == Some("fuel") {
            sections.push(Section::new("fuel", "Fuel by a clocked meter", fuel::items()));
        }
        sections.push(
            Section::new(
                "other",
                "Other heat between the two points",
                vec![
                    ReadingItem::optional(OTHER, "Heat of a fan between them", Kind::Power)
                        .assuming(Power::from_si(0.0).amount())
                        .covered()
                        .into(),
                ],
            )
            .seldom(),
        );
        sections
    }

    fn solve(&self, given: &Given) -> Result<Outcome, Stop> {
        let (here, entering) = pressure::with(given, |here| entering(given, here))?;
        let mut outcome = Outcome { cautions: CAUTIONS, ..Outcome::default() };
        let leaving_t: ThermodynamicTemperature =
            given.quantity(LEAVING).ok_or_else(|| Stop::waits(LEAVING, "the leaving dry bulb"))?;
        let leaving = leaving(given, &entering.read.air, leaving_t)?;
        let power = power(given, here.pressure, &mut outcome)?;
        let other: Power = given.quantity(OTHER).unwrap_or_default();
        let all = Power::from_si(power.si() + other.si());
        results(&entering.read.air, &leaving, all, &mut outcome);
        judge(&entering, &leaving, &mut outcome);
        outcome.notes.extend(here.notes);
        outcome.notes.extend(entering.read.notes.iter().cloned());
        let point = |key: &'static str, label: &'static str, mark, air| StatePoint {
            key: key.into(),
            label: label.into(),
            mark: Some(mark),
            air,
        };
        outcome.lines.push(Line { from: entering.read.air, to: leaving, kind: LineKind::Process });
        outcome.states.push(point("entering", "Entering air", Mark::ENTERING, entering.read.air));
        outcome.states.push(point("leaving", "Leaving air", Mark::LEAVING, leaving));
        if entering.read.saturated {
            outcome.saturated.push("entering".to_owned());
        }
        outcome.pressure =
            Some(Sentence::new("{0}, {s0}").with(here.pressure.amount()).nested(here.source));
        Ok(outcome)
    }

    fn terms(&self, given: &Given) -> Vec<Term> {
        let mut terms = pressure::terms(given);
        if matches!(pressure::here(given).map(|here| entering(given, here.pressure)), Ok(Ok(entering)) if entering.assumed)
        {
            let u = ASSUMED_W_HALF_WIDTH / crate::doubt::COVERAGE_95;
            terms.push(Term::worked_out(
                "humidity that was not read",
                Moved::WorkedOut(HUMIDITY),
                u,
            ));
        }
        terms
    }

    fn judge(&self, _: &Given, outcome: &Outcome, doubts: &BTreeMap<String, Doubt>) -> Vec<Note> {
        let (Some(rise), Some(doubt)) = (outcome.amount("rise"), doubts.get("rise")) else {
            return Vec::new();
        };
        let Some(half_width) = doubt.half_width_si.filter(|width| *width > 0.05 * rise.si()) else {
            return Vec::new();
        };
        let lead = Sentence::new(
            "The rise of {0} is known to ± {1}: that alone is more than 5 % of the flow.",
        )
        .with(rise)
        .with(TemperatureInterval::from_si(half_width).amount());
        vec![Note::remark("rise_in_doubt", lead)]
    }
}

/// The entering air, and whether its humidity stands in for one that was not read.
struct Entering {
    read: Read,
    assumed: bool,
}

fn entering(given: &Given, here: Pressure) -> Result<Entering, Stop> {
    match ENTERING.read(given, here) {
        Ok(read) => Ok(Entering { read, assumed: false }),
        Err(Stop::Waits(missing))
            if missing.len() == 1 && given.reading("entering.dry_bulb").is_some() =>
        {
            let dry_bulb: ThermodynamicTemperature =
                given.quantity("entering.dry_bulb").unwrap_or_default();
            let w = HumidityRatio::from_si((ASSUMED_W + given.shift(HUMIDITY)).max(0.0));
            let air = MoistAir::new(dry_bulb, Humidity::HumidityRatio(w), here)
                .or_else(|_| MoistAir::saturated(dry_bulb, here))
                .map_err(|_| {
                    Refusal::new(
                        "entering.dry_bulb",
                        "dry_bulb_out_of_range",
                        Sentence::new("Dry bulb {0} is outside what moist air is worked out for. Check the number and its unit.")
                            .with(dry_bulb.amount()),
                    )
                })?;
            let read = Read { air, saturated: false, notes: Vec::new(), by: "humidity_ratio" };
            Ok(Entering { read, assumed: true })
        }
        Err(stop) => Err(stop),
    }
}

/// The leaving air: the same water, another temperature.
fn leaving(
    given: &Given,
    entering: &MoistAir,
    t: ThermodynamicTemperature,
) -> Result<MoistAir, Stop> {
    let rise = TemperatureInterval::from_si(t.si() - entering.dry_bulb().si());
    if rise.si() <= 0.0 {
        return Err(Refusal::new(
            LEAVING,
            "not_warmer",
            Sentence::new("Leaving {0} is not warmer than entering {1}: no power went into this air. Swap the two, or read again.")
                .with(t.amount())
                .with(entering.dry_bulb().amount()),
        )
        .offering(Offer::new(
            "Swap the two",
            vec![Change::Swap("entering.dry_bulb".into(), LEAVING.into())],
        ))
        .into());
    }
    if !RISE_K.contains(&rise.si()) && !given.is_drawn() {
        return Err(Refusal::new(
            LEAVING,
            "rise_out_of_range",
            Sentence::new("A rise of {0} is outside 2 to 90 K: no flow can be told from it. Check both temperatures and their units.")
                .with(rise.amount()),
        )
        .into());
    }
    MoistAir::new(t, Humidity::HumidityRatio(entering.humidity_ratio()), entering.pressure())
        .map_err(|error| {
            Refusal::new(
                LEAVING,
                "leaving_out_of_range",
                Sentence::new(
                    "Leaving air of {0} is outside what moist air is worked out for ({w0}).",
                )
                .with(t.amount())
                .word(error.to_string()),
            )
            .into()
        })
}

fn power_items(given: &Given) -> Vec<Item> {
    let mut items: Vec<Item> = vec![
        ChoiceItem::new(
            BY,
            "Known from",
            None,
            vec![
                Choice::helped("legs", "Electric, leg by leg", "Each leg against neutral"),
                Choice::helped(
                    "three_phase",
                    "Electric, three phase",
                    "Means of the line voltages and currents",
                ),
                Choice::new("single_phase", "Electric, single phase"),
                Choice::helped("known", "A power meter", "Or a power known otherwise"),
                Choice::helped(
                    "fuel",
                    "Fuel by a clocked meter",
                    "With the efficiency that the analyser printed",
                ),
            ],
        )
        .into(),
    ];
    match given.choice(BY) {
        Some("known") => {
            items.push(
                ReadingItem::wanted(KNOWN, "Power", Kind::Power)
                    .help("Watts, not volt-amperes")
                    .into(),
            );
        }
        Some(by @ ("legs" | "three_phase" | "single_phase")) => items.extend(electric::items(by)),
        _ => {}
    }
    items
}

/// The power that goes into the air.
fn power(given: &Given, here: Pressure, outcome: &mut Outcome) -> Result<Power, Stop> {
    let Some(by) = given.choice(BY) else {
        return Err(Stop::waits(BY, "what the power is known from"));
    };
    let power = match by {
        "fuel" => fuel::power(given, here, outcome)?,
        "known" => given.quantity(KNOWN).ok_or_else(|| Stop::waits(KNOWN, "the power"))?,
        _ => electric::power(given, by, outcome)?,
    };
    if !(10.0..=1e7).contains(&power.si()) {
        return Err(Refusal::new(
            if by == "known" { KNOWN } else { BY },
            "power_out_of_range",
            Sentence::new(
                "A power of {0} is outside 10 W to 10 MW. Check the numbers and their units.",
            )
            .with(power.amount()),
        )
        .into());
    }
    Ok(power)
}

fn results(entering: &MoistAir, leaving: &MoistAir, power: Power, outcome: &mut Outcome) {
    let m = dry_air(entering, leaving, power);
    let figure = |key, label, amount| Figure::new(key, label, amount, RESULTS);
    let volume = |air: &MoistAir| AirFlow::from_si(m.si() * air.specific_volume().si());
    let rise = TemperatureInterval::from_si(leaving.dry_bulb().si() - entering.dry_bulb().si());
    outcome.push(
        figure("flow_entering", "Actual flow, entering", volume(entering).amount())
            .role(Role::Headline),
    );
    outcome.push(
        figure("flow_leaving", "Actual flow, leaving", volume(leaving).amount()).role(Role::Minor),
    );
    outcome.push(figure("rise", "Rise of the dry bulb", rise.amount()).role(Role::Minor));
    outcome.push(figure("dry_air", "Dry-air mass flow", m.amount()));
    let standard = StandardAirFlow::from_si(m.si() / STANDARD_DENSITY_SI);
    outcome.push(
        figure("flow_standard", "As standard air", standard.amount())
            .on_condition(Sentence::new("Dry air of 1.200 kg/m³")),
    );
    outcome.push(Figure::new("power", "Power into the air", power.amount(), POWER));
    let delta_h = leaving.enthalpy().si() - entering.enthalpy().si();
    outcome.push(
        figure(
            "delta_h",
            "Change of enthalpy",
            dewledger_quantities::EnthalpyDifference::from_si(delta_h).amount(),
        )
        .role(Role::Detail),
    );
    outcome.steps.push(Step::new(
        "Air flow",
        "m = P / (h(t2, W) - h(t1, W)),  V = m v",
        Sentence::new("{0} ÷ {1} = {2}; × {3} = {4}")
            .with(power.amount())
            .with(dewledger_quantities::EnthalpyDifference::from_si(delta_h).amount())
            .with(m.amount())
            .with(entering.specific_volume().amount())
            .with(volume(entering).amount()),
        "steady balance; no water joins or leaves",
    ));
    let book = AirFlow::from_si(power.si() / (BOOK * rise.si()));
    let error = book.si() / volume(entering).si() - 1.0;
    outcome.versus.push(Versus {
        figure: "flow_entering",
        title: Sentence::new("Flow by 1.08"),
        book: book.amount(),
        error,
        parts: Vec::new(),
        reason: Sentence::new(
            "It comes out as standard air at sea level, not as what passes here.",
        ),
    });
}

fn judge(entering: &Entering, leaving: &MoistAir, outcome: &mut Outcome) {
    let rise =
        TemperatureInterval::from_si(leaving.dry_bulb().si() - entering.read.air.dry_bulb().si());
    if entering.assumed {
        outcome.notes.push(Note::remark(
            "humidity_assumed",
            Sentence::new(
                "The humidity was not read: {0} is taken, which adds 0.7 % to the doubt.",
            )
            .with(HumidityRatio::from_si(ASSUMED_W).amount()),
        ));
    }
    if rise.si() < SMALL_RISE_K {
        outcome.notes.push(
            Note::unusual(
                "small_rise",
                LEAVING,
                Sentence::new(
                    "A rise of {0} is small: two thermometers of ± 0.3 K leave more than 5 %.",
                )
                .with(rise.amount()),
            )
            .because(Sentence::new("Use one thermometer for both, or more stages.")),
        );
    }
    outcome.notes.push(
        Note::remark("radiation", Sentence::new("A thermometer that sees the element reads high."))
            .because(Sentence::new(
                "Move it 3 to 5 m on, or past an elbow; take a grid; wait 10 to 15 minutes; read volts under load.",
            )),
    );
}
