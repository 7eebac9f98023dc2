//! What must hold for any text and any number: typed digits survive unit switches, shown numbers read back, nothing
//! typed makes the reader panic or answer with something that is no number.

use dewledger_quantities::{
    Amount, Entry, Kind, ReadError, Unit, plain, read, read_plus_minus, show, show_with,
};
use proptest::prelude::*;

/// A kind with one of its units.
fn measured() -> impl Strategy<Value = (Kind, &'static Unit)> {
    let pairs: Vec<(Kind, &'static Unit)> =
        Kind::ALL.iter().flat_map(|kind| Unit::of(*kind).map(move |unit| (*kind, unit))).collect();
    proptest::sample::select(pairs)
}

/// Text of the kind that people type, with some that they should not.
fn text() -> impl Strategy<Value = String> {
    proptest::string::string_regex(
        "[-−+]? ?[0-9]{0,4}[ '’]?[0-9]{0,3}[.,]?[0-9]{0,4} ?(°F|F|C|cfm|kPa|%|e-3|x|-)?",
    )
    .expect("the pattern is regular")
}

/// The value of a number as shown: without the spaces, with an ASCII minus.
fn number(shown: &str) -> f64 {
    shown.replace('\u{a0}', "").replace('−', "-").parse().expect("a shown number is a number")
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 2000, ..ProptestConfig::default() })]

    /// The text and its unit are kept as typed, so nothing can change them. More is true: even a value that was
    /// converted from unit to unit, each time from the one before, still has every digit that was typed.
    #[test]
    fn typed_digits_come_back_after_any_unit_switches(
        (kind, unit) in measured(),
        digits in 0_u32..10_000_000,
        decimals in 0_usize..5,
        negative in any::<bool>(),
        switches in proptest::collection::vec(any::<proptest::sample::Index>(), 0..12),
    ) {
        let value = f64::from(digits) / 10_f64.powi(i32::try_from(decimals).unwrap());
        let sign = if negative && digits > 0 { "-" } else { "" };
        let typed = format!("{sign}{value:.decimals$}");
        let Ok(Entry::Read(read)) = read(kind, &typed, unit) else { return Ok(()) };
        let units: Vec<&'static Unit> = Unit::of(kind).collect();
        let mut si = read.amount.si();
        for switch in &switches {
            let through = units[switch.index(units.len())];
            si = through.to_si(kind, through.from_si(kind, si).unwrap()).unwrap();
        }
        let back = unit.from_si(kind, si).unwrap();
        // A zero may come back with a sign.
        let text = format!("{:.*}", decimals, if back.abs() < 1e-9 { 0.0 } else { back });
        prop_assert_eq!(text, typed);
    }

    #[test]
    fn a_shown_number_reads_back_to_what_it_shows(
        (kind, unit) in measured(),
        digits in 1_u32..1_000_000,
        power in -6_i32..4,
        negative in any::<bool>(),
    ) {
        let value = f64::from(digits) * 10_f64.powi(power) * if negative { -1.0 } else { 1.0 };
        let amount = Amount::new(kind, unit.to_si(kind, value).unwrap());
        let shown = show(amount, unit);
        // Three decimals may be refused as doubtful; one more digit takes the doubt away.
        let typed = if shown.number.contains('.') { format!("{}0", shown.number) } else { shown.number.clone() };
        match read(kind, &typed, unit) {
            Ok(Entry::Read(typed)) => {
                prop_assert!((typed.value - number(&shown.number)).abs() <= 1e-9 * typed.value.abs());
                // And it is within half of its last place of the value, but for what the scale's own zero rounds.
                let decimals = shown.number.split_once('.').map_or(0, |(_, decimals)| decimals.len());
                let half = 0.5 * 10_f64.powi(-i32::try_from(decimals).unwrap());
                prop_assert!((typed.value - value).abs() <= half * (1.0 + 1e-6) + 1e-9 * value.abs());
            }
            // Three digits before a point that shows none behind "12.30" + "0".
            Err(ReadError::Ambiguous { one, .. }) => {
                prop_assert!((number(&one.replace(' ', "")) - number(&shown.number)).abs() < 1e-9);
            }
            other => prop_assert!(false, "{typed}: {other:?}"),
        }
    }

    #[test]
    fn units_convert_there_and_back((kind, unit) in measured(), value in -1e6_f64..1e6) {
        let si = unit.to_si(kind, value).unwrap();
        let back = unit.from_si(kind, si).unwrap();
        // An offset takes digits off a value near its zero: allow for it in stored units.
        let offset = unit.to_si(kind, 0.0).unwrap().abs();
        let step = unit.width_from_si(kind, 1.0).unwrap();
        prop_assert!((back - value).abs() <= 4.0 * f64::EPSILON * (value.abs() + offset * step));
    }

    /// The same reading typed in two units is the same quantity, to 1e-12.
    #[test]
    fn two_units_of_one_reading_have_one_si_value((kind, unit) in measured(), value in -1e4_f64..1e4) {
        let si = unit.to_si(kind, value).unwrap();
        for other in Unit::of(kind) {
            let typed = plain(Amount::new(kind, si), other);
            let text = format!("{typed} {}", other.id);
            // A plain number's identifier cannot be typed behind it; three decimals can be doubtful.
            let Ok(Entry::Read(read)) = read(kind, &text, other) else { continue };
            prop_assert_eq!(read.unit.id, other.id);
            let scale = other.to_si(kind, 0.0).unwrap().abs() + si.abs();
            prop_assert!((read.amount.si() - si).abs() <= 1e-12 * scale, "{text}");
        }
    }

    #[test]
    fn nothing_typed_is_read_as_something_that_is_no_number((kind, unit) in measured(), text in ".{0,70}") {
        if let Ok(Entry::Read(typed)) = read(kind, &text, unit) {
            prop_assert!(typed.amount.si().is_finite() && typed.value.is_finite());
            prop_assert!(text.chars().any(|c| c.is_ascii_digit()), "{text}");
        }
        let _ = read_plus_minus(kind, &text, unit);
    }

    #[test]
    fn each_reading_offered_for_a_doubtful_text_has_no_doubt_left((kind, unit) in measured(), text in text()) {
        if let Err(ReadError::Ambiguous { one, other, .. }) = read(kind, &text, unit) {
            for offered in [one, other] {
                let again = read(kind, &offered, unit);
                prop_assert!(matches!(again, Ok(Entry::Read(_))), "{text} offers {offered}: {again:?}");
            }
        }
    }

    #[test]
    fn a_plus_minus_has_two_digits_and_its_value_the_same_place(
        (kind, unit) in measured(),
        value in -1e5_f64..1e5,
        width in 1e-4_f64..1e4,
    ) {
        let amount = Amount::new(kind, unit.to_si(kind, value).unwrap());
        let width_si = width / unit.width_from_si(kind, 1.0).unwrap();
        let (shown, plus_minus) = show_with(amount, width_si, unit);
        let digits = plus_minus.number.replace(['.', '\u{a0}'], "");
        let significant = digits.trim_start_matches('0');
        // 9960 shows as 10 000: its zeros stand for the place.
        let two = significant.chars().skip(2).all(|c| c == '0') && significant.len() >= 2;
        prop_assert!(two, "{}", plus_minus.number);
        let decimals = |text: &str| text.split_once('.').map_or(0, |(_, decimals)| decimals.len());
        prop_assert_eq!(decimals(&shown.number), decimals(&plus_minus.number));
        prop_assert!((number(&plus_minus.number) / width - 1.0).abs() <= 0.05 + 1e-9);
        // The value is off by half of a unit of the last place of the ± at most, itself at most a tenth of the ±.
        prop_assert!((number(&shown.number) - value).abs() <= 0.0501 * number(&plus_minus.number) + 1e-9 * value.abs());
    }
}
