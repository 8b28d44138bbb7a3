//! The integration tests: one binary, one module a subject.

mod cli;
mod json;
mod program;
mod tidy;
