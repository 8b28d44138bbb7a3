//! The integration tests, one binary.

mod arbitrary;
mod edits;
mod files;
mod scenario;
