//! Reading what a person types.
//!
//! Both decimal marks, a minus of any kind (also behind the number), a unit typed with the number. What could mean
//! two numbers is refused with both, never guessed. A blank is "not read", never zero.

use crate::number::{Marks, Parts, Trouble, marks, take_apart};
use crate::unit::{normal, two_meanings};
use crate::{Amount, Kind, Unit};

/// What a field holds.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Entry {
    /// Nothing: not read.
    NotRead,
    /// A number.
    Read(Typed),
}

/// A number as read.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Typed {
    /// Its value.
    pub amount: Amount,
    /// The unit that it is in: a typed one wins over the field's.
    pub unit: &'static Unit,
    /// A unit stood beside the number.
    pub unit_typed: bool,
    /// A comma was its decimal mark, so that it is worth saying back.
    pub comma: bool,
    /// The number in `unit`.
    pub value: f64,
}

/// Why a text is no number. The sentences are fit for a person.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
pub enum ReadError {
    /// No number in it.
    #[error("“{text}” is not a number. Type digits, with a point or a comma for decimals.")]
    NotANumber {
        /// As typed, shortened.
        text: String,
    },
    /// A space between digits that are not thousands.
    #[error("“{text}” looks like two numbers. Type one; a space may only part thousands.")]
    TwoNumbers {
        /// As typed, shortened.
        text: String,
    },
    /// Could be two numbers.
    #[error("“{text}” can be read as {one} or as {other}. Type it without the mark, or say which.")]
    Ambiguous {
        /// As typed, shortened.
        text: String,
        /// One reading, with the unit if one was typed. Typed in place of `text`, it has no other reading.
        one: String,
        /// The other, likewise.
        other: String,
    },
    /// The unit behind the number is not known.
    #[error("“{unit}” is not a unit of {kind} here. Choose one beside the field.")]
    UnknownUnit {
        /// As typed, shortened.
        unit: String,
        /// The quantity's name.
        kind: &'static str,
    },
    /// The unit behind the number measures something else.
    #[error("“{unit}” is a unit of {measures}. This field takes {kind}.")]
    OtherQuantity {
        /// As typed, shortened.
        unit: String,
        /// What it measures.
        measures: &'static str,
        /// The quantity's name.
        kind: &'static str,
    },
    /// The unit behind the number means one thing here and another there.
    #[error("“{unit}” can mean {one} or {other}. Type {instead}.")]
    TwoMeanings {
        /// As typed, shortened.
        unit: String,
        /// One meaning.
        one: &'static str,
        /// The other.
        other: &'static str,
        /// What to type.
        instead: &'static str,
    },
    /// More than a number can hold.
    #[error("“{text}” is too large to be a reading.")]
    TooLarge {
        /// As typed, shortened.
        text: String,
    },
    /// A ± at or below zero.
    #[error("A ± is above zero. Leave it blank where it is not known.")]
    NoWidth,
    /// A ± in per cent of a quantity whose zero depends on the scale.
    #[error("A ± in per cent depends on where a scale of {kind} begins. Type it as a difference.")]
    ShareOfAScale {
        /// The quantity's name.
        kind: &'static str,
    },
}

/// Largest number of characters that a reading is looked for in.
const LONGEST: usize = 60;

