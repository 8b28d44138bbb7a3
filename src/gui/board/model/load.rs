//! Loads of the liquid as the board draws them.

use crate::geom::{Edge, Point, Vec2, cross};

use super::flatten;

/// The load of the liquid on one edge.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Load {
    /// Where its line of action meets the edge.
    pub on_edge: Point,
    /// On the tank, N.
    pub force_n: Vec2,
}

/// Where the line of action through `through` along `force` meets the edge; the nearest point of the edge when
/// it meets it nowhere.
pub(super) fn where_met(edge: &Edge, through: Point, force: Vec2) -> Point {
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
