//! Plates on what they stand on: the lines of a section, the ends that stand on them, new plates between them.

use crate::app::{self, plate_across, shifted_along_walls};
use crate::geom::{Edge, Point, Vec2};
use crate::section::{Plate, STANDS_WITHIN, Section};

use super::shape::with_point;

/// A line that a plate may stand on.
#[derive(Clone, Debug, PartialEq)]
pub struct Line {
    /// Where it runs.
    pub edge: Edge,
    /// Its name: `floor`, `obstacle 1`, `plate 2`.
    pub name: String,
}

/// Which ends of a plate stand on something.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Stands {
    /// Its first point.
    pub first: bool,
    /// Its last one.
    pub last: bool,
}

impl Stands {
    /// Of plate `plate_idx`, as it is drawn.
    pub fn of(section: &Section, plate_idx: usize) -> Stands {
        let lines = lines(section, Some(plate_idx));
        let reach_m = STANDS_WITHIN * size_m(section);
        let is_on = |p: Option<&Point>| p.is_some_and(|p| lines.iter().any(|l| l.edge.nearest(*p).1 <= reach_m));
        let points = section.plates.get(plate_idx).map_or(&[][..], |plate| &plate.points);
        Stands { first: is_on(points.first()), last: is_on(points.last()) }
    }
}

/// Whether a place lies on plate `plate_idx`.
pub fn stands_on(section: &Section, plate_idx: usize, p: Point) -> bool {
    let reach_m = STANDS_WITHIN * size_m(section);
    section.plates.get(plate_idx).is_some_and(|plate| plate.segments().any(|e| e.nearest(p).1 <= reach_m))
}

/// All lines that a plate may stand on: outline, obstacles, and plates but for one.
pub fn lines(section: &Section, but_plate: Option<usize>) -> Vec<Line> {
    let outline = (0..section.outline.len()).map(|i| (section.edge(i), section.edge_label(i)));
    let obstacles = section.obstacles.iter().enumerate();
    let obstacles = obstacles.flat_map(|(i, o)| o.edges().into_iter().map(move |e| (e, o.label(i))));
    let plates = section.plates.iter().enumerate().filter(|(i, _)| Some(*i) != but_plate);
    let plates = plates.flat_map(|(i, plate)| plate.segments().map(move |e| (e, plate.label(i))));
    let all = outline.chain(obstacles).chain(plates);
    all.filter(|(edge, _)| is_finite(edge) && edge.start != edge.end)
        .map(|(edge, name)| Line { edge, name })
        .collect()
}

/// All plates that have an end on plate `plate_idx`, as they must be once it has become `next`.
pub fn joined(section: &Section, plate_idx: usize, next: &Plate) -> Vec<(usize, Plate)> {
    let edges: Vec<Edge> = next.segments().collect();
    let mut out = Vec::new();
    for (i, other) in section.plates.iter().enumerate().filter(|(i, o)| *i != plate_idx && o.points.len() > 1) {
        let mut stood = None;
        for end in [0, other.points.len() - 1] {
            let at = other.points[end];
            if stands_on(section, plate_idx, at) {
                let to = meets(&edges, inner(other, end), at).unwrap_or(at);
                stood = Some(with_point(stood.as_ref().unwrap_or(other), end, to));
            }
        }
        out.extend(stood.map(|stood| (i, stood)));
    }
    out
}

/// A plate like the last one, upright in the middle of the widest cell, from wall to wall.
pub fn new_plate(section: &Section) -> Option<Plate> {
    upright_at(section, roomiest_place(section)?)
}

/// The middle of the widest cell between plates and ends of the tank.
pub fn roomiest_place(section: &Section) -> Option<Point> {
    let (low, high) = extent(section)?;
    let mean_s = |plate: &Plate| plate.points.iter().map(|p| p.x).sum::<f64>() / plate.points.len() as f64;
    let mut stops = vec![low.x, high.x];
    stops.extend(section.plates.iter().map(mean_s).filter(|s| *s > low.x && *s < high.x));
    stops.sort_by(f64::total_cmp);
    let widest = stops.windows(2).rev().max_by(|a, b| (a[1] - a[0]).total_cmp(&(b[1] - b[0])))?;
    let s = (500.0 * (widest[0] + widest[1])).round() * 1e-3;
    // The longest way through the tank along this upright.
    let outline: Vec<Edge> = (0..section.outline.len()).map(|i| section.edge(i)).collect();
    let mut zs: Vec<f64> = places_on(&outline, Point::new(s, low.y), Vec2::y()).map(|p| p.y).collect();
    zs.sort_by(f64::total_cmp);
    let middles = zs.windows(2).map(|pair| (pair[1] - pair[0], Point::new(s, 0.5 * (pair[0] + pair[1]))));
    let inside = middles.filter(|(_, p)| section.contains(*p));
    inside.max_by(|a, b| a.0.total_cmp(&b.0)).map(|(_, p)| p)
}

