//! The verdict column: one row a verdict, the worst first, every limit at the same place. What crosses it fails.

use egui::{Align, Align2, Rect, Response, Role, Sense, Ui, UiBuilder, WidgetInfo, pos2, vec2};

use crate::analysis::{State, Verdict};
use crate::units::{Quantity, number, utilisation_text};

use super::desk::Judged;
use super::{Desk, VerdictAt, field, font, marks, problems, working};

const INSET: f32 = 17.0;
const HEAD: f32 = 30.0;
const STALE_CARD: f32 = 102.0;

/// What the column shows.
#[derive(Clone, Debug, Default)]
pub struct VerdictColumn {
    /// Only verdicts of the chosen case.
    pub is_this_case_only: bool,
}

/// The column in `rect`; each row is `row_height` high.
pub fn verdicts_ui(ui: &mut Ui, rect: Rect, row_height: f32, desk: &mut Desk, column: &mut VerdictColumn) {
    let look = desk.look;
    ui.painter().rect_filled(rect, 0.0, look.panel);
    let (head, body) = rect.split_top_bottom_at_y(rect.top() + HEAD);
    head_ui(ui, head.shrink2(vec2(INSET, 0.0)), desk, column);
    let is_stale = desk.judged().is_some_and(|j| j.is_stale);
    let (body, foot) = body.split_top_bottom_at_y(body.bottom() - if is_stale { STALE_CARD } else { 0.0 });
    let mut child = ui.new_child(UiBuilder::new().max_rect(body).id_salt("verdicts"));
    child.set_clip_rect(body.intersect(ui.clip_rect()));
    egui::ScrollArea::vertical().auto_shrink(false).show(&mut child, |ui| {
        ui.spacing_mut().item_spacing = egui::Vec2::ZERO;
        let Some(judged) = desk.judged() else {
            let words = "Nothing is judged yet: put the faults of the study right first";
            note_ui(ui, desk, words);
            return;
        };
        ui.scope(|ui| {
            if judged.is_stale {
                ui.set_opacity(super::look::STALE_OPACITY);
            }
            layout_ui(ui, row_height, desk, judged);
            rows_ui(ui, row_height, desk, judged, column);
            quiet_rows_ui(ui, desk, judged, column);
        });
        ui.add_space(16.0);
    });
    if is_stale {
        stale_ui(ui, foot, desk);
    }
}

fn head_ui(ui: &mut Ui, rect: Rect, desk: &Desk, column: &mut VerdictColumn) {
    let look = desk.look;
    let y = rect.center().y + 3.0;
    let title = ui.painter().text(pos2(rect.left(), y), Align2::LEFT_CENTER, "Verdicts", font::heading(), look.ink);
    let words = if column.is_this_case_only { "this case only" } else { "all cases" };
    let link = Rect::from_min_max(pos2(title.right() + 16.0, y - 9.0), pos2(rect.right(), y + 11.0));
    let response = field::link_ui(ui, link, Align::Min, words, &format!("Verdicts shown, {words}"), look)
        .on_hover_text("Show the verdicts of all cases, or of the chosen one only");
    if response.clicked() {
        column.is_this_case_only = !column.is_this_case_only;
    }
    let limit = pos2(rect.left() + 0.8 * rect.width(), y);
    ui.painter().text(limit, Align2::CENTER_CENTER, "limit", font::small(), look.ink2);
    ui.painter().text(pos2(rect.right(), y), Align2::RIGHT_CENTER, "used", font::small(), look.ink2);
    ui.painter().hline(rect.x_range(), ui.painter().round_to_pixel_center(rect.bottom() - 0.5), (1.0, look.line));
}

fn rows_ui(ui: &mut Ui, row_height: f32, desk: &mut Desk, judged: Judged, column: &VerdictColumn) {
    let mut n_shown = 0;
    for (c, v) in judged.results.ranked() {
        if column.is_this_case_only && c != desk.view.case_idx {
            continue;
        }
        n_shown += 1;
        verdict_ui(ui, row_height, desk, judged, VerdictAt::Case(c, v));
    }
    if n_shown == 0 {
        note_ui(ui, desk, "No check applies: add a load case, a mouth or a requirement record");
    }
}

