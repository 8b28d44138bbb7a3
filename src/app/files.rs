//! Reading and writing scenario files. The only place below the screens that touches the disk.
//!
//! Knows no window and no scenario syntax.

use std::fs::{self, File};
use std::io::{self, Read, Write};
use std::path::{Path, PathBuf};

use crate::problem::{Place, Problem};
use crate::scenario;
use crate::study::Study;

/// Links that are followed to the file behind them; more than this is a ring.
const MAX_LINKS: usize = 40;

/// Why a file could not be read or written.
#[derive(Debug, thiserror::Error)]
pub enum FileError {
    /// The operating system says no.
    #[error("{path} cannot be {action}: {}; {}", io_words(error, action).0, io_words(error, action).1, path = path.display())]
    Io {
        /// The file.
        path: PathBuf,
        /// `read` or `saved`.
        action: &'static str,
        /// What the system says.
        error: io::Error,
    },
    /// The text is not a scenario.
    #[error("{path} cannot be read: {faults}", path = path.display(), faults = counted(problems))]
    Unreadable {
        /// The file.
        path: PathBuf,
        /// With line and column.
        problems: Vec<Problem>,
    },
    /// The study would give a file that cannot be read again; nothing was written.
    #[error("{path} was not saved, since it could not be read again: {faults}", path = path.display(), faults = counted(problems))]
    Unwritable {
        /// The file.
        path: PathBuf,
        /// With line and column of the text that was not written.
        problems: Vec<Problem>,
    },
}

impl FileError {
    /// The file.
    pub fn path(&self) -> &Path {
        match self {
            FileError::Io { path, .. } | FileError::Unreadable { path, .. } | FileError::Unwritable { path, .. } => {
                path
            }
        }
    }

    /// The faults, each with what to do.
    pub fn into_problems(self) -> Vec<Problem> {
        match self {
            FileError::Io { path, action, error } => {
                let (message, hint) = io_words(&error, action);
                let message = format!("{} cannot be {action}: {message}", path.display());
                vec![Problem::fault(Place::Field("file"), message, hint)]
            }
            FileError::Unreadable { problems, .. } | FileError::Unwritable { problems, .. } => problems,
        }
    }
}

/// Reads a scenario file. A file that is too large is refused without reading it whole.
pub fn load(path: &Path) -> Result<Study, FileError> {
    let bytes = read_bounded(path).map_err(|error| FileError::Io { path: path.into(), action: "read", error })?;
    scenario::parse(&bytes).map_err(|problems| FileError::Unreadable { path: path.into(), problems })
}

/// Writes a scenario file so that a crash at any moment leaves either the old file or the new one.
///
/// The text goes to a new file in the same folder, which then takes the place of the old one. Permissions and owner
/// of the old file are kept, a link stays a link. When it fails, the old file is as it was.
pub fn save_atomic(path: &Path, study: &Study) -> Result<(), FileError> {
    let text = scenario::write(study);
    scenario::parse(text.as_bytes()).map_err(|problems| FileError::Unwritable { path: path.into(), problems })?;
    write_atomic(path, text.as_bytes())
}

/// Writes any other file in the same careful way.
pub fn write_atomic(path: &Path, bytes: &[u8]) -> Result<(), FileError> {
    replace(path, bytes).map_err(|error| FileError::Io { path: path.into(), action: "saved", error })
}

fn read_bounded(path: &Path) -> io::Result<Vec<u8>> {
    let mut bytes = Vec::new();
    File::open(path)?.take(scenario::MAX_FILE_BYTES as u64 + 1).read_to_end(&mut bytes)?;
    Ok(bytes)
}

