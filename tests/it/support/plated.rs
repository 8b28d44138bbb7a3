//! Sections with plates: drawn by hand, and random ones as proptest strategies. Plates are lines without thickness.

use brimwright::geom::{Edge, Path, Point, Vec2};
use brimwright::section::{Panel, Plate, Section};
use proptest::collection::vec;
use proptest::prelude::*;

use super::random::star;
use super::shapes::{self, polygon};

/// A section as a drawing.
#[derive(Clone, Debug)]
pub struct Plated {
    /// Counter-clockwise.
    pub outline: Vec<Edge>,
    /// Indices of the outline's edges that are open to air.
    pub mouths: Vec<usize>,
    /// Each counter-clockwise.
    pub obstacles: Vec<Vec<Edge>>,
    /// Each a line through these points.
    pub plates: Vec<Vec<Point>>,
}

impl Plated {
    /// A tank of these edges, all of them walls.
    pub fn tank(outline: Vec<Edge>) -> Plated {
        Plated { outline, mouths: vec![], obstacles: vec![], plates: vec![] }
    }

    pub fn with_mouth(mut self, edge_idx: usize) -> Plated {
        self.mouths.push(edge_idx);
        self
    }

    pub fn with_obstacle(mut self, edges: Vec<Edge>) -> Plated {
        self.obstacles.push(edges);
        self
    }

    pub fn with_plate(mut self, points: &[(f64, f64)]) -> Plated {
        self.plates.push(points.iter().map(|&(s, z)| Point::new(s, z)).collect());
        self
    }

    /// As a section 1 m wide, its plates 6 mm thick.
    pub fn section(&self) -> Section {
        let mut section = shapes::section(&self.outline, &self.mouths, 1.0);
        section.obstacles = self.obstacles.iter().map(|edges| shapes::obstacle(edges)).collect();
        section.plates = self.plates.iter().map(|points| plate(points)).collect();
        section
    }

    /// Outline and obstacles, the region on the left of each.
    pub fn edges(&self) -> Vec<Edge> {
        let holes = self.obstacles.iter().flat_map(|o| Path::new(o.clone()).reversed().edges().to_vec());
        self.outline.iter().copied().chain(holes).collect()
    }

    /// Area of the region.
    pub fn area(&self) -> f64 {
        let area = |edges: &Vec<Edge>| Path::new(edges.clone()).signed_area();
        area(&self.outline) - self.obstacles.iter().map(area).sum::<f64>()
    }
}

/// How a random plate hangs on its section.
#[derive(Clone, Copy, Debug)]
enum Hold {
    /// One end on a wall.
    Wall,
    /// Both ends free.
    Free,
    /// Right through.
    Through,
}

/// A random plate: where along the section, from and to as shares of the way in, and how it hangs.
type Seed = (f64, f64, f64, Hold);

fn seeds() -> impl Strategy<Value = Vec<Seed>> {
    let hold = prop_oneof![4 => Just(Hold::Wall), 2 => Just(Hold::Free), 1 => Just(Hold::Through)];
    vec((0.1..0.9, 0.1..0.4, 0.45..0.9, hold), 0..=4)
}

/// A star-shaped polygon, with obstacles and arcs or without, its plates on spokes; half of them with the edge
/// above the centre open.
fn plated_star(arcs: bool) -> impl Strategy<Value = Plated> {
    (star(5..=12, arcs), seeds(), any::<bool>()).prop_map(|(sample, seeds, is_open)| {
        let n = sample.outline.len();
        let center = sample.center;
        let room = sample.outline.iter().map(|e| e.nearest(center).1).fold(f64::INFINITY, f64::min);
        // The edge above the centre: its ends are to the right and to the left of it.
        let above = |e: &Edge| e.start.x > center.x && e.end.x <= center.x && e.start.y + e.end.y > 2.0 * center.y;
        let mouth = (0..n).find(|&i| is_open && above(&sample.outline[i]));
        let walls: Vec<&Edge> = (0..n).filter(|&i| Some(i) != mouth).map(|i| &sample.outline[i]).collect();
        let clear = if sample.obstacles.is_empty() { 0.2 } else { 0.85 };
        let mut is_through = false;
        let mut plates = vec![];
        for (i, &(along, from, to, hold)) in seeds.iter().enumerate() {
            // Every plate has an edge of its own: spokes to different edges do not meet outside the centre.
            let Some(wall) = walls.get(i * walls.len() / seeds.len()) else { continue };
            let foot = wall.point_at(along);
            // Clear of the obstacles, which lie within 0.8 of the room, or else of the centre.
            let spoke = |share: f64| {
                let reach = (foot - center).norm();
                let inner = clear * room.min(reach);
                center + (foot - center) * ((inner + (1.0 - share) * (reach - inner)) / reach)
            };
            match hold {
                Hold::Through if !is_through && sample.obstacles.is_empty() => {
                    let opposite = walls[(i * walls.len() / seeds.len() + walls.len() / 2) % walls.len()];
                    is_through = true;
                    plates.push(vec![foot, center, opposite.point_at(0.05)]);
                }
                Hold::Free => plates.push(vec![spoke(from), spoke(to)]),
                _ => plates.push(vec![foot, spoke(to)]),
            }
        }
        Plated {
            outline: sample.outline.clone(),
            mouths: mouth.into_iter().collect(),
            obstacles: sample.obstacles,
            plates,
        }
    })
}

