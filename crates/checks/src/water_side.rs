//! The water block: a flow of water or glycol with two temperatures, turned into heat.
//!
//! `m = V rho(t at the meter)`, `Q = m (h(t2) - h(t1))`, positive = gained by the water. Water by IAPWS SR6-08 at 0.1 MPa;
//! glycols by Melinder's fits, the heat capacity integrated exactly. A volume flow says where its meter sits: between
//! 180 and 160 °F the density differs by 0.7 %. A strength is by mass, by volume before mixing at 20 °C, or from the
//! freezing point, where inhibitors move it by about 1 K (common practice).

mod fluid;

use std::collections::BTreeMap;

use dewledger_properties::glycol::Glycol;
use dewledger_quantities::{
    Amount, EnthalpyDifference, Kind, MassDensity, Power, Quantity, Ratio, Sentence, Share,
    SpecificHeatCapacity, TemperatureInterval, ThermodynamicTemperature, WaterConstant, WaterFlow,
    WaterMassFlow, difference,
};

pub use fluid::{Fluid, heat};

use crate::doubt::Doubt;
use crate::form::{Choice, ChoiceItem, Item, ReadingItem};
use crate::given::Given;
use crate::outcome::{Missing, Note, Outcome, Step};
use crate::refusal::{Refusal, Stop};

/// Temperatures that the block works with, K.
const RANGE_K: std::ops::RangeInclusive<f64> = 258.15..=371.15;
/// Half-width taken for a temperature where no ± is stated, K.
const NEAR_K: f64 = 0.3;
/// No flow in a pipe is larger, m³/s.
const LARGEST_M3_S: f64 = 5.0;
/// The strengths, by mass, that the fits are made for.
const STRENGTHS: std::ops::RangeInclusive<f64> = 0.0..=0.6;
/// Below this strength by mass the fits are off pure water by 0.1 %.
const WEAK: f64 = 0.05;
/// Two readings that are the same, K.
const SAME_K: f64 = 1e-9;
/// Below this change, K, the pressure drop across a coil shows in it.
const SMALL_K: f64 = 1.0;
/// Above this change, K, a unit or a reading is likely wrong.
const LARGE_K: f64 = 40.0;

/// A water block: the prefix of its keys and its name before "water" in a sentence.
#[derive(Debug, Clone, Copy)]
pub struct WaterSide<'a> {
    /// Prefix of its keys: `evaporator`.
    pub prefix: &'a str,
    /// What stands before a word in a sentence: "evaporator’s ", or nothing.
    pub whose: &'a str,
}

/// A water block read.
#[derive(Debug, Clone)]
pub struct Water {
    /// What flows.
    pub fluid: Fluid,
    /// What the meter shows.
    pub flow: WaterFlow,
    /// Temperature where the meter sits.
    pub meter: ThermodynamicTemperature,
    /// As it enters.
    pub entering: ThermodynamicTemperature,
    /// As it leaves.
    pub leaving: ThermodynamicTemperature,
    /// At the meter.
    pub density: MassDensity,
    /// What passes.
    pub mass_flow: WaterMassFlow,
    /// Leaving less entering.
    pub rise: TemperatureInterval,
    /// Mean between the two temperatures.
    pub heat_capacity: SpecificHeatCapacity,
    /// Gained by the water.
    pub heat: Power,
    /// Heat for each volume flow and step of temperature.
    pub factor: WaterConstant,
    /// Typed in US gallons per minute: decides which book constant stands beside it.
    pub inch_pound: bool,
    /// Remarks.
    pub notes: Vec<Note>,
    /// The working.
    pub steps: Vec<Step>,
}

