//! Pressure here: read, or worked out from elevation, altimeter setting or a sea-level figure.
//!
//! Weather services publish pressure reduced to sea level. Taken for the pressure in the room it makes humidity
//! ratio and enthalpy wrong by a quarter at 1600 m, so a figure that looks so is caught before any result.
//! Bands around the standard atmosphere: 3 % is weather, 8 % cannot be (field practice, no standard behind it).
//! Sources: ISO 2533:1975 for the standard atmosphere; the definition of the altimeter setting.

use dewledger_properties::atmosphere;
use dewledger_quantities::{
    Elevation, Kind, Pressure, Quantity, RelativeHumidity, Sentence, Share,
    ThermodynamicTemperature,
};

use crate::doubt::Term;
use crate::form::{Choice, ChoiceItem, Item, ReadingItem, Section};
use crate::given::{Given, Moved};
use crate::outcome::{Change, Note, Offer};
use crate::refusal::{Refusal, Stop};

/// How the pressure is known.
pub const BY: &str = "pressure.by";
/// Elevation of the site.
pub const ELEVATION: &str = "pressure.elevation";
/// Read by a barometer in the room.
pub const READ: &str = "pressure.read";
/// Altimeter setting of an airport near by.
pub const ALTIMETER: &str = "pressure.altimeter";
/// Sea-level pressure of a weather service.
pub const SEA_LEVEL: &str = "pressure.sea_level";
/// Outdoor temperature, for the sea-level reduction.
pub const OUTDOOR: &str = "pressure.outdoor_temperature";
/// Outdoor relative humidity, for the sea-level reduction.
pub const OUTDOOR_HUMIDITY: &str = "pressure.outdoor_humidity";

/// Standard pressure at sea level, Pa (exact, ISO 2533).
const STANDARD_PA: f64 = 101_325.0;

/// The worked-out value that a doubt of the pressure moves, Pa.
const WORKED_OUT: &str = "pressure";

/// Standard uncertainty of a pressure from elevation alone, Pa: day-to-day weather (field practice).
pub const FROM_ELEVATION_U_PA: f64 = 700.0;
/// Relative standard uncertainty of a barometer without a stated ± (field practice).
const BAROMETER_U: f64 = 0.001;
/// What the reduction to sea level adds, relative, per metre of elevation: services reduce in different ways.
const REDUCTION_U_PER_M: f64 = 0.003 / 1000.0;

/// Ratio to the standard atmosphere within which a barometer is believed (weather).
const BELIEVED: std::ops::RangeInclusive<f64> = 0.97..=1.03;
/// Ratio to the standard atmosphere outside which it is refused.
const POSSIBLE: std::ops::RangeInclusive<f64> = 0.92..=1.08;
/// Below this elevation, m, a sea-level figure hides within the weather.
const HIDDEN_BELOW_M: f64 = 300.0;

/// The pressure of the air here.
#[derive(Debug, Clone)]
pub struct Here {
    /// Absolute.
    pub pressure: Pressure,
    /// Where it comes from, in words.
    pub source: Sentence,
    /// Remarks on it.
    pub notes: Vec<Note>,
    /// Elevation, when given.
    pub elevation: Option<Elevation>,
}

