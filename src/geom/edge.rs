//! One edge: a straight segment or an exact circular arc.

use std::f64::consts::{PI, TAU};

use crate::num::bisect;

use super::{Point, Vec2, cross};

/// A directed edge from `start` to `end`. `sweep` is the angle that the tangent turns through, radians: zero for
/// a straight line, positive to the left (counter-clockwise), less than a full turn in size.
///
/// An arc is held by its ends and its sweep, so that moving a vertex never tears the chain. With chord c and
/// sweep phi: radius = c / (2 sin(phi/2)), sagitta = (c/2) tan(phi/4), on the right-hand side of the chord for a
/// positive sweep.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Edge {
    /// Where it starts.
    pub start: Point,
    /// Where it ends.
    pub end: Point,
    /// Angle turned through, radians.
    pub sweep: f64,
}

impl Edge {
    /// A straight edge.
    pub fn line(start: Point, end: Point) -> Edge {
        Edge { start, end, sweep: 0.0 }
    }

    /// The arc from `start` to `end` that passes through `via`; a straight line where the three are in line.
    pub fn through(start: Point, via: Point, end: Point) -> Edge {
        let (a, b) = (via - start, end - via);
        // Inscribed angle: the tangent turns by twice the exterior angle at `via`.
        Edge { start, end, sweep: 2.0 * cross(a, b).atan2(a.dot(&b)) }
    }

    /// The arc from `start` to `end` whose middle lies `sagitta` to the right of the chord (negative: left).
    pub fn with_sagitta(start: Point, end: Point, sagitta: f64) -> Edge {
        let chord = (end - start).norm();
        let sweep = if chord > 0.0 { 4.0 * (2.0 * sagitta / chord).atan() } else { 0.0 };
        Edge { start, end, sweep }
    }

    /// The minor arc from `start` to `end` with this radius, turning left when `radius` is positive; none when
    /// the radius is smaller than half the chord.
    pub fn with_radius(start: Point, end: Point, radius: f64) -> Option<Edge> {
        let ratio = (end - start).norm() / (2.0 * radius);
        (ratio.abs() <= 1.0).then(|| Edge { start, end, sweep: 2.0 * ratio.asin() })
    }

    /// Whether it is an arc.
    pub fn is_arc(&self) -> bool {
        self.sweep != 0.0
    }

    /// From start to end.
    pub fn chord(&self) -> Vec2 {
        self.end - self.start
    }

    /// Signed radius of an arc, positive when it turns left; infinite for a line.
    pub fn radius(&self) -> f64 {
        if self.is_arc() { self.chord().norm() / (2.0 * (self.sweep / 2.0).sin()) } else { f64::INFINITY }
    }

    /// Distance of the arc's middle from the chord, positive to the right of the chord.
    pub fn sagitta(&self) -> f64 {
        0.5 * self.chord().norm() * (self.sweep / 4.0).tan()
    }

    /// Centre of an arc; none for a line.
    pub fn center(&self) -> Option<Point> {
        if !self.is_arc() {
            return None;
        }
        let (c, half) = (self.chord(), self.sweep / 2.0);
        // From the chord's middle, to the left by c/2 cot(sweep/2).
        let left = Vec2::new(-c.y, c.x) * (0.5 * half.cos() / half.sin());
        Some(self.start + c * 0.5 + left)
    }

    /// Length along the edge.
    pub fn length(&self) -> f64 {
        if self.is_arc() { (self.radius() * self.sweep).abs() } else { self.chord().norm() }
    }

    /// The point at parameter `t` in 0..=1, in proportion to length. Exact at both ends; stable however flat the
    /// arc is, since it is built on the chord: P = start + c sin(t phi/2) / sin(phi/2), turned by (t - 1) phi/2.
    pub fn point_at(&self, t: f64) -> Point {
        if t <= 0.0 {
            return self.start;
        }
        if t >= 1.0 {
            return self.end;
        }
        let c = self.chord();
        if !self.is_arc() {
            return self.start + c * t;
        }
        let half = self.sweep / 2.0;
        let ratio = (t * half).sin() / half.sin();
        self.start + rotate(c, (t - 1.0) * half) * ratio
    }

    /// Unit tangent at parameter `t`, in the direction of travel.
    pub fn tangent_at(&self, t: f64) -> Vec2 {
        let c = self.chord();
        let n = c.norm();
        if n == 0.0 { Vec2::zeros() } else { rotate(c / n, (t - 0.5) * self.sweep) }
    }

    /// The part between two parameters.
    pub fn part(&self, from: f64, to: f64) -> Edge {
        Edge { start: self.point_at(from), end: self.point_at(to), sweep: self.sweep * (to - from) }
    }

    /// The same edge travelled backwards.
    pub fn reversed(&self) -> Edge {
        Edge { start: self.end, end: self.start, sweep: -self.sweep }
    }

    /// Area between the arc and its chord, positive when the arc lies to the right of the chord (it then adds to
    /// a counter-clockwise region): (r2/2)(phi - sin phi), by series for flat arcs.
    pub fn segment_area(&self) -> f64 {
        if !self.is_arc() {
            return 0.0;
        }
        let c2 = self.chord().norm_squared();
        let half_sin = (self.sweep / 2.0).sin();
        c2 / (8.0 * half_sin * half_sin) * phi_minus_sin(self.sweep)
    }

