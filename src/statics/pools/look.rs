//! The basins along one direction, and the bodies of liquid in them.

use crate::geom::{Basins, Point, Vec2};
use crate::section::{Cut, WidthLaw};

/// A body of liquid: connected, with one level.
#[derive(Clone, Debug, PartialEq)]
pub struct Body {
    /// Volume, m3.
    pub volume_m3: f64,
    /// The compartment that it came from.
    pub compartment: usize,
    /// The basin that its surface stands in.
    pub basin: usize,
    /// The low points that it covers.
    pub lows: Vec<usize>,
}

/// A section cut by its plates, seen along one direction.
pub struct Look<'a> {
    /// Its basins; marked edges are mouths.
    pub basins: Basins<'a>,
    /// The direction.
    pub up: Vec2,
    /// The section.
    pub cut: &'a Cut,
}

impl<'a> Look<'a> {
    /// `up` is a unit vector.
    pub fn new(cut: &'a Cut, width: &'a WidthLaw, up: Vec2) -> Look<'a> {
        Look { basins: Basins::new(cut.edges(), up, width, &|i| cut.is_mouth(i)), up, cut }
    }

    /// Level of a body, m.
    pub fn level_of(&self, body: &Body) -> f64 {
        self.basins.level_for(body.basin, body.volume_m3)
    }

    /// The most that a body may hold in its basin: up to its mouth or its sill, m3.
    pub fn capacity_of(&self, basin: usize) -> f64 {
        let b = &self.basins.all()[basin];
        match b.mouth {
            Some((level, _)) => self.basins.volume_below(basin, level),
            None => b.volume_at_top,
        }
    }

    /// How fast that capacity grows as the direction turns counter-clockwise, m3/rad: the surface turns about the point
    /// at which liquid would leave. None where it is shut above.
    pub fn capacity_rate(&self, basin: usize) -> Option<f64> {
        let b = &self.basins.all()[basin];
        let (level, pivot) = match b.mouth {
            Some((level, face_idx)) => (level, self.lowest_on(face_idx)),
            None => (b.top, self.basins.outlet(basin)?.at),
        };
        let depth = self.basins.depth();
        Some(self.basins.surface(basin, level).iter().map(|&(l, r)| depth.turned(l, r, pivot)).sum())
    }

    /// The lowest point of a face.
    pub fn lowest_on(&self, face_idx: u32) -> Point {
        let edge = &self.cut.edges()[face_idx as usize];
        let ((_, t), _) = edge.extent(self.up);
        edge.point_at(t)
    }

    /// For each basin, the body that it lies in, whole or in part.
    pub fn owners(&self, bodies: &[Body]) -> Vec<Option<usize>> {
        let mut owner = vec![None; self.basins.all().len()];
        for (i, body) in bodies.iter().enumerate() {
            owner[body.basin] = Some(i);
        }
        // Parents come after their children.
        for basin in (0..owner.len()).rev() {
            if owner[basin].is_none() {
                owner[basin] = self.basins.all()[basin].parent.and_then(|p| owner[p]);
            }
        }
        owner
    }

    /// The low points of a basin.
    pub fn lows_of(&self, basin: usize) -> Vec<usize> {
        (0..=basin).filter(|&b| self.basins.is_leaf(b) && self.basins.is_within(b, basin)).collect()
    }
}
