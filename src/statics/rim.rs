//! Walls carried on vertically above a rim: where the liquid would stand if the rim were high enough.

use crate::geom::{Edge, Point, Vec2};
use crate::section::{Face, Mouth, Region, Wall};

use super::bound::Bound;

/// How a mouth was treated.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Carried {
    /// The walls beside it go on upward.
    On,
    /// A wall beside it is not vertical: freeboard has no meaning there.
    Slanted,
    /// Part of the section lies above it.
    Covered,
    /// It does not face up.
    Sideways,
}

/// A wall counts as vertical within this angle, radians: a tenth of a degree.
const VERTICAL_RAD: f64 = 0.1 * std::f64::consts::PI / 180.0;

/// The cut section with the walls beside each mouth carried on by `height_m` along the tank's z, nothing open, and what
/// became of each mouth. Mouths that cannot be carried on stay where they are, shut. Walls that were added come last,
/// two a mouth that is carried on, the low end of each where the mouth was.
pub fn carry_walls_on(region: &Region, bound: Bound, mouths: &[Mouth], height_m: f64) -> (Vec<Face>, Vec<Carried>) {
    let is_outline = |f: &&Face| matches!(f.wall, Wall::Outline { .. });
    let outline: Vec<Edge> = region.faces().iter().filter(is_outline).map(|f| f.edge).collect();
    let carried: Vec<Carried> = mouths.iter().map(|mouth| judge(&outline, mouth)).collect();
    let rise = Vec2::new(0.0, height_m);
    let is_raised = |edge_idx: usize| {
        let mouth_idx = mouths.iter().position(|m| m.edge_idxs.contains(&edge_idx));
        mouth_idx.is_some_and(|i| carried[i] == Carried::On)
    };
    let mut faces: Vec<Face> = bound.cut(region).faces().to_vec();
    for face in &mut faces {
        if let Wall::Outline { edge_idx, is_mouth } = &mut face.wall {
            *is_mouth = false;
            if is_raised(*edge_idx) {
                face.edge = Edge { start: face.edge.start + rise, end: face.edge.end + rise, ..face.edge };
            }
        }
    }
    for (mouth, _) in mouths.iter().zip(&carried).filter(|(_, how)| **how == Carried::On) {
        let Some((first, last)) = ends(&outline, mouth) else { continue };
        let wall = Wall::Outline { edge_idx: mouth.edge_idxs[0], is_mouth: false };
        faces.push(Face { edge: Edge::line(first, first + rise), wall });
        faces.push(Face { edge: Edge::line(last + rise, last), wall });
    }
    (faces, carried)
}

/// Start and end of the mouth in the sense of travel that has the region on its left.
fn ends(outline: &[Edge], mouth: &Mouth) -> Option<(Point, Point)> {
    let own: Vec<&Edge> = mouth.edge_idxs.iter().map(|&i| &outline[i]).collect();
    let first = own.iter().find(|e| !own.iter().any(|o| o.end == e.start))?;
    let last = own.iter().find(|e| !own.iter().any(|o| o.start == e.end))?;
    Some((first.start, last.end))
}

fn judge(outline: &[Edge], mouth: &Mouth) -> Carried {
    let Some((first, last)) = ends(outline, mouth) else { return Carried::Sideways };
    if last.x >= first.x {
        return Carried::Sideways;
    }
    let up_to = outline.iter().find(|e| e.end == first).map(|e| e.tangent_at(1.0));
    let down_from = outline.iter().find(|e| e.start == last).map(|e| e.tangent_at(0.0));
    let (Some(before), Some(after)) = (up_to, down_from) else { return Carried::Sideways };
    let is_vertical = |t: Vec2| t.y > 0.0 && t.x.abs() <= VERTICAL_RAD;
    if !is_vertical(before) || !is_vertical(-after) {
        return Carried::Slanted;
    }
    let slack = 1e-9 * (first.x - last.x);
    let (low, high) = (last.x + slack, first.x - slack);
    let rim = first.y.min(last.y);
    let is_above = |e: &Edge| {
        e.parts_below(-Vec2::y(), -rim - slack).iter().any(|&(a, b)| {
            let ((left, _), (right, _)) = e.part(a, b).extent(Vec2::x());
            right > low && left < high
        })
    };
    let others = (0..outline.len()).filter(|i| !mouth.edge_idxs.contains(i));
    if others.map(|i| &outline[i]).any(is_above) { Carried::Covered } else { Carried::On }
}