/// A plate like the last one, upright through `p`, up and down to what is nearest; none outside the tank.
pub fn upright_at(section: &Section, p: Point) -> Option<Plate> {
    let plate = section.contains(p).then(|| plate_across(section, p, p))?;
    Some(Plate { points: upward(plate.points[0], plate.points[1]), ..plate }).filter(|plate| plate.length_m() > 0.0)
}

/// A plate like the last one, from place to place as it was drawn. The foot comes first, of a level one the left end:
/// places along it count from there.
pub fn drawn(section: &Section, from: Point, to: Point) -> Plate {
    Plate { points: upward(from, to), ..plate_across(section, from, to) }
}

/// The plates with the upright ones at equal distances; none where that changes nothing.
pub fn equally_spaced(section: &Section) -> Option<Vec<Plate>> {
    let is_upright = |plate: &Plate| match plate.points[..] {
        [first, .., last] => (last.y - first.y).abs() > (last.x - first.x).abs(),
        _ => false,
    };
    let upright: Vec<usize> = (0..section.plates.len()).filter(|&i| is_upright(&section.plates[i])).collect();
    let spaced = app::equally_spaced(section, &upright);
    (spaced != section.plates).then_some(spaced)
}

fn upward(a: Point, b: Point) -> Vec<Point> {
    let is_level = (b.y - a.y).abs() < (b.x - a.x).abs();
    if if is_level { a.x <= b.x } else { a.y <= b.y } { vec![a, b] } else { vec![b, a] }
}

/// A copy of plate `plate_idx` a little to the right of it, or to the left where there is no room.
pub fn copied(section: &Section, plate_idx: usize) -> Option<Plate> {
    let (low, high) = extent(section)?;
    let step = (0.05 * (high.x - low.x) * 1e3).round() * 1e-3;
    let beside = |by: f64| shifted_along_walls(section, plate_idx, Vec2::new(by, 0.0));
    let is_inside = |plate: &Plate| plate.points.iter().all(|p| p.x > low.x && p.x < high.x);
    let mut copy = beside(step).filter(is_inside).or_else(|| beside(-step))?;
    copy.name = next_name(section, &copy.name);
    Some(copy)
}

/// `name` counted on to the next number that no plate has: `Plate 1`, `Plate 2`.
fn next_name(section: &Section, name: &str) -> String {
    let stem = name.trim_end_matches(|c: char| c.is_ascii_digit()).trim_end();
    let is_taken = |name: &String| section.plates.iter().any(|plate| plate.name == *name);
    match name {
        "" => String::new(),
        _ => (2..).map(|i| format!("{stem} {i}")).find(|name| !is_taken(name)).unwrap_or_default(),
    }
}

/// Where the line from `inner` through `end` meets an edge nearest to `end`.
fn meets(edges: &[Edge], inner: Point, end: Point) -> Option<Point> {
    let way = end - inner;
    let length = way.norm();
    (length > 0.0).then(|| first_met(edges, inner, way / length, end)).flatten()
}

/// The place nearest to `near` at which the ray from `from` along `way`, a unit vector, meets an edge.
fn first_met(edges: &[Edge], from: Point, way: Vec2, near: Point) -> Option<Point> {
    let ahead = places_on(edges, from, way).filter(|p| way.dot(&(p - from)) > 0.0);
    let met = ahead.min_by(|a, b| (a - near).norm().total_cmp(&(b - near).norm()))?;
    // Upright and level plates stay so to the last digit.
    let (s, z) = (if way.x == 0.0 { from.x } else { met.x }, if way.y == 0.0 { from.y } else { met.y });
    Some(Point::new(s, z))
}

/// All places at which the line through `from` along `way` meets an edge.
fn places_on(edges: &[Edge], from: Point, way: Vec2) -> impl Iterator<Item = Point> {
    let across = Vec2::new(-way.y, way.x);
    let level = across.dot(&from.coords);
    edges.iter().flat_map(move |e| {
        let within = e.crossings(across, level).into_iter().map(|t| e.point_at(t));
        // Rounding of the coordinates, so that the line does not slip between two edges.
        let slack_m = 8.0 * f64::EPSILON * (e.start.coords.amax() + e.end.coords.amax() + from.coords.amax());
        let ends = [e.start, e.end].into_iter().filter(move |p| (across.dot(&p.coords) - level).abs() <= slack_m);
        within.chain(ends)
    })
}

/// A point of the plate's line from which its end segment leads to corner `end`: the corner before it, or its middle.
fn inner(plate: &Plate, end: usize) -> Point {
    let next = if end == 0 { 1 } else { end - 1 };
    match plate.points.len() {
        2 => nalgebra::center(&plate.points[0], &plate.points[1]),
        _ => plate.points[next],
    }
}

fn extent(section: &Section) -> Option<(Point, Point)> {
    let axes = [Vec2::x(), Vec2::y()];
    let edges = (0..section.outline.len()).map(|i| section.edge(i));
    let boxes = edges.filter(is_finite).map(|e| axes.map(|axis| e.extent(axis)).map(|(low, high)| (low.0, high.0)));
    let joined = boxes.map(|[s, z]| (Point::new(s.0, z.0), Point::new(s.1, z.1)));
    joined.reduce(|(low, high), (l, h)| (low.inf(&l), high.sup(&h)))
}

