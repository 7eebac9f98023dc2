//! A damaged file opens sound or is set aside as it is, with what can be read carried over.

#![expect(clippy::unwrap_used, reason = "what fails here fails the test")]

mod common;

use std::path::{Path, PathBuf};

use common::{at, body, folder, open};
use dewledger_ledger::{Body, Event, Kind, Ledger, OpenError, ResultRow, Within};

const ENTRIES: usize = 60;

fn text(number: usize) -> String {
    format!("{{\"n\":{number}}}").repeat(40)
}

/// A ledger of sixty entries, whole in its file.
fn whole(path: &Path) -> Vec<u8> {
    let mut ledger = open(path);
    for number in 0..ENTRIES {
        let results = vec![ResultRow {
            key: "total_w".into(),
            quantity: "power".into(),
            si: 1000.0,
            half_width_si: None,
        }];
        let entry = Body { text: text(number), results, ..body(&format!("{number}")) };
        ledger.file(Kind::Entry, at(i64::try_from(number).unwrap()), &entry, None).unwrap();
    }
    ledger.checkpoint().unwrap();
    drop(ledger);
    std::fs::read(path).unwrap()
}

fn put(bytes: &[u8]) -> (tempfile::TempDir, PathBuf) {
    let (folder, path) = folder();
    std::fs::create_dir_all(path.parent().unwrap()).unwrap();
    std::fs::write(&path, bytes).unwrap();
    (folder, path)
}

#[test]
fn a_damaged_file_is_opened_sound_or_set_aside() {
    let (_folder, path) = folder();
    let whole = whole(&path);
    let (mut sound, mut aside, mut refused, mut carried) = (0, 0, 0, 0);
    // Truncations at every page and within some, and bytes flipped all over the file, its header included.
    let truncated = (0..whole.len()).step_by(2048).map(|length| whole[..length].to_vec());
    let flipped = (0..100).chain((0..600).map(|case| case * 7919 + 13)).map(|place| {
        let mut bytes = whole.clone();
        let place = place % bytes.len();
        bytes[place] ^= 1 << (place % 8);
        bytes
    });
    for bytes in truncated.chain(flipped) {
        let (_folder, path) = put(&bytes);
        match Ledger::open(&path, at(100)) {
            Ok(opened) => match opened.event {
                Event::SetAside { damaged, salvaged } => {
                    assert_eq!(std::fs::read(&damaged).unwrap(), bytes, "it is kept as it was");
                    let heads = opened.ledger.list(Kind::Entry, Within::Everything).unwrap();
                    // The flipped byte may stand in a row's kind: it is carried over, but no entry any more.
                    let others = salvaged.revisions.checked_sub(heads.len()).unwrap();
                    assert!(others <= 1, "{others} of {} are no entries", salvaged.revisions);
                    assert!(opened.ledger.back_up(&path.with_file_name("copy")).is_ok());
                    aside += 1;
                    carried += salvaged.revisions;
                }
                Event::Existing => {
                    opened.ledger.list(Kind::Entry, Within::Everything).unwrap();
                    sound += 1;
                }
                // The schema's number itself was flipped to an older one.
                Event::Fresh | Event::Migrated { .. } => panic!("{:?}", opened.event),
            },
            Err(OpenError::Foreign { .. } | OpenError::TooNew { .. }) => {
                assert_eq!(std::fs::read(&path).unwrap(), bytes);
                refused += 1;
            }
            Err(other) => {
                assert_eq!(std::fs::read(&path).unwrap(), bytes);
                panic!("{other}");
            }
        }
    }
    println!(
        "{sound} sound, {aside} set aside, {refused} refused, {carried} revisions carried over"
    );
    assert!(sound > 0 && aside > 100 && refused < 20 && carried > 2000);
}