impl WaterSide<'_> {
    /// A key of this block.
    #[must_use]
    pub fn key(&self, of: &str) -> String {
        format!("{}.{of}", self.prefix)
    }

    /// What is asked.
    #[must_use]
    pub fn items(&self, given: &Given) -> Vec<Item> {
        let mut items: Vec<Item> = vec![
            ReadingItem::wanted(self.key("rate"), "Water flow", Kind::WaterFlow).into(),
            ChoiceItem::new(
                self.key("meter"),
                "The flow meter sits",
                Some("entering"),
                vec![
                    Choice::new("entering", "Where the water enters"),
                    Choice::helped("leaving", "Where it leaves", "Up to 1 % in hot water"),
                ],
            )
            .into(),
            ReadingItem::wanted(self.key("entering"), "Entering", Kind::Temperature)
                .help("One thermometer moved between both wells: what it reads high or low cancels")
                .into(),
            ReadingItem::wanted(self.key("leaving"), "Leaving", Kind::Temperature).into(),
            ChoiceItem::new(
                self.key("fluid"),
                "In the pipe is",
                None,
                vec![
                    Choice::new("water", "Water"),
                    Choice::new("ethylene_glycol", "Ethylene glycol"),
                    Choice::new("propylene_glycol", "Propylene glycol"),
                ],
            )
            .into(),
        ];
        if self.glycol(given).is_some() {
            items.extend(self.strength_items(given));
        }
        items
    }

    fn strength_items(&self, given: &Given) -> Vec<Item> {
        let by = self.key("strength_by");
        let mut items: Vec<Item> = vec![
            ChoiceItem::new(
                by.clone(),
                "Its strength is known",
                None,
                vec![
                    Choice::new("mass", "By mass"),
                    Choice::helped("volume", "By volume", "Before mixing, at 20 °C"),
                    Choice::helped("freezing", "By its freezing point", "As a refractometer shows"),
                ],
            )
            .into(),
        ];
        if let Some((key, label, kind, _)) = given.choice(&by).and_then(|by| self.strength_by(by)) {
            items.push(ReadingItem::wanted(key, label, kind).into());
        }
        items
    }

    /// Key, label, kind and name of a strength known so.
    fn strength_by(&self, by: &str) -> Option<(String, &'static str, Kind, &'static str)> {
        match by {
            "mass" => {
                Some((self.key("mass_share"), "Glycol by mass", Kind::Share, "the glycol’s share"))
            }
            "volume" => Some((
                self.key("volume_share"),
                "Glycol by volume",
                Kind::Share,
                "the glycol’s share",
            )),
            "freezing" => Some((
                self.key("freezing_point"),
                "Freezing point",
                Kind::Temperature,
                "the freezing point",
            )),
            _ => None,
        }
    }

    fn glycol(&self, given: &Given) -> Option<Glycol> {
        match given.choice(&self.key("fluid"))? {
            "ethylene_glycol" => Some(Glycol::Ethylene),
            "propylene_glycol" => Some(Glycol::Propylene),
            _ => None,
        }
    }

    /// Whether anything of it was read.
    #[must_use]
    pub fn begun(&self, given: &Given) -> bool {
        ["rate", "entering", "leaving"].iter().any(|of| given.reading(&self.key(of)).is_some())
    }

    fn missing(&self, given: &Given) -> Vec<Missing> {
        let mut missing = Vec::new();
        let named = |name: &str| format!("the {}{name}", self.whose);
        for (of, name) in [
            ("rate", "water flow"),
            ("entering", "entering water temperature"),
            ("leaving", "leaving water temperature"),
        ] {
            if given.reading(&self.key(of)).is_none() {
                missing.push(Missing::new(self.key(of), named(name)));
            }
        }
        if given.choice(&self.key("fluid")).is_none() {
            let mut fluid = Missing::new(self.key("fluid"), "what is in the pipe");
            fluid.asks = Some(Sentence::new("Is it water, or a glycol?"));
            missing.push(fluid);
        }
        if self.glycol(given).is_some() {
            let by = self.key("strength_by");
            match given.choice(&by).and_then(|by| self.strength_by(by)) {
                None => missing.push(Missing::new(by, "how the glycol’s strength is known")),
                Some((key, _, _, name)) if given.reading(&key).is_none() => {
                    missing.push(Missing::new(key, name));
                }
                Some(_) => {}
            }
        }
        missing
    }

    /// The block as read.
    ///
    /// # Errors
    ///
    /// Waits for what is missing; refuses what cannot be.
    pub fn read(&self, given: &Given) -> Result<Water, Stop> {
        let missing = self.missing(given);
        let (rate, entering, leaving) =
            (self.key("rate"), self.key("entering"), self.key("leaving"));
        let (Some(flow), Some(t1), Some(t2), true) = (
            given.quantity::<WaterFlow>(&rate),
            given.quantity::<ThermodynamicTemperature>(&entering),
            given.quantity::<ThermodynamicTemperature>(&leaving),
            missing.is_empty(),
        ) else {
            return Err(Stop::Waits(missing));
        };
        flows(rate.clone(), flow)?;
        let mut notes = Vec::new();
        let (fluid, strength) = self.fluid(given, &mut notes)?;
        for (key, t) in [(&entering, t1), (&leaving, t2)] {
            in_range(key, t)?;
            liquid(given, key, t, fluid, strength.as_ref(), &mut notes)?;
        }
        if (t2.si() - t1.si()).abs() < SAME_K && !given.is_drawn() {
            return Err(Refusal::new(
                leaving,
                "no_change",
                Sentence::new(
                    "Entering and leaving both read {0}: no load to compute. Is the valve open?",
                )
                .with(t1.amount()),
            )
            .into());
        }
        let meter =
            if given.choice_or(&self.key("meter"), "entering") == "leaving" { t2 } else { t1 };
        let (Some(density), Some(change)) = (fluid.density(meter), fluid.enthalpy_change(t1, t2))
        else {
            return Err(too_cold(entering, t1, fluid, strength.as_ref()).into());
        };
        let rise = difference(t2, t1);
        judge_change(&leaving, rise, &mut notes);
        let mass_flow = WaterMassFlow::from_si(flow.si() * density.si());
        let heat = Power::from_si(mass_flow.si() * change.si());
        let heat_capacity = fluid.mean_heat_capacity(t1, t2).unwrap_or_default();
        let inch_pound = given
            .reading(&rate)
            .and_then(|rate| rate.unit)
            .is_some_and(|unit| unit.id.starts_with("gal"));
        let mut water = Water {
            fluid,
            flow,
            meter,
            entering: t1,
            leaving: t2,
            density,
            mass_flow,
            rise,
            heat_capacity,
            heat,
            factor: WaterConstant::from_si(density.si() * heat_capacity.si()),
            inch_pound,
            notes,
            steps: Vec::new(),
        };
        water.steps = water.working(strength.as_ref(), change);
        Ok(water)
    }

    /// The fluid, and how its strength is said: "20.0 % by volume".
    fn fluid(
        &self,
        given: &Given,
        notes: &mut Vec<Note>,
    ) -> Result<(Fluid, Option<Sentence>), Stop> {
        let Some(glycol) = self.glycol(given) else { return Ok((Fluid::Water, None)) };
        let by = given.choice_or(&self.key("strength_by"), "");
        let Some((key, ..)) = self.strength_by(by) else { return Ok((Fluid::Water, None)) };
        let typed = given.reading(&key).map(|reading| reading.amount);
        let Some(typed) = typed else { return Ok((Fluid::Water, None)) };
        let (strength, said) = strength(glycol, by, typed, &key)?;
        // Without any glycol it is water: the fits are off it by 0.1 %.
        let fluid =
            if strength.si() <= 0.0 { Fluid::Water } else { Fluid::Glycol(glycol, strength) };
        if strength.si() > 0.0 && strength.si() < WEAK {
            notes.push(Note::remark(
                format!("{key}.weak"),
                Sentence::new(
                    "Below 5 % by mass the mixture is worked out up to 0.1 % off plain water.",
                ),
            ));
        }
        if by != "mass" {
            notes.push(
                Note::remark(
                    format!("{key}.inhibitors"),
                    Sentence::new(
                        "Inhibitors move the freezing point by about 1 K: the strength is known to about ± 2 % by volume.",
                    ),
                )
                .because(Sentence::new("A refractometer is calibrated for one maker’s mix.")),
            );
        }
        Ok((fluid, Some(said)))
    }
}

