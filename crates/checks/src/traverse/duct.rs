//! The duct of a traverse: its clear size, and where the probe is held in it.
//!
//! Positions of ISO 3966 (log-Tchebycheff, log-linear), quoted from memory; how many lines by size, common practice.

use dewledger_quantities::{Area, Kind, Length, Quantity, Sentence};

use crate::drawn::{Cell, Table};
use crate::form::{Choice, ChoiceItem, Item, ReadingItem};
use crate::given::Given;
use crate::outcome::{Missing, Step};
use crate::refusal::{Refusal, Stop};

pub(super) const SHAPE: &str = "duct.shape";
const WIDTH: &str = "duct.width";
const HEIGHT: &str = "duct.height";
const DIAMETER: &str = "duct.diameter";
const SIZE_IS: &str = "duct.size_is";
const LINING: &str = "duct.lining";
pub(super) const RULE: &str = "duct.rule";

/// Sizes that are worked with, m.
const SIZES_M: std::ops::RangeInclusive<f64> = 0.05..=10.0;

/// Log-Tchebycheff positions along a side, as fractions of it, for 5, 6 and 7.
const SIDES: [&[f64]; 3] = [
    &[0.074, 0.288, 0.500, 0.712, 0.926],
    &[0.061, 0.235, 0.437, 0.563, 0.765, 0.939],
    &[0.053, 0.203, 0.366, 0.500, 0.634, 0.797, 0.947],
];
/// Log-Tchebycheff positions on one half of a diameter, as fractions of it, for 3, 4 and 5 a radius.
const TCHEBYCHEFF: [&[f64]; 3] = [
    &[0.0321, 0.1374, 0.3123],
    &[0.0238, 0.1000, 0.1938, 0.3343],
    &[0.0189, 0.0764, 0.1554, 0.2150, 0.3567],
];
/// Log-linear positions, likewise.
const LINEAR: [&[f64]; 3] = [
    &[0.0321, 0.1349, 0.3207],
    &[0.0210, 0.1170, 0.1840, 0.3450],
    &[0.0191, 0.0764, 0.1534, 0.2171, 0.3609],
];

/// A duct by its clear size.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Duct {
    /// Width and height.
    Rectangular(Length, Length),
    /// Diameter.
    Round(Length),
}

impl Duct {
    /// Clear area, m².
    #[must_use]
    pub fn area(self) -> Area {
        Area::from_si(match self {
            Duct::Rectangular(width, height) => width.si() * height.si(),
            Duct::Round(d) => std::f64::consts::FRAC_PI_4 * d.si() * d.si(),
        })
    }

    /// Lines and points on each that the rule asks for.
    #[must_use]
    pub fn grid(self) -> (usize, usize) {
        match self {
            Duct::Rectangular(width, height) => (along(width), along(height)),
            Duct::Round(d) if d.si() > 0.25 => (3, 10),
            Duct::Round(_) => (2, 6),
        }
    }
}

/// Positions along a side of a rectangular duct: 5 below 0.75 m, 6 to 0.9 m, 7 above.
fn along(side: Length) -> usize {
    // A side typed as 0.9 m in another unit is still 0.9 m.
    if side.si() < 0.75 {
        5
    } else if side.si() <= 0.9 + 1e-9 {
        6
    } else {
        7
    }
}

/// Positions along a line as fractions of the side or diameter; none where no rule gives so many.
#[must_use]
pub fn positions(round: bool, log_linear: bool, points: usize) -> Option<Vec<f64>> {
    if !round {
        return SIDES.iter().find(|row| row.len() == points).map(|row| row.to_vec());
    }
    let table = if log_linear { LINEAR } else { TCHEBYCHEFF };
    let half = table.iter().find(|row| 2 * row.len() == points)?;
    Some(half.iter().copied().chain(half.iter().rev().map(|y| 1.0 - y)).collect())
}

pub(super) fn items(given: &Given) -> Vec<Item> {
    let reading = |key, label| -> Item { ReadingItem::wanted(key, label, Kind::Length).into() };
    let mut items: Vec<Item> = vec![
        ChoiceItem::new(
            SHAPE,
            "The duct is",
            None,
            vec![Choice::new("rectangular", "Rectangular"), Choice::new("round", "Round")],
        )
        .into(),
    ];
    match given.choice(SHAPE) {
        Some("rectangular") => items.extend([reading(WIDTH, "Width"), reading(HEIGHT, "Height")]),
        Some("round") => {
            items.push(reading(DIAMETER, "Diameter"));
            items.push(
                ChoiceItem::new(
                    RULE,
                    "Positions by",
                    Some("log_tchebycheff"),
                    vec![
                        Choice::new("log_tchebycheff", "Log-Tchebycheff"),
                        Choice::new("log_linear", "Log-linear"),
                    ],
                )
                .into(),
            );
        }
        _ => return items,
    }
    items.push(
        ChoiceItem::new(
            SIZE_IS,
            "That size is",
            None,
            vec![
                Choice::helped("clear", "Clear inside", "Inside the lining, where there is one"),
                Choice::helped(
                    "over_lining",
                    "To the metal, lined inside",
                    "The lining takes some of it",
                ),
            ],
        )
        .into(),
    );
    if given.choice(SIZE_IS) == Some("over_lining") {
        items.push(reading(LINING, "Thickness of the lining"));
    }
    items
}

