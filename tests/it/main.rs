//! The integration tests: one binary, one module a subject.

mod arbitrary;
mod edits;
mod files;
mod scenario;
