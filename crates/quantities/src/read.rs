//! Reading what a person types.
//!
//! Both decimal marks, a minus of any kind (also behind the number), a unit typed with the number. What could mean
//! two numbers is refused with both, never guessed. A blank is "not read", never zero.

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
        /// As typed.
        text: String,
    },
    /// Could be two numbers.
    #[error("“{text}” can be read as {one} or as {other}. Type it without the mark, or say which.")]
    Ambiguous {
        /// As typed.
        text: String,
        /// One reading, as it would be typed.
        one: String,
        /// The other.
        other: String,
    },
    /// The unit behind the number is not known.
    #[error("“{unit}” is not a unit of {kind} here. Choose one beside the field.")]
    UnknownUnit {
        /// As typed.
        unit: String,
        /// The quantity's name.
        kind: &'static str,
    },
    /// More than a number can hold.
    #[error("“{text}” is too large to be a reading.")]
    TooLarge {
        /// As typed.
        text: String,
    },
}

/// Largest number of characters that a reading is looked for in.
const LONGEST: usize = 60;

/// Reads a number of `kind`, in `unit` unless it carries its own.
///
/// # Errors
///
/// [`ReadError`] with a sentence for the person.
pub fn read(kind: Kind, text: &str, unit: &'static Unit) -> Result<Entry, ReadError> {
    let trimmed = text.trim();
    if trimmed.is_empty() {
        return Ok(Entry::NotRead);
    }
    let (number, suffix) = parts(trimmed)?;
    let (unit, unit_typed) = match suffix.as_str() {
        "" => (unit, false),
        suffix => (typed_unit(kind, suffix)?, true),
    };
    let (value, comma) = number_of(kind, unit, trimmed, &number)?;
    let si = unit.to_si(kind, value).unwrap_or(f64::NAN);
    if !si.is_finite() {
        return Err(ReadError::TooLarge { text: shortened(trimmed) });
    }
    Ok(Entry::Read(Typed { amount: Amount::new(kind, si), unit, unit_typed, comma, value }))
}

/// A ± as typed: absolute, or relative to its reading.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum PlusMinus {
    /// A half-width in stored SI units of the kind's difference.
    Absolute(f64),
    /// A share of the reading, 0.05 for 5 %.
    Relative(f64),
}

/// Reads a ± of a reading of `kind`: "0.3", "0.3 K", "5 %". Blank is not known.
///
/// # Errors
///
/// [`ReadError`] with a sentence for the person; a ± is never below zero.
pub fn read_plus_minus(
    kind: Kind,
    text: &str,
    unit: &'static Unit,
) -> Result<Option<PlusMinus>, ReadError> {
    let trimmed = text.trim().trim_start_matches('±').trim();
    if trimmed.is_empty() {
        return Ok(None);
    }
    let difference = kind.difference();
    let percent = trimmed.strip_suffix('%').map(str::trim);
    let relative_kind = !matches!(kind, Kind::RelativeHumidity | Kind::Share);
    let not_a_number = || ReadError::NotANumber { text: shortened(text) };
    let plus_minus = match percent {
        Some(number) if relative_kind => {
            let unit = Unit::find("%").ok_or_else(not_a_number)?;
            match read(Kind::Share, number, unit)? {
                Entry::Read(typed) => PlusMinus::Relative(typed.amount.si()),
                Entry::NotRead => return Err(not_a_number()),
            }
        }
        _ => {
            let fallback = if unit.measures(difference) {
                unit
            } else {
                Unit::of(difference).next().ok_or_else(not_a_number)?
            };
            match read(difference, trimmed, fallback)? {
                Entry::Read(typed) => PlusMinus::Absolute(typed.amount.si()),
                Entry::NotRead => return Ok(None),
            }
        }
    };
    let value = match plus_minus {
        PlusMinus::Absolute(value) | PlusMinus::Relative(value) => value,
    };
    if value < 0.0 { Err(not_a_number()) } else { Ok(Some(plus_minus)) }
}

