//! Random sections that are simple by construction, and random directions, as proptest strategies.

use std::f64::consts::{FRAC_PI_2, PI, TAU};
use std::ops::RangeInclusive;

use brimwright::geom::{Edge, Path, Point, Vec2, cross};
use brimwright::section::Section;
use proptest::collection::vec;
use proptest::prelude::*;
use proptest::test_runner::{Config, RngSeed};

use super::shapes;

/// A region: a counter-clockwise outline round `center`, and counter-clockwise obstacles inside it.
#[derive(Clone, Debug)]
pub struct Sample {
    pub center: Point,
    pub outline: Vec<Edge>,
    pub obstacles: Vec<Vec<Edge>>,
}

impl Sample {
    /// All edges with the region on the left.
    pub fn edges(&self) -> Vec<Edge> {
        let holes = self.obstacles.iter().flat_map(|o| Path::new(o.clone()).reversed().edges().to_vec());
        self.outline.iter().copied().chain(holes).collect()
    }

    /// As a section; `mouths` are indices of edges.
    pub fn section(&self, mouths: &[usize], width_m: f64) -> Section {
        let mut section = shapes::section(&self.outline, mouths, width_m);
        section.obstacles = self.obstacles.iter().map(|edges| shapes::obstacle(edges)).collect();
        section
    }

    /// Lowest and highest level.
    pub fn extent(&self, up: Vec2) -> (f64, f64) {
        Path::new(self.outline.clone()).extent(up)
    }

    /// Whether any edge is an arc.
    pub fn has_arcs(&self) -> bool {
        self.edges().iter().any(Edge::is_arc)
    }
}

/// The suite's way of running properties: a fixed seed a property, nothing written to disk.
pub fn config(n_cases: u32, seed: u64) -> Config {
    Config { cases: n_cases, rng_seed: RngSeed::Fixed(seed), failure_persistence: None, ..Config::default() }
}

/// Any direction: at random, or an exact multiple of a quarter turn.
pub fn direction() -> impl Strategy<Value = Vec2> {
    let exact = [(0.0, 1.0), (1.0, 0.0), (0.0, -1.0), (-1.0, 0.0)].map(|(x, y)| Vec2::new(x, y));
    prop_oneof![
        3 => (0.0..TAU).prop_map(|angle| Vec2::new(angle.cos(), angle.sin())),
        2 => proptest::sample::select(exact.to_vec()),
    ]
}

/// A fill as a share of capacity.
pub fn share() -> impl Strategy<Value = f64> {
    0.01..0.99
}

/// A star-shaped polygon with up to two obstacles; with `arcs`, some edges are bent, in either sense.
pub fn star(n_edges: RangeInclusive<usize>, arcs: bool) -> impl Strategy<Value = Sample> {
    let spoke = (0.0..0.8, 0.3..1.0, prop_oneof![Just(0.0), -0.9..0.9]);
    (vec(spoke, n_edges), place(), 0..3_usize, 0.0..TAU).prop_map(
        move |(spokes, (center, size), n_obstacles, turn)| {
            let n = spokes.len();
            let at = |i: usize| {
                let (jitter, radius, _) = spokes[i % n];
                let angle: f64 = turn + TAU * (i as f64 + jitter) / n as f64;
                center + Vec2::new(angle.cos(), angle.sin()) * (radius * size)
            };
            let bent = |i: usize| {
                let (start, end) = (at(i), at((i + 1) % n));
                let bend = if arcs { spokes[i].2 } else { 0.0 };
                Edge { start, end, sweep: bend * most_bend(center, start, end, bend) }
            };
            let outline: Vec<Edge> = (0..n).map(bent).collect();
            let room = outline.iter().map(|edge| edge.nearest(center).1).fold(f64::INFINITY, f64::min);
            let obstacles = obstacles(center, room, n_obstacles, turn, arcs);
            Sample { center, outline, obstacles }
        },
    )
}

