//! Book constants here: what 1.08, 4.5 and 4840 are at this site and these states, how wrong the book would have
//! been, why, and whether it matters.
//!
//! `k_t = rho`, `k_s = rho dh_s / dT`, `k_l = rho (dh_l / dW - h_w)` with `rho` the dry air per volume where the
//! flow is actual. Error `e = k_book / k_here - 1`. The error is split among its causes by the logarithmic mean:
//! `k_book / k_here` is a product of factors `r_i`, and `part_i = L(k_book, k_here) ln r_i / k_here` with
//! `L(a, b) = (a - b) / ln(a / b)`; the parts add up to `e` exactly, in any order.
//! Source: own derivation; how each constant is built: `1.08 = 60 × 0.075 × 0.24`, `4.5 = 60 × 0.075`,
//! `4840 = 4.5 × 1076` with `1076 = h_g(75 °F) − h_f(50 °F)`: the condensate is already deducted (common practice).

use std::collections::BTreeMap;

use dewledger_properties::MoistAir;
use dewledger_quantities::{
    Amount, EnthalpyDifference, Kind, LatentConstant, MassDensity, Power, Pressure, Quantity,
    Ratio, SensibleConstant, Sentence, Share, TotalConstant, UnitChoice, show,
};

mod books;

pub use books::Constant;

use books::{Books, LATENT, SENSIBLE, TOTAL, constant};

use crate::air_heat::{self, FLOOR_K, FLOOR_W, FLOW, Readings};
use crate::check::{About, Check, Group};
use crate::doubt::Doubt;
use crate::flow_block::{Basis, Flow};
use crate::form::{ReadingItem, Section};
use crate::given::Given;
use crate::outcome::{Figure, Note, Outcome, Role, Step, Versus};
use crate::refusal::{Refusal, Stop};
use crate::split::{Split, split};
use crate::water_state::{self, WaterStream};

/// The check.
pub struct BookConstants;

const ABOUT: About = About {
    id: "book_constants",
    label: "Book constants here",
    question: "What are 1.08, 4.5 and 4840 here, and how wrong is the book?",
    takes: "two air states; a flow for loads",
    group: Group::Air,
};

/// Standard pressure that the book assumes, Pa.
const BOOK_PRESSURE_PA: f64 = 101_325.0;
/// Ratio of molar masses, water over dry air (ASHRAE RP-1485).
const EPSILON: f64 = 0.621_945;

const HERE: &str = "Constants here";
const ERROR: &str = "Error of the book";
const LOADS: &str = "Loads by the book";
const CHART: &str = "With a sea-level chart as well";

/// The constants; the sensible and latent ones are withheld where their difference is not resolved.
#[derive(Debug, Clone, PartialEq)]
pub struct Results {
    /// Dry air per volume, the book's 4.5.
    pub total: Constant,
    /// Heat per volume and degree, the book's 1.08.
    pub sensible: Option<Constant>,
    /// Heat per volume and moisture, water's own enthalpy deducted, the book's 4840.
    pub latent: Option<Constant>,
    /// The same on the air side, the water's own enthalpy not deducted, J/m³.
    pub latent_air: Option<f64>,
}

/// The constants where the flow passed.
#[must_use]
fn solve(
    given: &Given,
    entering: &MoistAir,
    leaving: &MoistAir,
    passed: Passed<'_>,
    books: Books,
    water: Option<&WaterStream>,
) -> Results {
    let parts = split(entering, leaving);
    let density = passed.density;
    let density_logs = |book_density: f64| match passed.air {
        Some(air) => {
            let pressure = (BOOK_PRESSURE_PA / air.pressure().si()).ln();
            let humidity = (1.0 + air.humidity_ratio().si() / EPSILON).ln();
            let temperature = (book_density / density).ln() - pressure - humidity;
            vec![("pressure", pressure), ("temperature", temperature), ("humidity", humidity)]
        }
        None => vec![("standard density", (book_density / density).ln())],
    };
    let total = {
        let mut logs = density_logs(books.density);
        logs.push(("rounding", (books.total / books.density).ln()));
        constant(density, books.total, logs)
    };
    let delta_t = leaving.dry_bulb().si() - entering.dry_bulb().si();
    let delta_w = leaving.humidity_ratio().si() - entering.humidity_ratio().si();
    let sensible = (delta_t.abs() >= given.floor("delta_t", FLOOR_K)).then(|| {
        let heat_capacity = parts.sensible.si() / delta_t;
        let mut logs = density_logs(books.density);
        logs.push(("heat capacity", (books.heat_capacity / heat_capacity).ln()));
        logs.push(("rounding", (books.sensible / (books.density * books.heat_capacity)).ln()));
        constant(density * heat_capacity, books.sensible, logs)
    });
    let latent_per_water =
        (delta_w.abs() >= given.floor("delta_w", FLOOR_W)).then(|| parts.latent.si() / delta_w);
    let latent = latent_per_water.map(|air_side| {
        let net = air_side - water.map_or(0.0, |water| water.enthalpy.si());
        let mut logs = density_logs(books.density);
        logs.push(("latent heat", (books.latent_heat / net).ln()));
        logs.push(("rounding", (books.latent / (books.density * books.latent_heat)).ln()));
        constant(density * net, books.latent, logs)
    });
    Results {
        total,
        sensible,
        latent,
        latent_air: latent_per_water.map(|air_side| density * air_side),
    }
}

