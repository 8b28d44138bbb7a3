//! A section seen along one effective gravity: volume below a level and back, with the width law.

use crate::geom::{Edge, Point, Sublevel, Until, Vec2};
use crate::num::{gauss, tanh_sinh};
use crate::section::WidthLaw;

/// One piece of a liquid surface inside the tank; seen along effective gravity, `left` is on the left.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Chord {
    /// The left end.
    pub left: Point,
    /// The right end.
    pub right: Point,
}

impl Chord {
    /// Its length, m.
    pub fn length(&self) -> f64 {
        (self.right - self.left).norm()
    }
}

/// A section with its width law: what holds the liquid, whichever way effective gravity points.
#[derive(Clone, Debug)]
pub struct Vessel {
    edges: Vec<Edge>,
    width: WidthLaw,
    /// Under each edge: - integral of Omega ds; empty for a constant width.
    under: Vec<f64>,
    capacity_m3: f64,
}

impl Vessel {
    /// `edges` are closed chains with the region on their left.
    pub fn new(edges: Vec<Edge>, width: WidthLaw) -> Vessel {
        let (under, capacity_m3) = match width.constant() {
            Some(w) => (Vec::new(), w * Sublevel::new(&edges, Vec2::y()).total_area()),
            None => {
                let under: Vec<f64> = edges.iter().map(|e| under_edge(e, &width)).collect();
                let sum = under.iter().sum();
                (under, sum)
            }
        };
        Vessel { edges, width, under, capacity_m3 }
    }

    /// Volume of the whole region, m3.
    pub fn capacity_m3(&self) -> f64 {
        self.capacity_m3
    }

    /// Seen along a direction; `up` is a unit vector.
    pub fn tilted(&self, up: Vec2) -> Tilted<'_> {
        Tilted { vessel: self, sublevel: Sublevel::new(&self.edges, up) }
    }

    /// The same, to be asked about levels up to `level` only; saves work where the width is constant.
    pub fn tilted_below(&self, up: Vec2, level: f64) -> Tilted<'_> {
        let until = if self.width.constant().is_some() { Until::Level(level) } else { Until::All };
        Tilted { vessel: self, sublevel: Sublevel::up_to(&self.edges, up, until) }
    }
}

/// Volume against level along one direction.
///
/// With a constant width the volume is the area times it, in closed form. Otherwise, with Omega' = w,
/// V(h) = - contour integral of Omega ds over the wetted edges and the surface (Green's theorem); on straight lines
/// in closed form by the integral of Omega, on arcs by quadrature.
#[derive(Clone, Debug)]
pub struct Tilted<'a> {
    vessel: &'a Vessel,
    sublevel: Sublevel,
}

