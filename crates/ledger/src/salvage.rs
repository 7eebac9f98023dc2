//! What can still be read of a damaged ledger, carried over row by row.

use std::path::Path;

use rusqlite::{Connection, ErrorCode, OpenFlags, Row, Statement, types::Value};

use crate::pages::each_row;

/// How much was carried over.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq)]
pub struct Salvaged {
    /// Records of which at least one revision could be read.
    pub records: usize,
    /// Their revisions.
    pub revisions: usize,
    /// Unfinished forms.
    pub drafts: usize,
}

impl Salvaged {
    /// What is in a ledger.
    pub(crate) fn count(ledger: &Connection) -> rusqlite::Result<Self> {
        let count = |sql| -> rusqlite::Result<usize> {
            let number: u32 = ledger.query_row(sql, [], |row| row.get(0))?;
            Ok(number as usize)
        };
        Ok(Self {
            records: count("SELECT count(DISTINCT record) FROM revision")?,
            revisions: count("SELECT count(*) FROM revision")?,
            drafts: count("SELECT count(*) FROM draft WHERE discarded_ms IS NULL")?,
        })
    }
}

/// A table of a damaged file.
struct Table {
    name: &'static str,
    /// Its key, that rows can be asked for one by one.
    key: &'static str,
    /// What to read, newest schema first. The first that the file understands is taken.
    selects: &'static [&'static str],
    insert: &'static str,
}

/// In the order that references ask for.
const TABLES: &[Table] = &[
    Table {
        name: "identity",
        key: "only_row",
        selects: &["SELECT only_row, device FROM identity"],
        insert: "INSERT OR IGNORE INTO identity VALUES (?1, ?2)",
    },
    Table {
        name: "revision",
        key: "id",
        selects: &[
            "SELECT revision.id, record, kind, parent, device, at_ms, utc_offset_min, withdrawn, invented, site, equipment, visit, title, app_version, body FROM revision",
            "SELECT revision.id, record, record.kind, parent, device, at_ms, utc_offset_min, withdrawn, invented, site, equipment, visit, title, app_version, body FROM revision JOIN record ON record.id = revision.record",
        ],
        insert: "INSERT OR IGNORE INTO revision VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7, ?8, ?9, ?10, ?11, ?12, ?13, ?14, ?15)",
    },
    Table {
        name: "result",
        key: "revision",
        selects: &["SELECT revision, key, quantity, si, half_width_si FROM result"],
        insert: "INSERT OR IGNORE INTO result VALUES (?1, ?2, ?3, ?4, ?5)",
    },
    Table {
        name: "draft",
        key: "id",
        selects: &["SELECT id, kept_ms, discarded_ms, title, body FROM draft"],
        insert: "INSERT OR IGNORE INTO draft VALUES (?1, ?2, ?3, ?4, ?5)",
    },
    Table {
        name: "preference",
        key: "key",
        selects: &["SELECT key, value FROM preference"],
        insert: "INSERT OR IGNORE INTO preference VALUES (?1, ?2)",
    },
];

/// Reads what can be read of `damaged` into `ledger`, in one transaction. The damaged file is only read. Rows that
/// cannot be read or do not fit are left.
///
/// # Errors
///
/// Where `ledger` cannot be written; damage is no error.
pub(crate) fn carry_over(damaged: &Path, ledger: &mut Connection) -> rusqlite::Result<Salvaged> {
    let transaction = ledger.transaction()?;
    // Asks by way of SQLite first: it knows what is current.
    let mut drafts_known = false;
    if let Ok(from) = Connection::open_with_flags(damaged, OpenFlags::SQLITE_OPEN_READ_ONLY)
        && from.pragma_update(None, "trusted_schema", false).is_ok()
        && from.pragma_update(None, "cell_size_check", true).is_ok()
    {
        for table in TABLES {
            carry(&from, &transaction, table)?;
        }
        drafts_known =
            from.prepare("SELECT * FROM draft").is_ok_and(|mut all| all.query([]).is_ok());
    }
    // What was filed never changes, so that it can be taken from wherever it stands. A page may also hold a draft that
    // was filed or discarded long ago: better that than losing one, but only where SQLite cannot tell.
    carry_pages(damaged, &transaction, !drafts_known)?;
    let salvaged = Salvaged::count(&transaction)?;
    transaction.commit()?;
    Ok(salvaged)
}

