//! The criteria: one a file, and the table of them.
