//! The water that leaves or joins the air: in which state, and what enthalpy it carries.
//!
//! The air's own enthalpy change needs no assumption about it; the duty that a coil or burner exchanged does.

use dewledger_properties::{MoistAir, water};
use dewledger_quantities::{Kind, Quantity, Sentence, ThermodynamicTemperature, WaterEnthalpy};

use crate::form::{Choice, ChoiceItem, Item, ReadingItem};
use crate::given::Given;
use crate::refusal::{Refusal, Stop};

const BY: &str = "water.state";
const TEMPERATURE: &str = "water.temperature";
const STEAM: &str = "water.steam_enthalpy";

/// The water stream.
#[derive(Debug, Clone)]
pub struct WaterStream {
    /// What it carries per mass.
    pub enthalpy: WaterEnthalpy,
    /// Where that comes from.
    pub source: Sentence,
    /// Its temperature, when it is liquid: for its volume.
    pub temperature: Option<ThermodynamicTemperature>,
}

/// What is asked.
#[must_use]
pub fn items(given: &Given) -> Vec<Item> {
    let mut items: Vec<Item> = vec![
        ChoiceItem::new(
            BY,
            "The water is",
            Some("leaving_wet_bulb"),
            vec![
                Choice::helped(
                    "leaving_wet_bulb",
                    "Condensate at the leaving wet bulb",
                    "Assumed where air dries",
                ),
                Choice::new("condensate", "Condensate, temperature read"),
                Choice::new("liquid", "Water added, temperature read"),
                Choice::new("steam", "Steam added"),
                Choice::helped("unknown", "Not known", "No duty is given then"),
            ],
        )
        .into(),
    ];
    match given.choice_or(BY, "leaving_wet_bulb") {
        "condensate" | "liquid" => {
            items.push(
                ReadingItem::wanted(TEMPERATURE, "Water temperature", Kind::Temperature).into(),
            );
        }
        "steam" => {
            items.push(
                ReadingItem::wanted(STEAM, "Steam enthalpy", Kind::WaterEnthalpy)
                    .help("From liquid water at 0 °C; saturated steam at 1 atm has 2 676 kJ/kg (1 150 Btu/lb)")
                    .into(),
            );
        }
        _ => {}
    }
    items
}

/// The water stream; none where it is not known, or where air gains water of an unknown state.
///
/// # Errors
///
/// Refuses temperatures and enthalpies that cannot be.
pub fn read(given: &Given, leaving: &MoistAir, removed: bool) -> Result<Option<WaterStream>, Stop> {
    match given.choice_or(BY, "leaving_wet_bulb") {
        "condensate" | "liquid" => {
            let Some(temperature) = given.quantity::<ThermodynamicTemperature>(TEMPERATURE) else {
                return Ok(None);
            };
            let refuse = || {
                Refusal::new(
                    TEMPERATURE,
                    "water_temperature_out_of_range",
                    Sentence::new("Liquid water of {0} is outside 0 to 100 °C. Check the number and its unit.")
                        .with(temperature.amount()),
                )
            };
            if !(273.15..=373.15).contains(&temperature.si()) {
                return Err(refuse().into());
            }
            let enthalpy =
                water::enthalpy(temperature, leaving.pressure()).map_err(|_| refuse())?;
            let source = Sentence::new("liquid water at {0}").with(temperature.amount());
            Ok(Some(WaterStream { enthalpy, source, temperature: Some(temperature) }))
        }
        "steam" => {
            let Some(enthalpy) = given.quantity::<WaterEnthalpy>(STEAM) else { return Ok(None) };
            if !(2_400_000.0..=3_300_000.0).contains(&enthalpy.si()) {
                return Err(Refusal::new(
                    STEAM,
                    "steam_enthalpy_out_of_range",
                    Sentence::new("A steam enthalpy of {0} is outside 2 400 to 3 300 kJ/kg. Check its zero and unit.")
                        .with(enthalpy.amount()),
                )
                .into());
            }
            let source = Sentence::new("steam of {0}").with(enthalpy.amount());
            Ok(Some(WaterStream { enthalpy, source, temperature: None }))
        }
        "unknown" => Ok(None),
        _ if removed => {
            let Ok(wet_bulb) = leaving.wet_bulb() else { return Ok(None) };
            let temperature = wet_bulb.reading();
            // Below freezing the coil frosts: nothing drains while the air is read.
            if temperature.si() < 273.16 {
                return Ok(None);
            }
            let Ok(enthalpy) = water::enthalpy(temperature, leaving.pressure()) else {
                return Ok(None);
            };
            let source = Sentence::new("condensate at the leaving wet bulb {0}, assumed")
                .with(temperature.amount());
            Ok(Some(WaterStream { enthalpy, source, temperature: Some(temperature) }))
        }
        _ => Ok(None),
    }
}
