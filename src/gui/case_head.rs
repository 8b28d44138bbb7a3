//! The thin row above the board where the chosen load case is named and typed.

use egui::{Align, Popup, PopupCloseBehavior, Rect, Role, Sense, Ui, WidgetInfo, pos2, vec2};

use crate::app::Edit;
use crate::cases::{Accel, AccelUnit, Attitude, LoadCase};
use crate::units::{Quantity, Unit, number};

use super::number::Number;
use super::{Command, Desk, Stage, board, field, font, formula};

const LEVEL: f64 = 0.0;

const RELEASE_WORDS: &str = "Followed by a slow release back to rest: shows what stays trapped behind sills";

/// The row in `rect`.
pub fn case_head_ui(ui: &mut Ui, rect: Rect, desk: &mut Desk) {
    let look = desk.look;
    ui.painter().rect_filled(rect, 0.0, look.panel);
    ui.painter().hline(rect.x_range(), ui.painter().round_to_pixel_center(rect.bottom() - 0.5), (1.0, look.line2));
    let inset = rect.shrink2(vec2(16.0, 4.0));
    let i = desk.view.case_idx;
    let Some(case) = desk.study().cases.get(i) else {
        if field::link_ui(ui, inset, Align::Min, "Add a load case", "Add a load case above the board", look).clicked()
        {
            desk.run(Command::AddCase);
        }
        return;
    };
    let mut row = Row { x: inset.left(), rect: inset };
    row.text(ui, &(i + 1).to_string(), font::heading(), look.accent, 8.0);
    let name_width = text_width(ui, &case.name, font::body()).clamp(40.0, 0.28 * inset.width());
    let cell = row.cell(name_width, 18.0);
    field::text_cell_ui(ui, cell, Align::Min, desk, ("case name", i), "Name of the case", &case.name, |name| {
        Edit::Case(i, Box::new(LoadCase { name, ..case.clone() }))
    });
    accel_ui(ui, &mut row, desk, i, case.accel);
    attitude_ui(ui, &mut row, desk, i, case.attitude);
    let more = more_ui(ui, inset, desk, i, case);
    stages_ui(ui, inset.with_min_x(row.x).with_max_x(more.left() - 20.0), desk);
}

/// A place that moves along a row.
struct Row {
    x: f32,
    rect: Rect,
}

impl Row {
    fn cell(&mut self, width: f32, gap: f32) -> Rect {
        let cell = self.rect.with_min_x(self.x).with_max_x(self.x + width);
        self.x += width + gap;
        cell
    }

    fn text(&mut self, ui: &Ui, text: &str, font: egui::FontId, color: egui::Color32, gap: f32) {
        let cell = self.cell(text_width(ui, text, font.clone()), gap);
        field::paint_fitting(ui, cell.expand2(vec2(0.5, 0.0)), Align::Min, text, font, color);
    }

    fn symbol(&mut self, ui: &Ui, symbol: &str, color: egui::Color32) {
        let at = formula::symbol_ui(ui.painter(), pos2(self.x, self.rect.center().y), symbol, color);
        self.x = at.right() + 5.0;
    }

    /// A number as wide as it reads, with a field's room while it is typed.
    fn number(&mut self, ui: &Ui, shown: &str, gap: f32) -> Rect {
        self.cell(text_width(ui, shown, font::figure()).max(26.0), gap)
    }
}

