//! The working of the opened verdict: formulas with the numbers put in, what would make it hold, trust, source, and
//! the requirement record that its limit comes from.

use egui::{Align, Rect, Ui, UiBuilder, pos2, vec2};

use crate::analysis::{Reach, State, Verdict};
use crate::app::Edit;
use crate::units::Measure;

use super::tank::confirm;
use super::{Desk, field, font, formula};

const LABEL: f32 = 46.0;

/// The working, below the verdict's row; `inset` from both sides of the column.
pub fn working_ui(ui: &mut Ui, inset: f32, desk: &mut Desk, verdict: &Verdict, case_idx: Option<usize>) {
    let outer = ui.available_rect_before_wrap();
    let inner = outer.with_min_x(outer.left() + inset).with_max_x(outer.right() - inset);
    ui.scope_builder(UiBuilder::new().max_rect(inner), |ui| {
        ui.spacing_mut().item_spacing = egui::Vec2::ZERO;
        rule_ui(ui, desk);
        for line in &verdict.working {
            let color = if verdict.state == State::Fails && verdict.demand == Some(line.result) {
                desk.look.state(State::Fails)
            } else {
                desk.look.ink
            };
            work_line_ui(ui, desk, &line.symbols, None, color);
            work_line_ui(ui, desk, &format!("= {}", line.numbers), Some(line.result), color);
            ui.add_space(4.0);
        }
        if !verdict.working.is_empty() {
            rule_ui(ui, desk);
        }
        if !verdict.mend.is_empty() {
            let mend: Vec<String> = verdict.mend.iter().map(|m| m.text(desk.view.units)).collect();
            paragraph_ui(ui, &mend.join(" "), font::figure(), desk.look.ink);
        }
        if !verdict.remark.is_empty() {
            paragraph_ui(ui, &verdict.remark, font::body(), desk.look.ink2);
        }
        ui.add_space(2.0);
        labelled_ui(ui, desk, "Trust", &trust_text(verdict));
        let entry = verdict.source.entry();
        labelled_ui(ui, desk, "Source", &entry.short).on_hover_text(format!("{}\n{}", entry.full, entry.status));
        record_ui(ui, desk, verdict);
        if let Some(case_idx) = case_idx {
            note_ui(ui, desk, verdict, case_idx);
        }
        ui.add_space(10.0);
    });
}

fn work_line_ui(ui: &mut Ui, desk: &Desk, text: &str, result: Option<Measure>, color: egui::Color32) {
    let mut words = formula::parse(text);
    if let Some(result) = result {
        words.extend(formula::parse("="));
        words.push(formula::result(&desk.text(result)));
    }
    let at = ui.cursor().min;
    let size = formula::formula_ui(ui.painter(), at, ui.available_width(), &words, desk.look.ink2, color);
    ui.advance_cursor_after_rect(Rect::from_min_size(at, vec2(ui.available_width(), size.y)));
}

fn rule_ui(ui: &mut Ui, desk: &Desk) {
    let (rect, _) = ui.allocate_exact_size(vec2(ui.available_width(), 13.0), egui::Sense::hover());
    let y = ui.painter().round_to_pixel_center(rect.center().y);
    ui.painter().hline(rect.x_range(), y, (1.0, desk.look.line2));
}

fn paragraph_ui(ui: &mut Ui, text: &str, font: egui::FontId, color: egui::Color32) {
    ui.add(egui::Label::new(egui::RichText::new(text).font(font).color(color)).wrap());
    ui.add_space(3.0);
}

fn labelled_ui(ui: &mut Ui, desk: &Desk, label: &str, text: &str) -> egui::Response {
    let whole = ui.available_rect_before_wrap();
    let at = pos2(whole.left(), whole.top() + 6.5);
    ui.painter().text(at, egui::Align2::LEFT_CENTER, label, font::small(), desk.look.ink3);
    let right = whole.with_min_x(whole.left() + LABEL);
    let response = ui.scope_builder(UiBuilder::new().max_rect(right), |ui| {
        let text = egui::RichText::new(text).font(font::small()).color(desk.look.ink2);
        ui.add(egui::Label::new(text).wrap().sense(egui::Sense::hover()))
    });
    ui.add_space(3.0);
    response.inner
}

/// What limits trust; one sentence where nothing does.
fn trust_text(verdict: &Verdict) -> String {
    let told: Vec<String> = verdict
        .trust
        .iter()
        .filter(|t| t.reach != Reach::Inside)
        .map(|t| format!("{}: {}", t.name, t.words))
        .collect();
    if told.is_empty() { "inside the method's range on all five".to_owned() } else { told.join("; ") }
}

/// The requirement record that gives the limit: clause, edition, where it came from, and whether anyone has confirmed it.
fn record_ui(ui: &mut Ui, desk: &mut Desk, verdict: &Verdict) {
    let Some((i, record)) = verdict.record.and_then(|i| Some((i, desk.study().records.get(i)?))) else { return };
    let state = if record.confirmed { "confirmed" } else { "unconfirmed" };
    labelled_ui(ui, desk, "Limit", &format!("{}, {state}", record.title));
    let given = |text: &str, none: &str| if text.is_empty() { none.to_owned() } else { text.to_owned() };
    labelled_ui(ui, desk, "Clause", &given(&record.clause, "none given"));
    labelled_ui(ui, desk, "Edition", &given(&record.edition, "none given"));
    labelled_ui(ui, desk, "From", &given(&record.origin, "no origin given"));
    if !record.confirmed {
        let rect = field::row_rect(ui).with_min_x(ui.cursor().left() + LABEL);
        if field::link_ui(ui, rect, Align::Min, "Confirm this record", "Confirm this record", desk.look).clicked() {
            desk.edit(confirm(&desk.study().records, i, true));
        }
    }
}

fn note_ui(ui: &mut Ui, desk: &mut Desk, verdict: &Verdict, case_idx: usize) {
    let Some(case) = desk.study().cases.get(case_idx) else { return };
    let notes = &desk.study().verdict_notes;
    let text = notes
        .iter()
        .find(|note| note.case == case.name && note.criterion == verdict.criterion)
        .map_or("", |note| note.text.as_str());
    let rect = field::row_rect(ui);
    let label = "Note beside the verdict";
    field::paint_fitting(ui, rect, Align::Min, "Note", font::small(), desk.look.ink3);
    let id = ("verdict note", case_idx, verdict.criterion);
    field::text_cell_ui(ui, rect.with_min_x(rect.left() + LABEL), Align::Min, desk, id, label, text, |text| {
        Edit::VerdictNote(case.name.clone(), verdict.criterion.to_owned(), text)
    });
}
