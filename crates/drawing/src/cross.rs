//! What air is at a place of the chart.

use dewledger_properties::{MoistAir, saturation_humidity_ratio_over_liquid};
use dewledger_quantities::{HumidityRatio, Pressure, Quantity};

use crate::window::Place;

/// What is at a place.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Cross {
    /// Clear air.
    Air(MoistAir),
    /// More water than air of this dry bulb holds as vapour.
    Fog {
        /// What it holds at most.
        most: HumidityRatio,
    },
}

/// What air is at `place` and `pressure`: clear up to saturation over liquid water, also below freezing.
#[must_use]
pub fn read(place: &Place, pressure: Pressure) -> Cross {
    match saturation_humidity_ratio_over_liquid(place.dry_bulb, pressure) {
        Ok(most) if place.humidity_ratio.si() > most.si() => Cross::Fog { most },
        // Above boiling there is no most.
        Ok(_) | Err(_) => Cross::Air(MoistAir::unchecked(
            place.dry_bulb,
            HumidityRatio::from_si(place.humidity_ratio.si().max(0.0)),
            pressure,
        )),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Air of 20 °C at 101.325 kPa holds 14.7 g/kg (published moist-air tables, from memory).
    #[test]
    fn beyond_saturation_there_is_fog() {
        let pressure = Pressure::from_si(101_325.0);
        let at = |w: f64| read(&Place::si(293.15, w), pressure);
        assert!(matches!(at(0.0146), Cross::Air(air) if air.relative_humidity().si() > 0.98));
        let Cross::Fog { most } = at(0.0150) else { panic!("it is foggy") };
        assert!((most.si() - 0.0147).abs() < 1e-4, "{most:?}");
        // Below freezing air can hold more than over ice: −10 °C, 1.7 g/kg is clear.
        assert!(matches!(read(&Place::si(263.15, 0.0017), pressure), Cross::Air(_)));
    }
}
