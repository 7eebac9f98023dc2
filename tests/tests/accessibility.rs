//! The rules of axe-core (dev only, from npm, pinned in `ui-dev/package.json`) over every screen, in Chromium with a
//! phone's shape and a desktop's, in every theme.

#![expect(clippy::unwrap_used, reason = "what fails here fails the test")]

use std::path::PathBuf;

use dewledger_tests::{Driver, Hand, has_chromium};
use serde_json::{Value, json};

/// The rules' own text, run within the page.
fn axe() -> String {
    let path = PathBuf::from(env!("CARGO_MANIFEST_DIR"))
        .join("../ui-dev/node_modules/axe-core/axe.min.js");
    std::fs::read_to_string(&path)
        .unwrap_or_else(|error| panic!("{}: {error}; run npm ci --prefix ui-dev", path.display()))
}

const RUN: &str = "
    const done = arguments[arguments.length - 1];
    axe.run(document, { resultTypes: ['violations'] }).then(
        (found) => done(found.violations.map((v) => v.id + ': ' + v.nodes.map((n) => n.html + ' ' + n.failureSummary).join(' | '))),
        (error) => done([String(error)]),
    );
";

/// The screens that need no identity in their address.
const PLAIN: &[&str] = &[
    "#/",
    "#/checks",
    "#/sites",
    "#/sites/new",
    "#/instruments",
    "#/instruments/new",
    "#/instruments/new?class=aspirated_psychrometer",
    "#/units",
    "#/appearance",
    "#/about",
];

async fn holds(driver: &Driver, axe: &str, screen: &str) {
    // A client runs scripts outside the page's policy, as a person's own tools would.
    driver.client.execute(axe, Vec::new()).await.unwrap();
    let found: Value = driver.client.execute_async(RUN, Vec::new()).await.unwrap();
    let found: Vec<String> = serde_json::from_value(found).unwrap();
    assert!(found.is_empty(), "{screen}:\n{}", found.join("\n"));
}

async fn every_screen(driver: &Driver, hand: &Hand, axe: &str) {
    for screen in PLAIN {
        hand.go(screen).await;
        holds(driver, axe, screen).await;
    }
    for check in dewledger_checks::ALL.iter().map(|check| check.about().id) {
        let screen = format!("#/check/{check}");
        hand.go(&screen).await;
        holds(driver, axe, &screen).await;
    }
    hand.go("#/sites").await;
    hand.tap("Haldry Fork School").await;
    hand.sees("Visits").await;
    holds(driver, axe, "a site").await;
    let site = hand.address().await;
    for (link, screen) in
        [("#/visit/", "a visit"), ("#/equipment/", "equipment"), ("#/entry/", "an entry")]
    {
        hand.go(&site).await;
        hand.sees("Visits").await;
        hand.follow(link).await;
        holds(driver, axe, screen).await;
    }
    let site = site.split('?').next().unwrap_or_default();
    for form in ["/edit", "/equipment/new", "/visit/new"] {
        hand.go(&format!("{site}{form}")).await;
        holds(driver, axe, form).await;
    }
    hand.go(site).await;
    hand.follow("#/visit/").await;
    hand.follow("/run/new").await;
    holds(driver, axe, "probes side by side").await;
    hand.go("#/instruments").await;
    hand.follow("#/instrument/").await;
    holds(driver, axe, "an instrument").await;
    hand.type_at("probes-0-due", "soon").await;
    // What is only cleared tells the page nothing; a blank that is typed does.
    hand.type_at("name", " ").await;
    hand.tap("Keep it").await;
    hand.sees("An instrument needs a name").await;
    holds(driver, axe, "an instrument that is refused").await;
    a_reading_and_what_is_asked(driver, hand, axe).await;
    // A refused form: two bulbs the wrong way round.
    hand.go("#/check/air_state").await;
    hand.type_into("pressure.elevation", "1609 m").await;
    hand.type_into("air.dry_bulb", "62 F").await;
    hand.type_into("air.wet_bulb", "80 F").await;
    hand.go("#/checks").await;
    holds(driver, axe, "after a refusal").await;
}

