//! Families of lines on the chart: relative humidity, wet bulb, enthalpy, specific volume.
//!
//! Each point is worked out by `properties` for its own dry bulb; nothing is interpolated between lines.

use dewledger_properties::{Humidity, MoistAir, Wick};
use dewledger_quantities::{
    Amount, Enthalpy, HumidityRatio, Kind, Pressure, Quantity, RelativeHumidity,
    ThermodynamicTemperature, UnitChoice,
};

use crate::scale::Scale;
use crate::window::{Place, Window};

/// What is the same along each line of a family.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Family {
    /// Relative humidity over liquid water.
    RelativeHumidity,
    /// Thermodynamic wet bulb: of a wet wick above 0.01 °C, of an iced one below.
    WetBulb,
    /// Enthalpy per mass of dry air.
    Enthalpy,
    /// Volume per mass of dry air.
    SpecificVolume,
}

/// One line of a family.
#[derive(Debug, Clone, PartialEq)]
pub struct Contour {
    /// What is the same along it.
    pub level: Amount,
    /// What stands at it: "60 %", "18 °C".
    pub label: String,
    /// From cold to warm.
    pub points: Vec<Place>,
}

/// Points of a line of relative humidity, which bends.
const BENT: u32 = 64;
/// Points of the other lines, which hardly do.
const STRAIGHT: u32 = 24;
/// Triple point of water, K.
const TRIPLE_K: f64 = 273.16;
/// Dry bulbs that moist air is worked out for, K.
const RANGE_K: (f64, f64) = (213.15, 363.15);

impl Family {
    /// All of them, in the order in which a person is offered them.
    pub const ALL: [Family; 4] =
        [Family::RelativeHumidity, Family::WetBulb, Family::Enthalpy, Family::SpecificVolume];

    /// Identifier in requests.
    #[must_use]
    pub const fn id(self) -> &'static str {
        match self {
            Family::RelativeHumidity => "relative_humidity",
            Family::WetBulb => "wet_bulb",
            Family::Enthalpy => "enthalpy",
            Family::SpecificVolume => "specific_volume",
        }
    }

    /// Name on screen.
    #[must_use]
    pub const fn label(self) -> &'static str {
        match self {
            Family::RelativeHumidity => "Relative humidity",
            Family::WetBulb => "Wet bulb",
            Family::Enthalpy => "Enthalpy",
            Family::SpecificVolume => "Specific volume",
        }
    }

    /// One word for it, on a key.
    #[must_use]
    pub const fn short(self) -> &'static str {
        match self {
            Family::RelativeHumidity => "Humidity",
            Family::WetBulb => "Wet bulb",
            Family::Enthalpy => "Enthalpy",
            Family::SpecificVolume => "Volume",
        }
    }

    /// What is drawn when it is chosen.
    #[must_use]
    pub const fn help(self) -> &'static str {
        match self {
            Family::RelativeHumidity => "Lines of relative humidity alone",
            Family::WetBulb => "Wet bulb beside relative humidity",
            Family::Enthalpy => "Enthalpy of moist air beside relative humidity",
            Family::SpecificVolume => {
                "Volume of moist air for each mass of dry air, beside relative humidity"
            }
        }
    }

    /// The quantity.
    #[must_use]
    pub const fn kind(self) -> Kind {
        match self {
            Family::RelativeHumidity => Kind::RelativeHumidity,
            Family::WetBulb => Kind::Temperature,
            Family::Enthalpy => Kind::Enthalpy,
            Family::SpecificVolume => Kind::SpecificVolume,
        }
    }

    /// The family's quantity of a state, stored SI. Near freezing a wick can be wet or iced; `near` says which is meant.
    fn near(self, air: &MoistAir, near: f64) -> Option<f64> {
        if self != Family::WetBulb {
            return self.of(air);
        }
        let wet_bulb = air.wet_bulb().ok()?;
        let meant = if near < TRIPLE_K { wet_bulb.ice } else { wet_bulb.liquid };
        Some(meant.unwrap_or_else(|| wet_bulb.reading()).si())
    }

    /// The family's quantity of a state, stored SI.
    fn of(self, air: &MoistAir) -> Option<f64> {
        match self {
            Family::RelativeHumidity => Some(air.relative_humidity().si()),
            Family::WetBulb => air.wet_bulb().ok().map(|wet_bulb| wet_bulb.reading().si()),
            Family::Enthalpy => Some(air.enthalpy().si()),
            Family::SpecificVolume => Some(air.specific_volume().si()),
        }
    }
}

fn air(t: f64, w: f64, pressure: Pressure) -> MoistAir {
    MoistAir::unchecked(ThermodynamicTemperature::from_si(t), HumidityRatio::from_si(w), pressure)
}

/// Humidity ratio of saturated air, over ice below 0.01 °C; none above boiling.
fn saturated(t: f64, pressure: Pressure) -> Option<f64> {
    let air = MoistAir::saturated(ThermodynamicTemperature::from_si(t), pressure).ok()?;
    Some(air.humidity_ratio().si())
}

/// The lines of `family` that can be seen in `window`, at most about `most` of them, at round numbers of the person's units.
#[must_use]
pub fn contours(
    family: Family,
    window: &Window,
    pressure: Pressure,
    units: &UnitChoice,
    most: f64,
) -> Vec<Contour> {
    let Some(range) = range(family, window, pressure) else { return Vec::new() };
    let Some(scale) = Scale::over(family.kind(), range, units.get(family.kind()), most) else {
        return Vec::new();
    };
    scale
        .amounts()
        .filter(|level| {
            // The line of saturation is drawn as such, and that of no humidity is the axis.
            family != Family::RelativeHumidity || (level.si() > 1e-9 && level.si() < 1.0 - 1e-9)
        })
        .filter_map(|level| {
            let points = match family {
                Family::RelativeHumidity => humidity_line(level.si(), window, pressure),
                Family::WetBulb | Family::Enthalpy | Family::SpecificVolume => {
                    slanting_line(family, level.si(), window, pressure)?
                }
            };
            (points.len() > 1).then(|| Contour { level, label: scale.text(level), points })
        })
        .collect()
}

