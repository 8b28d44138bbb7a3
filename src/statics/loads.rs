//! Pressures and loads of one settled body of liquid.

use crate::geom::{Edge, Point, Vec2, cross};
use crate::num::{gauss, tanh_sinh};
use crate::problem::Place;
use crate::section::{EdgeKind, Region, RegionEdge, Section, WidthLaw};

use super::tilted::{Tilted, pieces_between_kinks};

/// The load of the liquid on one edge.
#[derive(Clone, Debug, PartialEq)]
pub struct EdgeLoad {
    /// Which edge: [`Place::Edge`] or [`Place::Obstacle`].
    pub place: Place,
    /// Its name.
    pub name: String,
    /// Whether it is a wall; nothing presses on a mouth.
    pub is_wall: bool,
    /// Length that the liquid wets, m.
    pub wetted_length_m: f64,
    /// Resultant of the liquid on the edge, N, along s and z.
    pub force_n: Vec2,
    /// Moment about the study's moment point, N m, counter-clockwise positive: s Fz - z Fs.
    pub moment_n_m: f64,
    /// A point on the line of action; none where the resultant is zero.
    pub acts_at: Option<Point>,
    /// Highest gage pressure of the liquid on it, Pa, and where; none when dry.
    pub peak: Option<(f64, Point)>,
}

/// Loads of a settled body of liquid.
#[derive(Clone, Debug, PartialEq)]
pub struct Loads {
    /// One an edge of the region.
    pub edges: Vec<EdgeLoad>,
    /// Load on the side walls that the width law shapes, N; zero for a constant width.
    pub sides_force_n: Vec2,
    /// Moment of that load, N m.
    pub sides_moment_n_m: f64,
    /// All together: mass times effective gravity, N.
    pub total_force_n: Vec2,
    /// Moment of all together, N m: the total acts at the centroid.
    pub total_moment_n_m: f64,
    /// Centroid of the liquid.
    pub centroid: Point,
}

/// Gage pressure of the liquid at `p`, Pa: rho |G| (level - up . p), below zero above the surface.
pub fn pressure_at(p: Point, level_m: f64, up: Vec2, weight_pa_per_m: f64) -> f64 {
    weight_pa_per_m * (level_m - up.dot(&p.coords))
}

/// Loads on every edge of `region` from the liquid below `level_m`, whose volume is `volume_m3`, with
/// `weight_pa_per_m` = rho |G|; moments about `about`. The gas pressure is left out: it acts on all walls alike.
///
/// Straight edges under a constant width have polynomial integrands, which the quadrature integrates exactly; on
/// arcs, and under a width law, it is accurate to about 1e-13 of the load. The load on the side walls is what the
/// divergence theorem leaves to them: total less edges.
/// Source: [RigidAcceleration].
pub fn loads(
    section: &Section,
    region: &Region,
    tilted: &Tilted,
    level_m: f64,
    volume_m3: f64,
    weight_pa_per_m: f64,
    about: Point,
) -> Loads {
    let (up, width) = (tilted.up(), &section.width);
    let edges: Vec<EdgeLoad> = region
        .edges()
        .iter()
        .map(|e| {
            let dry = dry_edge(section, e);
            edge_load(dry, &e.edge, width, up, level_m, weight_pa_per_m, about)
        })
        .collect();
    let centroid = centroid(region.geometry(), width, tilted, level_m, volume_m3);
    let total = up * (-weight_pa_per_m * volume_m3);
    let total_moment = cross(centroid - about, total);
    let (mut force, mut moment) = (Vec2::zeros(), 0.0);
    for e in &edges {
        force += e.force_n;
        moment += e.moment_n_m;
    }
    let is_constant = width.constant().is_some();
    Loads {
        edges,
        // The side walls' normals have no s component.
        sides_force_n: if is_constant { Vec2::zeros() } else { Vec2::new(0.0, total.y - force.y) },
        sides_moment_n_m: if is_constant { 0.0 } else { total_moment - moment },
        total_force_n: total,
        total_moment_n_m: total_moment,
        centroid,
    }
}

/// An edge without any load.
fn dry_edge(section: &Section, e: &RegionEdge) -> EdgeLoad {
    let name = match e.obstacle_idx {
        None => section.edge_label(e.edge_idx),
        Some(o) => format!("{}, edge {}", section.obstacles[o].label(o), e.edge_idx + 1),
    };
    EdgeLoad {
        place: e.place(),
        name,
        is_wall: e.obstacle_idx.is_some() || section.outline[e.edge_idx].kind == EdgeKind::Wall,
        wetted_length_m: 0.0,
        force_n: Vec2::zeros(),
        moment_n_m: 0.0,
        acts_at: None,
        peak: None,
    }
}

