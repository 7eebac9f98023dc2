//! A probe as typed, read: its statement, and what is wrong with it.

use std::collections::BTreeMap;

use dewledger_checks::statement::{
    Band, Coverage, Statement, StatementError, USUAL_CALIBRATION_SHARE,
};
use dewledger_quantities::{Entry, Kind, Unit, read};

use crate::reply::FieldError;
use crate::request::{TypedBand, TypedProbe};

/// A number without a unit of its own; none where it is blank.
pub(crate) fn number(text: &str) -> Result<Option<f64>, String> {
    let Some(unit) = Unit::find("1") else { return Ok(None) };
    match read(Kind::Ratio, text, unit).map_err(|error| error.to_string())? {
        Entry::NotRead => Ok(None),
        Entry::Read(typed) => Ok(Some(typed.amount.si())),
    }
}

/// A probe that has been read.
#[derive(Debug, Clone)]
pub(crate) struct ReadProbe {
    pub(crate) kind: Kind,
    pub(crate) statement: Statement,
    pub(crate) reads: BTreeMap<String, String>,
}

/// Collects what is wrong, by the place of the field.
struct Reader<'a> {
    at: &'a str,
    errors: Vec<FieldError>,
}

impl Reader<'_> {
    fn wrong(&mut self, field: &str, says: impl Into<String>) {
        self.errors.push(FieldError { field: format!("{}.{field}", self.at), says: says.into() });
    }

    fn number(&mut self, field: &str, text: &str) -> Option<f64> {
        number(text).unwrap_or_else(|says| {
            self.wrong(field, says);
            None
        })
    }

    fn band(&mut self, index: usize, typed: &TypedBand) -> Band {
        let mut read =
            |field: &str, text: &str| self.number(&format!("bands.{index}.{field}"), text);
        Band {
            up_to: read("up_to", &typed.up_to),
            absolute: read("absolute", &typed.absolute).unwrap_or(0.0),
            of_reading: read("of_reading", &typed.of_reading).unwrap_or(0.0) / 100.0,
            of_range: read("of_range", &typed.of_range).unwrap_or(0.0) / 100.0,
            counts: read("counts", &typed.counts).unwrap_or(0.0),
            greater: typed.greater,
        }
    }
}

/// The unit of a probe's statement: its own, where that measures what it reads.
pub(crate) fn unit(typed: &TypedProbe, kind: Kind) -> Option<&'static Unit> {
    Unit::find(&typed.unit).filter(|unit| unit.measures(kind))
}

/// Reads a probe; `at` is its place in the form (`probes.0`).
pub(crate) fn read_probe(typed: &TypedProbe, at: &str) -> Result<ReadProbe, Vec<FieldError>> {
    let mut reader = Reader { at, errors: Vec::new() };
    let Some(kind) = Kind::from_id(&typed.quantity) else {
        reader.wrong("quantity", "Say what it reads.");
        return Err(reader.errors);
    };
    let Some(unit) = unit(typed, kind) else {
        reader.wrong("unit", "Say in which unit its accuracy is stated.");
        return Err(reader.errors);
    };
    let bands =
        typed.bands.iter().enumerate().map(|(index, band)| reader.band(index, band)).collect();
    let coverage = match typed.coverage.as_str() {
        "ninety_five" => Coverage::NinetyFive,
        "one_sigma" => Coverage::OneSigma,
        _ => Coverage::Limits,
    };
    let share = reader.number("calibration_share", &typed.calibration_share);
    let statement = Statement {
        unit,
        bands,
        range: reader.number("range", &typed.range),
        resolution: reader.number("resolution", &typed.resolution).unwrap_or(0.0),
        coverage,
        calibration_share: share.map_or(USUAL_CALIBRATION_SHARE, |share| share / 100.0),
    };
    reader.number("response", &typed.response);
    for (field, text) in [("calibrated", &typed.calibrated), ("due", &typed.due)] {
        if !text.trim().is_empty() && date(text).is_none() {
            reader.wrong(field, "Write the day as 2026-03-01.");
        }
    }
    if let Err(error) = statement.check() {
        reader.wrong(&place(&statement, &error), error.to_string());
    }
    if reader.errors.is_empty() {
        Ok(ReadProbe { kind, statement, reads: typed.reads.clone() })
    } else {
        Err(reader.errors)
    }
}

/// The field in which a statement is wrong.
fn place(statement: &Statement, error: &StatementError) -> String {
    let bands = &statement.bands;
    let in_band = |wrong: &dyn Fn(&str, f64) -> bool| {
        bands.iter().enumerate().find_map(|(index, band)| {
            [
                ("absolute", band.absolute),
                ("of_reading", band.of_reading),
                ("of_range", band.of_range),
                ("counts", band.counts),
            ]
            .into_iter()
            .find(|(field, number)| wrong(field, *number))
            .map(|(field, _)| format!("bands.{index}.{field}"))
        })
    };
    let beside = |field: &str| Some(field.to_owned());
    let found = match error {
        StatementError::NoRange => beside("range"),
        StatementError::NoResolution => beside("resolution"),
        StatementError::CalibrationShare => beside("calibration_share"),
        StatementError::Negative => in_band(&|_, number| number < 0.0).or_else(|| {
            let field = if statement.resolution < 0.0 {
                "resolution"
            } else if statement.range.is_some_and(|range| range < 0.0) {
                "range"
            } else {
                "calibration_share"
            };
            beside(field)
        }),
        StatementError::TooLarge => {
            in_band(&|field, number| field.starts_with("of_") && number > 0.5)
        }
        StatementError::Empty => bands
            .iter()
            .position(|band| band.absolute + band.of_reading + band.of_range + band.counts <= 0.0)
            .map(|index| format!("bands.{index}.absolute")),
        StatementError::Bands => {
            let ends: Vec<f64> =
                bands.iter().map(|band| band.up_to.unwrap_or(f64::INFINITY)).collect();
            // The end that does not lie below the next one; where all do, the last band has an end.
            let index =
                ends.windows(2).position(|pair| pair[0] >= pair[1]).unwrap_or(ends.len() - 1);
            beside(&format!("bands.{index}.up_to"))
        }
    };
    found.unwrap_or_else(|| "bands.0.absolute".to_owned())
}

/// A day as typed.
pub(crate) fn date(text: &str) -> Option<jiff::civil::Date> {
    text.trim().parse().ok()
}
