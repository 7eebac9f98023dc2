//! A process that is killed while it saves loses nothing that it was told was stored.

use std::io::{BufRead, BufReader, Write};
use std::path::Path;
use std::process::{Command, Stdio};

use dewledger_ledger::{At, Body, Event, Kind, Ledger, Within};

/// Set in the child: the path to write to.
const CHILD: &str = "DEWLEDGER_TEST_CHILD";

fn at(ms: i64) -> At {
    At { ms: 1_780_000_000_000 + ms, utc_offset_min: 0 }
}

/// The child's part: files entries and keeps a draft for ever, saying each number after its commit returned.
#[test]
fn child_that_saves_until_it_is_killed() {
    let Some(path) = std::env::var_os(CHILD) else { return };
    let mut ledger = Ledger::open(Path::new(&path), at(0)).unwrap().ledger;
    let mut draft = None;
    let mut out = std::io::stdout();
    for number in 0.. {
        let body = Body {
            title: format!("n{number}"),
            text: "{}".into(),
            app_version: "0".into(),
            ..Body::default()
        };
        draft = Some(ledger.keep_draft(draft, at(number), "draft", &format!("d{number}")).unwrap());
        ledger.file(Kind::Entry, at(number), &body, None).unwrap();
        writeln!(out, "saved {number}").unwrap();
        out.flush().unwrap();
    }
}

#[test]
fn nothing_acknowledged_is_lost_to_a_kill() {
    let folder = tempfile::tempdir().unwrap();
    let mut acknowledged_in_all = 0;
    for round in 0..40_u64 {
        let path = folder.path().join(format!("{round}.dewledger"));
        let mut child = Command::new(std::env::current_exe().unwrap())
            .args(["--exact", "child_that_saves_until_it_is_killed", "--nocapture"])
            .env(CHILD, &path)
            .stdout(Stdio::piped())
            .stderr(Stdio::null())
            .spawn()
            .unwrap();
        let mut last = None;
        let lines = BufReader::new(child.stdout.take().unwrap()).lines();
        for line in lines {
            let line = line.unwrap();
            if let Some(number) = line.split("saved ").nth(1) {
                last = number.trim().parse::<usize>().ok();
                // Killed at another moment in each round.
                if last >= Some((round % 7) as usize + 1) {
                    child.kill().unwrap();
                    break;
                }
            }
        }
        child.wait().unwrap();
        let opened = Ledger::open(&path, at(0)).unwrap();
        assert_eq!(opened.event, Event::Existing, "round {round} left a sound file");
        let entries = opened.ledger.list(Kind::Entry, Within::Everything).unwrap();
        let acknowledged = last.unwrap() + 1;
        assert!(
            entries.len() >= acknowledged,
            "round {round}: {} of {acknowledged}",
            entries.len()
        );
        let draft = &opened.ledger.drafts().unwrap()[0];
        let number: usize = draft.text[1..].parse().unwrap();
        assert!(number + 1 >= acknowledged, "the draft is as new as what was said of it");
        acknowledged_in_all += acknowledged;
    }
    assert!(acknowledged_in_all > 80, "the rounds saved something: {acknowledged_in_all}");
}
