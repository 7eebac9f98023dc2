//! Several takes of one reading: mean, scatter, drift, and whether it was steady.
//!
//! Slope by least squares over time. Drift is the slope times the time from the first take to the last.
//! *Steady*: neither that drift nor the last step is more than the reading's own ± (without its calibration, which
//! is the same at every take). *Hunting*: not steady, and steps larger than that ± change direction at least twice.
//! *Drifting*: otherwise. Fewer than three takes, or less than half a minute: not judged. The rule is this project's.
//!
//! Readings that were taken together, take by take (voltage and current off one display), scatter together: their
//! covariance is estimated from the pairs and kept (JCGM 100:2008, 5.2 and H.2).

use crate::part::{Part, Source};

/// One take.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Take {
    /// Seconds from any fixed moment.
    pub at_s: f64,
    /// The reading in its stored SI unit.
    pub si: f64,
}

/// What several takes come to.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Summary {
    /// How many.
    pub count: usize,
    /// Their mean, in the stored SI unit.
    pub mean_si: f64,
    /// Standard deviation of one take; none of fewer than two.
    pub scatter_si: Option<f64>,
    /// Least-squares slope per second; none where all were taken at once.
    pub slope_si_per_s: Option<f64>,
    /// From the first to the last, s.
    pub lasted_s: f64,
    /// Mean time, s.
    pub middle_s: f64,
}

/// Whether a reading stood still.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Steadiness {
    /// It did.
    Steady,
    /// It moves one way.
    Drifting,
    /// It swings.
    Hunting,
    /// Too few takes, or too short a time.
    NotJudged,
}

/// The takes in the order of their time.
fn in_order(takes: &[Take]) -> Vec<Take> {
    let mut takes = takes.to_vec();
    takes.sort_by(|one, other| one.at_s.total_cmp(&other.at_s));
    takes
}

/// What the takes come to; none of none.
#[must_use]
#[expect(clippy::cast_precision_loss, reason = "a handful of takes")]
pub fn summary(takes: &[Take]) -> Option<Summary> {
    let takes = in_order(takes);
    let (first, last) = (takes.first()?, takes.last()?);
    let n = takes.len() as f64;
    let mean_si = takes.iter().map(|take| take.si).sum::<f64>() / n;
    let middle_s = takes.iter().map(|take| take.at_s).sum::<f64>() / n;
    let squares: f64 = takes.iter().map(|take| (take.si - mean_si).powi(2)).sum();
    let times: f64 = takes.iter().map(|take| (take.at_s - middle_s).powi(2)).sum();
    let both: f64 = takes.iter().map(|take| (take.at_s - middle_s) * (take.si - mean_si)).sum();
    Some(Summary {
        count: takes.len(),
        mean_si,
        scatter_si: (takes.len() > 1).then(|| (squares / (n - 1.0)).sqrt()),
        slope_si_per_s: (times > 0.0).then(|| both / times),
        lasted_s: last.at_s - first.at_s,
        middle_s,
    })
}

/// Whether the reading stood still, with the 95 % half-width of its own part.
#[must_use]
pub fn steadiness(takes: &[Take], own_half_width_si: f64) -> Steadiness {
    let ordered = in_order(takes);
    let Some(summary) = summary(takes) else { return Steadiness::NotJudged };
    if summary.count < 3 || summary.lasted_s < 30.0 {
        return Steadiness::NotJudged;
    }
    let steps: Vec<f64> = ordered.windows(2).map(|pair| pair[1].si - pair[0].si).collect();
    // A step of exactly the ± is within it, whatever the last bit of a subtraction says.
    let within = own_half_width_si * (1.0 + 1e-9) + 1e-12;
    let drift = summary.slope_si_per_s.unwrap_or(0.0).abs() * summary.lasted_s;
    if drift <= within && steps.last().is_some_and(|step| step.abs() <= within) {
        return Steadiness::Steady;
    }
    let large: Vec<f64> = steps.into_iter().filter(|step| step.abs() > within).collect();
    let turns = large.windows(2).filter(|pair| pair[0] * pair[1] < 0.0).count();
    if turns >= 2 { Steadiness::Hunting } else { Steadiness::Drifting }
}

