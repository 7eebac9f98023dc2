//! Faults, and the JSON Schema of everything that crosses the edge.

use dewledger_ledger::WriteError;
use schemars::generate::SchemaSettings;

use crate::reply::{Fault, FaultCode, Reply};
use crate::request::Request;

impl Fault {
    pub(crate) fn new(code: FaultCode, message: impl Into<String>) -> Self {
        Self { code, field: None, message: message.into() }
    }

    pub(crate) fn at(field: impl Into<String>, message: impl Into<String>) -> Self {
        Self { code: FaultCode::Field, field: Some(field.into()), message: message.into() }
    }

    pub(crate) fn not_found(what: &str) -> Self {
        Self::new(FaultCode::NotFound, format!("{what} is not in this ledger."))
    }
}

impl From<WriteError> for Fault {
    fn from(error: WriteError) -> Self {
        match error {
            WriteError::DiskFull => Fault::new(
                FaultCode::NotStored,
                "The disk is full. Nothing was filed; what you typed is still here. Make room, then file again.",
            ),
            WriteError::Busy => Fault::new(
                FaultCode::NotStored,
                "Another window of this app holds the ledger. Nothing was filed; what you typed is still here.",
            ),
            WriteError::NotFound { what } => {
                Fault::new(FaultCode::NotFound, format!("{what} is not in this ledger."))
            }
            WriteError::Sql(error) => Fault::new(
                FaultCode::NotStored,
                format!("The ledger could not be written ({error}). Nothing was filed."),
            ),
        }
    }
}

/// The JSON Schema of requests, replies and faults, as it stands in `docs/desk.schema.json`.
///
/// # Panics
///
/// Never: a schema is plain JSON.
#[must_use]
pub fn schema() -> String {
    let generator = SchemaSettings::draft2020_12().into_generator();
    let schema = generator.into_root_schema_for::<(Request, Reply, Fault)>();
    serde_json::to_string_pretty(&schema).expect("a schema is plain JSON") + "\n"
}