impl Tilted<'_> {
    /// The direction.
    pub fn up(&self) -> Vec2 {
        self.sublevel.up()
    }

    /// Lowest and highest level, m.
    pub fn span(&self) -> (f64, f64) {
        (self.sublevel.lowest(), self.sublevel.highest())
    }

    /// Volume below `level`, m3.
    pub fn volume_below(&self, level: f64) -> f64 {
        if let Some(w) = self.vessel.width.constant() {
            return w * self.sublevel.area_below(level);
        }
        if level <= self.sublevel.lowest() {
            return 0.0;
        }
        if level >= self.sublevel.highest() {
            return self.vessel.capacity_m3;
        }
        let (up, width) = (self.up(), &self.vessel.width);
        let mut walls = 0.0;
        for (e, under) in self.vessel.edges.iter().zip(&self.vessel.under) {
            for (from, to) in e.parts_below(up, level) {
                let is_whole = from == 0.0 && to == 1.0;
                walls += if is_whole { *under } else { under_edge(&e.part(from, to), width) };
            }
        }
        // The surface closes the contour from right to left.
        let surface: f64 = self.chords(level).iter().map(|c| under_edge(&Edge::line(c.right, c.left), width)).sum();
        (walls + surface).clamp(0.0, self.vessel.capacity_m3)
    }

    /// The level below which `volume` (m3) lies, clamped to the span; safeguarded Newton steps where the width
    /// varies (the volume's derivative is the width along the surface).
    pub fn level_for_volume(&self, volume: f64) -> f64 {
        let (mut low, mut high) = self.span();
        if let Some(w) = self.vessel.width.constant() {
            return self.sublevel.level_for_area(volume / w);
        }
        if volume <= 0.0 {
            return low;
        }
        if volume >= self.vessel.capacity_m3 {
            return high;
        }
        let size = high - low;
        let mut level = self.sublevel.level_for_area(volume / self.vessel.capacity_m3 * self.sublevel.total_area());
        for _ in 0..100 {
            let error = self.volume_below(level) - volume;
            if error > 0.0 {
                high = level
            } else {
                low = level
            }
            // Two roundings of the capacity: the sum's own accuracy.
            if error.abs() <= 2.0 * f64::EPSILON * self.vessel.capacity_m3 || high - low <= f64::EPSILON * size {
                break;
            }
            let next = level - error / self.surface_area(level);
            level = if next > low && next < high { next } else { 0.5 * (low + high) };
        }
        level
    }

    /// Area of the surface at `level`, m2: chords weighted with the width.
    fn surface_area(&self, level: f64) -> f64 {
        if let Some(w) = self.vessel.width.constant() {
            return w * self.sublevel.width_at(level);
        }
        self.chords(level)
            .iter()
            .map(|c| {
                let dz = c.right.y - c.left.y;
                let mean = if dz.abs() > 1e-6 * self.vessel.capacity_m3.cbrt() {
                    (self.vessel.width.omega(c.right.y) - self.vessel.width.omega(c.left.y)) / dz
                } else {
                    self.vessel.width.width(0.5 * (c.left.y + c.right.y))
                };
                mean * c.length()
            })
            .sum()
    }

    /// The surface at `level`, from left to right.
    pub fn chords(&self, level: f64) -> Vec<Chord> {
        self.sublevel.chords(level).into_iter().map(|(left, right)| Chord { left, right }).collect()
    }

    /// Whether the region below `level` stays one body at every lower level too.
    pub fn is_one_basin(&self, level: f64) -> bool {
        self.sublevel.n_basins(level) <= 1
    }

    /// Count of connected bodies of liquid below `level`.
    pub fn n_pools(&self, level: f64) -> usize {
        self.sublevel.n_pools(level)
    }
}

/// - integral of Omega ds along an edge: the volume between the edge and the law's lowest height, m3.
fn under_edge(e: &Edge, width: &WidthLaw) -> f64 {
    if !e.is_arc() {
        let (ds, dz) = (e.end.x - e.start.x, e.end.y - e.start.y);
        if ds == 0.0 {
            return 0.0;
        }
        let (low, high) = width.range().unwrap_or((0.0, 0.0));
        // The difference quotient loses figures over short rises; there Omega is smooth enough for quadrature.
        let mean = if dz.abs() > 1e-5 * (high - low) {
            (width.omega2(e.end.y) - width.omega2(e.start.y)) / dz
        } else {
            gauss(1, |t| [width.omega(e.start.y + t * dz)])[0]
        };
        return -mean * ds;
    }
    pieces_between_kinks(e, width)
        .map(|part| {
            let length = part.length();
            -tanh_sinh(|t| [width.omega(part.point_at(t).y) * part.tangent_at(t).x * length])[0]
        })
        .sum()
}

/// The edge cut where the width law is not smooth, and where an arc turns round in z: there it may touch the lowest
/// or highest line of the law without crossing it.
pub(super) fn pieces_between_kinks<'e>(e: &'e Edge, width: &WidthLaw) -> impl Iterator<Item = Edge> + 'e {
    let mut stops = vec![0.0];
    stops.extend(e.turning_points(Vec2::y()));
    for kink in width.kinks() {
        stops.extend(e.crossings(Vec2::y(), kink));
    }
    stops.push(1.0);
    stops.sort_unstable_by(f64::total_cmp);
    stops.dedup();
    (1..stops.len()).map(move |i| e.part(stops[i - 1], stops[i]))
}
