//! The desk, or the reason why its ledger does not open.

use std::fs;
use std::path::Path;

use dewledger_desk::{Clock, Desk, OpenFault};

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
            Err(fault) => fault.reply(),
        }
    }

    /// Brings the ledger's file to rest, so that it is whole if the app is ended or the device copied now.
    pub fn pause(&self) {
        if let Ok(desk) = &self.0 {
            desk.pause();
        }
    }
}
