//! Aqueous glycols: density, heat capacity, conductivity, viscosity and freezing point by mass fraction.
//!
//! Å. Melinder, Properties of Secondary Working Fluids for Indirect Systems, 2nd ed., IIR/IIF, Paris 2010
//! (coefficients as an open library's data file cites them; not checked against the book):
//! `P(T, x) = sum C_ij (T − T_b)^i (x − x_b)^j`. Range: mass fraction 0 to 0.6, freezing point to 100 °C.
//! At x = 0 the fits are off pure water by 0.1 %: use [`crate::water`] there.

use dewledger_quantities::{
    EnthalpyDifference, MassDensity, Quantity, Ratio, SpecificHeatCapacity,
    ThermodynamicTemperature,
};

/// A glycol.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Glycol {
    /// Ethylene glycol and water.
    Ethylene,
    /// Propylene glycol and water.
    Propylene,
}

/// Why there is no such mixture.
#[derive(Debug, Clone, Copy, PartialEq, thiserror::Error)]
pub enum GlycolError {
    /// Mass fraction outside 0 to 0.6.
    #[error("mass fraction {} is outside 0 to 0.6", .got.si())]
    StrengthOutOfRange {
        /// As given.
        got: Ratio,
    },
    /// Below freezing of the mixture, or above 100 °C.
    #[error("{} K is below freezing ({} K) or above 373.15 K", .got.si(), .freezing.si())]
    TemperatureOutOfRange {
        /// As given.
        got: ThermodynamicTemperature,
        /// Freezing point of the mixture.
        freezing: ThermodynamicTemperature,
    },
    /// No mixture freezes there.
    #[error("no mixture of this glycol up to 0.6 by mass freezes at {} K", .got.si())]
    NoSuchFreezingPoint {
        /// As given.
        got: ThermodynamicTemperature,
    },
}

type Rows = [[f64; 6]; 4];

struct Fit {
    t_base: f64,
    x_base: f64,
    density: Rows,
    heat_capacity: Rows,
    conductivity: Rows,
    log_viscosity: Rows,
    freezing: [f64; 6],
    /// Density of the pure glycol at 20 °C, kg/m³ (from memory).
    pure_density: f64,
}

static ETHYLENE: Fit = Fit {
    t_base: 304.878,
    x_base: 0.308_462,
    density: [
        [1034.0, 131.1, 0.749, -106.2, -96.23, 489.1],
        [-0.4781, -0.6876, 0.7855, 1.229, -7.211, 0.0],
        [-0.002_692, 0.004_805, -0.003_995, -0.01153, 0.0, 0.0],
        [4.725e-06, 1.69e-06, 4.982e-05, 0.0, 0.0, 0.0],
    ],
    heat_capacity: [
        [3737.0, -1799.0, -993.3, 2610.0, 1537.0, -16180.0],
        [2.93, 10.46, 3.516, -1.189, -42.72, 0.0],
        [-0.004_675, -0.04147, 0.05109, -0.1643, 0.0, 0.0],
        [-1.389e-05, 1.847e-05, -0.000_713_8, 0.0, 0.0, 0.0],
    ],
    conductivity: [
        [0.472, -0.4286, 0.1747, 0.03017, -0.1322, 0.2678],
        [0.000_890_3, -0.001_473, 0.000_681_4, -0.002_412, 0.002_555, 0.0],
        [-1.058e-06, 1.059e-05, -3.612e-05, 4.004e-05, 0.0, 0.0],
        [-2.789e-09, -1.142e-08, 2.365e-08, 0.0, 0.0, 0.0],
    ],
    log_viscosity: [
        [-6.437_255, 2.471, 0.03328, 1.659, 3.089, -18.65],
        [-0.0255, -0.01171, 0.01086, 0.003_157, 0.01831, 0.0],
        [0.000_178_2, 0.000_105_2, 0.000_105_1, 0.000_406_3, 0.0, 0.0],
        [-7.669e-07, -1.634e-06, -6.475e-06, 0.0, 0.0, 0.0],
    ],
    freezing: [257.9, -80.8, -133.4, -72.93, 100.6, 11.4],
    pure_density: 1113.0,
};

