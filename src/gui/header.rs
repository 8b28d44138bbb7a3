//! The header: name, menus, what is open, and how many verdicts stand in each state.

use std::path::PathBuf;

use egui::{Align2, Button, Color32, Rect, Role, Sense, Ui, UiBuilder, WidgetInfo, pos2, vec2};

use crate::analysis::State;
use crate::app::{Derived, EXAMPLES};
use crate::problem::Severity;

use super::commands::{Menu, TABLE};
use super::{Command, Desk, field, font, marks};

/// The header in `rect`.
pub fn header_ui(ui: &mut Ui, rect: Rect, is_folded: bool, desk: &mut Desk, recent: &[PathBuf]) {
    let look = desk.look;
    ui.painter().rect_filled(rect, 0.0, look.panel);
    let inset = rect.shrink2(vec2(16.0, 0.0));
    let middle = rect.center().y;
    let name =
        ui.painter().text(pos2(inset.left(), middle), Align2::LEFT_CENTER, "brimwright", font::title(), look.ink);
    let menus = menus_ui(ui, inset.with_min_x(name.right() + 12.0), is_folded, desk, recent);
    let right = counts_ui(ui, inset, desk);

    let x = ui.painter().round_to_pixel_center(menus.right() + 14.0);
    ui.painter().vline(x, egui::Rangef::new(middle - 9.0, middle + 9.0), (1.0, look.line));
    let title = Rect::from_min_max(pos2(x + 14.0, rect.top()), pos2(right - 16.0, rect.bottom()));
    title_ui(ui, title, desk);
    ui.painter().hline(rect.x_range(), ui.painter().round_to_pixel_center(rect.bottom() - 0.5), (1.0, look.line));
}

/// All rows of one menu.
pub fn menu_rows_ui(ui: &mut Ui, menu: Menu, desk: &mut Desk, recent: &[PathBuf]) {
    ui.set_min_width(230.0);
    ui.spacing_mut().interact_size.y = 24.0;
    ui.spacing_mut().item_spacing.y = 0.0;
    for row in TABLE.iter().filter(|row| row.menu == menu) {
        if row.starts_group {
            ui.separator();
        }
        let shortcut = row.shortcut.map(|s| ui.ctx().format_shortcut(&s)).unwrap_or_default();
        let is_chosen = match row.command {
            Command::Units(units) => desk.view.units == units,
            Command::Theme(theme) => ui.ctx().options(|o| o.theme_preference) == theme,
            _ => false,
        };
        let hint = egui::RichText::new(shortcut).color(desk.look.ink3);
        let button = Button::new(row.words(desk.doc))
            .right_text(hint)
            .selected(is_chosen)
            .wrap_mode(egui::TextWrapMode::Extend);
        let is_enabled = (row.is_enabled)(desk.doc, desk.view);
        if ui.add_enabled(is_enabled, button).on_hover_text(row.tooltip).clicked() {
            desk.run(row.command);
            ui.close();
        }
        if row.command == Command::Open {
            files_ui(ui, desk, recent);
        }
    }
}

fn files_ui(ui: &mut Ui, desk: &mut Desk, recent: &[PathBuf]) {
    let mut chosen = None;
    ui.add_enabled_ui(!recent.is_empty(), |ui| {
        ui.menu_button("Open recent", |ui| {
            for (i, path) in recent.iter().enumerate() {
                let name = path.file_name().map_or_else(|| path.to_string_lossy(), |name| name.to_string_lossy());
                if ui.button(name).on_hover_text(path.to_string_lossy()).clicked() {
                    chosen = Some(Command::OpenRecent(i));
                }
            }
        });
    });
    ui.menu_button("Open an example", |ui| {
        for (i, example) in EXAMPLES.iter().enumerate() {
            let name = example.file_name.split('.').next().unwrap_or(example.file_name).replace(['_', '-'], " ");
            if ui.button(name).clicked() {
                chosen = Some(Command::OpenExample(i));
            }
        }
    });
    if let Some(command) = chosen {
        desk.run(command);
        ui.close();
    }
}

