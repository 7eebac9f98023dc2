//! Surface condensation: will this surface sweat, and how thick must its insulation be?
//!
//! Flat: `q = (T_a - T_i) / (1/h_o + d/k + 1/h_i)`, `T_s = T_a - q/h_o`. Pipe of radius `r1` under `d`: `r2 = r1 + d`,
//! `q' = (T_a - T_i) / (ln(r2/r1)/(2 pi k) + 1/(2 pi r2 h_o))`, `T_s = T_a - q'/(2 pi r2 h_o)`; the liquid's own film
//! is left out. Margin: surface less dew point (frost point below 0 °C). Thinnest insulation for a margin: flat
//! `d = k ((T_a - T_i)/(h_o (T_a - T_n)) - 1/h_o - 1/h_i)`, pipe `r2 ln(r2/r1) = (k/h_o) (T_n - T_i)/(T_a - T_n)`, one
//! root. Steady conduction (Fourier's law); the method is that of ISO 12241 (from memory), its film coefficients
//! replaced by one that is typed or assumed: a low one is the unfavourable side, so a sweep stands beside it.

use std::collections::BTreeMap;

use dewledger_properties::{Humidity, MoistAir, saturation_humidity_ratio};
use dewledger_quantities::{
    HeatFluxDensity, HeatTransfer, Kind, Length, LinearPowerDensity, Quantity, RelativeHumidity,
    Sentence, TemperatureInterval, ThermalConductivity, ThermodynamicTemperature, difference,
};

use crate::check::{About, Check, Group};
use crate::doubt::Doubt;
use crate::drawn::{Cell, Table};
use crate::form::{Choice, ChoiceItem, Item, Mark, ReadingItem, Section};
use crate::given::Given;
use crate::outcome::{Caution, Figure, Missing, Note, Outcome, Role, StatePoint, Step};
use crate::pressure;
use crate::refusal::{Refusal, Stop};
use crate::state_block::{Point, Read};

/// The check.
pub struct Surface;

const ABOUT: About = About {
    id: "surface",
    label: "Surface condensation",
    question: "Will this surface sweat, and what insulation would keep it dry?",
    takes: "the air around it, and the surface or its construction",
    group: Group::Air,
};

const AIR: Point<'static> = Point { prefix: "air", name: "surrounding" };
const BY: &str = "surface.by";
const READ: &str = "surface.temperature";
const INSIDE: &str = "construction.inside";
const DIAMETER: &str = "construction.diameter";
const THICKNESS: &str = "construction.thickness";
const CONDUCTIVITY: &str = "construction.conductivity";
const FILM_OUTSIDE: &str = "construction.film_outside";
const FILM_INSIDE: &str = "construction.film_inside";
const WANTED: &str = "margin.wanted";
const RESULTS: &str = "The surface";
const DRY: &str = "Keeping it dry";

/// Film coefficient outside where none is typed, W/(m² K): between a dull jacket and a galvanised one.
const ASSUMED_OUTSIDE: f64 = 7.0;
/// Film coefficient of moving air inside a duct where none is typed, W/(m² K).
const ASSUMED_INSIDE: f64 = 25.0;
/// The sweep that stands beside it, W/(m² K).
const SWEEP: [f64; 6] = [5.0, 6.0, 7.0, 8.0, 9.0, 10.0];
/// Margin that is asked for where none is typed, K (field practice).
const ASSUMED_MARGIN: f64 = 1.0;
/// No pipe's insulation is thicker, m.
const LARGEST_RADIUS_M: f64 = 1.0;

const CAUTIONS: &[Caution] = &[Caution {
    title: "At pipes and ducts",
    says: "Work at height, hot and cold surfaces, moving parts: isolate before you touch. Old insulation may hold \
           asbestos: leave it alone. Wet insulation and standing water near live parts are for a qualified person. \
           Local rules, the maker’s instructions and licensed people come first.",
}];

/// What lies between the inside and the air.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Shape {
    /// A flat wall, with the film inside it.
    Flat {
        /// Film coefficient inside.
        inside: HeatTransfer,
    },
    /// A pipe of this outer radius, its liquid without a film.
    Pipe {
        /// Radius under the insulation.
        radius: Length,
    },
}