/// Copies a table's rows on every way that leads to them. Reading a table stops at the first damaged page; read from
/// the other end, and row by row through the index, the rows behind it can be had. A row met twice is ignored.
fn carry(from: &Connection, to: &Connection, table: &Table) -> rusqlite::Result<()> {
    let Some(select) = table.selects.iter().find(|select| from.prepare(select).is_ok()) else {
        return Ok(());
    };
    let Table { name, key, insert, .. } = table;
    let mut insert = to.prepare(insert)?;
    for order in [
        String::new(),
        format!("ORDER BY {name}.rowid DESC"),
        format!("ORDER BY {name}.{key} DESC"),
    ] {
        if let Ok(mut statement) = from.prepare(&format!("{select} {order}")) {
            rows(&mut statement, [], &mut insert)?;
        }
    }
    let mut keys = Vec::new();
    for order in ["ASC", "DESC"] {
        let Ok(mut statement) =
            from.prepare(&format!("SELECT {key} FROM {name} ORDER BY {key} {order}"))
        else {
            continue;
        };
        let Ok(mut found) = statement.query([]) else { continue };
        while let Ok(Some(row)) = found.next() {
            keys.extend(row.get::<_, Value>(0));
        }
    }
    if let Ok(mut one) = from.prepare(&format!("{select} WHERE {name}.{key} = ?1")) {
        for key in keys {
            rows(&mut one, [key], &mut insert)?;
        }
    }
    Ok(())
}

/// Copies rows that look like ours from the pages themselves.
fn carry_pages(damaged: &Path, to: &Connection, drafts: bool) -> rusqlite::Result<()> {
    let insert = |name: &str| {
        TABLES.iter().find(|table| table.name == name).map_or("", |table| table.insert)
    };
    let mut revision = to.prepare(insert("revision"))?;
    let mut draft = to.prepare(insert("draft"))?;
    let mut results = Vec::new();
    each_row(damaged, |in_table, values| match (in_table, values.as_slice()) {
        (true, [Value::Text(_), Value::Text(_), Value::Text(_), ..]) if values.len() == 15 => {
            put(&mut revision, values)
        }
        (false, [Value::Text(_), Value::Text(_), Value::Text(_), _, _]) => {
            results.push(values);
            Ok(())
        }
        (false, [Value::Text(_), Value::Integer(_), _, Value::Text(_), Value::Text(_)])
            if drafts =>
        {
            put(&mut draft, values)
        }
        _ => Ok(()),
    })?;
    // Results name their revision, which may stand on a later page.
    let mut result = to.prepare(insert("result"))?;
    results.into_iter().try_for_each(|values| put(&mut result, values))
}

/// Inserts a row. One that the schema refuses is damaged too, and left.
fn put(insert: &mut Statement<'_>, values: Vec<Value>) -> rusqlite::Result<()> {
    match insert.execute(rusqlite::params_from_iter(values)) {
        Err(error) if error.sqlite_error_code() != Some(ErrorCode::ConstraintViolation) => {
            Err(error)
        }
        _ => Ok(()),
    }
}

/// Copies what a statement finds until the damage stops it.
fn rows(
    statement: &mut Statement<'_>,
    parameters: impl rusqlite::Params,
    insert: &mut Statement<'_>,
) -> rusqlite::Result<()> {
    let columns = statement.column_count();
    let values = |row: &Row<'_>| -> rusqlite::Result<Vec<Value>> {
        (0..columns).map(|index| row.get(index)).collect()
    };
    let Ok(mut found) = statement.query(parameters) else { return Ok(()) };
    while let Ok(Some(row)) = found.next() {
        let Ok(values) = values(row) else { continue };
        put(insert, values)?;
    }
    Ok(())
}
