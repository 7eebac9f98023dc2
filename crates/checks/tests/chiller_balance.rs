//! Chiller heat balance: the worked case, what the electrical reading covers, every sentence, laws.

mod support;

use dewledger_checks::doubt::work_out;
use dewledger_checks::{Change, Given, Reading};
use dewledger_quantities::{Amount, Kind};
use support::{check, given, note, refused, say, si, solve, waits};

const ID: &str = "chiller_balance";
const T: Kind = Kind::Temperature;

fn put(given: &mut Given, key: &str, kind: Kind, si: f64) {
    given.put(key, Reading::new(Amount::new(kind, si)));
}

fn plant(evaporator: f64, condenser: f64) -> Given {
    given(
        &[
            ("evaporator.fluid", "water"),
            ("condenser.fluid", "water"),
            ("power.covers", "compressor"),
            ("motor.kind", "hermetic"),
        ],
        &[
            ("evaporator.rate", Kind::WaterFlow, evaporator),
            ("evaporator.entering", T, 285.15),
            ("evaporator.leaving", T, 279.65),
            ("condenser.rate", Kind::WaterFlow, condenser),
            ("condenser.entering", T, 302.15),
            ("condenser.leaving", T, 307.15),
            ("power.input", Kind::Power, 63_000.0),
        ],
    )
}

/// Evaporator 351 685.284 W, condenser 418 900 W, 63 000 W in: 4 214.716 W apart. With 5 %, 5 % and 2 %: ± 27 377 W,
/// E 0.153952; 5.582306 and 0.63 kW a ton (worked by hand).
fn worked() -> Given {
    let one = solve(ID, &plant(1e-2, 1e-2));
    let (cooling, rejected) = (si(&one, "cooling"), si(&one, "rejected"));
    let mut given = plant(351_685.284 / cooling * 1e-2, 418_900.0 / rejected * 1e-2);
    for (key, share) in [("evaporator.rate", 0.05), ("condenser.rate", 0.05), ("power.input", 0.02)]
    {
        let value = given.reading(key).expect("it was read").amount.si();
        given = given.within(key, share * value);
    }
    // Temperatures that are known: their own part vanishes.
    for key in
        ["evaporator.entering", "evaporator.leaving", "condenser.entering", "condenser.leaving"]
    {
        given = given.within(key, 1e-7);
    }
    given
}

#[test]
fn the_worked_balance() {
    let worked = work_out(check(ID), &worked()).unwrap();
    let outcome = &worked.outcome;
    assert!((si(outcome, "misfit") - 4_214.716).abs() < 1e-3, "{}", si(outcome, "misfit"));
    let within = worked.doubts["misfit"].half_width_si.unwrap();
    assert!((within - 27_377.0).abs() < 1.0, "{within}");
    assert!((si(outcome, "misfit") / within - 0.153_952).abs() < 1e-5);
    assert!((si(outcome, "performance") - 5.582_306).abs() < 1e-6);
    assert!((si(outcome, "input_per_cooling") * 3.516_852_842 - 0.63).abs() < 1e-8);
    assert!((si(outcome, "closure") - 4_214.716 / 418_900.0).abs() < 1e-8);
    assert_eq!(
        say(&note(outcome, "agrees").lead),
        "Both sides agree within what the readings allow: 4.21 kW apart, ± 27.4 kW (E = 0.15)."
    );
}

#[test]
fn sides_that_do_not_agree_are_said() {
    let mut off = worked();
    let rate = off.reading("condenser.rate").unwrap().amount.si();
    put(&mut off, "condenser.rate", Kind::WaterFlow, 0.85 * rate);
    let off = off.within("condenser.rate", 0.02 * rate);
    let worked = work_out(check(ID), &off).unwrap();
    let lead = say(&note(&worked.outcome, "disagrees").lead);
    assert!(
        lead.starts_with("The two sides do not agree: 58.6 kW apart, more than the ± "),
        "{lead}"
    );
    assert_eq!(
        say(&note(&worked.outcome, "closure").lead),
        "The two sides are 16.5 % apart; about 5 % is usual."
    );
    assert!(si(&worked.outcome, "misfit") < 0.0);
}