fn accel_ui(ui: &mut Ui, row: &mut Row, desk: &mut Desk, i: usize, accel: Accel) {
    let look = desk.look;
    let (Accel::Components { unit, .. } | Accel::Polar { unit, .. }) = accel;
    let shown_in = accel_unit(desk, unit);
    let mut value =
        |ui: &mut Ui, row: &mut Row, id: &str, label: &str, si: f64, shown_in: Unit, edit: &dyn Fn(f64) -> Accel| {
            let rect = row.number(ui, &number(shown_in.from_si(si), 3), 5.0);
            Number::new((id, i), label, si, shown_in).significant(3).color(look.accent).cell_ui(
                ui,
                rect,
                Align::Min,
                desk,
                |v| v.map(|v| Edit::CaseAccel(i, edit(v))).ok_or_else(|| "Type a number".to_owned()),
            );
        };
    match accel {
        Accel::Components { a_s, a_z, unit } => {
            row.symbol(ui, "a_s", look.ink2);
            value(ui, row, "a_s", "Acceleration a_s", a_s, shown_in, &|a_s| Accel::Components { a_s, a_z, unit });
            row.x += 7.0;
            row.symbol(ui, "a_z", look.ink2);
            value(ui, row, "a_z", "Acceleration a_z", a_z, shown_in, &|a_z| Accel::Components { a_s, a_z, unit });
        }
        Accel::Polar { magnitude, direction_deg, unit } => {
            row.symbol(ui, "|a|", look.ink2);
            value(ui, row, "|a|", "Magnitude of the acceleration", magnitude, shown_in, &|magnitude| Accel::Polar {
                magnitude,
                direction_deg,
                unit,
            });
            row.text(ui, shown_in.symbol, font::small(), look.ink3, 10.0);
            row.text(ui, "toward", font::small(), look.ink2, 5.0);
            let degree = Unit { symbol: "°", in_si: 1.0 };
            value(ui, row, "direction", "Direction of the acceleration", direction_deg, degree, &|direction_deg| {
                Accel::Polar { magnitude, direction_deg, unit }
            });
            row.x -= 4.0;
            row.text(ui, "°", font::small(), look.ink3, 4.0);
        }
    }
    let units = [(AccelUnit::MPerS2, accel_unit(desk, AccelUnit::MPerS2).symbol), (AccelUnit::G, "g")];
    let cell = row.cell(text_width(ui, shown_in.symbol, font::body()) + 2.0, 18.0);
    if let Some(to) = field::choice_ui(ui, cell, Align::Min, "Unit of the acceleration", unit, &units, look) {
        desk.edit(Edit::CaseAccel(i, in_unit(accel, to, desk.study().gravity_m_per_s2)));
    }
}

fn attitude_ui(ui: &mut Ui, row: &mut Row, desk: &mut Desk, i: usize, attitude: Attitude) {
    let (kind, words) = match attitude {
        Attitude::Level => (0, "level"),
        Attitude::GradePercent(_) => (1, "grade"),
        Attitude::HeelDeg(_) => (2, "heel"),
    };
    let cell = row.cell(text_width(ui, words, font::body()) + 2.0, 6.0);
    let choices = [(0, "level"), (1, "grade"), (2, "heel")];
    if let Some(to) = field::choice_ui(ui, cell, Align::Min, "Attitude", kind, &choices, desk.look) {
        let angle = attitude.angle_rad();
        desk.edit(Edit::CaseAttitude(
            i,
            match to {
                1 => Attitude::GradePercent(100.0 * angle.tan()),
                2 => Attitude::HeelDeg(angle.to_degrees()),
                _ => Attitude::Level,
            },
        ));
    }
    let (value, unit, make): (f64, &str, fn(f64) -> Attitude) = match attitude {
        Attitude::Level => return,
        Attitude::GradePercent(percent) => (percent, "%", Attitude::GradePercent),
        Attitude::HeelDeg(deg) => (deg, "°", Attitude::HeelDeg),
    };
    let cell = row.number(ui, &number(value, 3), 4.0);
    let unit = Unit { symbol: unit, in_si: 1.0 };
    Number::new(("attitude", i), "Attitude", value, unit)
        .significant(3)
        .cell_ui(ui, cell, Align::Min, desk, |v| Ok(Edit::CaseAttitude(i, make(v.unwrap_or(LEVEL)))))
        .on_hover_text("Positive: the right side is up");
    row.text(ui, unit.symbol, font::small(), desk.look.ink3, 18.0);
}

