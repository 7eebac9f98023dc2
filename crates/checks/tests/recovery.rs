//! Energy recovery: worked cases by two routes, constructed exchangers, refusals.

mod support;

use dewledger_checks::doubt::work_out;
use dewledger_checks::{Given, Reading};
use dewledger_quantities::{Amount, Kind};
use support::{Case, check, given, note, refused, say, si, solve, waits, withheld};

const CASES: &str = include_str!("data/recovery.json");

fn wheel() -> Given {
    let case = Case::of(CASES, "7a");
    given(
        &[
            ("device.kind", "moist_wheel"),
            ("outdoor.humidity_by", "relative_humidity_over_ice"),
            ("supply.humidity_by", "relative_humidity"),
            ("return.humidity_by", "relative_humidity"),
            ("exhaust.humidity_by", "relative_humidity_over_ice"),
            ("supply_flow.basis", "standard"),
            ("return_flow.basis", "standard"),
            ("transfer.by", "ratio"),
        ],
        &[
            ("pressure.elevation", Kind::Elevation, case.input("elevation_m")),
            ("outdoor.dry_bulb", Kind::Temperature, case.kelvin("t1_C")),
            (
                "outdoor.relative_humidity_over_ice",
                Kind::RelativeHumidity,
                case.input("RH1_over_ice"),
            ),
            ("supply.dry_bulb", Kind::Temperature, case.kelvin("t2_C")),
            ("supply.relative_humidity", Kind::RelativeHumidity, case.input("RH2")),
            ("return.dry_bulb", Kind::Temperature, case.kelvin("t3_C")),
            ("return.relative_humidity", Kind::RelativeHumidity, case.input("RH3")),
            ("exhaust.dry_bulb", Kind::Temperature, case.kelvin("t4_C")),
            (
                "exhaust.relative_humidity_over_ice",
                Kind::RelativeHumidity,
                case.input("RH4_over_ice"),
            ),
            ("supply_flow.rate", Kind::StandardAirFlow, case.input("supply_standard_flow_m3_s")),
            ("return_flow.rate", Kind::StandardAirFlow, case.input("exhaust_standard_flow_m3_s")),
            ("supply_flow.standard_density", Kind::Density, case.input("standard_density_kg_m3")),
            ("return_flow.standard_density", Kind::Density, case.input("standard_density_kg_m3")),
            ("transfer.ratio", Kind::Share, case.input("eatr")),
        ],
    )
}

fn plates() -> Given {
    let case = Case::of(CASES, "7b");
    let mut given = given(
        &[
            ("device.kind", "plates"),
            ("supply_flow.basis", "actual_supply"),
            ("return_flow.basis", "actual_return"),
        ],
        &[
            ("pressure.elevation", Kind::Elevation, case.input("elevation_m")),
            ("supply_flow.rate", Kind::AirFlow, case.input("supply_actual_at_2_m3_s")),
            ("return_flow.rate", Kind::AirFlow, case.input("exhaust_actual_at_3_m3_s")),
        ],
    );
    for (corner, t, w) in [
        ("outdoor", "t1_C", "W1"),
        ("supply", "t2_C", "W2"),
        ("return", "t3_C", "W3"),
        ("exhaust", "t4_C", "W4"),
    ] {
        given.choose(format!("{corner}.humidity_by"), "humidity_ratio");
        put(&mut given, &format!("{corner}.dry_bulb"), Kind::Temperature, case.kelvin(t));
        put(&mut given, &format!("{corner}.humidity_ratio"), Kind::HumidityRatio, case.input(w));
    }
    given
}

fn put(given: &mut Given, key: &str, kind: Kind, si: f64) {
    given.put(key, Reading::new(Amount::new(kind, si)));
}

