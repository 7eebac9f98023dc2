//! Air flow by traverse: worked cases, profiles integrated by elementary means, where to hold the probe, every sentence.

mod support;

use dewledger_checks::doubt::work_out;
use dewledger_checks::drawn::Cell;
use dewledger_checks::traverse::positions;
use dewledger_checks::{Given, Outcome, Reading};
use dewledger_quantities::{Amount, Kind};
use serde_json::Value;
use support::{Case, check, given, note, refused, say, si, solve, typed, waits};

const CASES: &str = include_str!("data/traverse.json");
const ID: &str = "traverse";

fn put(given: &mut Given, key: &str, kind: Kind, si: f64) {
    given.put(key, Reading::new(Amount::new(kind, si)));
}

/// Numbers of a worked case's input, row by row.
fn numbers(id: &str, name: &str) -> Vec<f64> {
    let all: Value = serde_json::from_str(CASES).expect("the file is JSON");
    let case = all["cases"].as_array().expect("cases").iter().find(|case| case["id"] == id);
    let rows = case.expect("the case")["inputs"][name].as_array().expect("an array").clone();
    rows.iter()
        .flat_map(|row| row.as_array().cloned().unwrap_or_else(|| vec![row.clone()]))
        .map(|number| number.as_f64().expect("a number"))
        .collect()
}

fn points(given: &mut Given, kind: Kind, a_line: usize, values: &[f64]) {
    for (at, value) in values.iter().enumerate() {
        put(given, &format!("line{}.point{}", at / a_line + 1, at % a_line + 1), kind, *value);
    }
}

fn rectangular() -> Given {
    let case = Case::of(CASES, "B1");
    let mut given = given(
        &[
            ("pressure.by", "elevation"),
            ("duct.shape", "rectangular"),
            ("duct.size_is", "clear"),
            ("duct_air.humidity_by", "humidity_ratio"),
            ("grid.read_as", "velocity_pressure"),
        ],
        &[
            ("pressure.elevation", Kind::Elevation, case.input("elevation_m")),
            ("duct.width", Kind::Length, case.input("width_m")),
            ("duct.height", Kind::Length, case.input("height_m")),
            ("duct_air.dry_bulb", Kind::Temperature, case.kelvin("t_C")),
            ("duct_air.humidity_ratio", Kind::HumidityRatio, case.input("W")),
            ("duct_air.duct_pressure", Kind::PressureDifference, case.input("static_Pa")),
        ],
    );
    points(&mut given, Kind::PressureDifference, 5, &numbers("B1", "dp_Pa"));
    given
}

#[test]
fn a_rectangular_duct_at_altitude() {
    let outcome = solve(ID, &rectangular());
    Case::of(CASES, "B1").hold(
        &outcome,
        &[
            ("density", "density_kg_m3", 1.0, 0.0, 1e-6, 0.0),
            ("velocity", "velocity_mean_m_s", 1.0, 0.0, 1e-6, 0.0),
            ("flow", "flow_actual_m3_s", 1.0, 0.0, 1e-6, 0.0),
            ("dry_air", "mass_flow_dry_kg_s", 1.0, 0.0, 1e-6, 0.0),
            ("flow_standard", "flow_std_1p2_m3_s", 1.0, 0.0, 1e-6, 0.0),
        ],
    );
    let versus = &outcome.versus[0];
    assert!((versus.error - 0.0033).abs() < 5e-5, "{}", versus.error);
    assert!((versus.book.si() - 11.703_872).abs() < 2e-5);
}

#[test]
fn a_round_duct_in_inches() {
    let case = Case::of(CASES, "B2");
    let mut given = given(
        &[
            ("pressure.by", "read"),
            ("duct.shape", "round"),
            ("duct.size_is", "clear"),
            ("duct_air.humidity_by", "relative_humidity"),
            ("grid.read_as", "velocity_pressure"),
        ],
        &[
            ("pressure.read", Kind::Pressure, case.input("station_pressure_Pa")),
            ("duct_air.relative_humidity", Kind::RelativeHumidity, case.input("rh")),
        ],
    );
    typed(&mut given, "duct.diameter", Kind::Length, "in", 24.0);
    typed(&mut given, "duct_air.dry_bulb", Kind::Temperature, "degF", 75.0);
    typed(&mut given, "duct_air.duct_pressure", Kind::PressureDifference, "inH2O", -1.2);
    for (at, dp) in numbers("B2", "dp_inwg").iter().enumerate() {
        let key = format!("line{}.point{}", at / 10 + 1, at % 10 + 1);
        typed(&mut given, &key, Kind::PressureDifference, "inH2O", *dp);
    }
    let outcome = solve(ID, &given);
    // The case takes the humidity ratio at the room’s pressure; the relative humidity was read in the duct: 4e-5 at most.
    case.hold(
        &outcome,
        &[
            ("velocity", "velocity_mean_m_s", 1.0, 0.0, 5e-5, 0.0),
            ("flow", "flow_actual_m3_s", 1.0, 0.0, 5e-5, 0.0),
            ("dry_air", "mass_flow_dry_kg_s", 1.0, 0.0, 5e-5, 0.0),
            // Typed in inches of water: standard air is that of 0.075 lb/ft³.
            ("flow_standard", "flow_std_0p075lb_m3_s", 1.0, 0.0, 5e-5, 0.0),
        ],
    );
    assert_eq!(outcome.tables[0].title, "Points on each of three diameters, 60° apart");
    assert_eq!(outcome.tables[0].rows.len(), 10);
}

