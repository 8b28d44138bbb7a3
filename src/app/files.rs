//! Reading and writing scenario files. The only place below the screens that touches the disk.

use std::path::{Path, PathBuf};

use crate::problem::Problem;
use crate::study::Study;

/// Why a file could not be read or written.
#[derive(Debug, thiserror::Error)]
pub enum FileError {
    /// The operating system says no.
    #[error("{path}: {error}", path = path.display())]
    Io {
        /// The file.
        path: PathBuf,
        /// What the system says.
        error: std::io::Error,
    },
    /// The text is not a scenario.
    #[error("{path}: {n} faults", path = path.display(), n = problems.len())]
    Unreadable {
        /// The file.
        path: PathBuf,
        /// With line and column.
        problems: Vec<Problem>,
    },
}

/// Reads a scenario file.
pub fn load(path: &Path) -> Result<Study, FileError> {
    let _ = path;
    todo!()
}

/// Writes a scenario file so that a crash at any moment leaves either the old file or the new one.
pub fn save_atomic(path: &Path, study: &Study) -> Result<(), FileError> {
    let _ = (path, study);
    todo!()
}
