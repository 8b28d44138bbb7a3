//! The shape of one plate. Openings keep their place in the tank as far as they can: when a corner moves, those before
//! it keep their distance from the first end, those behind it theirs from the last; one that reaches an end of the plate
//! stays at that end.

use crate::geom::{Edge, Point, Vec2};
use crate::section::{Opening, Plate};

/// How near an end an opening must lie to belong to it, as a share of the plate's length: rounding, not judgement.
const AT_END: f64 = 1e-9;

/// The plate with its corner `k` at `to`.
pub fn with_point(plate: &Plate, k: usize, to: Point) -> Plate {
    let mut next = plate.clone();
    let Some(point) = next.points.get_mut(k) else { return next };
    *point = to;
    keep_openings(plate, k, &mut next);
    next
}

/// The plate moved by a displacement, openings and all.
pub fn shifted(plate: &Plate, by: Vec2) -> Plate {
    let mut next = plate.clone();
    next.points.iter_mut().for_each(|point| *point += by);
    next
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
    keep_openings(plate, k, &mut next);
    Some(next)
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

/// Puts the openings of `plate` on `next`, whose corner `k` has moved or gone.
fn keep_openings(plate: &Plate, k: usize, next: &mut Plate) {
    let (old_m, new_m) = (plate.length_m(), next.length_m());
    let corner_m: f64 = plate.segments().take(k).map(|e| e.length()).sum();
    let place = |at_m: f64| if at_m <= corner_m { at_m } else { new_m - (old_m - at_m) };
    let slack_m = AT_END * old_m;
    for opening in &mut next.openings {
        let length_m = opening.length_m();
        let (at_first, at_last) = (opening.from_m <= slack_m, opening.to_m >= old_m - slack_m);
        (opening.from_m, opening.to_m) = match (at_first, at_last) {
            (true, true) => (0.0, new_m),
            (true, false) => (opening.from_m, opening.to_m),
            (false, true) => (new_m - length_m, new_m),
            (false, false) => (place(opening.from_m), place(opening.to_m)),
        };
        slide_inside(opening, new_m);
    }
}

/// An opening that a shorter plate has no room for moves inward.
fn slide_inside(opening: &mut Opening, length_m: f64) {
    let over_m = (opening.to_m - length_m).max(0.0);
    let under_m = (-opening.from_m).max(0.0);
    opening.from_m = (opening.from_m - over_m + under_m).max(0.0);
    opening.to_m = (opening.to_m - over_m + under_m).min(length_m);
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::section::{OpeningShape, Panel};

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
    fn openings_keep_their_place_while_ends_move() {
        let raised_top = with_point(&plate(), 1, Point::new(0.0, 1.5));
        check(&raised_top, [(0.0, 0.05), (0.4, 0.6), (1.4, 1.5)]);
        let raised_foot = with_point(&plate(), 0, Point::new(0.0, 0.2));
        check(&raised_foot, [(0.0, 0.05), (0.2, 0.4), (0.7, 0.8)]);
        let short = with_point(&plate(), 1, Point::new(0.0, 0.5));
        check(&short, [(0.0, 0.05), (0.3, 0.5), (0.4, 0.5)]);
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
        let above_m = 0.4_f64.hypot(0.7);
        let off = 0.5 + above_m - 1.0;
        check(&bent, [(0.0, 0.05), (0.4 + off, 0.6 + off), (0.9 + off, 1.0 + off)]);
    }

    #[test]
    fn a_place_along_the_plate_is_counted_from_its_first_point() {
        let (bent, _) = with_corner(&plate(), Point::new(0.0, 0.3)).unwrap();
        let bent = with_point(&bent, 2, Point::new(1.0, 0.3));
        assert!((along(&bent, Point::new(0.6, 0.4)) - 0.9).abs() < 1e-12);
        assert_eq!(along(&bent, Point::new(-1.0, -1.0)), 0.0);
    }
}
