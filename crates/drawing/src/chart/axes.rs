//! Grid, axes, numbers and titles.

use dewledger_quantities::Kind;

use super::Pen;
use crate::family::Family;
use crate::geometry::Px;
use crate::node::{Node, hundredths};
use crate::text::{self, Anchor};

impl Pen<'_> {
    /// Hairlines at the numbers of both axes; they end at the fog.
    pub(super) fn grid(&self) -> Vec<Node> {
        let area = self.plot.area;
        let mut d = String::new();
        for x in
            self.plot.across.iter().flat_map(|scale| scale.amounts()).map(|at| self.plot.tick(at))
        {
            d.push_str(&format!(
                "M{} {}V{}",
                hundredths(x),
                hundredths(area.top),
                hundredths(area.bottom())
            ));
        }
        for y in self.plot.up.iter().flat_map(|scale| scale.amounts()).map(|at| self.plot.tick(at))
        {
            d.push_str(&format!(
                "M{} {}H{}",
                hundredths(area.left),
                hundredths(y),
                hundredths(area.right())
            ));
        }
        vec![Node::of("path", "pc-grid-line").with("d", d)]
    }

    /// Both axes with their numbers and titles, and the key of the family that was chosen.
    pub(super) fn axes(&self) -> Node {
        let (area, size) = (self.plot.area, self.sheet.text);
        let mut group = Node::of("g", "pc-axes");
        group.push(Node::of("path", "pc-axis").with(
            "d",
            format!(
                "M{} {}H{}V{}",
                hundredths(area.left),
                hundredths(area.bottom()),
                hundredths(area.right()),
                hundredths(area.top)
            ),
        ));
        let tick = |at: Px, anchor: Anchor, number: String| {
            Node::of("text", "pc-tick")
                .px("x", at.x)
                .px("y", at.y)
                .with("text-anchor", anchor.name())
                .saying(number)
        };
        if let Some(scale) = &self.plot.across {
            for amount in scale.amounts() {
                let at = Px::new(self.plot.tick(amount), area.bottom() + 1.45 * size);
                group.push(tick(at, Anchor::Middle, scale.number(amount)));
            }
        }
        if let Some(scale) = &self.plot.up {
            for amount in scale.amounts() {
                let at = Px::new(area.right() + 0.55 * size, self.plot.tick(amount) + 0.35 * size);
                group.push(tick(at, Anchor::Start, scale.number(amount)));
            }
        }
        let title = |at: Px, anchor: Anchor, text: String| {
            Node::of("text", "pc-title")
                .px("x", at.x)
                .px("y", at.y)
                .with("text-anchor", anchor.name())
                .saying(text)
        };
        let unit = |kind: Kind| self.chart.units.get(kind).symbol;
        group.push(title(
            Px::new(area.left, area.bottom() + 3.25 * size),
            Anchor::Start,
            format!("Dry bulb, {}", unit(Kind::Temperature)),
        ));
        let humidity = format!("Humidity ratio, {}", unit(Kind::HumidityRatio));
        let room = self.sheet.width - 0.4 * size - text::width(&humidity, size, true);
        group.push(title(
            Px::new(self.sheet.width - 0.4 * size, 1.25 * size),
            Anchor::End,
            humidity,
        ));
        if let Some(key) = self.key(room) {
            group.push(key);
        }
        group
    }

    /// A short piece of the chosen family's line and its name, at the upper left up to `room`; below, at the right of the
    /// other title, where there is none.
    fn key(&self, room: f64) -> Option<Node> {
        let family = self.chart.family;
        if family == Family::RelativeHumidity {
            return None;
        }
        let (area, size) = (self.plot.area, self.sheet.text);
        let symbol = self.chart.units.get(family.kind()).symbol;
        let name = format!("{}, {symbol}", family.label());
        let sample = 2.2 * size;
        let wide = sample + 0.4 * size + text::width(&name, size, false);
        let (left, baseline) = if area.left + wide + size < room {
            (area.left, 1.25 * size)
        } else {
            (self.sheet.width - 0.4 * size - wide, area.bottom() + 3.25 * size)
        };
        let middle = baseline - 0.35 * size;
        Some(
            Node::of("g", "pc-key").holding([
                Node::of("path", line_class(family)).with(
                    "d",
                    format!(
                        "M{} {}H{}",
                        hundredths(left),
                        hundredths(middle),
                        hundredths(left + sample)
                    ),
                ),
                Node::of("text", "pc-tick")
                    .px("x", left + sample + 0.4 * size)
                    .px("y", baseline)
                    .saying(name),
            ]),
        )
    }
}

/// The class of a family's lines; each has a dash of its own.
pub(super) const fn line_class(family: Family) -> &'static str {
    match family {
        Family::RelativeHumidity => "pc-rh",
        Family::WetBulb => "pc-wet-bulb",
        Family::Enthalpy => "pc-enthalpy",
        Family::SpecificVolume => "pc-volume",
    }
}
