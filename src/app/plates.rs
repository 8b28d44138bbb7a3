//! Plates as the window proposes them: across the tank, moved along the walls they stand on, equally spaced.
//!
//! A section goes in, plates come out, nothing is changed. A plate's end stands on the outline, an obstacle or another
//! plate, or is free. Where the outline is faulty every end counts as free: the plate comes out as it was drawn, and
//! `section::check` says why. Knows no liquid and no load.

use std::f64::consts::TAU;

use crate::geom::{Edge, Path, Point, Vec2};
use crate::section::{Opening, Panel, Plate, STANDS_WITHIN, Section};

/// Lengths below this share of the section's diagonal, or of a plate, are taken as zero.
const SLACK: f64 = 1e-9;

/// Thickness of a first plate until the user says otherwise, m. Common practice: 3 to 5 mm of steel.
const FIRST_THICKNESS_M: f64 = 0.005;

/// A plate from wall to wall along the line through the two points, from `from` toward `to`; upright through the point
/// where the two are one. Obstacles and plates stop it like walls. It is built like the last plate of the section and
/// has no openings.
pub fn plate_across(section: &Section, from: Point, to: Point) -> Plate {
    let obstacles = 0..section.obstacles.len();
    let plates = section.plates.iter().flat_map(Plate::segments).collect();
    let ends = Stops::new(section, obstacles, plates).and_then(|stops| {
        let aim = if to == from { from + Vec2::y() * (SLACK * stops.diagonal_m) } else { to };
        stops.span(from, aim)
    });
    let (start, end) = ends.unwrap_or((from, to));
    let points = vec![start, end];
    match section.plates.last() {
        Some(last) => Plate { name: String::new(), points, openings: vec![], ..last.clone() },
        None => Plate {
            name: String::new(),
            points,
            thickness_m: FIRST_THICKNESS_M,
            corrosion_m: 0.0,
            material: String::new(),
            panel: Panel::default(),
            openings: vec![],
        },
    }
}

/// A plate of the section moved by `by`, metres; none where there is no such plate. An end that stood on a wall is
/// carried along the plate's own line until it stands there again: an upright plate follows floor and roof, and one that
/// lies between upright walls stays. Openings keep their distance from the nearer end. What stood on the plate
/// does not follow it.
pub fn shifted_along_walls(section: &Section, plate_idx: usize, by: Vec2) -> Option<Plate> {
    let old = section.plates.get(plate_idx)?;
    let moved: Vec<Point> = old.points.iter().map(|p| p + by).collect();
    let mut points = moved.clone();
    if let ([first, second, ..], [.., before_last, last]) = (&moved[..], &moved[..]) {
        for (end_idx, inner, end) in [(0, second, first), (moved.len() - 1, before_last, last)] {
            let stops = Stops::under(section, plate_idx, old.points[end_idx]);
            if let Some((_, stands_at)) = stops.and_then(|stops| stops.span(*inner, *end)) {
                points[end_idx] = stands_at;
            }
        }
    }
    Some(with_length_kept_openings(old, Plate { points, ..old.clone() }))
}

/// All plates of the section, the chosen ones moved along s so that the bays between them and to the ends of the tank
/// are equally long. Their order stays. A plate that is not upright counts by the middle of its reach along s.
pub fn equally_spaced(section: &Section, plate_idxs: &[usize]) -> Vec<Plate> {
    let mut plates = section.plates.clone();
    let Some(outline) = sound_path(section.edges()) else { return plates };
    let (low, high) = outline.extent(Vec2::x());
    let mut chosen: Vec<(f64, usize)> = (0..plates.len())
        .filter(|i| plate_idxs.contains(i))
        .filter_map(|i| middle_s(&plates[i]).map(|s| (s, i)))
        .collect();
    chosen.sort_by(|a, b| a.0.total_cmp(&b.0));
    let bay_m = (high - low) / (chosen.len() + 1) as f64;
    for (n_before, &(s, i)) in chosen.iter().enumerate() {
        let to = low + bay_m * (n_before + 1) as f64;
        if let Some(plate) = shifted_along_walls(section, i, Vec2::new(to - s, 0.0)) {
            plates[i] = plate;
        }
    }
    plates
}

