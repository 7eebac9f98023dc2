//! Outdoor-air share: how much of this mixed air came from outdoors?
//!
//! By mass of dry air. *Temperature*: the share at which the mixture of both streams has the mixed dry bulb, `h(t_m, W(x)) =
//! h_r + x (h_o - h_r)`; without humidities `x = (t_m - t_r)/(t_o - t_r)`, off by up to 0.007. *Moisture*: the same in W.
//! *CO2*: the same in `y = c (1 + W/eps)`, per dry air. *Enthalpy* is shown and not combined: it is made of the same
//! readings. *Flow*: outdoor over supply. Combined by least variance with the covariance of the methods (generalised
//! least squares); a method of negative weight is dropped, because the mean must not leave what it is made of. Each
//! method is held against the mean. Source: balances of dry air, water, energy and CO2.

mod combine;
mod methods;

use std::collections::BTreeMap;

use dewledger_quantities::{
    AirFlow, DryAirFlow, Kind, Quantity, Sentence, Share, TemperatureInterval,
};

use crate::check::{About, Check, Group};
use crate::doubt::{Doubt, Term};
use crate::drawn::{Line, LineKind};
use crate::flow_block::FlowBlock;
use crate::form::{Item, Mark, ReadingItem, Section, Shape};
use crate::given::{Given, Moved};
use crate::outcome::{Caution, Figure, Note, Outcome, Role, StatePoint, Step};
use crate::pressure;
use crate::refusal::{Refusal, Stop};
use crate::state_block::Point;
use methods::{ALL, Corner, Corners, Method, differences, methods};

/// The check.
pub struct OutdoorShare;

const ABOUT: About = About {
    id: "outdoor_share",
    label: "Outdoor-air share",
    question: "How much of this mixed air came from outdoors?",
    takes: "return, outdoor and mixed air, by temperature, moisture, CO2 or flow",
    group: Group::Air,
};

const RETURN: Point<'static> = Point { prefix: "return", name: "return" };
const OUTDOOR: Point<'static> = Point { prefix: "outdoor", name: "outdoor" };
const MIXED: Point<'static> = Point { prefix: "mixed", name: "mixed" };
const POINTS: [(Point<'static>, &str, &str, Mark); 3] = [
    (
        RETURN,
        "Return air",
        "in the return duct, not in the room",
        Mark { letter: 'R', shape: Shape::Diamond },
    ),
    (
        OUTDOOR,
        "Outdoor air",
        "at the intake, not on the roof",
        Mark { letter: 'O', shape: Shape::Circle },
    ),
    (MIXED, "Mixed air", "by a grid of nine points or more", Mark::MIXED),
];
const CO2: [&str; 3] = ["co2.return", "co2.outdoor", "co2.mixed"];
const SUPPLY_FLOW: FlowBlock<'static> = FlowBlock {
    prefix: "supply_flow",
    places: &[("actual_mixed", "Actual, at the mixed air’s state")],
    plane: false,
};
const OUTDOOR_FLOW: FlowBlock<'static> = FlowBlock {
    prefix: "outdoor_flow",
    places: &[("actual_outdoor", "Actual, at the outdoor air’s state")],
    plane: false,
};
/// The value worked out that carries the doubt of CO2 without humidity.
const CO2_BASIS: &str = "CO2 per moist air";
const SHARE: &str = "Share of outdoor air";
const FLOWS: &str = "Flows";
const APART: &str = "Outdoor against return";
/// Wider than this a share says little.
const WIDE: f64 = 0.15;

const CAUTIONS: &[Caution] = &[
    Caution {
        title: "Dampers and fans",
        says: "They start by themselves. Isolate before reaching in. Never force outdoor dampers in cold weather without \
               someone watching the coil.",
    },
    Caution {
        title: "Roofs and plenums",
        says: "Mind edges, weather and confined spaces. Local rules, the maker’s instructions and licensed people come \
               first.",
    },
];