/// The section of a form that asks for it.
#[must_use]
pub fn section(given: &Given) -> Section {
    let by = ChoiceItem::new(
        BY,
        "Known from",
        Some("elevation"),
        vec![
            Choice::helped(
                "elevation",
                "Elevation",
                "Standard atmosphere, give or take the weather",
            ),
            Choice::helped(
                "read",
                "Read here",
                "A barometer in the room, not corrected to sea level",
            ),
            Choice::helped(
                "altimeter",
                "Altimeter setting",
                "Of an airport near by, with the elevation here",
            ),
            Choice::helped(
                "sea_level",
                "Sea-level pressure",
                "From a weather service, with elevation and outdoor air",
            ),
        ],
    );
    let elevation = ReadingItem::wanted(ELEVATION, "Elevation", Kind::Elevation).covered();
    let mut items: Vec<Item> = vec![by.into()];
    match given.choice_or(BY, "elevation") {
        "read" => {
            items.push(
                ReadingItem::wanted(READ, "Pressure here", Kind::Pressure)
                    .help("As read in the room, not corrected to sea level")
                    .covered()
                    .into(),
            );
            items.push(
                ReadingItem::optional(ELEVATION, "Elevation", Kind::Elevation)
                    .help("Lets a sea-level figure be noticed")
                    .covered()
                    .into(),
            );
        }
        "altimeter" => {
            items.push(
                ReadingItem::wanted(ALTIMETER, "Altimeter setting", Kind::Pressure)
                    .covered()
                    .into(),
            );
            items.push(elevation.into());
        }
        "sea_level" => {
            items.push(
                ReadingItem::wanted(SEA_LEVEL, "Sea-level pressure", Kind::Pressure)
                    .covered()
                    .into(),
            );
            items.push(elevation.into());
            items.push(
                ReadingItem::wanted(OUTDOOR, "Outdoor dry bulb", Kind::Temperature)
                    .covered()
                    .into(),
            );
            items.push(
                ReadingItem::optional(
                    OUTDOOR_HUMIDITY,
                    "Outdoor relative humidity",
                    Kind::RelativeHumidity,
                )
                .help(
                    "Counts for at most half a per cent of the correction; blank is counted as dry",
                )
                .into(),
            );
        }
        _ => items.push(elevation.into()),
    }
    Section::new("pressure", "Pressure here", items)
}

/// The pressure here.
///
/// # Errors
///
/// Waits for what is missing; refuses what cannot be at this elevation.
pub fn here(given: &Given) -> Result<Here, Stop> {
    let mut here = match given.choice_or(BY, "elevation") {
        "read" => from_barometer(given)?,
        "altimeter" => from_altimeter(given)?,
        "sea_level" => from_sea_level(given)?,
        _ => from_elevation(given)?,
    };
    here.pressure = Pressure::from_si(here.pressure.si() + given.shift(WORKED_OUT));
    if !(50_000.0..=120_000.0).contains(&here.pressure.si()) {
        let field = match given.choice_or(BY, "elevation") {
            "read" => READ,
            "altimeter" => ALTIMETER,
            "sea_level" => SEA_LEVEL,
            _ => ELEVATION,
        };
        return Err(Refusal::new(
            field,
            "pressure_out_of_range",
            Sentence::new("{0} is outside the 50 to 120 kPa that moist air is worked out for. Check the number and its unit.")
                .with(here.pressure.amount()),
        )
        .into());
    }
    Ok(here)
}

/// The pressure here and what is read at it. While the pressure waits, all else that is missing is named with it,
/// so that a person is asked for everything at once.
///
/// # Errors
///
/// As [`here`] and `read`.
pub fn with<T>(
    given: &Given,
    read: impl Fn(Pressure) -> Result<T, Stop>,
) -> Result<(Here, T), Stop> {
    match here(given) {
        Ok(here) => read(here.pressure).map(|read| (here, read)),
        Err(Stop::Waits(mut missing)) => {
            // Only what is missing counts: a refusal at a trial pressure may not be one at the real pressure.
            if let Err(Stop::Waits(more)) = read(Pressure::from_si(STANDARD_PA)) {
                missing.extend(more);
            }
            Err(Stop::Waits(missing))
        }
        Err(refused) => Err(refused),
    }
}

/// Doubt of a pressure that carries no typed ±.
#[must_use]
pub fn terms(given: &Given) -> Vec<Term> {
    let by = given.choice_or(BY, "elevation");
    if by == "read" && given.reading(READ).is_some_and(|reading| reading.half_width_si.is_some()) {
        return Vec::new();
    }
    let Ok(here) = here(given) else { return Vec::new() };
    let (source, u) = match by {
        "read" => ("barometer", here.pressure.si() * BAROMETER_U),
        "altimeter" => ("altimeter setting", here.pressure.si() * BAROMETER_U),
        "sea_level" => {
            let height = here.elevation.map_or(0.0, |elevation| elevation.si().abs());
            (
                "pressure brought down from sea level",
                here.pressure.si() * (BAROMETER_U + REDUCTION_U_PER_M * height),
            )
        }
        _ => ("pressure from elevation: the weather", FROM_ELEVATION_U_PA),
    };
    vec![Term::worked_out(source, Moved::WorkedOut(WORKED_OUT), u)]
}

