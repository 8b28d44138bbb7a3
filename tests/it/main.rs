//! The integration tests: one binary.

mod cli;
mod json;
mod program;
mod tidy;
