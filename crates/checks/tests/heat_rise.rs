//! Air flow by temperature rise: worked cases by two routes, electric power and fuel worked by hand, refusals.

mod support;

use dewledger_checks::doubt::work_out;
use dewledger_checks::{Given, Reading};
use dewledger_quantities::{Amount, Kind, Unit};
use support::{Case, check, given, note, refused, say, si, solve, typed, waits};

const CASES: &str = include_str!("data/heat_rise.json");

fn put(given: &mut Given, key: &str, kind: Kind, si: f64) {
    given.put(key, Reading::new(Amount::new(kind, si)));
}

fn heater() -> Given {
    let case = Case::of(CASES, "9a");
    given(
        &[("entering.humidity_by", "humidity_ratio"), ("power.by", "three_phase")],
        &[
            ("pressure.elevation", Kind::Elevation, case.input("elevation_m")),
            ("entering.dry_bulb", Kind::Temperature, case.kelvin("t1_C")),
            ("entering.humidity_ratio", Kind::HumidityRatio, case.input("W")),
            ("leaving.dry_bulb", Kind::Temperature, case.kelvin("t2_C")),
            ("power.voltage", Kind::Voltage, 208.0),
            ("power.current", Kind::Current, 41.5),
            ("power.factor", Kind::Ratio, 1.0),
        ],
    )
}

#[test]
fn an_electric_duct_heater() {
    let cfm = 1.0 / Unit::find("cfm").unwrap().to_si(Kind::AirFlow, 1.0).unwrap();
    let outcome = solve("heat_rise", &heater());
    Case::of(CASES, "9a").hold(
        &outcome,
        &[
            ("power", "power_W", 1.0, 0.0, 1e-7, 0.0),
            ("delta_h", "delta_h_J_kg", 1.0, 0.0, 2e-5, 0.0),
            ("dry_air", "m_da_kg_s", 1.0, 0.0, 2e-5, 0.0),
            ("flow_entering", "flow_entering_m3_s", 1.0, 0.0, 2e-5, 0.0),
            ("flow_leaving", "flow_leaving_cfm", cfm, 0.0, 2e-5, 0.0),
        ],
    );
    // By 1.08 it would be 1928 cfm, against 2374 actual.
    let book = outcome.versus[0].book.si() * cfm;
    assert!((book - 1928.01).abs() < 0.1, "{book}");
}

/// 415 V, 22.4 A, power factor 1, three phase: 16 101.144 W. Legs 240.1/21.8, 239.2/22.6, 241.0/14.9 V/A: 14 231.0 W, 24.62 %
/// unbalance (elementary, worked by hand).
#[test]
fn electric_power_by_leg() {
    let mut three = heater();
    put(&mut three, "power.voltage", Kind::Voltage, 415.0);
    put(&mut three, "power.current", Kind::Current, 22.4);
    assert!((si(&solve("heat_rise", &three), "power") - 16_101.144).abs() < 0.001);
    let mut legs = heater();
    legs.choose("power.by", "legs");
    for (leg, volts, amperes) in [(1, 240.1, 21.8), (2, 239.2, 22.6), (3, 241.0, 14.9)] {
        put(&mut legs, &format!("power.leg{leg}_voltage"), Kind::Voltage, volts);
        put(&mut legs, &format!("power.leg{leg}_current"), Kind::Current, amperes);
        put(&mut legs, &format!("power.leg{leg}_factor"), Kind::Ratio, 1.0);
    }
    let outcome = solve("heat_rise", &legs);
    assert!((si(&outcome, "power") - 14_231.0).abs() < 0.01);
    assert!((si(&outcome, "unbalance") - 0.2462).abs() < 5e-5);
    let unbalance = note(&outcome, "unbalance");
    assert_eq!(
        say(&unbalance.lead),
        "One leg carries less: an element, fuse or contactor leg may be open."
    );
    assert_eq!(say(unbalance.reason.as_ref().unwrap()), "Have it checked by a qualified person.");
}

fn burner() -> Given {
    let mut given = heater();
    given.choose("pressure.by", "read");
    given.choose("power.by", "fuel");
    given.choose("fuel.value_is", "gross");
    given.choose("fuel.efficiency_on", "gross");
    put(&mut given, "pressure.read", Kind::Pressure, 84_000.0);
    typed(&mut given, "fuel.volume", Kind::FuelVolume, "ft3", 1.0);
    typed(&mut given, "fuel.time", Kind::Duration, "s", 42.0);
    typed(&mut given, "fuel.heating_value", Kind::HeatingValue, "Btu/ft3", 1020.0);
    typed(&mut given, "fuel.base_pressure", Kind::Pressure, "psi", 14.73);
    typed(&mut given, "fuel.base_temperature", Kind::Temperature, "degF", 60.0);
    typed(&mut given, "fuel.meter_pressure", Kind::PressureDifference, "kPa", 1.74);
    typed(&mut given, "fuel.meter_temperature", Kind::Temperature, "degC", 15.0);
    typed(&mut given, "fuel.efficiency", Kind::Share, "%", 81.0);
    given
}

