//! Saturation pressure of pure water: over liquid (IAPWS-IF97 region 4) and over ice (IAPWS R14-08).
//!
//! Over liquid: IAPWS R7-97(2012), equations 29 to 31; valid 273.15 to 647 K, and extrapolated below for
//! supercooled water, where it agrees with meteorological practice to 0.06 % of relative humidity.
//! Over ice: IAPWS R14-08(2011), equation 6; valid 50 to 273.16 K.

const N: [f64; 10] = [
    0.116_705_214_527_67e4,
    -0.724_213_167_032_06e6,
    -0.170_738_469_400_92e2,
    0.120_208_247_024_70e5,
    -0.323_255_503_223_33e7,
    0.149_151_086_135_30e2,
    -0.482_326_573_615_91e4,
    0.405_113_405_420_57e6,
    -0.238_555_575_678_49,
    0.650_175_348_447_98e3,
];

/// Over liquid water: Pa from K.
pub(crate) fn over_liquid(t: f64) -> f64 {
    let theta = t + N[8] / (t - N[9]);
    let a = (theta + N[0]) * theta + N[1];
    let b = (N[2] * theta + N[3]) * theta + N[4];
    let c = (N[5] * theta + N[6]) * theta + N[7];
    let root = 2.0 * c / (-b + (b * b - 4.0 * a * c).sqrt());
    let square = root * root;
    1e6 * square * square
}

/// Over ice: Pa from K.
pub(crate) fn over_ice(t: f64) -> f64 {
    611.657 * over_ice_log(t).exp()
}

/// `ln(p / 611.657 Pa)` over ice.
pub(crate) fn over_ice_log(t: f64) -> f64 {
    let theta = t / 273.16;
    let sum = -0.212_144_006e2 * theta.powf(0.003_333_333_33)
        + 0.273_203_819e2 * theta.powf(1.206_666_67)
        - 0.610_598_130e1 * theta.powf(1.703_333_33);
    sum / theta
}

/// Temperature at which the pressure over liquid is `p`: K from Pa. The exact inverse of [`over_liquid`].
pub(crate) fn liquid_temperature(p: f64) -> f64 {
    let beta2 = (p * 1e-6).sqrt();
    let beta = beta2.sqrt();
    let e = beta2 + N[2] * beta + N[5];
    let f = N[0] * beta2 + N[3] * beta + N[6];
    let g = N[1] * beta2 + N[4] * beta + N[7];
    let d = 2.0 * g / (-f - (f * f - 4.0 * e * g).sqrt());
    let sum = N[9] + d;
    0.5 * (sum - (sum * sum - 4.0 * (N[8] + N[9] * d)).sqrt())
}

#[cfg(test)]
mod tests {
    use super::*;

    /// IAPWS R7-97(2012) table 35, MPa.
    #[test]
    fn liquid_agrees_with_if97_table_35() {
        for (t, p) in
            [(300.0, 0.353_658_941e-2), (500.0, 0.263_889_776e1), (600.0, 0.123_443_146e2)]
        {
            assert!((over_liquid(t) * 1e-6 / p - 1.0).abs() < 2e-9);
        }
    }

    /// IAPWS R7-97(2012) table 36, K.
    #[test]
    fn its_inverse_agrees_with_if97_table_36() {
        for (p, t) in [(0.1e6, 372.755_919), (1e6, 453.035_632), (10e6, 584.149_488)] {
            assert!((liquid_temperature(p) - t).abs() < 1e-6);
        }
        for t in [233.15, 253.15, 273.16, 300.0, 350.0] {
            assert!((liquid_temperature(over_liquid(t)) - t).abs() < 1e-8);
        }
    }

    /// IAPWS R14-08(2011) table 3: 8.947 35 Pa at 230 K.
    #[test]
    fn ice_agrees_with_r14_08_table_3() {
        assert!((over_ice(230.0) - 8.947_35).abs() < 5e-6);
        assert!((over_ice(273.16) / over_liquid(273.16) - 1.0).abs() < 1e-9);
    }
}
