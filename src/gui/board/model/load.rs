//! Loads of the liquid as the board draws them.

use crate::analysis::{PlateLoad, Settled};
use crate::geom::{Edge, Point, Vec2, cross};
use crate::problem::Place;
use crate::section::{Plate, Section};

use super::flatten;

/// Share of the highest pressure below which a difference of two pressures is rounding.
const ROUNDING: f64 = 1e-9;

/// The load of the liquid on one edge.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Load {
    /// Where its line of action meets the edge.
    pub on_edge: Point,
    /// On the tank, N.
    pub force_n: Vec2,
}

/// The net pressure across a plate, as a prism on it.
#[derive(Clone, Debug, PartialEq)]
pub struct Prism {
    /// Its parts along the plate.
    pub parts: Vec<PrismPart>,
    /// The net pressure of largest size, Pa, and where.
    pub peak: Option<(f64, Point)>,
    /// The resultant, where there is one.
    pub load: Option<Load>,
}

/// A straight part of a prism.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PrismPart {
    /// Along the plate.
    pub line: [Point; 2],
    /// Where a positive pressure pushes: a unit vector.
    pub toward: Vec2,
    /// Net pressure at both ends, Pa.
    pub pa: [f64; 2],
}

impl PrismPart {
    /// The part, cut where the pressure changes sides.
    pub fn of_one_sign(&self) -> Vec<PrismPart> {
        let ([a, b], [from, to]) = (self.pa, self.line);
        if a * b >= 0.0 {
            return vec![*self];
        }
        let zero = from + (to - from) * (a / (a - b));
        let part = |line, pa| PrismPart { line, pa, ..*self };
        vec![part([from, zero], [a, 0.0]), part([zero, to], [0.0, b])]
    }
}

impl Prism {
    /// None where nothing presses but what rounding leaves of `peak_pa`, the highest pressure in the tank.
    pub fn new(plate: &Plate, load: &PlateLoad, peak_pa: f64) -> Option<Prism> {
        let is_felt = |pa: f64| pa.abs() > ROUNDING * peak_pa.abs();
        let parts: Vec<PrismPart> = (load.stretches.iter())
            .filter(|s| is_felt(s.from_pa) || is_felt(s.to_pa))
            .filter_map(|s| {
                let line = [plate.point_at(s.from_m), plate.point_at(s.to_m)];
                let along = (line[1] - line[0]).try_normalize(0.0)?;
                Some(PrismPart { line, toward: Vec2::new(along.y, -along.x), pa: [s.from_pa, s.to_pa] })
            })
            .collect();
        let segments: Vec<Edge> = plate.segments().collect();
        let load_at = |through: Point| {
            let met = segments.iter().map(|e| where_met(e, through, load.force_n));
            let off = |p: &Point| cross(load.force_n, p - through).abs();
            let on_edge = met.min_by(|a, b| off(a).total_cmp(&off(b)))?;
            Some(Load { on_edge, force_n: load.force_n })
        };
        (!parts.is_empty()).then(|| Prism { parts, peak: load.peak, load: load.acts_at.and_then(load_at) })
    }
}

/// Loads on all walls of the outline, and on the edge of an obstacle that governs.
pub(super) fn edge_loads(section: &Section, governing: &Place, state: &Settled) -> Vec<Load> {
    let walls = state.edges.iter().filter(|load| load.is_wall);
    let loads = walls.filter_map(|load| {
        let edge = match load.place {
            Place::Edge(i) if i < section.outline.len() => section.edge(i),
            Place::Obstacle { obstacle_idx, edge_idx: Some(i) } if load.place == *governing => {
                *section.obstacles.get(obstacle_idx)?.edges().get(i)?
            }
            _ => return None,
        };
        Some(Load { on_edge: where_met(&edge, load.acts_at?, load.force_n), force_n: load.force_n })
    });
    loads.collect()
}

/// Where the line of action through `through` along `force` meets the edge; the nearest point of the edge when
/// it meets it nowhere.
fn where_met(edge: &Edge, through: Point, force: Vec2) -> Point {
    let points = flatten(edge, 1e-3 * edge.length());
    let crossing = points.windows(2).find_map(|pair| {
        let (a, b) = (cross(force, pair[0] - through), cross(force, pair[1] - through));
        (a != b && (a <= 0.0) != (b <= 0.0)).then(|| pair[0] + (pair[1] - pair[0]) * (a / (a - b)))
    });
    crossing.unwrap_or_else(|| edge.point_at(edge.nearest(through).0))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_load_starts_where_its_line_of_action_meets_the_edge() {
        let quarter = Edge::with_radius(Point::new(1.0, 0.0), Point::new(0.0, 1.0), 1.0).unwrap();
        // Through the centre, as every uniform pressure on an arc acts.
        let force = Vec2::new(1.0, 1.0);
        let at = where_met(&quarter, Point::origin(), force);
        let want = Point::new(1.0, 1.0) * std::f64::consts::FRAC_1_SQRT_2;
        assert!((at - want).norm() < 2e-3, "got {at}, expected {want}");
    }
}
