//! Welds: what the attached ends of a plate hand to what they stand on, a metre of the tank's width.

use crate::geom::{Point, Vec2, cross};
use crate::num::gauss;
use crate::plates::{EndReaction, PlateError, Profile, Strip, StripEnds};
use crate::section::{Placed, Plate, WidthLaw};
use crate::statics::Stretch;

use super::pressure::profile;
use super::span::{Layout, Part};

/// What an attached end of a plate hands to its weld, a metre of weld. Sides that are held as well take load off it; that
/// is not counted.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Weld {
    /// Which end: 0 where the plate begins, 1 where it ends.
    pub end: usize,
    /// Where.
    pub at: Point,
    /// As a plate that nothing else holds: its other end is free, or an opening cuts it off. Statics alone, bends
    /// included; the whole force, moments about the weld.
    pub alone: Option<EndReaction>,
    /// As a strip that is held at both of its ends and may turn there; where it bends, from the weld to the bend.
    pub hinged: Option<EndReaction>,
    /// The same where it may not turn.
    pub clamped: Option<EndReaction>,
}

impl Weld {
    /// The largest force of all ways, N/m, with its sign.
    pub fn force_n_per_m(&self) -> f64 {
        self.largest(|r| r.force_n_per_m)
    }

    /// The largest moment of all ways, N m a metre, with its sign.
    pub fn moment_n(&self) -> f64 {
        self.largest(|r| r.moment_n)
    }

    fn largest(&self, of: fn(&EndReaction) -> f64) -> f64 {
        let all = [self.alone, self.hinged, self.clamped].into_iter().flatten();
        all.map(|r| of(&r)).fold(0.0, |a: f64, b| if b.abs() > a.abs() { b } else { a })
    }
}

/// The welds of a plate under the net pressure along it. Where an opening lies at an end, the weld beside it bears all of
/// the load.
///
/// Errors: pressures beyond what numbers hold.
pub fn welds(
    plate: &Plate,
    placed: &Placed,
    width: &WidthLaw,
    stretches: &[Stretch],
) -> Result<Vec<Weld>, PlateError> {
    let layout = Layout::new(plate, placed, width);
    let length_m = plate.length_m();
    let points = &placed.points;
    let bare = |end: usize| {
        let at = if end == 0 { points[0] } else { points[points.len() - 1] };
        Weld { end, at, alone: None, hinged: None, clamped: None }
    };
    let mut welds = [bare(0), bare(1)];
    for part in layout.parts().into_iter().flatten() {
        let bends: Vec<f64> = layout.bends_in(&part).collect();
        for end in [0, 1].into_iter().filter(|&end| part.is_held[end]) {
            let beside = if end == 0 { [0.0, 1e-3 * length_m] } else { [(1.0 - 1e-3) * length_m, length_m] };
            let per_weld = 1.0 / (1.0 - layout.open_share(beside[0], beside[1]));
            let times = |r: EndReaction| EndReaction {
                force_n_per_m: per_weld * r.force_n_per_m,
                moment_n: per_weld * r.moment_n,
            };
            if !part.is_held[1 - end] {
                welds[end].alone = Some(times(alone(plate, stretches, &part, end)?));
                continue;
            }
            let (from_m, to_m) = match (end, bends.first(), bends.last()) {
                (0, Some(&bend), _) => (part.from_m, bend),
                (1, _, Some(&bend)) => (bend, part.to_m),
                _ => (part.from_m, part.to_m),
            };
            let pressure = profile(plate, stretches, [from_m, to_m])?;
            let reaction = |ends| -> Result<EndReaction, PlateError> {
                let strip = Strip::load(to_m - from_m, ends, &pressure)?;
                Ok(times(if end == 0 { strip.start } else { strip.end }))
            };
            welds[end].hinged = Some(reaction(StripEnds::Hinged)?);
            welds[end].clamped = Some(reaction(StripEnds::Clamped)?);
        }
    }
    let is_attached = |w: &Weld| w.alone.is_some() || w.hinged.is_some();
    Ok(welds.into_iter().filter(is_attached).collect())
}

