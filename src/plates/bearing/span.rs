//! Spans: the straight parts of a plate between lines that hold it or at which it ends.

use crate::section::{Attached, Opening, OpeningShape, Placed, Plate, WidthLaw};

/// A straight part of a plate: the height of its panels.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Span {
    /// Where it starts, m along the plate.
    pub from_m: f64,
    /// Where it ends, m along the plate.
    pub to_m: f64,
    /// Whether it is held at its start and at its end: on a wall, on another plate or at a bend. Not on a rim.
    pub is_held: [bool; 2],
    /// Width of its panels: between stiffeners, or the largest width of the tank along it, m.
    pub width_m: f64,
    /// The largest share of that width that an opening in it takes.
    pub open_share: f64,
}

impl Span {
    /// Its length along the plate, m.
    pub fn length_m(&self) -> f64 {
        self.to_m - self.from_m
    }
}

/// An opening that takes more of a panel's width than this runs right across it: what is left beside it holds nothing.
const WIDE: f64 = 0.5;

/// Bends by less than this hold nothing: sine of ten degrees, an own choice.
const LEAST_BEND: f64 = 0.17;

/// A part of a plate that no opening cuts, with its ends: whether each stands on something that holds it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Part {
    pub from_m: f64,
    pub to_m: f64,
    pub is_held: [bool; 2],
}

/// A plate as it is cut: its openings with the shares that they take, and where it bends.
pub(super) struct Layout<'a> {
    plate: &'a Plate,
    width: &'a WidthLaw,
    length_m: f64,
    stands: [bool; 2],
    openings: Vec<(&'a Opening, f64)>,
    bends: Vec<f64>,
}

impl<'a> Layout<'a> {
    pub fn new(plate: &'a Plate, placed: &Placed, width: &'a WidthLaw) -> Layout<'a> {
        let stands = placed.ends.map(|e| !matches!(e, Attached::Free | Attached::Outline { is_mouth: true, .. }));
        let (length_m, bends) = (plate.length_m(), bends(plate));
        let mut layout = Layout { plate, width, length_m, stands, openings: Vec::new(), bends };
        let share = |o: &Opening| {
            let tank_m = layout.tank_width_m(o.from_m.max(0.0), o.to_m.min(length_m));
            open_share(o, tank_m, layout.panel_width_m(tank_m))
        };
        layout.openings = plate.openings.iter().map(|o| (o, share(o))).collect();
        layout
    }

    /// The parts that its openings leave, in one way or in two: where an opening cuts only some of its panels, the
    /// whole ones first.
    pub fn parts(&self) -> Vec<Vec<Part>> {
        let wide = || self.openings.iter().filter(|o| o.1 > WIDE).map(|o| o.0);
        let full = wide().filter(|o| matches!(o.shape, OpeningShape::Share(share) if share >= 1.0));
        let (full, wide): (Vec<&Opening>, Vec<&Opening>) = (full.collect(), wide().collect());
        let mut ways = vec![self.uncut(&full)];
        if wide.len() > full.len() {
            ways.push(self.uncut(&wide));
        }
        ways
    }

    /// Where a part bends, m along the plate.
    pub fn bends_in(&self, part: &Part) -> impl Iterator<Item = f64> {
        self.bends.iter().copied().filter(move |&b| part.from_m < b && b < part.to_m)
    }

    /// The largest share that an opening which does not cut takes between two places.
    pub fn open_share(&self, from_m: f64, to_m: f64) -> f64 {
        let within = |o: &&(&Opening, f64)| o.0.from_m < to_m && o.0.to_m > from_m && o.1 <= WIDE;
        self.openings.iter().filter(within).map(|o| o.1).fold(0.0, f64::max)
    }

    /// The largest width of the tank along a stretch of the plate.
    fn tank_width_m(&self, from_m: f64, to_m: f64) -> f64 {
        let corners = self.plate.segments().scan(0.0, |along, segment| {
            *along += segment.length();
            Some((*along, segment.end.y))
        });
        let inner = corners.filter(|c| from_m < c.0 && c.0 < to_m).map(|c| c.1);
        let ends = [from_m, to_m].map(|along| self.plate.point_at(along).y);
        let (low, high) =
            inner.chain(ends).fold((f64::INFINITY, f64::NEG_INFINITY), |acc, z| (acc.0.min(z), acc.1.max(z)));
        self.width.widest(low, high)
    }

    fn panel_width_m(&self, tank_m: f64) -> f64 {
        self.plate.panel.stiffener_spacing_m.map_or(tank_m, |spacing| spacing.min(tank_m))
    }

    fn uncut(&self, cuts: &[&Opening]) -> Vec<Part> {
        let slack = SLACK * self.length_m;
        let mut cuts: Vec<[f64; 2]> = cuts.iter().map(|o| [o.from_m, o.to_m]).collect();
        cuts.sort_by(|a, b| a[0].total_cmp(&b[0]));
        cuts.push([self.length_m, self.length_m]);
        let mut parts = Vec::new();
        let (mut from_m, mut holds_start) = (0.0, self.stands[0]);
        for [cut_from, cut_to] in cuts {
            if cut_from > from_m + slack {
                let is_last = cut_from >= self.length_m - slack;
                parts.push(Part {
                    from_m,
                    to_m: cut_from,
                    is_held: [holds_start, is_last && cut_to <= cut_from && self.stands[1]],
                });
            }
            (from_m, holds_start) = (cut_to, false);
        }
        parts
    }
}

