//! Round trips from every pair of inputs, over the whole range.

use dewledger_properties::{Humidity, MoistAir, Wick};
use dewledger_quantities::{Pressure, Quantity, RelativeHumidity, ThermodynamicTemperature};
use proptest::prelude::*;

fn near(one: f64, other: f64, relative: f64, absolute: f64) -> bool {
    (one - other).abs() <= absolute + relative * other.abs()
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(4000))]

    #[test]
    fn every_pair_of_inputs_leads_back(t in -60.0..90.0_f64, rh in 0.0..=1.0_f64, p in 50_000.0..120_000.0_f64) {
        let dry_bulb = ThermodynamicTemperature::from_si(t + 273.15);
        let pressure = Pressure::from_si(p);
        // Above boiling a high relative humidity is nearly pure steam and refused: that is its own test.
        let Ok(air) = MoistAir::new(dry_bulb, Humidity::RelativeHumidity(RelativeHumidity::from_si(rh)), pressure) else {
            prop_assert!(t > 70.0);
            return Ok(());
        };
        let w = air.humidity_ratio().si();
        for value in [w, air.enthalpy().si(), air.specific_volume().si(), air.density().si(), air.entropy().si(),
            air.heat_capacity().si(), air.vapour_pressure().si(), air.degree_of_saturation().si()] {
            prop_assert!(value.is_finite());
        }
        prop_assert!(near(air.relative_humidity().si(), rh, 1e-9, 1e-12));
        let again = |humidity| MoistAir::new(dry_bulb, humidity, pressure).map(|air| air.humidity_ratio().si());
        prop_assert!(near(again(Humidity::HumidityRatio(air.humidity_ratio())).unwrap(), w, 0.0, 0.0));
        prop_assert!(near(again(Humidity::Enthalpy(air.enthalpy())).unwrap(), w, 1e-8, 1e-10));
        if let Ok(dew) = air.dew_point() && dew.si() <= dry_bulb.si() {
            prop_assert!(near(again(Humidity::DewPoint(dew)).unwrap(), w, 1e-6, 1e-10), "dew {}", dew.si());
        }
        if let Ok(frost) = air.frost_point() && frost.si() < 273.16 && frost.si() <= dry_bulb.si() {
            prop_assert!(near(again(Humidity::FrostPoint(frost)).unwrap(), w, 1e-6, 1e-10), "frost {}", frost.si());
        }
        let wet_bulb = air.wet_bulb().unwrap();
        for (root, wick) in [(wet_bulb.liquid, Wick::Wet), (wet_bulb.ice, Wick::Iced)] {
            // Air supersaturated over ice has an iced wet bulb above its dry bulb: no reading that can be typed.
            // A wet bulb below -60 °C is out of range, and at the triple point rounding decides the branch.
            if let Some(root) = root && root.si() <= dry_bulb.si() && root.si() > 213.15
                && (root.si() - 273.16).abs() > 1e-6 {
                let back = again(Humidity::WetBulb(root, wick));
                prop_assert!(back.is_ok_and(|back| near(back, w, 1e-6, 2e-9)), "{wick:?} {}: {back:?} {w}", root.si());
            }
        }
        let by_h = MoistAir::from_enthalpy_and_humidity_ratio(air.enthalpy(), air.humidity_ratio(), pressure);
        prop_assert!(near(by_h.unwrap().dry_bulb().si(), dry_bulb.si(), 0.0, 1e-6));
    }

    #[test]
    fn any_reading_gives_air_or_says_why_not(
        t in -80.0..110.0_f64, other in -120.0..120.0_f64, ratio in -0.2..1.3_f64, p in 30_000.0..140_000.0_f64,
        which in 0..7_usize,
    ) {
        use dewledger_quantities::{Enthalpy, HumidityRatio};
        let temperature = ThermodynamicTemperature::from_si(other + 273.15);
        let humidity = match which {
            0 => Humidity::WetBulb(temperature, Wick::NotSaid),
            1 => Humidity::RelativeHumidity(RelativeHumidity::from_si(ratio)),
            2 => Humidity::RelativeHumidityOverIce(RelativeHumidity::from_si(ratio)),
            3 => Humidity::DewPoint(temperature),
            4 => Humidity::FrostPoint(temperature),
            5 => Humidity::HumidityRatio(HumidityRatio::from_si(ratio * 0.1)),
            _ => Humidity::Enthalpy(Enthalpy::from_si(other * 2000.0)),
        };
        let air = MoistAir::new(ThermodynamicTemperature::from_si(t + 273.15), humidity, Pressure::from_si(p));
        if let Ok(air) = air {
            let wet_bulb = air.wet_bulb().unwrap();
            for value in [air.humidity_ratio().si(), air.enthalpy().si(), air.specific_volume().si(),
                air.relative_humidity().si(), air.relative_humidity_over_ice().si(), wet_bulb.reading().si()] {
                prop_assert!(value.is_finite());
            }
        }
    }
}
