//! Second and third virial coefficients of moist air and their temperature derivatives, molar.
//!
//! Dry air: low-density limit of Lemmon, Jacobsen, Penoncello, Friend, J. Phys. Chem. Ref. Data 29, 331 (2000).
//! Water: low-density limit of IAPWS-95 (R6-95(2018)). Cross second: Harvey and Huang, Int. J. Thermophys. 28,
//! 556 (2007). Cross thirds: Hyland and Wexler 1983 as ASHRAE RP-1485 gives them. (Bibliography from memory;
//! the coefficients are checked against tables below.)

use crate::constants::{RHO_AIR, RHO_WATER, T_AIR, T_WATER};

/// Coefficients at one temperature: m³/mol and m⁶/mol², and their derivatives by K.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Virials {
    pub(crate) baa: f64,
    pub(crate) baw: f64,
    pub(crate) bww: f64,
    pub(crate) caaa: f64,
    pub(crate) caaw: f64,
    pub(crate) caww: f64,
    pub(crate) cwww: f64,
    pub(crate) dbaa: f64,
    pub(crate) dbaw: f64,
    pub(crate) dbww: f64,
    pub(crate) dcaaa: f64,
    pub(crate) dcaaw: f64,
    pub(crate) dcaww: f64,
    pub(crate) dcwww: f64,
}

const BAA: [(f64, f64); 6] = [
    (0.118_160_747_229, 0.0),
    (0.713_116_392_079, 0.33),
    (-1.618_241_920_67, 1.01),
    (-0.101_365_037_912, 1.6),
    (-0.146_629_609_713, 3.6),
    (0.014_828_789_197_8, 3.5),
];
const BWW: [(f64, f64); 7] = [
    (0.125_335_479_355_23e-1, -0.5),
    (0.789_576_347_228_28e1, 0.875),
    (-0.878_032_033_035_61e1, 1.0),
    (-0.668_565_723_079_65, 4.0),
    (0.204_338_109_509_65, 6.0),
    (-0.662_126_050_396_87e-4, 12.0),
    (-0.107_936_009_089_32, 7.0),
];
const CWWW: [(f64, f64); 10] = [
    (0.318_025_093_454_18, 0.5),
    (-0.261_455_338_593_58, 0.75),
    (-0.192_327_211_560_02, 1.0),
    (-0.257_090_430_034_38, 5.0),
    (0.176_114_910_087_52e-1, 1.0),
    (0.221_322_951_675_46, 9.0),
    (-0.402_476_697_635_28, 10.0),
    (0.668_565_723_079_65, 4.0),
    (-0.204_338_109_509_65, 6.0),
    (0.662_126_050_396_87e-4, 12.0),
];

/// `sum n tau^t` and its derivative by T.
fn power_sum(terms: &[(f64, f64)], tau: f64, t: f64) -> (f64, f64) {
    let mut sum = 0.0;
    let mut slope = 0.0;
    for (n, exponent) in terms {
        let term = n * tau.powf(*exponent);
        sum += term;
        slope -= exponent * term / t;
    }
    (sum, slope)
}