/// The menus; gives the room that they take.
fn menus_ui(ui: &mut Ui, rect: Rect, is_folded: bool, desk: &mut Desk, recent: &[PathBuf]) -> Rect {
    let mut child = ui.new_child(UiBuilder::new().max_rect(rect.shrink2(vec2(0.0, 8.0))).id_salt("menus"));
    let mut taken = Rect::from_min_size(rect.min, egui::Vec2::ZERO);
    egui::MenuBar::new().ui(&mut child, |ui| {
        ui.spacing_mut().button_padding = vec2(8.0, 3.0);
        ui.spacing_mut().item_spacing.x = 2.0;
        if is_folded {
            let button = ui.menu_button("Menu", |ui| {
                for menu in Menu::ALL {
                    ui.menu_button(menu.word(), |ui| menu_rows_ui(ui, menu, desk, recent));
                }
            });
            taken = taken.union(button.response.rect);
        } else {
            for menu in Menu::ALL {
                let button = ui.menu_button(menu.word(), |ui| menu_rows_ui(ui, menu, desk, recent));
                taken = taken.union(button.response.rect);
            }
        }
    });
    taken
}

fn title_ui(ui: &mut Ui, rect: Rect, desk: &Desk) {
    let (doc, look) = (desk.doc, desk.look);
    let study = doc.study();
    let title = if study.title.is_empty() { "Untitled" } else { &study.title };
    let mut notes = Vec::new();
    if !study.revision.is_empty() {
        notes.push(format!("revision {}", study.revision));
    }
    notes.push(match (doc.is_unsaved(), &doc.path) {
        (true, _) => "unsaved changes".to_owned(),
        (false, Some(_)) => "saved".to_owned(),
        (false, None) => "not in a file yet".to_owned(),
    });
    let notes = notes.join(", ");
    let job = font::runs([
        (title, font::body_heavy(), look.ink),
        ("   ", font::small(), look.ink),
        (&notes, font::small(), look.ink2),
    ]);
    let at = field::paint_job(ui, rect, egui::Align::Min, job);
    let response = ui.interact(at, egui::Id::unique("document title"), Sense::hover());
    response.widget_info(|| WidgetInfo::labeled(Role::Label, true, format!("{title}, {notes}")));
    if let Some(path) = &doc.path {
        response.on_hover_text(path.to_string_lossy());
    }
}

/// Cups with their counts, or the count of faults. Gives the left end.
fn counts_ui(ui: &Ui, rect: Rect, desk: &Desk) -> f32 {
    let look = desk.look;
    let mut x = rect.right();
    let y = rect.center().y;
    if let Derived::Faulty { problems, .. } = desk.doc.derived() {
        let n = problems.iter().filter(|p| p.severity == Severity::Fault).count();
        let words = if n == 1 { "1 fault".to_owned() } else { format!("{n} faults") };
        let color = look.state(State::Fails);
        let text = ui.painter().text(pos2(x, y), Align2::RIGHT_CENTER, &words, font::body_heavy(), color);
        ui.painter().circle_stroke(pos2(text.left() - 12.0, y), 5.5, (1.75, color));
        speak(ui, text.expand2(vec2(20.0, 4.0)), "count of faults", &words);
        return text.left() - 22.0;
    }
    let Some(judged) = desk.judged() else { return x };
    for state in State::ALL.into_iter().rev() {
        let n = judged.results.count(state);
        let color: Color32 = if n == 0 { look.ink3 } else { look.state(state) };
        let text = ui.painter().text(pos2(x, y), Align2::RIGHT_CENTER, n.to_string(), font::body_heavy(), color);
        marks::paint_cup(ui.painter(), pos2(text.left() - 13.0, y), 15.0, state, look);
        let spot = text.with_min_x(text.left() - 22.0).expand2(vec2(0.0, 4.0));
        speak(ui, spot, state.word(), &format!("{n} {}", state.word()));
        x = spot.left() - 14.0;
    }
    x
}

fn speak(ui: &Ui, rect: Rect, id: &str, words: &str) {
    let response = ui.interact(rect, egui::Id::unique(("header", id)), Sense::hover());
    response.widget_info(|| WidgetInfo::labeled(Role::Label, true, words));
    response.on_hover_text(words);
}