/// A construction, typed.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Construction {
    /// Flat or pipe.
    pub shape: Shape,
    /// What is inside.
    pub inside: ThermodynamicTemperature,
    /// Thickness of the insulation.
    pub thickness: Length,
    /// Its conductivity at its mean temperature.
    pub conductivity: ThermalConductivity,
    /// Film coefficient outside, convection and radiation together.
    pub film_outside: HeatTransfer,
}

/// Heat that goes in.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Gain {
    /// Per area of a flat wall.
    PerArea(HeatFluxDensity),
    /// Per length of a pipe.
    PerLength(LinearPowerDensity),
}

impl Construction {
    /// Surface temperature and heat gain in air of this temperature.
    #[must_use]
    pub fn surface(&self, air: ThermodynamicTemperature) -> (ThermodynamicTemperature, Gain) {
        let over = air.si() - self.inside.si();
        let (film, d, k) = (self.film_outside.si(), self.thickness.si(), self.conductivity.si());
        match self.shape {
            Shape::Flat { inside } => {
                let flux = over / (1.0 / film + d / k + 1.0 / inside.si());
                let surface = ThermodynamicTemperature::from_si(air.si() - flux / film);
                (surface, Gain::PerArea(HeatFluxDensity::from_si(flux)))
            }
            Shape::Pipe { radius } => {
                let (r1, r2) = (radius.si(), radius.si() + d);
                let round = std::f64::consts::TAU;
                let per_length = over / ((r2 / r1).ln() / (round * k) + 1.0 / (round * r2 * film));
                let surface =
                    ThermodynamicTemperature::from_si(air.si() - per_length / (round * r2 * film));
                (surface, Gain::PerLength(LinearPowerDensity::from_si(per_length)))
            }
        }
    }

    /// The thinnest insulation that brings the surface to `wanted`; none where none reaches it. Zero where it needs none.
    #[must_use]
    pub fn thinnest(
        &self,
        air: ThermodynamicTemperature,
        wanted: ThermodynamicTemperature,
    ) -> Option<Length> {
        let (film, k) = (self.film_outside.si(), self.conductivity.si());
        let left = air.si() - wanted.si();
        if left <= 0.0 {
            return None;
        }
        match self.shape {
            Shape::Flat { inside } => {
                let over = air.si() - self.inside.si();
                let d = k * (over / (film * left) - 1.0 / film - 1.0 / inside.si());
                Some(Length::from_si(d.max(0.0)))
            }
            Shape::Pipe { radius } => {
                let asked = k / film * (wanted.si() - self.inside.si()) / left;
                if asked <= 0.0 {
                    return Some(Length::from_si(0.0));
                }
                let r1 = radius.si();
                // r ln(r/r1) rises from zero and bends upward: Newton from above goes down to its one root.
                let mut r2 = r1 + asked.max(r1);
                for _ in 0..60 {
                    let step = (r2 * (r2 / r1).ln() - asked) / ((r2 / r1).ln() + 1.0);
                    r2 -= step;
                    if step.abs() < 1e-12 {
                        break;
                    }
                }
                (r2 <= LARGEST_RADIUS_M).then(|| Length::from_si(r2 - r1))
            }
        }
    }
}

fn by(given: &Given) -> &str {
    given.choice_or(BY, "read")
}

fn is_pipe(given: &Given) -> bool {
    by(given) == "pipe"
}

