//! The case strip: one card a load case, each with its worst verdict. Cards are chosen, added and put in order here.

use egui::{Align, Align2, Color32, CornerRadius, Key, Painter, Rect, Response, Role, Sense, StrokeKind, Ui};
use egui::{UiBuilder, WidgetInfo, pos2, vec2};

use crate::analysis::{CaseResult, State};
use crate::app::Edit;
use crate::units::{Measure, Quantity, utilisation_text};

use super::{Command, Desk, board, field, font, formula, marks};

const GAP: f32 = 10.0;

/// The strip in `rect`.
pub fn strip_ui(ui: &mut Ui, rect: Rect, card_width: f32, has_drawings: bool, desk: &mut Desk) {
    let look = desk.look;
    ui.painter().rect_filled(rect, 0.0, look.sunk);
    let mut child = ui.new_child(UiBuilder::new().max_rect(rect).id_salt("strip"));
    child.set_clip_rect(rect);
    let n = desk.study().cases.len();
    egui::ScrollArea::horizontal().auto_shrink(false).show(&mut child, |ui| {
        let card = vec2(card_width, rect.height() - 2.0 * GAP);
        let width = GAP + (n + 1) as f32 * (card_width + GAP);
        let (whole, _) = ui.allocate_exact_size(vec2(width, rect.height()), Sense::hover());
        let place = |i: usize| Rect::from_min_size(whole.min + vec2(GAP + i as f32 * (card_width + GAP), GAP), card);
        // A case that was chosen elsewhere comes into view.
        let seen = egui::Id::unique("case in view");
        if ui.data(|d| d.get_temp::<usize>(seen)) != Some(desk.view.case_idx) {
            ui.data_mut(|d| d.insert_temp(seen, desk.view.case_idx));
            ui.scroll_to_rect(place(desk.view.case_idx).expand(GAP), None);
        }
        let mut moved = None;
        for i in 0..n {
            let response = card_ui(ui, place(i), i, has_drawings, desk);
            if let Some(at) = response.interact_pointer_pos()
                && (response.dragged() || response.drag_stopped())
            {
                let to = (((at.x - whole.left() - GAP) / (card_width + GAP)) as usize).min(n - 1);
                if response.drag_stopped() {
                    moved = Some((i, to));
                } else if to != i {
                    let edge = if to > i { place(to).right() + 0.5 * GAP } else { place(to).left() - 0.5 * GAP };
                    ui.painter().vline(edge, place(to).y_range(), (2.0, look.accent));
                }
            }
        }
        if let Some((from, to)) = moved
            && from != to
        {
            desk.edit(Edit::ReorderCase(from, to));
            desk.view.case_idx = to;
        }
        add_ui(ui, place(n), desk);
    });
}

/// One card. Clicking chooses its case.
fn card_ui(ui: &mut Ui, rect: Rect, i: usize, has_drawing: bool, desk: &mut Desk) -> Response {
    let look = desk.look;
    let case = &desk.study().cases[i];
    let judged = desk.judged();
    let result = judged.and_then(|j| j.results.cases.get(i));
    let worst = result.and_then(CaseResult::worst);
    let is_chosen = desk.view.case_idx == i;
    let response = ui.interact(rect, egui::Id::unique(("card", i)), Sense::click_and_drag());
    response.widget_info(|| {
        let state = worst.map_or("", |v| v.state.word());
        let used = utilisation_text(worst.and_then(|v| v.utilisation));
        let words = format!("Case {}, {}, {state}, {used}", i + 1, case.name);
        WidgetInfo::selected(Role::ListBoxOption, true, is_chosen, words)
    });
    if response.clicked() || response.drag_started() {
        desk.view.case_idx = i;
    }
    if response.has_focus() && ui.input(|input| input.key_pressed(Key::Delete)) {
        desk.run(Command::DeleteCase);
    }
    card_menu(&response, i, desk);

    let painter = ui.painter_at(rect.expand(4.0));
    let ground = match (is_chosen, response.hovered()) {
        (true, _) => look.raised,
        (false, true) => look.hover,
        (false, false) => look.panel,
    };
    let outline = if is_chosen { (1.5, look.accent) } else { (1.0, look.line2) };
    painter.rect(rect, CornerRadius::same(3), ground, outline, StrokeKind::Inside);
    let inner = rect.shrink2(vec2(10.0, 8.0));
    let head = Rect::from_min_size(inner.min, vec2(inner.width(), 18.0));
    let number = (i + 1).to_string();
    let number_color = if is_chosen { look.accent } else { look.ink2 };
    let job = font::runs([
        (number.as_str(), font::heading(), number_color),
        ("  ", font::heading(), number_color),
        (case.name.as_str(), if is_chosen { font::heading() } else { font::name() }, look.ink),
    ]);
    field::paint_job(ui, head, Align::Min, job);

    let is_stale = judged.is_some_and(|j| j.is_stale);
    let mut faded = painter.clone();
    if is_stale {
        faded.set_opacity(super::look::STALE_OPACITY);
    }
    let body = inner.with_min_y(head.bottom() + 4.0);
    let y = if has_drawing { body.top() + 8.0 } else { body.center().y };
    let number = faded.text(
        pos2(inner.right(), y),
        Align2::RIGHT_CENTER,
        utilisation_text(worst.and_then(|v| v.utilisation)),
        font::card_number(),
        worst.map_or(look.ink3, |v| look.state_number(v.state)),
    );
    let state = worst.map_or(State::NotJudged, |v| v.state);
    marks::paint_cup(&faded, pos2(number.left() - 15.0, y), 13.0, state, look);
    if has_drawing {
        if let Some(judged) = judged.filter(|j| i < j.results.cases.len()) {
            let drawing = body.with_max_x(number.left() - 26.0).expand2(vec2(4.0, 2.0));
            board::thumbnail_ui(&faded, drawing, judged.study, judged.results, i, look);
        }
        component_ui(&painter, body, desk, i);
    }
    marks::paint_focus(&painter, rect, &response, look);
    response
}

