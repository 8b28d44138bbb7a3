//! The document, its edits and its history. No egui here: the window reads and proposes, this applies.
//!
//! Four kinds of state are never mixed: the document (here), the view (the window's), derived results (here,
//! tagged with the revision) and gestures (the window's).

mod background;
mod document;
mod edit;
mod examples;
mod files;
mod job;
mod mend;
mod plates;

pub use background::Background;
pub use document::{Derived, Document, Step};
pub use edit::{Edit, apply};
pub use examples::{EXAMPLES, Example};
pub use files::{FileError, load, save_atomic, write_atomic};
pub use job::{Job, Workers};
pub use mend::{Mend, mend};
pub use plates::{equally_spaced, plate_across, shifted_along_walls, with_length_kept_openings};
