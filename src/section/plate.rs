//! Plates: thin internal walls, and the openings along them.

use std::f64::consts::PI;

use crate::geom::{Edge, Point};

/// A thin internal wall: an open chain of straight segments, in the kernel a slit of no width.
///
/// Each end stands on the outline, on an obstacle, on another plate, or is free. Which it is follows from where it
/// lies, see [`super::Attached`].
#[derive(Clone, Debug, PartialEq)]
pub struct Plate {
    /// As shown; may be empty.
    pub name: String,
    /// Its corners from end to end, metres; at least two.
    pub points: Vec<Point>,
    /// Thickness as built, m.
    pub thickness_m: f64,
    /// Part of the thickness that is given up to corrosion and never counts as strength, m.
    pub corrosion_m: f64,
    /// Name of its material; may be empty.
    pub material: String,
    /// How it is stiffened and held.
    pub panel: Panel,
    /// Its openings, in any order.
    pub openings: Vec<Opening>,
}

/// The panel of a plate that bending is checked for: between stiffeners that run along the plate in the section.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Panel {
    /// Clear distance of the stiffeners out of the plane, m; none: the plate spans the width of the tank.
    pub stiffener_spacing_m: Option<f64>,
    /// How its edges are held.
    pub edges: PanelEdges,
}

/// How the edges of a panel are held. An end of the plate that is free is a free edge whatever is said here.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum PanelEdges {
    /// They may turn.
    #[default]
    SimplySupported,
    /// They may not.
    Clamped,
}

/// An opening: an interval along a plate through which liquid and gas pass.
#[derive(Clone, Debug, PartialEq)]
pub struct Opening {
    /// As shown; may be empty.
    pub name: String,
    /// Where it begins, m along the plate from its first point.
    pub from_m: f64,
    /// Where it ends, m along the plate.
    pub to_m: f64,
    /// How much of it is open.
    pub shape: OpeningShape,
}

/// How much of an opening's interval is open.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum OpeningShape {
    /// A share of the width, above 0 and up to 1: a drain gap, a vent gap, a slot.
    Share(f64),
    /// Round holes side by side, as wide as the interval is long: limber holes, a manhole.
    Holes {
        /// How many.
        n: u32,
    },
    /// A perforated field.
    Perforated {
        /// Hole diameter, m.
        diameter_m: f64,
        /// Distance of hole centres, m.
        pitch_m: f64,
        /// Rows staggered (centres on equilateral triangles) rather than on squares.
        is_staggered: bool,
    },
}

impl Opening {
    /// Its length along the plate, m.
    pub fn length_m(&self) -> f64 {
        self.to_m - self.from_m
    }

    /// Open share of its interval where the tank is `width_m` wide: open area = share x length x width. May exceed
    /// one where holes do not fit; that is a fault.
    pub fn open_share(&self, width_m: f64) -> f64 {
        match self.shape {
            OpeningShape::Share(share) => share,
            OpeningShape::Holes { n } => f64::from(n) * PI / 4.0 * self.length_m() / width_m,
            OpeningShape::Perforated { diameter_m, pitch_m, is_staggered } => {
                let cell = pitch_m * pitch_m * if is_staggered { 0.75_f64.sqrt() } else { 1.0 };
                PI / 4.0 * diameter_m * diameter_m / cell
            }
        }
    }
}

impl Plate {
    /// The name shown: its own, or `plate 2`.
    pub fn label(&self, idx: usize) -> String {
        if self.name.is_empty() { format!("plate {}", idx + 1) } else { self.name.clone() }
    }

    /// Its straight segments, from end to end.
    pub fn segments(&self) -> impl Iterator<Item = Edge> {
        self.points.windows(2).map(|w| Edge::line(w[0], w[1]))
    }

    /// Length from end to end, m.
    pub fn length_m(&self) -> f64 {
        self.segments().map(|e| e.length()).sum()
    }

    /// The point `along_m` from the first one, clamped to the ends.
    pub fn point_at(&self, along_m: f64) -> Point {
        let mut left = along_m;
        for e in self.segments() {
            let length = e.length();
            if left <= length {
                return e.point_at(if length > 0.0 { left / length } else { 0.0 });
            }
            left -= length;
        }
        self.points.last().copied().unwrap_or_else(Point::origin)
    }

    /// The openings from the first point on, with their indices.
    pub fn openings_in_order(&self) -> Vec<(usize, &Opening)> {
        let mut openings: Vec<(usize, &Opening)> = self.openings.iter().enumerate().collect();
        openings.sort_by(|a, b| a.1.from_m.total_cmp(&b.1.from_m));
        openings
    }
}
