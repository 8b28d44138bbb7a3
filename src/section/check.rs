//! Every fault of a section, found at once, with its place.

use std::f64::consts::TAU;

use crate::geom::{Edge, Path, Point, Vec2};
use crate::problem::{Place, Problem};

use super::cut::{Face, Wall};
use super::meet::meetings;
use super::place::Layout;
use super::{EdgeKind, Region, Section, WidthLaw};

/// Lengths below this share of the section's diagonal are taken as zero: far above rounding in f64, far below
/// what can be built.
const SLACK: f64 = 1e-9;

/// The region, or every fault.
///
/// Refused: fewer than two edges, non-finite numbers, doubled vertices, arcs of a full turn or more, chains that
/// cross or touch themselves or each other, no area, obstacles outside, a mouth on no outline, a width law that is
/// not positive or does not reach from floor to roof; plates that leave the tank, cross, touch or lie along a wall or
/// each other, or have no length; openings that run off their plate, overlap, or are not open.
pub fn check(section: &Section) -> Result<Region, Vec<Problem>> {
    let mut faults = Vec::new();
    check_width(&section.width, &mut faults);
    let outline_place = |i: usize| Place::Edge(i);
    let outline = section.edges();
    let outline_ok = check_chain(&outline, Place::Field("outline"), &outline_place, &mut faults);
    let mut obstacles = Vec::new();
    for (obstacle_idx, obstacle) in section.obstacles.iter().enumerate() {
        let place = |i: usize| Place::Obstacle { obstacle_idx, edge_idx: Some(i) };
        let edges = obstacle.edges();
        let whole = Place::Obstacle { obstacle_idx, edge_idx: None };
        let ok = check_chain(&edges, whole, &place, &mut faults);
        obstacles.push(ok.then(|| Path::new(edges)));
    }
    if outline_ok {
        let path = Path::new(outline);
        for (obstacle_idx, obstacle) in obstacles.iter().enumerate() {
            let Some(obstacle) = obstacle else { continue };
            check_obstacle(obstacle_idx, obstacle, &path, &obstacles[..obstacle_idx], &mut faults);
        }
        check_reach(&section.width, &path, &mut faults);
    }
    if section.outline.iter().all(|e| e.kind == EdgeKind::Mouth) && !section.outline.is_empty() {
        faults.push(Problem::fault(
            Place::Field("outline"),
            "every edge is a mouth",
            "mark the edges that hold liquid as walls",
        ));
    }
    if !faults.is_empty() {
        return Err(faults);
    }
    let mut faces = Vec::new();
    let outline_wall = |edge_idx: usize| {
        let is_mouth = section.outline[edge_idx].kind == EdgeKind::Mouth;
        Wall::Outline { edge_idx, is_mouth }
    };
    push_chain(&section.edges(), true, &outline_wall, &mut faces);
    for (obstacle_idx, obstacle) in section.obstacles.iter().enumerate() {
        let wall = |edge_idx| Wall::Obstacle { obstacle_idx, edge_idx };
        push_chain(&obstacle.edges(), false, &wall, &mut faces);
    }
    let geometry: Vec<Edge> = faces.iter().map(|f| f.edge).collect();
    let outline = Path::new(section.edges());
    let (s, z) = (outline.extent(Vec2::x()), outline.extent(Vec2::y()));
    let (low, high) = (Point::new(s.0, z.0), Point::new(s.1, z.1));
    let holes: f64 = section.obstacles.iter().map(|o| Path::new(o.edges()).signed_area().abs()).sum();
    let layout = Layout::new(section, &faces, (high - low).norm());
    let plates = layout.place()?;
    let [open, shut, cells] = layout.cut(&plates);
    let area_m2 = outline.signed_area().abs() - holes;
    Ok(Region { faces, geometry, plates, open, shut, cells, area_m2, low, high })
}

/// Adds a chain with the region on the left of each edge; the order of the section's edges is kept.
fn push_chain(edges: &[Edge], is_outline: bool, wall: &dyn Fn(usize) -> Wall, out: &mut Vec<Face>) {
    let is_ccw = Path::new(edges.to_vec()).signed_area() > 0.0;
    for (edge_idx, edge) in edges.iter().enumerate() {
        let edge = if is_ccw == is_outline { *edge } else { edge.reversed() };
        out.push(Face { edge, wall: wall(edge_idx) });
    }
}

