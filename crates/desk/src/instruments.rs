//! The register of instruments.

use dewledger_checks::part::half_width;
use dewledger_ledger::{Body, Head, InstrumentId, Kind as Record, RecordId, Within};
use dewledger_quantities::{Amount, Kind, Unit, UnitChoice, show, show_with};
use serde::{Deserialize, Serialize};

use crate::classes::{self, CLASSES};
use crate::clock;
use crate::desk::{Asked, VERSION};
use crate::form_view::unit_view;
use crate::places::{body, capital, json};
use crate::probe::{self, ReadProbe, read_probe};
use crate::reply::{
    ChoiceView, Fault, FieldError, InstrumentForm, InstrumentRow, InstrumentsView, OptionView,
    ProbeForm, Reply,
};
use crate::request::{TypedBand, TypedInstrument, TypedProbe};

/// An instrument's body.
#[derive(Debug, Clone, Default, PartialEq, Serialize, Deserialize)]
pub(crate) struct InstrumentBody {
    pub(crate) typed: TypedInstrument,
}

/// What an instrument can read, in the order of the list.
const READABLE: &[Kind] = &[
    Kind::Temperature,
    Kind::RelativeHumidity,
    Kind::AirFlow,
    Kind::Velocity,
    Kind::PressureDifference,
    Kind::Pressure,
    Kind::WaterFlow,
    Kind::CondensateFlow,
    Kind::WaterVolume,
    Kind::Duration,
    Kind::Power,
    Kind::Voltage,
    Kind::Current,
    Kind::MoleFraction,
    Kind::Length,
];

const SAYS: &str = "A probe’s accuracy statement gives every reading its ±. Readings of one probe share its \
                    calibration, so an offset cancels where one is taken from another.";

fn record(text: &str) -> Result<RecordId, Fault> {
    let id: InstrumentId = text.parse().map_err(|_| Fault::not_found("That instrument"))?;
    Ok(RecordId::Instrument(id))
}

fn option(value: &str, label: &str, help: &str) -> OptionView {
    OptionView {
        value: value.to_owned(),
        label: label.to_owned(),
        help: (!help.is_empty()).then(|| help.to_owned()),
    }
}

pub(crate) fn list(at: &Asked<'_>) -> Result<Reply, Fault> {
    let mut instruments: Vec<InstrumentRow> = at
        .state
        .ledger
        .list(Record::Instrument, Within::Everything)?
        .iter()
        .map(|head| row(at, head))
        .collect();
    instruments.sort_by_key(|row| (row.withdrawn, row.name.to_lowercase()));
    Ok(Reply::Instruments(InstrumentsView {
        instruments,
        classes: CLASSES.iter().map(|class| option(class.id, class.label, class.help)).collect(),
        says: SAYS.to_owned(),
    }))
}

fn row(at: &Asked<'_>, head: &Head) -> InstrumentRow {
    let known: InstrumentBody = body(head);
    let mut says = Vec::new();
    if !known.typed.serial.trim().is_empty() {
        says.push(format!("serial {}", known.typed.serial.trim()));
    }
    let names: Vec<String> = known.typed.probes.iter().map(name).collect();
    says.push(names.join(", "));
    let today = clock::date(at.now);
    let earliest = known.typed.probes.iter().filter_map(|p| probe::date(&p.due)).min();
    let overdue = earliest.is_some_and(|due| due < today);
    let due = earliest.map(|due| {
        let day = due.strftime("%-d %B %Y");
        if overdue {
            format!("Calibration was due on {day}")
        } else {
            format!("Calibration due on {day}")
        }
    });
    InstrumentRow {
        instrument: head.record.to_string(),
        name: head.body.title.clone(),
        says: capital(&says.join(": ")),
        due,
        overdue,
        withdrawn: head.withdrawn,
        invented: head.body.invented,
    }
}

/// A probe's own name, else what it reads.
fn name(probe: &TypedProbe) -> String {
    if probe.name.trim().is_empty() {
        Kind::from_id(&probe.quantity).map_or_else(String::new, |kind| kind.label().to_owned())
    } else {
        probe.name.trim().to_owned()
    }
}

pub(crate) fn form(
    at: &Asked<'_>,
    instrument: Option<&str>,
    class: Option<&str>,
    typed: Option<TypedInstrument>,
) -> Result<Reply, Fault> {
    let head =
        instrument.map(|id| record(id).and_then(|id| Ok(at.state.ledger.head(id)?))).transpose()?;
    let stands = head.as_ref().map(|head| body::<InstrumentBody>(head).typed);
    let started = match class {
        Some(class) => Some(classes::typed(class).ok_or_else(|| Fault::not_found("That class"))?),
        None => None,
    };
    let blank = || TypedInstrument {
        probes: vec![TypedProbe {
            quantity: "temperature".to_owned(),
            unit: at.state.units.get(Kind::Temperature).id.to_owned(),
            bands: vec![TypedBand::default()],
            ..TypedProbe::default()
        }],
        ..TypedInstrument::default()
    };
    let typed = typed.or(stands).or(started).unwrap_or_else(blank);
    let read = read_all(&typed);
    let errors = read.iter().filter_map(|probe| probe.as_ref().err()).flatten().cloned().collect();
    Ok(Reply::InstrumentForm(Box::new(InstrumentForm {
        instrument: instrument.map(str::to_owned),
        probes: typed
            .probes
            .iter()
            .zip(&read)
            .map(|(typed, read)| probe_form(typed, read.as_ref().ok(), &at.state.units))
            .collect(),
        typed,
        errors,
        withdrawn: head.is_some_and(|head| head.withdrawn),
        quantities: READABLE
            .iter()
            .map(|kind| option(kind.id(), &capital(kind.label()), ""))
            .collect(),
        coverages: vec![
            option("limits", "Limits", "Never outside: what is taken where the paper does not say"),
            option("ninety_five", "95 %", "In 95 of 100 cases inside, as a certificate with k = 2"),
            option("one_sigma", "One standard deviation", "In 68 of 100 cases inside"),
        ],
    })))
}

