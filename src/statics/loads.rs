//! Pressures and loads of settled pools on walls and plates.

use crate::geom::{Depth, Edge, Point, Vec2, cross};
use crate::num::{gauss, tanh_sinh};
use crate::problem::Place;
use crate::section::{EdgeKind, Region, Section, Wall, WidthLaw};

use super::tilted::Chord;
use super::wetted::WetPart;

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

/// Net pressure along a stretch of a plate, linear in between: the left side's less the right side's, so positive
/// toward the right-hand normal of the direction in which the plate is drawn.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Stretch {
    /// From where, m along the plate.
    pub from_m: f64,
    /// To where, m along the plate.
    pub to_m: f64,
    /// Net pressure at its start, Pa.
    pub from_pa: f64,
    /// Net pressure at its end, Pa.
    pub to_pa: f64,
}

/// The net load across one plate: what its left side bears less what its right side bears.
#[derive(Clone, Debug, PartialEq)]
pub struct PlateLoad {
    /// Its name.
    pub name: String,
    /// Resultant of both sides, N, along s and z.
    pub force_n: Vec2,
    /// Moment about the study's moment point, N m, counter-clockwise positive.
    pub moment_n_m: f64,
    /// A point on the line of action; none where the resultant is zero.
    pub acts_at: Option<Point>,
    /// The resultant along the right-hand normal, summed along the plate, N.
    pub net_n: f64,
    /// The net pressure of largest size, Pa, with its sign, and where.
    pub peak: Option<(f64, Point)>,
    /// Net pressure along its solid part, from its first point on.
    pub stretches: Vec<Stretch>,
    /// Highest gage pressure of the liquid on either side, Pa, and where.
    pub highest: Option<(f64, Point)>,
}

/// How a pool presses: its level and rho |G|.
#[derive(Clone, Copy, Debug)]
pub(super) struct Press {
    pub level_m: f64,
    pub weight_pa_per_m: f64,
}

/// Gage pressure of the liquid at `p`, Pa: rho |G| (level - up . p), below zero above the surface.
pub fn pressure_at(p: Point, level_m: f64, up: Vec2, weight_pa_per_m: f64) -> f64 {
    weight_pa_per_m * (level_m - up.dot(&p.coords))
}

/// Loads on every edge of the outline and of the obstacles. The gas pressure is left out: it acts on all walls alike.
///
/// Straight edges under a constant width have polynomial integrands, which the quadrature integrates exactly; on arcs,
/// and under a width law, it is accurate to about 1e-13 of the load.
/// Source: [RigidAcceleration].
pub(super) fn edge_loads(
    section: &Section,
    region: &Region,
    wet: &[WetPart],
    press: &[Press],
    up: Vec2,
    about: Point,
) -> Vec<EdgeLoad> {
    let mut loads: Vec<EdgeLoad> = region.faces().iter().map(|f| dry(section, f.wall)).collect();
    for part in wet {
        let own = |f: &crate::section::Face| match (f.wall, part.wall) {
            (Wall::Outline { edge_idx: a, .. }, Wall::Outline { edge_idx: b, .. }) => a == b,
            (a, b) => a == b,
        };
        let Some(i) = region.faces().iter().position(own) else { continue };
        let load = &mut loads[i];
        load.wetted_length_m += part.edge.length();
        let (force, moment) = resultant(&part.edge, &section.width, press[part.body_idx], up, about);
        load.force_n += force;
        load.moment_n_m += moment;
        raise(&mut load.peak, highest(&part.edge, press[part.body_idx], up));
    }
    for (load, face) in loads.iter_mut().zip(region.faces()) {
        load.acts_at = acts_at(load.force_n, load.moment_n_m, about, &face.edge);
    }
    loads
}

/// Net loads and pressures below this share of those on one side are what rounding leaves of equal ones.
const ROUNDING: f64 = 1e-11;

