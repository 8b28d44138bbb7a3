//! Two clippers that share nothing with the kernel's edge sums: boundary integrals by Gauss-Legendre quadrature
//! (exact arcs, full precision), and polygon clipping by the library `geo` (which snaps to a grid of about 1e-9
//! of the drawing's size, so it is compared to 1e-7).

use std::sync::LazyLock;

use brimwright::geom::{Edge, Point, Vec2};
use geo::{Area, BooleanOps, Centroid, Coord, LineString, MultiPolygon, Polygon};

/// What lies below a level.
#[derive(Clone, Copy, Debug)]
pub struct Below {
    pub area: f64,
    /// Undefined where the area is zero.
    pub centroid: Point,
    /// Integral of the depth below the level over the area.
    pub pressed: f64,
    /// Where that integral acts; undefined where it is zero.
    pub pressed_at: Point,
}

/// The axis along the level lines, so that (along, up) is right-handed.
pub fn along(up: Vec2) -> Vec2 {
    Vec2::new(up.y, -up.x)
}

/// Area and centroid of the part of the region with `up . x < level`: contour integrals of u dv, u2/2 dv and
/// u v dv over the parts of the edges below the level; and the same weighted with the depth. The surface itself adds
/// nothing, since dv = 0 on it.
pub fn quadrature(edges: &[Edge], up: Vec2, level: f64) -> Below {
    let origin = edges[0].start;
    let (u_axis, level) = (along(up), level - up.dot(&origin.coords));
    // Integrals of 1, u and v: plain, and weighted with the depth.
    let (mut plain, mut deep) = ([0.0; 3], [0.0; 3]);
    for edge in edges {
        let length = edge.length();
        let u = |t: f64| u_axis.dot(&(edge.point_at(t) - origin));
        let v = |t: f64| up.dot(&(edge.point_at(t) - origin));
        let dv = |t: f64| up.dot(&edge.tangent_at(t)) * length;
        for (from, to) in monotone_pieces(edge, &dv) {
            let Some((from, to)) = part_below(&v, from, to, level) else { continue };
            for &(node, weight) in GAUSS_LEGENDRE.iter() {
                let t = from + (to - from) * node;
                let (u, v, dv) = (u(t), v(t), dv(t) * weight * (to - from));
                for (i, term) in [u * dv, 0.5 * u * u * dv, u * v * dv].into_iter().enumerate() {
                    plain[i] += term;
                    deep[i] += term * (level - v);
                }
            }
        }
    }
    let at = |[whole, u, v]: [f64; 3]| origin + (u_axis * u + up * v) / whole;
    Below { area: plain[0], centroid: at(plain), pressed: deep[0], pressed_at: at(deep) }
}

/// The same by `geo`, for straight edges: the pieces below the level.
pub fn geo_below(region: &MultiPolygon, up: Vec2, level: f64) -> MultiPolygon {
    region.intersection(&half_plane(region, up, level))
}

/// Area and centroid of pieces.
pub fn geo_measure(pieces: &MultiPolygon) -> (f64, Point) {
    let centroid = pieces.centroid().map_or(Point::new(f64::NAN, f64::NAN), |c| Point::new(c.x(), c.y()));
    (pieces.unsigned_area(), centroid)
}

/// A region for `geo`: outline and holes, every arc cut into 200 chords.
pub fn geo_region(outline: &[Edge], obstacles: &[Vec<Edge>]) -> MultiPolygon {
    let ring = |edges: &[Edge]| {
        let chords = |e: &Edge| {
            let (e, n_chords) = (*e, if e.is_arc() { 200 } else { 1 });
            (0..n_chords).map(move |i| e.point_at(i as f64 / n_chords as f64))
        };
        LineString::from(edges.iter().flat_map(chords).map(|p| Coord { x: p.x, y: p.y }).collect::<Vec<_>>())
    };
    let holes = obstacles.iter().map(|edges| ring(edges)).collect();
    MultiPolygon::new(vec![Polygon::new(ring(outline), holes)])
}

/// A rectangle as small as it may be, since the library's grid is as coarse as what it is given is large.
fn half_plane(region: &MultiPolygon, up: Vec2, level: f64) -> Polygon {
    let points = || region.0[0].exterior().0.iter().map(|c| Vec2::new(c.x, c.y));
    let range =
        |axis: Vec2| points().map(|p| axis.dot(&p)).fold((f64::MAX, f64::MIN), |r, x| (r.0.min(x), r.1.max(x)));
    let ((left, right), (low, high)) = (range(along(up)), range(up));
    let margin = 0.1 * (right - left).max(high - low);
    let corner = |u: f64, v: f64| {
        let p = along(up) * u + up * v;
        Coord { x: p.x, y: p.y }
    };
    let (left, right, low) = (left - margin, right + margin, low - margin);
    let corners = vec![corner(left, low), corner(right, low), corner(right, level), corner(left, level)];
    Polygon::new(LineString::from(corners), vec![])
}

/// Parameters between which the edge rises or falls all the way. `dv` is its slope.
fn monotone_pieces(edge: &Edge, dv: &impl Fn(f64) -> f64) -> Vec<(f64, f64)> {
    const N_SAMPLES: usize = 8;
    if !edge.is_arc() {
        return vec![(0.0, 1.0)];
    }
    let mut cuts = vec![0.0];
    for k in 0..N_SAMPLES {
        let (a, b) = (k as f64 / N_SAMPLES as f64, (k + 1) as f64 / N_SAMPLES as f64);
        if dv(a) * dv(b) < 0.0 {
            cuts.push(bisect(dv, a, b));
        } else if dv(b) == 0.0 {
            cuts.push(b);
        }
    }
    cuts.push(1.0);
    cuts.windows(2).filter(|w| w[0] < w[1]).map(|w| (w[0], w[1])).collect()
}

/// The part of a monotone piece that lies below the level.
fn part_below(v: &impl Fn(f64) -> f64, from: f64, to: f64, level: f64) -> Option<(f64, f64)> {
    match (v(from) < level, v(to) < level) {
        (true, true) => Some((from, to)),
        (false, false) => None,
        (starts_below, _) => {
            let cut = bisect(&|t| v(t) - level, from, to);
            Some(if starts_below { (from, cut) } else { (cut, to) })
        }
    }
}

fn bisect(f: &impl Fn(f64) -> f64, mut a: f64, mut b: f64) -> f64 {
    let rises = f(a) < 0.0;
    while b - a > f64::EPSILON * b.abs() {
        let middle = 0.5 * (a + b);
        if (f(middle) > 0.0) == rises { b = middle } else { a = middle }
    }
    0.5 * (a + b)
}

/// Nodes and weights on 0..1, from Newton's iteration on the Legendre polynomial of order 20.
static GAUSS_LEGENDRE: LazyLock<Vec<(f64, f64)>> = LazyLock::new(|| {
    const ORDER: usize = 20;
    let legendre = |x: f64| {
        let (mut before, mut p) = (1.0, x);
        for k in 2..=ORDER {
            (before, p) = (p, ((2 * k - 1) as f64 * x * p - (k - 1) as f64 * before) / k as f64);
        }
        (p, ORDER as f64 * (x * p - before) / (x * x - 1.0))
    };
    (0..ORDER)
        .map(|i| {
            let mut x = (std::f64::consts::PI * (i as f64 + 0.75) / (ORDER as f64 + 0.5)).cos();
            for _ in 0..8 {
                let (p, slope) = legendre(x);
                x -= p / slope;
            }
            let slope = legendre(x).1;
            ((x + 1.0) / 2.0, 1.0 / ((1.0 - x * x) * slope * slope))
        })
        .collect()
});
