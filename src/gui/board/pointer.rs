//! The pointer on the board: zoom, pan, choose, drag, double click. Everything it changes in the document goes out
//! as proposals.

use egui::{CursorIcon, Id, Key, Modifiers, PointerButton, Pos2, Response, Ui};

use crate::analysis;
use crate::app::Edit;
use crate::geom::Point;
use crate::gui::{Proposal, Stage, View, plating};

use super::anchors::grid_snapper;
use super::bob::Dial;
use super::drag::{Drag, Feedback, Held};
use super::keys::focus_id;
use super::pen;
use super::scene::Scene;
use super::target::Target;
use super::words::place_words;

/// What the pointer does in this frame.
#[derive(Clone, Debug, Default)]
pub struct Pointing {
    /// Where it is, when it is over the drawing or drags something.
    pub pos: Option<Pos2>,
    /// What it would take hold of, or holds.
    pub target: Option<Target>,
    /// Whether it holds it.
    pub is_dragging: bool,
    /// What the drag says.
    pub feedback: Feedback,
}

/// The dial of a bob that is being dragged: its scale must not change under the hand.
pub fn held_dial(ui: &Ui, id: Id) -> Option<Dial> {
    match ui.data(|d| d.get_temp::<Drag>(id))?.held {
        Held::Bob { dial, .. } => Some(dial),
        _ => None,
    }
}

/// Zoom by wheel or pinch, before the scene is laid out.
pub fn zoom(ui: &Ui, canvas: &Response, scene: &Scene, view: &mut View) -> bool {
    let Some(pos) = canvas.hover_pos().filter(|p| scene.screen.rect.contains(*p)) else { return false };
    let factor = ui.input(|i| i.zoom_delta() * (i.smooth_scroll_delta().y * 0.0025).exp());
    if factor == 1.0 || !factor.is_finite() {
        return false;
    }
    view.camera = Some(scene.screen.zoomed(factor, pos));
    true
}

/// Clicks and drags.
pub fn point(ui: &Ui, canvas: &Response, scene: &Scene, view: &mut View, out: &mut Vec<Proposal>) -> Pointing {
    let keys = ui.input(|i| i.modifiers);
    let drag = ui.data(|d| d.get_temp::<Drag>(canvas.id));
    if drag.is_none()
        && let Some(pen) = view.pen
        && let Some(pointing) = pen::draw(ui, canvas, scene, pen, view, out)
    {
        return pointing;
    }
    let drag = match drag {
        Some(drag) => go_on(ui, canvas, scene, drag, out),
        None => begin(ui, canvas, scene, view, out),
    };
    let pos = ui.input(|i| i.pointer.latest_pos());
    if let (Some(drag), Some(pos)) = (&drag, pos) {
        if let Some(camera) = drag.camera(scene, pos) {
            view.camera = Some(camera);
            ui.set_cursor_icon(CursorIcon::Grabbing);
        }
        let (edits, feedback) = drag.edits(scene, pos, keys);
        out.extend(edits.into_iter().map(Proposal::Edit));
        view.status = status(&feedback.words, &feedback.reason);
        let target = held_target(drag);
        return Pointing { pos: Some(pos), target, is_dragging: target.is_some(), feedback };
    }
    hover(ui, canvas, scene, view, keys, out)
}

/// Takes hold of what was pressed.
fn begin(ui: &Ui, canvas: &Response, scene: &Scene, view: &mut View, out: &mut Vec<Proposal>) -> Option<Drag> {
    let pans = ui.input(|i| i.key_down(Key::Space)) || canvas.drag_started_by(PointerButton::Middle);
    if !(canvas.drag_started_by(PointerButton::Primary) || canvas.drag_started_by(PointerButton::Middle)) {
        return None;
    }
    let press = ui.input(|i| i.pointer.press_origin()).filter(|p| scene.screen.rect.contains(*p))?;
    let target = Target::under(scene, press, view.selected).filter(|_| !pans);
    let drag = if pans { Drag::pan(scene, press) } else { Drag::begin(scene, target, press) };
    if let Some(target) = target {
        choose(ui, canvas, view, Some(target));
        // What is held must not be scaled under the hand.
        view.camera = Some(scene.screen.camera);
    }
    out.extend(drag.label(scene).map(Proposal::BeginGesture));
    ui.data_mut(|d| d.insert_temp(canvas.id, drag.clone()));
    Some(drag)
}

/// Ends the drag, calls it off, or hands it back.
fn go_on(ui: &Ui, canvas: &Response, scene: &Scene, drag: Drag, out: &mut Vec<Proposal>) -> Option<Drag> {
    let is_called_off = ui.input(|i| i.key_pressed(Key::Escape));
    // An undo in the middle of a drag ends it: what follows must not become steps of its own.
    let is_undone = ui.input(|i| i.modifiers.command && (i.key_down(Key::Z) || i.key_down(Key::Y)));
    let is_over = is_called_off || is_undone || !canvas.dragged();
    if !is_over {
        return Some(drag);
    }
    ui.data_mut(|d| d.remove::<Drag>(canvas.id));
    if drag.label(scene).is_some() {
        out.push(if is_called_off { Proposal::CancelGesture } else { Proposal::EndGesture });
    }
    None
}

