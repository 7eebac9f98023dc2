//! Apparatus dew point and bypass: at what mean surface does this coil work, and how much air slips through untouched?
//!
//! The line from the entering through the leaving state carried on to saturation is the apparatus dew point; the bypass
//! factor `BF = (T2 - T_adp)/(T1 - T_adp)`. At another flow `BF' = exp(ln BF (m'/m)^(n-1))`: `NTU = -ln BF`, conductance as `m^n`,
//! n 0 where the air side does not respond, 0.6 for finned surfaces, 0.8 for smooth ducts (effectiveness and NTU; Colburn's
//! analogy, from memory). An approximation: a stiff coolant, one surface temperature.

mod line;
mod predict;

use std::collections::BTreeMap;

use dewledger_properties::{Humidity, MoistAir, saturation_humidity_ratio_over_liquid};
use dewledger_quantities::{
    HumidityRatioDifference, Kind, Quantity, Ratio, Sentence, Share, TemperatureInterval,
    ThermodynamicTemperature,
};

use crate::check::{About, Check, Group};
use crate::doubt::Doubt;
use crate::drawn::{Line, LineKind};
use crate::form::{Mark, ReadingItem, Section, Shape};
use crate::given::Given;
use crate::outcome::{Caution, Figure, Note, Offer, Outcome, Role, StatePoint, Step};
use crate::pressure;
use crate::refusal::{Refusal, Stop, both};
use crate::state_block::{Point, Read};

pub use line::{Meeting, at_flow, bypass, meeting};

/// The check.
pub struct Coil;

const ABOUT: About = About {
    id: "coil",
    label: "Apparatus dew point and bypass",
    question: "At what surface does this coil work, and how much air slips through?",
    takes: "the air before and after a cooling coil",
    group: Group::Air,
};

const ENTERING: Point<'static> = Point { prefix: "entering", name: "entering" };
const LEAVING: Point<'static> = Point { prefix: "leaving", name: "leaving" };
const FAN_RISE: &str = "coil.fan_rise";
const COOLANT: &str = "coil.coolant";
const RESULTS: &str = "The coil";

/// Without a stated ±, a smaller change of moisture is not resolved, kg/kg.
const FLOOR_W: f64 = 5e-5;

const CAUTIONS: &[Caution] = &[
    Caution {
        title: "At the coil",
        says: "Fans and belts start by themselves; pans are slippery; fins cut. Isolate before reaching in.",
    },
    Caution {
        title: "Refrigerant",
        says: "Refrigerant circuits are for licensed people. Local rules and the maker’s instructions come first.",
    },
];

impl Check for Coil {
    fn about(&self) -> &'static About {
        &ABOUT
    }

    fn form(&self, given: &Given) -> Vec<Section> {
        let mut sections = vec![
            pressure::section(given),
            Section::new("entering", "Entering air", ENTERING.items(given))
                .marked(Mark::ENTERING)
                .beside("before the coil"),
            Section::new("leaving", "Leaving air", LEAVING.items(given))
                .marked(Mark::LEAVING)
                .beside("after the coil"),
            Section::new(
                "coil",
                "The coil",
                vec![
                    ReadingItem::optional(
                        FAN_RISE,
                        "Fan’s rise before the leaving point",
                        Kind::TemperatureDifference,
                    )
                    .assuming(TemperatureInterval::from_si(0.0).amount())
                    .help("Where the leaving point lies after a fan; its own check gives it")
                    .covered()
                    .into(),
                    ReadingItem::optional(COOLANT, "Coolant entering", Kind::Temperature).into(),
                ],
            )
            .seldom(),
        ];
        sections.extend(predict::sections(given));
        sections
    }

    fn solve(&self, given: &Given) -> Result<Outcome, Stop> {
        let (here, (entering, leaving)) = pressure::with(given, |here| {
            both(ENTERING.read(given, here), LEAVING.read(given, here))
        })?;
        let leaving = less_fan(given, leaving)?;
        let mut outcome = Outcome { cautions: CAUTIONS, ..Outcome::default() };
        cools(given, &entering, &leaving)?;
        let drop = entering.air.humidity_ratio().si() - leaving.air.humidity_ratio().si();
        let floor = given.floor("delta_w", FLOOR_W);
        if drop > 0.0 && drop >= floor {
            wet(given, &entering.air, &leaving.air, &mut outcome)?;
        } else {
            dry(given, &entering.air, &leaving.air, &mut outcome);
        }
        outcome.push(
            Figure::new(
                "delta_w",
                "Drop of humidity ratio",
                HumidityRatioDifference::from_si(drop).amount(),
                RESULTS,
            )
            .role(Role::Detail),
        );
        predict::earlier(given, &mut outcome)?;
        outcome.notes.extend(here.notes);
        finish(entering, leaving, &mut outcome);
        outcome.pressure =
            Some(Sentence::new("{0}, {s0}").with(here.pressure.amount()).nested(here.source));
        Ok(outcome)
    }

    fn judge(&self, _: &Given, outcome: &Outcome, doubts: &BTreeMap<String, Doubt>) -> Vec<Note> {
        let mut notes = Vec::new();
        let width = |key: &str| {
            let doubt = doubts.get(key)?;
            (doubt.unknown.is_empty() && doubt.u_si > 0.0).then_some(1.96 * doubt.u_si)
        };
        if let Some(width) = width("adp").filter(|width| *width > 2.0) {
            notes.push(
                Note::unusual(
                    "adp_in_doubt",
                    LEAVING.key("dry_bulb"),
                    Sentence::new("A steep line: the apparatus dew point is known to ± {0} only.")
                        .with(TemperatureInterval::from_si(width).amount()),
                )
                .because(Sentence::new("Read the leaving humidity better: it decides.")),
            );
        }
        if let (Some(ratio), Some(width)) = (outcome.amount("drift"), width("drift")) {
            let off = ratio.si() - 1.0;
            let lead = if off.abs() <= width {
                Sentence::new("Against then no change can be told.")
            } else if off < 0.0 {
                Sentence::new("The surface does less than then: {0} of it.")
                    .with(Share::from_si(ratio.si()).amount())
            } else {
                Sentence::new("The surface does more than then: {0} of it.")
                    .with(Share::from_si(ratio.si()).amount())
            };
            let reason = if off < 0.0 {
                "Fouled or flooded fins, air past the coil, uneven face velocity, part of it dry, more flow than was read, or a leaving probe near a reheat do that."
            } else {
                "A cleaned coil, less flow than was read (a filter), or a leaving probe that is wet do that."
            };
            let mut note = Note::remark("drift_judged", lead);
            if off.abs() > width {
                note = note.because(Sentence::new(reason));
            }
            notes.push(note);
        }
        notes
    }
}

