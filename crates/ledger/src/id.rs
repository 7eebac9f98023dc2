//! Identities: UUID version 7, so that they sort by time and two devices never make the same one.
//!
//! Stored as hyphenated text: a ledger is looked at with other tools too, and 20 bytes more a row are nothing here.

use std::fmt;
use std::str::FromStr;

use uuid::{NoContext, Timestamp, Uuid};

use crate::At;

/// A text that is no identity.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[error("“{text}” is no identity")]
pub struct BadId {
    /// As given.
    pub text: String,
}

macro_rules! ids {
    ($($(#[$doc:meta])* $name:ident;)*) => {$(
        $(#[$doc])*
        #[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
        pub struct $name(Uuid);

        impl $name {
            /// A new one at a moment.
            #[must_use]
            pub fn new(at: At) -> Self {
                Self(new(at))
            }

            /// From an identity that is known to be of this sort.
            #[must_use]
            pub(crate) const fn of(uuid: Uuid) -> Self {
                Self(uuid)
            }
        }

        impl fmt::Display for $name {
            fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
                self.0.hyphenated().fmt(formatter)
            }
        }

        impl FromStr for $name {
            type Err = BadId;
            fn from_str(text: &str) -> Result<Self, BadId> {
                parse(text).map(Self)
            }
        }
    )*};
}

ids! {
    /// A site.
    SiteId;
    /// A piece of equipment.
    EquipmentId;
    /// A visit.
    VisitId;
    /// An entry.
    EntryId;
    /// An instrument.
    InstrumentId;
    /// A revision of any of them.
    RevisionId;
    /// A draft.
    DraftId;
}

/// A new identity at a moment.
pub(crate) fn new(at: At) -> Uuid {
    let ms = u64::try_from(at.ms).unwrap_or(0);
    let nanos = (ms % 1000) as u32 * 1_000_000;
    Uuid::new_v7(Timestamp::from_unix(NoContext, ms / 1000, nanos))
}

pub(crate) fn parse(text: &str) -> Result<Uuid, BadId> {
    Uuid::try_parse(text).map_err(|_| BadId { text: text.chars().take(40).collect() })
}