/// Checks one closed chain by itself; true when it is sound enough for what follows.
fn check_chain(edges: &[Edge], whole: Place, place: &dyn Fn(usize) -> Place, faults: &mut Vec<Problem>) -> bool {
    let n_before = faults.len();
    let n = edges.len();
    if n < 3 && !(n == 2 && edges.iter().any(Edge::is_arc)) {
        faults.push(Problem::fault(
            whole,
            format!("{n} edges enclose nothing"),
            "draw at least three edges, or two with an arc",
        ));
        return false;
    }
    for (i, e) in edges.iter().enumerate() {
        if ![e.start.x, e.start.y, e.sweep].iter().all(|v| v.is_finite()) {
            faults.push(Problem::fault(
                place(i),
                "a number is not finite",
                "type the coordinates and the sweep of this edge again",
            ));
        }
    }
    if faults.len() > n_before {
        return false;
    }
    let size = edges.iter().map(|e| (e.start - edges[0].start).norm()).fold(0.0, f64::max);
    for (i, e) in edges.iter().enumerate() {
        if e.chord().norm() <= SLACK * size {
            faults.push(Problem::fault(
                place(i),
                format!("starts and ends at the same place, s {:.4} m, z {:.4} m", e.start.x, e.start.y),
                "move one of its ends, or delete the vertex",
            ));
        }
        if e.sweep.abs() >= TAU * (1.0 - 1e-6) {
            faults.push(Problem::fault(
                place(i),
                format!("the arc turns {:.1}°: a full turn or more", e.sweep.to_degrees()),
                "keep the sweep between -360° and 360°; make a circle of two half-turn arcs",
            ));
        }
    }
    if faults.len() > n_before {
        return false;
    }
    let slack = SLACK * size;
    for i in 0..n {
        for j in i + 1..n {
            let meets: Vec<Point> = meetings(&edges[i], &edges[j], slack)
                .into_iter()
                .filter(|p| {
                    // Neighbours may meet at the vertex that they share; where they are tangent there, rounding
                    // moves the computed meeting by about the square root of f64's precision.
                    let at_joint = |joined: bool, q: Point| joined && (*p - q).norm() <= 1e-6 * size;
                    !at_joint(j == i + 1, edges[i].end) && !at_joint(i == 0 && j == n - 1, edges[0].start)
                })
                .collect();
            if let Some(p) = meets.first() {
                let what = match (place(i), place(j)) {
                    (Place::Edge(edge_idx), Place::Edge(other_idx)) => {
                        Place::Crossing { edge_idx, other_idx, at_m: [p.x, p.y] }
                    }
                    (first, _) => first,
                };
                faults.push(Problem::fault(
                    what,
                    format!("edges {} and {} of the chain cross or touch", i + 1, j + 1),
                    "move a vertex so that the chain meets itself only at its vertices",
                ));
            }
        }
    }
    if faults.len() > n_before {
        return false;
    }
    let area = Path::new(edges.to_vec()).signed_area().abs();
    if area <= SLACK * size * size {
        faults.push(Problem::fault(whole, "encloses no area", "move a vertex off the line of the others"));
        return false;
    }
    true
}

fn check_obstacle(
    obstacle_idx: usize,
    obstacle: &Path,
    outline: &Path,
    earlier: &[Option<Path>],
    faults: &mut Vec<Problem>,
) {
    let place = Place::Obstacle { obstacle_idx, edge_idx: None };
    let size = outline.perimeter();
    let crosses = |other: &Path| {
        obstacle.edges().iter().any(|a| other.edges().iter().any(|b| !meetings(a, b, SLACK * size).is_empty()))
    };
    let sample = obstacle.edges()[0].point_at(0.5);
    if crosses(outline) {
        faults.push(Problem::fault(
            place,
            "touches or crosses the outline",
            "move it clear of the walls, or make it part of the outline",
        ));
        return;
    }
    if !outline.contains(sample) {
        faults.push(Problem::fault(place, "lies outside the outline", "move it inside, or delete it"));
        return;
    }
    for (other_idx, other) in earlier.iter().enumerate() {
        let Some(other) = other else { continue };
        if crosses(other) || other.contains(sample) || obstacle.contains(other.edges()[0].point_at(0.5)) {
            faults.push(Problem::fault(
                place.clone(),
                format!("overlaps obstacle {}", other_idx + 1),
                "move them apart, or draw them as one obstacle",
            ));
        }
    }
}

fn check_width(width: &WidthLaw, faults: &mut Vec<Problem>) {
    let place = Place::Field("width law");
    let mut positive = |value: f64, name: &str| {
        if !(value.is_finite() && value > 0.0) {
            faults.push(Problem::fault(place.clone(), format!("{name} is {value} m"), "give a length above zero"));
        }
    };
    match width {
        WidthLaw::Constant { width_m } => positive(*width_m, "the width"),
        WidthLaw::RoundBarrel { diameter_m, bottom_z_m } => {
            positive(*diameter_m, "the diameter");
            positive(1.0 + bottom_z_m.abs(), "the height of the lowest line");
        }
        WidthLaw::Oval { width_m, height_m, bottom_z_m } => {
            positive(*width_m, "the width of the oval");
            positive(*height_m, "the height of the oval");
            positive(1.0 + bottom_z_m.abs(), "the height of the lowest line");
        }
        WidthLaw::Table(rows) => {
            if rows.len() < 2 {
                faults.push(Problem::fault(
                    place.clone(),
                    "the width table has fewer than two rows",
                    "give at least two heights with their widths",
                ));
            }
            for (i, &(z, w)) in rows.iter().enumerate() {
                if !(z.is_finite() && w.is_finite() && w >= 0.0) {
                    faults.push(Problem::fault(
                        Place::WidthRow(i),
                        format!("z {z} m, width {w} m"),
                        "give finite numbers, the width not below zero",
                    ));
                } else if i > 0 && z <= rows[i - 1].0 {
                    faults.push(Problem::fault(
                        Place::WidthRow(i),
                        format!("z {z} m is not above the row before"),
                        "order the rows by rising height",
                    ));
                }
            }
            if rows.len() >= 2 && rows.iter().all(|row| row.1 == 0.0) {
                faults.push(Problem::fault(
                    place,
                    "every width in the table is zero",
                    "give at least one width above zero",
                ));
            }
        }
    }
}

fn check_reach(width: &WidthLaw, outline: &Path, faults: &mut Vec<Problem>) {
    let Some((low, high)) = width.range() else { return };
    let (bottom, top) = outline.extent(Vec2::y());
    let slack = 1e-6 * (top - bottom);
    if bottom < low - slack || top > high + slack {
        faults.push(Problem::fault(
            Place::Field("width law"),
            format!("it is given from z {low:.4} m to {high:.4} m, the outline spans {bottom:.4} m to {top:.4} m"),
            "make the law reach from the lowest to the highest point of the outline",
        ));
    }
}
