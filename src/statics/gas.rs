//! Gas pockets: gas that no mouth opens to air, though the liquid under it has moved as if it were vented.
//!
//! Knows no pressure of gas: a pocket is named, and whoever judges by the liquid beside it must say so.

use crate::geom::{Point, StripView};
use crate::section::{Region, Section, Wall};

use super::pools::{Body, Look};

/// A gas space that touches no mouth.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct GasPocket {
    /// The cell in which most of it lies.
    pub cell_idx: usize,
    /// Volume, m3.
    pub volume_m3: f64,
    /// A point in it.
    pub at: Point,
    /// The compartment that it lies in.
    pub compartment: usize,
}

/// Gas below this share of the region's volume is what rounding leaves under a roof.
const LEAST_SHARE: f64 = 1e-6;

/// The pockets over `bodies` along a look, the largest first.
///
/// Gas passes plate openings that are dry on both sides, shut to liquid or not. A space is no pocket where its
/// volume cannot have changed: alone in a part of the cut that has no mouth.
pub fn gas_pockets(section: &Section, region: &Region, look: &Look, bodies: &[Body]) -> Vec<GasPocket> {
    let gas = Gas::new(look, bodies);
    let mut spaces = Spaces { group: (0..gas.strips.len()).collect() };
    for [below, above] in look.basins.contacts() {
        if gas.is_dry_at_top(below) && gas.is_dry_at_bottom(above) {
            spaces.join(below, above);
        }
    }
    gas.through_openings(section, &mut spaces);
    let is_vented = gas.vented();
    let parts: Vec<usize> = gas.strips.iter().map(|s| look.cut.part_of(s.edge_idxs[0])).collect();
    let dry: Vec<usize> = (0..gas.strips.len()).filter(|&i| gas.volumes_m3[i] > 0.0).collect();
    let whole: f64 = look.basins.all().iter().filter(|b| b.parent.is_none()).map(|b| b.volume_at_top).sum();
    let mut found: Vec<Space> = Vec::new();
    for &i in &dry {
        let root = spaces.root(i);
        let space = match found.iter_mut().find(|s| s.root == root) {
            Some(space) => space,
            None => {
                found.push(Space { root, volume_m3: 0.0, is_vented: false, largest: i, parts: Vec::new() });
                found.last_mut().expect("one was pushed")
            }
        };
        space.volume_m3 += gas.volumes_m3[i];
        space.is_vented |= is_vented[i];
        space.parts.push(parts[i]);
        if gas.volumes_m3[i] > gas.volumes_m3[space.largest] {
            space.largest = i;
        }
    }
    found.retain(|s| s.volume_m3 > LEAST_SHARE * whole);
    let has_mouth = |part: usize| {
        let faces = 0..look.cut.faces().len();
        faces.into_iter().any(|f| look.cut.part_of(f) == part && look.cut.is_mouth(f as u32))
    };
    let is_alone = |s: &Space| found.iter().all(|o| o.root == s.root || o.parts.iter().all(|p| !s.parts.contains(p)));
    let is_pocket = |s: &&Space| !s.is_vented && (!is_alone(s) || s.parts.iter().any(|&p| has_mouth(p)));
    let mut pockets: Vec<GasPocket> = found
        .iter()
        .filter(is_pocket)
        .map(|s| {
            let at = gas.middle(look, s.largest);
            GasPocket {
                cell_idx: region.cells().part_at(at).unwrap_or_default(),
                volume_m3: s.volume_m3,
                at,
                compartment: region.open().part_at(at).unwrap_or_default(),
            }
        })
        .collect();
    pockets.sort_by(|a, b| b.volume_m3.total_cmp(&a.volume_m3));
    pockets
}

/// A connected gas space.
struct Space {
    root: usize,
    volume_m3: f64,
    is_vented: bool,
    /// Its strip with most gas.
    largest: usize,
    /// The parts of the cut that it lies in.
    parts: Vec<usize>,
}

/// The strips of a look, and what is dry of each.
struct Gas<'a> {
    look: &'a Look<'a>,
    strips: Vec<StripView>,
    /// The level from which on each is dry; its top where none of it is.
    dry_from: Vec<f64>,
    volumes_m3: Vec<f64>,
    /// Level edges: (edge, strip, whether it is the strip's floor).
    level: Vec<(usize, usize, bool)>,
}

