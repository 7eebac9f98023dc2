//! Outdoor-air share: a worked case by two routes with its combination, mixtures that return their share, refusals.

mod support;

use dewledger_checks::doubt::work_out;
use dewledger_checks::{Given, Reading, Stop};
use dewledger_quantities::{Amount, Kind};
use support::{Case, check, given, note, refused, say, si, solve, waits, withheld};

const CASES: &str = include_str!("data/outdoor_share.json");

fn put(given: &mut Given, key: &str, kind: Kind, si: f64) {
    given.put(key, Reading::new(Amount::new(kind, si)));
}

/// Four ways; without any ±.
fn four_ways() -> Given {
    let case = Case::of(CASES, "4c");
    let mut given =
        given(&[], &[("pressure.elevation", Kind::Elevation, case.input("elevation_m"))]);
    for (point, name) in [("return", "return"), ("outdoor", "outdoor"), ("mixed", "mixed")] {
        given.choose(format!("{point}.humidity_by"), "relative_humidity");
        put(
            &mut given,
            &format!("{point}.dry_bulb"),
            Kind::Temperature,
            case.kelvin(&format!("t_{name}_C")),
        );
        put(
            &mut given,
            &format!("{point}.relative_humidity"),
            Kind::RelativeHumidity,
            case.input(&format!("RH_{name}")),
        );
        put(
            &mut given,
            &format!("co2.{point}"),
            Kind::MoleFraction,
            case.input(&format!("co2_{name}_ppm")) * 1e-6,
        );
    }
    given
}

/// The same with the standard uncertainties of the case.
fn doubted() -> Given {
    let case = Case::of(CASES, "4c");
    let mut given = four_ways();
    for point in ["return", "outdoor", "mixed"] {
        for (key, u) in [
            (format!("{point}.dry_bulb"), case.input("u_t_K")),
            (format!("{point}.relative_humidity"), case.input("u_RH")),
            (format!("co2.{point}"), case.input("u_co2_ppm") * 1e-6),
        ] {
            given = given.within(&key, 1.959_964 * u);
        }
    }
    given
}

#[test]
fn four_ways_and_their_mean() {
    let case = Case::of(CASES, "4c");
    let worked = work_out(check("outdoor_share"), &doubted()).unwrap();
    case.hold(
        &worked.outcome,
        &[
            ("temperature", "x_temperature", 1.0, 0.0, 2e-5, 0.0),
            ("moisture", "x_W", 1.0, 0.0, 2e-5, 0.0),
            ("enthalpy", "x_h", 1.0, 0.0, 2e-5, 0.0),
            ("carbon_dioxide", "x_co2", 1.0, 0.0, 2e-5, 0.0),
            ("share", "x_combined", 1.0, 0.0, 2e-4, 0.0),
            ("weight_temperature", "weight_T", 1.0, 0.0, 2e-3, 0.0),
            ("weight_moisture", "weight_W", 1.0, 0.0, 0.0, 1e-12),
            ("weight_carbon_dioxide", "weight_co2", 1.0, 0.0, 4e-3, 0.0),
            ("z_temperature", "z_T", 1.0, 0.0, 5e-3, 0.0),
            ("z_moisture", "z_W", 1.0, 0.0, 5e-3, 0.0),
        ],
    );
    // Without any ± nothing is combined; the volume share is of the one by temperature.
    case.hold(
        &solve("outdoor_share", &four_ways()),
        &[("volume_share", "volume_share_outdoor", 1.0, 0.0, 2e-5, 0.0)],
    );
    // Standard uncertainties: the pressure from an elevation adds next to nothing.
    for (figure, output) in [
        ("temperature", "u_temperature"),
        ("moisture", "u_W"),
        ("enthalpy", "u_h"),
        ("carbon_dioxide", "u_co2"),
        ("share", "u_combined"),
    ] {
        let theirs =
            serde_json::from_str::<serde_json::Value>(CASES).unwrap()["cases"][0]["outputs"]
                [output]
                .as_f64()
                .unwrap();
        let ours = worked.doubts[figure].u_si;
        assert!((ours / theirs - 1.0).abs() < 0.02, "{figure}: {ours}, {theirs}");
    }
}

#[test]
fn without_humidity_the_plain_share() {
    let mut plain = given(&[], &[("pressure.elevation", Kind::Elevation, 850.0)]);
    for (key, celsius) in
        [("return.dry_bulb", 23.6), ("outdoor.dry_bulb", 6.0), ("mixed.dry_bulb", 18.9)]
    {
        put(&mut plain, key, Kind::Temperature, celsius + 273.15);
    }
    Case::of(CASES, "4c").hold(
        &solve("outdoor_share", &plain),
        &[("temperature", "x_temperature_plain", 1.0, 0.0, 1e-9, 0.0)],
    );
}