/// All coefficients at `t`, K.
pub(crate) fn virials(t: f64) -> Virials {
    let tau = T_AIR / t;
    let (baa, dbaa) = power_sum(&BAA, tau, t);
    let (caaa, dcaaa) = power_sum(&[(0.071_414_017_897_1, 0.0), (0.101_365_037_912, 1.6)], tau, t);
    let tau = T_WATER / t;
    let (bww, dbww) = power_sum(&BWW, tau, t);
    let (cwww, dcwww) = power_sum(&CWWW, tau, t);
    let r = t / 100.0;
    let harvey = [(66.5687, -0.237), (-238.834, -1.048), (-176.755, -3.183)];
    let (mut baw, mut dbaw) = (0.0, 0.0);
    for (n, exponent) in harvey {
        let term: f64 = 1e-6 * n * r.powf(exponent);
        baw += term;
        dbaw += exponent * term / t;
    }
    let (i, i2) = (1.0 / t, 1.0 / (t * t));
    let (i3, i4) = (i2 * i, i2 * i2);
    let caaw =
        1e-12 * (482.737 + 1.056_78e5 * i - 6.563_94e7 * i2 + 2.944_42e10 * i3 - 3.193_17e12 * i4);
    let dcaaw = 1e-12
        * i
        * (-1.056_78e5 * i + 2.0 * 6.563_94e7 * i2 - 3.0 * 2.944_42e10 * i3
            + 4.0 * 3.193_17e12 * i4);
    let exponent = -10.728_87 + 3_478.04 * i - 3.833_83e5 * i2 + 3.340_60e7 * i3;
    let caww = -1e-6 * exponent.exp();
    let dcaww = caww * i * (-3_478.04 * i + 2.0 * 3.833_83e5 * i2 - 3.0 * 3.340_60e7 * i3);
    let air2 = 2.0 / (RHO_AIR * RHO_AIR);
    let water2 = 2.0 / (RHO_WATER * RHO_WATER);
    Virials {
        baa: baa / RHO_AIR,
        baw,
        bww: bww / RHO_WATER,
        caaa: caaa * air2,
        caaw,
        caww,
        cwww: cwww * water2,
        dbaa: dbaa / RHO_AIR,
        dbaw,
        dbww: dbww / RHO_WATER,
        dcaaa: dcaaa * air2,
        dcaaw,
        dcaww,
        dcwww: dcwww * water2,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// IAPWS G9-12 table 7. Its `C_aww` has other last digits of the same equation: 1e-4.
    #[test]
    fn virials_agree_with_iapws_g9_12_table_7() {
        type Row = (f64, [f64; 7]);
        let rows: [Row; 3] = [
            (
                200.0,
                [
                    -0.392_722_567e-4,
                    -0.784_874_278e-4,
                    -0.186_282_737e-1,
                    0.227_113_063e-8,
                    0.105_493_575e-8,
                    -0.349_872_634e-5,
                    -0.263_959_706e-3,
                ],
            ),
            (
                300.0,
                [
                    -0.776_210_977e-5,
                    -0.295_672_747e-4,
                    -0.120_129_928e-2,
                    0.181_166_638e-8,
                    0.801_977_741e-9,
                    -0.115_552_784e-6,
                    -0.420_419_196e-5,
                ],
            ),
            (
                400.0,
                [
                    0.603_953_176e-5,
                    -0.100_804_610e-4,
                    -0.348_784_166e-3,
                    0.162_604_635e-8,
                    0.672_018_172e-9,
                    -0.200_806_021e-7,
                    -0.217_733_298e-6,
                ],
            ),
        ];
        for (t, row) in rows {
            let v = virials(t);
            let ours = [v.baa, v.baw, v.bww, v.caaa, v.caaw, v.caww, v.cwww];
            for (index, (ours, table)) in ours.iter().zip(row).enumerate() {
                let allowed = if index == 5 { 1.1e-4 } else { 6e-9 };
                assert!(
                    (ours / table - 1.0).abs() < allowed,
                    "{t} K, {index}: {ours} against {table}"
                );
            }
        }
    }

    /// ASHRAE RP-1485 tables A.2.1, A.3, A.5, A.6, cm³/mol and cm⁶/mol², as cited by an open library's validation
    /// files, at −60, 0 and 200 °C.
    #[test]
    fn virials_agree_with_rp_1485_tables() {
        let rows = [
            (213.15, [-33.065, -68.306, -11174.0], [2177.9, 1027.3, -1_821_432.0]),
            (273.15, [-13.562, -38.074, -2025.6], [1893.1, 861.02, -224_234.0]),
            (473.15, [11.905, -2.0472, -200.52], [1551.2, 627.15, -8436.5]),
        ];
        for (t, b, c) in rows {
            let v = virials(t);
            for (ours, table) in [v.baa, v.baw, v.bww].iter().zip(b) {
                assert!((ours * 1e6 / table - 1.0).abs() < 6e-5, "{t}: {ours} {table}");
            }
            for (ours, table) in [v.caaa, v.caaw, v.caww].iter().zip(c) {
                assert!((ours * 1e12 / table - 1.0).abs() < 6e-5, "{t}: {ours} {table}");
            }
        }
    }

    #[test]
    fn derivatives_are_the_slopes_of_the_coefficients() {
        for t in [215.0, 273.15, 300.0, 360.0] {
            let (low, high, v) = (virials(t - 0.01), virials(t + 0.01), virials(t));
            let pairs = [
                (high.baa - low.baa, v.dbaa),
                (high.baw - low.baw, v.dbaw),
                (high.bww - low.bww, v.dbww),
                (high.caaa - low.caaa, v.dcaaa),
                (high.caaw - low.caaw, v.dcaaw),
                (high.caww - low.caww, v.dcaww),
                (high.cwww - low.cwww, v.dcwww),
            ];
            for (rise, slope) in pairs {
                assert!((rise / 0.02 / slope - 1.0).abs() < 1e-5);
            }
        }
    }
}