fn flows(key: String, flow: WaterFlow) -> Result<(), Stop> {
    if flow.si() <= 0.0 {
        return Err(Refusal::new(
            key,
            "flow_not_above_zero",
            Sentence::new("A water flow of {0} moves no heat. Is the pump running? Read it again, or leave it blank.")
                .with(flow.amount()),
        )
        .into());
    }
    if flow.si() > LARGEST_M3_S {
        return Err(Refusal::new(
            key,
            "flow_too_large",
            Sentence::new("A water flow of {0} is beyond any pipe of a building. Check its unit.")
                .with(flow.amount()),
        )
        .into());
    }
    Ok(())
}

fn in_range(key: &str, t: ThermodynamicTemperature) -> Result<(), Stop> {
    if RANGE_K.contains(&t.si()) {
        return Ok(());
    }
    Err(Refusal::new(
        key.to_owned(),
        "water_temperature_out_of_range",
        Sentence::new(
            "Water of {0} is outside −15 to 98 °C (5 to 208 °F). Check the number and its unit.",
        )
        .with(t.amount()),
    )
    .into())
}

/// The mass fraction, and the strength in words.
fn strength(glycol: Glycol, by: &str, typed: Amount, key: &str) -> Result<(Ratio, Sentence), Stop> {
    let out_of_range = || {
        let way = if by == "volume" { "by volume" } else { "by mass" };
        Refusal::new(
            key.to_owned(),
            "strength_out_of_range",
            Sentence::new("A strength of {0} {w0} is outside 0 to 60 % by mass, which glycols are worked out for. Check the number and how it counts.")
                .with(typed)
                .word(way),
        )
    };
    let share = Ratio::from_si(typed.si());
    match by {
        "volume" => glycol
            .mass_fraction_from_volume(share)
            .map(|strength| (strength, Sentence::new("at {0} by volume").with(typed)))
            .map_err(|_| out_of_range().into()),
        "freezing" => {
            let freezing: ThermodynamicTemperature = typed.get().unwrap_or_default();
            glycol
                .mass_fraction_from_freezing(freezing)
                .map(|strength| (strength, Sentence::new("by its freezing point")))
                .map_err(|_| {
                    Refusal::new(
                        key.to_owned(),
                        "no_such_freezing_point",
                        Sentence::new("No mixture of this glycol between 5 and 60 % by mass freezes at {0}. Check the number and its unit, or give the strength by mass.")
                            .with(typed),
                    )
                    .into()
                })
        }
        _ if STRENGTHS.contains(&share.si()) => {
            Ok((share, Sentence::new("at {0} by mass").with(typed)))
        }
        _ => Err(out_of_range().into()),
    }
}

