//! The life of a ledger's file: refusals, damage, revisions, a full disk, two programs.

#![expect(clippy::unwrap_used, reason = "what fails here fails the test")]

use std::path::{Path, PathBuf};

use dewledger_ledger::{
    APPLICATION_ID, At, Body, Event, Kind, Ledger, OpenError, RecordId, ResultRow, SCHEMA, Within,
    WriteError,
};
use rusqlite::Connection;

fn at(ms: i64) -> At {
    At { ms: 1_780_000_000_000 + ms, utc_offset_min: 120 }
}

fn open(path: &Path) -> Ledger {
    Ledger::open(path, at(0)).unwrap().ledger
}

fn body(title: &str) -> Body {
    Body {
        title: title.to_owned(),
        text: "{}".to_owned(),
        app_version: "0".to_owned(),
        ..Body::default()
    }
}

fn folder() -> (tempfile::TempDir, PathBuf) {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("db").join("ledger.dewledger");
    (folder, path)
}

#[test]
fn a_fresh_ledger_says_what_it_is() {
    let (_folder, path) = folder();
    let opened = Ledger::open(&path, at(0)).unwrap();
    assert_eq!(opened.event, Event::Fresh);
    let connection = Connection::open(&path).unwrap();
    let id: i32 = connection.pragma_query_value(None, "application_id", |row| row.get(0)).unwrap();
    let schema: i64 =
        connection.pragma_query_value(None, "user_version", |row| row.get(0)).unwrap();
    assert_eq!((id, schema), (APPLICATION_ID, SCHEMA));
    let mode: String =
        connection.pragma_query_value(None, "journal_mode", |row| row.get(0)).unwrap();
    assert_eq!(mode, "wal");
    let loose: i64 = connection
        .query_row("SELECT count(*) FROM pragma_table_list WHERE schema = 'main' AND type = 'table' AND name NOT LIKE 'sqlite_%' AND strict = 0", [], |row| row.get(0))
        .unwrap();
    assert_eq!(loose, 0, "every table is STRICT");
    drop(opened);
    assert_eq!(Ledger::open(&path, at(1)).unwrap().event, Event::Existing);
}

#[test]
fn newer_and_foreign_files_are_refused_and_left_as_they_are() {
    for (name, sql) in [
        (
            "newer",
            format!(
                "PRAGMA application_id = {APPLICATION_ID}; PRAGMA user_version = 999; CREATE TABLE t (a)"
            ),
        ),
        ("foreign", "PRAGMA application_id = 12345; CREATE TABLE t (a)".to_owned()),
        ("nameless", "CREATE TABLE t (a)".to_owned()),
    ] {
        let (_folder, path) = folder();
        std::fs::create_dir_all(path.parent().unwrap()).unwrap();
        Connection::open(&path).unwrap().execute_batch(&sql).unwrap();
        let before = std::fs::read(&path).unwrap();
        let error = Ledger::open(&path, at(0)).unwrap_err();
        match name {
            "newer" => assert!(matches!(error, OpenError::TooNew { found: 999, .. }), "{error}"),
            _ => assert!(matches!(error, OpenError::Foreign { .. }), "{error}"),
        }
        assert_eq!(std::fs::read(&path).unwrap(), before, "{name} was touched");
    }
}

#[test]
fn what_is_filed_cannot_be_changed_behind_its_back() {
    let (_folder, path) = folder();
    let mut ledger = open(&path);
    let mut filed = body("entry");
    filed.results.push(ResultRow {
        key: "total".into(),
        quantity: "power".into(),
        si: -1.0,
        half_width_si: None,
    });
    ledger.file(Kind::Entry, at(1), &filed, None).unwrap();
    let connection = Connection::open(&path).unwrap();
    connection.pragma_update(None, "recursive_triggers", true).unwrap();
    for sql in [
        "UPDATE revision SET title = 'other'",
        "DELETE FROM revision",
        "INSERT OR REPLACE INTO revision SELECT * FROM revision",
        "UPDATE record SET kind = 'site'",
        "DELETE FROM record",
        "UPDATE result SET si = 2.0",
        "DELETE FROM result",
    ] {
        let error = connection.execute(sql, []).unwrap_err().to_string();
        assert!(error.contains("append-only"), "{sql}: {error}");
    }
}