fn elevation(given: &Given) -> Result<Elevation, Stop> {
    let elevation: Elevation =
        given.quantity(ELEVATION).ok_or_else(|| Stop::waits(ELEVATION, "the elevation"))?;
    if !(-430.0..=5000.0).contains(&elevation.si()) {
        return Err(Refusal::new(
            ELEVATION,
            "elevation_out_of_range",
            Sentence::new(
                "Elevation {0} is outside −430 to 5 000 m. Check the number and its unit.",
            )
            .with(elevation.amount()),
        )
        .into());
    }
    Ok(elevation)
}

fn standard(elevation: Elevation) -> Result<Pressure, Stop> {
    atmosphere::pressure_at(elevation).map_err(|_| {
        Refusal::new(
            ELEVATION,
            "elevation_out_of_range",
            Sentence::new("Elevation {0} is outside the standard atmosphere used here.")
                .with(elevation.amount()),
        )
        .into()
    })
}

fn from_elevation(given: &Given) -> Result<Here, Stop> {
    let elevation = elevation(given)?;
    let pressure = standard(elevation)?;
    Ok(Here {
        pressure,
        source: Sentence::new("standard atmosphere at {0}").with(elevation.amount()),
        notes: Vec::new(),
        elevation: Some(elevation),
    })
}

fn from_barometer(given: &Given) -> Result<Here, Stop> {
    let read: Pressure =
        given.quantity(READ).ok_or_else(|| Stop::waits(READ, "the pressure here"))?;
    let mut notes = Vec::new();
    let elevation = if given.reading(ELEVATION).is_some() { Some(elevation(given)?) } else { None };
    if let Some(elevation) = elevation {
        judge(read, elevation, &mut notes)?;
    } else {
        notes.push(
            Note::remark(
                "pressure_unchecked",
                Sentence::new("The barometer is taken as it reads."),
            )
            .because(Sentence::new(
                "Without an elevation a figure corrected to sea level cannot be noticed.",
            )),
        );
    }
    Ok(Here { pressure: read, source: Sentence::new("read here"), notes, elevation })
}

/// Whether a barometer can read so at this elevation.
fn judge(read: Pressure, elevation: Elevation, notes: &mut Vec<Note>) -> Result<(), Stop> {
    let standard = standard(elevation)?;
    let ratio = read.si() / standard.si();
    let from_altimeter = atmosphere::from_altimeter_setting(read, elevation).ok();
    let offers = [
        Offer::new(
            "It is an altimeter setting",
            vec![
                Change::Move(READ.into(), ALTIMETER.into()),
                Change::Choose(BY.into(), "altimeter".into()),
            ],
        ),
        Offer::new(
            "It is a sea-level pressure",
            vec![
                Change::Move(READ.into(), SEA_LEVEL.into()),
                Change::Choose(BY.into(), "sea_level".into()),
            ],
        ),
    ];
    if !POSSIBLE.contains(&ratio) {
        if ratio > 1.0 {
            let said = from_altimeter.unwrap_or(standard);
            let says = Sentence::new(
                "Pressure {0} cannot be at {1}, where it is near {2}. It is probably a sea-level figure: \
                 taken as an altimeter setting it gives {3}. Say which it is, or correct the elevation.",
            )
            .with(read.amount())
            .with(elevation.amount())
            .with(standard.amount())
            .with(said.amount());
            let mut refusal = Refusal::new(READ, "sea_level_pressure", says);
            refusal.offers = offers.to_vec();
            return Err(refusal.into());
        }
        return Err(Refusal::new(
            READ,
            "pressure_too_low_for_elevation",
            Sentence::new("Pressure {0} cannot be at {1}, where it is near {2}. Check the number, its unit and the elevation.")
                .with(read.amount())
                .with(elevation.amount())
                .with(standard.amount()),
        )
        .into());
    }
    if !BELIEVED.contains(&ratio) {
        let lead = if ratio > 1.0 {
            Sentence::new("Pressure {0} looks corrected to sea level: {1} would have about {2}.")
        } else {
            Sentence::new("Pressure {0} is unusually low: {1} would have about {2}.")
        };
        let lead = lead.with(read.amount()).with(elevation.amount()).with(standard.amount());
        let mut note = Note::unusual("pressure_unusual", READ, lead)
            .because(Sentence::new("Weather moves the pressure by about 3 % either way."));
        if ratio > 1.0 {
            note.offers = offers.to_vec();
        }
        notes.push(note);
    } else if elevation.si() > 30.0 && elevation.si() < HIDDEN_BELOW_M {
        let share = Share::from_si(elevation.si() / 8400.0);
        notes.push(
            Note::remark(
                "sea_level_hides",
                Sentence::new("A figure corrected to sea level could not be noticed here."),
            )
            .because(
                Sentence::new("At {0} it would be {1} too high.")
                    .with(elevation.amount())
                    .with(share.amount()),
            ),
        );
    }
    Ok(())
}

