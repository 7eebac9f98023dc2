//! Apparatus dew point and bypass: worked cases by two routes, lines that were built, refusals.

mod support;

use dewledger_checks::coil::{Meeting, bypass, meeting};
use dewledger_checks::doubt::work_out;
use dewledger_checks::{Given, Reading};
use dewledger_properties::{Humidity, MoistAir, saturation_humidity_ratio};
use dewledger_quantities::{
    Amount, HumidityRatio, Kind, Pressure, Quantity, ThermodynamicTemperature,
};
use support::{Case, check, given, note, refused, say, si, solve, waits, withheld};

const CASES: &str = include_str!("data/coil.json");

fn put(given: &mut Given, key: &str, kind: Kind, si: f64) {
    given.put(key, Reading::new(Amount::new(kind, si)));
}

fn by_wet_bulb(id: &str) -> Given {
    let case = Case::of(CASES, id);
    given(
        &[],
        &[
            ("pressure.elevation", Kind::Elevation, case.input("elevation_m")),
            ("entering.dry_bulb", Kind::Temperature, case.kelvin("t1_C")),
            ("entering.wet_bulb", Kind::Temperature, case.kelvin("twb1_C")),
            ("leaving.dry_bulb", Kind::Temperature, case.kelvin("t2_C")),
            ("leaving.wet_bulb", Kind::Temperature, case.kelvin("twb2_C")),
        ],
    )
}

fn by_humidity(id: &str) -> Given {
    let case = Case::of(CASES, id);
    given(
        &[
            ("entering.humidity_by", "relative_humidity"),
            ("leaving.humidity_by", "relative_humidity"),
        ],
        &[
            ("pressure.elevation", Kind::Elevation, case.input("elevation_m")),
            ("entering.dry_bulb", Kind::Temperature, case.kelvin("t1_C")),
            ("entering.relative_humidity", Kind::RelativeHumidity, case.input("RH1")),
            ("leaving.dry_bulb", Kind::Temperature, case.kelvin("t2_C")),
            ("leaving.relative_humidity", Kind::RelativeHumidity, case.input("RH2")),
        ],
    )
}

#[test]
fn a_coil_at_height_and_what_it_would_do() {
    let case = Case::of(CASES, "5a");
    let mut flow = by_wet_bulb("5a");
    put(&mut flow, "other.flow_ratio", Kind::Ratio, 0.8);
    case.hold(
        &solve("coil", &flow),
        &[
            ("adp", "t_adp_C", 1.0, -273.15, 0.0, 1e-3),
            ("adp_humidity", "W_adp", 1.0, 0.0, 1e-4, 0.0),
            ("bypass", "bypass_factor", 1.0, 0.0, 1e-3, 0.0),
            ("contact", "contact_factor", 1.0, 0.0, 1e-3, 0.0),
            ("steepness", "sat_slope_over_line_slope", 1.0, 0.0, 1e-3, 0.0),
            ("predicted_bypass", "flow80_bypass_a06", 1.0, 0.0, 1e-3, 0.0),
            ("predicted_dry_bulb", "flow80_t2_C", 1.0, -273.15, 0.0, 1e-3),
            ("predicted_humidity_ratio", "flow80_W2", 1.0, 0.0, 1e-3, 0.0),
        ],
    );
    let mut fan = by_wet_bulb("5a");
    put(&mut fan, "coil.fan_rise", Kind::TemperatureDifference, 0.6);
    case.hold(
        &solve("coil", &fan),
        &[
            ("adp", "with_fan_rise_off_t_adp_C", 1.0, -273.15, 0.0, 1e-3),
            ("bypass", "with_fan_rise_off_bypass", 1.0, 0.0, 1e-3, 0.0),
        ],
    );
    let mut still = flow.clone();
    put(&mut still, "other.exponent", Kind::Ratio, 0.0);
    case.hold(
        &solve("coil", &still),
        &[
            ("predicted_bypass", "flow80_bypass_a0", 1.0, 0.0, 2e-3, 0.0),
            ("predicted_dry_bulb", "flow80_t2_a0_C", 1.0, -273.15, 0.0, 1e-3),
        ],
    );
    let mut other = by_wet_bulb("5a");
    put(&mut other, "other.dry_bulb", Kind::Temperature, case.kelvin("new_t1_C"));
    put(&mut other, "other.wet_bulb", Kind::Temperature, case.kelvin("new_twb1_C"));
    case.hold(
        &solve("coil", &other),
        &[
            ("predicted_dry_bulb", "entering_76_60F_t2_C", 1.0, -273.15, 0.0, 1e-3),
            ("predicted_humidity_ratio", "entering_76_60F_W2", 1.0, 0.0, 1e-3, 0.0),
        ],
    );
}

