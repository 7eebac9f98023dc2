//! Rows read straight from the pages of a damaged file, where SQLite no longer finds the way to them.
//!
//! A row stands whole on a leaf of its table's tree, with overflow pages behind it. Where the root of the tree or the
//! schema is lost, the leaves are still there. Source: "Database File Format", <https://www.sqlite.org/fileformat2.html>,
//! sections 1.6 (B-tree Pages), 1.7 (Cell Payload Overflow Pages), 2.1 (Record Format) and 4 (The Write-Ahead Log).

use std::collections::BTreeMap;
use std::path::Path;

use rusqlite::types::Value;

use crate::beside::with_suffix;

/// The page size of every ledger: SQLite's default, never changed by us. Read from no header, because that may be lost.
const PAGE: usize = 4096;

const TABLE_LEAF: u8 = 0x0d;
const INDEX_LEAF: u8 = 0x0a;
const INDEX_INTERIOR: u8 = 0x02;

/// Page numbers start at 1.
type Pages<'a> = BTreeMap<usize, &'a [u8]>;

/// Hands over every row that can be made out on any page: with true, one of an ordinary table; with false, one of an
/// index or of a table without row numbers.
pub(crate) fn each_row<E>(
    path: &Path,
    mut row: impl FnMut(bool, Vec<Value>) -> Result<(), E>,
) -> Result<(), E> {
    let file = std::fs::read(path).unwrap_or_default();
    let log = std::fs::read(with_suffix(path, "-wal")).unwrap_or_default();
    let mut pages: Pages<'_> = (1..).zip(file.chunks_exact(PAGE)).collect();
    overlay(&mut pages, &log);
    for (number, page) in &pages {
        // The file's own header stands before the first page's.
        let start = if *number == 1 { 100 } else { 0 };
        let Some(kind) = page.get(start) else { continue };
        let (header, skipped) = match *kind {
            TABLE_LEAF | INDEX_LEAF => (8, 0),
            INDEX_INTERIOR => (12, 4),
            _ => continue,
        };
        let cells = number_at(page, start + 3, 2).unwrap_or(0);
        for cell in 0..cells {
            let found = number_at(page, start + header + 2 * cell, 2)
                .and_then(|at| payload(&pages, page, at + skipped, *kind == TABLE_LEAF))
                .and_then(|payload| record(&payload));
            if let Some(values) = found {
                row(*kind == TABLE_LEAF, values)?;
            }
        }
    }
    Ok(())
}

/// Puts the pages of committed changes over those of the file.
fn overlay<'a>(pages: &mut Pages<'a>, log: &'a [u8]) {
    let Some(salt) = log.get(16..24) else { return };
    let mut open: Pages<'a> = Pages::new();
    for frame in log[32.min(log.len())..].chunks_exact(24 + PAGE) {
        // Frames of an older round of the log carry another salt.
        if frame.get(8..16) != Some(salt) {
            break;
        }
        let Some(number) = number_at(frame, 0, 4) else { break };
        open.insert(number, &frame[24..]);
        if number_at(frame, 4, 4) != Some(0) {
            pages.append(&mut open);
        }
    }
}

/// An unsigned number of a few bytes, the highest first.
fn number_at(bytes: &[u8], at: usize, length: usize) -> Option<usize> {
    let bytes = bytes.get(at..at.checked_add(length)?)?;
    Some(bytes.iter().fold(0, |number, byte| number << 8 | usize::from(*byte)))
}

/// A number of one to nine bytes, and where it ends.
fn varint(bytes: &[u8], at: usize) -> Option<(u64, usize)> {
    let mut number = 0_u64;
    for index in 0..8 {
        let byte = *bytes.get(at + index)?;
        number = number << 7 | u64::from(byte & 0x7f);
        if byte & 0x80 == 0 {
            return Some((number, at + index + 1));
        }
    }
    Some((number << 8 | u64::from(*bytes.get(at + 8)?), at + 9))
}

/// What a cell holds, gathered from its overflow pages.
fn payload(pages: &Pages<'_>, page: &[u8], at: usize, in_table: bool) -> Option<Vec<u8>> {
    let (length, mut at) = varint(page, at)?;
    if in_table {
        (_, at) = varint(page, at)?;
    }
    let length = usize::try_from(length).ok().filter(|length| *length <= pages.len() * PAGE)?;
    // The names and formulas X, M and K are those of section 1.7; no bytes of a page are reserved.
    let x = if in_table { PAGE - 35 } else { (PAGE - 12) * 64 / 255 - 23 };
    let m = (PAGE - 12) * 32 / 255 - 23;
    if length <= x {
        return Some(page.get(at..at + length)?.to_vec());
    }
    let k = m + (length - m) % (PAGE - 4);
    let here = if k <= x { k } else { m };
    let mut gathered = page.get(at..at + here)?.to_vec();
    let mut next = number_at(page, at + here, 4)?;
    while gathered.len() < length {
        let overflow = pages.get(&next)?;
        next = number_at(overflow, 0, 4)?;
        let wanted = (length - gathered.len()).min(PAGE - 4);
        gathered.extend_from_slice(overflow.get(4..4 + wanted)?);
    }
    Some(gathered)
}

