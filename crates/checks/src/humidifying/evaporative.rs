//! Water that evaporates into air: wetted media, sprays.

use dewledger_properties::{MoistAir, water};
use dewledger_quantities::{
    HumidityRatio, Kind, MoistureFlow, Quantity, Ratio, Sentence, Share, TemperatureInterval,
    ThermodynamicTemperature, WaterEnthalpy, difference,
};

use super::{
    ENTERING, Humidified, RESULTS, SHARE, WATER, headline, out_of_range, results, water_temperature,
};
use crate::flow_block::Flow;
use crate::form::{Choice, ChoiceItem, Item, ReadingItem, Section};
use crate::given::Given;
use crate::outcome::{Figure, Note, Outcome, Step};
use crate::refusal::{Refusal, Stop};
use crate::state_block::Read;

const KNOWN: &str = "pad.by";
const EFFECTIVENESS: &str = "pad.effectiveness";
const LEAVING: &str = "pad.leaving_dry_bulb";
const TEMPERATURE: &str = "pad.water_temperature";
const CYCLES: &str = "pad.cycles";
/// Below this depression, K, an effectiveness says nothing.
const LEAST_DEPRESSION_K: f64 = 3.0;

fn by_leaving(given: &Given) -> bool {
    given.choice_or(KNOWN, "leaving") == "leaving"
}

pub(super) fn sections(given: &Given) -> Vec<Section> {
    let known: Item = ChoiceItem::new(
        KNOWN,
        "Known is",
        Some("leaving"),
        vec![
            Choice::helped("leaving", "Leaving dry bulb", "As read behind it"),
            Choice::helped(
                "effectiveness",
                "Its effectiveness",
                "Saturation effectiveness, from its maker",
            ),
        ],
    )
    .into();
    let reading = if by_leaving(given) {
        ReadingItem::wanted(LEAVING, "Leaving dry bulb", Kind::Temperature)
    } else {
        ReadingItem::wanted(EFFECTIVENESS, "Saturation effectiveness", SHARE)
    };
    vec![
        Section::new("pad", "Wetted media", vec![known, reading.into()]),
        Section::new(
            "pad_water",
            "Its water",
            vec![
                ReadingItem::optional(TEMPERATURE, "Water temperature", Kind::Temperature)
                    .help("Blank is recirculating water, at the wet bulb")
                    .into(),
                ReadingItem::optional(CYCLES, "Cycles of concentration", Kind::Ratio)
                    .help("For the bleed")
                    .covered()
                    .into(),
            ],
        )
        .seldom(),
    ]
}

/// The humidity ratio at a dry bulb of air that took up water of an enthalpy: `h2 - h1 = (W2 - W1) h_w`.
fn taken_up(
    air: &MoistAir,
    dry_bulb: ThermodynamicTemperature,
    of: WaterEnthalpy,
) -> HumidityRatio {
    let at = |w: f64| {
        let then = MoistAir::unchecked(dry_bulb, HumidityRatio::from_si(w), air.pressure());
        then.enthalpy().si() - air.enthalpy().si() - (w - air.humidity_ratio().si()) * of.si()
    };
    // Nearly linear in W: a few secant steps end it.
    let (mut one, mut other) = (air.humidity_ratio().si(), air.humidity_ratio().si() + 1e-3);
    let (mut f_one, mut f_other) = (at(one), at(other));
    for _ in 0..20 {
        if (f_other - f_one).abs() < 1e-12 {
            break;
        }
        let next = other - f_other * (other - one) / (f_other - f_one);
        (one, f_one) = (other, f_other);
        (other, f_other) = (next, at(next));
        if (other - one).abs() < 1e-15 {
            break;
        }
    }
    HumidityRatio::from_si(other)
}

