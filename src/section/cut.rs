//! The section cut by its plates: closed chains in which a plate is a slit, out along one side and back along the other.
//!
//! Walls are cut where plates stand on them, at the very same point, so that nothing leaks through rounding.

use crate::geom::{Basins, Edge, Point, Vec2};
use crate::problem::Place;

use super::WidthLaw;

/// What a face is a part of.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Wall {
    /// An edge of the outline.
    Outline {
        /// Which edge.
        edge_idx: usize,
        /// Whether it is open to air.
        is_mouth: bool,
    },
    /// An edge of an obstacle.
    Obstacle {
        /// Which obstacle.
        obstacle_idx: usize,
        /// Which of its edges.
        edge_idx: usize,
    },
    /// One side of a plate.
    Plate {
        /// Which plate.
        plate_idx: usize,
        /// From where to where along it, m from its first point.
        span_m: [f64; 2],
        /// Whether it is the side on the left of the direction in which the plate is drawn.
        is_left: bool,
    },
    /// A plate carried on from a free end to the next wall: a border between cells, not a wall.
    Carried,
}

impl Wall {
    /// Its place on the study.
    pub fn place(&self) -> Place {
        match *self {
            Wall::Outline { edge_idx, .. } => Place::Edge(edge_idx),
            Wall::Obstacle { obstacle_idx, edge_idx } => Place::Obstacle { obstacle_idx, edge_idx: Some(edge_idx) },
            Wall::Plate { plate_idx, .. } => Place::Plate { plate_idx, opening_idx: None },
            Wall::Carried => Place::Whole,
        }
    }
}

/// A part of a wall as one side of the liquid sees it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Face {
    /// Geometry, with the region on its left.
    pub edge: Edge,
    /// What it is a part of.
    pub wall: Wall,
}

/// A section cut by slits.
#[derive(Clone, Debug)]
pub struct Cut {
    faces: Vec<Face>,
    edges: Vec<Edge>,
    part_of: Vec<usize>,
    /// A point inside each part.
    inside: Vec<Point>,
}

impl Cut {
    /// From faces that are closed chains, slits out and back.
    pub fn new(faces: Vec<Face>) -> Cut {
        let edges: Vec<Edge> = faces.iter().map(|f| f.edge).collect();
        let (part_of, inside) = parts(&edges);
        Cut { faces, edges, part_of, inside }
    }

    /// All faces.
    pub fn faces(&self) -> &[Face] {
        &self.faces
    }

    /// The same as geometry alone.
    pub fn edges(&self) -> &[Edge] {
        &self.edges
    }

    /// Count of parts that hang together.
    pub fn n_parts(&self) -> usize {
        self.inside.len()
    }

    /// A point inside a part.
    pub fn inside(&self, part: usize) -> Point {
        self.inside[part]
    }

    /// The part that a face bounds.
    pub fn part_of(&self, face_idx: usize) -> usize {
        self.part_of[face_idx]
    }

    /// The part that holds a point; none outside.
    pub fn part_at(&self, p: Point) -> Option<usize> {
        let depth = WidthLaw::Constant { width_m: 1.0 };
        let basins = Basins::new(&self.edges, Vec2::y(), &depth, &|_| false);
        let face_idx = basins.face_beside(p)?;
        Some(self.part_of[face_idx])
    }

    /// The faces of one part as geometry, with their indices.
    pub fn edges_of(&self, part: usize) -> (Vec<Edge>, Vec<usize>) {
        let idxs: Vec<usize> = (0..self.faces.len()).filter(|&i| self.part_of[i] == part).collect();
        (idxs.iter().map(|&i| self.edges[i]).collect(), idxs)
    }

    /// Whether a face is a mouth.
    pub fn is_mouth(&self, face_idx: u32) -> bool {
        matches!(self.faces[face_idx as usize].wall, Wall::Outline { is_mouth: true, .. })
    }
}