impl Check for OutdoorShare {
    fn about(&self) -> &'static About {
        &ABOUT
    }

    fn form(&self, given: &Given) -> Vec<Section> {
        let mut sections = vec![pressure::section(given)];
        for (point, title, aside, mark) in POINTS {
            let mut items = point.items(given);
            for item in items.iter_mut().skip(1) {
                if let Item::Reading(item) = item {
                    item.required = false;
                }
            }
            sections.push(Section::new(point.prefix, title, items).marked(mark).beside(aside));
        }
        let co2 = CO2
            .into_iter()
            .zip(["Return", "Outdoor", "Mixed"])
            .map(|(key, label)| ReadingItem::optional(key, label, Kind::MoleFraction).into())
            .collect();
        sections.push(
            Section::new("co2", "CO2", co2).beside("one analyser moved through all three").seldom(),
        );
        sections.push(
            Section::new("supply_flow", "Supply flow", SUPPLY_FLOW.items(given, false))
                .beside("gives the outdoor flow")
                .seldom(),
        );
        sections.push(
            Section::new("outdoor_flow", "Outdoor flow", OUTDOOR_FLOW.items(given, false))
                .beside("by a traverse of the intake")
                .seldom(),
        );
        sections
    }

    fn solve(&self, given: &Given) -> Result<Outcome, Stop> {
        let (here, corners) = pressure::with(given, |here| Corners::read(given, here))?;
        let found = methods(given, here.pressure, &corners)?;
        if found.is_empty() {
            return Err(Stop::Waits(corners.missing(given)));
        }
        let mut outcome = Outcome { cautions: CAUTIONS, ..Outcome::default() };
        let usable = usable(given, &corners, &found, &mut outcome)?;
        let combined = combine::combine(self, given, here.pressure, &usable, &mut outcome);
        headline(&usable, combined, &mut outcome);
        for (key, label, apart) in differences(&corners, given) {
            outcome.push(Figure::new(key, label, apart, APART).role(Role::Detail));
        }
        let share = combined.or_else(|| usable.first().map(|method| method.share));
        if let Some(share) = share {
            flows(given, here.pressure, &corners, share, &mut outcome)?;
        }
        judge(&corners, &usable, &mut outcome);
        outcome.steps.extend(steps(&usable));
        outcome.notes.extend(here.notes);
        corners.finish(&mut outcome);
        outcome.pressure =
            Some(Sentence::new("{0}, {s0}").with(here.pressure.amount()).nested(here.source));
        Ok(outcome)
    }

    fn terms(&self, given: &Given) -> Vec<Term> {
        let mut terms = pressure::terms(given);
        let humid = POINTS.iter().all(|(point, ..)| {
            let by = given.choice_or(&point.key("humidity_by"), "wet_bulb");
            given.reading(&point.key(by)).is_some()
        });
        if let Some(mixed) = given.reading(CO2[2]).filter(|_| !humid) {
            let u = 0.005 * mixed.amount.si();
            terms.push(Term::worked_out(
                "CO2 read without humidity",
                Moved::WorkedOut(CO2_BASIS),
                u,
            ));
        }
        terms
    }

    fn judge(&self, _: &Given, outcome: &Outcome, doubts: &BTreeMap<String, Doubt>) -> Vec<Note> {
        let mut notes = Vec::new();
        for kind in ALL {
            let (Some(share), Some(doubt)) = (outcome.amount(kind.key), doubts.get(kind.key))
            else {
                continue;
            };
            if !doubt.unknown.is_empty() || doubt.u_si <= 0.0 {
                continue;
            }
            if share.si() < -2.0 * doubt.u_si || share.si() > 1.0 + 2.0 * doubt.u_si {
                notes.push(cannot_mix(kind.key, share));
            }
            let half_width = 1.96 * doubt.u_si;
            let apart = outcome.amount(kind.difference);
            if half_width > WIDE
                && let Some(apart) = apart
            {
                let needed = dewledger_quantities::Amount::new(
                    apart.kind(),
                    apart.si().abs() * half_width / WIDE,
                );
                notes.push(
                    Note::remark(
                        format!("{}_wide", kind.key),
                        Sentence::new("By {w0} these instruments need {0} between outdoor and return to tell the share within ± 15 %; today it is {1}.")
                            .with(needed)
                            .with(dewledger_quantities::Amount::new(apart.kind(), apart.si().abs()))
                            .word(kind.name),
                    )
                    .because(Sentence::new("Come back on another day, or take a tracer or a traverse.")),
                );
            }
        }
        notes
    }
}

fn cannot_mix(key: &'static str, share: dewledger_quantities::Amount) -> Note {
    Note::unusual(
        format!("{key}_outside"),
        MIXED.key("dry_bulb"),
        Sentence::new("A share of {0} cannot come from mixing these two streams.").with(share),
    )
    .because(Sentence::new("Check which point is which, look for a third stream, or take more points: mixed air lies in layers."))
}

/// Methods whose difference is large enough to tell a share; the others are withheld, singly.
fn usable(
    given: &Given,
    corners: &Corners,
    found: &[Method],
    outcome: &mut Outcome,
) -> Result<Vec<Method>, Stop> {
    let apart = differences(corners, given);
    let mut usable = Vec::new();
    for method in found {
        let difference = apart.iter().find(|(key, ..)| *key == method.kind.difference);
        let needed =
            method.kind.least.map(|least| 1.96 * given.floor(method.kind.difference, least / 1.96));
        if let (Some((_, _, apart)), Some(needed)) = (difference, needed)
            && apart.si().abs() < needed
        {
            let why = Sentence::new("outdoor and return are {0} apart; these instruments need {1}")
                .with(dewledger_quantities::Amount::new(apart.kind(), apart.si().abs()))
                .with(dewledger_quantities::Amount::new(apart.kind(), needed));
            outcome.push(Figure::withheld(method.kind.key, method.kind.label, why, SHARE));
            continue;
        }
        outcome.push(Figure::new(method.kind.key, method.kind.label, method.share.amount(), SHARE));
        usable.push(method.clone());
    }
    if usable.is_empty() {
        return Err(Refusal::new(
            OUTDOOR.key("dry_bulb"),
            "too_alike",
            Sentence::new("Return and outdoor are too alike today: no share can be read. Come back with 6 K between them, or use a tracer or a traverse."),
        )
        .into());
    }
    Ok(usable)
}