/// Where the flow passed: dry air per volume, and the air itself where the flow is actual.
#[derive(Debug, Clone, Copy)]
struct Passed<'a> {
    density: f64,
    air: Option<&'a MoistAir>,
}

/// The place where an actual flow passed, from the choice of the flow block.
fn passed<'a>(
    basis: Basis,
    given: &Given,
    entering: &'a MoistAir,
    leaving: &'a MoistAir,
    plane: Option<&'a MoistAir>,
) -> Option<Passed<'a>> {
    match basis {
        Basis::Actual(volume) => {
            let air = match given.choice("flow.basis") {
                Some("actual_leaving") => leaving,
                Some("actual_at_plane") => plane?,
                _ => entering,
            };
            Some(Passed { density: 1.0 / volume.si(), air: Some(air) })
        }
        Basis::Standard(density) => Some(Passed { density: density.si(), air: None }),
        Basis::DryAir => None,
    }
}

/// The book's loads beside those here, for a check that has both. Empty for a flow read as dry air by mass: the
/// book's constants are for volumes.
#[must_use]
pub fn versus(
    given: &Given,
    entering: &MoistAir,
    leaving: &MoistAir,
    flow: &Flow,
    water: Option<&WaterStream>,
    plane: Option<&MoistAir>,
) -> Vec<Versus> {
    let own_plane = FLOW
        .at_plane(given)
        .then(|| FLOW.plane_point().read(given, entering.pressure()).ok())
        .flatten()
        .map(|read| read.air);
    let plane = plane.or(own_plane.as_ref());
    let Some(passed) = passed(flow.basis, given, entering, leaving, plane) else {
        return Vec::new();
    };
    let books = Books::of(given, flow.inch_pound);
    let results = solve(given, entering, leaving, passed, books, water);
    let parts = split(entering, leaving);
    let m = flow.dry_air.si();
    let mut versus = Vec::new();
    let mut add = |figure, title: Sentence, here: f64, constant: &Constant| {
        versus.push(Versus {
            figure,
            title,
            book: Power::from_si(here * (1.0 + constant.error)).amount(),
            error: constant.error,
            parts: constant.parts.clone(),
            reason: reason(passed, books),
        });
    };
    let said = |name: &'static str, amount| {
        Sentence::new("{w0} by {w1}").word(name).word(as_printed(amount, flow.inch_pound))
    };
    let total = TotalConstant::from_si(books.total).amount();
    add("total", said("Total", total), m * parts.total.si(), &results.total);
    if let Some(sensible) = &results.sensible {
        let book = SensibleConstant::from_si(books.sensible).amount();
        add("sensible", said("Sensible", book), m * parts.sensible.si(), sensible);
    }
    if let Some(latent) = &results.latent {
        let book = LatentConstant::from_si(books.latent).amount();
        let delta_w = leaving.humidity_ratio().si() - entering.humidity_ratio().si();
        let net =
            m * (parts.latent.si() - delta_w * water.map_or(0.0, |water| water.enthalpy.si()));
        let figure = if water.is_some() { "latent_net" } else { "latent" };
        add(figure, said("Latent", book), net, latent);
    }
    versus
}

/// A book number as the book prints it: in the book's own unit, whatever the reader's are.
fn as_printed(amount: Amount, inch_pound: bool) -> String {
    let book = if inch_pound { UnitChoice::ip() } else { UnitChoice::si() };
    show(amount, book.get(amount.kind())).text()
}

