//! Gestures: what a drag on the board proposes, from the press to the release.
//!
//! The gesture is window state: it lives here between frames and never in the document.

use egui::{Modifiers, Pos2};

use crate::app::Edit;
use crate::cases::{Accel, AccelUnit};
use crate::geom::{Edge, Point, Vec2};
use crate::gui::Camera;
use crate::study::Fill;
use crate::units::{Measure, Quantity, fixed};

use super::anchors::snapper;
use super::bob::Dial;
use super::plate_drag::PlateHold;
use super::scene::Scene;
use super::snap::{Snapped, tidy};
use super::target::Target;
use super::words::{edge_name, form_words, place_words};

/// How near rest, or no sideways or upward part, the bob must be to snap to it, points.
const BOB_REACH: f32 = 4.0;

/// A drag under way.
#[derive(Clone, Debug)]
pub struct Drag {
    /// What is held.
    pub held: Held,
    /// Where the button went down.
    press: Pos2,
}

/// What a drag holds, as it was when it began.
#[derive(Clone, Debug)]
pub enum Held {
    /// The whole drawing.
    Board(Camera),
    /// A point, or all that moves with it.
    Place(Target, Point),
    /// An edge, moved with both its ends.
    Edge(usize, Point, Point),
    /// An edge, bent.
    Middle(usize, Point),
    /// A plate or a part of one.
    Plate(PlateHold),
    /// The still level, z in metres.
    StillLevel(f64),
    /// The bob.
    Bob {
        /// Its dial, kept while it is held.
        dial: Dial,
        /// Effective gravity.
        gravity: Vec2,
        /// Acceleration, m/s2.
        accel: Vec2,
    },
}

/// What a drag shows beside the pointer and in the status line.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Feedback {
    /// Beside the pointer.
    pub words: String,
    /// Why something snapped.
    pub reason: String,
    /// The section point that is held.
    pub at: Option<Point>,
    /// Points that it aligned with.
    pub aligned_with: Vec<Point>,
    /// A line that is being drawn.
    pub line: Option<[Point; 2]>,
}

impl Drag {
    /// Takes hold of `target`, or of the board.
    pub fn begin(scene: &Scene, target: Option<Target>, press: Pos2) -> Drag {
        let held = match target {
            Some(Target::Edge(i)) => {
                scene.edges.get(i).map(|e| Held::Edge(i, e.start, e.end)).filter(|_| scene.edges.len() > 2)
            }
            Some(Target::Middle(i)) => scene.edges.get(i).map(|e| Held::Middle(i, e.point_at(0.5))),
            Some(Target::StillLevel) => scene.model.still_z_m.map(Held::StillLevel),
            Some(Target::Bob) => {
                (scene.case()).map(|c| Held::Bob { dial: scene.dial, gravity: c.gravity.vec, accel: c.accel })
            }
            Some(other) => PlateHold::begin(scene, other)
                .map(Held::Plate)
                .or_else(|| other.anchor(scene).map(|p| Held::Place(other, p))),
            None => None,
        };
        Drag { held: held.unwrap_or(Held::Board(scene.screen.camera)), press }
    }

    /// Moves the drawing itself.
    pub fn pan(scene: &Scene, press: Pos2) -> Drag {
        Drag { held: Held::Board(scene.screen.camera), press }
    }

    /// The words for undo; none for a pan, which is not part of the document.
    pub fn label(&self, scene: &Scene) -> Option<String> {
        Some(match self.held {
            Held::Board(_) => return None,
            Held::Plate(ref hold) => hold.label(),
            Held::Place(Target::Vertex(i), _) => format!("Move vertex {}", i + 1),
            Held::Place(Target::ObstacleVertex(i, j), _) => {
                format!("Move vertex {} of obstacle {}", j + 1, i + 1)
            }
            Held::Place(Target::Obstacle(i), _) => format!("Move obstacle {}", i + 1),
            Held::Place(Target::Point(i), _) => format!("Move point {}", i + 1),
            Held::Place(Target::Compartment(i), _) => format!("Move the point of compartment {}", i + 1),
            Held::Place(Target::Sump, _) => "Move the sump".to_owned(),
            Held::Place(..) => "Move the moment point".to_owned(),
            Held::Edge(i, ..) => format!("Move {}", edge_name(scene, i)),
            Held::Middle(i, _) => format!("Bend {}", edge_name(scene, i)),
            Held::StillLevel(_) => "Set the fill".to_owned(),
            Held::Bob { .. } => format!("Set the acceleration of case {}", scene.case_idx + 1),
        })
    }

