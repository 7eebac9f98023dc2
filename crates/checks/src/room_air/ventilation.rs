//! The room's size, what is supplied and exhausted, and how often that renews its air.

use dewledger_quantities::{
    AirFlow, Amount, DryAirFlow, Kind, Quantity, RoomLength, RoomVolume, Sentence,
};

use super::{AS_ROOM, AS_SUPPLY, Airs, EXHAUST, SUPPLY, changes};
use crate::flow_block::FlowBlock;
use crate::form::{Choice, ChoiceItem, Item, ReadingItem};
use crate::given::Given;
use crate::outcome::{Figure, Missing, Note, Outcome, Role, Step};
use crate::refusal::{Refusal, Stop};

const BY: &str = "size.by";
const VOLUME: &str = "size.volume";
const SIDES: [(&str, &str, &str); 3] = [
    ("size.length", "Length", "the room’s length"),
    ("size.width", "Width", "the room’s width"),
    ("size.height", "Height", "the room’s height"),
];
const CHANGES: &str = "Air changes";
const FLOWS: &str = "Flows";
/// Share of the larger flow below which an offset is not resolved where no ± is stated (common practice: what a flow
/// hood holds).
const UNSTATED_SHARE: f64 = 0.1;
/// Changes an hour outside which a room is unusual (common practice).
const USUAL_PER_HOUR: std::ops::RangeInclusive<f64> = 0.1..=100.0;

pub(super) fn size_items(given: &Given) -> Vec<Item> {
    let mut items: Vec<Item> = vec![
        ChoiceItem::new(
            BY,
            "Its volume is",
            Some("sides"),
            vec![
                Choice::helped("sides", "Worked out", "From length, width and height"),
                Choice::helped("typed", "Typed", "For a room that is no box"),
            ],
        )
        .into(),
    ];
    if given.choice_or(BY, "sides") == "typed" {
        items.push(ReadingItem::wanted(VOLUME, "Volume of the room", Kind::RoomVolume).into());
    } else {
        items.extend(
            SIDES
                .iter()
                .map(|(key, label, _)| ReadingItem::wanted(*key, *label, Kind::RoomLength).into()),
        );
    }
    items
}

/// What is asked of a flow: its block, none of it needed while the other flow or the pressure alone is wanted.
pub(super) fn flow_items(given: &Given, block: &FlowBlock) -> Vec<Item> {
    let mut items = block.items(given, false);
    if let Some(Item::Reading(reading)) = items.first_mut() {
        reading.help = Some(
            "A hood’s own resistance takes 5 to 15 % off a weak outlet, unless it corrects for that"
                .into(),
        );
    }
    items
}

/// Whether this flow was read at another state than the room's.
pub(super) fn converted(given: &Given, block: &FlowBlock) -> bool {
    given
        .choice(&format!("{}.basis", block.prefix))
        .is_some_and(|basis| basis != AS_ROOM && given.reading(&block.rate_key(given)).is_some())
}

/// The room's volume; none while it is not read, with what is missing.
fn volume(given: &Given, outcome: &mut Outcome) -> Result<Result<RoomVolume, Vec<Missing>>, Stop> {
    let volume = if given.choice_or(BY, "sides") == "typed" {
        let Some(volume) = given.quantity::<RoomVolume>(VOLUME) else {
            return Ok(Err(vec![Missing::new(VOLUME, "the room’s volume")]));
        };
        volume
    } else {
        let mut sides = Vec::new();
        let mut missing = Vec::new();
        for (key, _, name) in SIDES {
            match given.quantity::<RoomLength>(key) {
                Some(side) if (0.5..=500.0).contains(&side.si()) => sides.push(side),
                Some(side) => {
                    return Err(Refusal::new(
                        key,
                        "side_out_of_range",
                        Sentence::new(
                            "A side of {0} is outside 0.5 to 500 m (1.6 to 1 640 ft): no room is that. Check the number and its unit.",
                        )
                        .with(side.amount()),
                    )
                    .into());
                }
                None => missing.push(Missing::new(key, name)),
            }
        }
        let [length, width, height] = sides[..] else { return Ok(Err(missing)) };
        let volume = RoomVolume(length.0 * width.0 * height.0);
        outcome.steps.push(Step::new(
            "Volume of the room",
            "V = a b c",
            Sentence::new("{0} × {1} × {2} = {3}")
                .with(length.amount())
                .with(width.amount())
                .with(height.amount())
                .with(volume.amount()),
            "a box; furniture is not taken off",
        ));
        volume
    };
    if (1.0..=1e6).contains(&volume.si()) {
        return Ok(Ok(volume));
    }
    let key = if given.choice_or(BY, "sides") == "typed" { VOLUME } else { SIDES[0].0 };
    Err(Refusal::new(
        key,
        "volume_out_of_range",
        Sentence::new("A room of {0} is outside 1 to 1 000 000 m³ (35 to 35 million ft³). Check the number and its unit.")
            .with(volume.amount()),
    )
    .into())
}

