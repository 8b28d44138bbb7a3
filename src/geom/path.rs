//! A closed chain of edges.

use super::{Edge, Point, Vec2, cross};

/// A closed chain: each edge starts where the one before ends, the first where the last ends.
#[derive(Clone, Debug, PartialEq)]
pub struct Path {
    edges: Vec<Edge>,
}

impl Path {
    /// From edges that already form a closed chain.
    pub fn new(edges: Vec<Edge>) -> Path {
        debug_assert!(edges.iter().zip(edges.iter().cycle().skip(1)).all(|(a, b)| a.end == b.start));
        Path { edges }
    }

    /// A polygon.
    pub fn polygon(points: &[Point]) -> Path {
        let n = points.len();
        Path { edges: (0..n).map(|i| Edge::line(points[i], points[(i + 1) % n])).collect() }
    }

    /// Its edges.
    pub fn edges(&self) -> &[Edge] {
        &self.edges
    }

    /// Signed area, positive when counter-clockwise: shoelace about the first vertex, plus arc segments.
    pub fn signed_area(&self) -> f64 {
        let Some(first) = self.edges.first() else { return 0.0 };
        let origin = first.start;
        self.edges.iter().map(|e| 0.5 * cross(e.start - origin, e.end - origin) + e.segment_area()).sum()
    }

    /// The same chain in the other sense.
    pub fn reversed(&self) -> Path {
        Path { edges: self.edges.iter().rev().map(Edge::reversed).collect() }
    }

    /// Length round.
    pub fn perimeter(&self) -> f64 {
        self.edges.iter().map(Edge::length).sum()
    }

    /// Lowest and highest value of `axis . point`.
    pub fn extent(&self, axis: Vec2) -> (f64, f64) {
        self.edges
            .iter()
            .map(|e| e.extent(axis))
            .fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), (l, h)| (low.min(l.0), high.max(h.0)))
    }

    /// Whether `p` lies inside, by winding: the angle under which the chain is seen from `p`. Points on the chain
    /// may go either way.
    pub fn contains(&self, p: Point) -> bool {
        let mut winding = 0.0;
        for e in &self.edges {
            let (a, b) = (e.start - p, e.end - p);
            winding += cross(a, b).atan2(a.dot(&b));
            // A point between arc and chord is passed on the other side.
            if let Some(center) = e.center() {
                let side = cross(e.chord(), p - e.start);
                let in_disc = (p - center).norm() < e.radius().abs();
                let beyond_chord = if e.sweep > 0.0 { side < 0.0 } else { side > 0.0 };
                if in_disc && beyond_chord {
                    winding += std::f64::consts::TAU * e.sweep.signum();
                }
            }
        }
        (winding / std::f64::consts::TAU).round() as i64 != 0
    }

    /// Points for drawing, no further than `sagitta` from the true curve. Never used for a result.
    pub fn flatten(&self, sagitta: f64) -> Vec<Point> {
        let mut out = Vec::new();
        for e in &self.edges {
            e.flatten_into(sagitta, &mut out);
        }
        out
    }
}