/// Standard uncertainty of the mean from the scatter, and its degrees of freedom; none of fewer than two takes.
///
/// Two or three takes, or takes that all show the same number, say little of the scatter: it is then at least the
/// `repeatability` that is known of the instrument, and the step of its display over √12.
#[must_use]
#[expect(clippy::cast_precision_loss, reason = "a handful of takes")]
pub fn scatter_of_mean(
    takes: &[Take],
    repeatability_si: f64,
    resolution_si: f64,
) -> Option<(f64, f64)> {
    let summary = summary(takes)?;
    let mut scatter = summary.scatter_si?;
    if summary.count <= 3 || scatter < 0.5 * resolution_si {
        scatter = scatter.max(repeatability_si).max(resolution_si / 12.0_f64.sqrt());
    }
    let n = summary.count as f64;
    Some((scatter / n.sqrt(), n - 1.0))
}

/// Fewer takes than this say nothing of how two readings scatter together (a choice of this project).
pub const TOGETHER_FROM: usize = 5;

/// The scatter of several readings that were taken together, take by take: for each its parts, in independent sources
/// that they share, by the Cholesky factor of the covariance of their means. None where the counts differ or are
/// below [`TOGETHER_FROM`].
#[must_use]
#[expect(clippy::cast_precision_loss, reason = "a handful of takes")]
pub fn together(readings: &[&[f64]], id: &str, name: &str) -> Option<Vec<Vec<Part>>> {
    let count = readings.first()?.len();
    if count < TOGETHER_FROM || readings.iter().any(|values| values.len() != count) {
        return None;
    }
    let n = count as f64;
    let means: Vec<f64> = readings.iter().map(|values| values.iter().sum::<f64>() / n).collect();
    let covariance = |one: usize, other: usize| {
        let pairs = readings[one].iter().zip(readings[other]);
        pairs.map(|(a, b)| (a - means[one]) * (b - means[other])).sum::<f64>() / (n * (n - 1.0))
    };
    // Over as many entries as the shorter one has.
    let dot = |one: &[f64], other: &[f64]| one.iter().zip(other).map(|(a, b)| a * b).sum::<f64>();
    let mut factor: Vec<Vec<f64>> = Vec::with_capacity(readings.len());
    for row in 0..readings.len() {
        let mut line: Vec<f64> = Vec::with_capacity(row + 1);
        for (column, above) in factor.iter().enumerate() {
            let rest = covariance(row, column) - dot(&line, above);
            // A reading that is fully told by the ones before it adds no source of its own.
            line.push(if above[column] > 0.0 { rest / above[column] } else { 0.0 });
        }
        line.push((covariance(row, row) - dot(&line, &line)).max(0.0).sqrt());
        factor.push(line);
    }
    let part = |(column, u): (usize, &f64)| Part {
        source: Source::shared(format!("{id}/{column}"), name),
        u_si: *u,
        freedom: n - 1.0,
    };
    Some(factor.iter().map(|line| line.iter().enumerate().map(part).collect()).collect())
}