#[test]
fn a_coil_in_milder_air_and_dry() {
    let case = Case::of(CASES, "5b");
    let mut coil = by_wet_bulb("5b");
    put(&mut coil, "other.dry_bulb", Kind::Temperature, case.kelvin("new_t1_C"));
    put(&mut coil, "other.wet_bulb", Kind::Temperature, case.kelvin("new_twb1_C"));
    put(&mut coil, "other.flow_ratio", Kind::Ratio, case.input("flow_ratio"));
    case.hold(
        &solve("coil", &coil),
        &[
            ("adp", "t_adp_C", 1.0, -273.15, 0.0, 1e-3),
            ("bypass", "bypass_factor", 1.0, 0.0, 1e-3, 0.0),
            ("predicted_bypass", "new_bypass", 1.0, 0.0, 1e-3, 0.0),
            ("predicted_dry_bulb", "new_t2_C", 1.0, -273.15, 0.0, 1e-3),
            ("predicted_humidity_ratio", "new_W2", 1.0, 0.0, 1e-3, 0.0),
        ],
    );
    let mut dry = by_wet_bulb("5b");
    dry.choose("other.humidity_by", "dew_point");
    put(&mut dry, "other.dry_bulb", Kind::Temperature, case.kelvin("dry_case_t1_C"));
    put(&mut dry, "other.dew_point", Kind::Temperature, case.kelvin("dry_case_dew_point_C"));
    let outcome = solve("coil", &dry);
    case.hold(&outcome, &[("predicted_humidity_ratio", "dry_case_W2", 1.0, 0.0, 1e-4, 0.0)]);
    assert_eq!(say(&note(&outcome, "would_run_dry").lead), "With that air the coil would run dry.");
}

#[test]
fn a_line_that_passes_saturation_by() {
    let case = Case::of(CASES, "5c");
    let outcome = solve("coil", &by_humidity("5c"));
    let why = withheld(&outcome, "adp");
    assert!(why.starts_with("The line through both states never meets saturation"), "{why}");
    case.hold(
        &outcome,
        &[
            ("left_the_coil", "t_coil_leaving_if_95RH_C", 1.0, -273.15, 0.0, 2e-3),
            ("reheat", "reheat_rise_K", 1.0, 0.0, 0.0, 2e-3),
        ],
    );
    let lead = say(&note(&outcome, "passes_by").lead);
    assert_eq!(lead, "No surface cools this air along this line.");
}

#[test]
fn a_steep_line_is_said_and_moves_far() {
    let case = Case::of(CASES, "5d");
    let outcome = solve("coil", &by_humidity("5d"));
    case.hold(
        &outcome,
        &[
            ("adp", "t_adp_C", 1.0, -273.15, 0.0, 1e-3),
            ("bypass", "bypass_factor", 1.0, 0.0, 1e-3, 0.0),
            ("steepness", "sat_slope_over_line_slope", 1.0, 0.0, 1e-3, 0.0),
        ],
    );
    assert!(
        say(&note(&outcome, "steep_line").lead)
            .starts_with("The line is nearly as steep as saturation")
    );
    let mut changed = by_humidity("5d");
    put(
        &mut changed,
        "leaving.relative_humidity",
        Kind::RelativeHumidity,
        case.input("RH2_changed"),
    );
    case.hold(
        &solve("coil", &changed),
        &[
            ("adp", "t_adp_changed_C", 1.0, -273.15, 0.0, 2e-3),
            ("bypass", "bypass_changed", 1.0, 0.0, 1e-3, 0.0),
        ],
    );
    // First order would say -1.54 K for two points; draws see how it bends.
    let doubted = by_humidity("5d")
        .within("leaving.relative_humidity", 0.02)
        .within("leaving.dry_bulb", 0.2)
        .within("entering.dry_bulb", 0.2)
        .within("entering.relative_humidity", 0.02);
    let worked = work_out(check("coil"), &doubted).unwrap();
    assert!(worked.doubts["adp"].wants_draws);
}

/// A line built from a chosen apparatus dew point and bypass factor returns both, wherever saturation there is steeper
/// than the line.
#[test]
fn built_lines_return_what_they_were_built_from() {
    let mut built = 0;
    for pressure in [101_325.0, 83_000.0, 70_000.0] {
        let p = Pressure::from_si(pressure);
        for adp in [275.0, 279.0, 283.0, 287.0] {
            for (t1, rise) in [(295.0, 3e-4), (300.0, 2.0e-4), (303.0, 0.8e-4), (306.0, 3.5e-4)] {
                for share in [0.03, 0.12, 0.3] {
                    let surface = ThermodynamicTemperature::from_si(adp);
                    let w = saturation_humidity_ratio(surface, p).unwrap().si();
                    let above =
                        saturation_humidity_ratio(ThermodynamicTemperature::from_si(adp + 0.01), p);
                    if (above.unwrap().si() - w) / 0.01 < 1.05 * rise {
                        continue;
                    }
                    let at = |t: f64| {
                        let humidity =
                            Humidity::HumidityRatio(HumidityRatio::from_si(w + rise * (t - adp)));
                        MoistAir::new(ThermodynamicTemperature::from_si(t), humidity, p)
                    };
                    let (Ok(entering), Ok(leaving)) = (at(t1), at(adp + share * (t1 - adp))) else {
                        continue;
                    };
                    let Meeting::At { dry_bulb, .. } = meeting(&entering, &leaving) else {
                        unreachable!("it was built on one")
                    };
                    assert!(
                        (dry_bulb.si() - adp).abs() < 1e-5,
                        "{adp} {t1} {rise} {share}: {}",
                        dry_bulb.si()
                    );
                    assert!((bypass(&entering, &leaving, dry_bulb).si() - share).abs() < 1e-6);
                    built += 1;
                }
            }
        }
    }
    assert!(built > 90, "{built}");
}

