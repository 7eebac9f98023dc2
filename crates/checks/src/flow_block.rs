//! The flow block: an air flow with what it is, turned into a mass flow of dry air.
//!
//! A volume flow without its state is no flow: the same 10 000 cfm can mean 68, 72 or 86 kW. *Actual* flow is
//! divided by the specific volume where it passed. *Standard* flow is a mass flow in disguise, `m = V rho`, and
//! has no correction for altitude or temperature; its density counts dry air unless said otherwise.

use dewledger_properties::MoistAir;
use dewledger_quantities::{
    AirFlow, DryAirFlow, Kind, MassDensity, Pressure, Quantity, Sentence, SpecificVolume,
    StandardAirFlow,
};

use crate::form::{Choice, ChoiceItem, Item, ReadingItem};
use crate::given::Given;
use crate::outcome::{Missing, Step};
use crate::refusal::{Refusal, Stop};
use crate::state_block::Point;

/// Dry-air density of 0.075 lb/ft³, the standard of flows typed in inch-pound units, kg/m³.
pub const STANDARD_DENSITY_IP: f64 = 0.075 * 0.453_592_37 / 0.028_316_846_592;
/// Standard density of flows typed in SI units, kg/m³.
pub const STANDARD_DENSITY_SI: f64 = 1.2;
/// No air flow is larger, m³/s.
const LARGEST_M3_S: f64 = 1000.0;

/// A flow block: its prefix and the places where its flow may be actual.
#[derive(Debug, Clone, Copy)]
pub struct FlowBlock<'a> {
    /// Prefix of its keys: `flow`.
    pub prefix: &'a str,
    /// Places of the check at which the flow may have passed: value of the choice, label.
    pub places: &'a [(&'static str, &'static str)],
    /// Whether a plane of its own can be said, with a state block `plane`.
    pub plane: bool,
}

/// What a flow was read as.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Basis {
    /// What passed there, at this specific volume.
    Actual(SpecificVolume),
    /// Standard air of this density.
    Standard(MassDensity),
    /// Dry air by mass.
    DryAir,
}

/// A flow read.
#[derive(Debug, Clone)]
pub struct Flow {
    /// Dry air that passes.
    pub dry_air: DryAirFlow,
    /// What was read.
    pub basis: Basis,
    /// Typed in inch-pound units: decides which book constants stand beside it.
    pub inch_pound: bool,
    /// The working.
    pub step: Step,
}