/// Which part of the region each face bounds, and a point inside each: faces that bound one strip bound one part.
fn parts(edges: &[Edge]) -> (Vec<usize>, Vec<Point>) {
    let mut group: Vec<usize> = (0..edges.len()).collect();
    let mut inside = vec![Point::origin(); edges.len()];
    let mut widest = vec![0.0; edges.len()];
    let depth = WidthLaw::Constant { width_m: 1.0 };
    // Two directions, so that an edge that is level in one is not in the other.
    for up in [Vec2::new(-0.6, 0.8), Vec2::new(0.28, 0.96)] {
        let basins = Basins::new(edges, up, &depth, &|_| false);
        let mut first_of_root = vec![None; basins.all().len()];
        for strip in basins.strips() {
            let root = basins.root(strip.basin);
            for face_idx in strip.edge_idxs {
                let first = *first_of_root[root].get_or_insert(face_idx);
                let (a, b) = (root_of(&mut group, face_idx), root_of(&mut group, first));
                group[a.max(b)] = a.min(b);
                if strip.size_m > widest[face_idx] {
                    (widest[face_idx], inside[face_idx]) = (strip.size_m, strip.middle);
                }
            }
        }
    }
    let mut number = vec![None; edges.len()];
    let mut parts: Vec<(f64, Point)> = Vec::new();
    let part_of = (0..edges.len())
        .map(|i| {
            let root = root_of(&mut group, i);
            let part = *number[root].get_or_insert_with(|| {
                parts.push((0.0, inside[i]));
                parts.len() - 1
            });
            if widest[i] > parts[part].0 {
                parts[part] = (widest[i], inside[i]);
            }
            part
        })
        .collect();
    (part_of, parts.into_iter().map(|p| p.1).collect())
}

fn root_of(group: &mut [usize], mut i: usize) -> usize {
    while group[i] != i {
        group[i] = group[group[i]];
        i = group[i];
    }
    i
}

/// A base edge with the region on its left, and the points at which it is to be cut.
#[derive(Clone, Debug)]
pub(super) struct Base {
    pub edge: Edge,
    pub wall: Wall,
    pub stops: Vec<(f64, Point)>,
}

impl Base {
    /// Marks a cut; a point within `slack` of an end needs none.
    pub fn stop_at(&mut self, p: Point, slack: f64) {
        let (t, _) = self.edge.nearest(p);
        let is_end = (p - self.edge.start).norm() <= slack || (p - self.edge.end).norm() <= slack;
        if !is_end && t > 0.0 && t < 1.0 && !self.stops.iter().any(|s| s.1 == p) {
            self.stops.push((t, p));
        }
    }

    /// Its parts, in order.
    pub fn faces(&self, out: &mut Vec<Face>) {
        let mut stops = self.stops.clone();
        stops.sort_unstable_by(|a, b| a.0.total_cmp(&b.0));
        stops.push((1.0, self.edge.end));
        let (mut from_t, mut from) = (0.0, self.edge.start);
        for (t, p) in stops {
            let edge = Edge { start: from, end: p, sweep: self.edge.sweep * (t - from_t) };
            out.push(Face { edge, wall: self.wall });
            (from_t, from) = (t, p);
        }
    }
}

/// A plate as a chain of points, each at its distance along it, with the stretches that are open.
#[derive(Clone, Debug)]
pub(super) struct Slit {
    /// Which plate; none for one that is carried on.
    pub plate_idx: Option<usize>,
    pub nodes: Vec<(f64, Point)>,
    pub openings: Vec<[f64; 2]>,
}

impl Slit {
    /// Puts a point on it; a point within `slack` of a node is that node.
    pub fn stop_at(&mut self, along_m: f64, p: Point, slack: f64) {
        if self.nodes.iter().all(|n| n.1 != p && (n.0 - along_m).abs() > slack) {
            self.nodes.push((along_m, p));
            self.nodes.sort_by(|a, b| a.0.total_cmp(&b.0));
        }
    }

    /// The straight stretches between nodes, solid ones only where `is_open`.
    pub fn stretches(&self, is_open: bool) -> impl Iterator<Item = ([f64; 2], Edge)> {
        let is_in_opening =
            move |middle: f64| is_open && self.openings.iter().any(|o| o[0] <= middle && middle <= o[1]);
        self.nodes
            .windows(2)
            .filter(move |w| !is_in_opening(0.5 * (w[0].0 + w[1].0)))
            .map(|w| ([w[0].0, w[1].0], Edge::line(w[0].1, w[1].1)))
    }

    /// Both sides, as chains out and back.
    pub fn faces(&self, is_open: bool, out: &mut Vec<Face>) {
        let wall = |span_m, is_left| match self.plate_idx {
            Some(plate_idx) => Wall::Plate { plate_idx, span_m, is_left },
            None => Wall::Carried,
        };
        let stretches: Vec<([f64; 2], Edge)> = self.stretches(is_open).collect();
        // A face has the region on its left: travelled as drawn, it is the plate's left side.
        out.extend(stretches.iter().map(|&(span, edge)| Face { edge, wall: wall(span, true) }));
        out.extend(stretches.iter().rev().map(|&(span, e)| Face { edge: e.reversed(), wall: wall(span, false) }));
    }
}
