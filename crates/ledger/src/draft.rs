//! Drafts: half-typed forms, kept on the disk at every pause of typing.

use rusqlite::{OptionalExtension, Row, params};

use crate::record::text;
use crate::{At, DraftId, Ledger, WriteError, id};

/// A kept draft.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Draft {
    /// Its identity.
    pub id: DraftId,
    /// When it was kept last, ms since 1970 UTC.
    pub kept_ms: i64,
    /// A name for lists.
    pub title: String,
    /// What was typed; its meaning is known above the ledger.
    pub text: String,
}

/// How long a discarded draft can be brought back, ms.
const BROUGHT_BACK_WITHIN: i64 = 24 * 3600 * 1000;

fn draft(row: &Row<'_>) -> rusqlite::Result<Draft> {
    let id = id::parse(&row.get::<_, String>(0)?).map_err(|error| {
        rusqlite::Error::FromSqlConversionFailure(0, rusqlite::types::Type::Text, Box::new(error))
    })?;
    Ok(Draft {
        id: DraftId::of(id),
        kept_ms: row.get(1)?,
        title: text(row, 2)?,
        text: text(row, 3)?,
    })
}

impl Ledger {
    /// Keeps a draft, over the one of this identity if there is one. Returns after the commit.
    ///
    /// # Errors
    ///
    /// [`WriteError`]; the draft kept before stands then.
    pub fn keep_draft(
        &mut self,
        id: Option<DraftId>,
        at: At,
        title: &str,
        text: &str,
    ) -> Result<DraftId, WriteError> {
        let id = id.unwrap_or_else(|| DraftId::new(at));
        self.connection.execute(
            "INSERT INTO draft (id, kept_ms, title, body) VALUES (?1, ?2, ?3, ?4)
             ON CONFLICT (id) DO UPDATE SET kept_ms = ?2, title = ?3, body = ?4, discarded_ms = NULL",
            params![id.to_string(), at.ms, title, text],
        )?;
        Ok(id)
    }

    /// A kept draft, discarded or not.
    ///
    /// # Errors
    ///
    /// [`WriteError::NotFound`] where there is none.
    pub fn draft(&self, id: DraftId) -> Result<Draft, WriteError> {
        self.connection
            .query_row(
                "SELECT id, kept_ms, title, body FROM draft WHERE id = ?1",
                [id.to_string()],
                draft,
            )
            .optional()?
            .ok_or_else(|| WriteError::NotFound { what: format!("draft {id}") })
    }

    /// Drafts that were not discarded, newest first.
    ///
    /// # Errors
    ///
    /// [`WriteError`] where they cannot be read.
    pub fn drafts(&self) -> Result<Vec<Draft>, WriteError> {
        let sql = "SELECT id, kept_ms, title, body FROM draft WHERE discarded_ms IS NULL ORDER BY kept_ms DESC";
        let mut statement = self.connection.prepare_cached(sql)?;
        let rows = statement.query_map([], draft)?;
        Ok(rows.collect::<rusqlite::Result<_>>()?)
    }

    /// Sets a draft aside; those set aside a day ago are gone.
    ///
    /// # Errors
    ///
    /// [`WriteError`].
    pub fn discard_draft(&mut self, id: DraftId, at: At) -> Result<(), WriteError> {
        self.connection
            .execute("DELETE FROM draft WHERE discarded_ms < ?1", [at.ms - BROUGHT_BACK_WITHIN])?;
        self.connection.execute(
            "UPDATE draft SET discarded_ms = ?2 WHERE id = ?1",
            params![id.to_string(), at.ms],
        )?;
        Ok(())
    }

    /// Brings a discarded draft back.
    ///
    /// # Errors
    ///
    /// [`WriteError::NotFound`] where it is gone.
    pub fn restore_draft(&mut self, id: DraftId) -> Result<Draft, WriteError> {
        self.connection
            .execute("UPDATE draft SET discarded_ms = NULL WHERE id = ?1", [id.to_string()])?;
        self.draft(id)
    }
}
