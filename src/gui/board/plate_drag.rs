//! A plate in the hand: the whole of it, one corner, an opening, or one end of an opening.
//!
//! Everything is worked out from the section as it was when the hand took hold, so that nothing is lost on the way.

use egui::Modifiers;

use crate::app::{Edit, shifted_along_walls};
use crate::geom::{Point, Vec2};
use crate::gui::plating::{self, Stands};
use crate::section::{Plate, Section};
use crate::units::{Measure, Quantity};

use super::anchors::{lines, snapper};
use super::drag::{Feedback, placed};
use super::scene::Scene;
use super::snap::{Snapped, tidy};
use super::target::{OpeningEnd, Target};

/// Shortest opening that the hand can make, m.
const LEAST_OPENING_M: f64 = 0.001;

/// What is held, and the section as it was.
#[derive(Clone, Debug)]
pub struct PlateHold {
    target: Target,
    plate_idx: usize,
    section: Box<Section>,
    from: Point,
}

impl PlateHold {
    /// Takes hold of a plate or a part of one; none for anything else.
    pub fn begin(scene: &Scene, target: Target) -> Option<PlateHold> {
        let plate_idx = target.selects()?.plate()?;
        let from = target.anchor(scene)?;
        let section = &scene.study.section;
        section.plates.get(plate_idx).filter(|plate| plate.points.len() > 1)?;
        Some(PlateHold { target, plate_idx, section: Box::new(section.clone()), from })
    }

    /// What is held.
    pub fn target(&self) -> Target {
        self.target
    }

    /// The words for undo.
    pub fn label(&self) -> String {
        let plate = self.plate_idx + 1;
        match self.target {
            Target::PlatePoint(_, k) => format!("Move corner {} of plate {plate}", k + 1),
            Target::Opening(_, o) => format!("Move opening {} of plate {plate}", o + 1),
            Target::OpeningEnd(_, o, _) => format!("Change opening {} of plate {plate}", o + 1),
            _ => format!("Move plate {plate}"),
        }
    }

    /// The edits for a hand that has moved by `moved`, snapped.
    pub fn edits(&self, scene: &Scene, moved: Vec2, keys: Modifiers) -> (Vec<Edit>, Feedback) {
        match self.target {
            Target::PlatePoint(_, k) => self.corner_edits(scene, k, self.from + moved, keys),
            Target::Opening(_, o) => self.opening_edits(scene, o, None, self.from + moved, keys),
            Target::OpeningEnd(_, o, end) => self.opening_edits(scene, o, Some(end), self.from + moved, keys),
            _ => self.whole_edits(scene, moved, keys),
        }
    }

    /// The edits that move what is held by `moved`, without snapping.
    pub fn exact_edits(&self, moved: Vec2) -> Vec<Edit> {
        let plate = self.plate();
        match self.target {
            Target::PlatePoint(_, k) => self.corner_to(k, Point::from((self.from + moved).coords.map(tidy))),
            Target::Opening(_, o) | Target::OpeningEnd(_, o, _) => {
                let to = plating::along(plate, self.from + moved * self.reach(moved));
                let by_m = tidy(to - plating::along(plate, self.from));
                let end = if let Target::OpeningEnd(.., end) = self.target { Some(end) } else { None };
                self.opening_by(o, end, by_m)
            }
            _ => {
                let next = shifted_along_walls(&self.section, self.plate_idx, self.across(moved));
                next.map_or_else(Vec::new, |next| self.becomes(next))
            }
        }
    }

    /// A whole plate that stands on something moves across itself only.
    fn across(&self, mut by: Vec2) -> Vec2 {
        if let Some(axis) = self.axis() {
            by[1 - axis] = 0.0;
        }
        by
    }

    /// The axis along which such a plate moves; none for a free one.
    fn axis(&self) -> Option<usize> {
        let stands = Stands::of(&self.section, self.plate_idx);
        let points = &self.plate().points;
        let reach = points[points.len() - 1] - points[0];
        (stands.first || stands.last).then_some(if reach.x.abs() <= reach.y.abs() { 0 } else { 1 })
    }

    fn plate(&self) -> &Plate {
        &self.section.plates[self.plate_idx]
    }

    /// How much an arrow key's step must be stretched so that it goes the whole step along a slanted plate.
    fn reach(&self, moved: Vec2) -> f64 {
        let plate = self.plate();
        let before = plating::along(plate, self.from);
        let after = plating::along(plate, self.from + moved);
        let share = (after - before).abs() / moved.norm().max(f64::MIN_POSITIVE);
        if share > 0.3 { 1.0 / share } else { 0.0 }
    }

