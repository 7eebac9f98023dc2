//! Journeys through the real app: the window over WebDriver, and the same screens in Chromium with a phone's shape.
//! Both type real readings, read what a person sees, file, close, open again and find it.

#![expect(clippy::unwrap_used, reason = "what fails here fails the test")]

use std::path::Path;

use dewledger_tests::{Driver, Hand, has_chromium};

/// Types two states and a flow in mixed units, reads the result, files it under a new site.
async fn types_and_files(hand: &Hand) {
    hand.sees("The ledger is empty").await;
    hand.tap("Start a check").await;
    hand.tap("How much heat and water").await;
    hand.sees("Heat moved by the air").await;
    hand.type_into("pressure.elevation", "1609 m").await;
    hand.type_into("entering.dry_bulb", "80 F").await;
    hand.type_into("entering.wet_bulb", "62 F").await;
    hand.type_into("leaving.dry_bulb", "12,7778").await;
    hand.type_into("leaving.wet_bulb", "53 F").await;
    hand.sees("waits for the air flow").await;
    hand.type_into("flow.rate", "10000 cfm").await;
    hand.choose("flow.basis", "as the air enters").await;
    // The worked figures stand in the desk's own tests; here is what a person sees of them.
    hand.sees("Heat removed, total").await;
    hand.sees("read as 12.8 °C").await;
    hand.sees("refrigeration tons").await;
    hand.sees("too high").await;
    let page = hand.page().await;
    // 10 000 cfm actual as it enters at this pressure; read as standard air it would be 86 kW. The same readings by
    // CoolProp 8.0.0 give 68.46 kW.
    assert!(page.contains("68.5") && page.contains("kW"), "{page}");
    hand.tap("File").await;
    hand.sees("Where is this?").await;
}

/// The app is opened again: the entry is there, as typed.
async fn finds_it_again(hand: &Hand) {
    hand.sees("Heat moved by the air").await;
    hand.sees("Invented works").await;
    hand.tap("Heat moved by the air").await;
    hand.sees("Entering air, dry bulb").await;
    let page = hand.page().await;
    assert!(
        page.contains("80 F") && page.contains("10000 cfm") && page.contains("12,7778"),
        "{page}"
    );
    assert!(page.contains("Heat removed, total"), "{page}");
}

/// Fills the sheet that asks where it was, with a site that is added on the spot.
async fn names_the_site(hand: &Hand) {
    hand.type_at("add-name", "Invented works").await;
    hand.type_at("add-elevation", "1609 m").await;
    hand.tap("Add the site").await;
    hand.tap("File it").await;
    hand.sees("Filed ").await;
}

fn folder() -> tempfile::TempDir {
    tempfile::tempdir().unwrap()
}

fn ledger(folder: &Path) -> std::path::PathBuf {
    folder.join("ledger.dewledger")
}

fn run(journey: impl std::future::Future<Output = ()>) {
    let runtime = tokio::runtime::Builder::new_current_thread().enable_all().build().unwrap();
    runtime.block_on(async {
        let bounded = tokio::time::timeout(std::time::Duration::from_secs(240), journey).await;
        assert!(bounded.is_ok(), "the journey took more than four minutes");
    });
}

#[test]
fn a_check_is_typed_filed_and_found_again_in_the_window() {
    run(async {
        let folder = folder();
        let driver = Driver::window(folder.path(), &ledger(folder.path())).await;
        let hand = Hand::new(&driver.client);
        types_and_files(&hand).await;
        names_the_site(&hand).await;
        driver.close().await;
        let driver = Driver::window(folder.path(), &ledger(folder.path())).await;
        finds_it_again(&Hand::new(&driver.client)).await;
        driver.close().await;
    });
}

#[test]
fn a_check_is_typed_filed_and_found_again_on_a_phones_screen() {
    if !has_chromium() {
        return;
    }
    run(async {
        let folder = folder();
        let driver = Driver::phone(folder.path(), &ledger(folder.path())).await;
        let hand = Hand::new(&driver.client);
        types_and_files(&hand).await;
        names_the_site(&hand).await;
        driver.close().await;
        let driver = Driver::phone(folder.path(), &ledger(folder.path())).await;
        finds_it_again(&Hand::new(&driver.client)).await;
        driver.close().await;
    });
}

/// The device's clock, 20 s further with each take: a journey cannot wait for air to settle.
const CLOCK: &str = "
    let at = Date.parse('2026-12-01T14:05:00Z') - 20000;
    Date.prototype.toISOString = () => new Intl.DateTimeFormat('sv-SE', {
        timeZone: 'UTC', year: 'numeric', month: '2-digit', day: '2-digit',
        hour: '2-digit', minute: '2-digit', second: '2-digit',
    }).format((at += 20000)).replace(' ', 'T') + 'Z';
