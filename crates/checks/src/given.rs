//! What a check is given: readings by key, choices by key.

use std::collections::BTreeMap;

use dewledger_quantities::{Amount, Quantity, Unit};

use crate::outcome::Change;
use crate::part::{Part, half_width};

/// One reading, read from what was typed.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Reading {
    /// The value.
    pub amount: Amount,
    /// The unit it was typed in, when a person typed it.
    pub unit: Option<&'static Unit>,
    /// Half-width of its 95 % interval in the stored SI unit of its kind's difference; none is not known.
    pub half_width_si: Option<f64>,
}

impl Reading {
    /// A reading without a stated ±.
    #[must_use]
    pub const fn new(amount: Amount) -> Self {
        Self { amount, unit: None, half_width_si: None }
    }
}

/// Readings and choices of one form. A key that is not there was not read or not chosen.
#[derive(Debug, Clone, Default, PartialEq)]
pub struct Given {
    readings: BTreeMap<String, Reading>,
    choices: BTreeMap<String, String>,
    parts: BTreeMap<String, Vec<Part>>,
    shifts: BTreeMap<&'static str, f64>,
    floors: BTreeMap<String, f64>,
    kept: BTreeMap<String, f64>,
    drawing: bool,
    moved: bool,
}

impl Given {
    /// Adds or replaces a reading.
    pub fn put(&mut self, key: impl Into<String>, reading: Reading) {
        self.readings.insert(key.into(), reading);
    }

    /// Adds or replaces a choice.
    pub fn choose(&mut self, key: impl Into<String>, value: impl Into<String>) {
        self.choices.insert(key.into(), value.into());
    }

    /// With one more reading, typed quantity and no ±: for tests and worked examples.
    #[must_use]
    pub fn with<Q: Quantity>(mut self, key: &str, quantity: Q) -> Self {
        self.put(key, Reading::new(quantity.amount()));
        self
    }

    /// With one more choice.
    #[must_use]
    pub fn choosing(mut self, key: &str, value: &str) -> Self {
        self.choose(key, value);
        self
    }

    /// With the 95 % half-width of a reading that is there, in stored SI units.
    #[must_use]
    pub fn within(mut self, key: &str, half_width_si: f64) -> Self {
        if let Some(reading) = self.readings.get_mut(key) {
            reading.half_width_si = Some(half_width_si);
        }
        self
    }

    /// Says what the doubt of a reading that is there is made of; its half-width follows.
    pub fn doubt_by(&mut self, key: &str, parts: Vec<Part>) {
        if let Some(reading) = self.readings.get_mut(key) {
            reading.half_width_si = half_width(&parts);
            self.parts.insert(key.to_owned(), parts);
        }
    }

    /// What the doubt of a reading is made of; empty where only its half-width is known, or nothing.
    #[must_use]
    pub fn parts(&self, key: &str) -> &[Part] {
        self.parts.get(key).map_or(&[], Vec::as_slice)
    }

    /// The reading at `key`.
    #[must_use]
    pub fn reading(&self, key: &str) -> Option<&Reading> {
        self.readings.get(key)
    }

    /// The quantity at `key`; none when not read, or of another kind.
    #[must_use]
    pub fn quantity<Q: Quantity>(&self, key: &str) -> Option<Q> {
        self.readings.get(key).and_then(|reading| reading.amount.get())
    }

    /// The choice at `key`.
    #[must_use]
    pub fn choice(&self, key: &str) -> Option<&str> {
        self.choices.get(key).map(String::as_str)
    }

    /// The choice at `key`, or what stands by default.
    #[must_use]
    pub fn choice_or<'a>(&'a self, key: &str, default: &'a str) -> &'a str {
        self.choice(key).unwrap_or(default)
    }

    /// All readings by key.
    pub fn readings(&self) -> impl Iterator<Item = (&str, &Reading)> {
        self.readings.iter().map(|(key, reading)| (key.as_str(), reading))
    }

    /// By how much a worked-out value (`pressure`) is moved while its doubt is carried through; 0 otherwise.
    #[must_use]
    pub fn shift(&self, what: &'static str) -> f64 {
        self.shifts.get(what).copied().unwrap_or(0.0)
    }

    /// Below which size a difference is not resolved: twice its standard uncertainty where that is known, else
    /// `unstated`, the floor for readings without a stated ±. In stored SI units.
    #[must_use]
    pub fn floor(&self, difference: &str, unstated: f64) -> f64 {
        // A draw is one possible truth: nothing in it is too small to be told.
        if self.drawing {
            return 0.0;
        }
        self.floors.get(difference).copied().unwrap_or(unstated)
    }

