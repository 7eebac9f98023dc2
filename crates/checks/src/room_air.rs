//! Room air changes and pressure: how often is this room's air renewed, and which way does air flow through its door?
//!
//! Changes in a time: a flow over the room's volume, supply and exhaust each by itself, never their sum. The flow counts
//! at the room's own state, `V_room = m v_room`, where it was read at another. Offset: exhaust less supply. The pressure
//! against the neighbour is corrected by the mean of the instrument's zero before and after; half of the zero's drift
//! bounds what is left of it. Definitions; no standard is quoted, and no limit is built in.

mod between;
mod ventilation;

use std::collections::BTreeMap;

use dewledger_properties::MoistAir;
use dewledger_quantities::{AirChanges, AirFlow, Pressure, Quantity, RoomVolume, Sentence};

use crate::check::{About, Check, Group};
use crate::doubt::{Doubt, Term};
use crate::flow_block::FlowBlock;
use crate::form::{Item, Mark, Section};
use crate::given::Given;
use crate::outcome::{Caution, Figure, Missing, Note, Outcome, Role, StatePoint};
use crate::pressure;
use crate::refusal::Stop;
use crate::state_block::{Point, Read};

/// The check.
pub struct RoomAir;

const ABOUT: About = About {
    id: "room_air",
    label: "Room air changes and pressure",
    question: "How often is this room’s air renewed, and which way does air flow?",
    takes: "the room’s size, supply and exhaust, and its pressure against the next room",
    group: Group::Air,
};

const ROOM: Point<'static> = Point { prefix: "room", name: "room" };
const SUPPLY_AIR: Point<'static> = Point { prefix: "supply_air", name: "supply" };
const SUPPLY: FlowBlock<'static> = FlowBlock {
    prefix: "supply",
    places: &[
        (AS_ROOM, "Actual, as the room’s air is"),
        (AS_SUPPLY, "Actual, as the supply air is"),
    ],
    plane: false,
};
const EXHAUST: FlowBlock<'static> = FlowBlock {
    prefix: "exhaust",
    places: &[(AS_ROOM, "Actual, as the room’s air is")],
    plane: false,
};
/// Results that this check is for; the first that is there leads.
const ANSWERS: [&str; 4] = ["exhaust_changes", "supply_changes", "offset", "room_pressure"];
const AS_ROOM: &str = "actual_room";
const AS_SUPPLY: &str = "actual_supply";

const WRONG_WAY: Caution = Caution {
    title: "Air flows the wrong way",
    says: "Tell the person in charge of this area now; change nothing yourself. Write down when, and who was told.",
};
const NOT_SHOWN: Caution = Caution {
    title: "Which way air flows could not be shown",
    says: "Tell the person in charge of this area that it could not be shown; change nothing yourself. Zero the \
           instrument and read again.",
};
const PERMISSION: Caution = Caution {
    title: "Permission first",
    says: "Isolation rooms, laboratories and clean rooms: enter only with leave, in the clothing that the place asks \
           for. Never prop a door or move a damper. Visible smoke sets off detectors: use it only where that was agreed.",
};
const FLUE_GAS: Caution = Caution {
    title: "Fuel-burning appliances",
    says: "A room held below its neighbours can draw flue gas out of an appliance that takes its air from it. Headache \
           or a carbon monoxide alarm: leave, and call for help from outside.",
};
const JUDGEMENT: Caution = Caution {
    title: "Whose judgement",
    says: "Local rules and the people in charge of the room come first. No limit is built in here: type what is asked \
           for as a requirement.",
};
const CAUTIONS: &[Caution] = &[PERMISSION, FLUE_GAS, JUDGEMENT];
const CAUTIONS_WRONG_WAY: &[Caution] = &[WRONG_WAY, PERMISSION, FLUE_GAS, JUDGEMENT];
const CAUTIONS_NOT_SHOWN: &[Caution] = &[NOT_SHOWN, PERMISSION, FLUE_GAS, JUDGEMENT];