fn too_cold(
    key: String,
    t: ThermodynamicTemperature,
    fluid: Fluid,
    strength: Option<&Sentence>,
) -> Refusal {
    let freezing = fluid.freezing().amount();
    let says = match strength {
        Some(strength) => Sentence::new(
            "{s0} this glycol freezes at {0}; the reading {1} is colder. Check the strength, or read again.",
        )
        .nested(strength.clone()),
        None => Sentence::new(
            "Water freezes at {0}; the reading {1} is colder. If there is glycol in it, choose it.",
        ),
    };
    Refusal::new(key, "frozen", says.with(freezing).with(t.amount()))
}

/// Colder than freezing is refused; by no more than its ± it stands, and is said.
fn liquid(
    given: &Given,
    key: &str,
    t: ThermodynamicTemperature,
    fluid: Fluid,
    strength: Option<&Sentence>,
    notes: &mut Vec<Note>,
) -> Result<(), Stop> {
    let below = fluid.freezing().si() - t.si();
    if below <= 0.0 {
        return Ok(());
    }
    let stated = given.reading(key).and_then(|reading| reading.half_width_si);
    let refusal = too_cold(key.to_owned(), t, fluid, strength);
    if below > stated.unwrap_or(NEAR_K) && !given.is_drawn() {
        return Err(refusal.into());
    }
    notes.push(Note::within(
        format!("{key}.at_freezing"),
        key.to_owned(),
        Sentence::new("{0} is below freezing by less than its ±: it is worked out as liquid.")
            .with(t.amount()),
    ));
    Ok(())
}

