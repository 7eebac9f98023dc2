//! The ± of a state as it is drawn: an ellipse, or a bar where only one of the two is known.

use dewledger_checks::doubt::{COVERAGE_95, StateDoubt};

use crate::geometry::Px;
use crate::node::{Node, hundredths};
use crate::plot::Plot;

/// Half-axes over standard uncertainties of the ellipse that holds both quantities together 95 times in 100: the square
/// root of the 0.95 quantile of chi-squared with two degrees of freedom, `sqrt(-2 ln 0.05)` (JCGM 102:2011, 6.5.2).
pub(crate) const ELLIPSE_95: f64 = 2.447_746_830_680_816;

/// An ellipse on the drawing.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Ellipse {
    /// Half-axes, px, the longer one first.
    pub(crate) long: f64,
    pub(crate) short: f64,
    /// Direction of the longer one, degrees, growing clockwise from the right.
    pub(crate) tilt: f64,
}

impl Ellipse {
    /// How far it reaches from its middle in a direction (radians, growing clockwise from the right), px.
    pub(crate) fn reach(&self, angle: f64) -> f64 {
        let along = angle - self.tilt.to_radians();
        (along.cos() / self.long).hypot(along.sin() / self.short.max(0.5)).recip()
    }

    /// Half the width and half the height of the box around it, px.
    pub(crate) fn half_box(&self) -> (f64, f64) {
        let (sin, cos) = self.tilt.to_radians().sin_cos();
        ((self.long * cos).hypot(self.short * sin), (self.long * sin).hypot(self.short * cos))
    }
}

/// The ellipse of a doubt whose two parts are known.
pub(crate) fn ellipse(doubt: &StateDoubt, plot: &Plot) -> Option<Ellipse> {
    let (per_k, per_ratio) = plot.per_unit();
    let across = doubt.dry_bulb_k? * per_k;
    let up = doubt.humidity_ratio_kg_kg? * per_ratio;
    // y grows downwards on the drawing, so what rises with the dry bulb falls there.
    let both = -doubt.correlation * across * up;
    let (a, c) = (across * across, up * up);
    let middle = 0.5 * (a + c);
    let apart = (0.5 * (a - c)).hypot(both);
    let long = ELLIPSE_95 * (middle + apart).max(0.0).sqrt();
    let short = ELLIPSE_95 * (middle - apart).max(0.0).sqrt();
    let tilt = 0.5 * (2.0 * both).atan2(a - c).to_degrees();
    (long.is_finite() && tilt.is_finite() && long > 0.0).then_some(Ellipse { long, short, tilt })
}

/// The ± of a state at `at`: none while it would not be seen beside the dot.
pub(crate) fn draw(doubt: &StateDoubt, at: Px, plot: &Plot) -> Option<Node> {
    if let Some(Ellipse { long, short, tilt }) = ellipse(doubt, plot) {
        return Some(
            Node::of("ellipse", "pc-doubt")
                .px("rx", long)
                // A line without thickness is not drawn.
                .px("ry", short.max(0.5))
                .with(
                    "transform",
                    format!(
                        "translate({} {}) rotate({})",
                        hundredths(at.x),
                        hundredths(at.y),
                        hundredths(tilt)
                    ),
                ),
        );
    }
    let (per_k, per_ratio) = plot.per_unit();
    let (dx, dy, (cx, cy)) = match (doubt.dry_bulb_k, doubt.humidity_ratio_kg_kg) {
        (Some(u), None) => (COVERAGE_95 * u * per_k, 0.0, (0.0, 5.0)),
        (None, Some(u)) => (0.0, COVERAGE_95 * u * per_ratio, (5.0, 0.0)),
        _ => return None,
    };
    if dx + dy <= 0.0 {
        return None;
    }
    let line = |from: Px, to: Px| {
        format!(
            "M{} {}L{} {}",
            hundredths(from.x),
            hundredths(from.y),
            hundredths(to.x),
            hundredths(to.y)
        )
    };
    let ends = [at.moved(-dx, -dy), at.moved(dx, dy)];
    let caps = ends.map(|end| line(end.moved(-cx, -cy), end.moved(cx, cy)));
    let path = format!("{}{}{}", line(ends[0], ends[1]), caps[0], caps[1]);
    Some(Node::of("path", "pc-doubt-bar").with("d", path))
}

#[cfg(test)]
mod tests {
    use dewledger_quantities::UnitChoice;

    use super::*;
    use crate::plot::Sheet;
    use crate::window::Window;

    fn plot() -> Plot {
        let sheet = Sheet { width: 400.0, height: 400.0, text: 14.0 };
        Plot::new(Window::si((273.15, 303.15), (0.0, 0.02)), &sheet, &UnitChoice::si())
    }

    fn doubt(dry_bulb: f64, ratio: f64, correlation: f64) -> StateDoubt {
        StateDoubt { dry_bulb_k: Some(dry_bulb), humidity_ratio_kg_kg: Some(ratio), correlation }
    }

    /// Without correlation the axes are the two standard uncertainties; fully correlated it is a line from the lower left
    /// to the upper right (elementary).
    #[test]
    fn an_ellipse_tilts_with_what_errs_together() {
        let plot = plot();
        let (per_k, per_ratio) = plot.per_unit();
        let upright = ellipse(&doubt(0.5, 1e-4, 0.0), &plot).unwrap();
        assert!((upright.long - ELLIPSE_95 * 0.5 * per_k).abs() < 1e-9);
        assert!((upright.short - ELLIPSE_95 * 1e-4 * per_ratio).abs() < 1e-9);
        assert!(upright.tilt.abs() < 1e-9);
        let alike = 0.5 * per_k / per_ratio;
        let line = ellipse(&doubt(0.5, alike, 1.0), &plot).unwrap();
        assert!((line.tilt + 45.0).abs() < 1e-6 && line.short < 1e-3, "{line:?}");
        let other = ellipse(&doubt(0.5, alike, -0.6), &plot).unwrap();
        assert!((other.tilt - 45.0).abs() < 1e-6);
        assert!((other.reach(45.0_f64.to_radians()) - other.long).abs() < 1e-9);
        assert!((other.reach(135.0_f64.to_radians()) - other.short).abs() < 1e-9);
        // Each coordinate by itself: its own standard uncertainty (elementary).
        let (half_width, half_height) = other.half_box();
        assert!((half_width - ELLIPSE_95 * 0.5 * per_k).abs() < 1e-9);
        assert!((half_height - ELLIPSE_95 * 0.5 * per_k).abs() < 1e-9);
        // Half-axes of a correlation r between equals are sqrt(1 ± r).
        assert!((other.long / other.short - (1.6_f64 / 0.4).sqrt()).abs() < 1e-9);
    }

    /// `1 - exp(-k²/2)` of draws of two independent normals lie within k: 0.95 by definition.
    #[test]
    fn the_ellipse_holds_95_in_100() {
        assert!((1.0 - (-0.5 * ELLIPSE_95 * ELLIPSE_95).exp() - 0.95).abs() < 1e-12);
    }

    #[test]
    fn what_is_not_known_is_not_drawn() {
        let plot = plot();
        let at = Px::new(100.0, 100.0);
        let only = StateDoubt { humidity_ratio_kg_kg: None, ..doubt(0.5, 0.0, 0.0) };
        assert_eq!(draw(&only, at, &plot).unwrap().attribute("class"), Some("pc-doubt-bar"));
        let neither = StateDoubt { dry_bulb_k: None, ..only };
        assert_eq!(draw(&neither, at, &plot), None);
        assert_eq!(draw(&doubt(0.0, 0.0, 0.0), at, &plot), None);
    }
}
