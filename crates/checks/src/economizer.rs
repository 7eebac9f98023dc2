//! More outdoor air or less: which share of outdoor air asks least of the coil now?
//!
//! At a share x of outdoor air the mixed air is weighed by dry air; at or below the coil's leaving dry bulb nothing is left to
//! cool; else `load = m (h_M - h(t_c, W_l))` with `W_l = min(W_M, W(t_c, RH_c))`: a coil that has nothing to dry pays for
//! temperature alone. A dry-bulb rule opens where outdoor is cooler than return, an enthalpy rule where its enthalpy is
//! lower; what counts is the load. Between both ends it need not run one way, hence the curve. Own derivation; rules of
//! this kind stand in ANSI/ASHRAE/IES 90.1 (from memory).

use dewledger_properties::{Humidity, MoistAir, settle};
use dewledger_quantities::{
    DryAirFlow, Enthalpy, EnthalpyDifference, HumidityRatio, Kind, Power, Quantity,
    RelativeHumidity, Sentence, Share, TemperatureInterval, ThermodynamicTemperature, difference,
};

use crate::check::{About, Check, Group};
use crate::drawn::{Cell, Curve, Line, LineKind, Table};
use crate::flow_block::FlowBlock;
use crate::form::{Mark, ReadingItem, Section, Shape};
use crate::given::Given;
use crate::outcome::{Caution, Figure, Missing, Note, Outcome, Role, StatePoint, Step};
use crate::pressure;
use crate::refusal::{Refusal, Stop, both};
use crate::split::split;
use crate::state_block::{Point, Read};

/// The check.
pub struct Economizer;

const ABOUT: About = About {
    id: "economizer",
    label: "More outdoor air or less",
    question: "Would more outdoor air spare the coil now?",
    takes: "return and outdoor air, the supply flow, what the coil is set to",
    group: Group::Air,
};

const RETURN: Point<'static> = Point { prefix: "return", name: "return" };
const OUTDOOR: Point<'static> = Point { prefix: "outdoor", name: "outdoor" };
const FLOW: FlowBlock<'static> = FlowBlock {
    prefix: "flow",
    places: &[("actual_return", "Actual, at the return’s state")],
    plane: false,
};
const LEAST: &str = "damper.least";
const LIMIT: &str = "damper.limit";
const COIL_T: &str = "coil.leaving";
const COIL_RH: &str = "coil.leaving_humidity";
const RESULTS: &str = "The coil’s load";
/// Air leaves a wet coil nearly saturated (common practice).
const ASSUMED_RH: f64 = 0.95;
/// Steps of the curve.
const STEPS: u32 = 200;
/// Mixed air below this freezes coils, K.
const FREEZES_K: f64 = 275.15;

const CAUTIONS: &[Caution] = &[
    Caution {
        title: "Freezing",
        says: "More outdoor air in cold weather can freeze a coil. Freeze protection must see the coldest spot; never force \
               dampers without someone watching the coil.",
    },
    Caution {
        title: "Building pressure",
        says: "All outdoor air needs a way out: relief and building pressure are not part of this. Local rules, the maker’s \
               instructions and licensed people come first.",
    },
];

/// What is held fixed while the damper moves.
#[derive(Debug, Clone)]
pub struct Plant {
    /// Return air.
    pub back: MoistAir,
    /// Outdoor air.
    pub outdoor: MoistAir,
    /// Dry air supplied.
    pub dry_air: DryAirFlow,
    /// What the coil cools to.
    pub coil: ThermodynamicTemperature,
    /// Humidity ratio of the air that leaves it while it is wet.
    pub wet: HumidityRatio,
}

/// The coil's load at one share of outdoor air.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Load {
    /// Air before the coil.
    pub mixed: MoistAir,
    /// Heat that the coil takes.
    pub total: Power,
    /// Of it by drying.
    pub latent: Power,
}

impl Plant {
    /// The load at a share of outdoor air, 0 to 1.
    ///
    /// # Errors
    ///
    /// What the properties refuse of the mixture.
    pub fn load(&self, share: Share) -> Result<Load, dewledger_properties::AirError> {
        let mix = |of: fn(&MoistAir) -> f64| {
            of(&self.back) + share.si() * (of(&self.outdoor) - of(&self.back))
        };
        let (h, w) = (mix(|air| air.enthalpy().si()), mix(|air| air.humidity_ratio().si()));
        let p = self.back.pressure();
        let mixed = settle(Enthalpy::from_si(h), HumidityRatio::from_si(w), p)?.air;
        if mixed.dry_bulb().si() <= self.coil.si() {
            return Ok(Load { mixed, total: Power::from_si(0.0), latent: Power::from_si(0.0) });
        }
        let leaving =
            MoistAir::unchecked(self.coil, HumidityRatio::from_si(w.min(self.wet.si())), p);
        let m = self.dry_air.si();
        Ok(Load {
            mixed,
            total: Power::from_si(m * (h - leaving.enthalpy().si())),
            latent: Power::from_si(-m * split(&mixed, &leaving).latent.si()),
        })
    }

