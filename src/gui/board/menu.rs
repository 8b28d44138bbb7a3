//! The menu under the right button: what can be done with the thing, or at the place, that was pressed.

use egui::{Button, Modifiers, Pos2, Response, Ui};

use crate::app::Edit;
use crate::geom::Point;
use crate::gui::{Pen, Proposal, Selected, View, plating};
use crate::section::{EdgeKind, Obstacle, Vertex};
use crate::study::{Compartment, NamedPoint};
use crate::units::UnitSystem;

use super::anchors::{grid_snapper, lines, snapper};
use super::pointer::{split, split_plate};
use super::scene::Scene;
use super::screen::round_step;
use super::target::Target;

/// Length of a new opening, points on the screen.
const NEW_OPENING: f64 = 48.0;

/// Where the menu was called up.
#[derive(Clone, Copy)]
struct Called {
    target: Option<Target>,
    pos: Pos2,
}

/// Shows the menu while it is open. To call it up puts the pen away.
pub fn menu_ui(ui: &Ui, canvas: &Response, scene: &Scene, view: &mut View, out: &mut Vec<Proposal>) {
    let id = canvas.id.with("menu");
    if canvas.secondary_clicked()
        && let Some(pos) = ui.input(|i| i.pointer.latest_pos())
    {
        let target = Target::under(scene, pos, view.selected);
        view.selected = target.and_then(Target::selects).or(view.selected);
        view.pen = None;
        ui.data_mut(|d| d.insert_temp(id, Called { target, pos }));
    }
    canvas.context_menu(|ui| {
        let Some(called) = ui.data(|d| d.get_temp::<Called>(id)) else { return };
        match called.target {
            Some(Target::Edge(i) | Target::Middle(i)) if i < scene.edges.len() => {
                edge_menu_ui(ui, scene, i, called.pos, view, out)
            }
            Some(target) if plate_of(scene, target).is_some() => {
                plate_menu_ui(ui, scene, target, called.pos, view, out)
            }
            Some(target) if target.selects().is_some_and(|s| s.removal(scene.study).is_some()) => {
                remove_ui(ui, scene, target, view, out);
            }
            _ => place_menu_ui(ui, scene, called.pos, view, out),
        }
    });
}

fn edge_menu_ui(ui: &mut Ui, scene: &Scene, i: usize, pos: Pos2, view: &mut View, out: &mut Vec<Proposal>) {
    let mut propose = |edit: Edit| out.push(Proposal::Edit(edit));
    let kind = scene.study.section.outline[i].kind;
    for (words, choice) in [("Wall", EdgeKind::Wall), ("Mouth, open to air", EdgeKind::Mouth)] {
        if ui.radio(kind == choice, words).clicked() {
            propose(Edit::EdgeKind(i, choice));
            ui.close();
        }
    }
    ui.separator();
    if ui.add_enabled(scene.edges[i].is_arc(), Button::new("Straight")).clicked() {
        propose(Edit::BendEdge(i, 0.0));
    }
    if ui.button("Insert vertex here").clicked() {
        propose(split(scene, i, pos, Modifiers::NONE));
    }
    let p = scene.screen.section_from_screen(pos);
    let edge = scene.edges[i];
    let n = scene.edges.len();
    let nearest = if (edge.start - p).norm() <= (edge.end - p).norm() { i } else { (i + 1) % n };
    let words = format!("Delete vertex {}", nearest + 1);
    if ui.add_enabled(n > 3, Button::new(words)).clicked() {
        propose(Edit::RemoveVertex(nearest));
    }
    ui.separator();
    draw_from_ui(ui, scene, pos, view);
}

fn plate_menu_ui(ui: &mut Ui, scene: &Scene, target: Target, pos: Pos2, view: &mut View, out: &mut Vec<Proposal>) {
    let section = &scene.study.section;
    let Some(i) = plate_of(scene, target) else { return };
    let plate = &section.plates[i];
    let at_m = plating::along(plate, scene.screen.section_from_screen(pos));
    let length_m = round_step(NEW_OPENING / scene.screen.scale(), scene.units).0;
    let opened = plating::with_opening(plate, at_m, length_m);
    if ui.add_enabled(opened.is_some(), Button::new("Add an opening here")).clicked()
        && let Some((plate, o)) = opened
    {
        out.push(Proposal::Edit(Edit::Plate(i, Box::new(plate))));
        view.selected = Some(Selected::Opening(i, o));
    }
    if ui.button("Insert corner here").clicked() {
        out.extend(split_plate(scene, i, pos, Modifiers::NONE).map(Proposal::Edit));
    }
    draw_from_ui(ui, scene, pos, view);
    ui.separator();
    if ui.button("Duplicate").clicked()
        && let Some(copy) = plating::copied(section, i)
    {
        out.push(Proposal::Edit(Edit::AddPlate(Box::new(copy))));
        view.selected = Some(Selected::Plate(section.plates.len()));
    }
    let spaced = plating::equally_spaced(section);
    if ui.add_enabled(spaced.is_some(), Button::new("Space the plates equally")).clicked() {
        out.extend(spaced.map(|plates| Proposal::Edit(Edit::Plates(plates))));
    }
    ui.separator();
    let is_part = match target {
        Target::PlatePoint(..) => plate.points.len() > 2,
        Target::Opening(..) | Target::OpeningEnd(..) => true,
        _ => false,
    };
    if is_part {
        remove_ui(ui, scene, target, view, out);
    }
    remove_ui(ui, scene, Target::Plate(i), view, out);
}