impl FlowBlock<'_> {
    fn key(&self, of: &str) -> String {
        format!("{}.{of}", self.prefix)
    }

    /// The key of the number itself.
    #[must_use]
    pub fn rate_key(&self, given: &Given) -> String {
        if given.choice(&self.key("basis")) == Some("dry_air") {
            self.key("dry_air")
        } else {
            self.key("rate")
        }
    }

    /// The measuring plane as a point of its own.
    #[must_use]
    pub fn plane_point(&self) -> Point<'static> {
        Point { prefix: "plane", name: "measuring plane’s" }
    }

    /// Whether the flow is actual at a plane of its own.
    #[must_use]
    pub fn at_plane(&self, given: &Given) -> bool {
        given.choice(&self.key("basis")) == Some("actual_at_plane")
    }

    /// What is asked.
    #[must_use]
    pub fn items(&self, given: &Given, required: bool) -> Vec<Item> {
        let mut options: Vec<Choice> = self
            .places
            .iter()
            .map(|(value, label)| {
                Choice::helped(value, *label, "What passed there, at its own density")
            })
            .collect();
        if self.plane {
            options.push(Choice::helped(
                "actual_at_plane",
                "Actual, at another plane",
                "With its own air state",
            ));
        }
        options.push(Choice::helped(
            "standard",
            "Standard air",
            "A flow at a standard density: a mass flow in disguise",
        ));
        options.push(Choice::new("dry_air", "Dry air by mass"));
        let basis = given.choice(&self.key("basis"));
        let (kind, label) = match basis {
            Some("standard") => (Kind::StandardAirFlow, "Standard flow"),
            Some("dry_air") => (Kind::DryAirFlow, "Dry-air mass flow"),
            _ => (Kind::AirFlow, "Volume flow"),
        };
        let mut rate = ReadingItem::wanted(self.rate_key(given), label, kind);
        rate.required = required;
        let mut items = vec![
            rate.into(),
            ChoiceItem::new(self.key("basis"), "The flow is", None, options).into(),
        ];
        if basis == Some("standard") {
            items.push(
                ReadingItem::optional(self.key("standard_density"), "Standard density", Kind::Density)
                    .assuming(self.default_density(given).amount())
                    .help("Some instruments take 0, 20, 21.1 or 25 °C as standard, up to 9 % apart: see its papers")
                    .covered()
                    .into(),
            );
            items.push(
                ChoiceItem::new(
                    self.key("density_counts"),
                    "The density counts",
                    Some("dry_air"),
                    vec![
                        Choice::new("dry_air", "Dry air"),
                        Choice::helped(
                            "moist_air",
                            "Moist air",
                            "Thermal and other mass-flow instruments",
                        ),
                    ],
                )
                .into(),
            );
        }
        items
    }

    fn default_density(&self, given: &Given) -> MassDensity {
        let inch_pound = self.inch_pound(given);
        MassDensity::from_si(if inch_pound { STANDARD_DENSITY_IP } else { STANDARD_DENSITY_SI })
    }

    fn inch_pound(&self, given: &Given) -> bool {
        let unit = given.reading(&self.rate_key(given)).and_then(|reading| reading.unit);
        unit.is_some_and(|unit| matches!(unit.id, "cfm" | "ft3/min" | "lb/h"))
    }

    /// The flow; none while it is not read, with what is missing.
    ///
    /// # Errors
    ///
    /// Refuses a flow that cannot be; waits for the state of a plane of its own.
    pub fn read(
        &self,
        given: &Given,
        here: Pressure,
        states: &[(&str, &MoistAir)],
    ) -> Result<Result<Flow, Missing>, Stop> {
        let rate_key = self.rate_key(given);
        let Some(rate) = given.reading(&rate_key).copied() else {
            return Ok(Err(Missing::new(rate_key, "the air flow")));
        };
        let value = rate.amount.si();
        if value <= 0.0 {
            return Err(Refusal::new(
                rate_key,
                "flow_not_above_zero",
                Sentence::new(
                    "An air flow of {0} moves no heat. Read it again, or leave it blank.",
                )
                .with(rate.amount),
            )
            .into());
        }
        if value > LARGEST_M3_S {
            return Err(Refusal::new(
                rate_key,
                "flow_too_large",
                Sentence::new("An air flow of {0} is beyond any air handler. Check its unit: cfm typed as m³/s looks like this.")
                    .with(rate.amount),
            )
            .into());
        }
        let basis_key = self.key("basis");
        let Some(basis) = given.choice(&basis_key) else {
            let mut missing = Missing::new(basis_key, "what the flow is");
            missing.asks = Some(
                Sentence::new("Is {0} what passed there (actual), or standard air?")
                    .with(rate.amount),
            );
            return Ok(Err(missing));
        };
        let inch_pound = self.inch_pound(given);
        let (dry_air, basis, step) = match basis {
            "dry_air" => self.by_mass(rate.amount.get().unwrap_or(DryAirFlow::from_si(value))),
            "standard" => self.standard(given, StandardAirFlow::from_si(value), states)?,
            "actual_at_plane" => {
                let plane = self.plane_point().read(given, here)?;
                actual(AirFlow::from_si(value), &plane.air)
            }
            place => {
                let Some((_, air)) = states.iter().find(|(name, _)| *name == place) else {
                    return Ok(Err(Missing::new(basis_key, "what the flow is")));
                };
                actual(AirFlow::from_si(value), air)
            }
        };
        Ok(Ok(Flow { dry_air, basis, inch_pound, step }))
    }

    /// What the flow is read as, whether or not it was read; none while it is not said.
    #[must_use]
    pub fn basis(
        &self,
        given: &Given,
        entering: &MoistAir,
        leaving: &MoistAir,
        plane: Option<&MoistAir>,
    ) -> Option<Basis> {
        match given.choice(&self.key("basis"))? {
            "standard" => {
                let density = given.quantity(&self.key("standard_density"));
                Some(Basis::Standard(density.unwrap_or_else(|| self.default_density(given))))
            }
            "dry_air" => Some(Basis::DryAir),
            "actual_at_plane" => Some(Basis::Actual(plane?.specific_volume())),
            "actual_leaving" => Some(Basis::Actual(leaving.specific_volume())),
            _ => Some(Basis::Actual(entering.specific_volume())),
        }
    }

    fn by_mass(&self, dry_air: DryAirFlow) -> (DryAirFlow, Basis, Step) {
        let numbers = Sentence::new("m = {0}, as read").with(dry_air.amount());
        (
            dry_air,
            Basis::DryAir,
            Step::new("Dry-air mass flow", "m", numbers, "read as a mass flow of dry air"),
        )
    }

    fn standard(
        &self,
        given: &Given,
        flow: StandardAirFlow,
        states: &[(&str, &MoistAir)],
    ) -> Result<(DryAirFlow, Basis, Step), Stop> {
        let key = self.key("standard_density");
        let density: MassDensity =
            given.quantity(&key).unwrap_or_else(|| self.default_density(given));
        if !(0.9..=1.35).contains(&density.si()) {
            return Err(Refusal::new(
                key,
                "standard_density_out_of_range",
                Sentence::new("A standard density of {0} is no standard: they lie between 0.9 and 1.35 kg/m³. If it is the density of the air here, the flow is actual.")
                    .with(density.amount()),
            )
            .into());
        }
        let mass = flow.si() * density.si();
        let moist = given.choice_or(&self.key("density_counts"), "dry_air") == "moist_air";
        let (dry_air, formula, source) = if moist {
            let w = states.first().map_or(0.0, |(_, air)| air.humidity_ratio().si());
            (
                mass / (1.0 + w),
                "m = V_std rho_std / (1 + W)",
                "the standard density counts moist air",
            )
        } else {
            (
                mass,
                "m = V_std rho_std",
                "the standard density counts dry air; no correction for altitude belongs here",
            )
        };
        let dry_air = DryAirFlow::from_si(dry_air);
        let numbers = Sentence::new("{0} × {1} = {2}")
            .with(flow.amount())
            .with(density.amount())
            .with(dry_air.amount());
        Ok((
            dry_air,
            Basis::Standard(density),
            Step::new("Dry-air mass flow", formula, numbers, source),
        ))
    }
}

/// `m = V / v` at the state where the flow passed.
fn actual(flow: AirFlow, air: &MoistAir) -> (DryAirFlow, Basis, Step) {
    let volume = air.specific_volume();
    let dry_air = DryAirFlow::from_si(flow.si() / volume.si());
    let numbers = Sentence::new("{0} ÷ {1} = {2}")
        .with(flow.amount())
        .with(volume.amount())
        .with(dry_air.amount());
    let step = Step::new(
        "Dry-air mass flow",
        "m = V / v",
        numbers,
        "v of moist air per mass of dry air (real gas) where the flow passed",
    );
    (dry_air, Basis::Actual(volume), step)
}
