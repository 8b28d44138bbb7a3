//! Grows the tree, slab by slab.

use crate::geom::piece::{Flat, Piece};
use crate::geom::sublevel::Slab;
use crate::geom::{Edge, Sublevel, Vec2};

use super::{Basin, Basins, Depth, Strip};

impl<'a> Basins<'a> {
    /// The basins of the region that `edges` bound, seen along `up`; edges are as [`Sublevel::new`] takes them.
    /// `is_mouth` marks edges by index.
    ///
    /// Costs O(n log n); volumes are as accurate as areas of [`Sublevel`].
    pub fn new(edges: &[Edge], up: Vec2, depth: &'a dyn Depth, is_mouth: &dyn Fn(u32) -> bool) -> Basins<'a> {
        Basins::over(Sublevel::new(edges, up), depth, is_mouth)
    }

    /// The basins of a region that is cut into slabs already.
    pub fn over(sublevel: Sublevel, depth: &'a dyn Depth, is_mouth: &dyn Fn(u32) -> bool) -> Basins<'a> {
        let n_edges = sublevel.pieces().iter().map(|p| p.edge_idx as usize + 1).max().unwrap_or(0);
        let n_edges = sublevel.flats().iter().map(|f| f.edge_idx as usize + 1).fold(n_edges, usize::max);
        let n_strips = sublevel.slabs().iter().map(|s| s.n as usize / 2).sum();
        let mut first_piece = vec![0u32; n_edges + 1];
        sublevel.pieces().iter().for_each(|p| first_piece[p.edge_idx as usize + 1] += 1);
        for i in 0..n_edges {
            first_piece[i + 1] += first_piece[i];
        }
        let strips = Vec::with_capacity(n_strips);
        let mut this = Basins { sublevel, depth, basins: Vec::new(), strips, first_piece };
        this.grow(is_mouth);
        this
    }

    fn grow(&mut self, is_mouth: &dyn Fn(u32) -> bool) {
        let origin_level = self.sublevel.origin_level();
        let extent = self.sublevel.slabs().iter().map(|s| s.width_bottom.max(s.width_top)).fold(0.0, f64::max);
        // Strips that share less than this are not connected: far above rounding, far below any real gap.
        let slack = 1e-12 * extent;
        // Volume of each basin so far.
        let mut volume: Vec<f64> = Vec::new();
        let mut below: Vec<Below> = Vec::new();
        let mut here: Vec<Below> = Vec::new();
        let mut links: Vec<(usize, usize)> = Vec::new();
        let mut next_flat = 0;
        for k in 0..self.sublevel.slabs().len() {
            let slab = self.sublevel.slabs()[k];
            let flats = self.flats_at(slab.bottom, &mut next_flat);
            here.clear();
            let crossing = self.sublevel.crossing_of(&slab).chunks_exact(2);
            here.extend(crossing.map(|pair| Below { u: [pair[0].u_bottom, pair[1].u_bottom], basin: NONE }));
            let level = slab.bottom + origin_level;
            self.link(&here, &below, flats.clone(), slack, &mut links);
            self.connect(&mut here, &below, &links, (level, k as u32), &mut volume);
            self.mark_mouths(&slab, &mut here, &below, flats, level, is_mouth);
            for strip in &here {
                self.strips.push(Strip { basin: strip.basin, before: volume[strip.basin as usize] });
            }
            for (i, strip) in here.iter_mut().enumerate() {
                let (l, r) = self.sublevel.strip(&slab, i);
                let top = [l.u_at(slab.top), r.u_at(slab.top)];
                volume[strip.basin as usize] += self.volume_between(l, r, (slab.bottom, strip.u), (slab.top, top));
                strip.u = top;
            }
            std::mem::swap(&mut below, &mut here);
        }
        let n_slabs = self.sublevel.slabs().len() as u32;
        let highest = self.sublevel.slabs().last().map_or(0.0, |s| s.top) + origin_level;
        for strip in &below {
            self.close(strip.basin, highest, n_slabs, &volume);
        }
        // Ceilings that are mouths.
        let top = self.sublevel.slabs().last().map_or(0.0, |s| s.top);
        let flats = self.flats_at(top, &mut next_flat);
        self.mark_ceilings(&below, flats, highest, is_mouth);
    }

    /// The level edges at `v`.
    fn flats_at(&self, v: f64, next: &mut usize) -> std::ops::Range<usize> {
        let flats = self.sublevel.flats();
        while *next < flats.len() && flats[*next].v < v {
            *next += 1;
        }
        let first = *next;
        while *next < flats.len() && flats[*next].v == v {
            *next += 1;
        }
        first..*next
    }

    /// Gives every strip of a slab its basin: that of what it stands on, a new one where that is several or nothing.
    fn connect(
        &mut self,
        here: &mut [Below],
        below: &[Below],
        links: &[(usize, usize)],
        (level, slab_idx): (f64, u32),
        volume: &mut Vec<f64>,
    ) {
        let mut have_met = false;
        for &(i, j) in links {
            let (own, other) = (here[i].basin, below[j].basin);
            have_met |= own != NONE && own != other;
            here[i].basin = other;
        }
        if have_met {
            self.meet(here, below, links, (level, slab_idx), volume);
        }
        for strip in here.iter_mut().filter(|strip| strip.basin == NONE) {
            strip.basin = self.bear(&[], level, slab_idx, volume);
        }
        let mut lives = vec![false; self.basins.len()];
        here.iter().for_each(|strip| lives[strip.basin as usize] = true);
        for strip in below {
            if !lives[strip.basin as usize] && self.basins[strip.basin as usize].parent.is_none() {
                self.close(strip.basin, level, slab_idx, volume);
            }
        }
    }

    /// Gives the strips of a slab in which basins meet theirs; those that stand on nothing are left without.
    fn meet(
        &mut self,
        here: &mut [Below],
        below: &[Below],
        links: &[(usize, usize)],
        (level, slab_idx): (f64, u32),
        volume: &mut Vec<f64>,
    ) {
        // Groups of strips that hang together through what is below: union over strips here and basins below.
        let n = here.len();
        let mut group: Vec<usize> = (0..n + below.len()).collect();
        for j in 0..below.len() {
            let first = below.iter().position(|b| b.basin == below[j].basin).unwrap_or(j);
            group[n + j] = n + first;
        }
        for &(i, j) in links {
            let (a, b) = (root_of(&mut group, i), root_of(&mut group, n + j));
            group[a] = b;
        }
        let roots: Vec<usize> = (0..n + below.len()).map(|i| root_of(&mut group, i)).collect();
        let mut is_done = vec![false; n];
        for i in 0..n {
            if is_done[i] || here[i].basin == NONE {
                continue;
            }
            let mut parts: Vec<u32> = Vec::new();
            for (j, b) in below.iter().enumerate() {
                if roots[n + j] == roots[i] && !parts.contains(&b.basin) {
                    parts.push(b.basin);
                }
            }
            let basin = match parts[..] {
                [one] => one,
                _ => self.bear(&parts, level, slab_idx, volume),
            };
            for k in (i..n).filter(|&k| roots[k] == roots[i]) {
                (here[k].basin, is_done[k]) = (basin, true);
            }
        }
    }

    /// A new basin over those that met; a low point over none.
    fn bear(&mut self, parts: &[u32], level: f64, slab_idx: u32, volume: &mut Vec<f64>) -> u32 {
        let idx = self.basins.len();
        let mut sum = 0.0;
        for &part in parts {
            self.close(part, level, slab_idx, volume);
            self.basins[part as usize].parent = Some(idx);
            sum += volume[part as usize];
        }
        self.basins.push(Basin {
            bottom: level,
            top: level,
            parent: None,
            children: parts.iter().map(|&p| p as usize).collect(),
            mouth: None,
            volume_at_top: sum,
            volume_at_bottom: sum,
            first_slab: slab_idx,
            end_slab: slab_idx,
        });
        volume.push(sum);
        idx as u32
    }

    fn close(&mut self, basin: u32, level: f64, slab_idx: u32, volume: &[f64]) {
        let basin_ref = &mut self.basins[basin as usize];
        basin_ref.top = level;
        basin_ref.end_slab = slab_idx;
        basin_ref.volume_at_top = volume[basin as usize];
    }

    /// Pairs (here, below) of strips that touch over more than `slack`, level slits between them taken off.
    fn link(
        &self,
        here: &[Below],
        below: &[Below],
        flats: std::ops::Range<usize>,
        slack: f64,
        links: &mut Vec<(usize, usize)>,
    ) {
        let flats = &self.sublevel.flats()[flats];
        links.clear();
        let (mut i, mut j) = (0, 0);
        while i < here.len() && j < below.len() {
            let (a, b) = (here[i].u, below[j].u);
            let (low, high) = (a[0].max(b[0]), a[1].min(b[1]));
            if high - low > slack {
                let shut: f64 = flats
                    .iter()
                    .filter(|f| f.is_floor)
                    .map(|f: &Flat| (f.u[1].min(high) - f.u[0].max(low)).max(0.0))
                    .sum();
                if high - low - shut > slack {
                    links.push((i, j));
                }
            }
            if a[1] < b[1] { i += 1 } else { j += 1 }
        }
    }

    /// Notes where basins first touch a mouth: along a rising edge, or a level one above or below.
    fn mark_mouths(
        &mut self,
        slab: &Slab,
        here: &mut [Below],
        below: &[Below],
        flats: std::ops::Range<usize>,
        level: f64,
        is_mouth: &dyn Fn(u32) -> bool,
    ) {
        for (i, strip) in here.iter().enumerate() {
            let (l, r) = self.sublevel.strip(slab, i);
            for edge_idx in [l.edge_idx, r.edge_idx] {
                if is_mouth(edge_idx) {
                    let mouth = &mut self.basins[strip.basin as usize].mouth;
                    mouth.get_or_insert((level, edge_idx));
                }
            }
        }
        for f in flats.clone() {
            let flat = self.sublevel.flats()[f];
            if flat.is_floor && is_mouth(flat.edge_idx) {
                for strip in here.iter().filter(|s| s.u[0] < flat.u[1] && s.u[1] > flat.u[0]) {
                    self.basins[strip.basin as usize].mouth.get_or_insert((level, flat.edge_idx));
                }
            }
        }
        self.mark_ceilings(below, flats, level, is_mouth);
    }

    /// Notes mouths that lie level over strips.
    fn mark_ceilings(
        &mut self,
        below: &[Below],
        flats: std::ops::Range<usize>,
        level: f64,
        is_mouth: &dyn Fn(u32) -> bool,
    ) {
        for f in flats {
            let flat = self.sublevel.flats()[f];
            if !flat.is_floor && is_mouth(flat.edge_idx) {
                for strip in below.iter().filter(|s| s.u[0] < flat.u[1] && s.u[1] > flat.u[0]) {
                    self.basins[strip.basin as usize].mouth.get_or_insert((level, flat.edge_idx));
                }
            }
        }
    }

    /// Volume of a strip between two levels of its slab, m3.
    pub(super) fn strip_volume(&self, left: &Piece, right: &Piece, from: f64, to: f64) -> f64 {
        let [low, high] = [from, to].map(|v| (v, [left.u_at(v), right.u_at(v)]));
        self.volume_between(left, right, low, high)
    }

    /// The same, where its span of u at both levels is known.
    fn volume_between(
        &self,
        left: &Piece,
        right: &Piece,
        (from, [l0, r0]): (f64, [f64; 2]),
        (to, [l1, r1]): (f64, [f64; 2]),
    ) -> f64 {
        if let Some(depth) = self.depth.constant() {
            let area = 0.5 * ((r0 - l0).max(0.0) + (r1 - l1).max(0.0)) * (to - from);
            let arcs = left.segment_area([l0, from], [l1, to]) + right.segment_area([r0, from], [r1, to]);
            return depth * (area + arcs);
        }
        let point = |u: f64, v: f64| self.sublevel.point(u, v);
        let (a, b, c, d) = (point(l0, from), point(r0, from), point(r1, to), point(l1, to));
        let side = |piece: &Piece, low, high| match piece.arc {
            None => Edge::line(low, high),
            Some((_, radius)) => Edge::with_radius(low, high, if piece.is_right { radius } else { -radius })
                .unwrap_or(Edge::line(low, high)),
        };
        let sum = self.depth.under(&Edge::line(a, b))
            + self.depth.under(&side(right, b, c))
            + self.depth.under(&Edge::line(c, d))
            - self.depth.under(&side(left, a, d));
        sum.max(0.0)
    }
}

const NONE: u32 = u32::MAX;

/// A strip's span of u at a border, and its basin.
struct Below {
    u: [f64; 2],
    basin: u32,
}

fn root_of(group: &mut [usize], mut i: usize) -> usize {
    while group[i] != i {
        group[i] = group[group[i]];
        i = group[i];
    }
    i
}