impl Check for Surface {
    fn about(&self) -> &'static About {
        &ABOUT
    }

    fn form(&self, given: &Given) -> Vec<Section> {
        let mut surface: Vec<Item> = vec![
            ChoiceItem::new(
                BY,
                "The surface is",
                Some("read"),
                vec![
                    Choice::helped("read", "Read", "By a contact probe; bare metal fools infrared"),
                    Choice::helped("flat", "Worked out, flat", "A duct or a wall with insulation"),
                    Choice::helped("pipe", "Worked out, pipe", "A pipe with insulation"),
                ],
            )
            .into(),
        ];
        if by(given) == "read" {
            surface
                .push(ReadingItem::wanted(READ, "Surface temperature", Kind::Temperature).into());
        }
        let mut sections = vec![
            pressure::section(given),
            Section::new("air", "Surrounding air", AIR.items(given))
                .marked(Mark::ENTERING)
                .beside("close to the surface"),
            Section::new("surface", "The surface", surface),
        ];
        if by(given) != "read" {
            sections.push(Section::new("construction", "Construction", construction(given)));
        }
        sections.push(
            Section::new(
                "margin",
                "Margin",
                vec![
                    ReadingItem::optional(
                        WANTED,
                        "Wanted above the dew point",
                        Kind::TemperatureDifference,
                    )
                    .assuming(TemperatureInterval::from_si(ASSUMED_MARGIN).amount())
                    .covered()
                    .into(),
                ],
            )
            .seldom(),
        );
        sections
    }

    fn solve(&self, given: &Given) -> Result<Outcome, Stop> {
        let (here, read) = pressure::with(given, |here| AIR.read(given, here))?;
        let dew_point = dew_or_frost(&read)?;
        let mut outcome = Outcome { cautions: CAUTIONS, ..Outcome::default() };
        let wanted = wanted(given)?;
        if by(given) == "read" {
            let surface = read_surface(given)?;
            margin(&read.air, surface, dew_point, &mut outcome);
        } else {
            let construction = read_construction(given)?;
            by_construction(&read, &construction, dew_point, wanted, &mut outcome)?;
        }
        judge(&read.air, &mut outcome);
        outcome.notes.extend(here.notes);
        outcome.notes.extend(read.notes);
        if read.saturated {
            outcome.saturated.push("air".to_owned());
        }
        outcome.states.push(StatePoint {
            key: "air".into(),
            label: "Surrounding air".into(),
            mark: Some(Mark::ENTERING),
            air: read.air,
        });
        outcome.pressure =
            Some(Sentence::new("{0}, {s0}").with(here.pressure.amount()).nested(here.source));
        Ok(outcome)
    }

    fn judge(&self, _: &Given, outcome: &Outcome, doubts: &BTreeMap<String, Doubt>) -> Vec<Note> {
        let (Some(margin), Some(doubt)) = (outcome.amount("margin"), doubts.get("margin")) else {
            return Vec::new();
        };
        let Some(half_width) = doubt.half_width_si else { return Vec::new() };
        if margin.si().abs() >= half_width {
            return Vec::new();
        }
        let lead = Sentence::new("Whether it sweats cannot be told: the margin is {0} ± {1}.")
            .with(margin)
            .with(TemperatureInterval::from_si(half_width).amount());
        vec![Note::unusual("margin_within_doubt", AIR.key("dry_bulb"), lead)]
    }
}

fn construction(given: &Given) -> Vec<Item> {
    let mut items: Vec<Item> = Vec::new();
    if is_pipe(given) {
        items.push(
            ReadingItem::wanted(INSIDE, "Temperature of the liquid", Kind::Temperature).into(),
        );
        items.push(
            ReadingItem::wanted(DIAMETER, "Outer diameter of the pipe", Kind::Length)
                .help("Without the insulation")
                .into(),
        );
    } else {
        items.push(ReadingItem::wanted(INSIDE, "Temperature inside", Kind::Temperature).into());
    }
    items.push(ReadingItem::wanted(THICKNESS, "Thickness of the insulation", Kind::Length).into());
    items.push(
        ReadingItem::wanted(CONDUCTIVITY, "Its conductivity", Kind::ThermalConductivity)
            .help("From its maker, at its mean temperature; wet it conducts far more")
            .into(),
    );
    items.push(
        ReadingItem::optional(FILM_OUTSIDE, "Film coefficient outside", Kind::FilmCoefficient)
            .assuming(HeatTransfer::from_si(ASSUMED_OUTSIDE).amount())
            .help("Still air indoors, W/(m²·K): 8 to 10 dull, 5 to 6 galvanised, 3 to 4 bright aluminium")
            .covered()
            .into(),
    );
    if !is_pipe(given) {
        items.push(
            ReadingItem::optional(FILM_INSIDE, "Film coefficient inside", Kind::FilmCoefficient)
                .assuming(HeatTransfer::from_si(ASSUMED_INSIDE).amount())
                .covered()
                .into(),
        );
    }
    items
}

