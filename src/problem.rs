//! What is wrong with an input, where, and how to mend it.
//!
//! One [`Problem`] a fault; lists of them are handed whole to whoever shows them. Knows no geometry and no
//! screen: a place is an index or a name.

use std::fmt;

/// How bad a [`Problem`] is.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Severity {
    /// Nothing can be judged before it is mended.
    Fault,
    /// Judged all the same; the user should know.
    Warning,
}

/// Where on the study a [`Problem`], a verdict or a value sits. Indices count from zero; shown from one.
#[derive(Clone, Debug, PartialEq)]
pub enum Place {
    /// The study as a whole.
    Whole,
    /// A named input, by the words that the window and the file use for it.
    Field(&'static str),
    /// An edge of the outline.
    Edge(usize),
    /// A vertex of the outline: where edge `i` starts.
    Vertex(usize),
    /// Two edges of the outline that meet where they should not, and the point.
    Crossing {
        /// First edge.
        edge_idx: usize,
        /// Second edge.
        other_idx: usize,
        /// Where they meet, in metres.
        at_m: [f64; 2],
    },
    /// An obstacle, or one of its edges.
    Obstacle {
        /// Which obstacle.
        obstacle_idx: usize,
        /// Which of its edges, where one is meant.
        edge_idx: Option<usize>,
    },
    /// A plate, or one of its openings.
    Plate {
        /// Which plate.
        plate_idx: usize,
        /// Which of its openings, where one is meant.
        opening_idx: Option<usize>,
    },
    /// A compartment with a fill of its own.
    Compartment(usize),
    /// A material of the scenario.
    Material(usize),
    /// A row of the width table.
    WidthRow(usize),
    /// A load case.
    Case(usize),
    /// A named point.
    Point(usize),
    /// A requirement record.
    Record(usize),
    /// A place in a text file; both count from one.
    Text {
        /// Line.
        line: usize,
        /// Column.
        column: usize,
    },
}

impl fmt::Display for Place {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Place::Whole => write!(f, "the scenario"),
            Place::Field(name) => write!(f, "{name}"),
            Place::Edge(i) => write!(f, "edge {}", i + 1),
            Place::Vertex(i) => write!(f, "vertex {}", i + 1),
            Place::Crossing { edge_idx, other_idx, at_m: [s, z] } => {
                write!(f, "edges {} and {} at s {s:.4} m, z {z:.4} m", edge_idx + 1, other_idx + 1)
            }
            Place::Obstacle { obstacle_idx, edge_idx: None } => write!(f, "obstacle {}", obstacle_idx + 1),
            Place::Obstacle { obstacle_idx, edge_idx: Some(e) } => {
                write!(f, "obstacle {}, edge {}", obstacle_idx + 1, e + 1)
            }
            Place::Plate { plate_idx, opening_idx: None } => write!(f, "plate {}", plate_idx + 1),
            Place::Plate { plate_idx, opening_idx: Some(o) } => {
                write!(f, "plate {}, opening {}", plate_idx + 1, o + 1)
            }
            Place::Compartment(i) => write!(f, "compartment {}", i + 1),
            Place::Material(i) => write!(f, "material {}", i + 1),
            Place::WidthRow(i) => write!(f, "width table, row {}", i + 1),
            Place::Case(i) => write!(f, "load case {}", i + 1),
            Place::Point(i) => write!(f, "point {}", i + 1),
            Place::Record(i) => write!(f, "requirement record {}", i + 1),
            Place::Text { line, column } => write!(f, "line {line}, column {column}"),
        }
    }
}

/// One thing that is wrong with an input.
#[derive(Clone, Debug, PartialEq)]
pub struct Problem {
    /// Fault or warning.
    pub severity: Severity,
    /// Where.
    pub place: Place,
    /// What is wrong, with the numbers.
    pub message: String,
    /// How to mend it.
    pub hint: String,
}

impl Problem {
    /// A fault: nothing is judged before it is mended.
    pub fn fault(place: Place, message: impl Into<String>, hint: impl Into<String>) -> Problem {
        Problem { severity: Severity::Fault, place, message: message.into(), hint: hint.into() }
    }

    /// A warning: judged all the same.
    pub fn warning(place: Place, message: impl Into<String>, hint: impl Into<String>) -> Problem {
        Problem { severity: Severity::Warning, ..Problem::fault(place, message, hint) }
    }
}

impl fmt::Display for Problem {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let word = match self.severity {
            Severity::Fault => "fault",
            Severity::Warning => "warning",
        };
        write!(f, "{word}: {}: {}", self.place, self.message)?;
        if self.hint.is_empty() { Ok(()) } else { write!(f, "\n  hint: {}", self.hint) }
    }
}
