//! Rows of a column: headings, typed numbers and texts, computed numbers, choices.
//!
//! Numbers are shown rounded and edited in full; decimal comma and point are both read.

use egui::{Align, Align2, Color32, Id, Key, Rect, Response, Role, Sense, Ui, WidgetInfo, pos2, vec2};

use crate::app::Edit;
use crate::units::{Unit, number};

use super::cell::{Cell, is_editing};
use super::{Desk, Look, Proposal, font};

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

/// A number in SI, its unit, and how it may be typed.
pub struct Number<'a> {
    id: Id,
    label: &'a str,
    si: Option<f64>,
    unit: Unit,
    significant: usize,
    is_typed: bool,
    may_be_empty: bool,
    color: Option<Color32>,
    prefix: &'a str,
}

impl<'a> Number<'a> {
    /// A typed number; `id` is unique in the window.
    pub fn new(id: impl std::hash::Hash + std::fmt::Debug, label: &'a str, si: f64, unit: Unit) -> Self {
        Number {
            id: Id::unique(id),
            label,
            si: Some(si),
            unit,
            significant: 4,
            is_typed: true,
            may_be_empty: false,
            color: None,
            prefix: "",
        }
    }

    /// Without a value so far: `not given`.
    pub fn or_none(mut self, si: Option<f64>) -> Self {
        self.si = si;
        self
    }

    /// Significant figures shown.
    pub fn significant(mut self, significant: usize) -> Self {
        self.significant = significant;
        self
    }

    /// Worked out by the program, though it may be typed over: no dots under it.
    pub fn computed(mut self, is_computed: bool) -> Self {
        self.is_typed = !is_computed;
        self
    }

    /// Colour of the number.
    pub fn color(mut self, color: Color32) -> Self {
        self.color = Some(color);
        self
    }

    /// A letter before the number: `R`.
    pub fn prefix(mut self, prefix: &'a str) -> Self {
        self.prefix = prefix;
        self
    }

    /// Empty text takes the value away.
    pub fn optional(mut self) -> Self {
        self.may_be_empty = true;
        self
    }

    /// A row: label, number, unit. Proposes the edit when a number is typed, or dragged with Alt.
    pub fn row_ui(self, ui: &mut Ui, desk: &mut Desk, edit: impl Fn(f64) -> Edit) -> Response {
        self.try_row_ui(ui, desk, |si| si.map(&edit).ok_or_else(|| "Type a number".to_owned()))
    }

    /// A row whose edit may be refused with a word, or may take the value away.
    pub fn try_row_ui(
        self,
        ui: &mut Ui,
        desk: &mut Desk,
        edit: impl Fn(Option<f64>) -> Result<Edit, String>,
    ) -> Response {
        let rect = row_rect(ui);
        let label = Rect::from_min_max(rect.min, pos2(number_right(rect) - 62.0, rect.bottom()));
        paint_fitting(ui, label, Align::Min, self.label, font::body(), desk.look.ink2);
        self.number_ui(ui, rect.with_min_x(label.right()), desk, edit)
    }

    /// Number and unit at the right of `rect`, without a label.
    pub fn number_ui(
        self,
        ui: &mut Ui,
        rect: Rect,
        desk: &mut Desk,
        edit: impl Fn(Option<f64>) -> Result<Edit, String>,
    ) -> Response {
        paint_unit(ui, rect, self.unit.symbol, desk.look);
        let right = number_right(rect);
        let left = if self.prefix.is_empty() { rect.left() } else { right - 44.0 };
        let at = pos2(left - 2.0, rect.center().y);
        ui.painter().text(at, Align2::RIGHT_CENTER, self.prefix, font::small(), desk.look.ink2);
        let cell = Rect::from_min_max(pos2(left, rect.top()), pos2(right, rect.bottom()));
        self.cell_ui(ui, cell, Align::Max, desk, edit)
    }

