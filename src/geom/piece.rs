//! A stretch of an edge along which the level only rises: what slabs are cut from.

use std::f64::consts::FRAC_PI_2;

use super::edge::phi_minus_sin;
use super::{Edge, Point, Vec2};

/// A stretch of an edge along which the level only rises, in (u, v) about the region's origin: v along `up`, u to
/// its right.
#[derive(Clone, Copy, Debug)]
pub(super) struct Piece {
    pub low: [f64; 2],
    pub high: [f64; 2],
    /// Whether the edge travels upward here: the region is then to its left, and it bounds a strip on the right.
    pub is_right: bool,
    /// du/dv of the chord.
    gain: f64,
    /// Arcs: (low end - centre), signed radius as travelled.
    pub arc: Option<([f64; 2], f64)>,
    /// The edge that it is a stretch of, and the edge's parameters at the low and the high end.
    pub edge_idx: u32,
    pub t: [f64; 2],
}

/// A level edge: it bounds no strip, but it may part what lies below it from what lies above.
#[derive(Clone, Copy, Debug)]
pub(super) struct Flat {
    pub v: f64,
    /// From left to right.
    pub u: [f64; 2],
    pub edge_idx: u32,
    /// Whether the region lies above it.
    pub is_floor: bool,
}

impl Piece {
    /// +1 where it bounds a strip on the right, -1 on the left.
    pub fn side(&self) -> f64 {
        if self.is_right { 1.0 } else { -1.0 }
    }

    /// u at level `v`.
    pub fn u_at(&self, v: f64) -> f64 {
        if v <= self.low[1] {
            return self.low[0];
        }
        if v >= self.high[1] {
            return self.high[0];
        }
        let d = v - self.low[1];
        match self.arc {
            None => self.low[0] + self.gain * d,
            Some(([x, t], radius)) => {
                // (x + du)^2 + (t + d)^2 = x^2 + t^2, solved for du without cancellation. The piece stays on one
                // side of the centre: the outer side of a left turn travelling up, and so on.
                let q = d * (2.0 * t + d);
                let side = if (radius > 0.0) == self.is_right { 1.0 } else { -1.0 };
                let denominator = x.abs() + (x * x - q).max(0.0).sqrt();
                if denominator > 0.0 { self.low[0] - side * q / denominator } else { self.low[0] }
            }
        }
    }

    /// Level at the edge's parameter `t`, held to the piece.
    pub fn v_at(&self, t: f64) -> f64 {
        let share = (t - self.t[0]) / (self.t[1] - self.t[0]);
        if share <= 0.0 {
            return self.low[1];
        }
        if share >= 1.0 {
            return self.high[1];
        }
        match self.arc {
            None => self.low[1] + share * (self.high[1] - self.low[1]),
            Some(([x, y], radius)) => {
                // Turn the low end's radius by its share of the angle to the high end.
                let (du, dv) = (self.high[0] - self.low[0], self.high[1] - self.low[1]);
                let angle = 2.0 * ((du * du + dv * dv).sqrt() / (2.0 * radius.abs())).min(1.0).asin() * share;
                // Travelled up, a left turn goes round counter-clockwise; down, the other way.
                let (sin, cos) = angle.copysign(if self.is_right { radius } else { -radius }).sin_cos();
                (self.low[1] + x * sin + y * (cos - 1.0)).clamp(self.low[1], self.high[1])
            }
        }
    }

    /// The edge's parameter at level `v`, held to the piece.
    pub fn t_at(&self, v: f64) -> f64 {
        if v <= self.low[1] {
            return self.t[0];
        }
        if v >= self.high[1] {
            return self.t[1];
        }
        let share = match self.arc {
            None => (v - self.low[1]) / (self.high[1] - self.low[1]),
            Some((_, radius)) => {
                let angle_to = |to: [f64; 2]| {
                    let (du, dv) = (to[0] - self.low[0], to[1] - self.low[1]);
                    ((du * du + dv * dv).sqrt() / (2.0 * radius.abs())).min(1.0).asin()
                };
                angle_to([self.u_at(v), v]) / angle_to(self.high)
            }
        };
        self.t[0] + share * (self.t[1] - self.t[0])
    }

    /// Area that the arc adds to the strips beyond its chord, between two of its points: with x = chord / 2r,
    /// r2 (asin x - x sqrt(1 - x2)), by its series for short stretches.
    pub fn segment_area(&self, from: [f64; 2], to: [f64; 2]) -> f64 {
        let Some((_, radius)) = self.arc else { return 0.0 };
        let (du, dv) = (to[0] - from[0], to[1] - from[1]);
        let x2 = (du * du + dv * dv) / (4.0 * radius * radius);
        let segment = if x2 < 0.01 {
            // 2 int x2 / sqrt(1 - x2) dx; the first term left out is below 1e-17 of the sum.
            let series = [63.0 / 3328.0, 35.0 / 1408.0, 5.0 / 144.0, 3.0 / 56.0, 0.1, 1.0 / 3.0];
            let tail = x2 * (429.0 / 34816.0) + 231.0 / 15360.0;
            2.0 * x2 * x2.sqrt() * series.into_iter().fold(tail, |sum, term| sum * x2 + term)
        } else {
            0.5 * phi_minus_sin(2.0 * x2.sqrt().min(1.0).asin())
        };
        radius * radius.abs() * segment
    }
}