fn replace(path: &Path, bytes: &[u8]) -> io::Result<()> {
    let target = behind_links(path)?;
    let old = match fs::metadata(&target) {
        Ok(old) => Some(old),
        Err(e) if e.kind() == io::ErrorKind::NotFound => None,
        Err(e) => return Err(e),
    };
    if let Some(old) = &old {
        if old.is_dir() {
            return Err(io::ErrorKind::IsADirectory.into());
        }
        if !old.is_file() {
            return Err(io::Error::new(io::ErrorKind::InvalidInput, "this is a device or a pipe, not a file"));
        }
        // The system would let a file that is marked read-only be replaced; whoever marked it meant otherwise.
        if old.permissions().readonly() {
            return Err(io::ErrorKind::PermissionDenied.into());
        }
    }
    let folder = match target.parent() {
        Some(folder) if folder.as_os_str().is_empty() => Path::new("."),
        Some(folder) => folder,
        None => return Err(io::ErrorKind::IsADirectory.into()),
    };
    // Dropped on any failure below, which deletes the temporary file.
    let mut temporary = create_in(folder)?;
    temporary.write_all(bytes)?;
    temporary.flush()?;
    if let Some(old) = &old {
        keep_owner(temporary.as_file(), old);
        temporary.as_file().set_permissions(old.permissions())?;
    }
    temporary.as_file().sync_all()?;
    temporary.persist(&target).map_err(|e| e.error)?;
    // The new file is in place. Should the folder not sync, a power cut may bring the old one back, whole.
    #[cfg(unix)]
    let _ = File::open(folder).and_then(|folder| folder.sync_all());
    Ok(())
}

/// The file to replace: what a link points at, so that the link stays.
fn behind_links(path: &Path) -> io::Result<PathBuf> {
    let mut target = path.to_owned();
    for _ in 0..MAX_LINKS {
        match fs::symlink_metadata(&target) {
            Ok(metadata) if metadata.is_symlink() => {
                let to = fs::read_link(&target)?;
                target = target.parent().unwrap_or(Path::new("")).join(to);
            }
            _ => return Ok(target),
        }
    }
    Err(io::Error::other("its links go round in a ring"))
}

fn create_in(folder: &Path) -> io::Result<tempfile::NamedTempFile> {
    let mut builder = tempfile::Builder::new();
    builder.prefix(".brimwright-").suffix(".part");
    // As any new file: the user's mask applies.
    #[cfg(unix)]
    builder.permissions(std::os::unix::fs::PermissionsExt::from_mode(0o666));
    builder.tempfile_in(folder)
}

/// Best effort: only a privileged user may give a file away.
#[cfg(unix)]
fn keep_owner(file: &File, old: &fs::Metadata) {
    use std::os::unix::fs::{MetadataExt, fchown};
    let _ = fchown(file, Some(old.uid()), Some(old.gid()));
}

#[cfg(not(unix))]
fn keep_owner(_: &File, _: &fs::Metadata) {}

/// What the system says, and what to do.
fn io_words(error: &io::Error, action: &str) -> (String, &'static str) {
    use io::ErrorKind::*;
    let (message, hint) = match (error.kind(), action) {
        (NotFound, "read") => ("there is no such file", "check its name and folder"),
        (NotFound, _) => ("there is no such folder", "make it first, or choose another"),
        (PermissionDenied, "read") => ("you are not allowed to read it", "ask for permission, or open a copy"),
        (PermissionDenied, _) => ("it is read-only for you", "save under another name or in another folder"),
        (ReadOnlyFilesystem, _) => ("the disk is read-only", "save to another disk"),
        (StorageFull | QuotaExceeded | FileTooLarge, _) => {
            ("there is no room for it", "free some space, or save to another disk")
        }
        (IsADirectory, _) => ("it is a folder", "choose a file"),
        (NotADirectory, _) => ("a part of its path is a file, not a folder", "check the path"),
        _ => return (error.to_string(), "try another file or folder"),
    };
    (message.to_owned(), hint)
}

fn counted(problems: &[Problem]) -> String {
    match problems {
        [only] => only.to_string(),
        _ => format!("{} faults", problems.len()),
    }
}
