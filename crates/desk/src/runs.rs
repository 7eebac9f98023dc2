//! Probes side by side: several held in the same air at the start and the end of a visit.
//!
//! What a probe shows above what it is held against is recorded with the visit. Where it is applied, every reading
//! of that probe at this visit is corrected by it, and says so; the probes of the run then share what they were held
//! against (one probe's calibration, or the mean of all), and each keeps the doubt of the comparison.

use dewledger_checks::doubt::COVERAGE_95;
use dewledger_checks::part::{Part, Source};
use dewledger_ledger::{Body, Head, RecordId};
use dewledger_quantities::{Amount, Entry, Kind, Unit, UnitChoice, read, show};
use serde::{Deserialize, Serialize};

use crate::bench::{Bench, Correction, KnownProbe};
use crate::clock;
use crate::desk::{Asked, VERSION};
use crate::form_view::unit_view;
use crate::places::{body, capital, json, visit_id};
use crate::reply::{Fault, OptionView, Reply, RunRow, RunView};
use crate::request::{Place, TypedRun, TypedRunRow};
use crate::visits::{self, VisitBody};

/// A run as it is kept with its visit.
#[derive(Debug, Clone, Default, PartialEq, Serialize, Deserialize)]
pub(crate) struct KeptRun {
    pub(crate) typed: TypedRun,
    pub(crate) at_ms: i64,
}

/// One probe of a run, worked out.
struct Found<'a> {
    probe: &'a KnownProbe,
    si: f64,
    own_u: f64,
    calibration_u: f64,
}

fn head(at: &Asked<'_>, visit: &str) -> Result<Head, Fault> {
    Ok(at.state.ledger.head(RecordId::Visit(visit_id(visit)?))?)
}

fn root_sum(parts: impl Iterator<Item = f64>) -> f64 {
    parts.map(|part| part * part).sum::<f64>().sqrt()
}

fn unit_of(kind: Kind, row: &TypedRunRow, units: &UnitChoice) -> &'static Unit {
    row.value
        .unit
        .as_deref()
        .and_then(Unit::find)
        .filter(|unit| unit.measures(kind))
        .unwrap_or_else(|| units.get(kind))
}

/// What one probe showed; none while it is not read, or cannot be.
fn found<'a>(
    kind: Kind,
    row: &TypedRunRow,
    bench: &'a Bench,
    units: &UnitChoice,
) -> Option<Found<'a>> {
    let probe = bench.probe(&row.probe)?;
    let Ok(Entry::Read(number)) = read(kind, &row.value.text, unit_of(kind, row, units)) else {
        return None;
    };
    let si = number.amount.si();
    let parts = probe.statement.parts(kind, si, "", "")?;
    let own = |part: &&Part| part.source == Source::Own;
    Some(Found {
        probe,
        si,
        own_u: root_sum(parts.iter().filter(own).map(|part| part.u_si)),
        calibration_u: root_sum(parts.iter().filter(|part| !own(part)).map(|part| part.u_si)),
    })
}

/// A run worked out.
struct Worked<'a> {
    kind: Kind,
    found: Vec<Found<'a>>,
    /// Index of the probe that the others are held against; none is the mean.
    against: Option<usize>,
    reference_si: f64,
}

impl<'a> Worked<'a> {
    /// None while fewer than two probes are read, or the one held against is not.
    fn of(typed: &TypedRun, bench: &'a Bench, units: &UnitChoice) -> Option<Self> {
        let kind = Kind::from_id(&typed.quantity)?;
        let found: Vec<Found<'a>> =
            typed.rows.iter().filter_map(|row| found(kind, row, bench, units)).collect();
        if found.len() < 2 {
            return None;
        }
        let named = typed.against.as_deref().filter(|id| !id.is_empty());
        let against = match named {
            Some(id) => Some(found.iter().position(|one| one.probe.id == id)?),
            None => None,
        };
        #[expect(clippy::cast_precision_loss, reason = "a handful of probes")]
        let mean = found.iter().map(|one| one.si).sum::<f64>() / found.len() as f64;
        let reference_si = against.map_or(mean, |index| found[index].si);
        Some(Self { kind, found, against, reference_si })
    }

    /// Weight of another probe in what one is held against.
    #[expect(clippy::cast_precision_loss, reason = "a handful of probes")]
    fn weight(&self, index: usize) -> f64 {
        match self.against {
            Some(reference) => f64::from(u8::from(reference == index)),
            None => 1.0 / self.found.len() as f64,
        }
    }

