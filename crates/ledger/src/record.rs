//! Records and their revisions: sites, equipment, visits, entries, instruments.

use rusqlite::{OptionalExtension, Row, TransactionBehavior, params};

use crate::id::{self, BadId};
use crate::{
    At, DraftId, EntryId, EquipmentId, InstrumentId, Ledger, RevisionId, SiteId, VisitId,
    WriteError,
};

/// What a record is.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Kind {
    /// A building with its elevation.
    Site,
    /// A piece of equipment at a site.
    Equipment,
    /// One stay at a site.
    Visit,
    /// A check or a full set, filed.
    Entry,
    /// An instrument with its probes.
    Instrument,
}

impl Kind {
    const fn text(self) -> &'static str {
        match self {
            Kind::Site => "site",
            Kind::Equipment => "equipment",
            Kind::Visit => "visit",
            Kind::Entry => "entry",
            Kind::Instrument => "instrument",
        }
    }
}

/// The identity of a record of any kind.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum RecordId {
    /// A site.
    Site(SiteId),
    /// Equipment.
    Equipment(EquipmentId),
    /// A visit.
    Visit(VisitId),
    /// An entry.
    Entry(EntryId),
    /// An instrument.
    Instrument(InstrumentId),
}

impl RecordId {
    /// A new one.
    #[must_use]
    pub fn new(kind: Kind, at: At) -> Self {
        match kind {
            Kind::Site => RecordId::Site(SiteId::new(at)),
            Kind::Equipment => RecordId::Equipment(EquipmentId::new(at)),
            Kind::Visit => RecordId::Visit(VisitId::new(at)),
            Kind::Entry => RecordId::Entry(EntryId::new(at)),
            Kind::Instrument => RecordId::Instrument(InstrumentId::new(at)),
        }
    }

    /// What it is of.
    #[must_use]
    pub const fn kind(self) -> Kind {
        match self {
            RecordId::Site(_) => Kind::Site,
            RecordId::Equipment(_) => Kind::Equipment,
            RecordId::Visit(_) => Kind::Visit,
            RecordId::Entry(_) => Kind::Entry,
            RecordId::Instrument(_) => Kind::Instrument,
        }
    }

    fn text(self) -> String {
        match self {
            RecordId::Site(id) => id.to_string(),
            RecordId::Equipment(id) => id.to_string(),
            RecordId::Visit(id) => id.to_string(),
            RecordId::Entry(id) => id.to_string(),
            RecordId::Instrument(id) => id.to_string(),
        }
    }
}

impl std::fmt::Display for RecordId {
    fn fmt(&self, formatter: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        formatter.write_str(&self.text())
    }
}

/// What a revision holds.
#[derive(Debug, Clone, Default, PartialEq)]
pub struct Body {
    /// The site that it belongs to; none for a site itself.
    pub site: Option<SiteId>,
    /// The equipment that it belongs to.
    pub equipment: Option<EquipmentId>,
    /// The visit that it belongs to.
    pub visit: Option<VisitId>,
    /// Its name or label, for lists.
    pub title: String,
    /// Invented example data.
    pub invented: bool,
    /// The version that wrote it.
    pub app_version: String,
    /// Everything else; its meaning is known above the ledger.
    pub text: String,
    /// Results, of an entry.
    pub results: Vec<ResultRow>,
}

/// One result, in SI.
#[derive(Debug, Clone, PartialEq)]
pub struct ResultRow {
    /// Its key.
    pub key: String,
    /// Identifier of its quantity.
    pub quantity: String,
    /// The value.
    pub si: f64,
    /// The 95 % half-width; none is not known.
    pub half_width_si: Option<f64>,
}

/// A stored revision.
#[derive(Debug, Clone, PartialEq)]
pub struct Revision {
    /// Its identity.
    pub id: RevisionId,
    /// The record.
    pub record: RecordId,
    /// The revision that it replaces.
    pub parent: Option<RevisionId>,
    /// The ledger that it was written in first: two corrections made apart usually differ in it.
    pub device: String,
    /// When it was written.
    pub at: At,
    /// It takes the record back.
    pub withdrawn: bool,
    /// What it holds; results are read only where they are asked for.
    pub body: Body,
}

