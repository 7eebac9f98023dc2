//! Showing values: digits by quantity and unit, the same in every country.
//!
//! A true minus (U+2212), no-break spaces before the unit and in thousands. With a ±: two significant digits of
//! the ±, the value to the same place, rounding half up, one decimal fewer after a carry.

use crate::{Amount, Unit};

/// A value as shown.
#[derive(Debug, Clone, PartialEq)]
pub struct Shown {
    /// The number.
    pub number: String,
    /// Its unit.
    pub unit: &'static Unit,
}

impl Shown {
    /// Number and unit.
    #[must_use]
    pub fn text(&self) -> String {
        if self.unit.symbol.is_empty() {
            self.number.clone()
        } else {
            format!("{}\u{a0}{}", self.number, self.unit.symbol)
        }
    }
}

/// Shows a value to what a field instrument resolves, with at least three significant digits.
#[must_use]
pub fn show(amount: Amount, unit: &'static Unit) -> Shown {
    let value = unit.from_si(amount.kind(), amount.si()).unwrap_or(f64::NAN);
    Shown { number: number(value, decimals(amount, unit, value)), unit }
}

/// Shows a value with the half-width of its interval, both rounded to two digits of the half-width.
#[must_use]
pub fn show_with(amount: Amount, half_width_si: f64, unit: &'static Unit) -> (Shown, Shown) {
    let value = unit.from_si(amount.kind(), amount.si()).unwrap_or(f64::NAN);
    let width = unit.width_from_si(amount.kind(), half_width_si).unwrap_or(f64::NAN).abs();
    if !(width.is_finite() && width > 0.0) {
        return (show(amount, unit), Shown { number: "not\u{a0}known".to_owned(), unit });
    }
    let mut place = 1 - exponent(width);
    // 0.0996 rounds to 0.10, one place fewer.
    if exponent(rounded(width, place)) > exponent(width) {
        place -= 1;
    }
    let shown = |value: f64| Shown { number: at_place(value, place), unit };
    (shown(value), shown(width))
}

/// The shortest text that reads back to the same number, for files and programs: ASCII, never rounded.
#[must_use]
pub fn plain(amount: Amount, unit: &Unit) -> String {
    unit.from_si(amount.kind(), amount.si()).map_or_else(String::new, |value| format!("{value}"))
}

/// Decimals of the table, more where the value is small, none where it is large.
fn decimals(amount: Amount, unit: &Unit, value: f64) -> i32 {
    let table = i32::from(unit.decimals(amount.kind()));
    if !value.is_finite() || value == 0.0 {
        return table;
    }
    let magnitude = exponent(value.abs());
    // Three significant digits at least for what is small, four at least for powers and flows in large units.
    let wanted = if table == 0 { 2 - magnitude } else { (2 - magnitude).min(table + 3) };
    let temperature_like = matches!(
        amount.kind(),
        crate::Kind::Temperature
            | crate::Kind::TemperatureDifference
            | crate::Kind::RelativeHumidity
            | crate::Kind::Share
            | crate::Kind::Enthalpy
            | crate::Kind::EnthalpyDifference
            | crate::Kind::Ratio
    );
    if temperature_like { table } else { table.max(wanted.min(table + 3)) }
}

/// The power of ten of the first significant digit.
fn exponent(value: f64) -> i32 {
    // The text form is exact where a logarithm can be off by one at powers of ten.
    let text = format!("{value:e}");
    text.split_once('e').and_then(|(_, exponent)| exponent.parse().ok()).unwrap_or(0)
}

fn rounded(value: f64, place: i32) -> f64 {
    let scale = 10_f64.powi(place);
    (value * scale + 0.5 * value.signum() * 1e-12).round() / scale
}

/// With so many decimals; below zero, rounded to tens and more.
fn at_place(value: f64, place: i32) -> String {
    if place >= 0 { number(value, place) } else { number(rounded(value, place), 0) }
}

