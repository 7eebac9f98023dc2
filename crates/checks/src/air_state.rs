//! Air state: what air is this, at this building's pressure?
//!
//! Every humidity goes to the humidity ratio first; enthalpy, volume, wet bulb, dew point and relative humidity
//! follow from it. Real-gas moist air (ASHRAE RP-1485; see `dewledger-properties`). Below 0.01 °C relative
//! humidity and dew point are over liquid water; over ice and frost point stand beside them.

use dewledger_properties::MoistAir;
use dewledger_quantities::{Pressure, Quantity, Sentence, Share};

use crate::check::{About, Check, Group};
use crate::form::{Mark, Section};
use crate::given::Given;
use crate::outcome::{Caution, Figure, Outcome, Role, StatePoint, Step};
use crate::pressure;
use crate::refusal::Stop;
use crate::state_block::Point;

/// The check.
pub struct AirState;

const ABOUT: About = About {
    id: "air_state",
    label: "Air state",
    question: "What air is this, at this building’s pressure?",
    takes: "a dry bulb and one humidity",
    group: Group::Air,
};

const POINT: Point<'static> = Point { prefix: "air", name: "read" };
const RESULTS: &str = "Results";

/// Standard pressure at sea level, for what a sea-level chart would have said.
const SEA_LEVEL_PA: f64 = 101_325.0;
/// Below this pressure the sea-level figure differs enough to be worth a line (about 300 m).
const WORTH_SAYING_BELOW_PA: f64 = 97_800.0;

const CAUTIONS: &[Caution] = &[Caution {
    title: "At the air handler",
    says: "Fans, belts and dampers start by themselves, and doors on the pressure side fly open. Isolate and lock \
           before reaching in. Local rules, the maker’s instructions and licensed people come first.",
}];

impl Check for AirState {
    fn about(&self) -> &'static About {
        &ABOUT
    }

    fn form(&self, given: &Given) -> Vec<Section> {
        vec![
            pressure::section(given),
            Section::new("air", "The air", POINT.items(given)).marked(Mark::ENTERING),
        ]
    }

    fn solve(&self, given: &Given) -> Result<Outcome, Stop> {
        let (here, read) = pressure::with(given, |here| POINT.read(given, here))?;
        let mut outcome = Outcome { cautions: CAUTIONS, ..Outcome::default() };
        results(&read.air, read.by, &mut outcome);
        if here.pressure.si() < WORTH_SAYING_BELOW_PA
            && let Ok(sea) = POINT.read(given, Pressure::from_si(SEA_LEVEL_PA))
        {
            sea_level(&read.air, &sea.air, &mut outcome);
        }
        outcome.steps = steps(&read.air, read.by, &here.source);
        outcome.notes.extend(here.notes);
        outcome.notes.extend(read.notes);
        if read.saturated {
            outcome.saturated.push("air".to_owned());
        }
        outcome.states.push(StatePoint {
            key: "air".into(),
            label: "The air".into(),
            mark: Some(Mark::ENTERING),
            air: read.air,
        });
        outcome.pressure =
            Some(Sentence::new("{0}, {s0}").with(here.pressure.amount()).nested(here.source));
        Ok(outcome)
    }
}