/// The steady trace, and the component of the acceleration that governs.
fn component_ui(painter: &Painter, body: Rect, desk: &Desk, i: usize) {
    let look = desk.look;
    let study = desk.study();
    let accel = study.cases[i].accel.to_m_per_s2(study.gravity_m_per_s2);
    let (symbol, value) = if accel.y.abs() > accel.x.abs() { ("a_z", accel.y) } else { ("a_s", accel.x) };
    let measure = Measure::new(Quantity::Acceleration, value);
    let right = body.right();
    let bottom = body.bottom();
    let unit = measure.quantity.unit(desk.units()).symbol;
    let unit = painter.text(pos2(right, bottom - 6.0), Align2::RIGHT_CENTER, unit, font::tick(), look.ink3);
    formula::symbol_ui(painter, pos2(unit.left() - 16.0, bottom - 6.0), symbol, look.ink2);
    let number = measure.number(desk.units(), 3);
    painter.text(pos2(right, bottom - 20.0), Align2::RIGHT_CENTER, number, font::small(), look.ink2);
    if body.height() > 62.0 {
        let y = painter.round_to_pixel_center(bottom - 36.0);
        painter.hline(egui::Rangef::new(right - 34.0, right), y, (1.0, look.ink2));
    }
}

fn card_menu(response: &Response, i: usize, desk: &mut Desk) {
    egui::Popup::context_menu(response).id(response.id.with("menu")).show(|ui| {
        desk.view.case_idx = i;
        for row in super::commands::TABLE.iter().filter(|row| row.menu == super::commands::Menu::Case) {
            let is_enabled = (row.is_enabled)(desk.doc, desk.view);
            if ui.add_enabled(is_enabled, egui::Button::new(row.text)).on_hover_text(row.tooltip).clicked() {
                desk.run(row.command);
            }
        }
    });
}

fn add_ui(ui: &Ui, rect: Rect, desk: &mut Desk) {
    let look = desk.look;
    let response = ui.interact(rect, egui::Id::unique("add card"), Sense::click());
    response.widget_info(|| WidgetInfo::labeled(Role::Button, true, "Add a load case"));
    let ground = if response.hovered() { look.hover } else { Color32::TRANSPARENT };
    ui.painter().rect(rect, CornerRadius::same(3), ground, (1.0, look.line), StrokeKind::Inside);
    // Where the strip ends before the card does, the words stand in what is seen of it, the first of them alone if need be.
    let seen = rect.intersect(ui.clip_rect()).shrink2(vec2(8.0, 0.0));
    let words = if seen.width() < 96.0 { "Add" } else { "Add a load case" };
    ui.painter().text(seen.center(), Align2::CENTER_CENTER, words, font::body(), look.accent);
    marks::paint_focus(ui.painter(), rect, &response, look);
    if response.clicked() {
        desk.run(Command::AddCase);
    }
}
