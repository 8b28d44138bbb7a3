//! The cells between walls and plates: what each holds standing level and at rest, and could hold.

use egui::{Align, Role, Sense, Ui, WidgetInfo};

use crate::gui::{Desk, field, font};
use crate::units::{Measure, Quantity};

use super::TankColumn;
use super::plates::measure_ui;

pub(super) fn cells_ui(ui: &mut Ui, desk: &mut Desk, _: &mut TankColumn) {
    let Some(judged) = desk.judged().filter(|judged| judged.results.cells.len() > 1) else {
        return field::heading_ui(ui, desk.look, "Cells", "one");
    };
    field::heading_ui(ui, desk.look, "Cells", "still, capacity");
    if judged.is_stale {
        ui.set_opacity(crate::gui::look::STALE_OPACITY);
    }
    for (i, cell) in judged.results.cells.iter().enumerate() {
        let rect = field::row_rect(ui);
        let volume = |m3: f64| Measure::new(Quantity::Volume, m3);
        let area = desk.text(Measure::new(Quantity::Area, cell.area_m2));
        let level = cell.still_z_m.map_or_else(
            || "dry when still".to_owned(),
            |m| format!("still level z {}", desk.text(Measure::new(Quantity::Length, m))),
        );
        let spoken = format!(
            "Cell {}, {}, still {}, capacity {}, area {area}, {level}",
            i + 1,
            cell.name,
            desk.text(volume(cell.still_m3)),
            desk.text(volume(cell.capacity_m3)),
        );
        let response = ui.interact(rect, egui::Id::unique(("cell", i)), Sense::hover());
        response.widget_info(|| WidgetInfo::labeled(Role::Label, true, &spoken));
        let name = rect.with_max_x(rect.right() - 118.0);
        field::paint_fitting(ui, name, Align::Min, &cell.name, font::body(), desk.look.ink2);
        measure_ui(ui, rect.with_max_x(rect.right() - 60.0), desk, volume(cell.still_m3), 3);
        measure_ui(ui, rect, desk, volume(cell.capacity_m3), 3);
        response.on_hover_text(format!("{}, area {area}, {level}", cell.name));
    }
    ui.set_opacity(1.0);
}