/// A number with decimals, a true minus, thousands parted, no minus before a zero.
fn number(value: f64, decimals: i32) -> String {
    if !value.is_finite() {
        return "–".to_owned();
    }
    let decimals = usize::try_from(decimals.clamp(0, 12)).unwrap_or(0);
    // Half up in decimal, where the binary value of a typed 0.125 stands a hair below.
    let magnitude = value.abs() * (1.0 + 4.0 * f64::EPSILON);
    let text = format!("{magnitude:.decimals$}");
    let (whole, fraction) =
        text.split_once('.').map_or((text.as_str(), None), |(w, f)| (w, Some(f)));
    let mut grouped = String::new();
    for (at, digit) in whole.chars().enumerate() {
        if whole.len() > 4 && at > 0 && (whole.len() - at).is_multiple_of(3) {
            grouped.push('\u{a0}');
        }
        grouped.push(digit);
    }
    if let Some(fraction) = fraction {
        grouped.push('.');
        grouped.push_str(fraction);
    }
    let zero = !text.chars().any(|c| matches!(c, '1'..='9'));
    if value < 0.0 && !zero { format!("−{grouped}") } else { grouped }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::Kind;

    fn unit(id: &str) -> &'static Unit {
        Unit::find(id).unwrap()
    }

    /// Worked cases of the rule "two significant digits of the ±" (JCGM 100:2008 7.2.6 for the rule).
    #[test]
    fn a_value_is_rounded_with_its_plus_minus() {
        let cases = [
            (50_235.63, 2807.3, "50\u{a0}200", "2800"),
            (0.689_22, 0.0996, "0.69", "0.10"),
            (12.8, 0.0951, "12.800", "0.095"),
            (1.0, 0.009_95, "1.000", "0.010"),
            (-3.26, 0.31, "−3.26", "0.31"),
        ];
        for (value, width, shown, plus_minus) in cases {
            let (a, b) = show_with(Amount::new(Kind::Ratio, value), width, unit("1"));
            assert_eq!((a.number.as_str(), b.number.as_str()), (shown, plus_minus));
        }
    }

    #[test]
    fn a_width_converts_without_the_offset() {
        let (value, width) = show_with(Amount::new(Kind::Temperature, 293.15), 0.5, unit("degF"));
        assert_eq!((value.number.as_str(), width.number.as_str()), ("68.00", "0.90"));
    }

    #[test]
    fn digits_suit_the_unit() {
        let cases = [
            (Kind::Temperature, 299.816_667, "degF", "80.0\u{a0}°F"),
            (Kind::Temperature, 263.15, "degC", "−10.0\u{a0}°C"),
            (Kind::Power, 93_452.821, "kW", "93.5\u{a0}kW"),
            (Kind::Power, 93_452.821, "Btu/h", "318\u{a0}874\u{a0}Btu/h"),
            (Kind::Pressure, 83_427.577, "kPa", "83.43\u{a0}kPa"),
            (Kind::AirFlow, 5.852_148_3, "cfm", "12\u{a0}400\u{a0}cfm"),
            (Kind::HumidityRatio, 0.010_361_053, "gr/lb", "72.5\u{a0}gr/lb"),
            (Kind::HumidityRatio, 0.010_361_053, "g/kg", "10.36\u{a0}g/kg"),
            (Kind::Elevation, 1609.344, "ft", "5280\u{a0}ft"),
            (Kind::RelativeHumidity, 0.5, "%", "50.0\u{a0}%"),
            (Kind::Temperature, 273.149_999, "degC", "0.0\u{a0}°C"),
        ];
        for (kind, si, id, text) in cases {
            assert_eq!(show(Amount::new(kind, si), unit(id)).text(), text);
        }
    }

    #[test]
    fn plain_text_reads_back_to_the_same_number() {
        for value in [0.1, 83_427.577_123_4, 1e-9, -40.0] {
            let text = plain(Amount::new(Kind::PressureDifference, value), unit("Pa"));
            assert_eq!(text.parse::<f64>().unwrap().to_bits(), value.to_bits());
        }
    }
}
