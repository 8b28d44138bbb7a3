//! Plates on the screen: solid parts, openings, and the glow of what is chosen.

use egui::{Painter, Pos2, Shape, Stroke};

use crate::gui::Look;

use super::lines;
use super::model::{BoardModel, PlateLine};
use super::paint::Pens;
use super::screen::Screen;

/// From this scale on a plate is as thick as it is, points a metre.
const TO_SCALE: f64 = 400.0;

/// Half the length of the tick across the end of an opening, points.
const TICK: f32 = 4.0;

/// All plates; with the pens of a small drawing openings are gaps.
pub fn paint_plates(painter: &Painter, screen: &Screen, model: &BoardModel, pens: Pens, look: &Look) {
    for plate in &model.plates {
        let ink = Stroke::new(width(plate, screen, pens), look.ink);
        for points in &plate.solid {
            painter.add(Shape::line(visible(painter, screen.line(points)), ink));
        }
        if pens.isobar == 0.0 {
            continue;
        }
        for opening in plate.openings.iter().filter(|opening| opening.points.len() > 1) {
            let path = screen.line(&opening.points);
            lines::dashed(painter, &path, Stroke::new(0.9, look.ink), 3.0, 3.0);
            for (end, along) in [path[0], path[path.len() - 1]].into_iter().zip(opening.along) {
                let across = screen.screen_vec(along).normalized().rot90() * TICK.max(0.5 * ink.width + 1.5);
                lines::segment(painter, [end - across, end + across], Stroke::new(1.25, look.ink));
            }
        }
    }
}

/// Width of a plate's line, points.
fn width(plate: &PlateLine, screen: &Screen, pens: Pens) -> f32 {
    if screen.scale() <= TO_SCALE {
        return pens.plate;
    }
    pens.plate.max((plate.thickness_m * screen.scale()) as f32).min(1e4)
}

/// A line whose ends lie far away does not upset the tessellation: straight parts are cut, corners kept.
fn visible(painter: &Painter, path: Vec<Pos2>) -> Vec<Pos2> {
    match path[..] {
        [a, b] => lines::clip(painter.clip_rect().expand(1e3), [a, b]).map_or_else(Vec::new, |ends| ends.to_vec()),
        _ => path,
    }
}
