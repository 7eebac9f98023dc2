//! Water over a season, from hours with their outdoor humidity.

use dewledger_properties::{MoistAir, water};
use dewledger_quantities::{HumidityRatio, Kind, Mass, Quantity, Sentence, Time, WaterVolume};

use crate::flow_block::Flow;
use crate::form::{ReadingItem, Repeat, Section, count};
use crate::given::Given;
use crate::outcome::{Figure, Note, Outcome};
use crate::refusal::{Refusal, Stop};

const BINS: &str = "bins";
const MOST_BINS: usize = 24;
const SEASON: &str = "Over the season";

fn bin_key(number: usize, of: &str) -> String {
    format!("bin{number}.{of}")
}

/// What is asked of each outdoor state.
pub(super) fn bin_sections(given: &Given) -> Vec<Section> {
    let count = count(given, BINS, 0, MOST_BINS);
    let repeat = |add: &'static str| Repeat {
        choice: BINS.into(),
        count,
        least: 0,
        most: MOST_BINS,
        add: Some(add.into()),
        remove: Some("Take this state away".into()),
    };
    if count == 0 {
        let mut section = Section::new("season", "Over a season", Vec::new()).seldom();
        section.repeat = Some(repeat("Add an outdoor state with its hours"));
        return vec![section];
    }
    (1..=count)
        .map(|number| {
            let mut section = Section::new(
                format!("bin{number}"),
                format!("Outdoor state {number}"),
                vec![
                    ReadingItem::wanted(bin_key(number, "hours"), "Hours", Kind::Duration)
                        .covered()
                        .into(),
                    ReadingItem::wanted(
                        bin_key(number, "humidity_ratio"),
                        "Humidity ratio",
                        Kind::HumidityRatio,
                    )
                    .into(),
                ],
            );
            if number == count {
                section.repeat = Some(repeat("Add a state"));
            }
            section
        })
        .collect()
}

/// Water over a season from hours with their outdoor humidity; states that would dry give nothing and are counted.
pub(super) fn seasons(
    given: &Given,
    leaving: &MoistAir,
    flow: Option<&Flow>,
    outcome: &mut Outcome,
) -> Result<(), Stop> {
    let Some(flow) = flow else { return Ok(()) };
    let count = count(given, BINS, 0, MOST_BINS);
    let (mut total, mut dry, mut any) = (0.0, 0, false);
    for number in 1..=count {
        let hours: Option<Time> = given.quantity(&bin_key(number, "hours"));
        let w: Option<HumidityRatio> = given.quantity(&bin_key(number, "humidity_ratio"));
        let (Some(hours), Some(w)) = (hours, w) else { continue };
        if hours.si() > 8784.0 * 3600.0 {
            let says = Sentence::new("{0} is more than a year has.").with(hours.amount());
            return Err(Refusal::new(bin_key(number, "hours"), "more_than_a_year", says).into());
        }
        any = true;
        let drop = (w.si() - leaving.humidity_ratio().si()).max(0.0);
        if drop <= 0.0 {
            dry += 1;
        }
        let water = Mass::from_si(hours.si() * flow.dry_air.si() * drop);
        total += water.si();
        outcome.push(Figure::new(
            format!("bin_{number}"),
            format!("Outdoor state {number}"),
            water.amount(),
            SEASON,
        ));
    }
    if any {
        outcome.push(Figure::new("season", "All of them", Mass::from_si(total).amount(), SEASON));
        let t = leaving.wet_bulb().ok().map(dewledger_properties::WetBulb::reading);
        let density =
            t.and_then(|t| water::density(t, leaving.pressure()).ok()).map_or(999.5, Quantity::si);
        outcome.push(Figure::new(
            "season_volume",
            "By volume",
            WaterVolume::from_si(total / density).amount(),
            SEASON,
        ));
        if dry > 0 {
            outcome.notes.push(
                Note::remark(
                    "dry_bins",
                    Sentence::new("{w0} of these outdoor states give no water.")
                        .word(dry.to_string()),
                )
                .because(Sentence::new(
                    "Drier air than the coil leaves is not netted against the rest.",
                )),
            );
        }
    }
    Ok(())
}
