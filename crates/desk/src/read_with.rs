//! What a reading was read with, where, and how often: the parts of its ±, its takes, what was found side by side.

use std::collections::BTreeMap;

use dewledger_checks::doubt::COVERAGE_95;
use dewledger_checks::form::ReadingItem;
use dewledger_checks::part::{Part, Source, half_width};
use dewledger_checks::takes::{
    Steadiness, Summary, TOGETHER_FROM, Take, at as at_time, scatter_of_mean, steadiness, summary,
};
use dewledger_quantities::{Amount, Entry, Kind, PlusMinus, Unit, read, read_plus_minus};

use crate::bench::{Bench, Correction};
use crate::clock;
use crate::probe::number;
use crate::reply::Message;
use crate::request::{Typed, TypedReading, TypedSpot};

/// Takes within this of each other were made together, s: one look at one display.
const TOGETHER_S: f64 = 5.0;

/// What a reading was read with, worked out.
#[derive(Debug, Clone, Default)]
pub(crate) struct With {
    /// The probe, as `instrument/probe`.
    pub(crate) probe: Option<String>,
    /// What its ± is made of.
    pub(crate) parts: Vec<Part>,
    /// Takes that could be read.
    pub(crate) takes: Vec<Take>,
    /// What is wrong with those that could not, by their index.
    pub(crate) wrong: BTreeMap<usize, String>,
    /// The mean of the takes, or their value at another reading's time, before any correction.
    pub(crate) mean_si: Option<f64>,
    /// Whether it stood still.
    pub(crate) steadiness: Option<Steadiness>,
    /// 95 % half-width of its own part, without calibration.
    pub(crate) own_half_width_si: Option<f64>,
    /// The value before what was found side by side was taken off.
    pub(crate) before_si: Option<f64>,
}

/// Whether a reading has an instrument at all: not definitions and settings.
pub(crate) fn asked_of(item: &ReadingItem) -> bool {
    (!item.covered && item.kind != Kind::Elevation) || item.kind == Kind::Pressure
}

fn wrong(says: impl Into<String>) -> Message {
    Message { says: says.into(), acts: Vec::new() }
}

/// The takes of a reading, and what is wrong with those that cannot be read.
fn takes(
    kind: Kind,
    typed: &TypedReading,
    unit: &'static Unit,
) -> (Vec<Take>, BTreeMap<usize, String>) {
    let (mut takes, mut wrong) = (Vec::new(), BTreeMap::new());
    for (index, take) in typed.takes.iter().enumerate() {
        let at_s = match clock::moment_ms(&take.at) {
            #[expect(
                clippy::cast_precision_loss,
                reason = "milliseconds of this age, to the second"
            )]
            Some(ms) => ms as f64 / 1000.0,
            None => {
                wrong.insert(index, "Its time cannot be read.".to_owned());
                continue;
            }
        };
        match read(kind, &take.text, unit) {
            Ok(Entry::Read(number)) => takes.push(Take { at_s, si: number.amount.si() }),
            Ok(Entry::NotRead) => {
                wrong.insert(index, "It is blank.".to_owned());
            }
            Err(error) => {
                wrong.insert(index, error.to_string());
            }
        }
    }
    (takes, wrong)
}

impl With {
    /// Probe and takes of a reading, before its value is known.
    pub(crate) fn of(
        item: &ReadingItem,
        typed: &TypedReading,
        form: &Typed,
        unit: &'static Unit,
        bench: &Bench,
    ) -> Result<Self, Message> {
        let (takes, wrong_takes) = takes(item.kind, typed, unit);
        let mut with = With { takes, wrong: wrong_takes, ..With::default() };
        if asked_of(item) {
            let probe = bench.used(item.key.as_ref(), item.kind, form);
            with.probe = probe.map(|probe| probe.id.clone());
        }
        with.mean_si = summary(&with.takes).map(|summary| summary.mean_si);
        if let Some(other) = typed.at_time_of.as_deref().filter(|key| !key.is_empty())
            && let Some(other) = form.readings.get(other)
        {
            with.mean_si = Some(with.at_time_of(other)?);
        }
        Ok(with)
    }

