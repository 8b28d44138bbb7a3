//! Snapping: a dragged point goes to other vertices' s and z, to the grid, else to a round number. A bent edge
//! goes straight, to a half circle, tangent to its neighbours, else to a round radius.
//!
//! Knows no gesture: it turns a wish into a place, with the reason in words.

use crate::geom::{Edge, Point, Vec2, cross};
use crate::units::{Measure, Quantity, UnitSystem};

use super::rulers;
use super::screen::{Screen, round_step};

/// How near a point must be to snap to another one's s or z, points.
const ALIGN_REACH: f64 = 6.0;

/// How near it must be to a line of the grid.
const GRID_REACH: f64 = 4.0;

/// Round numbers stand at least this far apart, points.
const ROUND_STEP: f64 = 1.5;

/// Largest sweep that the hand can bend, radians: a full turn has no ends.
const LARGEST_SWEEP: f64 = 6.1;

/// A point that others align with.
#[derive(Clone, Debug, PartialEq)]
pub struct Anchor {
    /// Where.
    pub at: Point,
    /// Its name: `vertex 3`.
    pub name: String,
}

/// Where a point snapped to, and why.
#[derive(Clone, Debug, PartialEq)]
pub struct Snapped {
    /// The place.
    pub at: Point,
    /// Points that it aligned with, for the hint lines.
    pub aligned_with: Vec<Point>,
    /// `plumb with vertex 3, on grid`; empty when nothing held it.
    pub reason: String,
}

/// What there is to snap to.
#[derive(Clone, Debug)]
pub struct Snapper<'a> {
    /// Sets what is near.
    pub screen: &'a Screen,
    /// Sets what is round.
    pub units: UnitSystem,
    /// Other points.
    pub anchors: Vec<Anchor>,
    /// Off while Ctrl is held.
    pub is_on: bool,
}

impl Snapper<'_> {
    /// Where a point that wants to be at `p` goes.
    pub fn point(&self, p: Point) -> Snapped {
        if !self.is_on {
            return Snapped { at: p, aligned_with: Vec::new(), reason: String::new() };
        }
        let (mut plumb, mut level) = (self.aligned(0, p.x), self.aligned(1, p.y));
        // On the very spot of another vertex there is no place for this one.
        if let (Some(a), Some(b)) = (plumb, level)
            && a.at == b.at
        {
            if (a.at.x - p.x).abs() <= (a.at.y - p.y).abs() { level = None } else { plumb = None }
        }
        let mut out = Snapped { at: p, aligned_with: Vec::new(), reason: String::new() };
        let mut reasons = Vec::new();
        let mut is_on_grid = false;
        for (axis, found, words) in [(0, plumb, "plumb with"), (1, level, "level with")] {
            if let Some(anchor) = found {
                out.at[axis] = anchor.at[axis];
                out.aligned_with.push(anchor.at);
                reasons.push(format!("{words} {}", anchor.name));
            } else {
                let (value, on_grid) = self.round(p[axis]);
                out.at[axis] = value;
                is_on_grid |= on_grid;
            }
        }
        if is_on_grid {
            reasons.push("on grid".to_owned());
        }
        out.reason = reasons.join(", ");
        out
    }

    /// A single height that wants to be at `z`, snapped as a point's z is.
    pub fn level(&self, z: f64) -> (f64, String) {
        if !self.is_on {
            return (z, String::new());
        }
        match (self.aligned(1, z), self.round(z)) {
            (Some(anchor), _) => (anchor.at.y, format!("level with {}", anchor.name)),
            (None, (value, true)) => (value, "on grid".to_owned()),
            (None, (value, false)) => (value, String::new()),
        }
    }

    /// The sweep of the edge from `start` to `end` whose middle wants to be at `wish`; `before` and `after` are its
    /// neighbours.
    pub fn sweep(&self, start: Point, end: Point, wish: Point, before: Edge, after: Edge) -> (f64, String) {
        let chord = end - start;
        let length = chord.norm();
        if length <= 0.0 {
            return (0.0, String::new());
        }
        let right = Vec2::new(chord.y, -chord.x) / length;
        let sagitta = right.dot(&(wish - (start + chord * 0.5)));
        let free = Edge::with_sagitta(start, end, sagitta).sweep.clamp(-LARGEST_SWEEP, LARGEST_SWEEP);
        if !self.is_on {
            return (free, String::new());
        }
        let turn = |a: Vec2, b: Vec2| cross(a, b).atan2(a.dot(&b));
        let along = chord / length;
        let half_turn = std::f64::consts::PI;
        let special = [
            (0.0, "straight"),
            (half_turn, "half circle"),
            (-half_turn, "half circle"),
            (2.0 * turn(before.tangent_at(1.0), along), "tangent to the edge before"),
            (2.0 * turn(along, after.tangent_at(0.0)), "tangent to the edge after"),
        ];
        let reach_m = ALIGN_REACH / self.screen.scale();
        let sagitta_of = |sweep: f64| Edge { start, end, sweep }.sagitta();
        let off = |sweep: f64| (sagitta_of(sweep) - sagitta).abs();
        let nearest = (special.into_iter())
            .filter(|(sweep, _)| sweep.abs() <= LARGEST_SWEEP && off(*sweep) <= reach_m)
            .min_by(|a, b| off(a.0).total_cmp(&off(b.0)));
        if let Some((sweep, reason)) = nearest {
            return (sweep, reason.to_owned());
        }
        let radius = Edge { start, end, sweep: free }.radius();
        let (step, _) = round_step(ROUND_STEP / self.screen.scale(), self.units);
        let round = (radius / step).round() * step;
        // Beyond a half circle the round radius has two arcs; this is the larger one.
        let minor = Edge::with_radius(start, end, round).map(|e| e.sweep);
        let rounded = minor.map(|s| if free.abs() > half_turn { s.signum() * 2.0 * half_turn - s } else { s });
        match rounded.filter(|s| off(*s) <= reach_m && s.signum() == free.signum()) {
            Some(sweep) => {
                let radius = Measure::new(Quantity::Length, round.abs()).text_to(self.units, 4);
                (sweep, format!("radius {radius}"))
            }
            None => (free, String::new()),
        }
    }

    /// The nearest anchor along an axis, if one is near.
    fn aligned(&self, axis: usize, v: f64) -> Option<&Anchor> {
        let reach_m = ALIGN_REACH / self.screen.scale();
        let off = |a: &&Anchor| (a.at[axis] - v).abs();
        self.anchors.iter().filter(|a| off(a) <= reach_m).min_by(|a, b| off(a).total_cmp(&off(b)))
    }

    /// The grid's line, where one is near, else a round number; and whether it is the grid's.
    fn round(&self, v: f64) -> (f64, bool) {
        let grid = rulers::grid_step_m(self.screen, self.units);
        let line = (v / grid).round() * grid;
        if (line - v).abs() <= GRID_REACH / self.screen.scale() {
            return (tidy(line), true);
        }
        let (step, _) = round_step(ROUND_STEP / self.screen.scale(), self.units);
        (tidy((v / step).round() * step), false)
    }
}

