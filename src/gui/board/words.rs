//! What the board says of things and places: spoken names with their numbers, and the words of the status line.

use crate::geom::{Edge, Point};
use crate::gui::plating;
use crate::section::EdgeKind;
use crate::units::{Measure, Quantity, UnitSystem, fixed};

use super::scene::Scene;
use super::target::{OpeningEnd, Target};

impl Target {
    /// Its name with its numbers, as it is spoken: `Vertex 3, s 0.550 m, z 1.760 m`.
    pub fn words(self, scene: &Scene) -> String {
        let section = &scene.study.section;
        let place = self.anchor(scene).map(|p| place_words(p, scene)).unwrap_or_default();
        let length = |m: f64| Measure::new(Quantity::Length, m).text_to(scene.units, 4);
        match self {
            Target::Vertex(i) => format!("Vertex {}, {place}", i + 1),
            Target::Middle(i) => format!("Middle of {}, {}", edge_name(scene, i), edge_form(scene, i)),
            Target::Edge(i) => {
                let mouth = section.outline[i].kind == EdgeKind::Mouth;
                let kind = if mouth { "mouth" } else { "wall" };
                format!("{}, {kind}, {}", edge_name(scene, i), edge_form(scene, i))
            }
            Target::ObstacleVertex(i, j) => format!("Obstacle {}, vertex {}, {place}", i + 1, j + 1),
            Target::Obstacle(i) => {
                format!("{}, {place}", named("Obstacle", i, section.obstacles.get(i).map(|o| &o.name)))
            }
            Target::Plate(i) => {
                let form = section.plates.get(i).map_or_else(String::new, |plate| {
                    format!("{}, {} thick", length(plate.length_m()), length(plate.thickness_m))
                });
                format!("{}, {form}", plate_name(scene, i))
            }
            Target::PlatePoint(i, k) => {
                let name = plate_name(scene, i);
                format!("{} of {}, {place}", corner_words(scene, i, k), lower_first(&name))
            }
            Target::Opening(i, o) => {
                let opening = section.plates.get(i).and_then(|plate| plate.openings.get(o));
                let reach = opening.map_or_else(String::new, |opening| {
                    format!(", from {} to {}", length(opening.from_m), length(opening.to_m))
                });
                format!("{}{reach}", opening_name(scene, i, o))
            }
            Target::OpeningEnd(i, o, end) => {
                let opening = section.plates.get(i).and_then(|plate| plate.openings.get(o));
                let (word, at_m) = match end {
                    OpeningEnd::From => ("Beginning", opening.map(|opening| opening.from_m)),
                    OpeningEnd::To => ("End", opening.map(|opening| opening.to_m)),
                };
                let name = lower_first(&opening_name(scene, i, o));
                format!("{word} of {name}, at {}", length(at_m.unwrap_or_default()))
            }
            Target::Compartment(i) => {
                let own = scene.study.compartments.get(i).map(|c| &c.name);
                format!("{}, {place}", named("Compartment", i, own))
            }
            Target::Sump => format!("Sump, {place}"),
            Target::Point(i) => format!("{}, {place}", named("Point", i, scene.study.points.get(i).map(|p| &p.name))),
            Target::MomentPoint => format!("Moment point, {place}"),
            Target::StillLevel => format!("Still level, {}", length(scene.model.still_z_m.unwrap_or(0.0))),
            Target::Bob => {
                let accel = scene.case().map(|c| c.accel).unwrap_or_default();
                let [a_s, a_z] =
                    [accel.x, accel.y].map(|a| Measure::new(Quantity::Acceleration, a).text(scene.units));
                format!("Plumb bob, a_s {a_s}, a_z {a_z}")
            }
        }
    }
}

/// A place in words, as fine as the board shows it: `s 0.550 m, z 1.760 m`.
pub fn place_words(p: Point, scene: &Scene) -> String {
    let unit = Quantity::Distance.unit(scene.units);
    let decimals = (scene.screen.scale().log10().floor() as usize + 1).max(3);
    let number = |v: f64| fixed(unit.from_si(v), decimals);
    format!("s {} {unit}, z {} {unit}", number(p.x), number(p.y), unit = unit.symbol)
}

/// The form of an edge in words: `straight, 1 250 mm` or `arc, radius 600 mm, 64.2°`.
pub fn form_words(edge: &Edge, units: UnitSystem) -> String {
    let length = |m: f64| Measure::new(Quantity::Length, m).text_to(units, 4);
    if edge.is_arc() {
        let sweep = fixed(edge.sweep.abs().to_degrees(), 1);
        format!("arc, radius {}, {sweep}°", length(edge.radius().abs()))
    } else {
        format!("straight, {}", length(edge.length()))
    }
}

/// The name of an edge: `edge 3`, or its own.
pub fn edge_name(scene: &Scene, i: usize) -> String {
    named("edge", i, scene.study.section.outline.get(i).map(|e| &e.name))
}

/// The name of a plate: `Plate 2`, or its own.
pub fn plate_name(scene: &Scene, i: usize) -> String {
    named("Plate", i, scene.study.section.plates.get(i).map(|plate| &plate.name))
}

/// What a corner of a plate is: `Foot`, `Top`, `Left end`, `Right end`, `Corner 2`.
pub fn corner_words(scene: &Scene, i: usize, k: usize) -> String {
    scene.study.section.plates.get(i).map_or_else(String::new, |plate| plating::corner_word(plate, k))
}

fn opening_name(scene: &Scene, i: usize, o: usize) -> String {
    let plate = scene.study.section.plates.get(i);
    let own = plate.and_then(|plate| plate.openings.get(o)).map_or("", |opening| &opening.name);
    match own {
        "" => format!("Opening {} of plate {}", o + 1, i + 1),
        own => format!("Opening {} of plate {}, {own}", o + 1, i + 1),
    }
}

fn named(word: &str, i: usize, own: Option<&String>) -> String {
    match own {
        Some(own) if !own.is_empty() => format!("{word} {}, {own}", i + 1),
        _ => format!("{word} {}", i + 1),
    }
}

fn lower_first(words: &str) -> String {
    crate::gui::commands::lower_first(words)
}

fn edge_form(scene: &Scene, i: usize) -> String {
    scene.edges.get(i).map(|e| form_words(e, scene.units)).unwrap_or_default()
}
