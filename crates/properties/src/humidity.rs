//! Humidity as it is read, and the way from it to the humidity ratio.

use dewledger_quantities::{Enthalpy, HumidityRatio, RelativeHumidity, ThermodynamicTemperature};

/// A humidity, as read beside a dry bulb.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Humidity {
    /// Thermodynamic wet bulb, with the state of the wick.
    WetBulb(ThermodynamicTemperature, Wick),
    /// Over liquid water, also below freezing (WMO practice).
    RelativeHumidity(RelativeHumidity),
    /// Over ice below 0.01 °C, the ordinary one above.
    RelativeHumidityOverIce(RelativeHumidity),
    /// Over liquid water, also below freezing.
    DewPoint(ThermodynamicTemperature),
    /// Over ice; exists up to 0.01 °C.
    FrostPoint(ThermodynamicTemperature),
    /// Per mass of dry air.
    HumidityRatio(HumidityRatio),
    /// Per mass of dry air.
    Enthalpy(Enthalpy),
}

/// The state of a wet bulb's wick, which only the person can see.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum Wick {
    /// Liquid.
    Wet,
    /// Frozen.
    Iced,
    /// Not looked at: liquid where liquid can be, else ice.
    #[default]
    NotSaid,
}