    /// A value that a check found before and that stays while the readings are moved.
    #[must_use]
    pub fn kept(&self, what: &str) -> Option<f64> {
        self.kept.get(what).copied()
    }

    /// All values that a check found before, by what they are.
    pub fn all_kept(&self) -> impl Iterator<Item = (&str, f64)> {
        self.kept.iter().map(|(what, value)| (what.as_str(), *value))
    }

    /// Keeps what a check found.
    pub(crate) fn keep(&mut self, kept: &BTreeMap<String, f64>) {
        self.kept.extend(kept.iter().map(|(what, value)| (what.clone(), *value)));
    }

    /// Sets the floor of a difference from its known doubt.
    pub(crate) fn set_floor(&mut self, difference: &str, floor_si: f64) {
        self.floors.insert(difference.to_owned(), floor_si);
    }

    /// The same after the changes of an offer, in order.
    #[must_use]
    pub fn changed(&self, changes: &[Change]) -> Self {
        let mut other = self.clone();
        for change in changes {
            match change {
                Change::Choose(key, value) => other.choose(key.as_ref(), value.as_ref()),
                Change::Unit(key, unit) => other.typed_in(key, unit),
                Change::Swap(one, two) => {
                    let (first, second) = (other.take(one), other.take(two));
                    other.place(two, first);
                    other.place(one, second);
                }
                Change::Move(from, to) => {
                    let moved = other.take(from);
                    other.place(to, moved);
                }
                Change::Clear(key) => {
                    other.take(key);
                }
            }
        }
        other
    }

    /// The number of a reading as it was typed, taken for another unit.
    fn typed_in(&mut self, key: &str, unit: &str) {
        let Some(reading) = self.readings.get_mut(key) else { return };
        let kind = reading.amount.kind();
        let number = reading.unit.and_then(|typed| typed.from_si(kind, reading.amount.si()));
        let Some((meant, number)) = Unit::find(unit).zip(number) else { return };
        let (Some(si), Some(before), Some(after)) = (
            meant.to_si(kind, number),
            reading.unit.and_then(|unit| unit.width_from_si(kind, 1.0)),
            meant.width_from_si(kind, 1.0),
        ) else {
            return;
        };
        // A ± was typed in steps of the same unit.
        reading.half_width_si = reading.half_width_si.map(|width| width * before / after);
        reading.amount = Amount::new(kind, si);
        reading.unit = Some(meant);
        self.parts.remove(key);
    }

    fn take(&mut self, key: &str) -> Option<(Reading, Option<Vec<Part>>)> {
        let reading = self.readings.remove(key)?;
        Some((reading, self.parts.remove(key)))
    }

    fn place(&mut self, key: &str, what: Option<(Reading, Option<Vec<Part>>)>) {
        let Some((reading, parts)) = what else { return };
        self.readings.insert(key.to_owned(), reading);
        if let Some(parts) = parts {
            self.parts.insert(key.to_owned(), parts);
        }
    }

    /// From now on it is drawn around the readings: air beyond saturation by however much counts as saturated.
    pub(crate) fn drawing(&mut self) {
        self.drawing = true;
    }

    /// Whether it is solved only for how far its results move: curves and tables are not looked at then.
    #[must_use]
    pub fn is_moved(&self) -> bool {
        self.moved
    }

    /// Whether it is drawn around the readings.
    #[must_use]
    pub fn is_drawn(&self) -> bool {
        self.drawing
    }

    /// The same, with each key moved by its part, in stored SI units. A key without a reading is a worked-out value.
    #[must_use]
    pub fn moved(&self, moves: &[(Moved, f64)]) -> Self {
        let mut other = self.clone();
        other.moved = true;
        for (what, by) in moves {
            match what {
                Moved::Reading(key) => {
                    if let Some(reading) = other.readings.get_mut(key) {
                        reading.amount = reading.amount.moved(*by);
                    }
                }
                Moved::WorkedOut(what) => *other.shifts.entry(what).or_insert(0.0) += by,
            }
        }
        other
    }
}

/// What a source of doubt moves.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Moved {
    /// A reading, by key.
    Reading(String),
    /// A value worked out on the way that has a doubt of its own, as the pressure from an elevation.
    WorkedOut(&'static str),
}