/// What stands now of one record: one revision, or several corrections made apart.
pub type Head = Revision;

/// What to list.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Within {
    /// All of a kind.
    Everything,
    /// Of a site.
    Site(SiteId),
    /// Of a piece of equipment.
    Equipment(EquipmentId),
    /// Of a visit.
    Visit(VisitId),
}

const COLUMNS: &str = "id, record, parent, at_ms, utc_offset_min, withdrawn, invented, site, equipment, visit, title, app_version, body, kind, device";

fn bad(error: BadId) -> rusqlite::Error {
    rusqlite::Error::FromSqlConversionFailure(0, rusqlite::types::Type::Text, Box::new(error))
}

fn uuid(row: &Row<'_>, column: usize) -> rusqlite::Result<uuid::Uuid> {
    id::parse(&row.get::<_, String>(column)?).map_err(bad)
}

fn optional(row: &Row<'_>, column: usize) -> rusqlite::Result<Option<uuid::Uuid>> {
    row.get::<_, Option<String>>(column)?.map(|text| id::parse(&text).map_err(bad)).transpose()
}

/// Text as it stands. A byte that the disk flipped is shown as a mark and hides neither the rest of the text nor the
/// other rows of a list.
pub(crate) fn text(row: &Row<'_>, column: usize) -> rusqlite::Result<String> {
    Ok(String::from_utf8_lossy(row.get_ref(column)?.as_bytes()?).into_owned())
}

fn revision(row: &Row<'_>) -> rusqlite::Result<Revision> {
    let record = uuid(row, 1)?;
    let kind: String = row.get(13)?;
    let record = match kind.as_str() {
        "site" => RecordId::Site(SiteId::of(record)),
        "equipment" => RecordId::Equipment(EquipmentId::of(record)),
        "visit" => RecordId::Visit(VisitId::of(record)),
        "entry" => RecordId::Entry(EntryId::of(record)),
        "instrument" => RecordId::Instrument(InstrumentId::of(record)),
        other => return Err(bad(BadId { text: format!("{other} {record}") })),
    };
    Ok(Revision {
        id: RevisionId::of(uuid(row, 0)?),
        record,
        parent: optional(row, 2)?.map(RevisionId::of),
        device: row.get(14)?,
        at: At { ms: row.get(3)?, utc_offset_min: row.get(4)? },
        withdrawn: row.get(5)?,
        body: Body {
            site: optional(row, 7)?.map(SiteId::of),
            equipment: optional(row, 8)?.map(EquipmentId::of),
            visit: optional(row, 9)?.map(VisitId::of),
            title: text(row, 10)?,
            invented: row.get(6)?,
            app_version: text(row, 11)?,
            text: text(row, 12)?,
            results: Vec::new(),
        },
    })
}

impl Ledger {
    /// Files a new record with its first revision. Returns after the commit.
    ///
    /// # Errors
    ///
    /// [`WriteError`]; nothing is stored then.
    pub fn file(
        &mut self,
        kind: Kind,
        at: At,
        body: &Body,
        from: Option<DraftId>,
    ) -> Result<Revision, WriteError> {
        self.write(RecordId::new(kind, at), None, at, false, body, from)
    }

    /// Writes a further revision of a record, replacing `parent`. Returns after the commit.
    ///
    /// # Errors
    ///
    /// [`WriteError`], [`WriteError::NotFound`] where `parent` is not in this ledger; nothing is stored then.
    pub fn revise(
        &mut self,
        parent: &Revision,
        at: At,
        body: &Body,
        from: Option<DraftId>,
    ) -> Result<Revision, WriteError> {
        self.write(parent.record, Some(parent.id), at, false, body, from)
    }

