//! Timed fills of the drain: how much runs, and whether it is still rising.

use dewledger_properties::water;
use dewledger_quantities::{
    CondensateFlow, Kind, MassDensity, MoistureFlow, Pressure, Quantity, Sentence,
    ThermodynamicTemperature, Time, WaterVolume,
};

use super::{DRAIN, WATER_TEMPERATURE};
use crate::form::{ReadingItem, Repeat, Section, count};
use crate::given::Given;
use crate::outcome::{Figure, Note, Outcome, Role, Step};
use crate::refusal::{Refusal, Stop};
use crate::state_block::Read;

const FILLS: &str = "fills";
const MOST_FILLS: usize = 6;

pub(super) fn fill_key(number: usize, of: &str) -> String {
    format!("fill{number}.{of}")
}

/// What is asked of each fill.
pub(super) fn fill_sections(given: &Given) -> Vec<Section> {
    let count = count(given, FILLS, 1, MOST_FILLS);
    (1..=count)
        .map(|number| {
            let mut section = Section::new(
                format!("fill{number}"),
                format!("Fill {number} of the drain"),
                vec![
                    ReadingItem::optional(fill_key(number, "volume"), "Volume", Kind::WaterVolume)
                        .into(),
                    ReadingItem::optional(fill_key(number, "time"), "Time to fill", Kind::Duration)
                        .into(),
                ],
            );
            if number == count {
                section.repeat = Some(Repeat {
                    choice: FILLS.into(),
                    count,
                    least: 1,
                    most: MOST_FILLS,
                    add: Some("Add a fill".into()),
                    remove: Some("Take this fill away".into()),
                });
            }
            section
        })
        .collect()
}

/// One timed fill.
pub(super) struct Fill {
    number: usize,
    volume: WaterVolume,
    time: Time,
    /// Relative 95 % half-width of its rate: typed, else 1 % of volume and 2 s (field practice).
    half_width: f64,
}

/// Every fill that was read.
pub(super) fn read_fills(given: &Given) -> Result<Vec<Fill>, Stop> {
    let mut fills = Vec::new();
    for number in 1..=count(given, FILLS, 1, MOST_FILLS) {
        let (volume_key, time_key) = (fill_key(number, "volume"), fill_key(number, "time"));
        let volume: Option<WaterVolume> = given.quantity(&volume_key);
        let time: Option<Time> = given.quantity(&time_key);
        let (volume, time) = match (volume, time) {
            (None, None) => continue,
            (None, Some(_)) => return Err(Stop::waits(volume_key, "the volume of the fill")),
            (Some(_), None) => return Err(Stop::waits(time_key, "the time of the fill")),
            (Some(volume), Some(time)) => (volume, time),
        };
        if !(0.05e-3..=0.2).contains(&volume.si()) {
            return Err(Refusal::new(
                volume_key,
                "fill_volume_out_of_range",
                Sentence::new(
                    "A fill of {0} is outside 0.05 to 200 L. Check the number and its unit.",
                )
                .with(volume.amount()),
            )
            .into());
        }
        if !(30.0..=86_400.0).contains(&time.si()) {
            return Err(Refusal::new(
                time_key,
                "fill_time_out_of_range",
                Sentence::new("A filling time of {0} is outside 30 s to 24 h. A shorter one times the hand, not the drain.")
                    .with(time.amount()),
            )
            .into());
        }
        let half = |key: &str, unstated: f64| {
            given.reading(key).and_then(|r| r.half_width_si).unwrap_or(unstated)
        };
        let half_width = (half(&volume_key, 0.01 * volume.si()) / volume.si())
            .hypot(half(&time_key, 2.0) / time.si());
        fills.push(Fill { number, volume, time, half_width });
    }
    Ok(fills)
}

/// How repeated fills run.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Run {
    /// Within their ±, or without order.
    Even,
    /// Each larger than the one before, the last by more than the ±.
    Rising,
    /// Each smaller than the one before, the last by more than the ±.
    Falling,
}

/// Judges the rates of repeated fills; `rates` with their absolute half-widths, in one unit.
#[must_use]
pub fn run(rates: &[(f64, f64)]) -> Run {
    let (Some(first), Some(last)) = (rates.first(), rates.last()) else { return Run::Even };
    let beyond = (last.0 - first.0).abs() > first.1.hypot(last.1);
    let all = |test: fn(f64, f64) -> bool| rates.windows(2).all(|pair| test(pair[0].0, pair[1].0));
    if rates.len() < 2 || !beyond {
        Run::Even
    } else if all(|before, after| after > before) {
        Run::Rising
    } else if all(|before, after| after < before) {
        Run::Falling
    } else {
        Run::Even
    }
}

