//! What can go wrong, sorted by what a person can do about it.

use std::path::PathBuf;

/// Why the ledger could not be opened. What was in it is as it was.
#[derive(Debug, thiserror::Error)]
pub enum OpenError {
    /// A file of another program.
    #[error("{} is not a ledger of this app (application id {found:#x}); it was left as it is", .path.display())]
    Foreign {
        /// The file.
        path: PathBuf,
        /// What it says it is.
        found: i32,
    },
    /// A ledger of a newer version.
    #[error("{} was written by a newer version of this app (schema {found}, this version knows {known}); it was left as it is", .path.display())]
    TooNew {
        /// The file.
        path: PathBuf,
        /// Its schema.
        found: i64,
        /// The newest schema that this version knows.
        known: i64,
    },
    /// Another process is opening it, or has it open while it needs mending.
    #[error("{} is in use by another program of this app; close that one and try again", .path.display())]
    InUse {
        /// The file.
        path: PathBuf,
    },
    /// It is of an older schema and could not be brought up to date.
    #[error("the ledger could not be brought up to schema {number}: {source}")]
    Migration {
        /// The schema that was not reached.
        number: i64,
        /// Why.
        source: rusqlite::Error,
    },
    /// Bringing it up to date would have left rows that name others that are not there.
    #[error("the ledger could not be brought up to schema {number}: rows would be left dangling")]
    Dangling {
        /// The schema that was not reached.
        number: i64,
    },
    /// The folder or file cannot be read or written.
    #[error("{} cannot be opened: {source}", .path.display())]
    Disk {
        /// The file.
        path: PathBuf,
        /// Why.
        source: std::io::Error,
    },
    /// SQLite refused.
    #[error("the ledger cannot be opened: {0}")]
    Sql(#[from] rusqlite::Error),
}

/// Why nothing was stored, or nothing could be read.
#[derive(Debug, thiserror::Error)]
pub enum WriteError {
    /// The disk is full. What was typed is still with the caller.
    #[error("the disk is full; nothing was stored")]
    DiskFull,
    /// Another program holds the ledger.
    #[error("the ledger is in use by another program; nothing was stored")]
    Busy,
    /// It names something that is not in the ledger.
    #[error("{what} is not in the ledger")]
    NotFound {
        /// What was asked for.
        what: String,
    },
    /// The disk or SQLite refused.
    #[error("the ledger could not be written: {0}")]
    Sql(rusqlite::Error),
}

impl From<rusqlite::Error> for WriteError {
    fn from(error: rusqlite::Error) -> Self {
        match error.sqlite_error_code() {
            Some(rusqlite::ErrorCode::DiskFull) => WriteError::DiskFull,
            Some(rusqlite::ErrorCode::DatabaseBusy | rusqlite::ErrorCode::DatabaseLocked) => {
                WriteError::Busy
            }
            _ => WriteError::Sql(error),
        }
    }
}