fn read_all(typed: &TypedInstrument) -> Vec<Result<ReadProbe, Vec<FieldError>>> {
    typed
        .probes
        .iter()
        .enumerate()
        .map(|(index, probe)| read_probe(probe, &format!("probes.{index}")))
        .collect()
}

fn probe_form(typed: &TypedProbe, read: Option<&ReadProbe>, units: &UnitChoice) -> ProbeForm {
    let kind = Kind::from_id(&typed.quantity);
    ProbeForm {
        units: kind.map(|kind| Unit::of(kind).map(unit_view).collect()).unwrap_or_default(),
        unit: kind
            .and_then(|kind| probe::unit(typed, kind))
            .map_or_else(String::new, |unit| unit.symbol.to_owned()),
        reads: kind.map(|kind| ways(kind, typed)).unwrap_or_default(),
        comes_to: read.and_then(|read| comes_to(read, units)),
    }
}

/// Ways of reading that change what a number means.
fn ways(kind: Kind, typed: &TypedProbe) -> Vec<ChoiceView> {
    let choice = |key: &str, label: &str, options: Vec<OptionView>| ChoiceView {
        key: key.to_owned(),
        label: label.to_owned(),
        value: typed.reads.get(key).cloned(),
        options,
        help: None,
        error: None,
    };
    if matches!(kind, Kind::AirFlow | Kind::Velocity) {
        let options = vec![
            option("actual", "Actual flow", "What passes, at its own density"),
            option("standard", "Standard flow", "At a standard density: a mass flow in disguise"),
        ];
        return vec![choice("flow", "It shows", options)];
    }
    if kind == Kind::Temperature && typed.name.to_lowercase().contains("wet") {
        let options = vec![
            option("measured", "Measured with a wick", ""),
            option(
                "sea_level",
                "Worked out for sea-level pressure",
                "Wrong at height: by 0.6 K at 1 600 m",
            ),
            option("here", "Worked out for the pressure set on it", ""),
        ];
        return vec![choice("wet_bulb", "Its wet bulb is", options)];
    }
    Vec::new()
}

/// What a statement comes to at an everyday reading.
fn comes_to(read: &ReadProbe, units: &UnitChoice) -> Option<String> {
    let si = crate::units::everyday(read.kind);
    let parts = read.statement.parts(read.kind, si, "", "")?;
    let shared: Vec<_> = parts
        .iter()
        .filter(|part| matches!(part.source, dewledger_checks::part::Source::Shared { .. }))
        .cloned()
        .collect();
    let unit = units.get(read.kind);
    let width = |half_width: f64| show_width(Amount::new(read.kind, si), half_width, unit);
    let whole = width(half_width(&parts)?);
    let at = show(Amount::new(read.kind, si), unit).text();
    Some(match half_width(&shared) {
        Some(shared) => {
            format!("{whole} at {at} (95 %), of which {} is calibration", width(shared))
        }
        None => format!("{whole} at {at} (95 %), all of it new at each reading"),
    })
}

/// "± 0.21 K".
pub(crate) fn show_width(amount: Amount, half_width_si: f64, unit: &'static Unit) -> String {
    let (_, width) = show_with(amount, half_width_si, unit);
    format!("± {}", width.text())
}

pub(crate) fn save(
    at: &mut Asked<'_>,
    instrument: Option<&str>,
    mut typed: TypedInstrument,
) -> Result<Reply, Fault> {
    typed.name = typed.name.trim().to_owned();
    if typed.name.is_empty() {
        return Err(Fault::at("name", "An instrument needs a name, as the team calls it."));
    }
    if typed.name.chars().count() > 200 {
        return Err(Fault::at("name", "A name of up to 200 characters is enough."));
    }
    if typed.probes.is_empty() {
        return Err(Fault::at("probes", "Say at least what it reads and how accurately."));
    }
    for read in read_all(&typed) {
        if let Err(errors) = read
            && let Some(first) = errors.into_iter().next()
        {
            return Err(Fault::at(first.field, first.says));
        }
    }
    // A probe keeps its identity through every revision: its calibration is shared by all it read.
    let mut highest = typed
        .probes
        .iter()
        .filter_map(|probe| probe.id.as_deref()?.parse::<u32>().ok())
        .max()
        .unwrap_or(0);
    for probe in &mut typed.probes {
        if probe.id.is_none() {
            highest += 1;
            probe.id = Some(highest.to_string());
        }
    }
    let title = typed.name.clone();
    let new = Body {
        title: title.clone(),
        app_version: VERSION.to_owned(),
        text: json(&InstrumentBody { typed })?,
        ..Body::default()
    };
    let revision = match instrument {
        None => at.state.ledger.file(Record::Instrument, at.now, &new, None)?,
        Some(id) => {
            let head = at.state.ledger.head(record(id)?)?;
            let new = Body { invented: head.body.invented, ..new };
            at.state.ledger.revise(&head, at.now, &new, None)?
        }
    };
    Ok(Reply::InstrumentSaved {
        instrument: revision.record.to_string(),
        says: format!("{title} kept"),
    })
}

pub(crate) fn withdraw(
    at: &mut Asked<'_>,
    instrument: &str,
    withdrawn: bool,
) -> Result<Reply, Fault> {
    let head = at.state.ledger.head(record(instrument)?)?;
    at.state.ledger.withdraw(&head, at.now, withdrawn)?;
    list(at)
}