/// A plate with each end that runs out through the outline or into an obstacle drawn back onto it, along the plate's own
/// line; none where no end does.
pub(super) fn ended_on_walls(section: &Section, plate: &Plate) -> Option<Plate> {
    let stops = Stops::new(section, 0..section.obstacles.len(), vec![])?;
    let last = plate.points.len().checked_sub(1).filter(|last| *last > 0)?;
    let mut points = plate.points.clone();
    for (end, inner) in [(0, 1), (last, last - 1)] {
        let (from, to) = (plate.points[inner], plate.points[end]);
        let (_, wall) = stops.span(from, to)?;
        if (to - wall).dot(&(to - from)) > 0.0 {
            points[end] = wall;
        }
    }
    let next = Plate { points, ..plate.clone() };
    (next != *plate).then(|| with_length_kept_openings(plate, next))
}

/// `new` with the openings of `old`, each at its old distance from the end of the plate that it is nearer to; one that
/// reaches from end to end still does. None runs off the plate: where there is too little room an opening
/// is moved on, and cut only where it is longer than the plate. In a drag, `old` is the plate before the drag.
pub fn with_length_kept_openings(old: &Plate, new: Plate) -> Plate {
    let (was_m, is_m) = (old.length_m(), new.length_m());
    let slack = SLACK * was_m;
    let kept = |opening: &Opening| {
        let (from_start, from_end) = (opening.from_m, was_m - opening.to_m);
        let is_on_plate = from_start >= -slack && from_end >= -slack;
        if !is_on_plate {
            return opening.clone();
        }
        if from_start <= slack && from_end <= slack {
            return Opening { from_m: 0.0, to_m: is_m, ..opening.clone() };
        }
        let shift = if from_end < from_start - slack { is_m - was_m } else { 0.0 };
        let (from_m, to_m) = (opening.from_m + shift, opening.to_m + shift);
        let back = (-from_m).max(0.0) - (to_m - is_m).max(0.0);
        Opening { from_m: (from_m + back).max(0.0), to_m: (to_m + back).min(is_m), ..opening.clone() }
    };
    Plate { openings: old.openings.iter().map(kept).collect(), ..new }
}

/// What a plate may stand on.
struct Stops {
    outline: Path,
    holes: Vec<Path>,
    plates: Vec<Edge>,
    diagonal_m: f64,
}

impl Stops {
    /// The outline, some of the obstacles, and segments of plates; none where they are faulty.
    fn new(section: &Section, obstacles: impl IntoIterator<Item = usize>, plates: Vec<Edge>) -> Option<Stops> {
        let outline = sound_path(section.edges())?;
        let holes = obstacles.into_iter().map(|i| sound_path(section.obstacles[i].edges())).collect::<Option<_>>()?;
        let (s, z) = (outline.extent(Vec2::x()), outline.extent(Vec2::y()));
        Some(Stops { outline, holes, plates, diagonal_m: (s.1 - s.0).hypot(z.1 - z.0) })
    }

    /// The outline, and the obstacle or plate that an end of a plate stands on; none where the end is free.
    fn under(section: &Section, plate_idx: usize, end: Point) -> Option<Stops> {
        let mut stops = Stops::new(section, [], vec![])?;
        let slack = STANDS_WITHIN * stops.diagonal_m;
        let is_near = |edges: &[Edge]| edges.iter().any(|e| e.nearest(end).1 <= slack);
        if is_near(stops.outline.edges()) {
            return Some(stops);
        }
        if let Some(i) = section.obstacles.iter().position(|o| is_near(&o.edges())) {
            return Stops::new(section, [i], vec![]);
        }
        let others = section.plates.iter().enumerate().filter(|(i, _)| *i != plate_idx);
        stops.plates = others.map(|(_, p)| p.segments().collect::<Vec<_>>()).find(|edges| is_near(edges))?;
        Some(stops)
    }