fn missing(given: &Given) -> Vec<Missing> {
    let Some(shape) = given.choice(SHAPE) else {
        return vec![Missing::new(SHAPE, "whether the duct is rectangular or round")];
    };
    let sides: &[(&'static str, &'static str)] = if shape == "round" {
        &[(DIAMETER, "the diameter")]
    } else {
        &[(WIDTH, "the width"), (HEIGHT, "the height")]
    };
    let mut missing: Vec<Missing> = sides
        .iter()
        .filter(|(key, _)| given.reading(key).is_none())
        .map(|(key, name)| Missing::new(*key, *name))
        .collect();
    match given.choice(SIZE_IS) {
        None => {
            let mut asked = Missing::new(SIZE_IS, "whether the size is inside the lining");
            asked.asks = Some(Sentence::new("Is that the clear size, inside any lining?"));
            missing.push(asked);
        }
        Some("over_lining") if given.reading(LINING).is_none() => {
            missing.push(Missing::new(LINING, "the thickness of the lining"));
        }
        Some(_) => {}
    }
    missing
}

/// The duct by its clear size.
///
/// # Errors
///
/// Waits for its size; refuses one that cannot be.
pub(super) fn read(given: &Given) -> Result<Duct, Stop> {
    let missing = missing(given);
    if !missing.is_empty() {
        return Err(Stop::Waits(missing));
    }
    let lining: Length = if given.choice(SIZE_IS) == Some("over_lining") {
        given.quantity(LINING).unwrap_or_default()
    } else {
        Length::default()
    };
    let clear = |key: &'static str| -> Result<Length, Stop> {
        let typed: Length = given.quantity(key).unwrap_or_default();
        let clear = Length::from_si(typed.si() - 2.0 * lining.si());
        if SIZES_M.contains(&clear.si()) && lining.si() >= 0.0 {
            return Ok(clear);
        }
        Err(Refusal::new(
            key,
            "size_out_of_range",
            Sentence::new("A duct of {0} clear is outside 0.05 to 10 m. Check the number, its unit and the lining.")
                .with(clear.amount()),
        )
        .into())
    };
    Ok(if given.choice(SHAPE) == Some("round") {
        Duct::Round(clear(DIAMETER)?)
    } else {
        Duct::Rectangular(clear(WIDTH)?, clear(HEIGHT)?)
    })
}

/// Where to hold the probe, by the size.
pub(super) fn tables(given: &Given, duct: Duct, points: usize) -> Vec<Table> {
    let linear = given.choice(RULE) == Some("log_linear");
    let along = |title: String, side: Length, round: bool, count: usize| {
        let shares = positions(round, linear, count)?;
        let rows = shares.iter().enumerate().map(|(at, share)| {
            vec![
                Cell::Words(Sentence::new("{w0}").word((at + 1).to_string())),
                Cell::Amount(Length::from_si(share * side.si()).amount()),
            ]
        });
        Some(Table {
            title: title.into(),
            columns: vec!["Position".into(), "From the wall".into()],
            rows: rows.collect(),
        })
    };
    let (lines, by_rule) = duct.grid();
    match duct {
        Duct::Rectangular(width, height) => [
            along("Lines across the width".to_owned(), width, false, lines),
            along("Points on each line, over the height".to_owned(), height, false, by_rule),
        ]
        .into_iter()
        .flatten()
        .collect(),
        Duct::Round(diameter) => {
            let points = if positions(true, linear, points).is_some() { points } else { by_rule };
            let title = if lines == 2 {
                "Points on each of two diameters at right angles".to_owned()
            } else {
                "Points on each of three diameters, 60° apart".to_owned()
            };
            along(title, diameter, true, points).into_iter().collect()
        }
    }
}

pub(super) fn step(duct: Duct) -> Step {
    let area = duct.area().amount();
    match duct {
        Duct::Rectangular(width, height) => Step::new(
            "Clear area",
            "A = a b",
            Sentence::new("{0} × {1} = {2}").with(width.amount()).with(height.amount()).with(area),
            "inside the lining",
        ),
        Duct::Round(diameter) => Step::new(
            "Clear area",
            "A = pi D² / 4",
            Sentence::new("D = {0}: {1}").with(diameter.amount()).with(area),
            "inside the lining",
        ),
    }
}
