//! A section without faults.

use crate::geom::{Edge, Point};

use super::cut::{Cut, Face};
use super::place::Placed;

/// A section without faults: every edge has the region on its left.
#[derive(Clone, Debug)]
pub struct Region {
    pub(super) faces: Vec<Face>,
    pub(super) geometry: Vec<Edge>,
    pub(super) plates: Vec<Placed>,
    pub(super) open: Cut,
    pub(super) shut: Cut,
    pub(super) cells: Cut,
    pub(super) area_m2: f64,
    pub(super) low: Point,
    pub(super) high: Point,
}

impl Region {
    /// All edges without the plates, the outline's first, in the order of the section.
    pub fn faces(&self) -> &[Face] {
        &self.faces
    }

    /// The same edges as geometry alone.
    pub fn geometry(&self) -> &[Edge] {
        &self.geometry
    }

    /// The plates as they stand.
    pub fn plates(&self) -> &[Placed] {
        &self.plates
    }

    /// Cut by the plates with their openings open: the settled bound. Its parts are the compartments.
    pub fn open(&self) -> &Cut {
        &self.open
    }

    /// Cut by the plates with their openings shut: the sealed bound.
    pub fn shut(&self) -> &Cut {
        &self.shut
    }

    /// Cut by the plates, openings shut, and upright plates carried on from their free ends. Its parts are the cells.
    pub fn cells(&self) -> &Cut {
        &self.cells
    }

    /// Area, m2.
    pub fn area_m2(&self) -> f64 {
        self.area_m2
    }

    /// Corners of the box round the outline.
    pub fn bounds(&self) -> (Point, Point) {
        (self.low, self.high)
    }

    /// Diagonal of the box, m: the scale of lengths.
    pub fn diagonal_m(&self) -> f64 {
        (self.high - self.low).norm()
    }
}
