//! What the coil would do with other air and another flow, and what it did before.

use dewledger_properties::MoistAir;
use dewledger_quantities::{
    HumidityRatio, Kind, Quantity, Ratio, Sentence, Share, ThermodynamicTemperature,
};

use super::line::at_flow;
use crate::drawn::{Cell, Table};
use crate::form::{Item, ReadingItem, Section};
use crate::given::Given;
use crate::outcome::{Figure, Note, Outcome, Role, Step};
use crate::pressure;
use crate::refusal::{Refusal, Stop};
use crate::state_block::Point;

const NEW: Point<'static> = Point { prefix: "other", name: "other" };
const FLOW_RATIO: &str = "other.flow_ratio";
const EXPONENT: &str = "other.exponent";
const EARLIER: &str = "earlier.bypass";
const EARLIER_FLOW: &str = "earlier.flow_ratio";
const PREDICTED: &str = "With other air or flow";
const DRIFT: &str = "Against an earlier visit";
/// Finned surfaces (from memory: 0.5 to 0.7).
const ASSUMED_EXPONENT: f64 = 0.6;
/// The band that stands beside every prediction.
const BAND: [f64; 3] = [0.0, 0.6, 0.8];

pub(super) fn sections(given: &Given) -> Vec<Section> {
    let mut items = NEW.items(given);
    for item in &mut items {
        if let Item::Reading(item) = item {
            item.required = false;
        }
    }
    items.push(
        ReadingItem::optional(FLOW_RATIO, "Flow, over today’s", Kind::Ratio)
            .assuming(Ratio::from_si(1.0).amount())
            .help("Of dry-air mass flows; 0.8 is a fifth less")
            .covered()
            .into(),
    );
    items.push(
        ReadingItem::optional(EXPONENT, "Flow exponent of the surface", Kind::Ratio)
            .assuming(Ratio::from_si(ASSUMED_EXPONENT).amount())
            .help("0 does not respond, 0.6 fins, 0.8 smooth ducts; the band is shown")
            .covered()
            .into(),
    );
    vec![
        Section::new("other", "With other air or flow", items).beside("what it would do").seldom(),
        Section::new(
            "earlier",
            "An earlier visit",
            vec![
                ReadingItem::optional(EARLIER, "Bypass factor then", Kind::Share).into(),
                ReadingItem::optional(EARLIER_FLOW, "Today’s mass flow over then’s", Kind::Ratio)
                    .into(),
            ],
        )
        .seldom(),
    ]
}

fn ratio(
    given: &Given,
    key: &'static str,
    assumed: f64,
    range: std::ops::RangeInclusive<f64>,
) -> Result<Ratio, Stop> {
    let ratio: Ratio = given.quantity(key).unwrap_or_else(|| Ratio::from_si(assumed));
    if range.contains(&ratio.si()) || given.is_drawn() {
        return Ok(ratio);
    }
    Err(Refusal::new(
        key,
        "ratio_out_of_range",
        Sentence::new("{0} is outside {1} to {2}. Check the number.")
            .with(ratio.amount())
            .with(Ratio::from_si(*range.start()).amount())
            .with(Ratio::from_si(*range.end()).amount()),
    )
    .into())
}

/// Leaving air from another state and flow, with the same surface.
fn leaving(
    new: &MoistAir,
    surface: &MoistAir,
    bypass: Ratio,
) -> (ThermodynamicTemperature, HumidityRatio, bool) {
    let part = |of: fn(&MoistAir) -> f64| of(surface) + bypass.si() * (of(new) - of(surface));
    let dry = new.humidity_ratio().si() <= surface.humidity_ratio().si();
    let w = if dry { new.humidity_ratio().si() } else { part(|air| air.humidity_ratio().si()) };
    (
        ThermodynamicTemperature::from_si(part(|air| air.dry_bulb().si())),
        HumidityRatio::from_si(w),
        dry,
    )
}

pub(super) fn predict(
    given: &Given,
    entering: &MoistAir,
    surface: &MoistAir,
    bypass: Ratio,
    outcome: &mut Outcome,
) -> Result<(), Stop> {
    let here = pressure::here(given)?.pressure;
    let asked = given.reading(&NEW.key("dry_bulb")).is_some();
    if !asked && given.reading(FLOW_RATIO).is_none() {
        return Ok(());
    }
    let new = match NEW.read(given, here) {
        Ok(read) => {
            outcome.notes.extend(read.notes);
            read.air
        }
        Err(Stop::Waits(missing)) if asked => {
            outcome.waits.extend(missing);
            return Ok(());
        }
        // Only the flow changes.
        Err(Stop::Waits(_)) => *entering,
        Err(refused) => return Err(refused),
    };
    let flow = ratio(given, FLOW_RATIO, 1.0, 0.5..=1.5)?;
    let exponent = ratio(given, EXPONENT, ASSUMED_EXPONENT, 0.0..=1.0)?;
    let then = at_flow(bypass, flow, exponent);
    let (t, w, dry) = leaving(&new, surface, then);
    let figure = |key, label, amount| Figure::new(key, label, amount, PREDICTED);
    outcome.push(
        figure("predicted_dry_bulb", "Leaving dry bulb", t.amount())
            .on_condition(Sentence::new("an approximation: the same surface")),
    );
    outcome.push(figure("predicted_humidity_ratio", "Leaving humidity ratio", w.amount()));
    outcome.push(figure("predicted_bypass", "Bypass factor", Share::from_si(then.si()).amount()));
    if dry {
        outcome.notes.push(Note::remark(
            "would_run_dry",
            Sentence::new("With that air the coil would run dry."),
        ));
    }
    outcome.tables.push(band(&new, surface, bypass, flow));
    outcome.steps.push(Step::new(
        "Other air, other flow",
        "BF' = exp(ln BF (m'/m)^(n-1)),  T2' = T_adp + BF' (T1' - T_adp)",
        Sentence::new("flow {0}, n = {1}: BF' = {2}, T2' = {3}")
            .with(flow.amount())
            .with(exponent.amount())
            .with(Share::from_si(then.si()).amount())
            .with(t.amount()),
        "the same surface temperature; conductance as the flow to the power n",
    ));
    doubtful(given, entering, &new, surface, flow, outcome);
    Ok(())
}

