//! The state block: dry bulb and one humidity at a named point, in three bands.
//!
//! Impossible readings are refused with what mends them; readings that are impossible only by less than their ±
//! are taken as saturated air, the typed value kept; unusual ones are computed with a note.
//! Humidity below 0.01 °C: *relative humidity* and *dew point* are over liquid water (WMO practice, and how
//! probes are adjusted), *relative humidity over ice* and *frost point* are properties of their own.

use dewledger_properties::{AirError, Humidity, MoistAir, Wick, lowest_wet_bulb};
use dewledger_quantities::{
    Enthalpy, HumidityRatio, Kind, Pressure, PressureDifference, Quantity, RelativeHumidity,
    Sentence, ThermodynamicTemperature, difference,
};

use crate::form::{Choice, ChoiceItem, Item, ReadingItem};
use crate::given::{Given, Reading};
use crate::outcome::{Change, Note, Offer};
use crate::refusal::{Refusal, Stop};

/// Half-width taken for a wet bulb, dew point or frost point where no ± is stated, K (field practice).
const NEAR_K: f64 = 0.3;
/// Half-width taken for a relative humidity where no ± is stated (field practice).
const NEAR_RH: f64 = 0.03;
/// Few instruments hold outside these dry bulbs, K.
const USUAL_K: std::ops::RangeInclusive<f64> = 233.15..=333.15;
/// Dry bulbs that moist air is worked out for, K.
const RANGE_K: std::ops::RangeInclusive<f64> = 213.15..=363.15;
/// Below this wet bulb, K, the state of the wick is asked for: ice is possible.
const WICK_ASKED_BELOW_K: f64 = 273.85;

/// A point of the air: its prefix and its name in a sentence.
#[derive(Debug, Clone, Copy)]
pub struct Point<'a> {
    /// Prefix of its keys: `entering`.
    pub prefix: &'a str,
    /// Name in a sentence: "entering".
    pub name: &'a str,
}

/// A state read at a point.
#[derive(Debug, Clone)]
pub struct Read {
    /// The state, at the pressure of this point.
    pub air: MoistAir,
    /// Taken as saturated within its ±.
    pub saturated: bool,
    /// Remarks.
    pub notes: Vec<Note>,
    /// Which humidity was read.
    pub by: &'static str,
}

/// Identifiers and labels of the humidities that can be read, in the order of the sheet.
const HUMIDITIES: [(&str, &str, Kind); 7] = [
    ("wet_bulb", "Wet bulb", Kind::Temperature),
    ("relative_humidity", "Relative humidity", Kind::RelativeHumidity),
    ("dew_point", "Dew point", Kind::Temperature),
    ("humidity_ratio", "Humidity ratio", Kind::HumidityRatio),
    ("enthalpy", "Enthalpy", Kind::Enthalpy),
    ("relative_humidity_over_ice", "Relative humidity over ice", Kind::RelativeHumidity),
    ("frost_point", "Frost point", Kind::Temperature),
];