    /// A-B-A: this reading at the other one's time.
    fn at_time_of(&self, other: &TypedReading) -> Result<f64, Message> {
        let times: Vec<f64> = other
            .takes
            .iter()
            .filter_map(|take| clock::moment_ms(&take.at))
            .map(|ms| {
                #[expect(
                    clippy::cast_precision_loss,
                    reason = "milliseconds of this age, to the second"
                )]
                let seconds = ms as f64 / 1000.0;
                seconds
            })
            .collect();
        let [first, ..] = times.as_slice() else {
            return Err(wrong("The other reading has no takes: take it between two of this one."));
        };
        #[expect(clippy::cast_precision_loss, reason = "a handful of takes")]
        let middle =
            first + times.iter().map(|time| time - first).sum::<f64>() / times.len() as f64;
        at_time(&self.takes, middle).ok_or_else(|| {
            wrong("Take this one before and after the other: there is no take on one side of its time.")
        })
    }

    /// The parts of the ± of a value that is now known, and the value after what was found side by side.
    pub(crate) fn finish(
        &mut self,
        item: &ReadingItem,
        typed: &TypedReading,
        amount: Amount,
        stated_si: Option<f64>,
        unit: &'static Unit,
        bench: &Bench,
    ) -> Result<Amount, Message> {
        let probe = self.probe.as_deref().and_then(|id| bench.probe(id));
        let found = probe.and_then(|probe| bench.correction(&probe.id, probe.kind));
        let corrected = match found {
            Some(found) => amount.moved(-found.offset_si),
            None => amount,
        };
        self.before_si = found.map(|_| amount.si());
        let mut parts = match (stated_si, probe) {
            // A ± typed by hand stands for the whole instrument, and shares nothing.
            (Some(half_width), _) => vec![Part::certain(Source::Own, half_width / COVERAGE_95)],
            (None, Some(probe)) => {
                let label = probe.label.as_str();
                let parts = probe
                    .statement
                    .parts(item.kind, amount.si(), &probe.id, label)
                    .unwrap_or_default();
                match found {
                    Some(found) => side_by_side(parts, found, label),
                    None => parts,
                }
            }
            (None, None) => Vec::new(),
        };
        let own: Vec<Part> =
            parts.iter().filter(|part| part.source == Source::Own).cloned().collect();
        self.own_half_width_si = half_width(&own);
        if !self.takes.is_empty() {
            self.steadiness = Some(match self.own_half_width_si {
                Some(own) => steadiness(&self.takes, own),
                None => Steadiness::NotJudged,
            });
        }
        // Place and scatter alone do not say what the instrument adds: the ± stays not known.
        if !parts.is_empty() {
            let step =
                probe.map_or(0.0, |probe| step_si(item.kind, amount.si(), probe.statement.unit));
            let resolution = probe.map_or(0.0, |probe| probe.statement.resolution * step);
            if let Some((u_si, freedom)) = scatter_of_mean(&self.takes, 0.0, resolution) {
                parts.push(Part { source: Source::Scatter, u_si, freedom });
            }
            if let Some(spot) = &typed.spot {
                parts.extend(place(item.kind, spot, amount.si(), unit)?);
            }
        }
        self.parts = parts;
        Ok(corrected)
    }

    pub(crate) fn summary(&self) -> Option<Summary> {
        summary(&self.takes)
    }
}

/// One step of a unit as a difference, in stored SI.
fn step_si(kind: Kind, si: f64, unit: &Unit) -> f64 {
    let value = unit.from_si(kind, si).unwrap_or(0.0);
    unit.to_si(kind, value + 1.0).map_or(0.0, |moved| moved - si)
}

