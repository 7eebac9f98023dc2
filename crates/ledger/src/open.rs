//! Opening the ledger: settings, refusals, setting a damaged file aside.

use std::path::{Path, PathBuf};
use std::time::Duration;

use rusqlite::{Connection, OpenFlags, OptionalExtension};

use crate::salvage::{Salvaged, carry_over};
use crate::schema::{APPLICATION_ID, SCHEMA, migrate, version};
use crate::{At, OpenError, WriteError, id};

/// An open ledger. One writer; other processes may read and take turns writing.
#[derive(Debug)]
pub struct Ledger {
    pub(crate) connection: Connection,
    pub(crate) device: String,
    path: PathBuf,
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

/// Copies of older schemas that are kept.
const COPIES: usize = 3;

impl Ledger {
    /// Opens the ledger at `path`, or makes one.
    ///
    /// # Errors
    ///
    /// [`OpenError`] where the file is another program's, newer, or cannot be opened; it is left as it is then.
    pub fn open(path: &Path, now: At) -> Result<Opened, OpenError> {
        let disk = |source| OpenError::Disk { path: path.to_owned(), source };
        if let Some(folder) = path.parent() {
            std::fs::create_dir_all(folder).map_err(disk)?;
        }
        let there = std::fs::metadata(path).is_ok_and(|file| file.len() > 0);
        if !there {
            return Ok(Opened { ledger: Self::ready(path, now)?, event: Event::Fresh });
        }
        match look(path)? {
            Found::Sound { schema } if schema < SCHEMA => {
                let copy = copy_aside(path, schema, now)?;
                Ok(Opened { ledger: Self::ready(path, now)?, event: Event::Migrated { copy } })
            }
            Found::Sound { .. } => {
                Ok(Opened { ledger: Self::ready(path, now)?, event: Event::Existing })
            }
            Found::Damaged => {
                let damaged = set_aside(path, now)?;
                let mut ledger = Self::ready(path, now)?;
                let salvaged = carry_over(&damaged, &mut ledger.connection);
                Ok(Opened { ledger, event: Event::SetAside { damaged, salvaged } })
            }
        }
    }

    /// Opens for writing, with every setting, at the schema of this version.
    fn ready(path: &Path, now: At) -> Result<Self, OpenError> {
        let mut connection = Connection::open(path)?;
        settings(&connection)?;
        migrate(&mut connection)?;
        let device = device(&connection, now)?;
        Ok(Self { connection, device, path: path.to_owned() })
    }

    /// Where it is.
    #[must_use]
    pub fn path(&self) -> &Path {
        &self.path
    }

    /// Brings everything from the write-ahead log into the file, so that a copy of the file alone is whole.
    ///
    /// # Errors
    ///
    /// [`WriteError`] where the disk refuses.
    pub fn checkpoint(&self) -> Result<(), WriteError> {
        self.connection.query_row("PRAGMA wal_checkpoint(TRUNCATE)", [], |_| Ok(()))?;
        Ok(())
    }

