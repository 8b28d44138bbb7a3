//! The keyboard on the board: every handle can be reached with Tab, is spoken with its numbers, and moves with the
//! arrow keys. Plus and minus zoom, Home fits.

use egui::{EventFilter, Id, Key, Modifiers, Rect, Response, Role, Sense, Ui, WidgetInfo, vec2};

use crate::app::Edit;
use crate::geom::{Edge, Point, Vec2};
use crate::gui::{Proposal, View, marks};
use crate::units::{Quantity, UnitSystem};

use super::drag::{accel_edit, level_edit, move_to};
use super::plate_drag::PlateHold;
use super::scene::{Scene, looking_at};
use super::snap::tidy;
use super::target::Target;

/// The id of the handle of `target` on the board `canvas`.
pub fn focus_id(canvas: Id, target: Target) -> Id {
    canvas.with(target)
}

/// Makes every handle known, and obeys the keys of the one that has the keyboard. Gives the handle with the focus.
pub fn handles_ui(
    ui: &Ui,
    canvas: &Response,
    scene: &Scene,
    view: &mut View,
    out: &mut Vec<Proposal>,
) -> Option<(Target, Response)> {
    let mut focused = None;
    for target in Target::reachable(scene) {
        let Some(pos) = target.handle(scene) else { continue };
        let rect = Rect::from_center_size(pos, handle_size(target));
        let response = ui.interact(rect, focus_id(canvas.id, target), Sense::focusable_noninteractive());
        response.widget_info(|| WidgetInfo::labeled(Role::GraphicsObject, true, target.words(scene)));
        if response.gained_focus() {
            view.selected = target.selects();
            if !scene.screen.rect.contains(pos)
                && let Some(p) = target.anchor(scene)
            {
                view.camera = Some(looking_at(&scene.screen, p));
            }
        }
        if response.has_focus() {
            focused = Some((target, response));
        }
    }
    let has_focus = canvas.has_focus() || focused.is_some();
    if has_focus {
        let id = focused.as_ref().map_or(canvas.id, |(_, r)| r.id);
        let filter = EventFilter { horizontal_arrows: true, vertical_arrows: true, ..Default::default() };
        ui.memory_mut(|m| m.set_focus_lock_filter(id, filter));
        obey(ui, scene, focused.as_ref().map(|(t, _)| *t), view, out);
    }
    focused
}

/// The ring round the handle that has the keyboard.
pub fn paint_focus(ui: &Ui, scene: &Scene, target: Target, response: &Response, look: &crate::gui::Look) {
    if let Some(pos) = target.handle(scene) {
        let painter = ui.painter().with_clip_rect(scene.screen.rect);
        let rect = match target {
            Target::Bob => Rect::from_min_max(pos - vec2(9.0, 4.0), pos + vec2(9.0, 29.0)),
            _ => Rect::from_center_size(pos, vec2(10.0, 10.0)),
        };
        marks::paint_focus(&painter, rect, response, look);
    }
}

fn handle_size(target: Target) -> egui::Vec2 {
    match target {
        Target::Bob => vec2(20.0, 20.0),
        _ => vec2(12.0, 12.0),
    }
}

fn obey(ui: &Ui, scene: &Scene, focused: Option<Target>, view: &mut View, out: &mut Vec<Proposal>) {
    if ui.input(|i| i.pointer.any_down()) {
        return;
    }
    let mut arrow = Vec2::zeros();
    let coarse = ui.input(|i| i.modifiers.shift);
    for (key, direction) in [
        (Key::ArrowLeft, Vec2::new(-1.0, 0.0)),
        (Key::ArrowRight, Vec2::new(1.0, 0.0)),
        (Key::ArrowDown, Vec2::new(0.0, -1.0)),
        (Key::ArrowUp, Vec2::new(0.0, 1.0)),
    ] {
        let n = ui.input(|i| i.num_presses(key)) as f64;
        arrow += direction * n;
    }
    if arrow != Vec2::zeros() {
        match focused {
            // A plate may take others along: one press is one step.
            Some(target) => match PlateHold::begin(scene, target) {
                Some(hold) => {
                    out.push(Proposal::BeginGesture(hold.label()));
                    out.extend(nudge(scene, target, arrow, coarse).into_iter().map(Proposal::Edit));
                    out.push(Proposal::EndGesture);
                }
                None => out.extend(nudge(scene, target, arrow, coarse).into_iter().map(Proposal::Edit)),
            },
            None => {
                let step = vec2(-arrow.x as f32, arrow.y as f32) * if coarse { 120.0 } else { 30.0 };
                view.camera = Some(scene.screen.panned(step));
            }
        }
    }
    look_around(ui, scene, view);
    let removes = ui
        .input_mut(|i| i.consume_key(Modifiers::NONE, Key::Delete) || i.consume_key(Modifiers::NONE, Key::Backspace));
    if removes && let Some(edit) = view.selected.and_then(|s| s.removal(scene.study)) {
        out.push(Proposal::Edit(edit));
        view.selected = None;
    }
}

fn look_around(ui: &Ui, scene: &Scene, view: &mut View) {
    let zooms = [(Key::Plus, 1.25_f32), (Key::Equals, 1.25), (Key::Minus, 0.8)];
    for (key, factor) in zooms {
        if ui.input_mut(|i| i.consume_key(Modifiers::NONE, key)) {
            view.camera = Some(scene.screen.zoomed(factor, scene.screen.rect.center()));
        }
    }
    if ui.input_mut(|i| i.consume_key(Modifiers::NONE, Key::Home)) {
        view.camera = None;
    }
}

/// The edit that one press of an arrow key makes: 1 mm, 0.1 m/s2 or their like; ten times as much with Shift.
fn nudge(scene: &Scene, target: Target, arrow: Vec2, coarse: bool) -> Vec<Edit> {
    let times = if coarse { 10.0 } else { 1.0 };
    let step_m = times * if scene.units == UnitSystem::Si { 1e-3 } else { 0.05 * 0.0254 };
    match target {
        Target::Middle(i) | Target::Edge(i) => {
            scene.edges.get(i).map(|e| bent(i, e, arrow * step_m)).into_iter().collect()
        }
        Target::StillLevel => {
            let z = scene.model.still_z_m.map(|z| tidy(z + arrow.y * step_m));
            z.and_then(|z| level_edit(scene, z)).into_iter().collect()
        }
        Target::Bob => {
            // The tip moves along the arrow: effective gravity is minus the acceleration.
            let step = 0.1 * times * Quantity::Acceleration.unit(scene.units).in_si;
            let accel = scene.case().map(|c| c.accel - arrow * step);
            accel.and_then(|a| accel_edit(scene, a, Modifiers::NONE)).into_iter().collect()
        }
        _ => match target.anchor(scene) {
            Some(p) => move_to(scene, target, Point::from((p + arrow * step_m).coords.map(tidy))),
            None => Vec::new(),
        },
    }
}

fn bent(i: usize, edge: &Edge, by: Vec2) -> Edit {
    let chord = edge.chord();
    let right = Vec2::new(chord.y, -chord.x) / chord.norm().max(f64::MIN_POSITIVE);
    let along = right.dot(&by);
    // An arrow along the chord cannot bend it.
    let moved = if along.abs() > 0.3 * by.norm() { by.norm() * along.signum() } else { 0.0 };
    Edit::BendEdge(i, Edge::with_sagitta(edge.start, edge.end, edge.sagitta() + moved).sweep)
}
