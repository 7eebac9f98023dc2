//! Humidifying and evaporative cooling: worked cases by two routes, a handbook's steam example, refusals.

mod support;

use dewledger_checks::{Given, Reading};
use dewledger_quantities::{Amount, Kind};
use support::{Case, given, note, refused, say, si, solve, waits};

const CASES: &str = include_str!("data/humidifying.json");

fn put(given: &mut Given, key: &str, kind: Kind, si: f64) {
    given.put(key, Reading::new(Amount::new(kind, si)));
}

fn steam() -> Given {
    let case = Case::of(CASES, "8a");
    given(
        &[
            ("entering.humidity_by", "relative_humidity"),
            ("method.by", "steam"),
            ("flow.basis", "actual_entering"),
        ],
        &[
            ("pressure.elevation", Kind::Elevation, case.input("elevation_m")),
            ("entering.dry_bulb", Kind::Temperature, case.kelvin("t1_C")),
            ("entering.relative_humidity", Kind::RelativeHumidity, case.input("RH1")),
            ("target.relative_humidity", Kind::RelativeHumidity, case.input("target_RH2")),
            ("flow.rate", Kind::AirFlow, case.input("flow_actual_at_entering_m3_s")),
            ("steam.feed_water", Kind::Temperature, case.kelvin("feed_water_C")),
        ],
    )
}

fn pad() -> Given {
    let case = Case::of(CASES, "8b");
    given(
        &[
            ("method.by", "evaporative"),
            ("pad.by", "effectiveness"),
            ("flow.basis", "actual_entering"),
        ],
        &[
            ("pressure.elevation", Kind::Elevation, case.input("elevation_m")),
            ("entering.dry_bulb", Kind::Temperature, case.kelvin("t1_C")),
            ("entering.wet_bulb", Kind::Temperature, case.kelvin("twb1_C")),
            ("pad.effectiveness", Kind::Share, case.input("effectiveness")),
            ("flow.rate", Kind::AirFlow, case.input("flow_actual_at_entering_m3_s")),
            ("pad.cycles", Kind::Ratio, case.input("cycles_of_concentration")),
        ],
    )
}

#[test]
fn steam_to_a_humidity() {
    Case::of(CASES, "8a").hold(
        &solve("humidifying", &steam()),
        &[
            ("dry_air", "m_da_kg_s", 1.0, 0.0, 2e-6, 0.0),
            ("added", "delta_W", 1.0, 0.0, 1e-3, 0.0),
            ("dry_bulb", "t2_C", 1.0, -273.15, 0.0, 1e-3),
            ("humidity_ratio", "W2", 1.0, 0.0, 1e-3, 0.0),
            ("water", "water_kg_h", 3600.0, 0.0, 1e-3, 0.0),
            ("heat", "heat_with_steam_W", 1.0, 0.0, 1e-3, 0.0),
            ("generator", "generator_power_W", 1.0, 0.0, 1e-3, 0.0),
            ("fog_limit_water", "fog_limit_water_kg_h", 3600.0, 0.0, 1e-3, 0.0),
        ],
    );
}

#[test]
fn a_wetted_pad() {
    Case::of(CASES, "8b").hold(
        &solve("humidifying", &pad()),
        &[
            ("dry_air", "m_da_kg_s", 1.0, 0.0, 2e-6, 0.0),
            ("dry_bulb", "t2_C", 1.0, -273.15, 0.0, 1e-4),
            ("humidity_ratio", "W2", 1.0, 0.0, 2e-5, 0.0),
            ("enthalpy", "h2_J_kg", 1.0, 0.0, 2e-5, 0.0),
            ("relative_humidity", "RH2", 1.0, 0.0, 2e-5, 0.0),
            ("water", "evaporated_kg_h", 3600.0, 0.0, 1e-4, 0.0),
            ("bleed", "bleed_kg_h", 3600.0, 0.0, 1e-4, 0.0),
            ("make_up", "make_up_kg_h", 3600.0, 0.0, 1e-4, 0.0),
        ],
    );
}

#[test]
fn steam_past_saturation_is_fog() {
    let case = Case::of(CASES, "8c");
    let given = given(
        &[
            ("entering.humidity_by", "relative_humidity"),
            ("flow.basis", "dry_air"),
            ("target.by", "water"),
        ],
        &[
            ("pressure.elevation", Kind::Elevation, case.input("elevation_m")),
            ("entering.dry_bulb", Kind::Temperature, case.kelvin("t1_C")),
            ("entering.relative_humidity", Kind::RelativeHumidity, case.input("RH1")),
            ("flow.dry_air", Kind::DryAirFlow, case.input("flow_da_kg_s")),
            ("target.water", Kind::MoistureFlow, case.input("steam_added_kg_h") / 3600.0),
            ("steam.dryness", Kind::Share, case.input("steam_dryness")),
        ],
    );
    let outcome = solve("humidifying", &given);
    case.hold(
        &outcome,
        &[
            ("dry_bulb", "t2_C", 1.0, -273.15, 0.0, 2e-3),
            ("humidity_ratio", "W_vapour", 1.0, 0.0, 1e-3, 0.0),
            ("enthalpy", "h2_J_kg", 1.0, 0.0, 1e-3, 0.0),
            ("fog", "fog_kg_kg", 1.0, 0.0, 1e-2, 0.0),
            ("fog_flow", "fog_kg_h", 3600.0, 0.0, 1e-2, 0.0),
        ],
    );
    assert!(say(&note(&outcome, "fog").lead).starts_with("The air cannot hold it: 0.239 g/kg"));
}