/// Combined where that can be, else the first method.
fn headline(usable: &[Method], combined: Option<Share>, outcome: &mut Outcome) {
    if let Some(share) = combined {
        outcome.figures.insert(
            0,
            Figure::new("share", "Outdoor air, combined", share.amount(), SHARE)
                .role(Role::Headline),
        );
        for method in usable {
            if let Some(figure) =
                outcome.figures.iter_mut().find(|figure| figure.key == method.kind.key)
            {
                figure.role = Role::Minor;
            }
        }
        return;
    }
    let first = usable.first().map(|method| method.kind.key);
    if let Some(figure) =
        outcome.figures.iter_mut().find(|figure| Some(figure.key.as_ref()) == first)
    {
        figure.role = Role::Headline;
    }
}

/// Outdoor flow from the share and a supply flow.
fn flows(
    given: &Given,
    here: dewledger_quantities::Pressure,
    corners: &Corners,
    share: Share,
    outcome: &mut Outcome,
) -> Result<(), Stop> {
    let (Some(mixed), Some(outdoor), Some(back)) =
        (corners.state(2), corners.state(1), corners.state(0))
    else {
        return Ok(());
    };
    let (x, v_o, v_r) = (share.si(), outdoor.specific_volume().si(), back.specific_volume().si());
    outcome.push(
        Figure::new(
            "volume_share",
            "The same by volume",
            Share::from_si(x * v_o / (x * v_o + (1.0 - x) * v_r)).amount(),
            SHARE,
        )
        .role(Role::Detail),
    );
    let supply = match SUPPLY_FLOW.read(given, here, &[("actual_mixed", mixed)])? {
        Ok(supply) => supply,
        Err(missing) => {
            if given.reading(&SUPPLY_FLOW.rate_key(given)).is_some() {
                outcome.waits.push(missing);
            }
            return Ok(());
        }
    };
    let dry_air = DryAirFlow::from_si(x * supply.dry_air.si());
    let figure = |key, label, amount| Figure::new(key, label, amount, FLOWS);
    outcome.push(
        figure("outdoor_flow", "Outdoor air", AirFlow::from_si(dry_air.si() * v_o).amount())
            .on_condition(Sentence::new("actual, as it is outdoors")),
    );
    outcome.push(
        figure("outdoor_dry_air", "Outdoor air, as dry air", dry_air.amount()).role(Role::Detail),
    );
    outcome.steps.push(supply.step);
    Ok(())
}

fn judge(corners: &Corners, usable: &[Method], outcome: &mut Outcome) {
    for method in usable {
        // Without a known ± a little beyond is still the readings’.
        if !(-0.05..=1.05).contains(&method.share.si()) {
            outcome.notes.push(cannot_mix(method.kind.key, method.share.amount()));
        }
    }
    if let (Corner { dry_bulb: Some(back), .. }, Corner { dry_bulb: Some(outdoor), .. }) =
        (&corners.points[0], &corners.points[1])
    {
        let apart = TemperatureInterval::from_si((outdoor.si() - back.si()).abs());
        if apart.si() < 6.0 && usable.iter().any(|method| method.kind.key == "temperature") {
            outcome.notes.push(Note::remark(
                "mild_day",
                Sentence::new(
                    "Outdoor and return are only {0} apart: temperatures say little on a mild day.",
                )
                .with(apart.amount()),
            ));
        }
    }
    outcome.notes.push(
        Note::remark("layers", Sentence::new("Mixed air is never mixed."))
            .because(Sentence::new("Take nine points or more, or read the supply with coils shut and take off the fan’s rise.")),
    );
}

fn steps(usable: &[Method]) -> Vec<Step> {
    usable
        .iter()
        .map(|method| {
            Step::new(
                method.kind.label,
                method.kind.formula,
                Sentence::new("x = {0}").with(method.share.amount()),
                "balance of dry air and of what is compared; by mass",
            )
        })
        .collect()
}

impl Corners {
    fn finish(self, outcome: &mut Outcome) {
        if let (Some(back), Some(outdoor)) = (self.state(0).copied(), self.state(1).copied()) {
            outcome.lines.push(Line { from: back, to: outdoor, kind: LineKind::Mixing });
        }
        for ((point, label, _, mark), corner) in POINTS.into_iter().zip(self.points) {
            let Some(read) = corner.read else { continue };
            if read.saturated {
                outcome.saturated.push(point.prefix.to_owned());
            }
            outcome.notes.extend(read.notes);
            outcome.states.push(StatePoint {
                key: point.prefix.into(),
                label: label.into(),
                mark: Some(mark),
                air: read.air,
            });
        }
    }
}
