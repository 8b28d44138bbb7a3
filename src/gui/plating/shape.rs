//! The shape of one plate: corners moved, added and taken out, and places along it.

use crate::app::with_length_kept_openings;
use crate::geom::{Edge, Point};
use crate::section::Plate;

/// The plate with its corner `k` at `to`; openings keep their distance from the nearer end.
pub fn with_point(plate: &Plate, k: usize, to: Point) -> Plate {
    let mut next = plate.clone();
    let Some(point) = next.points.get_mut(k) else { return next };
    *point = to;
    with_length_kept_openings(plate, next)
}

/// The plate with a new corner on its line at the point nearest to `at`, and the corner's index; none at its ends.
pub fn with_corner(plate: &Plate, at: Point) -> Option<(Plate, usize)> {
    let (i, segment, t) = nearest(plate, at)?;
    let corner = segment.point_at(t);
    if corner == segment.start || corner == segment.end {
        return None;
    }
    let mut next = plate.clone();
    next.points.insert(i + 1, corner);
    Some((next, i + 1))
}

/// The middle of the longest segment: where a new corner has most room.
pub fn longest_middle(plate: &Plate) -> Point {
    let longest = plate.segments().max_by(|a, b| a.length().total_cmp(&b.length()));
    longest.map_or_else(Point::origin, |segment| segment.point_at(0.5))
}

/// The plate without its corner `k`; none where it would not be a plate any more.
pub fn without_corner(plate: &Plate, k: usize) -> Option<Plate> {
    if plate.points.len() < 3 || k >= plate.points.len() {
        return None;
    }
    let mut next = plate.clone();
    next.points.remove(k);
    Some(with_length_kept_openings(plate, next))
}

/// What corner `k` of a plate is: `Foot`, `Top`, `Left end`, `Right end`, `Corner 2`.
pub fn corner_word(plate: &Plate, k: usize) -> String {
    let (Some(first), Some(last)) = (plate.points.first(), plate.points.last()) else { return String::new() };
    let is_level = (last.y - first.y).abs() < (last.x - first.x).abs();
    let is_forward = if is_level { first.x <= last.x } else { first.y <= last.y };
    let [low, high] = if is_level { ["Left end", "Right end"] } else { ["Foot", "Top"] };
    match (k == 0, k + 1 == plate.points.len()) {
        (true, _) => if is_forward { low } else { high }.to_owned(),
        (_, true) => if is_forward { high } else { low }.to_owned(),
        _ => format!("Corner {}", k + 1),
    }
}

/// How far along the plate, from its first point, the point nearest to `p` lies, m.
pub fn along(plate: &Plate, p: Point) -> f64 {
    let Some((i, segment, t)) = nearest(plate, p) else { return 0.0 };
    plate.segments().take(i).map(|e| e.length()).sum::<f64>() + t * segment.length()
}

fn nearest(plate: &Plate, p: Point) -> Option<(usize, Edge, f64)> {
    let segments = plate.segments().enumerate().map(|(i, segment)| (i, segment, segment.nearest(p)));
    let (i, segment, (t, _)) = segments.min_by(|a, b| a.2.1.total_cmp(&b.2.1))?;
    Some((i, segment, t))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::section::{Opening, OpeningShape, Panel};

    /// Upright, 1 m, with a drain at its foot, a manhole in the middle and a vent at its top.
    fn plate() -> Plate {
        let opening = |from_m, to_m| Opening { name: String::new(), from_m, to_m, shape: OpeningShape::Share(1.0) };
        Plate {
            name: String::new(),
            points: vec![Point::new(0.0, 0.0), Point::new(0.0, 1.0)],
            thickness_m: 0.005,
            corrosion_m: 0.0,
            material: String::new(),
            panel: Panel::default(),
            openings: vec![opening(0.0, 0.05), opening(0.4, 0.6), opening(0.9, 1.0)],
        }
    }

    fn check(plate: &Plate, want: [(f64, f64); 3]) {
        let got: Vec<(f64, f64)> = plate.openings.iter().map(|o| (o.from_m, o.to_m)).collect();
        for (got, want) in got.iter().zip(want) {
            let off = (got.0 - want.0).abs().max((got.1 - want.1).abs());
            assert!(off < 1e-12, "{:?}: got {got:?}, expected {want:?}, within 1e-12 m", plate.points);
        }
    }

    #[test]
    fn openings_keep_to_their_end_while_corners_move() {
        check(&with_point(&plate(), 1, Point::new(0.0, 1.5)), [(0.0, 0.05), (0.4, 0.6), (1.4, 1.5)]);
        check(&with_point(&plate(), 0, Point::new(0.0, 0.2)), [(0.0, 0.05), (0.4, 0.6), (0.7, 0.8)]);
        assert_eq!(with_point(&plate(), 7, Point::origin()), plate(), "there is no such corner");
    }

    #[test]
    fn a_new_corner_moves_no_opening_and_its_removal_brings_the_plate_back() {
        let (split, k) = with_corner(&plate(), Point::new(0.3, 0.3)).expect("within the plate");
        assert_eq!((k, split.points[1]), (1, Point::new(0.0, 0.3)));
        check(&split, [(0.0, 0.05), (0.4, 0.6), (0.9, 1.0)]);
        assert_eq!(without_corner(&split, 1), Some(plate()));
        assert_eq!(with_corner(&plate(), Point::new(0.0, -1.0)), None, "there is a corner already");
        assert_eq!(without_corner(&plate(), 0), None, "two points make a plate");
        // The knee goes out by 0.4 m: 0.5 m from the foot to it, and the part above it is longer.
        let bent = with_point(&split, 1, Point::new(0.4, 0.3));
        let off = 0.5 + 0.4_f64.hypot(0.7) - 1.0;
        check(&bent, [(0.0, 0.05), (0.4, 0.6), (0.9 + off, 1.0 + off)]);
    }

    #[test]
    fn a_place_along_the_plate_is_counted_from_its_first_point() {
        let (bent, _) = with_corner(&plate(), Point::new(0.0, 0.3)).unwrap();
        let bent = with_point(&bent, 2, Point::new(1.0, 0.3));
        assert!((along(&bent, Point::new(0.6, 0.4)) - 0.9).abs() < 1e-12);
        assert_eq!(along(&bent, Point::new(-1.0, -1.0)), 0.0);
    }
}
