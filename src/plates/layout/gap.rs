//! Gaps: clear distances along s between upright plates, and to the ends of the tank.

use crate::geom::{Edge, Point, Sublevel, Vec2};
use crate::section::{Placed, Region, Wall};

use super::divider::{middle, walls};

/// The distance along s from one upright plate, or end of the tank, to the next.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Gap {
    /// Where it begins.
    pub left: Point,
    /// Where it ends, at the same level.
    pub right: Point,
    /// The plates at its left and right; none at an end of the tank.
    pub plate_idxs: [Option<usize>; 2],
}

impl Gap {
    /// From left to right, m.
    pub fn length_m(&self) -> f64 {
        self.right.x - self.left.x
    }
}

/// The gaps on both sides of every upright plate, measured level with the middle of its height; the tank's own length at
/// the middle of its height where it has none.
///
/// A plate that does not reach that level counts as carried on from its end; thicknesses are not taken off, so that a
/// gap is no shorter than it is built; obstacles count for nothing.
pub fn gaps(region: &Region) -> Vec<Gap> {
    let outline: Vec<Edge> = walls(region, |wall| matches!(wall, Wall::Outline { .. }));
    let outline = Sublevel::new(&outline, Vec2::y());
    let upright: Vec<(usize, &Placed)> = region.plates().iter().enumerate().filter(|(_, p)| p.is_upright()).collect();
    if upright.is_empty() {
        let chords = outline.chords(0.5 * (outline.lowest() + outline.highest()));
        return chords.into_iter().map(|(left, right)| Gap { left, right, plate_idxs: [None; 2] }).collect();
    }
    let mut gaps = Vec::new();
    for &(plate_idx, placed) in &upright {
        let z = middle(placed).y;
        let s = s_at(placed, z);
        let slack = 1e-9 * region.diagonal_m();
        let around = outline.chords(z).into_iter().find(|(l, r)| l.x - slack <= s && s <= r.x + slack);
        let Some((left, right)) = around else { continue };
        // Those in the same plane have an order too, so that one of them has the next plate on either side.
        let others = upright.iter().filter(|o| o.0 != plate_idx).map(|&(i, other)| (s_at(other, z), i));
        let others: Vec<(f64, usize)> = others.filter(|o| left.x <= o.0 && o.0 <= right.x).collect();
        let is_left = |o: &(f64, usize)| (o.0, o.1) < (s, plate_idx);
        let before = others.iter().copied().filter(is_left).max_by(|a, b| a.0.total_cmp(&b.0).then(a.1.cmp(&b.1)));
        let after =
            others.iter().copied().filter(|o| !is_left(o)).min_by(|a, b| a.0.total_cmp(&b.0).then(a.1.cmp(&b.1)));
        let here = Point::new(s, z);
        gaps.push(Gap {
            left: before.map_or(left, |b| Point::new(b.0, z)),
            right: here,
            plate_idxs: [before.map(|b| b.1), Some(plate_idx)],
        });
        gaps.push(Gap {
            left: here,
            right: after.map_or(right, |a| Point::new(a.0, z)),
            plate_idxs: [Some(plate_idx), after.map(|a| a.1)],
        });
    }
    gaps
}

/// Where a plate stands at a level; beyond its ends, where it would stand if carried on.
fn s_at(placed: &Placed, z: f64) -> f64 {
    let crossed = placed.points.windows(2).find(|w| (w[0].y - z) * (w[1].y - z) <= 0.0 && w[0].y != w[1].y);
    let (from, to) = match crossed {
        Some(w) => (w[0], w[1]),
        None => {
            let last = placed.points.len() - 1;
            let (first, second) = (placed.points[0], placed.points[1]);
            let is_beyond_first = (first.y - z).abs() <= (placed.points[last].y - z).abs();
            if is_beyond_first { (first, second) } else { (placed.points[last], placed.points[last - 1]) }
        }
    };
    let (across, up) = (to.x - from.x, to.y - from.y);
    if up == 0.0 { from.x } else { from.x + across * ((z - from.y) / up) }
}