/// The values of a record.
fn record(payload: &[u8]) -> Option<Vec<Value>> {
    let (end, mut at) = varint(payload, 0)?;
    let end = usize::try_from(end).ok().filter(|end| *end <= payload.len())?;
    let mut body = end;
    let mut values = Vec::new();
    while at < end {
        let kind;
        (kind, at) = varint(payload, at)?;
        let length = match kind {
            0 | 8 | 9 => 0,
            1..=4 => usize::try_from(kind).ok()?,
            5 => 6,
            6 | 7 => 8,
            10 | 11 => return None,
            _ => usize::try_from((kind - 12) / 2).ok()?,
        };
        let bytes = payload.get(body..body.checked_add(length)?)?;
        body += length;
        values.push(match kind {
            0 => Value::Null,
            7 => Value::Real(f64::from_be_bytes(bytes.try_into().ok()?)),
            8 => Value::Integer(0),
            9 => Value::Integer(1),
            1..=6 => Value::Integer(signed(bytes)),
            kind if kind % 2 == 0 => Value::Blob(bytes.to_vec()),
            _ => Value::Text(std::str::from_utf8(bytes).ok()?.to_owned()),
        });
    }
    Some(values)
}

/// A signed number of one to eight bytes, the highest first.
fn signed(bytes: &[u8]) -> i64 {
    let first = bytes.first().is_some_and(|byte| byte & 0x80 != 0);
    bytes.iter().fold(if first { -1 } else { 0 }, |number, byte| number << 8 | i64::from(*byte))
}

#[cfg(test)]
mod tests {
    use super::*;
    use proptest::prelude::*;
    use rusqlite::{Connection, params};

    /// Every storage class, every width of integer, overflow of one and of many pages, both sorts of tree, in the file
    /// and in the log: what is read from the pages is what SQLite was given.
    #[test]
    fn rows_read_from_the_pages_are_those_that_were_written() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("file");
        let connection = Connection::open(&path).unwrap();
        connection
            .execute_batch(
                "PRAGMA journal_mode = WAL;
                 CREATE TABLE plain (id INTEGER, text TEXT, number REAL, bytes BLOB) STRICT;
                 CREATE TABLE keyed (id INTEGER PRIMARY KEY, text TEXT, number REAL, bytes BLOB) STRICT, WITHOUT ROWID;",
            )
            .unwrap();
        let mut written = Vec::new();
        let mut insert = |from: i64, to: i64| {
            for number in from..to {
                let id = if number % 2 == 0 { 1_i64 << number } else { -(1_i64 << number) };
                let text = "ä".repeat(usize::try_from(number * number * 7).unwrap());
                let real = 0.1 * id as f64;
                for table in ["plain", "keyed"] {
                    let sql = format!("INSERT INTO {table} VALUES (?1, ?2, ?3, ?4)");
                    connection.execute(&sql, params![id, text, real, b"\0\xff"]).unwrap();
                }
                written.push(vec![
                    Value::Integer(id),
                    Value::Text(text),
                    Value::Real(real),
                    Value::Blob(b"\0\xff".to_vec()),
                ]);
            }
        };
        insert(2, 40);
        connection.query_row("PRAGMA wal_checkpoint(TRUNCATE)", [], |_| Ok(())).unwrap();
        insert(40, 62);
        assert!(std::fs::metadata(with_suffix(&path, "-wal")).unwrap().len() > 0);
        let (mut plain, mut keyed) = (Vec::new(), Vec::new());
        each_row(&path, |in_table, values| {
            // Real numbers that are whole are stored as integers.
            let whole = |value: Value| match value {
                Value::Integer(number) => Value::Real(number as f64),
                Value::Null | Value::Real(_) | Value::Text(_) | Value::Blob(_) => value,
            };
            let mut values = values;
            if let Some(real) = values.get_mut(2) {
                *real = whole(real.clone());
            }
            if values.len() == 4 {
                if in_table { plain.push(values) } else { keyed.push(values) }
            }
            Ok::<(), ()>(())
        })
        .unwrap();
        let by_id = |rows: &mut Vec<Vec<Value>>| {
            rows.sort_by_key(|row| match row[0] {
                Value::Integer(id) => id,
                Value::Null | Value::Real(_) | Value::Text(_) | Value::Blob(_) => panic!("{row:?}"),
            });
        };
        by_id(&mut written);
        by_id(&mut plain);
        by_id(&mut keyed);
        assert_eq!(plain, written);
        assert_eq!(keyed, written);
    }

    proptest! {
        /// Whatever stands on the pages, reading ends and does not panic.
        #[test]
        fn any_bytes_are_read_without_panic(
            bytes in proptest::collection::vec(any::<u8>(), PAGE..3 * PAGE),
            kinds in proptest::collection::vec(prop_oneof![Just(TABLE_LEAF), Just(INDEX_LEAF), Just(INDEX_INTERIOR)], 3),
        ) {
            let mut bytes = bytes;
            for (page, kind) in bytes.chunks_exact_mut(PAGE).zip(kinds) {
                page[0] = kind;
            }
            let folder = tempfile::tempdir().unwrap();
            let path = folder.path().join("file");
            std::fs::write(&path, &bytes).unwrap();
            std::fs::write(with_suffix(&path, "-wal"), &bytes).unwrap();
            each_row(&path, |_, _| Ok::<(), ()>(())).unwrap();
        }
    }
}
