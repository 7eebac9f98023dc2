//! The schema and the way to it: numbered migrations, each in a transaction of its own.
//!
//! **Never change or remove a migration; only add.** Files of every released schema must open for ever; each has a
//! fixture in `tests/fixtures/`.

use rusqlite::{Connection, TransactionBehavior};

use crate::OpenError;

/// "DWLG": what `PRAGMA application_id` of a ledger says.
pub const APPLICATION_ID: i32 = i32::from_be_bytes(*b"DWLG");

/// The migrations, in order; the schema's number is how many were applied.
const MIGRATIONS: &[&str] = &[
    include_str!("../migrations/0001_ledger.sql"),
    include_str!("../migrations/0002_kinds_and_parents.sql"),
];

/// The schema that this version writes.
pub const SCHEMA: i64 = MIGRATIONS.len() as i64;

/// The schema of a file.
pub(crate) fn version(connection: &Connection) -> rusqlite::Result<i64> {
    connection.pragma_query_value(None, "user_version", |row| row.get(0))
}

/// Brings a file up to [`SCHEMA`]. A migration that fails leaves the file as it was before it.
pub(crate) fn migrate(connection: &mut Connection) -> Result<(), OpenError> {
    migrate_by(connection, MIGRATIONS)
}

fn migrate_by(connection: &mut Connection, migrations: &[&str]) -> Result<(), OpenError> {
    // A migration may rebuild a table that others name. The setting is deaf inside a transaction, so it is changed
    // out here, and what it would have refused is asked before each commit.
    connection.pragma_update(None, "foreign_keys", false)?;
    let migrated =
        (1..).zip(migrations).try_for_each(|(number, sql)| step(connection, number, sql));
    connection.pragma_update(None, "foreign_keys", true)?;
    migrated
}

fn step(connection: &mut Connection, number: i64, sql: &str) -> Result<(), OpenError> {
    let transaction = connection.transaction_with_behavior(TransactionBehavior::Immediate)?;
    // Another program may have migrated since: ask inside the transaction.
    if version(&transaction)? >= number {
        return Ok(());
    }
    let failed = |source| OpenError::Migration { number, source };
    transaction.execute_batch(sql).map_err(failed)?;
    if transaction.prepare("PRAGMA foreign_key_check")?.exists([])? {
        return Err(OpenError::Dangling { number });
    }
    transaction.pragma_update(None, "user_version", number)?;
    transaction.pragma_update(None, "application_id", APPLICATION_ID)?;
    transaction.commit().map_err(failed)
}

/// What is asked of a ledger of [`SCHEMA`]: every table, view and trigger is named by one of these.
const USES: &[&str] = &[
    "SELECT id, record, kind, parent, device, at_ms, utc_offset_min, withdrawn, invented, site, equipment, visit, title, app_version, body FROM head",
    "SELECT revision, key, quantity, si, half_width_si FROM result",
    "SELECT id, kept_ms, discarded_ms, title, body FROM draft",
    "SELECT key, value FROM preference",
    "SELECT only_row, device FROM identity",
    "INSERT INTO revision SELECT * FROM revision",
    "INSERT INTO result SELECT * FROM result",
    "UPDATE revision SET id = id",
    "UPDATE result SET key = key",
    "DELETE FROM revision",
    "DELETE FROM result",
];

/// Whether the schema as it stands in the file still means what it should. SQLite checks its rows and trees but not
/// the text of its views and triggers: a flipped byte there would come up at the first use.
pub(crate) fn usable(connection: &Connection) -> bool {
    // Preparing compiles the statement with its triggers; nothing is run.
    USES.iter().all(|sql| connection.prepare(sql).is_ok())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_failed_migration_leaves_the_rows() {
        let mut connection = Connection::open_in_memory().unwrap();
        migrate(&mut connection).unwrap();
        connection.execute("INSERT INTO preference VALUES ('units', 'si')", []).unwrap();
        let mut broken = MIGRATIONS.to_vec();
        broken.push("CREATE TABLE more (id TEXT) STRICT; DELETE FROM preference; SELECT nothing FROM nowhere;");
        let error = migrate_by(&mut connection, &broken).unwrap_err();
        assert!(
            matches!(error, OpenError::Migration { number, .. } if number == SCHEMA + 1),
            "{error}"
        );
        assert_eq!(version(&connection).unwrap(), SCHEMA);
        let value: String =
            connection.query_row("SELECT value FROM preference", [], |row| row.get(0)).unwrap();
        assert_eq!(value, "si");
        assert!(connection.prepare("SELECT * FROM more").is_err());
    }

    #[test]
    fn a_migration_that_leaves_a_row_dangling_is_undone() {
        let mut connection = Connection::open_in_memory().unwrap();
        migrate(&mut connection).unwrap();
        let mut broken = MIGRATIONS.to_vec();
        broken
            .push("INSERT INTO result VALUES ('no such revision', 'total_w', 'power', 1.0, NULL);");
        let error = migrate_by(&mut connection, &broken).unwrap_err();
        assert!(matches!(error, OpenError::Dangling { number } if number == SCHEMA + 1), "{error}");
        let rows: i64 =
            connection.query_row("SELECT count(*) FROM result", [], |row| row.get(0)).unwrap();
        assert_eq!(rows, 0);
        let keys: bool =
            connection.pragma_query_value(None, "foreign_keys", |row| row.get(0)).unwrap();
        assert!(keys, "foreign keys are on again after a failure");
    }

    #[test]
    fn a_view_or_trigger_that_means_nothing_any_more_is_noticed() {
        let mut connection = Connection::open_in_memory().unwrap();
        migrate(&mut connection).unwrap();
        assert!(usable(&connection));
        let sql = "SELECT name, sql FROM sqlite_schema WHERE type IN ('view', 'trigger')";
        let mut statement = connection.prepare(sql).unwrap();
        let made: Vec<(String, String)> = statement
            .query_map([], |row| Ok((row.get(0)?, row.get(1)?)))
            .unwrap()
            .map(Result::unwrap)
            .collect();
        assert!(made.len() >= 8);
        for (name, sql) in made {
            let mut other = Connection::open_in_memory().unwrap();
            migrate(&mut other).unwrap();
            let broken =
                sql.replace("RAISE(ABORT, ", "nosuch(").replace("revision.id)", "revision.idd)");
            assert_ne!(broken, sql);
            let kind = if sql.starts_with("CREATE VIEW") { "VIEW" } else { "TRIGGER" };
            other.execute_batch(&format!("DROP {kind} {name}; {broken}")).unwrap();
            assert!(!usable(&other), "{broken}");
        }
    }

    #[test]
    fn migrating_twice_changes_nothing() {
        let mut connection = Connection::open_in_memory().unwrap();
        migrate(&mut connection).unwrap();
        migrate(&mut connection).unwrap();
        assert_eq!(version(&connection).unwrap(), SCHEMA);
    }
}
