//! Where liquid goes: over a sill to the neighbour, and down by steepest descent to a low point.

use crate::geom::Point;
use crate::geom::piece::{Flat, Piece};

use super::Basins;

/// What lies over the sill of a basin.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Outlet {
    /// The sill.
    pub at: Point,
    /// An edge that it is the top of, by index.
    pub edge_idx: u32,
    /// Whether the far side lies to the right.
    pub is_to_right: bool,
    /// The basin on the far side, full to the same sill when both become one.
    pub neighbour: usize,
    /// The low point there that steepest descent reaches.
    pub low: usize,
}

/// A strip of the region between two edges, over the height of one slab.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct StripView {
    /// The basin that it lies in.
    pub basin: usize,
    /// The edges on its left and right, by index.
    pub edge_idxs: [usize; 2],
    /// A point in its middle.
    pub middle: Point,
    /// The smaller of its width and its height, m.
    pub size_m: f64,
    /// A point in it, close to its bottom.
    pub low: Point,
    /// Level of its bottom.
    pub bottom: f64,
    /// Level of its top.
    pub top: f64,
    slab_idx: usize,
    strip_idx: usize,
}

/// A stretch of an edge along which the level only rises, and the basin beside its low end. A level edge is one too.
#[derive(Clone, Copy, Debug)]
pub struct Side<'b> {
    /// The basin beside its low end.
    pub basin: usize,
    /// Level of its low end.
    pub low_level: f64,
    /// The edge's parameter there.
    pub t_low: f64,
    /// None for a level edge.
    piece: Option<(&'b Piece, f64)>,
}

impl Side<'_> {
    /// The edge's parameter at a level, held to the stretch.
    pub fn t_at(&self, level: f64) -> f64 {
        match self.piece {
            Some((piece, origin_level)) => piece.t_at(level - origin_level),
            None => 1.0 - self.t_low,
        }
    }
}

