//! Plates: chosen by a click, typed exactly, corner by corner.

use egui::{Align, Rect, Stroke, Ui, pos2};

use crate::app::Edit;
use crate::geom::Point;
use crate::gui::number::Number;
use crate::gui::{Command, Desk, Selected, field, font, plating};
use crate::section::{Panel, PanelEdges, Plate};
use crate::units::{Measure, Quantity};

use super::TankColumn;
use super::materials::material_choice_ui;
use super::openings::openings_ui;
use super::outline::{fields_ui, list_row_ui};

const EDGES: [(PanelEdges, &str); 2] =
    [(PanelEdges::SimplySupported, "simply supported"), (PanelEdges::Clamped, "clamped")];

pub(super) fn plates_ui(ui: &mut Ui, desk: &mut Desk, _: &mut TankColumn) {
    let plates = &desk.study().section.plates;
    let note = match plates.is_empty() {
        true => "none",
        false if is_narrow(ui) => "s, solid",
        false => "s, thickness, solid",
    };
    field::heading_ui(ui, desk.look, "Plates", note);
    let open = desk.view.selected.and_then(Selected::plate);
    let mut chosen = None;
    for (i, plate) in plates.iter().enumerate() {
        let is_open = open == Some(i);
        if row_ui(ui, desk, i, plate, is_open) {
            chosen = Some(if is_open { None } else { Some(Selected::Plate(i)) });
        }
        if is_open {
            fields_ui(ui, desk, |ui, desk| plate_fields_ui(ui, desk, i, plate));
        }
    }
    if field::link_row_ui(ui, "Add a plate", desk.look).clicked()
        && let Some(plate) = plating::new_plate(&desk.study().section)
    {
        desk.edit(Edit::AddPlate(Box::new(plate)));
        chosen = Some(Some(Selected::Plate(plates.len())));
    }
    if let Some(spaced) = plating::equally_spaced(&desk.study().section)
        && field::link_row_ui(ui, "Space them equally", desk.look).clicked()
    {
        desk.edit(Edit::Plates(spaced));
    }
    if let Some(selected) = chosen {
        desk.view.selected = selected;
    }
}

/// One row: mark, name, s of the foot, the thickness where there is room, the share that is solid. Gives whether it was
/// clicked.
fn row_ui(ui: &mut Ui, desk: &mut Desk, i: usize, plate: &Plate, is_open: bool) -> bool {
    let label = plate.label(i);
    let taken = if is_narrow(ui) { 64.0 } else { 112.0 };
    let rect = field::row_rect(ui);
    let response = list_row_ui(ui, rect, desk, is_open, &label, &format!("Plate {}, {label}", i + 1), taken);
    let x = ui.painter().round_to_pixel_center(rect.left() + 5.0);
    let ink = Stroke::new(1.75, desk.look.ink);
    for (from, to) in [(-7.0, -2.5), (2.5, 7.0)] {
        ui.painter().line_segment([pos2(x, rect.center().y + from), pos2(x, rect.center().y + to)], ink);
    }
    let foot = plate.points.iter().min_by(|a, b| a.y.total_cmp(&b.y)).map_or(0.0, |p| p.x);
    let solid = plate.solid_share(&desk.study().section.width);
    let figures = [
        (Quantity::Length, foot, 4, if is_narrow(ui) { 50.0 } else { 98.0 }),
        (Quantity::Length, plate.thickness_m, 2, 50.0),
        (Quantity::Share, solid, 3, 0.0),
    ];
    for (k, (quantity, si, significant, from_right)) in figures.into_iter().enumerate() {
        if si.is_finite() && !(k == 1 && is_narrow(ui)) {
            measure_ui(ui, rect.with_max_x(rect.right() - from_right), desk, Measure::new(quantity, si), significant);
        }
    }
    response.on_hover_text(label).clicked()
}

/// A number with its unit, at the right of `rect`.
pub(super) fn measure_ui(ui: &Ui, rect: Rect, desk: &Desk, measure: Measure, significant: usize) {
    let number = measure.number(desk.units(), significant);
    let unit = format!(" {}", desk.unit(measure.quantity).symbol);
    let job = font::runs([
        (number.as_str(), font::figure(), desk.look.ink),
        (unit.as_str(), font::small(), desk.look.ink3),
    ]);
    field::paint_job(ui, rect, Align::Max, job);
}

/// Whether only two numbers have room beside a name.
fn is_narrow(ui: &Ui) -> bool {
    ui.available_width() < 220.0
}

fn plate_fields_ui(ui: &mut Ui, desk: &mut Desk, i: usize, plate: &Plate) {
    let length = desk.unit(Quantity::Length);
    let with = |change: &dyn Fn(&mut Plate)| {
        let mut next = plate.clone();
        change(&mut next);
        Edit::Plate(i, Box::new(next))
    };
    field::text_row_ui(ui, desk, ("plate name", i), "Name", &plate.name, |name| with(&|p| p.name = name.clone()));
    for (k, at) in plate.points.iter().enumerate() {
        let word = plating::corner_word(plate, k);
        let moved = |to: Point| Edit::Plate(i, Box::new(plating::with_point(plate, k, to)));
        Number::new(("plate s", i, k), &format!("{word}, s"), at.x, length)
            .row_ui(ui, desk, |s| moved(Point::new(s, at.y)));
        Number::new(("plate z", i, k), &format!("{word}, z"), at.y, length)
            .row_ui(ui, desk, |z| moved(Point::new(at.x, z)));
    }
    Number::new(("plate thickness", i), "Thickness", plate.thickness_m, length)
        .row_ui(ui, desk, |si| with(&|p| p.thickness_m = si));
    Number::new(("plate corrosion", i), "Corrosion", plate.corrosion_m, length)
        .row_ui(ui, desk, |si| with(&|p| p.corrosion_m = si))
        .on_hover_text("Part of the thickness that is given up to corrosion and never counts as strength");
    field::text_row_ui(ui, desk, ("plate material", i), "Material", &plate.material, |name| {
        with(&|p| p.material = name.clone())
    });
    if let Some(name) = material_choice_ui(ui, desk, &plate.material) {
        desk.edit(with(&|p| p.material.clone_from(&name)));
    }
    let panel = plate.panel;
    Number::new(("plate stiffeners", i), "Stiffener spacing", 0.0, length)
        .or_none(panel.stiffener_spacing_m)
        .optional()
        .try_row_ui(ui, desk, |si| Ok(with(&|p| p.panel = Panel { stiffener_spacing_m: si, ..panel })))
        .on_hover_text("Clear distance out of the plane; without one the plate spans the width of the tank");
    if let Some(edges) = field::choice_row_ui(ui, desk.look, "Edges", panel.edges, &EDGES) {
        desk.edit(with(&|p| p.panel = Panel { edges, ..panel }));
    }
    openings_ui(ui, desk, i, plate);
    if field::link_row_ui(ui, "Add a corner", desk.look).clicked() {
        desk.edit(with(&|p| {
            if let Some((split, _)) = plating::with_corner(p, plating::longest_middle(p)) {
                *p = split;
            }
        }));
    }
    if field::link_row_ui(ui, "Duplicate this plate", desk.look).clicked() {
        desk.run(Command::DuplicatePlate);
    }
    if field::link_row_ui(ui, "Take this plate out", desk.look).clicked() {
        desk.edit(Edit::RemovePlate(i));
        desk.view.selected = None;
    }
}
