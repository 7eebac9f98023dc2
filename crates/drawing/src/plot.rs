//! Where the chart's window lies on the drawing, and back.

use dewledger_quantities::{Amount, Kind, Quantity, UnitChoice};

use crate::geometry::{Px, Rect};
use crate::scale::Scale;
use crate::text;
use crate::window::{Place, Window};

/// The paper that is drawn on, in CSS pixels.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Sheet {
    /// Width, px.
    pub width: f64,
    /// Height, px.
    pub height: f64,
    /// Size of the text, px.
    pub text: f64,
}

/// Narrowest and widest paper, px: a small phone, and a large screen.
const SIDE: (f64, f64) = (200.0, 4000.0);
/// Smallest and largest text, px.
const TEXT: (f64, f64) = (8.0, 48.0);

impl Sheet {
    /// Brought to a size that can be drawn on.
    #[must_use]
    pub fn kept(self) -> Self {
        let within = |value: f64, (least, most): (f64, f64)| {
            if value.is_finite() { value.clamp(least, most) } else { least }
        };
        Self {
            width: within(self.width, SIDE),
            height: within(self.height, SIDE),
            text: within(self.text, TEXT),
        }
    }

    /// How many numbers stand along the dry bulb.
    pub(crate) fn most_across(&self) -> f64 {
        (self.width / (3.7 * self.text)).clamp(2.0, 16.0)
    }

    /// How many numbers stand along the humidity ratio.
    pub(crate) fn most_up(&self) -> f64 {
        (self.height / (4.2 * self.text)).clamp(2.0, 12.0)
    }
}

/// A window on a sheet: where a place is drawn, and what place a point is.
#[derive(Debug, Clone, PartialEq)]
pub struct Plot {
    /// What is looked at.
    pub window: Window,
    /// Where it is drawn, without the axes' numbers.
    pub area: Rect,
    pub(crate) across: Option<Scale>,
    pub(crate) up: Option<Scale>,
}

impl Plot {
    /// Leaves room for the numbers at the right and below and for the titles.
    #[must_use]
    pub fn new(window: Window, sheet: &Sheet, units: &UnitChoice) -> Self {
        let across = Scale::over(
            Kind::Temperature,
            (window.coldest.si(), window.warmest.si()),
            units.get(Kind::Temperature),
            sheet.most_across(),
        );
        let up = Scale::over(
            Kind::HumidityRatio,
            (window.driest.si(), window.wettest.si()),
            units.get(Kind::HumidityRatio),
            sheet.most_up(),
        );
        let widest = |scale: &Option<Scale>| {
            scale
                .iter()
                .flat_map(|scale| scale.amounts().map(|at| scale.number(at)))
                .fold(0.0, |widest: f64, number| {
                    widest.max(text::width(&number, sheet.text, false))
                })
        };
        let left = sheet.text;
        let top = 2.2 * sheet.text;
        let right = widest(&up) + 1.1 * sheet.text;
        let below = 4.0 * sheet.text;
        let area = Rect::new(
            left,
            top,
            (sheet.width - left - right).max(10.0),
            (sheet.height - top - below).max(10.0),
        );
        Self { window, area, across, up }
    }

    /// Where a place is drawn; outside the area where it is not looked at.
    #[must_use]
    pub fn px(&self, place: &Place) -> Px {
        Px::new(self.x(place.dry_bulb.si()), self.y(place.humidity_ratio.si()))
    }

    pub(crate) fn x(&self, dry_bulb_k: f64) -> f64 {
        self.area.left
            + self.area.width * (dry_bulb_k - self.window.coldest.si()) / self.window.span_k()
    }

    pub(crate) fn y(&self, humidity_ratio: f64) -> f64 {
        self.area.bottom()
            - self.area.height * (humidity_ratio - self.window.driest.si())
                / self.window.span_ratio()
    }

    /// The place of a point.
    #[must_use]
    pub fn place(&self, at: Px) -> Place {
        let across = (at.x - self.area.left) / self.area.width;
        let up = (self.area.bottom() - at.y) / self.area.height;
        Place::si(
            self.window.coldest.si() + across * self.window.span_k(),
            self.window.driest.si() + up * self.window.span_ratio(),
        )
    }

    /// The place of the point of the area that is nearest to a point: a finger may come down beside it.
    #[must_use]
    pub fn nearest(&self, at: Px) -> Place {
        let inside = |value: f64, low: f64, high: f64| {
            if value.is_finite() { value.clamp(low, high) } else { 0.5 * (low + high) }
        };
        self.place(Px::new(
            inside(at.x, self.area.left, self.area.right()),
            inside(at.y, self.area.top, self.area.bottom()),
        ))
    }

    /// Pixels for each kelvin and for each kg/kg.
    pub(crate) fn per_unit(&self) -> (f64, f64) {
        (self.area.width / self.window.span_k(), self.area.height / self.window.span_ratio())
    }

    /// Where a number of an axis is drawn: along it, px.
    pub(crate) fn tick(&self, amount: Amount) -> f64 {
        if amount.kind() == Kind::Temperature { self.x(amount.si()) } else { self.y(amount.si()) }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_point_is_the_place_that_is_drawn_there() {
        let sheet = Sheet { width: 680.0, height: 560.0, text: 14.0 };
        let window = Window::si((275.15, 309.15), (0.0, 0.02));
        let plot = Plot::new(window, &sheet, &UnitChoice::si());
        let place = Place::si(299.55, 0.0111);
        let back = plot.place(plot.px(&place));
        assert!((back.dry_bulb.si() - 299.55).abs() < 1e-9);
        assert!((back.humidity_ratio.si() - 0.0111).abs() < 1e-12);
        let corner = plot.px(&Place::si(309.15, 0.0));
        assert!((corner.x - plot.area.right()).abs() < 1e-9);
        assert!((corner.y - plot.area.bottom()).abs() < 1e-9);
    }

    #[test]
    fn no_sheet_is_too_odd() {
        let odd = Sheet { width: f64::NAN, height: -1.0, text: 1e9 }.kept();
        assert_eq!(odd, Sheet { width: 200.0, height: 200.0, text: 48.0 });
    }
}
