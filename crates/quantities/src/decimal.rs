//! Decimal rounding for the screen: half up, on the fifteen digits that a floating-point number surely carries.

/// A magnitude as `digits * 10^power`, with fifteen significant digits.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Decimal {
    digits: u64,
    power: i32,
}

/// Significant digits kept. A sixteenth is noise of the conversion: a typed 0.125 may come back a hair below.
const SIGNIFICANT: usize = 15;

impl Decimal {
    /// The magnitude of a number; none for infinity and what is not a number.
    pub(crate) fn of(value: f64) -> Option<Self> {
        if !value.is_finite() {
            return None;
        }
        let text = format!("{:.*e}", SIGNIFICANT - 1, value.abs());
        let (mantissa, exponent) = text.split_once('e')?;
        let digits = mantissa.replace('.', "").parse().ok()?;
        let last = i32::try_from(SIGNIFICANT - 1).ok()?;
        Some(Self { digits, power: exponent.parse::<i32>().ok()? - last })
    }

    /// The power of ten of the first significant digit; zero for zero.
    pub(crate) fn exponent(self) -> i32 {
        self.digits.checked_ilog10().map_or(0, |log| i32::try_from(log).unwrap_or(0) + self.power)
    }

    /// Rounded half up to `place` decimals; below zero to tens, hundreds and so on.
    pub(crate) fn rounded(self, place: i32) -> Self {
        let dropped = -place - self.power;
        let Ok(dropped @ 1..) = u32::try_from(dropped) else { return self };
        let digits = 10_u64.checked_pow(dropped).map_or(0, |unit| {
            self.digits / unit + u64::from(self.digits % unit >= unit.div_ceil(2))
        });
        Self { digits, power: -place }
    }

    pub(crate) fn is_zero(self) -> bool {
        self.digits == 0
    }

    /// Its text with `place` decimals, or none from there down, thousands parted. It has been rounded to that place.
    pub(crate) fn text(self, place: i32) -> String {
        let decimals = usize::try_from(place).unwrap_or(0);
        let shift = self.power + i32::try_from(decimals).unwrap_or(0);
        let mut text = self.digits.to_string();
        if self.digits > 0 {
            text.extend(std::iter::repeat_n('0', usize::try_from(shift).unwrap_or(0)));
        }
        if text.len() <= decimals {
            text.insert_str(0, &"0".repeat(decimals + 1 - text.len()));
        }
        let (whole, fraction) = text.split_at(text.len() - decimals);
        let point = if fraction.is_empty() { "" } else { "." };
        format!("{}{point}{fraction}", grouped(whole))
    }
}

/// Digits with no-break spaces between thousands, from five digits on.
pub(crate) fn grouped(whole: &str) -> String {
    let mut grouped = String::with_capacity(whole.len() + 8);
    for (at, digit) in whole.chars().enumerate() {
        if whole.len() > 4 && at > 0 && (whole.len() - at).is_multiple_of(3) {
            grouped.push('\u{a0}');
        }
        grouped.push(digit);
    }
    grouped
}

#[cfg(test)]
mod tests {
    use super::*;

    fn shown(value: f64, place: i32) -> String {
        Decimal::of(value).unwrap().rounded(place).text(place)
    }

    #[test]
    fn halves_go_up_in_decimal() {
        // 1.005 and 2.675 are stored below the half, 0.125 exactly on it.
        for (value, place, text) in [
            (1.005, 2, "1.01"),
            (2.675, 2, "2.68"),
            (0.125, 2, "0.13"),
            (0.1 + 0.2, 1, "0.3"),
            (9.995, 2, "10.00"),
            (0.5, 0, "1"),
            (0.499_999, 0, "0"),
            (50.0, -2, "100"),
            (49.0, -2, "0"),
            (0.0, 2, "0.00"),
        ] {
            assert_eq!(shown(value, place), text, "{value} to {place}");
        }
    }

    #[test]
    fn large_and_small_numbers_keep_their_place() {
        assert_eq!(shown(1e18, 0), "1\u{a0}000\u{a0}000\u{a0}000\u{a0}000\u{a0}000\u{a0}000");
        assert_eq!(shown(1.5e-7, 8), "0.00000015");
        assert_eq!(shown(1e-30, 2), "0.00");
        assert_eq!(shown(f64::MIN_POSITIVE, 0), "0");
        assert_eq!(shown(12_345.678, 1), "12\u{a0}345.7");
        assert_eq!(shown(1234.5, 0), "1235");
        assert!(shown(f64::MAX, 0).starts_with("179\u{a0}769"));
    }

    #[test]
    fn exponents_are_exact_at_powers_of_ten() {
        for (value, exponent) in
            [(1.0, 0), (1000.0, 3), (999.999, 2), (0.001, -3), (1e-300, -300), (0.0, 0)]
        {
            assert_eq!(Decimal::of(value).unwrap().exponent(), exponent, "{value}");
        }
        assert!(Decimal::of(f64::NAN).is_none() && Decimal::of(f64::INFINITY).is_none());
    }
}
