//! What there is to snap to while something moves: corners of everything else, and the lines that plates stand on.

use egui::Modifiers;

use crate::geom::Point;
use crate::gui::Selected;
use crate::gui::plating::{self, Line};

use super::scene::Scene;
use super::snap::{Anchor, Snapper};
use super::target::Target;
use super::words::corner_words;

/// What there is to snap to while `moved` moves; with no such thing, all corners.
pub fn snapper<'a>(scene: &'a Scene, keys: Modifiers, moved: Option<Target>) -> Snapper<'a> {
    let n = scene.edges.len();
    let outline = (scene.edges.iter().enumerate())
        .filter(|(i, _)| match moved {
            Some(Target::Vertex(v)) => v != *i,
            Some(Target::Edge(e)) => e != *i && (e + 1) % n != *i,
            _ => true,
        })
        .map(|(i, e)| Anchor { at: e.start, name: format!("vertex {}", i + 1) });
    let obstacles = scene.study.section.obstacles.iter().enumerate().flat_map(|(i, o)| {
        let named = o.vertices.iter().enumerate().map(move |(j, v)| (i, j, v.start));
        named
            .filter(move |(i, j, _)| match moved {
                Some(Target::ObstacleVertex(oi, oj)) => (oi, oj) != (*i, *j),
                Some(Target::Obstacle(oi)) => oi != *i,
                _ => true,
            })
            .map(|(i, j, at)| Anchor { at, name: format!("obstacle {}, vertex {}", i + 1, j + 1) })
    });
    let held = moved.and_then(Target::selects).and_then(Selected::plate);
    let plates = scene.model.plates.iter().enumerate().flat_map(|(i, plate)| {
        let named = plate.points.iter().enumerate().map(move |(k, at)| (i, k, *at));
        named
            .filter(move |(i, k, at)| match moved {
                Some(Target::PlatePoint(pi, pk)) if pi == *i => pk != *k,
                _ => held.is_none_or(|held| held != *i && !goes_along(scene, held, *at)),
            })
            .map(|(i, k, at)| {
                let name = format!("plate {}, {}", i + 1, corner_words(scene, i, k).to_lowercase());
                Anchor { at, name }
            })
    });
    Snapper {
        screen: &scene.screen,
        units: scene.units,
        anchors: outline.chain(obstacles).chain(plates).collect(),
        is_on: !keys.ctrl,
    }
}

/// Whether the end of another plate stands on the one that is held, and moves with it.
fn goes_along(scene: &Scene, held: usize, end: Point) -> bool {
    plating::stands_on(&scene.study.section, held, end)
}

/// What snaps to the grid and to round numbers alone.
pub fn grid_snapper<'a>(scene: &'a Scene, keys: Modifiers) -> Snapper<'a> {
    Snapper { screen: &scene.screen, units: scene.units, anchors: Vec::new(), is_on: !keys.ctrl }
}

/// The lines that the end of a plate may stand on, but for those of one plate.
pub fn lines(scene: &Scene, but_plate: Option<usize>) -> Vec<Line> {
    plating::lines(&scene.study.section, but_plate)
}

/// The anchor of a plate that is being drawn: where it begins.
pub fn beginning(at: Point) -> Anchor {
    Anchor { at, name: "its beginning".to_owned() }
}
