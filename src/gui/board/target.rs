//! The things on the board that can be pointed at, taken hold of and reached with the keyboard.

use egui::Pos2;

use crate::geom::{Edge, Point, Vec2};
use crate::gui::Selected;

use super::model::PlateLine;
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
    /// A whole plate.
    Plate(usize),
    /// A corner or end of a plate.
    PlatePoint(usize, usize),
    /// An opening of a plate, which moves along it.
    Opening(usize, usize),
    /// One end of an opening.
    OpeningEnd(usize, usize, OpeningEnd),
    /// A compartment with a fill of its own.
    Compartment(usize),
    /// Where the tank is emptied from.
    Sump,
    /// A named point.
    Point(usize),
    /// The point about which moments are taken.
    MomentPoint,
    /// The still level, which sets the fill.
    StillLevel,
}

/// An end of an opening.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum OpeningEnd {
    /// The one nearer to the plate's first point.
    From,
    /// The other one.
    To,
}

impl Target {
    /// Everything that the keyboard can reach, in the order of the Tab key.
    pub fn reachable(scene: &Scene) -> Vec<Target> {
        let outline = (0..scene.edges.len()).flat_map(|i| [Target::Vertex(i), Target::Middle(i)]);
        let obstacles = (0..scene.study.section.obstacles.len()).map(Target::Obstacle);
        let plates = (0..scene.model.plates.len()).flat_map(|i| Target::of_plate(scene, i));
        let compartments = (0..scene.study.compartments.len()).map(Target::Compartment);
        let points = (0..scene.study.points.len()).map(Target::Point);
        let places = compartments.chain([Target::Sump]).chain(points).chain([Target::MomentPoint]);
        let mut all: Vec<Target> = outline.chain(plates).chain(obstacles).chain(places).collect();
        if scene.model.still_z_m.is_some() {
            all.push(Target::StillLevel);
        }
        if scene.has_bob() {
            all.push(Target::Bob);
        }
        all.retain(|t| t.handle(scene).is_some_and(|p| p.is_finite()));
        all
    }

    /// What lies under the pointer: handles of what is chosen first, then the smallest thing first; handles of obstacles
    /// only while theirs is chosen.
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
        let plate_points =
            scene.model.plates.iter().enumerate().flat_map(|(i, p)| (0..p.points.len()).map(move |k| (i, k)));
        let corners = (0..n).map(Target::Vertex).chain(plate_points.map(|(i, k)| Target::PlatePoint(i, k)));
        let openings =
            scene.model.plates.iter().enumerate().flat_map(|(i, p)| (0..p.openings.len()).map(move |o| (i, o)));
        let ticks =
            openings.flat_map(|(i, o)| [OpeningEnd::From, OpeningEnd::To].map(|end| Target::OpeningEnd(i, o, end)));
        let points = (0..scene.study.points.len()).map(Target::Point);
        let compartments = (0..scene.study.compartments.len()).map(Target::Compartment);
        let middles = (0..n).filter(|&i| scene.edges[i].length() * scene.screen.scale() >= LEAST_BENDABLE);
        nearest(handles_of(scene, selected))
            .or_else(|| nearest(corners.collect()))
            .or_else(|| nearest(ticks.collect()))
            .or_else(|| nearest(points.chain(compartments).chain([Target::Sump]).collect()))
            .or_else(|| nearest(middles.map(Target::Middle).collect()))
            .or_else(|| nearest(vec![Target::MomentPoint]))
            .or_else(|| line_under(scene, pos))
            .or_else(|| still_level_under(scene, pos))
            .or_else(|| obstacle_under(scene, pos))
    }

    /// A plate and all its handles.
    fn of_plate(scene: &Scene, i: usize) -> Vec<Target> {
        let Some(plate) = scene.model.plates.get(i) else { return Vec::new() };
        let points = (0..plate.points.len()).map(|k| Target::PlatePoint(i, k));
        let openings = (0..plate.openings.len()).flat_map(|o| {
            let [from, to] = [OpeningEnd::From, OpeningEnd::To].map(|end| Target::OpeningEnd(i, o, end));
            [from, Target::Opening(i, o), to]
        });
        [Target::Plate(i)].into_iter().chain(points).chain(openings).collect()
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
            Target::Plate(i) => plate_middle(scene.model.plates.get(i)?),
            Target::PlatePoint(i, k) => scene.model.plates.get(i)?.points.get(k).copied(),
            Target::Opening(i, o) => middle(&scene.model.plates.get(i)?.openings.get(o)?.points),
            Target::OpeningEnd(i, o, end) => {
                let points = &scene.model.plates.get(i)?.openings.get(o)?.points;
                if end == OpeningEnd::From { points.first() } else { points.last() }.copied()
            }
            Target::Compartment(i) => scene.study.compartments.get(i).map(|c| c.at),
            Target::Sump => scene.study.sump,
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
            Target::Plate(i) => Some(Selected::Plate(i)),
            Target::PlatePoint(i, k) => Some(Selected::PlatePoint(i, k)),
            Target::Opening(i, o) | Target::OpeningEnd(i, o, _) => Some(Selected::Opening(i, o)),
            Target::Compartment(i) => Some(Selected::Compartment(i)),
            Target::Sump => Some(Selected::Sump),
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
}