/// Why the book is off, in a sentence.
fn reason(passed: Passed<'_>, books: Books) -> Sentence {
    let ratio = passed.density / books.density;
    let lighter = Share::from_si((1.0 - ratio).abs()).amount();
    match passed.air {
        None => Sentence::new(
            "The flow is standard air: it needs no altitude correction, and correcting again would be the error.",
        ),
        Some(_) if (ratio - 1.0).abs() < 0.005 => Sentence::new(
            "The air here weighs what the book assumes; what is left is its heat capacity.",
        ),
        Some(_) if ratio < 1.0 => {
            Sentence::new("The air here weighs {0} less than the book assumes.").with(lighter)
        }
        Some(_) => {
            Sentence::new("The air here weighs {0} more than the book assumes.").with(lighter)
        }
    }
}

impl Check for BookConstants {
    fn about(&self) -> &'static About {
        &ABOUT
    }

    fn form(&self, given: &Given) -> Vec<Section> {
        let mut sections = air_heat::sections(given, false);
        let inch_pound = thinks_in_inch_pounds(given);
        let books = if inch_pound { Books::IP } else { Books::SI };
        let item = |key, label, kind, amount| {
            ReadingItem::optional(key, label, kind).assuming(amount).covered().into()
        };
        sections.push(
            Section::new(
                "book",
                "The book",
                vec![
                    item(
                        SENSIBLE,
                        "Sensible",
                        Kind::SensibleConstant,
                        SensibleConstant::from_si(books.sensible).amount(),
                    ),
                    item(
                        TOTAL,
                        "Total",
                        Kind::TotalConstant,
                        TotalConstant::from_si(books.total).amount(),
                    ),
                    item(
                        LATENT,
                        "Latent",
                        Kind::LatentConstant,
                        LatentConstant::from_si(books.latent).amount(),
                    ),
                ],
            )
            .beside("as printed"),
        );
        sections
    }

    fn solve(&self, given: &Given) -> Result<Outcome, Stop> {
        let readings = air_heat::read(given)?;
        let (entering, leaving) = (&readings.entering.air, &readings.leaving.air);
        let removed = leaving.humidity_ratio().si() < entering.humidity_ratio().si();
        let water = water_state::read(given, leaving, removed)?;
        let plane = if FLOW.at_plane(given) {
            Some(FLOW.plane_point().read(given, readings.here.pressure)?.air)
        } else {
            None
        };
        let Some(basis) = FLOW.basis(given, entering, leaving, plane.as_ref()) else {
            return Err(Stop::waits("flow.basis", "what the flow is"));
        };
        let Some(passed) = passed(basis, given, entering, leaving, plane.as_ref()) else {
            return Err(Refusal::new(
                "flow.basis",
                "no_volume_flow",
                Sentence::new("Book constants are for volume flows; a flow of dry air by mass needs none. Choose actual or standard."),
            )
            .into());
        };
        let inch_pound = thinks_in_inch_pounds(given);
        let books = Books::of(given, inch_pound);
        let results = solve(given, entering, leaving, passed, books, water.as_ref());
        plausible(&results)?;
        let mut outcome = Outcome { cautions: air_heat::CAUTIONS, ..Outcome::default() };
        constants(&results, &mut outcome);
        outcome.steps = steps(&results, passed);
        outcome.notes.extend(readings.here.notes.iter().cloned());
        outcome.notes.extend(readings.entering.notes.iter().cloned());
        outcome.notes.extend(readings.leaving.notes.iter().cloned());
        if passed.air.is_none() {
            outcome.notes.push(
                Note::remark("no_altitude_correction", Sentence::new("No altitude correction belongs to a standard flow."))
                    .because(Sentence::new("Only heat capacity and latent heat differ from the book; correcting the density again is the error.")),
            );
        }
        if let Ok(flow) = &readings.flow {
            loads(given, &readings, flow, passed, books, water.as_ref(), &mut outcome);
            outcome.versus = versus(given, entering, leaving, flow, water.as_ref(), plane.as_ref());
        }
        air_heat::finish(readings, &mut outcome);
        Ok(outcome)
    }

    fn judge(&self, _: &Given, outcome: &Outcome, doubts: &BTreeMap<String, Doubt>) -> Vec<Note> {
        let mut notes = Vec::new();
        for versus in &outcome.versus {
            let (Some(amount), Some(doubt)) =
                (outcome.amount(versus.figure), doubts.get(versus.figure))
            else {
                continue;
            };
            let Some(half_width) = doubt.half_width_si else { continue };
            let lead = verdict(versus.error, half_width / amount.si().abs());
            notes.push(Note::remark(
                format!("verdict.{}", versus.figure),
                Sentence::new("{s0}: {w0}.").nested(versus.title.clone()).word(lead),
            ));
        }
        notes
    }
}

