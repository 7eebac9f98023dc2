//! A result against a requirement: *meets*, *falls short* (*goes over*, for an upper limit), *cannot be told*.
//!
//! The limit is moved by a guard band of 1.645 u (risk 5 %; the idea of JCGM 106:2012), so that "meets" is wrong in at
//! most that share of cases. Where the result's interval is lopsided, the share of draws that meet the requirement
//! decides instead. When it cannot be told, the sources are searched for one that could decide by itself: with
//! `u* = |y - T| / 1.645`, source k would have to shrink to `u_k'^2 = u*^2 - (u^2 - c_k^2)`, if that is positive.
//! There are no built-in limits: every requirement is typed by a person, with where it comes from.

use statrs::distribution::{ContinuousCDF, Normal};

use crate::doubt::Doubt;

/// Risk of a wrong "meets" that is taken where none is stated.
pub const USUAL_RISK: f64 = 0.05;

/// What is asked of a result, in its stored SI unit.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Asked {
    /// Not below.
    AtLeast(f64),
    /// Not above.
    AtMost(f64),
    /// Not below the first, not above the second.
    Between(f64, f64),
}

impl Asked {
    fn limits(self) -> (Option<f64>, Option<f64>) {
        match self {
            Asked::AtLeast(low) => (Some(low), None),
            Asked::AtMost(high) => (None, Some(high)),
            Asked::Between(low, high) => (Some(low), Some(high)),
        }
    }

    /// Whether a value is as asked.
    #[must_use]
    pub fn holds(self, value: f64) -> bool {
        let (low, high) = self.limits();
        low.is_none_or(|low| value >= low) && high.is_none_or(|high| value <= high)
    }
}

/// One of three honest answers; the second has two names.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Answer {
    /// It does, by more than the doubt.
    Meets,
    /// It lies below by more than the doubt.
    FallsShort,
    /// It lies above by more than the doubt.
    GoesOver,
    /// The doubt is larger than the distance.
    CannotBeTold,
}

/// A requirement held against a result.
#[derive(Debug, Clone, PartialEq)]
pub struct Verdict {
    /// The answer.
    pub answer: Answer,
    /// How far inside the limit the result must lie, in its stored SI unit; none where draws decided.
    pub guard_si: Option<f64>,
    /// Probability that the requirement is met.
    pub met: f64,
    /// The band asked for is narrower than both guard bands: it could not be shown with any result.
    pub never: bool,
    /// What would decide, where it cannot be told.
    pub decides: Option<Decides>,
}

/// What would decide.
#[derive(Debug, Clone, PartialEq)]
pub enum Decides {
    /// Any one of these would, with its ± shrunk to this factor; the least demanding first.
    AnyOf(Vec<(String, f64)>),
    /// No single one can: at least these together would have to improve.
    Together(Vec<String>),
    /// Nothing would: the result lies on the limit.
    Nothing,
}

/// Holds a result against what is asked. `risk` is that of a wrong "meets", between 0 and one half. `sorted` are its
/// draws in rising order, where its interval is lopsided. None where its doubt is not known, or the risk is none.
#[must_use]
pub fn judge(
    value_si: f64,
    doubt: &Doubt,
    sorted: Option<&[f64]>,
    asked: Asked,
    risk: f64,
) -> Option<Verdict> {
    if !doubt.unknown.is_empty() || doubt.u_si <= 0.0 || !(risk > 0.0 && risk < 0.5) {
        return None;
    }
    match sorted.filter(|_| doubt.interval.is_some()) {
        Some(sorted) => Some(by_draws(sorted, asked, risk)),
        // Without draws a lopsided result has no honest answer.
        None if doubt.half_width_si.is_none() => None,
        None => Some(by_guard(value_si, doubt, asked, risk)),
    }
}

fn normal() -> Normal {
    Normal::standard()
}