/// A velocity field in a square duct of 0.6 m, sampled where the rule says.
fn field(read_as: &[(&str, &str)], velocity: impl Fn(f64, f64) -> f64) -> Given {
    let mut given = given(
        &[
            ("pressure.by", "read"),
            ("duct.shape", "rectangular"),
            ("duct.size_is", "clear"),
            ("duct_air.humidity_by", "relative_humidity"),
            ("grid.read_as", "velocity"),
            ("grid.meter", "actual"),
        ],
        &[
            ("pressure.read", Kind::Pressure, 83_523.526_950_872),
            ("duct.width", Kind::Length, 0.6),
            ("duct.height", Kind::Length, 0.6),
            ("duct_air.dry_bulb", Kind::Temperature, 305.15),
            ("duct_air.relative_humidity", Kind::RelativeHumidity, 0.3),
        ],
    );
    for (key, value) in read_as {
        given.choose(*key, *value);
    }
    let along = positions(false, false, 5).expect("five is one of the rule's");
    let values: Vec<f64> =
        along.iter().flat_map(|x| along.iter().map(|y| velocity(*x, *y))).collect();
    points(&mut given, Kind::Velocity, 5, &values);
    given
}

#[test]
fn instruments_show_different_velocities() {
    let case = Case::of(CASES, "B3");
    let shown = case.input("indicated_m_s");
    for (kind, output) in [
        ("actual", "actual_kind_m_s"),
        ("pressure_kind", "pressure_kind_m_s"),
        ("mass_kind", "mass_kind_m_s"),
    ] {
        let mut given = field(&[("grid.meter", kind)], |_, _| shown);
        put(&mut given, "grid.standard_density", Kind::Density, case.input("rho_std"));
        case.hold(&solve(ID, &given), &[("velocity", output, 1.0, 0.0, 1e-6, 0.0)]);
    }
}

/// Depth below the nearer wall to the power of a seventh, in both directions; its mean over the section by the midpoint rule.
#[test]
fn the_rule_integrates_a_profile() {
    let seventh = |x: f64| (2.0 * x.min(1.0 - x)).powf(1.0 / 7.0);
    let steps = 20_000_u32;
    let mean: f64 =
        (0..steps).map(|n| seventh((f64::from(n) + 0.5) / f64::from(steps))).sum::<f64>()
            / f64::from(steps);
    let outcome = solve(ID, &field(&[], |x, y| 8.0 * seventh(x) * seventh(y)));
    let off = si(&outcome, "velocity") / (8.0 * mean * mean) - 1.0;
    assert!(off.abs() < 3e-3, "{off}");
    assert!((si(&outcome, "flow") / (0.36 * si(&outcome, "velocity")) - 1.0).abs() < 1e-12);
    // Along a diameter of a round duct, over equal areas: dA = 2 r dr.
    for linear in [false, true] {
        for count in [6, 8, 10] {
            let points = positions(true, linear, count).expect("one of the rule's");
            #[expect(clippy::cast_precision_loss, reason = "ten points")]
            let sampled = points.iter().map(|y| seventh(*y)).sum::<f64>() / count as f64;
            let exact: f64 = (0..steps)
                .map(|n| {
                    let r = (f64::from(n) + 0.5) / f64::from(steps);
                    2.0 * r * (1.0 - r).powf(1.0 / 7.0) / f64::from(steps)
                })
                .sum();
            assert!((sampled / exact - 1.0).abs() < 4e-3, "{linear} {count}: {sampled} {exact}");
        }
    }
}

fn lengths(outcome: &Outcome, table: usize) -> Vec<f64> {
    let rows = &outcome.tables[table].rows;
    rows.iter()
        .map(|row| match &row[1] {
            Cell::Amount(length) => length.si(),
            Cell::Words(words) => panic!("{words:?}"),
        })
        .collect()
}

