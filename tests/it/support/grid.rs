//! A section as a net of points that see each other: the ground of the brute-force sampler. Knows no level, no
//! liquid, and nothing of how the kernel finds pools.
//!
//! Two kinds of node. A cell is the middle of a square of the grid and stands for the square's area where it lies
//! inside the section. A bead lies on a wall, a plate or a mouth, stands for no area, and makes heights exact:
//! liquid stands up to the very tip of a plate, slides along the very wall, and leaves at the very lip, however
//! coarse the grid.
//!
//! Two nodes are linked when they are near and no wall or plate lies between them. So every way through the net is
//! a true way through the section, along which the level is highest at a node: no leak is possible. A gap can be
//! missed only where it is much narrower than a square.

use brimwright::geom::{Edge, Path, Point, Vec2, cross};

use super::plated::Plated;

/// The net.
pub struct Grid {
    /// Where the nodes are: cells first, then beads.
    pub at: Vec<Point>,
    pub n_cells: usize,
    /// Side of a square.
    pub step: f64,
    /// The nodes that each node is linked with.
    pub links: Vec<Vec<u32>>,
    /// Whether liquid that reaches the node leaves through a mouth.
    pub is_exit: Vec<bool>,
    /// Length of all walls and of both faces of all plates.
    boundary: f64,
}

/// Distance of a bead from what it lies on, in steps.
const OFF: f64 = 1e-4;

const GOLDEN: f64 = 1.618_033_988_749_895;

/// A straight piece of something; a mouth stops nobody.
#[derive(Clone, Copy)]
struct Piece {
    from: Point,
    to: Point,
    is_mouth: bool,
}

impl Grid {
    /// `n_across` squares along the longer side of the section's box, the grid turned by the angle whose
    /// tangent is the golden ratio: along upright and level walls, and most of all at that slope, squares that
    /// count too much and too little even out.
    pub fn new(section: &Plated, n_across: usize) -> Grid {
        let axes = [Vec2::new(1.0, GOLDEN).normalize(), Vec2::new(-GOLDEN, 1.0).normalize()];
        let outline = Path::new(section.outline.clone());
        let size = |axis| outline.extent(axis).1 - outline.extent(axis).0;
        let step = f64::max(size(Vec2::x()), size(Vec2::y())) / n_across as f64;

        let is_mouth = |i: usize| section.mouths.contains(&i);
        let mut chains = vec![pieces(&section.outline, is_mouth, step)];
        for obstacle in &section.obstacles {
            chains.push(pieces(Path::new(obstacle.clone()).reversed().edges(), |_| false, step));
        }
        let plates: Vec<Piece> = section
            .plates
            .iter()
            .flat_map(|plate| plate.windows(2).map(|p| Piece { from: p[0], to: p[1], is_mouth: false }))
            .collect();
        let boundary = section.edges().iter().map(Edge::length).sum::<f64>()
            + plates.iter().map(|p| 2.0 * p.length()).sum::<f64>();

        let ([low_u, low_v], [high_u, high_v]) =
            (axes.map(|a| outline.extent(a).0), axes.map(|a| outline.extent(a).1));
        let mut at = vec![];
        for i in 0..=((high_u - low_u) / step) as usize {
            for j in 0..=((high_v - low_v) / step) as usize {
                let p = axes[0] * (low_u + (i as f64 + 0.5) * step) + axes[1] * (low_v + (j as f64 + 0.5) * step);
                if is_inside(&chains, p.into()) {
                    at.push(p.into());
                }
            }
        }
        let n_cells = at.len();
        let mut is_exit = vec![false; n_cells];
        for chain in &chains {
            for (bead, exit) in beads_on_chain(chain, step) {
                // Where a plate meets a wall, a bead on the wall would lie within the plate.
                if plates.iter().all(|p| p.distance(bead) > 100.0 * OFF * step) {
                    at.push(bead);
                    is_exit.push(exit);
                }
            }
        }
        for plate in &section.plates {
            let beads = beads_on_plate(plate, step);
            is_exit.extend(beads.iter().map(|_| false));
            at.extend(beads);
        }
        let shafts = section.plates.iter().flat_map(|plate| shut(plate, section, step));
        let stops: Vec<Piece> = chains.into_iter().flatten().chain(shafts).filter(|p| !p.is_mouth).collect();
        let links = link(&at, &stops, 1.5 * step);
        Grid { at, n_cells, step, links, is_exit, boundary }
    }

