//! Estimates of one quantity put together by least variance (generalised least squares).
//!
//! Estimates y with covariance V: weights `w = V^-1 1 / (1' V^-1 1)`, mean `w' y`, `chi2 = r' V^-1 r`. Uncertainties that are
//! shares of each estimate would pull the mean outside of them where they are shared (Peelle's pertinent puzzle, nuclear-
//! data literature, from memory): so V is scaled to one size, `V_ij Q^2/(y_i y_j)`, and solved once more.

/// Solves `matrix x = right` by elimination with pivoting; for a handful of rows. None where it is singular.
#[must_use]
pub(crate) fn solve(mut matrix: Vec<Vec<f64>>, mut right: Vec<f64>) -> Option<Vec<f64>> {
    let n = right.len();
    for column in 0..n {
        let pivot = (column..n).max_by(|one, other| {
            matrix[*one][column].abs().total_cmp(&matrix[*other][column].abs())
        })?;
        if matrix[pivot][column].abs() < f64::MIN_POSITIVE {
            return None;
        }
        matrix.swap(column, pivot);
        right.swap(column, pivot);
        for row in column + 1..n {
            let factor = matrix[row][column] / matrix[column][column];
            let above = matrix[column].clone();
            for (cell, above) in matrix[row].iter_mut().zip(&above).skip(column) {
                *cell -= factor * above;
            }
            right[row] -= factor * right[column];
        }
    }
    for row in (0..n).rev() {
        let known: f64 = (row + 1..n).map(|column| matrix[row][column] * right[column]).sum();
        right[row] = (right[row] - known) / matrix[row][row];
    }
    Some(right)
}

/// What each source of doubt does to each estimate, by its own standard uncertainty.
pub(crate) struct Effects {
    /// Name of the source, and its effect on each estimate.
    pub(crate) sources: Vec<(String, Vec<f64>)>,
}

impl Effects {
    fn covariance(&self, count: usize) -> Vec<Vec<f64>> {
        let mut covariance = vec![vec![0.0; count]; count];
        for (_, effect) in &self.sources {
            for (row, one) in covariance.iter_mut().zip(effect) {
                for (cell, other) in row.iter_mut().zip(effect) {
                    *cell += one * other;
                }
            }
        }
        covariance
    }
}

/// A source that would explain why the estimates do not agree.
#[derive(Debug, Clone, PartialEq)]
pub(crate) struct Suspect {
    pub(crate) source: String,
    /// By how much it would have to be off, in its own standard uncertainty.
    pub(crate) shift: f64,
}

/// Estimates put together.
#[derive(Debug, Clone, PartialEq)]
pub(crate) struct Together {
    pub(crate) weights: Vec<f64>,
    pub(crate) mean: f64,
    /// Standard uncertainty of the mean.
    pub(crate) u: f64,
    pub(crate) chi2: f64,
    pub(crate) suspects: Vec<Suspect>,
}

/// `chi2` that 95 of 100 agreeing sets stay below, for 1 and 2 degrees of freedom.
const LIMITS: [f64; 2] = [3.841_459, 5.991_465];
/// Below this a source cannot be tested.
const TESTABLE: f64 = 0.01;

impl Together {
    /// Whether the estimates disagree by more than their doubt.
    pub(crate) fn disagree(&self) -> bool {
        let freedom = self.weights.len() - 1;
        LIMITS.get(freedom - 1).is_some_and(|limit| self.chi2 > *limit)
    }
}

/// Puts two or three estimates together. None where their covariance is singular.
#[must_use]
pub(crate) fn together(estimates: &[f64], effects: &Effects) -> Option<Together> {
    let covariance = effects.covariance(estimates.len());
    let (_, first) = mean(estimates, &covariance)?;
    // Once more with every uncertainty at the size of the first mean.
    let scaled: Vec<Vec<f64>> = covariance
        .iter()
        .zip(estimates)
        .map(|(row, one)| {
            row.iter()
                .zip(estimates)
                .map(|(cell, other)| cell * first * first / (one * other))
                .collect()
        })
        .collect();
    let (weights, mean) = mean(estimates, &scaled)?;
    let ones = solve(scaled.clone(), vec![1.0; estimates.len()])?;
    let variance = 1.0 / ones.iter().sum::<f64>();
    let rest: Vec<f64> = estimates.iter().map(|value| value - mean).collect();
    let weighed = solve(scaled.clone(), rest.clone())?;
    let chi2 = dot(&rest, &weighed);
    let suspects = suspects(estimates, effects, &scaled, &weighed, variance, first);
    Some(Together { weights, mean, u: variance.sqrt(), chi2, suspects })
}

fn dot(one: &[f64], other: &[f64]) -> f64 {
    one.iter().zip(other).map(|(a, b)| a * b).sum()
}

fn mean(estimates: &[f64], covariance: &[Vec<f64>]) -> Option<(Vec<f64>, f64)> {
    let solved = solve(covariance.to_vec(), vec![1.0; estimates.len()])?;
    let sum: f64 = solved.iter().sum();
    let weights: Vec<f64> = solved.iter().map(|value| value / sum).collect();
    let mean = dot(&weights, estimates);
    Some((weights, mean))
}

/// Readings, not estimates, are tested: one that moves two estimates together must not be blamed on the third.
fn suspects(
    estimates: &[f64],
    effects: &Effects,
    covariance: &[Vec<f64>],
    weighed: &[f64],
    variance: f64,
    size: f64,
) -> Vec<Suspect> {
    let tested: Vec<(String, f64, f64)> = effects
        .sources
        .iter()
        .filter_map(|(source, effect)| {
            let effect: Vec<f64> =
                effect.iter().zip(estimates).map(|(by, value)| by * size / value).collect();
            let inverse = solve(covariance.to_vec(), effect.clone())?;
            // c' V^-1 (V - 1 1' u^2) V^-1 c
            let sum: f64 = inverse.iter().sum();
            let testable = dot(&effect, &inverse) - variance * sum * sum;
            (testable > TESTABLE)
                .then(|| (source.clone(), dot(&effect, weighed) / testable.sqrt(), testable))
        })
        .collect();
    let most = tested.iter().map(|(_, z, _)| z * z).fold(0.0, f64::max);
    let mut suspects: Vec<Suspect> = tested
        .into_iter()
        .filter(|(_, z, _)| most - z * z < 2.0 && z.abs() > 1.64)
        .map(|(source, z, testable)| Suspect { source, shift: z.abs() / testable.sqrt() })
        .collect();
    suspects.sort_by(|one, other| one.shift.total_cmp(&other.shift));
    suspects
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Peelle's pertinent puzzle: 1.5 and 1.0 with 10 % of their own each and 20 % shared come to 0.882 where each share is
    /// taken at its own estimate, outside of both; scaled to one size they come to 1.25.
    #[test]
    fn shared_shares_do_not_pull_the_mean_outside() {
        let effects = Effects {
            sources: vec![
                ("one".to_owned(), vec![0.15, 0.0]),
                ("other".to_owned(), vec![0.0, 0.10]),
                ("shared".to_owned(), vec![0.30, 0.20]),
            ],
        };
        let (_, naive) = mean(&[1.5, 1.0], &effects.covariance(2)).unwrap();
        assert!((naive - 0.882_352_94).abs() < 1e-8, "{naive}");
        let together = together(&[1.5, 1.0], &effects).unwrap();
        assert!((together.mean - 1.25).abs() < 1e-12, "{}", together.mean);
    }
}
