//! How a person may spell a unit: one normal form for what is typed and for what the table holds.

use crate::{Kind, Unit};

/// Words and their short forms, applied in this order to a text in lower case and without spaces.
const SHORT: &[(&str, &str)] = &[
    ("degrees", "°"),
    ("degree", "°"),
    ("deg", "°"),
    ("percent", "%"),
    ("per", "/"),
    ("cuft", "ft3"),
    ("cubicfeet", "ft3"),
    ("sqft", "ft2"),
    ("squarefeet", "ft2"),
    ("lbs", "lb"),
    ("pounds", "lb"),
    ("litres", "l"),
    ("liters", "l"),
    ("gallons", "gal"),
    ("/hour", "/h"),
    ("/hr", "/h"),
    ("/minute", "/min"),
    ("/second", "/s"),
    ("/sec", "/s"),
];

/// The normal form of a spelling. Case, spaces, full stops, raised dots and brackets do not count; a power may be
/// written as `m3`, `m^3` or `m³`, a degree sign as any of its look-alikes.
pub(crate) fn normal(text: &str) -> String {
    let mut form = String::with_capacity(text.len());
    for character in text.chars() {
        match character {
            '.' | '·' | '⋅' | '∙' | '*' | '×' | '(' | ')' | '^' | '_' => {}
            '²' => form.push('2'),
            '³' => form.push('3'),
            // U+00BA and U+02DA stand on keyboards where the degree sign does not.
            'º' | '˚' => form.push('°'),
            '℃' => form.push_str("°c"),
            '℉' => form.push_str("°f"),
            '″' | '”' | '“' => form.push('"'),
            '′' | '’' => form.push('\''),
            space if space.is_whitespace() => {}
            other => form.extend(other.to_lowercase()),
        }
    }
    for (word, short) in SHORT {
        if form.contains(word) {
            form = form.replace(word, short);
        }
    }
    form
}

/// A spelling that has two meanings for these kinds, so that neither is taken.
#[derive(Debug)]
pub(crate) struct TwoMeanings {
    spellings: &'static [&'static str],
    kinds: &'static [Kind],
    /// One meaning, in words.
    pub(crate) one: &'static str,
    /// The other.
    pub(crate) other: &'static str,
    /// What to type so that it is plain.
    pub(crate) instead: &'static str,
}

/// Spellings of the trade that mean one thing here and another there.
const TWO_MEANINGS: &[TwoMeanings] = &[
    // M is a thousand in the older usage of the trade and a million everywhere else.
    TwoMeanings {
        spellings: &["mbh", "mbtu/h", "mbtuh", "mmbh", "mmbtu/h", "mmbtuh"],
        kinds: &[Kind::Power],
        one: "thousand Btu/h",
        other: "million Btu/h",
        instead: "kBtu/h",
    },
    TwoMeanings {
        spellings: &["gr", "grs"],
        kinds: &[Kind::HumidityRatio, Kind::HumidityRatioDifference],
        one: "grains per pound",
        other: "grams per kilogram",
        instead: "gr/lb or g/kg",
    },
    TwoMeanings {
        spellings: &["in", "inch", "inches", "\""],
        kinds: &[Kind::Pressure, Kind::PressureDifference, Kind::VapourPressure],
        one: "inches of water",
        other: "inches of mercury",
        instead: "in. of water or inHg",
    },
    TwoMeanings {
        spellings: &["ton", "tons"],
        kinds: &[Kind::Mass],
        one: "tons of 2000 lb",
        other: "tonnes of 1000 kg",
        instead: "lb or kg",
    },
    TwoMeanings {
        spellings: &["ton", "tons", "ton/h", "tons/h"],
        kinds: &[Kind::DryAirFlow, Kind::MoistureFlow],
        one: "tons of 2000 lb",
        other: "tonnes of 1000 kg",
        instead: "lb/h or kg/h",
    },
    TwoMeanings {
        spellings: &["ton", "tons", "tonh", "tonhours"],
        kinds: &[Kind::Energy],
        one: "refrigeration ton-hours",
        other: "tonnes of a fuel",
        instead: "kWh or kBtu",
    },
];

/// The two meanings that a spelling (in normal form) has for a kind, if it has two.
pub(crate) fn two_meanings(kind: Kind, normal: &str) -> Option<&'static TwoMeanings> {
    TWO_MEANINGS.iter().find(|two| two.kinds.contains(&kind) && two.spellings.contains(&normal))
}

impl Unit {
    /// Whether `normal`, a spelling in normal form, means this unit behind a number of this kind.
    pub(crate) fn is_spelt(&self, kind: Kind, normal: &str) -> bool {
        self.spellings_for(kind).any(|spelling| self::normal(spelling) == normal)
    }

    /// Every spelling of this unit behind a number of this kind: its identifier, its symbol and what else is typed.
    /// Case, spaces, full stops, brackets and the way a power is written do not count when one is read.
    pub fn spellings_for(&self, kind: Kind) -> impl Iterator<Item = &'static str> {
        let scale = self.scale(kind);
        [self.id, self.symbol]
            .into_iter()
            // The plain number's identifier is a digit, its symbol nothing: neither is typed behind a number.
            .filter(|text| text.chars().any(|c| !c.is_ascii_digit()))
            .chain(self.spellings.iter().copied())
            .chain(scale.map_or(&[][..], |scale| scale.also).iter().copied())
            .filter(move |_| scale.is_some())
    }
}

#[cfg(test)]
mod tests {
    use std::collections::BTreeMap;

    use super::*;

    #[test]
    fn a_spelling_means_one_unit_of_a_kind() {
        for kind in Kind::ALL {
            let mut seen = BTreeMap::new();
            for unit in Unit::of(*kind) {
                for spelling in unit.spellings_for(*kind) {
                    let form = normal(spelling);
                    assert!(!form.is_empty(), "{}", unit.id);
                    assert!(two_meanings(*kind, &form).is_none(), "{kind:?} {spelling}");
                    let before = seen.insert(form, unit.id);
                    assert!(
                        before.is_none_or(|id| id == unit.id),
                        "{kind:?} {spelling}: {before:?} and {}",
                        unit.id
                    );
                }
            }
        }
    }

    #[test]
    fn look_alikes_have_one_normal_form() {
        for group in [
            &["°F", "º f", "˚F", "℉", "deg F", "deg. F"][..],
            &["m³/s", "m3/s", "m^3/s", "M3/S", "m³ per second"],
            &["ft³/min", "cu ft/min", "cu. ft. per minute", "ft^3/min"],
            &["Btu/(h·ft²)", "btu/h*ft2", "BTU/hr⋅sq ft"],
            &["in. of water", "in of water"],
        ] {
            for text in group {
                assert_eq!(normal(text), normal(group[0]), "{text}");
            }
        }
    }
}
