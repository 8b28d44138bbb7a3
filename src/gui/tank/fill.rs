//! The fill, in every way of giving it: typing one way makes it the way that is given.

use egui::{CornerRadius, Key, Rect, Response, Sense, Ui, WidgetInfo, pos2, vec2};

use crate::app::Edit;
use crate::gui::field::{self, Number};
use crate::gui::{Desk, Proposal, marks};
use crate::study::Fill;
use crate::units::{Quantity, fixed};

/// Share by which the arrow keys move the fill.
const KEY_STEP: f64 = 0.001;

pub(super) fn fill_ui(ui: &mut Ui, desk: &mut Desk) {
    let given = desk.study().fill;
    let judged = desk.judged();
    let still = judged.map(|j| &j.results.still);
    let share = match given {
        Fill::Share(share) => Some(share),
        _ => still.map(|s| s.share),
    };
    let highest = still.and_then(|s| s.highest_share);
    let is_over = matches!((share, highest), (Some(share), Some(highest)) if share > highest);

    let percent = desk.unit(Quantity::Share);
    Number::new("fill share", "Fill", 0.0, percent)
        .or_none(share)
        .significant(3)
        .computed(!matches!(given, Fill::Share(_)))
        .color(desk.look.accent)
        .row_ui(ui, desk, |si| Edit::Fill(Fill::Share(si)));
    if let Some(share) = share {
        bar_ui(ui, desk, share, highest);
    }
    let (highest_text, color) = match highest {
        Some(highest) if is_over => (percent_down(highest), desk.look.state(crate::analysis::State::Fails)),
        Some(highest) => (percent_down(highest), desk.look.ink),
        None => ("–".to_owned(), desk.look.ink3),
    };
    field::computed_row_ui(ui, desk.look, "Highest that holds", &highest_text, "%", color)
        .on_hover_text("The highest fill that no judged load case spills, over the whole ramp from rest");

    let (volume, level, ullage) = match given {
        Fill::Volume(v) => (Some(v), still.map(|s| s.level_z_m), still.map(|s| s.ullage_m)),
        Fill::Level(z) => (still.map(|s| s.volume_m3), Some(z), still.map(|s| s.ullage_m)),
        Fill::Ullage(u) => (still.map(|s| s.volume_m3), still.map(|s| s.level_z_m), Some(u)),
        Fill::Share(_) => (still.map(|s| s.volume_m3), still.map(|s| s.level_z_m), still.map(|s| s.ullage_m)),
    };
    Number::new("fill volume", "Volume", 0.0, desk.unit(Quantity::Volume))
        .or_none(volume)
        .computed(!matches!(given, Fill::Volume(_)))
        .row_ui(ui, desk, |si| Edit::Fill(Fill::Volume(si)));
    Number::new("fill level", "Still level, z", 0.0, desk.unit(Quantity::Length))
        .or_none(level)
        .computed(!matches!(given, Fill::Level(_)))
        .row_ui(ui, desk, |si| Edit::Fill(Fill::Level(si)));
    Number::new("fill ullage", "Ullage height", 0.0, desk.unit(Quantity::Length))
        .or_none(ullage)
        .computed(!matches!(given, Fill::Ullage(_)))
        .row_ui(ui, desk, |si| Edit::Fill(Fill::Ullage(si)));
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
        painter.vline(x, track.expand(3.0).y_range(), (1.25, look.state(crate::analysis::State::Fails)));
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