fn place_menu_ui(ui: &mut Ui, scene: &Scene, pos: Pos2, view: &mut View, out: &mut Vec<Proposal>) {
    let p = grid_snapper(scene, Modifiers::NONE).point(scene.screen.section_from_screen(pos)).at;
    let mut propose = |edit: Edit| out.push(Proposal::Edit(edit));
    let section = &scene.study.section;
    draw_from_ui(ui, scene, pos, view);
    let upright = plating::upright_at(section, p);
    if ui.add_enabled(upright.is_some(), Button::new("Add upright plate here")).clicked()
        && let Some(plate) = upright
    {
        propose(Edit::AddPlate(Box::new(plate)));
        view.selected = Some(Selected::Plate(section.plates.len()));
    }
    if ui.button("Add obstacle here").clicked() {
        propose(Edit::AddObstacle(new_obstacle(scene, p)));
    }
    ui.separator();
    if ui.button("Add point here").clicked() {
        let mut points = scene.study.points.clone();
        points.push(NamedPoint { name: format!("Point {}", points.len() + 1), at: p });
        propose(Edit::Points(points));
    }
    if ui.button("Add compartment here").clicked() {
        let mut all = scene.study.compartments.clone();
        view.selected = Some(Selected::Compartment(all.len()));
        all.push(Compartment { name: String::new(), at: p, liquid: None, fill: scene.study.fill });
        propose(Edit::Compartments(all));
    }
    if ui.button("Put the sump here").clicked() {
        propose(Edit::Sump(Some(p)));
    }
    if ui.button("Take moments about here").clicked() {
        propose(Edit::MomentAbout(p));
    }
    ui.separator();
    if ui.button("Fit").clicked() {
        view.camera = None;
    }
}

/// Hands the pen over, with the beginning of the plate where the menu was called up.
fn draw_from_ui(ui: &mut Ui, scene: &Scene, pos: Pos2, view: &mut View) {
    if ui.button("Draw a plate from here").clicked() {
        let wish = scene.screen.section_from_screen(pos);
        let from = snapper(scene, Modifiers::NONE, None).onto(wish, &lines(scene, None), &[]).at;
        view.pen = Some(Pen { from: Some(from) });
    }
}

fn remove_ui(ui: &mut Ui, scene: &Scene, target: Target, view: &mut View, out: &mut Vec<Proposal>) {
    let words = match target {
        Target::Vertex(_) => "Delete vertex",
        Target::Point(_) => "Delete point",
        Target::Plate(_) => "Delete plate",
        Target::PlatePoint(..) => "Delete corner",
        Target::Opening(..) | Target::OpeningEnd(..) => "Delete opening",
        Target::Compartment(_) => "Delete compartment",
        Target::Sump => "Delete sump",
        _ => "Delete obstacle",
    };
    let edit = target.selects().and_then(|s| s.removal(scene.study));
    let may = !matches!(target, Target::Vertex(_)) || scene.edges.len() > 3;
    if ui.add_enabled(may, Button::new(words)).clicked() {
        out.extend(edit.map(Proposal::Edit));
        view.selected = None;
    }
}

/// The plate that the thing is, or is a part of.
fn plate_of(scene: &Scene, target: Target) -> Option<usize> {
    target.selects()?.plate().filter(|&i| i < scene.study.section.plates.len())
}

/// A square of a round size round `p`, about 40 points wide.
fn new_obstacle(scene: &Scene, p: Point) -> Obstacle {
    let units: UnitSystem = scene.units;
    let half = 0.5 * round_step(40.0 / scene.screen.scale(), units).0;
    let corners = [(-half, -half), (half, -half), (half, half), (-half, half)];
    let vertex = |(s, z)| Vertex { start: Point::new(p.x + s, p.y + z), sweep_rad: 0.0 };
    Obstacle { name: String::new(), vertices: corners.map(vertex).to_vec() }
}
