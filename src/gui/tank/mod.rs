//! The tank column: what the tank is. Every value stands in a row and can be typed there.
//!
//! Knows no verdict and no case, save the highest fill that holds.

mod cells;
mod compartments;
mod fill;
mod flow;
mod limits;
mod liquid;
mod materials;
mod mouths;
mod openings;
mod outline;
mod plates;
mod records;
mod scenario;
mod width;

use egui::{Rect, Sense, Ui, UiBuilder, Vec2, vec2};

use super::{Desk, field};

pub(super) use records::confirm;

/// What of the column is unfolded.
#[derive(Clone, Debug, Default)]
pub struct TankColumn {
    shows_all_edges: bool,
    open_record: Option<usize>,
    open_material: Option<usize>,
    is_over_board: bool,
    /// The part that was asked for from the folded headings.
    wanted: Option<usize>,
    last_wanted: usize,
}

/// A part of the column under its own heading.
type Part = (&'static str, fn(&mut Ui, &mut Desk, &mut TankColumn));

const PARTS: &[Part] = &[
    ("Liquid", liquid::liquid_ui),
    ("Outline", outline::outline_ui),
    ("Plates", plates::plates_ui),
    ("Own materials", materials::materials_ui),
    ("Cells", cells::cells_ui),
    ("Compartments", compartments::compartments_ui),
    ("Mouths", mouths::mouths_ui),
    ("Obstacles", outline::obstacles_ui),
    ("Width law", width::width_ui),
    ("Gas and air", liquid::gas_ui),
    ("Sump and openings", flow::flow_ui),
    ("Requirement records", records::records_ui),
    ("Named points", mouths::points_ui),
    ("Scenario", scenario::scenario_ui),
];

/// The column in `rect`; only its headings where it is folded.
pub fn tank_ui(ui: &mut Ui, rect: Rect, is_folded: bool, desk: &mut Desk, column: &mut TankColumn) {
    if !is_folded {
        column.is_over_board = false;
        parts_ui(ui, rect, desk, column);
        return;
    }
    headings_ui(ui, rect, desk, column);
    ui.painter().vline(ui.painter().round_to_pixel_center(rect.right()), rect.y_range(), (1.0, desk.look.line));
    if column.is_over_board {
        let over = Rect::from_min_size(rect.right_top(), vec2(248.0, rect.height()));
        let area = egui::Area::new(egui::Id::unique("tank column")).fixed_pos(over.min).order(egui::Order::Middle);
        area.show(ui.ctx(), |ui| {
            ui.painter().rect_filled(over, 0.0, desk.look.panel);
            ui.painter().vline(over.right() - 0.5, over.y_range(), (1.0, desk.look.line));
            parts_ui(ui, over, desk, column);
        });
    }
}

fn parts_ui(ui: &mut Ui, rect: Rect, desk: &mut Desk, column: &mut TankColumn) {
    let mut child = ui.new_child(UiBuilder::new().max_rect(rect).id_salt("tank"));
    child.set_clip_rect(rect.intersect(ui.clip_rect()));
    egui::ScrollArea::vertical().auto_shrink(false).show(&mut child, |ui| {
        let inner = Rect::from_min_size(ui.cursor().min, Vec2::new(rect.width(), f32::INFINITY));
        let inset = inner.with_min_x(inner.left() + 16.0).with_max_x(inner.right() - 16.0);
        ui.scope_builder(UiBuilder::new().max_rect(inset), |ui| {
            ui.spacing_mut().item_spacing = Vec2::ZERO;
            ui.add_space(1.0);
            for (i, (_, part_ui)) in PARTS.iter().enumerate() {
                if column.wanted == Some(i) {
                    ui.scroll_to_cursor(Some(egui::Align::TOP));
                    column.wanted = None;
                }
                part_ui(ui, desk, column);
            }
            ui.add_space(16.0);
        });
    });
}

fn headings_ui(ui: &mut Ui, rect: Rect, desk: &mut Desk, column: &mut TankColumn) {
    let inset = rect.shrink2(vec2(12.0, 8.0));
    let mut child = ui.new_child(UiBuilder::new().max_rect(inset).id_salt("tank headings"));
    child.set_clip_rect(rect);
    child.spacing_mut().item_spacing = Vec2::ZERO;
    for (i, (title, _)) in PARTS.iter().enumerate() {
        let row = field::row_rect(&mut child).expand2(vec2(0.0, 2.0));
        if field::link_ui(&mut child, row, egui::Align::Min, short(title), title, desk.look).clicked() {
            let is_shown_already = column.is_over_board && column.last_wanted == i;
            column.is_over_board = !is_shown_already;
            (column.wanted, column.last_wanted) = (Some(i), i);
        }
        child.allocate_exact_size(vec2(1.0, 5.0), Sense::hover());
    }
}

/// A title for the folded column.
fn short(title: &str) -> &str {
    match title {
        "Width law" => "Width",
        "Own materials" => "Materials",
        "Compartments" => "Compart.",
        "Gas and air" => "Gas",
        "Sump and openings" => "Sump",
        "Requirement records" => "Records",
        "Named points" => "Points",
        title => title,
    }
}
