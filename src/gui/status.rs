//! The status line: where the pointer is, what just happened, how long judging took, the file.

use egui::{Align, Rect, Ui, vec2};

use crate::app::Derived;
use crate::units::{UnitSystem, number};

use super::{Desk, field, font};

/// The line in `rect`. `event` is the last thing that happened; `judged_ms` the time of the last judgement.
pub fn status_ui(ui: &Ui, rect: Rect, desk: &Desk, event: &str, judged_ms: Option<f64>) {
    let look = desk.look;
    ui.painter().rect_filled(rect, 0.0, look.panel);
    ui.painter().hline(rect.x_range(), ui.painter().round_to_pixel_center(rect.top()), (1.0, look.line));
    let inner = rect.shrink2(vec2(16.0, 0.0));
    let third = inner.width() / 3.0;
    let left = inner.with_max_x(inner.left() + third);
    field::paint_fitting(ui, left, Align::Min, &desk.view.status, font::small(), look.ink2);
    let middle = inner.with_min_x(left.right() + 8.0).with_max_x(inner.right() - third);
    field::paint_fitting(ui, middle, Align::Center, event, font::small(), look.ink2);
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
}