    /// What a cell stands for.
    pub fn cell_area(&self) -> f64 {
        self.step * self.step
    }

    /// How far an area of cells may be from the true one, for a body with `surface` metres of surface at most. A
    /// square that its border cuts counts wholly or not at all: half a square too much or too little at most, 0.29 of
    /// a square as a standard deviation, and there are border / step of them. Being independent, since the grid is
    /// turned, they add up as their square root. Four deviations are allowed, and two squares for whole numbers.
    pub fn area_tolerance(&self, surface: f64) -> f64 {
        self.cell_area() * (4.0 * 0.29 * ((self.boundary + surface) / self.step).sqrt() + 2.0)
    }

    /// The node nearest to a place: beads line both sides of every plate, so it is on the same side.
    pub fn node_near(&self, p: Point) -> usize {
        let distance = |i: &usize| (self.at[*i] - p).norm_squared();
        (0..self.at.len()).min_by(|a, b| distance(a).total_cmp(&distance(b))).expect("a section has nodes")
    }
}

impl Piece {
    fn length(&self) -> f64 {
        (self.to - self.from).norm()
    }

    fn distance(&self, p: Point) -> f64 {
        let along = self.to - self.from;
        let t = (along.dot(&(p - self.from)) / along.norm_squared()).clamp(0.0, 1.0);
        (p - (self.from + along * t)).norm()
    }

    fn normal(&self) -> Vec2 {
        let along = (self.to - self.from) / self.length();
        Vec2::new(-along.y, along.x)
    }

    /// Places along the piece, at most half a step apart, without its ends.
    fn inner_points(&self, step: f64) -> impl Iterator<Item = Point> {
        let (from, along) = (self.from, self.to - self.from);
        let n = (self.length() / (0.5 * step)).ceil();
        (1..n as usize).map(move |k| from + along * (k as f64 / n))
    }

    /// Whether it touches the straight way from `p` to `q`.
    fn is_between(&self, p: Point, q: Point) -> bool {
        let side = |a: Point, b: Point, c: Point| cross(b - a, c - a);
        side(self.from, self.to, p) * side(self.from, self.to, q) <= 0.0
            && side(p, q, self.from) * side(p, q, self.to) <= 0.0
    }
}

/// A chain of edges as straight pieces; arcs as chords of at most a step, which leave them by step^2 / (8 radius).
fn pieces(edges: &[Edge], is_mouth: impl Fn(usize) -> bool, step: f64) -> Vec<Piece> {
    let mut out = vec![];
    for (i, edge) in edges.iter().enumerate() {
        let n = if edge.is_arc() { (edge.length() / step).ceil() } else { 1.0 };
        let point = |k: f64| edge.point_at(k / n);
        out.extend((0..n as usize).map(|k| k as f64).map(|k| Piece {
            from: point(k),
            to: point(k + 1.0),
            is_mouth: is_mouth(i),
        }));
    }
    out
}

/// Whether a ray to the right crosses the chains an odd number of times.
fn is_inside(chains: &[Vec<Piece>], p: Point) -> bool {
    let crosses = |piece: &&Piece| {
        let (a, b) = (piece.from, piece.to);
        (a.y <= p.y) != (b.y <= p.y) && a.x + (p.y - a.y) / (b.y - a.y) * (b.x - a.x) > p.x
    };
    chains.iter().flatten().filter(crosses).count() % 2 == 1
}

/// Beads on the inner side of a closed chain, and whether they lie on a mouth: at every corner and between.
fn beads_on_chain(chain: &[Piece], step: f64) -> Vec<(Point, bool)> {
    let mut out = vec![];
    for (i, piece) in chain.iter().enumerate() {
        let before = chain[(i + chain.len() - 1) % chain.len()];
        let inward = before.normal() + piece.normal();
        out.push((piece.from + inward.normalize() * (OFF * step), before.is_mouth || piece.is_mouth));
        let inward = piece.normal() * (OFF * step);
        out.extend(piece.inner_points(step).map(|p| (p + inward, piece.is_mouth)));
    }
    out
}

