//! The part of the chart that is looked at.

use dewledger_quantities::{HumidityRatio, Kind, Quantity, ThermodynamicTemperature, UnitChoice};

use crate::geometry::Px;
use crate::plot::{Plot, Sheet};
use crate::scale::Scale;

/// A place on the chart, whether or not air can be there.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Place {
    /// Dry bulb.
    pub dry_bulb: ThermodynamicTemperature,
    /// Humidity ratio.
    pub humidity_ratio: HumidityRatio,
}

impl Place {
    /// At a dry bulb in K and a humidity ratio in kg/kg.
    pub(crate) fn si(dry_bulb_k: f64, humidity_ratio: f64) -> Self {
        Self {
            dry_bulb: ThermodynamicTemperature::from_si(dry_bulb_k),
            humidity_ratio: HumidityRatio::from_si(humidity_ratio),
        }
    }
}

/// The part of the chart that is looked at: dry bulb from left to right, humidity ratio from below.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Window {
    /// Left edge.
    pub coldest: ThermodynamicTemperature,
    /// Right edge.
    pub warmest: ThermodynamicTemperature,
    /// Lower edge.
    pub driest: HumidityRatio,
    /// Upper edge.
    pub wettest: HumidityRatio,
}

/// Dry bulbs that moist air is worked out for, K.
const DRY_BULB_K: (f64, f64) = (213.15, 363.15);
/// Humidity ratios that can be looked at, kg/kg.
const HUMIDITY_RATIO: (f64, f64) = (0.0, 1.0);
/// Narrowest and widest look along the dry bulb, K.
const SPAN_K: (f64, f64) = (2.0, 150.0);
/// Narrowest and widest look along the humidity ratio, kg/kg.
const SPAN_RATIO: (f64, f64) = (0.000_2, 1.0);
/// The first look is at least this wide, K, and this high, kg/kg, so that an everyday chart is recognised.
const HOME_SPAN_K: f64 = 24.0;
const HOME_TOP: f64 = 0.008;

/// What a finger, a wheel or a key does to the window, in pixels of the drawing that it was done on.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Gesture {
    /// Drawn to the right by this, px.
    pub dx: f64,
    /// Drawn down by this, px.
    pub dy: f64,
    /// Made larger by this factor, above 0.
    pub zoom: f64,
    /// The point that stays where it is while it grows; it is then drawn along.
    pub about: Px,
}

impl Window {
    /// The window that frames `places`, with room around them, widened to round numbers of the person's units.
    #[must_use]
    pub fn around(places: &[Place], units: &UnitChoice, sheet: &Sheet) -> Self {
        let temperatures: Vec<f64> = places.iter().map(|place| place.dry_bulb.si()).collect();
        let low = temperatures.iter().copied().fold(f64::INFINITY, f64::min);
        let high = temperatures.iter().copied().fold(f64::NEG_INFINITY, f64::max);
        let (low, high) = if low <= high { (low, high) } else { (283.15, 298.15) };
        let pad = (0.3 * (high - low)).max(5.0);
        let (mut low, mut high) = (low - pad, high + pad);
        let short = HOME_SPAN_K - (high - low);
        if short > 0.0 {
            low -= 0.5 * short;
            high += 0.5 * short;
        }
        let wettest = places.iter().map(|place| place.humidity_ratio.si()).fold(0.0, f64::max);
        let top = (1.5 * wettest).max(HOME_TOP);
        let unit = units.get(Kind::Temperature);
        let range = (low.max(DRY_BULB_K.0), high.min(DRY_BULB_K.1));
        let (low, high) =
            Scale::widened(Kind::Temperature, range, unit, sheet.most_across()).unwrap_or(range);
        let unit = units.get(Kind::HumidityRatio);
        let (_, top) = Scale::widened(Kind::HumidityRatio, (0.0, top), unit, sheet.most_up())
            .unwrap_or((0.0, top));
        Self::si((low, high), (0.0, top)).kept()
    }