impl Point<'_> {
    /// A key of this point.
    #[must_use]
    pub fn key(&self, of: &str) -> String {
        format!("{}.{of}", self.prefix)
    }

    /// Which humidity is read here.
    fn humidity_by(&self, given: &Given) -> &'static str {
        let chosen = given.choice(&self.key("humidity_by")).unwrap_or("wet_bulb");
        HUMIDITIES.iter().map(|(id, ..)| *id).find(|id| *id == chosen).unwrap_or("wet_bulb")
    }

    /// What is asked at this point.
    #[must_use]
    pub fn items(&self, given: &Given) -> Vec<Item> {
        let by = self.humidity_by(given);
        let (_, label, kind) =
            HUMIDITIES.into_iter().find(|(id, ..)| *id == by).unwrap_or(HUMIDITIES[0]);
        let mut humidity = ReadingItem::wanted(self.key(by), label, kind);
        humidity.pick = Some(ChoiceItem::new(
            self.key("humidity_by"),
            "Humidity read as",
            Some("wet_bulb"),
            HUMIDITIES.iter().map(|(id, label, _)| Choice::new(id, *label)).collect(),
        ));
        let mut items = vec![
            ReadingItem::wanted(self.key("dry_bulb"), "Dry bulb", Kind::Temperature).into(),
            humidity.into(),
        ];
        let wet_bulb: Option<ThermodynamicTemperature> = given.quantity(&self.key("wet_bulb"));
        if by == "wet_bulb" && wet_bulb.is_some_and(|wet_bulb| wet_bulb.si() < WICK_ASKED_BELOW_K) {
            items.push(
                ChoiceItem::new(
                    self.key("wick"),
                    "The wick is",
                    Some("not_said"),
                    vec![
                        Choice::new("not_said", "Not looked at"),
                        Choice::new("wet", "Wet"),
                        Choice::new("iced", "Iced"),
                    ],
                )
                .help("Near freezing the two give different air")
                .into(),
            );
        }
        items
    }

    /// The optional gauge pressure in the duct at this point.
    #[must_use]
    pub fn duct_pressure(&self, label: &'static str) -> Item {
        ReadingItem::optional(self.key("duct_pressure"), label, Kind::PressureDifference).into()
    }

    /// The state here.
    ///
    /// # Errors
    ///
    /// Waits for what is not read; refuses what cannot be.
    pub fn read(&self, given: &Given, here: Pressure) -> Result<Read, Stop> {
        let by = self.humidity_by(given);
        let dry_bulb: Option<ThermodynamicTemperature> = given.quantity(&self.key("dry_bulb"));
        let humidity = given.reading(&self.key(by));
        let (Some(dry_bulb), Some(humidity)) = (dry_bulb, humidity) else {
            return Err(Stop::Waits(self.missing(given, by)));
        };
        let pressure = self.pressure(given, here)?;
        let mut notes = Vec::new();
        self.judge_dry_bulb(given, dry_bulb, by, &mut notes)?;
        let outcome = self.solve(given, dry_bulb, by, *humidity, pressure)?;
        if let Some(note) = outcome.1 {
            notes.push(note);
        }
        self.judge_state(&outcome.0, by, *humidity, &mut notes);
        Ok(Read { air: outcome.0, saturated: outcome.2, notes, by })
    }

    fn missing(&self, given: &Given, by: &str) -> Vec<crate::outcome::Missing> {
        let label =
            HUMIDITIES.iter().find(|(id, ..)| *id == by).map_or("wet bulb", |(_, label, _)| label);
        let mut missing = Vec::new();
        if given.reading(&self.key("dry_bulb")).is_none() {
            missing.push(crate::outcome::Missing::new(
                self.key("dry_bulb"),
                format!("the {} dry bulb", self.name),
            ));
        }
        if given.reading(&self.key(by)).is_none() {
            let name = format!("the {} {}", self.name, label.to_lowercase());
            missing.push(crate::outcome::Missing::new(self.key(by), name));
        }
        missing
    }

    /// The absolute pressure at this point: here, and the gauge pressure in the duct where it was read.
    fn pressure(&self, given: &Given, here: Pressure) -> Result<Pressure, Stop> {
        let key = self.key("duct_pressure");
        let gauge: PressureDifference = given.quantity(&key).unwrap_or_default();
        if gauge.si().abs() > 10_000.0 {
            return Err(Refusal::new(
                key,
                "duct_pressure_out_of_range",
                Sentence::new("A duct pressure of {0} is outside ±10 kPa. Check its unit; it is read against the room.")
                    .with(gauge.amount()),
            )
            .into());
        }
        Ok(here + gauge.0)
    }

    fn judge_dry_bulb(
        &self,
        given: &Given,
        dry_bulb: ThermodynamicTemperature,
        by: &str,
        notes: &mut Vec<Note>,
    ) -> Result<(), Stop> {
        let key = self.key("dry_bulb");
        let offer = self.fahrenheit_offer(given, &key, by);
        if !RANGE_K.contains(&dry_bulb.si()) {
            let mut refusal = Refusal::new(
                key,
                "dry_bulb_out_of_range",
                Sentence::new("Dry bulb {0} is outside the −60 to 90 °C (−76 to 194 °F) that moist air is worked out for. Check the number and its unit.")
                    .with(dry_bulb.amount()),
            );
            refusal.offers.extend(offer);
            return Err(refusal.into());
        }
        if !USUAL_K.contains(&dry_bulb.si()) {
            let mut note = Note::unusual(
                format!("{key}.extreme"),
                key,
                Sentence::new("Dry bulb {0} is beyond what most instruments read.")
                    .with(dry_bulb.amount()),
            )
            .because(Sentence::new(
                "Above 60 °C (140 °F) or below −40 °C check the probe’s range, or the unit.",
            ));
            note.offers.extend(offer);
            notes.push(note);
        }
        Ok(())
    }

    /// When the dry bulb was typed in °C and would be an everyday air temperature in °F: the offer to say so.
    fn fahrenheit_offer(&self, given: &Given, key: &str, by: &str) -> Option<Offer> {
        let celsius = |key: &str| {
            let reading = given.reading(key)?;
            (reading.unit?.id == "degC").then(|| reading.amount.si() - 273.15)
        };
        let number = celsius(key)?;
        if !(33.0..=140.0).contains(&number) {
            return None;
        }
        let mut changes = vec![Change::Unit(key.to_owned().into(), "degF")];
        let humidity = self.key(by);
        if celsius(&humidity).is_some() {
            changes.push(Change::Unit(humidity.into(), "degF"));
        }
        Some(Offer::new("It was typed in °F", changes))
    }

    /// The state, a note where it was taken as saturated, and whether it was.
    fn solve(
        &self,
        given: &Given,
        dry_bulb: ThermodynamicTemperature,
        by: &str,
        humidity: Reading,
        pressure: Pressure,
    ) -> Result<(MoistAir, Option<Note>, bool), Stop> {
        let key = self.key(by);
        // A draw beyond saturation is saturated air at its dry bulb, however far beyond.
        let drawn = given.is_drawn();
        let near_k = if drawn {
            f64::INFINITY
        } else {
            band(given.reading(&self.key("dry_bulb")), humidity)
        };
        let temperature = ThermodynamicTemperature::from_si(humidity.amount.si());
        let above = humidity.amount.si() - dry_bulb.si();
        let near = match by {
            "wet_bulb" | "dew_point" | "frost_point" => above > 0.0 && above <= near_k,
            "relative_humidity" | "relative_humidity_over_ice" => {
                let over = humidity.amount.si() - 1.0;
                over > 0.0 && (drawn || over <= humidity.half_width_si.unwrap_or(NEAR_RH))
            }
            _ => false,
        };
        if near {
            let air = if by == "relative_humidity_over_ice" || by == "frost_point" {
                MoistAir::saturated(dry_bulb, pressure)
            } else {
                MoistAir::new(
                    dry_bulb,
                    Humidity::RelativeHumidity(RelativeHumidity::from_si(1.0)),
                    pressure,
                )
            };
            let air =
                air.map_err(|error| self.refusal(&error, dry_bulb, by, humidity, pressure))?;
            let lead =
                Sentence::new("The {w0} air is taken as saturated.").word(self.name.to_owned());
            let note = Note::within(format!("{key}.saturated"), key, lead).because(
                Sentence::new(
                    "{0} is beyond saturation by less than its ±. The reading stays as typed.",
                )
                .with(humidity.amount),
            );
            return Ok((air, Some(note), true));
        }
        let wick = match given.choice_or(&self.key("wick"), "not_said") {
            "wet" => Wick::Wet,
            "iced" => Wick::Iced,
            _ => Wick::NotSaid,
        };
        let humidity_given = match by {
            "relative_humidity" => {
                Humidity::RelativeHumidity(RelativeHumidity::from_si(humidity.amount.si()))
            }
            "relative_humidity_over_ice" => {
                Humidity::RelativeHumidityOverIce(RelativeHumidity::from_si(humidity.amount.si()))
            }
            "dew_point" => Humidity::DewPoint(temperature),
            "frost_point" => Humidity::FrostPoint(temperature),
            "humidity_ratio" => {
                Humidity::HumidityRatio(HumidityRatio::from_si(humidity.amount.si()))
            }
            "enthalpy" => Humidity::Enthalpy(Enthalpy::from_si(humidity.amount.si())),
            _ => Humidity::WetBulb(temperature, wick),
        };
        let air = MoistAir::new(dry_bulb, humidity_given, pressure)
            .map_err(|error| self.refusal(&error, dry_bulb, by, humidity, pressure))?;
        Ok((air, None, false))
    }

    /// The sentence for what the properties refuse.
    fn refusal(
        &self,
        error: &AirError,
        dry_bulb: ThermodynamicTemperature,
        by: &str,
        humidity: Reading,
        pressure: Pressure,
    ) -> Stop {
        let key = self.key(by);
        let typed = humidity.amount;
        let dry = self.key("dry_bulb");
        let swap = Offer::new("Swap the two", vec![Change::Swap(dry.into(), key.clone().into())]);
        let fahrenheit = || {
            let unit = humidity.unit?;
            let number = typed.si() - 273.15;
            let as_fahrenheit = (number + 459.67) / 1.8;
            (unit.id == "degC" && as_fahrenheit <= dry_bulb.si() && as_fahrenheit > 213.15).then(
                || Offer::new("It was typed in °F", vec![Change::Unit(key.clone().into(), "degF")]),
            )
        };
        let refusal = |code, says: Sentence| Refusal::new(key.clone(), code, says);
        let refused = match error {
            AirError::WetBulbAboveDryBulb { .. } => {
                let mut refused = refusal(
                    "wet_bulb_above_dry_bulb",
                    Sentence::new("Wet bulb {0} is above dry bulb {1}. Air cannot do that. Swap the two, or wet the wick and read again.")
                        .with(typed)
                        .with(dry_bulb.amount()),
                );
                refused.offers.extend(fahrenheit());
                refused.offering(swap)
            }
            AirError::DewPointAboveDryBulb { .. } => {
                let mut refused = refusal(
                    "dew_point_above_dry_bulb",
                    Sentence::new("{w0} {0} is above dry bulb {1}. Air cannot do that. Swap the two, or read again.")
                        .word(if by == "frost_point" { "Frost point" } else { "Dew point" })
                        .with(typed)
                        .with(dry_bulb.amount()),
                );
                refused.offers.extend(fahrenheit());
                refused.offering(swap)
            }
            AirError::DrierThanBoneDry { .. } => {
                let lowest = lowest_wet_bulb(dry_bulb, pressure);
                refusal(
                    "drier_than_bone_dry",
                    Sentence::new("Wet bulb {0} at dry bulb {1} would be drier than bone-dry air; the lowest possible here is {2}. The wick was dry, or it was read too early.")
                        .with(typed)
                        .with(dry_bulb.amount())
                        .with(lowest.amount()),
                )
            }
            AirError::NoLiquidRoot { .. } => refusal(
                "wick_is_iced",
                Sentence::new("A wick at {0} is iced: no wet one can be that cold in this air. Say so, or read again.")
                    .with(typed),
            )
            .offering(Offer::new(
                "It is iced",
                vec![Change::Choose(self.key("wick").into(), "iced".into())],
            )),
            AirError::RelativeHumidityOutOfRange { .. } => refusal(
                "relative_humidity_out_of_range",
                Sentence::new("Relative humidity {0} is not between 0 and 100 %. A probe that shows 101 to 103 % is within its own error; beyond that read a wet bulb or a dew point.")
                    .with(typed),
            ),
            AirError::FrostPointAboveFreezing { .. } => refusal(
                "frost_point_above_freezing",
                Sentence::new("Frost point {0} is above freezing: there is only a dew point there.").with(typed),
            )
            .offering(Offer::new(
                "It was a dew point",
                vec![
                    Change::Move(key.clone().into(), self.key("dew_point").into()),
                    Change::Choose(self.key("humidity_by").into(), "dew_point".into()),
                ],
            )),
            AirError::AboveSaturation { limit, .. } => refusal(
                "above_saturation",
                Sentence::new("{0} of water is more than air of {1} can hold here; saturated it holds {2}. Check the number and its unit.")
                    .with(typed)
                    .with(dry_bulb.amount())
                    .with(limit.amount()),
            ),
            AirError::EnthalpyOutOfRange { lowest, highest, .. } => refusal(
                "enthalpy_out_of_range",
                Sentence::new("Enthalpy {0} cannot be at dry bulb {1}: from bone dry to saturated it runs from {2} to {3}. Is this figure on the zero of its unit (0 °F for Btu/lb, 0 °C for kJ/kg)?")
                    .with(typed)
                    .with(dry_bulb.amount())
                    .with(lowest.amount())
                    .with(highest.amount()),
            ),
            other @ (AirError::TemperatureOutOfRange { .. }
            | AirError::PressureOutOfRange { .. }
            | AirError::NoIceRoot { .. }
            | AirError::TooMuchWater
            | AirError::TooDryForDewPoint
            | AirError::NotConverged { .. }) => refusal(
                "cannot_be",
                Sentence::new("{0} at dry bulb {1} is outside what moist air is worked out for ({w0}).")
                    .with(typed)
                    .with(dry_bulb.amount())
                    .word(other.to_string()),
            ),
        };
        refused.into()
    }

    /// Notes on a state that stands.
    fn judge_state(&self, air: &MoistAir, by: &str, humidity: Reading, notes: &mut Vec<Note>) {
        let key = self.key(by);
        let rh = air.relative_humidity();
        if by == "relative_humidity" && !(0.10..=0.90).contains(&rh.si()) {
            let lead =
                Sentence::new("A relative humidity of {0} is where capacitive probes err most.")
                    .with(rh.amount());
            notes.push(
                Note::remark(format!("{key}.edge"), lead).because(Sentence::new(
                    "A wet bulb or a dew point is the better reading here.",
                )),
            );
        }
        if by == "wet_bulb" {
            let depression =
                difference(air.dry_bulb(), ThermodynamicTemperature::from_si(humidity.amount.si()));
            let half_width = humidity.half_width_si.unwrap_or(NEAR_K);
            if depression.si() > 0.0 && depression.si() < 1.0 && half_width >= NEAR_K {
                let lead =
                    Sentence::new("Wet bulb and dry bulb of the {w0} air are only {0} apart.")
                        .word(self.name.to_owned())
                        .with(depression.amount());
                notes.push(Note::remark(format!("{key}.close"), lead).because(Sentence::new(
                    "Their errors are of that size: keep the wick out of droplets, or read after the fan.",
                )));
            }
        }
        let over_ice = air.relative_humidity_over_ice();
        if air.dry_bulb().si() < 273.16 && over_ice.si() > 1.0 + 1e-9 {
            let lead =
                Sentence::new("The {w0} air holds {0} over ice: it is supersaturated over ice.")
                    .word(self.name.to_owned())
                    .with(over_ice.amount());
            notes.push(Note::remark(format!("{key}.over_ice"), lead).because(Sentence::new(
                "That is real outdoors in frost. Check whether the probe reads over ice or over liquid water.",
            )));
        }
    }
}

/// The half-width that a temperature may lie above the dry bulb by: the combined ± where both carry one.
fn band(dry_bulb: Option<&Reading>, humidity: Reading) -> f64 {
    match (dry_bulb.and_then(|reading| reading.half_width_si), humidity.half_width_si) {
        (Some(dry), Some(wet)) => dry.hypot(wet),
        _ => NEAR_K,
    }
}

/// The air at a point of a form, when its readings and the pressure are complete and can be: for showing what they
/// come to while the rest of the form is still blank.
#[must_use]
pub fn readout(given: &Given, prefix: &str) -> Option<MoistAir> {
    given.reading(&format!("{prefix}.dry_bulb"))?;
    let here = crate::pressure::here(given).ok()?;
    Point { prefix, name: "read" }.read(given, here.pressure).ok().map(|read| read.air)
}