    /// Takes a record back, or brings it back: a revision that says so. Nothing is erased.
    ///
    /// # Errors
    ///
    /// [`WriteError`]; nothing is stored then.
    pub fn withdraw(
        &mut self,
        parent: &Revision,
        at: At,
        withdrawn: bool,
    ) -> Result<Revision, WriteError> {
        let results = self.results(parent.id)?;
        let body = Body { results, ..parent.body.clone() };
        self.write(parent.record, Some(parent.id), at, withdrawn, &body, None)
    }

    /// The one place that writes a revision.
    fn write(
        &mut self,
        record: RecordId,
        parent: Option<RevisionId>,
        at: At,
        withdrawn: bool,
        body: &Body,
        from: Option<DraftId>,
    ) -> Result<Revision, WriteError> {
        let id = RevisionId::new(at);
        let device = self.device.clone();
        let transaction =
            self.connection.transaction_with_behavior(TransactionBehavior::Immediate)?;
        if let Some(parent) = parent {
            let here = "SELECT 1 FROM revision WHERE id = ?1 AND record = ?2";
            if !transaction.prepare_cached(here)?.exists([parent.to_string(), record.text()])? {
                return Err(WriteError::NotFound {
                    what: format!("{} {record}", record.kind().text()),
                });
            }
        }
        transaction.execute(
            "INSERT INTO revision VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7, ?8, ?9, ?10, ?11, ?12, ?13, ?14, ?15)",
            params![
                id.to_string(),
                record.text(),
                record.kind().text(),
                parent.map(|parent| parent.to_string()),
                device,
                at.ms,
                at.utc_offset_min,
                withdrawn,
                body.invented,
                body.site.map(|site| site.to_string()),
                body.equipment.map(|equipment| equipment.to_string()),
                body.visit.map(|visit| visit.to_string()),
                body.title,
                body.app_version,
                body.text,
            ],
        )?;
        for result in &body.results {
            transaction.execute(
                "INSERT INTO result VALUES (?1, ?2, ?3, ?4, ?5)",
                params![
                    id.to_string(),
                    result.key,
                    result.quantity,
                    result.si,
                    result.half_width_si
                ],
            )?;
        }
        if let Some(draft) = from {
            transaction.execute("DELETE FROM draft WHERE id = ?1", [draft.to_string()])?;
        }
        transaction.commit()?;
        Ok(Revision {
            id,
            record,
            parent,
            device,
            at,
            withdrawn,
            body: Body { results: Vec::new(), ..body.clone() },
        })
    }

    /// What stands now of a record: usually one revision; several where it was corrected apart, newest first.
    ///
    /// # Errors
    ///
    /// [`WriteError::NotFound`] where there is no such record.
    pub fn heads(&self, record: RecordId) -> Result<Vec<Head>, WriteError> {
        let sql =
            format!("SELECT {COLUMNS} FROM head WHERE record = ?1 ORDER BY at_ms DESC, id DESC");
        let heads = self.select(&sql, [record.text()])?;
        if heads.is_empty() {
            Err(WriteError::NotFound { what: format!("{} {record}", record.kind().text()) })
        } else {
            Ok(heads)
        }
    }

    /// The newest of what stands now of a record.
    ///
    /// # Errors
    ///
    /// [`WriteError::NotFound`] where there is no such record.
    pub fn head(&self, record: RecordId) -> Result<Head, WriteError> {
        let mut heads = self.heads(record)?;
        Ok(heads.swap_remove(0))
    }

    /// Every revision of a record, each after the one that it replaces. Clocks decide only between corrections
    /// made apart.
    ///
    /// # Errors
    ///
    /// [`WriteError`] where it cannot be read.
    pub fn history(&self, record: RecordId) -> Result<Vec<Revision>, WriteError> {
        let sql = format!("SELECT {COLUMNS} FROM revision WHERE record = ?1 ORDER BY at_ms, id");
        let mut left = self.select(&sql, [record.text()])?;
        let mut ordered: Vec<Revision> = Vec::with_capacity(left.len());
        while !left.is_empty() {
            let ready = |revision: &Revision| {
                revision
                    .parent
                    .is_none_or(|parent| ordered.iter().any(|before| before.id == parent))
            };
            // A parent that is not here (it was lost with a damaged file) holds nothing up.
            let next = left.iter().position(ready).unwrap_or(0);
            ordered.push(left.remove(next));
        }
        Ok(ordered)
    }

