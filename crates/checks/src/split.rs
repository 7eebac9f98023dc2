//! Sensible and latent parts of an enthalpy change.
//!
//! The mean of the two ways round the corner of a psychrometric chart: with `a = h(T2, W1)` and `c = h(T1, W2)`,
//! `s = ((a - h1) + (h2 - c)) / 2` and `l = ((c - h1) + (h2 - a)) / 2`, so that `s + l = h2 - h1` exactly and both
//! change sign, exactly, when the ends are swapped (the Shapley split of two causes; own derivation).

use dewledger_properties::MoistAir;
use dewledger_quantities::{EnthalpyDifference, Quantity};

/// An enthalpy change in two parts, per mass of dry air.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Split {
    /// All of it, `h2 - h1`.
    pub total: EnthalpyDifference,
    /// By the change of temperature.
    pub sensible: EnthalpyDifference,
    /// By the change of moisture.
    pub latent: EnthalpyDifference,
}

/// Splits the change from `entering` to `leaving`. Positive is gained.
#[must_use]
pub fn split(entering: &MoistAir, leaving: &MoistAir) -> Split {
    let (h1, h2) = (entering.enthalpy().si(), leaving.enthalpy().si());
    let a = MoistAir::unchecked(leaving.dry_bulb(), entering.humidity_ratio(), leaving.pressure())
        .enthalpy()
        .si();
    let c = MoistAir::unchecked(entering.dry_bulb(), leaving.humidity_ratio(), entering.pressure())
        .enthalpy()
        .si();
    Split {
        total: EnthalpyDifference::from_si(h2 - h1),
        sensible: EnthalpyDifference::from_si(0.5 * ((a - h1) + (h2 - c))),
        latent: EnthalpyDifference::from_si(0.5 * ((c - h1) + (h2 - a))),
    }
}