#[test]
fn a_wheel_in_winter_with_unequal_flows() {
    let outcome = solve("recovery", &wheel());
    Case::of(CASES, "7a").hold(
        &outcome,
        &[
            ("supply_dry_air", "m_supply_kg_s", 1.0, 0.0, 2e-6, 0.0),
            ("return_dry_air", "m_exhaust_kg_s", 1.0, 0.0, 2e-6, 0.0),
            ("sensible_effectiveness", "eff_sensible", 1.0, 0.0, 2e-6, 0.0),
            ("latent_effectiveness", "eff_latent", 1.0, 0.0, 1e-4, 0.0),
            ("total_effectiveness", "eff_total", 1.0, 0.0, 2e-5, 0.0),
            ("total", "q_total_W", 1.0, 0.0, 2e-5, 0.0),
            ("sensible", "q_sensible_W", 1.0, 0.0, 2e-5, 0.0),
            ("latent", "q_latent_W", 1.0, 0.0, 1e-4, 0.0),
            ("moisture", "moisture_kg_s", 1.0, 0.0, 1e-4, 0.0),
            ("exhaust_side", "q_exhaust_side_W", 1.0, 0.0, 2e-5, 0.0),
            ("gap_heat_share", "balance_gap_rel", 1.0, 0.0, 1e-3, 1e-5),
            ("exhaust_moisture", "moisture_exhaust_side_kg_s", 1.0, 0.0, 1e-4, 0.0),
            ("net_sensible_effectiveness", "net_eff_sensible", 1.0, 0.0, 2e-6, 0.0),
            ("net_latent_effectiveness", "net_eff_latent", 1.0, 0.0, 1e-4, 0.0),
            // Theirs is the enthalpy of the corrected temperature and moisture; enthalpies mix as they are.
            ("net_total_effectiveness", "net_eff_total", 1.0, 0.0, 1e-4, 0.0),
            ("line_saturation", "line13_max_saturation_ratio", 1.0, 0.0, 1e-4, 0.0),
        ],
    );
    // Heat closes within 2.2 %, water is 37 % apart.
    let apart = si(&outcome, "gap_water") / si(&outcome, "exhaust_moisture");
    assert!((apart + 0.313).abs() < 0.01, "{apart}");
    assert!(say(&note(&outcome, "unequal_flows").lead).contains("not comparable with a rating"));
}

#[test]
fn plates_in_summer() {
    Case::of(CASES, "7b").hold(
        &solve("recovery", &plates()),
        &[
            ("supply_dry_air", "m_supply_kg_s", 1.0, 0.0, 2e-6, 0.0),
            ("return_dry_air", "m_exhaust_kg_s", 1.0, 0.0, 2e-6, 0.0),
            ("sensible_effectiveness", "eff_sensible", 1.0, 0.0, 2e-6, 0.0),
            ("latent_effectiveness", "eff_latent", 1.0, 0.0, 0.0, 1e-9),
            ("total_effectiveness", "eff_total", 1.0, 0.0, 2e-5, 0.0),
            ("total", "q_total_W", 1.0, 0.0, 2e-5, 0.0),
            ("sensible", "q_sensible_W", 1.0, 0.0, 2e-5, 0.0),
            ("exhaust_side", "q_exhaust_side_W", 1.0, 0.0, 2e-5, 0.0),
            ("gap_heat_share", "balance_gap_rel", 1.0, 0.0, 1e-3, 1e-5),
        ],
    );
}

/// An exchanger that was built with an effectiveness returns it, whatever the flows.
#[test]
fn constructed_effectiveness_comes_back() {
    for (flow_supply, flow_return) in [(1.0, 1.0), (1.2, 0.9), (0.8, 1.1)] {
        let mut given = plates();
        let share = f64::min(flow_supply, flow_return) / flow_supply;
        let t2 = 273.15 + 34.0 - 0.7 * share * (34.0 - 24.5);
        put(&mut given, "supply.dry_bulb", Kind::Temperature, t2);
        for (prefix, flow) in [("supply_flow", flow_supply), ("return_flow", flow_return)] {
            given.choose(format!("{prefix}.basis"), "dry_air");
            put(&mut given, &format!("{prefix}.dry_air"), Kind::DryAirFlow, flow);
        }
        let effect = si(&solve("recovery", &given), "sensible_effectiveness");
        assert!((effect - 0.7).abs() < 1e-9, "{effect}");
    }
}

#[test]
fn carry_over_from_carbon_dioxide() {
    let mut given = wheel();
    given.choose("transfer.by", "co2");
    for (key, ppm) in [("outdoor", 420.0), ("supply", 444.0), ("return", 820.0)] {
        put(&mut given, &format!("transfer.co2_{key}"), Kind::MoleFraction, ppm * 1e-6);
    }
    assert!((si(&solve("recovery", &given), "transfer") - 0.06).abs() < 1e-12);
    put(&mut given, "transfer.co2_return", Kind::MoleFraction, 480e-6);
    let (field, _, says) = refused("recovery", &given);
    assert_eq!(field, "transfer.co2_return");
    assert_eq!(
        says,
        "Return and outdoor CO2 are less than 100 ppm apart: too little to tell the carry-over."
    );
    put(&mut given, "transfer.co2_return", Kind::MoleFraction, 820e-6);
    put(&mut given, "transfer.co2_supply", Kind::MoleFraction, 560e-6);
    let (_, _, says) = refused("recovery", &given);
    assert!(says.starts_with("A carry-over of 35.0 % is outside 0 to 25 %."), "{says}");
    put(&mut given, "transfer.co2_supply", Kind::MoleFraction, 470e-6);
    assert_eq!(
        say(&note(&solve("recovery", &given), "large_transfer").lead),
        "More than a tenth of the exhaust comes back."
    );
}