    /// Standard uncertainty of what all are held against, by calibration.
    fn shared_u(&self) -> f64 {
        let parts = self.found.iter().enumerate();
        root_sum(parts.map(|(index, one)| self.weight(index) * one.calibration_u))
    }

    /// Standard uncertainty of one probe's offset, by these parts of all.
    fn offset_u(&self, index: usize, part: impl Fn(&Found<'_>) -> f64) -> f64 {
        root_sum(self.found.iter().enumerate().map(|(other, one)| {
            let own = f64::from(u8::from(other == index));
            (own - self.weight(other)) * part(one)
        }))
    }

    fn offset(&self, index: usize) -> f64 {
        self.found[index].si - self.reference_si
    }

    /// Further apart than both accuracies allow.
    fn too_far(&self, index: usize) -> bool {
        let whole = |one: &Found<'_>| one.own_u.hypot(one.calibration_u);
        self.offset(index).abs() > COVERAGE_95 * self.offset_u(index, whole)
    }
}

/// What the runs of a visit say of its probes, where they are applied; the newest counts.
pub(crate) fn corrections(
    at: &Asked<'_>,
    visit: &str,
    bench: &Bench,
) -> Result<Vec<Correction>, Fault> {
    let known: VisitBody = body(&head(at, visit)?);
    let mut all = Vec::new();
    for (number, run) in known.runs.iter().enumerate() {
        if !run.typed.apply {
            continue;
        }
        let Some(worked) = Worked::of(&run.typed, bench, &at.state.units) else { continue };
        for (index, one) in worked.found.iter().enumerate() {
            all.push(Correction {
                probe: one.probe.id.clone(),
                kind: worked.kind,
                offset_si: worked.offset(index),
                run: format!("{visit}/run-{number}"),
                shared_u_si: worked.shared_u(),
                own_u_si: worked.offset_u(index, |one| one.own_u),
            });
        }
    }
    Ok(all)
}

/// The runs of a visit in a line each.
pub(crate) fn rows(at: &Asked<'_>, known: &VisitBody) -> Vec<OptionView> {
    let view = |(index, run): (usize, &KeptRun)| {
        let read = run.typed.rows.iter().filter(|row| !row.value.text.trim().is_empty()).count();
        let applied = if run.typed.apply {
            "what was found is taken off every reading"
        } else {
            "recorded, not applied"
        };
        OptionView {
            value: index.to_string(),
            label: title(at, &run.typed, Some(run.at_ms)),
            help: Some(format!("{read} probes; {applied}")),
        }
    };
    known.runs.iter().enumerate().map(view).collect()
}

fn title(at: &Asked<'_>, typed: &TypedRun, at_ms: Option<i64>) -> String {
    let mut title = capital(Kind::from_id(&typed.quantity).map_or("", Kind::label));
    title.push_str(if typed.when == "end" { ", at the end" } else { ", at the start" });
    if let Some(ms) = at_ms {
        let when = dewledger_ledger::At { ms, ..at.now };
        title = format!("{title}, {}", clock::time(when));
    }
    title
}

pub(crate) fn form(
    at: &Asked<'_>,
    visit: &str,
    index: Option<usize>,
    typed: Option<TypedRun>,
) -> Result<Reply, Fault> {
    let known: VisitBody = body(&head(at, visit)?);
    let kept = match index {
        Some(index) => {
            Some(known.runs.get(index).cloned().ok_or_else(|| Fault::not_found("That run"))?)
        }
        None => None,
    };
    let bench = Bench::at(at, &Place::default())?;
    let typed =
        typed.or_else(|| kept.as_ref().map(|kept| kept.typed.clone())).unwrap_or_else(|| {
            TypedRun {
                quantity: Kind::Temperature.id().to_owned(),
                when: "start".to_owned(),
                ..TypedRun::default()
            }
        });
    let at_ms = kept.map(|kept| kept.at_ms);
    Ok(Reply::Run(Box::new(view(at, index, at_ms, typed, &bench))))
}

fn view(
    at: &Asked<'_>,
    index: Option<usize>,
    at_ms: Option<i64>,
    typed: TypedRun,
    bench: &Bench,
) -> RunView {
    let units = &at.state.units;
    let kind = Kind::from_id(&typed.quantity).unwrap_or(Kind::Temperature);
    let worked = Worked::of(&typed, bench, units);
    let in_use = |probe: &&KnownProbe| {
        !probe.withdrawn || typed.rows.iter().any(|row| row.probe == probe.id)
    };
    let rows = bench
        .probes
        .iter()
        .filter(|probe| probe.kind == kind)
        .filter(in_use)
        .map(|probe| row(kind, probe, &typed, worked.as_ref(), units))
        .collect();
    let says = match &worked {
        Some(worked) if (0..worked.found.len()).any(|index| worked.too_far(index)) => {
            "One probe is further off than its accuracy allows: have it calibrated, and do not lean on it today.".to_owned()
        }
        Some(_) => "They agree within their accuracy.".to_owned(),
        None => "Hold two or more probes in the same moving air, out of the sun and away from the coil, until all stand still.".to_owned(),
    };
    let mut quantities: Vec<OptionView> = Vec::new();
    for probe in &bench.probes {
        let many = bench.probes.iter().filter(|other| other.kind == probe.kind).count() > 1;
        let id = probe.kind.id();
        if many && !quantities.iter().any(|option| option.value == id) {
            let label = capital(probe.kind.label());
            quantities.push(OptionView { value: id.to_owned(), label, help: None });
        }
    }
    RunView { index, title: title(at, &typed, at_ms), rows, quantities, says, typed }
}

fn row(
    kind: Kind,
    probe: &KnownProbe,
    typed: &TypedRun,
    worked: Option<&Worked<'_>>,
    units: &UnitChoice,
) -> RunRow {
    let blank = TypedRunRow { probe: probe.id.clone(), ..TypedRunRow::default() };
    let row = typed.rows.iter().find(|row| row.probe == probe.id).unwrap_or(&blank);
    let unit = unit_of(kind, row, units);
    let error = read(kind, &row.value.text, unit).err().map(|error| error.to_string());
    let found = worked.and_then(|worked| {
        let index = worked.found.iter().position(|one| one.probe.id == probe.id)?;
        Some((worked, index))
    });
    let offset = found.map(|(worked, index)| {
        if worked.against == Some(index) {
            return "the others are held against it".to_owned();
        }
        let difference = kind.difference();
        let width_unit = unit.for_difference(kind).unwrap_or_else(|| units.get(difference));
        let size = Amount::new(difference, worked.offset(index).abs());
        let text = show(size, width_unit).text();
        match worked.offset(index) {
            offset if offset.abs() < 1e-9 => "no difference".to_owned(),
            offset if offset > 0.0 => format!("{text} above"),
            _ => format!("{text} below"),
        }
    });
    RunRow {
        probe: probe.id.clone(),
        label: probe.label.clone(),
        text: row.value.text.clone(),
        unit: unit_view(unit),
        offset,
        too_far: found.is_some_and(|(worked, index)| worked.too_far(index)),
        error,
    }
}

pub(crate) fn save(
    at: &mut Asked<'_>,
    visit: &str,
    index: Option<usize>,
    mut typed: TypedRun,
) -> Result<Reply, Fault> {
    let head = head(at, visit)?;
    let mut known: VisitBody = body(&head);
    let bench = Bench::at(at, &Place::default())?;
    let kind = Kind::from_id(&typed.quantity)
        .ok_or_else(|| Fault::at("quantity", "Say what the probes read."))?;
    for row in &mut typed.rows {
        let unit = unit_of(kind, row, &at.state.units);
        row.value.unit = Some(unit.id.to_owned());
        if let Err(error) = read(kind, &row.value.text, unit) {
            return Err(Fault::at(row.probe.clone(), error.to_string()));
        }
    }
    typed.rows.retain(|row| !row.value.text.trim().is_empty());
    if Worked::of(&typed, &bench, &at.state.units).is_none() {
        return Err(Fault::at(
            "rows",
            "A run needs two probes or more, and a reading of the one they are held against.",
        ));
    }
    match index {
        Some(index) => {
            let run = known.runs.get_mut(index).ok_or_else(|| Fault::not_found("That run"))?;
            run.typed = typed;
        }
        None => known.runs.push(KeptRun { typed, at_ms: at.now.ms }),
    }
    let new = Body { text: json(&known)?, app_version: VERSION.to_owned(), ..head.body.clone() };
    at.state.ledger.revise(&head, at.now, &new, None)?;
    visits::visit(at, visit)
}