/// Reads a number of `kind`, in `unit` unless it carries its own.
///
/// # Errors
///
/// [`ReadError`] with a sentence for the person.
///
/// # Example
///
/// ```
/// use dewledger_quantities::{Entry, Kind, Unit, read};
///
/// let celsius = Unit::find("degC").expect("it stands in the table");
/// let Ok(Entry::Read(typed)) = read(Kind::Temperature, "55 F", celsius) else { panic!() };
/// assert_eq!(typed.unit.id, "degF");
/// assert_eq!(read(Kind::Temperature, "", celsius), Ok(Entry::NotRead));
/// let litres = Unit::find("L/s").expect("it stands in the table");
/// assert_eq!(
///     read(Kind::AirFlow, "10,000 cfm", litres).unwrap_err().to_string(),
///     "“10,000 cfm” can be read as 10.0 cfm or as 10\u{a0}000 cfm. Type it without the mark, or say which."
/// );
/// ```
pub fn read(kind: Kind, text: &str, unit: &'static Unit) -> Result<Entry, ReadError> {
    let trimmed = text.trim();
    if trimmed.is_empty() {
        return Ok(Entry::NotRead);
    }
    if trimmed.chars().count() > LONGEST {
        return Err(ReadError::NotANumber { text: shortened(trimmed) });
    }
    let parts = take_apart(trimmed).map_err(|trouble| match trouble {
        Trouble::NoNumber => ReadError::NotANumber { text: shortened(trimmed) },
        Trouble::TwoNumbers => ReadError::TwoNumbers { text: shortened(trimmed) },
    })?;
    let (unit, unit_typed) = unit_of(kind, &parts.rest, unit)?;
    let value = value(kind, unit, trimmed, &parts)?;
    let Some(si) = unit.to_si(kind, value) else {
        let measures = unit.kinds().next().map_or("something else", Kind::label);
        return Err(ReadError::OtherQuantity {
            unit: unit.symbol.to_owned(),
            measures,
            kind: kind.label(),
        });
    };
    if !si.is_finite() {
        return Err(ReadError::TooLarge { text: shortened(trimmed) });
    }
    let comma = parts.body.contains(',');
    Ok(Entry::Read(Typed { amount: Amount::new(kind, si), unit, unit_typed, comma, value }))
}

/// The unit that the number is in, and whether it was typed.
fn unit_of(
    kind: Kind,
    typed: &str,
    field: &'static Unit,
) -> Result<(&'static Unit, bool), ReadError> {
    let form = normal(typed);
    // A degree sign alone says that it is a temperature, not on which scale.
    if form.is_empty() || (form == "°" && kind.difference() == Kind::TemperatureDifference) {
        return Ok((field, false));
    }
    if let Some(unit) = Unit::of(kind).find(|unit| unit.is_spelt(kind, &form)) {
        return Ok((unit, true));
    }
    let unit = shortened(typed);
    if let Some(two) = two_meanings(kind, &form) {
        return Err(ReadError::TwoMeanings {
            unit,
            one: two.one,
            other: two.other,
            instead: two.instead,
        });
    }
    let other =
        Unit::all().iter().find_map(|unit| unit.kinds().find(|kind| unit.is_spelt(*kind, &form)));
    Err(match other {
        Some(other) => {
            ReadError::OtherQuantity { unit, measures: other.label(), kind: kind.label() }
        }
        None => ReadError::UnknownUnit { unit, kind: kind.label() },
    })
}

/// The value in `unit`, if its marks leave one reading.
fn value(kind: Kind, unit: &Unit, text: &str, parts: &Parts) -> Result<f64, ReadError> {
    let not_a_number = || ReadError::NotANumber { text: shortened(text) };
    let parse = |digits: &str| {
        let sign = if parts.negative { "-" } else { "" };
        let power = parts.exponent.as_deref().map_or_else(String::new, |power| format!("e{power}"));
        format!("{sign}{digits}{power}").parse::<f64>().map_err(|_| not_a_number())
    };
    let ambiguous = |one: &str, other: &str| ReadError::Ambiguous {
        text: shortened(text),
        one: offered(parts, one),
        other: offered(parts, other),
    };
    match marks(parts) {
        Marks::One(digits) => parse(&digits),
        Marks::Two(one, other) => Err(ambiguous(&one, &other)),
        Marks::DecimalOrThousands(decimal, thousands) => {
            // Where an instrument shows three decimals (1.204 kg/m³), or a thousand times as much cannot be
            // (101.325 kPa), there is nothing to doubt.
            let three_decimals = unit.decimals(kind) >= 3;
            let si = unit.to_si(kind, parse(&thousands)?).map_or(f64::INFINITY, f64::abs);
            if three_decimals || si > largest(kind) {
                parse(&decimal)
            } else {
                Err(ambiguous(&decimal, &thousands))
            }
        }
        Marks::None => Err(not_a_number()),
    }
}