/// Dew point; below 0 °C the frost point, because that is what the surface shows first.
fn dew_or_frost(read: &Read) -> Result<ThermodynamicTemperature, Stop> {
    read.air.frost_point().map_err(|_| {
        Refusal::new(
            AIR.key(read.by),
            "too_dry_for_a_dew_point",
            Sentence::new(
                "This air is too dry for a dew point to be worked out: no surface sweats in it.",
            ),
        )
        .into()
    })
}

fn read_surface(given: &Given) -> Result<ThermodynamicTemperature, Stop> {
    let surface: ThermodynamicTemperature =
        given.quantity(READ).ok_or_else(|| Stop::waits(READ, "the surface temperature"))?;
    within(surface.si(), 233.15..=363.15).then_some(surface).ok_or_else(|| {
        Refusal::new(
            READ,
            "surface_out_of_range",
            Sentence::new("A surface of {0} is outside −40 to 90 °C (−40 to 194 °F). Check the number and its unit.")
                .with(surface.amount()),
        )
        .into()
    })
}

fn wanted(given: &Given) -> Result<TemperatureInterval, Stop> {
    let wanted: TemperatureInterval =
        given.quantity(WANTED).unwrap_or_else(|| TemperatureInterval::from_si(ASSUMED_MARGIN));
    within(wanted.si(), 0.0..=10.0).then_some(wanted).ok_or_else(|| {
        Refusal::new(
            WANTED,
            "margin_out_of_range",
            Sentence::new("A margin of {0} is outside 0 to 10 K. Check the number and its unit.")
                .with(wanted.amount()),
        )
        .into()
    })
}

fn within(value: f64, range: std::ops::RangeInclusive<f64>) -> bool {
    range.contains(&value)
}

/// A part of the construction: read, in its range.
fn part<Q: Quantity>(
    given: &Given,
    key: &'static str,
    name: &'static str,
    range: std::ops::RangeInclusive<f64>,
    says: &'static str,
) -> Result<Q, Stop> {
    let value: Q = given.quantity(key).ok_or_else(|| Stop::waits(key, name))?;
    if within(value.si(), range) {
        return Ok(value);
    }
    Err(Refusal::new(key, "construction_out_of_range", Sentence::new(says).with(value.amount()))
        .into())
}

/// A constant of the method: typed, or assumed and said.
fn film(given: &Given, key: &'static str, assumed: f64, most: f64) -> Result<HeatTransfer, Stop> {
    let film: HeatTransfer = given.quantity(key).unwrap_or_else(|| HeatTransfer::from_si(assumed));
    if film.si() >= 2.0 && film.si() <= most {
        return Ok(film);
    }
    Err(Refusal::new(
        key,
        "film_out_of_range",
        Sentence::new("A film coefficient of {0} is beyond any surface of this kind. Check the number and its unit.")
            .with(film.amount()),
    )
    .into())
}