fn judge_change(key: &str, rise: TemperatureInterval, notes: &mut Vec<Note>) {
    let size = TemperatureInterval::from_si(rise.si().abs()).amount();
    if rise.si().abs() < SMALL_K {
        notes.push(
            Note::unusual(
                format!("{key}.small_change"),
                key.to_owned(),
                Sentence::new("A change of {0} is small: thermometers decide this result.").with(size),
            )
            .because(Sentence::new(
                "Under 1 K the pressure drop counts too: 50 kPa across a coil warms the water by 0.01 K.",
            )),
        );
    } else if rise.si().abs() > LARGE_K {
        notes.push(Note::unusual(
            format!("{key}.large_change"),
            key.to_owned(),
            Sentence::new("A change of {0} is much for a water side. Check both units.").with(size),
        ));
    }
}

impl Water {
    fn working(&self, strength: Option<&Sentence>, change: EnthalpyDifference) -> Vec<Step> {
        let mut steps = Vec::new();
        if let (Fluid::Glycol(_, share), Some(strength)) = (self.fluid, strength) {
            steps.push(Step::new(
                "Strength",
                "x = phi rho_g / (phi rho_g + (1 - phi) rho_w)",
                Sentence::new("{s0}: {0} by mass, freezes at {1}")
                    .nested(strength.clone())
                    .with(Share::from_si(share.si()).amount())
                    .with(self.fluid.freezing().amount()),
                "volumes before mixing at 20 °C; freezing point by Melinder (2010)",
            ));
        }
        steps.push(Step::new(
            "Mass flow",
            "m = V rho",
            Sentence::new("{0} × {1} = {2}, at the meter’s {3}")
                .with(self.flow.amount())
                .with(self.density.amount())
                .with(self.mass_flow.amount())
                .with(self.meter.amount()),
            match self.fluid {
                Fluid::Water => "water by IAPWS SR6-08 at 0.1 MPa",
                Fluid::Glycol(..) => "aqueous glycol by Melinder (2010)",
            },
        ));
        steps.push(Step::new(
            "Heat",
            "Q = m (h(t2) - h(t1))",
            Sentence::new("{0} × {1} = {2}")
                .with(self.mass_flow.amount())
                .with(change.amount())
                .with(self.heat.amount()),
            "the heat capacity integrated between the two temperatures; positive is gained by the water",
        ));
        steps
    }
}

/// Remark where the temperature change is not four times its standard uncertainty.
#[must_use]
pub fn judge_rise(
    outcome: &Outcome,
    doubts: &BTreeMap<String, Doubt>,
    rise: &str,
    heat: &str,
) -> Option<Note> {
    let (change, whole) = (outcome.amount(rise)?, outcome.amount(heat)?);
    let (of_change, of_heat) = (doubts.get(rise)?, doubts.get(heat)?);
    let known = of_change.unknown.is_empty() && of_change.u_si > 0.0;
    if !known || change.si().abs() >= 4.0 * of_change.u_si {
        return None;
    }
    let share = Share::from_si(of_heat.half_width_si? / whole.si().abs());
    Some(
        Note::remark(
            format!("{rise}.in_doubt"),
            Sentence::new("The temperature change is only {0}: the ± is {1} of the heat.")
                .with(TemperatureInterval::from_si(change.si().abs()).amount())
                .with(share.amount()),
        )
        .because(Sentence::new(
            "Read both temperatures with one thermometer moved between the wells.",
        )),
    )
}
