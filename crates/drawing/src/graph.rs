//! A plain line graph of one result over a range of another quantity.

use dewledger_checks::drawn::Curve;
use dewledger_quantities::{Amount, UnitChoice};

use crate::geometry::{Px, Rect, visible};
use crate::labels::{Placer, Spot};
use crate::node::{Node, hundredths};
use crate::plot::Sheet;
use crate::scale::Scale;
use crate::text::{self, Anchor, bounds};

/// Draws a curve: its points joined, its marks as dots with their names. None where it has fewer than two points that are
/// numbers, or spans nothing.
#[must_use]
pub fn graph(curve: &Curve, units: &UnitChoice, sheet: Sheet) -> Option<Node> {
    let sheet = sheet.kept();
    let finite = |(across, up): &&(Amount, Amount)| across.si().is_finite() && up.si().is_finite();
    let points: Vec<(Amount, Amount)> = curve.points.iter().filter(finite).copied().collect();
    let (first, ..) = points.first().filter(|_| points.len() > 1)?;
    let marks: Vec<(&str, Amount, Amount)> = curve
        .marks
        .iter()
        .filter(|(_, across, up)| across.si().is_finite() && up.si().is_finite())
        .map(|(name, across, up)| (name.as_ref(), *across, *up))
        .collect();
    let kinds = (first.kind(), points[0].1.kind());
    let all = || {
        points
            .iter()
            .map(|(a, u)| (a.si(), u.si()))
            .chain(marks.iter().map(|(_, a, u)| (a.si(), u.si())))
    };
    let range = |of: fn((f64, f64)) -> f64| {
        all().map(of).fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), value| {
            (low.min(value), high.max(value))
        })
    };
    let (across_unit, up_unit) = (units.get(kinds.0), units.get(kinds.1));
    let flat = |(low, high): (f64, f64)| {
        // A level line stands in the middle of a range of its own.
        if high > low {
            (low, high)
        } else {
            (low - 0.5 * low.abs().max(1e-3), high + 0.5 * high.abs().max(1e-3))
        }
    };
    let across_range = range(|(across, _)| across);
    if across_range.0 >= across_range.1 {
        return None;
    }
    let up_range = Scale::widened(kinds.1, flat(range(|(_, up)| up)), up_unit, sheet.most_up())?;
    let across = Scale::over(kinds.0, across_range, across_unit, sheet.most_across())?;
    let up = Scale::over(kinds.1, up_range, up_unit, sheet.most_up())?;

    let size = sheet.text;
    let widest =
        up.amounts().map(|at| text::width(&up.number(at), size, false)).fold(0.0, f64::max);
    let left = widest + 0.9 * size;
    let area = Rect::new(
        left,
        2.2 * size,
        (sheet.width - left - size).max(10.0),
        (sheet.height - 6.2 * size).max(10.0),
    );
    let x = |si: f64| {
        area.left + area.width * (si - across_range.0) / (across_range.1 - across_range.0)
    };
    let y = |si: f64| area.bottom() - area.height * (si - up_range.0) / (up_range.1 - up_range.0);
    let line: Vec<Px> = points.iter().map(|(a, u)| Px::new(x(a.si()), y(u.si()))).collect();

    let mut root = Node::of("svg", "pc-graph")
        .with("viewBox", format!("0 0 {} {}", hundredths(sheet.width), hundredths(sheet.height)))
        .px("width", sheet.width)
        .px("height", sheet.height)
        .px("font-size", size);
    let mut grid = String::new();
    for amount in across.amounts() {
        let x = hundredths(x(amount.si()));
        grid.push_str(&format!("M{x} {}V{}", hundredths(area.top), hundredths(area.bottom())));
    }
    for amount in up.amounts() {
        let y = hundredths(y(amount.si()));
        grid.push_str(&format!("M{} {y}H{}", hundredths(area.left), hundredths(area.right())));
    }
    root.push(Node::of("path", "pc-grid-line").with("d", grid));
    root.push(Node::of("path", "pc-axis").with(
        "d",
        format!(
            "M{} {}V{}H{}",
            hundredths(area.left),
            hundredths(area.top),
            hundredths(area.bottom()),
            hundredths(area.right())
        ),
    ));
    let words = |class: &str, at: Px, anchor: Anchor, text: String| {
        Node::of("text", class)
            .px("x", at.x)
            .px("y", at.y)
            .with("text-anchor", anchor.name())
            .saying(text)
    };
    for amount in across.amounts() {
        let at = Px::new(x(amount.si()), area.bottom() + 1.4 * size);
        root.push(words("pc-tick", at, Anchor::Middle, across.number(amount)));
    }
    for amount in up.amounts() {
        let at = Px::new(area.left - 0.5 * size, y(amount.si()) + 0.35 * size);
        root.push(words("pc-tick", at, Anchor::End, up.number(amount)));
    }
    let titled = |name: &str, symbol: &str| {
        if symbol.is_empty() { name.to_owned() } else { format!("{name}, {symbol}") }
    };
    let up_title = titled(&curve.up, up_unit.symbol);
    root.push(words("pc-title", Px::new(2.0, 1.2 * size), Anchor::Start, up_title));
    let across_title = titled(&curve.across, across_unit.symbol);
    let corner = Px::new(area.right(), area.bottom() + 3.1 * size);
    root.push(words("pc-title", corner, Anchor::End, across_title));
    root.push(super::chart::polyline("pc-curve", line.iter().copied()));

    let mut placer = Placer::new(area);
    for pair in visible(&line, &area).windows(2) {
        placer.line(pair[0], pair[1]);
    }
    let at = |(_, across, up): &(&str, Amount, Amount)| Px::new(x(across.si()), y(up.si()));
    for mark in &marks {
        placer.dot(Rect::around(at(mark), 5.0, 5.0));
    }
    for mark in &marks {
        let dot = at(mark);
        root.push(Node::of("circle", "pc-dot").px("cx", dot.x).px("cy", dot.y).px("r", 4.0));
        let spots = around(mark.0, dot, size);
        if let Some(spot) = placer.place(spots) {
            root.push(words("pc-state-name", spot.at, spot.anchor, mark.0.to_owned()));
        }
    }
    Some(root)
}

/// Places for a name around a dot.
fn around(name: &str, dot: Px, size: f64) -> Vec<Spot> {
    let mut spots = Vec::new();
    for (dx, anchor) in [(0.7, Anchor::Start), (-0.7, Anchor::End), (0.0, Anchor::Middle)] {
        for dy in [-0.6, 1.3, 0.35, -1.9, 2.6] {
            let at = dot.moved(dx * size, dy * size);
            let fills = bounds(name, at, anchor, size, true);
            spots.push(Spot { at, anchor, fills, cost: f64::abs(dy) });
        }
    }
    spots
}