/// ASHRAE Handbook Fundamentals, psychrometrics, steam injection (from memory): 100 kg/min of dry air at 20 °C and 8 °C wet
/// bulb, saturated steam of 110 °C, to a dew point of 13 °C: 0.76 kg/min, about 21 °C.
#[test]
fn the_handbooks_steam_example() {
    let given = given(
        &[("flow.basis", "dry_air"), ("target.by", "dew_point")],
        &[
            ("pressure.elevation", Kind::Elevation, 0.0),
            ("entering.dry_bulb", Kind::Temperature, 293.15),
            ("entering.wet_bulb", Kind::Temperature, 281.15),
            ("flow.dry_air", Kind::DryAirFlow, 100.0 / 60.0),
            ("target.dew_point", Kind::Temperature, 286.15),
            ("steam.pressure", Kind::Pressure, 143_380.0),
        ],
    );
    let outcome = solve("humidifying", &given);
    assert!((si(&outcome, "water") * 60.0 - 0.76).abs() < 0.005);
    assert!((si(&outcome, "dry_bulb") - 273.15 - 21.0).abs() < 0.3);
}

/// Recirculated water leaves the wet bulb where it was, and the effectiveness comes back from the leaving dry bulb.
#[test]
fn the_wet_bulb_stays() {
    let outcome = solve("humidifying", &pad());
    let leaving = &outcome.states[1].air;
    let entering = &outcome.states[0].air;
    let apart =
        leaving.wet_bulb().unwrap().reading().value - entering.wet_bulb().unwrap().reading().value;
    assert!(apart.abs() < 1e-4, "{apart}");
    let mut back = pad();
    back.choose("pad.by", "leaving");
    put(&mut back, "pad.leaving_dry_bulb", Kind::Temperature, si(&outcome, "dry_bulb"));
    assert!((si(&solve("humidifying", &back), "effectiveness") - 0.82).abs() < 1e-9);
}

#[test]
fn what_cannot_be_is_refused() {
    let with = |base: Given, key: &str, kind: Kind, si: f64| {
        let mut given = base;
        put(&mut given, key, kind, si);
        refused("humidifying", &given)
    };
    let (_, _, says) = with(steam(), "target.relative_humidity", Kind::RelativeHumidity, 0.10);
    assert_eq!(
        says,
        "10.0 % is not above what the entering air holds already: nothing is to be added."
    );
    let (_, _, says) = with(steam(), "target.relative_humidity", Kind::RelativeHumidity, 1.0);
    assert_eq!(
        says,
        "A target of 100.0 % is not below saturation. Type what the leaving air should hold."
    );
    let (_, _, says) = with(steam(), "steam.dryness", Kind::Share, 0.6);
    assert!(says.starts_with("Steam of dryness 60.0 % is outside 85 to 100 %"), "{says}");
    let (_, _, says) = with(steam(), "steam.pressure", Kind::Pressure, 30_000.0);
    assert!(says.contains("is outside 50 to 500 kPa absolute"), "{says}");
    let (_, _, says) = with(steam(), "steam.feed_water", Kind::Temperature, 400.0);
    assert!(says.contains("is outside 0 to 100 °C"), "{says}");
    let (_, _, says) = with(pad(), "pad.effectiveness", Kind::Share, 1.1);
    assert!(says.contains("is outside 0 to 100 %"), "{says}");
    let (_, _, says) = with(pad(), "pad.cycles", Kind::Ratio, 1.0);
    assert!(says.contains("are outside 1.05 to 10"), "{says}");
    let mut leaving = pad();
    leaving.choose("pad.by", "leaving");
    let (_, _, says) = with(leaving.clone(), "pad.leaving_dry_bulb", Kind::Temperature, 289.15);
    assert!(says.contains("water alone cannot cool that far"), "{says}");
    let (_, _, says) = with(leaving, "pad.leaving_dry_bulb", Kind::Temperature, 315.15);
    assert!(says.contains("evaporating water cools"), "{says}");
}

#[test]
fn what_looks_wrong_is_said() {
    let mut wet = steam();
    put(&mut wet, "target.relative_humidity", Kind::RelativeHumidity, 0.95);
    let lead = say(&note(&solve("humidifying", &wet), "duct_limit").lead);
    assert!(lead.starts_with("Leaving air of 95.0 % is above the 90 %"), "{lead}");
    let mut near = pad();
    put(&mut near, "entering.wet_bulb", Kind::Temperature, 273.15 + 37.0);
    let outcome = solve("humidifying", &near);
    assert!(say(&note(&outcome, "small_depression").lead).contains("an effectiveness says little"));
    assert!(say(&note(&outcome, "humid_already").lead).contains("is there anything to humidify?"));
}

#[test]
fn it_waits_for_what_it_needs() {
    let mut bare = steam();
    bare.choose("target.by", "water");
    assert_eq!(waits("humidifying", &bare), ["target.water"]);
}
