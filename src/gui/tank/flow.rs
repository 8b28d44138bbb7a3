//! Where the tank is emptied from, and how freely liquid passes its openings.

use egui::Ui;

use crate::app::Edit;
use crate::geom::{Point, Vec2};
use crate::gui::number::Number;
use crate::gui::{Desk, Selected, field};
use crate::units::Quantity;

use super::TankColumn;

pub(super) fn flow_ui(ui: &mut Ui, desk: &mut Desk, _: &mut TankColumn) {
    let study = desk.study();
    field::heading_ui(ui, desk.look, "Sump and openings", "");
    let length = desk.unit(Quantity::Length);
    match study.sump {
        Some(at) => {
            Number::new("sump s", "Sump, s", at.x, length)
                .row_ui(ui, desk, |s| Edit::Sump(Some(Point::new(s, at.y))))
                .on_hover_text("Where the tank is emptied from");
            Number::new("sump z", "Sump, z", at.y, length)
                .row_ui(ui, desk, |z| Edit::Sump(Some(Point::new(at.x, z))));
            if field::link_row_ui(ui, "Take the sump out", desk.look).clicked() {
                desk.edit(Edit::Sump(None));
            }
        }
        None => {
            if field::link_row_ui(ui, "Put a sump at the lowest point", desk.look).clicked()
                && let Some(lowest) = lowest_point(desk)
            {
                desk.edit(Edit::Sump(Some(lowest)));
                desk.view.selected = Some(Selected::Sump);
            }
        }
    }
    let ratio = desk.unit(Quantity::Ratio);
    Number::new("discharge coefficient", "Discharge coefficient", study.discharge_coefficient, ratio)
        .significant(2)
        .row_ui(ui, desk, Edit::DischargeCoefficient)
        .on_hover_text("C_d of the openings: what passes, as a share of area times the speed of free fall");
}

fn lowest_point(desk: &Desk) -> Option<Point> {
    let section = &desk.study().section;
    let lowest = (0..section.outline.len()).map(|i| {
        let edge = section.edge(i);
        let (_, t) = edge.extent(Vec2::y()).0;
        edge.point_at(t)
    });
    lowest.min_by(|a, b| a.y.total_cmp(&b.y))
}