/// How often a flow fills a volume.
#[must_use]
pub fn changes(flow: AirFlow, volume: RoomVolume) -> AirChanges {
    AirChanges(flow.0 / volume.0)
}

/// The air of the room and of its supply, as far as they were read, and what is missing of them.
struct Airs {
    room: Option<Read>,
    supply: Option<Read>,
    here: Option<pressure::Here>,
    missing: Vec<Missing>,
}

/// Whether this point is spoken of: a reading stands in it.
fn stands(given: &Given, point: Point) -> bool {
    given
        .readings()
        .any(|(key, _)| key.strip_prefix(point.prefix).is_some_and(|rest| rest.starts_with('.')))
}

/// Whether the state of the room's air is needed for a flow.
fn room_needed(given: &Given) -> bool {
    [SUPPLY, EXHAUST].iter().any(|block| ventilation::converted(given, block))
}

fn supply_needed(given: &Given) -> bool {
    given.choice("supply.basis") == Some(AS_SUPPLY)
}

impl Airs {
    fn read(given: &Given) -> Result<Self, Stop> {
        let mut airs = Airs { room: None, supply: None, here: None, missing: Vec::new() };
        let wanted = [
            (ROOM, stands(given, ROOM) || room_needed(given), room_needed(given)),
            (SUPPLY_AIR, supply_needed(given), true),
        ];
        if !wanted.iter().any(|(_, wanted, _)| *wanted) {
            return Ok(airs);
        }
        let needed = wanted.iter().any(|(_, wanted, needed)| *wanted && *needed);
        airs.here = airs.keep(pressure::here(given), needed)?;
        let at = airs.here.as_ref().map(|here| here.pressure);
        for (point, _, needed) in wanted.into_iter().filter(|(_, wanted, _)| *wanted) {
            // Without the pressure only what is missing counts: a refusal at a trial pressure may not be one at the real.
            let read = point.read(given, at.unwrap_or(Pressure::from_si(101_325.0)));
            let read = match (at, read) {
                (None, Ok(_) | Err(Stop::Refused(_))) => continue,
                (_, read) => airs.keep(read, needed)?,
            };
            if point.prefix == ROOM.prefix {
                airs.room = read;
            } else {
                airs.supply = read;
            }
        }
        Ok(airs)
    }

    /// A refusal stops; what is missing is kept where it is needed.
    fn keep<T>(&mut self, what: Result<T, Stop>, needed: bool) -> Result<Option<T>, Stop> {
        match what {
            Ok(what) => Ok(Some(what)),
            Err(Stop::Waits(missing)) => {
                if needed {
                    self.missing.extend(missing);
                }
                Ok(None)
            }
            Err(refused) => Err(refused),
        }
    }

    fn room(&self) -> Option<&MoistAir> {
        self.room.as_ref().map(|read| &read.air)
    }

    fn supply(&self) -> Option<&MoistAir> {
        self.supply.as_ref().map(|read| &read.air)
    }
}

