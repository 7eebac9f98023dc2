//! Steam into air.

use dewledger_properties::{MoistAir, saturation_humidity_ratio_over_liquid, water};
use dewledger_quantities::{
    HumidityRatio, Kind, MoistureFlow, Power, Pressure, Quantity, Ratio, RelativeHumidity,
    Sentence, Share, ThermodynamicTemperature, WaterEnthalpy,
};

use super::{
    SHARE, WATER, add, headline, largest_addition, out_of_range, results, water_temperature,
};
use crate::flow_block::Flow;
use crate::form::{Choice, ChoiceItem, Item, ReadingItem, Section};
use crate::given::Given;
use crate::outcome::{Figure, Missing, Note, Outcome, Step};
use crate::refusal::{Refusal, Stop};
use crate::state_block::Read;

const PRESSURE: &str = "steam.pressure";
const DRYNESS: &str = "steam.dryness";
const FEED: &str = "steam.feed_water";
const TARGET_BY: &str = "target.by";
const TARGETS: [(&str, &str, &str, Kind); 4] = [
    (
        "relative_humidity",
        "target.relative_humidity",
        "Leaving relative humidity",
        Kind::RelativeHumidity,
    ),
    ("humidity_ratio", "target.humidity_ratio", "Leaving humidity ratio", Kind::HumidityRatio),
    ("dew_point", "target.dew_point", "Leaving dew point", Kind::Temperature),
    ("water", "target.water", "Water added", Kind::MoistureFlow),
];

pub(super) fn sections(given: &Given) -> Vec<Section> {
    let (_, key, label, kind) = target(given);
    let options = TARGETS.iter().map(|(id, _, label, _)| Choice::new(id, *label)).collect();
    let target: Vec<Item> = vec![
        ChoiceItem::new(TARGET_BY, "Known is", Some("relative_humidity"), options).into(),
        ReadingItem::wanted(key, label, kind).into(),
    ];
    vec![
        Section::new("target", "How much", target),
        Section::new(
            "steam",
            "The steam",
            vec![
                ReadingItem::optional(PRESSURE, "Steam pressure, absolute", Kind::Pressure)
                    .help("A gauge’s reading plus the pressure here; blank is steam at the pressure here")
                    .covered()
                    .into(),
                ReadingItem::optional(DRYNESS, "Dryness of the steam", SHARE)
                    .assuming(Share::from_si(1.0).amount())
                    .covered()
                    .into(),
                ReadingItem::optional(FEED, "Feed water", Kind::Temperature)
                    .help("For the generator’s power")
                    .into(),
            ],
        )
        .seldom(),
    ]
}

fn target(given: &Given) -> (&'static str, &'static str, &'static str, Kind) {
    let by = given.choice_or(TARGET_BY, "relative_humidity");
    TARGETS.into_iter().find(|(id, ..)| *id == by).unwrap_or(TARGETS[0])
}

/// The steam's enthalpy, at its pressure or the one here.
fn steam(given: &Given, here: Pressure) -> Result<(WaterEnthalpy, Pressure, Ratio), Stop> {
    let pressure: Pressure = given.quantity(PRESSURE).unwrap_or(here);
    let dryness: Share = given.quantity(DRYNESS).unwrap_or_else(|| Share::from_si(1.0));
    if !(0.85..=1.0).contains(&dryness.si()) {
        return Err(Refusal::new(
            DRYNESS,
            "dryness_out_of_range",
            Sentence::new("Steam of dryness {0} is outside 85 to 100 %: below that it is mostly water. Separate it first.")
                .with(dryness.amount()),
        )
        .into());
    }
    if !(50_000.0..=500_000.0).contains(&pressure.si()) {
        return Err(Refusal::new(
            PRESSURE,
            "steam_pressure_out_of_range",
            Sentence::new("Steam at {0} is outside 50 to 500 kPa absolute. Add the pressure here to a gauge’s reading.")
                .with(pressure.amount()),
        )
        .into());
    }
    let dryness = Ratio::from_si(dryness.si());
    let enthalpy = water::steam_enthalpy(pressure, dryness).map_err(|error| {
        Refusal::new(
            PRESSURE,
            "steam_out_of_range",
            Sentence::new("This steam is outside what is worked out ({w0}).")
                .word(error.to_string()),
        )
    })?;
    Ok((enthalpy, pressure, dryness))
}

