//! The pressure of the room against its neighbour, and which way air flows.

use std::collections::BTreeMap;

use dewledger_quantities::{AirFlow, Kind, PressureDifference, Quantity, Sentence};

use super::{CAUTIONS_NOT_SHOWN, CAUTIONS_WRONG_WAY};
use crate::doubt::{Doubt, Term};
use crate::form::{Choice, ChoiceItem, Item, ReadingItem};
use crate::given::{Given, Moved};
use crate::outcome::{Change, Figure, Note, Offer, Outcome, Step};
use crate::refusal::{Refusal, Stop};

pub(super) const PRESSURE: &str = "between.pressure";
const ZERO_BEFORE: &str = "between.zero_before";
const ZERO_AFTER: &str = "between.zero_after";
const NEIGHBOUR: &str = "between.neighbour";
const DOORS: &str = "between.doors";
const WANTED: &str = "between.wanted";
const FIGURE: &str = "room_pressure";
const GROUP: &str = "Pressure against the next room";
/// The worked-out value that the zero's drift moves, Pa.
const ZERO: &str = "zero of the room's pressure";
/// Below this a direction is not resolved where no ± is stated, Pa: what a zero drifts (field practice).
const UNSTATED_PA: f64 = 0.5;
/// From about this on a door is hard to open, Pa (common practice).
const HARD_TO_OPEN_PA: f64 = 50.0;
/// No room is held so far from its neighbour, Pa (common practice, with a wide margin).
const LARGEST_PA: f64 = 500.0;
/// A zero further off than this was not set, Pa (field practice).
const LARGEST_ZERO_PA: f64 = 25.0;

pub(super) fn items() -> Vec<Item> {
    let pressure = Kind::PressureDifference;
    vec![
        ReadingItem::optional(PRESSURE, "Room less neighbour", pressure)
            .help("Above zero where the room’s pressure is the higher one; a mean over a minute")
            .into(),
        ReadingItem::optional(ZERO_BEFORE, "Zero before", pressure)
            .help("What the instrument shows with both ports open; blank is not read, not zero")
            .covered()
            .into(),
        ReadingItem::optional(ZERO_AFTER, "Zero after", pressure).covered().into(),
        ChoiceItem::new(
            NEIGHBOUR,
            "The neighbour is",
            None,
            vec![
                Choice::new("corridor", "Corridor"),
                Choice::new("anteroom", "Anteroom"),
                Choice::new("room", "Another room"),
                Choice::new("outdoors", "Outdoors"),
            ],
        )
        .into(),
        ChoiceItem::new(
            DOORS,
            "Doors were",
            None,
            vec![
                Choice::helped("closed", "Closed", "This one, the anteroom’s and the corridor’s"),
                Choice::helped("open", "Open", "Any of them"),
            ],
        )
        .into(),
        ChoiceItem::new(
            WANTED,
            "Asked for: air flows",
            Some("nothing"),
            vec![
                Choice::new("nothing", "Nothing is asked for"),
                Choice::new("in", "Into the room"),
                Choice::new("out", "Out of the room"),
            ],
        )
        .into(),
    ]
}

fn neighbour(given: &Given) -> &'static str {
    match given.choice(NEIGHBOUR) {
        Some("corridor") => "the corridor",
        Some("anteroom") => "the anteroom",
        Some("outdoors") => "the outdoors",
        _ => "the next room",
    }
}

/// The zero in the middle of the reading, and how far it moved from before to after.
fn zero(given: &Given) -> (PressureDifference, Option<PressureDifference>) {
    let before: Option<PressureDifference> = given.quantity(ZERO_BEFORE);
    let after: Option<PressureDifference> = given.quantity(ZERO_AFTER);
    match (before, after) {
        (Some(before), Some(after)) => (
            PressureDifference::from_si(f64::midpoint(before.si(), after.si())),
            Some(PressureDifference::from_si(after.si() - before.si())),
        ),
        (Some(only), None) | (None, Some(only)) => (only, None),
        (None, None) => (PressureDifference::from_si(0.0), None),
    }
}

/// What the zero's drift leaves in doubt: half of it either way, every value alike (JCGM 100:2008, 4.3.7).
pub(super) fn drift(given: &Given) -> Option<Term> {
    given.reading(PRESSURE)?;
    let (_, drift) = zero(given);
    let u = drift?.si().abs() / 2.0 / 3.0_f64.sqrt();
    (u > 0.0).then(|| Term::worked_out("drift of the zero", Moved::WorkedOut(ZERO), u))
}

fn in_range(given: &Given) -> Result<(), Stop> {
    for key in [ZERO_BEFORE, ZERO_AFTER] {
        let Some(zero) = given.quantity::<PressureDifference>(key) else { continue };
        if zero.si().abs() > LARGEST_ZERO_PA {
            return Err(Refusal::new(
                key,
                "zero_out_of_range",
                Sentence::new("A zero of {0} is no zero: open both ports to the same air, set it, and read again.")
                    .with(zero.amount()),
            )
            .into());
        }
    }
    let Some(reading) = given.reading(PRESSURE) else { return Ok(()) };
    if reading.amount.si().abs() <= LARGEST_PA {
        return Ok(());
    }
    let mut refusal = Refusal::new(
        PRESSURE,
        "room_pressure_out_of_range",
        Sentence::new(
            "No room is held {0} from the next: its door could not be moved. Check the number and its unit.",
        )
        .with(reading.amount),
    );
    if reading.unit.is_some_and(|unit| unit.id != "Pa") {
        refusal = refusal.offering(Offer::new(
            "The number is in pascals",
            vec![Change::Unit(PRESSURE.into(), "Pa")],
        ));
    }
    Err(refusal.into())
}

