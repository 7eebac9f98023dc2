//! Who may open, build, migrate or set aside the file: one process at a time.
//!
//! SQLite's own locks order the writes of several processes. They do not cover what happens around the file when it is
//! opened: making it, copying it aside, renaming a damaged one. So each open ledger holds a shared lock on a small
//! file beside it, and those acts need the exclusive one. The system gives both back when a process dies.

use std::fs::{File, TryLockError};
use std::path::Path;
use std::time::Duration;

use crate::OpenError;
use crate::beside::with_suffix;

/// How long another process may take to open the ledger before we give up: a migration of a large file takes seconds.
const PATIENCE: Duration = Duration::from_secs(20);
const PAUSE: Duration = Duration::from_millis(20);

/// The right to open the ledger, and after that the sign that it is open.
#[derive(Debug)]
pub(crate) struct Turn {
    file: File,
    /// Nobody else has the ledger open.
    pub(crate) alone: bool,
}

impl Turn {
    /// Waits while another process is opening the ledger at `path`.
    pub(crate) fn wait_for(path: &Path) -> Result<Self, OpenError> {
        let disk = |source| OpenError::Disk { path: path.to_owned(), source };
        let beside = with_suffix(path, "-lock");
        let file =
            File::options().create(true).truncate(false).write(true).open(beside).map_err(disk)?;
        let mut waited = Duration::ZERO;
        loop {
            match file.try_lock() {
                Ok(()) => return Ok(Self { file, alone: true }),
                // Where the system has no such locks (some phones), the app's data are in one process's hands anyway.
                Err(TryLockError::Error(error))
                    if error.kind() == std::io::ErrorKind::Unsupported =>
                {
                    return Ok(Self { file, alone: true });
                }
                Err(TryLockError::Error(source)) => return Err(disk(source)),
                Err(TryLockError::WouldBlock) => {}
            }
            if file.try_lock_shared().is_ok() {
                return Ok(Self { file, alone: false });
            }
            if waited >= PATIENCE {
                return Err(OpenError::InUse { path: path.to_owned() });
            }
            std::thread::sleep(PAUSE);
            waited += PAUSE;
        }
    }

    /// Opening is over: others may open now, but not set the file aside.
    pub(crate) fn share(&mut self) {
        if self.alone {
            // Refused only where there are no such locks. Another process may take its turn between the two lines: it
            // finds a sound ledger and shares in its turn.
            let _ = self.file.unlock();
            let _ = self.file.lock_shared();
            self.alone = false;
        }
    }
}
