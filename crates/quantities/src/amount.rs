//! An amount: a quantity whose kind is known when the program runs, not when it is compiled.

use crate::{Kind, Quantity};

/// A value with its kind: what a form's field holds and what a result is shown from.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Amount {
    kind: Kind,
    si: f64,
}

impl Amount {
    /// An amount of `kind` from its stored SI unit ([`Kind::si_suffix`]).
    #[must_use]
    pub const fn new(kind: Kind, si: f64) -> Self {
        Self { kind, si }
    }

    /// What it means.
    #[must_use]
    pub const fn kind(self) -> Kind {
        self.kind
    }

    /// The value in the stored SI unit of its kind.
    #[must_use]
    pub const fn si(self) -> f64 {
        self.si
    }

    /// As a typed quantity, when that is what it is.
    #[must_use]
    pub fn get<Q: Quantity>(self) -> Option<Q> {
        (self.kind == Q::KIND).then(|| Q::from_si(self.si))
    }

    /// The same kind, moved by `by` stored SI units.
    #[must_use]
    pub const fn moved(self, by: f64) -> Self {
        Self { kind: self.kind, si: self.si + by }
    }
}