    /// The stretch between stops of the line through two points that covers most of the way from one to the other, or
    /// lies nearest to it; its ends in the same sense.
    fn span(&self, from: Point, to: Point) -> Option<(Point, Point)> {
        let length_m = (to - from).norm();
        if !(length_m > 0.0 && length_m.is_finite()) {
            return None;
        }
        let along = (to - from) / length_m;
        let across = Vec2::new(-along.y, along.x);
        let level = across.dot(&from.coords);
        let slack = SLACK * self.diagonal_m;
        let mut cuts: Vec<f64> = Vec::new();
        for edge in self.edges() {
            let ends = [edge.start, edge.end].into_iter().filter(|p| (across.dot(&p.coords) - level).abs() <= slack);
            let crossings = edge.crossings(across, level).into_iter().map(|t| edge.point_at(t));
            cuts.extend(ends.chain(crossings).map(|p| along.dot(&(p - from))));
        }
        cuts.sort_by(f64::total_cmp);
        let covered = |&(a, b): &(f64, f64)| b.min(length_m) - a.max(0.0);
        cuts.windows(2)
            .map(|pair| (pair[0], pair[1]))
            .filter(|&(a, b)| b - a > slack && self.is_clear(from + along * (0.5 * (a + b))))
            .max_by(|a, b| covered(a).total_cmp(&covered(b)))
            .map(|(a, b)| (from + along * a, from + along * b))
    }

    fn edges(&self) -> impl Iterator<Item = &Edge> {
        let chains = std::iter::once(&self.outline).chain(&self.holes);
        chains.flat_map(|chain| chain.edges()).chain(&self.plates)
    }

    fn is_clear(&self, p: Point) -> bool {
        self.outline.contains(p) && !self.holes.iter().any(|hole| hole.contains(p))
    }
}

/// The chain, if geometry can be asked of it.
fn sound_path(edges: Vec<Edge>) -> Option<Path> {
    let is_sound = |e: &Edge| [e.start.x, e.start.y].iter().all(|x| x.is_finite()) && e.sweep.abs() < TAU;
    (edges.len() >= 2 && edges.iter().all(is_sound)).then(|| Path::new(edges))
}

