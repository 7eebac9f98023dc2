//! The points of a traverse: velocity pressures, or velocities as an instrument shows them.
//!
//! Velocity pressure `v = sqrt(2 C dp / rho)`, each point by itself: the mean of the roots, never the root of the mean. An
//! instrument that was told no density shows standard velocity: of the pressure kind `v sqrt(rho_std/rho)`, of the
//! mass kind (thermal) `v rho_std/rho`; told or free of it (vane, ultrasonic), what it shows.

use dewledger_quantities::{
    Kind, MassDensity, PressureDifference, Quantity, Ratio, Sentence, Velocity,
};

use super::duct::{Duct, SHAPE};
use crate::flow_block::{STANDARD_DENSITY_IP, STANDARD_DENSITY_SI};
use crate::form::{Choice, ChoiceItem, Item, ReadingItem, Repeat, Section, count};
use crate::given::Given;
use crate::outcome::{Missing, Note};
use crate::refusal::{Refusal, Stop};

const READ_AS: &str = "grid.read_as";
const METER: &str = "grid.meter";
const COEFFICIENT: &str = "grid.coefficient";
pub(super) const DENSITY: &str = "grid.standard_density";
const LINES: &str = "grid.lines";
const POINTS: &str = "grid.points";

/// Fewer points tell no flow.
const LEAST_POINTS: usize = 9;
/// A line has one of these.
const COUNTS: [(usize, &str); 8] =
    [(3, "3"), (4, "4"), (5, "5"), (6, "6"), (7, "7"), (8, "8"), (9, "9"), (10, "10")];
const MOST_LINES: usize = 10;
/// Velocity pressure of 3 m/s in standard air, Pa: a Pitot tube hardly reads below.
const SLOW_PA: f64 = 5.4;

pub(super) fn by_pressure(given: &Given) -> Option<bool> {
    match given.choice(READ_AS)? {
        "velocity_pressure" => Some(true),
        "velocity" => Some(false),
        _ => None,
    }
}

/// How velocities of standard air become actual.
fn needs_density(given: &Given) -> bool {
    by_pressure(given) == Some(false)
        && matches!(given.choice(METER), Some("pressure_kind" | "mass_kind"))
}

/// Lines and points on each: as chosen, else as the rule asks for this size.
pub(super) fn shape(given: &Given, duct: Option<Duct>) -> (usize, usize) {
    let (lines, points) = duct.map_or((5, 5), Duct::grid);
    let lines = given.choice(LINES).map_or(lines, |_| count(given, LINES, 1, MOST_LINES));
    let points = given
        .choice(POINTS)
        .and_then(|chosen| COUNTS.iter().find(|(_, name)| *name == chosen))
        .map_or(points, |(number, _)| *number);
    (lines, points)
}

fn key(line: usize, point: usize) -> String {
    format!("line{line}.point{point}")
}

pub(super) fn sections(given: &Given, duct: Option<Duct>) -> Vec<Section> {
    let (lines, points) = shape(given, duct);
    let round = given.choice(SHAPE) == Some("round");
    let default = COUNTS.iter().find(|(number, _)| *number == duct.map_or(5, |duct| duct.grid().1));
    let mut items: Vec<Item> = vec![
        ChoiceItem::new(
            READ_AS,
            "At each point is read",
            None,
            vec![
                Choice::helped(
                    "velocity_pressure",
                    "Velocity pressure",
                    "Inches of water are those of 4 °C, 249.089 Pa; of 60 °F they are 0.1 % less",
                ),
                Choice::new("velocity", "Velocity"),
            ],
        )
        .into(),
        ChoiceItem::new(
            POINTS,
            "Points on each line",
            default.map(|(_, name)| *name),
            COUNTS.iter().map(|(_, name)| Choice::new(name, *name)).collect(),
        )
        .into(),
    ];
    match by_pressure(given) {
        Some(true) => items.push(
            ReadingItem::optional(COEFFICIENT, "Coefficient of the probe", Kind::Ratio)
                .assuming(Ratio::from_si(1.0).amount())
                .help("From its papers; a Pitot-static tube of a standard form is 1")
                .covered()
                .into(),
        ),
        Some(false) => items.push(
            ChoiceItem::new(
                METER,
                "The instrument shows",
                None,
                vec![
                    Choice::helped(
                        "actual",
                        "Actual velocity",
                        "Vane, ultrasonic, or told the density here",
                    ),
                    Choice::helped(
                        "pressure_kind",
                        "Standard velocity, by pressure",
                        "Pitot grid or tube with a fixed constant",
                    ),
                    Choice::helped(
                        "mass_kind",
                        "Standard velocity, by mass",
                        "Hot wire and other thermal ones",
                    ),
                ],
            )
            .into(),
        ),
        None => {}
    }
    if needs_density(given) {
        items.push(
            ReadingItem::optional(DENSITY, "Its standard density", Kind::Density)
                .assuming(MassDensity::from_si(standard(given)).amount())
                .help("From its papers")
                .covered()
                .into(),
        );
    }
    let (kind, pressure) = match by_pressure(given) {
        Some(false) => (Kind::Velocity, false),
        _ => (Kind::PressureDifference, true),
    };
    let mut sections = vec![Section::new("grid", "The traverse", items)];
    for line in 1..=lines {
        let items = (1..=points).map(|point| {
            let number = (line - 1) * points + point;
            ReadingItem::wanted(key(line, point), format!("Point {number}"), kind).into()
        });
        let name = if round { "Diameter" } else { "Line" };
        let mut section =
            Section::new(format!("line{line}"), format!("{name} {line}"), items.collect());
        section.aside = Some(if pressure { "velocity pressures" } else { "velocities" }.into());
        section.repeat = Some(Repeat {
            choice: LINES.into(),
            count: lines,
            least: 1,
            most: MOST_LINES,
            add: (line == lines && lines < MOST_LINES).then(|| "Add a line".into()),
            remove: (line == lines && lines > 1).then(|| "Take this line away".into()),
        });
        sections.push(section);
    }
    sections
}