    /// The share at which the mixed air is what the coil would cool to; none where no share from `least` on is.
    #[must_use]
    pub fn free(&self, least: Share) -> Option<Share> {
        let off = |share: f64| {
            self.load(Share::from_si(share))
                .ok()
                .map(|load| load.mixed.dry_bulb().si() - self.coil.si())
        };
        let (mut low, mut high) = (least.si(), 1.0);
        if off(low)? <= 0.0 || off(high)? > 0.0 {
            return None;
        }
        for _ in 0..60 {
            let middle = 0.5 * (low + high);
            if off(middle)? > 0.0 {
                low = middle;
            } else {
                high = middle;
            }
        }
        Some(Share::from_si(0.5 * (low + high)))
    }
}

impl Check for Economizer {
    fn about(&self) -> &'static About {
        &ABOUT
    }

    fn form(&self, given: &Given) -> Vec<Section> {
        vec![
            pressure::section(given),
            Section::new("return", "Return air", RETURN.items(given))
                .marked(Mark { letter: 'R', shape: Shape::Diamond }),
            Section::new("outdoor", "Outdoor air", OUTDOOR.items(given))
                .marked(Mark { letter: 'O', shape: Shape::Circle })
                .beside("at the intake, not on the roof"),
            Section::new("flow", "Supply flow", FLOW.items(given, true)),
            Section::new(
                "damper",
                "The damper",
                vec![
                    ReadingItem::wanted(LEAST, "Least share of outdoor air", Kind::Share)
                        .help("By mass; what ventilation asks for")
                        .into(),
                    ReadingItem::optional(LIMIT, "Dry-bulb limit of its rule", Kind::Temperature)
                        .help("Blank is the return’s dry bulb")
                        .covered()
                        .into(),
                ],
            ),
            Section::new(
                "coil",
                "The coil",
                vec![
                    ReadingItem::wanted(COIL_T, "It cools to", Kind::Temperature).into(),
                    ReadingItem::optional(COIL_RH, "Humidity as it leaves", Kind::RelativeHumidity)
                        .assuming(RelativeHumidity::from_si(ASSUMED_RH).amount())
                        .covered()
                        .into(),
                ],
            ),
        ]
    }

    fn solve(&self, given: &Given) -> Result<Outcome, Stop> {
        let (here, (back, outdoor)) = pressure::with(given, |here| {
            both(RETURN.read(given, here), OUTDOOR.read(given, here))
        })?;
        let flow = FLOW.read(given, here.pressure, &[("actual_return", &back.air)])?;
        let (plant, least) = plant(
            given,
            &back,
            &outdoor,
            flow.as_ref().ok().map(|flow| flow.dry_air),
            flow.as_ref().err(),
        )?;
        let mut outcome = Outcome { cautions: CAUTIONS, ..Outcome::default() };
        if let Ok(flow) = flow {
            outcome.steps.push(flow.step);
        }
        results(given, &plant, least, &mut outcome).map_err(|error| {
            Stop::from(Refusal::new(
                OUTDOOR.key("dry_bulb"),
                "mixture_out_of_range",
                Sentence::new("The mixed air is outside what moist air is worked out for ({w0}).")
                    .word(error.to_string()),
            ))
        })?;
        outcome.notes.extend(here.notes);
        finish(back, outdoor, &mut outcome);
        outcome.pressure =
            Some(Sentence::new("{0}, {s0}").with(here.pressure.amount()).nested(here.source));
        Ok(outcome)
    }
}