#[test]
fn what_cannot_be_is_refused() {
    let mut warm = by_wet_bulb("5b");
    put(&mut warm, "leaving.dry_bulb", Kind::Temperature, 303.15);
    let (field, _, says) = refused("coil", &warm);
    assert_eq!(field, "leaving.dry_bulb");
    assert_eq!(
        says,
        "Leaving 30.0 °C is not cooler than entering 26.7 °C. Swap the two, or this is a heating coil."
    );
    let mut damp = by_humidity("5d");
    put(&mut damp, "entering.relative_humidity", Kind::RelativeHumidity, 0.3);
    let (_, _, says) = refused("coil", &damp);
    assert!(says.contains("none can be gained on a cooling coil. Check the leaving humidity, and look for carry-over."), "{says}");
    let mut fan = by_wet_bulb("5b");
    put(&mut fan, "coil.fan_rise", Kind::TemperatureDifference, 9.0);
    let (_, _, says) = refused("coil", &fan);
    assert!(says.contains("is outside 0 to 5 K"), "{says}");
    let mut ratio = by_wet_bulb("5b");
    put(&mut ratio, "other.flow_ratio", Kind::Ratio, 3.0);
    let (_, _, says) = refused("coil", &ratio);
    assert!(says.contains("is outside"), "{says}");
}

#[test]
fn what_looks_wrong_is_said() {
    let mut coolant = by_wet_bulb("5b");
    put(&mut coolant, "coil.coolant", Kind::Temperature, 273.15 + 12.0);
    let lead = say(&note(&solve("coil", &coolant), "below_the_coolant").lead);
    assert!(lead.ends_with("is below the coolant’s 12.0 °C: that cannot be."), "{lead}");
    let mut far = by_wet_bulb("5b");
    put(&mut far, "other.dry_bulb", Kind::Temperature, 308.15);
    put(&mut far, "other.wet_bulb", Kind::Temperature, 297.15);
    let lead = say(&note(&solve("coil", &far), "far_prediction").lead);
    assert!(lead.starts_with("That is far from today’s air or flow"), "{lead}");
}

/// The readings of a coil whose drying is not resolved by its instruments: nothing is said of a surface.
#[test]
fn drying_that_is_not_resolved_gives_no_surface() {
    let coil = by_wet_bulb("5a")
        .within("entering.wet_bulb", 0.8)
        .within("leaving.wet_bulb", 0.8)
        .within("entering.dry_bulb", 0.4)
        .within("leaving.dry_bulb", 0.4);
    let worked = work_out(check("coil"), &coil).unwrap();
    assert_eq!(
        withheld(&worked.outcome, "adp"),
        "The coil is dry, or its drying is not resolved by these readings"
    );
}

#[test]
fn drift_is_told_by_transfer_units() {
    let mut today = by_wet_bulb("5b");
    put(&mut today, "earlier.bypass", Kind::Share, 0.0974);
    put(&mut today, "earlier.flow_ratio", Kind::Ratio, 1.0);
    let outcome = solve("coil", &today);
    assert!((si(&outcome, "drift") - 1.0).abs() < 1e-3);
    // The same surface at 85 % of the flow: the bypass factor falls, the transfer units at that flow do not.
    let mut slower = today.clone();
    put(&mut slower, "earlier.bypass", Kind::Share, 0.097_394_254_f64.powf(0.85_f64.powf(0.4)));
    put(&mut slower, "earlier.flow_ratio", Kind::Ratio, 0.85);
    assert!((si(&solve("coil", &slower), "drift") - 1.0).abs() < 1e-3);
    let mut bare = by_wet_bulb("5b");
    put(&mut bare, "earlier.bypass", Kind::Share, 0.1);
    let waits: Vec<String> =
        solve("coil", &bare).waits.iter().map(|one| one.key.to_string()).collect();
    assert_eq!(waits, ["earlier.flow_ratio"]);
}

#[test]
fn it_waits_for_what_it_needs() {
    let bare = given(&[], &[("pressure.elevation", Kind::Elevation, 0.0)]);
    assert_eq!(waits("coil", &bare).len(), 4);
}
