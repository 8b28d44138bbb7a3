//! Edges of the outline, and obstacles: chosen by a click, typed exactly.

use std::f64::consts::TAU;

use egui::{Align, Rect, Response, Role, Sense, Ui, WidgetInfo, pos2, vec2};

use crate::app::Edit;
use crate::geom::{Edge, Point};
use crate::gui::field;
use crate::gui::number::Number;
use crate::gui::{Desk, Selected, font};
use crate::section::{EdgeKind, Obstacle, Vertex};
use crate::units::{Measure, Quantity};

use super::TankColumn;

/// Edges shown before the rest folds into one row.
const FEW_EDGES: usize = 8;

pub(super) fn outline_ui(ui: &mut Ui, desk: &mut Desk, column: &mut TankColumn) {
    let section = &desk.study().section;
    let n_edges = section.outline.len();
    field::heading_ui(ui, desk.look, "Outline", &format!("{n_edges} edges"));
    let selected = match desk.view.selected {
        Some(Selected::Edge(i) | Selected::Vertex(i)) => Some(i),
        _ => None,
    };
    let is_long = n_edges > FEW_EDGES + 1;
    let n_shown = if is_long && !column.shows_all_edges { FEW_EDGES } else { n_edges };
    let mut chosen = None;
    for i in 0..n_edges {
        if i >= n_shown && selected != Some(i) {
            continue;
        }
        if edge_row_ui(ui, desk, i, selected == Some(i)).clicked() {
            chosen = Some(if selected == Some(i) { None } else { Some(Selected::Edge(i)) });
        }
        if selected == Some(i) {
            edge_fields_ui(ui, desk, i);
        }
    }
    if is_long {
        let words = match column.shows_all_edges {
            true => "Fewer edges".to_owned(),
            false => format!("{} more edges", n_edges - FEW_EDGES),
        };
        if field::link_row_ui(ui, &words, desk.look).clicked() {
            column.shows_all_edges = !column.shows_all_edges;
        }
    }
    // Taken last, so that a value typed into the fields above is not lost with them.
    if let Some(selected) = chosen {
        desk.view.selected = selected;
    }
}

pub(super) fn obstacles_ui(ui: &mut Ui, desk: &mut Desk, _: &mut TankColumn) {
    let section = &desk.study().section;
    let n = section.obstacles.len();
    field::heading_ui(ui, desk.look, "Obstacles", if n == 0 { "none" } else { "" });
    let mut chosen = None;
    for (i, obstacle) in section.obstacles.iter().enumerate() {
        let is_selected = match desk.view.selected {
            Some(Selected::Obstacle(o) | Selected::ObstacleVertex(o, _)) => o == i,
            _ => false,
        };
        let words = if obstacle.name.is_empty() { format!("obstacle {}", i + 1) } else { obstacle.name.clone() };
        let rect = field::row_rect(ui);
        let response =
            list_row_ui(ui, rect, desk, is_selected, &words, &format!("Obstacle {}, {words}", i + 1), 10.0);
        let corners = format!("{} corners", obstacle.vertices.len());
        field::paint_fitting(ui, rect, Align::Max, &corners, font::small(), desk.look.ink3);
        if response.clicked() {
            chosen = Some(if is_selected { None } else { Some(Selected::Obstacle(i)) });
        }
        if is_selected {
            obstacle_fields_ui(ui, desk, i, obstacle);
        }
    }
    if field::link_row_ui(ui, "Add an obstacle", desk.look).clicked()
        && let Some(obstacle) = small_box(desk)
    {
        desk.edit(Edit::AddObstacle(obstacle));
        chosen = Some(Some(Selected::Obstacle(n)));
    }
    if let Some(selected) = chosen {
        desk.view.selected = selected;
    }
}

