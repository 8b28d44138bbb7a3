//! Lines of a scenario, and the small pieces that they are made of.

use crate::geom::Point;

use super::super::number::{deg, mm};

/// Lines, indented by the depth of brackets.
#[derive(Default)]
pub(super) struct Text {
    text: String,
    depth: usize,
}

impl Text {
    pub fn line(&mut self, line: &str) {
        self.text.extend(std::iter::repeat_n("    ", self.depth));
        self.text.push_str(line);
        self.text.push('\n');
    }

    pub fn open(&mut self, line: &str) {
        self.line(line);
        self.depth += 1;
    }

    pub fn close(&mut self, line: &str) {
        self.depth -= 1;
        self.line(line);
    }

    pub fn key(&mut self, key: &str, value: &str) {
        self.line(&format!("{key}: {value},"));
    }

    /// A text that may be left out when there is none.
    pub fn optional_text(&mut self, key: &str, text: &str) {
        if !text.is_empty() {
            self.key(key, &quoted(text));
        }
    }

    /// A list that a scenario must have, empty or not.
    pub fn list<T>(&mut self, key: &str, items: &[T], item: impl Fn(&mut Text, &T)) {
        if items.is_empty() {
            return self.key(key, "[]");
        }
        self.open(&format!("{key}: ["));
        for i in items {
            item(self, i);
        }
        self.close("],");
    }

    /// A list that may be left out when it is empty.
    pub fn optional_list<T>(&mut self, key: &str, items: &[T], item: impl Fn(&mut Text, &T)) {
        if !items.is_empty() {
            self.list(key, items, item);
        }
    }

    pub fn into_string(self) -> String {
        self.text
    }
}

pub(super) fn at(point: Point) -> String {
    format!("s_mm: {}, z_mm: {}", mm(point.x), mm(point.y))
}

pub(super) fn sweep(sweep_rad: f64) -> String {
    if sweep_rad == 0.0 { String::new() } else { format!(", sweep_deg: {}", deg(sweep_rad)) }
}

/// A text between quotes, on one line.
pub(super) fn quoted(text: &str) -> String {
    let mut out = String::with_capacity(text.len() + 2);
    out.push('"');
    for c in text.chars() {
        match c {
            '"' => out.push_str("\\\""),
            '\\' => out.push_str("\\\\"),
            '\n' => out.push_str("\\n"),
            '\t' => out.push_str("\\t"),
            c if c.is_control() => out.push_str(&format!("\\u{{{:x}}}", c as u32)),
            c => out.push(c),
        }
    }
    out.push('"');
    out
}
