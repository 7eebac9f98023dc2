//! Air flow by traverse: how much air passes this duct?
//!
//! Density of the moist air where it passes, `rho = (1 + W)/v(t, W, p_here + p_static)`; velocities point by point; `V = A mean(v)`,
//! `m = V/v`; standard flow `V rho/rho_std`, counting moist air, as a traverse weighs it. The spread of the points is the
//! profile and no doubt of the flow; the plane's own ± is asked. Source: Bernoulli; positions of ISO 3966 (from memory).

mod duct;
mod grid;

use dewledger_properties::MoistAir;
use dewledger_quantities::{
    AirFlow, DryAirFlow, Kind, MassDensity, PressureDifference, Quantity, Ratio, Sentence, Share,
    StandardAirFlow, Velocity,
};

pub use duct::{Duct, positions};
pub use grid::{from_pressure, from_shown};

use crate::check::{About, Check, Group};
use crate::doubt::{COVERAGE_95, Term};
use crate::form::{Mark, ReadingItem, Section};
use crate::given::{Given, Moved};
use crate::outcome::{Caution, Figure, Note, Outcome, Role, StatePoint, Step, Versus};
use crate::pressure;
use crate::refusal::{Refusal, Stop};
use crate::state_block::Point;
use grid::Grid;

/// The check.
pub struct Traverse;

const ABOUT: About = About {
    id: "traverse",
    label: "Air flow by traverse",
    question: "How much air passes this duct?",
    takes: "velocity pressures or velocities over a duct, its size and its air",
    group: Group::Air,
};

const AIR: Point<'static> = Point { prefix: "duct_air", name: "duct’s" };
const PLANE: &str = "plane.half_width";
const HOODS: &str = "hoods.sum";
const FACTOR: &str = "hoods.factor";
const RESULTS: &str = "Air flow";
const DUCT: &str = "The duct";
const OUTLETS: &str = "Against the outlets";
const PLANE_SHIFT: &str = "the plane";
/// Static pressures of ducts, Pa.
const STATIC_PA: f64 = 5000.0;

const CAUTIONS: &[Caution] = &[
    Caution {
        title: "Holes, ladders and sharp edges",
        says: "Ask before you drill: linings may hold asbestos, and wires or coils lie behind. Eyes covered; a sound ladder; \
               close every hole.",
    },
    Caution {
        title: "Ducts not to be opened",
        says: "Kitchen, laboratory and other exhausts may carry what harms you: no hole without leave of whoever is in charge. \
               Local rules, the maker’s instructions and licensed people come first.",
    },
];

impl Check for Traverse {
    fn about(&self) -> &'static About {
        &ABOUT
    }

    fn form(&self, given: &Given) -> Vec<Section> {
        let mut air = AIR.items(given);
        air.push(AIR.duct_pressure("Static pressure in the duct"));
        let mut sections = vec![
            pressure::section(given),
            Section::new("duct", "The duct", duct::items(given)),
            Section::new("duct_air", "Air in the duct", air).marked(Mark::ENTERING),
        ];
        sections.extend(grid::sections(given, duct::read(given).ok()));
        sections.push(Section::new(
            "plane",
            "The plane",
            vec![
                ReadingItem::optional(PLANE, "± of the plane itself (95 %)", Kind::Share)
                    .help("2 to 3 % for a good plane, 5 to 10 % for a poor one")
                    .covered()
                    .into(),
            ],
        ));
        sections.push(
            Section::new(
                "hoods",
                "Outlets downstream",
                vec![
                    ReadingItem::optional(HOODS, "Sum of their hood readings", Kind::AirFlow)
                        .help("Actual flow")
                        .into(),
                    ReadingItem::optional(FACTOR, "Factor of the hood", Kind::Ratio)
                        .assuming(Ratio::from_si(1.0).amount())
                        .help("Found for these outlets")
                        .covered()
                        .into(),
                ],
            )
            .seldom(),
        );
        sections
    }

    fn solve(&self, given: &Given) -> Result<Outcome, Stop> {
        let read = pressure::with(given, |here| AIR.read(given, here));
        let duct = match (duct::read(given), &read) {
            (Ok(duct), _) => duct,
            (Err(Stop::Waits(mut missing)), Err(Stop::Waits(more))) => {
                missing.extend(more.iter().cloned());
                missing.extend(grid::missing(given, None));
                return Err(Stop::Waits(missing));
            }
            (Err(stop), _) => return Err(stop),
        };
        let mut outcome = Outcome { cautions: CAUTIONS, ..Outcome::default() };
        outcome.tables = duct::tables(given, duct, grid::shape(given, Some(duct)).1);
        let missing = grid::missing(given, Some(duct));
        match read {
            Ok((here, read)) if missing.is_empty() => {
                static_pressure(given)?;
                let density = density(&read.air);
                let grid = grid::read(given, duct, density)?;
                results(given, duct, &read.air, &grid, &mut outcome)?;
                outcome.notes.extend(grid.notes);
                outcome.notes.extend(here.notes);
                outcome.notes.extend(read.notes);
                if read.saturated {
                    outcome.saturated.push(AIR.prefix.to_owned());
                }
                outcome.states.push(StatePoint {
                    key: AIR.prefix.into(),
                    label: "Air in the duct".into(),
                    mark: Some(Mark::ENTERING),
                    air: read.air,
                });
                outcome.pressure = Some(
                    Sentence::new("{0}, {s0}").with(here.pressure.amount()).nested(here.source),
                );
            }
            Ok(_) => outcome.waits.extend(missing),
            Err(Stop::Waits(first)) => {
                outcome.waits.extend(first);
                outcome.waits.extend(missing);
            }
            Err(refused) => return Err(refused),
        }
        outcome.push(Figure::new("area", "Clear area", duct.area().amount(), DUCT));
        outcome.steps.insert(0, duct::step(duct));
        Ok(outcome)
    }

    fn terms(&self, given: &Given) -> Vec<Term> {
        let mut terms = pressure::terms(given);
        if let Some(share) = given.quantity::<Share>(PLANE) {
            let u = share.si().abs() / COVERAGE_95;
            terms.push(Term::worked_out("the plane itself", Moved::WorkedOut(PLANE_SHIFT), u));
        }
        terms
    }
}

