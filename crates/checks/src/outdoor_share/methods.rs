//! The ways to a share, each from what was read for it.

use dewledger_properties::MoistAir;
use dewledger_quantities::{
    Amount, EnthalpyDifference, HumidityRatio, HumidityRatioDifference, Kind, Pressure, Quantity,
    Sentence, Share, TemperatureInterval, ThermodynamicTemperature,
};

use super::{CO2, CO2_BASIS, OUTDOOR_FLOW, POINTS, SUPPLY_FLOW};
use crate::given::Given;
use crate::outcome::Missing;
use crate::refusal::{Refusal, Stop};
use crate::state_block::Read;

/// Molar mass of water over that of dry air (ASHRAE RP-1485).
const EPSILON: f64 = 0.621_945;

/// A way to a share.
#[derive(Debug)]
pub(super) struct MethodKind {
    pub(super) key: &'static str,
    pub(super) label: &'static str,
    /// Within a sentence: "by temperature".
    pub(super) name: &'static str,
    /// Key of the difference that it divides by.
    pub(super) difference: &'static str,
    /// That difference without any stated ±, below which it is withheld (field practice), in SI.
    pub(super) least: Option<f64>,
    /// Made of the same readings as others: shown, not combined.
    pub(super) derived: bool,
    pub(super) formula: &'static str,
}

pub(super) static ALL: [&MethodKind; 5] =
    [&TEMPERATURE, &MOISTURE, &CARBON_DIOXIDE, &FLOW, &ENTHALPY];

static TEMPERATURE: MethodKind = MethodKind {
    key: "temperature",
    label: "By temperature",
    name: "temperature",
    difference: "delta_t",
    least: Some(6.0),
    derived: false,
    formula: "h(t_m, W_r + x (W_o - W_r)) = h_r + x (h_o - h_r)",
};
static MOISTURE: MethodKind = MethodKind {
    key: "moisture",
    label: "By moisture",
    name: "moisture",
    difference: "delta_w",
    least: Some(0.0015),
    derived: false,
    formula: "x = (W_m - W_r) / (W_o - W_r)",
};
static CARBON_DIOXIDE: MethodKind = MethodKind {
    key: "carbon_dioxide",
    label: "By CO2",
    name: "CO2",
    difference: "delta_co2",
    least: Some(200e-6),
    derived: false,
    formula: "x = (y_m - y_r) / (y_o - y_r),  y = c (1 + W/0.622)",
};
static FLOW: MethodKind = MethodKind {
    key: "by_flow",
    label: "By flow",
    name: "flow",
    difference: "none",
    least: None,
    derived: false,
    formula: "x = m_o / m_supply",
};
static ENTHALPY: MethodKind = MethodKind {
    key: "enthalpy",
    label: "By enthalpy",
    name: "enthalpy",
    difference: "delta_h",
    least: Some(6000.0),
    derived: true,
    formula: "x = (h_m - h_r) / (h_o - h_r)",
};

/// A share by one way.
#[derive(Debug, Clone)]
pub(super) struct Method {
    pub(super) kind: &'static MethodKind,
    pub(super) share: Share,
}

/// One of the three points: its dry bulb, its whole state where a humidity was read, its CO2.
pub(super) struct Corner {
    pub(super) dry_bulb: Option<ThermodynamicTemperature>,
    pub(super) read: Option<Read>,
    co2: Option<f64>,
}

/// Return, outdoor, mixed.
pub(super) struct Corners {
    pub(super) points: [Corner; 3],
}

impl Corners {
    pub(super) fn read(given: &Given, here: Pressure) -> Result<Self, Stop> {
        let mut points = Vec::with_capacity(3);
        for ((point, ..), key) in POINTS.into_iter().zip(CO2) {
            let read = match point.read(given, here) {
                Ok(read) => Some(read),
                Err(Stop::Waits(_)) => None,
                Err(refused) => return Err(refused),
            };
            let co2 = given.reading(key).map(|reading| reading.amount.si());
            if let Some(co2) = co2
                && !(300e-6..=0.01).contains(&co2)
                && !given.is_drawn()
            {
                return Err(Refusal::new(
                    key,
                    "co2_out_of_range",
                    Sentence::new("CO2 of {0} is outside 300 to 10 000 ppm. Is it in per cent? 0.04 % is 400 ppm.")
                        .with(Amount::new(Kind::MoleFraction, co2)),
                )
                .into());
            }
            points.push(Corner { dry_bulb: given.quantity(&point.key("dry_bulb")), read, co2 });
        }
        let points: [Corner; 3] =
            points.try_into().map_err(|_| Stop::waits("return.dry_bulb", "the return dry bulb"))?;
        Ok(Self { points })
    }

    /// The whole state at a point.
    pub(super) fn state(&self, index: usize) -> Option<&MoistAir> {
        self.points[index].read.as_ref().map(|read| &read.air)
    }

    /// What would make the first way complete.
    pub(super) fn missing(&self, given: &Given) -> Vec<Missing> {
        POINTS
            .iter()
            .filter(|(point, ..)| given.reading(&point.key("dry_bulb")).is_none())
            .map(|(point, ..)| {
                Missing::new(point.key("dry_bulb"), format!("the {} dry bulb", point.name))
            })
            .collect()
    }
}

