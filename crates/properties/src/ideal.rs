//! Ideal-gas parts: enthalpy of dry air (Lemmon et al. 2000) and of water vapour (IAPWS-95), molar.
//!
//! Reference states: dry air at 0 °C and 101.325 kPa, liquid water at the triple point (RP-1485).

use crate::constants::{R_AIR, R_MIXTURE, R_WATER, RHO_AIR, RHO_WATER, T_AIR, T_WATER};

const AIR_N: [f64; 10] = [
    0.605_719_400e-7,
    -0.210_274_769e-4,
    -0.158_860_716e-3,
    -13.841_928_076,
    17.275_266_575,
    -0.195_363_420e-3,
    2.490_888_032,
    0.791_309_509,
    0.212_236_768,
    -0.197_938_904,
];
const WATER_N: [(f64, f64); 5] = [
    (0.012436, 1.287_289_67),
    (0.97315, 3.537_342_22),
    (1.27950, 7.740_737_08),
    (0.96956, 9.244_377_96),
    (0.24873, 27.507_510_5),
];

/// `tau d alpha / d tau` and `alpha` (without ln delta) of dry air.
fn air(t: f64) -> (f64, f64) {
    let tau = T_AIR / t;
    let n = &AIR_N;
    let (mut d, mut alpha) = (0.0, 0.0);
    for (power, coefficient) in (-3..=1).zip(&n[..5]) {
        let term = coefficient * tau.powi(power);
        alpha += term;
        d += f64::from(power) * term;
    }
    let term = n[5] * tau.powf(1.5);
    alpha += term + n[6] * tau.ln();
    d += 1.5 * term + n[6];
    for (coefficient, gamma) in [(n[7], 25.36365), (n[8], 16.90741)] {
        alpha += coefficient * (-(-gamma * tau).exp()).ln_1p();
        d += coefficient * gamma * tau / (gamma * tau).exp_m1();
    }
    let exponential = (87.31279 * tau).exp();
    alpha += n[9] * (2.0 / 3.0 + exponential).ln();
    d += n[9] * 87.31279 * tau / (1.0 + 2.0 / 3.0 / exponential);
    (d, alpha)
}

/// `tau d alpha / d tau` and `alpha` (without ln delta) of water vapour.
fn water(t: f64) -> (f64, f64) {
    let tau = T_WATER / t;
    let mut d = 6.683_210_527_593_2 * tau + 3.00632;
    let mut alpha = -8.320_446_483_749_7 + 6.683_210_527_593_2 * tau + 3.00632 * tau.ln();
    for (n, gamma) in WATER_N {
        alpha += n * (-(-gamma * tau).exp()).ln_1p();
        d += n * gamma * tau / (gamma * tau).exp_m1();
    }
    (d, alpha)
}

/// Enthalpy of dry air as an ideal gas, J/mol.
pub(crate) fn air_enthalpy(t: f64) -> f64 {
    -7_914.149_298 + R_AIR * t * (1.0 + air(t).0)
}

/// Enthalpy of water vapour as an ideal gas, J/mol.
pub(crate) fn water_enthalpy(t: f64) -> f64 {
    -0.011_023_038_06 + R_MIXTURE * t * (1.0 + water(t).0)
}

/// Entropy of dry air at its molar volume `v`, J/(mol K), before mixing.
pub(crate) fn air_entropy(t: f64, v: f64) -> f64 {
    let v0 = R_AIR * 273.15 / 101_325.0;
    let (d, alpha) = air(t);
    -196.137_581_5 + R_AIR * (d - alpha - (1.0 / (v0 * RHO_AIR)).ln()) + R_AIR * (v / v0).ln()
}

/// Entropy of water vapour at the pressure `p`, J/(mol K), before mixing.
pub(crate) fn water_entropy(t: f64, p: f64) -> f64 {
    let (d, alpha) = water(t);
    R_WATER * (d - alpha - (p / (R_WATER * t * RHO_WATER)).ln())
}

#[cfg(test)]
mod tests {
    use super::*;

    /// ASHRAE RP-1485 table values at 200 °C, as cited by an open library's validation files.
    #[test]
    fn ideal_enthalpies_agree_with_rp_1485() {
        assert!((air_enthalpy(473.15) - 5_868.091_294_9).abs() < 1e-6);
        assert!((water_enthalpy(473.15) - 51_885.571_428_9).abs() < 1e-6);
    }
}
