//! What a maker says of an instrument's accuracy, and the standard uncertainties that follow from it.
//!
//! A statement is kept as it is printed, in its own unit: `± a`, `± b of reading`, `± c of range`, counts, in one band
//! or several. `A = a + n d + c range` and `L = A + b |y|` (the parts add, as in the worked voltmeter of JCGM
//! 100:2008, 4.3.7), or the greater of the two where the paper says so. The share κ of it is calibration: the same at
//! every reading of this probe. `√κ A/q` moves all readings alike (offset), `√κ b y/q` in proportion (gain, with the
//! sign of y); what is left is new at each reading: `u² = (L/q)² - κ (A/q)² - κ (b y/q)² + d²/12`. So the total is the
//! statement, whatever κ is, and nothing cancels more than it should.
//!
//! The divisor q: limits √3 (rectangular, JCGM 100:2008 4.3.7; taken where the paper does not say), 95 % 1.96, one
//! standard deviation 1. A share of the reading depends on where the scale begins: it is taken of the number in the
//! statement's own unit.

use dewledger_quantities::{Kind, Unit};

use crate::doubt::COVERAGE_95;
use crate::part::{Part, Source};

/// How much of a statement is calibration, where nothing better is known (a choice of this project).
pub const USUAL_CALIBRATION_SHARE: f64 = 0.8;

/// An accuracy statement in its own unit.
#[derive(Debug, Clone, PartialEq)]
pub struct Statement {
    /// The unit that its numbers are in.
    pub unit: &'static Unit,
    /// Bands of the reading, the narrowest first; the last one has no end.
    pub bands: Vec<Band>,
    /// The instrument's range, in `unit`; wanted where a band has a share of it.
    pub range: Option<f64>,
    /// The step of its display, in `unit`; 0 is not known.
    pub resolution: f64,
    /// What its width means.
    pub coverage: Coverage,
    /// Share of it that is calibration, 0 to 1.
    pub calibration_share: f64,
}

/// One band of a statement.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Band {
    /// It holds up to this reading, by magnitude, in the statement's unit; none: however far.
    pub up_to: Option<f64>,
    /// `a`, in the statement's unit.
    pub absolute: f64,
    /// `b`, share of the reading, 0 to 0.5.
    pub of_reading: f64,
    /// `c`, share of the range, 0 to 0.5.
    pub of_range: f64,
    /// `n`, steps of the display.
    pub counts: f64,
    /// The greater of the fixed part and the share of the reading counts, not their sum.
    pub greater: bool,
}

/// What the width of a statement means.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum Coverage {
    /// Never outside: rectangular. What is taken where the paper does not say.
    #[default]
    Limits,
    /// In 95 of 100 cases inside.
    NinetyFive,
    /// One standard deviation.
    OneSigma,
}

impl Coverage {
    /// Half-width over standard uncertainty.
    #[must_use]
    pub fn divisor(self) -> f64 {
        match self {
            Coverage::Limits => 3.0_f64.sqrt(),
            Coverage::NinetyFive => COVERAGE_95,
            Coverage::OneSigma => 1.0,
        }
    }
}

/// Why a statement cannot be.
#[derive(Debug, Clone, Copy, PartialEq, Eq, thiserror::Error)]
pub enum StatementError {
    /// A part below zero.
    #[error("No part of an accuracy can be negative.")]
    Negative,
    /// A share above one half.
    #[error("A share above 50 % is no accuracy. Check the number and its unit.")]
    TooLarge,
    /// A share of the range without a range.
    #[error("It gives a share of the range: give the range too.")]
    NoRange,
    /// Counts without a display step.
    #[error("It counts steps of the display: give the step too.")]
    NoResolution,
    /// Outside 0 to 1.
    #[error("The part that is calibration lies between 0 and 100 %.")]
    CalibrationShare,
    /// Nothing in it.
    #[error("Give at least one part of the accuracy.")]
    Empty,
    /// Bands not in order, or the last one ends.
    #[error("Put the bands in order; the last one has no upper end.")]
    Bands,
}

