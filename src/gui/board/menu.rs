//! The menu under the right button: what can be done with the thing, or at the place, that was pressed.

use egui::{Modifiers, Pos2, Response, Ui};

use crate::app::Edit;
use crate::geom::Point;
use crate::gui::{Proposal, View};
use crate::section::{EdgeKind, Obstacle, Vertex};
use crate::study::NamedPoint;
use crate::units::UnitSystem;

use super::keys::removal;
use super::pointer::split;
use super::scene::Scene;
use super::screen::round_step;
use super::snap::Snapper;
use super::target::Target;

/// Where the menu was called up.
#[derive(Clone, Copy)]
struct Called {
    target: Option<Target>,
    pos: Pos2,
}

/// Shows the menu while it is open.
pub fn menu_ui(ui: &Ui, canvas: &Response, scene: &Scene, view: &mut View, out: &mut Vec<Proposal>) {
    let id = canvas.id.with("menu");
    if canvas.secondary_clicked()
        && let Some(pos) = ui.input(|i| i.pointer.latest_pos())
    {
        let target = Target::under(scene, pos, view.selected);
        view.selected = target.and_then(Target::selects).or(view.selected);
        ui.data_mut(|d| d.insert_temp(id, Called { target, pos }));
    }
    canvas.context_menu(|ui| {
        let Some(called) = ui.data(|d| d.get_temp::<Called>(id)) else { return };
        match called.target {
            Some(Target::Edge(i) | Target::Middle(i)) if i < scene.edges.len() => {
                edge_menu_ui(ui, scene, i, called.pos, out)
            }
            Some(
                target @ (Target::Vertex(_) | Target::Obstacle(_) | Target::ObstacleVertex(..) | Target::Point(_)),
            ) => {
                let words = match target {
                    Target::Vertex(_) => "Delete vertex",
                    Target::Point(_) => "Delete point",
                    _ => "Delete obstacle",
                };
                let edit = target.selects().and_then(|s| removal(scene, s));
                let may = !matches!(target, Target::Vertex(_)) || scene.edges.len() > 3;
                if ui.add_enabled(may, egui::Button::new(words)).clicked() {
                    out.extend(edit.map(Proposal::Edit));
                    view.selected = None;
                }
            }
            _ => place_menu_ui(ui, scene, called.pos, view, out),
        }
    });
}

fn edge_menu_ui(ui: &mut Ui, scene: &Scene, i: usize, pos: Pos2, out: &mut Vec<Proposal>) {
    let mut propose = |edit: Edit| out.push(Proposal::Edit(edit));
    let kind = scene.study.section.outline[i].kind;
    for (words, choice) in [("Wall", EdgeKind::Wall), ("Mouth, open to air", EdgeKind::Mouth)] {
        if ui.radio(kind == choice, words).clicked() {
            propose(Edit::EdgeKind(i, choice));
            ui.close();
        }
    }
    ui.separator();
    if ui.add_enabled(scene.edges[i].is_arc(), egui::Button::new("Straight")).clicked() {
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
    if ui.add_enabled(n > 3, egui::Button::new(words)).clicked() {
        propose(Edit::RemoveVertex(nearest));
    }
}

fn place_menu_ui(ui: &mut Ui, scene: &Scene, pos: Pos2, view: &mut View, out: &mut Vec<Proposal>) {
    let snapper = Snapper { screen: &scene.screen, units: scene.units, anchors: Vec::new(), is_on: true };
    let p = snapper.point(scene.screen.section_from_screen(pos)).at;
    let mut propose = |edit: Edit| out.push(Proposal::Edit(edit));
    if ui.button("Add obstacle here").clicked() {
        propose(Edit::AddObstacle(new_obstacle(scene, p)));
    }
    if ui.button("Add point here").clicked() {
        let mut points = scene.study.points.clone();
        points.push(NamedPoint { name: format!("Point {}", points.len() + 1), at: p });
        propose(Edit::Points(points));
    }
    if ui.button("Take moments about here").clicked() {
        propose(Edit::MomentAbout(p));
    }
    ui.separator();
    if ui.button("Fit").clicked() {
        view.camera = None;
    }
}

/// A square of a round size round `p`, about 40 points wide.
fn new_obstacle(scene: &Scene, p: Point) -> Obstacle {
    let units: UnitSystem = scene.units;
    let half = 0.5 * round_step(40.0 / scene.screen.scale(), units).0;
    let corners = [(-half, -half), (half, -half), (half, half), (-half, half)];
    let vertex = |(s, z)| Vertex { start: Point::new(p.x + s, p.y + z), sweep_rad: 0.0 };
    Obstacle { name: String::new(), vertices: corners.map(vertex).to_vec() }
}
