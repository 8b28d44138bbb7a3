//! Plates put in place: on what their ends stand, and every fault of theirs.

use std::f64::consts::FRAC_PI_4;

use crate::geom::{Edge, Path, Point, Vec2, cross};
use crate::problem::{Place, Problem};

use super::cut::{Base, Cut, Face, Slit, Wall};
use super::meet::meetings;
use super::{OpeningShape, Plate, Section};

/// On what an end of a plate stands.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Attached {
    /// On nothing.
    Free,
    /// On an edge of the outline.
    Outline {
        /// Which edge.
        edge_idx: usize,
        /// Whether that is open to air: the plate ends on a rim line.
        is_mouth: bool,
    },
    /// On an obstacle.
    Obstacle(usize),
    /// On another plate.
    Plate(usize),
}

/// A plate in place: its ends moved exactly onto what they stand on.
#[derive(Clone, Debug, PartialEq)]
pub struct Placed {
    /// Its corners from end to end.
    pub points: Vec<Point>,
    /// On what the first and the last point stand.
    pub ends: [Attached; 2],
}

impl Placed {
    /// Whether it stands or hangs rather than lies: from end to end it goes at least as far along z as along s.
    pub fn is_upright(&self) -> bool {
        let across = self.points[self.points.len() - 1] - self.points[0];
        across.y.abs() >= across.x.abs()
    }
}

/// An end of a plate within this share of the section's diagonal of a wall stands on it: what is lost when coordinates
/// are typed to a tenth of a millimetre, and less than any gap that is left on purpose.
pub const STANDS_WITHIN: f64 = 1e-4;

/// The region's walls and plates, on the way to being cut.
pub(super) struct Layout<'a> {
    section: &'a Section,
    base: Vec<Base>,
    /// Length below which things are one.
    slack: f64,
    stands: f64,
}