/// What is held fixed, and the least share.
fn plant(
    given: &Given,
    back: &Read,
    outdoor: &Read,
    dry_air: Option<DryAirFlow>,
    flow_missing: Option<&Missing>,
) -> Result<(Plant, Share), Stop> {
    let least: Option<Share> = given.quantity(LEAST);
    let coil: Option<ThermodynamicTemperature> = given.quantity(COIL_T);
    let mut missing: Vec<Missing> = flow_missing.cloned().into_iter().collect();
    if least.is_none() {
        missing.push(Missing::new(LEAST, "the least share of outdoor air"));
    }
    if coil.is_none() {
        missing.push(Missing::new(COIL_T, "what the coil cools to"));
    }
    let (Some(least), Some(coil), Some(dry_air)) = (least, coil, dry_air) else {
        return Err(Stop::Waits(missing));
    };
    if !(0.05..=1.0).contains(&least.si()) && !given.is_drawn() {
        return Err(Refusal::new(
            LEAST,
            "share_out_of_range",
            Sentence::new(
                "A least share of {0} is outside 5 to 100 %. Check the number and its unit.",
            )
            .with(least.amount()),
        )
        .into());
    }
    if coil.si() >= back.air.dry_bulb().si() {
        return Err(Refusal::new(
            COIL_T,
            "coil_not_cooler",
            Sentence::new("A coil that cools to {0} cools nothing: the return is at {1}.")
                .with(coil.amount())
                .with(back.air.dry_bulb().amount()),
        )
        .into());
    }
    let rh: RelativeHumidity =
        given.quantity(COIL_RH).unwrap_or_else(|| RelativeHumidity::from_si(ASSUMED_RH));
    if !(0.85..=1.0).contains(&rh.si()) && !given.is_drawn() {
        return Err(Refusal::new(
            COIL_RH,
            "leaving_humidity_out_of_range",
            Sentence::new("Air leaves a wet coil at 85 to 100 %, not at {0}.").with(rh.amount()),
        )
        .into());
    }
    let wet = MoistAir::new(coil, Humidity::RelativeHumidity(rh), back.air.pressure()).map_err(
        |error| {
            Refusal::new(
                COIL_T,
                "coil_out_of_range",
                Sentence::new("Air of {0} is outside what moist air is worked out for ({w0}).")
                    .with(coil.amount())
                    .word(error.to_string()),
            )
        },
    )?;
    let plant =
        Plant { back: back.air, outdoor: outdoor.air, dry_air, coil, wet: wet.humidity_ratio() };
    Ok((plant, least))
}

fn results(
    given: &Given,
    plant: &Plant,
    least: Share,
    outcome: &mut Outcome,
) -> Result<(), dewledger_properties::AirError> {
    let full = Share::from_si(1.0);
    let free = plant.free(least);
    let open = free.unwrap_or(full);
    let (closed_load, open_load) = (plant.load(least)?, plant.load(open)?);
    let saving = Power::from_si(closed_load.total.si() - open_load.total.si());
    let figure = |key, label, amount| Figure::new(key, label, amount, RESULTS);
    outcome.push(
        figure("saving", "More outdoor air would save", saving.amount())
            .signed("More outdoor air would save", "More outdoor air would cost")
            .role(Role::Headline),
    );
    outcome.push(
        figure("load_least", "At the least share", closed_load.total.amount()).role(Role::Minor),
    );
    outcome.push(
        figure("load_open", "With more outdoor air", open_load.total.amount()).role(Role::Minor),
    );
    outcome.push(figure("open_share", "That share of outdoor air", open.amount()));
    outcome.push(figure("latent_least", "Latent, at the least share", closed_load.latent.amount()));
    outcome.push(figure("latent_open", "Latent, with more outdoor air", open_load.latent.amount()));
    let delta_t = difference(plant.outdoor.dry_bulb(), plant.back.dry_bulb());
    let delta_h =
        EnthalpyDifference::from_si(plant.outdoor.enthalpy().si() - plant.back.enthalpy().si());
    outcome.push(
        figure("delta_t", "Outdoor less return, dry bulb", delta_t.amount()).role(Role::Detail),
    );
    outcome.push(
        figure("delta_h", "Outdoor less return, enthalpy", delta_h.amount()).role(Role::Detail),
    );
    outcome.tables.push(rules(given, plant, saving, free, delta_h));
    if !given.is_moved() {
        outcome.curves.push(curve(plant, least, open)?);
    }
    outcome.steps.push(Step::new(
        "Load of the coil",
        "m (h_M - h(t_c, W_l)),  W_l = min(W_M, W_c)",
        Sentence::new("share {0}: mixed {1}, {2}; share {3}: mixed {4}, {5}")
            .with(least.amount())
            .with(closed_load.mixed.dry_bulb().amount())
            .with(closed_load.total.amount())
            .with(open.amount())
            .with(open_load.mixed.dry_bulb().amount())
            .with(open_load.total.amount()),
        "mixed by dry air; a coil with nothing to dry pays for temperature alone",
    ));
    outcome.lines.push(Line { from: plant.back, to: plant.outdoor, kind: LineKind::Mixing });
    outcome.states.push(StatePoint {
        key: "mixed".into(),
        label: "Mixed, at the least share".into(),
        mark: Some(Mark::MIXED),
        air: closed_load.mixed,
    });
    judge(plant, saving, &open_load, outcome);
    Ok(())
}