impl Statement {
    /// Whether it can be.
    ///
    /// # Errors
    ///
    /// [`StatementError`], the first thing found.
    pub fn check(&self) -> Result<(), StatementError> {
        let numbers = |band: &Band| [band.absolute, band.of_reading, band.of_range, band.counts];
        let all = || self.bands.iter().flat_map(numbers);
        let beside = [self.resolution, self.range.unwrap_or(0.0), self.calibration_share];
        if all().chain(beside).any(|number| number < 0.0 || !number.is_finite()) {
            return Err(StatementError::Negative);
        }
        if self.bands.iter().any(|band| band.of_reading > 0.5 || band.of_range > 0.5) {
            return Err(StatementError::TooLarge);
        }
        if self.calibration_share > 1.0 {
            return Err(StatementError::CalibrationShare);
        }
        if self.bands.iter().any(|band| band.of_range > 0.0) && self.range.unwrap_or(0.0) <= 0.0 {
            return Err(StatementError::NoRange);
        }
        if self.bands.iter().any(|band| band.counts > 0.0) && self.resolution <= 0.0 {
            return Err(StatementError::NoResolution);
        }
        let width = |band: &Band| numbers(band).into_iter().sum::<f64>();
        if self.bands.is_empty() || self.bands.iter().any(|band| width(band) <= 0.0) {
            return Err(StatementError::Empty);
        }
        let ends: Vec<f64> =
            self.bands.iter().map(|band| band.up_to.unwrap_or(f64::INFINITY)).collect();
        let ordered = ends.windows(2).all(|pair| pair[0] < pair[1]);
        if !ordered || ends.last().is_some_and(|end| end.is_finite()) {
            return Err(StatementError::Bands);
        }
        Ok(())
    }

    /// Half-width of the statement at a reading, both in its unit.
    #[must_use]
    pub fn half_width(&self, reading: f64) -> f64 {
        let (fixed, share, _) = self.at(reading);
        fixed + share
    }

    /// Fixed and proportional part at a reading, in the statement's unit, and its sign.
    fn at(&self, reading: f64) -> (f64, f64, f64) {
        let band = self
            .bands
            .iter()
            .find(|band| band.up_to.is_none_or(|end| reading.abs() <= end))
            .or(self.bands.last())
            .copied()
            .unwrap_or_default();
        let fixed = band.absolute
            + band.counts * self.resolution
            + band.of_range * self.range.unwrap_or(0.0);
        let share = band.of_reading * reading.abs();
        match (band.greater, fixed >= share) {
            (true, true) => (fixed, 0.0, reading.signum()),
            (true, false) => (0.0, share, reading.signum()),
            (false, _) => (fixed, share, reading.signum()),
        }
    }

