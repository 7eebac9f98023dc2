//! Constants, each belonging to its source: they differ by 1.7e-5 and must not be mixed.

/// Molar mass of dry air, kg/mol (Gatley, Herrmann, Kretzschmar 2008).
pub(crate) const M_AIR: f64 = 28.966e-3;
/// Molar mass of water, kg/mol (IAPWS-95).
pub(crate) const M_WATER: f64 = 18.015_268e-3;
/// Ratio of the two, rounded as ASHRAE RP-1485 uses it.
pub(crate) const EPSILON: f64 = 0.621_945;
/// Gas constant of the mixture's virial equation and of water's ideal enthalpy, J/(mol K) (RP-1485).
pub(crate) const R_MIXTURE: f64 = 8.314_472;
/// Gas constant of IAPWS-95, J/(mol K).
pub(crate) const R_WATER: f64 = 8.314_371;
/// Gas constant of Lemmon et al. 2000, J/(mol K).
pub(crate) const R_AIR: f64 = 8.314_510;
/// Triple point of water, K (exact by the former definition of the kelvin).
pub(crate) const TRIPLE_K: f64 = 273.16;
/// Reducing temperature and density of dry air, K and mol/m³ (Lemmon et al. 2000).
pub(crate) const T_AIR: f64 = 132.6312;
/// See [`T_AIR`].
pub(crate) const RHO_AIR: f64 = 10_447.7;
/// Critical temperature of water, K (IAPWS-95).
pub(crate) const T_WATER: f64 = 647.096;
/// Critical molar density of water, mol/m³ (IAPWS-95).
pub(crate) const RHO_WATER: f64 = 322.0 / 0.018_015_268;

/// Mole fraction of vapour from humidity ratio.
pub(crate) fn mole_fraction(w: f64) -> f64 {
    w / (EPSILON + w)
}

/// Humidity ratio from the mole fraction of vapour.
pub(crate) fn humidity_ratio(x: f64) -> f64 {
    EPSILON * x / (1.0 - x)
}

/// Mass-based per kilogram of dry air over molar: multiply J/mol by this.
pub(crate) fn per_dry_air(w: f64, x: f64) -> f64 {
    (1.0 + w) / ((1.0 - x) * M_AIR + x * M_WATER)
}
