//! States: a dot within its ±, and a lettered mark that stands off on a leader, like a survey pin.

use std::f64::consts::TAU;

use dewledger_quantities::{Quantity, show};

use super::{Pen, State};
use crate::doubt;
use crate::geometry::{Px, Rect};
use crate::labels::Spot;
use crate::marks;
use crate::node::{Node, hundredths};
use crate::text::{self, Anchor};

/// Half the size of what must stay to be seen of a dot, px.
const DOT: f64 = 4.0;
/// Directions in which a leader may go.
const DIRECTIONS: u32 = 16;

/// A mark and its words where they could stand.
struct Pin {
    middle: Px,
    mark: Rect,
    words: Option<Spot>,
    cost: f64,
}

impl Pen<'_> {
    pub(super) fn states(&mut self) -> Node {
        let mut group = Node::of("g", "pc-states");
        let seen: Vec<(&State, Px)> = self
            .chart
            .states
            .iter()
            .filter(|state| self.plot.window.holds(&state.place))
            .map(|state| (state, self.plot.px(&state.place)))
            .collect();
        for (state, at) in &seen {
            let (across, up) = state
                .doubt
                .as_ref()
                .and_then(|doubt| doubt::ellipse(doubt, self.plot))
                .map_or((DOT, DOT), |ellipse| ellipse.half_box());
            // A large ± cannot be kept free of words.
            let most = 2.0 * self.sheet.text;
            self.placer.dot(Rect::around(*at, across.clamp(DOT, most), up.clamp(DOT, most)));
            group
                .children
                .extend(state.doubt.as_ref().and_then(|doubt| doubt::draw(doubt, *at, self.plot)));
        }
        for (_, at) in &seen {
            group.push(Node::of("circle", "pc-dot").px("cx", at.x).px("cy", at.y).px("r", 3.0));
        }
        for (state, at) in seen {
            if state.mark.is_some() {
                group.children.extend(self.pin(state, at));
            }
        }
        group
    }

    /// Lines of words at a mark: its name, and on a wide sheet its two values.
    fn lines_of(&self, state: &State) -> Vec<(String, bool)> {
        let mut lines = vec![(state.label.clone(), true)];
        if self.sheet.width >= 34.0 * self.sheet.text {
            let amounts = [state.place.dry_bulb.amount(), state.place.humidity_ratio.amount()];
            let values =
                amounts.map(|amount| show(amount, self.chart.units.get(amount.kind())).text());
            lines.push((values.join(", "), false));
        }
        lines
    }

    fn pin(&mut self, state: &State, at: Px) -> Vec<Node> {
        let Some(mark) = state.mark else { return Vec::new() };
        let size = self.sheet.text;
        let lines = self.lines_of(state);
        let keep = state.doubt.as_ref().and_then(|doubt| doubt::ellipse(doubt, self.plot));
        let room = |angle: f64| keep.map_or(0.0, |ellipse| ellipse.reach(angle).min(3.0 * size));
        let mut best: Option<Pin> = None;
        for step in 0..DIRECTIONS {
            let angle = f64::from(step) / f64::from(DIRECTIONS) * TAU;
            for far in [2.4, 3.2, 4.4, 6.0] {
                let middle = at.towards(angle, far * size + room(angle));
                let mark = Rect::around(middle, marks::reach(size), marks::reach(size));
                // Short leaders, and upwards rather than down, into the open side of the chart.
                let mut cost = self.placer.cost(&mark)
                    + self.placer.leader_cost(at, middle)
                    + 6.0 * far
                    + 4.0 * (1.0 + angle.sin());
                let words = self.best_words(&lines, middle, &mark);
                cost += words.as_ref().map_or(0.0, |(_, cost)| *cost);
                if best.as_ref().is_none_or(|best| cost < best.cost) {
                    best = Some(Pin { middle, mark, words: words.map(|(spot, _)| spot), cost });
                }
            }
        }
        let Some(pin) = best else { return Vec::new() };
        self.placer.taken(pin.mark);
        self.placer.line(at, pin.middle);
        let angle = (pin.middle.y - at.y).atan2(pin.middle.x - at.x);
        // The leader keeps off the dot and its ±.
        let clear = (room(angle) + 2.0).min(pin.middle.distance(at) - size);
        let start = at.towards(angle, clear.max(0.5 * size));
        let mut nodes = vec![
            Node::of("path", "pc-leader").with(
                "d",
                format!(
                    "M{} {}L{} {}",
                    hundredths(start.x),
                    hundredths(start.y),
                    hundredths(pin.middle.x),
                    hundredths(pin.middle.y)
                ),
            ),
            marks::draw(mark, pin.middle, size),
        ];
        if let Some(spot) = pin.words {
            self.placer.taken(spot.fills);
            for (index, (line, bold)) in lines.iter().enumerate() {
                let down = 1.25 * size * f64::from(u32::try_from(index).unwrap_or(u32::MAX));
                let moved = Spot { at: spot.at.moved(0.0, down), ..spot };
                let class = if *bold { "pc-state-name" } else { "pc-state-value" };
                nodes.push(self.words(class, &moved, line));
            }
        }
        nodes
    }

    /// The best place beside a mark for its words, as one block.
    fn best_words(&self, lines: &[(String, bool)], middle: Px, mark: &Rect) -> Option<(Spot, f64)> {
        let size = self.sheet.text;
        let widest =
            lines.iter().map(|(line, bold)| text::width(line, size, *bold)).fold(0.0, f64::max);
        let rows = f64::from(u32::try_from(lines.len()).unwrap_or(u32::MAX));
        let height = 1.25 * size * (rows - 1.0) + 1.05 * size;
        let gap = marks::reach(size) + 0.35 * size;
        let block = |at: Px, anchor: Anchor, cost: f64| {
            let left = match anchor {
                Anchor::Start => at.x,
                Anchor::Middle => at.x - widest / 2.0,
                Anchor::End => at.x - widest,
            };
            let fills = Rect::new(left, at.y - 0.8 * size, widest, height);
            Spot { at, anchor, fills, cost: cost + 1e3 * fills.overlap(mark) }
        };
        let beside = middle.y - height / 2.0 + 0.8 * size;
        let above = middle.y - gap - height + 0.8 * size;
        let below = middle.y + gap + 0.8 * size;
        let mut spots = vec![
            block(Px::new(middle.x + gap, beside), Anchor::Start, 0.0),
            block(Px::new(middle.x - gap, beside), Anchor::End, 0.0),
            block(Px::new(middle.x, above), Anchor::Middle, 3.0),
            block(Px::new(middle.x, below), Anchor::Middle, 6.0),
        ];
        for anchor in [Anchor::Start, Anchor::End] {
            spots.push(block(Px::new(middle.x, above), anchor, 10.0));
            spots.push(block(Px::new(middle.x, below), anchor, 12.0));
        }
        self.placer.best(spots)
    }
}
