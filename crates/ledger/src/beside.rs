//! Files beside the ledger: their names, copies of older schemas, damaged ones, new ones on their way in.

use std::fs::File;
use std::io;
use std::path::{Path, PathBuf};

use rusqlite::{Connection, OpenFlags};

use crate::look::sound;
use crate::{At, OpenError};

/// Copies of older schemas that are kept.
const COPIES: usize = 3;

/// What SQLite keeps beside a file in use. They belong to it and move with it.
pub(crate) const COMPANIONS: [&str; 3] = ["-wal", "-shm", "-journal"];

/// `ledger.dewledger` and `-wal`: `ledger.dewledger-wal`.
pub(crate) fn with_suffix(path: &Path, suffix: &str) -> PathBuf {
    let mut name = path.as_os_str().to_owned();
    name.push(suffix);
    PathBuf::from(name)
}

/// `ledger.dewledger` and `damaged-`: `damaged-ledger.dewledger`, in the same folder.
fn with_prefix(path: &Path, prefix: &str) -> PathBuf {
    let mut name = std::ffi::OsString::from(prefix);
    name.push(path.file_name().unwrap_or_default());
    path.with_file_name(name)
}

/// Makes renames in the folder of `path` last through a power cut. Where a folder cannot be synced, nothing is lost
/// but that.
pub(crate) fn sync_folder(path: &Path) {
    let folder = path.parent().filter(|folder| !folder.as_os_str().is_empty());
    if let Ok(folder) = File::open(folder.unwrap_or(Path::new("."))) {
        let _ = folder.sync_all();
    }
}

fn remove_with_companions(path: &Path) -> io::Result<()> {
    for file in COMPANIONS.map(|suffix| with_suffix(path, suffix)).iter().chain([&path.to_owned()])
    {
        match std::fs::remove_file(file) {
            Err(error) if error.kind() != io::ErrorKind::NotFound => return Err(error),
            _ => {}
        }
    }
    Ok(())
}

/// A new ledger on its way in: built beside, then renamed into place, so that a kill leaves the old state or the new.
#[derive(Debug)]
pub(crate) struct Incoming {
    /// Where it is built.
    pub(crate) built: PathBuf,
    /// Where what stands at the ledger's path goes.
    damaged: PathBuf,
}

impl Incoming {
    const PREFIX: &str = "incoming-";

    fn of(path: &Path, stamp: i64) -> Self {
        Self {
            built: with_prefix(path, &format!("{}{stamp}-", Self::PREFIX)),
            damaged: with_prefix(path, &format!("damaged-{stamp}-")),
        }
    }

    /// A place to build in.
    pub(crate) fn begin(path: &Path, now: At) -> Result<Self, OpenError> {
        // Two in one millisecond, or a clock set back, must not meet.
        let mut stamp = now.ms;
        let mut incoming = Self::of(path, stamp);
        while incoming.damaged.exists() {
            stamp += 1;
            incoming = Self::of(path, stamp);
        }
        remove_with_companions(&incoming.built)
            .map_err(|source| OpenError::Disk { path: path.to_owned(), source })?;
        Ok(incoming)
    }

    /// One that a kill left behind. While something stands at the ledger's path it may be half built: it is removed.
    /// Where nothing stands there it is whole, because the old file is moved only after the new one was built.
    pub(crate) fn left_behind(path: &Path) -> Result<Option<Self>, OpenError> {
        let disk = |source| OpenError::Disk { path: path.to_owned(), source };
        let stamps = stamped(path, Self::PREFIX);
        if std::fs::exists(path).map_err(disk)? {
            for (stamp, _) in stamps {
                remove_with_companions(&Self::of(path, stamp).built).map_err(disk)?;
            }
            return Ok(None);
        }
        // Nothing was ever at the path where no damaged file of the same stamp stands aside: the first opening was
        // killed while it built.
        for (stamp, _) in stamps {
            let incoming = Self::of(path, stamp);
            // Of a ledger whose file was gone, the log alone is moved aside.
            if ["", "-wal"].iter().any(|suffix| with_suffix(&incoming.damaged, suffix).exists()) {
                return Ok(Some(incoming));
            }
            remove_with_companions(&incoming.built).map_err(disk)?;
        }
        Ok(None)
    }