    /// The number alone, in a place of the caller's.
    pub fn cell_ui(
        self,
        ui: &mut Ui,
        rect: Rect,
        align: Align,
        desk: &mut Desk,
        edit: impl Fn(Option<f64>) -> Result<Edit, String>,
    ) -> Response {
        let value = self.si.map(|si| self.unit.from_si(si));
        let shown = match value {
            Some(v) => number(v, self.significant),
            None => "not given".to_owned(),
        };
        let text = value.map(full_text).unwrap_or_default();
        let cell = Cell {
            id: self.id,
            label: self.label,
            shown: &shown,
            text: &text,
            is_typed: self.is_typed,
            font: if value.is_some() { font::figure() } else { font::small() },
            color: self.color.unwrap_or(if value.is_some() { desk.look.ink } else { desk.look.ink3 }),
            align,
            role: Role::SpinButton,
        };
        let (response, typed) = cell.show(ui, rect, desk.look, |text| match text {
            "" if self.may_be_empty => edit(None),
            _ => edit(Some(self.unit.to_si(parse_number(text)?))),
        });
        if let Some(edit) = typed {
            desk.edit(edit);
        }
        let Some(value) = value else { return response };
        if !is_editing(ui, self.id) {
            let step_figures = self.significant;
            drag(ui, &response, self.label, value, step_figures, desk, |v| edit(Some(self.unit.to_si(v))).ok());
        }
        response.on_hover_text(format!("{text} {}", self.unit.symbol))
    }
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

/// Reads a number as people write it: decimal comma or point, spaces between thousands, a true minus.
pub fn parse_number(text: &str) -> Result<f64, String> {
    let mut plain: String = text.chars().filter(|c| !c.is_whitespace()).collect();
    plain = plain.replace('\u{2212}', "-");
    if plain.is_empty() {
        return Err("Type a number".to_owned());
    }
    if plain.contains(',') && plain.contains('.') || plain.matches(',').count() > 1 {
        return Err(format!("`{text}`: use one decimal sign and spaces between thousands"));
    }
    match plain.replace(',', ".").parse::<f64>() {
        Ok(value) if value.is_finite() => Ok(value),
        Ok(_) => Err(format!("`{text}` is not finite")),
        Err(_) => Err(format!("`{text}` is not a number")),
    }
}

/// A value in full, without the noise that a change of units leaves in the last digits.
pub fn full_text(value: f64) -> String {
    let rounded: f64 = format!("{value:.11e}").parse().unwrap_or(value);
    rounded.to_string()
}

fn paint_unit(ui: &Ui, row: Rect, symbol: &str, look: &Look) {
    let at = pos2(row.right() - UNIT_COLUMN, row.center().y);
    ui.painter().text(at, Align2::LEFT_CENTER, symbol, font::small(), look.ink3);
}

/// Alt and drag: one step of the last shown figure a point.
fn drag(
    ui: &Ui,
    response: &Response,
    label: &str,
    value: f64,
    significant: usize,
    desk: &mut Desk,
    edit: impl Fn(f64) -> Option<Edit>,
) {
    let start_id = response.id.with("drag from");
    if response.drag_started() && ui.input(|i| i.modifiers.alt) {
        ui.data_mut(|d| d.insert_temp(start_id, value));
        desk.out.push(Proposal::BeginGesture(format!("Change {}", label.to_lowercase())));
    }
    let Some(start) = ui.data(|d| d.get_temp::<f64>(start_id)) else { return };
    let is_over = if ui.input(|i| i.key_pressed(Key::Escape)) {
        desk.out.push(Proposal::CancelGesture);
        true
    } else {
        let exponent = if start == 0.0 { 0.0 } else { start.abs().log10().floor() };
        let step = 10_f64.powf(exponent - (significant as f64 - 1.0).min(2.0));
        let moved = response.total_drag_delta().map_or(0.0, |d| f64::from(d.x));
        if response.dragged()
            && let Some(edit) = edit(((start + moved * step) / step).round() * step)
        {
            desk.edit(edit);
        }
        if response.drag_stopped() {
            desk.out.push(Proposal::EndGesture);
        }
        response.drag_stopped() || !response.dragged()
    };
    if is_over {
        ui.data_mut(|d| d.remove::<f64>(start_id));
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::units::Quantity;

    #[test]
    fn numbers_are_read_as_people_write_them() {
        for (text, want) in [
            ("2,75", Ok(2.75)),
            ("2.75", Ok(2.75)),
            (" 1 325 ", Ok(1325.0)),
            ("1\u{2009}325,5", Ok(1325.5)),
            ("\u{2212}3.92", Ok(-3.92)),
            ("1e-3", Ok(1e-3)),
            ("1,325.5", Err("use one decimal sign")),
            ("1,2,3", Err("use one decimal sign")),
            ("inf", Err("not finite")),
            ("NaN", Err("not finite")),
            ("1e999", Err("not finite")),
            ("twelve", Err("not a number")),
            ("", Err("Type a number")),
        ] {
            match (parse_number(text), want) {
                (Ok(got), Ok(want)) => assert_eq!(got, want, "{text:?}"),
                (Err(got), Err(want)) => assert!(got.contains(want), "{text:?}: {got:?}, expected {want:?}"),
                (got, want) => panic!("{text:?}: {got:?}, expected {want:?}"),
            }
        }
    }

    #[test]
    fn a_value_is_edited_in_full_but_without_noise() {
        let inch = Quantity::Length.unit(crate::units::UnitSystem::UsCustomary);
        assert_eq!(full_text(inch.from_si(inch.to_si(41.3))), "41.3");
        assert_eq!(full_text(1551.25), "1551.25");
        assert_eq!(full_text(-0.25), "-0.25");
    }
}