impl Basins<'_> {
    /// The stretches of an edge, with the basin beside each.
    pub fn sides_of(&self, edge_idx: u32) -> Vec<Side<'_>> {
        let origin_level = self.sublevel.origin_level();
        let mut sides = Vec::new();
        for i in self.first_piece[edge_idx as usize]..self.first_piece[edge_idx as usize + 1] {
            let piece = &self.sublevel.pieces()[i as usize];
            if let Some((k, strip, _)) = self.strip_of_piece(i, piece.low[1]) {
                sides.push(Side {
                    basin: self.basin_of(k, strip),
                    low_level: piece.low[1] + origin_level,
                    t_low: piece.t[0],
                    piece: Some((piece, origin_level)),
                });
            }
        }
        if let Some(flat) = self.sublevel.flats().iter().find(|f| f.edge_idx == edge_idx) {
            let basin = self.basin_of_flat(flat);
            let low_level = flat.v + origin_level;
            sides.extend(basin.map(|basin| Side { basin, low_level, t_low: 0.0, piece: None }));
        }
        sides
    }

    /// The basin above a floor, or below a ceiling.
    fn basin_of_flat(&self, flat: &Flat) -> Option<usize> {
        let slabs = self.sublevel.slabs();
        let k = if flat.is_floor {
            slabs.partition_point(|s| s.bottom < flat.v)
        } else {
            slabs.partition_point(|s| s.top < flat.v)
        };
        let slab = slabs.get(k)?;
        let middle = 0.5 * (flat.u[0] + flat.u[1]);
        let v = flat.v.clamp(slab.bottom, slab.top);
        let i = self.sublevel.strips(slab).position(|(l, r)| l.u_at(v) <= middle && middle <= r.u_at(v))?;
        Some(self.basin_of(k, i))
    }

    /// The sill over which a full basin pours, and what lies beyond; none where it is shut above.
    pub fn outlet(&self, basin: usize) -> Option<Outlet> {
        let b = &self.basins[basin];
        let parent = b.parent?;
        let over = self.basins[parent].first_slab as usize;
        let under = over.checked_sub(1)?;
        let (v, slab) = (b.top - self.sublevel.origin_level(), &self.sublevel.slabs()[under]);
        let spans: Vec<(usize, [f64; 2], usize)> = self
            .sublevel
            .strips(slab)
            .enumerate()
            .map(|(i, (l, r))| (i, [l.u_at(slab.top), r.u_at(slab.top)], self.basin_of(under, i)))
            .collect();
        // Strips beside each other under one strip of the parent; the narrowest ledge between them is the sill.
        let mut best: Option<(f64, [f64; 2], usize, u32, bool)> = None;
        let above: Vec<[f64; 2]> =
            self.strips_of(parent, over).map(|(l, r)| [l.u_at(slab.top), r.u_at(slab.top)]).collect();
        let touches = |u: &[f64; 2]| above.iter().position(|a| a[1].min(u[1]) > a[0].max(u[0]));
        for (own_idx, own, _) in spans.iter().filter(|s| self.is_within(s.2, basin)) {
            for (i, other, of) in &spans {
                if self.is_within(*of, basin) || !self.is_within(*of, parent) || touches(own) != touches(other) {
                    continue;
                }
                let is_to_right = own[1] <= other[0];
                let (sill, landing) = if is_to_right { (own[1], other[0]) } else { (own[0], other[1]) };
                let gap = (landing - sill).abs();
                if best.is_none_or(|b| gap < b.0) {
                    let (l, r) = self.sublevel.strip(slab, *own_idx);
                    let edge_idx = if is_to_right { r.edge_idx } else { l.edge_idx };
                    best = Some((gap, [sill, landing], *i, edge_idx, is_to_right));
                }
            }
        }
        let (_, [sill, landing], strip, edge_idx, is_to_right) = best?;
        let low = self.descend(under, strip, landing);
        let mut neighbour = low;
        while self.basins[neighbour].parent != Some(parent) {
            neighbour = self.basins[neighbour].parent?;
        }
        Some(Outlet { at: self.sublevel.point(sill, v), edge_idx, is_to_right, neighbour, low })
    }

    /// The low point that steepest descent reaches from the bottom of strip `i` of a slab, at `u` there: straight down
    /// through liquid or gas, along walls where they slant.
    pub fn descend(&self, mut slab_idx: usize, mut i: usize, mut u: f64) -> usize {
        loop {
            let slab = &self.sublevel.slabs()[slab_idx];
            let (l, r) = self.sublevel.strip(slab, i);
            let [left, right] = [l.u_at(slab.bottom), r.u_at(slab.bottom)];
            u = u.clamp(left.min(right), right.max(left));
            let Some(below) = slab_idx.checked_sub(1) else { break };
            let slab_below = &self.sublevel.slabs()[below];
            let basin = self.basin_of(slab_idx, i);
            let mut next: Option<(f64, usize, f64)> = None;
            for (j, (l, r)) in self.sublevel.strips(slab_below).enumerate() {
                let [a, b] = [l.u_at(slab_below.top).max(left), r.u_at(slab_below.top).min(right)];
                if b <= a || !self.is_within(self.basin_of(below, j), basin) {
                    continue;
                }
                let Some(landing) = self.way_down(slab.bottom, [a, b], u) else { continue };
                if next.is_none_or(|n| (landing - u).abs() < n.0) {
                    next = Some(((landing - u).abs(), j, landing));
                }
            }
            let Some((_, j, landing)) = next else { break };
            (slab_idx, i, u) = (below, j, landing);
        }
        self.basin_of(slab_idx, i)
    }

    /// The low point that steepest descent reaches from a point on an edge at parameter `t`; none for a level edge.
    pub fn descend_from(&self, edge_idx: u32, t: f64) -> Option<usize> {
        let (slab_idx, i, u) = self.strip_beside(edge_idx, t)?;
        Some(self.descend(slab_idx, i, u))
    }

    /// The lowest point of a basin without children, as an edge and its parameter: where its first strip begins.
    /// Two of them, so that one is not level in another direction.
    pub fn low_point(&self, basin: usize) -> [(u32, f64); 2] {
        let mut b = basin;
        while let Some(&child) = self.basins[b].children.first() {
            b = child;
        }
        let k = self.basins[b].first_slab as usize;
        let (l, r) = self.strips_of(b, k).next().expect("a basin has a strip in its first slab");
        let bottom = self.sublevel.slabs()[k].bottom;
        let t = |p: &Piece| if p.low[1] >= bottom { p.t[0] } else { p.t_at(bottom) };
        [(l.edge_idx, t(l)), (r.edge_idx, t(r))]
    }

    /// The basin beside an edge at parameter `t`, and the level there; none for a level edge.
    pub fn basin_beside(&self, edge_idx: u32, t: f64) -> Option<(usize, f64)> {
        let (slab_idx, i, _) = self.strip_beside(edge_idx, t)?;
        let piece = self.piece_at(edge_idx, t)?;
        Some((self.basin_of(slab_idx, i), piece.v_at(t) + self.sublevel.origin_level()))
    }

    /// The basin whose part of the region holds `p`; none outside. A point within rounding of an edge is inside.
    pub fn basin_at(&self, p: Point) -> Option<usize> {
        self.strip_at(p).map(|(k, i)| self.basin_of(k, i))
    }

    /// The low point that steepest descent reaches from `p`; none outside.
    pub fn low_under(&self, p: Point) -> Option<usize> {
        let (slab_idx, i) = self.strip_at(p)?;
        let [u, _] = self.sublevel.local(p);
        Some(self.descend(slab_idx, i, u))
    }

    /// An edge that bounds the strip which holds `p`, by index; none outside.
    pub fn face_beside(&self, p: Point) -> Option<usize> {
        let (k, i) = self.strip_at(p)?;
        let (l, _) = self.sublevel.strip(&self.sublevel.slabs()[k], i);
        Some(l.edge_idx as usize)
    }

    /// The strip that holds `p`, or is nearest to it within rounding: slab and index in it.
    fn strip_at(&self, p: Point) -> Option<(usize, usize)> {
        let [u, v] = self.sublevel.local(p);
        let slabs = self.sublevel.slabs();
        let (bottom, top) = (slabs.first()?.bottom, slabs.last()?.top);
        let slack = 1e-9 * (top - bottom).max(slabs.iter().map(|s| s.width_top).fold(0.0, f64::max));
        // The slabs that touch the point, from below.
        let first = slabs.partition_point(|s| s.top < v - slack);
        let mut best: Option<(f64, usize, usize)> = None;
        for (k, slab) in slabs.iter().enumerate().skip(first).take_while(|(_, s)| s.bottom <= v + slack) {
            let v = v.clamp(slab.bottom, slab.top);
            for (i, (l, r)) in self.sublevel.strips(slab).enumerate() {
                let off = (l.u_at(v) - u).max(u - r.u_at(v)).max(0.0);
                if off <= slack && best.is_none_or(|b| off < b.0) {
                    best = Some((off, k, i));
                }
            }
        }
        best.map(|(_, k, i)| (k, i))
    }

    /// Volume of a strip below a level, m3.
    pub fn strip_volume_below(&self, strip: &StripView, level: f64) -> f64 {
        let slab = &self.sublevel.slabs()[strip.slab_idx];
        let (l, r) = self.sublevel.strip(slab, strip.strip_idx);
        let to = (level - self.sublevel.origin_level()).clamp(slab.bottom, slab.top);
        self.strip_volume(l, r, slab.bottom, to)
    }

    /// Every strip, from the lowest slab up.
    pub fn strips(&self) -> impl Iterator<Item = StripView> {
        let slabs = self.sublevel.slabs().iter().enumerate();
        slabs.flat_map(move |(k, slab)| {
            self.sublevel.strips(slab).enumerate().map(move |(i, (l, r))| {
                let v = 0.5 * (slab.bottom + slab.top);
                let (a, b) = (l.u_at(v), r.u_at(v));
                let low = slab.bottom + 1e-3 * (slab.top - slab.bottom);
                StripView {
                    low: self.sublevel.point(0.5 * (l.u_at(low) + r.u_at(low)), low),
                    bottom: slab.bottom + self.sublevel.origin_level(),
                    top: slab.top + self.sublevel.origin_level(),
                    slab_idx: k,
                    strip_idx: i,
                    basin: self.basin_of(k, i),
                    edge_idxs: [l.edge_idx as usize, r.edge_idx as usize],
                    middle: self.sublevel.point(0.5 * (a + b), v),
                    size_m: (b - a).min(slab.top - slab.bottom),
                }
            })
        })
    }

    /// The strip beside an edge at `t`: slab, index in it, and u at the slab's bottom.
    fn strip_beside(&self, edge_idx: u32, t: f64) -> Option<(usize, usize, f64)> {
        let piece_idx = self.piece_idx_at(edge_idx, t)?;
        let v = self.sublevel.pieces()[piece_idx as usize].v_at(t);
        self.strip_of_piece(piece_idx, v)
    }

    /// The strip beside a piece at level `v`, the upper one at a border, but never above the piece.
    fn strip_of_piece(&self, piece_idx: u32, v: f64) -> Option<(usize, usize, f64)> {
        let piece = &self.sublevel.pieces()[piece_idx as usize];
        let slabs = self.sublevel.slabs();
        let mut k = slabs.partition_point(|s| s.top <= v);
        while k > 0 && (k >= slabs.len() || slabs[k].bottom >= piece.high[1]) {
            k -= 1;
        }
        let crossing = self.sublevel.crossing_of(slabs.get(k)?);
        let at = crossing.iter().position(|c| c.piece_idx == piece_idx)?;
        Some((k, at / 2, crossing[at].u_bottom))
    }

    fn piece_idx_at(&self, edge_idx: u32, t: f64) -> Option<u32> {
        let range = self.first_piece[edge_idx as usize]..self.first_piece[edge_idx as usize + 1];
        let distance = |i: &u32| {
            let [a, b] = self.sublevel.pieces()[*i as usize].t;
            (a.min(b) - t).max(t - a.max(b)).max(0.0)
        };
        range.min_by(|a, b| distance(a).total_cmp(&distance(b)))
    }

    fn piece_at(&self, edge_idx: u32, t: f64) -> Option<&Piece> {
        self.piece_idx_at(edge_idx, t).map(|i| &self.sublevel.pieces()[i as usize])
    }

    pub(super) fn basin_of(&self, slab_idx: usize, i: usize) -> usize {
        let first = self.sublevel.slabs()[slab_idx].first as usize / 2;
        self.strips[first + i].basin as usize
    }

    /// Whether level slits shut all of a span of u at `v`.
    pub(super) fn is_shut(&self, v: f64, a: f64, b: f64) -> bool {
        self.way_down(v, [a, b], a).is_none()
    }

    /// The place nearest to `u` in a span at `v` that no level slit shuts: what falls on a slit goes over its nearer end.
    fn way_down(&self, v: f64, [a, b]: [f64; 2], u: f64) -> Option<f64> {
        let flats = self.sublevel.flats();
        let first = flats.partition_point(|f| f.v < v);
        let here = flats[first..].iter().take_while(|f| f.v == v).filter(|f| f.is_floor);
        let mut shut: Vec<[f64; 2]> = here.map(|f| f.u).collect();
        shut.sort_unstable_by(|a, b| a[0].total_cmp(&b[0]));
        shut.push([b, b]);
        let (mut from, mut nearest) = (a, None::<f64>);
        for [left, right] in shut {
            let to = left.min(b);
            if to - from > 1e-12 * (b - a) {
                let here = u.clamp(from, to);
                nearest = nearest.filter(|n| (n - u).abs() <= (here - u).abs()).or(Some(here));
            }
            from = from.max(right);
        }
        nearest
    }
}