fn band(new: &MoistAir, surface: &MoistAir, bypass: Ratio, flow: Ratio) -> Table {
    let row = |exponent: f64| {
        let exponent = Ratio::from_si(exponent);
        let then = at_flow(bypass, flow, exponent);
        let (t, w, _) = leaving(new, surface, then);
        vec![
            Cell::Amount(exponent.amount()),
            Cell::Amount(Share::from_si(then.si()).amount()),
            Cell::Amount(t.amount()),
            Cell::Amount(w.amount()),
        ]
    };
    Table {
        title: "Over what the surface may do".into(),
        columns: vec![
            "Exponent".into(),
            "Bypass factor".into(),
            "Leaving dry bulb".into(),
            "Leaving humidity ratio".into(),
        ],
        rows: BAND.into_iter().map(row).collect(),
    }
}

/// A prediction far from today is hardly one.
fn doubtful(
    given: &Given,
    entering: &MoistAir,
    new: &MoistAir,
    surface: &MoistAir,
    flow: Ratio,
    outcome: &mut Outcome,
) {
    let far = (new.dry_bulb().si() - entering.dry_bulb().si()).abs() > 6.0;
    let other_flow = !(0.7..=1.3).contains(&flow.si());
    if (far || other_flow) && !given.is_drawn() {
        outcome.notes.push(
            Note::unusual(
                "far_prediction",
                if far { NEW.key("dry_bulb") } else { FLOW_RATIO.to_owned() },
                Sentence::new(
                    "That is far from today’s air or flow: the surface would shift with the load.",
                ),
            )
            .because(Sentence::new("Take it as a direction, not as a figure.")),
        );
    }
    let steep = (new.humidity_ratio().si() - surface.humidity_ratio().si())
        / (new.dry_bulb().si() - surface.dry_bulb().si());
    let then = MoistAir::saturated(
        ThermodynamicTemperature::from_si(surface.dry_bulb().si() + 0.01),
        surface.pressure(),
    );
    if let Ok(then) = then {
        let saturation = (then.humidity_ratio().si() - surface.humidity_ratio().si()) / 0.01;
        if steep > saturation {
            outcome.notes.push(Note::unusual(
                "cannot_hold",
                NEW.key("dry_bulb"),
                Sentence::new("From that air the line is steeper than saturation: the coil cannot hold this apparatus dew point."),
            ));
        }
    }
}

/// Against an earlier bypass factor: what the surface does, at the flow of then.
pub(super) fn earlier(given: &Given, outcome: &mut Outcome) -> Result<(), Stop> {
    let (Some(then), Some(bypass)) = (given.quantity::<Share>(EARLIER), outcome.amount("bypass"))
    else {
        return Ok(());
    };
    if !(0.001..1.0).contains(&then.si()) && !given.is_drawn() {
        return Err(Refusal::new(
            EARLIER,
            "earlier_out_of_range",
            Sentence::new(
                "A bypass factor of {0} is not between 0 and 100 %. Check the number and its unit.",
            )
            .with(then.amount()),
        )
        .into());
    }
    if given.reading(EARLIER_FLOW).is_none() {
        outcome
            .waits
            .push(crate::outcome::Missing::new(EARLIER_FLOW, "today’s mass flow over then’s"));
        return Ok(());
    }
    let flow = ratio(given, EARLIER_FLOW, 1.0, 0.3..=3.0)?;
    let exponent = ratio(given, EXPONENT, ASSUMED_EXPONENT, 0.0..=1.0)?;
    // NTU goes as m^(n-1): brought back to the flow of then.
    let today = -bypass.si().max(1e-12).ln() * flow.si().powf(1.0 - exponent.si());
    let drift = Ratio::from_si(today / -then.si().ln());
    outcome.push(
        Figure::new("drift", "What the surface does, over then", drift.amount(), DRIFT)
            .on_condition(Sentence::new("transfer units at the flow of then")),
    );
    outcome.push(
        Figure::new(
            "bypass_at_that_flow",
            "Today’s bypass factor at the flow of then",
            Share::from_si((-today).exp()).amount(),
            DRIFT,
        )
        .role(Role::Detail),
    );
    outcome.steps.push(Step::new(
        "Against then",
        "-ln BF (m/m_then)^(1-n) / -ln BF_then",
        Sentence::new("{0}").with(drift.amount()),
        "transfer units, not bypass factors: those move with the flow",
    ));
    Ok(())
}