fn by_guard(value: f64, doubt: &Doubt, asked: Asked, risk: f64) -> Verdict {
    let z = normal().inverse_cdf(1.0 - risk);
    let (u, guard) = (doubt.u_si, z * doubt.u_si);
    let (low, high) = asked.limits();
    let below = low.map_or(0.0, |low| normal().cdf((low - value) / u));
    let above = high.map_or(0.0, |high| normal().cdf((value - high) / u));
    let never = matches!((low, high), (Some(low), Some(high)) if high - low < 2.0 * guard);
    let inside =
        low.is_none_or(|low| value - low >= guard) && high.is_none_or(|high| high - value >= guard);
    let answer = if inside {
        Answer::Meets
    } else if low.is_some_and(|low| value - low <= -guard) {
        Answer::FallsShort
    } else if high.is_some_and(|high| value - high >= guard) {
        Answer::GoesOver
    } else {
        Answer::CannotBeTold
    };
    let decides = (answer == Answer::CannotBeTold).then(|| {
        let distance = [low, high]
            .into_iter()
            .flatten()
            .map(|limit| (value - limit).abs())
            .fold(f64::MAX, f64::min);
        what_decides(doubt, distance / z)
    });
    Verdict { answer, guard_si: Some(guard), met: (1.0 - below - above).max(0.0), never, decides }
}

#[expect(clippy::cast_precision_loss, reason = "counts far below 2^52")]
fn by_draws(sorted: &[f64], asked: Asked, risk: f64) -> Verdict {
    let share = |holds: &dyn Fn(f64) -> bool| {
        sorted.iter().filter(|value| holds(**value)).count() as f64 / sorted.len().max(1) as f64
    };
    let (low, high) = asked.limits();
    let met = share(&|value| asked.holds(value));
    let answer = if met >= 1.0 - risk {
        Answer::Meets
    } else if share(&|value| low.is_some_and(|low| value < low)) >= 1.0 - risk {
        Answer::FallsShort
    } else if share(&|value| high.is_some_and(|high| value > high)) >= 1.0 - risk {
        Answer::GoesOver
    } else {
        Answer::CannotBeTold
    };
    Verdict { answer, guard_si: None, met, never: false, decides: None }
}

/// Which source could decide by itself, were the standard uncertainty to come down to `wanted`; the result is taken to
/// stay where it is.
fn what_decides(doubt: &Doubt, wanted: f64) -> Decides {
    if wanted <= 0.0 {
        return Decides::Nothing;
    }
    let variance = doubt.u_si * doubt.u_si;
    let mut alone: Vec<(String, f64)> = doubt
        .shares
        .iter()
        .filter_map(|(source, share)| {
            let part = share * variance;
            let left = wanted * wanted - (variance - part);
            (left > 0.0 && part > 0.0).then(|| (source.clone(), (left / part).sqrt()))
        })
        .collect();
    if !alone.is_empty() {
        alone.sort_by(|one, other| other.1.total_cmp(&one.1));
        return Decides::AnyOf(alone);
    }
    // The shares come largest first: take as many as must vanish for the rest to be small enough.
    let mut rest = variance;
    let mut together = Vec::new();
    for (source, share) in &doubt.shares {
        together.push(source.clone());
        rest -= share * variance;
        if rest < wanted * wanted {
            break;
        }
    }
    Decides::Together(together)
}

