//! Where the liquid stands at the start: each group of compartments at one still level.

use crate::geom::Vec2;
use crate::section::{Cut, Placed, Region, Wall, WidthLaw};
use crate::statics::Vessel;

use super::look::{Body, Look};

/// Compartments that share one still level, and their volume together.
#[derive(Clone, Debug)]
pub struct Start {
    /// The compartments: parts of the section with its openings open.
    pub compartments: Vec<usize>,
    /// Volume of liquid in them, m3.
    pub volume_m3: f64,
    /// Their walls.
    pub vessel: Vessel,
    /// Whether it is the common fill, rather than a compartment's own.
    pub is_common: bool,
}

/// What holds the liquid under one bound: the section cut by its plates, with openings open or shut.
pub struct Holder<'a> {
    pub(super) cut: &'a Cut,
    pub(super) width: &'a WidthLaw,
    pub(super) plates: &'a [Placed],
    /// For each part of the cut, its compartment.
    compartment_of: Vec<usize>,
    /// For each compartment, whether it has the common fill.
    pub(super) is_common: Vec<bool>,
    pub(super) capacity_m3: f64,
    /// An area that turns levels into volumes of the section's own size, m2.
    pub(super) scale_m2: f64,
    starts: &'a [Start],
}

impl<'a> Holder<'a> {
    /// `cut` is the region's own, open or shut.
    pub fn new(region: &'a Region, cut: &'a Cut, width: &'a WidthLaw, starts: &'a [Start]) -> Holder<'a> {
        let open = region.open();
        let compartment_of =
            (0..cut.n_parts()).map(|part| open.part_at(cut.inside(part)).unwrap_or_default()).collect();
        let mut is_common = vec![true; open.n_parts()];
        for start in starts {
            start.compartments.iter().for_each(|&c| is_common[c] = start.is_common);
        }
        let capacity_m3 = starts.iter().map(|s| s.vessel.capacity_m3()).sum();
        let scale_m2 = capacity_m3 / region.diagonal_m();
        Holder { cut, width, plates: region.plates(), compartment_of, is_common, capacity_m3, scale_m2, starts }
    }

    /// Seen along a direction.
    pub fn look(&self, up: Vec2) -> Look<'a> {
        Look::new(self.cut, self.width, up)
    }

    /// The compartment that a basin lies in.
    pub fn compartment(&self, look: &Look, basin: usize) -> usize {
        let [(face_idx, _), _] = look.basins.low_point(basin);
        self.compartment_of[self.cut.part_of(face_idx as usize)]
    }

    /// The bodies of liquid at the start: below each group's still level along the look's direction.
    pub fn still(&self, look: &Look) -> Vec<Body> {
        let levels = self.still_levels(look.up);
        let mut bodies: Vec<Body> = Vec::new();
        for basin in (0..look.basins.all().len()).rev() {
            let b = &look.basins.all()[basin];
            let compartment = self.compartment(look, basin);
            let level = levels[compartment];
            let is_held = b.parent.is_some_and(|p| look.basins.all()[p].bottom < level);
            if b.bottom < level && !is_held {
                let volume_m3 = look.basins.volume_below(basin, level);
                if volume_m3 > 0.0 {
                    bodies.push(Body { volume_m3, compartment, basin, lows: look.lows_of(basin) });
                }
            }
        }
        bodies
    }

    /// The still level of each compartment along a direction.
    fn still_levels(&self, up: Vec2) -> Vec<f64> {
        let mut levels = vec![f64::NEG_INFINITY; self.is_common.len()];
        for start in self.starts {
            let level = start.vessel.tilted(up).level_for_volume(start.volume_m3);
            if start.volume_m3 > 0.0 {
                start.compartments.iter().for_each(|&c| levels[c] = level);
            }
        }
        levels
    }

    /// Volume of the common fill, m3.
    pub fn common_volume_m3(&self) -> f64 {
        self.starts.iter().filter(|s| s.is_common).map(|s| s.volume_m3).sum()
    }

    /// What a face is a part of.
    pub fn wall(&self, face_idx: u32) -> Wall {
        self.cut.faces()[face_idx as usize].wall
    }
}
