//! The handles of what is chosen or pointed at.

use egui::{Painter, Rect, Stroke, StrokeKind, vec2};

use crate::gui::{Look, Selected};

use super::scene::Scene;
use super::target::{OpeningEnd, Target, target_of};

/// Square handles at corners, round ones at the middles of edges and at the ends of openings.
pub fn paint_handles(
    painter: &Painter,
    scene: &Scene,
    selected: Option<Selected>,
    hovered: Option<Target>,
    look: &Look,
) {
    let n = scene.edges.len();
    let mut shown: Vec<(Target, bool)> = Vec::new();
    let mut show = |target: Target, is_chosen: bool| {
        match target {
            Target::Edge(i) | Target::Middle(i) if i < n => {
                let ends = [Target::Vertex(i), Target::Vertex((i + 1) % n), Target::Middle(i)];
                shown.extend(ends.map(|t| (t, is_chosen)));
            }
            Target::Vertex(i) if i < n => {
                let around = [Target::Vertex((i + n - 1) % n), Target::Vertex((i + 1) % n)];
                shown.extend(around.map(|t| (t, false)));
                shown.push((target, is_chosen));
            }
            Target::Plate(i) | Target::PlatePoint(i, _) | Target::Opening(i, _) | Target::OpeningEnd(i, ..) => {
                let Some(plate) = scene.model.plates.get(i) else { return };
                let corners = (0..plate.points.len()).map(|k| Target::PlatePoint(i, k));
                shown.extend(corners.map(|t| (t, is_chosen && (t == target || target == Target::Plate(i)))));
                let ends = [OpeningEnd::From, OpeningEnd::To];
                let ticks =
                    (0..plate.openings.len()).flat_map(|o| ends.map(|end| (o, Target::OpeningEnd(i, o, end))));
                shown.extend(ticks.map(|(o, t)| (t, is_chosen && (t == target || target == Target::Opening(i, o)))));
            }
            Target::Obstacle(i) | Target::ObstacleVertex(i, _) if is_chosen => {
                let n = scene.study.section.obstacles.get(i).map_or(0, |o| o.vertices.len());
                shown.extend((0..n).map(|j| (Target::ObstacleVertex(i, j), target == Target::ObstacleVertex(i, j))));
            }
            Target::Point(_) | Target::Compartment(_) | Target::Sump | Target::MomentPoint => {
                shown.push((target, is_chosen));
            }
            _ => {}
        };
    };
    hovered.into_iter().for_each(|t| show(t, false));
    selected.into_iter().for_each(|s| show(target_of(s), true));
    for (target, is_chosen) in shown {
        let Some(at) = target.handle(scene).filter(|p| scene.screen.rect.expand(8.0).contains(*p)) else { continue };
        let stroke = if is_chosen { Stroke::new(1.5, look.accent) } else { Stroke::new(1.25, look.ink2) };
        match target {
            Target::Middle(_) | Target::OpeningEnd(..) => painter.circle(at, 4.0, look.board, stroke),
            Target::Point(_) | Target::Compartment(_) | Target::Sump | Target::MomentPoint => {
                painter.circle_stroke(at, 8.0, stroke)
            }
            _ => {
                let rect = Rect::from_center_size(at, vec2(8.0, 8.0));
                painter.rect(rect, 0.0, look.board, stroke, StrokeKind::Middle)
            }
        };
    }
}
