//! Fuel gas by a clocked meter.

use dewledger_quantities::{
    FuelVolume, HeatingValue, Kind, Power, Pressure, PressureDifference, Quantity, Sentence, Share,
    ThermodynamicTemperature, Time,
};

use super::POWER;
use crate::form::{Choice, ChoiceItem, Item, ReadingItem};
use crate::given::Given;
use crate::outcome::{Figure, Missing, Note, Outcome, Step};
use crate::refusal::{Refusal, Stop};

const VOLUME: &str = "fuel.volume";
const SECONDS: &str = "fuel.time";
const VALUE: &str = "fuel.heating_value";
const VALUE_IS: &str = "fuel.value_is";
const BASE_PRESSURE: &str = "fuel.base_pressure";
const BASE_TEMPERATURE: &str = "fuel.base_temperature";
const METER_PRESSURE: &str = "fuel.meter_pressure";
const METER_TEMPERATURE: &str = "fuel.meter_temperature";
const EFFICIENCY: &str = "fuel.efficiency";
const EFFICIENCY_ON: &str = "fuel.efficiency_on";

fn gross_or_net(key: &'static str, label: &'static str) -> Item {
    ChoiceItem::new(
        key,
        label,
        None,
        vec![Choice::new("gross", "Gross"), Choice::new("net", "Net")],
    )
    .into()
}

pub(super) fn items() -> Vec<Item> {
    let reading = |key, label, kind| -> Item { ReadingItem::wanted(key, label, kind).into() };
    vec![
        reading(VOLUME, "Volume a turn", Kind::FuelVolume),
        reading(SECONDS, "Time a turn", Kind::Duration),
        reading(VALUE, "Heating value", Kind::HeatingValue),
        gross_or_net(VALUE_IS, "The heating value is"),
        ReadingItem::wanted(BASE_PRESSURE, "It holds at a pressure of", Kind::Pressure)
            .help("Absolute; the supplier says it beside the value")
            .into(),
        reading(BASE_TEMPERATURE, "and a temperature of", Kind::Temperature),
        ReadingItem::wanted(
            METER_PRESSURE,
            "Gauge pressure at the meter",
            Kind::PressureDifference,
        )
        .into(),
        reading(METER_TEMPERATURE, "Temperature of the gas", Kind::Temperature),
        ReadingItem::wanted(EFFICIENCY, "Combustion efficiency", Kind::Share)
            .help("As the analyser printed it")
            .into(),
        gross_or_net(EFFICIENCY_ON, "The efficiency is on"),
    ]
}

/// What the meter counts, at the state for which the heating value is quoted, over what it counts as it is.
fn to_base(
    at: Pressure,
    t: ThermodynamicTemperature,
    base: Pressure,
    base_t: ThermodynamicTemperature,
) -> f64 {
    at.si() / base.si() * base_t.si() / t.si()
}

pub(super) fn power(given: &Given, here: Pressure, outcome: &mut Outcome) -> Result<Power, Stop> {
    let missing: Vec<Missing> = items()
        .iter()
        .filter_map(|item| match item {
            Item::Reading(item) if given.reading(&item.key).is_none() => {
                Some(Missing::new(item.key.clone(), format!("the {}", item.label.to_lowercase())))
            }
            Item::Choice(item) if given.choice(&item.key).is_none() => {
                Some(Missing::new(item.key.clone(), "whether it is gross or net"))
            }
            Item::Reading(_) | Item::Choice(_) => None,
        })
        .collect();
    if !missing.is_empty() {
        return Err(Stop::Waits(missing));
    }
    let volume: FuelVolume = given.quantity(VOLUME).unwrap_or_default();
    let time: Time = given.quantity(SECONDS).unwrap_or_default();
    let value: HeatingValue = given.quantity(VALUE).unwrap_or_default();
    let base: Pressure = given.quantity(BASE_PRESSURE).unwrap_or_default();
    let base_t: ThermodynamicTemperature = given.quantity(BASE_TEMPERATURE).unwrap_or_default();
    let gauge: PressureDifference = given.quantity(METER_PRESSURE).unwrap_or_default();
    let t: ThermodynamicTemperature = given.quantity(METER_TEMPERATURE).unwrap_or_default();
    let efficiency: Share = given.quantity(EFFICIENCY).unwrap_or_default();
    check(given, volume, time, base, efficiency)?;
    let at = Pressure::from_si(here.si() + gauge.si());
    let factor = to_base(at, t, base, base_t);
    let input = Power::from_si(volume.si() / time.si() * value.si() * factor);
    let useful = Power::from_si(input.si() * efficiency.si());
    let on = given.choice_or(VALUE_IS, "gross").to_owned();
    outcome.push(
        Figure::new("fuel_input", "Fuel input", input.amount(), POWER)
            .on_condition(Sentence::new("on the {w0} heating value").word(on)),
    );
    outcome.push(Figure::new(
        "meter_factor",
        "Meter to the state of its heating value",
        dewledger_quantities::Ratio::from_si(factor).amount(),
        POWER,
    ));
    outcome.steps.push(Step::new(
        "Fuel",
        "P = V/s × HV × (p_m/p_base)(T_base/T_m) × eta",
        Sentence::new("{0} in {1}, {2}, factor {w0}: input {3}, useful {4}")
            .with(volume.amount())
            .with(time.amount())
            .with(value.amount())
            .with(input.amount())
            .with(useful.amount())
            .word(format!("{factor:.4}")),
        "ideal-gas law for what the meter counts; efficiency as the analyser printed it",
    ));
    outcome.notes.push(
        Note::remark(
            "gross_and_net",
            Sentence::new("Gross and net differ by about a tenth for natural gas."),
        )
        .because(Sentence::new("Value and efficiency must be on the same one; here they are.")),
    );
    Ok(useful)
}

fn check(
    given: &Given,
    volume: FuelVolume,
    time: Time,
    base: Pressure,
    efficiency: Share,
) -> Result<(), Stop> {
    let wrong = |key: &'static str, code, says: Sentence| Err(Refusal::new(key, code, says).into());
    if volume.si() <= 0.0 {
        return wrong(
            VOLUME,
            "no_volume",
            Sentence::new("A turn of {0} burns nothing. Read the dial’s size again.")
                .with(volume.amount()),
        );
    }
    if !(5.0..=3600.0).contains(&time.si()) {
        return wrong(
            SECONDS,
            "turn_out_of_range",
            Sentence::new("A turn of {0} is outside 5 s to an hour. Clock several turns of the smallest dial.")
                .with(time.amount()),
        );
    }
    if !(80_000.0..=120_000.0).contains(&base.si()) {
        return wrong(
            BASE_PRESSURE,
            "base_out_of_range",
            Sentence::new("A heating value at {0} is quoted nowhere: type the absolute pressure that stands beside it.")
                .with(base.amount()),
        );
    }
    if given.choice(VALUE_IS) != given.choice(EFFICIENCY_ON) {
        return wrong(
            EFFICIENCY_ON,
            "gross_against_net",
            Sentence::new(
                "Heating value and efficiency must both be gross or both be net: they differ by about a tenth.",
            ),
        );
    }
    let most = if given.choice(EFFICIENCY_ON) == Some("net") { 1.12 } else { 1.0 };
    if !(0.3..=most).contains(&efficiency.si()) && !given.is_drawn() {
        return wrong(
            EFFICIENCY,
            "efficiency_out_of_range",
            Sentence::new("An efficiency of {0} cannot be: above 100 % gross more would come out than goes in.")
                .with(efficiency.amount()),
        );
    }
    Ok(())
}
