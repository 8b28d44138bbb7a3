//! Scenario files: bytes to study and back. Knows no file system and no screen, and judges nothing: a negative
//! density is read here and refused by [`Study::validate`].
//!
//! The text is RON. It begins with its version; each version has a module with its frozen file structs, and
//! [`write()`] always writes the newest. Every number carries its unit in its key. Text comes from anywhere, so size,
//! nesting and the length of every list are bounded, and numbers are finite.

mod fault;
mod head;
mod limits;
mod list;
mod number;
mod v1;
mod writer;

use ron::extensions::Extensions;

use crate::problem::{Place, Problem};
use crate::study::Study;

pub use limits::*;

/// The version that [`write()`] writes, and the newest that [`parse`] reads.
pub const VERSION: u64 = 1;

/// Reads a scenario's text; every fault with line, column and hint.
pub fn parse(bytes: &[u8]) -> Result<Study, Vec<Problem>> {
    if bytes.len() > MAX_FILE_BYTES {
        return Err(vec![Problem::fault(
            Place::Text { line: 1, column: 1 },
            format!("the file is larger than {} MiB", MAX_FILE_BYTES >> 20),
            "this is probably not a scenario; a scenario takes a few kB",
        )]);
    }
    let text = std::str::from_utf8(bytes).map_err(|e| vec![fault::not_utf8(bytes, &e)])?;
    let text = text.strip_prefix('\u{feff}').unwrap_or(text);
    match head::version(text).map_err(|p| vec![p])? {
        head::Version::V1 => read::<v1::Scenario>(text).map(Study::from),
    }
}

/// Writes a study as scenario text, in stable order. Reading it back gives the same study up to the fifteenth
/// significant digit, and writing that gives the same text.
pub fn write(study: &Study) -> String {
    writer::text(study)
}

fn read<T: serde::de::DeserializeOwned>(text: &str) -> Result<T, Vec<Problem>> {
    ron::Options::default()
        .with_default_extension(Extensions::IMPLICIT_SOME)
        .with_recursion_limit(MAX_NESTING)
        .from_str(text)
        .map_err(|e| vec![fault::describe(text, &e)])
}
