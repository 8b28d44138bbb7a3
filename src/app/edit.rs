//! Edits: the only way in which a study changes. Each has a label for undo.

use crate::cases::{Accel, Attitude, LoadCase};
use crate::geom::Point;
use crate::liquid::Liquid;
use crate::section::{EdgeKind, Obstacle, OutlineEdge, WidthLaw};
use crate::study::{Fill, NamedPoint, Record, Study};

/// One change of a study. Indices that are out of range change nothing.
#[derive(Clone, Debug, PartialEq)]
pub enum Edit {
    /// Replace the whole study (a pasted or rebuilt one).
    Replace(Box<Study>),
    /// Title.
    Title(String),
    /// Author.
    Author(String),
    /// Revision mark.
    Revision(String),
    /// Notes of the scenario.
    Notes(String),
    /// Liquid.
    Liquid(Liquid),
    /// Fill.
    Fill(Fill),
    /// Gas pressure above the liquid, Pa gage.
    UllageGage(f64),
    /// Outside air pressure, Pa absolute.
    AirPressure(f64),
    /// Gravity, m/s2.
    Gravity(f64),
    /// Width law.
    Width(WidthLaw),
    /// Move the start of an edge of the outline.
    MoveVertex(usize, Point),
    /// Bend an edge of the outline: sweep, radians.
    BendEdge(usize, f64),
    /// Wall or mouth.
    EdgeKind(usize, EdgeKind),
    /// Name of an edge.
    EdgeName(usize, String),
    /// Split an edge of the outline at a point on it; the new vertex follows it.
    SplitEdge(usize, Point),
    /// Take the start of an edge out; its neighbours join. Nothing happens below three edges.
    RemoveVertex(usize),
    /// Replace the whole outline.
    Outline(Vec<OutlineEdge>),
    /// Move a vertex of an obstacle.
    MoveObstacleVertex(usize, usize, Point),
    /// Move a whole obstacle by (s, z) metres.
    ShiftObstacle(usize, f64, f64),
    /// Add an obstacle.
    AddObstacle(Obstacle),
    /// Take an obstacle out.
    RemoveObstacle(usize),
    /// Acceleration of a case.
    CaseAccel(usize, Accel),
    /// Grade or heel of a case.
    CaseAttitude(usize, Attitude),
    /// Name, note, source, onset: the whole case.
    Case(usize, Box<LoadCase>),
    /// Add a case at the end.
    AddCase(Box<LoadCase>),
    /// Take a case out.
    RemoveCase(usize),
    /// Move a case from one place to another.
    ReorderCase(usize, usize),
    /// Replace the requirement records.
    Records(Vec<Record>),
    /// Replace the named points.
    Points(Vec<NamedPoint>),
    /// Point about which moments are taken.
    MomentAbout(Point),
    /// Note beside a verdict: case name, criterion, text; an empty text removes it.
    VerdictNote(String, String, String),
}

impl Edit {
    /// The words that undo shows.
    pub fn label(&self) -> String {
        todo!()
    }
}

/// Applies an edit to a study.
pub fn apply(study: &mut Study, edit: &Edit) {
    let _ = (study, edit);
    todo!()
}