/// Net loads across every plate.
pub(super) fn plate_loads(
    section: &Section,
    region: &Region,
    wet: &[WetPart],
    press: &[Press],
    up: Vec2,
    about: Point,
) -> Vec<PlateLoad> {
    (0..section.plates.len())
        .map(|plate_idx| {
            let is_own = |w: &&WetPart| matches!(w.wall, Wall::Plate { plate_idx: p, .. } if p == plate_idx);
            let parts: Vec<&WetPart> = wet.iter().filter(is_own).collect();
            let (mut force, mut moment, mut net, mut size) = (Vec2::zeros(), 0.0, 0.0, 0.0);
            let mut highest_on = None;
            for part in &parts {
                let (f, m) = resultant(&part.edge, &section.width, press[part.body_idx], up, about);
                force += f;
                moment += m;
                size += f.norm();
                // The face's right-hand normal is the plate's own on its left side, the opposite on the right.
                let tangent = part.edge.tangent_at(0.5);
                let outward = f.dot(&Vec2::new(tangent.y, -tangent.x));
                net += if is_left(part) { outward } else { -outward };
                raise(&mut highest_on, highest(&part.edge, press[part.body_idx], up));
            }
            if force.norm() <= ROUNDING * size {
                force = Vec2::zeros();
            }
            if net.abs() <= ROUNDING * size {
                net = 0.0;
            }
            let stretches = stretches(&parts, press, up);
            let plate = &section.plates[plate_idx];
            let mut peak: Option<(f64, Point)> = None;
            for s in &stretches {
                for (along, pa) in [(s.from_m, s.from_pa), (s.to_m, s.to_pa)] {
                    // The first of equals.
                    if pa != 0.0 && peak.is_none_or(|p| pa.abs() > p.0.abs() * (1.0 + ROUNDING)) {
                        peak = Some((pa, plate.point_at(along)));
                    }
                }
            }
            let points = &region.plates()[plate_idx].points;
            let chord = Edge::line(points[0], points[points.len() - 1]);
            PlateLoad {
                name: plate.label(plate_idx),
                force_n: force,
                moment_n_m: moment,
                acts_at: acts_at(force, moment, about, &chord),
                net_n: net,
                peak,
                stretches,
                highest: highest_on,
            }
        })
        .collect()
}

fn is_left(part: &WetPart) -> bool {
    matches!(part.wall, Wall::Plate { is_left: true, .. })
}

/// Net pressure between all ends of wetted parts.
fn stretches(parts: &[&WetPart], press: &[Press], up: Vec2) -> Vec<Stretch> {
    let mut stops: Vec<f64> = parts.iter().flat_map(|p| p.along_m).collect();
    stops.sort_unstable_by(f64::total_cmp);
    // Both sides end at the same places, but for rounding: no stretch lies between.
    let slack = ROUNDING * stops.last().zip(stops.first()).map_or(0.0, |(last, first)| last - first);
    stops.dedup_by(|b, a| *b - *a <= slack);
    let mut out: Vec<Stretch> = Vec::new();
    let mut size = 0.0_f64;
    for w in stops.windows(2) {
        let middle = 0.5 * (w[0] + w[1]);
        let mut pa = [0.0; 2];
        let mut is_wet = false;
        for part in parts {
            let [a, b] = part.along_m;
            if middle < a.min(b) || middle > a.max(b) {
                continue;
            }
            is_wet = true;
            let Press { level_m, weight_pa_per_m } = press[part.body_idx];
            for (i, along) in w.iter().enumerate() {
                let p = part.edge.point_at((along - a) / (b - a));
                let liquid = pressure_at(p, level_m, up, weight_pa_per_m);
                pa[i] += if is_left(part) { liquid } else { -liquid };
                size = size.max(liquid);
            }
        }
        if is_wet {
            out.push(Stretch { from_m: w[0], to_m: w[1], from_pa: pa[0], to_pa: pa[1] });
        }
    }
    for pa in out.iter_mut().flat_map(|s| [&mut s.from_pa, &mut s.to_pa]) {
        if pa.abs() <= ROUNDING * size {
            *pa = 0.0;
        }
    }
    out
}

/// An edge without any load.
fn dry(section: &Section, wall: Wall) -> EdgeLoad {
    let (name, is_wall) = match wall {
        Wall::Outline { edge_idx, .. } => {
            (section.edge_label(edge_idx), section.outline[edge_idx].kind == EdgeKind::Wall)
        }
        Wall::Obstacle { obstacle_idx, edge_idx } => {
            (format!("{}, edge {}", section.obstacles[obstacle_idx].label(obstacle_idx), edge_idx + 1), true)
        }
        Wall::Plate { .. } | Wall::Carried => (String::new(), true),
    };
    EdgeLoad {
        place: wall.place(),
        name,
        is_wall,
        wetted_length_m: 0.0,
        force_n: Vec2::zeros(),
        moment_n_m: 0.0,
        acts_at: None,
        peak: None,
    }
}