/// A flow at the room's state; none while it was not read, or waits.
fn flow(
    given: &Given,
    block: &FlowBlock,
    name: &'static str,
    airs: &Airs,
    outcome: &mut Outcome,
) -> Result<Option<AirFlow>, Stop> {
    let key = block.rate_key(given);
    let Some(reading) = given.reading(&key).copied() else { return Ok(None) };
    let basis = given.choice(&format!("{}.basis", block.prefix));
    if basis == Some(AS_ROOM) {
        // Nothing at all through an outlet is a finding, not a slip.
        return as_room(&key, name, reading.amount).map(Some);
    }
    let Some(room) = airs.room() else {
        if basis.is_none() {
            let mut missing =
                Missing::new(format!("{}.basis", block.prefix), format!("what the {name} is"));
            missing.asks = Some(
                Sentence::new("Is {0} what passed there (actual), or standard air?")
                    .with(reading.amount),
            );
            outcome.waits.push(missing);
        }
        return Ok(None);
    };
    let mut states = vec![(AS_ROOM, room)];
    if let Some(supply) = airs.supply() {
        states.push((AS_SUPPLY, supply));
    } else if basis == Some(AS_SUPPLY) {
        return Ok(None);
    }
    let read = match block.read(given, room.pressure(), &states)? {
        Ok(read) => read,
        Err(missing) => {
            outcome.waits.push(missing);
            return Ok(None);
        }
    };
    let here = AirFlow::from_si(read.dry_air.si() * room.specific_volume().si());
    outcome.steps.push(read.step);
    outcome.steps.push(at_room(name, read.dry_air, room, here));
    Ok(Some(here))
}

fn at_room(
    name: &'static str,
    dry_air: DryAirFlow,
    room: &dewledger_properties::MoistAir,
    here: AirFlow,
) -> Step {
    Step::new(
        format!("The {name} at the room’s state"),
        "V_room = m v_room",
        Sentence::new("{0} × {1} = {2}")
            .with(dry_air.amount())
            .with(room.specific_volume().amount())
            .with(here.amount()),
        "dry air is what does not change on the way",
    )
}

fn as_room(key: &str, name: &'static str, amount: Amount) -> Result<AirFlow, Stop> {
    if amount.si() < 0.0 {
        return Err(Refusal::new(
            key.to_owned(),
            "flow_below_zero",
            Sentence::new("An air flow below zero, {0}, cannot be read as {w0}. Where air comes out of an exhaust or goes into a supply, type it at the other one.")
                .with(amount)
                .word(name),
        )
        .into());
    }
    if amount.si() > 1000.0 {
        return Err(Refusal::new(
            key.to_owned(),
            "flow_too_large",
            Sentence::new("An air flow of {0} is beyond any room. Check its unit: cfm typed as m³/s looks like this.")
                .with(amount),
        )
        .into());
    }
    Ok(AirFlow::from_si(amount.si()))
}