/// How much is added per dry air.
fn addition(
    given: &Given,
    read: &Read,
    flow: Option<&Flow>,
    steam: WaterEnthalpy,
) -> Result<HumidityRatio, Stop> {
    let (by, key, label, _) = target(given);
    let Some(reading) = given.reading(key) else {
        return Err(Stop::waits(key, format!("the {}", label.to_lowercase())));
    };
    let air = &read.air;
    let w1 = air.humidity_ratio().si();
    let added = match by {
        "water" => {
            let Some(flow) = flow else {
                return Err(Stop::Waits(vec![Missing::new("flow.rate", "the air flow")]));
            };
            reading.amount.si() / flow.dry_air.si()
        }
        "humidity_ratio" => reading.amount.si() - w1,
        "dew_point" => {
            let dew_point = ThermodynamicTemperature::from_si(reading.amount.si());
            let w = saturation_humidity_ratio_over_liquid(dew_point, air.pressure())
                .map_err(|error| out_of_range(&error))?;
            w.si() - w1
        }
        _ => to_humidity(air, reading.amount.get(), steam)?,
    };
    if added <= 0.0 && !given.is_drawn() {
        return Err(Refusal::new(
            key,
            "target_not_above",
            Sentence::new(
                "{0} is not above what the entering air holds already: nothing is to be added.",
            )
            .with(reading.amount),
        )
        .into());
    }
    Ok(HumidityRatio::from_si(added))
}

/// The addition that brings the air to a relative humidity.
fn to_humidity(
    air: &MoistAir,
    target: Option<RelativeHumidity>,
    steam: WaterEnthalpy,
) -> Result<f64, Stop> {
    let target = target.unwrap_or_default();
    if !(0.0..1.0).contains(&target.si()) {
        return Err(Refusal::new(
            TARGETS[0].1,
            "target_out_of_range",
            Sentence::new(
                "A target of {0} is not below saturation. Type what the leaving air should hold.",
            )
            .with(target.amount()),
        )
        .into());
    }
    Ok(largest_addition(air, steam, target.si()).map_or(0.0, Quantity::si))
}

pub(super) fn solve(
    given: &Given,
    here: Pressure,
    read: &Read,
    flow: Option<&Flow>,
    outcome: &mut Outcome,
) -> Result<super::Humidified, Stop> {
    let (enthalpy, pressure, dryness) = steam(given, here)?;
    let added = addition(given, read, flow, enthalpy)?;
    let done = add(&read.air, added, enthalpy).map_err(|error| out_of_range(&error))?;
    results(read, &done, flow, outcome);
    let limit = largest_addition(&read.air, enthalpy, 1.0);
    if let Some(limit) = limit {
        outcome.push(Figure::new(
            "fog_limit",
            "Most before fog, per dry air",
            limit.amount(),
            WATER,
        ));
        if let Some(flow) = flow {
            let most = MoistureFlow::from_si(flow.dry_air.si() * limit.si());
            outcome.push(Figure::new("fog_limit_water", "Most before fog", most.amount(), WATER));
        }
    }
    let feed = water_temperature(given, FEED)?;
    if let (Some(feed), Some(flow)) = (feed, flow)
        && let Ok(feed) = water::enthalpy(feed, here)
    {
        let power = flow.dry_air.si() * added.si() * (enthalpy.si() - feed.si());
        outcome.push(
            Figure::new("generator", "To make this steam", Power::from_si(power).amount(), WATER)
                .on_condition(Sentence::new("without losses and blow-down")),
        );
    }
    headline(outcome, &["water", "added"]);
    outcome.steps.push(Step::new(
        "The steam",
        "h_st = x h_g + (1 - x) h_f",
        Sentence::new("at {0}, dryness {1}: h_st = {2}")
            .with(pressure.amount())
            .with(Share::from_si(dryness.si()).amount())
            .with(enthalpy.amount()),
        "virial equation of steam; IAPWS SR6-08 for the liquid part",
    ));
    outcome.steps.push(Step::new(
        "Leaving air",
        "W2 = W1 + dW,  h2 = h1 + dW h_st,  t2 from (h2, W2)",
        Sentence::new("dW = {0}, h2 = {1}: {2}")
            .with(added.amount())
            .with(done.enthalpy.amount())
            .with(done.air.dry_bulb().amount()),
        "steady balances of water and energy; beyond saturation the rest is fog",
    ));
    if given.reading(PRESSURE).is_none() {
        outcome.notes.push(Note::remark(
            "steam_at_pressure_here",
            Sentence::new("Steam at the pressure here, {0}, is assumed.").with(here.amount()),
        ));
    }
    outcome.notes.push(
        Note::remark("absorption", Sentence::new("Steam needs a length of duct to be taken up."))
            .because(Sentence::new(
                "Read the leaving air behind that, and nothing colder may stand in it.",
            )),
    );
    Ok(done)
}
