//! Room air changes and pressure: the worked room, directions in words, refusals and cautions, laws.

mod support;

use dewledger_checks::doubt::work_out;
use dewledger_checks::part::{Part, Source};
use dewledger_checks::{Given, Outcome, Reading, Stop, Weight};
use dewledger_quantities::{Amount, Kind};
use support::{Case, check, given, note, refused, say, si, solve, typed, waits};

const CASES: &str = include_str!("data/room_air.json");
const TELL: &str = "Tell the person in charge of this area now; change nothing yourself.";

fn room() -> Given {
    let case = Case::of(CASES, "room");
    given(
        &[("exhaust.basis", "actual_room"), ("supply.basis", "actual_room")],
        &[
            ("size.length", Kind::RoomLength, case.input("length_m")),
            ("size.width", Kind::RoomLength, case.input("width_m")),
            ("size.height", Kind::RoomLength, case.input("height_m")),
            ("exhaust.rate", Kind::AirFlow, case.input("exhaust_L_s") / 1000.0),
            ("supply.rate", Kind::AirFlow, case.input("supply_L_s") / 1000.0),
        ],
    )
}

fn put(given: &mut Given, key: &str, kind: Kind, si: f64) {
    given.put(key, Reading::new(Amount::new(kind, si)));
}

/// The room with a pressure, Pa, beside a corridor with its doors closed.
fn pressed(pascals: f64) -> Given {
    let mut given = room();
    put(&mut given, "between.pressure", Kind::PressureDifference, pascals);
    given.choose("between.neighbour", "corridor");
    given.choose("between.doors", "closed");
    given
}

fn condition(outcome: &Outcome, figure: &str) -> String {
    let figure = outcome.figure(figure).unwrap_or_else(|| panic!("no figure {figure}"));
    say(figure.condition.as_ref().expect("it stands on a condition"))
}

fn titles(outcome: &Outcome) -> Vec<&'static str> {
    outcome.cautions.iter().map(|caution| caution.title).collect()
}

#[test]
fn the_worked_room() {
    let outcome = solve("room_air", &room());
    Case::of(CASES, "room").hold(
        &outcome,
        &[
            ("volume", "volume_m3", 1.0, 0.0, 1e-12, 0.0),
            ("exhaust_changes", "exhaust_changes_per_h", 3600.0, 0.0, 1e-7, 0.0),
            ("supply_changes", "supply_changes_per_h", 3600.0, 0.0, 1e-7, 0.0),
            ("offset", "offset_L_s", 1000.0, 0.0, 1e-9, 0.0),
        ],
    );
    assert_eq!(
        condition(&outcome, "offset"),
        "More is taken out than put in: the room draws air in"
    );
    let mut typed_in = room();
    typed_in.choose("size.by", "typed");
    put(&mut typed_in, "size.volume", Kind::RoomVolume, 73.92);
    let again = solve("room_air", &typed_in);
    let apart = si(&again, "exhaust_changes") / si(&outcome, "exhaust_changes") - 1.0;
    assert!(apart.abs() < 1e-12, "{apart}");
}

#[test]
fn one_flow_or_the_pressure_alone_is_enough() {
    let mut only = Given::default();
    for (key, reading) in room().readings().filter(|(key, _)| *key != "supply.rate") {
        only.put(key, *reading);
    }
    only.choose("exhaust.basis", "actual_room");
    let outcome = solve("room_air", &only);
    assert!(outcome.amount("exhaust_changes").is_some() && outcome.amount("offset").is_none());
    let mut alone = Given::default();
    put(&mut alone, "between.pressure", Kind::PressureDifference, -3.0);
    let outcome = solve("room_air", &alone);
    assert!((si(&outcome, "room_pressure") + 3.0).abs() < 1e-12);
    assert!(outcome.waits.is_empty(), "a pressure needs no flow: {:?}", outcome.waits);
    assert!(waits("room_air", &Given::default()).iter().any(|key| key == "between.pressure"));
}

