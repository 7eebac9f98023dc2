//! The heat that a pump adds to the water: `V dp` as pressure, `V dp / eta` as heat in the end.

use dewledger_quantities::{
    Kind, Power, PressureDifference, Quantity, Sentence, Share, TemperatureInterval,
};

use crate::form::{Choice, ChoiceItem, Item, ReadingItem};
use crate::given::Given;
use crate::outcome::{Figure, Missing, Note, Outcome, Step};
use crate::refusal::{Refusal, Stop};
use crate::water_side::Water;

const RISE: &str = "pump.pressure_rise";
const EFFICIENCY: &str = "pump.efficiency";
const COOLED_BY: &str = "pump.motor_cooled_by";
const MOTOR: &str = "pump.motor_efficiency";
const PUMP: &str = "The pump";

pub(super) fn items(given: &Given) -> Vec<Item> {
    let mut items: Vec<Item> = vec![
        ReadingItem::optional(RISE, "Pressure rise of the pump", Kind::PressureDifference)
            .help("Gauges at its flanges, brought to one height")
            .into(),
    ];
    if given.reading(RISE).is_some() {
        items.push(
            ReadingItem::wanted(EFFICIENCY, "Efficiency of the pump", Kind::Share)
                .help("From its maker’s curve at this flow")
                .into(),
        );
        items.push(
            ChoiceItem::new(
                COOLED_BY,
                "Its motor is cooled by",
                None,
                vec![
                    Choice::helped("air", "Air", "The motor’s own loss goes to the room"),
                    Choice::helped(
                        "water",
                        "The pumped water",
                        "All that it takes warms the water",
                    ),
                ],
            )
            .into(),
        );
        if given.choice(COOLED_BY) == Some("water") {
            items.push(ReadingItem::wanted(MOTOR, "Efficiency of the motor", Kind::Share).into());
        }
    }
    items
}

/// Hydraulic power and heat to the water, W. Efficiencies 0 to 1, above 0; the motor's is 1 where its loss goes elsewhere.
#[must_use]
pub(super) fn powers(
    flow: dewledger_quantities::WaterFlow,
    rise: PressureDifference,
    efficiency: Share,
    motor: Share,
) -> (Power, Power) {
    let hydraulic = flow.si() * rise.si();
    (Power::from_si(hydraulic), Power::from_si(hydraulic / (efficiency.si() * motor.si())))
}

fn efficiency(given: &Given, key: &'static str) -> Result<Option<Share>, Stop> {
    let Some(share) = given.quantity::<Share>(key) else { return Ok(None) };
    if (0.05..=1.0).contains(&share.si()) {
        return Ok(Some(share));
    }
    Err(Refusal::new(
        key,
        "efficiency_out_of_range",
        Sentence::new("An efficiency of {0} is outside 5 to 100 %. Check the number and its unit.")
            .with(share.amount()),
    )
    .into())
}

pub(super) fn report(given: &Given, water: &Water, outcome: &mut Outcome) -> Result<(), Stop> {
    let Some(rise) = given.quantity::<PressureDifference>(RISE) else { return Ok(()) };
    if rise.si() <= 0.0 {
        return Err(Refusal::new(
            RISE,
            "no_pressure_rise",
            Sentence::new("A pump raises the pressure: {0} is not above zero. Swap the gauges, or leave it blank.")
                .with(rise.amount()),
        )
        .into());
    }
    let pump = efficiency(given, EFFICIENCY)?;
    let in_water = match given.choice(COOLED_BY) {
        Some("water") => efficiency(given, MOTOR)?.ok_or((MOTOR, "the motor’s efficiency")),
        Some("air") => Ok(Share::from_si(1.0)),
        _ => Err((COOLED_BY, "what cools the pump’s motor")),
    };
    let (Some(pump), Ok(motor)) = (pump, in_water) else {
        if pump.is_none() {
            outcome.waits.push(Missing::new(EFFICIENCY, "the pump’s efficiency"));
        }
        outcome.waits.extend(in_water.err().map(|(key, name)| Missing::new(key, name)));
        return Ok(());
    };
    let (hydraulic, heat) = powers(water.flow, rise, pump, motor);
    let warms =
        TemperatureInterval::from_si(heat.si() / (water.mass_flow.si() * water.heat_capacity.si()));
    outcome.push(Figure::new("hydraulic", "Hydraulic power", hydraulic.amount(), PUMP));
    outcome.push(Figure::new("pump_heat", "Heat of the pump to the water", heat.amount(), PUMP));
    outcome.push(Figure::new("pump_rise", "which warms it by", warms.amount(), PUMP));
    outcome.steps.push(Step::new(
        "Heat of the pump",
        "P = V dp / eta",
        Sentence::new("{0} × {1} = {2}; ÷ {3} = {4}")
            .with(water.flow.amount())
            .with(rise.amount())
            .with(hydraulic.amount())
            .with(Share::from_si(pump.si() * motor.si()).amount())
            .with(heat.amount()),
        "all of the shaft’s power ends as heat of the water, in the pump and along the pipes",
    ));
    outcome.notes.push(Note::remark(
        "pump_heat_once",
        Sentence::new(
            "Friction along the pipes is this same heat: adding it again counts it twice.",
        ),
    ));
    Ok(())
}
