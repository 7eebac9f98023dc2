//! Three routes of one coil: worked cases by an independent program, closures by the doubt, refusals.

mod support;

use dewledger_checks::doubt::{Worked, work_out};
use dewledger_checks::statement::{Band, Coverage, Statement};
use dewledger_checks::{Given, Reading};
use dewledger_quantities::{Amount, Kind, Quantity, Unit};
use support::{Case, check, given, note, refused, say, si, solve, waits, withheld};

const CASES: &str = include_str!("data/coil_balance.json");

fn put(given: &mut Given, key: &str, kind: Kind, si: f64) {
    given.put(key, Reading::new(Amount::new(kind, si)));
}

/// The readings of the worked cases, without any ±.
fn coil() -> Given {
    let t = dewledger_quantities::ThermodynamicTemperature::from_si(285.95);
    let p = dewledger_quantities::Pressure::from_si(101_325.0);
    let density = dewledger_properties::water::density(t, p).expect("liquid at 13 °C").si();
    given(
        &[("pressure.by", "read"), ("flow.basis", "actual_leaving"), ("water.fluid", "water")],
        &[
            ("pressure.read", Kind::Pressure, 101_325.0),
            ("entering.dry_bulb", Kind::Temperature, 299.85),
            ("entering.wet_bulb", Kind::Temperature, 292.55),
            ("leaving.dry_bulb", Kind::Temperature, 285.95),
            ("leaving.wet_bulb", Kind::Temperature, 285.35),
            ("flow.rate", Kind::AirFlow, 2.0),
            ("water.rate", Kind::WaterFlow, 0.002_16),
            ("water.entering", Kind::Temperature, 280.15),
            ("water.leaving", Kind::Temperature, 285.75),
            ("drain.rate", Kind::CondensateFlow, 0.006_05 / density),
            // The worked cases take the leaving dry bulb.
            ("drain.temperature", Kind::Temperature, 285.95),
        ],
    )
}

fn statement(unit: &str, absolute: f64, of_reading: f64, resolution: f64) -> Statement {
    let share = of_reading > 0.0;
    Statement {
        unit: Unit::find(unit).expect("a unit of the table"),
        bands: vec![Band { absolute, of_reading, ..Band::default() }],
        range: None,
        resolution,
        coverage: if share { Coverage::NinetyFive } else { Coverage::Limits },
        calibration_share: if share { 0.0 } else { 0.8 },
    }
}

/// The same read with the instruments of the worked cases.
fn read_with_instruments(mut given: Given) -> Given {
    let air = statement("degC", 0.2, 0.0, 0.1);
    let water = statement("degC", 0.1, 0.0, 0.01);
    let probes = [
        ("entering.dry_bulb", &air, "dry"),
        ("leaving.dry_bulb", &air, "dry"),
        ("entering.wet_bulb", &air, "wet"),
        ("leaving.wet_bulb", &air, "wet"),
        ("water.entering", &water, "water"),
        ("water.leaving", &water, "water"),
        ("flow.rate", &statement("m3/s", 0.0, 0.05, 0.0), "hood"),
        ("water.rate", &statement("L/s", 0.0, 0.03, 0.0), "meter"),
        ("drain.rate", &statement("L/h", 0.0, 0.05, 0.0), "bucket"),
    ];
    for (key, statement, probe) in probes {
        let Some(reading) = given.reading(key).copied() else { continue };
        let parts = statement.parts(reading.amount.kind(), reading.amount.si(), probe, probe);
        given.doubt_by(key, parts.expect("a statement that covers the reading"));
    }
    given.within("pressure.read", 300.0 / 3.0_f64.sqrt() * 1.96)
}

fn worked(given: Given) -> Worked {
    work_out(check("coil_balance"), &read_with_instruments(given)).expect("a balance")
}

fn closure(worked: &Worked, key: &str) -> (f64, f64) {
    (si(&worked.outcome, key), worked.doubts[key].half_width_si.expect("a known ±"))
}