/// A row of a list: hover, choice and words; the caller adds what stands at the right, `taken` wide before the unit.
pub(super) fn list_row_ui(
    ui: &Ui,
    rect: Rect,
    desk: &Desk,
    is_selected: bool,
    words: &str,
    spoken: &str,
    taken: f32,
) -> Response {
    let look = desk.look;
    let response = ui.interact(rect, egui::Id::unique(("list row", spoken)), Sense::click());
    response.widget_info(|| WidgetInfo::selected(Role::ListBoxOption, true, is_selected, spoken));
    let ground = rect.expand2(vec2(8.0, 0.0));
    if is_selected {
        ui.painter().rect_filled(ground, 0.0, look.sel);
    } else if response.hovered() {
        ui.painter().rect_filled(ground, 0.0, look.hover);
    }
    let text = rect.with_min_x(rect.left() + 18.0).with_max_x(field::number_right(rect) - taken);
    let words = field::shortened(ui, words, &font::body(), text.width());
    field::paint_fitting(ui, text, Align::Min, &words, font::body(), look.ink2);
    crate::gui::marks::paint_focus(ui.painter(), ground.shrink(2.0), &response, look);
    response
}

fn edge_row_ui(ui: &mut Ui, desk: &mut Desk, i: usize, is_selected: bool) -> Response {
    let section = &desk.study().section;
    let (edge, geometry) = (&section.outline[i], section.edge(i));
    let kind = match (edge.kind, geometry.is_arc()) {
        (EdgeKind::Mouth, _) => "mouth",
        (EdgeKind::Wall, true) => "arc",
        (EdgeKind::Wall, false) => "line",
    };
    let words = if edge.name.is_empty() { kind.to_owned() } else { format!("{kind}, {}", edge.name) };
    let rect = field::row_rect(ui);
    let response = list_row_ui(
        ui,
        rect,
        desk,
        is_selected,
        &words,
        &format!("Edge {}, {words}", i + 1),
        if geometry.is_arc() { 58.0 } else { 44.0 },
    );
    field::paint_fitting(ui, rect, Align::Min, &(i + 1).to_string(), font::body(), desk.look.ink3);
    let length = desk.unit(Quantity::Length);
    if geometry.is_arc() {
        let label = format!("Radius of edge {}", i + 1);
        Number::new(("edge radius", i), &label, geometry.radius().abs(), length).prefix("R").number_ui(
            ui,
            rect,
            desk,
            |si| bend_to_radius(i, geometry, si),
        );
    } else {
        let at = pos2(field::number_right(rect), rect.bottom());
        let number = Measure::new(Quantity::Length, geometry.length()).number(desk.units(), 4);
        field::paint_fitting(ui, rect.with_max_x(at.x), Align::Max, &number, font::body(), desk.look.ink2);
        let unit = rect.with_min_x(rect.right() - field::UNIT_COLUMN);
        field::paint_fitting(ui, unit, Align::Min, length.symbol, font::small(), desk.look.ink3);
    }
    response.on_hover_text(words)
}

fn edge_fields_ui(ui: &mut Ui, desk: &mut Desk, i: usize) {
    let section = &desk.study().section;
    let (edge, geometry) = (&section.outline[i], section.edge(i));
    let (length, angle) = (desk.unit(Quantity::Length), desk.unit(Quantity::Angle));
    fields_ui(ui, desk, |ui, desk| {
        field::text_row_ui(ui, desk, ("edge name", i), "Name", &edge.name, |name| Edit::EdgeName(i, name));
        let kinds = [(EdgeKind::Wall, "wall"), (EdgeKind::Mouth, "mouth, open to air")];
        if let Some(kind) = field::choice_row_ui(ui, desk.look, "Kind", edge.kind, &kinds) {
            desk.edit(Edit::EdgeKind(i, kind));
        }
        let start = edge.start;
        Number::new(("edge start s", i), "Start s", start.x, length)
            .row_ui(ui, desk, |s| Edit::MoveVertex(i, Point::new(s, start.y)));
        Number::new(("edge start z", i), "Start z", start.y, length)
            .row_ui(ui, desk, |z| Edit::MoveVertex(i, Point::new(start.x, z)));
        Number::new(("edge sweep", i), "Sweep", geometry.sweep, angle)
            .row_ui(ui, desk, |sweep| Edit::BendEdge(i, sweep))
            .on_hover_text("Angle turned through; 0 is a straight line, positive turns to the left");
        if geometry.is_arc() {
            Number::new(("edge radius below", i), "Radius", geometry.radius().abs(), length).try_row_ui(
                ui,
                desk,
                |si| bend_to_radius(i, geometry, si),
            );
        }
        if field::link_row_ui(ui, "Split in the middle", desk.look).clicked() {
            desk.edit(Edit::SplitEdge(i, geometry.point_at(0.5)));
        }
        if section.outline.len() > 3 && field::link_row_ui(ui, "Take its start out", desk.look).clicked() {
            desk.edit(Edit::RemoveVertex(i));
        }
    });
}

