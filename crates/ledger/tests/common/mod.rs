//! What the tests of the ledger share.

use std::path::{Path, PathBuf};

use dewledger_ledger::{At, Body, Ledger};

pub(crate) fn at(ms: i64) -> At {
    At { ms: 1_780_000_000_000 + ms, utc_offset_min: 120 }
}

pub(crate) fn open(path: &Path) -> Ledger {
    Ledger::open(path, at(0)).unwrap().ledger
}

pub(crate) fn body(title: &str) -> Body {
    Body {
        title: title.to_owned(),
        text: "{}".to_owned(),
        app_version: "0".to_owned(),
        ..Body::default()
    }
}

pub(crate) fn folder() -> (tempfile::TempDir, PathBuf) {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("db").join("ledger.dewledger");
    (folder, path)
}