fn middle_s(plate: &Plate) -> Option<f64> {
    let s = plate.points.iter().map(|p| p.x);
    let (low, high) = (s.clone().reduce(f64::min)?, s.reduce(f64::max)?);
    Some(0.5 * (low + high)).filter(|s| s.is_finite())
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::section::{EdgeKind, Obstacle, OpeningShape, OutlineEdge, Vertex, WidthLaw};

    /// A section from (s, z, sweep in half turns).
    fn section(outline: &[(f64, f64, f64)], plates: Vec<Plate>) -> Section {
        let edge = |&(s, z, half_turns): &(f64, f64, f64)| OutlineEdge {
            name: String::new(),
            kind: EdgeKind::Wall,
            start: Point::new(s, z),
            sweep_rad: half_turns * std::f64::consts::PI,
        };
        Section {
            outline: outline.iter().map(edge).collect(),
            obstacles: vec![],
            plates,
            width: WidthLaw::Constant { width_m: 1.0 },
        }
    }

    fn plate(points: &[(f64, f64)], openings: &[(f64, f64)]) -> Plate {
        let shape = OpeningShape::Share(1.0);
        let opening = |&(from_m, to_m): &(f64, f64)| Opening { name: String::new(), from_m, to_m, shape };
        Plate {
            name: "p".into(),
            points: points.iter().map(|&(s, z)| Point::new(s, z)).collect(),
            thickness_m: 0.004,
            corrosion_m: 0.001,
            material: "m".into(),
            panel: Panel::default(),
            openings: openings.iter().map(opening).collect(),
        }
    }

    /// 4 m long; the floor rises by 1 in 10 to the right, the roof falls by 1 in 5.
    fn wedge(plates: Vec<Plate>) -> Section {
        section(&[(0.0, 0.0, 0.0), (4.0, 0.4, 0.0), (4.0, 1.2, 0.0), (0.0, 2.0, 0.0)], plates)
    }

    /// A ring of radius 1 m about the origin, of two half turns.
    fn ring(plates: Vec<Plate>) -> Section {
        section(&[(-1.0, 0.0, 1.0), (1.0, 0.0, 1.0)], plates)
    }

    #[track_caller]
    fn check_points(got: &Plate, want: &[(f64, f64)]) {
        let got: Vec<(f64, f64)> = got.points.iter().map(|p| (p.x, p.y)).collect();
        let is_close = got.len() == want.len()
            && got.iter().zip(want).all(|(g, w)| (g.0 - w.0).abs() + (g.1 - w.1).abs() < 1e-12);
        assert!(is_close, "got {got:?}, expected {want:?} within 1e-12 m");
    }

    #[track_caller]
    fn check_openings(got: &Plate, want: &[(f64, f64)]) {
        let got: Vec<(f64, f64)> = got.openings.iter().map(|o| (o.from_m, o.to_m)).collect();
        let is_close = got.len() == want.len()
            && got.iter().zip(want).all(|(g, w)| (g.0 - w.0).abs() + (g.1 - w.1).abs() < 1e-12);
        assert!(is_close, "got {got:?}, expected {want:?} within 1e-12 m");
    }

    // Expected places are worked out by hand from the equations of the walls.

    fn shifted(section: &Section, plate_idx: usize, ds_m: f64) -> Option<Plate> {
        shifted_along_walls(section, plate_idx, Vec2::new(ds_m, 0.0))
    }

    #[test]
    fn an_upright_plate_follows_floor_and_roof() {
        let moved = |plate, ds_m| shifted(&wedge(vec![plate]), 0, ds_m).expect("the plate is there");
        let full = [(1.0, 0.1), (1.0, 1.8)];
        check_points(&moved(plate(&full, &[]), 2.0), &[(3.0, 0.3), (3.0, 1.4)]);
        check_points(&moved(plate(&full, &[]), -0.5), &[(0.5, 0.05), (0.5, 1.9)]);
        // Drawn from the roof down, with a corner between, and a free end.
        check_points(&moved(plate(&[(1.0, 1.8), (1.0, 0.1)], &[]), 2.0), &[(3.0, 1.4), (3.0, 0.3)]);
        check_points(
            &moved(plate(&[(1.0, 0.1), (1.0, 1.0), (1.2, 1.3)], &[]), 1.0),
            &[(2.0, 0.2), (2.0, 1.0), (2.2, 1.3)],
        );
        check_points(&moved(plate(&[(1.0, 0.6), (1.0, 1.8)], &[]), 2.0), &[(3.0, 0.6), (3.0, 1.4)]);
        check_points(&moved(plate(&[(1.0, 0.6), (1.0, 1.5)], &[]), 2.0), &[(3.0, 0.6), (3.0, 1.5)]);
        // To where floor and roof have a vertex, and out of the tank, where there is nothing to stand on.
        let ridge =
            [(0.0, 0.0, 0.0), (2.0, 0.3, 0.0), (4.0, 0.0, 0.0), (4.0, 1.0, 0.0), (2.0, 1.4, 0.0), (0.0, 1.0, 0.0)];
        let tank = section(&ridge, vec![plate(&[(1.0, 0.15), (1.0, 1.2)], &[])]);
        check_points(&shifted(&tank, 0, 1.0).unwrap(), &[(2.0, 0.3), (2.0, 1.4)]);
        check_points(&moved(plate(&full, &[]), 4.0), &[(5.0, 0.1), (5.0, 1.8)]);
    }

    #[test]
    fn in_a_ring_a_plate_follows_the_arcs() {
        // 0.6 and 0.8 make the 3-4-5 triangle.
        let upright = plate(&[(0.0, -1.0), (0.0, 1.0)], &[]);
        let moved = shifted(&ring(vec![upright]), 0, 0.6).unwrap();
        check_points(&moved, &[(0.6, -0.8), (0.6, 0.8)]);
    }

    #[test]
    fn a_plate_between_upright_walls_stays_and_one_with_a_free_end_grows() {
        let shelf = plate(&[(0.0, 1.0), (4.0, 1.0)], &[]);
        check_points(&shifted(&wedge(vec![shelf]), 0, 0.3).unwrap(), &[(0.0, 1.0), (4.0, 1.0)]);
        let ledge = plate(&[(0.0, 1.0), (1.0, 1.0)], &[]);
        check_points(&shifted(&wedge(vec![ledge]), 0, 0.3).unwrap(), &[(0.0, 1.0), (1.3, 1.0)]);
    }

    #[test]
    fn a_plate_on_a_pipe_or_on_a_plate_stays_on_it() {
        let mut tank = wedge(vec![plate(&[(2.0, 1.0), (2.0, 1.6)], &[])]);
        let half = std::f64::consts::PI;
        let vertex = |s| Vertex { start: Point::new(s, 0.5), sweep_rad: half };
        tank.obstacles.push(Obstacle { name: "pipe".into(), vertices: vec![vertex(1.5), vertex(2.5)] });
        check_points(&shifted(&tank, 0, 0.3).unwrap(), &[(2.3, 0.9), (2.3, 1.54)]);

        let shelf = plate(&[(0.0, 0.8), (4.0, 1.2)], &[]);
        let tank = wedge(vec![shelf, plate(&[(1.0, 0.9), (1.0, 1.8)], &[])]);
        check_points(&shifted(&tank, 1, 1.0).unwrap(), &[(2.0, 1.0), (2.0, 1.6)]);
    }

    #[test]
    fn equal_bays_from_end_to_end() {
        let upright = |s: f64, openings: &[(f64, f64)]| plate(&[(s, 0.1 * s), (s, 2.0 - 0.2 * s)], openings);
        // Gap at the foot, hole, gap at the head of a plate 1.1 m high.
        let tank =
            wedge(vec![upright(3.0, &[(0.0, 0.1), (0.2, 0.5), (1.05, 1.1)]), upright(3.5, &[]), upright(0.2, &[])]);
        let all = equally_spaced(&tank, &[2, 0, 1, 1, 7]);
        check_points(&all[2], &[(1.0, 0.1), (1.0, 1.8)]);
        check_points(&all[0], &[(2.0, 0.2), (2.0, 1.6)]);
        check_points(&all[1], &[(3.0, 0.3), (3.0, 1.4)]);
        check_openings(&all[0], &[(0.0, 0.1), (0.2, 0.5), (1.35, 1.4)]);
        let one = equally_spaced(&tank, &[1]);
        assert_eq!((&one[0], &one[2]), (&tank.plates[0], &tank.plates[2]), "plates that are not chosen stay");
        check_points(&one[1], &[(2.0, 0.2), (2.0, 1.6)]);
        assert_eq!(equally_spaced(&tank, &[]), tank.plates);
    }

    #[test]
    fn a_plate_drawn_across_reaches_from_wall_to_wall() {
        let at = Point::new;
        let mut tank = wedge(vec![]);
        check_points(&plate_across(&tank, at(1.0, 0.5), at(1.0, 0.9)), &[(1.0, 0.1), (1.0, 1.8)]);
        // From the roof down, beginning outside; and a click.
        check_points(&plate_across(&tank, at(1.0, 2.5), at(1.0, 0.9)), &[(1.0, 1.8), (1.0, 0.1)]);
        check_points(&plate_across(&tank, at(3.0, 0.7), at(3.0, 0.7)), &[(3.0, 0.3), (3.0, 1.4)]);
        // It stops at what is there, and is built like the last plate.
        tank.plates.push(plate(&[(0.0, 1.0), (4.0, 1.0)], &[(0.1, 0.2)]));
        let built = plate_across(&tank, at(1.0, 0.2), at(1.0, 0.9));
        check_points(&built, &[(1.0, 0.1), (1.0, 1.0)]);
        let look = |p: &Plate| (p.name.clone(), p.thickness_m, p.corrosion_m, p.material.clone(), p.openings.len());
        assert_eq!(look(&built), (String::new(), 0.004, 0.001, "m".into(), 0));
    }

    #[test]
    fn openings_keep_to_their_end() {
        let long = |height: f64, openings: &[(f64, f64)]| plate(&[(0.0, 0.0), (0.0, height)], openings);
        let check = |to: f64, openings: &[(f64, f64)], want: &[(f64, f64)]| {
            check_openings(&with_length_kept_openings(&long(1.0, openings), long(to, &[])), want);
        };
        let three = [(0.0, 0.1), (0.3, 0.5), (0.9, 1.0)];
        check(1.0, &three, &three);
        check(1.5, &three, &[(0.0, 0.1), (0.3, 0.5), (1.4, 1.5)]);
        check(0.6, &three, &[(0.0, 0.1), (0.3, 0.5), (0.5, 0.6)]);
        // Too little room: moved on, then cut.
        check(0.45, &three, &[(0.0, 0.1), (0.25, 0.45), (0.35, 0.45)]);
        check(0.2, &[(0.5, 0.7)], &[(0.0, 0.2)]);
        check(0.15, &[(0.3, 0.5), (0.6, 0.65)], &[(0.0, 0.15), (0.0, 0.05)]);
        // From end to end; and one that ran off before, which is the user's to mend.
        check(2.0, &[(0.0, 1.0), (0.8, 1.2)], &[(0.0, 2.0), (0.8, 1.2)]);
    }

    #[test]
    fn faulty_sections_give_plates_as_they_were_drawn() {
        let full = || plate(&[(1.0, 0.1), (1.0, 1.8)], &[(0.0, 0.1)]);
        let nan = f64::NAN;
        for outline in [
            &[][..],
            &[(0.0, 0.0, 0.0)],
            &[(0.0, nan, 0.0), (1.0, 0.0, 0.0), (1.0, 1.0, 0.0)],
            &[(0.0, 0.0, 1e300), (4.0, 0.4, 0.0), (4.0, 1.2, 0.0), (0.0, 2.0, 0.0)],
            &[(0.0, 0.0, nan), (4.0, 0.4, 0.0), (4.0, 1.2, 0.0), (0.0, 2.0, 0.0)],
        ] {
            let tank = section(outline, vec![full()]);
            check_points(&shifted(&tank, 0, 0.5).unwrap(), &[(1.5, 0.1), (1.5, 1.8)]);
            assert_eq!(equally_spaced(&tank, &[0]), tank.plates, "{outline:?}");
            let drawn = plate_across(&tank, Point::new(0.0, 0.0), Point::new(1.0, 1.0));
            check_points(&drawn, &[(0.0, 0.0), (1.0, 1.0)]);
        }
        assert_eq!(shifted(&wedge(vec![]), 0, 0.5), None);
        for bad in [plate(&[], &[]), plate(&[(1.0, 1.0)], &[]), plate(&[(1.0, 1.0), (nan, 1.0)], &[(nan, 0.1)])] {
            let tank = wedge(vec![bad]);
            assert_eq!(shifted(&tank, 0, 0.5).unwrap().points.len(), tank.plates[0].points.len());
            assert_eq!(equally_spaced(&tank, &[0]).len(), 1);
        }
    }
}
