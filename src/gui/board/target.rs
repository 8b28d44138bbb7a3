//! The things on the board that can be pointed at, taken hold of and reached with the keyboard.

use egui::Pos2;

use crate::geom::{Edge, Point};
use crate::gui::Selected;
use crate::section::EdgeKind;
use crate::units::{Measure, Quantity, UnitSystem, fixed};

use super::scene::Scene;
use super::strips;

/// How near the pointer must be to a handle, points.
const HANDLE_REACH: f32 = 8.0;

/// How near it must be to a line.
const LINE_REACH: f64 = 6.0;

/// Shortest edge on the screen that offers its middle, points.
const LEAST_BENDABLE: f64 = 40.0;

/// A thing on the board.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Target {
    /// The plumb bob.
    Bob,
    /// Where an edge of the outline starts.
    Vertex(usize),
    /// The middle of an edge, which bends it.
    Middle(usize),
    /// An edge of the outline.
    Edge(usize),
    /// Vertex of an obstacle.
    ObstacleVertex(usize, usize),
    /// A whole obstacle.
    Obstacle(usize),
    /// A named point.
    Point(usize),
    /// The point about which moments are taken.
    MomentPoint,
    /// The still level, which sets the fill.
    StillLevel,
}

impl Target {
    /// Everything that the keyboard can reach, in the order of the Tab key.
    pub fn reachable(scene: &Scene) -> Vec<Target> {
        let outline = (0..scene.edges.len()).flat_map(|i| [Target::Vertex(i), Target::Middle(i)]);
        let obstacles = (0..scene.study.section.obstacles.len()).map(Target::Obstacle);
        let points = (0..scene.study.points.len()).map(Target::Point);
        let mut all: Vec<Target> = outline.chain(obstacles).chain(points).chain([Target::MomentPoint]).collect();
        if scene.model.still_z_m.is_some() {
            all.push(Target::StillLevel);
        }
        if scene.has_bob() {
            all.push(Target::Bob);
        }
        all.retain(|t| t.handle(scene).is_some_and(|p| p.is_finite()));
        all
    }

    /// What lies under the pointer, the smallest thing first; handles of obstacles only while theirs is chosen.
    pub fn under(scene: &Scene, pos: Pos2, selected: Option<Selected>) -> Option<Target> {
        let near = |t: &Target| t.handle(scene).is_some_and(|p| (p - pos).length() <= HANDLE_REACH);
        let nearest = |all: Vec<Target>| {
            let distance = |t: &Target| t.handle(scene).map_or(f32::MAX, |p| (p - pos).length());
            all.into_iter().filter(near).min_by(|a, b| distance(a).total_cmp(&distance(b)))
        };
        if scene.has_bob() && scene.hanging.now.is_some_and(|g| scene.dial.is_on_drop(g, pos)) {
            return Some(Target::Bob);
        }
        let n = scene.edges.len();
        let corners = match selected {
            Some(Selected::Obstacle(i) | Selected::ObstacleVertex(i, _)) => {
                let n = scene.study.section.obstacles.get(i).map_or(0, |o| o.vertices.len());
                (0..n).map(|j| Target::ObstacleVertex(i, j)).collect()
            }
            _ => Vec::new(),
        };
        let points = (0..scene.study.points.len()).map(Target::Point).collect();
        let middles = (0..n).filter(|&i| scene.edges[i].length() * scene.screen.scale() >= LEAST_BENDABLE);
        nearest((0..n).map(Target::Vertex).collect())
            .or_else(|| nearest(corners))
            .or_else(|| nearest(points))
            .or_else(|| nearest(middles.map(Target::Middle).collect()))
            .or_else(|| nearest(vec![Target::MomentPoint]))
            .or_else(|| edge_under(scene, pos))
            .or_else(|| still_level_under(scene, pos))
            .or_else(|| obstacle_under(scene, pos))
    }

    /// Where its handle is on the screen.
    pub fn handle(self, scene: &Scene) -> Option<Pos2> {
        match self {
            Target::Bob => scene.hanging.now.map(|g| scene.dial.tip(g)),
            Target::StillLevel => {
                let z = scene.model.still_z_m?;
                let x = scene.bounds().left().clamp(scene.screen.rect.left(), scene.screen.rect.right());
                Some(Pos2::new(x - 10.0, scene.at(Point::new(0.0, z)).y))
            }
            _ => Some(scene.at(self.anchor(scene)?)),
        }
    }

    /// The section point that moves with it.
    pub fn anchor(self, scene: &Scene) -> Option<Point> {
        let section = &scene.study.section;
        match self {
            Target::Vertex(i) => scene.edges.get(i).map(|e| e.start),
            Target::Middle(i) | Target::Edge(i) => scene.edges.get(i).map(|e| e.point_at(0.5)),
            Target::ObstacleVertex(i, j) => section.obstacles.get(i)?.vertices.get(j).map(|v| v.start),
            Target::Obstacle(i) => section.obstacles.get(i)?.vertices.first().map(|v| v.start),
            Target::Point(i) => scene.study.points.get(i).map(|p| p.at),
            Target::MomentPoint => Some(scene.study.moment_about),
            Target::Bob | Target::StillLevel => None,
        }
    }