/// Air changes by each flow, and how much more is taken out than put in: that difference, and whether it is resolved.
pub(super) fn work_out(
    given: &Given,
    airs: &Airs,
    outcome: &mut Outcome,
) -> Result<Option<(AirFlow, bool)>, Stop> {
    let volume = volume(given, outcome)?;
    let exhaust = flow(given, &EXHAUST, "exhaust", airs, outcome)?;
    let supply = flow(given, &SUPPLY, "supply", airs, outcome)?;
    let spoken_of =
        [&EXHAUST, &SUPPLY].iter().any(|block| given.reading(&block.rate_key(given)).is_some());
    // A pressure needs no flow beside it.
    let pressure_alone = !spoken_of && given.reading(super::between::PRESSURE).is_some();
    match &volume {
        Ok(volume) => {
            let of = [
                (
                    exhaust,
                    "exhaust_changes",
                    "Air changes by the exhaust",
                    "exhaust.rate",
                    "Changes by the exhaust",
                ),
                (
                    supply,
                    "supply_changes",
                    "Air changes by the supply",
                    "supply.rate",
                    "Changes by the supply",
                ),
            ];
            for (flow, key, label, field, step) in of {
                let Some(flow) = flow else { continue };
                one(flow, *volume, (key, label, field, step), outcome);
            }
        }
        Err(missing) => {
            if !pressure_alone {
                outcome.waits.extend(missing.iter().cloned());
            }
        }
    }
    if !spoken_of && !pressure_alone {
        outcome.waits.push(Missing::new(EXHAUST.rate_key(given), "the exhaust or the supply"));
    }
    let offset =
        exhaust.zip(supply).map(|(exhaust, supply)| offset(given, exhaust, supply, outcome));
    if let Ok(volume) = volume {
        outcome.push(
            Figure::new("volume", "Volume of the room", volume.amount(), CHANGES)
                .role(Role::Detail),
        );
    }
    for (flow, block, key, label) in [
        (exhaust, &EXHAUST, "exhaust_flow", "Exhaust at the room’s state"),
        (supply, &SUPPLY, "supply_flow", "Supply at the room’s state"),
    ] {
        if let Some(flow) = flow.filter(|_| converted(given, block)) {
            outcome.push(Figure::new(key, label, flow.amount(), FLOWS));
        }
    }
    Ok(offset)
}

fn one(
    flow: AirFlow,
    volume: RoomVolume,
    (key, label, field, step): (&'static str, &'static str, &'static str, &'static str),
    outcome: &mut Outcome,
) {
    let changes = changes(flow, volume);
    outcome.push(Figure::new(key, label, changes.amount(), CHANGES));
    outcome.steps.push(Step::new(
        step,
        "n = V_flow / V_room",
        Sentence::new("{0} ÷ {1} = {2}")
            .with(flow.amount())
            .with(volume.amount())
            .with(changes.amount()),
        "definition; each flow by itself, never their sum",
    ));
    if !USUAL_PER_HOUR.contains(&(changes.si() * 3600.0)) {
        outcome.notes.push(
            Note::unusual(
                format!("unusual_{key}"),
                field,
                Sentence::new("Its air renewed at {0} is unusual for a room.")
                    .with(changes.amount()),
            )
            .because(Sentence::new("Check the flow’s unit, and the room’s size.")),
        );
    }
}

fn offset(
    given: &Given,
    exhaust: AirFlow,
    supply: AirFlow,
    outcome: &mut Outcome,
) -> (AirFlow, bool) {
    let offset = AirFlow(exhaust.0 - supply.0);
    let unstated = UNSTATED_SHARE * exhaust.si().max(supply.si());
    let resolved = offset.si().abs() >= given.floor("offset", unstated) && offset.si() != 0.0;
    let says = if !resolved {
        "Which of the two is larger cannot be told"
    } else if offset.si() > 0.0 {
        "More is taken out than put in: the room draws air in"
    } else {
        "More is put in than taken out: the room pushes air out"
    };
    outcome.push(
        Figure::new("offset", "Exhaust less supply", offset.amount(), FLOWS)
            .on_condition(Sentence::new(says)),
    );
    outcome.steps.push(Step::new(
        "Exhaust less supply",
        "V_exhaust - V_supply",
        Sentence::new("{0} − {1} = {2}")
            .with(exhaust.amount())
            .with(supply.amount())
            .with(offset.amount()),
        "both at the room’s state; what one hood reads wrong in both is shared",
    ));
    (offset, resolved)
}