/// The least and the most of the quantity in the window. Each grows with the dry bulb and the humidity ratio, but relative
/// humidity, which falls with the dry bulb.
fn range(family: Family, window: &Window, pressure: Pressure) -> Option<(f64, f64)> {
    let (coldest, warmest) = (window.coldest.si(), window.warmest.si());
    let clear =
        |t: f64, w: f64| air(t, saturated(t, pressure).map_or(w, |most| w.min(most)), pressure);
    let (driest, wettest) = (window.driest.si(), window.wettest.si());
    if family == Family::RelativeHumidity {
        let most = family.of(&air(coldest, wettest, pressure))?.min(1.0);
        return Some((family.of(&air(warmest, driest, pressure))?, most));
    }
    Some((family.of(&clear(coldest, driest))?, family.of(&clear(warmest, wettest))?))
}

/// A line of relative humidity, to the first point above the window.
fn humidity_line(level: f64, window: &Window, pressure: Pressure) -> Vec<Place> {
    let mut points = Vec::new();
    for step in 0..=BENT {
        let t = window.coldest.si() + window.span_k() * f64::from(step) / f64::from(BENT);
        let humidity = Humidity::RelativeHumidity(RelativeHumidity::from_si(level));
        let Ok(air) = MoistAir::new(ThermodynamicTemperature::from_si(t), humidity, pressure)
        else {
            break;
        };
        let w = air.humidity_ratio().si();
        points.push(Place::si(t, w));
        if w > window.wettest.si() {
            break;
        }
    }
    points
}

/// A line that goes down from saturation to bone-dry air as it gets warmer.
fn slanting_line(
    family: Family,
    level: f64,
    window: &Window,
    pressure: Pressure,
) -> Option<Vec<Place>> {
    let at_saturation =
        |t: f64| saturated(t, pressure).and_then(|w| family.of(&air(t, w, pressure)));
    let start = match family {
        Family::WetBulb => level,
        Family::RelativeHumidity | Family::Enthalpy | Family::SpecificVolume => {
            root(RANGE_K, |t| at_saturation(t).map_or(f64::INFINITY, |value| value - level))?
        }
    };
    let dry =
        |t: f64| family.near(&air(t, 0.0, pressure), level).map_or(f64::NAN, |value| value - level);
    let end = root((start, RANGE_K.1), dry).unwrap_or(RANGE_K.1);
    // A little beyond the window, so that the line reaches its edges.
    let margin = 0.02 * window.span_k();
    let from = start.max(window.coldest.si() - margin);
    let to = end.min(window.warmest.si() + margin);
    if from >= to {
        return None;
    }
    let mut points = Vec::new();
    for step in 0..=STRAIGHT {
        let t = from + (to - from) * f64::from(step) / f64::from(STRAIGHT);
        let w = if step == 0 && from <= start {
            saturated(t, pressure)
        } else if step == STRAIGHT && to >= end && end < RANGE_K.1 {
            Some(0.0)
        } else {
            humidity_ratio(family, level, t, pressure)
        };
        points.extend(w.map(|w| Place::si(t, w)));
    }
    Some(points)
}

/// Humidity ratio of air at `t` on a line; none where the line does not go.
fn humidity_ratio(family: Family, level: f64, t: f64, pressure: Pressure) -> Option<f64> {
    let dry_bulb = ThermodynamicTemperature::from_si(t);
    let humidity = match family {
        Family::RelativeHumidity => Humidity::RelativeHumidity(RelativeHumidity::from_si(level)),
        Family::WetBulb => {
            Humidity::WetBulb(ThermodynamicTemperature::from_si(level), Wick::NotSaid)
        }
        Family::Enthalpy => Humidity::Enthalpy(Enthalpy::from_si(level)),
        Family::SpecificVolume => return by_volume(level, t, pressure),
    };
    let air = MoistAir::new(dry_bulb, humidity, pressure).ok()?;
    Some(air.humidity_ratio().si())
}

/// Humidity ratio of a specific volume, which is all but linear in it: a secant from bone-dry air.
fn by_volume(volume: f64, t: f64, pressure: Pressure) -> Option<f64> {
    let residual = |w: f64| air(t, w, pressure).specific_volume().si() - volume;
    let (mut one, mut other) = (0.0, 0.01);
    let (mut at_one, mut at_other) = (residual(one), residual(other));
    for _ in 0..12 {
        let slope = (at_other - at_one) / (other - one);
        let next = other - at_other / slope;
        if !next.is_finite() {
            return None;
        }
        (one, at_one) = (other, at_other);
        other = next;
        at_other = residual(other);
        if (other - one).abs() < 1e-13 {
            break;
        }
    }
    (other >= -1e-12).then_some(other.max(0.0))
}

/// The root of a growing function within a range, to 1e-9 of its unit, by halving; none where it has none.
fn root((mut low, mut high): (f64, f64), f: impl Fn(f64) -> f64) -> Option<f64> {
    if !(f(low) <= 0.0 && f(high) >= 0.0) {
        return None;
    }
    while high - low > 1e-9 {
        let middle = 0.5 * (low + high);
        if f(middle) <= 0.0 {
            low = middle;
        } else {
            high = middle;
        }
    }
    Some(0.5 * (low + high))
}