#[test]
fn a_lost_page_loses_what_stood_on_it_and_no_more() {
    let (_folder, path) = folder();
    let whole = whole(&path);
    let pages = whole.len() / 4096;
    let mut lost_by_page = Vec::new();
    for page in 0..pages {
        let mut bytes = whole.clone();
        bytes[page * 4096..(page + 1) * 4096].fill(0);
        let (_folder, path) = put(&bytes);
        let opened = Ledger::open(&path, at(100)).unwrap();
        if let Event::SetAside { salvaged, .. } = opened.event {
            for head in opened.ledger.list(Kind::Entry, Within::Everything).unwrap() {
                assert_eq!(head.body.text, text(head.body.title.parse().unwrap()));
            }
            lost_by_page.push(ENTRIES - salvaged.revisions);
        }
    }
    lost_by_page.sort_unstable();
    println!("entries lost by the loss of each page: {lost_by_page:?}");
    // Nine of these entries stand on a page. Where the way to the pages is lost, the pages are still read.
    assert!(lost_by_page.len() > pages / 2, "{lost_by_page:?}");
    assert!(lost_by_page.iter().all(|lost| *lost <= 9), "{lost_by_page:?}");
}

#[test]
fn an_empty_file_or_a_log_without_its_ledger_is_not_taken_for_a_fresh_start() {
    let (_empty_folder, empty) = put(&[]);
    let opened = Ledger::open(&empty, at(1)).unwrap();
    assert!(matches!(opened.event, Event::SetAside { .. }), "{:?}", opened.event);

    let (_folder, path) = folder();
    let ledger = open(&path);
    let log = path.with_file_name("ledger.dewledger-wal");
    let kept = std::fs::read(&log).unwrap_or_default();
    drop(ledger);
    std::fs::remove_file(&path).unwrap();
    std::fs::write(&log, if kept.is_empty() { b"changes".to_vec() } else { kept.clone() }).unwrap();
    let opened = Ledger::open(&path, at(2)).unwrap();
    let Event::SetAside { damaged, salvaged } = opened.event else { panic!("{:?}", opened.event) };
    assert_eq!(salvaged.records, 0);
    assert!(PathBuf::from(format!("{}-wal", damaged.display())).exists());
    drop(opened.ledger);
    assert_eq!(Ledger::open(&path, at(3)).unwrap().event, Event::Existing);
}

#[test]
fn a_damaged_ledger_that_another_window_has_open_stays_where_it_is() {
    let (_folder, path) = folder();
    drop(whole(&path));
    let window = open(&path);
    let mut bytes = std::fs::read(&path).unwrap();
    bytes[4096..8192].fill(0);
    std::fs::write(&path, &bytes).unwrap();
    let error = Ledger::open(&path, at(1)).unwrap_err();
    assert!(matches!(error, OpenError::InUse { .. }), "{error}");
    assert_eq!(std::fs::read(&path).unwrap(), bytes);
    drop(window);
    let opened = Ledger::open(&path, at(2)).unwrap();
    assert!(matches!(opened.event, Event::SetAside { .. }), "{:?}", opened.event);
}

#[test]
fn setting_aside_is_finished_where_it_was_interrupted() {
    let (_folder, path) = folder();
    let bytes = whole(&path);
    let beside = |name: &str| path.with_file_name(name);
    // Killed while the new one was built: what stands at the path is still the old one.
    std::fs::write(beside("incoming-5-ledger.dewledger"), &bytes[..5000]).unwrap();
    assert_eq!(Ledger::open(&path, at(0)).unwrap().event, Event::Existing);
    assert!(!beside("incoming-5-ledger.dewledger").exists());
    // Killed between the two renames: the new one is whole.
    std::fs::rename(&path, beside("incoming-5-ledger.dewledger")).unwrap();
    std::fs::write(beside("damaged-5-ledger.dewledger"), b"what it was").unwrap();
    std::fs::write(beside("ledger.dewledger-wal"), b"its log").unwrap();
    let opened = Ledger::open(&path, at(0)).unwrap();
    let Event::SetAside { damaged, salvaged } = opened.event else { panic!("{:?}", opened.event) };
    assert_eq!(salvaged.revisions, ENTRIES);
    assert_eq!(damaged, beside("damaged-5-ledger.dewledger"));
    assert_eq!(std::fs::read(beside("damaged-5-ledger.dewledger-wal")).unwrap(), b"its log");
    assert!(!beside("incoming-5-ledger.dewledger").exists());
}