fn is_finite(e: &Edge) -> bool {
    [e.start.x, e.start.y, e.end.x, e.end.y, e.sweep].iter().all(|c| c.is_finite())
}

fn size_m(section: &Section) -> f64 {
    extent(section).map_or(0.0, |(low, high)| (high - low).norm())
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::section::{EdgeKind, OutlineEdge, WidthLaw};

    /// A trough of 4 m by 2 m with a floor that rises by 1 in 4 from the middle to the right, and these plates.
    fn trough(plates: Vec<Plate>) -> Section {
        let corners = [(-2.0, 0.0), (0.0, 0.0), (2.0, 0.5), (2.0, 2.0), (-2.0, 2.0)];
        let edge = |(s, z)| OutlineEdge {
            name: String::new(),
            kind: EdgeKind::Wall,
            start: Point::new(s, z),
            sweep_rad: 0.0,
        };
        Section {
            outline: corners.map(edge).to_vec(),
            obstacles: vec![],
            plates,
            width: WidthLaw::Constant { width_m: 1.0 },
        }
    }

    fn plate(points: &[(f64, f64)]) -> Plate {
        let points = points.iter().map(|&(s, z)| Point::new(s, z)).collect();
        Plate { points, ..drawn(&trough(vec![]), Point::new(0.0, 0.0), Point::new(0.0, 1.0)) }
    }

    fn check_points(got: &Plate, want: &[(f64, f64)]) {
        assert_eq!(got.points.len(), want.len());
        for (got, want) in got.points.iter().zip(want) {
            let off = (got - Point::new(want.0, want.1)).norm();
            assert!(off < 1e-12, "got {got}, expected {want:?}, within 1e-12 m");
        }
    }

    #[test]
    fn a_plate_that_moves_takes_those_along_that_stand_on_it() {
        let section = trough(vec![plate(&[(-1.0, 0.0), (-1.0, 2.0)]), plate(&[(-2.0, 1.0), (-1.0, 1.0)])]);
        let next = shifted_along_walls(&section, 0, Vec2::new(0.5, 0.0)).unwrap();
        let others = joined(&section, 0, &next);
        assert_eq!(others.iter().map(|(i, _)| *i).collect::<Vec<_>>(), [1]);
        check_points(&others[0].1, &[(-2.0, 1.0), (-0.5, 1.0)]);
        assert_eq!(Stands::of(&section, 1), Stands { first: true, last: true });
    }

    #[test]
    fn upright_plates_are_spaced_and_shelves_stay() {
        let shelf = plate(&[(-2.0, 1.0), (-1.5, 1.0)]);
        let section =
            trough(vec![plate(&[(-0.5, 0.0), (-0.5, 2.0)]), shelf.clone(), plate(&[(0.0, 0.0), (0.0, 2.0)])]);
        let spaced = equally_spaced(&section).expect("they move");
        let third = 4.0 / 3.0;
        check_points(&spaced[0], &[(-2.0 + third, 0.0), (-2.0 + third, 2.0)]);
        check_points(&spaced[2], &[(2.0 - third, 0.25 * (2.0 - third)), (2.0 - third, 2.0)]);
        assert_eq!(spaced[1], shelf);
        assert_eq!(equally_spaced(&trough(spaced)), None, "they stand so already");
        assert_eq!(equally_spaced(&trough(vec![shelf])), None, "there is none to space");
    }

    #[test]
    fn a_drawn_plate_begins_at_its_foot() {
        let section = trough(vec![]);
        let points = |from: (f64, f64), to: (f64, f64)| {
            drawn(&section, Point::new(from.0, from.1), Point::new(to.0, to.1)).points
        };
        assert_eq!(points((0.3, 1.7), (0.2, 0.1)), [Point::new(0.2, 0.1), Point::new(0.3, 1.7)]);
        assert_eq!(points((0.9, 1.0), (-0.5, 1.1)), [Point::new(-0.5, 1.1), Point::new(0.9, 1.0)]);
    }

    #[test]
    fn a_new_plate_stands_in_the_widest_cell_from_wall_to_wall() {
        let first = new_plate(&trough(vec![])).unwrap();
        check_points(&first, &[(0.0, 0.0), (0.0, 2.0)]);
        let mut named = plate(&[(0.0, 0.0), (0.0, 2.0)]);
        (named.name, named.thickness_m) = ("Plate 1".to_owned(), 0.008);
        let mut section = trough(vec![named]);
        let second = new_plate(&section).unwrap();
        assert_eq!(second.thickness_m, 0.008, "as thick as the last one");
        check_points(&second, &[(-1.0, 0.0), (-1.0, 2.0)]);
        section.plates.push(second);
        check_points(&new_plate(&section).unwrap(), &[(1.0, 0.25), (1.0, 2.0)]);
        let copy = copied(&section, 0).unwrap();
        assert_eq!(copy.name, "Plate 2");
        check_points(&copy, &[(0.2, 0.05), (0.2, 2.0)]);
        assert_eq!(new_plate(&Section { outline: vec![], ..section }), None);
    }
}