#[test]
fn the_direction_is_said_in_words() {
    let outcome = solve("room_air", &pressed(-2.5));
    assert_eq!(condition(&outcome, "room_pressure"), "Air flows into the room from the corridor");
    let outcome = solve("room_air", &pressed(2.5));
    assert_eq!(condition(&outcome, "room_pressure"), "Air flows out of the room into the corridor");
    let outcome = solve("room_air", &pressed(0.3));
    assert_eq!(
        condition(&outcome, "room_pressure"),
        "Which way air flows between it and the corridor cannot be told"
    );
}

#[test]
fn a_wrong_direction_is_the_loudest_caution() {
    for (pascals, wanted, says) in [
        (2.5, "in", "Air flows out of the room, and it is asked to flow in."),
        (-2.5, "out", "Air flows into the room, and it is asked to flow out."),
    ] {
        let mut wrong = pressed(pascals);
        wrong.choose("between.wanted", wanted);
        let outcome = solve("room_air", &wrong);
        assert_eq!(titles(&outcome)[0], "Air flows the wrong way");
        assert!(outcome.cautions[0].says.starts_with(TELL), "{}", outcome.cautions[0].says);
        let note = note(&outcome, "wrong_way");
        assert_eq!(say(&note.lead), says);
        assert_eq!(say(note.reason.as_ref().unwrap()), TELL);
        assert_eq!(note.weight, Weight::Unusual);
        // As asked, or nothing asked: no such caution.
        let mut right = pressed(-pascals);
        right.choose("between.wanted", wanted);
        assert!(!titles(&solve("room_air", &right)).contains(&"Air flows the wrong way"));
        assert!(
            !titles(&solve("room_air", &pressed(pascals))).contains(&"Air flows the wrong way")
        );
    }
    let mut unshown = pressed(-0.2);
    unshown.choose("between.wanted", "in");
    let outcome = solve("room_air", &unshown);
    assert_eq!(titles(&outcome)[0], "Which way air flows could not be shown");
}

#[test]
fn cautions_always_stand() {
    assert_eq!(
        titles(&solve("room_air", &room())),
        ["Permission first", "Fuel-burning appliances", "Whose judgement"]
    );
}

/// Where the ± is known, it decides what can be told instead of the usual half pascal.
#[test]
fn the_doubt_decides_whether_a_direction_is_told() {
    let near = |half_width: f64| {
        let given = pressed(-0.8).within("between.pressure", half_width);
        work_out(check("room_air"), &given).unwrap().outcome
    };
    assert_eq!(condition(&near(0.5), "room_pressure"), "Air flows into the room from the corridor");
    let outcome = near(1.0);
    assert_eq!(
        condition(&outcome, "room_pressure"),
        "Which way air flows between it and the corridor cannot be told"
    );
    assert_eq!(
        say(&note(&outcome, "direction_within_doubt").lead),
        "Which way air flows cannot be told: the pressure is −0.800 Pa ± 1.00 Pa."
    );
}

#[test]
fn the_zero_is_taken_off_and_its_drift_is_doubt() {
    let mut given = pressed(-1.0).within("between.pressure", 0.1);
    put(&mut given, "between.zero_before", Kind::PressureDifference, 0.2);
    put(&mut given, "between.zero_after", Kind::PressureDifference, 0.8);
    let worked = work_out(check("room_air"), &given).unwrap();
    assert!((si(&worked.outcome, "room_pressure") + 1.5).abs() < 1e-12);
    // A rectangle of ± 0.3 Pa beside a normal ± 0.1 Pa, by hand.
    let u = (0.1_f64 / 1.959_964).hypot(0.3 / 3.0_f64.sqrt());
    let ours = worked.doubts["room_pressure"].u_si;
    assert!((ours / u - 1.0).abs() < 1e-6, "{ours} against {u}");
    assert_eq!(
        say(&note(&worked.outcome, "zero_drifts").lead),
        "The instrument’s zero moved by 0.600 Pa between before and after."
    );
    let unread = solve("room_air", &pressed(-1.0));
    assert_eq!(say(&note(&unread, "zero_not_read").lead), "The instrument’s zero was not read.");
}