    /// The sources of doubt of a reading of `kind`, `si` in its stored unit, of the probe `probe` that is called `name`.
    /// None where the statement's unit does not measure that kind.
    #[must_use]
    pub fn parts(&self, kind: Kind, si: f64, probe: &str, name: &str) -> Option<Vec<Part>> {
        let reading = self.unit.from_si(kind, si)?;
        // One step of the unit as a difference, in stored SI.
        let step = self.unit.to_si(kind, reading + 1.0)? - si;
        let q = self.coverage.divisor();
        let (fixed, share, sign) = self.at(reading);
        let kappa = self.calibration_share;
        let (offset, gain) = (kappa.sqrt() * fixed / q, kappa.sqrt() * share / q);
        let own = ((fixed + share) / q).powi(2) - offset.powi(2) - gain.powi(2)
            + self.resolution.powi(2) / 12.0;
        let shared = |part: &str, u: f64| {
            Part::certain(
                Source::shared(format!("{probe}/{part}"), format!("{name}: calibration")),
                u * step,
            )
        };
        let parts = [
            Part::certain(Source::Own, own.max(0.0).sqrt() * step),
            shared("offset", offset),
            shared("gain", sign * gain),
        ];
        Some(parts.into_iter().filter(|part| part.u_si != 0.0).collect())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn statement(unit: &str, band: Band) -> Statement {
        Statement {
            unit: Unit::find(unit).unwrap(),
            bands: vec![band],
            range: None,
            resolution: 0.0,
            coverage: Coverage::Limits,
            calibration_share: USUAL_CALIBRATION_SHARE,
        }
    }

    fn near(one: f64, other: f64, relative: f64) {
        assert!((one - other).abs() <= relative * other.abs(), "{one} against {other}");
    }

    /// JCGM 100:2008, 4.3.7: 14e-6 of the reading and 2e-6 of a 1 V range at 0.928571 V: 15 µV, u = 8.7 µV.
    #[test]
    fn parts_add_as_in_the_voltmeter_of_the_guide() {
        let voltmeter = Statement {
            range: Some(1.0),
            ..statement("V", Band { of_reading: 14e-6, of_range: 2e-6, ..Band::default() })
        };
        near(voltmeter.half_width(0.928_571), 15e-6, 1e-6);
        let parts = voltmeter.parts(Kind::Voltage, 0.928_571, "m", "voltmeter").unwrap();
        let variance: f64 = parts.iter().map(|part| part.u_si.powi(2)).sum();
        near(variance.sqrt(), 8.7e-6, 5e-3);
        near(variance.sqrt(), 8.660_254e-6, 1e-6);
    }

    #[test]
    fn the_total_is_the_statement_whatever_is_shared() {
        for kappa in [0.0, 0.3, 0.8, 1.0] {
            let statement = Statement {
                range: Some(5.0),
                calibration_share: kappa,
                ..statement("Pa", Band { of_reading: 0.004, of_range: 0.004, ..Band::default() })
            };
            let parts = statement.parts(Kind::PressureDifference, 2.0, "m", "gauge").unwrap();
            let variance: f64 = parts.iter().map(|part| part.u_si.powi(2)).sum();
            near(variance.sqrt(), 0.028 / 3.0_f64.sqrt(), 1e-12);
        }
    }

    /// Worked by hand: 0.4 % of reading and 0.4 % of range 5, step 0.01, κ 0.8, at 2.0.
    #[test]
    fn offset_gain_and_own_part() {
        let statement = Statement {
            range: Some(5.0),
            resolution: 0.01,
            ..statement("Pa", Band { of_reading: 0.004, of_range: 0.004, ..Band::default() })
        };
        let at = |y: f64| {
            let parts = statement.parts(Kind::PressureDifference, y, "m", "gauge").unwrap();
            [parts[0].u_si, parts[1].u_si, parts[2].u_si]
        };
        let [own, offset, gain] = at(2.0);
        near(offset, 0.010_327_955_589_9, 1e-9);
        near(gain, 0.004_131_182_24, 1e-8);
        near(own, 0.012_080_287_0, 1e-8);
        // The gain keeps the sign of the reading: two readings on both sides of zero err apart.
        assert!(at(-1.5)[2] < 0.0);
    }

    /// A share of the reading means what the paper's scale means: 0.5 % at 25 °C is 0.125 K, in °F 0.385 °F.
    #[test]
    fn a_share_of_a_temperature_is_of_the_papers_scale() {
        let band = Band { of_reading: 0.005, ..Band::default() };
        let u = |unit| {
            let parts = statement(unit, band).parts(Kind::Temperature, 298.15, "m", "probe");
            parts.unwrap().iter().map(|part| part.u_si.powi(2)).sum::<f64>().sqrt()
        };
        near(u("degC"), 0.125 / 3.0_f64.sqrt(), 1e-9);
        near(u("degF"), 0.385 / 1.8 / 3.0_f64.sqrt(), 1e-9);
    }

    #[test]
    fn the_greater_part_and_the_band_that_holds() {
        let mut hood =
            statement("L/s", Band { up_to: Some(100.0), absolute: 5.0, ..Band::default() });
        hood.bands.push(Band { absolute: 3.0, of_reading: 0.03, greater: true, ..Band::default() });
        assert!(hood.check().is_ok());
        near(hood.half_width(80.0), 5.0, 1e-12);
        near(hood.half_width(101.0), 3.03, 1e-12);
        near(hood.half_width(400.0), 12.0, 1e-12);
    }

    #[test]
    fn what_no_paper_can_say_is_refused() {
        let good = Band { absolute: 0.2, ..Band::default() };
        let refused = |change: &dyn Fn(&mut Statement)| {
            let mut one = statement("degC", good);
            change(&mut one);
            one.check().unwrap_err()
        };
        assert_eq!(refused(&|s| s.bands[0].absolute = -0.2), StatementError::Negative);
        assert_eq!(refused(&|s| s.bands[0].of_reading = 0.6), StatementError::TooLarge);
        assert_eq!(refused(&|s| s.bands[0].of_range = 0.1), StatementError::NoRange);
        assert_eq!(refused(&|s| s.bands[0].counts = 2.0), StatementError::NoResolution);
        assert_eq!(refused(&|s| s.calibration_share = 1.2), StatementError::CalibrationShare);
        assert_eq!(refused(&|s| s.bands[0].absolute = 0.0), StatementError::Empty);
        assert_eq!(refused(&|s| s.bands.push(good)), StatementError::Bands);
        assert_eq!(refused(&|s| s.bands[0].up_to = Some(3.0)), StatementError::Bands);
    }
}
