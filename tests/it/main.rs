//! The integration tests: one binary, one module a subject.

mod arbitrary;
mod cli;
mod edits;
mod examples;
mod files;
mod json;
mod program;
mod scenario;
mod tidy;
