//! The fill, in every way of giving it: typing one way makes it the way that is given.

use egui::{CornerRadius, Key, Rect, Response, Sense, Ui, WidgetInfo, pos2, vec2};

use crate::analysis::{State, Still};
use crate::app::Edit;
use crate::gui::field;
use crate::gui::number::Number;
use crate::gui::{Desk, Proposal, marks};
use crate::study::Fill;
use crate::units::{Quantity, fixed};

/// Share by which the arrow keys move the fill.
const KEY_STEP: f64 = 0.001;

/// A way of giving the fill.
struct Way {
    label: &'static str,
    quantity: Quantity,
    fill: fn(f64) -> Fill,
    of_still: fn(&Still) -> f64,
}

const SHARE: Way = Way { label: "Fill", quantity: Quantity::Share, fill: Fill::Share, of_still: |s| s.share };

const OTHER_WAYS: [Way; 3] = [
    Way { label: "Volume", quantity: Quantity::Volume, fill: Fill::Volume, of_still: |s| s.volume_m3 },
    Way { label: "Still level, z", quantity: Quantity::Length, fill: Fill::Level, of_still: |s| s.level_z_m },
    Way { label: "Ullage height", quantity: Quantity::Length, fill: Fill::Ullage, of_still: |s| s.ullage_m },
];

pub(super) fn fill_ui(ui: &mut Ui, desk: &mut Desk) {
    let look = desk.look;
    let share = way_ui(ui, desk, &SHARE);
    let highest = desk.judged().and_then(|j| j.results.still.highest_share);
    if let Some(share) = share {
        bar_ui(ui, desk, share, highest);
    }
    let color = match (share, highest) {
        _ if desk.judged().is_none_or(|j| j.is_stale) => look.ink3,
        (Some(share), Some(highest)) if share > highest => look.state(State::Fails),
        _ => look.ink,
    };
    let words = highest.map_or_else(|| "–".to_owned(), percent_down);
    field::computed_row_ui(ui, look, "Highest that holds", &words, "%", color)
        .on_hover_text("The highest fill that no judged load case spills, over the whole ramp from rest");
    for way in &OTHER_WAYS {
        way_ui(ui, desk, way);
    }
}

/// One row: the value as it was given, else as it follows from the still tank. Gives the value.
fn way_ui(ui: &mut Ui, desk: &mut Desk, way: &Way) -> Option<f64> {
    let given = match desk.study().fill {
        fill @ (Fill::Share(si) | Fill::Volume(si) | Fill::Level(si) | Fill::Ullage(si)) => {
            (fill == (way.fill)(si)).then_some(si)
        }
    };
    let judged = desk.judged();
    let si = given.or(judged.map(|j| (way.of_still)(&j.results.still)));
    let is_stale = given.is_none() && judged.is_none_or(|j| j.is_stale);
    let color = match way.quantity {
        _ if is_stale => desk.look.ink3,
        Quantity::Share => desk.look.accent,
        _ => desk.look.ink,
    };
    Number::new(("fill", way.label), way.label, 0.0, desk.unit_near(way.quantity, si.unwrap_or(1.0)))
        .or_none(si)
        .significant(if way.quantity == Quantity::Share { 3 } else { 4 })
        .computed(given.is_none())
        .color(color)
        .row_ui(ui, desk, |si| Edit::Fill((way.fill)(si)));
    si
}

/// The fill as a bar with a handle: drag it, or move it with the arrow keys.
fn bar_ui(ui: &mut Ui, desk: &mut Desk, share: f64, highest: Option<f64>) -> Response {
    let (rect, response) = ui.allocate_exact_size(vec2(ui.available_width(), 14.0), Sense::click_and_drag());
    response.widget_info(|| WidgetInfo::slider(ui.is_enabled(), 100.0 * share, "Fill bar, percent"));
    let x_of = |share: f64| rect.left() + rect.width() * share.clamp(0.0, 1.0) as f32;
    let track = Rect::from_center_size(rect.center(), vec2(rect.width(), 5.0));
    let look = desk.look;
    let painter = ui.painter();
    painter.rect_filled(track, CornerRadius::ZERO, look.line2);
    painter.rect_filled(track.with_max_x(x_of(share)), CornerRadius::ZERO, look.pressure_at(0.4));
    if let Some(highest) = highest {
        let x = painter.round_to_pixel_center(x_of(highest));
        painter.vline(x, track.expand(3.0).y_range(), (1.25, look.state(State::Fails)));
    }
    let handle = Rect::from_center_size(pos2(x_of(share), rect.center().y), vec2(4.0, 13.0));
    painter.rect_filled(handle.expand(1.0), CornerRadius::ZERO, look.panel);
    painter.rect_filled(handle, CornerRadius::ZERO, look.accent);
    marks::paint_focus(painter, handle, &response, look);
    if response.hovered() {
        ui.ctx().set_cursor_icon(egui::CursorIcon::ResizeHorizontal);
    }

    if response.drag_started() {
        desk.out.push(Proposal::BeginGesture("Change the fill".to_owned()));
    }
    if let Some(at) = response.interact_pointer_pos()
        && (response.dragged() || response.clicked())
    {
        let to = f64::from((at.x - rect.left()) / rect.width()).clamp(0.001, 1.0);
        desk.edit(Edit::Fill(Fill::Share((to * 1000.0).round() / 1000.0)));
    }
    if response.drag_stopped() {
        desk.out.push(Proposal::EndGesture);
    }
    if response.dragged() && ui.input(|i| i.key_pressed(Key::Escape)) {
        desk.out.push(Proposal::CancelGesture);
        ui.ctx().stop_dragging();
    }
    if response.has_focus() {
        ui.memory_mut(|m| {
            let filter = egui::EventFilter { horizontal_arrows: true, ..Default::default() };
            m.set_focus_lock_filter(response.id, filter);
        });
        let steps = ui.input(|i| i.num_presses(Key::ArrowRight) as f64 - i.num_presses(Key::ArrowLeft) as f64);
        if steps != 0.0 {
            desk.edit(Edit::Fill(Fill::Share((share + steps * KEY_STEP).clamp(KEY_STEP, 1.0))));
        }
    }
    response
}

/// A share in percent, rounded down so that typing it back in still holds.
fn percent_down(share: f64) -> String {
    fixed((share * 1000.0).floor() / 10.0, 1)
}