/// 1 ft³ in 42.0 s, 1 020 Btu/ft³ at 14.73 psia and 60 °F, meter at 84.0 kPa + 1.74 kPa and 15.0 °C: factor 0.84585957, input
/// 21 673.278 W, useful 59 901.36 Btu/h (ideal-gas law, worked by hand).
#[test]
fn fuel_by_a_clocked_meter() {
    let outcome = solve("heat_rise", &burner());
    assert!((si(&outcome, "meter_factor") - 0.845_859_57).abs() < 1e-7);
    assert!((si(&outcome, "fuel_input") - 21_673.278).abs() < 0.01);
    assert!((si(&outcome, "power") - 59_901.36 * 0.293_071_07).abs() < 0.02);
    assert!(
        say(&note(&outcome, "gross_and_net").lead)
            .starts_with("Gross and net differ by about a tenth")
    );
}

#[test]
fn what_cannot_be_is_refused() {
    let with = |base: Given, key: &str, kind: Kind, si: f64| {
        let mut given = base;
        put(&mut given, key, kind, si);
        refused("heat_rise", &given)
    };
    let (field, _, says) = with(heater(), "leaving.dry_bulb", Kind::Temperature, 285.15);
    assert_eq!(field, "leaving.dry_bulb");
    assert_eq!(
        says,
        "Leaving 12.0 °C is not warmer than entering 17.5 °C: no power went into this air. Swap the two, or read again."
    );
    let (_, _, says) = with(heater(), "leaving.dry_bulb", Kind::Temperature, 291.15);
    assert!(says.contains("is outside 2 to 90 K: no flow can be told from it"), "{says}");
    let (_, _, says) = with(heater(), "power.factor", Kind::Ratio, 1.3);
    assert!(says.ends_with("is outside 0.05 to 1. A heating element is 1."), "{says}");
    let (_, _, says) = with(heater(), "power.voltage", Kind::Voltage, 13_800.0);
    assert!(says.contains("is outside 1 to 1 000 V"), "{says}");
    let (_, _, says) = with(heater(), "power.current", Kind::Current, 0.001);
    assert!(says.contains("is outside 10 W to 10 MW"), "{says}");
    let (field, _, says) = with(burner(), "fuel.efficiency", Kind::Share, 1.08);
    assert_eq!(field, "fuel.efficiency");
    assert!(says.contains("above 100 % gross more would come out than goes in"), "{says}");
    let (_, _, says) = with(burner(), "fuel.base_pressure", Kind::Pressure, 2000.0);
    assert!(says.contains("is quoted nowhere"), "{says}");
    let mut mixed = burner();
    mixed.choose("fuel.efficiency_on", "net");
    let (_, _, says) = refused("heat_rise", &mixed);
    assert!(
        says.starts_with("Heating value and efficiency must both be gross or both be net"),
        "{says}"
    );
}

#[test]
fn a_heating_value_without_its_base_waits() {
    let whole = burner();
    let mut bare = Given::default();
    for (key, reading) in whole.readings().filter(|(key, _)| !key.starts_with("fuel.base")) {
        bare.put(key, *reading);
    }
    for (key, value) in [
        ("pressure.by", "read"),
        ("entering.humidity_by", "humidity_ratio"),
        ("power.by", "fuel"),
        ("fuel.value_is", "gross"),
    ] {
        bare.choose(key, value);
    }
    assert_eq!(
        waits("heat_rise", &bare),
        ["fuel.base_pressure", "fuel.base_temperature", "fuel.efficiency_on"]
    );
}

/// Without its humidity the flow moves by less than 1 %, and its doubt holds that.
#[test]
fn humidity_that_was_not_read_adds_to_the_doubt() {
    let whole = heater();
    let mut bare = Given::default();
    for (key, reading) in whole.readings().filter(|(key, _)| *key != "entering.humidity_ratio") {
        bare.put(key, *reading);
    }
    bare.choose("power.by", "three_phase");
    let widths = [
        ("power.voltage", 1e-6),
        ("power.current", 1e-6),
        ("power.factor", 1e-9),
        ("entering.dry_bulb", 1e-9),
        ("leaving.dry_bulb", 1e-9),
    ];
    for (key, width) in widths {
        bare = bare.within(key, width);
    }
    let worked = work_out(check("heat_rise"), &bare).unwrap();
    let dry_air = worked.outcome.amount("dry_air").unwrap().si();
    let half_width = worked.doubts["dry_air"].half_width_si.unwrap();
    assert!((half_width / dry_air - 0.007).abs() < 0.001, "{}", half_width / dry_air);
    let exact = si(&solve("heat_rise", &whole), "dry_air");
    assert!((dry_air - exact).abs() < half_width);
    assert!(
        say(&note(&worked.outcome, "humidity_assumed").lead)
            .starts_with("The humidity was not read")
    );
}

#[test]
fn a_small_rise_is_said() {
    let mut small = heater();
    put(&mut small, "leaving.dry_bulb", Kind::Temperature, 273.15 + 22.0);
    let lead = say(&note(&solve("heat_rise", &small), "small_rise").lead);
    assert!(lead.starts_with("A rise of 4.5 K is small"), "{lead}");
}