    /// What stands now of a kind, newest record first. Withdrawn ones are listed too and say so.
    ///
    /// # Errors
    ///
    /// [`WriteError`] where it cannot be read.
    pub fn list(&self, kind: Kind, within: Within) -> Result<Vec<Head>, WriteError> {
        self.newest(kind, within, u32::MAX)
    }

    /// As [`Ledger::list`], but no more than `count` of them: a first screen need not read a ledger of years.
    ///
    /// # Errors
    ///
    /// [`WriteError`] where it cannot be read.
    pub fn newest(&self, kind: Kind, within: Within, count: u32) -> Result<Vec<Head>, WriteError> {
        // The plus keeps SQLite from taking the index of kinds where a place narrows far better.
        let (clause, id) = match within {
            Within::Everything => ("kind = ?1 AND ?2 = ''", String::new()),
            Within::Site(site) => ("+kind = ?1 AND site = ?2", site.to_string()),
            Within::Equipment(equipment) => {
                ("+kind = ?1 AND equipment = ?2", equipment.to_string())
            }
            Within::Visit(visit) => ("+kind = ?1 AND visit = ?2", visit.to_string()),
        };
        let sql = format!(
            "SELECT {COLUMNS} FROM head WHERE {clause} ORDER BY record DESC, at_ms DESC, id DESC LIMIT ?3"
        );
        self.select(&sql, params![kind.text(), id, count])
    }

    fn select(
        &self,
        sql: &str,
        parameters: impl rusqlite::Params,
    ) -> Result<Vec<Revision>, WriteError> {
        let mut statement = self.connection.prepare_cached(sql)?;
        let rows = statement.query_map(parameters, revision)?;
        Ok(rows.collect::<rusqlite::Result<_>>()?)
    }

    /// Results of a revision, by key.
    ///
    /// # Errors
    ///
    /// [`WriteError`] where they cannot be read.
    pub fn results(&self, revision: RevisionId) -> Result<Vec<ResultRow>, WriteError> {
        let mut statement = self.connection.prepare_cached(
            "SELECT key, quantity, si, half_width_si FROM result WHERE revision = ?1 ORDER BY key",
        )?;
        let row = |row: &Row<'_>| {
            Ok(ResultRow {
                key: text(row, 0)?,
                quantity: text(row, 1)?,
                si: row.get(2)?,
                half_width_si: row.get(3)?,
            })
        };
        let rows = statement.query_map([revision.to_string()], row)?;
        Ok(rows.collect::<rusqlite::Result<_>>()?)
    }

    /// When the newest entry of a piece of equipment was filed.
    ///
    /// # Errors
    ///
    /// [`WriteError`] where it cannot be read.
    pub fn last_entry_at(&self, equipment: EquipmentId) -> Result<Option<At>, WriteError> {
        let sql = "SELECT at_ms, utc_offset_min FROM head WHERE kind = 'entry' AND equipment = ?1 AND withdrawn = 0 ORDER BY at_ms DESC LIMIT 1";
        let at = |row: &Row<'_>| Ok(At { ms: row.get(0)?, utc_offset_min: row.get(1)? });
        Ok(self.connection.query_row(sql, [equipment.to_string()], at).optional()?)
    }
}

macro_rules! into_record {
    ($($name:ident => $variant:ident;)*) => {$(
        impl From<$name> for RecordId {
            fn from(id: $name) -> Self {
                RecordId::$variant(id)
            }
        }
    )*};
}

into_record! {
    SiteId => Site;
    EquipmentId => Equipment;
    VisitId => Visit;
    EntryId => Entry;
    InstrumentId => Instrument;
}