/// Force and moment of a pool on a wetted part; the outward normal is the tangent turned to the right.
fn resultant(part: &Edge, width: &WidthLaw, press: Press, up: Vec2, about: Point) -> (Vec2, f64) {
    let [fs, fz, m] = along(part, width, |p, tangent, w| {
        let pressure = pressure_at(p, press.level_m, up, press.weight_pa_per_m) * w;
        let force = Vec2::new(tangent.y, -tangent.x) * pressure;
        [force.x, force.y, cross(p - about, force)]
    });
    (Vec2::new(fs, fz), m)
}

fn highest(part: &Edge, press: Press, up: Vec2) -> (f64, Point) {
    let ((lowest, t), _) = part.extent(up);
    (press.weight_pa_per_m * (press.level_m - lowest), part.point_at(t))
}

fn raise(peak: &mut Option<(f64, Point)>, found: (f64, Point)) {
    if peak.is_none_or(|p| found.0 > p.0) {
        *peak = Some(found);
    }
}

/// A point on the line of action, slid along it to the edge.
fn acts_at(force: Vec2, moment: f64, about: Point, e: &Edge) -> Option<Point> {
    let f2 = force.norm_squared();
    if f2 <= 0.0 {
        return None;
    }
    // The foot of the perpendicular from `about` onto the line of action.
    let foot = about + Vec2::new(force.y, -force.x) * (moment / f2);
    Some(slide_to_edge(foot, force / f2.sqrt(), e))
}

/// Moves a point along a line to where the line is nearest to the edge's chord.
fn slide_to_edge(foot: Point, direction: Vec2, e: &Edge) -> Point {
    let c = e.chord();
    let det = cross(direction, c);
    let along =
        if det.abs() > 1e-6 * c.norm() { cross(e.start - foot, c) / det } else { (e.start - foot).dot(&direction) };
    foot + direction * along
}

/// Centroid of a pool: first moments by Green's theorem over its wetted edges and its surface.
///
/// Constant width: with v the level and u to its right, int (h - v) dA = contour 1/2 (h - v)^2 du and
/// int u dA = contour u (h - v) du, both zero on the surface. Width law: int s w dA = - contour s Omega ds and
/// int z w dA = - contour (z Omega - Omega2) ds, surface included.
pub(super) fn centroid(
    wetted: &[Edge],
    surface: &[Chord],
    width: &WidthLaw,
    up: Vec2,
    level: f64,
    volume: f64,
) -> Option<Point> {
    if volume <= 0.0 || wetted.is_empty() {
        return None;
    }
    if width.constant().is_some() {
        let right = Vec2::new(up.y, -up.x);
        // About a point on the surface, so that nothing cancels.
        let origin = surface.first().map_or(wetted[0].start, |c| c.left);
        let height = level - up.dot(&origin.coords);
        let mut moments = [0.0; 2];
        for part in wetted {
            let [u, v] = along(part, width, |p, tangent, w| {
                let d = p - origin;
                let (u, below, du) = (right.dot(&d), height - up.dot(&d), right.dot(&tangent) * w);
                [u * below * du, 0.5 * below * below * du]
            });
            moments = [moments[0] + u, moments[1] + v];
        }
        return Some(origin + right * (moments[0] / volume) + up * (height - moments[1] / volume));
    }
    let surface = surface.iter().map(|c| Edge::line(c.right, c.left));
    let mut moments = [0.0; 2];
    for part in wetted.iter().copied().chain(surface) {
        for piece in width.between_kinks(&part) {
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
    Some(Point::new(moments[0] / volume, moments[1] / volume))
}

/// Integral along an edge of `f(point, unit tangent, width)` with respect to length.
fn along<const N: usize>(e: &Edge, width: &WidthLaw, mut f: impl FnMut(Point, Vec2, f64) -> [f64; N]) -> [f64; N] {
    let mut sum = [0.0; N];
    let mut add = |part: [f64; N]| (0..N).for_each(|i| sum[i] += part[i]);
    match Depth::constant(width) {
        Some(w) => {
            // Ten points a quarter turn: trigonometric polynomials up to degree three, to rounding.
            let n_panels = (e.sweep.abs() / std::f64::consts::FRAC_PI_2).ceil().max(1.0) as usize;
            let length = e.length();
            add(gauss(n_panels, |t| f(e.point_at(t), e.tangent_at(t), w).map(|x| x * length)));
        }
        None => {
            for piece in width.between_kinks(e) {
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