/// A share from a mixture that the mixing check made is the share that it was made with.
#[test]
fn a_mixture_returns_its_share() {
    for x in [0.1, 0.35, 0.8] {
        let mut mixing = given(
            &[("stream1_flow.basis", "dry_air"), ("stream2_flow.basis", "dry_air")],
            &[("pressure.elevation", Kind::Elevation, 1609.0)],
        );
        let streams = [("stream1", 296.15, 289.15, 1.0 - x), ("stream2", 308.15, 294.15, x)];
        let mut share = given(&[], &[("pressure.elevation", Kind::Elevation, 1609.0)]);
        for ((stream, t, wb, m), point) in streams.into_iter().zip(["return", "outdoor"]) {
            put(&mut mixing, &format!("{stream}.dry_bulb"), Kind::Temperature, t);
            put(&mut mixing, &format!("{stream}.wet_bulb"), Kind::Temperature, wb);
            put(&mut mixing, &format!("{stream}_flow.dry_air"), Kind::DryAirFlow, m);
            put(&mut share, &format!("{point}.dry_bulb"), Kind::Temperature, t);
            put(&mut share, &format!("{point}.wet_bulb"), Kind::Temperature, wb);
        }
        let mixed = solve("mixing", &mixing);
        share.choose("mixed.humidity_by", "humidity_ratio");
        put(&mut share, "mixed.dry_bulb", Kind::Temperature, si(&mixed, "dry_bulb"));
        put(&mut share, "mixed.humidity_ratio", Kind::HumidityRatio, si(&mixed, "humidity_ratio"));
        let outcome = solve("outdoor_share", &share);
        for key in ["temperature", "moisture", "enthalpy"] {
            assert!((si(&outcome, key) - x).abs() < 1e-6, "{key}: {}", si(&outcome, key));
        }
    }
}

#[test]
fn a_mild_day_needs_more_between_the_streams() {
    let mut mild = given(&[], &[("pressure.elevation", Kind::Elevation, 0.0)]);
    for (key, celsius) in
        [("return.dry_bulb", 23.5), ("outdoor.dry_bulb", 21.0), ("mixed.dry_bulb", 23.0)]
    {
        put(&mut mild, key, Kind::Temperature, celsius + 273.15);
    }
    let (_, code, says) = refused("outdoor_share", &mild);
    assert_eq!(code, "too_alike");
    assert_eq!(
        says,
        "Return and outdoor are too alike today: no share can be read. Come back with 6 K between them, or use a tracer or a traverse."
    );
    // With instruments that can tell it, but not well: how much they would need.
    let mut known = mild.clone();
    for key in ["return.dry_bulb", "outdoor.dry_bulb"] {
        known = known.within(key, 0.25);
    }
    known = known.within("mixed.dry_bulb", 1.2);
    let first = check("outdoor_share").solve(&known);
    assert!(matches!(first, Err(Stop::Refused(_))), "the floor without known doubt stands first");
    put(&mut known, "outdoor.dry_bulb", Kind::Temperature, 273.15 + 17.0);
    let known = known.within("outdoor.dry_bulb", 0.25);
    let worked = work_out(check("outdoor_share"), &known).unwrap();
    let lead = say(&note(&worked.outcome, "temperature_wide").lead);
    assert!(lead.starts_with("By temperature these instruments need "), "{lead}");
}

#[test]
fn one_way_is_withheld_where_its_streams_are_alike() {
    let mut damp = four_ways();
    put(&mut damp, "outdoor.relative_humidity", Kind::RelativeHumidity, 0.999);
    put(&mut damp, "outdoor.dry_bulb", Kind::Temperature, 273.15 + 10.0);
    let outcome = solve("outdoor_share", &damp);
    let why = withheld(&outcome, "moisture");
    assert!(
        why.starts_with("Outdoor and return are")
            && why.contains("these instruments need 1.50 g/kg"),
        "{why}"
    );
}

#[test]
fn what_cannot_be_is_refused_or_said() {
    let mut percent = four_ways();
    put(&mut percent, "co2.mixed", Kind::MoleFraction, 0.04);
    let (_, _, says) = refused("outdoor_share", &percent);
    assert!(says.ends_with("Is it in per cent? 0.04 % is 400 ppm."), "{says}");
    let mut outside = four_ways();
    put(&mut outside, "mixed.dry_bulb", Kind::Temperature, 273.15 + 27.0);
    let outcome = solve("outdoor_share", &outside);
    let lead = say(&note(&outcome, "temperature_outside").lead);
    assert!(lead.ends_with("cannot come from mixing these two streams."), "{lead}");
}

#[test]
fn a_supply_flow_gives_the_outdoor_flow() {
    let mut flow = four_ways();
    flow.choose("supply_flow.basis", "dry_air");
    put(&mut flow, "supply_flow.dry_air", Kind::DryAirFlow, 4.0);
    let outcome = solve("outdoor_share", &flow);
    assert!((si(&outcome, "outdoor_dry_air") - 4.0 * si(&outcome, "temperature")).abs() < 1e-12);
}

#[test]
fn it_waits_for_what_it_needs() {
    let bare = given(&[], &[("pressure.elevation", Kind::Elevation, 0.0)]);
    assert_eq!(
        waits("outdoor_share", &bare),
        ["return.dry_bulb", "outdoor.dry_bulb", "mixed.dry_bulb"]
    );
}