fn obstacle_fields_ui(ui: &mut Ui, desk: &mut Desk, i: usize, obstacle: &Obstacle) {
    let length = desk.unit(Quantity::Length);
    fields_ui(ui, desk, |ui, desk| {
        for (v, vertex) in obstacle.vertices.iter().enumerate() {
            let at = vertex.start;
            let labels = (format!("Corner {}, s", v + 1), format!("Corner {}, z", v + 1));
            Number::new(("obstacle s", i, v), &labels.0, at.x, length)
                .row_ui(ui, desk, |s| Edit::MoveObstacleVertex(i, v, Point::new(s, at.y)));
            Number::new(("obstacle z", i, v), &labels.1, at.y, length)
                .row_ui(ui, desk, |z| Edit::MoveObstacleVertex(i, v, Point::new(at.x, z)));
        }
        if field::link_row_ui(ui, "Take it out", desk.look).clicked() {
            desk.edit(Edit::RemoveObstacle(i));
            desk.view.selected = None;
        }
    });
}

/// Fields of the chosen thing, set in under its row.
pub(super) fn fields_ui(ui: &mut Ui, desk: &mut Desk, contents: impl FnOnce(&mut Ui, &mut Desk)) {
    let top = ui.cursor().top();
    let left = ui.cursor().left();
    let inset = ui.available_rect_before_wrap();
    let inset = inset.with_min_x(left + 18.0);
    ui.scope_builder(egui::UiBuilder::new().max_rect(inset), |ui| contents(ui, desk));
    let bar = Rect::from_min_max(pos2(left + 6.0, top + 2.0), pos2(left + 8.0, ui.cursor().top() - 2.0));
    ui.painter().rect_filled(bar, 0.0, desk.look.accent);
    ui.add_space(4.0);
}

/// The bend that gives an edge this radius; an arc of more than half a turn stays one.
fn bend_to_radius(i: usize, now: Edge, radius: Option<f64>) -> Result<Edit, String> {
    let radius = radius.ok_or("Type a radius")?;
    let sign = if now.sweep < 0.0 { -1.0 } else { 1.0 };
    let Some(minor) = Edge::with_radius(now.start, now.end, sign * radius.abs()) else {
        return Err("The radius is smaller than half the distance between the ends".to_owned());
    };
    let is_major = now.sweep.abs() > 0.5 * TAU;
    Ok(Edit::BendEdge(i, if is_major { sign * TAU - minor.sweep } else { minor.sweep }))
}

/// A box in the middle of the section, a tenth of its size.
fn small_box(desk: &Desk) -> Option<Obstacle> {
    let points: Vec<Point> = desk.study().section.outline.iter().map(|e| e.start).collect();
    let first = *points.first()?;
    let (low, high) = points.iter().fold((first, first), |(low, high), p| (low.inf(p), high.sup(p)));
    let (center, half) = (nalgebra::center(&low, &high), (high - low) * 0.05);
    let corner =
        |s: f64, z: f64| Vertex { start: Point::new(center.x + s * half.x, center.y + z * half.y), sweep_rad: 0.0 };
    let vertices = vec![corner(-1.0, -1.0), corner(1.0, -1.0), corner(1.0, 1.0), corner(-1.0, 1.0)];
    Some(Obstacle { name: String::new(), vertices })
}
