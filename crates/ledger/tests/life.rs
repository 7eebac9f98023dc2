//! The life of a ledger's file: refusals, damage, revisions, a full disk, two programs.

#![expect(clippy::unwrap_used, reason = "what fails here fails the test")]

mod common;

use common::{at, body, folder, open};
use dewledger_ledger::{
    APPLICATION_ID, Body, Event, Kind, Ledger, OpenError, RecordId, ResultRow, SCHEMA, Within,
    WriteError,
};
use rusqlite::Connection;

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
    let newer = format!(
        "PRAGMA application_id = {APPLICATION_ID}; PRAGMA user_version = 999; CREATE TABLE t (a)"
    );
    for (name, sql) in [
        ("newer", newer.clone()),
        ("newer, with a log", format!("PRAGMA journal_mode = WAL; {newer}")),
        ("foreign", "PRAGMA application_id = 12345; CREATE TABLE t (a)".to_owned()),
        ("nameless", "CREATE TABLE t (a)".to_owned()),
    ] {
        let (_folder, path) = folder();
        std::fs::create_dir_all(path.parent().unwrap()).unwrap();
        Connection::open(&path).unwrap().execute_batch(&sql).unwrap();
        let before = std::fs::read(&path).unwrap();
        let error = Ledger::open(&path, at(0)).unwrap_err();
        if name.starts_with("newer") {
            assert!(matches!(error, OpenError::TooNew { found: 999, .. }), "{error}");
        } else {
            assert!(matches!(error, OpenError::Foreign { .. }), "{error}");
        }
        assert_eq!(std::fs::read(&path).unwrap(), before, "{name} was touched");
        assert_eq!(std::fs::read_dir(path.parent().unwrap()).unwrap().count(), 1, "{name}");
    }
}

#[test]
fn a_newer_schema_that_stands_in_the_log_only_is_refused_too() {
    let (_folder, path) = folder();
    drop(open(&path));
    let connection = Connection::open(&path).unwrap();
    connection.pragma_update(None, "user_version", 999).unwrap();
    let before = std::fs::read(&path).unwrap();
    let error = Ledger::open(&path, at(0)).unwrap_err();
    assert!(matches!(error, OpenError::TooNew { found: 999, .. }), "{error}");
    assert_eq!(std::fs::read(&path).unwrap(), before);
}

#[test]
fn a_file_that_is_no_database_is_not_moved() {
    let (folder, _) = folder();
    let path = folder.path().join("letter.txt");
    std::fs::write(&path, "Dear owner, the coil moves 20 tons.").unwrap();
    let error = Ledger::open(&path, at(0)).unwrap_err();
    assert!(matches!(error, OpenError::Foreign { .. }), "{error}");
    assert_eq!(std::fs::read_to_string(&path).unwrap(), "Dear owner, the coil moves 20 tons.");
    assert_eq!(std::fs::read_dir(folder.path()).unwrap().count(), 1);
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
        "INSERT OR REPLACE INTO result SELECT * FROM result",
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
    let all = ledger.list(Kind::Equipment, Within::Everything).unwrap();
    assert_eq!(all.len(), 3);
    assert_eq!(ledger.newest(Kind::Equipment, Within::Everything, 2).unwrap(), all[..2]);
}

#[test]
fn revising_what_is_not_here_is_refused() {
    let (_folder, path) = folder();
    let (_other_folder, other_path) = folder();
    let elsewhere = open(&other_path).file(Kind::Entry, at(1), &body("elsewhere"), None).unwrap();
    let mut ledger = open(&path);
    let error = ledger.revise(&elsewhere, at(2), &body("correction"), None).unwrap_err();
    assert!(matches!(error, WriteError::NotFound { .. }), "{error}");
    assert!(ledger.is_empty().unwrap());
}

#[test]
fn the_schema_refuses_what_makes_no_sense() {
    let (_folder, path) = folder();
    let mut ledger = open(&path);
    let draft = ledger.keep_draft(None, at(0), "half", "text").unwrap();
    let mut endless = body("entry");
    let row =
        |si| ResultRow { key: "total_w".into(), quantity: "power".into(), si, half_width_si: None };
    for si in [f64::NAN, f64::INFINITY, f64::NEG_INFINITY] {
        endless.results = vec![row(1.0), row(si)];
        endless.results[0].key = "sensible_w".into();
        ledger.file(Kind::Entry, at(1), &endless, Some(draft)).unwrap_err();
    }
    assert!(ledger.is_empty().unwrap(), "nothing of a refused entry is stored");
    assert_eq!(ledger.drafts().unwrap().len(), 1, "and its draft is still there");

    let first = ledger.file(Kind::Entry, at(1), &body("entry"), None).unwrap();
    let connection = Connection::open(&path).unwrap();
    let copy = |id: &str, record: &str, kind: &str, parent: &str| {
        format!(
            "INSERT INTO revision SELECT {id}, {record}, {kind}, {parent}, device, at_ms, utc_offset_min, withdrawn, invented, site, equipment, visit, title, app_version, body FROM revision WHERE id = '{}'",
            first.id
        )
    };
    let fresh = "'01890000-0000-7000-8000-000000000000'";
    for (sql, why) in [
        (copy(fresh, "record", "'site'", "id"), "one kind"),
        (copy(fresh, fresh, "kind", "id"), "same record"),
        (copy(fresh, "record", "kind", fresh), "CHECK"),
        (copy("id", "record", "kind", "NULL"), "UNIQUE"),
        (copy(fresh, "'short'", "kind", "NULL"), "CHECK"),
    ] {
        let error = connection.execute(&sql, []).unwrap_err().to_string();
        assert!(error.contains(why), "{sql}: {error}");
    }
    connection.execute(&copy(fresh, "record", "kind", "id"), []).unwrap();
    assert_eq!(ledger.head(first.record).unwrap().parent, Some(first.id));
}