/// One hood in both flows: what it reads wrong in proportion cancels in part in the offset, not in the changes.
#[test]
fn one_hood_is_shared_by_both_flows() {
    let with = |shared: bool| {
        let mut given = room();
        for (key, flow) in [("exhaust.rate", 0.210), ("supply.rate", 0.155)] {
            let source = if shared { Source::shared("hood", "hood") } else { Source::Own };
            given.doubt_by(key, vec![Part::certain(source, 0.02 * flow)]);
        }
        for key in ["size.length", "size.width", "size.height"] {
            given = given.within(key, 0.01);
        }
        work_out(check("room_air"), &given).unwrap().doubts["offset"].u_si
    };
    assert!((with(true) - 0.02 * 0.055).abs() < 1e-9);
    assert!((with(false) - 0.02 * 0.210_f64.hypot(0.155)).abs() < 1e-9);
}

#[test]
fn flows_that_speak_against_the_pressure_are_said() {
    let outcome = solve("room_air", &pressed(2.5));
    let note = note(&outcome, "flows_against_pressure");
    assert_eq!(
        say(&note.lead),
        "More is taken out than put in, and yet air flows out of the room."
    );
    let outcome = solve("room_air", &pressed(-2.5));
    assert!(outcome.notes.iter().all(|note| note.code != "flows_against_pressure"));
    let mut swapped = pressed(-2.5);
    put(&mut swapped, "exhaust.rate", Kind::AirFlow, 0.155);
    put(&mut swapped, "supply.rate", Kind::AirFlow, 0.210);
    let outcome = solve("room_air", &swapped);
    assert_eq!(
        say(&support::note(&outcome, "flows_against_pressure").lead),
        "More is put in than taken out, and yet air flows into the room."
    );
    assert_eq!(
        condition(&outcome, "offset"),
        "More is put in than taken out: the room pushes air out"
    );
}

#[test]
fn what_cannot_be_is_refused() {
    let with = |key: &str, kind: Kind, si: f64| {
        let mut given = room();
        put(&mut given, key, kind, si);
        let (field, _, says) = refused("room_air", &given);
        assert_eq!(field, key);
        says
    };
    assert_eq!(
        with("size.height", Kind::RoomLength, 0.1),
        "A side of 0.100 m is outside 0.5 to 500 m (1.6 to 1 640 ft): no room is that. Check the number and its unit."
    );
    assert_eq!(
        with("exhaust.rate", Kind::AirFlow, -0.1),
        "An air flow below zero, −100 L/s, cannot be read as exhaust. Where air comes out of an exhaust or goes into a supply, type it at the other one."
    );
    assert!(
        with("supply.rate", Kind::AirFlow, 1550.0)
            .ends_with("is beyond any room. Check its unit: cfm typed as m³/s looks like this.")
    );
    assert_eq!(
        with("between.zero_before", Kind::PressureDifference, 40.0),
        "A zero of 40.0 Pa is no zero: open both ports to the same air, set it, and read again."
    );
    assert_eq!(
        with("between.pressure", Kind::PressureDifference, -620.0),
        "No room is held −620.0 Pa from the next: its door could not be moved. Check the number and its unit."
    );
    let mut volume = room();
    volume.choose("size.by", "typed");
    put(&mut volume, "size.volume", Kind::RoomVolume, 0.5);
    let (field, _, says) = refused("room_air", &volume);
    assert_eq!(field, "size.volume");
    assert_eq!(
        says,
        "A room of 0.500 m³ is outside 1 to 1 000 000 m³ (35 to 35 million ft³). Check the number and its unit."
    );
}

#[test]
fn pascals_typed_as_inches_of_water_are_offered() {
    let mut given = room();
    typed(&mut given, "between.pressure", Kind::PressureDifference, "inH2O", -2.5);
    let Err(Stop::Refused(refusal)) = check("room_air").solve(&given) else {
        panic!("−2.5 inches of water is not refused")
    };
    assert_eq!(say(&refusal.offers[0].label), "The number is in pascals");
    let mended = given.changed(&refusal.offers[0].changes);
    assert!((si(&solve("room_air", &mended), "room_pressure") + 2.5).abs() < 1e-9);
}