/// Corrected by a run side by side, a probe shares what it was held against, and has the comparison for its own.
fn side_by_side(parts: Vec<Part>, found: &Correction, label: &str) -> Vec<Part> {
    let mut parts: Vec<Part> =
        parts.into_iter().filter(|part| part.source == Source::Own).collect();
    let shared = |id: String, name: &str, u_si: f64| Part::certain(Source::shared(id, name), u_si);
    parts.push(shared(found.run.clone(), "Probes run side by side", found.shared_u_si));
    parts.push(shared(
        format!("{}/{}", found.run, found.probe),
        &format!("{label}, side-by-side run"),
        found.own_u_si,
    ));
    parts.retain(|part| part.u_si != 0.0);
    parts
}

/// What the place adds: the spread of a grid over its points, and what is stated of it.
fn place(
    kind: Kind,
    spot: &TypedSpot,
    value_si: f64,
    unit: &'static Unit,
) -> Result<Vec<Part>, Message> {
    let width = |typed: &crate::request::TypedValue, what: &str| -> Result<Option<f64>, Message> {
        let unit = typed.unit.as_deref().and_then(Unit::find).unwrap_or(unit);
        let read = read_plus_minus(kind, &typed.text, unit)
            .map_err(|error| wrong(format!("{what}: {error}")))?;
        Ok(read.map(|width| match width {
            PlusMinus::Absolute(half_width) => half_width,
            PlusMinus::Relative(share) => share * value_si.abs(),
        }))
    };
    let mut parts = Vec::new();
    if let Some(half_width) = width(&spot.plus_minus, "The ± of the place")? {
        parts.push(Part::certain(Source::Place, half_width / COVERAGE_95));
    }
    if spot.held == "grid"
        && let Some(spread) = width(&spot.spread, "The spread of the grid")?
    {
        let points = number(&spot.points).map_err(wrong)?.unwrap_or(0.0);
        if points < 2.0 {
            return Err(wrong("Say how many points the grid has: two or more."));
        }
        parts.push(Part {
            source: Source::Place,
            u_si: spread / points.sqrt(),
            freedom: points - 1.0,
        });
    }
    Ok(parts)
}

/// Readings that were taken together, take by take, scatter together: their own scatter is replaced by what they share.
pub(crate) fn together(readings: &mut BTreeMap<String, With>) {
    let mut left: Vec<String> = readings
        .iter()
        .filter(|(_, with)| with.takes.len() >= TOGETHER_FROM && with.wrong.is_empty())
        .map(|(key, _)| key.clone())
        .collect();
    let mut group = 0;
    while let Some(first) = left.first().cloned() {
        let like = |key: &String| {
            let (one, other) = (&readings[&first].takes, &readings[key].takes);
            one.len() == other.len()
                && one.iter().zip(other).all(|(a, b)| (a.at_s - b.at_s).abs() <= TOGETHER_S)
        };
        let (keys, rest): (Vec<String>, Vec<String>) = left.into_iter().partition(like);
        left = rest;
        if keys.len() < 2 {
            continue;
        }
        group += 1;
        let values: Vec<Vec<f64>> = keys
            .iter()
            .map(|key| readings[key].takes.iter().map(|take| take.si).collect())
            .collect();
        let slices: Vec<&[f64]> = values.iter().map(Vec::as_slice).collect();
        let id = format!("takes-{group}");
        let Some(parts) =
            dewledger_checks::takes::together(&slices, &id, "Scatter of takes made together")
        else {
            continue;
        };
        for (key, shared) in keys.iter().zip(parts) {
            let Some(with) = readings.get_mut(key).filter(|with| !with.parts.is_empty()) else {
                continue;
            };
            with.parts.retain(|part| part.source != Source::Scatter);
            with.parts.extend(shared.into_iter().filter(|part| part.u_si != 0.0));
        }
    }
}