";

/// Adds an instrument of a class, reads with it, in takes, and holds the dew point against a requirement.
async fn reads_with_an_instrument(driver: &Driver, hand: &Hand) {
    hand.go("#/instruments").await;
    hand.tap("Add an instrument").await;
    hand.tap("Aspirated psychrometer").await;
    hand.sees("Probe 2: wet bulb").await;
    hand.type_at("name", "Psychrometer 9").await;
    hand.type_at("probes-1-due", "2026-03-01").await;
    hand.tap("Keep it").await;
    hand.sees("Calibration was due on 1 March 2026").await;

    hand.go("#/check/air_state").await;
    driver.client.execute(CLOCK, Vec::new()).await.unwrap();
    hand.type_into("pressure.elevation", "1609 m").await;
    hand.type_into("air.dry_bulb", "24.0 C").await;
    hand.press("field-air-dry_bulb-pm").await;
    hand.tap("Psychrometer 9, dry bulb").await;
    hand.sees("Calibration, shared with other readings of this probe").await;
    hand.tap("Place").await;
    hand.tap("One point in a straight duct").await;
    hand.sees("At one point").await;
    hand.tap("Read with").await;
    hand.sees("Where it was held").await;
    hand.tap("Done").await;
    hand.press("field-air-wet_bulb-pm").await;
    hand.tap("Psychrometer 9, wet bulb").await;
    hand.tap("Takes").await;
    for text in ["16.7 C", "16.8 C", "16.7 C"] {
        hand.type_at("take-text", text).await;
        hand.tap("Take").await;
        hand.sees(text).await;
    }
    hand.sees("Takes: 3").await;
    hand.sees("Steady").await;
    hand.sees("14:05:40").await;
    hand.tap("Done").await;
    hand.sees("Psychrometer 9, wet bulb: its calibration was due on 1 March 2026").await;

    hand.tap("Hold a result against a requirement").await;
    hand.pick("asked-figure", "Dew point").await;
    hand.pick("asked-direction", "At most").await;
    hand.type_at("asked-value", "15 C").await;
    hand.type_at("asked-source", "an invented schedule").await;
    hand.tap("Hold it against this").await;
    // The same readings by CoolProp 8.0.0 give a dew point of 13.188 °C.
    hand.sees("13.19 °C dew point").await;
    hand.sees("by an invented schedule").await;
    hand.sees("Meets").await;
    hand.tap("File").await;
    hand.sees("Where is this?").await;
}

#[test]
fn a_reading_in_takes_with_an_instrument_meets_a_requirement_and_is_found_again() {
    if !has_chromium() {
        return;
    }
    run(async {
        let folder = folder();
        let driver = Driver::phone(folder.path(), &ledger(folder.path())).await;
        let hand = Hand::new(&driver.client);
        reads_with_an_instrument(&driver, &hand).await;
        names_the_site(&hand).await;
        driver.close().await;
        let driver = Driver::phone(folder.path(), &ledger(folder.path())).await;
        let hand = Hand::new(&driver.client);
        hand.sees("Invented works").await;
        hand.tap("Air state").await;
        hand.sees("Dew point: at most 15.0 °C, by an invented schedule").await;
        let page = hand.page().await;
        for text in ["Meets", "Psychrometer 9, wet bulb", "3 takes", "at one point"] {
            assert!(page.contains(text), "{text}: {page}");
        }
        driver.close().await;
    });
}

#[test]
fn a_half_typed_form_survives_the_program_being_killed() {
    if !has_chromium() {
        return;
    }
    run(async {
        let folder = folder();
        let driver = Driver::phone(folder.path(), &ledger(folder.path())).await;
        let hand = Hand::new(&driver.client);
        // Left before it was first kept: the draft is kept all the same, and the screen that was asked for comes.
        hand.go("#/check/air_state").await;
        hand.type_into("air.dry_bulb", "23").await;
        hand.go("#/").await;
        hand.sees("Not finished").await;
        hand.tap("Discard").await;
        hand.sees("Draft discarded").await;
        hand.go("#/check/air_state").await;
        hand.type_into("air.dry_bulb", "24,1").await;
        hand.sees("read as 24.1 °C").await;
        hand.sees("draft kept").await;
        driver.kill();
        let driver = Driver::phone(folder.path(), &ledger(folder.path())).await;
        let hand = Hand::new(&driver.client);
        hand.sees("Not finished").await;
        hand.tap("Continue").await;
        hand.sees("read as 24.1 °C").await;
        driver.close().await;
    });
}
