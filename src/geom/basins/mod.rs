//! Basins: the tree of connected parts of a region below a rising level.
//!
//! From its lowest point up, each low point of the region grows a part of its own; where two parts meet, at a sill, they
//! become one. That is a join tree: leaves are low points, inner nodes are born at sills. The slabs of a [`Sublevel`]
//! give it exactly, since strips only meet at the borders of slabs.
//!
//! Source: Carr, Snoeyink & Axen (2003), Computing contour trees in all dimensions, for the join tree (from memory).
//! Knows no liquid: a volume is an area weighted with a depth, and a mouth is an edge that is marked.

mod ask;
mod build;
mod flow;
mod touch;

use super::{Edge, Point, Sublevel};

pub use flow::{Outlet, Side, StripView};

/// How deep a region is out of its plane, as a function of place.
pub trait Depth: Sync {
    /// The depth if it is the same everywhere, m.
    fn constant(&self) -> Option<f64>;
    /// A function of edges whose sum round a counter-clockwise chain is the volume inside, m3.
    fn under(&self, edge: &Edge) -> f64;
    /// Integral of the depth along a straight line, m2.
    fn across(&self, from: Point, to: Point) -> f64;
    /// Integral along a straight line of depth times distance from `pivot`, m3; distances count positive toward `to`.
    fn turned(&self, from: Point, to: Point, pivot: Point) -> f64;
}

/// A connected part of the region from the level at which it is born to that at which it meets another.
#[derive(Clone, Debug)]
pub struct Basin {
    /// Level at which it is born: its lowest point, or the sill at which its parts met.
    pub bottom: f64,
    /// Level of its lowest sill to a neighbour, or of its ceiling.
    pub top: f64,
    /// The part that it becomes above `top`; none when it is shut above.
    pub parent: Option<usize>,
    /// The parts that met in it; empty for a low point.
    pub children: Vec<usize>,
    /// Lowest level at which it touches a marked edge, and the edge; above its children.
    pub mouth: Option<(f64, u32)>,
    /// Its own volume, from `bottom` to `top`, with its children: m3.
    pub volume_at_top: f64,
    /// Volume of its children, m3.
    pub volume_at_bottom: f64,
    first_slab: u32,
    end_slab: u32,
}

/// All basins of a region seen along one direction; children come before parents.
pub struct Basins<'a> {
    sublevel: Sublevel,
    depth: &'a dyn Depth,
    basins: Vec<Basin>,
    /// For each strip, in the order of slabs.
    strips: Vec<Strip>,
    /// Where the pieces of each edge begin; one more at the end.
    first_piece: Vec<u32>,
}

/// A strip of a slab.
#[derive(Clone, Copy, Debug)]
struct Strip {
    basin: u32,
    /// Volume of the basin below the slab, m3.
    before: f64,
}

impl Basins<'_> {
    /// All basins.
    pub fn all(&self) -> &[Basin] {
        &self.basins
    }

    /// The depth that volumes are weighted with.
    pub fn depth(&self) -> &dyn Depth {
        self.depth
    }

    /// The slabs that it is made from.
    pub fn sublevel(&self) -> &Sublevel {
        &self.sublevel
    }

    /// Whether `basin` is `ancestor` or lies below it.
    pub fn is_within(&self, mut basin: usize, ancestor: usize) -> bool {
        while basin < ancestor {
            match self.basins[basin].parent {
                Some(parent) => basin = parent,
                None => return false,
            }
        }
        basin == ancestor
    }

    /// The lowest basin that holds all of `basins`; none where they never meet, or for no basin.
    pub fn join(&self, basins: &[usize]) -> Option<usize> {
        let mut all = basins.iter().copied();
        let mut join = all.next()?;
        for mut other in all {
            // Parents have larger indices: climb with the smaller one.
            while join != other {
                let lower = if join < other { &mut join } else { &mut other };
                *lower = self.basins[*lower].parent?;
            }
        }
        Some(join)
    }

    /// The part of the region in which it ends when the level rises for ever.
    pub fn root(&self, mut basin: usize) -> usize {
        while let Some(parent) = self.basins[basin].parent {
            basin = parent;
        }
        basin
    }

    /// Whether it is a low point.
    pub fn is_leaf(&self, basin: usize) -> bool {
        self.basins[basin].children.is_empty()
    }

    /// Count of connected parts below `level`.
    pub fn n_parts(&self, level: f64) -> usize {
        self.basins.iter().filter(|b| b.bottom < level && (level <= b.top || b.parent.is_none())).count()
    }
}
