//! Showing values: digits by quantity and unit, the same in every country.
//!
//! A true minus (U+2212), no-break spaces before the unit and in thousands. With a ±: two significant digits of
//! the ±, the value to the same place, rounding half up, one decimal fewer after a carry.

use crate::decimal::Decimal;
use crate::{Amount, Kind, Unit};

/// A value as shown.
#[derive(Debug, Clone, PartialEq)]
pub struct Shown {
    /// The number; a dash where there is none.
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

/// Shows a value to what a field instrument resolves, and small values to three significant digits as far as three more
/// decimals give them (differences and shares: two digits, two more decimals). A value that is not a number, or in a
/// unit that does not measure it, is a dash.
///
/// # Example
///
/// ```
/// use dewledger_quantities::{Amount, Kind, Unit, show};
///
/// let shown = show(Amount::new(Kind::Temperature, 263.15), Unit::find("degC").expect("in the table"));
/// assert_eq!(shown.text(), "−10.0\u{a0}°C");
/// ```
#[must_use]
pub fn show(amount: Amount, unit: &'static Unit) -> Shown {
    let value = unit.from_si(amount.kind(), amount.si()).unwrap_or(f64::NAN);
    Shown { number: number(value, decimals(amount.kind(), unit, value)), unit }
}

/// Shows a value to a fixed number of decimals: the numbers along an axis, which all have the place of their step.
#[must_use]
pub fn show_to(amount: Amount, decimals: u8, unit: &'static Unit) -> Shown {
    let value = unit.from_si(amount.kind(), amount.si()).unwrap_or(f64::NAN);
    Shown { number: number(value, i32::from(decimals)), unit }
}

/// Shows a value with the half-width of its interval, both rounded to two digits of the half-width. The half-width
/// converts as a difference, without the scale's zero. Without one (zero, negative or not a number) the second text is
/// "not known", never ± 0.
#[must_use]
pub fn show_with(amount: Amount, half_width_si: f64, unit: &'static Unit) -> (Shown, Shown) {
    let value = unit.from_si(amount.kind(), amount.si()).unwrap_or(f64::NAN);
    let width = unit.width_from_si(amount.kind(), half_width_si).filter(|width| *width > 0.0);
    let Some(exact) = width.and_then(Decimal::of).filter(|exact| exact.exponent() > -LAST_PLACE)
    else {
        return (show(amount, unit), Shown { number: "not\u{a0}known".to_owned(), unit });
    };
    let mut place = 1 - exact.exponent();
    // 0.0996 rounds to 0.10, one place fewer.
    if exact.rounded(place).exponent() > exact.exponent() {
        place -= 1;
    }
    let half_width = Shown { number: exact.rounded(place).text(place), unit };
    (Shown { number: number(value, place), unit }, half_width)
}

/// No decimal is shown behind this one: a ± below it is no ±.
const LAST_PLACE: i32 = 18;

/// The shortest text that reads back to the same number, for files and programs: ASCII, never rounded. Empty where
/// there is no number.
#[must_use]
pub fn plain(amount: Amount, unit: &Unit) -> String {
    unit.from_si(amount.kind(), amount.si())
        .filter(|value| value.is_finite())
        // Adding zero takes the sign off a zero.
        .map_or_else(String::new, |value| format!("{}", value + 0.0))
}

/// Decimals of the table, and more where the value is small.
fn decimals(kind: Kind, unit: &Unit, value: f64) -> i32 {
    let table = i32::from(unit.decimals(kind));
    let Some(exact) = Decimal::of(value).filter(|exact| !exact.is_zero()) else { return table };
    let (digits, more) = match smallness(kind) {
        Smallness::Place => return table,
        Smallness::Hint => (2, 2),
        Smallness::Digits => (3, 3),
    };
    let wanted = (digits - 1 - exact.exponent()).clamp(table, table + more);
    // What is zero even so is noise: it gets no more zeros than others.
    if exact.rounded(wanted).is_zero() { table } else { wanted }
}

/// What a small value of a kind means.
enum Smallness {
    /// Nothing: the zero is a place on a scale, the instrument resolves there what it does elsewhere.
    Place,
    /// Near to the other: a hint of its size is enough.
    Hint,
    /// Little of it: it has three digits like much of it.
    Digits,
}

fn smallness(kind: Kind) -> Smallness {
    if matches!(
        kind,
        Kind::Temperature
            | Kind::RelativeHumidity
            | Kind::Enthalpy
            | Kind::WaterEnthalpy
            | Kind::Elevation
    ) {
        Smallness::Place
    } else if matches!(
        kind,
        Kind::TemperatureDifference
            | Kind::EnthalpyDifference
            | Kind::HumidityRatioDifference
            | Kind::Share
            | Kind::Ratio
    ) {
        Smallness::Hint
    } else {
        Smallness::Digits
    }
}

/// A number to a place, a true minus, thousands parted, no minus before a zero, a dash where there is none.
fn number(value: f64, place: i32) -> String {
    let Some(exact) = Decimal::of(value) else { return "–".to_owned() };
    let rounded = exact.rounded(place);
    let sign = if value < 0.0 && !rounded.is_zero() { "−" } else { "" };
    format!("{sign}{}", rounded.text(place))
}

#[cfg(test)]
mod tests {
    use super::*;

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
            (48_700.0, 9960.0, "49\u{a0}000", "10\u{a0}000"),
            (-3.26, 0.31, "−3.26", "0.31"),
            (0.001, 5.0, "0.0", "5.0"),
            (-0.04, 5.0, "0.0", "5.0"),
            (100.0, 0.105, "100.00", "0.11"),
            (12_345_678.0, 99.5, "12\u{a0}345\u{a0}680", "100"),
        ];
        for (value, width, shown, plus_minus) in cases {
            let (a, b) = show_with(Amount::new(Kind::Ratio, value), width, unit("1"));
            assert_eq!((a.number.as_str(), b.number.as_str()), (shown, plus_minus));
        }
    }

    #[test]
    fn a_plus_minus_is_never_zero() {
        for width in [0.0, -1.0, f64::NAN, f64::INFINITY, 1e-19] {
            let (value, plus_minus) = show_with(Amount::new(Kind::Power, 1000.0), width, unit("W"));
            assert_eq!(
                (value.number.as_str(), plus_minus.number.as_str()),
                ("1000", "not\u{a0}known")
            );
        }
        let (_, least) = show_with(Amount::new(Kind::Ratio, 0.0), 1e-15, unit("1"));
        assert_eq!(least.number, "0.0000000000000010");
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
            (Kind::Power, 35_168.528, "ton", "10.00\u{a0}refrigeration tons"),
        ];
        for (kind, si, id, text) in cases {
            assert_eq!(show(Amount::new(kind, si), unit(id)).text(), text);
        }
    }

    #[test]
    fn small_values_keep_digits_and_noise_does_not() {
        let cases = [
            (Kind::Power, 52.3, "kW", "0.0523\u{a0}kW"),
            (Kind::AirFlow, 0.0025, "cfm", "5.30\u{a0}cfm"),
            (Kind::HumidityRatio, 0.000_34, "g/kg", "0.340\u{a0}g/kg"),
            (Kind::Ratio, 0.0523, "1", "0.052"),
            (Kind::TemperatureDifference, 0.04, "K", "0.040\u{a0}K"),
            (Kind::TemperatureDifference, 3e-14, "K", "0.0\u{a0}K"),
            (Kind::Power, -1e-9, "kW", "0.0\u{a0}kW"),
            // On a scale the zero is a place like any other.
            (Kind::Temperature, 273.19, "degC", "0.0\u{a0}°C"),
        ];
        for (kind, si, id, text) in cases {
            assert_eq!(show(Amount::new(kind, si), unit(id)).text(), text);
        }
    }

    #[test]
    fn numbers_along_an_axis_have_the_place_of_their_step() {
        let at =
            |si, decimals| show_to(Amount::new(Kind::HumidityRatio, si), decimals, unit("g/kg"));
        assert_eq!(at(0.012, 0).text(), "12\u{a0}g/kg");
        assert_eq!(at(0.0005, 1).number, "0.5");
        let below = Amount::new(Kind::Temperature, 253.15);
        assert_eq!(show_to(below, 0, unit("degC")).number, "−20");
        // A tick at zero that rounding left a hair below it.
        assert_eq!(show_to(Amount::new(Kind::HumidityRatio, -1e-18), 0, unit("g/kg")).number, "0");
    }

    #[test]
    fn no_number_is_a_dash() {
        assert_eq!(show(Amount::new(Kind::Power, f64::NAN), unit("kW")).number, "–");
        assert_eq!(show(Amount::new(Kind::Power, 1.0), unit("degC")).number, "–");
        assert_eq!(plain(Amount::new(Kind::Power, f64::INFINITY), unit("kW")), "");
    }

    #[test]
    fn plain_text_reads_back_to_the_same_number() {
        for value in [0.1, 83_427.577_123_4, 1e-9, -40.0] {
            let text = plain(Amount::new(Kind::PressureDifference, value), unit("Pa"));
            assert_eq!(text.parse::<f64>().unwrap().to_bits(), value.to_bits());
        }
        assert_eq!(plain(Amount::new(Kind::PressureDifference, -0.0), unit("Pa")), "0");
    }
}