/// Every way that is complete, in the order of [`ALL`].
pub(super) fn methods(
    given: &Given,
    here: Pressure,
    corners: &Corners,
) -> Result<Vec<Method>, Stop> {
    let mut found = Vec::new();
    let mut push = |kind: &'static MethodKind, share: Option<f64>| {
        if let Some(share) = share.filter(|share| share.is_finite()) {
            found.push(Method { kind, share: Share::from_si(share) });
        }
    };
    let states =
        corners.state(0).zip(corners.state(1)).zip(corners.state(2)).map(|((r, o), m)| (r, o, m));
    push(&TEMPERATURE, by_temperature(corners));
    push(&MOISTURE, states.map(|(r, o, m)| part(r, o, m, |air| air.humidity_ratio().si())));
    push(&CARBON_DIOXIDE, by_carbon_dioxide(given, corners));
    push(&FLOW, by_flow(given, here, corners)?);
    push(&ENTHALPY, states.map(|(r, o, m)| part(r, o, m, |air| air.enthalpy().si())));
    Ok(found)
}

fn part(r: &MoistAir, o: &MoistAir, m: &MoistAir, of: impl Fn(&MoistAir) -> f64) -> f64 {
    (of(m) - of(r)) / (of(o) - of(r))
}

/// By temperature: exact with the humidities of both streams, plain without.
fn by_temperature(corners: &Corners) -> Option<f64> {
    let t = |index: usize| corners.points[index].dry_bulb.map(Quantity::si);
    let (t_r, t_o, t_m) = (t(0)?, t(1)?, t(2)?);
    let plain = (t_m - t_r) / (t_o - t_r);
    let (Some(back), Some(outdoor)) = (corners.state(0), corners.state(1)) else {
        return Some(plain);
    };
    let at = |x: f64| {
        let mix = |of: &dyn Fn(&MoistAir) -> f64| of(back) + x * (of(outdoor) - of(back));
        let w = HumidityRatio::from_si(mix(&|air| air.humidity_ratio().si()));
        let air = MoistAir::unchecked(ThermodynamicTemperature::from_si(t_m), w, back.pressure());
        air.enthalpy().si() - mix(&|air| air.enthalpy().si())
    };
    // Nearly linear: the secant from the plain share and a neighbour ends in a few steps.
    let (mut one, mut other) = (plain, plain + 0.01);
    let (mut f_one, mut f_other) = (at(one), at(other));
    for _ in 0..20 {
        if (f_other - f_one).abs() < f64::EPSILON {
            break;
        }
        let next = other - f_other * (other - one) / (f_other - f_one);
        if !next.is_finite() {
            return None;
        }
        (one, f_one) = (other, f_other);
        (other, f_other) = (next, at(next));
        if (other - one).abs() < 1e-13 {
            break;
        }
    }
    Some(other)
}

/// CO2 per dry air where the humidity is known, per moist air where it is not.
fn per_dry_air(corners: &Corners, given: &Given) -> Option<[f64; 3]> {
    let humid = (0..3).all(|index| corners.state(index).is_some());
    let y = |index: usize| {
        let c = corners.points[index].co2?;
        let moved = if index == 2 { given.shift(CO2_BASIS) } else { 0.0 };
        let w = if humid { corners.state(index)?.humidity_ratio().si() } else { 0.0 };
        Some((c + moved) * (1.0 + w / EPSILON))
    };
    Some([y(0)?, y(1)?, y(2)?])
}

fn by_carbon_dioxide(given: &Given, corners: &Corners) -> Option<f64> {
    let [r, o, m] = per_dry_air(corners, given)?;
    Some((m - r) / (o - r))
}

fn by_flow(given: &Given, here: Pressure, corners: &Corners) -> Result<Option<f64>, Stop> {
    let (Some(outdoor), Some(mixed)) = (corners.state(1), corners.state(2)) else {
        return Ok(None);
    };
    let supply = SUPPLY_FLOW.read(given, here, &[("actual_mixed", mixed)])?;
    let intake = OUTDOOR_FLOW.read(given, here, &[("actual_outdoor", outdoor)])?;
    Ok(match (supply, intake) {
        (Ok(supply), Ok(intake)) => Some(intake.dry_air.si() / supply.dry_air.si()),
        _ => None,
    })
}

type Difference = (&'static str, &'static str, Amount);

/// Outdoor less return in everything that was read at both.
pub(super) fn differences(corners: &Corners, given: &Given) -> Vec<Difference> {
    let mut all: Vec<Difference> = Vec::new();
    let t = |index: usize| corners.points[index].dry_bulb.map(Quantity::si);
    if let (Some(r), Some(o)) = (t(0), t(1)) {
        all.push(("delta_t", "In dry bulb", TemperatureInterval::from_si(o - r).amount()));
    }
    if let (Some(r), Some(o)) = (corners.state(0), corners.state(1)) {
        let w = o.humidity_ratio().si() - r.humidity_ratio().si();
        let h = o.enthalpy().si() - r.enthalpy().si();
        all.push(("delta_w", "In humidity ratio", HumidityRatioDifference::from_si(w).amount()));
        all.push(("delta_h", "In enthalpy", EnthalpyDifference::from_si(h).amount()));
    }
    if let Some([r, o, _]) = per_dry_air(corners, given) {
        all.push(("delta_co2", "In CO2", Amount::new(Kind::MoleFraction, o - r)));
    }
    all
}