/// The leaving air as it left the coil: less the fan's rise, where the point lies behind one.
fn less_fan(given: &Given, mut leaving: Read) -> Result<Read, Stop> {
    let Some(rise): Option<TemperatureInterval> = given.quantity(FAN_RISE) else {
        return Ok(leaving);
    };
    if !(0.0..=5.0).contains(&rise.si()) && !given.is_drawn() {
        return Err(Refusal::new(
            FAN_RISE,
            "fan_rise_out_of_range",
            Sentence::new(
                "A fan’s rise of {0} is outside 0 to 5 K. Check the number and its unit.",
            )
            .with(rise.amount()),
        )
        .into());
    }
    let t = ThermodynamicTemperature::from_si(leaving.air.dry_bulb().si() - rise.si());
    leaving.air = MoistAir::unchecked(t, leaving.air.humidity_ratio(), leaving.air.pressure());
    Ok(leaving)
}

/// A cooling coil cools, and gives no water.
fn cools(given: &Given, entering: &Read, leaving: &Read) -> Result<(), Stop> {
    let swap =
        || Offer::new("Swap entering and leaving", crate::air_heat::swap_points(entering, leaving));
    if leaving.air.dry_bulb().si() >= entering.air.dry_bulb().si() {
        return Err(Refusal::new(
            LEAVING.key("dry_bulb"),
            "not_cooler",
            Sentence::new("Leaving {0} is not cooler than entering {1}. Swap the two, or this is a heating coil.")
                .with(leaving.air.dry_bulb().amount())
                .with(entering.air.dry_bulb().amount()),
        )
        .offering(swap())
        .into());
    }
    let gained = leaving.air.humidity_ratio().si() - entering.air.humidity_ratio().si();
    if gained > given.floor("delta_w", FLOOR_W) && !given.is_drawn() {
        return Err(Refusal::new(
            LEAVING.key(leaving.by),
            "gains_water",
            Sentence::new("The air gains {0} of water: none can be gained on a cooling coil. Check the leaving humidity, and look for carry-over.")
                .with(HumidityRatioDifference::from_si(gained).amount()),
        )
        .into());
    }
    Ok(())
}