#[test]
fn unusual_rooms_are_computed_and_said() {
    let mut strong = room();
    put(&mut strong, "exhaust.rate", Kind::AirFlow, 4.0);
    let outcome = solve("room_air", &strong);
    assert_eq!(
        say(&note(&outcome, "unusual_exhaust_changes").lead),
        "Its air renewed at 194.81 changes/h is unusual for a room."
    );
    let outcome = solve("room_air", &pressed(-60.0));
    assert_eq!(
        say(&note(&outcome, "door_hard_to_open").lead),
        "−60.0 Pa across a door is unusual."
    );
    let mut open = pressed(-2.0);
    open.choose("between.doors", "open");
    assert_eq!(say(&note(&solve("room_air", &open), "doors_open").lead), "A door was open.");
    let mut unsaid = room();
    put(&mut unsaid, "between.pressure", Kind::PressureDifference, -2.0);
    assert_eq!(
        say(&note(&solve("room_air", &unsaid), "doors_not_said").lead),
        "Whether the doors were closed is not said."
    );
    let mut still = room();
    put(&mut still, "exhaust.rate", Kind::AirFlow, 0.0);
    assert!(si(&solve("room_air", &still), "exhaust_changes").abs() < 1e-15, "a finding, no slip");
}

#[test]
fn a_flow_says_what_it_is() {
    let mut unsaid = Given::default();
    for (key, reading) in room().readings().filter(|(key, _)| *key != "supply.rate") {
        unsaid.put(key, *reading);
    }
    assert!(waits("room_air", &unsaid).iter().any(|key| key == "exhaust.basis"));
    // Standard air asks for the room's state and the pressure, and for nothing that is there.
    unsaid.choose("exhaust.basis", "standard");
    let missing = waits("room_air", &unsaid);
    for key in ["pressure.elevation", "room.dry_bulb", "room.wet_bulb"] {
        assert!(missing.iter().any(|one| one == key), "{missing:?}");
    }
    assert!(!missing.iter().any(|one| one == "exhaust.rate"), "{missing:?}");
}

/// A flow scales its changes; a twice as large room halves them; nothing else moves.
#[test]
fn changes_follow_flow_and_volume() {
    let base = solve("room_air", &room());
    let mut double = room();
    put(&mut double, "exhaust.rate", Kind::AirFlow, 0.42);
    let more = solve("room_air", &double);
    assert!((si(&more, "exhaust_changes") / si(&base, "exhaust_changes") - 2.0).abs() < 1e-12);
    assert!((si(&more, "supply_changes") / si(&base, "supply_changes") - 1.0).abs() < 1e-12);
    let mut tall = room();
    put(&mut tall, "size.height", Kind::RoomLength, 5.6);
    let half = solve("room_air", &tall);
    assert!((si(&half, "exhaust_changes") / si(&base, "exhaust_changes") - 0.5).abs() < 1e-12);
}

#[test]
fn humidity_of_the_room_is_told_where_it_was_read() {
    let mut given = room();
    given.choose("room.humidity_by", "relative_humidity");
    put(&mut given, "pressure.elevation", Kind::Elevation, 20.0);
    put(&mut given, "room.dry_bulb", Kind::Temperature, 295.15);
    put(&mut given, "room.relative_humidity", Kind::RelativeHumidity, 0.48);
    let outcome = solve("room_air", &given);
    assert!((si(&outcome, "relative_humidity") - 0.48).abs() < 1e-9);
    assert_eq!(outcome.states.len(), 1);
    // Half of it read is no reason to wait: the room's air is wanted for the record only.
    let mut half = room();
    put(&mut half, "room.dry_bulb", Kind::Temperature, 295.15);
    assert!(solve("room_air", &half).amount("exhaust_changes").is_some());
}