#[test]
fn without_flows_equal_ones_are_assumed_and_said() {
    let mut bare = Given::default();
    let whole = plates();
    for (key, reading) in whole.readings().filter(|(key, _)| !key.contains("flow")) {
        bare.put(key, *reading);
    }
    bare.choose("device.kind", "plates");
    for corner in ["outdoor", "supply", "return", "exhaust"] {
        bare.choose(format!("{corner}.humidity_by"), "humidity_ratio");
    }
    let outcome = solve("recovery", &bare);
    assert!((si(&outcome, "sensible_effectiveness") - 5.6 / 9.5).abs() < 1e-9);
    assert_eq!(withheld(&outcome, "total"), "Both flows are needed");
    assert!(say(&note(&outcome, "equal_flows").lead).starts_with("Equal flows are assumed"));
}

#[test]
fn entering_airs_that_are_alike_tell_nothing() {
    let mut given = plates();
    put(&mut given, "return.dry_bulb", Kind::Temperature, 273.15 + 32.5);
    put(&mut given, "return.humidity_ratio", Kind::HumidityRatio, 0.0143);
    let outcome = solve("recovery", &given);
    assert_eq!(
        withheld(&outcome, "sensible_effectiveness"),
        "Outdoor and return are less than 2 K apart"
    );
    assert_eq!(
        withheld(&outcome, "latent_effectiveness"),
        "Outdoor and return are less than 0.5 g/kg apart"
    );
    put(&mut given, "return.dry_bulb", Kind::Temperature, 273.15 + 30.0);
    let outcome = solve("recovery", &given);
    assert_eq!(
        say(&note(&outcome, "close_streams").lead),
        "Outdoor and return are only 4.0 K apart."
    );
}

#[test]
fn what_looks_wrong_is_said() {
    let mut given = plates();
    put(&mut given, "supply.humidity_ratio", Kind::HumidityRatio, 0.0130);
    let outcome = solve("recovery", &given);
    let lead = say(&note(&outcome, "moisture_in_a_dry_device").lead);
    assert_eq!(lead, "The supply’s moisture changes by 1.50 g/kg in a device that moves none.");
    put(&mut given, "supply.dry_bulb", Kind::Temperature, 273.15 + 22.0);
    let outcome = solve("recovery", &given);
    assert!(
        say(&note(&outcome, "sensible_effectiveness_outside").lead)
            .contains("is outside 0 to 100 %")
    );
    let mut frosty = wheel();
    put(&mut frosty, "outdoor.dry_bulb", Kind::Temperature, 273.15 - 20.6);
    put(&mut frosty, "outdoor.relative_humidity_over_ice", Kind::RelativeHumidity, 0.8);
    put(&mut frosty, "pressure.elevation", Kind::Elevation, 0.0);
    let outcome = solve("recovery", &frosty);
    // -20.6 °C, 80 % and 22.2 °C, 35 % at sea level: 1.17 (CoolProp 8.0.0).
    assert!((si(&outcome, "line_saturation") - 1.17).abs() < 0.01);
    assert!(say(&note(&outcome, "frost_in_the_rotor").lead).contains("crosses saturation"));
}

/// Both sides against each other with the doubt of all readings: heat closes within it, water does not.
#[test]
fn both_sides_are_judged_by_the_doubt() {
    let mut given = wheel();
    let keys: Vec<String> = given.readings().map(|(key, _)| key.to_owned()).collect();
    for key in keys {
        let width = if key.ends_with("dry_bulb") {
            0.3
        } else if key.contains("humidity") {
            0.02
        } else if key.ends_with("rate") {
            0.08
        } else {
            continue;
        };
        given = given.within(&key, width);
    }
    let worked = work_out(check("recovery"), &given).unwrap();
    let codes: Vec<&str> = worked.outcome.notes.iter().map(|note| note.code.as_ref()).collect();
    assert!(codes.contains(&"gap_heat_closes") && codes.contains(&"gap_water_open"), "{codes:?}");
}

#[test]
fn it_waits_for_what_it_needs() {
    assert_eq!(waits("recovery", &given(&[], &[])), ["device.kind"]);
    let mut bare =
        given(&[("device.kind", "plates")], &[("pressure.elevation", Kind::Elevation, 0.0)]);
    put(&mut bare, "outdoor.dry_bulb", Kind::Temperature, 270.0);
    assert_eq!(waits("recovery", &bare).len(), 5);
}
