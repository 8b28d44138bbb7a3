//! Pools and pour-over: what one way from rest to a case costs, against the number of edges and plates.

use std::hint::black_box;

use brimwright::geom::{Edge, Point, Vec2};
use brimwright::section::{Panel, Plate, Section, WidthLaw};

use crate::support::followed::Followed;
use crate::support::shapes;
use crate::timing::median_s;

/// A box with a wavy floor of `n_edges` edges in all, and plates of several kinds: standing, hanging, with gaps at
/// both ends. The ways are to 0.4 g, a tilt of 21.8 degrees.
fn tank(n_edges: usize, n_plates: usize) -> Section {
    let (length, height) = (8.0, 2.0);
    let n_floor = n_edges - 3;
    let floor = |i: usize| {
        let share = i as f64 / n_floor as f64;
        Point::new(length * share, 0.12 * (9.0 * std::f64::consts::TAU * share).sin().abs())
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
            0 => (0.25, 1.6),
            1 => (0.3, 1.9),
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

pub fn pools() {
    println!("  one way from rest to 0.4 g, all pools at its end, one core");
    println!("  edges  plates        ms");
    for (n_edges, n_plates) in [(12, 0), (12, 4), (20, 8), (40, 8), (60, 0), (60, 8), (120, 8), (60, 16), (240, 16)] {
        let section = tank(n_edges, n_plates);
        let followed = Followed::new(section, 0.45 * 8.0 * 2.0 * 1.5);
        let ups = [Vec2::y(), Vec2::new(0.4, 1.0).normalize()];
        let s = median_s(|| _ = black_box(followed.along(&ups, brimwright::statics::LONGEST_STEP)));
        let traces = followed.along(&ups, brimwright::statics::LONGEST_STEP);
        let n_pools = traces[0].stops.first().map_or(0, |stop| stop.bodies.len());
        let aim = if (n_edges, n_plates) == (60, 8) {
            if s < 2e-3 { "   aim 2 ms   reached" } else { "   aim 2 ms   missed" }
        } else {
            ""
        };
        println!("  {n_edges:>5}  {n_plates:>6}  {:>8.3}   {n_pools} pools{aim}", 1e3 * s);
        let look = median_s(|| _ = black_box(followed.look(ups[1])));
        println!("                 {:>8.4}   one look", 1e3 * look);
    }
}