    /// Writes a sound copy of the whole ledger to a new file and checks it.
    ///
    /// # Errors
    ///
    /// [`WriteError`] where the file exists already or the disk refuses.
    pub fn back_up(&self, to: &Path) -> Result<(), WriteError> {
        self.connection.execute("VACUUM INTO ?1", [to.to_string_lossy()])?;
        let copy = Connection::open_with_flags(to, OpenFlags::SQLITE_OPEN_READ_ONLY)?;
        if sound(&copy)? {
            Ok(())
        } else {
            Err(WriteError::NotFound { what: "a sound copy".to_owned() })
        }
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
        let count: i64 =
            self.connection.query_row("SELECT count(*) FROM record", [], |row| row.get(0))?;
        Ok(count == 0)
    }
}

/// The settings of every connection; see the crate's documentation for why.
fn settings(connection: &Connection) -> rusqlite::Result<()> {
    connection.busy_timeout(Duration::from_secs(5))?;
    connection.pragma_update(None, "journal_mode", "WAL")?;
    connection.pragma_update(None, "synchronous", "FULL")?;
    connection.pragma_update(None, "foreign_keys", true)?;
    connection.pragma_update(None, "trusted_schema", false)?;
    connection.pragma_update(None, "cell_size_check", true)?;
    connection.pragma_update(None, "mmap_size", 0)?;
    connection.pragma_update(None, "journal_size_limit", 4 * 1024 * 1024)?;
    // Without it INSERT OR REPLACE deletes behind the back of the delete triggers.
    connection.pragma_update(None, "recursive_triggers", true)
}

/// What stands at a path.
enum Found {
    Sound { schema: i64 },
    Damaged,
}

/// Looks without writing. SQLite may need to read its write-ahead log, which a read-only connection can.
fn look(path: &Path) -> Result<Found, OpenError> {
    let connection = Connection::open_with_flags(path, OpenFlags::SQLITE_OPEN_READ_ONLY)?;
    connection.busy_timeout(Duration::from_secs(5))?;
    let application: rusqlite::Result<i32> =
        connection.pragma_query_value(None, "application_id", |row| row.get(0));
    let Ok(application) = application else { return Ok(Found::Damaged) };
    let Ok(schema) = version(&connection) else { return Ok(Found::Damaged) };
    let tables =
        connection.query_row("SELECT count(*) FROM sqlite_schema", [], |row| row.get::<_, i64>(0));
    let Ok(tables) = tables else { return Ok(Found::Damaged) };
    if application != APPLICATION_ID {
        // A kill during the very first opening leaves an empty file of nobody: that one is ours to fill.
        if application == 0 && schema == 0 && tables == 0 {
            return Ok(Found::Sound { schema: SCHEMA });
        }
        return Err(OpenError::Foreign { path: path.to_owned(), found: application });
    }
    if schema > SCHEMA {
        return Err(OpenError::TooNew { path: path.to_owned(), found: schema, known: SCHEMA });
    }
    match sound(&connection) {
        Ok(true) => Ok(Found::Sound { schema }),
        _ => Ok(Found::Damaged),
    }
}

fn sound(connection: &Connection) -> rusqlite::Result<bool> {
    connection
        .query_row("PRAGMA quick_check(1)", [], |row| row.get::<_, String>(0))
        .map(|says| says == "ok")
}

fn sibling(path: &Path, prefix: &str, now: At) -> PathBuf {
    let name = path
        .file_name()
        .map_or_else(|| "ledger".to_owned(), |name| name.to_string_lossy().into_owned());
    path.with_file_name(format!("{prefix}-{}-{name}", now.ms))
}

/// Renames a damaged file with its log, so that nothing writes to it any more.
fn set_aside(path: &Path, now: At) -> Result<PathBuf, OpenError> {
    let damaged = sibling(path, "damaged", now);
    let disk = |source| OpenError::Disk { path: path.to_owned(), source };
    std::fs::rename(path, &damaged).map_err(disk)?;
    for suffix in ["-wal", "-shm"] {
        let with = |path: &Path| PathBuf::from(format!("{}{suffix}", path.display()));
        if with(path).exists() {
            std::fs::rename(with(path), with(&damaged)).map_err(disk)?;
        }
    }
    Ok(damaged)
}

/// A whole copy of an older schema, before it is migrated; the newest few are kept.
fn copy_aside(path: &Path, schema: i64, now: At) -> Result<PathBuf, OpenError> {
    let copy = sibling(path, &format!("schema{schema}"), now);
    let connection = Connection::open(path)?;
    connection.execute("VACUUM INTO ?1", [copy.to_string_lossy()])?;
    if let Some(folder) = path.parent() {
        let name =
            path.file_name().map(|name| name.to_string_lossy().into_owned()).unwrap_or_default();
        let mut copies: Vec<PathBuf> = std::fs::read_dir(folder)
            .map(|files| files.flatten().map(|file| file.path()).collect())
            .unwrap_or_default();
        copies.retain(|file| {
            let file = file
                .file_name()
                .map(|name| name.to_string_lossy().into_owned())
                .unwrap_or_default();
            file.starts_with("schema") && file.ends_with(&name)
        });
        copies.sort();
        for old in copies.iter().rev().skip(COPIES) {
            // A copy that cannot be removed does no harm.
            let _ = std::fs::remove_file(old);
        }
    }
    Ok(copy)
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
