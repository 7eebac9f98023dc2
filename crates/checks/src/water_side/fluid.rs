//! What flows in a pipe: water by IAPWS SR6-08 at 0.1 MPa, glycols by Melinder's fits.

use dewledger_properties::{glycol::Glycol, water};
use dewledger_quantities::{
    EnthalpyDifference, MassDensity, Power, Pressure, Quantity, Ratio, SpecificHeatCapacity,
    ThermodynamicTemperature, WaterFlow, difference,
};

use super::SAME_K;

/// Pressure at which water's properties are taken, Pa: the pipe's own moves them by less than 0.05 %.
const PRESSURE_PA: f64 = 1e5;
/// Freezing point of water, K.
const WATER_FREEZES_K: f64 = 273.15;

/// What flows in the pipe.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Fluid {
    /// Water.
    Water,
    /// A glycol and its mass fraction, 0 to 0.6.
    Glycol(Glycol, Ratio),
}

impl Fluid {
    /// Density, kg/m³. Range: liquid, −15 to 100 °C. None outside.
    #[must_use]
    pub fn density(self, t: ThermodynamicTemperature) -> Option<MassDensity> {
        match self {
            Fluid::Water => water::density(t, Pressure::from_si(PRESSURE_PA)).ok(),
            Fluid::Glycol(glycol, strength) => glycol.density(strength, t).ok(),
        }
    }

    /// Change of enthalpy, J/kg. Range: as [`Fluid::density`], at both ends. None outside.
    #[must_use]
    pub fn enthalpy_change(
        self,
        from: ThermodynamicTemperature,
        to: ThermodynamicTemperature,
    ) -> Option<EnthalpyDifference> {
        match self {
            Fluid::Water => {
                let at = |t| water::enthalpy(t, Pressure::from_si(PRESSURE_PA)).ok();
                Some(EnthalpyDifference::from_si(at(to)?.si() - at(from)?.si()))
            }
            Fluid::Glycol(glycol, strength) => glycol.enthalpy_change(strength, from, to).ok(),
        }
    }

    /// Heat capacity, J/(kg K). Range: as [`Fluid::density`]. None outside.
    #[must_use]
    pub fn heat_capacity(self, t: ThermodynamicTemperature) -> Option<SpecificHeatCapacity> {
        match self {
            Fluid::Water => water::heat_capacity(t).ok(),
            Fluid::Glycol(glycol, strength) => glycol.heat_capacity(strength, t).ok(),
        }
    }

    /// Mean heat capacity between two temperatures, J/(kg K). Range: as [`Fluid::density`]. None outside.
    #[must_use]
    pub fn mean_heat_capacity(
        self,
        from: ThermodynamicTemperature,
        to: ThermodynamicTemperature,
    ) -> Option<SpecificHeatCapacity> {
        let rise = difference(to, from).si();
        if rise.abs() < SAME_K {
            return self.heat_capacity(from);
        }
        self.enthalpy_change(from, to).map(|h| SpecificHeatCapacity::from_si(h.si() / rise))
    }

    /// Freezing point, K.
    #[must_use]
    pub fn freezing(self) -> ThermodynamicTemperature {
        let water = ThermodynamicTemperature::from_si(WATER_FREEZES_K);
        match self {
            Fluid::Water => water,
            Fluid::Glycol(glycol, strength) => {
                glycol.freezing_temperature(strength).unwrap_or(water)
            }
        }
    }
}

/// Heat that a flow of a fluid takes up between two temperatures, W; the flow is that at `meter`. None outside the
/// range of the fluid.
#[must_use]
pub fn heat(
    fluid: Fluid,
    flow: WaterFlow,
    meter: ThermodynamicTemperature,
    entering: ThermodynamicTemperature,
    leaving: ThermodynamicTemperature,
) -> Option<Power> {
    let mass_flow = flow.si() * fluid.density(meter)?.si();
    Some(Power::from_si(mass_flow * fluid.enthalpy_change(entering, leaving)?.si()))
}
