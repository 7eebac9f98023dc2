//! Opening the ledger: the life of its file, and the settings of every connection.

use std::path::{Path, PathBuf};
use std::time::Duration;

use rusqlite::{Connection, OptionalExtension};

use crate::beside::{self, CopyError, Incoming, copy_aside, copy_whole};
use crate::look::{Found, glance, look, sound};
use crate::salvage::{Salvaged, carry_over};
use crate::schema::{SCHEMA, migrate};
use crate::turn::Turn;
use crate::{At, OpenError, WriteError, id};

/// An open ledger. Other processes may have it open too; they take turns writing.
#[derive(Debug)]
pub struct Ledger {
    // Before the turn: fields are dropped in this order, and the file is closed before others may set it aside.
    pub(crate) connection: Connection,
    pub(crate) device: String,
    path: PathBuf,
    _turn: Turn,
}

/// An opened ledger and what happened on the way.
#[derive(Debug)]
pub struct Opened {
    /// The ledger.
    pub ledger: Ledger,
    /// What a person may need to know.
    pub event: Event,
}

/// What happened when a ledger was opened.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Event {
    /// It did not exist.
    Fresh,
    /// It was there and sound.
    Existing,
    /// It was older and was brought up to date; a copy of the old one stands aside.
    Migrated {
        /// The copy.
        copy: PathBuf,
    },
    /// It was damaged and was set aside; what could be read was carried over.
    SetAside {
        /// The damaged file under its new name.
        damaged: PathBuf,
        /// What was carried over.
        salvaged: Salvaged,
    },
}

impl Ledger {
    /// Opens the ledger at `path`, or makes one, with its folder.
    ///
    /// A damaged one is set aside, and so are an empty file and a log of changes whose ledger is gone: a ledger never
    /// starts empty in the place of another without saying so.
    ///
    /// # Errors
    ///
    /// [`OpenError`] where the file is another program's, newer, in use, or cannot be opened; what was in it is as it
    /// was then.
    pub fn open(path: &Path, now: At) -> Result<Opened, OpenError> {
        // Refused before anything is made beside it.
        glance(path)?;
        if let Some(folder) = path.parent() {
            std::fs::create_dir_all(folder)
                .map_err(|source| OpenError::Disk { path: path.to_owned(), source })?;
        }
        let turn = Turn::wait_for(path)?;
        if turn.alone
            && let Some(incoming) = Incoming::left_behind(path)?
        {
            return Self::finish(incoming, path, now, turn);
        }
        let found = look(path)?;
        if !turn.alone && found != (Found::Sound { schema: SCHEMA }) {
            // Whoever has it open would go on writing to a file that was moved.
            return Err(OpenError::InUse { path: path.to_owned() });
        }
        let event = match found {
            Found::Sound { schema } if schema < SCHEMA => {
                Event::Migrated { copy: copy_aside(path, schema, now)? }
            }
            Found::Sound { .. } => Event::Existing,
            Found::Nothing => {
                let incoming = Incoming::begin(path, now)?;
                built(&incoming.built, now)?;
                incoming.swap(path)?;
                Event::Fresh
            }
            Found::Damaged => {
                let incoming = Incoming::begin(path, now)?;
                let mut connection = connect(&incoming.built)?;
                carry_over(path, &mut connection)?;
                drop(connection);
                built(&incoming.built, now)?;
                return Self::finish(incoming, path, now, turn);
            }
        };
        Ok(Opened { ledger: Self::ready(path, now, turn)?, event })
    }

    /// The last step of setting a damaged file aside, which a kill may have interrupted before.
    fn finish(incoming: Incoming, path: &Path, now: At, turn: Turn) -> Result<Opened, OpenError> {
        let damaged = incoming.swap(path)?;
        let ledger = Self::ready(path, now, turn)?;
        let salvaged = Salvaged::count(&ledger.connection)?;
        Ok(Opened { ledger, event: Event::SetAside { damaged, salvaged } })
    }

    fn ready(path: &Path, now: At, mut turn: Turn) -> Result<Self, OpenError> {
        let connection = connect(path)?;
        let device = device(&connection, now)?;
        turn.share();
        Ok(Self { connection, device, path: path.to_owned(), _turn: turn })
    }

    /// Where it is.
    #[must_use]
    pub fn path(&self) -> &Path {
        &self.path
    }

    /// The identity of this ledger among others, made once.
    #[must_use]
    pub fn device(&self) -> &str {
        &self.device
    }

    /// Brings everything from the write-ahead log into the file, so that a copy of the file alone is whole.
    ///
    /// # Errors
    ///
    /// [`WriteError`] where the disk refuses, [`WriteError::Busy`] where another process is reading or writing.
    pub fn checkpoint(&self) -> Result<(), WriteError> {
        let busy: bool =
            self.connection.query_row("PRAGMA wal_checkpoint(TRUNCATE)", [], |row| row.get(0))?;
        if busy { Err(WriteError::Busy) } else { Ok(()) }
    }

