//! Independent contributions put together, and how wide an interval that asks for.

use statrs::distribution::{ContinuousCDF, StudentsT};

use super::COVERAGE_95;

/// Contributions put together.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Combined {
    /// Standard uncertainty, in the unit of the contributions.
    pub u: f64,
    /// Effective degrees of freedom; infinite where no contribution has any.
    pub freedom: f64,
    /// Half-width of the 95 % interval over `u`.
    pub k: f64,
}

/// Independent contributions with their degrees of freedom, in quadrature; the effective degrees of freedom by
/// Welch-Satterthwaite, `u^4 / sum(c^4 / nu)` (JCGM 100:2008 G.4.1), not rounded down.
pub fn combine(parts: impl IntoIterator<Item = (f64, f64)>) -> Combined {
    let (mut variance, mut weighed) = (0.0, 0.0);
    for (part, freedom) in parts {
        let square = part * part;
        variance += square;
        if freedom.is_finite() {
            weighed += square * square / freedom;
        }
    }
    let freedom = if weighed > 0.0 { variance * variance / weighed } else { f64::INFINITY };
    Combined { u: variance.sqrt(), freedom, k: quantile(freedom) }
}

/// Half-width of the 95 % interval over the standard uncertainty with these degrees of freedom (Student's t).
#[must_use]
pub fn quantile(freedom: f64) -> f64 {
    // From there on the two differ by less than their sixth digit.
    if freedom > 1e6 {
        return COVERAGE_95;
    }
    StudentsT::new(0.0, 1.0, freedom).map_or(COVERAGE_95, |t| t.inverse_cdf(0.975))
}

#[cfg(test)]
mod tests {
    use super::*;

    /// JCGM 100:2008 H.1 (end gauge): 25, 9.7, 2.9 and 16.6 nm with 18, 25.6, 50 and 2 degrees of freedom make 32 nm with
    /// 16 (quoted from memory; worked out in full 31.67 nm and 16.76).
    #[test]
    fn the_end_gauge_of_the_guide() {
        let combined = combine([(25.0, 18.0), (9.7, 25.6), (2.9, 50.0), (16.6, 2.0)]);
        assert!((combined.u - 31.67).abs() < 0.01, "{}", combined.u);
        assert!((combined.freedom - 16.76).abs() < 0.03, "{}", combined.freedom);
    }

    /// JCGM 100:2008 table G.2: t for 95 % with 4, 10 and 50 degrees of freedom.
    #[test]
    fn quantiles_of_students_t() {
        for (freedom, k) in [(4.0, 2.78), (10.0, 2.23), (50.0, 2.01), (f64::INFINITY, 1.960)] {
            assert!((quantile(freedom) - k).abs() < 0.005, "{freedom}: {}", quantile(freedom));
        }
    }
}
