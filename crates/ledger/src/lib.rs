//! The ledger: one SQLite file with sites, equipment, visits, entries, drafts and preferences.
//!
//! It knows ids, text, integers and plain numbers; what a body means is known above it. Nothing else in Dewledger
//! knows SQL.
//!
//! # Durability
//!
//! WAL with `synchronous=FULL`: every commit is synced before the call returns, so that *Filed* is never said of
//! something that a power cut can take back. Saving is rare here; the sync costs nothing that a person feels.
//!
//! # Revisions
//!
//! Records are append-only: a correction is a new revision that names the one it replaces, and triggers refuse any
//! update or delete. Merging two ledgers is then a union, and two corrections made apart are both kept.
//!
//! # Refusals
//!
//! A file of another program or of a newer schema is refused and left as it is. A damaged file is never written to:
//! it is set aside under another name, and what can still be read is carried over into a new one.

mod at;
mod draft;
mod error;
mod id;
mod open;
mod preference;
mod record;
mod salvage;
mod schema;

pub use at::At;
pub use draft::Draft;
pub use error::{OpenError, WriteError};
pub use id::{BadId, DraftId, EntryId, EquipmentId, RevisionId, SiteId, VisitId};
pub use open::{Event, Ledger, Opened};
pub use record::{Body, Head, Kind, RecordId, ResultRow, Revision, Within};
pub use salvage::Salvaged;
pub use schema::{APPLICATION_ID, SCHEMA};