    /// Writes a sound copy of the whole ledger to a new file and checks it. The ledger is checked first. Nothing stands at `to` unless it is whole.
    ///
    /// # Errors
    ///
    /// [`WriteError`] where the file exists already, the ledger is not sound or the disk refuses.
    pub fn back_up(&self, to: &Path) -> Result<(), WriteError> {
        if !sound(&self.connection)? {
            return Err(WriteError::Sql(refusal(
                rusqlite::ffi::SQLITE_CORRUPT,
                "the ledger is damaged",
            )));
        }
        copy_whole(&self.connection, to).map_err(|error| match error {
            CopyError::Sql(error) => error.into(),
            CopyError::Disk(error) if error.kind() == std::io::ErrorKind::StorageFull => {
                WriteError::DiskFull
            }
            CopyError::Disk(_) | CopyError::Unsound => {
                let why = format!("{}: {error}", to.display());
                WriteError::Sql(refusal(rusqlite::ffi::SQLITE_CANTOPEN, &why))
            }
        })
    }

    /// Stands in for a full disk: no more pages than this.
    ///
    /// # Errors
    ///
    /// [`WriteError`] where SQLite refuses.
    #[doc(hidden)]
    pub fn limit_pages_for_tests(&self, pages: i64) -> Result<(), WriteError> {
        self.connection.query_row(&format!("PRAGMA max_page_count = {pages}"), [], |_| Ok(()))?;
        Ok(())
    }

    /// Whether nothing was ever stored in it.
    ///
    /// # Errors
    ///
    /// [`WriteError`] where it cannot be read.
    pub fn is_empty(&self) -> Result<bool, WriteError> {
        Ok(!self.connection.prepare_cached("SELECT 1 FROM revision")?.exists([])?)
    }
}

fn refusal(code: std::ffi::c_int, why: &str) -> rusqlite::Error {
    rusqlite::Error::SqliteFailure(rusqlite::ffi::Error::new(code), Some(why.to_owned()))
}

/// Opens a file for writing, with every setting, at the schema of this version.
fn connect(path: &Path) -> Result<Connection, OpenError> {
    let mut connection = Connection::open(path)?;
    settings(&connection)?;
    migrate(&mut connection)?;
    Ok(connection)
}

/// A whole ledger at `path`, all of it in the one file.
fn built(path: &Path, now: At) -> Result<(), OpenError> {
    let connection = connect(path)?;
    device(&connection, now)?;
    connection.query_row("PRAGMA wal_checkpoint(TRUNCATE)", [], |_| Ok(()))?;
    // Closing the last connection removes the log.
    connection.close().map_err(|(_, error)| error)?;
    beside::sync_folder(path);
    Ok(())
}

/// The settings of every connection; see the crate's documentation for why.
fn settings(connection: &Connection) -> rusqlite::Result<()> {
    connection.busy_timeout(Duration::from_secs(5))?;
    let mode: String =
        connection.pragma_update_and_check(None, "journal_mode", "WAL", |row| row.get(0))?;
    connection.pragma_update(None, "synchronous", if mode == "wal" { "FULL" } else { "EXTRA" })?;
    connection.pragma_update(None, "fullfsync", true)?;
    connection.pragma_update(None, "checkpoint_fullfsync", true)?;
    connection.pragma_update(None, "foreign_keys", true)?;
    connection.pragma_update(None, "trusted_schema", false)?;
    connection.pragma_update(None, "cell_size_check", true)?;
    connection.pragma_update(None, "mmap_size", 0)?;
    connection.pragma_update(None, "journal_size_limit", 4 * 1024 * 1024)?;
    connection.pragma_update(None, "recursive_triggers", true)
}

/// This ledger's device, made once.
fn device(connection: &Connection, now: At) -> rusqlite::Result<String> {
    let known =
        connection.query_row("SELECT device FROM identity", [], |row| row.get(0)).optional()?;
    if let Some(device) = known {
        return Ok(device);
    }
    let device = id::new(now).hyphenated().to_string();
    connection.execute("INSERT OR IGNORE INTO identity VALUES (1, ?1)", [&device])?;
    connection.query_row("SELECT device FROM identity", [], |row| row.get(0))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_setting_is_in_force_after_opening() {
        let folder = tempfile::tempdir().unwrap();
        let now = At { ms: 1_780_000_000_000, utc_offset_min: 0 };
        let ledger = Ledger::open(&folder.path().join("l.dewledger"), now).unwrap().ledger;
        let ask = |pragma: &str| -> String {
            let text = |row: &rusqlite::Row<'_>| row.get(0);
            let sql = format!("SELECT CAST({pragma} AS TEXT) FROM pragma_{pragma}");
            // Busy_timeout is the one whose column has another name.
            let sql = sql.replace("CAST(busy_timeout", "CAST(timeout");
            ledger.connection.query_row(&sql, [], text).unwrap()
        };
        for (pragma, value) in [
            ("journal_mode", "wal"),
            ("synchronous", "2"),
            ("fullfsync", "1"),
            ("checkpoint_fullfsync", "1"),
            ("foreign_keys", "1"),
            ("trusted_schema", "0"),
            ("cell_size_check", "1"),
            ("busy_timeout", "5000"),
            ("journal_size_limit", "4194304"),
            ("recursive_triggers", "1"),
        ] {
            assert_eq!(ask(pragma), value, "{pragma}");
        }
    }
}