#[test]
fn a_full_disk_at_any_page_is_said_and_a_later_save_works() {
    let mut refused = 0;
    for room in 0..55 {
        let (_folder, path) = folder();
        let mut ledger = open(&path);
        let draft = ledger.keep_draft(None, at(0), "half", "typed").unwrap();
        ledger.checkpoint().unwrap();
        let connection = Connection::open(&path).unwrap();
        let pages: i64 =
            connection.pragma_query_value(None, "page_count", |row| row.get(0)).unwrap();
        drop(connection);
        ledger.limit_pages_for_tests(pages + room).unwrap();
        let large = Body { text: "x".repeat(100_000), ..body("large") };
        let typed = "y".repeat(100_000);
        let kept = ledger.keep_draft(Some(draft), at(1), "half", &typed);
        let filed = ledger.file(Kind::Entry, at(2), &large, Some(draft));
        for error in [kept.as_ref().err(), filed.as_ref().err()].into_iter().flatten() {
            assert!(matches!(error, WriteError::DiskFull), "{error}");
            refused += 1;
        }
        let entries = ledger.list(Kind::Entry, Within::Everything).unwrap().len();
        assert_eq!(entries, usize::from(filed.is_ok()), "filed or not, never half");
        if filed.is_err() {
            let text = ledger.draft(draft).unwrap().text;
            assert_eq!(text, if kept.is_ok() { &typed } else { "typed" });
            ledger.limit_pages_for_tests(1_000_000).unwrap();
            ledger.file(Kind::Entry, at(3), &large, Some(draft)).unwrap();
        }
        assert!(ledger.drafts().unwrap().is_empty());
        assert_eq!(ledger.list(Kind::Entry, Within::Everything).unwrap()[0].body.text, large.text);
    }
    assert!((30..110).contains(&refused), "{refused} of 110 saves did not fit");
}

#[test]
fn two_programs_take_turns() {
    let (_folder, path) = folder();
    let (mut one, mut other) = (open(&path), open(&path));
    assert_eq!(one.device(), other.device());
    for turn in 0..20 {
        one.file(Kind::Entry, at(turn), &body("one"), None).unwrap();
        other.file(Kind::Entry, at(turn), &body("other"), None).unwrap();
    }
    assert_eq!(one.list(Kind::Entry, Within::Everything).unwrap().len(), 40);
}

#[test]
fn many_that_open_and_write_at_once_lose_nothing() {
    let (_folder, path) = folder();
    let start = std::sync::Barrier::new(8);
    std::thread::scope(|scope| {
        for _ in 0..8 {
            scope.spawn(|| {
                start.wait();
                let opened = Ledger::open(&path, at(0)).unwrap();
                assert!(matches!(opened.event, Event::Fresh | Event::Existing));
                let mut ledger = opened.ledger;
                for turn in 0..10 {
                    ledger.file(Kind::Entry, at(turn), &body("entry"), None).unwrap();
                }
            });
        }
    });
    assert_eq!(open(&path).list(Kind::Entry, Within::Everything).unwrap().len(), 80);
}

#[test]
fn a_backup_is_whole() {
    let (folder, path) = folder();
    let mut ledger = open(&path);
    ledger.file(Kind::Entry, at(1), &body("entry"), None).unwrap();
    let copy = folder.path().join("copy.dewledger");
    ledger.back_up(&copy).unwrap();
    assert_eq!(open(&copy).list(Kind::Entry, Within::Everything).unwrap().len(), 1);
    let before = std::fs::read(&copy).unwrap();
    assert!(ledger.back_up(&copy).is_err(), "a copy is never written over");
    assert_eq!(std::fs::read(&copy).unwrap(), before);
    let nowhere = folder.path().join("no such folder").join("copy.dewledger");
    assert!(ledger.back_up(&nowhere).is_err());
    let left: Vec<_> = std::fs::read_dir(folder.path())
        .unwrap()
        .map(|file| file.unwrap().file_name().into_string().unwrap())
        .filter(|name| name.ends_with("-half"))
        .collect();
    assert!(left.is_empty(), "{left:?}");
}
