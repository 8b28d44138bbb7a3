//! The pen that draws a plate: press, drag and let go, or click where it begins and where it ends.
//!
//! Nothing is in the document before the end: until then the plate is a line under the hand.

use egui::{CursorIcon, Key, Modifiers, Painter, PointerButton, Response, Ui, vec2};

use crate::app::Edit;
use crate::geom::Point;
use crate::gui::{Look, Pen, Proposal, Selected, View, font, plating};
use crate::units::{Measure, Quantity};

use super::anchors::{beginning, lines, snapper};
use super::drag::Feedback;
use super::pointer::{Pointing, status};
use super::scene::Scene;
use super::snap::Snapped;
use super::words::place_words;

/// Shortest plate that the pen draws, points: anything shorter is a click.
const LEAST_LENGTH: f64 = 8.0;

/// What the pen does in this frame; none while the drawing is moved under it, or it is put away.
pub fn draw(
    ui: &Ui,
    canvas: &Response,
    scene: &Scene,
    pen: Pen,
    view: &mut View,
    out: &mut Vec<Proposal>,
) -> Option<Pointing> {
    let keys = ui.input(|i| i.modifiers);
    if ui.input(|i| i.key_pressed(Key::Escape)) {
        view.pen = None;
        return None;
    }
    if ui.input(|i| i.key_down(Key::Space)) || canvas.drag_started_by(PointerButton::Middle) {
        return None;
    }
    let mut from = pen.from;
    if from.is_none() && canvas.drag_started_by(PointerButton::Primary) {
        let press = ui.input(|i| i.pointer.press_origin()).filter(|p| scene.screen.rect.contains(*p))?;
        from = Some(snapped(scene, keys, scene.screen.section_from_screen(press), None).at);
        view.pen = Some(Pen { from });
    }
    let is_ended = canvas.drag_stopped_by(PointerButton::Primary) || canvas.clicked();
    let is_over = is_ended || canvas.dragged() || canvas.hovered();
    let pos = ui.input(|i| i.pointer.latest_pos()).filter(|_| is_over)?;
    let snapped = snapped(scene, keys, scene.screen.section_from_screen(pos), from);
    ui.set_cursor_icon(CursorIcon::Crosshair);
    let to = snapped.at;
    let length_m = from.map_or(0.0, |from| (to - from).norm());
    if is_ended {
        match from.filter(|_| length_m * scene.screen.scale() >= LEAST_LENGTH) {
            Some(from) => {
                view.pen = None;
                view.selected = Some(Selected::Plate(scene.study.section.plates.len()));
                ui.memory_mut(|m| m.request_focus(canvas.id));
                let plate = plating::drawn(&scene.study.section, from, to);
                out.push(Proposal::Edit(Edit::AddPlate(Box::new(plate))));
            }
            None => view.pen = Some(Pen { from: from.or(Some(to)) }),
        }
    }
    let length = Measure::new(Quantity::Length, length_m).text_to(scene.units, 4);
    let words = match from {
        Some(_) => format!("{}, {length} long", place_words(to, scene)),
        None => place_words(to, scene),
    };
    let then = if from.is_some() { "then where it ends" } else { "the plate begins here" };
    let reason = status(&snapped.reason, then);
    view.status = status(&words, &reason);
    let line = from.map(|from| [from, to]);
    let feedback = Feedback { words, reason, at: Some(to), aligned_with: snapped.aligned_with, line };
    Some(Pointing { pos: Some(pos), target: None, is_dragging: true, feedback })
}

/// What to do with the pen, in a corner of the drawing.
pub fn paint_hint(painter: &Painter, scene: &Scene, pen: Pen, look: &Look) {
    let words = match pen.from {
        None => "Draw a plate from wall to wall. Esc stops",
        Some(_) => "Let go, or click, where the plate ends. Esc stops",
    };
    let text = painter.layout_no_wrap(words.to_owned(), font::small(), look.accent);
    let at = scene.screen.rect.left_top() + vec2(12.0, 8.0);
    painter.rect_filled(egui::Rect::from_min_size(at, text.size()).expand2(vec2(4.0, 2.0)), 0.0, look.board);
    painter.galley(at, text, look.accent);
}

fn snapped(scene: &Scene, keys: Modifiers, wish: Point, from: Option<Point>) -> Snapped {
    let mut snapper = snapper(scene, keys, None);
    snapper.anchors.extend(from.map(beginning));
    snapper.onto(wish, &lines(scene, None), from.as_slice())
}
