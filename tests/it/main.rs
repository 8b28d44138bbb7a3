//! The integration tests: one binary, one module a subject.

mod arbitrary;
mod edits;
mod examples;
mod files;
mod scenario;
