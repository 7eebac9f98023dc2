//! The combined share: least variance, with what the methods share.

use dewledger_quantities::{Pressure, Quantity, Ratio, Sentence, Share};

use super::methods::{Corners, Method, MethodKind, methods};
use super::{OutdoorShare, SHARE};
use crate::doubt::terms;
use crate::given::{Given, Moved};
use crate::least_variance::solve;
use crate::outcome::{Figure, Note, Outcome, Role};

/// Beyond this a method does not fit the mean.
const DOES_NOT_FIT: f64 = 2.0;

/// The combined share; none where the ± of the readings are not all known, or only one method is left. Weights are found
/// once and kept while the readings are moved.
pub(super) fn combine(
    check: &OutdoorShare,
    given: &Given,
    here: Pressure,
    usable: &[Method],
    outcome: &mut Outcome,
) -> Option<Share> {
    let combined: Vec<&Method> = usable.iter().filter(|method| !method.kind.derived).collect();
    if combined.len() < 2 {
        return None;
    }
    let kept: Option<Vec<f64>> =
        combined.iter().map(|method| given.kept(&weight_key(method.kind))).collect();
    let weights = match kept {
        Some(weights) => weights,
        None => {
            let covariance = covariance(check, given, here, &combined)?;
            let weights = weights(&covariance)?;
            for ((method, weight), z) in
                combined.iter().zip(&weights).zip(consistency(&covariance, &weights, &combined))
            {
                outcome.kept.insert(weight_key(method.kind), *weight);
                outcome.kept.insert(z_key(method.kind), z);
            }
            weights
        }
    };
    let mean =
        combined.iter().zip(&weights).map(|(method, weight)| weight * method.share.si()).sum();
    for (method, weight) in combined.iter().zip(&weights) {
        outcome.push(
            Figure::new(
                format!("weight_{}", method.kind.key),
                format!("Weight of {}", method.kind.label.to_lowercase()),
                Share::from_si(*weight).amount(),
                SHARE,
            )
            .role(Role::Detail),
        );
        let z = outcome
            .kept
            .get(&z_key(method.kind))
            .copied()
            .or_else(|| given.kept(&z_key(method.kind)));
        if let Some(z) = z {
            fits(method.kind, z, outcome);
        }
    }
    Some(Share::from_si(mean))
}

fn fits(kind: &'static MethodKind, z: f64, outcome: &mut Outcome) {
    outcome.push(
        Figure::new(
            format!("z_{}", kind.key),
            format!("{} off the mean, in its own spread", kind.label),
            Ratio::from_si(z).amount(),
            SHARE,
        )
        .role(Role::Detail),
    );
    if z.abs() > DOES_NOT_FIT {
        outcome.notes.push(
            Note::unusual(
                format!("{}_does_not_fit", kind.key),
                "mixed.dry_bulb",
                Sentence::new("The share by {w0} does not fit the others.").word(kind.name),
            )
            .because(Sentence::new("With two methods neither can be told from the other. Take the mixed air again, by more points.")),
        );
    }
}

fn weight_key(kind: &MethodKind) -> String {
    format!("weight.{}", kind.key)
}

fn z_key(kind: &MethodKind) -> String {
    format!("z.{}", kind.key)
}

/// Covariance of the shares from every source of doubt; none where a reading's ± is not known.
fn covariance(
    check: &OutdoorShare,
    given: &Given,
    here: Pressure,
    combined: &[&Method],
) -> Option<Vec<Vec<f64>>> {
    let known = given.readings().all(|(key, reading)| {
        reading.half_width_si.is_some() || key.starts_with("pressure.") || key.ends_with("density")
    });
    if !known {
        return None;
    }
    let shares = |given: &Given| -> Option<Vec<f64>> {
        let corners = Corners::read(given, here).ok()?;
        let found = methods(given, here, &corners).ok()?;
        combined
            .iter()
            .map(|method| {
                let same = found.iter().find(|other| std::ptr::eq(other.kind, method.kind))?;
                Some(same.share.si())
            })
            .collect()
    };
    let mut covariance = vec![vec![0.0; combined.len()]; combined.len()];
    for term in terms(check, given) {
        let side = |sign: f64| {
            let moves: Vec<(Moved, f64)> =
                term.moves.iter().map(|(what, by)| (what.clone(), sign * by)).collect();
            shares(&given.moved(&moves))
        };
        let middle: Vec<f64> = combined.iter().map(|method| method.share.si()).collect();
        let effect: Vec<f64> = match (side(1.0), side(-1.0)) {
            (Some(up), Some(down)) => {
                up.iter().zip(&down).map(|(up, down)| 0.5 * (up - down)).collect()
            }
            (Some(up), None) => up.iter().zip(&middle).map(|(up, middle)| up - middle).collect(),
            (None, Some(down)) => {
                middle.iter().zip(&down).map(|(middle, down)| middle - down).collect()
            }
            (None, None) => continue,
        };
        for (row, one) in covariance.iter_mut().zip(&effect) {
            for (cell, other) in row.iter_mut().zip(&effect) {
                *cell += one * other;
            }
        }
    }
    Some(covariance)
}

/// Weights of least variance, `w = C^-1 1 / (1' C^-1 1)`; a method of negative weight is dropped and the rest weighed anew.
fn weights(covariance: &[Vec<f64>]) -> Option<Vec<f64>> {
    let mut left: Vec<usize> = (0..covariance.len()).collect();
    loop {
        let matrix: Vec<Vec<f64>> = left
            .iter()
            .map(|row| left.iter().map(|column| covariance[*row][*column]).collect())
            .collect();
        let solved = solve(matrix, vec![1.0; left.len()])?;
        let sum: f64 = solved.iter().sum();
        let lowest = solved
            .iter()
            .enumerate()
            .min_by(|one, other| (one.1 / sum).total_cmp(&(other.1 / sum)))
            .map(|(index, value)| (index, value / sum))?;
        if lowest.1 < 0.0 && left.len() > 1 {
            left.remove(lowest.0);
            continue;
        }
        let mut weights = vec![0.0; covariance.len()];
        for (index, value) in left.iter().zip(&solved) {
            weights[*index] = value / sum;
        }
        return Some(weights);
    }
}

/// How far each method lies from the mean, over the spread of that distance.
fn consistency(covariance: &[Vec<f64>], weights: &[f64], combined: &[&Method]) -> Vec<f64> {
    let mean: f64 = combined.iter().zip(weights).map(|(method, w)| w * method.share.si()).sum();
    (0..combined.len())
        .map(|index| {
            let e = |other: usize| f64::from(u8::from(other == index)) - weights[other];
            let variance: f64 = (0..combined.len())
                .flat_map(|row| (0..combined.len()).map(move |column| (row, column)))
                .map(|(row, column)| e(row) * covariance[row][column] * e(column))
                .sum();
            if variance > 0.0 { (combined[index].share.si() - mean) / variance.sqrt() } else { 0.0 }
        })
        .collect()
}