impl Check for RoomAir {
    fn about(&self) -> &'static About {
        &ABOUT
    }

    fn form(&self, given: &Given) -> Vec<Section> {
        let mut sections = vec![
            Section::new("size", "The room", ventilation::size_items(given)),
            Section::new("exhaust", "Exhaust", ventilation::flow_items(given, &EXHAUST))
                .beside("all outlets together"),
            Section::new("supply", "Supply", ventilation::flow_items(given, &SUPPLY))
                .beside("all outlets together"),
            Section::new("between", "Pressure against the next room", between::items()),
        ];
        let (room, supply) = (room_needed(given), supply_needed(given));
        let wanted = |items: Vec<Item>, needed: bool| -> Vec<Item> {
            items.into_iter().map(|item| if needed { item } else { optional(item) }).collect()
        };
        if supply {
            sections.push(
                Section::new("supply_air", "Supply air", SUPPLY_AIR.items(given))
                    .marked(Mark::ENTERING)
                    .beside("at the outlet"),
            );
        }
        let mut section = Section::new("room", "Room air", wanted(ROOM.items(given), room))
            .marked(Mark::LEAVING)
            .beside("away from the outlets");
        let mut here = pressure::section(given);
        here.items = wanted(here.items, room || supply);
        if !room && !stands(given, ROOM) {
            section = section.seldom();
        }
        if !room && !supply && !stands(given, ROOM) {
            here = here.seldom();
        }
        sections.push(section);
        sections.push(here);
        sections
    }

    fn solve(&self, given: &Given) -> Result<Outcome, Stop> {
        let airs = Airs::read(given)?;
        let mut outcome = Outcome { cautions: CAUTIONS, ..Outcome::default() };
        outcome.waits.extend(airs.missing.iter().cloned());
        let offset = ventilation::work_out(given, &airs, &mut outcome)?;
        between::work_out(given, offset, &mut outcome)?;
        room_state(&airs, &mut outcome);
        // Its size or its humidity alone answer nothing that is asked here.
        if ANSWERS.iter().all(|key| outcome.amount(key).is_none()) {
            let mut missing = std::mem::take(&mut outcome.waits);
            missing.push(Missing::new(between::PRESSURE, "the pressure against the next room"));
            return Err(Stop::Waits(missing));
        }
        let leads = ANSWERS.iter().find(|key| outcome.amount(key).is_some());
        if let Some(leads) = leads
            && let Some(at) = outcome.figures.iter().position(|figure| figure.key == *leads)
        {
            let figure = outcome.figures.remove(at).role(Role::Headline);
            outcome.figures.insert(0, figure);
        }
        Ok(outcome)
    }

    fn terms(&self, given: &Given) -> Vec<Term> {
        let mut terms = pressure::terms(given);
        terms.extend(between::drift(given));
        terms
    }

    fn judge(
        &self,
        given: &Given,
        outcome: &Outcome,
        doubts: &BTreeMap<String, Doubt>,
    ) -> Vec<Note> {
        let _ = given;
        between::untold(outcome, doubts).into_iter().collect()
    }
}

/// The same, but it may stay blank.
fn optional(item: Item) -> Item {
    match item {
        Item::Reading(mut reading) => {
            reading.required = false;
            Item::Reading(reading)
        }
        Item::Choice(choice) => Item::Choice(choice),
    }
}

/// The air of the room and of its supply, for the record and the chart.
fn room_state(airs: &Airs, outcome: &mut Outcome) {
    let points = [
        (&airs.supply, SUPPLY_AIR, "Supply air", Mark::ENTERING),
        (&airs.room, ROOM, "Room air", Mark::LEAVING),
    ];
    for (read, point, label, mark) in points {
        let Some(read) = read else { continue };
        outcome.notes.extend(read.notes.iter().cloned());
        if read.saturated {
            outcome.saturated.push(point.prefix.to_owned());
        }
        outcome.states.push(StatePoint {
            key: point.prefix.into(),
            label: label.into(),
            mark: Some(mark),
            air: read.air,
        });
    }
    if let Some(air) = airs.room() {
        const GROUP: &str = "Room air";
        let figure = |key, label, amount| Figure::new(key, label, amount, GROUP);
        outcome.push(figure(
            "relative_humidity",
            "Relative humidity",
            air.relative_humidity().amount(),
        ));
        if let Ok(dew_point) = air.dew_point() {
            outcome.push(figure("dew_point", "Dew point", dew_point.amount()).role(Role::Detail));
        }
    }
    if let Some(here) = &airs.here {
        outcome.notes.extend(here.notes.iter().cloned());
        outcome.pressure = Some(
            Sentence::new("{0}, {s0}").with(here.pressure.amount()).nested(here.source.clone()),
        );
    }
}