#[test]
fn three_routes_that_agree() {
    let worked = worked(coil());
    let outcome = &worked.outcome;
    Case::of(CASES, "D1").hold(
        outcome,
        &[
            ("air", "air_net_W", 1.0, 0.0, 2e-5, 0.0),
            ("water", "water_W", 1.0, 0.0, 2e-4, 0.0),
            ("drain", "drain_W", 1.0, 0.0, 2e-5, 0.0),
            ("mean", "mean_W", 1.0, 0.0, 2e-4, 0.0),
            ("chi2", "chi2", 1.0, 0.0, 0.02, 0.0),
        ],
    );
    for (figure, u) in [("air", 1418.85), ("water", 845.1), ("drain", 989.18)] {
        assert!((worked.doubts[figure].u_si / u - 1.0).abs() < 2e-3, "{figure}");
    }
    assert!((worked.doubts["mean"].half_width_si.expect("a known ±") / 1250.89 - 1.0).abs() < 0.01);
    let (gap, half_width) = closure(&worked, "gap_air_water");
    assert!((gap + 839.7).abs() < 12.0 && (half_width / 3236.86 - 1.0).abs() < 2e-3);
    let (_, half_width) = closure(&worked, "gap_air_drain");
    assert!((half_width / 1681.54 - 1.0).abs() < 2e-3, "they share the flow and the dry bulbs");
    let lead = say(&note(outcome, "gap_air_water_closes").lead);
    assert!(lead.starts_with("Air and water agree within what the readings allow: 0.8"), "{lead}");
}

#[test]
fn a_water_flow_read_too_high_names_the_water_side() {
    let mut high = coil();
    put(&mut high, "water.rate", Kind::WaterFlow, 0.002_46);
    let worked = worked(high);
    Case::of(CASES, "D2").hold(
        &worked.outcome,
        &[("water", "water_W", 1.0, 0.0, 2e-4, 0.0), ("chi2", "chi2", 1.0, 0.0, 0.01, 0.0)],
    );
    let lead = say(&note(&worked.outcome, "routes_disagree").lead);
    for name in ["water flow", "entering", "leaving"] {
        assert!(lead.contains(&format!("The coil’s water, {name}")), "{lead}");
    }
    assert!(!lead.contains("Air flow") && !lead.contains("drain"), "{lead}");
    assert!(
        say(&note(&worked.outcome, "gap_air_water_open").lead)
            .starts_with("Air and water differ by 7.")
    );
    // Without the water the other two agree.
    let mut without = Given::default();
    for (key, reading) in coil().readings().filter(|(key, _)| !key.starts_with("water")) {
        without.put(key, *reading);
    }
    without.choose("pressure.by", "read");
    without.choose("flow.basis", "actual_leaving");
    let worked = self::worked(without);
    assert!((si(&worked.outcome, "mean") - 49_681.7).abs() < 15.0);
    assert!((si(&worked.outcome, "chi2") - 0.0468).abs() < 0.002);
}

/// Reading an air flow too high moves air and drain together: the flow is named, not the water.
#[test]
fn an_air_flow_read_too_high_is_not_blamed_on_the_water() {
    let mut high = coil();
    put(&mut high, "flow.rate", Kind::AirFlow, 2.6);
    let lead = say(&note(&worked(high).outcome, "routes_disagree").lead);
    assert!(lead.starts_with("The routes disagree.") && lead.contains("Air flow"), "{lead}");
}

#[test]
fn without_every_doubt_nothing_is_weighed() {
    let outcome = solve("coil_balance", &coil());
    assert_eq!(withheld(&outcome, "mean"), "The ± of every reading is needed to weigh the routes");
    assert!(outcome.amount("gap_air_water").is_some());
}

#[test]
fn what_cannot_be_is_refused() {
    let mut uphill = coil();
    put(&mut uphill, "drain.rate", Kind::CondensateFlow, -1e-6);
    let (field, _, says) = refused("coil_balance", &uphill);
    assert_eq!(field, "drain.rate");
    assert!(says.ends_with("runs uphill. Check the number."), "{says}");
    let mut damp = coil();
    put(&mut damp, "entering.wet_bulb", Kind::Temperature, 288.15);
    let (_, _, says) = refused("coil_balance", &damp);
    assert!(says.starts_with("Water came, and yet the air leaves with more of it"), "{says}");
    let mut swapped = coil();
    put(&mut swapped, "water.entering", Kind::Temperature, 285.75);
    put(&mut swapped, "water.leaving", Kind::Temperature, 280.15);
    let lead = say(&note(&solve("coil_balance", &swapped), "water_cools").lead);
    assert!(lead.ends_with("its two temperatures look swapped."), "{lead}");
}

#[test]
fn one_route_alone_waits_for_another() {
    let mut alone = Given::default();
    for (key, reading) in
        coil().readings().filter(|(key, _)| !key.starts_with("water") && !key.starts_with("drain"))
    {
        alone.put(key, *reading);
    }
    alone.choose("pressure.by", "read");
    alone.choose("flow.basis", "actual_leaving");
    assert_eq!(waits("coil_balance", &alone), ["water.rate", "drain.rate"]);
}