/// What is seldom typed: onset, source, note, and the way of giving the acceleration.
fn more_ui(ui: &mut Ui, rect: Rect, desk: &mut Desk, i: usize, case: &LoadCase) -> Rect {
    let words = if case.note.is_empty() { "More" } else { "More, note" };
    let response = field::link_ui(ui, rect, Align::Max, words, "More of this case", desk.look);
    let popup = Popup::menu(&response).close_behavior(PopupCloseBehavior::CloseOnClickOutside);
    popup.accessible_name("More of this case").show(|ui| {
        ui.set_width(300.0);
        ui.spacing_mut().item_spacing.y = 0.0;
        let with = |change: &dyn Fn(&mut LoadCase)| {
            let mut next = case.clone();
            change(&mut next);
            Edit::Case(i, Box::new(next))
        };
        let is_polar = matches!(case.accel, Accel::Polar { .. });
        let words = if is_polar { "Give it as components" } else { "Give it as magnitude and direction" };
        if field::link_row_ui(ui, words, desk.look).clicked() {
            desk.edit(Edit::CaseAccel(i, in_way(case.accel, !is_polar)));
        }
        Number::new(("onset", i), "Onset", 0.0, desk.unit(Quantity::Time))
            .or_none(case.onset_s)
            .optional()
            .try_row_ui(ui, desk, |si| Ok(with(&|c| c.onset_s = si)))
            .on_hover_text("Time over which the acceleration builds up; the settled verdicts do not use it");
        Number::new(("duration", i), "Then held for", 0.0, desk.unit(Quantity::Time))
            .or_none(case.duration_s)
            .optional()
            .try_row_ui(ui, desk, |si| Ok(with(&|c| c.duration_s = si)))
            .on_hover_text("Time for which the acceleration is then held; none: for long");
        let mut release = case.release;
        if ui.checkbox(&mut release, "Then released").on_hover_text(RELEASE_WORDS).changed() {
            desk.edit(with(&|c| c.release = release));
        }
        field::text_row_ui(ui, desk, ("case source", i), "Source", &case.source, |t| with(&|c| c.source = t.clone()));
        field::text_row_ui(ui, desk, ("case note", i), "Note", &case.note, |t| with(&|c| c.note = t.clone()));
    });
    response.rect
}

/// The states of the case, where there is more than one, and which of them the board shows; a click chooses.
fn stages_ui(ui: &mut Ui, rect: Rect, desk: &mut Desk) {
    let Some(case) = desk.case() else { return };
    let stages: Vec<Stage> = Stage::of(case).collect();
    if stages.len() < 2 {
        return;
    }
    let shown = desk.view.stage_of(case);
    let mut right = rect.right();
    for stage in stages.into_iter().rev() {
        // As its surface is drawn.
        let sample = if stage == Stage::Released { 0.0 } else { 34.0 };
        let width = text_width(ui, stage.word(), font::body_heavy());
        let place = rect.with_max_x(right).with_min_x(right - width - sample);
        right = place.left() - 16.0;
        if place.left() < rect.left() {
            return;
        }
        let response = ui.interact(place, ui.next_auto_id().with(stage.word()), Sense::click());
        let is_shown = shown == stage;
        let spoken = format!("State shown, {}", stage.word());
        response.widget_info(|| WidgetInfo::selected(Role::RadioButton, true, is_shown, &spoken));
        let y = ui.painter().round_to_pixel_center(place.center().y);
        let ends = [pos2(place.left(), y), pos2(place.left() + 26.0, y)];
        match (sample > 0.0, is_shown) {
            (true, true) => {
                ui.painter().line_segment(ends, (1.9, desk.look.ink));
            }
            (true, false) => board::paint_other_bound(ui.painter(), ends, desk.look),
            _ => {}
        }
        let (font, color) =
            if is_shown { (font::body_heavy(), desk.look.ink) } else { (font::body(), desk.look.accent) };
        let text = place.with_min_x(place.left() + sample).expand2(vec2(0.5, 0.0));
        field::paint_fitting(ui, text, Align::Min, stage.word(), font, color);
        super::marks::paint_focus(ui.painter(), place, &response, desk.look);
        let time = case.transfer.as_ref().and_then(|t| t.as_ref().ok()).filter(|_| stage != Stage::Released);
        let hint = time.map_or(stage.words().to_owned(), |transfer| format!("{}. {}", stage.words(), transfer.words));
        if response.on_hover_text(hint).clicked() {
            desk.view.stage = Some(stage);
        }
    }
    near_ui(ui, rect.with_max_x(right), desk);
}

