//! Every fault of a section, found at once.

use crate::geom::Edge;
use crate::problem::Problem;

use super::Section;

/// An edge of a region, with where it came from.
#[derive(Clone, Copy, Debug)]
pub struct RegionEdge {
    /// Geometry, with the region on its left.
    pub edge: Edge,
    /// None: the outline; some: this obstacle.
    pub obstacle_idx: Option<usize>,
    /// Index in the outline or obstacle.
    pub edge_idx: usize,
}

/// A section without faults: outline counter-clockwise, obstacles clockwise.
#[derive(Clone, Debug)]
pub struct Region {
    /// All edges.
    pub edges: Vec<RegionEdge>,
}

/// The region, or every fault.
pub fn check(section: &Section) -> Result<Region, Vec<Problem>> {
    let _ = section;
    todo!()
}
