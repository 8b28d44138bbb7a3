//! The tank's cross-section: outline, mouths, obstacles, width law. Validated here, once; inside, types are true.
//!
//! Knows no gravity, no liquid and no load case.

mod check;
mod cut;
mod depth;
mod meet;
mod mouth;
mod place;
mod plate;
mod region;
mod width;

use crate::geom::{Edge, Path, Point};

pub use check::check;
pub use cut::{Cut, Face, Wall};
pub use mouth::Mouth;
pub use place::{Attached, Placed, STANDS_WITHIN};
pub use plate::{Opening, OpeningShape, Panel, PanelEdges, Plate};
pub use region::Region;
pub use width::WidthLaw;

/// Whether an edge holds liquid back.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum EdgeKind {
    /// Shut.
    #[default]
    Wall,
    /// Open to air: rim, hatch, vent, overflow.
    Mouth,
}

/// One edge of the outline; it ends where the next one starts.
#[derive(Clone, Debug, PartialEq)]
pub struct OutlineEdge {
    /// As shown; may be empty.
    pub name: String,
    /// Wall or mouth.
    pub kind: EdgeKind,
    /// Where it starts, metres.
    pub start: Point,
    /// Angle swept by the edge, radians; zero is a straight line, positive turns to the left
    /// (counter-clockwise), at most a full turn.
    pub sweep_rad: f64,
}

/// One edge of an obstacle; it ends where the next one starts.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Vertex {
    /// Where the edge starts, metres.
    pub start: Point,
    /// Angle swept, radians, as in [`OutlineEdge`].
    pub sweep_rad: f64,
}

/// A closed chain inside the outline that is never liquid: a pipe, a duct, a box beam.
#[derive(Clone, Debug, PartialEq)]
pub struct Obstacle {
    /// As shown.
    pub name: String,
    /// Its edges, in either sense.
    pub vertices: Vec<Vertex>,
}

/// A cross-section as drawn; may be faulty. [`check`] turns it into a [`Region`] or lists every fault.
#[derive(Clone, Debug, PartialEq)]
pub struct Section {
    /// The outline, in either sense.
    pub outline: Vec<OutlineEdge>,
    /// Obstacles.
    pub obstacles: Vec<Obstacle>,
    /// Plates.
    pub plates: Vec<Plate>,
    /// Out-of-plane width.
    pub width: WidthLaw,
}

impl Section {
    /// Edge `idx` of the outline as geometry. Panics when `idx` is out of range.
    pub fn edge(&self, idx: usize) -> Edge {
        let next = &self.outline[(idx + 1) % self.outline.len()];
        let this = &self.outline[idx];
        Edge { start: this.start, end: next.start, sweep: this.sweep_rad }
    }

    /// All edges of the outline as geometry.
    pub fn edges(&self) -> Vec<Edge> {
        (0..self.outline.len()).map(|i| self.edge(i)).collect()
    }

    /// Whether a place lies inside the outline and outside every obstacle.
    pub fn contains(&self, p: Point) -> bool {
        let is_in = |edges: Vec<Edge>| Path::new(edges).contains(p);
        is_in(self.edges()) && !self.obstacles.iter().any(|o| is_in(o.edges()))
    }

    /// The name shown for an edge: its own, or `edge 3`.
    pub fn edge_label(&self, idx: usize) -> String {
        match self.outline.get(idx) {
            Some(edge) if !edge.name.is_empty() => edge.name.clone(),
            _ => format!("edge {}", idx + 1),
        }
    }
}

impl Obstacle {
    /// The name shown: its own, or `obstacle 2`.
    pub fn label(&self, idx: usize) -> String {
        if self.name.is_empty() { format!("obstacle {}", idx + 1) } else { self.name.clone() }
    }

    /// All edges as geometry.
    pub fn edges(&self) -> Vec<Edge> {
        let n = self.vertices.len();
        (0..n)
            .map(|i| Edge {
                start: self.vertices[i].start,
                end: self.vertices[(i + 1) % n].start,
                sweep: self.vertices[i].sweep_rad,
            })
            .collect()
    }
}
