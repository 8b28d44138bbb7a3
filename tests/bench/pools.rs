//! Pools and pour-over: what one way from rest to a case costs, against the number of edges and plates.

use std::hint::black_box;

use brimwright::geom::{Edge, Point, Vec2};
use brimwright::section::{Panel, Plate, Section, WidthLaw};
use brimwright::statics::LONGEST_STEP;

use crate::support::followed::Followed;
use crate::support::shapes;
use crate::timing::median_s;

/// How the floor goes.
#[derive(Clone, Copy)]
pub enum Floor {
    /// One trough.
    Hollow,
    /// Eighteen waves, which liquid leaves one by one.
    Wavy,
}

/// A box with a floor of many edges, `n_edges` in all, and plates of several kinds: standing, hanging, free at both ends.
pub fn tank(floor: Floor, n_edges: usize, n_plates: usize) -> Section {
    let (length, height) = (8.0, 2.0);
    let n_floor = n_edges - 3;
    let floor = |i: usize| {
        let share = i as f64 / n_floor as f64;
        let z = match floor {
            Floor::Hollow => (2.0 * share - 1.0).powi(2) * 0.2,
            Floor::Wavy => 0.12 * (9.0 * std::f64::consts::TAU * share).sin().abs(),
        };
        Point::new(length * share, z)
    };
    let mut corners: Vec<Point> = (0..=n_floor).map(floor).collect();
    corners.extend([Point::new(length, height), Point::new(0.0, height)]);
    let n = corners.len();
    let outline: Vec<Edge> = (0..n).map(|i| Edge::line(corners[i], corners[(i + 1) % n])).collect();
    let mut section = shapes::section(&outline, &[n - 2], 1.5);
    section.width = WidthLaw::Constant { width_m: 1.5 };
    for i in 0..n_plates {
        let s = length * (i as f64 + 0.63) / n_plates as f64;
        let (low, high) = match i % 3 {
            // On the floor, from the roof, and free.
            0 => (floor_at(&outline, s), 0.6),
            1 => (0.5, height),
            _ => (0.5, 1.4),
        };
        let points = vec![Point::new(s, low), Point::new(s, high)];
        let plate = Plate {
            name: String::new(),
            points,
            thickness_m: 0.006,
            corrosion_m: 0.0,
            material: String::new(),
            panel: Panel::default(),
            openings: vec![],
        };
        section.plates.push(plate);
    }
    section
}

/// z of the floor at `s`.
fn floor_at(outline: &[Edge], s: f64) -> f64 {
    let floor = outline.iter().filter(|e| e.end.x > e.start.x).find(|e| e.start.x <= s && s <= e.end.x);
    floor.map_or(0.0, |e| e.start.y + (e.end.y - e.start.y) * (s - e.start.x) / (e.end.x - e.start.x))
}

pub fn pools() {
    println!("  one way from rest to 0.4 g, a tilt of 21.8 degrees, and all pools at its end; one core");
    println!("  floor   edges  plates   a way, ms   one look, ms   pools");
    let sizes = [(12, 0), (12, 4), (20, 8), (40, 8), (60, 0), (60, 8), (60, 16), (120, 8), (240, 16)];
    for (floor, name) in [(Floor::Hollow, "hollow"), (Floor::Wavy, "wavy")] {
        for (n_edges, n_plates) in sizes {
            let followed = Followed::new(tank(floor, n_edges, n_plates), 0.45 * 8.0 * 2.0 * 1.5);
            let ups = [Vec2::y(), Vec2::new(0.4, 1.0).normalize()];
            let way = median_s(|| _ = black_box(followed.along(&ups, LONGEST_STEP)));
            let look = median_s(|| _ = black_box(followed.look(ups[1])));
            let traces = followed.along(&ups, LONGEST_STEP);
            let n_pools = traces[0].stops.first().map_or(0, |stop| stop.bodies.len());
            let word = if way < 2e-3 { "reached" } else { "missed" };
            let aim = if (n_edges, n_plates) == (60, 8) { format!("   aim 2 ms   {word}") } else { String::new() };
            let (way, look) = (1e3 * way, 1e3 * look);
            println!("  {name:<6} {n_edges:>6} {n_plates:>7} {way:>11.3} {look:>14.4} {n_pools:>7}{aim}");
        }
    }
}