/// A convex outline with convex obstacles, so that the liquid is one pool whatever the direction and the fill.
pub fn convex(arcs: bool) -> impl Strategy<Value = Sample> {
    let spoke = (0.0..0.8, prop_oneof![Just(0.0), 0.0..0.95]);
    (vec(spoke, 5..=12), place(), 0.4..1.0, 0..3_usize, 0.0..TAU).prop_map(
        move |(spokes, (center, size), flatness, n_obstacles, turn)| {
            let n = spokes.len();
            let at = |i: usize| {
                let angle: f64 = TAU * ((i % n) as f64 + spokes[i % n].0) / n as f64;
                let on_ellipse = Vec2::new(angle.cos(), flatness * angle.sin()) * size;
                center + brimwright::geom::rotate(on_ellipse, turn)
            };
            let exterior = |i: usize| {
                let (before, after) = (at(i) - at(i + n - 1), at(i + 1) - at(i));
                cross(before, after).atan2(before.dot(&after))
            };
            let bent = |i: usize| {
                let bend = if arcs { spokes[i].1 } else { 0.0 };
                Edge { start: at(i), end: at(i + 1), sweep: bend * exterior(i).min(exterior(i + 1)) }
            };
            let outline: Vec<Edge> = (0..n).map(bent).collect();
            let room = outline.iter().map(|edge| edge.nearest(center).1).fold(f64::INFINITY, f64::min);
            let obstacles = obstacles(center, room, n_obstacles, turn, arcs);
            Sample { center, outline, obstacles }
        },
    )
}

/// A rounded rectangle, from a box with square corners to a capsule or a circle.
pub fn rounded() -> impl Strategy<Value = Sample> {
    let radius_share = prop_oneof![1 => Just(1.0), 3 => 0.01..0.99];
    (0.2..3.0, 0.2..3.0, radius_share, place()).prop_map(|(width, height, radius_share, (shift, size))| {
        let (width, height) = (width * size, height * size);
        let radius = radius_share * 0.5 * f64::min(width, height);
        let shift = shift.coords;
        let mut outline = shapes::rounded_rectangle(width, height, radius);
        for edge in &mut outline {
            edge.start += shift;
            edge.end += shift;
        }
        Sample { center: Point::new(0.0, height / 2.0) + shift, outline, obstacles: vec![] }
    })
}

/// Any of the above.
pub fn any() -> impl Strategy<Value = Sample> {
    prop_oneof![star(5..=40, false), star(5..=40, true), convex(true), rounded()]
}

/// Centre and size of a section: centimetres to hundreds of metres, not far from the origin for its size.
fn place() -> impl Strategy<Value = (Point, f64)> {
    (-2.0..2.0, -2.0..2.0, -2.0..2.5).prop_map(|(x, y, log_size)| {
        let size = 10.0_f64.powf(log_size);
        (Point::new(x * size, y * size), size)
    })
}

/// The largest sweep with which the edge stays between the two rays from the centre through its ends.
fn most_bend(center: Point, start: Point, end: Point, bend: f64) -> f64 {
    let corner = |at: Point, to: Point| {
        let (a, b) = (center - at, to - at);
        cross(a, b).atan2(a.dot(&b)).abs()
    };
    let (first, last) = (corner(start, end), corner(end, start));
    let half = if bend > 0.0 { PI - first.max(last) } else { first.min(last) };
    2.0 * half.min(0.95 * FRAC_PI_2)
}

/// Obstacles within a disc of radius `room`: squares or, with `arcs`, circles of two half turns.
fn obstacles(center: Point, room: f64, n_obstacles: usize, turn: f64, arcs: bool) -> Vec<Vec<Edge>> {
    let reach = if n_obstacles == 1 { 0.7 } else { 0.35 } * room;
    (0..n_obstacles)
        .map(|i| {
            let side = if n_obstacles == 1 { 0.0 } else { (i as f64 - 0.5) * 0.9 * room };
            let middle = center + Vec2::new(side, 0.0);
            let spoke = |k: usize| {
                let angle = turn + FRAC_PI_2 * k as f64;
                middle + Vec2::new(angle.cos(), angle.sin()) * reach
            };
            if arcs {
                let halves = [(spoke(0), spoke(2)), (spoke(2), spoke(0))];
                halves.map(|(start, end)| Edge { start, end, sweep: PI }).to_vec()
            } else {
                (0..4).map(|k| Edge::line(spoke(k), spoke((k + 1) % 4))).collect()
            }
        })
        .collect()
}