/// The number's characters, its sign in front, and what stands behind it in lower case without spaces.
fn parts(text: &str) -> Result<(String, String), ReadError> {
    if text.chars().count() > LONGEST {
        return Err(ReadError::NotANumber { text: shortened(text) });
    }
    let mut number = String::new();
    let mut suffix = String::new();
    let mut negative = false;
    for (at, character) in text.char_indices() {
        let in_number = suffix.is_empty();
        match character {
            '-' | '−' | '–' | '—' | '‐' | '‑' | '﹣' | '－'
                if in_number && number.is_empty() && !negative =>
            {
                negative = true;
            }
            '-' | '−' | '–' | '—'
                if in_number
                    && !number.is_empty()
                    && !negative
                    && text[at..].chars().count() == 1 =>
            {
                negative = true;
            }
            '+' if in_number && number.is_empty() => {}
            '0'..='9' | '.' | ',' if in_number => number.push(character),
            // A space or an apostrophe may part thousands; it means nothing by itself.
            ' ' | '\u{a0}' | '\u{202f}' | '\u{2009}' | '_' => {}
            '\'' | '’'
                if in_number
                    && text[at..].chars().nth(1).is_some_and(|next| next.is_ascii_digit()) => {}
            'e' | 'E' if in_number && exponent_follows(&text[at..]) => {
                number.push_str(&text[at..].replace('−', "-"));
                break;
            }
            other if !number.is_empty() => suffix.extend(other.to_lowercase()),
            _ => return Err(ReadError::NotANumber { text: shortened(text) }),
        }
    }
    if !number.chars().any(|character| character.is_ascii_digit()) {
        return Err(ReadError::NotANumber { text: shortened(text) });
    }
    Ok((if negative { format!("-{number}") } else { number }, suffix))
}

/// `e-3` at the end of the text, as programs write small numbers.
fn exponent_follows(rest: &str) -> bool {
    let digits = rest[1..].trim_start_matches(['-', '+', '−']);
    !digits.is_empty() && digits.chars().all(|character| character.is_ascii_digit())
}

/// The unit that a person typed behind a number of this kind.
fn typed_unit(kind: Kind, suffix: &str) -> Result<&'static Unit, ReadError> {
    let suffix = suffix.trim_end_matches('.');
    Unit::of(kind)
        .find(|unit| unit.is_spelt(suffix))
        .ok_or_else(|| ReadError::UnknownUnit { unit: suffix.to_owned(), kind: kind.label() })
}

/// The value, and whether a comma was its decimal mark.
fn number_of(kind: Kind, unit: &Unit, text: &str, number: &str) -> Result<(f64, bool), ReadError> {
    let marks = number.matches(['.', ',']).count();
    let comma = number.contains(',');
    let parse = |text: &str| text.parse::<f64>().ok().filter(|value| value.is_finite());
    let not_a_number = || ReadError::NotANumber { text: shortened(text) };
    if marks > 1 {
        // "1.234,5" or "1,234.5": two readings, whichever mark parts the decimals.
        let without: String = number.chars().filter(|c| !matches!(c, '.' | ',')).collect();
        let last = number.rfind(['.', ',']).ok_or_else(not_a_number)?;
        let as_decimal: String = number
            .char_indices()
            .filter_map(|(at, c)| match c {
                '.' | ',' if at == last => Some('.'),
                '.' | ',' => None,
                other => Some(other),
            })
            .collect();
        return Err(ReadError::Ambiguous {
            text: shortened(text),
            one: as_decimal,
            other: without,
        });
    }
    let plain = number.replace(',', ".");
    let value = parse(&plain).ok_or_else(not_a_number)?;
    if let Some((whole, decimals)) = plain.split_once('.') {
        let whole = whole.trim_start_matches('-');
        let could_be_thousands = decimals.len() == 3
            && decimals.chars().all(|c| c.is_ascii_digit())
            && (1..=3).contains(&whole.len())
            && !whole.starts_with('0');
        // Where an instrument shows three decimals (1.013 bar, 1.204 kg/m³) there is nothing to doubt.
        if could_be_thousands && unit.decimals(kind) < 3 {
            return Err(ReadError::Ambiguous {
                text: shortened(text),
                one: format!("{whole}.{decimals}0"),
                other: format!("{whole}{decimals}"),
            });
        }
    }
    Ok((value, comma))
}