    /// Moves what stands at `path` aside, companions included, and the new ledger in. Says where the old one went.
    pub(crate) fn swap(self, path: &Path) -> Result<PathBuf, OpenError> {
        let swap = || -> io::Result<()> {
            for suffix in [""].into_iter().chain(COMPANIONS) {
                match std::fs::rename(with_suffix(path, suffix), with_suffix(&self.damaged, suffix))
                {
                    Err(error) if error.kind() != io::ErrorKind::NotFound => return Err(error),
                    _ => {}
                }
            }
            sync_folder(path);
            std::fs::rename(&self.built, path)
        };
        swap().map_err(|source| OpenError::Disk { path: path.to_owned(), source })?;
        sync_folder(path);
        Ok(self.damaged)
    }
}

/// Files beside `path` that are named prefix, number, hyphen, its name; with the number, in the order of the numbers.
fn stamped(path: &Path, prefix: &str) -> Vec<(i64, PathBuf)> {
    let folder = path.parent().filter(|folder| !folder.as_os_str().is_empty());
    let name = path.file_name().unwrap_or_default().to_string_lossy().into_owned();
    let number = |file: &Path| -> Option<i64> {
        let file = file.file_name()?.to_str()?;
        file.strip_prefix(prefix)?.strip_suffix(&name)?.strip_suffix('-')?.parse().ok()
    };
    let mut found: Vec<_> = std::fs::read_dir(folder.unwrap_or(Path::new(".")))
        .map(|files| files.flatten().map(|file| file.path()).collect::<Vec<_>>())
        .unwrap_or_default()
        .into_iter()
        .filter_map(|file| Some((number(&file)?, file)))
        .collect();
    found.sort();
    found
}

/// A whole and checked copy of `path`, written to `to`, which must not exist. Nothing stands at `to` unless it is sound.
pub(crate) fn copy_whole(from: &Connection, to: &Path) -> Result<(), CopyError> {
    if std::fs::exists(to)? {
        return Err(io::Error::from(io::ErrorKind::AlreadyExists).into());
    }
    let half = with_suffix(to, "-half");
    remove_with_companions(&half)?;
    let copied = copy_and_check(from, &half)
        .and_then(|()| std::fs::rename(&half, to).map_err(CopyError::from));
    if copied.is_err() {
        // What is left of it is worth nothing; where it cannot be removed, its name says so.
        let _ = remove_with_companions(&half);
        return copied;
    }
    sync_folder(to);
    Ok(())
}

fn copy_and_check(from: &Connection, half: &Path) -> Result<(), CopyError> {
    let text = half.to_str().ok_or(io::Error::from(io::ErrorKind::InvalidFilename))?;
    from.execute("VACUUM INTO ?1", [text])?;
    let copy = Connection::open_with_flags(half, OpenFlags::SQLITE_OPEN_READ_WRITE)?;
    if !sound(&copy)? {
        return Err(CopyError::Unsound);
    }
    copy.close().map_err(|(_, error)| error)?;
    // SQLite does not promise that the copy is on the disk.
    File::options().write(true).open(half)?.sync_all()?;
    Ok(())
}

/// Why no copy was made.
#[derive(Debug, thiserror::Error)]
pub(crate) enum CopyError {
    #[error(transparent)]
    Sql(#[from] rusqlite::Error),
    #[error(transparent)]
    Disk(#[from] io::Error),
    #[error("the copy did not read back as it should")]
    Unsound,
}

/// A whole copy of an older schema, before it is migrated; the newest few are kept.
pub(crate) fn copy_aside(path: &Path, schema: i64, now: At) -> Result<PathBuf, OpenError> {
    let prefix = format!("schema{schema}-");
    let connection = Connection::open_with_flags(path, OpenFlags::SQLITE_OPEN_READ_ONLY)?;
    for (_, half) in stamped(&with_suffix(path, "-half"), &prefix) {
        // Left by a kill. Where it cannot be removed, its name says what it is.
        let _ = remove_with_companions(&half);
    }
    let mut stamp = now.ms;
    let mut copy = with_prefix(path, &format!("{prefix}{stamp}-"));
    while copy.exists() {
        stamp += 1;
        copy = with_prefix(path, &format!("{prefix}{stamp}-"));
    }
    copy_whole(&connection, &copy).map_err(|error| match error {
        CopyError::Sql(error) => OpenError::Sql(error),
        CopyError::Disk(source) => OpenError::Disk { path: copy.clone(), source },
        CopyError::Unsound => OpenError::Disk {
            path: copy.clone(),
            source: io::Error::new(io::ErrorKind::InvalidData, error.to_string()),
        },
    })?;
    let mut copies: Vec<_> =
        (1..=schema).flat_map(|schema| stamped(path, &format!("schema{schema}-"))).collect();
    copies.sort();
    for (_, old) in copies.iter().rev().skip(COPIES) {
        // A copy that cannot be removed does no harm.
        let _ = std::fs::remove_file(old);
    }
    Ok(copy)
}
