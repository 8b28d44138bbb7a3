//! A value that reads as text and becomes a text edit when it is clicked, or entered with the keyboard.
//!
//! Dots under it: typed by the user. Plain: computed. Knows no study; what the text means is the caller's.

use egui::{Align, Align2, Color32, FontId, Id, Key, Rect, Response, Role, Sense, Shape, Ui, WidgetInfo, vec2};

use super::{Look, font, marks};

/// One such value.
pub struct Cell<'a> {
    /// Unique in the window.
    pub id: Id,
    /// What it is called, for those who do not see it.
    pub label: &'a str,
    /// What it reads.
    pub shown: &'a str,
    /// What is edited: the full value.
    pub text: &'a str,
    /// Whether the user gave it, rather than the program worked it out.
    pub is_typed: bool,
    /// Font of the text.
    pub font: FontId,
    /// Its colour.
    pub color: Color32,
    /// Side that it keeps to.
    pub align: Align,
    /// Role told to assistive technology.
    pub role: Role,
}

#[derive(Clone, Default)]
struct Draft {
    text: String,
    refusal: Option<String>,
    is_new: bool,
    shown_in_pass: u64,
}

impl Cell<'_> {
    /// Shows the value within `rect`. Gives the value when one was typed that `parse` takes; words of refusal stand
    /// beside the text until it is mended or called off.
    pub fn show<T>(
        self,
        ui: &mut Ui,
        rect: Rect,
        look: &Look,
        parse: impl Fn(&str) -> Result<T, String>,
    ) -> (Response, Option<T>) {
        // A draft whose cell was away for a while (its panel was shut) is forgotten, never taken late.
        let pass = ui.ctx().cumulative_pass_nr();
        let draft = ui.data(|d| d.get_temp::<Draft>(self.id)).filter(|d| d.shown_in_pass + 1 >= pass);
        match draft {
            None => (self.read_ui(ui, rect, look), None),
            Some(draft) => self.edit_ui(ui, rect, look, Draft { shown_in_pass: pass, ..draft }, parse),
        }
    }

    fn read_ui(self, ui: &Ui, rect: Rect, look: &Look) -> Response {
        let response = ui.interact(rect, self.id, Sense::click_and_drag());
        response.widget_info(|| WidgetInfo {
            current_text_value: Some(self.shown.to_owned()),
            ..WidgetInfo::labeled(self.role, ui.is_enabled(), self.label)
        });
        if ui.is_enabled() && response.clicked() {
            let shown_in_pass = ui.ctx().cumulative_pass_nr();
            let draft = Draft { text: self.text.to_owned(), refusal: None, is_new: true, shown_in_pass };
            ui.data_mut(|d| d.insert_temp(self.id, draft));
            ui.ctx().request_repaint();
        }
        let anchor = Align2([self.align, Align::Center]);
        let mut job = font::runs([(self.shown, self.font, self.color)]);
        job.wrap.max_width = rect.width();
        job.wrap.max_rows = 1;
        job.wrap.break_anywhere = true;
        let galley = ui.painter().layout_job(job);
        let text = anchor.align_size_within_rect(galley.size(), rect);
        ui.painter().galley(text.min, galley, self.color);
        let hovered = ui.is_enabled() && response.hovered();
        if self.is_typed || hovered {
            let y = ui.painter().round_to_pixel_center(text.bottom() + 0.5);
            let seen =
                Align2([self.align, Align::Center]).align_size_within_rect(vec2(text.width().max(12.0), 1.0), rect);
            let x = seen.x_range();
            let ends = [egui::pos2(x.min, y), egui::pos2(x.max, y)];
            let color = if hovered { look.accent } else { look.ink3 };
            ui.painter().extend(Shape::dashed_line(&ends, (1.0, color), 1.5, 1.5));
        }
        if hovered {
            ui.ctx().set_cursor_icon(egui::CursorIcon::Text);
        }
        marks::paint_focus(ui.painter(), rect, &response, look);
        response
    }

    fn edit_ui<T>(
        self,
        ui: &mut Ui,
        rect: Rect,
        look: &Look,
        mut draft: Draft,
        parse: impl Fn(&str) -> Result<T, String>,
    ) -> (Response, Option<T>) {
        let edit_id = self.id.with("edit");
        let edit = egui::TextEdit::singleline(&mut draft.text)
            .id(edit_id)
            .font(self.font)
            .align(Align2([self.align, Align::Center]))
            .margin(vec2(3.0, 1.0))
            .desired_width(f32::INFINITY)
            .clip_text(true);
        let rect = rect.expand2(vec2(3.0, 0.0));
        let response = ui.name_inputs(self.label, |ui| ui.place(rect, edit));
        if draft.is_new {
            draft.is_new = false;
            response.request_focus();
            select_all(ui, edit_id, &draft.text);
            ui.data_mut(|d| d.insert_temp(self.id, draft));
            return (response, None);
        }
        if response.changed() {
            draft.refusal = None;
        }
        let mut taken = None;
        let mut is_done = false;
        if !response.has_focus() {
            let (escaped, entered) = ui.input(|i| (i.key_pressed(Key::Escape), i.key_pressed(Key::Enter)));
            let is_unchanged = draft.text == self.text;
            is_done = true;
            if !escaped && !is_unchanged {
                match parse(draft.text.trim()) {
                    Ok(value) => taken = Some(value),
                    Err(words) if entered => {
                        draft.refusal = Some(words);
                        response.request_focus();
                        is_done = false;
                    }
                    Err(_) => {}
                }
            }
            if is_done && (escaped || entered) {
                ui.memory_mut(|m| m.request_focus(self.id));
            }
        }
        if let Some(words) = &draft.refusal {
            refusal_ui(ui, &response, words, look);
        }
        ui.data_mut(|d| {
            if is_done {
                d.remove::<Draft>(self.id);
            } else {
                d.insert_temp(self.id, draft);
            }
        });
        (response, taken)
    }
}

/// Whether the value with this id is being typed now.
pub fn is_editing(ui: &Ui, id: Id) -> bool {
    ui.data(|d| d.get_temp::<Draft>(id).is_some())
}

fn refusal_ui(ui: &Ui, response: &Response, words: &str, look: &Look) {
    egui::Tooltip::always_open(
        ui.ctx().clone(),
        ui.layer_id(),
        response.id.with("refusal"),
        egui::PopupAnchor::from(response),
    )
    .show(|ui| ui.label(egui::RichText::new(words).color(look.state(crate::analysis::State::Fails))));
}

fn select_all(ui: &Ui, id: Id, text: &str) {
    let mut state = egui::text_edit::TextEditState::load(ui.ctx(), id).unwrap_or_default();
    let end = egui::text::CCursor::new(text.chars().count());
    state.cursor.set_char_range(Some(egui::text::CCursorRange::two(egui::text::CCursor::new(0), end)));
    state.store(ui.ctx(), id);
}
