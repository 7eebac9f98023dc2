//! Round numbers along a scale, in the person's unit.

use dewledger_quantities::{Amount, Kind, Unit, show_to};

/// Round numbers over a range.
#[derive(Debug, Clone, PartialEq)]
pub(crate) struct Scale {
    kind: Kind,
    unit: &'static Unit,
    /// Their step, in the unit.
    step: f64,
    /// From the first to the last multiple of the step.
    multiples: std::ops::RangeInclusive<i32>,
}

/// 1, 2 or 5 times a power of ten, so that `range` holds at most `most` steps of it.
fn round_step(range: f64, most: f64) -> f64 {
    let least = (range / most).max(f64::MIN_POSITIVE);
    let power = 10.0_f64.powf(least.log10().floor());
    [1.0, 2.0, 5.0, 10.0]
        .into_iter()
        .map(|times| times * power)
        .find(|step| *step >= least * (1.0 - 1e-9))
        .unwrap_or(10.0 * power)
}

impl Scale {
    /// The round numbers from `low` to `high` (stored SI), at most `most` steps; none where the range is empty or the unit
    /// does not measure the kind.
    pub(crate) fn over(
        kind: Kind,
        (low, high): (f64, f64),
        unit: &'static Unit,
        most: f64,
    ) -> Option<Self> {
        let (low, high) = (unit.from_si(kind, low)?, unit.from_si(kind, high)?);
        if !(low < high && low.is_finite() && high.is_finite()) {
            return None;
        }
        let step = round_step(high - low, most.max(1.0));
        let slack = 1e-9;
        Some(Self {
            kind,
            unit,
            step,
            multiples: whole((low / step - slack).ceil())..=whole((high / step + slack).floor()),
        })
    }

    /// The numbers as amounts.
    pub(crate) fn amounts(&self) -> impl Iterator<Item = Amount> + '_ {
        self.multiples.clone().filter_map(|multiple| {
            let si = self.unit.to_si(self.kind, f64::from(multiple) * self.step)?;
            Some(Amount::new(self.kind, si))
        })
    }

    /// A number of the scale as it is written beside it, to the place of the step.
    pub(crate) fn number(&self, amount: Amount) -> String {
        show_to(amount, self.decimals(), self.unit).number
    }

    /// The same with its unit.
    pub(crate) fn text(&self, amount: Amount) -> String {
        show_to(amount, self.decimals(), self.unit).text()
    }

    #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "between 0 and 12")]
    fn decimals(&self) -> u8 {
        (-(self.step.log10() + 1e-9).floor()).clamp(0.0, 12.0) as u8
    }

    /// The range widened outwards to whole steps, stored SI.
    pub(crate) fn widened(
        kind: Kind,
        range: (f64, f64),
        unit: &'static Unit,
        most: f64,
    ) -> Option<(f64, f64)> {
        let scale = Self::over(kind, range, unit, most)?;
        let at = |si: f64| unit.from_si(kind, si).map(|value| value / scale.step);
        let low = unit.to_si(kind, (at(range.0)? + 1e-9).floor() * scale.step)?;
        let high = unit.to_si(kind, (at(range.1)? - 1e-9).ceil() * scale.step)?;
        Some((low, high))
    }
}

#[expect(clippy::cast_possible_truncation, reason = "a cast saturates, and no scale has that many")]
fn whole(value: f64) -> i32 {
    value as i32
}

#[cfg(test)]
mod tests {
    use super::*;

    fn unit(id: &str) -> &'static Unit {
        Unit::find(id).unwrap()
    }

    fn numbers(kind: Kind, range: (f64, f64), id: &str, most: f64) -> Vec<String> {
        let scale = Scale::over(kind, range, unit(id), most).unwrap();
        scale.amounts().map(|amount| scale.number(amount)).collect()
    }

    #[test]
    fn numbers_are_round_in_the_unit_of_the_person() {
        let celsius = numbers(Kind::Temperature, (262.0, 301.0), "degC", 5.0);
        assert_eq!(celsius, ["−10", "0", "10", "20"]);
        let fahrenheit = numbers(Kind::Temperature, (283.15, 305.4), "degF", 4.0);
        assert_eq!(fahrenheit, ["60", "80"]);
        let small = numbers(Kind::HumidityRatio, (0.0, 0.0011), "g/kg", 5.0);
        assert_eq!(small, ["0.0", "0.5", "1.0"]);
        let pounds = numbers(Kind::HumidityRatio, (0.0, 0.02), "lb/lb", 5.0);
        assert_eq!(pounds, ["0.000", "0.005", "0.010", "0.015", "0.020"]);
    }

    #[test]
    fn a_range_is_widened_to_whole_steps() {
        let (low, high) =
            Scale::widened(Kind::Temperature, (275.0, 301.0), unit("degC"), 6.0).unwrap();
        assert!((low - 273.15).abs() < 1e-9 && (high - 303.15).abs() < 1e-9, "{low} {high}");
        let same = Scale::widened(Kind::Temperature, (low, high), unit("degC"), 6.0).unwrap();
        assert!((same.0 - low).abs() < 1e-9 && (same.1 - high).abs() < 1e-9);
    }

    #[test]
    fn no_range_has_no_numbers() {
        for range in [(1.0, 1.0), (2.0, 1.0), (f64::NAN, 1.0), (0.0, f64::INFINITY)] {
            assert_eq!(Scale::over(Kind::Power, range, unit("W"), 5.0), None);
        }
        assert_eq!(Scale::over(Kind::Power, (0.0, 1.0), unit("degC"), 5.0), None);
    }
}
