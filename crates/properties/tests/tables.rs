//! Moist air against published tables, to their printed digits.

#![expect(
    clippy::unwrap_used,
    reason = "air of the tables exists; where it does not the test fails"
)]

use dewledger_properties::{Humidity, MoistAir, Wick, settle};
use dewledger_quantities::{
    Enthalpy, HumidityRatio, Pressure, Quantity, RelativeHumidity, ThermodynamicTemperature,
};

const STANDARD: f64 = 101_325.0;

fn celsius(t: f64) -> ThermodynamicTemperature {
    ThermodynamicTemperature::from_si(t + 273.15)
}

fn fahrenheit(t: f64) -> ThermodynamicTemperature {
    ThermodynamicTemperature::from_si((t + 459.67) / 1.8)
}

fn wet(dry: ThermodynamicTemperature, wet: ThermodynamicTemperature) -> MoistAir {
    MoistAir::new(dry, Humidity::WetBulb(wet, Wick::NotSaid), Pressure::from_si(STANDARD)).unwrap()
}

/// ASHRAE Handbook—Fundamentals, moist-air table at 101.325 kPa, saturated (older editions, by Hyland and Wexler:
/// 3e-4 in W, 0.01 kJ/kg below 50 °C). From memory.
#[test]
fn saturated_air_agrees_with_the_handbook_table() {
    let table = [
        (-20.0, 0.000_637_3, 0.7173, -18.546),
        (-10.0, 0.001_606_2, 0.7469, -6.072),
        (0.0, 0.003_789_5, 0.7781, 9.473),
        (5.0, 0.005_424, 0.7944, 18.639),
        (10.0, 0.007_661, 0.8116, 29.352),
        (15.0, 0.010_692, 0.8300, 42.113),
        (20.0, 0.014_758, 0.8498, 57.555),
        (25.0, 0.020_170, 0.8717, 76.500),
        (30.0, 0.027_329, 0.8962, 100.006),
        (35.0, 0.036_756, 0.9242, 129.455),
        (40.0, 0.049_141, 0.9568, 166.683),
        (50.0, 0.086_858, 1.0425, 275.345),
        (60.0, 0.153_54, 1.1752, 460.863),
    ];
    for (t, w, v, h) in table {
        let air = MoistAir::saturated(celsius(t), Pressure::from_si(STANDARD)).unwrap();
        assert!((air.humidity_ratio().si() / w - 1.0).abs() < 3e-4, "{t}");
        assert!((air.specific_volume().si() / v - 1.0).abs() < 1e-4, "{t}");
        let allowed = if t < 50.0 { 0.01 } else { 0.03 };
        assert!((air.enthalpy().si() / 1e3 - h).abs() < allowed, "{t}");
    }
}

/// Rating states of AHRI 210/240, ISO 5151 and EN 14511 (the states are the standards', from memory); W, h and RH
/// recomputed with CoolProp 8.0.0.
#[test]
fn rating_states_come_out() {
    let ip = [
        (80.0, 67.0, 0.011_223_7, 55.440, 31.521),
        (95.0, 75.0, 0.014_135_3, 71.471, 38.413),
        (70.0, 60.0, 0.008_782_2, 43.535, f64::NAN),
        (47.0, 43.0, 0.004_956_1, 20.848, f64::NAN),
    ];
    for (dry, bulb, w, h, h_ip) in ip {
        let air = wet(fahrenheit(dry), fahrenheit(bulb));
        assert!((air.humidity_ratio().si() - w).abs() < 6e-8);
        assert!((air.enthalpy().si() / 1e3 - h).abs() < 6e-4);
        if h_ip.is_finite() {
            assert!((air.enthalpy().si() / 2326.0 + 7.6857 - h_ip).abs() < 6e-4);
        }
    }
    let si = [
        (27.0, 19.0, 0.010_505_9),
        (35.0, 24.0, 0.014_310_4),
        (20.0, 15.0, 0.008_619_0),
        (7.0, 6.0, 0.005_409_7),
    ];
    for (dry, bulb, w) in si {
        assert!((wet(celsius(dry), celsius(bulb)).humidity_ratio().si() - w).abs() < 6e-8);
    }
}

