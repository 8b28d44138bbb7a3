//! The net pressure along a plate as a profile of one of its spans.

use crate::plates::{PlateError, Profile};
use crate::section::Plate;
use crate::statics::Stretch;

/// The profile from `from_m` to `to_m` along a plate, counted from there; nothing presses between wet stretches, but over
/// an opening pressure goes on in a straight line, as if it were shut.
pub(super) fn profile(plate: &Plate, stretches: &[Stretch], [from_m, to_m]: [f64; 2]) -> Result<Profile, PlateError> {
    let mut points: Vec<(f64, f64)> = Vec::with_capacity(2 * stretches.len() + 2);
    for s in stretches {
        if let Some(&(end, _)) = points.last() {
            let middle = 0.5 * (end + s.from_m);
            let is_opening = plate.openings.iter().any(|o| o.from_m <= middle && middle <= o.to_m);
            if s.from_m > end && !is_opening {
                points.extend([(end, 0.0), (s.from_m, 0.0)]);
            }
        }
        points.extend([(s.from_m, s.from_pa), (s.to_m, s.to_pa)]);
    }
    if points.is_empty() {
        points.extend([(from_m, 0.0), (to_m, 0.0)]);
    }
    points.iter_mut().for_each(|p| p.0 -= from_m);
    Profile::new(points)
}
