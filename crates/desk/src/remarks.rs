//! Remarks that come from how a reading was taken: unsteady takes, an instrument that reads something else than the form
//! was told, a calibration that is overdue, draws that were impossible.

use dewledger_checks::doubt::Drawn;
use dewledger_checks::form::Item;
use dewledger_checks::takes::Steadiness;
use dewledger_checks::{Change, Given, Note, Offer, pressure};
use dewledger_ledger::At;
use dewledger_properties::{Humidity, MoistAir, Wick};
use dewledger_quantities::{
    Amount, Pressure, Quantity, Sentence, Share, TemperatureInterval, ThermodynamicTemperature,
};

use crate::bench::{Bench, KnownProbe};
use crate::clock;
use crate::probe;
use crate::read_with::With;
use crate::typed::Readout;

/// Below this pressure, Pa, a wet bulb worked out at sea level is visibly wrong.
const AT_HEIGHT_PA: f64 = 99_000.0;

/// Remarks on all readings of a form.
pub(crate) fn of_readings(read: &Readout, bench: &Bench, now: At) -> Vec<Note> {
    let mut notes = Vec::new();
    for section in &read.sections {
        for item in &section.items {
            let Item::Reading(item) = item else { continue };
            let key = item.key.as_ref();
            let Some(with) = read.with.get(key) else { continue };
            let name = format!("{}, {}", section.title, item.label.to_lowercase());
            notes.extend(unsteady(key, &name, item.kind.difference(), with));
            let Some(probe) = with.probe.as_deref().and_then(|id| bench.probe(id)) else {
                continue;
            };
            notes.extend(overdue(key, probe, now));
            notes.extend(basis(key, section, &read.given, probe));
            notes.extend(at_sea_level(key, &read.given, probe));
        }
    }
    notes
}

fn unsteady(
    key: &str,
    name: &str,
    difference: dewledger_quantities::Kind,
    with: &With,
) -> Option<Note> {
    let summary = with.summary()?;
    let drift = summary.slope_si_per_s.unwrap_or(0.0).abs() * summary.lasted_s;
    let lead = match with.steadiness? {
        Steadiness::Drifting => Sentence::new("{w0} is drifting: {0} over its takes.")
            .with(Amount::new(difference, drift))
            .word(name.to_owned()),
        Steadiness::Hunting => Sentence::new("{w0} is hunting: it swings by more than its own ±.")
            .word(name.to_owned()),
        Steadiness::Steady | Steadiness::NotJudged => return None,
    };
    Some(Note::unusual(format!("{key}.unsteady"), key.to_owned(), lead).because(Sentence::new(
        "Every result that uses it holds for no one moment. Wait, or take the readings in turn and come back to the first.",
    )))
}

fn overdue(key: &str, probe: &KnownProbe, now: At) -> Option<Note> {
    let due = probe::date(&probe.typed.due).filter(|due| *due < clock::date(now))?;
    let lead = Sentence::new("{w0}: its calibration was due on {w1}.")
        .word(probe.label.clone())
        .word(due.strftime("%-d %B %Y").to_string());
    let reason =
        "Its ± stands as its paper says, which no longer holds. Run it beside another probe.";
    Some(Note::remark(format!("{key}.overdue"), lead).because(Sentence::new(reason)))
}

/// The instrument shows standard flow and the form says actual, or the other way round.
fn basis(
    key: &str,
    section: &dewledger_checks::form::Section,
    given: &Given,
    probe: &KnownProbe,
) -> Option<Note> {
    let shows = probe.reads.get("flow")?;
    let (prefix, _) = key.rsplit_once('.')?;
    let basis = format!("{prefix}.basis");
    let asked = section
        .items
        .iter()
        .any(|item| matches!(item, Item::Choice(choice) if choice.key == basis));
    let chosen = given.choice(&basis)?;
    if !asked || (shows == "standard") == (chosen == "standard") || chosen == "dry_air" {
        return None;
    }
    let lead = Sentence::new("{w0} shows {w1} flow, and the form says otherwise.")
        .word(probe.label.clone())
        .word(if shows == "standard" { "standard" } else { "actual" });
    let mut note = Note::unusual(format!("{key}.basis"), key.to_owned(), lead).because(
        Sentence::new("At height the two differ by a fifth. Say what it was set to show."),
    );
    if shows == "standard" {
        let change = Change::Choose(basis.into(), "standard".into());
        note = note.offering(Offer::new("It is standard flow", vec![change]));
    }
    Some(note)
}

/// A wet bulb that the instrument worked out for sea level: what it would be here.
fn at_sea_level(key: &str, given: &Given, probe: &KnownProbe) -> Option<Note> {
    if probe.reads.get("wet_bulb").map(String::as_str) != Some("sea_level") {
        return None;
    }
    let prefix = key.strip_suffix(".wet_bulb")?;
    let here = pressure::here(given).ok()?.pressure;
    if here.si() >= AT_HEIGHT_PA {
        return None;
    }
    let dry_bulb: ThermodynamicTemperature = given.quantity(&format!("{prefix}.dry_bulb"))?;
    let shown: ThermodynamicTemperature = given.quantity(key)?;
    let real = wet_bulb_here(dry_bulb, shown, here)?;
    let off = TemperatureInterval::from_si(shown.si() - real.si());
    let lead = Sentence::new("{w0} works wet bulbs out for sea level: {0} shown is {1} here.")
        .with(shown.amount())
        .with(real.amount())
        .word(probe.label.clone());
    Some(
        Note::unusual(format!("{key}.sea_level"), key.to_owned(), lead).because(
            Sentence::new(
                "It is off by {0}. Set the pressure on it, or type its relative humidity instead.",
            )
            .with(off.amount()),
        ),
    )
}

/// The wet bulb at this pressure of the air whose wet bulb was worked out for sea level.
fn wet_bulb_here(
    dry_bulb: ThermodynamicTemperature,
    shown: ThermodynamicTemperature,
    here: Pressure,
) -> Option<ThermodynamicTemperature> {
    let sea_level = Pressure::from_si(101_325.0);
    let then = MoistAir::new(dry_bulb, Humidity::WetBulb(shown, Wick::NotSaid), sea_level).ok()?;
    let humidity = Humidity::RelativeHumidity(then.relative_humidity());
    let now = MoistAir::new(dry_bulb, humidity, here).ok()?;
    Some(now.wet_bulb().ok()?.reading())
}

/// Remarks on draws.
pub(crate) fn of_draws(drawn: &Drawn) -> Vec<Note> {
    let mut notes = Vec::new();
    let percent = |share: f64| Share::from_si(share).amount();
    if drawn.too_many_impossible() {
        let lead = Sentence::new("{0} of the plausible values of these readings are impossible.")
            .with(percent(drawn.impossible));
        notes.push(Note::remark("draws_impossible", lead).because(Sentence::new(
            "So no interval is given: a reading is worse than its ± says, or its ± is too wide.",
        )));
    } else if drawn.saturated > 0.0 {
        let lead =
            Sentence::new("{0} of the draws lie beyond saturation and count as saturated air.")
                .with(percent(drawn.saturated));
        notes.push(Note::remark("draws_saturated", lead));
    }
    notes
}
