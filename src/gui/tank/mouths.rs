//! Mouths, and the points at which pressure is asked for.

use egui::{Align, Shape, Stroke, Ui, pos2};

use crate::app::Edit;
use crate::geom::{Point, Vec2};
use crate::gui::field;
use crate::gui::number::Number;
use crate::gui::{Desk, Selected, font};
use crate::section::EdgeKind;
use crate::study::NamedPoint;
use crate::units::{Measure, Quantity};

use super::TankColumn;
use super::outline::{fields_ui, list_row_ui};

pub(super) fn mouths_ui(ui: &mut Ui, desk: &mut Desk, _: &mut TankColumn) {
    let section = &desk.study().section;
    let mouths: Vec<usize> =
        (0..section.outline.len()).filter(|&i| section.outline[i].kind == EdgeKind::Mouth).collect();
    field::heading_ui(ui, desk.look, "Mouths", if mouths.is_empty() { "none" } else { "brim z" });
    if mouths.is_empty() {
        let rect = field::row_rect(ui);
        let words = "The tank is shut: nothing can spill";
        field::paint_fitting(ui, rect, Align::Min, words, font::small(), desk.look.ink3);
    }
    let length = desk.unit(Quantity::Length);
    let mut chosen = None;
    for i in mouths {
        let label = section.edge_label(i);
        let rect = field::row_rect(ui);
        let is_selected = desk.view.selected == Some(Selected::Edge(i));
        let response = list_row_ui(ui, rect, desk, is_selected, &label, &format!("Mouth, {label}"), 46.0);
        let y = ui.painter().round_to_pixel_center(rect.center().y);
        let (a, b) = (pos2(rect.left(), y), pos2(rect.left() + 11.0, y));
        let ink = Stroke::new(2.0, desk.look.ink);
        ui.painter().line_segment([a, a + egui::vec2(3.0, 0.0)], ink);
        ui.painter().line_segment([b - egui::vec2(3.0, 0.0), b], ink);
        ui.painter().extend(Shape::dotted_line(&[pos2(a.x + 5.0, y), pos2(b.x - 4.0, y)], desk.look.ink, 2.5, 0.7));
        let brim_z = section.edge(i).extent(Vec2::y()).0.0;
        let number = Measure::new(Quantity::Length, brim_z).number(desk.units(), 4);
        let numbers = rect.with_max_x(field::number_right(rect));
        field::paint_fitting(ui, numbers, Align::Max, &number, font::figure(), desk.look.ink);
        let unit = rect.with_min_x(rect.right() - field::UNIT_COLUMN);
        field::paint_fitting(ui, unit, Align::Min, length.symbol, font::small(), desk.look.ink3);
        if response.clicked() {
            chosen = Some(Selected::Edge(i));
        }
    }
    if chosen.is_some() {
        desk.view.selected = chosen;
    }
}

pub(super) fn points_ui(ui: &mut Ui, desk: &mut Desk, _: &mut TankColumn) {
    let points = &desk.study().points;
    field::heading_ui(ui, desk.look, "Named points", if points.is_empty() { "none" } else { "s, z" });
    let length = desk.unit(Quantity::Length);
    let mut chosen = None;
    for (i, point) in points.iter().enumerate() {
        let rect = field::row_rect(ui);
        let is_selected = desk.view.selected == Some(Selected::Point(i));
        let response =
            list_row_ui(ui, rect, desk, is_selected, &point.name, &format!("Point {}, {}", i + 1, point.name), 82.0);
        let number = |m: f64| Measure::new(Quantity::Length, m).number(desk.units(), 4);
        let place = format!("{}, {}", number(point.at.x), number(point.at.y));
        let numbers = rect.with_max_x(field::number_right(rect));
        field::paint_fitting(ui, numbers, Align::Max, &place, font::body(), desk.look.ink);
        let unit = rect.with_min_x(rect.right() - field::UNIT_COLUMN);
        field::paint_fitting(ui, unit, Align::Min, length.symbol, font::small(), desk.look.ink3);
        if response.clicked() {
            chosen = Some(if is_selected { None } else { Some(Selected::Point(i)) });
        }
        if is_selected {
            let with = |change: &dyn Fn(&mut NamedPoint)| {
                let mut next = points.clone();
                change(&mut next[i]);
                Edit::Points(next)
            };
            fields_ui(ui, desk, |ui, desk| {
                field::text_row_ui(ui, desk, ("point name", i), "Name", &point.name, |n| {
                    with(&|p| p.name = n.clone())
                });
                Number::new(("point s", i), "s", point.at.x, length).row_ui(ui, desk, |s| with(&|p| p.at.x = s));
                Number::new(("point z", i), "z", point.at.y, length).row_ui(ui, desk, |z| with(&|p| p.at.y = z));
                if field::link_row_ui(ui, "Take it out", desk.look).clicked() {
                    let mut next = points.clone();
                    next.remove(i);
                    desk.edit(Edit::Points(next));
                    desk.view.selected = None;
                }
            });
        }
    }
    if field::link_row_ui(ui, "Add a point", desk.look).clicked() {
        let mut next = points.clone();
        let at = desk.study().section.outline.first().map_or(Point::origin(), |edge| edge.start);
        next.push(NamedPoint { name: format!("point {}", points.len() + 1), at });
        desk.edit(Edit::Points(next));
        chosen = Some(Some(Selected::Point(points.len())));
    }
    if let Some(selected) = chosen {
        desk.view.selected = selected;
    }
}