fn read_construction(given: &Given) -> Result<Construction, Stop> {
    let missing: Vec<Missing> = [
        (INSIDE, "the temperature inside"),
        (DIAMETER, "the pipe’s diameter"),
        (THICKNESS, "the thickness of the insulation"),
        (CONDUCTIVITY, "its conductivity"),
    ]
    .into_iter()
    .filter(|(key, _)| (*key != DIAMETER || is_pipe(given)) && given.reading(key).is_none())
    .map(|(key, name)| Missing::new(key, name))
    .collect();
    if !missing.is_empty() {
        return Err(Stop::Waits(missing));
    }
    let inside = part(
        given,
        INSIDE,
        "the temperature inside",
        213.15..=363.15,
        "A temperature inside of {0} is outside −60 to 90 °C (−76 to 194 °F). Check the number and its unit.",
    )?;
    let shape = if is_pipe(given) {
        let diameter: Length = part(
            given,
            DIAMETER,
            "the pipe’s diameter",
            0.005..=2.0,
            "A pipe of {0} is outside 5 mm to 2 m. Check the number and its unit.",
        )?;
        Shape::Pipe { radius: diameter / 2.0 }
    } else {
        Shape::Flat { inside: film(given, FILM_INSIDE, ASSUMED_INSIDE, 5000.0)? }
    };
    Ok(Construction {
        shape,
        inside,
        thickness: part(
            given,
            THICKNESS,
            "the thickness of the insulation",
            0.001..=0.5,
            "An insulation of {0} is outside 1 to 500 mm. Check the number and its unit.",
        )?,
        conductivity: part(
            given,
            CONDUCTIVITY,
            "its conductivity",
            0.01..=2.0,
            "A conductivity of {0} is outside 0.01 to 2 W/(m·K): no insulation is that. Check the number and its unit.",
        )?,
        film_outside: film(given, FILM_OUTSIDE, ASSUMED_OUTSIDE, 50.0)?,
    })
}

/// Margin, dew point and the most humid air that would leave the surface dry.
fn margin(
    air: &MoistAir,
    surface: ThermodynamicTemperature,
    dew_point: ThermodynamicTemperature,
    outcome: &mut Outcome,
) {
    let margin = difference(surface, dew_point);
    outcome.push(
        Figure::new("margin", "Surface above the dew point", margin.amount(), RESULTS)
            .signed("Surface above the dew point", "Surface below the dew point: it sweats")
            .role(Role::Headline),
    );
    let name = if dew_point.si() < 273.16 { "Frost point" } else { "Dew point" };
    outcome.push(Figure::new("dew_point", name, dew_point.amount(), RESULTS).role(Role::Minor));
    outcome.push(Figure::new("surface", "Surface", surface.amount(), RESULTS).role(Role::Minor));
    let most = most_humid(air, surface);
    if let Some(most) = most {
        outcome.push(Figure::new(
            "largest_humidity",
            "Most humid air that leaves it dry",
            most.amount(),
            DRY,
        ));
    }
    outcome.steps.push(Step::new(
        "Margin",
        "t_s - t_dp",
        Sentence::new("{0} − {1} = {2}")
            .with(surface.amount())
            .with(dew_point.amount())
            .with(margin.amount()),
        "dew point of the surrounding air, real gas; frost point below 0 °C",
    ));
}

/// Relative humidity at the air's dry bulb of air whose dew point is the surface.
fn most_humid(air: &MoistAir, surface: ThermodynamicTemperature) -> Option<RelativeHumidity> {
    if surface.si() >= air.dry_bulb().si() {
        return Some(RelativeHumidity::from_si(1.0));
    }
    let w = saturation_humidity_ratio(surface, air.pressure()).ok()?;
    let then = MoistAir::new(air.dry_bulb(), Humidity::HumidityRatio(w), air.pressure()).ok()?;
    Some(then.relative_humidity())
}