/// The pressure, its direction in words, and what follows from it.
pub(super) fn work_out(
    given: &Given,
    offset: Option<(AirFlow, bool)>,
    outcome: &mut Outcome,
) -> Result<(), Stop> {
    in_range(given)?;
    let Some(read) = given.quantity::<PressureDifference>(PRESSURE) else { return Ok(()) };
    let (zero, drift) = zero(given);
    let pressure = PressureDifference::from_si(read.si() - zero.si() + given.shift(ZERO));
    let neighbour = neighbour(given);
    let resolved = pressure.si() != 0.0 && pressure.si().abs() >= given.floor(FIGURE, UNSTATED_PA);
    let out = pressure.si() > 0.0;
    let says = match (resolved, out) {
        (false, _) => "Which way air flows between it and {w0} cannot be told",
        (true, true) => "Air flows out of the room into {w0}",
        (true, false) => "Air flows into the room from {w0}",
    };
    outcome.push(
        Figure::new(FIGURE, "Room above its neighbour", pressure.amount(), GROUP)
            .on_condition(Sentence::new(says).word(neighbour)),
    );
    outcome.steps.push(Step::new(
        "Pressure of the room",
        "dp = read - zero",
        Sentence::new("{0} − {1} = {2}")
            .with(read.amount())
            .with(zero.amount())
            .with(pressure.amount()),
        "zero: the mean of before and after, 0 where it was not read; above zero, air flows out",
    ));
    remarks(given, pressure, drift, outcome);
    asked(given, resolved, out, outcome);
    if let Some((offset, true)) = offset
        && resolved
        && (offset.si() > 0.0) == out
    {
        let template = if out {
            "More is taken out than put in, and yet air flows out of the room."
        } else {
            "More is put in than taken out, and yet air flows into the room."
        };
        outcome.notes.push(
            Note::unusual("flows_against_pressure", PRESSURE, Sentence::new(template)).because(
                Sentence::new(
                    "A flow or the pressure’s sign is wrong, or an outlet was missed, or the neighbour is itself far from neutral.",
                ),
            ),
        );
    }
    Ok(())
}

/// A direction that is asked for: opposite, or not shown.
fn asked(given: &Given, resolved: bool, out: bool, outcome: &mut Outcome) {
    let wants_out = match given.choice(WANTED) {
        Some("out") => true,
        Some("in") => false,
        _ => return,
    };
    if !resolved {
        outcome.cautions = CAUTIONS_NOT_SHOWN;
        return;
    }
    if wants_out == out {
        return;
    }
    outcome.cautions = CAUTIONS_WRONG_WAY;
    let template = if out {
        "Air flows out of the room, and it is asked to flow in."
    } else {
        "Air flows into the room, and it is asked to flow out."
    };
    outcome.notes.push(Note::unusual("wrong_way", PRESSURE, Sentence::new(template)).because(
        Sentence::new("Tell the person in charge of this area now; change nothing yourself."),
    ));
}

fn remarks(
    given: &Given,
    pressure: PressureDifference,
    drift: Option<PressureDifference>,
    outcome: &mut Outcome,
) {
    if pressure.si().abs() > HARD_TO_OPEN_PA {
        outcome.notes.push(
            Note::unusual(
                "door_hard_to_open",
                PRESSURE,
                Sentence::new("{0} across a door is unusual.").with(pressure.amount()),
            )
            .because(Sentence::new("From about 50 Pa on a door is hard to open. Check the unit.")),
        );
    }
    if drift.is_some_and(|drift| drift.si().abs() > UNSTATED_PA) {
        let lead = Sentence::new("The instrument’s zero moved by {0} between before and after.")
            .with(drift.unwrap_or(pressure).amount());
        outcome.notes.push(
            Note::unusual("zero_drifts", ZERO_AFTER, lead)
                .because(Sentence::new("Let it warm up, set its zero, and read again.")),
        );
    }
    if given.reading(ZERO_BEFORE).is_none() && given.reading(ZERO_AFTER).is_none() {
        outcome.notes.push(
            Note::remark("zero_not_read", Sentence::new("The instrument’s zero was not read.")).because(
                Sentence::new("A zero that drifted by half a pascal can turn a direction round: read it first and last."),
            ),
        );
    }
    match given.choice(DOORS) {
        Some("closed") => {}
        Some("open") => outcome.notes.push(
            Note::unusual("doors_open", DOORS, Sentence::new("A door was open.")).because(
                Sentence::new("The pressure says nothing of the room with its doors closed."),
            ),
        ),
        _ => outcome.notes.push(
            Note::remark(
                "doors_not_said",
                Sentence::new("Whether the doors were closed is not said."),
            )
            .because(Sentence::new("Two visits compare only with the same doors closed.")),
        ),
    }
}

/// That the direction cannot be told, where the doubt is known.
pub(super) fn untold(outcome: &Outcome, doubts: &BTreeMap<String, Doubt>) -> Option<Note> {
    let pressure = outcome.amount(FIGURE)?;
    let half_width = doubts.get(FIGURE)?.half_width_si?;
    (pressure.si().abs() < half_width).then(|| {
        let lead = Sentence::new("Which way air flows cannot be told: the pressure is {0} ± {1}.")
            .with(pressure)
            .with(PressureDifference::from_si(half_width).amount());
        Note::unusual("direction_within_doubt", PRESSURE, lead)
    })
}