#[test]
fn a_correction_is_a_revision_and_two_made_apart_are_both_kept() {
    let (_folder, path) = folder();
    let mut ledger = open(&path);
    let first = ledger.file(Kind::Entry, at(1), &body("first"), None).unwrap();
    let one = ledger.revise(&first, at(2), &body("one"), None).unwrap();
    assert_eq!(ledger.head(first.record).unwrap().body.title, "one");
    let other = ledger.revise(&first, at(3), &body("other"), None).unwrap();
    let heads = ledger.heads(first.record).unwrap();
    assert_eq!(heads.iter().map(|head| head.id).collect::<Vec<_>>(), vec![other.id, one.id]);
    assert_eq!(ledger.history(first.record).unwrap().len(), 3);
}

#[test]
fn withdrawing_erases_nothing() {
    let (_folder, path) = folder();
    let mut ledger = open(&path);
    let first = ledger.file(Kind::Site, at(1), &body("site"), None).unwrap();
    let gone = ledger.withdraw(&first, at(2), true).unwrap();
    assert!(ledger.head(first.record).unwrap().withdrawn);
    ledger.withdraw(&gone, at(3), false).unwrap();
    assert!(!ledger.head(first.record).unwrap().withdrawn);
    assert_eq!(ledger.list(Kind::Site, Within::Everything).unwrap().len(), 1);
}

#[test]
fn filing_takes_the_draft_with_it() {
    let (_folder, path) = folder();
    let mut ledger = open(&path);
    let draft = ledger.keep_draft(None, at(1), "half", "text").unwrap();
    ledger.keep_draft(Some(draft), at(2), "half", "more text").unwrap();
    assert_eq!(ledger.drafts().unwrap()[0].text, "more text");
    ledger.file(Kind::Entry, at(3), &body("entry"), Some(draft)).unwrap();
    assert!(ledger.drafts().unwrap().is_empty());
    assert!(matches!(ledger.draft(draft), Err(WriteError::NotFound { .. })));
}

#[test]
fn a_discarded_draft_can_be_brought_back_for_a_day() {
    let (_folder, path) = folder();
    let mut ledger = open(&path);
    let draft = ledger.keep_draft(None, at(1), "half", "text").unwrap();
    ledger.discard_draft(draft, at(2)).unwrap();
    assert!(ledger.drafts().unwrap().is_empty());
    assert_eq!(ledger.restore_draft(draft).unwrap().text, "text");
    ledger.discard_draft(draft, at(3)).unwrap();
    let other = ledger.keep_draft(None, at(4), "half", "text").unwrap();
    ledger.discard_draft(other, at(25 * 3600 * 1000)).unwrap();
    assert!(ledger.restore_draft(draft).is_err());
}

#[test]
fn lists_know_where_things_belong() {
    let (_folder, path) = folder();
    let mut ledger = open(&path);
    let RecordId::Site(site) = ledger.file(Kind::Site, at(1), &body("here"), None).unwrap().record
    else {
        panic!()
    };
    let RecordId::Site(other) =
        ledger.file(Kind::Site, at(2), &body("there"), None).unwrap().record
    else {
        panic!()
    };
    for (site, title) in [(site, "AH-1"), (site, "AH-2"), (other, "AH-3")] {
        ledger
            .file(Kind::Equipment, at(3), &Body { site: Some(site), ..body(title) }, None)
            .unwrap();
    }
    let here = ledger.list(Kind::Equipment, Within::Site(site)).unwrap();
    assert_eq!(here.len(), 2);
    assert_eq!(ledger.list(Kind::Equipment, Within::Everything).unwrap().len(), 3);
}

