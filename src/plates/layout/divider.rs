//! Dividers: upright plates, those in one plane taken together, and how much of the tank's cross-section they cover.

use crate::geom::{Edge, Point, Sublevel, Vec2};
use crate::section::{Placed, Plate, Region, STANDS_WITHIN, Section, Wall, WidthLaw};

/// Upright plates in one plane across the tank.
#[derive(Clone, Debug, PartialEq)]
pub struct Divider {
    /// Its plates.
    pub plate_idxs: Vec<usize>,
    /// The middle of its first plate.
    pub at: Point,
    /// Its solid area as seen along s, openings taken off, m2.
    pub solid_m2: f64,
    /// Area of the tank's cross-section there, obstacles taken off, m2.
    pub cross_section_m2: f64,
}

impl Divider {
    /// The share of the cross-section that it covers.
    pub fn coverage(&self) -> f64 {
        self.solid_m2 / self.cross_section_m2
    }

    /// The share of the cross-section that it leaves open: its openings, and what its free ends leave.
    pub fn open_share(&self) -> f64 {
        1.0 - self.coverage()
    }
}

/// Every divider, from left to right.
///
/// The cross-section is the integral of the width law along the upright line through the plate's middle, from wall to
/// wall; where the section has a step at that very place, its part on the left. Of a slanted plate the area seen
/// along s counts. In closed form by the integral of the width law.
pub fn dividers(section: &Section, region: &Region) -> Vec<Divider> {
    let slack = STANDS_WITHIN * region.diagonal_m();
    let outline: Vec<Edge> = walls(region, |wall| matches!(wall, Wall::Outline { .. }));
    let (outline, whole) = (Sublevel::new(&outline, Vec2::x()), Sublevel::new(region.geometry(), Vec2::x()));
    let mut dividers: Vec<Divider> = Vec::new();
    let mut reaches: Vec<(f64, f64)> = Vec::new();
    for (plate_idx, placed) in region.plates().iter().enumerate().filter(|(_, p)| p.is_upright()) {
        let at = middle(placed);
        let solid_m2 = solid_m2(&section.plates[plate_idx], placed, &section.width);
        let is_here = |&(low, high): &(f64, f64)| low - slack <= at.y && at.y <= high + slack;
        let same = (0..dividers.len()).find(|&i| (dividers[i].at.x - at.x).abs() <= slack && is_here(&reaches[i]));
        if let Some(i) = same {
            dividers[i].plate_idxs.push(plate_idx);
            dividers[i].solid_m2 += solid_m2;
            continue;
        }
        let heights = |line: &Sublevel| -> Vec<(f64, f64)> {
            line.chords(at.x).iter().map(|(a, b)| (a.y.min(b.y), a.y.max(b.y))).collect()
        };
        let Some(reach) = heights(&outline).into_iter().find(is_here) else { continue };
        let clear = heights(&whole).into_iter().filter(|h| reach.0 - slack <= h.0 && h.1 <= reach.1 + slack);
        let omega = |z: f64| section.width.omega(z);
        let cross_section_m2 = clear.map(|(low, high)| omega(high) - omega(low)).sum();
        dividers.push(Divider { plate_idxs: vec![plate_idx], at, solid_m2, cross_section_m2 });
        reaches.push(reach);
    }
    dividers.sort_by(|a, b| a.at.x.total_cmp(&b.at.x));
    dividers
}

/// The middle between the ends of a plate.
pub(super) fn middle(placed: &Placed) -> Point {
    nalgebra::center(&placed.points[0], &placed.points[placed.points.len() - 1])
}

/// The walls of a region, plates left out, of one kind.
pub(super) fn walls(region: &Region, is_wanted: fn(&Wall) -> bool) -> Vec<Edge> {
    region.faces().iter().filter(|f| is_wanted(&f.wall)).map(|f| f.edge).collect()
}

/// Solid area of an upright plate seen along s.
fn solid_m2(plate: &Plate, placed: &Placed, width: &WidthLaw) -> f64 {
    let seen = |from: Point, to: Point| (width.omega(to.y) - width.omega(from.y)).abs();
    let open: f64 = plate
        .openings
        .iter()
        .map(|opening| {
            let (from, to) = (plate.point_at(opening.from_m), plate.point_at(opening.to_m));
            let (area, height) = (seen(from, to), (to.y - from.y).abs());
            // Its mean width, so that round holes keep their exact area.
            if height > 0.0 { area * opening.open_share(area / height) } else { 0.0 }
        })
        .sum();
    seen(placed.points[0], placed.points[placed.points.len() - 1]) - open
}
