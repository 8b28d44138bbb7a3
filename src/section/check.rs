//! Every fault of a section, found at once, with its place.

use std::f64::consts::TAU;

use crate::geom::{Edge, Path, Point, Vec2, cross};
use crate::problem::{Place, Problem};

use super::{EdgeKind, Section, WidthLaw};

/// An edge of a region, with where it came from.
#[derive(Clone, Copy, Debug)]
pub struct RegionEdge {
    /// Geometry, with the region on its left.
    pub edge: Edge,
    /// None: the outline; some: this obstacle.
    pub obstacle_idx: Option<usize>,
    /// Index in the outline or obstacle.
    pub edge_idx: usize,
}

impl RegionEdge {
    /// Its place on the study.
    pub fn place(&self) -> Place {
        match self.obstacle_idx {
            None => Place::Edge(self.edge_idx),
            Some(obstacle_idx) => Place::Obstacle { obstacle_idx, edge_idx: Some(self.edge_idx) },
        }
    }
}

/// A section without faults: every edge has the region on its left.
#[derive(Clone, Debug)]
pub struct Region {
    edges: Vec<RegionEdge>,
    geometry: Vec<Edge>,
    area_m2: f64,
    low: Point,
    high: Point,
}

impl Region {
    /// All edges, the outline's first, in the order of the section.
    pub fn edges(&self) -> &[RegionEdge] {
        &self.edges
    }

    /// The same edges as geometry alone.
    pub fn geometry(&self) -> &[Edge] {
        &self.geometry
    }

    /// Area, m2.
    pub fn area_m2(&self) -> f64 {
        self.area_m2
    }

    /// Corners of the box round the outline.
    pub fn bounds(&self) -> (Point, Point) {
        (self.low, self.high)
    }

    /// Diagonal of the box, m: the scale of lengths.
    pub fn diagonal_m(&self) -> f64 {
        (self.high - self.low).norm()
    }
}

/// Lengths below this share of the section's diagonal are taken as zero: far above rounding in f64, far below
/// what can be built.
const SLACK: f64 = 1e-9;

/// The region, or every fault.
///
/// Refused: fewer than two edges, non-finite numbers, doubled vertices, arcs of a full turn or more, chains that
/// cross or touch themselves or each other, no area, obstacles outside, a mouth on no outline, a width law that is
/// not positive or does not reach from floor to roof.
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
    let mut edges = Vec::new();
    push_chain(&section.edges(), None, &mut edges);
    for (obstacle_idx, obstacle) in section.obstacles.iter().enumerate() {
        push_chain(&obstacle.edges(), Some(obstacle_idx), &mut edges);
    }
    let geometry: Vec<Edge> = edges.iter().map(|e| e.edge).collect();
    let outline = Path::new(section.edges());
    let (s, z) = (outline.extent(Vec2::x()), outline.extent(Vec2::y()));
    let holes: f64 = section.obstacles.iter().map(|o| Path::new(o.edges()).signed_area().abs()).sum();
    Ok(Region {
        edges,
        geometry,
        area_m2: outline.signed_area().abs() - holes,
        low: Point::new(s.0, z.0),
        high: Point::new(s.1, z.1),
    })
}

/// Adds a chain with the region on the left of each edge; the order of the section's edges is kept.
fn push_chain(edges: &[Edge], obstacle_idx: Option<usize>, out: &mut Vec<RegionEdge>) {
    let is_ccw = Path::new(edges.to_vec()).signed_area() > 0.0;
    let keep = is_ccw == obstacle_idx.is_none();
    for (edge_idx, edge) in edges.iter().enumerate() {
        let edge = if keep { *edge } else { edge.reversed() };
        out.push(RegionEdge { edge, obstacle_idx, edge_idx });
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

/// Points at which two edges meet, shared ends included.
fn meetings(a: &Edge, b: &Edge, slack: f64) -> Vec<Point> {
    let mut out: Vec<Point> = Vec::new();
    if (a.start - b.start).norm() > reach(a) + reach(b) + slack {
        return out;
    }
    // Ends of one on the other: touching, and overlap of edges on one line or circle.
    for (edge, other) in [(a, b), (b, a)] {
        for p in [edge.start, edge.end] {
            if other.nearest(p).1 <= slack {
                out.push(p);
            }
        }
    }
    match (a.center(), b.center()) {
        (None, None) => {
            let (d, e) = (a.chord(), b.chord());
            let det = cross(d, e);
            if det != 0.0 {
                let w = b.start - a.start;
                let (t, u) = (cross(w, e) / det, cross(w, d) / det);
                if (0.0..=1.0).contains(&t) && (0.0..=1.0).contains(&u) {
                    out.push(a.point_at(t));
                }
            }
        }
        (Some(center), None) => line_on_circle(b, center, a, slack, &mut out),
        (None, Some(center)) => line_on_circle(a, center, b, slack, &mut out),
        (Some(p), Some(q)) => {
            let (r, s) = (a.radius().abs(), b.radius().abs());
            let d = q - p;
            let dist = d.norm();
            if dist > 0.0 && dist <= r + s + slack && dist >= (r - s).abs() - slack {
                let along = (dist * dist + r * r - s * s) / (2.0 * dist);
                let off = (r * r - along * along).max(0.0).sqrt();
                let (d, n) = (d / dist, Vec2::new(-d.y, d.x) / dist);
                for sign in [1.0, -1.0] {
                    let x = p + d * along + n * (sign * off);
                    if a.nearest(x).1 <= slack && b.nearest(x).1 <= slack {
                        out.push(x);
                    }
                }
            }
        }
    }
    out
}

/// No point of the edge is further from its start.
fn reach(e: &Edge) -> f64 {
    if e.sweep.abs() <= std::f64::consts::PI { e.chord().norm() } else { 2.0 * e.radius().abs() }
}

fn line_on_circle(line: &Edge, center: Point, arc: &Edge, slack: f64, out: &mut Vec<Point>) {
    let d = line.chord();
    let n2 = d.norm_squared();
    let foot = (center - line.start).dot(&d) / n2;
    let off2 = (line.start + d * foot - center).norm_squared();
    let r2 = arc.radius() * arc.radius();
    if off2 > r2 {
        return;
    }
    let half = ((r2 - off2) / n2).sqrt();
    for t in [foot - half, foot + half] {
        let p = line.start + d * t;
        if line.nearest(p).1 <= slack && arc.nearest(p).1 <= slack {
            out.push(p);
        }
    }
}
