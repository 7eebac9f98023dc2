//! Saturation, fog, and the families of lines with their labels.

use super::axes::line_class;
use super::{Pen, polyline};
use crate::family::{Contour, Family, contours};
use crate::geometry::{Px, along, length, visible};
use crate::labels::Spot;
use crate::node::{Node, hundredths};
use crate::saturation::Saturation;
use crate::text::{Anchor, width};

/// Shorter pieces of a line carry no label, in sizes of the text.
const SHORT: f64 = 3.0;

impl Pen<'_> {
    pub(super) fn plot_clip(&self, id: &str) -> Node {
        let area = self.plot.area;
        let rect = Node::new("rect")
            .px("x", area.left)
            .px("y", area.top)
            .px("width", area.width)
            .px("height", area.height);
        Node::new("clipPath").with("id", id).holding([rect])
    }

    /// Where air is clear: below the edge of the fog.
    pub(super) fn clear_clip(&self, id: &str, curve: &Saturation) -> Node {
        let area = self.plot.area;
        let mut points: Vec<Px> = self.edge(curve);
        let last = points.last().copied().unwrap_or(Px::new(area.left, area.top));
        points.push(Px::new(area.right(), last.y.max(area.top)));
        points.push(Px::new(area.right(), area.bottom()));
        points.push(Px::new(area.left, area.bottom()));
        Node::new("clipPath").with("id", id).holding([polyline("", points)])
    }

    /// The edge of the fog on the drawing, cut off at its upper end.
    fn edge(&self, curve: &Saturation) -> Vec<Px> {
        let points: Vec<Px> = curve.edge().iter().map(|place| self.plot.px(place)).collect();
        let tall = self.plot.area.grown(self.plot.area.height);
        visible(&points, &tall)
    }

    pub(super) fn hatch(&self, id: &str) -> Node {
        let step = hundredths(0.65 * self.sheet.text);
        Node::new("pattern")
            .with("id", id)
            .with("width", step.clone())
            .with("height", step.clone())
            .with("patternUnits", "userSpaceOnUse")
            .with("patternTransform", "rotate(45)")
            .holding([Node::of("path", "pc-hatch").with("d", format!("M0 0V{step}"))])
    }

    /// Beyond saturation no reading can stand.
    pub(super) fn fog(&self, hatch: &str, curve: &Saturation) -> Node {
        let area = self.plot.area;
        let mut points = self.edge(curve);
        if let (Some(first), Some(last)) = (points.first().copied(), points.last().copied()) {
            // Over the top, however the curve leaves the window.
            points.push(Px::new(last.x, area.top.min(last.y)));
            points.push(Px::new(first.x, area.top.min(first.y)));
        }
        polyline("pc-fog", points).with("fill", format!("url(#{hatch})"))
    }

    pub(super) fn saturation_lines(&self, curve: &Saturation) -> Vec<Node> {
        let mut lines = vec![self.path("pc-sat", curve.stable.iter().copied())];
        if !curve.supercooled.is_empty() {
            lines.push(self.path("pc-supercooled", curve.supercooled.iter().copied()));
        }
        lines
    }

    /// "saturated" beside its curve, and "fog" where there is room for it.
    pub(super) fn saturation_names(&mut self, curve: &Saturation) -> Vec<Node> {
        let size = self.sheet.text;
        let seen = |places: &[crate::window::Place]| {
            let points: Vec<Px> = places.iter().map(|place| self.plot.px(place)).collect();
            visible(&points, &self.plot.area)
        };
        let (stable, supercooled) = (seen(&curve.stable), seen(&curve.supercooled));
        for pair in stable.windows(2) {
            self.placer.line(pair[0], pair[1]);
        }
        // Two curves that can be told apart have a name each.
        let apart = supercooled
            .first()
            .zip(stable.first())
            .is_some_and(|(liquid, ice)| (liquid.y - ice.y).abs() > 0.6 * size);
        let name = if apart { "saturated over ice" } else { "saturated" };
        let mut names = Vec::new();
        let shares = [0.86, 0.78, 0.7, 0.62, 0.94, 0.54, 0.46];
        let along_curve = |line: &[Px], text: &str, above: bool, shares: &[f64]| -> Vec<Spot> {
            shares
                .iter()
                .enumerate()
                .filter_map(|(index, share)| {
                    let at = along(line, *share)?;
                    let (anchor, at) = if above {
                        (Anchor::End, at.moved(-0.6 * size, 0.1 * size))
                    } else {
                        (Anchor::Start, at.moved(0.6 * size, 1.1 * size))
                    };
                    let index = f64::from(u32::try_from(index).unwrap_or(u32::MAX));
                    Some(self.spot(text, at, anchor, false, index))
                })
                .collect()
        };
        let (ice_spots, liquid_spots) = if apart {
            (
                along_curve(&stable, name, false, &[0.1, 0.2, 0.3, 0.4]),
                along_curve(&supercooled, "over liquid water", true, &[0.7, 0.6, 0.8, 0.9]),
            )
        } else {
            (along_curve(&stable, name, true, &shares), Vec::new())
        };
        if let Some(spot) = self.placer.place_if_free(ice_spots) {
            names.push(self.words("pc-name", &spot, name));
        }
        if let Some(spot) = self.placer.place_if_free(liquid_spots) {
            names.push(self.words("pc-name", &spot, "over liquid water"));
        }
        let corner = Px::new(self.plot.area.left + 0.7 * size, self.plot.area.top + 1.6 * size);
        let spots: Vec<Spot> = (0..3)
            .map(|step| {
                let down = f64::from(step) * 1.6 * size;
                self.spot("fog", corner.moved(0.0, down), Anchor::Start, false, down)
            })
            // It belongs on the hatched side.
            .filter(|spot| {
                let fills = spot.fills;
                let foot = self.plot.place(Px::new(fills.right(), fills.bottom()));
                matches!(
                    crate::cross::read(&foot, self.chart.pressure),
                    crate::cross::Cross::Fog { .. }
                )
            })
            .collect();
        if let Some(spot) = self.placer.place_if_free(spots) {
            names.push(self.words("pc-name", &spot, "fog"));
        }
        names
    }

    /// Relative humidity, and the family that was chosen beside it; then their labels.
    pub(super) fn families(&mut self) -> (Vec<Node>, Vec<Node>) {
        let (width, height) = (self.plot.area.width, self.plot.area.height);
        let size = self.sheet.text;
        let both = (width * height).sqrt();
        let lines = |family: Family, most: f64| {
            contours(family, &self.plot.window, self.chart.pressure, self.chart.units, most)
        };
        let humidity = lines(Family::RelativeHumidity, if both > 32.0 * size { 10.0 } else { 5.0 });
        let chosen = match self.chart.family {
            Family::RelativeHumidity => Vec::new(),
            family @ (Family::WetBulb | Family::Enthalpy | Family::SpecificVolume) => {
                lines(family, (both / (3.2 * size)).clamp(4.0, 14.0))
            }
        };
        let mut nodes = Vec::new();
        let mut names = Vec::new();
        for (family, contours) in
            [(Family::RelativeHumidity, humidity), (self.chart.family, chosen)]
        {
            for contour in &contours {
                nodes.push(self.path(line_class(family), contour.points.iter().copied()));
            }
            // The chosen family's labels come first where they would meet.
            for contour in &contours {
                names.extend(self.name_of(family, contour));
            }
        }
        (nodes, names)
    }

    /// A label on its line, sliding along it to where nothing else is.
    fn name_of(&mut self, family: Family, contour: &Contour) -> Option<Node> {
        let size = self.sheet.text;
        let points: Vec<Px> = contour.points.iter().map(|place| self.plot.px(place)).collect();
        let seen = visible(&points, &self.plot.area.grown(-1.0));
        if length(&seen) < SHORT * size.max(0.4 * width(&contour.label, size, false)) {
            return None;
        }
        // Humidity near its warm end; the others near saturation, where they are read.
        let best = if family == Family::RelativeHumidity { 0.88 } else { 0.12 };
        let spots: Vec<Spot> = (0..=22)
            .filter_map(|step| {
                let share = 0.06 + 0.04 * f64::from(step);
                let at = along(&seen, share)?.moved(0.0, 0.35 * size);
                Some(self.spot(&contour.label, at, Anchor::Middle, false, (share - best).abs()))
            })
            .collect();
        let spot = self.placer.place_if_free(spots)?;
        Some(self.words("pc-level", &spot, &contour.label))
    }
}
