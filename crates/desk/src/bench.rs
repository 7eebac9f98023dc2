//! The bench: the probes at hand, which one is used for what, and what was found of them side by side.

use std::collections::BTreeMap;

use dewledger_checks::statement::Statement;
use dewledger_ledger::{Kind as Record, Within};
use dewledger_quantities::Kind;

use crate::desk::Asked;
use crate::instruments::InstrumentBody;
use crate::places::body;
use crate::probe::read_probe;
use crate::reply::Fault;
use crate::request::{Place, Typed, TypedProbe};
use crate::runs;

/// Key of the preference that holds which probe was used last for what, as `dry_bulb:temperature=instrument/probe`.
const STICKY: &str = "probes";

/// A probe that can be read with.
#[derive(Debug, Clone)]
pub(crate) struct KnownProbe {
    /// `instrument/probe`.
    pub(crate) id: String,
    /// "Stem thermometer, wet bulb".
    pub(crate) label: String,
    pub(crate) kind: Kind,
    pub(crate) statement: Statement,
    pub(crate) reads: BTreeMap<String, String>,
    /// As typed, for the record.
    pub(crate) typed: TypedProbe,
    pub(crate) withdrawn: bool,
}

impl KnownProbe {
    /// Whether readings of a kind can come from it.
    pub(crate) fn can_read(&self, kind: Kind) -> bool {
        self.kind == kind || self.statement.unit.measures(kind) && alike(self.kind, kind)
    }
}

/// Kinds that one instrument reads under two names: a hood's flow, actual or standard.
fn alike(one: Kind, other: Kind) -> bool {
    let flow = |kind| matches!(kind, Kind::AirFlow | Kind::StandardAirFlow);
    flow(one) && flow(other)
}

/// What a probe was found to read apart from the others in the same air.
#[derive(Debug, Clone, PartialEq)]
pub(crate) struct Correction {
    pub(crate) probe: String,
    pub(crate) kind: Kind,
    /// Taken off each reading, in stored SI steps.
    pub(crate) offset_si: f64,
    /// Identity of the run: what the probes of one run still share.
    pub(crate) run: String,
    /// Standard uncertainty of what they share: that of what they were held against.
    pub(crate) shared_u_si: f64,
    /// Standard uncertainty of the comparison itself, this probe's own from now on.
    pub(crate) own_u_si: f64,
}

/// The bench.
#[derive(Debug, Clone, Default)]
pub(crate) struct Bench {
    pub(crate) probes: Vec<KnownProbe>,
    pub(crate) corrections: Vec<Correction>,
    sticky: BTreeMap<String, String>,
}

/// What a probe is remembered for: the last part of the reading's key, and its kind.
fn remembered_as(key: &str, kind: Kind) -> String {
    let last = key.rsplit('.').next().unwrap_or(key);
    format!("{last}:{}", kind.id())
}

impl Bench {
    /// The bench as it stands at a place.
    pub(crate) fn at(at: &Asked<'_>, place: &Place) -> Result<Bench, Fault> {
        let mut bench = Bench { sticky: sticky(at), ..Bench::default() };
        for head in at.state.ledger.list(Record::Instrument, Within::Everything)? {
            let known: InstrumentBody = body(&head);
            let many = known.typed.probes.len() > 1;
            for typed in known.typed.probes {
                let Some(id) = typed.id.clone() else { continue };
                let Ok(read) = read_probe(&typed, "") else { continue };
                let label = if many && !typed.name.trim().is_empty() {
                    format!("{}, {}", head.body.title, typed.name.trim())
                } else {
                    head.body.title.clone()
                };
                bench.probes.push(KnownProbe {
                    id: format!("{}/{id}", head.record),
                    label,
                    kind: read.kind,
                    statement: read.statement,
                    reads: read.reads,
                    typed,
                    withdrawn: head.withdrawn,
                });
            }
        }
        bench.probes.sort_by(|one, other| one.label.cmp(&other.label));
        if let Some(visit) = &place.visit {
            bench.corrections = runs::corrections(at, visit, &bench)?;
        }
        Ok(bench)
    }

    pub(crate) fn probe(&self, id: &str) -> Option<&KnownProbe> {
        self.probes.iter().find(|probe| probe.id == id)
    }

    /// The probe that a reading counts as read with: the one named, else the one named for its like in this form,
    /// else the one used last.
    pub(crate) fn used(&self, key: &str, kind: Kind, typed: &Typed) -> Option<&KnownProbe> {
        let named = typed.readings.get(key).and_then(|reading| reading.probe.as_deref());
        if let Some(named) = named {
            return self.probe(named).filter(|probe| probe.can_read(kind));
        }
        let as_what = remembered_as(key, kind);
        let like = typed
            .readings
            .iter()
            .filter(|(other, _)| remembered_as(other, kind) == as_what)
            .find_map(|(_, reading)| reading.probe.as_deref());
        let id = like.or_else(|| self.sticky.get(&as_what).map(String::as_str))?;
        self.probe(id).filter(|probe| probe.can_read(kind) && !probe.withdrawn)
    }

    /// What was found of a probe side by side, where that is applied.
    pub(crate) fn correction(&self, probe: &str, kind: Kind) -> Option<&Correction> {
        self.corrections.iter().rev().find(|found| found.probe == probe && found.kind == kind)
    }
}

fn sticky(at: &Asked<'_>) -> BTreeMap<String, String> {
    let kept = at.state.ledger.preference(STICKY).ok().flatten().unwrap_or_default();
    let pair =
        |pair: &str| pair.split_once('=').map(|(what, probe)| (what.to_owned(), probe.to_owned()));
    kept.split(' ').filter_map(pair).collect()
}

/// Remembers which probes were used for what, so that the next form begins with them.
pub(crate) fn remember(
    at: &mut Asked<'_>,
    used: impl Iterator<Item = (String, Kind, Option<String>)>,
) -> Result<(), Fault> {
    let before = sticky(at);
    let mut sticky = before.clone();
    for (key, kind, probe) in used {
        match probe {
            Some(probe) => sticky.insert(remembered_as(&key, kind), probe),
            None => sticky.remove(&remembered_as(&key, kind)),
        };
    }
    if sticky != before {
        let text: Vec<String> =
            sticky.iter().map(|(what, probe)| format!("{what}={probe}")).collect();
        at.state.ledger.set_preference(STICKY, &text.join(" "))?;
    }
    Ok(())
}
