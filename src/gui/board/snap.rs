//! Snapping: a dragged point goes to other vertices' s and z, to the grid, else to a round number; the end of a plate
//! goes onto walls. A bent edge goes straight, to a half circle, tangent to its neighbours, else to a round radius.
//!
//! Knows no gesture: it turns a wish into a place, with the reason in words.

use crate::geom::{Edge, Point, Vec2, cross};
use crate::gui::plating::Line;
use crate::units::{Measure, Quantity, UnitSystem};

use super::rulers;
use super::screen::{Screen, round_step};

/// How near a point must be to snap to another one's s or z, points.
const ALIGN_REACH: f64 = 6.0;

/// How near the end of a plate must be to a corner or a line to go there, points.
const STAND_REACH: f64 = 8.0;

/// What a point that shares another one's s, or z, is called.
const ALIGNED_WORDS: [&str; 2] = ["plumb with", "level with"];

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
        for (axis, found) in [(0, plumb), (1, level)] {
            if let Some(anchor) = found {
                out.at[axis] = anchor.at[axis];
                out.aligned_with.push(anchor.at);
                reasons.push(format!("{} {}", ALIGNED_WORDS[axis], anchor.name));
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

    /// A single coordinate that wants to be `v` (axis 0: s, axis 1: z), snapped as a point's is; and the point that it
    /// aligned with.
    pub fn coordinate(&self, axis: usize, v: f64) -> (f64, Option<Point>, String) {
        if !self.is_on {
            return (v, None, String::new());
        }
        match (self.aligned(axis, v), self.round(v)) {
            (Some(anchor), _) => {
                (anchor.at[axis], Some(anchor.at), format!("{} {}", ALIGNED_WORDS[axis], anchor.name))
            }
            (None, (value, true)) => (value, None, "on grid".to_owned()),
            (None, (value, false)) => (value, None, String::new()),
        }
    }

    /// A distance along a line that wants to be `v`: a round one.
    pub fn distance(&self, v: f64) -> (f64, String) {
        if !self.is_on {
            return (v, String::new());
        }
        let (value, is_on_grid) = self.round(v);
        (value, if is_on_grid { "at a round distance".to_owned() } else { String::new() })
    }

    /// Where the end of a plate goes that wants to be at `p`: to a corner, else onto a line, there in line with other
    /// corners or at a round place, else where any point goes. It does not go to the places `but`.
    pub fn onto(&self, p: Point, lines: &[Line], but: &[Point]) -> Snapped {
        let reach_m = STAND_REACH / self.screen.scale();
        let placed = |at, aligned_with, reason| Snapped { at, aligned_with, reason };
        if !self.is_on {
            return self.point(p);
        }
        let off = |a: &&Anchor| (a.at - p).norm();
        let corners = self.anchors.iter().filter(|a| off(a) <= reach_m && !but.contains(&a.at));
        if let Some(corner) = corners.min_by(|a, b| off(a).total_cmp(&off(b))) {
            return placed(corner.at, Vec::new(), format!("at {}", corner.name));
        }
        let near = lines.iter().map(|line| (line, line.edge.nearest(p)));
        let nearest = near.min_by(|a, b| a.1.1.total_cmp(&b.1.1)).filter(|(_, (_, off))| *off <= reach_m);
        let Some((line, (t, _))) = nearest else { return self.point(p) };
        // First along the axis along which the line runs.
        let tangent = line.edge.tangent_at(t);
        let axes = if tangent.x.abs() >= tangent.y.abs() { [0, 1] } else { [1, 0] };
        for axis in axes {
            if let Some(anchor) = self.aligned(axis, p[axis])
                && let Some(at) = place_on(&line.edge, axis, anchor.at[axis], p, 2.0 * reach_m)
                && !but.contains(&at)
            {
                let reason = format!("on {}, {} {}", line.name, ALIGNED_WORDS[axis], anchor.name);
                return placed(at, vec![anchor.at], reason);
            }
        }
        let (round, is_on_grid) = self.round(p[axes[0]]);
        let grid = if is_on_grid { ", on grid" } else { "" };
        match place_on(&line.edge, axes[0], round, p, 2.0 * reach_m) {
            Some(at) => placed(at, Vec::new(), format!("on {}{grid}", line.name)),
            None => placed(line.edge.point_at(t), Vec::new(), format!("on {}", line.name)),
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

/// The place on the edge with this coordinate, near `p`.
fn place_on(edge: &Edge, axis: usize, value: f64, p: Point, reach_m: f64) -> Option<Point> {
    let direction = if axis == 0 { Vec2::x() } else { Vec2::y() };
    let places = edge.crossings(direction, value).into_iter().map(|t| edge.point_at(t));
    let nearest = places.min_by(|a, b| (a - p).norm().total_cmp(&(b - p).norm()));
    let mut at = nearest.filter(|at| (at - p).norm() <= reach_m)?;
    at[axis] = value;
    Some(at)
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
    fn the_end_of_a_plate_goes_to_corners_and_onto_lines() {
        let screen = screen();
        let line = |edge, name: &str| Line { edge, name: name.to_owned() };
        let lines = [
            line(Edge::line(Point::new(-2.0, 0.0), Point::new(2.0, 0.0)), "floor"),
            line(Edge::line(Point::new(2.0, 0.0), Point::new(1.0, 2.0)), "right wall"),
            line(Edge::through(Point::new(1.0, 2.0), Point::new(0.0, 2.5), Point::new(-1.0, 2.0)), "roof"),
        ];
        let snap = snapper(&screen, true);
        for (wish, want, reason) in [
            ((0.144, 0.02), (0.14, 0.0), "on floor"),
            ((0.298, -0.03), (0.3, 0.0), "on floor, on grid"),
            ((0.54, 0.01), (0.523, 0.0), "on floor, plumb with vertex 3"),
            ((0.55, 1.78), (0.523, 1.76), "at vertex 3"),
            // A slanted wall: a round height on it, or level with another vertex.
            ((1.51, 0.948), (1.525, 0.95), "on right wall"),
            ((1.60, 0.84), (1.5765, 0.847), "on right wall, level with vertex 5"),
            // Too far from any line.
            ((0.344, 0.256), (0.34, 0.26), ""),
        ] {
            let got = snap.onto(Point::new(wish.0, wish.1), &lines, &[]);
            assert!(
                (got.at - Point::new(want.0, want.1)).norm() < 1e-12,
                "wish {wish:?}: {got:?}, expected {want:?}"
            );
            assert_eq!(got.reason, reason, "wish {wish:?}");
        }
        let on_roof = snap.onto(Point::new(0.201, 2.45), &lines, &[]);
        let off = lines[2].edge.nearest(on_roof.at).1;
        assert!(off < 1e-12 && on_roof.at.x == 0.2, "on the arc at a round s: {on_roof:?}, {off} m off");
        let taken = [Point::new(0.523, 1.76)];
        assert_ne!(snap.onto(Point::new(0.55, 1.78), &lines, &taken).at, taken[0], "its own other end");
        let free = Point::new(0.1101, 0.0202);
        assert_eq!(snapper(&screen, false).onto(free, &lines, &[]).at, free, "with Ctrl nothing snaps");
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
