//! The criteria: one a file, and the table of them.

mod verdict;

pub use verdict::*;
