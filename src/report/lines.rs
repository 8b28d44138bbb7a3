//! Lines of text of a bounded width: labelled facts that wrap between one another, never inside a number and
//! its unit unless a fact alone is too long.

/// Columns that text keeps to.
pub(super) const WIDTH: usize = 80;

/// What stands between two facts of a line.
const BETWEEN: &str = " · ";

/// Text under construction.
#[derive(Default)]
pub(super) struct Lines {
    text: String,
}

impl Lines {
    /// An empty line.
    pub(super) fn gap(&mut self) {
        self.text.push('\n');
    }

    /// `start`, then the facts; wrapped lines go on under the first fact. Nothing without facts.
    pub(super) fn facts<S: AsRef<str>>(&mut self, start: &str, facts: impl IntoIterator<Item = S>) {
        let mut row = printable(start);
        let indent = width(&row);
        let mut is_first = true;
        for fact in facts {
            let fact = printable(fact.as_ref());
            if !is_first {
                if width(&row) + width(BETWEEN) + width(&fact) <= WIDTH {
                    row.push_str(BETWEEN);
                } else {
                    self.end(&mut row, indent);
                }
            }
            is_first = false;
            for (i, word) in words(&fact).enumerate() {
                if i > 0 {
                    if width(&row) + 1 + width(word) <= WIDTH {
                        row.push(' ');
                    } else {
                        self.end(&mut row, indent);
                    }
                }
                row.push_str(word);
            }
        }
        if !is_first {
            self.end(&mut row, 0);
        }
    }

    /// The text.
    pub(super) fn into_text(self) -> String {
        self.text
    }

    fn end(&mut self, row: &mut String, indent: usize) {
        self.text.push_str(row.trim_end_matches(' '));
        self.text.push('\n');
        *row = " ".repeat(indent);
    }
}

/// The words of a text; what follows a figure, its unit, is not parted from it.
fn words(text: &str) -> impl Iterator<Item = &str> {
    let mut rest = Some(text);
    std::iter::from_fn(move || {
        let text = rest?;
        let ends = text.match_indices(' ').map(|(end, _)| end);
        let end = ends.into_iter().find(|&end| !text[..end].ends_with(|c: char| c.is_ascii_digit()));
        rest = end.map(|end| &text[end + 1..]);
        Some(&text[..end.unwrap_or(text.len())])
    })
}

/// Columns that a text takes, one a character.
pub(super) fn width(text: &str) -> usize {
    text.chars().count()
}

/// A text at the left of a column.
pub(super) fn left(text: &str, columns: usize) -> String {
    format!("{text:<columns$}")
}

/// A text at the right of a column.
pub(super) fn right(text: &str, columns: usize) -> String {
    format!("{text:>columns$}")
}

/// The text without characters that could steer a terminal: a scenario may come from anyone.
pub(super) fn printable(text: &str) -> String {
    text.chars().map(|c| if c.is_control() { ' ' } else { c }).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn facts_wrap_between_one_another_under_the_first() {
        let mut lines = Lines::default();
        lines.facts("  fill  ", ["a".repeat(40), "b".repeat(40), "c d".to_owned()]);
        let want = format!("  fill  {}\n        {} · c d\n", "a".repeat(40), "b".repeat(40));
        assert_eq!(lines.into_text(), want);
    }

    #[test]
    fn a_fact_too_long_for_a_line_wraps_between_words() {
        let mut lines = Lines::default();
        lines.facts("note ", [["word"; 40].join(" ")]);
        let text = lines.into_text();
        assert!(text.lines().all(|line| width(line) <= WIDTH), "{text}");
        assert_eq!(text.split_whitespace().count(), 41, "{text}");
    }

    #[test]
    fn a_figure_and_its_unit_stay_together() {
        let words: Vec<&str> = words("at up to 0.65 kPa of gas").collect();
        assert_eq!(words, ["at", "up", "to", "0.65 kPa", "of", "gas"]);
    }

    #[test]
    fn control_characters_of_a_scenario_never_reach_the_terminal() {
        let mut lines = Lines::default();
        lines.facts("", ["red \u{1b}[31m\nnext"]);
        assert_eq!(lines.into_text(), "red  [31m next\n");
    }
}