fn edge_load(
    mut load: EdgeLoad,
    e: &Edge,
    width: &WidthLaw,
    up: Vec2,
    level: f64,
    weight: f64,
    about: Point,
) -> EdgeLoad {
    for (from, to) in e.parts_below(up, level) {
        let part = e.part(from, to);
        load.wetted_length_m += part.length();
        // The outward normal is the tangent turned to the right.
        let [fs, fz, m] = along(&part, width, |p, tangent, w| {
            let pressure = weight * (level - up.dot(&p.coords)) * w;
            let force = Vec2::new(tangent.y, -tangent.x) * pressure;
            [force.x, force.y, cross(p - about, force)]
        });
        load.force_n += Vec2::new(fs, fz);
        load.moment_n_m += m;
        let ((lowest, t), _) = part.extent(up);
        let pressure = weight * (level - lowest);
        if load.peak.is_none_or(|(highest, _)| pressure > highest) {
            load.peak = Some((pressure, part.point_at(t)));
        }
    }
    let f2 = load.force_n.norm_squared();
    if f2 > 0.0 {
        // The foot of the perpendicular from `about` onto the line of action, slid along it to the edge.
        let foot = about + Vec2::new(load.force_n.y, -load.force_n.x) * (load.moment_n_m / f2);
        load.acts_at = Some(slide_to_edge(foot, load.force_n / f2.sqrt(), e));
    }
    load
}

/// Moves a point along a line to where the line is nearest to the edge's chord.
fn slide_to_edge(foot: Point, direction: Vec2, e: &Edge) -> Point {
    let c = e.chord();
    let det = cross(direction, c);
    let along =
        if det.abs() > 1e-6 * c.norm() { cross(e.start - foot, c) / det } else { (e.start - foot).dot(&direction) };
    foot + direction * along
}

/// Centroid of the liquid below a level: first moments by Green's theorem over wetted edges and surface.
///
/// Constant width: with v the level and u to its right, int (h - v) dA = contour 1/2 (h - v)^2 du and
/// int u dA = contour u (h - v) du, both zero on the surface. Width law: int s w dA = - contour s Omega ds and
/// int z w dA = - contour (z Omega - Omega2) ds, surface included.
fn centroid(edges: &[Edge], width: &WidthLaw, tilted: &Tilted, level: f64, volume: f64) -> Point {
    let up = tilted.up();
    let chords = tilted.chords(level);
    if volume <= 0.0 {
        // Nothing: the lowest point, to which the centroid tends.
        let lowest = edges.iter().map(|e| (e.extent(up).0, e)).min_by(|a, b| a.0.0.total_cmp(&b.0.0));
        return lowest.map_or(Point::origin(), |((_, t), e)| e.point_at(t));
    }
    let wetted = || edges.iter().flat_map(|e| e.parts_below(up, level).into_iter().map(|(a, b)| e.part(a, b)));
    if width.constant().is_some() {
        let right = Vec2::new(up.y, -up.x);
        // About a point on the surface, so that nothing cancels.
        let origin = chords.first().map_or_else(|| edges[0].start, |c| c.left);
        let height = level - up.dot(&origin.coords);
        let mut moments = [0.0; 2];
        for part in wetted() {
            let [u, v] = along(&part, width, |p, tangent, w| {
                let d = p - origin;
                let (u, below, du) = (right.dot(&d), height - up.dot(&d), right.dot(&tangent) * w);
                [u * below * du, 0.5 * below * below * du]
            });
            moments = [moments[0] + u, moments[1] + v];
        }
        return origin + right * (moments[0] / volume) + up * (height - moments[1] / volume);
    }
    let surface = chords.iter().map(|c| Edge::line(c.right, c.left));
    let mut moments = [0.0; 2];
    for part in wetted().chain(surface) {
        for piece in pieces_between_kinks(&part, width) {
            let length = piece.length();
            let [s, z] = tanh_sinh(|t| {
                let p = piece.point_at(t);
                let ds = piece.tangent_at(t).x * length;
                let omega = width.omega(p.y);
                [-p.x * omega * ds, -(p.y * omega - width.omega2(p.y)) * ds]
            });
            moments = [moments[0] + s, moments[1] + z];
        }
    }
    Point::new(moments[0] / volume, moments[1] / volume)
}

/// Integral along an edge of `f(point, unit tangent, width)` with respect to length.
fn along<const N: usize>(e: &Edge, width: &WidthLaw, mut f: impl FnMut(Point, Vec2, f64) -> [f64; N]) -> [f64; N] {
    let mut sum = [0.0; N];
    let mut add = |part: [f64; N]| (0..N).for_each(|i| sum[i] += part[i]);
    match width.constant() {
        Some(w) => {
            // Ten points a quarter turn: trigonometric polynomials up to degree three, to rounding.
            let n_panels = (e.sweep.abs() / std::f64::consts::FRAC_PI_2).ceil().max(1.0) as usize;
            let length = e.length();
            add(gauss(n_panels, |t| f(e.point_at(t), e.tangent_at(t), w).map(|x| x * length)));
        }
        None => {
            for piece in pieces_between_kinks(e, width) {
                let length = piece.length();
                add(tanh_sinh(|t| {
                    let p = piece.point_at(t);
                    f(p, piece.tangent_at(t), width.width(p.y)).map(|x| x * length)
                }));
            }
        }
    }
    sum
}