/// A tank with a stepped floor and a stepped roof, its plates upright in the middle of a step; half of them with
/// one step of the roof open.
fn plated_steps() -> impl Strategy<Value = Plated> {
    let step = (0.3..1.0, 0.0..0.4, 0.8..1.2);
    (vec(step, 2..=5), seeds(), any::<bool>(), 0.0..1.0).prop_map(|(steps, seeds, is_open, which)| {
        let n = steps.len();
        let mut lefts = vec![0.0];
        for &(length, ..) in &steps {
            lefts.push(lefts[lefts.len() - 1] + length);
        }
        let floor = (0..n).flat_map(|i| [(lefts[i], steps[i].1), (lefts[i + 1], steps[i].1)]);
        let roof = (0..n).rev().flat_map(|i| [(lefts[i + 1], steps[i].2), (lefts[i], steps[i].2)]);
        let outline = polygon(&floor.chain(roof).collect::<Vec<_>>());
        // Floor and roof: edges 0, 2, 4 ... are level ones, the floor's n first, the roof's from right to left.
        let mouth_step = (which * n as f64) as usize;
        let mut plated = Plated::tank(outline);
        if is_open {
            plated.mouths.push(2 * n + 2 * (n - 1 - mouth_step));
        }
        for (i, &(along, from, to, hold)) in seeds.iter().enumerate() {
            // A step each, so that plates do not meet; more plates than steps share a step's length.
            let (step, turn) = (i % n, i / n);
            let (length, low, high) = steps[step];
            let s = lefts[step] + length * (0.1 + 0.4 * turn as f64 + 0.35 * along);
            let at = |share: f64| Point::new(s, low + share * (high - low));
            let is_under_mouth = is_open && step == mouth_step;
            let hangs = along > 0.5 && !is_under_mouth;
            plated.plates.push(match hold {
                Hold::Wall if hangs => vec![at(1.0), at(1.0 - to)],
                Hold::Through if !is_under_mouth => vec![at(0.0), at(1.0)],
                Hold::Free => vec![at(from), at(to)],
                _ => vec![at(0.0), at(to)],
            });
        }
        plated
    })
}

/// Any of the above without arcs.
pub fn straight() -> impl Strategy<Value = Plated> {
    prop_oneof![plated_star(false), plated_steps()]
}

/// Any of the above.
pub fn plated() -> impl Strategy<Value = Plated> {
    prop_oneof![straight(), plated_star(true)]
}

/// Effective gravity in units of g, after an acceleration of up to 2 g along and of up to 0.8 g up or down.
pub fn pull() -> impl Strategy<Value = Vec2> {
    (0.1..2.0, any::<bool>(), -0.8..0.8)
        .prop_map(|(a_s, to_left, a_z)| Vec2::new(if to_left { a_s } else { -a_s }, -1.0 - a_z))
}

/// A plate 6 mm thick, without openings.
pub fn plate(points: &[Point]) -> Plate {
    Plate {
        name: String::new(),
        points: points.to_vec(),
        thickness_m: 0.006,
        corrosion_m: 0.0,
        material: String::new(),
        panel: Panel::default(),
        openings: vec![],
    }
}
