//! The units, in one table.
//!
//! Identifiers are our own and never change; symbols are the trade's, for the screen; UCUM codes stand beside
//! them. Factors are composed from exact definitions (NIST SP 811, the SI brochure), which `unit/table.rs` names.

mod spelling;
mod table;

use crate::Kind;
pub(crate) use spelling::{normal, two_meanings};

/// A unit of measurement. Values of a kind are `si = value * factor + offset` in its stored SI unit.
#[derive(Debug, PartialEq)]
pub struct Unit {
    /// Identifier in files, requests and CSV headers.
    pub id: &'static str,
    /// Symbol on screen.
    pub symbol: &'static str,
    /// Name, as read aloud.
    pub name: &'static str,
    /// UCUM code, case sensitive. Of what the unit is, not of where its scale begins: the moist-air enthalpy in Btu/lb has
    /// its zero at 0 °F.
    pub ucum: &'static str,
    /// What it measures, its scale for each, and the decimals that a field instrument resolves.
    measures: &'static [Scale],
    /// Further spellings that a person may type with a number.
    spellings: &'static [&'static str],
}

/// How a unit measures one kind.
#[derive(Debug, PartialEq)]
struct Scale {
    kind: Kind,
    factor: f64,
    offset: f64,
    decimals: u8,
    /// Spellings that mean this unit for this kind only, as "scfm" for standard air.
    also: &'static [&'static str],
}

impl Unit {
    /// The unit with this identifier.
    #[must_use]
    pub fn find(id: &str) -> Option<&'static Unit> {
        table::UNITS.iter().find(|unit| unit.id == id)
    }

    /// Every unit.
    #[must_use]
    pub fn all() -> &'static [Unit] {
        table::UNITS
    }

    /// The units of a kind, in the order in which a sheet lists them.
    pub fn of(kind: Kind) -> impl Iterator<Item = &'static Unit> {
        table::UNITS.iter().filter(move |unit| unit.measures(kind))
    }

    /// The kinds that it measures.
    pub fn kinds(&self) -> impl Iterator<Item = Kind> {
        self.measures.iter().map(|scale| scale.kind)
    }

    /// Whether it measures this kind.
    #[must_use]
    pub fn measures(&self, kind: Kind) -> bool {
        self.scale(kind).is_some()
    }

    /// From a value in this unit to the stored SI unit of the kind; none where it does not measure it.
    #[must_use]
    pub fn to_si(&self, kind: Kind, value: f64) -> Option<f64> {
        self.scale(kind).map(|scale| value * scale.factor + scale.offset)
    }

    /// From the stored SI unit of the kind to a value in this unit; none where it does not measure it.
    #[must_use]
    pub fn from_si(&self, kind: Kind, si: f64) -> Option<f64> {
        self.scale(kind).map(|scale| (si - scale.offset) / scale.factor)
    }

    /// A width (a ±, a difference) from stored SI to this unit of `kind`: the factor without the offset.
    #[must_use]
    pub fn width_from_si(&self, kind: Kind, si: f64) -> Option<f64> {
        self.scale(kind).map(|scale| si / scale.factor)
    }

    /// The unit for differences of `kind` whose step is this unit's: kelvin for °C, "°F difference" for °F, itself
    /// where a difference has the same unit. None where it does not measure `kind`.
    #[must_use]
    pub fn for_difference(&'static self, kind: Kind) -> Option<&'static Unit> {
        let step = self.scale(kind)?.factor;
        let difference = kind.difference();
        if self.measures(difference) {
            return Some(self);
        }
        Unit::of(difference).find(|unit| {
            unit.scale(difference).is_some_and(|scale| scale.factor.to_bits() == step.to_bits())
        })
    }

    /// Whether the zero of its scale for this kind is not the zero of the stored SI unit, so that a share of a value
    /// means something else in another unit.
    #[must_use]
    pub fn is_shifted(&self, kind: Kind) -> bool {
        self.scale(kind).is_some_and(|scale| scale.offset.abs() > 0.0)
    }

    /// Decimals that a field instrument resolves in this unit; what [`crate::show`] shows at least.
    #[must_use]
    pub fn decimals(&self, kind: Kind) -> u8 {
        self.scale(kind).map_or(3, |scale| scale.decimals)
    }

    fn scale(&self, kind: Kind) -> Option<&'static Scale> {
        self.measures.iter().find(|scale| scale.kind == kind)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn identifiers_are_their_own() {
        for unit in Unit::all() {
            assert_eq!(
                Unit::all().iter().filter(|other| other.id == unit.id).count(),
                1,
                "{}",
                unit.id
            );
            // They stand in headers, preferences and command lines, between spaces and equals signs.
            let plain =
                |c: char| c.is_ascii_graphic() && !matches!(c, '=' | ',' | ';' | '"' | '\'');
            assert!(unit.id.chars().all(plain) && unit.ucum.is_ascii(), "{}", unit.id);
        }
    }

    #[test]
    fn a_unit_measures_a_kind_one_way() {
        for unit in Unit::all() {
            for kind in unit.kinds() {
                assert_eq!(unit.kinds().filter(|other| *other == kind).count(), 1, "{}", unit.id);
            }
        }
    }

    #[test]
    fn every_kind_has_a_unit_and_every_unit_one_for_differences() {
        for kind in Kind::ALL {
            assert!(Unit::of(*kind).next().is_some(), "{kind:?}");
            for unit in Unit::of(*kind) {
                assert!(unit.for_difference(*kind).is_some(), "{kind:?} {}", unit.id);
            }
        }
        let of = |id| Unit::find(id).unwrap().for_difference(Kind::Temperature).unwrap().id;
        assert_eq!([of("degC"), of("degF"), of("K")], ["K", "degF_difference", "K"]);
    }

    #[test]
    fn only_scales_with_a_zero_of_their_own_are_shifted() {
        let unit = |id| Unit::find(id).unwrap();
        assert!(unit("degF").is_shifted(Kind::Temperature));
        assert!(unit("Btu/lb").is_shifted(Kind::Enthalpy));
        assert!(!unit("Btu/lb").is_shifted(Kind::WaterEnthalpy));
        assert!(!unit("cfm").is_shifted(Kind::AirFlow));
    }
}