/// Whether the book's error matters against the doubt of the same load, both relative.
#[must_use]
pub fn verdict(error: f64, half_width: f64) -> &'static str {
    if error.abs() <= half_width / 3.0 {
        "the book constant is good enough here"
    } else if error.abs() <= half_width {
        "visible, still within the readings’ doubt"
    } else {
        "wrong by more than the readings can hide"
    }
}

/// Whether the person works in inch-pound units: by the flow's unit, else by the entering dry bulb's.
fn thinks_in_inch_pounds(given: &Given) -> bool {
    let unit = |key: &str| given.reading(key).and_then(|reading| reading.unit);
    match unit(&FLOW.rate_key(given)) {
        Some(unit) => matches!(unit.id, "cfm" | "ft3/min" | "lb/h"),
        None => unit("entering.dry_bulb").is_some_and(|unit| unit.id == "degF"),
    }
}

/// A book number further than a factor of three from the one here was typed in another unit.
fn plausible(results: &Results) -> Result<(), Stop> {
    let check = |key: &'static str, constant: &Constant, book: Amount, here| {
        if constant.book > 0.0 && (1.0 / 3.0..=3.0).contains(&(constant.book / constant.here)) {
            return Ok(());
        }
        Err(Stop::from(Refusal::new(
            key,
            "book_number_far_off",
            Sentence::new("{0} is no book constant for this air, where it is {1}. Check its unit.")
                .with(book)
                .with(here),
        )))
    };
    let density = |si| TotalConstant::from_si(si).amount();
    check(TOTAL, &results.total, density(results.total.book), density(results.total.here))?;
    if let Some(sensible) = &results.sensible {
        let amount = |si| SensibleConstant::from_si(si).amount();
        check(SENSIBLE, sensible, amount(sensible.book), amount(sensible.here))?;
    }
    if let Some(latent) = &results.latent {
        let amount = |si| LatentConstant::from_si(si).amount();
        check(LATENT, latent, amount(latent.book), amount(latent.here))?;
    }
    Ok(())
}

/// Constants and errors as results.
fn constants(results: &Results, outcome: &mut Outcome) {
    let error = |constant: &Constant| Share::from_si(constant.error).amount();
    outcome.push(
        Figure::new(
            "total_error",
            "The book’s total constant is off by",
            error(&results.total),
            ERROR,
        )
        .signed(
            "The book’s total constant is too high by",
            "The book’s total constant is too low by",
        )
        .role(Role::Headline),
    );
    outcome.push(Figure::new(
        "total_here",
        "Total",
        TotalConstant::from_si(results.total.here).amount(),
        HERE,
    ));
    match &results.sensible {
        Some(sensible) => {
            outcome.push(Figure::new(
                "sensible_here",
                "Sensible",
                SensibleConstant::from_si(sensible.here).amount(),
                HERE,
            ));
            outcome.push(
                Figure::new("sensible_error", "Sensible constant", error(sensible), ERROR)
                    .signed("Sensible constant too high by", "Sensible constant too low by"),
            );
        }
        None => outcome.push(Figure::withheld(
            "sensible_here",
            "Sensible",
            Sentence::new("the temperature change is not resolved"),
            HERE,
        )),
    }
    match (&results.latent, results.latent_air) {
        (Some(latent), Some(air_side)) => {
            outcome.push(Figure::new(
                "latent_here",
                "Latent, the water’s own enthalpy deducted",
                LatentConstant::from_si(latent.here).amount(),
                HERE,
            ));
            outcome.push(
                Figure::new(
                    "latent_air_here",
                    "Latent, air side",
                    LatentConstant::from_si(air_side).amount(),
                    HERE,
                )
                .role(Role::Detail),
            );
            outcome.push(
                Figure::new("latent_error", "Latent constant", error(latent), ERROR)
                    .signed("Latent constant too high by", "Latent constant too low by"),
            );
        }
        _ => outcome.push(Figure::withheld(
            "latent_here",
            "Latent",
            Sentence::new("the moisture change is not resolved"),
            HERE,
        )),
    }
    let factor = Ratio::from_si(results.total.here / results.total.book);
    outcome.push(
        Figure::new(
            "correction",
            "To correct the book’s total, multiply by",
            factor.amount(),
            HERE,
        )
        .on_condition(Sentence::new("here, today, for a flow read as this one")),
    );
}