    /// From bare edges, K and kg/kg, as they come back from a screen; brought to where there is a chart.
    #[must_use]
    pub fn si(dry_bulb_k: (f64, f64), humidity_ratio: (f64, f64)) -> Self {
        Self {
            coldest: ThermodynamicTemperature::from_si(dry_bulb_k.0),
            warmest: ThermodynamicTemperature::from_si(dry_bulb_k.1),
            driest: HumidityRatio::from_si(humidity_ratio.0),
            wettest: HumidityRatio::from_si(humidity_ratio.1),
        }
        .kept()
    }

    /// After a gesture on a drawing of this window on `sheet`.
    #[must_use]
    pub fn after(self, gesture: Gesture, sheet: &Sheet, units: &UnitChoice) -> Self {
        let plot = Plot::new(self, sheet, units);
        let zoom = if gesture.zoom > 0.0 && gesture.zoom.is_finite() { gesture.zoom } else { 1.0 };
        // Where a corner of the new window lay on the old drawing.
        let from = |x: f64, y: f64| {
            let about = gesture.about;
            Px::new(
                about.x + (x - gesture.dx - about.x) / zoom,
                about.y + (y - gesture.dy - about.y) / zoom,
            )
        };
        let area = plot.area;
        let low = plot.place(from(area.left, area.bottom()));
        let high = plot.place(from(area.right(), area.top));
        Self::si(
            (low.dry_bulb.si(), high.dry_bulb.si()),
            (low.humidity_ratio.si(), high.humidity_ratio.si()),
        )
    }

    /// Whether a place lies in it.
    #[must_use]
    pub fn holds(&self, place: &Place) -> bool {
        (self.coldest.si()..=self.warmest.si()).contains(&place.dry_bulb.si())
            && (self.driest.si()..=self.wettest.si()).contains(&place.humidity_ratio.si())
    }

    pub(crate) fn span_k(&self) -> f64 {
        self.warmest.si() - self.coldest.si()
    }

    pub(crate) fn span_ratio(&self) -> f64 {
        self.wettest.si() - self.driest.si()
    }

    /// Brought to where there is a chart: first its size, then its place.
    fn kept(self) -> Self {
        let (coldest, warmest) =
            within((self.coldest.si(), self.warmest.si()), SPAN_K, DRY_BULB_K, HOME_SPAN_K);
        let (driest, wettest) =
            within((self.driest.si(), self.wettest.si()), SPAN_RATIO, HUMIDITY_RATIO, 0.02);
        Self {
            coldest: ThermodynamicTemperature::from_si(coldest),
            warmest: ThermodynamicTemperature::from_si(warmest),
            driest: HumidityRatio::from_si(driest),
            wettest: HumidityRatio::from_si(wettest),
        }
    }
}

/// A range of a size within `spans` and a place within `limits`; `usual` wide where it is none at all.
fn within(
    (low, high): (f64, f64),
    spans: (f64, f64),
    limits: (f64, f64),
    usual: f64,
) -> (f64, f64) {
    if !(low.is_finite() && high.is_finite()) {
        let middle = limits.0 + 0.5 * (limits.1 - limits.0).min(4.0 * usual);
        return (middle - 0.5 * usual, middle + 0.5 * usual);
    }
    let span = (high - low).clamp(spans.0, spans.1.min(limits.1 - limits.0));
    let middle = 0.5 * (low + high);
    let low = (middle - 0.5 * span).clamp(limits.0, limits.1 - span);
    (low, low + span)
}

#[cfg(test)]
mod tests {
    use super::*;

    const SHEET: Sheet = Sheet { width: 358.0, height: 396.0, text: 14.0 };

    fn near(one: f64, other: f64, by: f64) {
        assert!((one - other).abs() <= by, "{one} against {other}");
    }