fn hover(
    ui: &Ui,
    canvas: &Response,
    scene: &Scene,
    view: &mut View,
    keys: Modifiers,
    out: &mut Vec<Proposal>,
) -> Pointing {
    let pos = canvas.hover_pos().filter(|p| scene.screen.rect.contains(*p));
    let was_here = ui.data(|d| d.get_temp::<bool>(canvas.id)).unwrap_or_default();
    ui.data_mut(|d| d.insert_temp(canvas.id, pos.is_some()));
    let Some(pos) = pos else {
        if was_here {
            view.status.clear();
        }
        return Pointing::default();
    };
    let target = Target::under(scene, pos, view.selected);
    let p = scene.screen.section_from_screen(pos);
    if ui.input(|i| i.key_down(Key::Space)) {
        ui.set_cursor_icon(CursorIcon::Grab);
    } else if let Some(target) = target {
        ui.set_cursor_icon(match target {
            Target::StillLevel => CursorIcon::ResizeVertical,
            Target::Edge(_) | Target::Plate(_) => CursorIcon::PointingHand,
            _ => CursorIcon::Grab,
        });
    }
    let what = match target {
        Some(
            Target::Vertex(_)
            | Target::ObstacleVertex(..)
            | Target::PlatePoint(..)
            | Target::Compartment(_)
            | Target::Sump
            | Target::Point(_)
            | Target::MomentPoint,
        )
        | None => target.map(|t| t.words(scene).split(", s ").next().unwrap_or_default().to_lowercase()),
        Some(t) => Some(t.words(scene)),
    };
    let stage = scene.case().map(|case| view.stage_of(case)).unwrap_or_default();
    let on = what.map(|w| format!("on {w}")).unwrap_or_default();
    view.status = status(&status(&place_words(p, scene), &pressure_words(p, scene, stage)), &on);
    if canvas.double_clicked() {
        match target {
            Some(Target::Edge(i) | Target::Middle(i)) => out.push(Proposal::Edit(split(scene, i, pos, keys))),
            Some(Target::Plate(i)) => out.extend(split_plate(scene, i, pos, keys).map(Proposal::Edit)),
            _ => {}
        }
    } else if canvas.clicked() {
        choose(ui, canvas, view, target);
    }
    Pointing { pos: Some(pos), target, is_dragging: false, feedback: Feedback::default() }
}

/// Splits an edge where the pointer is, at a round place where there is one.
pub fn split(scene: &Scene, edge_idx: usize, pos: Pos2, keys: Modifiers) -> Edit {
    let wish = grid_snapper(scene, keys).point(scene.screen.section_from_screen(pos)).at;
    let edge = scene.edges[edge_idx];
    Edit::SplitEdge(edge_idx, edge.point_at(edge.nearest(wish).0))
}

/// Adds a corner to a plate where the pointer is, at a round place where there is one.
pub fn split_plate(scene: &Scene, plate_idx: usize, pos: Pos2, keys: Modifiers) -> Option<Edit> {
    let wish = grid_snapper(scene, keys).point(scene.screen.section_from_screen(pos)).at;
    let (plate, _) = plating::with_corner(scene.study.section.plates.get(plate_idx)?, wish)?;
    Some(Edit::Plate(plate_idx, Box::new(plate)))
}

fn choose(ui: &Ui, canvas: &Response, view: &mut View, target: Option<Target>) {
    view.selected = target.and_then(Target::selects);
    let id = target.map_or(canvas.id, |t| focus_id(canvas.id, t.handle_target()));
    ui.memory_mut(|m| m.request_focus(id));
}

fn held_target(drag: &Drag) -> Option<Target> {
    match drag.held {
        Held::Board(_) => None,
        Held::Place(target, _) => Some(target),
        Held::Edge(i, ..) => Some(Target::Edge(i)),
        Held::Middle(i, _) => Some(Target::Middle(i)),
        Held::Plate(ref hold) => Some(hold.target()),
        Held::StillLevel(_) => Some(Target::StillLevel),
        Held::Bob { .. } => Some(Target::Bob),
    }
}

/// Gage pressure under the pointer, where there is liquid.
fn pressure_words(p: Point, scene: &Scene, stage: Stage) -> String {
    let Stage::Under(bound) = stage else { return String::new() };
    let pressure = scene
        .judged
        .and_then(|(study, results)| analysis::gage_pressure_at(study, results.cases.get(scene.case_idx)?, bound, p));
    pressure.map_or_else(String::new, |p| p.text(scene.units))
}

/// Words and the reason after them; either may be empty.
pub fn status(words: &str, reason: &str) -> String {
    [words, reason].into_iter().filter(|w| !w.is_empty()).collect::<Vec<_>>().join("   ")
}