/// ISO 3966 positions (from memory), before anything is read but the size.
#[test]
fn where_to_hold_the_probe_is_known_from_the_size() {
    let size = |shape: &str, sides: &[(&str, f64)]| {
        let mut given = given(&[("duct.shape", shape), ("duct.size_is", "clear")], &[]);
        for (key, side) in sides {
            put(&mut given, key, Kind::Length, *side);
        }
        given
    };
    let outcome = solve(ID, &size("rectangular", &[("duct.width", 1.0), ("duct.height", 0.8)]));
    assert_eq!(lengths(&outcome, 0), [0.053, 0.203, 0.366, 0.5, 0.634, 0.797, 0.947]);
    let down = lengths(&outcome, 1);
    assert_eq!(down.len(), 6);
    assert!((down[0] - 0.0488).abs() < 1e-12);
    assert!(outcome.amount("flow").is_none() && !outcome.waits.is_empty());
    let small = solve(ID, &size("round", &[("duct.diameter", 0.2)]));
    assert_eq!(small.tables[0].title, "Points on each of two diameters at right angles");
    let across = lengths(&small, 0);
    assert_eq!(across.len(), 6);
    assert!((across[0] - 0.2 * 0.0321).abs() < 1e-12);
    assert!((across[5] - 0.2 * 0.9679).abs() < 1e-12);
    let linear = size("round", &[("duct.diameter", 0.2)]).choosing("duct.rule", "log_linear");
    assert!((lengths(&solve(ID, &linear), 0)[1] - 0.2 * 0.1349).abs() < 1e-12);
    // 25 mm of lining on each side.
    let mut lined = size("rectangular", &[("duct.width", 1.0), ("duct.height", 0.8)])
        .choosing("duct.size_is", "over_lining");
    put(&mut lined, "duct.lining", Kind::Length, 0.025);
    assert!((si(&solve(ID, &lined), "area") - 0.95 * 0.75).abs() < 1e-12);
}

#[test]
fn what_is_missing_is_named() {
    let bare = waits(ID, &Given::default());
    assert!(bare.contains(&"duct.shape".to_owned()) && bare.contains(&"grid.read_as".to_owned()));
    let mut some = given(
        &[("grid.read_as", "velocity"), ("duct.shape", "round")],
        &[("duct.diameter", Kind::Length, 0.2)],
    );
    assert!(waits(ID, &some).contains(&"duct.size_is".to_owned()));
    some.choose("duct.size_is", "clear");
    let outcome = solve(ID, &some);
    let named = |key: &str| outcome.waits.iter().find(|one| one.key == key).expect("it waits");
    assert_eq!(
        say(named("grid.meter").asks.as_ref().expect("asked")),
        "Does it show the actual velocity here, or that of standard air?"
    );
    assert_eq!(named("line1.point1").name, "point 1 and 11 more");
}

#[test]
fn what_cannot_be_is_refused() {
    let with = |key: &str, kind: Kind, si: f64| {
        let mut given = rectangular();
        put(&mut given, key, kind, si);
        refused(ID, &given)
    };
    let (key, code, says) = with("line2.point2", Kind::PressureDifference, -4.0);
    assert_eq!((key.as_str(), code), ("line2.point2", "negative"));
    assert_eq!(
        says,
        "Point 7 is negative: swap the hoses, or enter 0 if the air stands or turns back there."
    );
    let mut velocities = field(&[], |_, _| 5.0);
    put(&mut velocities, "line1.point3", Kind::Velocity, -1.0);
    assert_eq!(
        refused(ID, &velocities).2,
        "Point 3 is negative: turn the probe into the flow, or enter 0 if the air stands or turns back there."
    );
    let (_, _, says) = with("line1.point1", Kind::PressureDifference, 6000.0);
    assert!(
        says.ends_with("above 5 kPa: no duct is that fast. Check the number and its unit."),
        "{says}"
    );
    let (_, _, says) = with("duct.width", Kind::Length, 12.0);
    assert!(
        says.ends_with("clear is outside 0.05 to 10 m. Check the number, its unit and the lining."),
        "{says}"
    );
    let (_, _, says) = with("duct_air.duct_pressure", Kind::PressureDifference, 6000.0);
    assert!(
        says.ends_with("is outside ±5 kPa. Check its unit; it is read against the room."),
        "{says}"
    );
    let (_, _, says) = with("grid.coefficient", Kind::Ratio, 2.0);
    assert!(
        says.ends_with("is outside 0.3 to 1.5. A Pitot-static tube of a standard form is 1."),
        "{says}"
    );
    let mut told = field(&[("grid.meter", "mass_kind")], |_, _| 5.0);
    put(&mut told, "grid.standard_density", Kind::Density, 0.5);
    assert!(refused(ID, &told).2.ends_with("is no standard: they lie between 0.9 and 1.35 kg/m³."));
    assert_eq!(
        refused(ID, &field(&[], |_, _| 0.0)).2,
        "All points are still: no air passes here. Is the fan running, is a damper closed?"
    );
    let few = field(&[("grid.lines", "1"), ("grid.points", "5")], |_, _| 5.0);
    assert_eq!(
        refused(ID, &few).2,
        "5 points tell no flow: a traverse has 9 or more. Add lines or points."
    );
    let mut hoods = rectangular();
    put(&mut hoods, "hoods.sum", Kind::AirFlow, 0.0);
    assert!(
        refused(ID, &hoods)
            .2
            .ends_with("have nothing to compare. Read them again, or leave it blank.")
    );
    put(&mut hoods, "hoods.sum", Kind::AirFlow, 6.0);
    put(&mut hoods, "hoods.factor", Kind::Ratio, 1.5);
    assert!(refused(ID, &hoods).2.ends_with("is outside 0.7 to 1.3. Check the number."));
}

