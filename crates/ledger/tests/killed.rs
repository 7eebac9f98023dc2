//! A process that is killed loses nothing that it was told was stored, and leaves no file half way.

#![expect(clippy::unwrap_used, reason = "what fails here fails the test")]

mod common;

use std::io::{BufRead, BufReader, Read, Write};
use std::path::Path;
use std::process::{Child, Command, Stdio};
use std::time::Duration;

use common::{at, body, folder, open};
use dewledger_ledger::{Event, Kind, Ledger, Within};

/// Set in a child: the path of its ledger.
const CHILD: &str = "DEWLEDGER_TEST_CHILD";

/// The child's part: files entries and keeps a draft for ever, saying each number after its commit returned.
#[test]
fn child_that_saves_until_it_is_killed() {
    let Some(path) = std::env::var_os(CHILD) else { return };
    let mut ledger = open(Path::new(&path));
    let mut draft = ledger.drafts().unwrap().first().map(|draft| draft.id);
    let start = ledger.list(Kind::Entry, Within::Everything).unwrap().len();
    let mut out = std::io::stdout();
    for number in start.. {
        let now = at(i64::try_from(number).unwrap());
        draft = Some(ledger.keep_draft(draft, now, "draft", &format!("d{number}")).unwrap());
        ledger.file(Kind::Entry, now, &body(&format!("n{number}")), None).unwrap();
        writeln!(out, "saved {number}").unwrap();
        out.flush().unwrap();
    }
}

/// The child's part: opens the ledger, which needs mending or bringing up to date, and waits for its end.
#[test]
fn child_that_opens_until_it_is_killed() {
    let Some(path) = std::env::var_os(CHILD) else { return };
    let mut out = std::io::stdout();
    writeln!(out, "opening").unwrap();
    out.flush().unwrap();
    let _ledger = open(Path::new(&path));
    writeln!(out, "opened").unwrap();
    out.flush().unwrap();
    // Ends with the pipe if the parent dies.
    let _ = std::io::stdin().read(&mut [0]);
}

fn child(part: &str, path: &Path) -> Child {
    Command::new(std::env::current_exe().unwrap())
        .args(["--exact", part, "--nocapture"])
        .env(CHILD, path)
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .stderr(Stdio::null())
        .spawn()
        .unwrap()
}

#[test]
fn nothing_acknowledged_is_lost_to_a_kill() {
    let (_folder, path) = folder();
    let (mut acknowledged, mut stored) = (0, 0);
    // One ledger through all of them: each child finds what the kill before it left, log of changes included.
    for round in 0..100_u64 {
        let mut child = child("child_that_saves_until_it_is_killed", &path);
        let lines = BufReader::new(child.stdout.take().unwrap()).lines();
        let mut saved = 0;
        let mut last = None;
        // Killed at another moment in each round; what was said before that is read to the end.
        for line in lines {
            if let Some((_, number)) = line.unwrap().split_once("saved ") {
                last = Some(number.trim().parse::<usize>().unwrap());
                saved += 1;
                if saved == round % 7 + 1 {
                    std::thread::sleep(Duration::from_micros(round * 53 % 1500));
                    child.kill().unwrap();
                }
            }
        }
        child.wait().unwrap();
        acknowledged += saved;
        let opened = Ledger::open(&path, at(0)).unwrap();
        assert_eq!(opened.event, Event::Existing, "round {round} left a sound file");
        let entries = opened.ledger.list(Kind::Entry, Within::Everything).unwrap().len();
        let last = last.unwrap();
        assert!(entries > last, "round {round}: {entries} stored, number {last} was acknowledged");
        assert!(entries >= stored, "what was there stays");
        stored = entries;
        let draft = &opened.ledger.drafts().unwrap()[0];
        let number: usize = draft.text[1..].parse().unwrap();
        assert!(number >= last, "the draft is as new as what was said of it");
    }
    assert!(acknowledged > 300, "the rounds saved something: {acknowledged}");
}

/// Kills a child at many moments of opening, and looks at what it left. Returns how many were killed before it was open.
fn kill_while_opening(make: impl Fn(&Path), look: impl Fn(&Path, &Event, Ledger)) -> usize {
    let mut before = 0;
    for round in 0..60_u64 {
        let (_folder, path) = folder();
        std::fs::create_dir_all(path.parent().unwrap()).unwrap();
        make(&path);
        let mut child = child("child_that_opens_until_it_is_killed", &path);
        let mut lines = BufReader::new(child.stdout.take().unwrap()).lines();
        assert!(lines.any(|line| line.unwrap().contains("opening")));
        std::thread::sleep(Duration::from_micros(round * 400));
        child.kill().unwrap();
        child.wait().unwrap();
        let opened_before = lines.any(|line| line.unwrap().contains("opened"));
        before += usize::from(!opened_before);
        let opened = Ledger::open(&path, at(1)).unwrap();
        look(&path, &opened.event, opened.ledger);
        let left = std::fs::read_dir(path.parent().unwrap()).unwrap();
        let left: Vec<_> = left
            .map(|file| file.unwrap().file_name().into_string().unwrap())
            .filter(|name| name.starts_with("incoming-") || name.contains("-half"))
            .collect();
        assert!(left.is_empty(), "{left:?}");
    }
    before
}

fn fixture() -> Vec<u8> {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/fixtures/schema-1.sqlite");
    std::fs::read(path).unwrap()
}

#[test]
fn a_kill_while_it_is_brought_up_to_date_leaves_the_old_state_or_the_new() {
    let old = fixture();
    let before = kill_while_opening(
        |path| std::fs::write(path, &old).unwrap(),
        |_, event, ledger| {
            assert!(matches!(event, Event::Migrated { .. } | Event::Existing), "{event:?}");
            assert_eq!(ledger.list(Kind::Entry, Within::Everything).unwrap().len(), 4);
            assert_eq!(ledger.drafts().unwrap().len(), 1);
        },
    );
    assert!(before > 5, "{before} of 60 were killed before it was open");
}

#[test]
fn a_kill_while_a_damaged_one_is_set_aside_loses_neither() {
    let (_folder, path) = folder();
    let mut ledger = open(&path);
    for number in 0..50 {
        ledger.file(Kind::Entry, at(number), &body("entry"), None).unwrap();
    }
    drop(ledger);
    let mut damaged = std::fs::read(&path).unwrap();
    damaged[..4096].fill(0);
    let before = kill_while_opening(
        |path| std::fs::write(path, &damaged).unwrap(),
        |path, event, ledger| {
            assert!(matches!(event, Event::SetAside { .. } | Event::Existing), "{event:?}");
            assert_eq!(ledger.list(Kind::Entry, Within::Everything).unwrap().len(), 50);
            let aside: Vec<_> = std::fs::read_dir(path.parent().unwrap())
                .unwrap()
                .map(|file| file.unwrap().path())
                .filter(|file| file.file_name().unwrap().to_str().unwrap().starts_with("damaged-"))
                .collect();
            assert_eq!(aside.len(), 1, "{aside:?}");
            assert!(std::fs::read(&aside[0]).unwrap() == damaged, "it is kept as it was");
        },
    );
    assert!(before > 5, "{before} of 60 were killed before it was open");
}

#[test]
fn a_kill_while_the_first_one_is_made_leaves_none_or_a_whole_one() {
    let before = kill_while_opening(
        |_| {},
        |_, event, ledger| {
            assert!(matches!(event, Event::Fresh | Event::Existing), "{event:?}");
            assert!(ledger.is_empty().unwrap());
        },
    );
    assert!(before > 5, "{before} of 60 were killed before it was open");
}
