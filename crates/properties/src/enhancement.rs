//! The enhancement factor f(T, p): how much more vapour saturated moist air holds than pure water would.
//!
//! ASHRAE RP-1485 equation 3.25 (form of Hyland and Wexler 1983), solved by fixed-point passes. Solubility of air
//! by IAPWS G7-04 (Fernández-Prini, Alvarez, Harvey, J. Phys. Chem. Ref. Data 32, 903, 2003).

use crate::constants::{M_WATER, R_WATER, T_WATER};
use crate::virial::Virials;
use crate::{ice, liquid, saturation};

/// The condensed phase that the air is saturated over.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Phase {
    Liquid,
    Ice,
}

/// Passes of the fixed point; its error falls a hundredfold each: 7e-11 after four.
const PASSES: usize = 6;

/// Henry's law constant of air in water, 1/Pa.
pub(crate) fn air_solubility(t: f64) -> f64 {
    let tr = t / T_WATER;
    let tau = 1.0 - tr;
    let henry = |a: f64, b: f64, c: f64| {
        saturation::over_liquid(t)
            * (a / tr + b * tau.powf(0.355) / tr + c * tr.powf(-0.41) * tau.exp()).exp()
    };
    let nitrogen = henry(-9.675_78, 4.721_62, 11.705_85);
    let oxygen = henry(-9.448_33, 4.438_22, 11.420_05);
    let argon = henry(-8.409_54, 4.295_87, 10.527_79);
    (0.7812 / nitrogen + 0.2095 / oxygen + 0.0093 / argon) / 1.013_25
}

/// `ln f` at K and Pa over `phase`.
pub(crate) fn log_factor(t: f64, p: f64, phase: Phase, v: &Virials) -> f64 {
    let q = 1.0 / (R_WATER * t);
    let (s, volume, k, beta) = match phase {
        Phase::Liquid => {
            let s = saturation::over_liquid(t);
            let water = liquid::liquid(t);
            (
                s,
                liquid::volume(t, s) * M_WATER,
                -water.volume_by_pressure / water.volume,
                air_solubility(t),
            )
        }
        Phase::Ice => {
            (saturation::over_ice(t), ice::volume(t) * M_WATER, ice::COMPRESSIBILITY, 0.0)
        }
    };
    let pq = p * q;
    let mut log_f = 0.0_f64;
    for _ in 0..PASSES {
        let x = log_f.exp() * s / p;
        let y = 1.0 - x;
        let (y2, y3) = (y * y, y * y * y);
        log_f = ((1.0 + k * s) * (p - s) - 0.5 * k * (p * p - s * s)) * q * volume
            + (-beta * y * p).ln_1p()
            + y2 * pq * v.baa
            - 2.0 * y2 * pq * v.baw
            - (p - s - y2 * p) * q * v.bww
            + pq * pq * (y3 * v.caaa + 1.5 * y2 * (1.0 - 2.0 * y) * v.caaw - 3.0 * y2 * x * v.caww)
            - 0.5 * q * q * ((3.0 - 2.0 * x) * x * x * p * p - s * s) * v.cwww
            + pq * pq
                * (-y2 * (3.0 * x - 2.0) * x * v.baa * v.bww
                    - 2.0 * y3 * (3.0 * x - 1.0) * v.baa * v.baw
                    + 6.0 * y2 * x * x * v.bww * v.baw
                    - 1.5 * y2 * y2 * v.baa * v.baa
                    - 2.0 * y2 * x * (3.0 * x - 2.0) * v.baw * v.baw)
            - 0.5 * q * q * (s * s - (4.0 - 3.0 * x) * x * x * x * p * p) * v.bww * v.bww;
    }
    log_f
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::virial::virials;

    /// ASHRAE RP-1485 tables: f at 101 325 Pa, solubility at 0.01 °C, as cited by an open library's validation files.
    #[test]
    fn factor_and_solubility_agree_with_rp_1485() {
        let f = |t: f64, phase| log_factor(t, 101_325.0, phase, &virials(t)).exp();
        assert!((f(213.15, Phase::Ice) - 1.007_08).abs() < 6e-6);
        assert!((f(353.15, Phase::Liquid) - 1.005_73).abs() < 6e-6);
        let solubility = air_solubility(273.16) * 1e9;
        // 2.4e-4 off the table's last digit, which moves f by 6e-9.
        assert!((solubility - 0.226_00).abs() < 6e-5, "{solubility}");
    }

    /// IAPWS G7-04 table 6: `ln(k_H / GPa)` at 300 and 400 K, through the solubility of the mixture.
    #[test]
    fn solubility_agrees_with_iapws_g7_04() {
        for (t, n2, o2, ar) in
            [(300.0, 2.1716_f64, 1.5024_f64, 1.4061_f64), (400.0, 2.3509, 1.8832, 1.8079)]
        {
            let table =
                (0.7812 / n2.exp() + 0.2095 / o2.exp() + 0.0093 / ar.exp()) / 1.013_25 * 1e-9;
            assert!((air_solubility(t) / table - 1.0).abs() < 1e-4);
        }
    }
}