    /// The camera of a pan with the pointer at `pos`.
    pub fn camera(&self, scene: &Scene, pos: Pos2) -> Option<Camera> {
        match self.held {
            Held::Board(camera) => {
                let began = super::screen::Screen::new(scene.screen.rect, camera);
                Some(began.panned(pos - self.press))
            }
            _ => None,
        }
    }

    /// The edits that bring the study to where the pointer is, and what to show.
    pub fn edits(&self, scene: &Scene, pos: Pos2, keys: Modifiers) -> (Vec<Edit>, Feedback) {
        let screen = &scene.screen;
        let moved = screen.section_from_screen(pos) - screen.section_from_screen(self.press);
        match &self.held {
            Held::Board(_) => (Vec::new(), Feedback::default()),
            Held::Plate(hold) => hold.edits(scene, moved, keys),
            Held::Place(target, from) => place_edits(scene, *target, *from + moved, keys),
            Held::Edge(i, start, end) => {
                let snapped = snapper(scene, keys, Some(Target::Edge(*i))).point(start + moved);
                let shift = snapped.at - start;
                let other = Point::from((end + shift).coords.map(tidy));
                let next = (i + 1) % scene.edges.len().max(1);
                let edits = vec![Edit::MoveVertex(*i, snapped.at), Edit::MoveVertex(next, other)];
                (edits, placed(scene, snapped))
            }
            Held::Middle(i, from) => bend_edits(scene, *i, from + moved, keys),
            Held::StillLevel(from) => level_edits(scene, from + moved.y, keys),
            Held::Bob { dial, gravity, accel } => {
                let tip = dial.tip(*gravity) + (pos - self.press);
                bob_edits(scene, dial, dial.gravity_at(tip), *accel, keys)
            }
        }
    }
}

/// The edits that put `target` at `p`.
pub fn place_edits(scene: &Scene, target: Target, p: Point, keys: Modifiers) -> (Vec<Edit>, Feedback) {
    let snapped = snapper(scene, keys, Some(target)).point(p);
    let edits = move_to(scene, target, snapped.at);
    (edits, placed(scene, snapped))
}

/// The edits that move what `target` anchors to `to`, without snapping.
pub fn move_to(scene: &Scene, target: Target, to: Point) -> Vec<Edit> {
    let Some(now) = target.anchor(scene).filter(|_| to.coords.iter().all(|c| c.is_finite())) else {
        return Vec::new();
    };
    match target {
        Target::Vertex(i) => vec![Edit::MoveVertex(i, to)],
        Target::ObstacleVertex(i, j) => vec![Edit::MoveObstacleVertex(i, j, to)],
        Target::Obstacle(i) => vec![Edit::ShiftObstacle(i, to.x - now.x, to.y - now.y)],
        Target::MomentPoint => vec![Edit::MomentAbout(to)],
        Target::Point(i) => {
            let mut points = scene.study.points.clone();
            points[i].at = to;
            vec![Edit::Points(points)]
        }
        Target::Compartment(i) => {
            let mut compartments = scene.study.compartments.clone();
            compartments[i].at = to;
            vec![Edit::Compartments(compartments)]
        }
        Target::Sump => vec![Edit::Sump(Some(to))],
        Target::Plate(_) | Target::PlatePoint(..) | Target::Opening(..) | Target::OpeningEnd(..) => {
            PlateHold::begin(scene, target).map_or_else(Vec::new, |hold| hold.exact_edits(to - now))
        }
        Target::Bob | Target::Middle(_) | Target::Edge(_) | Target::StillLevel => Vec::new(),
    }
}

/// The edit that sets the still level to `z`, in the way in which the fill was given.
pub fn level_edit(scene: &Scene, z: f64) -> Option<Edit> {
    let (study, _) = scene.judged?;
    let still = study.tilted(Vec2::y());
    let (low, high) = still.span();
    let z = z.clamp(low, high);
    let fill = match scene.study.fill {
        Fill::Level(_) => Fill::Level(z),
        Fill::Ullage(_) => Fill::Ullage(tidy(high - z)),
        Fill::Volume(_) => Fill::Volume(still.volume_below(z)),
        Fill::Share(_) => Fill::Share((still.volume_below(z) / study.capacity_m3()).clamp(0.0, 1.0)),
    };
    z.is_finite().then_some(Edit::Fill(fill))
}

