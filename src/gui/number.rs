//! Typed numbers: shown rounded, edited in full, with a decimal comma or point; dragged with Alt.

use egui::{Align, Align2, Color32, Id, Key, Rect, Response, Role, Ui, pos2};

use crate::app::Edit;
use crate::units::{Unit, number};

use super::cell::{Cell, is_editing};
use super::field::{number_right, paint_fitting, paint_unit, row_rect};
use super::{Desk, Proposal, font};

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
