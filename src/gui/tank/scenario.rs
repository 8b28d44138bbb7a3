//! Title, author, revision mark and notes.

use egui::Ui;

use crate::app::Edit;
use crate::geom::Point;
use crate::gui::Desk;
use crate::gui::field;
use crate::gui::number::Number;
use crate::units::Quantity;

use super::TankColumn;

pub(super) fn scenario_ui(ui: &mut Ui, desk: &mut Desk, _: &mut TankColumn) {
    field::heading_ui(ui, desk.look, "Scenario", "");
    let study = desk.study();
    field::text_row_ui(ui, desk, "title", "Title", &study.title, Edit::Title);
    field::text_row_ui(ui, desk, "author", "Author", &study.author, Edit::Author);
    field::text_row_ui(ui, desk, "revision", "Revision", &study.revision, Edit::Revision);
    field::text_row_ui(ui, desk, "notes", "Notes", &study.notes, Edit::Notes).on_hover_text(&study.notes);
    let (length, about) = (desk.unit(Quantity::Length), study.moment_about);
    Number::new("moment about s", "Moments about, s", about.x, length)
        .row_ui(ui, desk, |s| Edit::MomentAbout(Point::new(s, about.y)));
    Number::new("moment about z", "Moments about, z", about.y, length)
        .row_ui(ui, desk, |z| Edit::MomentAbout(Point::new(about.x, z)));
}