/// The spans of a plate.
///
/// An opening that takes half of the panel's width or less weakens its span; one that takes more runs right across, and
/// the plate ends at it. Where such an opening lies in some of the panels only, those without it are spans too.
pub fn spans(plate: &Plate, placed: &Placed, width: &WidthLaw) -> Vec<Span> {
    let layout = Layout::new(plate, placed, width);
    let mut spans: Vec<Span> = Vec::new();
    for part in layout.parts().into_iter().flatten() {
        let mut start = (part.from_m, part.is_held[0]);
        let bends = layout.bends_in(&part).map(|b| (b, true));
        for end in bends.chain([(part.to_m, part.is_held[1])]) {
            let span = Span {
                from_m: start.0,
                to_m: end.0,
                is_held: [start.1, end.1],
                width_m: layout.panel_width_m(layout.tank_width_m(start.0, end.0)),
                open_share: layout.open_share(start.0, end.0),
            };
            start = end;
            if span.length_m() > SLACK * layout.length_m && !spans.contains(&span) {
                spans.push(span);
            }
        }
    }
    spans
}

/// Lengths below this share of the plate's are rounding.
const SLACK: f64 = 1e-6;

/// The share of a panel's width that an opening takes. Slots are taken as spread evenly over the panels, round holes as
/// many to a panel as fall to it, at least one; of a perforated field what a row of holes takes.
fn open_share(opening: &Opening, tank_m: f64, panel_m: f64) -> f64 {
    match opening.shape {
        OpeningShape::Share(share) => share,
        OpeningShape::Holes { n } => (opening.length_m() / panel_m).max(f64::from(n) * opening.length_m() / tank_m),
        OpeningShape::Perforated { diameter_m, pitch_m, .. } => diameter_m / pitch_m,
    }
}

/// Where a plate bends enough to be held by it, m along it.
fn bends(plate: &Plate) -> Vec<f64> {
    let segments: Vec<_> = plate.segments().collect();
    let mut along = 0.0;
    let mut bends = Vec::new();
    for pair in segments.windows(2) {
        along += pair[0].length();
        let (a, b) = (pair[0].tangent_at(0.5), pair[1].tangent_at(0.5));
        if crate::geom::cross(a, b).abs() > LEAST_BEND {
            bends.push(along);
        }
    }
    bends
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::geom::Point;
    use crate::section::Panel;

    const WIDTH: WidthLaw = WidthLaw::Constant { width_m: 2.0 };

    fn check(openings: &[(f64, f64, OpeningShape)], spacing: Option<f64>, want: &[Span]) {
        let opening = |&(from_m, to_m, shape): &_| Opening { name: String::new(), from_m, to_m, shape };
        let plate = Plate {
            name: String::new(),
            points: vec![Point::origin(), Point::new(0.0, 1.0)],
            thickness_m: 0.005,
            corrosion_m: 0.0,
            material: String::new(),
            panel: Panel { stiffener_spacing_m: spacing, ..Panel::default() },
            openings: openings.iter().map(opening).collect(),
        };
        let wall = |is_mouth| Attached::Outline { edge_idx: 0, is_mouth };
        let placed = Placed { points: plate.points.clone(), ends: [wall(false), wall(false)] };
        assert_eq!(spans(&plate, &placed, &WIDTH), want, "{openings:?}");
        let on_rim = Placed { ends: [wall(false), wall(true)], ..placed };
        let is_held = spans(&plate, &on_rim, &WIDTH).iter().any(|s| s.to_m == 1.0 && s.is_held[1]);
        assert!(!is_held, "a rim holds nothing");
    }

    fn span(from_m: f64, to_m: f64, is_held: [bool; 2], width_m: f64, open_share: f64) -> Span {
        Span { from_m, to_m, is_held, width_m, open_share }
    }

    #[test]
    fn openings_weaken_or_cut() {
        let whole = span(0.0, 1.0, [true, true], 2.0, 0.0);
        check(&[], None, &[whole]);
        // Two holes of 0.25 take 0.5 of 2 m; of panels 0.625 m wide, one falls to each, and takes 0.25.
        let holes = OpeningShape::Holes { n: 2 };
        check(&[(0.5, 0.75, holes)], None, &[Span { open_share: 0.25, ..whole }]);
        check(&[(0.5, 0.75, holes)], Some(0.625), &[Span { open_share: 0.4, width_m: 0.625, ..whole }]);
        // A gap right across at the foot, and one in the middle.
        let gap = OpeningShape::Share(1.0);
        let [upper, lower] = [span(0.6, 1.0, [false, true], 2.0, 0.0), span(0.1, 0.5, [false, false], 2.0, 0.0)];
        check(&[(0.0, 0.1, gap), (0.5, 0.6, gap)], None, &[lower, upper]);
        // A hole that takes 0.8 of the panels that it is in: whole panels and cut ones.
        let narrow = |from, to, is_held| span(from, to, is_held, 0.25, 0.0);
        let cut = [narrow(0.0, 0.4, [true, false]), narrow(0.6, 1.0, [false, true])];
        let hole = (0.4, 0.6, OpeningShape::Holes { n: 1 });
        check(&[hole], Some(0.25), &[narrow(0.0, 1.0, [true, true]), cut[0], cut[1]]);
    }

    #[test]
    fn bends_hold_and_points_on_the_way_do_not() {
        let points = [(0.0, 0.0), (0.0, 0.3), (0.0, 0.5), (0.4, 0.8)].map(|(s, z)| Point::new(s, z));
        let plate = Plate {
            name: String::new(),
            points: points.to_vec(),
            thickness_m: 0.005,
            corrosion_m: 0.0,
            material: String::new(),
            panel: Panel::default(),
            openings: vec![],
        };
        let placed = Placed { points: plate.points.clone(), ends: [Attached::Plate(1), Attached::Free] };
        let want = [span(0.0, 0.5, [true, true], 2.0, 0.0), span(0.5, 1.0, [true, false], 2.0, 0.0)];
        assert_eq!(spans(&plate, &placed, &WIDTH), want);
    }
}