/// Standard density, kg/m³: 0.075 lb/ft³ where the points are typed in inch-pound units, else 1.2.
pub(super) fn standard(given: &Given) -> f64 {
    let typed = given.reading(&key(1, 1)).and_then(|reading| reading.unit);
    if typed.is_some_and(|unit| matches!(unit.id, "fpm" | "inH2O")) {
        STANDARD_DENSITY_IP
    } else {
        STANDARD_DENSITY_SI
    }
}

/// The points as velocities, with the velocity pressures where those were read.
#[derive(Debug, Clone)]
pub(super) struct Grid {
    pub(super) velocities: Vec<Velocity>,
    pub(super) pressures: Vec<PressureDifference>,
    pub(super) notes: Vec<Note>,
}

/// Velocity from a velocity pressure, `sqrt(2 C dp / rho)`. Units: Pa, kg/m³, in any; m/s out. Range: `dp >= 0`.
#[must_use]
pub fn from_pressure(dp: PressureDifference, density: MassDensity, coefficient: Ratio) -> Velocity {
    Velocity::from_si((2.0 * coefficient.si() * dp.si() / density.si()).sqrt())
}

/// Actual velocity from what an instrument of a kind shows: `actual`, `pressure_kind`, `mass_kind`.
#[must_use]
pub fn from_shown(
    shown: Velocity,
    kind: &str,
    density: MassDensity,
    standard: MassDensity,
) -> Velocity {
    let thinner = standard.si() / density.si();
    Velocity::from_si(match kind {
        "pressure_kind" => shown.si() * thinner.sqrt(),
        "mass_kind" => shown.si() * thinner,
        _ => shown.si(),
    })
}

/// What is missing of the points, the first named, the rest counted.
pub(super) fn missing(given: &Given, duct: Option<Duct>) -> Vec<Missing> {
    let mut missing = Vec::new();
    let Some(pressure) = by_pressure(given) else {
        return vec![Missing::new(READ_AS, "what is read at each point")];
    };
    if !pressure && given.choice(METER).is_none() {
        let mut kind = Missing::new(METER, "what the instrument shows");
        kind.asks =
            Some(Sentence::new("Does it show the actual velocity here, or that of standard air?"));
        missing.push(kind);
    }
    let (lines, points) = shape(given, duct);
    let blank: Vec<(usize, String)> = (1..=lines * points)
        .map(|number| (number, key((number - 1) / points + 1, (number - 1) % points + 1)))
        .filter(|(_, key)| given.reading(key).is_none())
        .collect();
    if let Some((number, key)) = blank.first() {
        let name = match blank.len() {
            1 => format!("point {number}"),
            more => format!("point {number} and {} more", more - 1),
        };
        missing.push(Missing::new(key.clone(), name));
    }
    missing
}

fn refused(key: String, code: &'static str, says: Sentence) -> Stop {
    Refusal::new(key, code, says).into()
}