/// Cuts edges into pieces, in (u, v) about `origin`, and the level edges, which bound no strip.
pub(super) fn cut(edges: &[Edge], origin: Point, up: Vec2, right: Vec2) -> (Vec<Piece>, Vec<Flat>) {
    let local = |p: Point| {
        let d = p - origin;
        [right.dot(&d), up.dot(&d)]
    };
    let mut pieces = Vec::with_capacity(edges.len() + 8);
    let mut flats = Vec::new();
    let mut last = (origin, [0.0; 2]);
    for (edge_idx, edge) in edges.iter().enumerate() {
        let edge_idx = edge_idx as u32;
        let from = if edge.start == last.0 { last.1 } else { local(edge.start) };
        let to = local(edge.end);
        if edge.is_arc() {
            push_arc(edge, edge_idx, (from, to), up, right, local, &mut pieces);
        } else if from[1] == to[1] {
            // Travelled to the right, the region is above.
            let is_floor = to[0] > from[0];
            let u = if is_floor { [from[0], to[0]] } else { [to[0], from[0]] };
            flats.push(Flat { v: from[1], u, edge_idx, is_floor });
        } else {
            push_piece((from, 0.0), (to, 1.0), None, edge_idx, &mut pieces);
        }
        last = (edge.end, to);
    }
    (pieces, flats)
}

fn push_piece(
    (from, from_t): ([f64; 2], f64),
    (to, to_t): ([f64; 2], f64),
    arc: Option<([f64; 2], f64)>,
    edge_idx: u32,
    pieces: &mut Vec<Piece>,
) {
    if from[1] == to[1] {
        return;
    }
    let is_right = to[1] > from[1];
    let (low, high, t) = if is_right { (from, to, [from_t, to_t]) } else { (to, from, [to_t, from_t]) };
    let gain = (high[0] - low[0]) / (high[1] - low[1]);
    pieces.push(Piece { low, high, is_right, gain, arc, edge_idx, t });
}

/// Cuts an arc where it turns along `up`, and at the quarter points between, where its angle is ill-conditioned
/// as a function of the chord no more.
fn push_arc(
    edge: &Edge,
    edge_idx: u32,
    (from, end): ([f64; 2], [f64; 2]),
    up: Vec2,
    right: Vec2,
    local: impl Fn(Point) -> [f64; 2],
    pieces: &mut Vec<Piece>,
) {
    let radius = edge.radius();
    // Point minus centre: the radius, at right angles to the tangent.
    let out = |t: f64| {
        let tangent = edge.tangent_at(t);
        let out = Vec2::new(tangent.y, -tangent.x) * radius;
        [right.dot(&out), up.dot(&out)]
    };
    let (mut from, mut from_out, mut from_t) = (from, out(0.0), 0.0);
    let turned = from_angle(radius, from_out);
    let mut push = |to: [f64; 2], to_out: [f64; 2], to_t: f64| {
        let low_out = if to[1] > from[1] { from_out } else { to_out };
        push_piece((from, from_t), (to, to_t), Some((low_out, radius)), edge_idx, pieces);
        (from, from_out, from_t) = (to, to_out, to_t);
    };
    let end_out = out(1.0);
    // The angle of the radius, signed by the way round, turns through the sweep; quarter turns lie on the axes.
    let quarter = |k: f64| (k * FRAC_PI_2 - turned) / edge.sweep.abs();
    let mut k = (turned / FRAC_PI_2).floor() + 1.0;
    // Ends within rounding of an axis are ends, not stops.
    while quarter(k) < 1.0 - 1e-12 {
        let t = quarter(k);
        if t > 1e-12 {
            let mut at = out(t);
            let flat = usize::from(at[0].abs() > at[1].abs());
            (at[flat], at[1 - flat]) = (0.0, radius.abs().copysign(at[1 - flat]));
            push(local(edge.point_at(t)), at, t);
        }
        k += 1.0;
    }
    push(end, end_out, 1.0);
}

/// Angle of a point about the centre, growing along the arc whichever way it turns.
fn from_angle(radius: f64, out: [f64; 2]) -> f64 {
    if radius > 0.0 { out[1].atan2(out[0]) } else { (-out[1]).atan2(out[0]) }
}