/// Density of moist air, kg/m³: what a probe in the stream weighs.
#[must_use]
pub fn density(air: &MoistAir) -> MassDensity {
    MassDensity::from_si((1.0 + air.humidity_ratio().si()) / air.specific_volume().si())
}

/// Mean of the points, m/s. None of no points is 0.
#[must_use]
pub fn mean(velocities: &[Velocity]) -> Velocity {
    #[expect(clippy::cast_precision_loss, reason = "a hundred points at most")]
    let count = velocities.len().max(1) as f64;
    Velocity::from_si(velocities.iter().map(|v| v.si()).sum::<f64>() / count)
}

fn static_pressure(given: &Given) -> Result<(), Stop> {
    let key = AIR.key("duct_pressure");
    let gauge: PressureDifference = given.quantity(&key).unwrap_or_default();
    if gauge.si().abs() <= STATIC_PA {
        return Ok(());
    }
    Err(Refusal::new(
        key,
        "static_out_of_range",
        Sentence::new("A static pressure of {0} is outside ±5 kPa. Check its unit; it is read against the room.")
            .with(gauge.amount()),
    )
    .into())
}

fn results(
    given: &Given,
    duct: Duct,
    air: &MoistAir,
    grid: &Grid,
    outcome: &mut Outcome,
) -> Result<(), Stop> {
    let here = density(air);
    // What the plane itself may be off moves every point alike.
    let velocity =
        Velocity::from_si(mean(&grid.velocities).si() * (1.0 + given.shift(PLANE_SHIFT)));
    if velocity.si() <= 0.0 {
        return Err(Refusal::new(
            "line1.point1",
            "no_flow",
            Sentence::new(
                "All points are still: no air passes here. Is the fan running, is a damper closed?",
            ),
        )
        .into());
    }
    let flow = AirFlow::from_si(duct.area().si() * velocity.si());
    let dry_air = DryAirFlow::from_si(flow.si() / air.specific_volume().si());
    let standard_density = MassDensity::from_si(grid::standard(given));
    let standard = StandardAirFlow::from_si(flow.si() * here.si() / standard_density.si());
    let dry_standard = StandardAirFlow::from_si(dry_air.si() / standard_density.si());
    let figure = |key, label, amount| Figure::new(key, label, amount, RESULTS);
    let condition = |text| Sentence::new(text).with(standard_density.amount());
    outcome.push(figure("flow", "Actual flow", flow.amount()).role(Role::Headline));
    outcome.push(figure("velocity", "Mean velocity", velocity.amount()).role(Role::Minor));
    outcome.push(figure("dry_air", "Dry-air mass flow", dry_air.amount()).role(Role::Minor));
    outcome.push(
        figure("flow_standard", "As standard air", standard.amount())
            .on_condition(condition("Moist air of {0}, as a traverse weighs it")),
    );
    outcome.push(
        figure("flow_standard_dry", "As standard air, dry air counted", dry_standard.amount())
            .on_condition(condition("Dry air of {0}"))
            .role(Role::Detail),
    );
    outcome.push(Figure::new("density", "Density of the air, moist", here.amount(), DUCT));
    working(air, grid, velocity, flow, dry_air, outcome);
    if given.reading(PLANE).is_none() {
        outcome.notes.push(
            Note::remark(
                "plane_uncounted",
                Sentence::new("The plane’s own part is not in the ±: 2 to 3 % where it is good, 5 to 10 % where it is poor."),
            )
            .because(Sentence::new("The spread of the points is the profile, not a doubt.")),
        );
    }
    outlets(given, flow, outcome)
}

