//! The saturation curve, over ice and over liquid water.

use dewledger_properties::{saturation_humidity_ratio, saturation_humidity_ratio_over_liquid};
use dewledger_quantities::{Pressure, Quantity, ThermodynamicTemperature};

use crate::window::{Place, Window};

/// Triple point of water, K: below it air is saturated over ice (IAPWS R14-08).
const TRIPLE_K: f64 = 273.16;
/// Points along the window.
const POINTS: u32 = 96;

/// The saturation curve of a window.
#[derive(Debug, Clone, PartialEq)]
pub struct Saturation {
    /// Over ice below 0.01 °C, over liquid water above.
    pub stable: Vec<Place>,
    /// Over supercooled liquid water below 0.01 °C, where air can still be clear: empty in warmer windows.
    pub supercooled: Vec<Place>,
}

/// The saturation curve of `window` at `pressure`, to the first point above the window.
#[must_use]
pub fn saturation(window: &Window, pressure: Pressure) -> Saturation {
    let (coldest, warmest) = (window.coldest.si(), window.warmest.si());
    let below = (coldest < TRIPLE_K).then(|| warmest.min(TRIPLE_K));
    let mut grid = steps(coldest, below.unwrap_or(coldest));
    grid.extend(steps(grid.last().copied().unwrap_or(coldest), warmest).into_iter().skip(1));
    let stable =
        curve(&grid, window, |t| saturation_humidity_ratio(t, pressure).ok().map(Quantity::si));
    let supercooled = below.map_or_else(Vec::new, |end| {
        curve(&steps(coldest, end), window, |t| {
            saturation_humidity_ratio_over_liquid(t, pressure).ok().map(Quantity::si)
        })
    });
    Saturation { stable, supercooled }
}

/// From one temperature to another, K, in even steps; the first alone where they are the same.
fn steps(from: f64, to: f64) -> Vec<f64> {
    if to <= from {
        return vec![from];
    }
    (0..=POINTS).map(|step| from + (to - from) * f64::from(step) / f64::from(POINTS)).collect()
}

/// Points until one lies above the window: further up nothing is seen.
fn curve(
    grid: &[f64],
    window: &Window,
    of: impl Fn(ThermodynamicTemperature) -> Option<f64>,
) -> Vec<Place> {
    let mut points = Vec::with_capacity(grid.len());
    for t in grid {
        let Some(w) = of(ThermodynamicTemperature::from_si(*t)) else { break };
        points.push(Place::si(*t, w));
        if w > window.wettest.si() {
            break;
        }
    }
    points
}

impl Saturation {
    /// The edge of the fog: over liquid water throughout, since air can be clear up to there.
    pub(crate) fn edge(&self) -> Vec<Place> {
        let mut edge = self.supercooled.clone();
        let above = |place: &&Place| place.dry_bulb.si() > TRIPLE_K || self.supercooled.is_empty();
        // A curve that left the window over liquid water has no more to come.
        if self.supercooled.last().is_none_or(|last| last.dry_bulb.si() >= TRIPLE_K - 1e-9) {
            edge.extend(self.stable.iter().filter(above));
        }
        edge
    }
}