fn from_altimeter(given: &Given) -> Result<Here, Stop> {
    let setting: Option<Pressure> = given.quantity(ALTIMETER);
    let setting = setting.ok_or_else(|| Stop::waits(ALTIMETER, "the altimeter setting"))?;
    let elevation = elevation(given)?;
    not_sea_level_like(setting, ALTIMETER)?;
    let pressure = atmosphere::from_altimeter_setting(setting, elevation)
        .map_err(|_| cannot_be_sea_level(setting, ALTIMETER))?;
    Ok(Here {
        pressure,
        source: Sentence::new("altimeter setting {0} at {1}")
            .with(setting.amount())
            .with(elevation.amount()),
        notes: Vec::new(),
        elevation: Some(elevation),
    })
}

fn from_sea_level(given: &Given) -> Result<Here, Stop> {
    let figure: Option<Pressure> = given.quantity(SEA_LEVEL);
    let figure = figure.ok_or_else(|| Stop::waits(SEA_LEVEL, "the sea-level pressure"))?;
    let elevation = elevation(given)?;
    let outdoor: ThermodynamicTemperature =
        given.quantity(OUTDOOR).ok_or_else(|| Stop::waits(OUTDOOR, "the outdoor dry bulb"))?;
    not_sea_level_like(figure, SEA_LEVEL)?;
    let refuse = || Stop::from(cannot_be_sea_level(figure, SEA_LEVEL));
    let humidity: Option<RelativeHumidity> = given.quantity(OUTDOOR_HUMIDITY);
    let moisture = match humidity {
        None => dewledger_quantities::HumidityRatio::default(),
        Some(humidity) => {
            // The moisture only trims the column's mean density: the standard pressure is near enough for it.
            dewledger_properties::MoistAir::new(
                outdoor,
                dewledger_properties::Humidity::RelativeHumidity(humidity),
                standard(elevation)?,
            )
            .map_err(|_| {
                Stop::from(Refusal::new(
                    OUTDOOR_HUMIDITY,
                    "outdoor_humidity",
                    Sentence::new("Outdoor air of {0} and {1} cannot be. Check both.")
                        .with(outdoor.amount())
                        .with(humidity.amount()),
                ))
            })?
            .humidity_ratio()
        }
    };
    let pressure = atmosphere::from_sea_level_pressure(figure, elevation, outdoor, moisture)
        .map_err(|_| refuse())?;
    Ok(Here {
        pressure,
        source: Sentence::new("sea-level pressure {0} brought to {1}")
            .with(figure.amount())
            .with(elevation.amount()),
        notes: Vec::new(),
        elevation: Some(elevation),
    })
}

/// Pressures at sea level stay within what weather has ever shown, with room to spare.
fn not_sea_level_like(figure: Pressure, field: &'static str) -> Result<(), Stop> {
    if (87_000.0..=108_500.0).contains(&figure.si()) {
        Ok(())
    } else {
        Err(cannot_be_sea_level(figure, field).into())
    }
}

fn cannot_be_sea_level(figure: Pressure, field: &'static str) -> Refusal {
    Refusal::new(
        field,
        "not_a_sea_level_figure",
        Sentence::new(
            "{0} is no pressure at sea level, where weather stays between 87 and 108.5 kPa. \
             If a barometer in the room shows it, choose “Read here”.",
        )
        .with(figure.amount()),
    )
    .offering(Offer::new(
        "It was read here",
        vec![Change::Move(field.into(), READ.into()), Change::Choose(BY.into(), "read".into())],
    ))
}
