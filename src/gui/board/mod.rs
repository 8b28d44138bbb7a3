//! The board: the section to scale, to look at and to take hold of.
//!
//! In three steps: the model says in metres what there is to draw, the scene lays it out on the screen, the painting
//! puts it down. The hand goes the other way: the target under the pointer, a drag, a snap, an [`Edit`] proposed.
//! Nothing here changes the document.
//!
//! [`Edit`]: crate::app::Edit

mod anchors;
mod annotate;
mod bob;
mod dims;
mod drag;
mod handles;
mod holds;
mod isobars;
mod keys;
mod labels;
mod legend;
mod lines;
mod liquid;
mod loads;
mod menu;
mod model;
mod paint;
mod paint_plate;
mod pen;
mod places;
mod plate_drag;
mod pointer;
mod rulers;
mod scene;
mod screen;
mod snap;
mod strips;
mod target;
mod words;

use egui::{Align2, Id, Painter, Rect, Role, Sense, Ui, WidgetInfo};

use crate::analysis::Results;
use crate::app::Document;
use crate::study::ValidStudy;
use crate::units::UnitSystem;

use super::{Look, Proposal, View, font};

use model::{Detail, Shown};
use pointer::Pointing;
use scene::Scene;
use target::Target;

pub use bob::Dial;
pub use holds::Holds;
pub use model::BoardModel;
pub use screen::Screen;

/// The board, in all the room that `ui` has, with what `holds` round the bob. The view changes in place; changes of the
/// document go into `out`.
pub fn board_ui(
    ui: &mut Ui,
    doc: &Document,
    view: &mut View,
    holds: Option<Holds>,
    look: &Look,
    out: &mut Vec<Proposal>,
) {
    let board = ui.available_rect_before_wrap();
    ui.advance_cursor_after_rect(board);
    let id = Id::unique("board");
    let canvas = ui.interact(board, id, Sense::click_and_drag());
    canvas.widget_info(|| WidgetInfo::labeled(Role::Canvas, true, "Board"));
    let area = rulers::drawing_area(board);
    if area.width() < 8.0 || area.height() < 8.0 {
        return;
    }
    let held_dial = pointer::held_dial(ui, id);
    let mut scene = Scene::new(ui, id, doc, view, area, held_dial);
    if pointer::zoom(ui, &canvas, &scene, view) {
        scene = Scene::new(ui, id, doc, view, area, held_dial);
    }
    let pointing = pointer::point(ui, &canvas, &scene, view, out);
    scene.hanging.holds = holds;
    scene.hanging.is_pointed_at = pointing.target == Some(Target::Bob) && !pointing.is_dragging;

    let painter = ui.painter().with_clip_rect(ui.clip_rect().intersect(board));
    painter.rect_filled(board, 0.0, look.board);
    let inside = painter.with_clip_rect(painter.clip_rect().intersect(area));
    paint_scene(&inside, &scene, view, &pointing, look);
    let focused = keys::handles_ui(ui, &canvas, &scene, view, out);
    if let Some((target, response)) = &focused {
        keys::paint_focus(ui, &scene, *target, response, look);
    }
    if let Some(pos) = pointing.pos.filter(|_| pointing.is_dragging) {
        annotate::paint_feedback(&inside, &scene, pos, &pointing.feedback, look);
    }
    if let Some(pen) = view.pen {
        pen::paint_hint(&inside, &scene, pen, look);
    }
    rulers::paint_rulers(&painter, board, &scene.screen, view.units, pointing.pos, look);
    super::marks::paint_focus(&painter, board.shrink(5.0), &canvas, look);
    menu::menu_ui(ui, &canvas, &scene, view, out);
}

/// A small drawing of the section under one load case: tints and surface, no words.
pub fn thumbnail_ui(
    painter: &Painter,
    rect: Rect,
    study: &ValidStudy,
    results: &Results,
    case_idx: usize,
    look: &Look,
) {
    let (low, high) = study.region().bounds();
    let screen = Screen::fitted(rect, rect.shrink(2.0), low, high);
    let detail = Detail { sagitta_m: 0.25 / screen.scale(), units: UnitSystem::Si };
    let model = BoardModel::judged(study, results, Shown { case_idx, ..Default::default() }, detail);
    let painter = painter.with_clip_rect(painter.clip_rect().intersect(rect));
    paint::paint_liquid(&painter, &screen, &model, paint::CARD_PENS, look);
    paint::paint_surface(&painter, &screen, &model, paint::CARD_PENS, look);
    paint_plate::paint_plates(&painter, &screen, &model, paint::CARD_PENS, look);
    paint::paint_walls(&painter, &screen, &model, paint::CARD_PENS, look);
}

/// The line of the bound that is not shown, as in the drawing.
pub fn paint_other_bound(painter: &Painter, ends: [egui::Pos2; 2], look: &Look) {
    lines::dash_dot(painter, &ends, egui::Stroke::new(1.1, look.ink));
}

fn paint_scene(painter: &Painter, scene: &Scene, view: &View, pointing: &Pointing, look: &Look) {
    let hovered = pointing.target;
    let pointed_at = pointing.pos.filter(|_| hovered.is_none() && !pointing.is_dragging);
    let (screen, model) = (&scene.screen, &*scene.model);
    rulers::paint_grid(painter, screen, scene.units, look);
    if model.edges.is_empty() {
        let words = "No outline yet. File, New gives a rectangle to start from";
        painter.text(screen.rect.center(), Align2::CENTER_CENTER, words, font::body(), look.ink2);
    }
    paint::paint_liquid(painter, screen, model, paint::BOARD_PENS, look);
    paint::paint_glow(painter, scene, view.selected, hovered, look);
    paint::paint_surface(painter, screen, model, paint::BOARD_PENS, look);
    paint::paint_last_good(painter, screen, model, look);
    paint_plate::paint_plates(painter, screen, model, paint::BOARD_PENS, look);
    paint::paint_walls(painter, screen, model, paint::BOARD_PENS, look);
    // A section that has been zoomed or moved under the bob shows through its paper.
    for area in scene.dial.areas(&scene.hanging).into_iter().filter(|area| area.intersects(scene.bounds())) {
        painter.rect_filled(area, 0.0, look.board.gamma_multiply(0.86));
    }
    annotate::annotate(painter, scene, look);
    bob::paint_bob(painter, &scene.dial, &scene.hanging, scene.units, look);
    // With one pool alone the whole liquid would be lined.
    if let Some(p) = pointed_at.filter(|_| model.pools.len() > 1)
        && let Some(pool) = model.pools.iter().find(|pool| pool.contains(screen.section_from_screen(p)))
    {
        paint::paint_pool(painter, scene, pool, look);
    }
    handles::paint_handles(painter, scene, view.selected, hovered, look);
}
