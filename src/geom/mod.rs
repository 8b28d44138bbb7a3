//! Plane geometry with exact arcs: edges, closed paths, and the part of a region below a slanted level.
//!
//! Knows no gravity, no liquid and no tank: a direction "up" is just a unit vector. A [`Point`] is a place, a
//! [`Vec2`] a displacement; x is the section's s, y its z.

mod basins;
mod edge;
mod path;
mod piece;
mod sublevel;

pub use basins::{Basin, Basins, Depth, Outlet, Side, StripView};
pub use edge::{Edge, rotate};
pub use path::Path;
pub use sublevel::{Sublevel, Until};

/// A place, in metres: x is s (right), y is z (up).
pub type Point = nalgebra::Point2<f64>;

/// A displacement or a direction.
pub type Vec2 = nalgebra::Vector2<f64>;

/// The z component of the cross product of two vectors.
pub fn cross(a: Vec2, b: Vec2) -> f64 {
    a.x * b.y - a.y * b.x
}
