//! Draws (Monte Carlo, JCGM 101:2008) where first order does not stand.
//!
//! Every source is drawn normal, scatter from repeats from Student's t with its degrees of freedom; the check is solved
//! at each draw; the interval is between the 2.5 % and 97.5 % of its results. Normal for a maker's limits is on the
//! wide side for one source and near the truth for several. A draw beyond saturation is saturated air at its dry
//! bulb. Draws that are refused for another reason are left out and counted.

use std::collections::BTreeMap;
use std::sync::atomic::{AtomicBool, Ordering};
use std::thread;

use rand_chacha::ChaCha8Rng;
use rand_chacha::rand_core::SeedableRng;
use rand_distr::{Distribution, StandardNormal, StudentT};

use super::{Term, first_order};
use crate::check::Check;
use crate::given::{Given, Moved};

/// Draws for the screen: the ends of a 95 % interval are good to about one per cent.
pub const DRAWS: usize = 20_000;

/// The one seed: the same readings always come to the same interval. Filed with an entry that has one.
pub const SEED: u64 = 0x_4457_4C47_2026;

/// Draws that are made in one go; each go has its own stream of the generator, so that the result does not depend on
/// how many of them run at once.
const AT_ONCE: usize = 250;

/// Above this share of impossible draws no interval is given.
const TOO_MANY_IMPOSSIBLE: f64 = 0.01;

/// An interval from draws, in stored SI units.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Interval {
    /// 2.5 % of the draws lie below it.
    pub low_si: f64,
    /// 2.5 % of the draws lie above it.
    pub high_si: f64,
}

impl Interval {
    /// Whether no draw moved the result.
    #[must_use]
    pub fn is_empty(self) -> bool {
        self.high_si - self.low_si <= 1e-12 * self.high_si.abs()
    }

    /// Whether both ends agree with `value ± half_width` within half a unit of the first digit of `u` (JCGM 101:2008,
    /// clause 8).
    #[must_use]
    pub fn agrees(self, value: f64, half_width: f64, u: f64) -> bool {
        let tolerance = 0.5 * 10_f64.powf(u.log10().floor());
        (self.low_si - (value - half_width)).abs() <= tolerance
            && (self.high_si - (value + half_width)).abs() <= tolerance
    }
}

/// What the draws came to.
#[derive(Debug, Clone, Default)]
pub struct Drawn {
    /// Intervals by key of the result; none where too many draws were impossible.
    pub intervals: BTreeMap<String, Interval>,
    /// Results of all draws, in rising order, by key.
    pub sorted: BTreeMap<String, Vec<f64>>,
    /// How many were made.
    pub made: usize,
    /// Share that had no result.
    pub impossible: f64,
    /// Share that was taken as saturated somewhere.
    pub saturated: f64,
}

impl Drawn {
    /// Too many draws had no result: these readings are hardly possible within their ±.
    #[must_use]
    pub fn too_many_impossible(&self) -> bool {
        self.impossible > TOO_MANY_IMPOSSIBLE
    }
}

/// One go's results, by figure.
#[derive(Default)]
struct Go {
    results: Vec<Vec<f64>>,
    impossible: usize,
    saturated: usize,
}

/// Makes `count` draws for the results `keys`, on as many threads as the machine has. None when `stop` was set meanwhile.
#[must_use]
#[expect(clippy::cast_precision_loss, reason = "counts far below 2^52")]
pub fn draw(
    check: &dyn Check,
    given: &Given,
    keys: &[String],
    count: usize,
    stop: &AtomicBool,
) -> Option<Drawn> {
    let mut given = given.clone();
    given.drawing();
    let terms = first_order::terms(check, &given);
    let goes: Vec<usize> = (0..count.div_ceil(AT_ONCE)).collect();
    let threads = thread::available_parallelism().map_or(1, std::num::NonZero::get).min(8);
    let share = goes.len().div_ceil(threads).max(1);
    let all: Vec<Go> = thread::scope(|scope| {
        let running: Vec<_> = goes
            .chunks(share)
            .map(|goes| {
                let (terms, given) = (&terms, &given);
                scope.spawn(move || {
                    goes.iter()
                        .take_while(|_| !stop.load(Ordering::Relaxed))
                        .map(|go| {
                            let size = AT_ONCE.min(count - go * AT_ONCE);
                            one_go(check, given, terms, keys, *go as u64, size)
                        })
                        .collect::<Vec<Go>>()
                })
            })
            .collect();
        running.into_iter().filter_map(|thread| thread.join().ok()).flatten().collect()
    });
    if stop.load(Ordering::Relaxed) {
        return None;
    }
    let impossible: usize = all.iter().map(|go| go.impossible).sum();
    let saturated: usize = all.iter().map(|go| go.saturated).sum();
    let mut drawn = Drawn {
        made: count,
        impossible: impossible as f64 / count as f64,
        saturated: saturated as f64 / count as f64,
        ..Drawn::default()
    };
    for (index, key) in keys.iter().enumerate() {
        let mut values: Vec<f64> =
            all.iter().filter_map(|go| go.results.get(index)).flatten().copied().collect();
        values.sort_by(f64::total_cmp);
        // A result that is withheld in some draws has no honest interval.
        let lost = (count - impossible).saturating_sub(values.len()) as f64 / count as f64;
        if !drawn.too_many_impossible()
            && lost <= TOO_MANY_IMPOSSIBLE
            && let (Some(low_si), Some(high_si)) = (at(&values, 0.025), at(&values, 0.975))
        {
            drawn.intervals.insert(key.clone(), Interval { low_si, high_si });
        }
        drawn.sorted.insert(key.clone(), values);
    }
    Some(drawn)
}

/// The value below which this share of the sorted ones lies.
#[expect(
    clippy::cast_precision_loss,
    clippy::cast_possible_truncation,
    clippy::cast_sign_loss,
    reason = "a position within a list"
)]
fn at(sorted: &[f64], share: f64) -> Option<f64> {
    let last = sorted.len().checked_sub(1)?;
    sorted.get(((last as f64) * share).round() as usize).copied()
}

fn one_go(
    check: &dyn Check,
    given: &Given,
    terms: &[Term],
    keys: &[String],
    stream: u64,
    size: usize,
) -> Go {
    let mut random = ChaCha8Rng::seed_from_u64(SEED);
    random.set_stream(stream);
    let mut go = Go { results: vec![Vec::with_capacity(size); keys.len()], ..Go::default() };
    let mut moves: Vec<(Moved, f64)> = terms
        .iter()
        .flat_map(|term| term.moves.iter().map(|(what, _)| (what.clone(), 0.0)))
        .collect();
    for _ in 0..size {
        let mut slots = moves.iter_mut();
        for term in terms {
            let by = deviate(term.freedom, &mut random);
            for ((_, u), slot) in term.moves.iter().zip(slots.by_ref()) {
                slot.1 = u * by;
            }
        }
        let Ok(outcome) = check.solve(&given.moved(&moves)) else {
            go.impossible += 1;
            continue;
        };
        go.saturated += usize::from(!outcome.saturated.is_empty());
        for (results, key) in go.results.iter_mut().zip(keys) {
            if let Some(amount) = outcome.amount(key) {
                results.push(amount.si());
            }
        }
    }
    go
}

/// A deviate of standard deviation one, or of Student's t where the uncertainty is an estimate from repeats.
fn deviate(freedom: f64, random: &mut ChaCha8Rng) -> f64 {
    if freedom.is_finite()
        && let Ok(t) = StudentT::new(freedom)
    {
        return t.sample(random);
    }
    StandardNormal.sample(random)
}