/// The reading at a moment between takes before and after it, by a straight line between the nearest two: A-B-A.
/// None where the moment is outside the takes.
#[must_use]
pub fn at(takes: &[Take], at_s: f64) -> Option<f64> {
    in_order(takes).windows(2).find_map(|pair| {
        let [before, after] = pair else { return None };
        if !(before.at_s..=after.at_s).contains(&at_s) {
            return None;
        }
        let span = after.at_s - before.at_s;
        let share = if span > 0.0 { (at_s - before.at_s) / span } else { 0.5 };
        Some(before.si + share * (after.si - before.si))
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    fn takes(values: &[f64]) -> Vec<Take> {
        let mut at_s = -20.0;
        values
            .iter()
            .map(|si| {
                at_s += 20.0;
                Take { at_s, si: *si }
            })
            .collect()
    }

    /// Worked by hand: 13.2 13.1 13.3 13.2 at 0, 20, 40, 60 s.
    #[test]
    fn mean_slope_and_drift() {
        let summary = summary(&takes(&[13.2, 13.1, 13.3, 13.2])).unwrap();
        assert!((summary.mean_si - 13.2).abs() < 1e-12);
        assert!((summary.slope_si_per_s.unwrap() - 0.001).abs() < 1e-12);
        assert!((summary.lasted_s - 60.0).abs() < 1e-12);
        assert!((summary.scatter_si.unwrap() - (0.02_f64 / 3.0).sqrt()).abs() < 1e-12);
    }

    #[test]
    fn steady_hunting_drifting() {
        let of = |values: &[f64]| steadiness(&takes(values), 0.15);
        assert_eq!(of(&[13.2, 13.1, 13.3, 13.2]), Steadiness::Steady);
        assert_eq!(of(&[13.0, 13.4, 12.9, 13.5]), Steadiness::Hunting);
        assert_eq!(of(&[13.0, 13.3, 13.6, 13.9]), Steadiness::Drifting);
        assert_eq!(of(&[13.0, 13.3]), Steadiness::NotJudged);
        let hurried: Vec<Take> = takes(&[1.0, 1.0, 1.0])
            .iter()
            .map(|take| Take { at_s: take.at_s / 4.0, ..*take })
            .collect();
        assert_eq!(steadiness(&hurried, 0.15), Steadiness::NotJudged);
    }

    #[test]
    fn takes_that_show_one_number_still_scatter_by_the_display() {
        let (u, freedom) = scatter_of_mean(&takes(&[20.0; 4]), 0.0, 0.1).unwrap();
        assert!((u - 0.1 / 12.0_f64.sqrt() / 2.0).abs() < 1e-12);
        assert!((freedom - 3.0).abs() < 1e-12);
        let (u, _) = scatter_of_mean(&takes(&[20.0, 20.1]), 0.3, 0.1).unwrap();
        assert!((u - 0.3 / 2.0_f64.sqrt()).abs() < 1e-12);
    }

    /// JCGM 100:2008 H.2: five simultaneous readings of voltage, current and phase.
    #[test]
    fn impedance_of_the_guide() {
        let volts = [5.007, 4.994, 5.005, 4.990, 4.999];
        let amperes = [19.663e-3, 19.639e-3, 19.640e-3, 19.685e-3, 19.678e-3];
        let radians = [1.0456, 1.0438, 1.0468, 1.0428, 1.0433];
        let parts = together(&[&volts, &amperes, &radians], "set", "display").unwrap();
        let u = |row: usize, column: usize| parts[row].get(column).map_or(0.0, |part| part.u_si);
        let of = |row: usize| (0..3).map(|column| u(row, column).powi(2)).sum::<f64>().sqrt();
        let r = |a: usize, b: usize| {
            (0..3).map(|column| u(a, column) * u(b, column)).sum::<f64>() / (of(a) * of(b))
        };
        // Table H.2: u 0.0032 V, 0.0095 mA, 0.00075 rad; r -0.36, 0.86, -0.65.
        assert!((of(0) - 0.0032).abs() < 5e-5 && (of(1) - 0.0095e-3).abs() < 5e-8);
        assert!((of(2) - 0.00075).abs() < 5e-6);
        for (found, printed) in [(r(0, 1), -0.36), (r(0, 2), 0.86), (r(1, 2), -0.65)] {
            assert!((found - printed).abs() < 0.006, "{found} against {printed}");
        }
        // Table H.3: R 127.732 Ω, u 0.071; X 219.847, u 0.295; Z 254.260, u 0.236.
        let mean = |values: &[f64; 5]| values.iter().sum::<f64>() / 5.0;
        let centre = [mean(&volts), mean(&amperes), mean(&radians)];
        let model = |x: [f64; 3]| [x[0] / x[1] * x[2].cos(), x[0] / x[1] * x[2].sin(), x[0] / x[1]];
        let expected = [(127.732, 0.071), (219.847, 0.2955), (254.260, 0.236)];
        for (output, (value, doubt)) in expected.into_iter().enumerate() {
            assert!((model(centre)[output] - value).abs() < 6e-4);
            let variance: f64 = (0..3)
                .map(|column| {
                    let side = |sign: f64| {
                        let mut x = centre;
                        for (row, x) in x.iter_mut().enumerate() {
                            *x += sign * u(row, column);
                        }
                        model(x)[output]
                    };
                    (0.5 * (side(1.0) - side(-1.0))).powi(2)
                })
                .sum();
            assert!((variance.sqrt() - doubt).abs() < 6e-4, "{}", variance.sqrt());
        }
        assert!(together(&[&volts[..4], &amperes[..4]], "set", "display").is_none());
    }

    #[test]
    fn the_first_reading_at_the_second_ones_time() {
        let a = [Take { at_s: 0.0, si: 24.0 }, Take { at_s: 120.0, si: 24.6 }];
        assert!((at(&a, 40.0).unwrap() - 24.2).abs() < 1e-12);
        assert_eq!(at(&a, 130.0), None);
    }
}
