//! A section seen along one effective gravity: volume below a level and back, with the width law.

use crate::geom::{Depth, Edge, Point, Sublevel, Until, Vec2};
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
                let under: Vec<f64> = edges.iter().map(|e| width.under(e)).collect();
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
                walls += if is_whole { *under } else { width.under(&e.part(from, to)) };
            }
        }
        // The surface closes the contour from right to left.
        let surface: f64 = self.chords(level).iter().map(|c| width.under(&Edge::line(c.right, c.left))).sum();
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
        self.chords(level).iter().map(|c| self.vessel.width.across(c.left, c.right)).sum()
    }

    /// The surface at `level`, from left to right.
    pub fn chords(&self, level: f64) -> Vec<Chord> {
        self.sublevel.chords(level).into_iter().map(|(left, right)| Chord { left, right }).collect()
    }
}