#[test]
fn what_looks_wrong_is_said() {
    // A jet along one side: 15 of 25 points nearly still.
    let jet = solve(ID, &field(&[], |x, _| if x < 0.4 { 10.0 } else { 1.0 }));
    assert_eq!(
        say(&note(&jet, "not_fit").lead),
        "This plane is not fit for a traverse: 15 of 25 points are nearly still. Move it, or take ± 10 %."
    );
    let mut slow = rectangular();
    points(&mut slow, Kind::PressureDifference, 5, &[4.0; 8]);
    let slow = solve(ID, &slow);
    assert!(
        say(&note(&slow, "slow").lead).starts_with("8 of 30 points are under 5.40 Pa, about 3 m/s")
    );
    let other = solve(ID, &field(&[("grid.lines", "3")], |_, _| 5.0));
    assert_eq!(
        say(&note(&other, "other_grid").lead),
        "The grid has 3 × 5 points; for this size the rule asks for 5 × 5."
    );
    assert_eq!(
        say(&note(&solve(ID, &rectangular()), "plane_uncounted").lead),
        "The plane’s own part is not in the ±: 2 to 3 % where it is good, 5 to 10 % where it is poor."
    );
    // Reverse points entered as 0 count in the mean and in their number.
    let still = solve(ID, &field(&[], |x, _| if x > 0.9 { 0.0 } else { 5.0 }));
    assert!((si(&still, "velocity") - 4.0).abs() < 1e-12);
}

/// Readings that are known, a plane of ± 3 %: the flow's own ± is those 3 %, and nothing of the profile's spread.
#[test]
fn the_plane_has_a_doubt_of_its_own() {
    let mut given = rectangular();
    put(&mut given, "plane.half_width", Kind::Share, 0.03);
    let keys: Vec<String> = given.readings().map(|(key, _)| key.to_owned()).collect();
    for key in keys {
        given = given.within(&key, 1e-9);
    }
    let worked = work_out(check(ID), &given).expect("it is worked out");
    let relative =
        worked.doubts["flow"].half_width_si.expect("known") / si(&worked.outcome, "flow");
    // The weather moves the density by 0.8 % and the flow by half of that.
    assert!((relative - 0.03_f64.hypot(0.0164 / 2.0)).abs() < 2e-3, "{relative}");
    assert!(worked.outcome.notes.iter().all(|note| note.code != "plane_uncounted"));
}

#[test]
fn outlets_against_the_traverse() {
    let mut given = rectangular();
    put(&mut given, "hoods.sum", Kind::AirFlow, 6.0);
    put(&mut given, "hoods.factor", Kind::Ratio, 0.95);
    let outcome = solve(ID, &given);
    assert!((si(&outcome, "hood_or_leak") - si(&outcome, "flow") / 5.7).abs() < 1e-12);
    let figure = outcome.figure("hood_or_leak").expect("it is there");
    assert_eq!(
        say(figure.condition.as_ref().expect("said")),
        "Traverse over outlets: the two cannot be told apart"
    );
}

/// Twice the velocity pressure everywhere is sqrt 2 of the flow; a coefficient works as the pressure does.
#[test]
fn laws_of_the_square_root() {
    let one = si(&solve(ID, &rectangular()), "flow");
    let mut twice = rectangular();
    let doubled: Vec<f64> = numbers("B1", "dp_Pa").iter().map(|dp| 2.0 * dp).collect();
    points(&mut twice, Kind::PressureDifference, 5, &doubled);
    assert!((si(&solve(ID, &twice), "flow") / one - 2.0_f64.sqrt()).abs() < 1e-12);
    let mut probe = rectangular();
    put(&mut probe, "grid.coefficient", Kind::Ratio, 0.81);
    assert!((si(&solve(ID, &probe), "flow") / one - 0.9).abs() < 1e-12);
}
