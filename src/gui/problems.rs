//! The list of problems: what is wrong, where, how to mend it. It takes the plot area while the study has faults, or
//! while a file could not be opened. What one obvious step mends has a button for it.

use egui::{Align, Align2, Button, Rect, Role, Sense, Ui, UiBuilder, WidgetInfo, pos2, vec2};

use crate::app::{Derived, Mend};
use crate::problem::{Place, Problem, Severity};

use super::{Command, Desk, Selected, field, font, marks};

const ROW: f32 = 55.0;

/// Problems of a file that was not opened, or not written; the document that was open is kept.
#[derive(Clone, Debug, PartialEq)]
pub struct FileTrouble {
    /// `tank.ron could not be opened`.
    pub title: String,
    /// Why, with line and column.
    pub problems: Vec<Problem>,
}

/// The faults of the study in `rect`.
pub fn problems_ui(ui: &mut Ui, rect: Rect, desk: &mut Desk) {
    let Derived::Faulty { problems, stale } = desk.doc.derived() else { return };
    let stale = match stale {
        Some(_) => " The verdicts at the right are of the last study without faults.",
        None => "",
    };
    let note = format!("{}.{stale}", counts(problems));
    let button = desk.doc.undo_label().map(|label| format!("Undo {}", super::commands::lower_first(label)));
    let mends = desk.doc.mends();
    let undo = button.map(|words| (words, Command::Undo));
    list_ui(ui, rect, desk, "Put right before judging", &note, problems, Some(mends), undo);
}

/// The problems of a file in `rect`. Gives whether the list was closed.
pub fn file_trouble_ui(ui: &mut Ui, rect: Rect, desk: &mut Desk, trouble: &FileTrouble) -> bool {
    let note = "The scenario that was open is kept.";
    list_ui(ui, rect, desk, &trouble.title, note, &trouble.problems, None, None);
    let head = rect.shrink2(vec2(16.0, 8.0)).with_max_y(rect.top() + 28.0);
    field::link_ui(ui, head, Align::Max, "Close this list", "Close this list", desk.look).clicked()
}

#[expect(clippy::too_many_arguments, reason = "one list in two places")]
fn list_ui(
    ui: &mut Ui,
    rect: Rect,
    desk: &mut Desk,
    title: &str,
    note: &str,
    problems: &[Problem],
    mends: Option<&[Option<Mend>]>,
    undo: Option<(String, Command)>,
) {
    let look = desk.look;
    ui.painter().rect_filled(rect, 0.0, look.board);
    let head = rect.shrink2(vec2(16.0, 8.0)).with_max_y(rect.top() + 28.0);
    let job = font::runs([
        (title, font::heading(), look.ink),
        ("      ", font::small(), look.ink),
        (note, font::small(), look.ink2),
    ]);
    field::paint_job(ui, head.with_max_x(head.right() - 100.0), Align::Min, job);
    ui.painter().hline(head.x_range(), ui.painter().round_to_pixel_center(head.bottom()), (1.0, look.line));
    let body = rect.with_min_y(head.bottom() + 1.0);
    let mut child = ui.new_child(UiBuilder::new().max_rect(body).id_salt("problems"));
    child.set_clip_rect(body.intersect(ui.clip_rect()));
    egui::ScrollArea::vertical().auto_shrink(false).show(&mut child, |ui| {
        ui.spacing_mut().item_spacing = egui::Vec2::ZERO;
        for (i, problem) in problems.iter().enumerate() {
            let mend = mends.and_then(|mends| mends.get(i)?.as_ref());
            let undo = undo.as_ref().filter(|_| i == 0);
            problem_ui(ui, desk, i, problem, mends.is_some(), mend, undo);
        }
    });
}

