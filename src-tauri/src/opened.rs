//! The desk, or the reason why its ledger does not open.

use std::fs;
use std::path::Path;

use dewledger_desk::{Clock, Desk, FaultCode, OpenFault, fault_json};

/// What stands behind the window. It is there even when the ledger does not open: a person who has readings in hand
/// must see why, in words, not a window that never came.
pub struct Opened(Result<Desk, OpenFault>);

impl Opened {
    /// Opens the ledger at `place`, with the folder that holds it.
    #[must_use]
    pub fn at(place: &Path, clock: Clock) -> Self {
        if let Some(folder) = place.parent() {
            // Where the folder cannot be made, opening the ledger fails next and says where and why.
            let _ = fs::create_dir_all(folder);
        }
        Self(Desk::open(place, clock))
    }

    /// The desk's reply to `request`; where there is no desk, the fault that says why, to every request.
    #[must_use]
    pub fn answer(&self, request: &str) -> String {
        match &self.0 {
            Ok(desk) => desk.answer(request),
            Err(fault) => fault_json(FaultCode::LedgerRefused, &fault.to_string()),
        }
    }

    /// Brings the ledger's file to rest, so that it is whole if the app is ended or the device copied now.
    pub fn pause(&self) {
        if let Ok(desk) = &self.0 {
            desk.pause();
        }
    }
}

#[cfg(test)]
mod tests {
    use serde_json::Value;

    use super::*;

    fn clock() -> Clock {
        Clock::new(|| jiff::Timestamp::UNIX_EPOCH.to_zoned_datetime(jiff::tz::TimeZone::UTC))
    }

    fn asked(opened: &Opened, request: &str) -> Value {
        serde_json::from_str(&opened.answer(request)).expect("the desk answers in JSON")
    }

    #[test]
    fn makes_the_folder_and_the_ledger_at_the_first_start() {
        let folder = tempfile::tempdir().unwrap();
        let place = folder.path().join("not/yet/there.dewledger");
        let opened = Opened::at(&place, clock());
        let reply = asked(&opened, r#"{"ask":"overview"}"#);
        assert_eq!(reply["ok"]["reply"], "overview", "{reply}");
        opened.pause();
        assert!(place.is_file());
    }

    #[test]
    fn where_the_ledger_does_not_open_every_request_is_told_why() {
        let folder = tempfile::tempdir().unwrap();
        // A folder stands where the ledger should.
        let opened = Opened::at(folder.path(), clock());
        for request in [r#"{"ask":"overview"}"#, r#"{"ask":"checks"}"#, "not a request"] {
            let reply = asked(&opened, request);
            assert_eq!(reply["fault"]["code"], "ledger_refused", "{reply}");
            assert_ne!(reply["fault"]["message"], "", "{reply}");
        }
        opened.pause();
        assert_eq!(fs::read_dir(folder.path()).unwrap().count(), 0, "nothing was written");
    }
}
