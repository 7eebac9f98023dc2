//! Laws that hold whatever the readings: signs, scales, sums, and figures or a refusal for every input.

#![expect(clippy::wildcard_enum_match_arm, reason = "kinds without a range of their own share one")]

use dewledger_checks::doubt::work_out;
use dewledger_checks::{Given, Reading, find};
use dewledger_quantities::{Amount, Kind};
use proptest::prelude::*;

fn put(given: &mut Given, key: &str, kind: Kind, si: f64) {
    given.put(key, Reading::new(Amount::new(kind, si)));
}

/// A process between two states by relative humidity.
fn process(p: f64, t: [f64; 2], rh: [f64; 2], flow: f64) -> Given {
    let mut given =
        Given::default().choosing("pressure.by", "read").choosing("flow.basis", "dry_air");
    put(&mut given, "pressure.read", Kind::Pressure, p);
    put(&mut given, "flow.dry_air", Kind::DryAirFlow, flow);
    for (index, point) in ["entering", "leaving"].into_iter().enumerate() {
        given.choose(format!("{point}.humidity_by"), "relative_humidity");
        put(&mut given, &format!("{point}.dry_bulb"), Kind::Temperature, t[index] + 273.15);
        put(&mut given, &format!("{point}.relative_humidity"), Kind::RelativeHumidity, rh[index]);
    }
    given
}

fn amounts(given: &Given, keys: &[&str]) -> Option<Vec<f64>> {
    let outcome = find("air_heat")?.solve(given).ok()?;
    keys.iter().map(|key| outcome.amount(key).map(Amount::si)).collect()
}

const HEATS: &[&str] = &["total", "sensible", "latent", "moisture", "delta_t"];

