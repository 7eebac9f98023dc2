//! The ledger: one SQLite file with sites, equipment, visits, entries, drafts and preferences.
//!
//! It knows ids, text, integers and plain numbers; what a body means is known above it. Nothing else in Dewledger
//! knows SQL.
//!
//! # Durability
//!
//! Settings of every connection, and why (<https://www.sqlite.org/pragma.html>):
//!
//! | setting | why |
//! | --- | --- |
//! | `journal_mode=WAL` | readers and the writer do not wait for each other; one sync a commit |
//! | `synchronous=FULL` | each commit is synced before the call returns: *Filed* is never said of what a power cut can take back. `NORMAL` keeps the file sound but may lose the last commits. `EXTRA` where the folder allows no WAL |
//! | `fullfsync=ON` | on a Mac an ordinary sync stops at the drive's own cache |
//! | `foreign_keys=ON` | a result names a revision that is there |
//! | `recursive_triggers=ON` | without it `INSERT OR REPLACE` deletes behind the back of the delete triggers |
//! | `trusted_schema=OFF`, `cell_size_check=ON`, `mmap_size=0` | a damaged or forged file is an error, not a crash |
//! | `busy_timeout=5000` | the window and a terminal take turns |
//! | `journal_size_limit=4 MiB` | the log of changes does not keep its largest size for ever |
//!
//! # Revisions
//!
//! Records are append-only: a correction is a new revision that names the one it replaces, and triggers refuse any
//! update or delete. Merging two ledgers is then a union, and two corrections made apart are both kept.
//!
//! # The file
//!
//! A file of another program or of a newer schema is refused and left as it is. An older one is copied aside before it is
//! migrated. A damaged file is never written to: what can be read of it is carried over into a new one, which takes its
//! place while the damaged one stands aside under another name. All of it survives being killed half way.
//!
//! Why things are as they are: `docs/decisions/ledger.md`.

mod at;
mod beside;
mod draft;
mod error;
mod id;
mod look;
mod open;
mod pages;
mod preference;
mod record;
mod salvage;
mod schema;
mod turn;

pub use at::At;
pub use draft::Draft;
pub use error::{OpenError, WriteError};
pub use id::{BadId, DraftId, EntryId, EquipmentId, InstrumentId, RevisionId, SiteId, VisitId};
pub use open::{Event, Ledger, Opened};
pub use record::{Body, Head, Kind, RecordId, ResultRow, Revision, Within};
pub use salvage::Salvaged;
pub use schema::{APPLICATION_ID, SCHEMA};