/// What each rule says, side by side.
fn rules(
    given: &Given,
    plant: &Plant,
    saving: Power,
    free: Option<Share>,
    delta_h: EnthalpyDifference,
) -> Table {
    let words = |text: &'static str| Cell::Words(Sentence::new(text));
    let (open, closed, close) = ("open", "at its least", "too close to tell");
    // Half of what the floor is, twice the standard uncertainty of the difference: its 95 % half-width.
    let told = |key: &str, value: f64| value.abs() > given.floor(key, 0.0);
    let limit: Option<ThermodynamicTemperature> = given.quantity(LIMIT);
    let limit_t = limit.unwrap_or_else(|| plant.back.dry_bulb());
    let cooler = TemperatureInterval::from_si(plant.outdoor.dry_bulb().si() - limit_t.si());
    let by_dry_bulb = if limit.is_none() && !told("delta_t", cooler.si()) {
        close
    } else if cooler.si() < 0.0 {
        open
    } else {
        closed
    };
    let by_enthalpy = if !told("delta_h", delta_h.si()) {
        close
    } else if delta_h.si() < 0.0 {
        open
    } else {
        closed
    };
    let by_load = if !told("saving", saving.si()) {
        words(close)
    } else if saving.si() <= 0.0 {
        words(closed)
    } else if let Some(share) = free {
        Cell::Words(Sentence::new("open to {0}").with(share.amount()))
    } else {
        words(open)
    };
    let row = |name: &'static str, looks: Cell, says: Cell| vec![words(name), looks, says];
    Table {
        title: "What each rule says".into(),
        columns: vec!["Rule".into(), "Looks at".into(), "The damper should be".into()],
        rows: vec![
            row("Dry bulb", Cell::Amount(cooler.amount()), words(by_dry_bulb)),
            row("Enthalpy", Cell::Amount(delta_h.amount()), words(by_enthalpy)),
            row("The load itself", Cell::Amount(saving.amount()), by_load),
        ],
    }
}

fn curve(
    plant: &Plant,
    least: Share,
    open: Share,
) -> Result<Curve, dewledger_properties::AirError> {
    let mut points = Vec::with_capacity(STEPS as usize + 1);
    for step in 0..=STEPS {
        let share = Share::from_si(f64::from(step) / f64::from(STEPS));
        points.push((share.amount(), plant.load(share)?.total.amount()));
    }
    let mark = |name: &'static str, share: Share| -> Result<_, dewledger_properties::AirError> {
        Ok((name.into(), share.amount(), plant.load(share)?.total.amount()))
    };
    Ok(Curve {
        title: "Load over the share of outdoor air".into(),
        across: "Share of outdoor air".into(),
        up: "Load of the coil".into(),
        points,
        marks: vec![mark("least", least)?, mark("open", open)?],
    })
}

fn judge(plant: &Plant, saving: Power, open: &Load, outcome: &mut Outcome) {
    let cooler = plant.outdoor.dry_bulb().si() < plant.back.dry_bulb().si();
    let leaner = plant.outdoor.enthalpy().si() < plant.back.enthalpy().si();
    if cooler && saving.si() < 0.0 {
        outcome.notes.push(
            Note::unusual(
                "humid_and_cool",
                OUTDOOR.key("dry_bulb"),
                Sentence::new(
                    "Outdoor air is cooler than the return and yet asks more of the coil.",
                ),
            )
            .because(Sentence::new(
                "It is humid: a dry-bulb rule would open here and cost drying.",
            )),
        );
    }
    if leaner && !cooler && saving.si() < 0.0 {
        outcome.notes.push(
            Note::unusual(
                "hot_and_dry",
                OUTDOOR.key("dry_bulb"),
                Sentence::new("Outdoor air has less enthalpy than the return and yet asks more of the coil."),
            )
            .because(Sentence::new("A coil that need not dry pays for temperature alone: an enthalpy rule would open here.")),
        );
    }
    if open.mixed.dry_bulb().si() < FREEZES_K {
        outcome.notes.push(
            Note::unusual(
                "mixed_near_freezing",
                OUTDOOR.key("dry_bulb"),
                Sentence::new("So much outdoor air would bring the mixed air to {0}.")
                    .with(open.mixed.dry_bulb().amount()),
            )
            .because(Sentence::new(
                "Mixed air comes in layers: a coil can freeze at a mean well above that.",
            )),
        );
    }
    outcome.notes.push(Note::remark(
        "two_humidities",
        Sentence::new("An enthalpy rule needs two humidity probes; each ± 3 % RH is ± 1.5 kJ/kg."),
    ));
}

fn finish(back: Read, outdoor: Read, outcome: &mut Outcome) {
    for (point, label, mark, read) in [
        (RETURN, "Return air", Mark { letter: 'R', shape: Shape::Diamond }, back),
        (OUTDOOR, "Outdoor air", Mark { letter: 'O', shape: Shape::Circle }, outdoor),
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