fn problem_ui(
    ui: &mut Ui,
    desk: &mut Desk,
    i: usize,
    problem: &Problem,
    is_on_board: bool,
    mend: Option<&Mend>,
    undo: Option<&(String, Command)>,
) {
    let look = desk.look;
    let (rect, response) = ui.allocate_exact_size(vec2(ui.available_width(), ROW), Sense::click());
    let spoken = problem.to_string();
    response.widget_info(|| WidgetInfo::labeled(Role::ListItem, true, &spoken));
    let chosen = selected(&problem.place).filter(|_| is_on_board);
    let is_chosen = chosen.is_some() && desk.view.selected == chosen;
    if is_chosen || response.hovered() {
        ui.painter().rect_filled(rect, 0.0, if is_chosen { look.sel } else { look.hover });
    }
    if is_chosen {
        ui.painter().rect_filled(rect.with_max_x(rect.left() + 3.0), 0.0, look.accent);
    }
    if response.clicked() && is_on_board {
        desk.view.selected = chosen;
        if let Place::Case(case_idx) = problem.place {
            desk.view.case_idx = case_idx;
        }
    }
    let inner = rect.shrink2(vec2(16.0, 0.0));
    let mark = pos2(inner.left() + 13.0, rect.top() + 22.0);
    match problem.severity {
        Severity::Fault => marks::paint_fault(ui.painter(), mark, 9.5, i + 1, look),
        Severity::Warning => marks::paint_warning(ui.painter(), mark, 9.5, i + 1, look),
    }
    let button_width = if mend.is_some() || undo.is_some() { 200.0 } else { 0.0 };
    let text = inner.with_min_x(inner.left() + 36.0).with_max_x(inner.right() - button_width);
    let at = |y: f32| {
        Rect::from_min_max(pos2(text.left(), rect.top() + y - 9.0), pos2(text.right(), rect.top() + y + 9.0))
    };
    let place = capitalised(&problem.place.to_string());
    let job = font::runs([
        (place.as_str(), font::heading(), look.ink),
        ("    ", font::small(), look.ink),
        (problem.message.as_str(), font::name(), look.ink),
    ]);
    field::paint_job(ui, at(16.0), Align::Min, job);
    field::paint_fitting(ui, at(36.0), Align::Min, &problem.hint, font::small(), look.ink2);
    let y = ui.painter().round_to_pixel_center(rect.bottom() - 0.5);
    ui.painter().hline(inner.x_range(), y, (1.0, look.line2));
    marks::paint_focus(ui.painter(), rect.shrink(4.0), &response, look);
    // One button in the middle, two one above the other.
    let both = mend.is_some() && undo.is_some();
    let place = |is_lower: bool| {
        let off = vec2(
            0.0,
            if !both {
                0.0
            } else if is_lower {
                13.0
            } else {
                -13.0
            },
        );
        Align2::RIGHT_CENTER.align_size_within_rect(vec2(188.0, 24.0), inner.translate(off))
    };
    if let Some(Mend { words, edit }) = mend
        && ui.place(place(false), Button::new(words).truncate()).clicked()
    {
        desk.edit(edit.clone());
    }
    if let Some((words, command)) = undo
        && ui.place(place(true), Button::new(words).truncate()).clicked()
    {
        desk.run(*command);
    }
    response.on_hover_text(spoken);
}

/// `text` with a capital to begin with.
pub(super) fn capitalised(text: &str) -> String {
    let mut chars = text.chars();
    chars.next().map(|c| c.to_uppercase().chain(chars).collect()).unwrap_or_default()
}

/// What on the board a problem is about.
fn selected(place: &Place) -> Option<Selected> {
    match *place {
        Place::Edge(i) => Some(Selected::Edge(i)),
        Place::Vertex(i) => Some(Selected::Vertex(i)),
        Place::Crossing { edge_idx, .. } => Some(Selected::Edge(edge_idx)),
        Place::Obstacle { obstacle_idx, .. } => Some(Selected::Obstacle(obstacle_idx)),
        Place::Plate { plate_idx, opening_idx: None } => Some(Selected::Plate(plate_idx)),
        Place::Plate { plate_idx, opening_idx: Some(o) } => Some(Selected::Opening(plate_idx, o)),
        Place::Compartment(i) => Some(Selected::Compartment(i)),
        Place::Point(i) => Some(Selected::Point(i)),
        _ => None,
    }
}

fn counts(problems: &[Problem]) -> String {
    let n_faults = problems.iter().filter(|p| p.severity == Severity::Fault).count();
    let n_warnings = problems.len() - n_faults;
    let plural = |n: usize, word: &str| if n == 1 { format!("1 {word}") } else { format!("{n} {word}s") };
    match n_warnings {
        0 => plural(n_faults, "fault"),
        _ => format!("{}, {}", plural(n_faults, "fault"), plural(n_warnings, "warning")),
    }
}