    #[test]
    fn the_first_look_frames_the_states_with_room_and_round_edges() {
        let places = [Place::si(285.75, 0.0098), Place::si(299.55, 0.0111)];
        let window = Window::around(&places, &UnitChoice::si(), &SHEET);
        assert!(places.iter().all(|place| window.holds(place)));
        near(window.driest.si(), 0.0, 0.0);
        near((window.coldest.si() - 273.15).rem_euclid(5.0), 0.0, 1e-9);
        near((window.warmest.si() - 273.15).rem_euclid(5.0), 0.0, 1e-9);
        assert!(window.span_k() >= HOME_SPAN_K && window.wettest.si() >= 0.0165);
        let nothing = Window::around(&[], &UnitChoice::ip(), &SHEET);
        assert!(nothing.span_k() >= HOME_SPAN_K);
    }

    #[test]
    fn zoom_keeps_the_point_under_the_finger() {
        let units = UnitChoice::si();
        let window = Window::si((273.15, 308.15), (0.0, 0.02));
        let about = Px::new(120.0, 200.0);
        let before = Plot::new(window, &SHEET, &units).place(about);
        let zoomed = window.after(Gesture { dx: 0.0, dy: 0.0, zoom: 2.0, about }, &SHEET, &units);
        let after = Plot::new(zoomed, &SHEET, &units).place(about);
        near(after.dry_bulb.si(), before.dry_bulb.si(), 1e-9);
        near(after.humidity_ratio.si(), before.humidity_ratio.si(), 1e-12);
        near(zoomed.span_k(), 17.5, 1e-9);
        let back = zoomed.after(Gesture { dx: 0.0, dy: 0.0, zoom: 0.5, about }, &SHEET, &units);
        near(back.coldest.si(), window.coldest.si(), 1e-9);
        near(back.wettest.si(), window.wettest.si(), 1e-12);
    }

    #[test]
    fn a_drag_goes_along_with_the_finger_and_stops_at_the_edge_of_the_chart() {
        let units = UnitChoice::si();
        let window = Window::si((283.15, 308.15), (0.005, 0.02));
        let drag = |dx: f64, dy: f64| {
            let about = Px::new(0.0, 0.0);
            window.after(Gesture { dx, dy, zoom: 1.0, about }, &SHEET, &units)
        };
        let plot = Plot::new(window, &SHEET, &units);
        let moved = drag(30.0, 10.0);
        let here = plot.place(Px::new(100.0, 100.0));
        let there = Plot::new(moved, &SHEET, &units).place(Px::new(130.0, 110.0));
        near(here.dry_bulb.si(), there.dry_bulb.si(), 1e-9);
        near(here.humidity_ratio.si(), there.humidity_ratio.si(), 1e-12);
        let far = drag(1e7, -1e7);
        near(far.coldest.si(), 213.15, 1e-9);
        near(far.driest.si(), 0.0, 1e-12);
        near(far.span_k(), window.span_k(), 1e-9);
    }

    #[test]
    fn whatever_comes_back_from_a_screen_is_a_window() {
        for edges in [f64::NAN, f64::INFINITY, -1e300, 1e300, 0.0] {
            for other in [f64::NAN, -1.0, 300.0, 1e300] {
                let window = Window::si((edges, other), (other, edges));
                assert!(window.span_k() > 1.9 && window.span_k() < 151.0, "{window:?}");
                assert!(window.span_ratio() > 0.0 && window.driest.si() >= 0.0, "{window:?}");
            }
        }
        let usual = Window::si((283.15, 308.15), (0.0, 0.02));
        for bad in [f64::NAN, f64::INFINITY, 0.0, -3.0] {
            let gesture = Gesture { dx: bad, dy: bad, zoom: bad, about: Px::new(bad, bad) };
            let window = usual.after(gesture, &SHEET, &UnitChoice::si());
            assert!(window.span_k().is_finite() && window.span_ratio() > 0.0, "{window:?}");
        }
    }
}