    /// Parameters strictly inside 0..1 at which the tangent is at right angles to `axis`: where the edge turns
    /// round along it. None for lines.
    pub fn turning_points(&self, axis: Vec2) -> Vec<f64> {
        if !self.is_arc() {
            return Vec::new();
        }
        // Tangent angle at t: a0 + t sweep. It is normal to the axis at a + k pi.
        let t0 = self.tangent_at(0.0);
        let normal = Vec2::new(-axis.y, axis.x);
        let to_normal = cross(t0, normal).atan2(t0.dot(&normal));
        let mut out = Vec::new();
        let (low, high) = (0.0_f64.min(self.sweep), 0.0_f64.max(self.sweep));
        let mut angle = to_normal + ((low - to_normal) / PI).floor() * PI;
        while angle <= high {
            let t = angle / self.sweep;
            if t > 1e-12 && t < 1.0 - 1e-12 {
                out.push(t);
            }
            angle += PI;
        }
        out.sort_by(f64::total_cmp);
        out
    }

    /// Lowest and highest value of `axis . point` along the edge, with the parameters at which they occur.
    pub fn extent(&self, axis: Vec2) -> ((f64, f64), (f64, f64)) {
        let along = |t: f64| (axis.dot(&self.point_at(t).coords), t);
        let (mut low, mut high) = (along(0.0), along(0.0));
        for t in self.turning_points(axis).into_iter().chain([1.0]) {
            let at = along(t);
            if at.0 < low.0 {
                low = at;
            }
            if at.0 > high.0 {
                high = at;
            }
        }
        (low, high)
    }

    /// Parameters strictly inside 0..1 at which `axis . point` passes through `level`, in order.
    pub fn crossings(&self, axis: Vec2, level: f64) -> Vec<f64> {
        let height = |t: f64| axis.dot(&self.point_at(t).coords) - level;
        let mut stops = self.turning_points(axis);
        stops.push(1.0);
        let mut out = Vec::new();
        let mut from = (0.0, height(0.0));
        for stop in stops {
            let to = (stop, height(stop));
            if from.1 * to.1 < 0.0 {
                out.push(if self.is_arc() {
                    bisect(from.0, to.0, f64::EPSILON, |t| (height(t) > 0.0) == (to.1 > 0.0))
                } else {
                    from.1 / (from.1 - to.1)
                });
            } else if to.1 == 0.0 && stop < 1.0 {
                out.push(stop);
            }
            from = to;
        }
        out
    }

    /// The parts of the edge, as parameter ranges, on which `axis . point` lies below `level`.
    pub fn parts_below(&self, axis: Vec2, level: f64) -> Vec<(f64, f64)> {
        let mut stops = vec![0.0];
        stops.extend(self.crossings(axis, level));
        stops.push(1.0);
        let is_below = |t: f64| axis.dot(&self.point_at(t).coords) < level;
        let mut out: Vec<(f64, f64)> = Vec::new();
        for pair in stops.windows(2) {
            if !is_below(0.5 * (pair[0] + pair[1])) {
                continue;
            }
            match out.last_mut() {
                Some(last) if last.1 == pair[0] => last.1 = pair[1],
                _ => out.push((pair[0], pair[1])),
            }
        }
        out
    }

    /// Parameter and distance of the point on the edge nearest to `p`.
    pub fn nearest(&self, p: Point) -> (f64, f64) {
        let mut best = (0.0, (p - self.start).norm());
        let mut offer = |t: f64| {
            let d = (p - self.point_at(t)).norm();
            if d < best.1 {
                best = (t, d);
            }
        };
        offer(1.0);
        match self.center() {
            None => {
                let c = self.chord();
                let n2 = c.norm_squared();
                if n2 > 0.0 {
                    offer(((p - self.start).dot(&c) / n2).clamp(0.0, 1.0));
                }
            }
            Some(center) => {
                let (from, to) = (self.start - center, p - center);
                let turned = cross(from, to).atan2(from.dot(&to));
                let turned = if self.sweep > 0.0 { turned.rem_euclid(TAU) } else { -(-turned).rem_euclid(TAU) };
                let t = turned / self.sweep;
                if (0.0..=1.0).contains(&t) {
                    offer(t);
                }
            }
        }
        best
    }

    /// Points along the edge for drawing, without the end point: no further than `sagitta` from the true curve.
    /// Never used for a result.
    pub fn flatten_into(&self, sagitta: f64, out: &mut Vec<Point>) {
        let n = if self.is_arc() {
            let ratio = (sagitta / self.radius().abs()).clamp(1e-6, 1.0);
            let step = 2.0 * (1.0 - ratio).acos().max(1e-3);
            ((self.sweep.abs() / step).ceil() as usize).clamp(1, 2000)
        } else {
            1
        };
        out.extend((0..n).map(|i| self.point_at(i as f64 / n as f64)));
    }
}

/// `v` turned counter-clockwise by `angle` radians.
pub fn rotate(v: Vec2, angle: f64) -> Vec2 {
    let (sin, cos) = angle.sin_cos();
    Vec2::new(v.x * cos - v.y * sin, v.x * sin + v.y * cos)
}

/// phi - sin(phi) without cancellation for small angles.
pub(super) fn phi_minus_sin(phi: f64) -> f64 {
    if phi.abs() > 0.5 {
        return phi - phi.sin();
    }
    // Taylor series; the first term left out is below 1e-19 relative at 0.5.
    let x2 = phi * phi;
    let mut term = phi * x2 / 6.0;
    let mut sum = term;
    for k in [20.0, 42.0, 72.0, 110.0, 156.0, 210.0] {
        term *= -x2 / k;
        sum += term;
    }
    sum
}