pub(super) fn solve(
    given: &Given,
    read: &Read,
    flow: Option<&Flow>,
    outcome: &mut Outcome,
) -> Result<Humidified, Stop> {
    let air = &read.air;
    let wet_bulb = air.wet_bulb().map_err(|error| out_of_range(&error))?.reading();
    let depression = difference(air.dry_bulb(), wet_bulb);
    let (dry_bulb, effectiveness) = leaving(given, air, wet_bulb, depression)?;
    let t = water_temperature(given, TEMPERATURE)?.unwrap_or(wet_bulb);
    let of = water::enthalpy(t, air.pressure()).map_err(|error| {
        Refusal::new(
            TEMPERATURE,
            "water_out_of_range",
            Sentence::new("This water is outside what is worked out ({w0}).")
                .word(error.to_string()),
        )
    })?;
    let w2 = taken_up(air, dry_bulb, of);
    let added = HumidityRatio::from_si(w2.si() - air.humidity_ratio().si());
    let done = super::add(air, added, of).map_err(|error| out_of_range(&error))?;
    outcome.push(Figure::new(
        "effectiveness",
        "Saturation effectiveness",
        Share::from_si(effectiveness.si()).amount(),
        RESULTS,
    ));
    results(read, &done, flow, outcome);
    bleed(given, flow, added, outcome)?;
    let order: &[&str] = if by_leaving(given) { &["effectiveness"] } else { &["dry_bulb"] };
    headline(outcome, order);
    outcome.steps.push(Step::new(
        "Saturation effectiveness",
        "eps = (t1 - t2) / (t1 - t_wb1)",
        Sentence::new("({0} − {1}) ÷ {2} = {3}")
            .with(air.dry_bulb().amount())
            .with(dry_bulb.amount())
            .with(depression.amount())
            .with(Share::from_si(effectiveness.si()).amount()),
        "of the entering wet-bulb depression",
    ));
    outcome.steps.push(Step::new(
        "Water taken up",
        "h2 - h1 = (W2 - W1) h_w(t_w)",
        Sentence::new("water at {0}: W2 = {1}").with(t.amount()).with(w2.amount()),
        "no heat from outside; with recirculated water the wet bulb stays",
    ));
    if depression.si() < LEAST_DEPRESSION_K {
        outcome.notes.push(
            Note::unusual(
                "small_depression",
                ENTERING.key("dry_bulb"),
                Sentence::new(
                    "The entering air is only {0} from its wet bulb: an effectiveness says little.",
                )
                .with(depression.amount()),
            )
            .because(Sentence::new("Come back in drier air.")),
        );
    }
    Ok(done)
}

/// The leaving dry bulb and the effectiveness, one from the other.
fn leaving(
    given: &Given,
    air: &MoistAir,
    wet_bulb: ThermodynamicTemperature,
    depression: TemperatureInterval,
) -> Result<(ThermodynamicTemperature, Ratio), Stop> {
    if by_leaving(given) {
        let dry_bulb: ThermodynamicTemperature =
            given.quantity(LEAVING).ok_or_else(|| Stop::waits(LEAVING, "the leaving dry bulb"))?;
        if dry_bulb.si() < wet_bulb.si() && !given.is_drawn() {
            return Err(Refusal::new(
                LEAVING,
                "below_the_wet_bulb",
                Sentence::new("Leaving dry bulb {0} is below the entering wet bulb {1}: water alone cannot cool that far. Check both, or the water is chilled.")
                    .with(dry_bulb.amount())
                    .with(wet_bulb.amount()),
            )
            .into());
        }
        if dry_bulb.si() > air.dry_bulb().si() && !given.is_drawn() {
            return Err(Refusal::new(
                LEAVING,
                "warmer_than_entering",
                Sentence::new("Leaving dry bulb {0} is above the entering {1}: evaporating water cools. Swap the two, or look for a heater between them.")
                    .with(dry_bulb.amount())
                    .with(air.dry_bulb().amount()),
            )
            .into());
        }
        let share = (air.dry_bulb().si() - dry_bulb.si()) / depression.si();
        return Ok((dry_bulb, Ratio::from_si(share)));
    }
    let effectiveness: Share = given
        .quantity(EFFECTIVENESS)
        .ok_or_else(|| Stop::waits(EFFECTIVENESS, "the effectiveness"))?;
    if !(0.0..=1.0).contains(&effectiveness.si()) && !given.is_drawn() {
        return Err(Refusal::new(
            EFFECTIVENESS,
            "effectiveness_out_of_range",
            Sentence::new(
                "An effectiveness of {0} is outside 0 to 100 %. Check the number and its unit.",
            )
            .with(effectiveness.amount()),
        )
        .into());
    }
    let dry_bulb = air.dry_bulb().si() - effectiveness.si() * depression.si();
    Ok((ThermodynamicTemperature::from_si(dry_bulb), Ratio::from_si(effectiveness.si())))
}

/// Bleed and make-up, where the cycles of concentration are known.
fn bleed(
    given: &Given,
    flow: Option<&Flow>,
    added: HumidityRatio,
    outcome: &mut Outcome,
) -> Result<(), Stop> {
    let Some(cycles): Option<Ratio> = given.quantity(CYCLES) else { return Ok(()) };
    if !(1.05..=10.0).contains(&cycles.si()) {
        return Err(Refusal::new(
            CYCLES,
            "cycles_out_of_range",
            Sentence::new("{0} cycles of concentration are outside 1.05 to 10. Check the number.")
                .with(cycles.amount()),
        )
        .into());
    }
    let Some(flow) = flow else { return Ok(()) };
    let evaporated = flow.dry_air.si() * added.si();
    let bleed = evaporated / (cycles.si() - 1.0);
    let figure =
        |key, label, rate| Figure::new(key, label, MoistureFlow::from_si(rate).amount(), WATER);
    outcome.push(figure("bleed", "Bleed", bleed));
    outcome.push(figure("make_up", "Make-up", evaporated + bleed));
    Ok(())
}