fn by_construction(
    read: &Read,
    construction: &Construction,
    dew_point: ThermodynamicTemperature,
    wanted: TemperatureInterval,
    outcome: &mut Outcome,
) -> Result<(), Stop> {
    let air = &read.air;
    if construction.inside.si() > air.dry_bulb().si() {
        return Err(Refusal::new(
            INSIDE,
            "inside_warmer",
            Sentence::new("Inside it is {0}, warmer than the air around it at {1}: the outside of this surface cannot sweat. Read the surface itself.")
                .with(construction.inside.amount())
                .with(air.dry_bulb().amount()),
        )
        .into());
    }
    let (surface, gain) = construction.surface(air.dry_bulb());
    margin(air, surface, dew_point, outcome);
    match gain {
        Gain::PerArea(flux) => {
            outcome.push(Figure::new(
                "heat_flux",
                "Heat gained through it",
                flux.amount(),
                RESULTS,
            ));
        }
        Gain::PerLength(gain) => {
            outcome.push(Figure::new(
                "heat_gain",
                "Heat gained through it",
                gain.amount(),
                RESULTS,
            ));
        }
    }
    let target = ThermodynamicTemperature::from_si(dew_point.si() + wanted.si());
    if target.si() >= air.dry_bulb().si() {
        let why = Sentence::new("at this humidity no insulation reaches the margin: dry the air");
        outcome.push(Figure::withheld("thinnest", "Thinnest insulation", why, DRY));
    } else if let Some(thinnest) = construction.thinnest(air.dry_bulb(), target) {
        outcome.push(
            Figure::new("thinnest", "Thinnest insulation", thinnest.amount(), DRY).on_condition(
                Sentence::new("for a surface {0} above the dew point, film {1}")
                    .with(wanted.amount())
                    .with(construction.film_outside.amount()),
            ),
        );
    } else {
        let why = Sentence::new("it would be thicker than a metre: dry the air");
        outcome.push(Figure::withheld("thinnest", "Thinnest insulation", why, DRY));
    }
    outcome.tables.push(sweep(air, construction, dew_point, target));
    outcome.steps.insert(0, working(air, construction, surface));
    Ok(())
}

/// Surface and margin over the film coefficients that it may have.
fn sweep(
    air: &MoistAir,
    construction: &Construction,
    dew_point: ThermodynamicTemperature,
    target: ThermodynamicTemperature,
) -> Table {
    let row = |film: f64| {
        let film = HeatTransfer::from_si(film);
        let other = Construction { film_outside: film, ..*construction };
        let (surface, _) = other.surface(air.dry_bulb());
        let thinnest = match other.thinnest(air.dry_bulb(), target) {
            Some(thinnest) => Cell::Amount(thinnest.amount()),
            None => Cell::Words(Sentence::new("none reaches it")),
        };
        vec![
            Cell::Amount(film.amount()),
            Cell::Amount(surface.amount()),
            Cell::Amount(difference(surface, dew_point).amount()),
            thinnest,
        ]
    };
    Table {
        title: "If the film outside were another".into(),
        columns: vec!["Film outside".into(), "Surface".into(), "Margin".into(), "Thinnest".into()],
        rows: SWEEP.into_iter().map(row).collect(),
    }
}

fn working(air: &MoistAir, construction: &Construction, surface: ThermodynamicTemperature) -> Step {
    let (formula, source) = match construction.shape {
        Shape::Flat { .. } => (
            "q = (t_a - t_i) / (1/h_o + d/k + 1/h_i),  t_s = t_a - q/h_o",
            "steady conduction through a flat wall",
        ),
        Shape::Pipe { .. } => (
            "q' = (t_a - t_i) / (ln(r2/r1)/(2 pi k) + 1/(2 pi r2 h_o)),  t_s = t_a - q'/(2 pi r2 h_o)",
            "steady conduction through a pipe’s insulation; the liquid’s film is left out",
        ),
    };
    let numbers = Sentence::new("air {0}, inside {1}, d = {2}, k = {3}, h_o = {4}: surface {5}")
        .with(air.dry_bulb().amount())
        .with(construction.inside.amount())
        .with(construction.thickness.amount())
        .with(construction.conductivity.amount())
        .with(construction.film_outside.amount())
        .with(surface.amount());
    Step::new("Surface temperature", formula, numbers, source)
}

fn judge(air: &MoistAir, outcome: &mut Outcome) {
    if air.relative_humidity().si() > 0.85 {
        outcome.notes.push(
            Note::unusual(
                "humid_room",
                AIR.key("dry_bulb"),
                Sentence::new("At {0} two points of humidity move the dew point by 0.4 K.")
                    .with(air.relative_humidity().amount()),
            )
            .because(Sentence::new("Read the dew point itself, or a wet bulb.")),
        );
    }
    outcome.notes.push(
        Note::remark(
            "plain_run",
            Sentence::new("This is the plain run. Joints, hangers, valves and fan plates are colder."),
        )
        .because(Sentence::new(
            "Infrared reads a shiny jacket wrong: tape a dull patch. Under a clear sky a surface is colder than the air.",
        )),
    );
}
