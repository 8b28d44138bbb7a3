//! The integration tests: one binary, one module a subject.

mod arbitrary;
#[cfg(feature = "gui")]
mod board;
mod cli;
mod edits;
mod examples;
mod files;
mod json;
mod program;
mod scenario;
mod tidy;