/// A reading as it can be typed without doubt: thousands parted by spaces, never three decimals, the unit as typed.
fn offered(parts: &Parts, digits: &str) -> String {
    let (whole, decimals) =
        digits.split_once('.').map_or((digits, None), |(whole, decimals)| (whole, Some(decimals)));
    let mut text = if parts.negative { "−".to_owned() } else { String::new() };
    text.push_str(&crate::decimal::grouped(whole));
    if let Some(decimals) = decimals {
        let significant = decimals.trim_end_matches('0');
        text.push('.');
        match significant.len() {
            0 => text.push('0'),
            3 => text.extend([significant, "0"]),
            _ => text.push_str(significant),
        }
    }
    if !parts.rest.is_empty() {
        text.push(' ');
        text.push_str(&parts.rest);
    }
    text
}

/// A magnitude in stored SI units that no reading of the trade goes beyond. It serves only to tell a decimal mark from
/// one that parts thousands; nothing is refused by it. Common practice, with a wide margin.
fn largest(kind: Kind) -> f64 {
    match kind {
        Kind::Temperature => 700.0,
        Kind::TemperatureDifference => 500.0,
        Kind::RelativeHumidity => 2.0,
        Kind::HumidityRatio | Kind::HumidityRatioDifference => 0.14,
        Kind::Enthalpy | Kind::EnthalpyDifference => 0.9e6,
        Kind::WaterEnthalpy => 4e6,
        Kind::ProcessSlope => 1e8,
        Kind::SpecificVolume => 10.0,
        Kind::Density => 2000.0,
        Kind::SpecificHeat => 1e4,
        Kind::AirFlow | Kind::StandardAirFlow => 1000.0,
        Kind::DryAirFlow => 1200.0,
        Kind::WaterFlow => 5.0,
        Kind::CondensateFlow => 0.1,
        Kind::MoistureFlow => 100.0,
        Kind::WaterMassFlow => 5000.0,
        Kind::Power => 1e9,
        Kind::Energy => 1e15,
        Kind::PowerPerArea | Kind::PowerPerLength => 1e4,
        Kind::FilmCoefficient => 1e5,
        Kind::ThermalConductivity => 1e3,
        Kind::Pressure | Kind::VapourPressure => 2e5,
        Kind::PressureDifference => 1e6,
        Kind::Elevation => 9000.0,
        Kind::Length => 20.0,
        Kind::Area => 1e5,
        Kind::WaterVolume => 0.9,
        Kind::RoomVolume => 1e6,
        Kind::RoomLength => 1000.0,
        Kind::AirChanges => 1.0,
        Kind::FuelVolume => 1e4,
        Kind::HeatingValue => 1e9,
        Kind::Mass => 400.0,
        Kind::Velocity => 90.0,
        Kind::Duration => 1e7,
        Kind::Ratio | Kind::Share => 9.0,
        Kind::MoleFraction => 0.5,
        Kind::Voltage => 1e5,
        Kind::Current => 1e4,
        Kind::SensibleConstant => 1e4,
        Kind::TotalConstant => 10.0,
        Kind::LatentConstant | Kind::WaterConstant => 1e7,
        Kind::InputPerCooling => 100.0,
    }
}

/// At most as much of a text as belongs in a sentence.
pub(crate) fn shortened(text: &str) -> String {
    let text = text.trim();
    if text.chars().count() <= 24 {
        text.to_owned()
    } else {
        text.chars().take(23).collect::<String>() + "…"
    }
}
