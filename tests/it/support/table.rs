//! Reference tables: `tests/reference/*.csv` as rows that can be compared with.
//!
//! `#` starts a comment line; the first other line names the columns; cells hold no commas. The tolerance of a
//! row is `last digit` (0.6 of the last digit printed in the expected cell), `relative X`, `absolute X`, or
//! `deviation`, which the test puts a number to.

use std::fmt::Write as _;
use std::path::{Path, PathBuf};

/// How far a value may lie from the one in the table.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Tolerance {
    /// 0.6 of the last digit of the expected cell.
    LastDigit,
    /// Of the expected value.
    Relative(f64),
    /// In the column's unit.
    Absolute(f64),
    /// Follows from how near the section comes to the shape of the table.
    Deviation,
}

/// One file.
pub struct Table {
    pub file_name: String,
    pub columns: Vec<String>,
    pub rows: Vec<Row>,
}

/// One row, and what was found to differ from it.
pub struct Row {
    file_name: String,
    cells: Vec<(String, String)>,
}

/// Differences found, reported together.
#[derive(Default)]
pub struct Findings {
    n_compared: usize,
    words: String,
}

/// The directory of the tables.
pub fn directory() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/reference")
}

/// Reads a table; a malformed one is an error of the test suite.
pub fn table(file_name: &str) -> Table {
    let text = std::fs::read_to_string(directory().join(file_name)).unwrap_or_else(|e| panic!("{file_name}: {e}"));
    let mut lines = text.lines().filter(|line| !line.starts_with('#') && !line.trim().is_empty());
    let split = |line: &str| line.split(',').map(|cell| cell.trim().to_owned()).collect::<Vec<_>>();
    let columns = split(lines.next().unwrap_or_else(|| panic!("{file_name}: no columns")));
    let rows = lines
        .map(|line| {
            let cells = split(line);
            assert_eq!(cells.len(), columns.len(), "{file_name}: cells of the row `{line}`");
            Row { file_name: file_name.to_owned(), cells: columns.iter().cloned().zip(cells).collect() }
        })
        .collect();
    Table { file_name: file_name.to_owned(), columns, rows }
}

impl Row {
    /// The text of a cell.
    pub fn text(&self, column: &str) -> &str {
        let cell = self.cells.iter().find(|(name, _)| name == column);
        cell.map(|(_, text)| text.as_str()).unwrap_or_else(|| panic!("{}: no column {column}", self.file_name))
    }

    /// Its name.
    pub fn id(&self) -> &str {
        self.text("id")
    }

    /// The number in a cell, none where the source gives none.
    pub fn given(&self, column: &str) -> Option<f64> {
        let text = self.text(column);
        (!text.is_empty()).then(|| {
            text.parse().unwrap_or_else(|_| panic!("{}, {}: {column} is `{text}`", self.file_name, self.id()))
        })
    }

    /// The number in a cell that must have one.
    pub fn number(&self, column: &str) -> f64 {
        self.given(column).unwrap_or_else(|| panic!("{}, {}: {column} is empty", self.file_name, self.id()))
    }

    /// The row's tolerance.
    pub fn tolerance(&self) -> Tolerance {
        let text = self.text("tolerance");
        let number = |rest: &str| rest.trim().parse().unwrap_or_else(|_| panic!("{}: tolerance {text}", self.id()));
        match text.split_once(' ') {
            Some(("last", "digit")) => Tolerance::LastDigit,
            Some(("relative", rest)) => Tolerance::Relative(number(rest)),
            Some(("absolute", rest)) => Tolerance::Absolute(number(rest)),
            None if text == "deviation" => Tolerance::Deviation,
            _ => panic!("{}, {}: tolerance `{text}`", self.file_name, self.id()),
        }
    }

    /// Compares a cell, where the source gives one, by the row's own tolerance.
    pub fn compare(&self, findings: &mut Findings, column: &str, got: f64) {
        let Some(expected) = self.given(column) else { return };
        let allowed = match self.tolerance() {
            Tolerance::LastDigit => {
                let n_decimals = self.text(column).split_once('.').map_or(0, |(_, decimals)| decimals.len());
                0.6 * 10.0_f64.powi(-(n_decimals as i32))
            }
            Tolerance::Relative(share) => share * expected.abs(),
            Tolerance::Absolute(size) => size,
            Tolerance::Deviation => panic!("{}: the test must put a number to the deviation", self.id()),
        };
        self.compare_within(findings, column, got, allowed);
    }

    /// Compares a cell, where the source gives one, by a tolerance that the test states.
    pub fn compare_within(&self, findings: &mut Findings, column: &str, got: f64, allowed: f64) {
        let Some(expected) = self.given(column) else { return };
        findings.n_compared += 1;
        if (got - expected).abs() <= allowed {
            return;
        }
        let inputs: Vec<String> = self.cells.iter().map(|(name, text)| format!("{name} {text}")).collect();
        let _ = writeln!(
            findings.words,
            "{}, {}: {column}: expected {expected}, got {got} (off by {:.3e}, tolerance {allowed:.3e})\n    {}",
            self.file_name,
            self.id(),
            got - expected,
            inputs.join("; ")
        );
    }
}

impl Findings {
    /// Fails with every difference, or if fewer than `n_least` values were compared.
    pub fn report(self, n_least: usize) {
        assert!(self.words.is_empty(), "values that differ from their table:\n{}", self.words);
        assert!(self.n_compared >= n_least, "compared {} values, expected at least {n_least}", self.n_compared);
    }
}