/// At most as much of a text as belongs in a sentence.
fn shortened(text: &str) -> String {
    let text = text.trim();
    if text.chars().count() <= 24 {
        text.to_owned()
    } else {
        text.chars().take(23).collect::<String>() + "…"
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn unit(id: &str) -> &'static Unit {
        Unit::find(id).unwrap()
    }

    fn value(kind: Kind, text: &str, id: &str) -> f64 {
        match read(kind, text, unit(id)).unwrap() {
            Entry::Read(typed) => typed.value,
            Entry::NotRead => panic!("{text} was not read"),
        }
    }

    #[test]
    fn blank_is_not_read() {
        for blank in ["", "  ", "\u{a0}"] {
            assert_eq!(read(Kind::Temperature, blank, unit("degC")), Ok(Entry::NotRead));
        }
    }

    #[test]
    fn both_marks_and_every_minus_are_read() {
        for text in ["-17.5", "−17.5", "–17,5", "17.5-", "17,5−", " - 17.5 "] {
            assert!((value(Kind::Temperature, text, "degC") + 17.5).abs() < 1e-12, "{text}");
        }
        assert!((value(Kind::AirFlow, "12 400", "cfm") - 12_400.0).abs() < 1e-9);
        assert!((value(Kind::AirFlow, "12’400", "cfm") - 12_400.0).abs() < 1e-9);
        assert!((value(Kind::HumidityRatio, "9.1e-3", "kg/kg") - 9.1e-3).abs() < 1e-15);
    }

    #[test]
    fn a_unit_typed_with_the_number_wins() {
        let cases = [
            (Kind::Temperature, "55 F", "degC", "degF"),
            (Kind::Temperature, "55°F", "degC", "degF"),
            (Kind::Temperature, "25C", "degF", "degC"),
            (Kind::AirFlow, "12400 cfm", "L/s", "cfm"),
            (Kind::AirFlow, "12400cfm", "L/s", "cfm"),
            (Kind::Pressure, "83.4 kPa", "inHg", "kPa"),
            (Kind::Pressure, "29.42 inHg", "kPa", "inHg"),
            (Kind::Power, "3 tons", "kW", "ton"),
            (Kind::WaterFlow, "24 gpm", "L/s", "gal/min"),
            (Kind::RelativeHumidity, "45 %", "1", "%"),
            (Kind::Elevation, "5280 ft", "m", "ft"),
        ];
        for (kind, text, field, used) in cases {
            let Entry::Read(typed) = read(kind, text, unit(field)).unwrap() else {
                panic!("{text}")
            };
            assert_eq!((typed.unit.id, typed.unit_typed), (used, true), "{text}");
        }
    }

    #[test]
    fn what_could_be_two_numbers_is_refused_with_both() {
        let both = |kind, text, id| match read(kind, text, unit(id)) {
            Err(ReadError::Ambiguous { one, other, .. }) => (one, other),
            other => panic!("{text}: {other:?}"),
        };
        assert_eq!(both(Kind::AirFlow, "10,000", "cfm"), ("10.0000".into(), "10000".into()));
        assert_eq!(both(Kind::AirFlow, "1.234,5", "cfm"), ("1234.5".into(), "12345".into()));
        // Three decimals are what these show.
        assert!((value(Kind::Density, "1,204", "kg/m3") - 1.204).abs() < 1e-12);
        assert!((value(Kind::Pressure, "14.696", "psi") - 14.696).abs() < 1e-12);
        assert!((value(Kind::Temperature, "0.125", "degC") - 0.125).abs() < 1e-12);
    }

    #[test]
    fn a_unit_of_something_else_is_named() {
        let error = read(Kind::Temperature, "55 cfm", unit("degF")).unwrap_err();
        assert_eq!(
            error.to_string(),
            "“cfm” is not a unit of temperature here. Choose one beside the field."
        );
        assert!(matches!(read(Kind::Power, "x", unit("kW")), Err(ReadError::NotANumber { .. })));
    }

    #[test]
    fn a_plus_minus_is_absolute_or_a_share() {
        let k = unit("K");
        assert_eq!(
            read_plus_minus(Kind::Temperature, "0.3", k).unwrap(),
            Some(PlusMinus::Absolute(0.3))
        );
        assert_eq!(
            read_plus_minus(Kind::AirFlow, "5 %", unit("cfm")).unwrap(),
            Some(PlusMinus::Relative(0.05))
        );
        assert_eq!(
            read_plus_minus(Kind::RelativeHumidity, "2 %", unit("%")).unwrap(),
            Some(PlusMinus::Absolute(0.02))
        );
        assert_eq!(read_plus_minus(Kind::Temperature, "", k).unwrap(), None);
        assert!(read_plus_minus(Kind::Temperature, "-0.3", k).is_err());
        // °F beside a ± is a difference.
        let Some(PlusMinus::Absolute(half)) =
            read_plus_minus(Kind::Temperature, "0.9 °F", k).unwrap()
        else {
            panic!()
        };
        assert!((half - 0.5).abs() < 1e-12);
    }
}
