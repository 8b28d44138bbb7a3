//! The status line: where the pointer is, what just happened or is under way, how long judging took, the file.

use egui::{Align, Align2, Id, Pos2, Rect, Role, Sense, Ui, WidgetInfo, vec2};

use crate::app::Derived;
use crate::units::{UnitSystem, number};

use super::pictures::{Pictures, Work};
use super::{Desk, Look, field, font, marks};

/// What the user asks of work in the background.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Asked {
    /// End it.
    Stop,
    /// Take up again what was ended.
    StartAgain,
}

/// The line in `rect`. `event` is the last thing that happened; `judged_ms` the time of the last judgement.
pub fn status_ui(
    ui: &mut Ui,
    rect: Rect,
    desk: &Desk,
    event: &str,
    judged_ms: Option<f64>,
    pictures: &Pictures,
) -> Option<Asked> {
    let look = desk.look;
    ui.painter().rect_filled(rect, 0.0, look.panel);
    ui.painter().hline(rect.x_range(), ui.painter().round_to_pixel_center(rect.top()), (1.0, look.line));
    let inner = rect.shrink2(vec2(16.0, 0.0));
    let third = inner.width() / 3.0;
    let left = inner.with_max_x(inner.left() + third);
    field::paint_fitting(ui, left, Align::Min, &desk.view.status, font::small(), look.ink2);
    let middle = inner.with_min_x(left.right() + 8.0).with_max_x(inner.right() - third);
    let asked = match (pictures.work(ui.ctx()), pictures.stopped()) {
        (Some(work), _) => work_ui(ui, middle, work, look).then_some(Asked::Stop),
        (None, Some(work)) if event.is_empty() => {
            let words = format!("{} stopped at {:.0} %", work.name, 100.0 * work.share);
            let left = middle.with_max_x(middle.center().x + 20.0);
            field::paint_fitting(ui, left, Align::Max, &words, font::small(), look.ink2);
            link_ui(ui, left.right_center() + vec2(12.0, 0.0), "Start again", look).then_some(Asked::StartAgain)
        }
        _ => {
            field::paint_fitting(ui, middle, Align::Center, event, font::small(), look.ink2);
            None
        }
    };
    let judged = match (desk.doc.derived(), judged_ms) {
        (Derived::Faulty { .. }, _) => "not judged, faults".to_owned(),
        (Derived::Judged { .. }, Some(ms)) => format!("judged in {} ms", number(ms, 2)),
        (Derived::Judged { .. }, None) => "judged".to_owned(),
    };
    let units = match desk.units() {
        UnitSystem::Si => "SI",
        UnitSystem::UsCustomary => "US units",
    };
    let file = desk
        .doc
        .path
        .as_deref()
        .and_then(|path| path.file_name())
        .map_or_else(|| "no file".to_owned(), |name| name.to_string_lossy().into_owned());
    let right = inner.with_min_x(middle.right() + 8.0);
    let words = format!("{judged}    {units}    {file}");
    field::paint_fitting(ui, right, Align::Max, &words, font::small(), look.ink2);
    asked
}

/// Name, bar, percent and `Stop`; whether that was pressed.
fn work_ui(ui: &mut Ui, rect: Rect, work: Work, look: &Look) -> bool {
    let bar = Rect::from_center_size(rect.center(), vec2(BAR.x.min(0.4 * rect.width()), BAR.y));
    let name = rect.with_max_x(bar.left() - 12.0);
    field::paint_fitting(ui, name, Align::Max, work.name, font::small(), look.ink2);
    ui.painter().rect_filled(bar, 0.0, look.line2);
    let done = bar.with_max_x(bar.left() + bar.width() * work.share as f32);
    ui.painter().rect_filled(done, 0.0, look.accent);
    let percent = format!("{:.0} %", 100.0 * work.share);
    let at = bar.right_center() + vec2(44.0, 0.0);
    ui.painter().text(at, Align2::RIGHT_CENTER, &percent, font::small_figure(), look.ink);
    let response = ui.interact(bar, Id::unique("work under way"), Sense::hover());
    let words = format!("{}, {percent}", work.name);
    response.widget_info(|| WidgetInfo::labeled(Role::ProgressIndicator, true, &words));
    link_ui(ui, at + vec2(14.0, 0.0), "Stop", look)
}

fn link_ui(ui: &mut Ui, left: Pos2, words: &str, look: &Look) -> bool {
    let galley = ui.painter().layout_no_wrap(words.to_owned(), font::small(), look.accent);
    let rect = Align2::LEFT_CENTER.anchor_size(left, galley.size());
    let response =
        ui.interact(rect.expand2(vec2(4.0, 2.0)), Id::unique("work under way").with(words), Sense::click());
    response.widget_info(|| WidgetInfo::labeled(Role::Button, true, words));
    ui.painter().galley(rect.min, galley, look.accent);
    if response.hovered() {
        ui.painter().hline(rect.x_range(), rect.bottom() - 1.0, (1.0, look.accent));
    }
    marks::paint_focus(ui.painter(), rect, &response, look);
    response.clicked()
}

/// Size of the bar.
const BAR: egui::Vec2 = vec2(120.0, 6.0);