impl<'a> Gas<'a> {
    fn new(look: &'a Look<'a>, bodies: &[Body]) -> Gas<'a> {
        let levels: Vec<f64> = bodies.iter().map(|b| look.level_of(b)).collect();
        let owners = look.owners(bodies);
        let strips: Vec<StripView> = look.basins.strips().collect();
        let dry_from: Vec<f64> = strips
            .iter()
            .map(|s| owners[s.basin].map_or(s.bottom, |body| levels[body].clamp(s.bottom, s.top)))
            .collect();
        let volume = |(s, &from): (&StripView, &f64)| {
            let below = |level| look.basins.strip_volume_below(s, level);
            if from < s.top { below(s.top) - below(from) } else { 0.0 }
        };
        let volumes_m3 = strips.iter().zip(&dry_from).map(volume).collect();
        Gas { look, strips, dry_from, volumes_m3, level: look.basins.level_edges() }
    }

    /// Rounding leaves strips of no height: those are dry at their top where they are at their bottom.
    fn is_dry_at_top(&self, strip: usize) -> bool {
        self.dry_from[strip] < self.strips[strip].top || self.is_dry_at_bottom(strip)
    }

    fn is_dry_at_bottom(&self, strip: usize) -> bool {
        self.dry_from[strip] <= self.strips[strip].bottom
    }

    /// For each strip, whether its gas touches a mouth.
    fn vented(&self) -> Vec<bool> {
        let is_mouth = |edge_idx: usize| self.look.cut.is_mouth(edge_idx as u32);
        let touches = |(i, s): (usize, &StripView)| self.is_dry_at_top(i) && s.edge_idxs.into_iter().any(is_mouth);
        let mut is_vented: Vec<bool> = self.strips.iter().enumerate().map(touches).collect();
        for &(edge_idx, strip, is_floor) in &self.level {
            is_vented[strip] |= is_mouth(edge_idx) && self.is_dry_beside(strip, is_floor);
        }
        is_vented
    }

    fn is_dry_beside(&self, strip: usize, is_floor: bool) -> bool {
        if is_floor { self.is_dry_at_bottom(strip) } else { self.is_dry_at_top(strip) }
    }

    /// Joins spaces through openings that the cut takes as shut, where both sides are dry.
    fn through_openings(&self, section: &Section, spaces: &mut Spaces) {
        let is_opening = |wall: Wall| match wall {
            Wall::Plate { plate_idx, span_m: [from, to], .. } => {
                let middle = 0.5 * (from + to);
                section.plates[plate_idx].openings.iter().any(|o| o.from_m <= middle && middle <= o.to_m)
            }
            _ => false,
        };
        let faces = self.look.cut.faces();
        for (i, face) in faces.iter().enumerate().filter(|(_, f)| is_opening(f.wall)) {
            let is_other_side = |f: &crate::section::Face| f.edge == face.edge.reversed() && is_opening(f.wall);
            let Some(other) = faces.iter().skip(i + 1).position(is_other_side).map(|k| i + 1 + k) else { continue };
            for (a, from_a, to_a) in self.dry_along(i) {
                for (b, from_b, to_b) in self.dry_along(other) {
                    if from_a.max(from_b) < to_a.min(to_b) || (from_a == to_a && from_a == from_b) {
                        spaces.join(a, b);
                    }
                }
            }
        }
    }

    /// The strips beside a face, with the levels between which it is dry there; one level along a level face.
    fn dry_along(&self, face_idx: usize) -> Vec<(usize, f64, f64)> {
        let strips =
            self.strips.iter().enumerate().filter(|(i, s)| s.edge_idxs.contains(&face_idx) && self.is_dry_at_top(*i));
        let mut dry: Vec<(usize, f64, f64)> = strips.map(|(i, s)| (i, self.dry_from[i], s.top)).collect();
        let level = self.level.iter().filter(|l| l.0 == face_idx && self.is_dry_beside(l.1, l.2));
        dry.extend(level.map(|&(_, strip, is_floor)| {
            let v = if is_floor { self.strips[strip].bottom } else { self.strips[strip].top };
            (strip, v, v)
        }));
        dry
    }

    /// A point in the gas of a strip.
    fn middle(&self, look: &Look, strip: usize) -> Point {
        let s = &self.strips[strip];
        let level = 0.5 * (self.dry_from[strip] + s.top);
        let surface = look.basins.surface(s.basin, level).into_iter().map(|(l, r)| nalgebra::center(&l, &r));
        let near = |p: &Point| (p - s.middle).norm();
        surface.min_by(|a, b| near(a).total_cmp(&near(b))).unwrap_or(s.middle)
    }
}

/// Strips that hang together.
struct Spaces {
    group: Vec<usize>,
}

impl Spaces {
    fn root(&mut self, mut i: usize) -> usize {
        while self.group[i] != i {
            self.group[i] = self.group[self.group[i]];
            i = self.group[i];
        }
        i
    }

    fn join(&mut self, a: usize, b: usize) {
        let (a, b) = (self.root(a), self.root(b));
        self.group[a.max(b)] = a.min(b);
    }
}
