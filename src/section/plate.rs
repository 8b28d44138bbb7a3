//! Plates: thin internal walls, and the openings along them.

use std::f64::consts::PI;

use crate::geom::{Edge, Point};

use super::WidthLaw;

/// A thin internal wall: an open chain of straight segments, in the kernel a slit of no width.
///
/// Each end stands on the outline, on an obstacle, on another plate, or is free. Which it is follows from where it
/// lies, see [`super::Attached`].
#[derive(Clone, Debug, PartialEq)]
pub struct Plate {
    /// As shown; may be empty.
    pub name: String,
    /// Its corners from end to end, metres; at least two.
    pub points: Vec<Point>,
    /// Thickness as built, m.
    pub thickness_m: f64,
    /// Part of the thickness that is given up to corrosion and never counts as strength, m.
    pub corrosion_m: f64,
    /// Name of its material; may be empty.
    pub material: String,
    /// How it is stiffened and held.
    pub panel: Panel,
    /// Its openings, in any order.
    pub openings: Vec<Opening>,
}

/// The panel of a plate that bending is checked for: between stiffeners that run along the plate in the section.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Panel {
    /// Clear distance of the stiffeners out of the plane, m; none: the plate spans the width of the tank.
    pub stiffener_spacing_m: Option<f64>,
    /// How its edges are held.
    pub edges: PanelEdges,
}

/// How the edges of a panel are held. An end of the plate that is free is a free edge whatever is said here.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum PanelEdges {
    /// They may turn.
    #[default]
    SimplySupported,
    /// They may not.
    Clamped,
}

/// An opening: an interval along a plate through which liquid and gas pass.
#[derive(Clone, Debug, PartialEq)]
pub struct Opening {
    /// As shown; may be empty.
    pub name: String,
    /// Where it begins, m along the plate from its first point.
    pub from_m: f64,
    /// Where it ends, m along the plate.
    pub to_m: f64,
    /// How much of it is open.
    pub shape: OpeningShape,
}

/// How much of an opening's interval is open.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum OpeningShape {
    /// A share of the width, above 0 and up to 1: a drain gap, a vent gap, a slot.
    Share(f64),
    /// Round holes side by side, as wide as the interval is long: limber holes, a manhole.
    Holes {
        /// How many.
        n: u32,
    },
    /// A perforated field.
    Perforated {
        /// Hole diameter, m.
        diameter_m: f64,
        /// Distance of hole centres, m.
        pitch_m: f64,
        /// Rows staggered (centres on equilateral triangles) rather than on squares.
        is_staggered: bool,
    },
}

impl Opening {
    /// Its length along the plate, m.
    pub fn length_m(&self) -> f64 {
        self.to_m - self.from_m
    }

    /// Open share of its interval where the tank is `width_m` wide: open area = share x length x width. May exceed
    /// one where holes do not fit; that is a fault.
    pub fn open_share(&self, width_m: f64) -> f64 {
        match self.shape {
            OpeningShape::Share(share) => share,
            OpeningShape::Holes { n } => f64::from(n) * PI / 4.0 * self.length_m() / width_m,
            OpeningShape::Perforated { diameter_m, pitch_m, is_staggered } => {
                let cell = pitch_m * pitch_m * if is_staggered { 0.75_f64.sqrt() } else { 1.0 };
                PI / 4.0 * diameter_m * diameter_m / cell
            }
        }
    }
}

/// A stretch of plate that rises by less than this share of its length lies level: its mean width is that in its middle,
/// to the square of this.
const LEVEL_WITHIN: f64 = 1e-6;

impl Plate {
    /// The name shown: its own, or `plate 2`.
    pub fn label(&self, idx: usize) -> String {
        if self.name.is_empty() { format!("plate {}", idx + 1) } else { self.name.clone() }
    }

    /// Its straight segments, from end to end.
    pub fn segments(&self) -> impl Iterator<Item = Edge> {
        self.points.windows(2).map(|w| Edge::line(w[0], w[1]))
    }

    /// Length from end to end, m.
    pub fn length_m(&self) -> f64 {
        self.segments().map(|e| e.length()).sum()
    }

