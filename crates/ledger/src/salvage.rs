//! What can still be read of a damaged ledger, carried over row by row.

use std::path::Path;

use rusqlite::{Connection, OpenFlags, Row};

/// How much was carried over.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq)]
pub struct Salvaged {
    /// Records.
    pub records: usize,
    /// Their revisions.
    pub revisions: usize,
    /// Unfinished forms.
    pub drafts: usize,
}

const RECORDS: (&str, &str, usize) =
    ("SELECT id, kind FROM record", "INSERT OR IGNORE INTO record VALUES (?1, ?2)", 2);
const REVISIONS: (&str, &str, usize) = (
    "SELECT id, record, parent, device, at_ms, utc_offset_min, withdrawn, invented, site, equipment, visit, title, app_version, body FROM revision",
    "INSERT OR IGNORE INTO revision VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7, ?8, ?9, ?10, ?11, ?12, ?13, ?14)",
    14,
);
const RESULTS: (&str, &str, usize) = (
    "SELECT revision, key, quantity, si, half_width_si FROM result",
    "INSERT OR IGNORE INTO result VALUES (?1, ?2, ?3, ?4, ?5)",
    5,
);
const DRAFTS: (&str, &str, usize) = (
    "SELECT id, kept_ms, discarded_ms, title, body FROM draft",
    "INSERT OR IGNORE INTO draft VALUES (?1, ?2, ?3, ?4, ?5)",
    5,
);
const PREFERENCES: (&str, &str, usize) =
    ("SELECT key, value FROM preference", "INSERT OR IGNORE INTO preference VALUES (?1, ?2)", 2);

/// Reads what can be read of `damaged` into `ledger`. The damaged file is only read; rows that do not fit are left.
pub(crate) fn carry_over(damaged: &Path, ledger: &mut Connection) -> Salvaged {
    let mut salvaged = Salvaged::default();
    let flags = OpenFlags::SQLITE_OPEN_READ_ONLY;
    let Ok(from) = Connection::open_with_flags(damaged, flags) else { return salvaged };
    let Ok(transaction) = ledger.transaction() else { return salvaged };
    salvaged.records = rows(&from, &transaction, RECORDS);
    // Parents may stand behind their children in the file: foreign keys are asked at the commit.
    let _ = transaction.pragma_update(None, "defer_foreign_keys", true);
    salvaged.revisions = rows(&from, &transaction, REVISIONS);
    let _ = rows(&from, &transaction, RESULTS);
    salvaged.drafts = rows(&from, &transaction, DRAFTS);
    let _ = rows(&from, &transaction, PREFERENCES);
    // A parent that was lost would fail the commit: what hangs on it is carried over as a first revision instead.
    let orphans = "SELECT count(*) FROM revision WHERE parent IS NOT NULL AND parent NOT IN (SELECT id FROM revision)";
    let lost: i64 = transaction.query_row(orphans, [], |row| row.get(0)).unwrap_or(0);
    if lost > 0 || transaction.commit().is_err() {
        return Salvaged::default();
    }
    salvaged
}

/// Copies rows until the damage stops the reading.
fn rows(
    from: &Connection,
    to: &Connection,
    (select, insert, columns): (&str, &str, usize),
) -> usize {
    let Ok(mut statement) = from.prepare(select) else { return 0 };
    let Ok(mut found) = statement.query([]) else { return 0 };
    let values = |row: &Row<'_>| -> rusqlite::Result<Vec<rusqlite::types::Value>> {
        (0..columns).map(|index| row.get(index)).collect()
    };
    let mut count = 0;
    while let Ok(Some(row)) = found.next() {
        if let Ok(values) = values(row)
            && to.execute(insert, rusqlite::params_from_iter(values)).is_ok()
        {
            count += 1;
        }
    }
    count
}