proptest! {
    #![proptest_config(ProptestConfig::with_cases(600))]

    #[test]
    fn swapping_the_ends_changes_every_sign_exactly(
        p in 55e3..110e3_f64, t1 in -20.0..45.0_f64, t2 in -20.0..45.0_f64, rh1 in 0.05..1.0_f64, rh2 in 0.05..1.0_f64,
    ) {
        let there = amounts(&process(p, [t1, t2], [rh1, rh2], 2.0), HEATS).unwrap();
        let back = amounts(&process(p, [t2, t1], [rh2, rh1], 2.0), HEATS).unwrap();
        for (there, back) in there.iter().zip(back) {
            prop_assert!(there.to_bits() == (-back).to_bits() || there.abs() + back.abs() == 0.0, "{there} {back}");
        }
    }

    #[test]
    fn heat_scales_with_flow_and_its_parts_add_up(
        p in 55e3..110e3_f64, t1 in -20.0..45.0_f64, t2 in -20.0..45.0_f64, rh1 in 0.05..1.0_f64, rh2 in 0.05..1.0_f64,
        scale in 0.1..50.0_f64,
    ) {
        let one = amounts(&process(p, [t1, t2], [rh1, rh2], 1.0), HEATS).unwrap();
        let more = amounts(&process(p, [t1, t2], [rh1, rh2], scale), HEATS).unwrap();
        for (one, more) in one.iter().zip(&more).take(4) {
            prop_assert!((one * scale - more).abs() <= 1e-12 * more.abs().max(1e-9));
        }
        prop_assert!((more[1] + more[2] - more[0]).abs() <= 1e-9 * (more[1].abs() + more[2].abs()));
    }

    #[test]
    fn mixing_a_stream_with_itself_gives_it_back(
        p in 55e3..110e3_f64, t in -15.0..45.0_f64, rh in 0.05..0.99_f64, flow in 0.1..20.0_f64, n in 2..8_usize,
    ) {
        let mut given = Given::default().choosing("pressure.by", "read").choosing("streams", &n.to_string());
        put(&mut given, "pressure.read", Kind::Pressure, p);
        for number in 1..=n {
            given.choose(format!("stream{number}.humidity_by"), "relative_humidity_over_ice");
            given.choose(format!("stream{number}_flow.basis"), "actual");
            put(&mut given, &format!("stream{number}.dry_bulb"), Kind::Temperature, t + 273.15);
            put(&mut given, &format!("stream{number}.relative_humidity_over_ice"), Kind::RelativeHumidity, rh);
            put(&mut given, &format!("stream{number}_flow.rate"), Kind::AirFlow, flow * f64::from(u8::try_from(number).unwrap()));
        }
        let outcome = find("mixing").unwrap().solve(&given).unwrap();
        prop_assert!((outcome.amount("dry_bulb").unwrap().si() - t - 273.15).abs() < 1e-6);
        prop_assert!(outcome.amount("fog").is_none());
        let shares: f64 = (1..=n).map(|i| outcome.amount(&format!("share_mass_{i}")).unwrap().si()).sum();
        prop_assert!((shares - 1.0).abs() < 1e-12);
    }

    #[test]
    fn causes_of_a_book_error_add_up_to_it(
        p in 60e3..105e3_f64, t1 in 22.0..40.0_f64, drop in 3.0..17.0_f64, rh1 in 0.3..0.9_f64, rh2 in 0.5..1.0_f64,
    ) {
        let mut given = process(p, [t1, t1 - drop], [rh1, rh2], 1.0).choosing("flow.basis", "actual_entering");
        put(&mut given, "flow.rate", Kind::AirFlow, 2.0);
        let outcome = find("book_constants").unwrap().solve(&given).unwrap();
        for versus in &outcome.versus {
            let sum: f64 = versus.parts.iter().map(|(_, part)| part).sum();
            prop_assert!((sum - versus.error).abs() < 1e-12);
        }
    }

    #[test]
    fn every_input_gives_figures_or_says_why_not(
        check in 0..5_usize, values in proptest::collection::vec(-1.5..1.5_f64, 40), picks in proptest::collection::vec(0..7_usize, 40),
        half in 0.0..2.0_f64,
    ) {
        let check = dewledger_checks::ALL[check];
        let mut given = Given::default();
        // The form is asked again after each round of choices, since choices bring further fields.
        for round in 0..3 {
            let mut at = round;
            for section in check.form(&given) {
                for item in section.items {
                    at = (at + 1) % 40;
                    match item {
                        dewledger_checks::form::Item::Choice(choice) => {
                            let option = &choice.options[picks[at] % choice.options.len()];
                            given.choose(choice.key.as_ref(), option.value);
                        }
                        dewledger_checks::form::Item::Reading(item) => {
                            if let Some(pick) = &item.pick {
                                given.choose(pick.key.as_ref(), pick.options[picks[at] % pick.options.len()].value);
                            }
                            let value = values[at];
                            let si = match item.kind {
                                Kind::Temperature => 290.0 + 40.0 * value,
                                Kind::Pressure => 90e3 + 20e3 * value,
                                Kind::Elevation => 1500.0 * value,
                                Kind::Enthalpy => 60e3 * value,
                                Kind::Duration => 900.0 * (1.5 + value),
                                Kind::WaterVolume => 5e-3 * value,
                                Kind::PressureDifference => 500.0 * value,
                                _ => value,
                            };
                            let half_width_si = (half > 1.0).then_some(half * 1e-3 * si.abs());
                            given.put(item.key.as_ref(), Reading { half_width_si, ..Reading::new(Amount::new(item.kind, si)) });
                        }
                    }
                }
            }
        }
        if let Ok(worked) = work_out(check, &given) {
            for figure in &worked.outcome.figures {
                if let Some(amount) = figure.amount {
                    prop_assert!(amount.si().is_finite(), "{} {amount:?}", figure.key);
                }
            }
            for (key, doubt) in &worked.doubts {
                prop_assert!(doubt.u_si.is_finite(), "{key}");
                let sum: f64 = doubt.shares.iter().map(|(_, share)| share).sum();
                prop_assert!(doubt.shares.is_empty() || (sum - 1.0).abs() < 1e-9);
                prop_assert!(doubt.shares.iter().all(|(_, share)| *share >= 0.0));
            }
        }
    }
}