/// A result against a rated figure that has a doubt of its own: the normalised error `|y - N| / sqrt(U_y^2 + U_N^2)` (ISO
/// 13528, quoted from memory). Up to one the two do not disagree; that does not prove that the rating is met.
#[must_use]
pub fn normalised_error(value: f64, half_width: f64, rated: f64, rated_half_width: f64) -> f64 {
    (value - rated).abs() / half_width.hypot(rated_half_width)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::doubt::{COVERAGE_95, Interval};

    /// A coil's total of 50 235.630 W, u 1 432.3087 W, by an independent program.
    fn coil() -> Doubt {
        let share = |name: &str, share: f64| (name.to_owned(), share);
        Doubt {
            u_si: 1_432.308_7,
            half_width_si: Some(COVERAGE_95 * 1_432.308_7),
            freedom: f64::INFINITY,
            shares: vec![
                share("air flow", 0.800_531_28),
                share("wet bulb in", 0.113_4),
                share("wet bulb out", 0.067_0),
                share("wet calibration", 0.018_5),
            ],
            ..Doubt::default()
        }
    }

    fn at_least(limit: f64) -> Verdict {
        judge(50_235.630_5, &coil(), None, Asked::AtLeast(limit), USUAL_RISK).unwrap()
    }

    #[test]
    fn three_answers() {
        assert_eq!(at_least(44_000.0).answer, Answer::Meets);
        assert_eq!(at_least(48_000.0).answer, Answer::CannotBeTold);
        assert_eq!(at_least(54_000.0).answer, Answer::FallsShort);
        let at_most = |limit| {
            judge(50_235.6, &coil(), None, Asked::AtMost(limit), USUAL_RISK).unwrap().answer
        };
        assert_eq!(at_most(44_000.0), Answer::GoesOver);
        assert_eq!(at_most(54_000.0), Answer::Meets);
        assert!((at_least(48_000.0).met - 0.940_721).abs() < 1e-5);
        assert!((at_least(48_000.0).guard_si.unwrap() - 2_355.938).abs() < 0.01);
    }

    #[test]
    fn what_would_decide_is_not_merely_the_largest_share() {
        let Some(Decides::AnyOf(any)) = at_least(48_000.0).decides else {
            unreachable!("one source can")
        };
        assert_eq!(any[0].0, "air flow");
        assert!((any[0].1 - 0.935_777).abs() < 1e-4, "{}", any[0].1);
        assert_eq!(any[1].0, "wet bulb in");
        assert!((any[1].1 - 0.349_7).abs() < 2e-3, "{}", any[1].1);
        let Some(Decides::AnyOf(any)) = at_least(49_000.0).decides else {
            unreachable!("the flow can")
        };
        assert!(any.len() == 1 && (any[0].1 - 0.307_317).abs() < 1e-3);
        // Nearer still: the flow alone cannot, the flow and the entering wet bulb together could.
        let Some(Decides::Together(names)) = at_least(49_500.0).decides else {
            unreachable!("no single one")
        };
        assert_eq!(names, ["air flow", "wet bulb in"]);
    }

    #[test]
    fn a_band_narrower_than_the_doubt_can_never_be_shown() {
        let verdict =
            judge(50_235.6, &coil(), None, Asked::Between(49_000.0, 51_000.0), USUAL_RISK).unwrap();
        assert!(verdict.never && verdict.answer == Answer::CannotBeTold);
    }

    #[test]
    fn draws_decide_where_it_is_lopsided() {
        let sorted: Vec<f64> = (0..1000).map(|index| f64::from(index) / 1000.0).collect();
        let interval = Interval { low_si: 0.025, high_si: 0.975 };
        let doubt = Doubt { half_width_si: None, interval: Some(interval), ..coil() };
        let answer = |asked| judge(0.5, &doubt, Some(&sorted), asked, USUAL_RISK).unwrap().answer;
        assert_eq!(answer(Asked::AtLeast(0.04)), Answer::Meets);
        assert_eq!(answer(Asked::AtLeast(0.06)), Answer::CannotBeTold);
        assert_eq!(answer(Asked::AtLeast(0.96)), Answer::FallsShort);
        assert_eq!(answer(Asked::AtMost(0.04)), Answer::GoesOver);
        assert!(judge(0.5, &doubt, None, Asked::AtMost(0.04), USUAL_RISK).is_none(), "not yet");
    }

    #[test]
    fn no_answer_without_a_known_doubt() {
        let doubt = Doubt { unknown: vec!["air flow".into()], ..coil() };
        assert!(judge(1.0, &doubt, None, Asked::AtLeast(0.5), USUAL_RISK).is_none());
        assert!(judge(1.0, &coil(), None, Asked::AtLeast(0.5), 0.5).is_none());
    }

    /// Against 52 000 W ± 5 %, by an independent program.
    #[test]
    fn a_rating_with_a_tolerance_of_its_own() {
        let error = normalised_error(50_235.63, 2_807.3, 52_000.0, 2_600.0);
        assert!((error - 0.461_111).abs() < 1e-6);
    }
}
