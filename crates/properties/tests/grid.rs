//! Moist air against CoolProp's grid (see `data/README.md`) at the accuracy that the app promises:
//! W 1e-6 relative, h 0.5 J/kg, v 1e-6 relative, dew or frost point 5e-4 K, wet bulb 1e-4 K.

#![expect(
    clippy::unwrap_used,
    clippy::float_cmp,
    reason = "a reference table that cannot be read fails the test; its marks are exact"
)]

use dewledger_properties::{Humidity, MoistAir};
use dewledger_quantities::{Pressure, Quantity, RelativeHumidity, ThermodynamicTemperature};

/// One row of a reference table: numbers by column name.
struct Row(Vec<(String, f64)>);

impl Row {
    fn get(&self, name: &str) -> f64 {
        self.0
            .iter()
            .find(|(column, _)| column == name)
            .unwrap_or_else(|| panic!("no column {name}"))
            .1
    }
}

fn table(text: &str) -> Vec<Row> {
    let mut reader = csv::Reader::from_reader(text.as_bytes());
    let columns: Vec<String> = reader.headers().unwrap().iter().map(str::to_owned).collect();
    let row = |record: csv::StringRecord| {
        Row(columns
            .iter()
            .cloned()
            .zip(record.iter().map(|cell| cell.parse().unwrap_or(f64::NAN)))
            .collect())
    };
    reader.records().map(|record| row(record.unwrap())).collect()
}

fn state(row: &Row) -> MoistAir {
    MoistAir::new(
        ThermodynamicTemperature::from_si(row.get("T_db_C") + 273.15),
        Humidity::RelativeHumidityOverIce(RelativeHumidity::from_si(row.get("RH"))),
        Pressure::from_si(row.get("P_Pa")),
    )
    .unwrap()
}

#[test]
fn states_agree_with_coolprop_over_the_grid() {
    let rows = table(include_str!("data/grid_public.csv"));
    assert!(rows.len() > 700, "the grid is whole");
    let mut worst = [0.0_f64; 7];
    for row in &rows {
        let air = state(row);
        let relative = |ours: f64, column: &str| (ours / row.get(column) - 1.0).abs();
        let wet_bulb = air.wet_bulb().unwrap();
        let off = |root: Option<ThermodynamicTemperature>| {
            root.map_or(f64::INFINITY, |root| (root.si() - 273.15 - row.get("T_wb_C")).abs())
        };
        let wet_bulb_off = if row.get("wb_two_roots") == 1.0 {
            off(wet_bulb.liquid).min(off(wet_bulb.ice))
        } else {
            off(Some(wet_bulb.reading()))
        };
        let deviations = [
            relative(air.humidity_ratio().si(), "W"),
            (air.enthalpy().si() - row.get("h_J_kgda")).abs(),
            relative(air.specific_volume().si(), "v_m3_kgda"),
            (air.frost_point().unwrap().si() - 273.15 - row.get("T_dp_C")).abs(),
            wet_bulb_off,
            relative(air.heat_capacity().si(), "cp_J_kgda_K"),
            (air.entropy().si() - row.get("s_J_kgda_K")).abs(),
        ];
        let limits = [1e-6, 0.5, 1e-6, 5e-4, 1e-4, 1e-6, 1e-3];
        for (index, (deviation, limit)) in deviations.iter().zip(limits).enumerate() {
            let at = (row.get("T_db_C"), row.get("P_Pa"), row.get("RH"));
            assert!(deviation <= &limit, "property {index} off by {deviation} at {at:?}");
            worst[index] = worst[index].max(*deviation);
        }
    }
    println!(
        "worst: W {:.1e} rel, h {:.2} J/kg, v {:.1e} rel, dew {:.1e} K, wet bulb {:.1e} K, cp {:.1e} rel, s {:.1e}",
        worst[0], worst[1], worst[2], worst[3], worst[4], worst[5], worst[6]
    );
}

#[test]
fn both_wet_bulbs_near_freezing_are_found() {
    for row in table(include_str!("data/wb_two_roots.csv")) {
        let air = state(&row);
        let wet_bulb = air.wet_bulb().unwrap();
        let liquid = wet_bulb.liquid.expect("a wet wick is possible").si() - 273.15;
        let ice = wet_bulb.ice.expect("an iced wick is possible").si() - 273.15;
        assert!(
            (liquid - row.get("T_wb_water_C")).abs() < 1e-4,
            "{liquid} {}",
            row.get("T_wb_water_C")
        );
        assert!((ice - row.get("T_wb_ice_C")).abs() < 1e-4, "{ice} {}", row.get("T_wb_ice_C"));
    }
}

