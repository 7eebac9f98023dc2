//! Fan and motor heat: a worked case by two routes, the trade's figure for the rise, refusals and laws.

mod support;

use dewledger_checks::{Given, Reading};
use dewledger_quantities::{Amount, Kind};
use support::{Case, given, refused, si, solve, waits};

const CASES: &str = include_str!("data/fan_heat.json");

fn fan(motor: &str) -> Given {
    let case = Case::of(CASES, "9b");
    given(
        &[
            ("entering.humidity_by", "humidity_ratio"),
            ("flow.basis", "actual_entering"),
            ("fan.motor", motor),
        ],
        &[
            ("pressure.elevation", Kind::Elevation, case.input("elevation_m")),
            ("entering.dry_bulb", Kind::Temperature, case.kelvin("t_C")),
            ("entering.humidity_ratio", Kind::HumidityRatio, case.input("W")),
            ("flow.rate", Kind::AirFlow, case.input("flow_actual_m3_s")),
            ("fan.total_pressure", Kind::PressureDifference, case.input("fan_total_pressure_Pa")),
            ("fan.efficiency", Kind::Share, case.input("fan_total_efficiency")),
            ("fan.drive_efficiency", Kind::Share, case.input("drive_efficiency")),
            ("fan.motor_efficiency", Kind::Share, case.input("motor_efficiency")),
        ],
    )
}

#[test]
fn a_draw_through_fan() {
    let case = Case::of(CASES, "9b");
    case.hold(
        &solve("fan_heat", &fan("in_stream")),
        &[
            ("dry_air", "m_da_kg_s", 1.0, 0.0, 2e-6, 0.0),
            ("air_power", "air_power_W", 1.0, 0.0, 2e-6, 0.0),
            ("shaft_power", "shaft_power_W", 1.0, 0.0, 2e-6, 0.0),
            ("motor_input", "motor_input_W", 1.0, 0.0, 2e-6, 0.0),
            ("heat", "motor_input_W", 1.0, 0.0, 2e-6, 0.0),
            ("rise", "rise_motor_in_K", 1.0, 0.0, 1e-4, 0.0),
            ("rise_ideal", "rise_ideal_K", 1.0, 0.0, 1e-4, 0.0),
        ],
    );
    for (motor, output) in
        [("belt_inside", "rise_motor_out_belt_in_K"), ("outside", "rise_shaft_only_K")]
    {
        case.hold(&solve("fan_heat", &fan(motor)), &[("rise", output, 1.0, 0.0, 1e-4, 0.0)]);
    }
}

/// 0.371 °F for an inch of water at an efficiency of 1 and 0.075 lb/ft³ (2545/(6356 x 1.08), derived; common practice).
#[test]
fn the_trades_rise_for_an_inch_of_water() {
    let mut given = fan("outside");
    for (key, kind, si) in [
        ("pressure.elevation", Kind::Elevation, 0.0),
        ("entering.dry_bulb", Kind::Temperature, 294.15),
        ("entering.humidity_ratio", Kind::HumidityRatio, 0.0),
        ("fan.total_pressure", Kind::PressureDifference, 249.088_91),
        ("fan.efficiency", Kind::Share, 1.0),
    ] {
        given.put(key, Reading::new(Amount::new(kind, si)));
    }
    let rise = si(&solve("fan_heat", &given), "rise") * 1.8;
    assert!((rise - 0.371).abs() < 0.002, "{rise}");
}

/// Without a flow the rise is the same; with the electrical power that the chain takes, too.
#[test]
fn every_way_to_know_it_comes_to_one_rise() {
    let with_flow = solve("fan_heat", &fan("in_stream"));
    let mut bare =
        given(&[("entering.humidity_by", "humidity_ratio"), ("fan.motor", "in_stream")], &[]);
    for (key, reading) in fan("in_stream").readings().filter(|(key, _)| !key.starts_with("flow")) {
        bare.put(key, *reading);
    }
    let without = solve("fan_heat", &bare);
    assert!((si(&with_flow, "rise") - si(&without, "rise")).abs() < 1e-9);
    for motor in ["in_stream", "belt_inside", "outside"] {
        let by_pressure = solve("fan_heat", &fan(motor));
        let mut by_power = fan(motor);
        by_power.choose("fan.by", "power");
        let taken = Amount::new(Kind::Power, si(&by_pressure, "motor_input"));
        by_power.put("fan.power", Reading::new(taken));
        let by_power = solve("fan_heat", &by_power);
        assert!((si(&by_pressure, "rise") - si(&by_power, "rise")).abs() < 1e-9, "{motor}");
    }
}

#[test]
fn what_cannot_be_is_refused() {
    let with = |key: &str, kind: Kind, si: f64| {
        let mut given = fan("in_stream");
        given.put(key, Reading::new(Amount::new(kind, si)));
        refused("fan_heat", &given)
    };
    let (field, _, says) = with("fan.efficiency", Kind::Share, 1.2);
    assert_eq!(field, "fan.efficiency");
    assert_eq!(
        says,
        "An efficiency of 120.0 % is outside 10 to 100 %. Check the number and its unit."
    );
    let (_, _, says) = with("fan.total_pressure", Kind::PressureDifference, 9000.0);
    assert_eq!(
        says,
        "A total pressure of 9000.0 Pa is outside 10 to 5 000 Pa. Check the number and its unit."
    );
    let mut given = fan("in_stream");
    given.choose("fan.by", "power");
    given.put("fan.power", Reading::new(Amount::new(Kind::Power, 5.0)));
    let (_, _, says) = refused("fan_heat", &given);
    assert_eq!(
        says,
        "A fan that takes 0.0050 kW is outside 10 W to 1 MW. Check the number and its unit."
    );
}

#[test]
fn where_the_motor_stands_is_asked() {
    let mut asked = Given::default();
    for (key, reading) in fan("in_stream").readings() {
        asked.put(key, *reading);
    }
    asked.choose("entering.humidity_by", "humidity_ratio");
    asked.choose("flow.basis", "actual_entering");
    assert_eq!(waits("fan_heat", &asked), ["fan.motor"]);
}
