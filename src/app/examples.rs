//! The demo scenarios, built into the program.

/// One example.
pub struct Example {
    /// File name in `scenarios/`.
    pub file_name: &'static str,
    /// Its text.
    pub text: &'static str,
}

/// All examples; the first is shown on first start.
pub const EXAMPLES: &[Example] = &[];