fn wet(
    given: &Given,
    entering: &MoistAir,
    leaving: &MoistAir,
    outcome: &mut Outcome,
) -> Result<(), Stop> {
    match meeting(entering, leaving) {
        Meeting::At { dry_bulb, humidity_ratio, steepness } => {
            let share = bypass(entering, leaving, dry_bulb);
            let figure = |key, label, amount| Figure::new(key, label, amount, RESULTS);
            outcome
                .push(figure("adp", "Apparatus dew point", dry_bulb.amount()).role(Role::Headline));
            outcome.push(
                figure("bypass", "Bypass factor", Share::from_si(share.si()).amount())
                    .role(Role::Minor),
            );
            outcome.push(
                figure("contact", "Contact factor", Share::from_si(1.0 - share.si()).amount())
                    .role(Role::Minor),
            );
            outcome.push(figure("adp_humidity", "Humidity ratio there", humidity_ratio.amount()));
            outcome.push(
                figure("steepness", "Slope of saturation over the line’s", steepness.amount())
                    .on_condition(Sentence::new(
                        "at the apparatus dew point; near 1 the line hardly meets it",
                    ))
                    .role(Role::Detail),
            );
            outcome.steps.push(step(entering, leaving, dry_bulb, share));
            let surface = MoistAir::unchecked(dry_bulb, humidity_ratio, leaving.pressure());
            outcome.lines.push(Line { from: *leaving, to: surface, kind: LineKind::CarriedOn });
            outcome.states.push(StatePoint {
                key: "adp".into(),
                label: "Apparatus dew point".into(),
                mark: Some(Mark { letter: 'D', shape: Shape::Diamond }),
                air: surface,
            });
            judge(given, entering, leaving, dry_bulb, share, steepness, outcome);
            predict::predict(given, entering, &surface, share, outcome)
        }
        Meeting::Nowhere { nearest } => {
            passes_by(leaving, nearest, outcome);
            Ok(())
        }
    }
}

fn step(
    entering: &MoistAir,
    leaving: &MoistAir,
    adp: ThermodynamicTemperature,
    share: Ratio,
) -> Step {
    Step::new(
        "Apparatus dew point and bypass",
        "W_s(T) = W2 + k (T - T2),  k = (W1 - W2)/(T1 - T2);  BF = (T2 - T)/(T1 - T)",
        Sentence::new("{0}, {1} to {2}, {3}: T = {4}, BF = {5}")
            .with(entering.dry_bulb().amount())
            .with(entering.humidity_ratio().amount())
            .with(leaving.dry_bulb().amount())
            .with(leaving.humidity_ratio().amount())
            .with(adp.amount())
            .with(Share::from_si(share.si()).amount()),
        "the first meeting with saturation from the leaving state, at this pressure",
    )
}

fn judge(
    given: &Given,
    entering: &MoistAir,
    leaving: &MoistAir,
    adp: ThermodynamicTemperature,
    share: Ratio,
    steepness: Ratio,
    outcome: &mut Outcome,
) {
    let unusual =
        |code: &'static str, lead: Sentence| Note::unusual(code, LEAVING.key("dry_bulb"), lead);
    if let Some(coolant) = given.quantity::<ThermodynamicTemperature>(COOLANT)
        && adp.si() < coolant.si()
    {
        outcome.notes.push(
            unusual(
                "below_the_coolant",
                Sentence::new(
                    "An apparatus dew point of {0} is below the coolant’s {1}: that cannot be.",
                )
                .with(adp.amount())
                .with(coolant.amount()),
            )
            .because(Sentence::new("A leaving humidity read low, or a coolant read warm.")),
        );
    }
    if adp.si() < 273.16 {
        outcome.notes.push(
            unusual(
                "frosting",
                Sentence::new("The surface works at {0}: it frosts.").with(adp.amount()),
            )
            .because(Sentence::new(
                "The figures mix ice and water then, and change while it frosts.",
            )),
        );
    }
    if share.si() > 0.35 || share.si() < 0.01 {
        outcome.notes.push(
            unusual(
                "bypass_unusual",
                Sentence::new("A bypass factor of {0} is unusual.").with(Share::from_si(share.si()).amount()),
            )
            .because(Sentence::new("Common are 25 to 45 % with 2 rows, 10 to 25 % with 4, 4 to 12 % with 6, 2 to 6 % with 8.")),
        );
    }
    if steepness.si() < 1.6 {
        outcome.notes.push(
            unusual(
                "steep_line",
                Sentence::new("The line is nearly as steep as saturation: a little humidity moves the apparatus dew point by several kelvin."),
            )
            .because(Sentence::new("The coil could as well work at a lower meeting, with fog on the way; these readings cannot tell.")),
        );
    }
    if leaving.relative_humidity().si() > 0.97 {
        outcome.notes.push(Note::remark(
            "leaving_nearly_saturated",
            Sentence::new("Leaving air of {0}: keep the probe out of droplets.")
                .with(leaving.relative_humidity().amount()),
        ));
    }
    let through_fog = (1..20).any(|step| {
        let x = f64::from(step) / 20.0;
        let part = |of: &dyn Fn(&MoistAir) -> f64| of(leaving) + x * (of(entering) - of(leaving));
        let t = ThermodynamicTemperature::from_si(part(&|air| air.dry_bulb().si()));
        let w = part(&|air| air.humidity_ratio().si());
        saturation_humidity_ratio_over_liquid(t, leaving.pressure())
            .is_ok_and(|limit| w > limit.si())
    });
    if through_fog {
        outcome.notes.push(unusual(
            "through_fog",
            Sentence::new(
                "A straight line between the states runs through fog; the real path is curved.",
            ),
        ));
    }
}