/// What `selected` stands for as a thing on the board.
pub fn target_of(selected: Selected) -> Target {
    match selected {
        Selected::Edge(i) => Target::Edge(i),
        Selected::Vertex(i) => Target::Vertex(i),
        Selected::Obstacle(i) => Target::Obstacle(i),
        Selected::ObstacleVertex(i, j) => Target::ObstacleVertex(i, j),
        Selected::Plate(i) => Target::Plate(i),
        Selected::PlatePoint(i, k) => Target::PlatePoint(i, k),
        Selected::Opening(i, o) => Target::Opening(i, o),
        Selected::Compartment(i) => Target::Compartment(i),
        Selected::Sump => Target::Sump,
        Selected::Point(i) => Target::Point(i),
        Selected::Bob => Target::Bob,
    }
}

/// The handles of what is chosen.
fn handles_of(scene: &Scene, selected: Option<Selected>) -> Vec<Target> {
    let n = scene.edges.len();
    match selected {
        Some(Selected::Edge(i)) if i < n => vec![Target::Vertex(i), Target::Vertex((i + 1) % n), Target::Middle(i)],
        Some(Selected::Obstacle(i) | Selected::ObstacleVertex(i, _)) => {
            let n = scene.study.section.obstacles.get(i).map_or(0, |o| o.vertices.len());
            (0..n).map(|j| Target::ObstacleVertex(i, j)).collect()
        }
        Some(selected) => selected.plate().map_or_else(Vec::new, |i| {
            let handles = Target::of_plate(scene, i).into_iter();
            handles.filter(|t| matches!(t, Target::PlatePoint(..) | Target::OpeningEnd(..))).collect()
        }),
        None => Vec::new(),
    }
}

/// The nearest edge, plate or opening.
fn line_under(scene: &Scene, pos: Pos2) -> Option<Target> {
    let p = scene.screen.section_from_screen(pos);
    let reach_m = LINE_REACH / scene.screen.scale();
    let edges = scene.edges.iter().enumerate().map(|(i, e)| (Target::Edge(i), e.nearest(p).1 - reach_m));
    let plates = scene.model.plates.iter().enumerate().flat_map(|(i, plate)| {
        let solid = plate.solid.iter().map(move |points| (Target::Plate(i), points));
        let open = plate.openings.iter().enumerate().map(move |(o, line)| (Target::Opening(i, o), &line.points));
        let reach_m = f64::max(reach_m, 0.5 * plate.thickness_m);
        solid.chain(open).map(move |(target, points)| (target, distance_m(points, p) - reach_m))
    });
    // Plates first: at its end a plate lies on a wall that can be taken hold of everywhere else.
    let (target, beyond_m) = plates.chain(edges).min_by(|a, b| a.1.total_cmp(&b.1))?;
    (beyond_m <= 0.0).then_some(target)
}

fn distance_m(points: &[Point], p: Point) -> f64 {
    let distances = points.windows(2).map(|pair| Edge::line(pair[0], pair[1]).nearest(p).1);
    distances.fold(f64::INFINITY, f64::min)
}

/// The middle of the longest solid part: where the plate itself is taken hold of.
fn plate_middle(plate: &PlateLine) -> Option<Point> {
    let longest = plate.solid.iter().max_by(|a, b| length_m(a).total_cmp(&length_m(b)));
    middle(longest.unwrap_or(&plate.points))
}

/// The middle of a line along its length.
fn middle(points: &[Point]) -> Option<Point> {
    let half_m = 0.5 * length_m(points);
    let mut walked_m = 0.0;
    for pair in points.windows(2) {
        let length = (pair[1] - pair[0]).norm();
        if walked_m + length >= half_m {
            return Some(Edge::line(pair[0], pair[1]).point_at(if length > 0.0 {
                (half_m - walked_m) / length
            } else {
                0.0
            }));
        }
        walked_m += length;
    }
    points.last().copied()
}

fn length_m(points: &[Point]) -> f64 {
    points.windows(2).map(|pair| (pair[1] - pair[0]).norm()).sum()
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
        let chain = scene.model.obstacles.get(i).map(|points| strips::sides(points).collect::<Vec<_>>());
        let is_inside = chain.is_some_and(|chain| strips::contain(&chain, Vec2::y(), p));
        (is_near || is_inside).then_some(Target::Obstacle(i))
    })
}