static PROPYLENE: Fit = Fit {
    t_base: 305.8583,
    x_base: 0.307_031,
    density: [
        [1018.0, 76.04, -24.98, -155.0, -113.1, 234.2],
        [-0.5406, -0.945, 0.27, 2.829, -2.221, 0.0],
        [-0.002_666, 0.005_541, -0.004_018, -0.007_175, 0.0, 0.0],
        [1.347e-05, -1.343e-05, 3.376e-05, 0.0, 0.0, 0.0],
    ],
    heat_capacity: [
        [3882.0, -1304.0, -1598.0, 353.9, 5000.0, -4959.0],
        [2.699, 5.07, 0.9534, 31.02, -71.35, 0.0],
        [-0.001_659, -0.004_752, 0.1167, -0.295, 0.0, 0.0],
        [-1.032e-05, 0.000_152_2, -0.000_487, 0.0, 0.0, 0.0],
    ],
    conductivity: [
        [0.4513, -0.4795, 0.2076, -0.09083, -0.05952, 0.2104],
        [0.000_795_5, -0.001_678, 0.001_563, -0.002_518, -0.003_605, 0.0],
        [3.482e-08, 8.941e-06, -4.615e-05, 6.543e-05, 0.0, 0.0],
        [-5.966e-09, 1.493e-08, 9.897e-08, 0.0, 0.0, 0.0],
    ],
    log_viscosity: [
        [-6.224_055, 3.328, 0.5453, -3.9, -1.587, 35.64],
        [-0.03045, -0.03984, -0.000_86, 0.1054, 0.04475, 0.0],
        [0.000_252_5, 0.000_433_2, -0.000_159_3, -0.001_589, 0.0, 0.0],
        [-1.399e-06, -1.86e-06, -4.465e-07, 0.0, 0.0, 0.0],
    ],
    freezing: [259.9, -66.31, -109.4, -228.3, -340.9, 146.5],
    pure_density: 1036.0,
};

/// How far below freezing the fits are still evaluated, K.
const SLACK_K: f64 = 1.0;

/// Density of water at 20 °C, kg/m³ (IAPWS SR6-08).
const WATER_DENSITY_20: f64 = 998.2065;

fn polynomial(rows: &Rows, dt: f64, dx: f64) -> f64 {
    rows.iter()
        .rev()
        .fold(0.0, |sum, row| sum * dt + row.iter().rev().fold(0.0, |sum, c| sum * dx + c))
}

