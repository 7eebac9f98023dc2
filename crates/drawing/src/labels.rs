//! Where words go: each to the place where it covers least, what was placed before winning.

use crate::geometry::{Px, Rect};
use crate::text::Anchor;

/// Penalty for a pixel outside the drawing, for other words touched and each pixel on them, for a dot covered, and for a
/// pixel of a line covered.
const OUTSIDE: f64 = 50.0;
const TOUCHED: f64 = 400.0;
const WORDS: f64 = 6.0;
const DOT: f64 = 2000.0;
const LINE: f64 = 8.0;

/// What is on the drawing already.
#[derive(Debug, Clone)]
pub(crate) struct Placer {
    bounds: Rect,
    words: Vec<Rect>,
    dots: Vec<Rect>,
    lines: Vec<(Px, Px)>,
}

/// A choice for a piece of text: where its baseline is, and the box that it fills.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Spot {
    pub(crate) at: Px,
    pub(crate) anchor: Anchor,
    pub(crate) fills: Rect,
    /// How much it is disliked by itself.
    pub(crate) cost: f64,
}

impl Placer {
    /// An empty drawing within `bounds`.
    pub(crate) const fn new(bounds: Rect) -> Self {
        Self { bounds, words: Vec::new(), dots: Vec::new(), lines: Vec::new() }
    }

    /// A dot that must stay to be seen.
    pub(crate) fn dot(&mut self, dot: Rect) {
        self.dots.push(dot);
    }

    /// A line that should stay to be seen.
    pub(crate) fn line(&mut self, from: Px, to: Px) {
        self.lines.push((from, to));
    }

    /// Words, or a mark, that stand.
    pub(crate) fn taken(&mut self, words: Rect) {
        self.words.push(words);
    }

    #[cfg(test)]
    pub(crate) fn collisions(&self) -> usize {
        let on_dot = |words: &Rect| self.dots.iter().any(|dot| dot.overlap(words) > 0.0);
        let of = |index: usize| {
            self.words[index + 1..].iter().filter(|w| w.overlap(&self.words[index]) > 1.0).count()
        };
        self.words.iter().filter(|words| on_dot(words)).count()
            + (0..self.words.len()).map(of).sum::<usize>()
    }

    /// How bad it would be to put something there.
    pub(crate) fn cost(&self, fills: &Rect) -> f64 {
        let on_words = |words: &Rect| match words.overlap(fills) {
            shared if shared > 0.0 => TOUCHED + WORDS * shared,
            _ => 0.0,
        };
        let words: f64 = self.words.iter().map(on_words).sum();
        let dots = self.dots.iter().filter(|dot| dot.overlap(fills) > 0.0).count();
        let lines: f64 = self.lines.iter().map(|(from, to)| fills.covers(*from, *to)).sum();
        OUTSIDE * fills.outside(&self.bounds)
            + words
            + DOT * f64::from(u32::try_from(dots).unwrap_or(u32::MAX))
            + LINE * lines
    }

    /// How bad a leader from `from` to `to` would be: across words, dots and lines.
    pub(crate) fn leader_cost(&self, from: Px, to: Px) -> f64 {
        let covered: f64 = self.words.iter().map(|words| words.covers(from, to)).sum();
        let end = from.between(to, 0.2);
        let dots: f64 = self.dots.iter().map(|dot| dot.covers(end, to)).sum();
        let crossed = self.lines.iter().filter(|line| cross(**line, (end, to))).count();
        20.0 * covered + 200.0 * dots + 60.0 * f64::from(u32::try_from(crossed).unwrap_or(u32::MAX))
    }

    /// The best of several spots, which is taken then.
    pub(crate) fn place(&mut self, spots: impl IntoIterator<Item = Spot>) -> Option<Spot> {
        let best = self.best(spots)?.0;
        self.taken(best.fills);
        Some(best)
    }

    /// The best of several spots, and how bad it is.
    pub(crate) fn best(&self, spots: impl IntoIterator<Item = Spot>) -> Option<(Spot, f64)> {
        spots
            .into_iter()
            .map(|spot| (spot, spot.cost + self.cost(&spot.fills)))
            .min_by(|one, other| one.1.total_cmp(&other.1))
    }

    /// The best of several spots, taken only when it covers no words, no dot and no line of weight.
    pub(crate) fn place_if_free(&mut self, spots: impl IntoIterator<Item = Spot>) -> Option<Spot> {
        let free = |spot: &Spot| {
            let fills = &spot.fills;
            // Two numbers side by side would be read as one.
            let apart = fills.grown(3.0);
            fills.outside(&self.bounds) <= 0.0
                && self.words.iter().chain(&self.dots).all(|taken| taken.overlap(&apart) <= 0.0)
                && self.lines.iter().all(|(from, to)| fills.clip(*from, *to).is_none())
        };
        let spot =
            spots.into_iter().filter(free).min_by(|one, other| one.cost.total_cmp(&other.cost))?;
        self.taken(spot.fills);
        Some(spot)
    }
}

/// Whether two lines cross.
fn cross((a, b): (Px, Px), (c, d): (Px, Px)) -> bool {
    let side = |p: Px, q: Px, r: Px| (q.x - p.x) * (r.y - p.y) - (q.y - p.y) * (r.x - p.x);
    side(a, b, c) * side(a, b, d) < 0.0 && side(c, d, a) * side(c, d, b) < 0.0
}

#[cfg(test)]
mod tests {
    use super::*;

    fn spot(left: f64, cost: f64) -> Spot {
        Spot {
            at: Px::new(left, 10.0),
            anchor: Anchor::Start,
            fills: Rect::new(left, 0.0, 20.0, 10.0),
            cost,
        }
    }

    #[test]
    fn words_go_where_nothing_is() {
        let mut placer = Placer::new(Rect::new(0.0, 0.0, 100.0, 100.0));
        placer.dot(Rect::new(8.0, 4.0, 4.0, 4.0));
        let best = placer.place([spot(0.0, 0.0), spot(40.0, 5.0)]).unwrap();
        assert!((best.at.x - 40.0).abs() < 1e-9);
        placer.line(Px::new(85.0, -5.0), Px::new(85.0, 50.0));
        assert_eq!(placer.place_if_free([spot(45.0, 0.0), spot(70.0, 0.0), spot(95.0, 0.0)]), None);
        // Beside words there is a gap.
        assert_eq!(placer.place_if_free([spot(62.0, 0.0)]), None);
        assert!(placer.place_if_free([spot(64.0, 0.0)]).is_some());
        assert_eq!(placer.collisions(), 0);
    }

    #[test]
    fn a_leader_does_not_cross_a_line() {
        let mut placer = Placer::new(Rect::new(0.0, 0.0, 100.0, 100.0));
        placer.line(Px::new(0.0, 50.0), Px::new(100.0, 50.0));
        let down = placer.leader_cost(Px::new(50.0, 30.0), Px::new(50.0, 90.0));
        let up = placer.leader_cost(Px::new(50.0, 30.0), Px::new(50.0, 5.0));
        assert!(down > up && up <= 0.0);
    }
}