#[test]
fn a_full_disk_is_said_and_a_later_save_works() {
    let (_folder, path) = folder();
    let mut ledger = open(&path);
    ledger.checkpoint().unwrap();
    let connection = Connection::open(&path).unwrap();
    let pages: i64 = connection.pragma_query_value(None, "page_count", |row| row.get(0)).unwrap();
    drop(connection);
    ledger.limit_pages_for_tests(pages + 1).unwrap();
    let large = Body { text: "x".repeat(200_000), ..body("large") };
    let error = ledger.file(Kind::Entry, at(1), &large, None).unwrap_err();
    assert!(matches!(error, WriteError::DiskFull), "{error}");
    assert!(ledger.list(Kind::Entry, Within::Everything).unwrap().is_empty());
    ledger.limit_pages_for_tests(1_000_000).unwrap();
    ledger.file(Kind::Entry, at(2), &large, None).unwrap();
    assert_eq!(ledger.list(Kind::Entry, Within::Everything).unwrap().len(), 1);
}

#[test]
fn two_programs_take_turns() {
    let (_folder, path) = folder();
    let (mut one, mut other) = (open(&path), open(&path));
    for turn in 0..20 {
        one.file(Kind::Entry, at(turn), &body("one"), None).unwrap();
        other.file(Kind::Entry, at(turn), &body("other"), None).unwrap();
    }
    assert_eq!(one.list(Kind::Entry, Within::Everything).unwrap().len(), 40);
}

#[test]
fn a_damaged_file_is_opened_sound_or_set_aside() {
    let (_folder, path) = folder();
    let mut ledger = open(&path);
    for number in 0..60 {
        let entry = Body { text: format!("{{\"n\":{number}}}").repeat(40), ..body("entry") };
        ledger.file(Kind::Entry, at(number), &entry, None).unwrap();
    }
    ledger.checkpoint().unwrap();
    drop(ledger);
    let whole = std::fs::read(&path).unwrap();
    let (mut sound, mut aside, mut carried) = (0, 0, 0);
    // Truncations at every other page, and bytes flipped all over the file.
    let truncated = (1..whole.len() / 4096).step_by(2).map(|pages| whole[..pages * 4096].to_vec());
    let flipped = (0..240).map(|case: usize| {
        let mut bytes = whole.clone();
        let place = (case * 7919 + 13) % bytes.len();
        bytes[place] ^= 0x5a;
        bytes
    });
    for bytes in truncated.chain(flipped) {
        let (_folder, path) = folder();
        std::fs::create_dir_all(path.parent().unwrap()).unwrap();
        std::fs::write(&path, &bytes).unwrap();
        match Ledger::open(&path, at(100)) {
            Ok(opened) => match opened.event {
                Event::SetAside { damaged, salvaged } => {
                    assert_eq!(
                        std::fs::read(&damaged).unwrap(),
                        bytes,
                        "the damaged file is kept as it was"
                    );
                    aside += 1;
                    carried += salvaged.revisions;
                    opened.ledger.list(Kind::Entry, Within::Everything).unwrap();
                }
                Event::Fresh | Event::Existing | Event::Migrated { .. } => sound += 1,
            },
            // The header itself may say that it is another program's, newer, or no database: refused, untouched.
            Err(_) => assert_eq!(std::fs::read(&path).unwrap(), bytes),
        }
    }
    assert!(
        sound > 0 && aside > 20 && carried > 100,
        "{sound} sound, {aside} set aside, {carried} rows carried over"
    );
}

#[test]
fn a_backup_is_whole() {
    let (folder, path) = folder();
    let mut ledger = open(&path);
    ledger.file(Kind::Entry, at(1), &body("entry"), None).unwrap();
    let copy = folder.path().join("copy.dewledger");
    ledger.back_up(&copy).unwrap();
    assert_eq!(open(&copy).list(Kind::Entry, Within::Everything).unwrap().len(), 1);
    assert!(ledger.back_up(&copy).is_err(), "a copy is never written over");
}
