//! One pool as it is drawn: its tints, its surface, and the line round it.

use crate::analysis::{self, Chord};
use crate::geom::{Point, Vec2};

use super::super::liquid::{Body, TintScale, Tinted};
use super::super::strips::{Side, contain};
use super::sides_of;

/// A connected body of liquid.
#[derive(Clone, Debug, PartialEq)]
pub struct Pool {
    /// Bands and isobars.
    pub tinted: Tinted,
    /// Its surface, in pieces.
    pub surface: Vec<Chord>,
    /// Walls and plates that it wets.
    pub sides: Vec<Side>,
    /// m3.
    pub volume_m3: f64,
    /// In its middle.
    pub centroid: Point,
    up: Vec2,
    level_m: f64,
}

impl Pool {
    /// A pool of a settled state along `up`, under a gas at `gas_pa` gage.
    pub fn new(pool: &analysis::Pool, up: Vec2, gas_pa: f64, tints: Option<TintScale>, sagitta_m: f64) -> Pool {
        let sides: Vec<Side> = sides_of(pool.wetted.iter().map(|face| &face.edge), sagitta_m);
        let body =
            Body { sides: sides.clone(), up, level_m: pool.level_m, gas_pa, weight_pa_per_m: pool.weight_pa_per_m };
        Pool {
            tinted: body.tinted(tints),
            surface: pool.surface.clone(),
            sides,
            volume_m3: pool.volume_m3,
            centroid: pool.centroid,
            up,
            level_m: pool.level_m,
        }
    }

    /// Whether a place lies in it.
    pub fn contains(&self, p: Point) -> bool {
        self.up.dot(&p.coords) < self.level_m && contain(&self.sides, self.up, p)
    }
}