/// The layout of plates, judged once for the tank and not for a case.
fn layout_ui(ui: &mut Ui, row_height: f32, desk: &mut Desk, judged: Judged) {
    let layout = &judged.results.layout;
    if layout.verdicts.is_empty() {
        return;
    }
    quiet_heading_ui(ui, desk, "Layout of plates, tank level and at rest");
    for i in 0..layout.verdicts.len() {
        verdict_ui(ui, row_height, desk, judged, VerdictAt::Layout(i));
    }
    quiet_heading_ui(ui, desk, "Load cases");
}

fn verdict_ui(ui: &mut Ui, row_height: f32, desk: &mut Desk, judged: Judged, at: VerdictAt) {
    let look = desk.look;
    let Some(verdict) = at.find(judged.results) else { return };
    let case_idx = at.case_idx();
    let is_open = desk.view.open_verdict == Some(at) && !judged.is_stale;
    let top = ui.cursor().top();
    let (rect, response) = ui.allocate_exact_size(vec2(ui.available_width(), row_height), Sense::click());
    let spoken = spoken_words(verdict, case_idx, desk);
    response.widget_info(|| WidgetInfo::selected(Role::ListBoxOption, true, is_open, &spoken));
    let ground = ui.painter().add(egui::Shape::Noop);
    if response.clicked() {
        desk.view.open_verdict = if is_open { None } else { Some(at) };
        desk.view.case_idx = case_idx.unwrap_or(desk.view.case_idx);
    }
    row_ui(ui, rect, desk, verdict, case_idx, is_open);
    marks::paint_focus(ui.painter(), rect.shrink(5.0), &response, look);
    if is_open {
        working::working_ui(ui, INSET, desk, verdict, case_idx);
    }
    let whole = rect.with_max_y(ui.cursor().top());
    if is_open {
        ui.painter().set(ground, egui::Shape::rect_filled(whole, 0.0, look.raised));
        let bar = Rect::from_min_max(pos2(rect.left(), top), pos2(rect.left() + 3.0, whole.bottom()));
        ui.painter().rect_filled(bar, 0.0, look.accent);
    } else if response.hovered() {
        ui.painter().set(ground, egui::Shape::rect_filled(rect, 0.0, look.hover));
    }
    let y = ui.painter().round_to_pixel_center(whole.bottom() - 0.5);
    ui.painter().hline(whole.shrink2(vec2(INSET, 0.0)).x_range(), y, (1.0, look.line2));
    if !is_open {
        tooltip(response, verdict, case_idx, desk);
    }
}

fn row_ui(ui: &Ui, rect: Rect, desk: &Desk, verdict: &Verdict, case_idx: Option<usize>, is_open: bool) {
    let look = desk.look;
    let painter = ui.painter();
    let inner = rect.shrink2(vec2(INSET, 0.0));
    let line_y = rect.top() + 15.0;
    marks::paint_cup(painter, pos2(inner.left() + 8.0, line_y), 15.0, verdict.state, look);
    let number = painter.text(
        pos2(inner.right(), line_y),
        Align2::RIGHT_CENTER,
        utilisation_text(verdict.utilisation),
        font::number(),
        look.state_number(verdict.state),
    );
    let is_loud = is_open || matches!(verdict.state, State::Fails | State::NotJudged);
    let font = if is_loud { font::heading() } else { font::name() };
    let name = Rect::from_min_max(pos2(inner.left() + 24.0, line_y - 9.0), pos2(number.left() - 22.0, line_y + 9.0));
    let at = field::paint_job(ui, name, Align::Min, font::runs([(verdict.criterion, font, look.ink)]));
    if verdict.unconfirmed_record.is_some() {
        marks::paint_record_mark(painter, pos2(at.right() + 11.0, line_y + 0.5), false, look);
    }
    let bar = Rect::from_min_size(pos2(inner.left(), rect.top() + 25.0), vec2(inner.width(), 10.0));
    marks::paint_bar(painter, bar, verdict.utilisation, verdict.state, look);
    if rect.height() < 50.0 {
        return;
    }
    let y = rect.top() + 43.0;
    marks::paint_trust(painter, pos2(inner.right(), y), &verdict.trust, look);
    let right = inner.right() - marks::trust_width(verdict.trust.len()) - 6.0;
    let third = Rect::from_min_max(pos2(inner.left(), y - 8.0), pos2(right, y + 8.0));
    third_line_ui(ui, third, desk, verdict, case_idx);
}

