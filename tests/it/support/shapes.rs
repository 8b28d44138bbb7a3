//! Sections as chains of exact edges, counter-clockwise.

use std::f64::consts::{FRAC_PI_2, PI, TAU};

use brimwright::geom::{Edge, Point};
use brimwright::section::{EdgeKind, Obstacle, OutlineEdge, Section, Vertex, WidthLaw};

/// A polygon.
pub fn polygon(points: &[(f64, f64)]) -> Vec<Edge> {
    let at = |i: usize| Point::new(points[i % points.len()].0, points[i % points.len()].1);
    (0..points.len()).map(|i| Edge::line(at(i), at(i + 1))).collect()
}

/// A rectangle from (0, 0): floor, right wall, top, left wall.
pub fn rectangle(length: f64, height: f64) -> Vec<Edge> {
    polygon(&[(0.0, 0.0), (length, 0.0), (length, height), (0.0, height)])
}

/// A circle of two half turns, its lowest point at (0, 0): lower half, upper half.
pub fn circle(radius: f64) -> Vec<Edge> {
    let (left, right) = (Point::new(-radius, radius), Point::new(radius, radius));
    vec![Edge { start: left, end: right, sweep: PI }, Edge { start: right, end: left, sweep: PI }]
}

/// A rectangle with round corners, symmetric about s = 0, its bottom at z = 0; a capsule where the radius is half
/// the shorter side.
pub fn rounded_rectangle(width: f64, height: f64, radius: f64) -> Vec<Edge> {
    let (half, flat) = (width / 2.0, width / 2.0 - radius);
    let points = [
        (-flat, 0.0),
        (flat, 0.0),
        (half, radius),
        (half, height - radius),
        (flat, height),
        (-flat, height),
        (-half, height - radius),
        (-half, radius),
    ];
    let mut edges = polygon(&points);
    for corner in edges.iter_mut().skip(1).step_by(2) {
        corner.sweep = FRAC_PI_2;
    }
    edges.retain(|edge| edge.chord().norm() > 0.0);
    edges
}

/// An ellipse, its lowest point at (0, 0), as a chain of `n_arcs` arcs, each through three of its points; and the
/// greatest distance between the chain and the true ellipse. The distance changes sign in the middle of every arc,
/// so that areas come much nearer than it.
pub fn ellipse(semi_axis_s: f64, semi_axis_z: f64, n_arcs: usize) -> (Vec<Edge>, f64) {
    let at = |k: usize| {
        let (sin, cos) = (TAU * (k % (2 * n_arcs)) as f64 / (2 * n_arcs) as f64).sin_cos();
        Point::new(semi_axis_s * cos, semi_axis_z * (1.0 + sin))
    };
    let edges: Vec<Edge> = (0..n_arcs).map(|i| Edge::through(at(2 * i), at(2 * i + 1), at(2 * i + 2))).collect();
    let distance = |p: Point| {
        let (x, z) = (p.x / semi_axis_s, (p.y - semi_axis_z) / semi_axis_z);
        let gradient = (x / semi_axis_s).hypot(z / semi_axis_z);
        ((x * x + z * z - 1.0) / (2.0 * gradient)).abs()
    };
    let samples = edges.iter().flat_map(|edge| (1..16).map(|k| edge.point_at(k as f64 / 16.0)));
    let deviation = samples.map(distance).fold(0.0, f64::max);
    (edges, deviation)
}

/// A section with the same width at every height; `mouths` are indices of edges.
pub fn section(outline: &[Edge], mouths: &[usize], width_m: f64) -> Section {
    Section {
        outline: outline
            .iter()
            .enumerate()
            .map(|(i, edge)| OutlineEdge {
                name: String::new(),
                kind: if mouths.contains(&i) { EdgeKind::Mouth } else { EdgeKind::Wall },
                start: edge.start,
                sweep_rad: edge.sweep,
            })
            .collect(),
        obstacles: vec![],
        plates: vec![],
        width: WidthLaw::Constant { width_m },
    }
}

/// An obstacle of these edges.
pub fn obstacle(edges: &[Edge]) -> Obstacle {
    let vertices = edges.iter().map(|edge| Vertex { start: edge.start, sweep_rad: edge.sweep }).collect();
    Obstacle { name: String::new(), vertices }
}