/// Which bound is near for as long as the case lasts, where its liquid moves between them.
fn near_ui(ui: &mut Ui, rect: Rect, desk: &Desk) {
    let Some(Ok(transfer)) = desk.case().and_then(|case| case.transfer.as_ref()) else { return };
    if transfer.moved_m3 == 0.0 {
        return;
    }
    let words = match transfer.near {
        Some(bound) => format!("{} is near", bound.word()),
        None => "neither bound is near".to_owned(),
    };
    let place = rect.with_min_x(rect.right() - text_width(ui, &words, font::body()) - 1.0);
    if place.left() < rect.left() {
        return;
    }
    let response = ui.interact(place, ui.next_auto_id().with("near"), Sense::hover());
    response.widget_info(|| WidgetInfo::labeled(Role::Label, true, format!("{words}: {}", transfer.words)));
    field::paint_fitting(ui, place, Align::Min, &words, font::body(), desk.look.ink3);
    response.on_hover_text(&transfer.words);
}

fn accel_unit(desk: &Desk, unit: AccelUnit) -> Unit {
    match unit {
        AccelUnit::MPerS2 => desk.unit(Quantity::Acceleration),
        AccelUnit::G => Unit { symbol: "g", in_si: 1.0 },
    }
}

/// The same acceleration, given in another unit.
fn in_unit(accel: Accel, to: AccelUnit, gravity_m_per_s2: f64) -> Accel {
    let scale = if to == AccelUnit::G { 1.0 / gravity_m_per_s2 } else { gravity_m_per_s2 };
    match accel {
        Accel::Components { a_s, a_z, unit } if unit != to => {
            Accel::Components { a_s: a_s * scale, a_z: a_z * scale, unit: to }
        }
        Accel::Polar { magnitude, direction_deg, unit } if unit != to => {
            Accel::Polar { magnitude: magnitude * scale, direction_deg, unit: to }
        }
        same => same,
    }
}

/// The same acceleration, given as components or as magnitude and direction.
fn in_way(accel: Accel, to_polar: bool) -> Accel {
    match accel {
        Accel::Components { a_s, a_z, unit } if to_polar => {
            Accel::Polar { magnitude: a_s.hypot(a_z), direction_deg: a_z.atan2(a_s).to_degrees(), unit }
        }
        Accel::Polar { magnitude, direction_deg, unit } if !to_polar => {
            let (sin, cos) = direction_deg.to_radians().sin_cos();
            Accel::Components { a_s: magnitude * cos, a_z: magnitude * sin, unit }
        }
        same => same,
    }
}

fn text_width(ui: &Ui, text: &str, font: egui::FontId) -> f32 {
    ui.painter().layout_no_wrap(text.to_owned(), font, egui::Color32::PLACEHOLDER).size().x
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn another_unit_or_way_is_the_same_acceleration() {
        let accel = Accel::Components { a_s: -3.0, a_z: 1.5, unit: AccelUnit::MPerS2 };
        let want = accel.to_m_per_s2(9.80665);
        let in_g = in_unit(accel, AccelUnit::G, 9.80665);
        for other in [in_g, in_way(accel, true), in_way(in_g, true), in_way(in_way(in_g, true), false)] {
            let got = other.to_m_per_s2(9.80665);
            assert!((got - want).norm() < 1e-12, "{other:?}: {got:?}, expected {want:?}");
        }
        assert_eq!(in_unit(accel, AccelUnit::MPerS2, 9.80665), accel);
    }
}
