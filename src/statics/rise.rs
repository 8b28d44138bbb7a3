//! The settled rise at the mouths, with the walls carried on above the rim: what freeboard must cover.

use crate::geom::{Point, Vec2};
use crate::section::{Mouth, Region, WidthLaw};

use super::rim::{Carried, carry_walls_on};
use super::tilted::{Tilted, Vessel};

/// The section with its rims carried on, ready to be looked at along one direction.
#[derive(Clone, Debug)]
pub struct Rims {
    vessel: Vessel,
    carried: Vec<Carried>,
    up: Vec2,
    brims: Vec<Point>,
}

impl Rims {
    /// None where effective gravity does not point toward the floor: no wall is high enough then.
    pub fn new(region: &Region, width: &WidthLaw, mouths: &[Mouth], up: Vec2) -> Option<Rims> {
        if up.y <= 0.0 {
            return None;
        }
        let tan = (up.x / up.y).abs();
        // Higher than any liquid of this section can stand against one wall: a wedge of all its area, and more.
        let size = region.diagonal_m();
        let height = 3.0 * size + size * tan + 2.0 * (2.0 * region.area_m2() * tan).sqrt();
        let (edges, carried) = carry_walls_on(region, mouths, height);
        let brims = mouths.iter().map(|m| m.brim(region, up).1).collect();
        Some(Rims { vessel: Vessel::new(edges, width.clone()), carried, up, brims })
    }

    /// What became of each mouth.
    pub fn carried(&self) -> &[Carried] {
        &self.carried
    }

    /// Brim of each mouth, as effective gravity sees it.
    pub fn brims(&self) -> &[Point] {
        &self.brims
    }

    /// The carried-on section seen along the direction.
    pub fn tilted(&self) -> Tilted<'_> {
        self.vessel.tilted(self.up)
    }

    /// z of the settled surface above the brim of a mouth, m, for a volume in the carried-on section; none where
    /// it stands in several pools.
    pub fn surface_z_m(&self, tilted: &Tilted, volume_m3: f64, mouth_idx: usize) -> Option<f64> {
        let level = tilted.level_for_volume(volume_m3);
        let s = self.brims[mouth_idx].x;
        (tilted.n_pools(level) <= 1).then(|| (level - self.up.x * s) / self.up.y)
    }
}