/// The drained rate, with its fills as results; none without fills, or while the coil is still filling.
pub(super) fn drain(
    given: &Given,
    leaving: Option<&Read>,
    fills: &[Fill],
    outcome: &mut Outcome,
) -> Result<Option<MoistureFlow>, Stop> {
    if fills.is_empty() {
        return Ok(None);
    }
    let typed: Option<ThermodynamicTemperature> = given.quantity(WATER_TEMPERATURE);
    if let Some(t) = typed
        && !(273.15..=313.15).contains(&t.si())
    {
        let says = Sentence::new(
            "Condensate of {0} is outside 0 to 40 °C. Check the number and its unit.",
        );
        return Err(Refusal::new(
            WATER_TEMPERATURE,
            "water_temperature_out_of_range",
            says.with(t.amount()),
        )
        .into());
    }
    // Without a reading the leaving wet bulb, or 12 °C: the density moves by 0.1 % at most.
    let assumed = leaving
        .and_then(|leaving| leaving.air.wet_bulb().ok())
        .map_or(ThermodynamicTemperature::from_si(285.15), dewledger_properties::WetBulb::reading);
    let t = typed.unwrap_or(assumed);
    // Pressure moves the density by a hundred-thousandth; without an air state the standard one does.
    let pressure = leaving.map_or(Pressure::from_si(1e5), |leaving| leaving.air.pressure());
    let density = water::density(t, pressure).unwrap_or_else(|_| MassDensity::from_si(999.5));
    let rates: Vec<(f64, f64)> = fills
        .iter()
        .map(|fill| {
            let rate = fill.volume.si() / fill.time.si();
            (rate, rate * fill.half_width)
        })
        .collect();
    for (fill, (rate, _)) in fills.iter().zip(&rates) {
        outcome.push(Figure::new(
            format!("fill_{}", fill.number),
            format!("Fill {}", fill.number),
            CondensateFlow::from_si(*rate).amount(),
            DRAIN,
        ));
        if fill.volume.si() < 0.5e-3 || fill.time.si() < 300.0 {
            let lead = Sentence::new("Fill {w0} is short: {0} in {1}.")
                .word(fill.number.to_string())
                .with(fill.volume.amount())
                .with(fill.time.amount());
            let reason = Sentence::new(
                "Half a litre and five minutes make a second of the watch and a few drops small.",
            );
            outcome.notes.push(
                Note::unusual(
                    format!("fill{}.short", fill.number),
                    fill_key(fill.number, "time"),
                    lead,
                )
                .because(reason),
            );
        }
    }
    // Whether it rises is told from what was read, not from draws around it.
    let run = if given.is_drawn() { Run::Even } else { run(&rates) };
    match run {
        Run::Rising => {
            outcome.notes.push(
                Note::unusual("still_rising", fill_key(1, "volume"), Sentence::new("The coil or the pan is still filling: wait and fill again."))
                    .because(Sentence::new("Each fill is quicker than the one before, by more than its ±. No mean is given.")),
            );
            return Ok(None);
        }
        Run::Falling => {
            outcome.notes.push(
                Note::unusual(
                    "falling",
                    fill_key(1, "volume"),
                    Sentence::new(
                        "The drain is running out: each fill is slower than the one before.",
                    ),
                )
                .because(Sentence::new(
                    "The pan is emptying or the load is falling. No mean is given.",
                )),
            );
            return Ok(None);
        }
        Run::Even => {}
    }
    let volume: f64 = fills.iter().map(|fill| fill.volume.si()).sum();
    let time: f64 = fills.iter().map(|fill| fill.time.si()).sum();
    let rate = MoistureFlow::from_si(volume * density.si() / time);
    outcome.push(Figure::new(
        "drain_volume",
        "Drained",
        CondensateFlow::from_si(volume / time).amount(),
        DRAIN,
    ));
    outcome.push(Figure::new("drain", "Drained, by mass", rate.amount(), DRAIN));
    let daily = WaterVolume::from_si(volume / time * 86_400.0);
    outcome.push(
        Figure::new("drain_daily", "In a day at this rate", daily.amount(), DRAIN)
            .role(Role::Detail),
    );
    outcome.steps.push(Step::new(
        "Drained",
        "m_w = V rho / time",
        Sentence::new("{0} × {1} ÷ {2} = {3}")
            .with(WaterVolume::from_si(volume).amount())
            .with(density.amount())
            .with(Time::from_si(time).amount())
            .with(rate.amount()),
        "density of liquid water by IAPWS SR6-08; fills weighed by time",
    ));
    Ok(Some(rate))
}
