//! The schema and the way to it: numbered migrations, each in a transaction of its own.
//!
//! **Never change or remove a migration; only add.** Files of every released schema must open for ever.

use rusqlite::{Connection, TransactionBehavior};

/// "DWLG": what `PRAGMA application_id` of a ledger says.
pub const APPLICATION_ID: i32 = i32::from_be_bytes(*b"DWLG");

/// The migrations, in order; the schema's number is how many were applied.
const MIGRATIONS: &[&str] = &[include_str!("../migrations/0001_ledger.sql")];

/// The schema that this version writes.
pub const SCHEMA: i64 = MIGRATIONS.len() as i64;

/// The schema of a file.
pub(crate) fn version(connection: &Connection) -> rusqlite::Result<i64> {
    connection.pragma_query_value(None, "user_version", |row| row.get(0))
}

/// Brings a file up to [`SCHEMA`]. A migration that fails leaves the file as it was before it.
pub(crate) fn migrate(connection: &mut Connection) -> rusqlite::Result<()> {
    migrate_by(connection, MIGRATIONS)
}

fn migrate_by(connection: &mut Connection, migrations: &[&str]) -> rusqlite::Result<()> {
    for (index, sql) in migrations.iter().enumerate() {
        let number = i64::try_from(index + 1).unwrap_or(i64::MAX);
        let transaction = connection.transaction_with_behavior(TransactionBehavior::Immediate)?;
        // Another program may have migrated since: ask inside the transaction.
        if version(&transaction)? >= number {
            continue;
        }
        transaction.execute_batch(sql)?;
        transaction.pragma_update(None, "user_version", number)?;
        transaction.pragma_update(None, "application_id", APPLICATION_ID)?;
        transaction.commit()?;
    }
    Ok(())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_failed_migration_leaves_the_rows() {
        let mut connection = Connection::open_in_memory().unwrap();
        migrate(&mut connection).unwrap();
        connection.execute("INSERT INTO preference VALUES ('units', 'si')", []).unwrap();
        let broken = [
            MIGRATIONS[0],
            "CREATE TABLE more (id TEXT) STRICT; DELETE FROM preference; SELECT nothing FROM nowhere;",
        ];
        assert!(migrate_by(&mut connection, &broken).is_err());
        assert_eq!(version(&connection).unwrap(), 1);
        let value: String =
            connection.query_row("SELECT value FROM preference", [], |row| row.get(0)).unwrap();
        assert_eq!(value, "si");
        assert!(connection.prepare("SELECT * FROM more").is_err());
    }

    #[test]
    fn migrating_twice_changes_nothing() {
        let mut connection = Connection::open_in_memory().unwrap();
        migrate(&mut connection).unwrap();
        migrate(&mut connection).unwrap();
        assert_eq!(version(&connection).unwrap(), SCHEMA);
    }
}