/// Beads on both faces of a plate, on its corners, and beyond its two ends. An end on a wall has its bead behind the
/// wall, where nothing sees it; an end on a mouth has it over the mouth, where both sides see it.
fn beads_on_plate(points: &[Point], step: f64) -> Vec<Point> {
    let pieces: Vec<Piece> = points.windows(2).map(|p| Piece { from: p[0], to: p[1], is_mouth: false }).collect();
    let off = OFF * step;
    let mut out = vec![];
    for piece in &pieces {
        let (side, along) = (piece.normal() * off, (piece.to - piece.from).normalize() * off);
        for p in piece.inner_points(step).chain([piece.from + along * 2.0, piece.to - along * 2.0]) {
            out.extend([p + side, p - side]);
        }
    }
    for pair in pieces.windows(2) {
        let side = (pair[0].normal() + pair[1].normal()).normalize() * off;
        out.extend([pair[1].from + side, pair[1].from - side]);
    }
    let (first, last) = (pieces[0], pieces[pieces.len() - 1]);
    out.push(first.from + (first.from - first.to).normalize() * off);
    out.push(last.to + (last.to - last.from).normalize() * off);
    out
}

/// The pieces of a plate, carried on by half a step behind the walls on which it ends: the chords of an arc do not go
/// through its foot.
fn shut(plate: &[Point], section: &Plated, step: f64) -> Vec<Piece> {
    let walls = section.edges().into_iter().enumerate().filter(|(i, _)| !section.mouths.contains(i));
    let walls: Vec<Edge> = walls.map(|(_, edge)| edge).collect();
    let is_on_wall = |p: Point| walls.iter().any(|edge| edge.nearest(p).1 < OFF * step);
    let beyond = |end: Point, before: Point| {
        if is_on_wall(end) { end + (end - before).normalize() * (0.5 * step) } else { end }
    };
    let n = plate.len();
    let mut points = plate.to_vec();
    points[0] = beyond(plate[0], plate[1]);
    points[n - 1] = beyond(plate[n - 1], plate[n - 2]);
    points.windows(2).map(|p| Piece { from: p[0], to: p[1], is_mouth: false }).collect()
}

/// Links all nodes that are nearer than `reach` and see each other.
fn link(at: &[Point], stops: &[Piece], reach: f64) -> Vec<Vec<u32>> {
    let low = |pick: fn(&Point) -> f64| at.iter().map(pick).fold(f64::INFINITY, f64::min);
    let (low_x, low_y) = (low(|p| p.x), low(|p| p.y));
    let bin = |p: &Point| (((p.x - low_x) / reach) as usize + 1, ((p.y - low_y) / reach) as usize + 1);
    let n_columns = at.iter().map(|p| bin(p).0).max().expect("a section has nodes") + 2;
    let n_rows = at.iter().map(|p| bin(p).1).max().expect("a section has nodes") + 2;
    let mut bins = vec![vec![]; n_columns * n_rows];
    let mut links = vec![vec![]; at.len()];
    let mut near_stops: Vec<&Piece> = vec![];
    for (i, &p) in at.iter().enumerate() {
        near_stops.clear();
        near_stops.extend(stops.iter().filter(|stop| {
            let (a, b) = (stop.from, stop.to);
            a.x.min(b.x) <= p.x + reach
                && a.x.max(b.x) >= p.x - reach
                && a.y.min(b.y) <= p.y + reach
                && a.y.max(b.y) >= p.y - reach
        }));
        let (column, row) = bin(&p);
        for c in column - 1..=column + 1 {
            for r in row - 1..=row + 1 {
                for &j in &bins[c * n_rows + r] {
                    let q: Point = at[j as usize];
                    if (q - p).norm_squared() <= reach * reach && !near_stops.iter().any(|s| s.is_between(p, q)) {
                        links[i].push(j);
                        links[j as usize].push(i as u32);
                    }
                }
            }
        }
        bins[column * n_rows + row].push(i as u32);
    }
    links
}
