//! Rows of a column: headings, typed texts, computed numbers, choices, links. Typed numbers are [`super::number`].

use egui::{Align, Align2, Color32, Id, Rect, Response, Role, Sense, Ui, WidgetInfo, pos2, vec2};

use crate::app::Edit;

use super::cell::Cell;
use super::{Desk, Look, font};

/// Distance from one row to the next.
pub const ROW: f32 = 21.0;

/// Width of the unit column.
pub const UNIT_COLUMN: f32 = 38.0;

/// Space between a number and its unit.
pub const UNIT_GAP: f32 = 6.0;

/// A column's heading with its rule, and a word at the right.
pub fn heading_ui(ui: &mut Ui, look: &Look, title: &str, note: &str) {
    ui.add_space(9.0);
    let (rect, response) = ui.allocate_exact_size(vec2(ui.available_width(), 22.0), Sense::hover());
    response.widget_info(|| WidgetInfo::labeled(Role::Heading, true, title));
    let painter = ui.painter();
    let y = rect.center().y - 1.0;
    painter.text(pos2(rect.left(), y), Align2::LEFT_CENTER, title, font::heading(), look.ink);
    painter.text(pos2(rect.right(), y), Align2::RIGHT_CENTER, note, font::small(), look.ink2);
    painter.hline(rect.x_range(), painter.round_to_pixel_center(rect.bottom()), (1.0, look.line));
    ui.add_space(2.0);
}

/// A row with a typed text.
pub fn text_row_ui(
    ui: &mut Ui,
    desk: &mut Desk,
    id: impl std::hash::Hash + std::fmt::Debug,
    label: &str,
    value: &str,
    edit: impl Fn(String) -> Edit,
) -> Response {
    let rect = row_rect(ui);
    let label_width = 76.0_f32.min(0.4 * rect.width());
    let (left, right) = rect.split_left_right_at_x(rect.left() + label_width);
    paint_fitting(ui, left, Align::Min, label, font::body(), desk.look.ink2);
    text_cell_ui(ui, right, Align::Max, desk, id, label, value, edit)
}

/// A typed text in a place of the caller's.
#[expect(clippy::too_many_arguments, reason = "a place, a name, a value and what to do with it")]
pub fn text_cell_ui(
    ui: &mut Ui,
    rect: Rect,
    align: Align,
    desk: &mut Desk,
    id: impl std::hash::Hash + std::fmt::Debug,
    label: &str,
    value: &str,
    edit: impl Fn(String) -> Edit,
) -> Response {
    let cell = Cell {
        id: Id::unique(id),
        label,
        shown: if value.is_empty() { "none" } else { value },
        text: value,
        is_typed: true,
        font: font::body(),
        color: if value.is_empty() { desk.look.ink3 } else { desk.look.ink },
        align,
        role: Role::TextInput,
    };
    let (response, typed) = cell.show(ui, rect, desk.look, |text| Ok(text.to_owned()));
    if let Some(text) = typed {
        desk.edit(edit(text));
    }
    response
}

/// A row with a computed number and its unit.
pub fn computed_row_ui(ui: &mut Ui, look: &Look, label: &str, number: &str, unit: &str, color: Color32) -> Response {
    let rect = row_rect(ui);
    let response = ui.interact(rect, ui.next_auto_id().with(label), Sense::hover());
    response.widget_info(|| WidgetInfo::labeled(Role::Label, true, format!("{label}, {number} {unit}")));
    let right = number_right(rect);
    let label_rect = rect.with_max_x(right - 48.0);
    paint_fitting(ui, label_rect, Align::Min, label, font::body(), look.ink2);
    ui.painter().text(pos2(right, rect.center().y), Align2::RIGHT_CENTER, number, font::figure(), color);
    paint_unit(ui, rect, unit, look);
    response
}

/// A row with a choice among a few words.
pub fn choice_row_ui<T: Copy + PartialEq>(
    ui: &mut Ui,
    look: &Look,
    label: &str,
    now: T,
    choices: &[(T, &str)],
) -> Option<T> {
    let rect = row_rect(ui);
    paint_fitting(ui, rect.with_max_x(rect.center().x), Align::Min, label, font::body(), look.ink2);
    choice_ui(ui, rect.with_min_x(rect.center().x), Align::Max, label, now, choices, look)
}

