//! Reading a ± as a person types it: a difference, or a share of its reading.

use crate::read::shortened;
use crate::{Entry, Kind, ReadError, Unit, read};

/// A ± as typed: absolute, or relative to its reading. Always above zero.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum PlusMinus {
    /// A half-width in stored SI units of the kind's difference.
    Absolute(f64),
    /// A share of the reading, 0.05 for 5 %.
    Relative(f64),
}

/// Reads a ± of a reading of `kind`: "0.3", "0.3 K", "0.5 °F", "5 %". Blank is not known. A number alone is in `unit`,
/// or in its steps where that is a unit of the reading (a ± beside °F is in Fahrenheit steps). "%" is a share of the
/// reading, but for relative humidity and other quantities that are themselves in per cent.
///
/// # Errors
///
/// [`ReadError`] with a sentence for the person: what [`read`] refuses, a ± at or below zero, and a share of a
/// quantity whose zero depends on its scale (5 % of 20 °C is another width than 5 % of 68 °F).
///
/// # Panics
///
/// Never: tests hold that per cent stands in the table and that every kind has a unit.
pub fn read_plus_minus(
    kind: Kind,
    text: &str,
    unit: &'static Unit,
) -> Result<Option<PlusMinus>, ReadError> {
    let trimmed = text.trim();
    let trimmed = ["±", "+/-", "+/−", "+-"]
        .iter()
        .find_map(|sign| trimmed.strip_prefix(sign))
        .unwrap_or(trimmed)
        .trim();
    if trimmed.is_empty() {
        return Ok(None);
    }
    let in_per_cent = unit.id == "%" || matches!(kind, Kind::RelativeHumidity | Kind::Share);
    if let Some(number) = trimmed.strip_suffix('%').filter(|_| !in_per_cent) {
        let per_cent = Unit::find("%").expect("it stands in the table");
        if Unit::of(kind).any(|unit| unit.is_shifted(kind)) {
            return Err(ReadError::ShareOfAScale { kind: kind.label() });
        }
        return match read(Kind::Share, number, per_cent)? {
            Entry::Read(typed) => {
                above_zero(typed.amount.si()).map(|share| Some(PlusMinus::Relative(share)))
            }
            Entry::NotRead => Err(ReadError::NotANumber { text: shortened(text) }),
        };
    }
    let difference = kind.difference();
    let field = if unit.measures(difference) { Some(unit) } else { unit.for_difference(kind) };
    let field = field.or_else(|| Unit::of(difference).next()).expect("every kind has a unit");
    match read(difference, trimmed, field)? {
        Entry::Read(typed) => {
            above_zero(typed.amount.si()).map(|width| Some(PlusMinus::Absolute(width)))
        }
        Entry::NotRead => Ok(None),
    }
}

fn above_zero(width: f64) -> Result<f64, ReadError> {
    if width > 0.0 { Ok(width) } else { Err(ReadError::NoWidth) }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn width(kind: Kind, text: &str, id: &str) -> Option<PlusMinus> {
        read_plus_minus(kind, text, Unit::find(id).unwrap()).unwrap()
    }

    fn absolute(kind: Kind, text: &str, id: &str) -> f64 {
        match width(kind, text, id) {
            Some(PlusMinus::Absolute(width)) => width,
            other => panic!("{text}: {other:?}"),
        }
    }

    #[test]
    fn a_plus_minus_is_absolute_or_a_share() {
        assert_eq!(width(Kind::Temperature, "0.3", "K"), Some(PlusMinus::Absolute(0.3)));
        assert_eq!(width(Kind::Temperature, "± 0,3 K", "K"), Some(PlusMinus::Absolute(0.3)));
        assert_eq!(
            width(Kind::Temperature, "+/- 0.3 °C", "degF_difference"),
            Some(PlusMinus::Absolute(0.3))
        );
        assert_eq!(width(Kind::AirFlow, "5 %", "cfm"), Some(PlusMinus::Relative(0.05)));
        assert_eq!(width(Kind::RelativeHumidity, "2 %", "%"), Some(PlusMinus::Absolute(0.02)));
        assert_eq!(width(Kind::RelativeHumidity, "2", "%"), Some(PlusMinus::Absolute(0.02)));
        assert_eq!(width(Kind::Ratio, "2 %", "%"), Some(PlusMinus::Absolute(0.02)));
        assert_eq!(width(Kind::Ratio, "2 %", "1"), Some(PlusMinus::Relative(0.02)));
        assert_eq!(width(Kind::HumidityRatio, "0.2", "g/kg"), Some(PlusMinus::Absolute(2e-4)));
        assert_eq!(width(Kind::Temperature, " ", "K"), None);
    }

    #[test]
    fn a_width_beside_a_scale_is_in_its_steps() {
        // 0.9 Fahrenheit steps are 0.5 K, whatever the zero.
        for (text, id) in
            [("0.9", "degF"), ("0.9 °F", "K"), ("0.9 °F", "degC"), ("0.9", "degF_difference")]
        {
            assert!((absolute(Kind::Temperature, text, id) - 0.5).abs() < 1e-12, "{text} in {id}");
        }
        assert!((absolute(Kind::Temperature, "0.5", "degC") - 0.5).abs() < 1e-12);
        // 1 Btu/lb is 2326 J/kg (NIST SP 811 B.8), without the 7.6857 between the two zeros.
        assert!((absolute(Kind::Enthalpy, "1", "Btu/lb") - 2326.0).abs() < 1e-6);
    }

    #[test]
    fn what_is_no_width_is_refused() {
        let error =
            |kind, text, id| read_plus_minus(kind, text, Unit::find(id).unwrap()).unwrap_err();
        for text in ["0", "-0.3", "0 %", "−5 %"] {
            assert_eq!(error(Kind::AirFlow, text, "cfm"), ReadError::NoWidth, "{text}");
        }
        assert!(matches!(error(Kind::Temperature, "2 %", "degC"), ReadError::ShareOfAScale { .. }));
        assert!(matches!(error(Kind::AirFlow, "%", "cfm"), ReadError::NotANumber { .. }));
        assert!(matches!(error(Kind::AirFlow, "3 kW", "cfm"), ReadError::OtherQuantity { .. }));
    }
}