/// The points, none of them missing.
pub(super) fn read(given: &Given, duct: Duct, density: MassDensity) -> Result<Grid, Stop> {
    let (lines, points) = shape(given, Some(duct));
    if lines * points < LEAST_POINTS {
        return Err(refused(
            POINTS.to_owned(),
            "too_few_points",
            Sentence::new(
                "{w0} points tell no flow: a traverse has 9 or more. Add lines or points.",
            )
            .word((lines * points).to_string()),
        ));
    }
    let coefficient: Ratio = given.quantity(COEFFICIENT).unwrap_or_else(|| Ratio::from_si(1.0));
    if !(0.3..=1.5).contains(&coefficient.si()) {
        return Err(refused(
            COEFFICIENT.to_owned(),
            "coefficient_out_of_range",
            Sentence::new("A coefficient of {0} is outside 0.3 to 1.5. A Pitot-static tube of a standard form is 1.")
                .with(coefficient.amount()),
        ));
    }
    let told: MassDensity =
        given.quantity(DENSITY).unwrap_or_else(|| MassDensity::from_si(standard(given)));
    if !(0.9..=1.35).contains(&told.si()) {
        return Err(refused(
            DENSITY.to_owned(),
            "standard_density_out_of_range",
            Sentence::new(
                "A standard density of {0} is no standard: they lie between 0.9 and 1.35 kg/m³.",
            )
            .with(told.amount()),
        ));
    }
    let pressure = by_pressure(given) == Some(true);
    let mut grid = Grid { velocities: Vec::new(), pressures: Vec::new(), notes: Vec::new() };
    for number in 1..=lines * points {
        let key = key((number - 1) / points + 1, (number - 1) % points + 1);
        let Some(reading) = given.reading(&key) else { continue };
        let read = reading.amount.si();
        // Standing air may read a little below zero, by its ±.
        if read < -reading.half_width_si.unwrap_or(0.0) && !given.is_drawn() {
            let says = if pressure {
                "Point {w0} is negative: swap the hoses, or enter 0 if the air stands or turns back there."
            } else {
                "Point {w0} is negative: turn the probe into the flow, or enter 0 if the air stands or turns back there."
            };
            return Err(refused(key, "negative", Sentence::new(says).word(number.to_string())));
        }
        let (most, unit) = if pressure { (5000.0, "5 kPa") } else { (80.0, "80 m/s") };
        if read > most {
            return Err(refused(
                key,
                "too_fast",
                Sentence::new("Point {w0} reads {0}, above {w1}: no duct is that fast. Check the number and its unit.")
                    .with(reading.amount)
                    .word(number.to_string())
                    .word(unit),
            ));
        }
        let read = read.max(0.0);
        if pressure {
            let dp = PressureDifference::from_si(read);
            grid.pressures.push(dp);
            grid.velocities.push(from_pressure(dp, density, coefficient));
        } else {
            let kind = given.choice_or(METER, "actual");
            grid.velocities.push(from_shown(Velocity::from_si(read), kind, density, told));
        }
    }
    judge(&mut grid, density);
    if (lines, points) != duct.grid() {
        let (by_lines, by_points) = duct.grid();
        grid.notes.push(
            Note::remark(
                "other_grid",
                Sentence::new(
                    "The grid has {w0} × {w1} points; for this size the rule asks for {w2} × {w3}.",
                )
                .word(lines.to_string())
                .word(points.to_string())
                .word(by_lines.to_string())
                .word(by_points.to_string()),
            )
            .because(Sentence::new(
                "Positions are only right where lines and points are those of one rule.",
            )),
        );
    }
    Ok(grid)
}

/// Whether the plane is fit: three quarters of the velocity pressures above a tenth of the largest (AMCA 203, ASHRAE 111,
/// from memory), and fast enough for a Pitot tube.
fn judge(grid: &mut Grid, density: MassDensity) {
    let pressures: Vec<f64> = if grid.pressures.is_empty() {
        grid.velocities.iter().map(|v| 0.5 * density.si() * v.si() * v.si()).collect()
    } else {
        grid.pressures.iter().map(|dp| dp.si()).collect()
    };
    let all = pressures.len();
    let largest = pressures.iter().copied().fold(0.0, f64::max);
    let still = pressures.iter().filter(|dp| **dp <= 0.1 * largest).count();
    if 4 * (all - still) < 3 * all {
        grid.notes.push(Note::unusual(
            "not_fit",
            READ_AS,
            Sentence::new("This plane is not fit for a traverse: {w0} of {w1} points are nearly still. Move it, or take ± 10 %.")
                .word(still.to_string())
                .word(all.to_string()),
        ));
    }
    let slow = grid.pressures.iter().filter(|dp| dp.si() < SLOW_PA).count();
    if 4 * slow > all {
        grid.notes.push(
            Note::unusual(
                "slow",
                READ_AS,
                Sentence::new("{w0} of {w1} points are under {0}, about 3 m/s: a Pitot tube hardly reads there.")
                    .with(PressureDifference::from_si(SLOW_PA).amount())
                    .word(slow.to_string())
                    .word(all.to_string()),
            )
            .because(Sentence::new("Take a thermal or vane instrument, or a smaller plane.")),
        );
    }
}