/// The edit that gives the case shown this acceleration, in the unit in which it was given.
pub fn accel_edit(scene: &Scene, accel: Vec2, keys: Modifiers) -> Option<Edit> {
    let case = scene.study.cases.get(scene.case_idx)?;
    let (Accel::Components { unit, .. } | Accel::Polar { unit, .. }) = case.accel;
    let (one, fine, coarse) = match unit {
        AccelUnit::MPerS2 => (1.0, 100.0, 10.0),
        AccelUnit::G => (scene.study.gravity_m_per_s2, 1000.0, 100.0),
    };
    let round = |a: f64| match (keys.alt, keys.ctrl) {
        (true, _) => (a / one * coarse).round() / coarse + 0.0,
        (false, false) => (a / one * fine).round() / fine + 0.0,
        (false, true) => a / one,
    };
    let (a_s, a_z) = (round(accel.x), round(accel.y));
    (a_s.is_finite() && a_z.is_finite())
        .then_some(Edit::CaseAccel(scene.case_idx, Accel::Components { a_s, a_z, unit }))
}

fn bend_edits(scene: &Scene, i: usize, wish: Point, keys: Modifiers) -> (Vec<Edit>, Feedback) {
    let (Some(edge), n) = (scene.edges.get(i).copied(), scene.edges.len()) else { return Default::default() };
    let (before, after) = (scene.edges[(i + n - 1) % n], scene.edges[(i + 1) % n]);
    let (sweep, reason) =
        snapper(scene, keys, Some(Target::Middle(i))).sweep(edge.start, edge.end, wish, before, after);
    let bent = Edge { sweep, ..edge };
    let words = form_words(&bent, scene.units);
    let feedback = Feedback { words, reason, at: Some(bent.point_at(0.5)), ..Default::default() };
    (vec![Edit::BendEdge(i, sweep)], feedback)
}

fn level_edits(scene: &Scene, z: f64, keys: Modifiers) -> (Vec<Edit>, Feedback) {
    let (z, _, reason) = snapper(scene, keys, Some(Target::StillLevel)).coordinate(1, z);
    let z = scene.judged.map_or(z, |(study, _)| {
        let (low, high) = study.tilted(Vec2::y()).span();
        z.clamp(low, high)
    });
    let level = Measure::new(Quantity::Length, z).text_to(scene.units, 4);
    let share = scene.judged.map(|(_, r)| Measure::new(Quantity::Share, r.still.share).text(scene.units));
    let words = format!("still {level}, {}", share.unwrap_or_default());
    (level_edit(scene, z).into_iter().collect(), Feedback { words, reason, ..Default::default() })
}

fn bob_edits(scene: &Scene, dial: &Dial, gravity: Vec2, began: Vec2, keys: Modifiers) -> (Vec<Edit>, Feedback) {
    let mut accel = scene.hanging.rest - gravity;
    let mut reason = String::new();
    let snaps = !keys.ctrl && !keys.alt;
    let is_near = |a: f64| (a as f32 * dial.scale).abs() <= BOB_REACH;
    if keys.shift {
        accel.y = began.y;
        reason = "a_z kept".to_owned();
    } else if snaps && is_near(accel.y) {
        accel.y = 0.0;
        reason = "no a_z".to_owned();
    }
    if snaps && is_near(accel.x) {
        accel.x = 0.0;
        reason = if accel.y == 0.0 { "at rest".to_owned() } else { "no a_s".to_owned() };
    }
    let Some(edit) = accel_edit(scene, accel, keys) else { return Default::default() };
    let Edit::CaseAccel(_, given) = &edit else { return Default::default() };
    let set = given.to_m_per_s2(scene.study.gravity_m_per_s2);
    let unit = Quantity::Acceleration.unit(scene.units);
    let [a_s, a_z] = [set.x, set.y].map(|a| fixed(unit.from_si(a), 2));
    let words = format!("a_s {a_s}  a_z {a_z} {}", unit.symbol);
    (vec![edit], Feedback { words, reason, ..Default::default() })
}

/// What a point shows that snapped.
pub fn placed(scene: &Scene, snapped: Snapped) -> Feedback {
    Feedback {
        words: place_words(snapped.at, scene),
        reason: snapped.reason,
        at: Some(snapped.at),
        aligned_with: snapped.aligned_with,
        line: None,
    }
}
