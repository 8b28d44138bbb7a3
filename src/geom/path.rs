//! A closed chain of edges.

use crate::num::bisect;

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

    /// Whether `p` lies inside: a ray to the right crosses the chain an odd number of times. Points on the chain may
    /// go either way.
    pub fn contains(&self, p: Point) -> bool {
        let n_crossings: usize = self.edges.iter().map(|e| n_right_of(e, p)).sum();
        n_crossings % 2 == 1
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

/// How often an edge crosses the ray from `p` to the right. Stretches between turning points take in their lower
/// end and leave out their upper one, so that a shared vertex counts once.
fn n_right_of(e: &Edge, p: Point) -> usize {
    let height = |t: f64| e.point_at(t).y - p.y;
    let mut stops = e.turning_points(Vec2::y());
    stops.push(1.0);
    let mut from = 0.0;
    let mut n = 0;
    for to in stops {
        let (low, high) = (height(from), height(to));
        if (low <= 0.0) != (high <= 0.0) {
            let t = if e.is_arc() {
                bisect(from, to, f64::EPSILON, |t| (height(t) <= 0.0) == (high <= 0.0))
            } else {
                low / (low - high)
            };
            n += usize::from(e.point_at(t).x > p.x);
        }
        from = to;
    }
    n
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_point_on_a_chord_or_level_with_a_vertex_is_judged_by_the_chain() {
        let (left, right) = (Point::new(-1.0, 0.0), Point::new(1.0, 0.0));
        let half = std::f64::consts::PI;
        let ring = Path::new(vec![
            Edge { start: left, end: right, sweep: half },
            Edge { start: right, end: left, sweep: half },
        ]);
        let square = Path::polygon(&[(0.0, 0.0), (1.0, 0.0), (1.0, 1.0), (0.0, 1.0)].map(|(s, z)| Point::new(s, z)));
        let checks = [
            (&ring, (0.0, 0.0), true),
            (&ring, (0.0, 0.999), true),
            (&ring, (0.8, 0.8), false),
            (&ring, (-2.0, 0.0), false),
            (&ring, (-2.0, 1.0), false),
            (&square, (0.5, 0.5), true),
            (&square, (-0.5, 0.0), false),
            (&square, (-0.5, 1.0), false),
            (&square, (1.5, 0.5), false),
        ];
        for (path, (s, z), want) in checks {
            for path in [path.clone(), path.reversed()] {
                assert_eq!(path.contains(Point::new(s, z)), want, "({s}, {z})");
            }
        }
    }
}