fn working(
    air: &MoistAir,
    grid: &Grid,
    velocity: Velocity,
    flow: AirFlow,
    dry_air: DryAirFlow,
    outcome: &mut Outcome,
) {
    let here = density(air);
    outcome.steps.push(Step::new(
        "Density",
        "rho = (1 + W) / v",
        Sentence::new("(1 + {0}) ÷ {1} = {2}, at {3}")
            .with(air.humidity_ratio().amount())
            .with(air.specific_volume().amount())
            .with(here.amount())
            .with(air.pressure().amount()),
        "moist air (real gas) at the pressure in the duct",
    ));
    let count = grid.velocities.len().to_string();
    outcome.steps.push(Step::new(
        "Mean velocity",
        if grid.pressures.is_empty() { "mean(v)" } else { "mean(sqrt(2 C dp / rho))" },
        Sentence::new("of {w0} points: {0}").with(velocity.amount()).word(count),
        "mean of the roots, never the root of the mean",
    ));
    outcome.steps.push(Step::new(
        "Flow",
        "V = A mean(v),  m = V / v",
        Sentence::new("V = {0},  ÷ {1} = {2}")
            .with(flow.amount())
            .with(air.specific_volume().amount())
            .with(dry_air.amount()),
        "actual at the plane",
    ));
    if grid.pressures.is_empty() {
        return;
    }
    #[expect(clippy::cast_precision_loss, reason = "a hundred points at most")]
    let count = grid.pressures.len() as f64;
    let pressure = grid.pressures.iter().map(|dp| dp.si()).sum::<f64>() / count;
    // The probe's coefficient and the plane are in both: their ratio holds the roots alone.
    let roots = grid.pressures.iter().map(|dp| dp.si().sqrt()).sum::<f64>() / count;
    let error = pressure.sqrt() / roots - 1.0;
    outcome.versus.push(Versus {
        figure: "velocity",
        title: Sentence::new("Velocity by the root of the mean pressure"),
        book: Velocity::from_si(velocity.si() * (1.0 + error)).amount(),
        error,
        parts: Vec::new(),
        reason: Sentence::new("The more the points differ, the higher that root lies."),
    });
}

/// The outlets' sum against the traverse: the hood's factor and the leak between, which this cannot tell apart.
fn outlets(given: &Given, flow: AirFlow, outcome: &mut Outcome) -> Result<(), Stop> {
    let Some(sum) = given.quantity::<AirFlow>(HOODS) else { return Ok(()) };
    let factor: Ratio = given.quantity(FACTOR).unwrap_or_else(|| Ratio::from_si(1.0));
    if !(0.7..=1.3).contains(&factor.si()) {
        return Err(Refusal::new(
            FACTOR,
            "factor_out_of_range",
            Sentence::new("A hood’s factor of {0} is outside 0.7 to 1.3. Check the number.")
                .with(factor.amount()),
        )
        .into());
    }
    if sum.si() <= 0.0 {
        return Err(Refusal::new(
            HOODS,
            "no_sum",
            Sentence::new("Outlets that give {0} have nothing to compare. Read them again, or leave it blank.")
                .with(sum.amount()),
        )
        .into());
    }
    let outlets = AirFlow::from_si(factor.si() * sum.si());
    let ratio = Ratio::from_si(flow.si() / outlets.si());
    outcome.push(Figure::new("outlets", "All outlets", outlets.amount(), OUTLETS));
    outcome.push(
        Figure::new("hood_or_leak", "Hood factor or leak", ratio.amount(), OUTLETS)
            .on_condition(Sentence::new("Traverse over outlets: the two cannot be told apart")),
    );
    Ok(())
}
