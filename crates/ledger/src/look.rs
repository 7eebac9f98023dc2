//! Looking at what stands at the ledger's path, without writing to it.

use std::fs::File;
use std::io::{self, Read};
use std::path::Path;
use std::time::Duration;

use rusqlite::config::DbConfig;
use rusqlite::{Connection, ErrorCode, OpenFlags};

use crate::OpenError;
use crate::beside::with_suffix;
use crate::schema::{APPLICATION_ID, SCHEMA, usable, version};

/// What stands at a path.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Found {
    Nothing,
    Sound { schema: i64 },
    Damaged,
}

/// Every SQLite file begins so (<https://www.sqlite.org/fileformat2.html>, "The Database Header").
const MAGIC: &[u8; 16] = b"SQLite format 3\0";

/// Reads the first bytes only. A file of another program or of a newer version is refused here, before SQLite opens it.
pub(crate) fn glance(path: &Path) -> Result<Found, OpenError> {
    let disk = |source| OpenError::Disk { path: path.to_owned(), source };
    let foreign = |found| OpenError::Foreign { path: path.to_owned(), found };
    let mut header = Vec::with_capacity(100);
    match File::open(path) {
        Ok(file) => file.take(100).read_to_end(&mut header).map_err(disk)?,
        // Without its file, a log of changes is all that is left of a ledger.
        Err(error) if error.kind() == io::ErrorKind::NotFound => {
            let log = std::fs::metadata(with_suffix(path, "-wal")).map_or(0, |file| file.len());
            return Ok(if log > 0 { Found::Damaged } else { Found::Nothing });
        }
        Err(error) => return Err(disk(error)),
    };
    let number = |at: usize| -> Option<i32> {
        header.get(at..at + 4).and_then(|four| four.try_into().ok()).map(i32::from_be_bytes)
    };
    if header.get(..16) != Some(MAGIC.as_slice()) {
        // A ledger's first page may be what is damaged. Some other file that was named by mistake must not be moved.
        let ours = header.is_empty()
            || number(68) == Some(APPLICATION_ID)
            || path.extension().is_some_and(|extension| extension == "dewledger");
        return if ours { Ok(Found::Damaged) } else { Err(foreign(0)) };
    }
    // Values that no ledger has, and that SQLite would refuse without calling it damage: the versions of the format,
    // the format of the schema, the encoding of text.
    let strange =
        header.get(18..20).is_none_or(|bytes| bytes.iter().any(|byte| ![1, 2].contains(byte)))
            || !number(44).is_some_and(|format| (0..=4).contains(&format))
            || !number(56).is_some_and(|encoding| (0..=1).contains(&encoding));
    match (number(60), number(68)) {
        (Some(schema), Some(APPLICATION_ID)) if i64::from(schema) > SCHEMA => {
            Err(OpenError::TooNew { path: path.to_owned(), found: schema.into(), known: SCHEMA })
        }
        (_, Some(APPLICATION_ID)) if strange => Ok(Found::Damaged),
        (Some(schema), Some(APPLICATION_ID)) => Ok(Found::Sound { schema: schema.into() }),
        (_, Some(other)) => Err(foreign(other)),
        (_, None) => Ok(Found::Damaged),
    }
}

/// Looks properly: through the log of changes, and at every page.
pub(crate) fn look(path: &Path) -> Result<Found, OpenError> {
    match glance(path)? {
        Found::Sound { .. } => {}
        other @ (Found::Nothing | Found::Damaged) => return Ok(other),
    }
    match schema_if_sound(path) {
        Ok(Some(schema)) if schema > SCHEMA => {
            Err(OpenError::TooNew { path: path.to_owned(), found: schema, known: SCHEMA })
        }
        Ok(Some(schema)) => Ok(Found::Sound { schema }),
        Ok(None) => Ok(Found::Damaged),
        // Only these say something about the file. Anything else (in use, not permitted, the disk does not answer)
        // says something about the moment, and a sound ledger must not be set aside for it.
        Err(error)
            if matches!(
                error.sqlite_error_code(),
                Some(ErrorCode::DatabaseCorrupt | ErrorCode::NotADatabase)
            ) =>
        {
            Ok(Found::Damaged)
        }
        Err(error) => Err(error.into()),
    }
}

fn schema_if_sound(path: &Path) -> rusqlite::Result<Option<i64>> {
    // Not opened read-only: SQLite leaves CHECK constraints out of a read-only check. Nothing is written all the same:
    // not by statements, and not by bringing the log into the file at the end.
    let flags = OpenFlags::SQLITE_OPEN_READ_WRITE | OpenFlags::SQLITE_OPEN_NO_MUTEX;
    let connection = Connection::open_with_flags(path, flags)?;
    connection.set_db_config(DbConfig::SQLITE_DBCONFIG_NO_CKPT_ON_CLOSE, true)?;
    connection.pragma_update(None, "query_only", true)?;
    connection.busy_timeout(Duration::from_secs(5))?;
    connection.pragma_update(None, "trusted_schema", false)?;
    connection.pragma_update(None, "cell_size_check", true)?;
    let schema = version(&connection)?;
    if schema > SCHEMA {
        // What a newer version thinks sound is not ours to say.
        return Ok(Some(schema));
    }
    let sound = sound(&connection)? && (schema < SCHEMA || usable(&connection));
    Ok(sound.then_some(schema))
}

/// Whether SQLite finds nothing wrong. CHECK constraints are left out where `connection` is read-only.
///
/// The full check, indexes included: on 10 000 entries (50 MB) it took 103 ms where `quick_check` took 83, and what the
/// quick one lets pass makes a list fail later.
pub(crate) fn sound(connection: &Connection) -> rusqlite::Result<bool> {
    connection
        .query_row("PRAGMA integrity_check(1)", [], |row| row.get::<_, String>(0))
        .map(|says| says == "ok")
}