    /// What choosing it selects.
    pub fn selects(self) -> Option<Selected> {
        match self {
            Target::Bob => Some(Selected::Bob),
            Target::Vertex(i) => Some(Selected::Vertex(i)),
            Target::Middle(i) | Target::Edge(i) => Some(Selected::Edge(i)),
            Target::ObstacleVertex(i, j) => Some(Selected::ObstacleVertex(i, j)),
            Target::Obstacle(i) => Some(Selected::Obstacle(i)),
            Target::Point(i) => Some(Selected::Point(i)),
            Target::MomentPoint | Target::StillLevel => None,
        }
    }

    /// The handle that has the keyboard when it is chosen with the pointer.
    pub fn handle_target(self) -> Target {
        match self {
            Target::Edge(i) => Target::Middle(i),
            Target::ObstacleVertex(i, _) => Target::Obstacle(i),
            other => other,
        }
    }

    /// Its name with its numbers, as it is spoken: `Vertex 3, s 0.550 m, z 1.760 m`.
    pub fn words(self, scene: &Scene) -> String {
        let units = scene.units;
        let place = self.anchor(scene).map(|p| place_words(p, scene)).unwrap_or_default();
        let name = |own: &str, word: &str, i: usize| match own {
            "" => format!("{word} {}", i + 1),
            own => format!("{word} {}, {own}", i + 1),
        };
        match self {
            Target::Vertex(i) => format!("Vertex {}, {place}", i + 1),
            Target::Middle(i) => format!("Middle of {}, {}", edge_name(scene, i), edge_form(scene, i)),
            Target::Edge(i) => {
                let mouth = scene.study.section.outline[i].kind == EdgeKind::Mouth;
                let kind = if mouth { "mouth" } else { "wall" };
                format!("{}, {kind}, {}", edge_name(scene, i), edge_form(scene, i))
            }
            Target::ObstacleVertex(i, j) => format!("Obstacle {}, vertex {}, {place}", i + 1, j + 1),
            Target::Obstacle(i) => {
                let own = scene.study.section.obstacles.get(i).map_or("", |o| &o.name);
                format!("{}, {place}", name(own, "Obstacle", i))
            }
            Target::Point(i) => {
                let own = scene.study.points.get(i).map_or("", |p| &p.name);
                format!("{}, {place}", name(own, "Point", i))
            }
            Target::MomentPoint => format!("Moment point, {place}"),
            Target::StillLevel => {
                let level = Measure::new(Quantity::Length, scene.model.still_z_m.unwrap_or(0.0));
                format!("Still level, {}", level.text_to(units, 4))
            }
            Target::Bob => {
                let accel = scene.case().map(|c| c.accel).unwrap_or_default();
                let [a_s, a_z] = [accel.x, accel.y].map(|a| Measure::new(Quantity::Acceleration, a).text(units));
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
    match scene.study.section.outline.get(i) {
        Some(edge) if !edge.name.is_empty() => format!("edge {}, {}", i + 1, edge.name),
        _ => format!("edge {}", i + 1),
    }
}

fn edge_form(scene: &Scene, i: usize) -> String {
    scene.edges.get(i).map(|e| form_words(e, scene.units)).unwrap_or_default()
}

fn edge_under(scene: &Scene, pos: Pos2) -> Option<Target> {
    let p = scene.screen.section_from_screen(pos);
    let reach_m = LINE_REACH / scene.screen.scale();
    let distances = scene.edges.iter().enumerate().map(|(i, e)| (i, e.nearest(p).1));
    let (i, distance) = distances.min_by(|a, b| a.1.total_cmp(&b.1))?;
    (distance <= reach_m).then_some(Target::Edge(i))
}

fn still_level_under(scene: &Scene, pos: Pos2) -> Option<Target> {
    let y = scene.at(Point::new(0.0, scene.model.still_z_m?)).y;
    let span = scene.bounds().expand(26.0).x_range();
    ((pos.y - y).abs() <= 5.0 && span.contains(pos.x)).then_some(Target::StillLevel)
}

fn obstacle_under(scene: &Scene, pos: Pos2) -> Option<Target> {
    let p = scene.screen.section_from_screen(pos);
    let reach_m = LINE_REACH / scene.screen.scale();
    scene.study.section.obstacles.iter().enumerate().find_map(|(i, obstacle)| {
        let is_near = obstacle.edges().iter().any(|e| e.nearest(p).1 <= reach_m);
        let is_inside = scene.model.obstacles.get(i).is_some_and(|points| strips::contain(points, p));
        (is_near || is_inside).then_some(Target::Obstacle(i))
    })
}
