//! What cannot be worked out, with the quantities that show why.

use dewledger_quantities::{
    Enthalpy, HumidityRatio, Pressure, Quantity, RelativeHumidity, ThermodynamicTemperature,
};

/// Why there is no such air.
#[derive(Debug, Clone, Copy, PartialEq, thiserror::Error)]
pub enum AirError {
    /// The temperature is outside −60 to 90 °C.
    #[error("temperature {} K is outside 213.15 to 363.15 K", .got.si())]
    TemperatureOutOfRange {
        /// As given.
        got: ThermodynamicTemperature,
    },
    /// The pressure is outside 40 to 135 kPa (50 to 120 kPa at a site, with a duct's pressure added).
    #[error("pressure {} Pa is outside 40 000 to 135 000 Pa", .got.si())]
    PressureOutOfRange {
        /// As given.
        got: Pressure,
    },
    /// The wet bulb is above the dry bulb.
    #[error("wet bulb {} K is above dry bulb {} K", .wet_bulb.si(), .dry_bulb.si())]
    WetBulbAboveDryBulb {
        /// As given.
        wet_bulb: ThermodynamicTemperature,
        /// As given.
        dry_bulb: ThermodynamicTemperature,
    },
    /// The wet bulb is below that of bone-dry air.
    #[error("wet bulb {} K is below that of bone-dry air, {} K", .wet_bulb.si(), .lowest.si())]
    DrierThanBoneDry {
        /// As given.
        wet_bulb: ThermodynamicTemperature,
        /// The wet bulb of bone-dry air.
        lowest: ThermodynamicTemperature,
    },
    /// A wick said to be wet is so cold that it can only be iced.
    #[error("no wet wick can be at {} K in this air", .wet_bulb.si())]
    NoLiquidRoot {
        /// As given.
        wet_bulb: ThermodynamicTemperature,
    },
    /// A wick said to be iced is above freezing.
    #[error("no iced wick can be at {} K", .wet_bulb.si())]
    NoIceRoot {
        /// As given.
        wet_bulb: ThermodynamicTemperature,
    },
    /// The relative humidity is not between 0 and 1.
    #[error("relative humidity {} is outside 0 to 1", .got.si())]
    RelativeHumidityOutOfRange {
        /// As given.
        got: RelativeHumidity,
    },
    /// The dew point or frost point is above the dry bulb.
    #[error("dew point {} K is above dry bulb {} K", .dew_point.si(), .dry_bulb.si())]
    DewPointAboveDryBulb {
        /// As given.
        dew_point: ThermodynamicTemperature,
        /// As given.
        dry_bulb: ThermodynamicTemperature,
    },
    /// There is no frost point above freezing.
    #[error("frost point {} K is above freezing", .got.si())]
    FrostPointAboveFreezing {
        /// As given.
        got: ThermodynamicTemperature,
    },
    /// More water than saturated air holds, or less than none.
    #[error("humidity ratio {} is outside 0 to saturation at {}", .got.si(), .limit.si())]
    AboveSaturation {
        /// As given.
        got: HumidityRatio,
        /// Saturated.
        limit: HumidityRatio,
    },
    /// The enthalpy is not between that of bone-dry and of saturated air.
    #[error("enthalpy {} J/kg is outside {} to {} J/kg", .got.si(), .lowest.si(), .highest.si())]
    EnthalpyOutOfRange {
        /// As given.
        got: Enthalpy,
        /// Bone dry.
        lowest: Enthalpy,
        /// Saturated.
        highest: Enthalpy,
    },
    /// More than 2 kg of water per kg of dry air, or nearly pure steam.
    #[error("more than 2 kg of water per kg of dry air")]
    TooMuchWater,
    /// So little water that its dew point lies beyond the equations.
    #[error("too dry for a dew point")]
    TooDryForDewPoint,
    /// An iteration did not close.
    #[error("not converged after {after} steps, {residual} left")]
    NotConverged {
        /// Steps taken.
        after: usize,
        /// What was left, in the unit of what was sought.
        residual: f64,
    },
}
