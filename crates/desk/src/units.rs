//! Units and appearance: preferences of the person, kept in the ledger.

use dewledger_ledger::Ledger;
use dewledger_quantities::{Amount, Kind, Unit, UnitChoice, show};

use crate::desk::Asked;
use crate::form_view::unit_view;
use crate::reply::{Fault, FaultCode, Reply, UnitsRow, UnitsView};
use crate::request::{Preset, Theme};

/// Key of the preference that holds all units, as `quantity=unit` pairs.
const UNITS: &str = "units";
const APPEARANCE: &str = "appearance";

/// The units that were chosen, SI where nothing was.
pub(crate) fn load(ledger: &Ledger) -> UnitChoice {
    let mut units = UnitChoice::si();
    let kept = ledger.preference(UNITS).ok().flatten().unwrap_or_default();
    for pair in kept.split(' ') {
        let Some((quantity, unit)) = pair.split_once('=') else { continue };
        if let (Some(kind), Some(unit)) = (Kind::from_id(quantity), Unit::find(unit)) {
            // A unit that no longer measures the quantity leaves the preset's.
            let _ = units.set(kind, unit);
        }
    }
    units
}

fn keep(at: &mut Asked<'_>, units: UnitChoice) -> Result<(), Fault> {
    let text: Vec<String> =
        units.iter().map(|(kind, unit)| format!("{}={}", kind.id(), unit.id)).collect();
    at.state.ledger.set_preference(UNITS, &text.join(" "))?;
    at.state.units = units;
    Ok(())
}

/// An everyday value of each quantity, SI, so that a person sees what a unit looks like.
const EVERYDAY: &[(Kind, f64)] = &[
    (Kind::Temperature, 294.15),
    (Kind::TemperatureDifference, 10.0),
    (Kind::RelativeHumidity, 0.5),
    (Kind::HumidityRatio, 0.009),
    (Kind::Enthalpy, 45_000.0),
    (Kind::SpecificVolume, 0.85),
    (Kind::Density, 1.18),
    (Kind::AirFlow, 2.36),
    (Kind::StandardAirFlow, 2.36),
    (Kind::DryAirFlow, 2.5),
    (Kind::WaterFlow, 4.29e-3),
    (Kind::CondensateFlow, 3.1e-6),
    (Kind::MoistureFlow, 3.1e-3),
    (Kind::WaterMassFlow, 4.3),
    (Kind::Power, 41_300.0),
    (Kind::PowerPerArea, 19.0),
    (Kind::PowerPerLength, 7.6),
    (Kind::FilmCoefficient, 7.0),
    (Kind::ThermalConductivity, 0.036),
    (Kind::Pressure, 83_430.0),
    (Kind::PressureDifference, 250.0),
    (Kind::Elevation, 1609.0),
    (Kind::Length, 0.6),
    (Kind::Area, 0.54),
    (Kind::WaterVolume, 4e-3),
    (Kind::Velocity, 2.5),
    (Kind::Duration, 600.0),
    (Kind::RoomLength, 5.0),
    (Kind::AirChanges, 10.0 / 3600.0),
    (Kind::HeatingValue, 38e6),
    (Kind::SensibleConstant, 1230.0),
    (Kind::TotalConstant, 1.2),
    (Kind::LatentConstant, 3.01e6),
    (Kind::WaterConstant, 4.19e6),
    (Kind::InputPerCooling, 0.18),
];

/// An everyday value of a quantity, SI; 1 where none is known.
pub(crate) fn everyday(kind: Kind) -> f64 {
    EVERYDAY.iter().find(|(known, _)| *known == kind).map_or(1.0, |(_, si)| *si)
}

pub(crate) fn view(units: &UnitChoice) -> UnitsView {
    let preset = units.preset().map(|preset| match preset {
        dewledger_quantities::Preset::Ip => Preset::Ip,
        dewledger_quantities::Preset::Si => Preset::Si,
    });
    let rows = EVERYDAY
        .iter()
        .map(|(kind, si)| {
            let unit = units.get(*kind);
            UnitsRow {
                quantity: kind.id().to_owned(),
                label: kind.label().to_owned(),
                chosen: unit_view(unit),
                units: Unit::of(*kind).map(unit_view).collect(),
                example: show(Amount::new(*kind, *si), unit).text(),
            }
        })
        .collect();
    UnitsView { preset, rows }
}

pub(crate) fn choose(at: &mut Asked<'_>, quantity: &str, unit: &str) -> Result<Reply, Fault> {
    let kind = Kind::from_id(quantity)
        .ok_or_else(|| Fault::not_found(&format!("The quantity “{quantity}”")))?;
    let unit = Unit::find(unit).ok_or_else(|| Fault::not_found(&format!("The unit “{unit}”")))?;
    let mut units = at.state.units.clone();
    units
        .set(kind, unit)
        .map_err(|error| Fault::new(FaultCode::BadRequest, format!("{error}.")))?;
    // A difference follows its quantity, so that °F and its differences do not part.
    if let Some(follower) = unit.for_difference(kind) {
        units
            .set(kind.difference(), follower)
            .map_err(|error| Fault::new(FaultCode::BadRequest, format!("{error}.")))?;
    }
    keep(at, units)?;
    Ok(Reply::Units(view(&at.state.units)))
}

pub(crate) fn preset(at: &mut Asked<'_>, preset: Preset) -> Result<Reply, Fault> {
    let units = match preset {
        Preset::Ip => UnitChoice::ip(),
        Preset::Si => UnitChoice::si(),
    };
    keep(at, units)?;
    Ok(Reply::Units(view(&at.state.units)))
}

pub(crate) fn appearance(at: &Asked<'_>) -> Result<Reply, Fault> {
    let theme = match at.state.ledger.preference(APPEARANCE)?.as_deref() {
        Some("light") => Theme::Light,
        Some("dark") => Theme::Dark,
        Some("contrast") => Theme::Contrast,
        _ => Theme::System,
    };
    Ok(Reply::Appearance { theme })
}

pub(crate) fn choose_appearance(at: &mut Asked<'_>, theme: Theme) -> Result<Reply, Fault> {
    let text = match theme {
        Theme::System => "system",
        Theme::Light => "light",
        Theme::Dark => "dark",
        Theme::Contrast => "contrast",
    };
    at.state.ledger.set_preference(APPEARANCE, text)?;
    Ok(Reply::Appearance { theme })
}
