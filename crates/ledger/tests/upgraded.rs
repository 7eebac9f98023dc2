//! Files of every released schema open, with all that is in them.
//!
//! `fixtures/schema-N.sqlite` was written by the version that made schema N, and never changes.

#![expect(clippy::unwrap_used, reason = "what fails here fails the test")]

mod common;

use std::path::Path;

use common::{at, body, folder, open};
use dewledger_ledger::{Event, Kind, Ledger, SCHEMA, Within};
use rusqlite::Connection;

fn fixture(path: &Path) {
    let from = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/fixtures/schema-1.sqlite");
    std::fs::create_dir_all(path.parent().unwrap()).unwrap();
    std::fs::copy(from, path).unwrap();
}

/// The whole schema as SQLite holds it.
fn schema(path: &Path) -> Vec<String> {
    let connection = Connection::open(path).unwrap();
    let sql = "SELECT type || ' ' || name || ': ' || coalesce(sql, '') FROM sqlite_schema ORDER BY type, name";
    let mut statement = connection.prepare(sql).unwrap();
    let rows = statement.query_map([], |row| row.get(0)).unwrap();
    rows.map(Result::unwrap).collect()
}

#[test]
fn an_upgraded_schema_equals_a_fresh_one() {
    let (_folder, path) = folder();
    let (_fresh_folder, fresh) = folder();
    fixture(&path);
    drop(open(&path));
    drop(open(&fresh));
    assert_eq!(schema(&path), schema(&fresh));
}

#[test]
fn an_older_file_is_copied_aside_and_keeps_everything() {
    let (_folder, path) = folder();
    fixture(&path);
    let opened = Ledger::open(&path, at(100)).unwrap();
    let Event::Migrated { copy } = opened.event else { panic!("{:?}", opened.event) };
    let version = |path: &Path| -> i64 {
        let connection = Connection::open(path).unwrap();
        connection.pragma_query_value(None, "user_version", |row| row.get(0)).unwrap()
    };
    assert_eq!((version(&copy), version(&path)), (1, SCHEMA));

    // What the file was written with, by hand: two tags, one visit, an entry corrected twice apart, one withdrawn, one plain.
    let ledger = opened.ledger;
    let list = |kind| ledger.list(kind, Within::Everything).unwrap();
    let site = list(Kind::Site).remove(0);
    assert_eq!(site.body.title, "Invented mill");
    assert_eq!(site.body.text, r#"{"elevation":{"text":"1609","unit":"m"}}"#);
    assert!(site.body.invented);
    let tags: Vec<_> = list(Kind::Equipment).into_iter().map(|head| head.body.title).collect();
    assert_eq!(tags, ["AH-2", "AH-1"]);
    assert_eq!(list(Kind::Visit).len(), 1);
    let entries = list(Kind::Entry);
    let titles: Vec<_> = entries.iter().map(|head| head.body.title.as_str()).collect();
    assert_eq!(titles, ["Air state", "Mixing", "Heat moved by the air", "Heat moved by the air"]);
    assert_eq!(
        entries.iter().map(|head| head.withdrawn).collect::<Vec<_>>(),
        [false, true, false, false]
    );
    assert_eq!(ledger.history(entries[3].record).unwrap().len(), 3);
    let results = ledger.results(entries[3].id).unwrap();
    let total = results.iter().find(|row| row.key == "total_w").unwrap();
    assert_eq!((total.si, total.half_width_si), (-68_400.0, Some(900.0)));
    let other = &ledger.results(entries[2].id).unwrap()[1];
    assert_eq!((other.si, other.half_width_si), (-86_100.0, Some(900.0)));
    let drafts = ledger.drafts().unwrap();
    assert_eq!(drafts.len(), 1, "the discarded one is not listed");
    assert_eq!(drafts[0].text, r#"{"half":"typed"}"#);
    assert_eq!(ledger.preference("units").unwrap().as_deref(), Some("si"));
    assert_eq!(ledger.device(), entries[0].device, "the device is the one that wrote them");

    // It goes on as any other.
    let mut ledger = ledger;
    ledger.revise(&entries[0], at(200), &body("Air state"), None).unwrap();
    drop(ledger);
    assert_eq!(Ledger::open(&path, at(300)).unwrap().event, Event::Existing);
}

#[test]
fn the_newest_three_copies_are_kept() {
    let (_folder, path) = folder();
    let mut copies = Vec::new();
    for round in 0..5 {
        fixture(&path);
        let opened = Ledger::open(&path, at(round)).unwrap();
        let Event::Migrated { copy } = opened.event else { panic!("{:?}", opened.event) };
        copies.push(copy);
    }
    let kept: Vec<_> = copies.iter().map(|copy| copy.exists()).collect();
    assert_eq!(kept, [false, false, true, true, true]);
}