/// The properties of a state as results.
fn results(air: &MoistAir, by: &str, outcome: &mut Outcome) {
    let figure = |key, label, amount| Figure::new(key, label, amount, RESULTS);
    outcome.push(
        figure("humidity_ratio", "Humidity ratio", air.humidity_ratio().amount())
            .role(Role::Headline),
    );
    outcome.push(figure("enthalpy", "Enthalpy", air.enthalpy().amount()).role(Role::Minor));
    let frost = air.dry_bulb().si() < 273.16;
    let mut rh = figure("relative_humidity", "Relative humidity", air.relative_humidity().amount());
    if frost {
        rh = rh.on_condition(Sentence::new("over liquid water"));
    }
    outcome.push(rh.role(if by == "relative_humidity" { Role::Plain } else { Role::Minor }));
    if frost {
        let over_ice = air.relative_humidity_over_ice().amount();
        outcome.push(figure("relative_humidity_over_ice", "Relative humidity over ice", over_ice));
    }
    if let Ok(wet_bulb) = air.wet_bulb() {
        let reading = figure("wet_bulb", "Wet bulb", wet_bulb.reading().amount());
        outcome.push(match (wet_bulb.liquid, wet_bulb.ice) {
            (Some(_), Some(_)) => reading.on_condition(Sentence::new("with a wet wick")),
            (None, Some(_)) => reading.on_condition(Sentence::new("the wick is iced")),
            _ => reading,
        });
        if let (Some(_), Some(ice)) = (wet_bulb.liquid, wet_bulb.ice) {
            let iced = figure("wet_bulb_iced", "Wet bulb, iced wick", ice.amount());
            outcome
                .push(iced.on_condition(Sentence::new("near freezing the wick can show either")));
        }
    }
    match air.dew_point() {
        Ok(dew) => {
            let dew_point = figure("dew_point", "Dew point", dew.amount());
            let below = dew.si() < 273.16;
            outcome.push(
                if below {
                    dew_point.on_condition(Sentence::new("over liquid water"))
                } else {
                    dew_point
                }
                .role(if by == "dew_point" { Role::Plain } else { Role::Minor }),
            );
            if below && let Ok(frost_point) = air.frost_point() {
                outcome.push(figure("frost_point", "Frost point", frost_point.amount()));
            }
        }
        Err(_) => outcome.push(Figure::withheld(
            "dew_point",
            "Dew point",
            Sentence::new("below what this app works out: the air is nearly dry"),
            RESULTS,
        )),
    }
    outcome.push(figure("specific_volume", "Specific volume", air.specific_volume().amount()));
    outcome.push(figure("density", "Density of the moist air", air.density().amount()));
    outcome.push(
        figure("vapour_pressure", "Vapour pressure", air.vapour_pressure().amount())
            .role(Role::Detail),
    );
    outcome.push(
        figure("degree_of_saturation", "Degree of saturation", air.degree_of_saturation().amount())
            .on_condition(Sentence::new("humidity ratio over that of saturated air"))
            .role(Role::Detail),
    );
    outcome.push(
        figure("specific_heat", "Specific heat", air.heat_capacity().amount()).role(Role::Detail),
    );
    outcome.push(
        figure("pressure", "Pressure of this air", air.pressure().amount()).role(Role::Detail),
    );
}

/// What the same readings say on a chart made for sea level.
fn sea_level(here: &MoistAir, sea: &MoistAir, outcome: &mut Outcome) {
    let error = |sea: f64, here: f64| Share::from_si(sea / here - 1.0).amount();
    let off =
        Sentence::new("{0} off").with(error(sea.humidity_ratio().si(), here.humidity_ratio().si()));
    outcome.push(
        Figure::new(
            "humidity_ratio_at_sea_level",
            "Humidity ratio, had sea level been assumed",
            sea.humidity_ratio().amount(),
            "A sea-level chart would say",
        )
        .on_condition(off),
    );
    outcome.push(Figure::new(
        "enthalpy_at_sea_level",
        "Enthalpy, had sea level been assumed",
        sea.enthalpy().amount(),
        "A sea-level chart would say",
    ));
}

fn steps(air: &MoistAir, by: &str, source: &Sentence) -> Vec<Step> {
    let (w, h, v) = (air.humidity_ratio(), air.enthalpy(), air.specific_volume());
    let route = match by {
        "wet_bulb" => {
            "energy balance at the wick: h + (W_s(t_wb) - W) h_w = h_s(t_wb), solved for W"
        }
        "relative_humidity" => "W = 0.621945 x / (1 - x), x = phi f p_ws / p over liquid water",
        "relative_humidity_over_ice" => {
            "W = 0.621945 x / (1 - x), x = phi f p_ws / p over ice below 0.01 °C"
        }
        "dew_point" => "x = f p_ws(t_dp) / p over liquid water",
        "frost_point" => "x = f p_ws(t_fp) / p over ice",
        "enthalpy" => "h(t, p, W) = h, solved for W",
        _ => "W as read",
    };
    vec![
        Step::new(
            "Pressure here",
            "p",
            Sentence::new("{0}: {s0}").with(air.pressure().amount()).nested(source.clone()),
            "ISO 2533 standard atmosphere where it comes from elevation",
        ),
        Step::new(
            "Humidity ratio",
            route,
            Sentence::new("W = {0} at {1}").with(w.amount()).with(air.dry_bulb().amount()),
            "real-gas moist air, ASHRAE RP-1485; kg of water per kg of dry air",
        ),
        Step::new(
            "Enthalpy and volume",
            "h(t, p, W), v(t, p, W)",
            Sentence::new("h = {0}, v = {1}").with(h.amount()).with(v.amount()),
            "per mass of dry air; zero at dry air of 0 °C (SI) or 0 °F (IP)",
        ),
    ]
}
