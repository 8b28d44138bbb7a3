//! Volumes, levels and surfaces of basins.

use crate::geom::Point;
use crate::geom::piece::Piece;

use super::Basins;

impl Basins<'_> {
    /// Volume of a basin, its children included, below `level`, m3; clamped to its span of levels.
    pub fn volume_below(&self, basin: usize, level: f64) -> f64 {
        let b = &self.basins[basin];
        if level <= b.bottom {
            return b.volume_at_bottom;
        }
        if level >= b.top {
            return b.volume_at_top;
        }
        let v = level - self.sublevel.origin_level();
        let k = self.slab_of_level(basin, v);
        self.volume_in_slab(basin, k, v)
    }

    /// The level at which a basin, its children included, holds `volume`; clamped to its span of levels.
    pub fn level_for(&self, basin: usize, volume: f64) -> f64 {
        let b = &self.basins[basin];
        if volume <= b.volume_at_bottom {
            return b.bottom;
        }
        if volume >= b.volume_at_top {
            return b.top;
        }
        // The last slab below which there is less than the volume.
        let (mut low, mut high) = (b.first_slab as usize, b.end_slab as usize);
        while high - low > 1 {
            let middle = (low + high) / 2;
            if self.before(basin, middle) < volume { low = middle } else { high = middle }
        }
        let slab = self.sublevel.slabs()[low];
        let missing = volume - self.before(basin, low);
        let (mut least, mut most) = (slab.bottom, slab.top);
        let [w0, w1] = [slab.bottom, slab.top].map(|v| self.surface_in_slab(basin, low, v));
        let height = slab.top - slab.bottom;
        let gain = (w1 - w0) / height;
        let root = (w0 * w0 + 2.0 * gain * missing).max(0.0).sqrt();
        let rise = if w0 + root > 0.0 { (2.0 * missing / (w0 + root)).clamp(0.0, height) } else { 0.0 };
        let mut v = slab.bottom + rise;
        // Straight edges under a constant depth are done; others take safeguarded Newton steps.
        if self.depth.constant().is_none() || slab.has_arcs {
            for _ in 0..80 {
                let error = self.volume_in_slab(basin, low, v) - volume;
                if error > 0.0 {
                    most = v
                } else {
                    least = v
                }
                // Under a depth that varies, the sum over edges is no better than the whole basin's rounding.
                let whole = if self.depth.constant().is_some() { volume } else { 4.0 * b.volume_at_top };
                if error.abs() <= 2.0 * f64::EPSILON * whole || most - least <= f64::EPSILON * height {
                    break;
                }
                let next = v - error / self.surface_in_slab(basin, low, v);
                v = if next > least && next < most { next } else { 0.5 * (least + most) };
            }
        }
        v + self.sublevel.origin_level()
    }

    /// The surface of a basin at a level within its span: pairs of left and right ends, from left to right.
    pub fn surface(&self, basin: usize, level: f64) -> Vec<(Point, Point)> {
        let v = level - self.sublevel.origin_level();
        let k = self.slab_of_level(basin, v);
        self.strips_of(basin, k)
            .map(|(l, r)| (self.sublevel.point(l.u_at(v), v), self.sublevel.point(r.u_at(v), v)))
            .collect()
    }

    /// The slab in which level `v` (from the region's origin) cuts a basin, the lower of two at their border.
    pub(super) fn slab_of_level(&self, basin: usize, v: f64) -> usize {
        let b = &self.basins[basin];
        let slabs = &self.sublevel.slabs()[b.first_slab as usize..b.end_slab as usize];
        b.first_slab as usize + slabs.partition_point(|s| s.bottom < v).max(1) - 1
    }

    /// The strips of a basin in a slab, its children left out.
    pub(super) fn strips_of(&self, basin: usize, slab_idx: usize) -> impl Iterator<Item = (&Piece, &Piece)> {
        let slab = &self.sublevel.slabs()[slab_idx];
        let first = slab.first as usize / 2;
        let is_own = move |(i, _): &(usize, (&Piece, &Piece))| self.strips[first + i].basin as usize == basin;
        self.sublevel.strips(slab).enumerate().filter(is_own).map(|(_, pieces)| pieces)
    }

    /// Volume of a basin below a slab, m3.
    fn before(&self, basin: usize, slab_idx: usize) -> f64 {
        let slab = &self.sublevel.slabs()[slab_idx];
        let (first, n) = (slab.first as usize / 2, slab.n as usize / 2);
        let own = self.strips[first..first + n].iter().find(|s| s.basin as usize == basin);
        own.map_or(self.basins[basin].volume_at_top, |s| s.before)
    }

    fn volume_in_slab(&self, basin: usize, slab_idx: usize, v: f64) -> f64 {
        let bottom = self.sublevel.slabs()[slab_idx].bottom;
        let part: f64 = self.strips_of(basin, slab_idx).map(|(l, r)| self.strip_volume(l, r, bottom, v)).sum();
        self.before(basin, slab_idx) + part
    }

    /// Area of the surface, m2.
    fn surface_in_slab(&self, basin: usize, slab_idx: usize, v: f64) -> f64 {
        self.strips_of(basin, slab_idx)
            .map(|(l, r)| {
                let (a, b) = (l.u_at(v), r.u_at(v));
                match self.depth.constant() {
                    Some(depth) => depth * (b - a).max(0.0),
                    None => self.depth.across(self.sublevel.point(a, v), self.sublevel.point(b, v)),
                }
            })
            .sum()
    }
}