/// The reaction of a part that only its end `end` holds. The force is that along and across the plate together, signed
/// as its component toward the right-hand normal of the plate there; the moment is signed as that of a [`Strip`].
fn alone(plate: &Plate, stretches: &[Stretch], part: &Part, end: usize) -> Result<EndReaction, PlateError> {
    let pressure: Profile = profile(plate, stretches, [0.0, plate.length_m()])?;
    let held = plate.point_at(if end == 0 { part.from_m } else { part.to_m });
    let (mut along, mut force, mut moment) = (0.0, Vec2::zeros(), 0.0);
    let mut normal_at_weld = Vec2::zeros();
    let segments: Vec<_> = plate.segments().collect();
    for segment in &segments {
        let (from, to) = (along, along + segment.length());
        let tangent = segment.tangent_at(0.5);
        let normal = Vec2::new(tangent.y, -tangent.x);
        let at_weld = if end == 0 { part.from_m } else { part.to_m };
        if from <= at_weld && at_weld <= to && (end == 1 || normal_at_weld == Vec2::zeros()) {
            normal_at_weld = normal;
        }
        for piece in pressure.pieces(to.min(part.to_m)) {
            let (a, b) = (piece.from_m.max(from).max(part.from_m), piece.to_m);
            if a >= b {
                continue;
            }
            let slope = (piece.to_pa - piece.from_pa) / (piece.to_m - piece.from_m);
            let [n, m] = gauss(1, |t| {
                let x = a + t * (b - a);
                let pa = (piece.from_pa + slope * (x - piece.from_m)) * (b - a);
                [pa, pa * cross(segment.start + tangent * (x - from) - held, normal)]
            });
            force += normal * n;
            moment += m;
        }
        along = to;
    }
    let sign = if force.dot(&normal_at_weld) < 0.0 { -1.0 } else { 1.0 };
    let moment_n = if end == 0 { moment } else { -moment };
    Ok(EndReaction { force_n_per_m: sign * force.norm(), moment_n })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::section::{Attached, Panel};

    /// A plate 0.4 m long under 100 Pa all along, held at its first point; from its welds the reaction as it stands alone.
    fn check(points: &[(f64, f64)], force: f64, moment: f64) {
        let points: Vec<Point> = points.iter().map(|&(s, z)| Point::new(s, z)).collect();
        let wall = Attached::Outline { edge_idx: 0, is_mouth: false };
        let stretches = [Stretch { from_m: 0.0, to_m: 0.4, from_pa: 100.0, to_pa: 100.0 }];
        let width = WidthLaw::Constant { width_m: 1.0 };
        for end in [0, 1] {
            let mut points = points.clone();
            let mut ends = [wall, Attached::Free];
            if end == 1 {
                // Drawn the other way, its right-hand normal is the other one: pressure presses it back.
                points.reverse();
                ends.reverse();
            }
            let plate = Plate {
                name: String::new(),
                points: points.clone(),
                thickness_m: 0.005,
                corrosion_m: 0.0,
                material: String::new(),
                panel: Panel::default(),
                openings: vec![],
            };
            let found = welds(&plate, &Placed { points, ends }, &width, &stretches).unwrap();
            assert_eq!(found.len(), 1);
            assert_eq!((found[0].end, found[0].hinged, found[0].at), (end, None, Point::origin()));
            let alone = found[0].alone.unwrap();
            let near = (alone.force_n_per_m - force).abs() < 1e-12 && (alone.moment_n - moment).abs() < 1e-12;
            assert!(near, "end {end}: {alone:?}, expected {force} N/m, {moment} N");
        }
    }

    #[test]
    fn a_plate_that_stands_alone_is_a_cantilever_bends_included() {
        // p L, and p L^2 / 2 that stretches the face which the pressure presses.
        check(&[(0.0, 0.0), (0.0, 0.4)], 40.0, -8.0);
        // 0.2 up and 0.2 to the right: 20 N to the right at 0.1 high, and 20 N down at 0.1 to the right: sqrt 2 x 20 N,
        // and 2 + 2 N m.
        check(&[(0.0, 0.0), (0.0, 0.2), (0.2, 0.2)], 20.0 * 2.0_f64.sqrt(), -4.0);
    }
}