#[test]
fn states_agree_with_an_independent_transcription() {
    for row in table(include_str!("data/spec_states.csv")) {
        let air = MoistAir::new(
            ThermodynamicTemperature::from_si(row.get("T_C") + 273.15),
            Humidity::RelativeHumidityOverIce(RelativeHumidity::from_si(row.get("RH"))),
            Pressure::from_si(row.get("P_Pa")),
        )
        .unwrap();
        assert!((air.humidity_ratio().si() / row.get("W") - 1.0).abs() < 1e-7);
        assert!((air.enthalpy().si() - row.get("h_J_kgda")).abs() < 0.02);
        assert!((air.specific_volume().si() / row.get("v_m3_kgda") - 1.0).abs() < 1e-8);
        assert!((air.frost_point().unwrap().si() - 273.15 - row.get("T_dp_C")).abs() < 1e-5);
        assert!((air.wet_bulb().unwrap().reading().si() - 273.15 - row.get("T_wb_C")).abs() < 1e-5);
        assert!((air.entropy().si() - row.get("s_J_kgda_K")).abs() < 1e-4);
    }
}

#[test]
fn liquid_water_agrees_with_iapws() {
    use dewledger_properties::water;
    let pressure = Pressure::from_si(1e5);
    for row in table(include_str!("data/water_0p1MPa.csv")) {
        let t = ThermodynamicTemperature::from_si(row.get("T_C") + 273.15);
        assert!(
            (water::density(t, pressure).unwrap().si() / row.get("rho_SR608") - 1.0).abs() < 1e-9
        );
        assert!((water::enthalpy(t, pressure).unwrap().si() - row.get("h_SR608")).abs() < 1e-2);
        // IAPWS-95 itself: the short equation's stated agreement.
        assert!(
            (water::density(t, pressure).unwrap().si() / row.get("rho_IAPWS95_0p1MPa") - 1.0).abs()
                < 1e-7
        );
        assert!((water::heat_capacity(t).unwrap().si() / row.get("cp_IAPWS95") - 1.0).abs() < 5e-5);
        assert!((water::enthalpy(t, pressure).unwrap().si() - row.get("h_IAPWS95")).abs() < 1.5);
    }
}

#[test]
fn glycols_agree_with_coolprop() {
    use dewledger_properties::glycol::Glycol;
    use dewledger_quantities::Ratio;
    let mut compared = 0;
    let text = include_str!("data/glycol_public.csv");
    let mut reader = csv::Reader::from_reader(text.as_bytes());
    let columns: Vec<String> = reader.headers().unwrap().iter().map(str::to_owned).collect();
    for record in reader.records() {
        let record = record.unwrap();
        let cell =
            |name: &str| record.get(columns.iter().position(|c| c == name).unwrap()).unwrap();
        let number = |name: &str| cell(name).parse::<f64>().unwrap_or(f64::NAN);
        let glycol = if cell("fluid") == "MEG" { Glycol::Ethylene } else { Glycol::Propylene };
        let strength = Ratio::from_si(number("mass_fraction"));
        let t = ThermodynamicTemperature::from_si(number("T_C") + 273.15);
        if number("rho_kg_m3").is_nan() {
            continue;
        }
        let Ok(density) = glycol.density(strength, t) else { continue };
        assert!((density.si() / number("rho_kg_m3") - 1.0).abs() < 1e-12);
        assert!(
            (glycol.heat_capacity(strength, t).unwrap().si() / number("cp_J_kgK") - 1.0).abs()
                < 1e-12
        );
        assert!(
            (glycol.conductivity_w_m_k(strength, t).unwrap() / number("k_W_mK") - 1.0).abs()
                < 1e-12
        );
        assert!(
            (glycol.viscosity_pa_s(strength, t).unwrap() / number("mu_Pa_s") - 1.0).abs() < 1e-12
        );
        compared += 1;
    }
    assert!(compared > 200, "{compared} rows compared");
}