/// A choice among a few words, at one side of `rect`.
pub fn choice_ui<T: Copy + PartialEq>(
    ui: &mut Ui,
    rect: Rect,
    align: Align,
    label: &str,
    now: T,
    choices: &[(T, &str)],
    look: &Look,
) -> Option<T> {
    let word = choices.iter().find(|(choice, _)| *choice == now).map_or("", |(_, word)| word);
    let response = link_ui(ui, rect, align, word, &format!("{label}, {word}"), look);
    let mut chosen = None;
    egui::Popup::menu(&response).accessible_name(label).show(|ui| {
        for (choice, word) in choices {
            if ui.selectable_label(*choice == now, *word).clicked() && *choice != now {
                chosen = Some(*choice);
            }
        }
    });
    chosen
}

/// Words in accent that can be pressed. `spoken` is what assistive technology says.
pub fn link_ui(ui: &mut Ui, rect: Rect, align: Align, words: &str, spoken: &str, look: &Look) -> Response {
    let galley = ui.painter().layout_no_wrap(words.to_owned(), font::body(), look.accent);
    let text = Align2([align, Align::Center]).align_size_within_rect(galley.size(), rect);
    let response = ui.interact(text.expand2(vec2(2.0, 1.0)), ui.next_auto_id().with(spoken), Sense::click());
    response.widget_info(|| WidgetInfo::labeled(Role::Button, ui.is_enabled(), spoken));
    ui.painter().galley(text.min, galley, look.accent);
    if response.hovered() {
        let y = ui.painter().round_to_pixel_center(text.bottom() - 1.0);
        ui.painter().hline(text.x_range(), y, (1.0, look.accent));
        ui.ctx().set_cursor_icon(egui::CursorIcon::PointingHand);
    }
    super::marks::paint_focus(ui.painter(), text, &response, look);
    // The next link of the same words in this column needs another id.
    ui.skip_ahead_auto_ids(1);
    response
}

/// A row with a link.
pub fn link_row_ui(ui: &mut Ui, words: &str, look: &Look) -> Response {
    let rect = row_rect(ui);
    link_ui(ui, rect, Align::Min, words, words, look)
}

/// Room for one row.
pub fn row_rect(ui: &mut Ui) -> Rect {
    let spacing = ui.spacing().item_spacing.y;
    ui.spacing_mut().item_spacing.y = 0.0;
    let (rect, _) = ui.allocate_exact_size(vec2(ui.available_width(), ROW), Sense::hover());
    ui.spacing_mut().item_spacing.y = spacing;
    rect
}

/// Right end of the numbers in a row.
pub fn number_right(row: Rect) -> f32 {
    row.right() - UNIT_COLUMN - UNIT_GAP
}

/// Text cut off with an ellipsis where `rect` is too narrow.
pub fn paint_fitting(ui: &Ui, rect: Rect, align: Align, text: &str, font: egui::FontId, color: Color32) {
    paint_job(ui, rect, align, font::runs([(text, font, color)]));
}

/// `text` with its middle left out where it is wider than `width`: names often differ only at their end.
pub fn shortened(ui: &Ui, text: &str, font: &egui::FontId, width: f32) -> String {
    let fits = |text: &str| {
        let galley = ui.painter().layout_no_wrap(text.to_owned(), font.clone(), Color32::PLACEHOLDER);
        galley.size().x <= width
    };
    if fits(text) {
        return text.to_owned();
    }
    let chars: Vec<char> = text.chars().collect();
    let with_kept = |n: usize| {
        let (head, tail) = (&chars[..n.div_ceil(2)], &chars[chars.len() - n / 2..]);
        let [head, tail] = [head, tail].map(|part| part.iter().collect::<String>());
        format!("{}…{}", head.trim_end(), tail.trim_start())
    };
    let (mut fitting, mut too_many) = (0, chars.len());
    while fitting + 1 < too_many {
        let n = (fitting + too_many) / 2;
        if fits(&with_kept(n)) { fitting = n } else { too_many = n }
    }
    with_kept(fitting)
}

/// Runs of text on one line, cut off with an ellipsis where `rect` is too narrow. Gives the text's place.
pub fn paint_job(ui: &Ui, rect: Rect, align: Align, mut job: egui::text::LayoutJob) -> Rect {
    job.wrap.max_width = rect.width().max(0.0);
    job.wrap.max_rows = 1;
    job.wrap.break_anywhere = true;
    let galley = ui.painter().layout_job(job);
    let at = Align2([align, Align::Center]).align_size_within_rect(galley.size(), rect);
    ui.painter().galley(at.min, galley, Color32::PLACEHOLDER);
    at
}

/// The unit column of a row.
pub fn paint_unit(ui: &Ui, row: Rect, symbol: &str, look: &Look) {
    let at = pos2(row.right() - UNIT_COLUMN, row.center().y);
    ui.painter().text(at, Align2::LEFT_CENTER, symbol, font::small(), look.ink3);
}