/// Without the dust that multiplying a step leaves behind: to a tenth of a micrometre.
pub fn tidy(v: f64) -> f64 {
    let tidied = (v * 1e7).round() / 1e7;
    if tidied.is_finite() { tidied + 0.0 } else { v }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::gui::Camera;

    fn screen() -> Screen {
        let rect = egui::Rect::from_min_size(egui::pos2(0.0, 0.0), egui::vec2(704.0, 398.0));
        // 10 mm are 1.72 points: the grid is 0.1 m, round numbers are 10 mm apart.
        Screen::new(rect, Camera { points_per_m: 172.0, center_m: [0.0, 1.0] })
    }

    fn snapper(screen: &Screen, is_on: bool) -> Snapper<'_> {
        let anchor = |s, z, name: &str| Anchor { at: Point::new(s, z), name: name.to_owned() };
        let anchors = vec![anchor(0.523, 1.76, "vertex 3"), anchor(-1.2, 0.847, "vertex 5")];
        Snapper { screen, units: UnitSystem::Si, anchors, is_on }
    }

    #[test]
    fn points_go_to_others_to_the_grid_or_to_a_round_number() {
        let screen = screen();
        for (wish, want, reason) in [
            ((0.54, 0.83), (0.523, 0.847), "plumb with vertex 3, level with vertex 5"),
            ((0.311, 0.212), (0.3, 0.2), "on grid"),
            ((0.344, 0.256), (0.34, 0.26), ""),
            ((0.344, 0.199), (0.34, 0.2), "on grid"),
            // Not onto the spot of vertex 3 itself.
            ((0.524, 1.75), (0.523, 1.75), "plumb with vertex 3"),
        ] {
            let got = snapper(&screen, true).point(Point::new(wish.0, wish.1));
            assert_eq!(got.at, Point::new(want.0, want.1), "wish {wish:?}: {}", got.reason);
            assert_eq!(got.reason, reason, "wish {wish:?}");
        }
        let free = Point::new(0.5401, 0.8302);
        assert_eq!(snapper(&screen, false).point(free).at, free, "with Ctrl nothing snaps");
    }

    #[test]
    fn a_bent_edge_finds_straight_half_circle_and_tangents() {
        let screen = screen();
        let (start, end) = (Point::new(0.0, 0.0), Point::new(1.0, 0.0));
        // Upright walls at both ends of the floor: tangent to them is a half circle; a slanted one before it.
        let before = Edge::line(Point::new(-0.3, 0.3), start);
        let after = Edge::line(end, Point::new(1.0, 1.0));
        let snap = snapper(&screen, true);
        let bend = |z: f64| snap.sweep(start, end, Point::new(0.5, z), before, after);
        assert_eq!(bend(0.02), (0.0, "straight".to_owned()));
        let (sweep, reason) = bend(-0.48);
        assert!((sweep - std::f64::consts::PI).abs() < 1e-12 && reason == "half circle", "{sweep} {reason}");
        // A wall that comes down at 45 degrees turns by 45 degrees at each end of a tangent arc: sweep 90 degrees.
        let (sweep, reason) = bend(-0.21);
        assert!((sweep - std::f64::consts::FRAC_PI_2).abs() < 1e-12, "{sweep} {reason}");
        assert_eq!(reason, "tangent to the edge before");
        let (sweep, reason) = bend(-0.30);
        let radius = Edge { start, end, sweep }.radius();
        assert!((radius / 0.01 - (radius / 0.01).round()).abs() < 1e-9, "round radius: {radius} {reason}");
        let (sweep, _) = bend(-0.9);
        assert!(sweep > std::f64::consts::PI, "beyond a half circle: {sweep}");
    }
}
