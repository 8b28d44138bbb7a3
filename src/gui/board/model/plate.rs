//! Plates as they are drawn: the solid parts of each, and its openings between them.

use crate::geom::{Point, Vec2};
use crate::section::Plate;

/// One plate. Without points where a coordinate is not finite, so that indices stay those of the study.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct PlateLine {
    /// Its corners from end to end.
    pub points: Vec<Point>,
    /// What lies between its openings.
    pub solid: Vec<Vec<Point>>,
    /// Its openings, in the study's order.
    pub openings: Vec<OpeningLine>,
    /// Thickness, m.
    pub thickness_m: f64,
}

/// One opening of a plate. Without points where it has no length on the plate.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct OpeningLine {
    /// From its one end to the other.
    pub points: Vec<Point>,
    /// Direction of the plate at both ends, unit vectors.
    pub along: [Vec2; 2],
}

impl PlateLine {
    /// A plate, faulty or not.
    pub fn new(plate: &Plate) -> PlateLine {
        let is_finite = |p: &Point| p.coords.iter().all(|c| c.is_finite());
        if plate.points.len() < 2 || !plate.points.iter().all(is_finite) {
            let openings = vec![OpeningLine::default(); plate.openings.len()];
            return PlateLine { openings, ..Default::default() };
        }
        let length_m = plate.length_m();
        // Openings that overlap or run off the plate are faults, and drawn as far as they go.
        let span = |from_m: f64, to_m: f64| {
            let (from_m, to_m) = (from_m.clamp(0.0, length_m), to_m.clamp(0.0, length_m));
            (from_m < to_m).then_some((from_m, to_m))
        };
        let openings = plate.openings.iter().map(|opening| match span(opening.from_m, opening.to_m) {
            Some((from_m, to_m)) => OpeningLine {
                points: part(plate, from_m, to_m),
                along: [from_m, to_m].map(|at_m| direction(plate, at_m)),
            },
            None => OpeningLine::default(),
        });
        let openings = openings.collect();
        let mut solid = Vec::new();
        let mut reached_m = 0.0;
        for (_, opening) in plate.openings_in_order() {
            let Some((from_m, to_m)) = span(opening.from_m, opening.to_m) else { continue };
            if from_m > reached_m {
                solid.push(part(plate, reached_m, from_m));
            }
            reached_m = f64::max(reached_m, to_m);
        }
        if reached_m < length_m {
            solid.push(part(plate, reached_m, length_m));
        }
        let thickness_m = if plate.thickness_m.is_finite() { plate.thickness_m } else { 0.0 };
        PlateLine { points: plate.points.clone(), solid, openings, thickness_m }
    }
}

/// The line of a plate between two places along it.
fn part(plate: &Plate, from_m: f64, to_m: f64) -> Vec<Point> {
    let mut points = vec![plate.point_at(from_m)];
    let mut corner_m = 0.0;
    for segment in plate.segments() {
        corner_m += segment.length();
        if corner_m > from_m && corner_m < to_m {
            points.push(segment.end);
        }
    }
    points.push(plate.point_at(to_m));
    points
}

fn direction(plate: &Plate, at_m: f64) -> Vec2 {
    let mut end_m = 0.0;
    for segment in plate.segments() {
        end_m += segment.length();
        if at_m <= end_m && segment.start != segment.end {
            return segment.tangent_at(0.0);
        }
    }
    plate.segments().last().map_or(Vec2::zeros(), |segment| segment.tangent_at(0.0))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::section::{Opening, OpeningShape, Panel};

    fn check(openings: &[(f64, f64)], want: &[&[(f64, f64)]]) {
        let corners = [(0.0, 0.0), (0.0, 1.0), (2.0, 1.0)];
        let opening =
            |&(from_m, to_m)| Opening { name: String::new(), from_m, to_m, shape: OpeningShape::Share(1.0) };
        let plate = Plate {
            name: String::new(),
            points: corners.map(|(s, z)| Point::new(s, z)).to_vec(),
            thickness_m: 0.005,
            corrosion_m: 0.0,
            material: String::new(),
            panel: Panel::default(),
            openings: openings.iter().map(opening).collect(),
        };
        let line = PlateLine::new(&plate);
        let got: Vec<Vec<(f64, f64)>> =
            line.solid.iter().map(|points| points.iter().map(|p| (p.x, p.y)).collect()).collect();
        assert_eq!(got, want, "openings {openings:?}");
        assert_eq!(line.openings.len(), openings.len());
    }

    #[test]
    fn what_is_not_open_is_solid() {
        check(&[], &[&[(0.0, 0.0), (0.0, 1.0), (2.0, 1.0)]]);
        check(&[(2.0, 2.5), (0.0, 0.25)], &[&[(0.0, 0.25), (0.0, 1.0), (1.0, 1.0)], &[(1.5, 1.0), (2.0, 1.0)]]);
        check(&[(0.5, 1.5)], &[&[(0.0, 0.0), (0.0, 0.5)], &[(0.5, 1.0), (2.0, 1.0)]]);
    }

    #[test]
    fn faulty_openings_are_drawn_as_far_as_they_go() {
        check(&[(0.5, 1.5), (1.0, 2.0)], &[&[(0.0, 0.0), (0.0, 0.5)], &[(1.0, 1.0), (2.0, 1.0)]]);
        check(&[(2.0, 9.0), (-3.0, -1.0), (1.5, 1.2)], &[&[(0.0, 0.0), (0.0, 1.0), (1.0, 1.0)]]);
        check(&[(-1.0, 9.0)], &[]);
        check(&[(f64::NAN, 1.0)], &[&[(0.0, 0.0), (0.0, 1.0), (2.0, 1.0)]]);
    }
}