    fn whole_edits(&self, scene: &Scene, moved: Vec2, keys: Modifiers) -> (Vec<Edit>, Feedback) {
        let plate = self.plate();
        let last = plate.points.len() - 1;
        let stands = Stands::of(&self.section, self.plate_idx);
        let snapper = snapper(scene, keys, Some(self.target));
        let end = if stands.last && !stands.first { last } else { 0 };
        let lead = plate.points[end];
        let (by, mut snapped) = if let Some(axis) = self.axis() {
            let (value, aligned, reason) = snapper.coordinate(axis, lead[axis] + moved[axis]);
            let mut by = Vec2::zeros();
            by[axis] = value - lead[axis];
            (by, Snapped { at: lead, aligned_with: aligned.into_iter().collect(), reason })
        } else {
            let snapped = snapper.point(lead + moved);
            (snapped.at - lead, snapped)
        };
        let Some(next) = shifted_along_walls(&self.section, self.plate_idx, by) else { return Default::default() };
        snapped.at = next.points[end];
        (self.becomes(next), placed(scene, snapped))
    }

    fn corner_edits(&self, scene: &Scene, k: usize, wish: Point, keys: Modifiers) -> (Vec<Edit>, Feedback) {
        let points = &self.plate().points;
        let snapper = snapper(scene, keys, Some(self.target));
        let is_end = k == 0 || k + 1 == points.len();
        let snapped = if is_end {
            let others: Vec<Point> = points.iter().enumerate().filter(|(i, _)| *i != k).map(|(_, p)| *p).collect();
            snapper.onto(wish, &lines(scene, Some(self.plate_idx)), &others)
        } else {
            snapper.point(wish)
        };
        (self.corner_to(k, snapped.at), placed(scene, snapped))
    }

    fn corner_to(&self, k: usize, to: Point) -> Vec<Edit> {
        self.becomes(plating::with_point(self.plate(), k, to))
    }

    fn opening_edits(
        &self,
        scene: &Scene,
        o: usize,
        end: Option<OpeningEnd>,
        wish: Point,
        keys: Modifiers,
    ) -> (Vec<Edit>, Feedback) {
        let plate = self.plate();
        let Some(opening) = plate.openings.get(o) else { return Default::default() };
        let by_m = plating::along(plate, wish) - plating::along(plate, self.from);
        let held_m = if end == Some(OpeningEnd::To) { opening.to_m } else { opening.from_m };
        let (wish_m, reason) = snapper(scene, keys, Some(self.target)).distance(held_m + by_m);
        let edits = self.opening_by(o, end, wish_m - held_m);
        let Some(Edit::Plate(_, next)) = edits.first() else { return (edits, Feedback::default()) };
        let now = &next.openings[o];
        let length = |m: f64| Measure::new(Quantity::Length, m).text_to(scene.units, 4);
        let words = format!("{} to {}, {} open", length(now.from_m), length(now.to_m), length(now.length_m()));
        let (low_m, high_m) = plating::room(plate, o);
        let reason = match () {
            _ if now.from_m <= 0.0 || now.to_m >= plate.length_m() => "at the end of the plate".to_owned(),
            _ if now.from_m <= low_m || now.to_m >= high_m => "at the next opening".to_owned(),
            _ => reason,
        };
        let at = match end {
            Some(OpeningEnd::From) => next.point_at(now.from_m),
            Some(OpeningEnd::To) => next.point_at(now.to_m),
            None => next.point_at(0.5 * (now.from_m + now.to_m)),
        };
        (edits, Feedback { words, reason, at: Some(at), ..Default::default() })
    }

    /// An opening, or one end of it, moved along the plate as far as its neighbours and the ends of the plate let it.
    fn opening_by(&self, o: usize, end: Option<OpeningEnd>, by_m: f64) -> Vec<Edit> {
        let mut next = self.plate().clone();
        let (low_m, high_m) = plating::room(&next, o);
        let Some(opening) = next.openings.get_mut(o) else { return Vec::new() };
        let (from_m, to_m) = (opening.from_m, opening.to_m);
        let clamped = |v: f64, low: f64, high: f64| v.min(high).max(low);
        match end {
            Some(OpeningEnd::From) => opening.from_m = clamped(from_m + by_m, low_m, to_m - LEAST_OPENING_M),
            Some(OpeningEnd::To) => opening.to_m = clamped(to_m + by_m, from_m + LEAST_OPENING_M, high_m),
            None => {
                let by_m = clamped(by_m, low_m - from_m, high_m - to_m);
                (opening.from_m, opening.to_m) = (from_m + by_m, to_m + by_m);
            }
        }
        vec![Edit::Plate(self.plate_idx, Box::new(next))]
    }

    /// The plate as it becomes, and with it those that stand on it.
    fn becomes(&self, next: Plate) -> Vec<Edit> {
        let others = plating::joined(&self.section, self.plate_idx, &next);
        let all = std::iter::once((self.plate_idx, next)).chain(others);
        all.map(|(i, plate)| Edit::Plate(i, Box::new(plate))).collect()
    }
}