/// Loads here, by the book, and by the book with a sea-level chart.
fn loads(
    given: &Given,
    readings: &Readings,
    flow: &Flow,
    passed: Passed<'_>,
    books: Books,
    water: Option<&WaterStream>,
    outcome: &mut Outcome,
) {
    let (entering, leaving) = (&readings.entering.air, &readings.leaving.air);
    let parts: Split = split(entering, leaving);
    let m = flow.dry_air.si();
    let load = |key, label: &'static str, change: EnthalpyDifference, gained, lost| {
        Figure::new(key, label, Power::from_si(m * change.si()).amount(), LOADS)
            .signed(gained, lost)
    };
    outcome.push(load(
        "total",
        "Total here",
        parts.total,
        "Total here, added",
        "Total here, removed",
    ));
    outcome.push(load(
        "sensible",
        "Sensible here",
        parts.sensible,
        "Sensible here, added",
        "Sensible here, removed",
    ));
    outcome.push(load(
        "latent",
        "Latent here",
        parts.latent,
        "Latent here, added",
        "Latent here, removed",
    ));
    if let Some(water) = water {
        let delta_w = leaving.humidity_ratio().si() - entering.humidity_ratio().si();
        let net = Power::from_si(m * (parts.latent.si() - delta_w * water.enthalpy.si()));
        outcome.push(
            Figure::new("latent_net", "Latent here, net", net.amount(), LOADS)
                .signed("Latent here less the water, added", "Latent here less the water, removed"),
        );
    }
    let Some(_) = passed.air else { return };
    let volume = m / passed.density;
    let sea = |point: crate::state_block::Point<'_>| {
        point.read(given, Pressure::from_si(BOOK_PRESSURE_PA))
    };
    if let (Ok(entering_sea), Ok(leaving_sea)) = (sea(air_heat::ENTERING), sea(air_heat::LEAVING)) {
        let change = leaving_sea.air.enthalpy().si() - entering_sea.air.enthalpy().si();
        let book = books.total * volume * change;
        let error = Share::from_si(book / (m * parts.total.si()) - 1.0);
        outcome.push(
            Figure::new(
                "chart_total",
                "Total by constant and sea-level chart",
                Power::from_si(book).amount(),
                CHART,
            )
            .signed(
                "Total by constant and sea-level chart, added",
                "Total by constant and sea-level chart, removed",
            ),
        );
        outcome.push(Figure::new("chart_error", "Its error", error.amount(), CHART));
        let moisture =
            leaving_sea.air.humidity_ratio().si() - entering_sea.air.humidity_ratio().si();
        outcome.push(Figure::new(
            "chart_delta_w",
            "Moisture change by the sea-level chart",
            dewledger_quantities::HumidityRatioDifference::from_si(moisture).amount(),
            CHART,
        ));
    }
}

fn steps(results: &Results, passed: Passed<'_>) -> Vec<Step> {
    let density = MassDensity::from_si(passed.density);
    let mut steps = vec![Step::new(
        "Total constant",
        "k_t = 1 / v where the flow passed",
        Sentence::new("{0} of dry air by volume = {1}")
            .with(density.amount())
            .with(TotalConstant::from_si(results.total.here).amount()),
        "the book: 4.5 = 60 × 0.075 (1.2 kg/m³)",
    )];
    if let Some(sensible) = &results.sensible {
        steps.push(Step::new(
            "Sensible constant",
            "k_s = rho dh_s / dt",
            Sentence::new("{0}; the book says {1}")
                .with(SensibleConstant::from_si(sensible.here).amount())
                .with(SensibleConstant::from_si(sensible.book).amount()),
            "the book: 1.08 = 60 × 0.075 × 0.24",
        ));
    }
    if let Some(latent) = &results.latent {
        steps.push(Step::new(
            "Latent constant",
            "k_l = rho (dh_l / dW - h_w)",
            Sentence::new("{0}; the book says {1}")
                .with(LatentConstant::from_si(latent.here).amount())
                .with(LatentConstant::from_si(latent.book).amount()),
            "the book: 4840 = 4.5 × 1076, the condensate already deducted",
        ));
    }
    steps.push(Step::new(
        "Causes of the error",
        "part_i = L(k_book, k_here) ln r_i / k_here",
        Sentence::new("they add up to {0} exactly")
            .with(Share::from_si(results.total.error).amount()),
        "logarithmic mean: no order among the causes; own derivation",
    ));
    steps
}
