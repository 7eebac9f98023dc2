//! Preferences: small texts by key.

use rusqlite::{OptionalExtension, params};

use crate::{Ledger, WriteError};

impl Ledger {
    /// A preference, if it was ever set.
    ///
    /// # Errors
    ///
    /// [`WriteError`] where it cannot be read.
    pub fn preference(&self, key: &str) -> Result<Option<String>, WriteError> {
        let sql = "SELECT value FROM preference WHERE key = ?1";
        Ok(self.connection.query_row(sql, [key], |row| row.get(0)).optional()?)
    }

    /// Sets a preference. Returns after the commit.
    ///
    /// # Errors
    ///
    /// [`WriteError`]; the old value stands then.
    pub fn set_preference(&mut self, key: &str, value: &str) -> Result<(), WriteError> {
        let sql =
            "INSERT INTO preference VALUES (?1, ?2) ON CONFLICT (key) DO UPDATE SET value = ?2";
        self.connection.execute(sql, params![key, value])?;
        Ok(())
    }
}