    /// The point `along_m` from the first one, clamped to the ends.
    pub fn point_at(&self, along_m: f64) -> Point {
        let mut left = along_m;
        for e in self.segments() {
            let length = e.length();
            if left <= length {
                return e.point_at(if length > 0.0 { left / length } else { 0.0 });
            }
            left -= length;
        }
        self.points.last().copied().unwrap_or_else(Point::origin)
    }

    /// Area of a stretch along it, m2.
    fn area_m2(&self, width: &WidthLaw, from_m: f64, to_m: f64) -> f64 {
        let mut start_m = 0.0;
        let mut area_m2 = 0.0;
        for e in self.segments() {
            let length = e.length();
            let (from, to) = ((from_m - start_m).max(0.0), (to_m - start_m).min(length));
            start_m += length;
            if from >= to {
                continue;
            }
            let (low, high) = (e.point_at(from / length).y, e.point_at(to / length).y);
            // By the integral of the width law, unless the stretch lies level.
            let mean_m = if (high - low).abs() > LEVEL_WITHIN * (to - from) {
                (width.omega(high) - width.omega(low)) / (high - low)
            } else {
                width.width(0.5 * (low + high))
            };
            area_m2 += mean_m * (to - from);
        }
        area_m2
    }

    /// The share of its area that is solid, openings taken off.
    pub fn solid_share(&self, width: &WidthLaw) -> f64 {
        let open = |o: &Opening| {
            let area_m2 = self.area_m2(width, o.from_m, o.to_m);
            area_m2 * o.open_share(area_m2 / o.length_m())
        };
        1.0 - self.openings.iter().map(open).sum::<f64>() / self.area_m2(width, 0.0, self.length_m())
    }

    /// The openings from the first point on, with their indices.
    pub fn openings_in_order(&self) -> Vec<(usize, &Opening)> {
        let mut openings: Vec<(usize, &Opening)> = self.openings.iter().enumerate().collect();
        openings.sort_by(|a, b| a.1.from_m.total_cmp(&b.1.from_m));
        openings
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// A plate from (1, 0.2) up to (1, 1.2) and on to (1.5, 1.2), with openings.
    fn bent(openings: &[(f64, f64, OpeningShape)]) -> Plate {
        let opening =
            |&(from_m, to_m, shape): &(f64, f64, OpeningShape)| Opening { name: String::new(), from_m, to_m, shape };
        Plate {
            name: String::new(),
            points: vec![Point::new(1.0, 0.2), Point::new(1.0, 1.2), Point::new(1.5, 1.2)],
            thickness_m: 0.005,
            corrosion_m: 0.0,
            material: String::new(),
            panel: Panel::default(),
            openings: openings.iter().map(opening).collect(),
        }
    }

    #[test]
    fn the_solid_share_takes_openings_off_by_their_area() {
        // Worked out by hand. Constant width 2 m: area 3 m2. A width that grows from 1 m at z = 0 to 3 m at z = 2, 1 + z:
        // upright part 1.7 m2, level part 0.5 x 2.2 = 1.1 m2; a slot from 0.6 m up, 0.8 to 1.2 m in z, 0.4 x 2.0 m2, and
        // round the corner 0.1 m on, 0.1 x 2.2 m2. One hole 0.5 m wide has pi / 16 m2 whatever the width.
        let constant = WidthLaw::Constant { width_m: 2.0 };
        let growing = WidthLaw::Table(vec![(0.0, 1.0), (2.0, 3.0)]);
        let (half, hole) = (OpeningShape::Share(0.5), OpeningShape::Holes { n: 1 });
        for (width, openings, want) in [
            (&constant, vec![], 1.0),
            (&constant, vec![(0.0, 0.3, half)], 1.0 - 0.3 / 3.0),
            (&constant, vec![(0.0, 0.3, half), (0.4, 0.9, hole)], 1.0 - (0.3 + PI / 16.0) / 3.0),
            (&growing, vec![(0.6, 1.1, half)], 1.0 - 0.5 * (0.8 + 0.22) / 2.8),
            (&growing, vec![(0.2, 0.7, hole)], 1.0 - PI / 16.0 / 2.8),
        ] {
            let got = bent(&openings).solid_share(width);
            assert!((got - want).abs() < 1e-12, "{openings:?} in {width:?}: {got}, want {want}");
        }
    }
}