fn third_line_ui(ui: &Ui, rect: Rect, desk: &Desk, verdict: &Verdict, case_idx: Option<usize>) {
    let look = desk.look;
    let (small, strong) = (font::small, font::small_figure);
    let case = case_idx.map_or_else(String::new, |i| format!("case {}, ", i + 1));
    let place = format!("{case}{}", verdict.place_words);
    let job = match (verdict.demand, verdict.limit) {
        (Some(demand), Some(limit)) if verdict.state != State::NotJudged => {
            let unit = desk.unit_near(demand.quantity, demand.si.abs().max(limit.si.abs()));
            let significant = if demand.quantity == Quantity::Count { 1 } else { 3 };
            let [demand, limit] = [demand, limit].map(|m| number(unit.from_si(m.si), significant));
            let gap = if ["°", ""].contains(&unit.symbol) { "" } else { " " };
            let sense = format!("{gap}{}, {} ", unit.symbol, verdict.sense.words());
            let numbers = [
                (demand.as_str(), strong(), look.ink),
                (&sense, small(), look.ink2),
                (&limit, strong(), look.ink),
                ("   ", small(), look.ink2),
            ];
            let taken = ui.painter().layout_job(font::runs(numbers.clone())).size().x;
            let place = field::shortened(ui, &place, &small(), rect.width() - taken);
            font::runs(numbers.into_iter().chain([(place.as_str(), small(), look.ink2)]))
        }
        _ => {
            let remark = if verdict.remark.is_empty() { verdict.state.word() } else { &verdict.remark };
            font::runs([(case.as_str(), small(), look.ink2), (remark, small(), look.ink2)])
        }
    };
    field::paint_job(ui, rect, Align::Min, job);
}

/// Checks that do not apply, and what the user should know of the input: quiet, never left out.
fn quiet_rows_ui(ui: &mut Ui, desk: &mut Desk, judged: Judged, column: &VerdictColumn) {
    let mut rows: Vec<(String, String, Vec<usize>)> = Vec::new();
    for (c, case) in judged.results.cases.iter().enumerate() {
        if column.is_this_case_only && c != desk.view.case_idx {
            continue;
        }
        for absent in case.absent.iter().chain(&judged.results.layout.absent) {
            let title = match absent.place_words.as_str() {
                "" => absent.criterion.to_owned(),
                place => format!("{}, {place}", absent.criterion),
            };
            let reason = absent.reason.text(desk.view.units);
            match rows.iter_mut().find(|(t, r, _)| *t == title && *r == reason) {
                Some((_, _, cases)) => cases.push(c),
                None => rows.push((title, reason, vec![c])),
            }
        }
    }
    if !rows.is_empty() {
        quiet_heading_ui(ui, desk, "Does not apply");
    }
    let n_cases = if column.is_this_case_only { 1 } else { judged.results.cases.len() };
    for (title, reason, cases) in rows {
        let numbers: Vec<String> = cases.iter().map(|c| (c + 1).to_string()).collect();
        let title = if cases.len() == n_cases { title } else { format!("{title}, case {}", numbers.join(", ")) };
        quiet_row_ui(ui, desk, &title, &reason);
    }
    if !judged.results.warnings.is_empty() {
        quiet_heading_ui(ui, desk, "To know of the input");
    }
    for (i, warning) in judged.results.warnings.iter().enumerate() {
        let title = problems::capitalised(&warning.place.to_string());
        quiet_row_ui(ui, desk, &title, &format!("{} {}", warning.message, warning.hint));
        if let Some(Some(mend)) = desk.doc.mends().get(i).filter(|_| !judged.is_stale) {
            let rect = field::row_rect(ui).shrink2(vec2(INSET, 0.0));
            if field::link_ui(ui, rect, Align::Min, &mend.words, &mend.words, desk.look).clicked() {
                desk.edit(mend.edit.clone());
            }
        }
    }
}