#[test]
fn an_open_motor_keeps_its_loss() {
    let mut open = worked();
    open.choose("motor.kind", "open");
    let outcome = solve(ID, &open);
    assert_eq!(outcome.waits[0].key, "motor.efficiency");
    assert!(outcome.amount("misfit").is_none());
    put(&mut open, "motor.efficiency", Kind::Share, 0.92);
    let outcome = solve(ID, &open);
    assert!((si(&outcome, "refrigerant_power") - 57_960.0).abs() < 1e-6);
    assert!((si(&outcome, "misfit") - 4_214.716 - 5_040.0).abs() < 1e-3);
    // What is paid for is still all of it.
    assert!((si(&outcome, "performance") - 5.582_306).abs() < 1e-6);
    put(&mut open, "motor.efficiency", Kind::Share, 1.4);
    assert_eq!(
        refused(ID, &open).2,
        "A motor’s efficiency of 140.0 % is outside 50 to 100 %. Check the number and its unit."
    );
}

#[test]
fn pumps_and_fans_close_no_balance() {
    let pumps = worked().choosing("power.covers", "with_pumps_and_fans");
    let outcome = solve(ID, &pumps);
    assert!(outcome.amount("misfit").is_none());
    assert_eq!(
        say(outcome.waits[0].asks.as_ref().unwrap()),
        "Water pumps and fans do not heat the refrigerant: read the compressor’s own input for the balance."
    );
    let condition = outcome.figure("performance").unwrap().condition.as_ref().unwrap();
    assert_eq!(say(condition), "Input with water pumps and fans");
}

#[test]
fn what_is_missing_is_named() {
    assert_eq!(waits(ID, &Given::default()).len(), 9);
    let bare = given(
        &[("evaporator.fluid", "water"), ("power.covers", "compressor")],
        &[
            ("evaporator.rate", Kind::WaterFlow, 1e-2),
            ("evaporator.entering", T, 285.15),
            ("evaporator.leaving", T, 279.65),
            ("power.input", Kind::Power, 63_000.0),
        ],
    );
    let outcome = solve(ID, &bare);
    let waiting: Vec<&str> = outcome.waits.iter().map(|one| one.key.as_ref()).collect();
    assert_eq!(
        waiting,
        [
            "motor.kind",
            "condenser.rate",
            "condenser.entering",
            "condenser.leaving",
            "condenser.fluid"
        ]
    );
    assert_eq!(
        say(outcome.waits[0].asks.as_ref().unwrap()),
        "Is the motor inside the refrigerant, or open with a shaft?"
    );
    assert!(si(&outcome, "cooling") > 0.0 && outcome.amount("performance").is_some());
}

#[test]
fn swapped_temperatures_are_refused() {
    let swap = |side: &str| {
        let (entering, leaving) = (format!("{side}.entering"), format!("{side}.leaving"));
        worked().changed(&[Change::Swap(entering.into(), leaving.into())])
    };
    let (field, _, says) = refused(ID, &swap("evaporator"));
    assert_eq!(field, "evaporator.leaving");
    assert_eq!(
        says,
        "The evaporator’s water leaves at 12.0 °C, warmer than the 6.5 °C it enters at: this cools nothing. Swap the two, or read again."
    );
    let (field, _, says) = refused(ID, &swap("condenser"));
    assert_eq!(field, "condenser.leaving");
    assert_eq!(
        says,
        "The condenser’s water leaves at 29.0 °C, colder than the 34.0 °C it enters at: it takes up nothing. Swap the two, or read again."
    );
}

/// What goes in and what comes out are the same three figures however they are put together.
#[test]
fn the_balance_adds_up() {
    let outcome = solve(ID, &worked());
    let figure = |key: &str| si(&outcome, key);
    let all = figure("cooling") + figure("refrigerant_power");
    assert!((figure("goes_in") - all).abs() < 1e-9 * all);
    assert!((figure("rejected") - figure("goes_in") - figure("misfit")).abs() < 1e-9 * all);
}
