//! Which parts of which walls a pool wets.

use crate::geom::Edge;
use crate::section::{Face, Wall};

use super::pools::{Body, Look};

/// A part of a face below a pool's surface.
#[derive(Clone, Copy, Debug)]
pub(super) struct WetPart {
    /// What it is a part of.
    pub wall: Wall,
    /// Its geometry, the liquid on its left.
    pub edge: Edge,
    /// On plates: from where to where along the plate, m, in the sense of `edge`.
    pub along_m: [f64; 2],
    /// The body that wets it.
    pub body_idx: usize,
}

/// All wetted parts, in the order of the cut's faces. `levels` are those of `bodies`.
pub(super) fn wetted(look: &Look, bodies: &[Body], levels: &[f64]) -> Vec<WetPart> {
    let owners = look.owners(bodies);
    let mut out = Vec::new();
    for (face_idx, face) in look.cut.faces().iter().enumerate() {
        for side in look.basins.sides_of(face_idx as u32) {
            let Some(body_idx) = owners[side.basin] else { continue };
            if side.low_level >= levels[body_idx] {
                continue;
            }
            let (mut from, mut to) = (side.t_low, side.t_at(levels[body_idx]));
            if to < from {
                (from, to) = (to, from);
            }
            if to > from {
                let edge = part(&face.edge, from, to);
                out.push(WetPart { wall: face.wall, edge, along_m: along(face, from, to), body_idx });
            }
        }
    }
    out
}

/// The part between two parameters; the whole where it is.
fn part(edge: &Edge, from: f64, to: f64) -> Edge {
    if from == 0.0 && to == 1.0 { *edge } else { edge.part(from, to) }
}

fn along(face: &Face, from: f64, to: f64) -> [f64; 2] {
    match face.wall {
        Wall::Plate { span_m: [a, b], is_left, .. } => {
            let at = |t: f64| if is_left { a + (b - a) * t } else { b - (b - a) * t };
            [at(from), at(to)]
        }
        _ => [0.0; 2],
    }
}
