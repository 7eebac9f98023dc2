//! Who may know what. A crate that knows too much is not seen in a review of its code, but it is seen in its manifest.

use std::collections::{BTreeMap, BTreeSet};
use std::process::Command;

use serde_json::Value;

/// The whole table: each crate of ours, and those of ours that it may name outside its tests. (The crate of tests is
/// not shipped and may know everyone, so it is left out.)
const ARROWS: [(&str, &[&str]); 8] = [
    ("dewledger-quantities", &[]),
    ("dewledger-properties", &["dewledger-quantities"]),
    ("dewledger-checks", &["dewledger-quantities", "dewledger-properties"]),
    ("dewledger-ledger", &[]),
    ("dewledger-drawing", &["dewledger-quantities", "dewledger-properties", "dewledger-checks"]),
    (
        "dewledger-desk",
        &[
            "dewledger-quantities",
            "dewledger-properties",
            "dewledger-checks",
            "dewledger-ledger",
            "dewledger-drawing",
        ],
    ),
    ("dewledger-cli", &["dewledger-desk"]),
    ("dewledger-window", &["dewledger-desk"]),
];

/// Crates from outside that only some of ours may name outside their tests, and why.
const ONLY: [(&str, &[&str], &str); 5] = [
    ("rusqlite", &["dewledger-ledger"], "the ledger is the only crate that knows SQL"),
    (
        "serde_json",
        &["dewledger-desk", "dewledger-cli"],
        "JSON is the desk's; the command passes it on",
    ),
    ("serde", &["dewledger-desk"], "a quantity must not leak into a file as a bare number"),
    ("tauri", &["dewledger-window"], "everything but the window runs without one"),
    (
        "tiny_http",
        &["dewledger-cli"],
        "the loopback server is the only listener, and the window has none",
    ),
];

/// Networking crates that must not be among what the desktop's programs are built from: the app never opens a
/// connection off the device. (For Android tauri brings some of them along, see `docs/android.md`; there the missing
/// permission closes the network.)
const NO_NETWORK: [&str; 8] =
    ["reqwest", "hyper", "h2", "ureq", "rustls", "native-tls", "socket2", "mio"];

fn cargo(arguments: &[&str]) -> String {
    let output = Command::new(env!("CARGO"))
        .args(arguments)
        .current_dir(concat!(env!("CARGO_MANIFEST_DIR"), "/.."))
        .output()
        .expect("the cargo that built this test is still there");
    assert!(
        output.status.success(),
        "cargo {arguments:?}: {}",
        String::from_utf8_lossy(&output.stderr)
    );
    String::from_utf8(output.stdout).expect("cargo writes UTF-8")
}

/// The crates that are shipped, each with what it names outside its tests.
fn named() -> BTreeMap<String, BTreeSet<String>> {
    let metadata: Value =
        serde_json::from_str(&cargo(&["metadata", "--no-deps", "--format-version", "1"]))
            .expect("cargo writes JSON");
    let packages = metadata["packages"].as_array().expect("a list");
    packages
        .iter()
        .filter(|package| package["name"] != "dewledger-tests")
        .map(|package| {
            let dependencies = package["dependencies"].as_array().expect("a list");
            let names = dependencies
                .iter()
                .filter(|dependency| dependency["kind"] != "dev")
                .map(|dependency| dependency["name"].as_str().expect("a name").to_owned())
                .collect();
            (package["name"].as_str().expect("a name").to_owned(), names)
        })
        .collect()
}

#[test]
fn each_of_our_crates_knows_only_what_it_may() {
    let named = named();
    let listed: BTreeSet<_> = ARROWS.iter().map(|(name, _)| (*name).to_owned()).collect();
    assert_eq!(
        named.keys().cloned().collect::<BTreeSet<_>>(),
        listed,
        "the table names every crate"
    );

    for (name, may) in ARROWS {
        let ours: BTreeSet<_> = named[name]
            .iter()
            .map(String::as_str)
            .filter(|known| listed.contains(*known))
            .collect();
        let may: BTreeSet<_> = may.iter().copied().collect();
        let too_much: Vec<_> = ours.difference(&may).collect();
        assert!(too_much.is_empty(), "{name} must not know {too_much:?}");
    }
}

#[test]
fn crates_from_outside_stay_where_they_belong() {
    let named = named();
    for (outside, may, why) in ONLY {
        let users: BTreeSet<_> = named
            .iter()
            .filter(|(_, names)| names.contains(outside))
            .map(|(name, _)| name.as_str())
            .collect();
        let may: BTreeSet<_> = may.iter().copied().collect();
        assert!(!users.is_empty(), "{outside} is used nowhere: take it from the table");
        assert!(users.is_subset(&may), "{outside} is known to {users:?}: {why}");
    }
}

/// `cargo tree` and not `cargo metadata`: the latter shows every optional dependency that the tests' own WebDriver
/// client switches on, as if the programs had it too.
#[test]
fn the_desktop_programs_hold_no_networking_crate() {
    for program in ["dewledger-cli", "dewledger-window"] {
        let tree = cargo(&[
            "tree",
            "--package",
            program,
            "--edges",
            "normal",
            "--prefix",
            "none",
            "--locked",
        ]);
        let parts: BTreeSet<_> =
            tree.lines().filter_map(|line| line.split_whitespace().next()).collect();
        assert!(parts.contains("dewledger-desk"), "the tree of {program} was read");
        let found: Vec<_> = NO_NETWORK.iter().filter(|name| parts.contains(**name)).collect();
        assert!(found.is_empty(), "{program} is built with {found:?}");
    }
}