impl Glycol {
    fn fit(self) -> &'static Fit {
        match self {
            Glycol::Ethylene => &ETHYLENE,
            Glycol::Propylene => &PROPYLENE,
        }
    }

    fn value(
        self,
        rows: &Rows,
        strength: Ratio,
        t: ThermodynamicTemperature,
    ) -> Result<f64, GlycolError> {
        let freezing = self.freezing_temperature(strength)?;
        // A reading may lie below freezing by its own ±; the fits are smooth there.
        if !(freezing.si() - SLACK_K..=373.15).contains(&t.si()) {
            return Err(GlycolError::TemperatureOutOfRange { got: t, freezing });
        }
        let fit = self.fit();
        Ok(polynomial(rows, t.si() - fit.t_base, strength.si() - fit.x_base))
    }

    /// Density of the mixture, kg/m³.
    ///
    /// # Errors
    ///
    /// [`GlycolError`] out of range.
    pub fn density(
        self,
        strength: Ratio,
        t: ThermodynamicTemperature,
    ) -> Result<MassDensity, GlycolError> {
        self.value(&self.fit().density, strength, t).map(MassDensity::from_si)
    }

    /// Heat capacity of the mixture, J/(kg K).
    ///
    /// # Errors
    ///
    /// [`GlycolError`] out of range.
    pub fn heat_capacity(
        self,
        strength: Ratio,
        t: ThermodynamicTemperature,
    ) -> Result<SpecificHeatCapacity, GlycolError> {
        self.value(&self.fit().heat_capacity, strength, t).map(SpecificHeatCapacity::from_si)
    }

    /// Change of enthalpy from one temperature to another, J/kg: the heat capacity's polynomial integrated exactly.
    ///
    /// # Errors
    ///
    /// [`GlycolError`] out of range at either end.
    pub fn enthalpy_change(
        self,
        strength: Ratio,
        from: ThermodynamicTemperature,
        to: ThermodynamicTemperature,
    ) -> Result<EnthalpyDifference, GlycolError> {
        let fit = self.fit();
        self.value(&fit.heat_capacity, strength, from)?;
        self.value(&fit.heat_capacity, strength, to)?;
        let dx = strength.si() - fit.x_base;
        let integral = |t: ThermodynamicTemperature| {
            let dt = t.si() - fit.t_base;
            let rows = fit.heat_capacity.iter().zip([1.0, 2.0, 3.0, 4.0]).rev();
            dt * rows.fold(0.0, |sum, (row, power)| {
                sum * dt + row.iter().rev().fold(0.0, |sum, c| sum * dx + c) / power
            })
        };
        Ok(EnthalpyDifference::from_si(integral(to) - integral(from)))
    }

    /// Thermal conductivity of the mixture, W/(m K).
    ///
    /// # Errors
    ///
    /// [`GlycolError`] out of range.
    pub fn conductivity_w_m_k(
        self,
        strength: Ratio,
        t: ThermodynamicTemperature,
    ) -> Result<f64, GlycolError> {
        self.value(&self.fit().conductivity, strength, t)
    }

    /// Dynamic viscosity of the mixture, Pa s.
    ///
    /// # Errors
    ///
    /// [`GlycolError`] out of range.
    pub fn viscosity_pa_s(
        self,
        strength: Ratio,
        t: ThermodynamicTemperature,
    ) -> Result<f64, GlycolError> {
        self.value(&self.fit().log_viscosity, strength, t).map(f64::exp)
    }

    /// Freezing point of the mixture, K.
    ///
    /// # Errors
    ///
    /// [`GlycolError::StrengthOutOfRange`].
    pub fn freezing_temperature(
        self,
        strength: Ratio,
    ) -> Result<ThermodynamicTemperature, GlycolError> {
        if !(0.0..=0.6).contains(&strength.si()) {
            return Err(GlycolError::StrengthOutOfRange { got: strength });
        }
        let fit = self.fit();
        let dx = strength.si() - fit.x_base;
        Ok(ThermodynamicTemperature::from_si(
            fit.freezing.iter().rev().fold(0.0, |sum, c| sum * dx + c),
        ))
    }

    /// Mass fraction from a volume fraction before mixing at 20 °C (mixtures shrink).
    ///
    /// # Errors
    ///
    /// [`GlycolError::StrengthOutOfRange`].
    pub fn mass_fraction_from_volume(self, volume: Ratio) -> Result<Ratio, GlycolError> {
        let density = self.fit().pure_density;
        let part = volume.si() * density;
        let strength = Ratio::from_si(part / (part + (1.0 - volume.si()) * WATER_DENSITY_20));
        if (0.0..=0.6).contains(&strength.si()) {
            Ok(strength)
        } else {
            Err(GlycolError::StrengthOutOfRange { got: strength })
        }
    }

    /// Mass fraction from a freezing point, by bisection over 0.05 to 0.6.
    ///
    /// # Errors
    ///
    /// [`GlycolError::NoSuchFreezingPoint`].
    pub fn mass_fraction_from_freezing(
        self,
        freezing: ThermodynamicTemperature,
    ) -> Result<Ratio, GlycolError> {
        let at =
            |x: f64| self.freezing_temperature(Ratio::from_si(x)).map(|t| t.si() - freezing.si());
        let (mut low, mut high) = (0.05, 0.6);
        if !(at(low)? >= 0.0 && at(high)? <= 0.0) {
            return Err(GlycolError::NoSuchFreezingPoint { got: freezing });
        }
        while high - low > 1e-13 {
            let middle = 0.5 * (low + high);
            if at(middle)? > 0.0 { low = middle } else { high = middle }
        }
        Ok(Ratio::from_si(0.5 * (low + high)))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Volume per cent to mass fraction and freezing point, worked with the same fits by an independent program.
    #[test]
    fn strengths_convert() {
        let cases = [
            (
                Glycol::Ethylene,
                [
                    (0.2, 0.2180, -8.97),
                    (0.3, 0.3233, -16.48),
                    (0.4, 0.4264, -26.73),
                    (0.5, 0.5272, -39.83),
                ],
            ),
            (
                Glycol::Propylene,
                [
                    (0.2, 0.2060, -7.47),
                    (0.3, 0.3079, -13.31),
                    (0.4, 0.4090, -21.42),
                    (0.5, 0.5093, -33.55),
                ],
            ),
        ];
        for (glycol, rows) in cases {
            for (volume, mass, freezing) in rows {
                let strength = glycol.mass_fraction_from_volume(Ratio::from_si(volume)).unwrap();
                assert!((strength.si() - mass).abs() < 6e-5);
                let t = glycol.freezing_temperature(strength).unwrap();
                assert!((t.si() - 273.15 - freezing).abs() < 6e-3);
                let back = glycol.mass_fraction_from_freezing(t).unwrap();
                assert!((back.si() - strength.si()).abs() < 1e-9);
            }
        }
    }

    /// The integral against the heat capacity summed up in small steps (trapezoidal rule).
    #[test]
    fn the_enthalpy_change_is_the_heat_capacity_summed_up() {
        let at = |celsius: f64| ThermodynamicTemperature::from_si(celsius + 273.15);
        for glycol in [Glycol::Ethylene, Glycol::Propylene] {
            let x = Ratio::from_si(0.35);
            let c = |t: f64| glycol.heat_capacity(x, at(t)).unwrap().si();
            let steps = 1000;
            let summed: f64 = (0..steps)
                .map(|step| {
                    let t = -5.0 + 0.06 * f64::from(step);
                    0.03 * (c(t) + c(t + 0.06))
                })
                .sum();
            let ours = glycol.enthalpy_change(x, at(-5.0), at(55.0)).unwrap().si();
            assert!((ours / summed - 1.0).abs() < 1e-9, "{ours} {summed}");
        }
    }

    #[test]
    fn colder_than_freezing_is_refused() {
        let strength = Ratio::from_si(0.2);
        let error = Glycol::Propylene
            .density(strength, ThermodynamicTemperature::from_si(264.15))
            .unwrap_err();
        assert!(matches!(error, GlycolError::TemperatureOutOfRange { .. }));
    }
}
