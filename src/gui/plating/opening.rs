//! Openings of one plate: where there is room for them, and new ones.

use crate::section::{Opening, OpeningShape, Plate};

/// Stretch along the plate, m, in which opening `o` may lie without touching a neighbour.
pub fn room(plate: &Plate, o: usize) -> (f64, f64) {
    let Some(this) = plate.openings.get(o) else { return (0.0, plate.length_m()) };
    let middle_m = 0.5 * (this.from_m + this.to_m);
    stretch(plate, middle_m, |i| i != o)
}

/// The plate with one more opening round `at_m`, as long as asked where there is room, and its index; none inside another
/// opening.
pub fn with_opening(plate: &Plate, at_m: f64, length_m: f64) -> Option<(Plate, usize)> {
    let is_taken = plate.openings.iter().any(|o| o.from_m <= at_m && at_m <= o.to_m);
    let (low_m, high_m) = stretch(plate, at_m, |_| true);
    let half_m = 0.5 * length_m.min(0.5 * (high_m - low_m));
    let is_placed = half_m.is_finite() && half_m > 0.0;
    (!is_taken && is_placed).then(|| {
        let middle_m = at_m.clamp(low_m + half_m, high_m - half_m);
        let mut next = plate.clone();
        next.openings.push(Opening {
            name: String::new(),
            from_m: middle_m - half_m,
            to_m: middle_m + half_m,
            shape: OpeningShape::Share(1.0),
        });
        (next, plate.openings.len())
    })
}

/// The middle of the longest stretch without an opening, m along the plate.
pub fn roomiest_m(plate: &Plate) -> f64 {
    let mut stops = vec![0.0];
    stops.extend(plate.openings_in_order().iter().flat_map(|(_, o)| [o.from_m, o.to_m]));
    stops.push(plate.length_m());
    let gaps = stops.chunks_exact(2).map(|gap| (gap[1] - gap[0], 0.5 * (gap[0] + gap[1])));
    gaps.max_by(|a, b| a.0.total_cmp(&b.0)).map_or(0.0, |(_, middle_m)| middle_m)
}

/// From the end of the last opening before `at_m`, or of the plate, to the beginning of the next one.
fn stretch(plate: &Plate, at_m: f64, is_meant: impl Fn(usize) -> bool) -> (f64, f64) {
    let (mut low_m, mut high_m) = (0.0, plate.length_m());
    for (_, other) in plate.openings.iter().enumerate().filter(|(i, _)| is_meant(*i)) {
        if 0.5 * (other.from_m + other.to_m) <= at_m {
            low_m = f64::max(low_m, other.to_m);
        } else {
            high_m = f64::min(high_m, other.from_m);
        }
    }
    (low_m, high_m)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::geom::Point;
    use crate::section::Panel;

    /// A plate of 2 m with these openings.
    fn plate(openings: &[(f64, f64)]) -> Plate {
        let opening =
            |&(from_m, to_m)| Opening { name: String::new(), from_m, to_m, shape: OpeningShape::Share(1.0) };
        Plate {
            name: String::new(),
            points: vec![Point::new(0.0, 0.0), Point::new(0.0, 2.0)],
            thickness_m: 0.005,
            corrosion_m: 0.0,
            material: String::new(),
            panel: Panel::default(),
            openings: openings.iter().map(opening).collect(),
        }
    }

    #[test]
    fn an_opening_has_room_up_to_its_neighbours() {
        let plate = plate(&[(1.375, 2.0), (0.75, 1.0), (0.0, 0.25)]);
        assert_eq!(room(&plate, 1), (0.25, 1.375));
        assert_eq!(room(&plate, 0), (1.0, 2.0));
        assert_eq!(room(&plate, 2), (0.0, 0.75));
        assert_eq!(roomiest_m(&plate), 0.5);
    }

    #[test]
    fn a_new_opening_lies_beside_the_others() {
        for (at_m, length_m, want) in [
            (1.0, 0.5, Some((0.75, 1.25))),
            (0.3, 0.5, Some((0.25, 0.75))),
            (1.45, 0.5, Some((1.0, 1.5))),
            (1.9, 0.5, None),
            // Half of what there is, where there is little.
            (1.45, 3.0, Some((0.875, 1.5))),
        ] {
            let got = with_opening(&plate(&[(0.0, 0.25), (1.5, 2.0)]), at_m, length_m);
            let got = got.map(|(plate, i)| (plate.openings[i].from_m, plate.openings[i].to_m));
            assert_eq!(got, want, "at {at_m} m, {length_m} m long");
        }
    }
}