impl<'a> Layout<'a> {
    pub fn new(section: &'a Section, faces: &[Face], diagonal_m: f64) -> Layout<'a> {
        let base = faces.iter().map(|f| Base { edge: f.edge, wall: f.wall, stops: Vec::new() }).collect();
        Layout { section, base, slack: 1e-9 * diagonal_m, stands: STANDS_WITHIN * diagonal_m }
    }

    /// Every plate in place, or every fault.
    pub fn place(&self) -> Result<Vec<Placed>, Vec<Problem>> {
        let mut faults = Vec::new();
        for (i, plate) in self.section.plates.iter().enumerate() {
            self.check_alone(i, plate, &mut faults);
        }
        if !faults.is_empty() {
            return Err(faults);
        }
        let unmoved = |plate: &Plate| Placed { points: plate.points.clone(), ends: [Attached::Free; 2] };
        let mut placed: Vec<Placed> = self.section.plates.iter().map(unmoved).collect();
        for this in &mut placed {
            let last = this.points.len() - 1;
            for (end, idx) in [0, last].into_iter().enumerate() {
                (this.ends[end], this.points[idx]) = self.on_wall(this.points[idx]);
            }
        }
        // Once more for as long as an end moves: another may stand on it.
        for _ in 0..=placed.len() {
            let before = placed.clone();
            for i in 0..placed.len() {
                let last = placed[i].points.len() - 1;
                for (end, idx) in [0, last].into_iter().enumerate() {
                    if matches!(placed[i].ends[end], Attached::Free | Attached::Plate(_)) {
                        let typed = self.section.plates[i].points[idx];
                        (placed[i].ends[end], placed[i].points[idx]) = self.on_plate(i, typed, &placed);
                    }
                }
            }
            if placed == before {
                break;
            }
        }
        for i in 0..placed.len() {
            self.check_place(i, &placed, &mut faults);
        }
        if faults.is_empty() { Ok(placed) } else { Err(faults) }
    }

    /// What is wrong with a plate by itself.
    fn check_alone(&self, plate_idx: usize, plate: &Plate, faults: &mut Vec<Problem>) {
        let whole = Place::Plate { plate_idx, opening_idx: None };
        let mut fault = |place: &Place, message: String, hint: &str| {
            faults.push(Problem::fault(place.clone(), message, hint));
        };
        if plate.points.len() < 2 {
            return fault(&whole, "has fewer than two corners".to_owned(), "give both of its ends");
        }
        if !plate.points.iter().all(|p| p.x.is_finite() && p.y.is_finite()) {
            return fault(&whole, "a coordinate is not finite".to_owned(), "type the corners of this plate again");
        }
        if !(plate.thickness_m.is_finite() && plate.thickness_m > 0.0) {
            fault(&whole, format!("its thickness is {} m", plate.thickness_m), "give a thickness above zero");
        }
        if !(plate.corrosion_m.is_finite() && plate.corrosion_m >= 0.0) {
            let message = format!("its corrosion allowance is {} m", plate.corrosion_m);
            fault(&whole, message, "give an allowance of zero or more");
        }
        if let Some(spacing) = plate.panel.stiffener_spacing_m
            && !(spacing.is_finite() && spacing > 0.0)
        {
            let message = format!("its stiffeners stand {spacing} m apart");
            fault(&whole, message, "give a distance above zero, or leave it out");
        }
        let segments: Vec<Edge> = plate.segments().collect();
        if let Some(e) = segments.iter().find(|e| e.length() <= self.slack) {
            let message = format!("has no length at s {:.4} m, z {:.4} m", e.start.x, e.start.y);
            return fault(&whole, message, "move one of its corners, or delete the plate");
        }
        for (i, e) in segments.iter().enumerate() {
            for (j, other) in segments.iter().enumerate().skip(i + 1) {
                let joint = e.end;
                let shared = |p: &Point| j == i + 1 && (p - joint).norm() <= self.slack;
                let folds = j == i + 1 && turns_back(e, other);
                if folds || meetings(e, other, self.slack).iter().any(|p| !shared(p)) {
                    let message = "crosses or touches itself".to_owned();
                    return fault(&whole, message, "move a corner so that the plate meets itself nowhere");
                }
            }
        }
        let length = plate.length_m();
        for (opening_idx, o) in plate.openings.iter().enumerate() {
            let place = Place::Plate { plate_idx, opening_idx: Some(opening_idx) };
            if !(o.from_m.is_finite() && o.to_m.is_finite() && o.to_m - o.from_m > self.slack) {
                let message = format!("goes from {} m to {} m", o.from_m, o.to_m);
                fault(&place, message, "let it end further along the plate than it begins");
                continue;
            }
            if o.to_m - o.from_m <= self.stands {
                let message = format!("is shorter than {:.2e} m, within which places are one", self.stands);
                fault(&place, message, "make it longer, or delete it");
                continue;
            }
            if o.from_m < -self.stands || o.to_m > length + self.stands {
                let message = format!(
                    "from {:.4} m to {:.4} m runs off the plate, which is {length:.4} m long",
                    o.from_m, o.to_m
                );
                fault(&place, message, "keep it within the plate");
            }
            let share = o.open_share(self.width_at(plate.point_at(0.5 * (o.from_m + o.to_m))));
            let is_sane = share.is_finite() && share > 0.0 && share <= 1.0 + 1e-9;
            let fits = match o.shape {
                OpeningShape::Share(_) => true,
                OpeningShape::Holes { .. } => share <= FRAC_PI_4 * (1.0 + 1e-9),
                OpeningShape::Perforated { diameter_m, pitch_m, .. } => 0.0 < diameter_m && diameter_m < pitch_m,
            };
            if !(is_sane && fits) {
                let hint = match o.shape {
                    OpeningShape::Share(_) => "give a share above 0 % and up to 100 %",
                    OpeningShape::Holes { .. } => "give at least one hole, and no more than fit side by side",
                    OpeningShape::Perforated { .. } => "give a hole diameter above zero and a pitch larger than it",
                };
                let message = format!("{} % of it would be open", number(share * 100.0));
                fault(&place, if is_sane { "its holes do not fit".to_owned() } else { message }, hint);
            }
            for (other_idx, other) in plate.openings.iter().enumerate().take(opening_idx) {
                if o.from_m < other.to_m - self.slack && other.from_m < o.to_m - self.slack {
                    let message = format!("overlaps opening {}", other_idx + 1);
                    fault(&place, message, "move them apart, or make one opening of them");
                }
            }
        }
    }

    fn width_at(&self, p: Point) -> f64 {
        self.section.width.width(p.y)
    }

    /// On what wall the end `p` of a plate stands, if any, and the exact point there.
    fn on_wall(&self, p: Point) -> (Attached, Point) {
        let near = self.base.iter().map(|b| (b, b.edge.nearest(p)));
        let near = near.filter(|(_, (_, d))| *d <= self.stands).min_by(|a, b| a.1.1.total_cmp(&b.1.1));
        let Some((base, (t, _))) = near else { return (Attached::Free, p) };
        let corner = [base.edge.start, base.edge.end].into_iter().find(|q| (p - q).norm() <= self.stands);
        let at = corner.unwrap_or_else(|| base.edge.point_at(t));
        match base.wall {
            Wall::Outline { edge_idx, is_mouth } => (Attached::Outline { edge_idx, is_mouth }, at),
            Wall::Obstacle { obstacle_idx, .. } => (Attached::Obstacle(obstacle_idx), at),
            _ => (Attached::Free, at),
        }
    }

    /// The same for other plates. What was typed at a corner of theirs goes where that corner goes.
    fn on_plate(&self, plate_idx: usize, p: Point, placed: &[Placed]) -> (Attached, Point) {
        for (other_idx, other) in placed.iter().enumerate().filter(|(i, _)| *i != plate_idx) {
            let typed = &self.section.plates[other_idx].points;
            if let Some(corner) = typed.iter().position(|q| (p - q).norm() <= self.stands) {
                return (Attached::Plate(other_idx), other.points[corner]);
            }
            let near = segments(other).map(|e| (e, e.nearest(p))).min_by(|a, b| a.1.1.total_cmp(&b.1.1));
            if let Some((e, (t, d))) = near
                && d <= self.stands
            {
                return (Attached::Plate(other_idx), e.point_at(t));
            }
        }
        (Attached::Free, p)
    }

    /// What is wrong with a plate among walls and other plates.
    fn check_place(&self, plate_idx: usize, all: &[Placed], faults: &mut Vec<Problem>) {
        let place = Place::Plate { plate_idx, opening_idx: None };
        let this = &all[plate_idx];
        let (first, last) = (this.points[0], this.points[this.points.len() - 1]);
        let stands_at = |p: &Point| {
            let near = |q: Point, end: usize| this.ends[end] != Attached::Free && (p - q).norm() <= self.stands;
            near(first, 0) || near(last, 1)
        };
        let outline = Path::new(self.section.edges());
        for e in segments(this) {
            let middle = e.point_at(0.5);
            if let Some(wall) = self.base.iter().find(|b| b.edge.nearest(middle).1 <= self.stands) {
                let message = format!("lies along {}", wall.wall.place());
                return faults.push(Problem::fault(place, message, "move it off the wall, or delete it"));
            }
            let crossed = self.base.iter().find(|b| meetings(&e, &b.edge, self.slack).iter().any(|p| !stands_at(p)));
            let is_inside = |p: Point| {
                let is_in = |edges: Vec<Edge>| Path::new(edges).contains(p);
                outline.contains(p) && !self.section.obstacles.iter().any(|o| is_in(o.edges()))
            };
            if let Some(wall) = crossed {
                let message = format!("meets {} between its ends", wall.wall.place());
                return faults.push(Problem::fault(place, message, "let it end on the wall, or stay clear of it"));
            }
            if !is_inside(middle) {
                return faults.push(Problem::fault(place, "leaves the tank", "move it inside, or delete it"));
            }
        }
        for (other_idx, other) in all.iter().enumerate().take(plate_idx) {
            let joins = |p: &Point| {
                let at_end = |a: &Placed, b_idx: usize| {
                    let ends = [a.points[0], a.points[a.points.len() - 1]];
                    (0..2).any(|k| a.ends[k] == Attached::Plate(b_idx) && (p - ends[k]).norm() <= self.stands)
                };
                // Two ends on one point of a wall, or end to end.
                let both = |a: &Placed| {
                    let ends = [a.points[0], a.points[a.points.len() - 1]];
                    (0..2).any(|k| a.ends[k] != Attached::Free && (p - ends[k]).norm() <= self.stands)
                };
                at_end(this, other_idx) || at_end(other, plate_idx) || (both(this) && both(other))
            };
            for a in segments(this) {
                for b in segments(other) {
                    let meets = meetings(&a, &b, self.slack);
                    let covers =
                        b.nearest(a.point_at(0.5)).1 <= self.stands || a.nearest(b.point_at(0.5)).1 <= self.slack;
                    let lies_along = covers && cross(a.tangent_at(0.5), b.tangent_at(0.5)).abs() < 1e-6;
                    if lies_along || meets.iter().any(|p| !joins(p)) {
                        let word = if lies_along { "lies along" } else { "crosses" };
                        let message = format!("{word} plate {}", other_idx + 1);
                        let hint = "move them apart, or let one end on the other";
                        return faults.push(Problem::fault(place, message, hint));
                    }
                }
            }
        }
    }

    /// The region cut with openings open, with openings shut, and into cells.
    pub fn cut(self, placed: &[Placed]) -> [Cut; 3] {
        let mut base = self.base;
        let mut slits: Vec<Slit> = Vec::new();
        for (plate_idx, (plate, placed)) in self.section.plates.iter().zip(placed).enumerate() {
            let mut slit = Slit { plate_idx: Some(plate_idx), nodes: nodes(&placed.points), openings: Vec::new() };
            for o in &plate.openings {
                let span = [o.from_m, o.to_m];
                for along in span {
                    slit.stop_at(along, plate.point_at(along), self.stands);
                }
                slit.openings.push(span);
            }
            slits.push(slit);
        }
        for (i, this) in placed.iter().enumerate() {
            for (end, p) in [this.points[0], this.points[this.points.len() - 1]].into_iter().enumerate() {
                match this.ends[end] {
                    Attached::Outline { .. } | Attached::Obstacle(_) => stop_base(&mut base, p, self.slack),
                    Attached::Plate(other) => stop_slit(&mut slits[other], p, self.slack),
                    Attached::Free => {}
                }
                let _ = i;
            }
        }
        let faces = |base: &[Base], slits: &[Slit], is_open: bool| {
            let mut out = Vec::new();
            base.iter().for_each(|b| b.faces(&mut out));
            slits.iter().for_each(|s| s.faces(is_open, &mut out));
            Cut::new(out)
        };
        let open = faces(&base, &slits, true);
        let shut = faces(&base, &slits, false);
        let n_plates = slits.len();
        for i in 0..n_plates {
            let points: Vec<Point> = slits[i].nodes.iter().map(|n| n.1).collect();
            let (a, b) = (points[0], points[points.len() - 1]);
            if !placed[i].is_upright() {
                continue;
            }
            let tips = [(a, a - points[1], 0), (b, b - points[points.len() - 2], 1)];
            for (tip, away, end) in tips {
                if placed[i].ends[end] == Attached::Free {
                    carry_on(tip, away, &mut base, &mut slits, self.slack);
                }
            }
        }
        let cells = faces(&base, &slits, false);
        [open, shut, cells]
    }
}

/// Carries a plate on from its tip to the next wall.
fn carry_on(tip: Point, away: Vec2, base: &mut [Base], slits: &mut Vec<Slit>, slack: f64) {
    let reach: f64 = base.iter().map(|b| (b.edge.start - tip).norm()).fold(0.0, f64::max);
    let ray = Edge::line(tip, tip + away * (2.0 * reach / away.norm()));
    let walls = base.iter().map(|b| b.edge);
    let plates = slits.iter().flat_map(|s| s.nodes.windows(2).map(|w| Edge::line(w[0].1, w[1].1)));
    let hits = walls.chain(plates).flat_map(|e| meetings(&ray, &e, slack));
    let ahead = hits.filter(|p| (p - tip).norm() > slack.max(1e-6 * reach));
    let Some(hit) = ahead.min_by(|a, b| (a - tip).norm().total_cmp(&(b - tip).norm())) else { return };
    let mut hit = hit;
    // A hit beside a corner is the corner.
    let corners = base.iter().map(|b| b.edge.start).chain(slits.iter().flat_map(|s| s.nodes.iter().map(|n| n.1)));
    if let Some(corner) = corners.into_iter().find(|c| (c - hit).norm() <= 10.0 * slack) {
        hit = corner;
    }
    for b in base.iter_mut().filter(|b| b.edge.nearest(hit).1 <= 2.0 * slack) {
        b.stop_at(hit, slack);
    }
    for s in slits.iter_mut() {
        if s.nodes.windows(2).any(|w| Edge::line(w[0].1, w[1].1).nearest(hit).1 <= 2.0 * slack) {
            stop_slit(s, hit, slack);
        }
    }
    slits.push(Slit { plate_idx: None, nodes: nodes(&[tip, hit]), openings: Vec::new() });
}

fn stop_base(base: &mut [Base], p: Point, slack: f64) {
    for b in base.iter_mut().filter(|b| b.edge.nearest(p).1 <= slack) {
        b.stop_at(p, slack);
    }
}

fn stop_slit(slit: &mut Slit, p: Point, slack: f64) {
    let stretches = slit.nodes.windows(2).map(|w| (w[0].0, Edge::line(w[0].1, w[1].1)));
    let near = stretches.map(|(from, e)| (from + e.nearest(p).0 * e.length(), e.nearest(p).1));
    if let Some((along, _)) = near.min_by(|a, b| a.1.total_cmp(&b.1)) {
        slit.stop_at(along, p, slack);
    }
}

fn nodes(points: &[Point]) -> Vec<(f64, Point)> {
    let mut along = 0.0;
    let mut out = vec![(0.0, points[0])];
    for w in points.windows(2) {
        along += (w[1] - w[0]).norm();
        out.push((along, w[1]));
    }
    out
}

fn segments(placed: &Placed) -> impl Iterator<Item = Edge> {
    placed.points.windows(2).map(|w| Edge::line(w[0], w[1]))
}

/// Whether `b` goes back along `a`.
fn turns_back(a: &Edge, b: &Edge) -> bool {
    let (p, q) = (a.tangent_at(0.5), b.tangent_at(0.5));
    cross(p, q).abs() < 1e-9 && p.dot(&q) < 0.0
}

fn number(x: f64) -> String {
    if x.is_finite() { format!("{x:.1}") } else { "not a number".to_owned() }
}