/// The sheets of a reading and of a requirement, and the form with verdicts.
async fn a_reading_and_what_is_asked(driver: &Driver, hand: &Hand, axe: &str) {
    hand.go("#/check/air_state").await;
    hand.type_into("pressure.elevation", "1609 m").await;
    hand.type_into("air.dry_bulb", "24 C").await;
    hand.type_into("air.wet_bulb", "17 C").await;
    hand.press("field-air-wet_bulb-pm").await;
    hand.tap("Read with").await;
    hand.tap("Psychrometer 2, wet bulb").await;
    hand.sees("What the ± is made of").await;
    holds(driver, axe, "what a reading was read with").await;
    hand.tap("Place").await;
    hand.tap("Over a grid of points").await;
    hand.type_at("spot-spread", "0.4").await;
    hand.sees("Say how many points").await;
    holds(driver, axe, "where a reading was taken").await;
    hand.tap("Not said").await;
    hand.tap("Takes").await;
    for text in ["17 C", "17.1 C", "seventeen"] {
        hand.type_at("take-text", text).await;
        hand.tap("Take").await;
        hand.sees(text).await;
    }
    holds(driver, axe, "takes").await;
    driver
        .client
        .execute(
            "document.querySelector('dialog .takes li:last-child button').click();",
            Vec::new(),
        )
        .await
        .unwrap();
    hand.tap("Done").await;
    for (limit, answer) in [("15 C", "Dew point: at least 15.0 °C"), ("much", "is not a number")] {
        hand.tap("Hold a result against a requirement").await;
        hand.pick("asked-figure", "Dew point").await;
        hand.type_at("asked-value", limit).await;
        holds(driver, axe, "a requirement").await;
        hand.tap("Hold it against this").await;
        hand.sees(answer).await;
    }
    holds(driver, axe, "verdicts").await;
    hand.go("#/").await;
    hand.tap("Discard").await;
}

fn look(shape: Value) {
    if !has_chromium() {
        return;
    }
    let runtime = tokio::runtime::Builder::new_current_thread().enable_all().build().unwrap();
    runtime.block_on(async {
        let axe = axe();
        let folder = tempfile::tempdir().unwrap();
        let driver =
            Driver::browser(folder.path(), &folder.path().join("ledger.dewledger"), shape).await;
        let hand = Hand::new(&driver.client);
        hand.sees("The ledger is empty").await;
        holds(&driver, &axe, "the empty ledger").await;
        hand.tap("Add the demo site").await;
        hand.sees("Filed last").await;
        for (theme, name) in [("Light", "light"), ("Dark", "dark"), ("High contrast", "contrast")] {
            hand.go("#/appearance").await;
            hand.tap(theme).await;
            let drawn = driver
                .client
                .execute("return document.documentElement.dataset.theme;", Vec::new())
                .await
                .unwrap();
            assert_eq!(drawn, json!(name));
            every_screen(&driver, &hand, &axe).await;
        }
        // The rules do find what is wrong: a picture without words.
        driver
            .client
            .execute(
                "document.querySelector('main').append(document.createElement('img'));",
                Vec::new(),
            )
            .await
            .unwrap();
        let found: Value = driver.client.execute_async(RUN, Vec::new()).await.unwrap();
        assert!(found.to_string().contains("image-alt"), "{found}");
        driver.close().await;
    });
}

#[test]
fn a_phones_screens_break_no_rule() {
    look(json!({ "width": 390, "height": 844, "pixelRatio": 2, "touch": true, "mobile": true }));
}

#[test]
fn a_desktops_screens_break_no_rule() {
    look(json!({ "width": 1280, "height": 800, "pixelRatio": 1, "touch": false, "mobile": false }));
}
