//! Rows of columns under a heading, each column as wide as what stands in it.

use super::lines::{Lines, WIDTH, left, printable, right, width};

/// Where the text of a column stands.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Side {
    /// At its left.
    Left,
    /// At its right: numbers.
    Right,
}

/// A table under construction.
pub(super) struct Grid {
    sides: Vec<Side>,
    rows: Vec<Vec<String>>,
}

/// What stands before every row.
const INDENT: usize = 3;

/// Spaces between columns.
const BETWEEN: usize = 2;

impl Grid {
    /// The heading of each column and where its text stands. The first column holds names and the last one, when at
    /// the left, text that may wrap.
    pub(super) fn new(columns: &[(&str, Side)]) -> Grid {
        let sides = columns.iter().map(|c| c.1).collect();
        Grid { sides, rows: vec![columns.iter().map(|c| c.0.to_owned()).collect()] }
    }

    /// One text a column.
    pub(super) fn row(&mut self, row: impl IntoIterator<Item = String>) {
        self.rows.push(row.into_iter().map(|text| printable(&text)).collect());
    }

    /// Writes it after an empty line; nothing where there is but the heading.
    pub(super) fn write(&self, lines: &mut Lines) {
        if self.rows.len() < 2 {
            return;
        }
        let columns = self.columns();
        let last = columns.len() - 1;
        lines.gap();
        if INDENT + columns.iter().map(|w| w + BETWEEN).sum::<usize>() - BETWEEN > WIDTH {
            return self.write_as_facts(lines);
        }
        for row in &self.rows {
            let mut first = row[0].as_str();
            if width(first) > columns[0] {
                // A name that is too long has lines of its own.
                lines.facts(&" ".repeat(INDENT), [first]);
                first = "";
            }
            let mut start = " ".repeat(INDENT) + &left(first, columns[0]);
            for i in 1..last {
                start += &(" ".repeat(BETWEEN) + &self.in_column(i, &row[i], columns[i]));
            }
            start += &" ".repeat(BETWEEN);
            lines.facts(&start, [self.in_column(last, &row[last], columns[last])]);
        }
    }

    /// Where numbers are too long to stand beside one another: row by row, each with its heading.
    fn write_as_facts(&self, lines: &mut Lines) {
        let headings = &self.rows[0];
        for row in &self.rows[1..] {
            let start = if row[0].is_empty() { String::new() } else { format!("{}  ", row[0]) };
            let rest = headings.iter().zip(row).skip(1).filter(|(_, text)| !text.is_empty());
            let facts = rest.map(|(heading, text)| format!("{heading} {text}").trim_start().to_owned());
            if width(&start) + INDENT > WIDTH / 2 {
                lines.facts(&" ".repeat(INDENT), [start]);
                lines.facts(&" ".repeat(2 * INDENT), facts);
            } else {
                lines.facts(&(" ".repeat(INDENT) + &start), facts);
            }
        }
    }

    fn in_column(&self, i: usize, text: &str, columns: usize) -> String {
        match self.sides[i] {
            Side::Right => right(text, columns),
            // The last one wraps.
            Side::Left if i + 1 == self.sides.len() => text.to_owned(),
            Side::Left => left(text, columns),
        }
    }

    /// Columns of text that each column takes: the names what the others leave, at most.
    fn columns(&self) -> Vec<usize> {
        const LEAST_NAME: usize = 8;
        const LEAST_TEXT: usize = 24;
        let widest = |i: usize| self.rows.iter().map(|row| width(&row[i])).max().unwrap_or(0);
        let mut columns: Vec<usize> = (0..self.sides.len()).map(widest).collect();
        if let (Some(Side::Left), Some(text)) = (self.sides.last(), columns.last_mut()) {
            *text = LEAST_TEXT.min(*text);
        }
        let others: usize = columns[1..].iter().map(|w| w + BETWEEN).sum();
        let most = WIDTH.saturating_sub(INDENT + others).max(LEAST_NAME);
        columns[0] = self.rows.iter().map(|row| width(&row[0])).filter(|&w| w <= most).max().unwrap_or(0);
        columns
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn text(grid: &Grid) -> String {
        let mut lines = Lines::default();
        grid.write(&mut lines);
        lines.into_text()
    }

    #[test]
    fn columns_are_as_wide_as_what_stands_in_them() {
        let mut grid = Grid::new(&[("cell", Side::Left), ("still", Side::Right), ("in", Side::Left)]);
        grid.row(["cell 1".into(), "1.250 m³".into(), "aft".into()]);
        grid.row(["cell 12".into(), "–".into(), "".into()]);
        let want = "\n   cell        still  in\n   cell 1   1.250 m³  aft\n   cell 12         –\n";
        assert_eq!(text(&grid), want);
    }

    #[test]
    fn a_long_name_has_a_line_of_its_own_and_long_text_wraps() {
        let mut grid = Grid::new(&[("cell", Side::Left), ("still", Side::Right), ("in", Side::Left)]);
        grid.row([["name"; 20].join(" "), "1 m³".into(), ["word"; 20].join(" ")]);
        grid.row(["b".into(), "2 m³".into(), "aft".into()]);
        let text = text(&grid);
        assert!(text.lines().all(|line| width(line) <= 80), "{text}");
        for (word, n) in [("name", 20), ("word", 20)] {
            assert_eq!(text.split_whitespace().filter(|w| *w == word).count(), n, "{text}");
        }
        assert!(text.ends_with("\n   b      2 m³  aft\n"), "the other names keep their column: {text}");
    }

    #[test]
    fn numbers_too_long_for_columns_stand_row_by_row() {
        let mut grid = Grid::new(&[("state", Side::Left), ("settled", Side::Right), ("sealed", Side::Right)]);
        grid.row(["moment".into(), "1".repeat(36) + " lbf ft", "2".repeat(36) + " lbf ft"]);
        let (settled, sealed) = ("1".repeat(36), "2".repeat(36));
        assert_eq!(
            text(&grid),
            format!("\n   moment  settled {settled} lbf ft\n           sealed {sealed} lbf ft\n")
        );
    }

    #[test]
    fn a_heading_alone_is_nothing() {
        assert_eq!(text(&Grid::new(&[("cell", Side::Left), ("still", Side::Right)])), "");
    }
}
