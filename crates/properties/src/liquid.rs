//! Liquid water near atmospheric pressure: IAPWS SR6-08(2011); Pátek et al., J. Phys. Chem. Ref. Data 38, 21 (2009).
//!
//! Valid 253.15 to 383.15 K around 0.1 MPa (the pressure enters to first order); enthalpy zero at the triple point.

const R: f64 = 461.518_05;
const T_R: f64 = 10.0;
const P_0: f64 = 1e5;

const C1: f64 = -2.452_093_414e2;
const C2: f64 = 3.869_269_598e1;
const C3: f64 = -8.983_025_854;
const G_A: [(f64, i32); 3] = [(-1.661_470_539e5, 4), (2.708_781_640e6, 5), (-1.557_191_544e8, 7)];
const G_B: [(f64, i32); 4] =
    [(-8.237_426_256e-1, 2), (1.908_956_353, 3), (-2.017_597_384, 4), (8.546_361_348e-1, 5)];
const V_0: f64 = 1.937_631_57e-2;
const V_A: [(f64, i32); 5] = [
    (6.744_584_46e3, 4),
    (-2.225_216_04e5, 5),
    (1.002_312_47e8, 7),
    (-1.635_521_18e9, 8),
    (8.322_996_58e9, 9),
];
const V_B: [(f64, i32); 6] = [
    (5.785_452_92e-3, 1),
    (-1.531_956_65e-2, 2),
    (3.113_378_59e-2, 3),
    (-4.235_462_41e-2, 4),
    (3.387_135_07e-2, 5),
    (-1.199_467_61e-2, 6),
];
const K_A: [(f64, i32); 5] = [
    (-7.524_587_8e-6, 1),
    (-1.376_741_8e-2, 3),
    (1.062_729_3e1, 5),
    (-2.045_779_5e2, 6),
    (1.203_741_4e3, 7),
];
const K_B: [(f64, i32); 7] = [
    (-3.109_147_0e-6, 1),
    (2.896_491_9e-5, 3),
    (-1.311_276_3e-4, 4),
    (3.041_045_3e-4, 5),
    (-3.903_459_4e-4, 6),
    (2.340_311_7e-4, 7),
    (-4.851_010_1e-5, 9),
];

/// Properties at one temperature; `p`, Pa, enters to first order.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Liquid {
    /// Specific enthalpy at 0.1 MPa, J/kg.
    pub(crate) enthalpy: f64,
    /// Its slope by pressure, m³/kg.
    pub(crate) enthalpy_by_pressure: f64,
    /// Specific volume at 0.1 MPa, m³/kg.
    pub(crate) volume: f64,
    /// Its slope by pressure, m³/(kg Pa).
    pub(crate) volume_by_pressure: f64,
    /// Isobaric heat capacity at 0.1 MPa, J/(kg K).
    pub(crate) heat_capacity: f64,
}

fn sum(terms: &[(f64, i32)], base: f64, weight: impl Fn(f64) -> f64, shift: i32) -> f64 {
    terms.iter().map(|(a, n)| weight(f64::from(*n)) * a * base.powi(n + shift)).sum()
}

/// At `t`, K.
pub(crate) fn liquid(t: f64) -> Liquid {
    let theta = t / T_R;
    let alpha = T_R / (593.0 - t);
    let beta = T_R / (t - 232.0);
    let one = |_: f64| 1.0;
    let n = |n: f64| n;
    let nn = |n: f64| n * (n + 1.0);
    let g = R
        * T_R
        * (C1
            + C2 * theta
            + C3 * theta * theta.ln()
            + sum(&G_A, alpha, one, 0)
            + sum(&G_B, beta, one, 0));
    let entropy =
        -R * (C2 + C3 * (1.0 + theta.ln()) + sum(&G_A, alpha, n, 1) - sum(&G_B, beta, n, 1));
    let volume = R * T_R / P_0 * (V_0 + sum(&V_A, alpha, one, 0) + sum(&V_B, beta, one, 0));
    let volume_by_t = R / P_0 * (sum(&V_A, alpha, n, 1) - sum(&V_B, beta, n, 1));
    let volume_by_pressure =
        R * T_R / (P_0 * P_0) * (sum(&K_A, alpha, one, 0) + sum(&K_B, beta, one, 0));
    let heat_capacity = -R * (C3 + theta * (sum(&G_A, alpha, nn, 2) + sum(&G_B, beta, nn, 2)));
    Liquid {
        enthalpy: g + t * entropy,
        enthalpy_by_pressure: volume - t * volume_by_t,
        volume,
        volume_by_pressure,
        heat_capacity,
    }
}

/// Specific enthalpy, J/kg, at K and Pa.
pub(crate) fn enthalpy(t: f64, p: f64) -> f64 {
    let liquid = liquid(t);
    liquid.enthalpy + (p - P_0) * liquid.enthalpy_by_pressure
}

/// Specific volume, m³/kg, at K and Pa.
pub(crate) fn volume(t: f64, p: f64) -> f64 {
    let liquid = liquid(t);
    liquid.volume + (p - P_0) * liquid.volume_by_pressure
}

#[cfg(test)]
mod tests {
    use super::*;

    /// IAPWS SR6-08(2011) table 8 at 0.1 MPa: density, cp in kJ/(kg K), dv/dp in m³/(kg MPa).
    #[test]
    fn liquid_agrees_with_sr6_08_table_8() {
        let rows = [
            (260.0, 997.068_360, 4.300_174_72, -5.820_968_2e-7),
            (298.15, 997.047_013, 4.181_446_18, -4.538_033_4e-7),
            (375.0, 957.009_710, 4.217_746_97, -5.156_665_28e-7),
        ];
        for (t, density, heat_capacity, by_pressure) in rows {
            let liquid = liquid(t);
            assert!((1.0 / liquid.volume / density - 1.0).abs() < 1e-9);
            assert!((liquid.heat_capacity / 1e3 / heat_capacity - 1.0).abs() < 3e-9);
            assert!((liquid.volume_by_pressure * 1e6 / by_pressure - 1.0).abs() < 2e-8);
        }
    }
}