/// ASHRAE Handbook—Fundamentals, psychrometrics chapter, state examples read off a chart (from memory).
#[test]
fn handbook_examples_come_out() {
    let air = wet(celsius(40.0), celsius(20.0));
    assert!((air.enthalpy().si() / 1e3 - 56.7).abs() < 0.2);
    assert!((air.humidity_ratio().si() * 1e3 - 6.5).abs() < 0.06);
    assert!((air.dew_point().unwrap().si() - 273.15 - 7.0).abs() < 0.6);
    assert!((air.relative_humidity().si() - 0.14).abs() < 0.005);
    assert!((air.specific_volume().si() - 0.896).abs() < 6e-4);
    let air = wet(fahrenheit(100.0), fahrenheit(65.0));
    assert!((air.enthalpy().si() / 2326.0 + 7.6857 - 29.80).abs() < 0.01);
    assert!((air.humidity_ratio().si() - 0.005_23).abs() < 6e-6);
}

/// IAPWS G8-10 table 14: 300 K, dry-air mass fraction 0.977 605 798, 100 kPa. Its molar mass of air is 2e-5 off ours.
#[test]
fn a_state_of_iapws_g8_10_comes_out() {
    let w = 1.0 / 0.977_605_798 - 1.0;
    let air = MoistAir::unchecked(
        ThermodynamicTemperature::from_si(300.0),
        HumidityRatio::from_si(w),
        Pressure::from_si(1e5),
    );
    assert!((air.density().si() / 1.146_142_16 - 1.0).abs() < 2.5e-5);
    assert!((air.enthalpy().si() / (1.0 + w) / 83_490.838_3 - 1.0).abs() < 4e-5);
}

#[test]
fn the_zero_of_enthalpy_is_dry_air_at_0_c() {
    let dry =
        MoistAir::unchecked(celsius(0.0), HumidityRatio::default(), Pressure::from_si(STANDARD));
    assert!(dry.enthalpy().si().abs() < 1e-4);
}

/// The lowest wet bulb possible: 8.243 °C at 25 °C and 101.325 kPa (recomputed with CoolProp 8.0.0).
#[test]
fn bone_dry_air_has_the_lowest_wet_bulb() {
    let lowest = dewledger_properties::lowest_wet_bulb(celsius(25.0), Pressure::from_si(STANDARD));
    assert!((lowest.si() - 273.15 - 8.243).abs() < 6e-4);
    let error = MoistAir::new(
        celsius(25.0),
        Humidity::WetBulb(celsius(8.0), Wick::NotSaid),
        Pressure::from_si(STANDARD),
    )
    .unwrap_err();
    assert!(matches!(error, dewledger_properties::AirError::DrierThanBoneDry { .. }));
}

/// 85 °C at 54 kPa: above boiling there is no saturation to stop at, and pure steam is refused.
#[test]
fn air_above_boiling_has_no_saturation() {
    let p = Pressure::from_si(54_000.0);
    let at = |rh: f64| {
        MoistAir::new(celsius(85.0), Humidity::RelativeHumidity(RelativeHumidity::from_si(rh)), p)
    };
    let air = at(0.5).unwrap();
    assert!((air.relative_humidity().si() - 0.5).abs() < 1e-9);
    assert!(at(1.0).is_err());
}

#[test]
fn foggy_air_settles_with_its_enthalpy_and_water() {
    let p = Pressure::from_si(STANDARD);
    for (h, w) in [(20_000.0, 0.012), (-15_000.0, 0.003), (8_000.0, 0.0048), (60_000.0, 0.010)] {
        let mixed = settle(Enthalpy::from_si(h), HumidityRatio::from_si(w), p).unwrap();
        let t = mixed.air.dry_bulb();
        let total = mixed.air.humidity_ratio().si() + mixed.liquid.si() + mixed.ice.si();
        assert!((total - w).abs() < 1e-12);
        let liquid = if mixed.liquid.si() > 0.0 {
            dewledger_properties::water::enthalpy(t, p).unwrap().si()
        } else {
            0.0
        };
        // Ice by its enthalpy and heat capacity at the triple point (IAPWS R10-06 table 6) and the slope of the latter.
        let below = t.si() - 273.16;
        let ice = -333_354.0 + 2_096.8 * below + 3.68 * below * below;
        let sum = mixed.air.enthalpy().si() + mixed.liquid.si() * liquid + mixed.ice.si() * ice;
        assert!((sum - h).abs() < 0.5, "{h}: {sum}");
    }
}