fn quiet_heading_ui(ui: &mut Ui, desk: &Desk, title: &str) {
    ui.add_space(10.0);
    let (rect, _) = ui.allocate_exact_size(vec2(ui.available_width(), 22.0), Sense::hover());
    let at = pos2(rect.left() + INSET, rect.center().y);
    ui.painter().text(at, Align2::LEFT_CENTER, title, font::heading(), desk.look.ink2);
}

fn quiet_row_ui(ui: &mut Ui, desk: &Desk, title: &str, words: &str) {
    let width = ui.available_width() - 2.0 * INSET;
    let mut job = font::runs([
        (title, font::small_figure(), desk.look.ink2),
        ("   ", font::small(), desk.look.ink2),
        (words, font::small(), desk.look.ink3),
    ]);
    job.wrap.max_width = width;
    let galley = ui.painter().layout_job(job);
    let (rect, response) = ui.allocate_exact_size(vec2(ui.available_width(), galley.size().y + 8.0), Sense::hover());
    response.widget_info(|| WidgetInfo::labeled(Role::Label, true, format!("{title}, {words}")));
    ui.painter().galley(rect.min + vec2(INSET, 4.0), galley, desk.look.ink3);
}

fn note_ui(ui: &mut Ui, desk: &Desk, words: &str) {
    quiet_row_ui(ui, desk, "", words);
}

/// The card that says of when the greyed verdicts are.
fn stale_ui(ui: &Ui, foot: Rect, desk: &Desk) {
    let look = desk.look;
    let card = foot.shrink2(vec2(INSET, 12.0));
    ui.painter().rect(card, egui::CornerRadius::same(3), look.raised, (1.0, look.line), egui::StrokeKind::Inside);
    let at = card.min + vec2(14.0, 12.0);
    ui.painter().text(at, Align2::LEFT_TOP, "From before the faults", font::body_heavy(), look.ink);
    for (i, words) in ["The study has faults, so nothing is judged.", "Put them right, or undo."].iter().enumerate() {
        let at = at + vec2(0.0, 20.0 + 16.0 * i as f32);
        ui.painter().text(at, Align2::LEFT_TOP, *words, font::small(), look.ink2);
    }
}

fn tooltip(response: Response, verdict: &Verdict, case_idx: Option<usize>, desk: &Desk) {
    response.on_hover_ui(|ui| {
        ui.label(spoken_words(verdict, case_idx, desk));
        if !verdict.remark.is_empty() {
            ui.label(egui::RichText::new(&verdict.remark).color(desk.look.ink2));
        }
        ui.label(egui::RichText::new(marks::trust_words(&verdict.trust)).font(font::small()).color(desk.look.ink2));
    });
}

/// What assistive technology says: `Freeboard, fails, 1.09, 473 mm, at most 435 mm, hatch 1, case 3`.
fn spoken_words(verdict: &Verdict, case_idx: Option<usize>, desk: &Desk) -> String {
    let mut words =
        vec![verdict.criterion.to_owned(), verdict.state.word().to_owned(), utilisation_text(verdict.utilisation)];
    words.extend(verdict.demand.map(|demand| desk.text(demand)));
    words.extend(verdict.limit.map(|limit| format!("{} {}", verdict.sense.words(), desk.text(limit))));
    words.push(verdict.place_words.clone());
    words.extend(case_idx.map(|i| format!("case {}", i + 1)));
    words.join(", ")
}