/// The line never meets saturation: what would explain it.
fn passes_by(leaving: &MoistAir, nearest: ThermodynamicTemperature, outcome: &mut Outcome) {
    let why =
        Sentence::new("the line through both states never meets saturation; it is nearest at {0}")
            .with(nearest.amount());
    outcome.push(Figure::withheld("adp", "Apparatus dew point", why, RESULTS).role(Role::Headline));
    let left = left_the_coil(leaving);
    let mut note = Note::unusual(
        "passes_by",
        LEAVING.key("dry_bulb"),
        Sentence::new("No surface cools this air along this line."),
    );
    note.reason = Some(match left {
        Some(left) => {
            let rise = TemperatureInterval::from_si(leaving.dry_bulb().si() - left.si());
            outcome.push(
                Figure::new(
                    "left_the_coil",
                    "It would have left the coil at",
                    left.amount(),
                    RESULTS,
                )
                .on_condition(Sentence::new("were it at 95 % there")),
            );
            outcome.push(Figure::new("reheat", "Warmed after that by", rise.amount(), RESULTS));
            Sentence::new("Reheat or a fan after the coil ({0} would do), uncooled air mixed in, a leaving humidity read low, or carry-over read as humidity at entering.")
                .with(rise.amount())
        }
        None => Sentence::new(
            "Reheat or a fan after the coil, uncooled air mixed in, a leaving humidity read low, or carry-over read as humidity at entering.",
        ),
    });
    outcome.notes.push(note);
}

/// The dry bulb at which this water is 95 % of saturation.
fn left_the_coil(leaving: &MoistAir) -> Option<ThermodynamicTemperature> {
    let humidity = |t: f64| {
        let t = ThermodynamicTemperature::from_si(t);
        let air =
            MoistAir::new(t, Humidity::HumidityRatio(leaving.humidity_ratio()), leaving.pressure());
        air.ok().map(|air| air.relative_humidity().si())
    };
    let (mut low, mut high) = (leaving.dew_point().ok()?.si(), leaving.dry_bulb().si());
    if humidity(high)? > 0.95 {
        return None;
    }
    for _ in 0..60 {
        let middle = 0.5 * (low + high);
        if humidity(middle).is_none_or(|then| then > 0.95) {
            low = middle;
        } else {
            high = middle;
        }
    }
    Some(ThermodynamicTemperature::from_si(0.5 * (low + high)))
}

/// A dry coil has no apparatus dew point.
fn dry(given: &Given, entering: &MoistAir, leaving: &MoistAir, outcome: &mut Outcome) {
    let why = Sentence::new("the coil is dry, or its drying is not resolved by these readings");
    outcome.push(Figure::withheld("adp", "Apparatus dew point", why, RESULTS).role(Role::Headline));
    if let Some(coolant) = given.quantity::<ThermodynamicTemperature>(COOLANT) {
        let cooled = entering.dry_bulb().si() - leaving.dry_bulb().si();
        let share = cooled / (entering.dry_bulb().si() - coolant.si());
        outcome.push(
            Figure::new(
                "approach",
                "Cooled, of what its coolant could",
                Share::from_si(share).amount(),
                RESULTS,
            )
            .on_condition(Sentence::new("of entering dry bulb less coolant")),
        );
    }
    outcome.notes.push(
        Note::remark(
            "dry_coil",
            Sentence::new(
                "A level line meets saturation at the entering dew point: that is no surface.",
            ),
        )
        .because(Sentence::new("Come back when the coil dries the air.")),
    );
}

fn finish(entering: Read, leaving: Read, outcome: &mut Outcome) {
    outcome.lines.insert(0, Line { from: entering.air, to: leaving.air, kind: LineKind::Process });
    let mut states = Vec::new();
    for (point, label, mark, read) in [
        (ENTERING, "Entering air", Mark::ENTERING, entering),
        (LEAVING, "Leaving air", Mark::LEAVING, leaving),
    ] {
        let point: Point<'static> = point;
        if read.saturated {
            outcome.saturated.push(point.prefix.to_owned());
        }
        outcome.notes.extend(read.notes);
        states.push(StatePoint {
            key: point.prefix.into(),
            label: label.into(),
            mark: Some(mark),
            air: read.air,
        });
    }
    states.append(&mut outcome.states);
    outcome.states = states;
}
