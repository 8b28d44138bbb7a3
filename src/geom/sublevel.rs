//! The part of a region below a slanted level: areas, levels, chords, pools. Exact for lines and arcs.
//!
//! The region is cut into slabs at the level of every vertex and of every turning point of an arc. Within a slab
//! the edges neither start nor end nor cross, so that the region there is a row of strips between a left and a
//! right piece, and area is the trapezoid between chords plus circular segments: every term adds, nothing cancels.

use super::piece::{Flat, Piece, cut};
use super::{Edge, Point, Vec2};

#[derive(Clone, Copy, Debug)]
pub(super) struct Slab {
    pub bottom: f64,
    pub top: f64,
    /// Range in `crossing`.
    pub first: u32,
    pub n: u32,
    /// Area of the region below the slab.
    pub area_below: f64,
    pub width_bottom: f64,
    pub width_top: f64,
    pub has_arcs: bool,
}

/// How far up a section is cut.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Until {
    /// To its top.
    All,
    /// At least to this level.
    Level(f64),
    /// At least until this area lies below.
    Area(f64),
}

/// A piece that crosses a slab.
#[derive(Clone, Copy, Debug)]
pub(super) struct Crossing {
    pub piece_idx: u32,
    /// u at the slab's bottom.
    pub u_bottom: f64,
}

/// A piece that the sweep crosses, with its u at the borders and in the middle of the present slab.
#[derive(Clone, Copy, Debug)]
struct Active<'a> {
    piece: &'a Piece,
    piece_idx: u32,
    u_bottom: f64,
    u_middle: f64,
    u_top: f64,
}

/// A region seen along one direction: area against level and back.
///
/// Levels are v = up . x in metres. Costs O(n log n) to make and O(log n) a level for straight edges.
/// Relative error of an area below 1e-12 (straight edges) and 1e-11 (arcs); levels likewise.
#[derive(Clone, Debug)]
pub struct Sublevel {
    up: Vec2,
    right: Vec2,
    origin: Point,
    origin_level: f64,
    pieces: Vec<Piece>,
    /// From the lowest up.
    flats: Vec<Flat>,
    slabs: Vec<Slab>,
    /// Slab by slab, from left to right; strips are pairs.
    crossing: Vec<Crossing>,
    total: f64,
}

impl Sublevel {
    /// `edges` are closed chains with the region on their left, in any order, not crossing; `up` is a unit vector.
    /// A chain may be a slit: out along one side and back along the other.
    pub fn new(edges: &[Edge], up: Vec2) -> Sublevel {
        Sublevel::up_to(edges, up, Until::All)
    }

    /// The same, cut only as far up as asked: what lies above is taken as not there.
    pub fn up_to(edges: &[Edge], up: Vec2, until: Until) -> Sublevel {
        let right = Vec2::new(up.y, -up.x);
        let origin = edges.first().map_or(Point::origin(), |e| e.start);
        let (pieces, mut flats) = cut(edges, origin, up, right);
        flats.sort_unstable_by(|a, b| a.v.total_cmp(&b.v));
        let mut this = Sublevel {
            up,
            right,
            origin,
            origin_level: up.dot(&origin.coords),
            pieces,
            flats,
            slabs: Vec::new(),
            crossing: Vec::new(),
            total: 0.0,
        };
        this.cut_into_slabs(until);
        this
    }

    /// The direction.
    pub fn up(&self) -> Vec2 {
        self.up
    }

    /// Area of the whole region.
    pub fn total_area(&self) -> f64 {
        self.total
    }

    /// Lowest level of the region.
    pub fn lowest(&self) -> f64 {
        self.slabs.first().map_or(0.0, |s| s.bottom) + self.origin_level
    }

    /// Highest level of the region.
    pub fn highest(&self) -> f64 {
        self.slabs.last().map_or(0.0, |s| s.top) + self.origin_level
    }

    /// Area of the region below `level`: zero below it, the whole above it.
    pub fn area_below(&self, level: f64) -> f64 {
        let v = level - self.origin_level;
        match self.slab_at(v) {
            None => 0.0,
            Some(slab) if v >= slab.top && slab.top == self.slabs[self.slabs.len() - 1].top => self.total,
            Some(slab) => slab.area_below + self.measure(slab, v).1,
        }
    }

    /// Length of the surface at `level`: the derivative of the area.
    pub fn width_at(&self, level: f64) -> f64 {
        let v = level - self.origin_level;
        match self.slab_at(v) {
            Some(slab) if v <= slab.top => self.measure(slab, v).0,
            _ => 0.0,
        }
    }

    /// The level below which `area` lies; clamped to the region's lowest and highest level. Where a span of
    /// levels has no width, its lowest.
    pub fn level_for_area(&self, area: f64) -> f64 {
        let after = self.slabs.partition_point(|s| s.area_below < area);
        if after == 0 {
            return self.lowest();
        }
        let slab = &self.slabs[after - 1];
        if area >= self.total {
            return self.highest();
        }
        let missing = area - slab.area_below;
        let height = slab.top - slab.bottom;
        let gain = (slab.width_top - slab.width_bottom) / height;
        let root = (slab.width_bottom * slab.width_bottom + 2.0 * gain * missing).max(0.0).sqrt();
        let guess = (2.0 * missing / (slab.width_bottom + root)).clamp(0.0, height);
        let rise = if slab.has_arcs { self.newton(slab, missing, guess) } else { guess };
        slab.bottom + rise + self.origin_level
    }

    /// The surface at `level`: pairs of left and right ends, from left to right.
    pub fn chords(&self, level: f64) -> Vec<(Point, Point)> {
        let v = level - self.origin_level;
        let Some(slab) = self.slab_at(v) else { return Vec::new() };
        self.strips(slab)
            .map(|(left, right)| {
                let point = |piece: &Piece| self.origin + self.right * piece.u_at(v) + self.up * v;
                (point(left), point(right))
            })
            .collect()
    }

    /// Sweeps upward: the next border is the next end of a piece that is crossed, or the next start of another.
    fn cut_into_slabs(&mut self, until: Until) {
        let (last_level, last_area) = match until {
            Until::All => (f64::INFINITY, f64::INFINITY),
            Until::Level(level) => (level - self.origin_level, f64::INFINITY),
            Until::Area(area) => (f64::INFINITY, area),
        };
        let pieces = &self.pieces;
        // Only low points need sorting: from there the chains lead up, piece by piece.
        let starts = (0..pieces.len()).filter(|&i| !is_led_to(pieces, i));
        let mut rising: Vec<(f64, u32)> = Vec::with_capacity(pieces.len());
        rising.extend(starts.map(|i| (pieces[i].low[1], i as u32)));
        rising.sort_unstable_by(|a, b| a.0.total_cmp(&b.0));
        let mut rising = rising.into_iter().peekable();
        // A level slit cuts slabs too.
        let mut flats = self.flats.iter().map(|flat| flat.v).peekable();
        let Some(&(mut bottom, _)) = rising.peek() else { return };
        self.slabs.reserve(pieces.len());
        self.crossing.reserve(4 * pieces.len());
        let mut active: Vec<Active> = Vec::with_capacity(8);
        let mut area = 0.0;
        loop {
            active.retain_mut(|a| {
                if a.piece.high[1] > bottom {
                    return true;
                }
                let Some(next) = next_up(pieces, a.piece_idx as usize) else { return false };
                (a.piece, a.piece_idx) = (&pieces[next], next as u32);
                true
            });
            let n_before = active.len();
            while let Some((_, piece_idx)) = rising.next_if(|next| next.0 <= bottom) {
                let piece = &pieces[piece_idx as usize];
                active.push(Active { piece, piece_idx, u_bottom: 0.0, u_middle: 0.0, u_top: piece.low[0] });
            }
            let ends = active.iter().map(|a| a.piece.high[1]);
            let top = ends.chain(rising.peek().map(|next| next.0)).fold(f64::INFINITY, f64::min);
            if top == f64::INFINITY {
                break;
            }
            while flats.next_if(|&v| v <= bottom).is_some() {}
            let top = flats.peek().map_or(top, |&v| top.min(v));
            let (mut width_bottom, mut width_top, mut segments, mut has_arcs) = (0.0, 0.0, 0.0, false);
            for a in &mut active {
                let piece = a.piece;
                a.u_bottom = a.u_top;
                a.u_top = piece.u_at(top);
                width_bottom += piece.side() * a.u_bottom;
                width_top += piece.side() * a.u_top;
                if piece.arc.is_some() {
                    has_arcs = true;
                    segments += piece.segment_area([a.u_bottom, bottom], [a.u_top, top]);
                }
            }
            // Pieces do not cross: only new ones need to find their place.
            if active.len() > n_before {
                let middle = 0.5 * (bottom + top);
                active.iter_mut().for_each(|a| a.u_middle = a.piece.u_at(middle));
                active.sort_unstable_by(|a, b| a.u_middle.total_cmp(&b.u_middle));
                alternate(&mut active);
            }
            let (width_bottom, width_top) = (f64::max(width_bottom, 0.0), f64::max(width_top, 0.0));
            let (first, n) = (self.crossing.len() as u32, active.len() as u32);
            let crossing = active.iter().map(|a| Crossing { piece_idx: a.piece_idx, u_bottom: a.u_bottom });
            self.crossing.extend(crossing);
            self.slabs.push(Slab { bottom, top, first, n, area_below: area, width_bottom, width_top, has_arcs });
            area += 0.5 * (width_bottom + width_top) * (top - bottom) + segments;
            if top >= last_level || area >= last_area {
                break;
            }
            bottom = top;
        }
        self.total = area;
    }

    /// The slab that holds level `v`, the lower of two at their border; none below the region.
    fn slab_at(&self, v: f64) -> Option<&Slab> {
        self.slab_and_index(v).map(|(_, slab)| slab)
    }

    pub(super) fn slab_and_index(&self, v: f64) -> Option<(usize, &Slab)> {
        let after = self.slabs.partition_point(|s| s.bottom < v);
        after.checked_sub(1).map(|i| (i, &self.slabs[i]))
    }

    pub(super) fn slabs(&self) -> &[Slab] {
        &self.slabs
    }

    pub(super) fn pieces(&self) -> &[Piece] {
        &self.pieces
    }

    pub(super) fn flats(&self) -> &[Flat] {
        &self.flats
    }

    /// Level of the region's origin: levels inside count from it.
    pub(super) fn origin_level(&self) -> f64 {
        self.origin_level
    }

    /// (u, v) of a point, from the region's origin.
    pub(super) fn local(&self, p: Point) -> [f64; 2] {
        let d = p - self.origin;
        [self.right.dot(&d), self.up.dot(&d)]
    }

    /// The point at (u, v) from the region's origin.
    pub(super) fn point(&self, u: f64, v: f64) -> Point {
        self.origin + self.right * u + self.up * v
    }

    /// The pieces left and right of strip `i` of a slab.
    pub(super) fn strip(&self, slab: &Slab, i: usize) -> (&Piece, &Piece) {
        let piece = |c: usize| &self.pieces[self.crossing[slab.first as usize + c].piece_idx as usize];
        (piece(2 * i), piece(2 * i + 1))
    }

    pub(super) fn crossing_of(&self, slab: &Slab) -> &[Crossing] {
        &self.crossing[slab.first as usize..(slab.first + slab.n) as usize]
    }

    pub(super) fn strips(&self, slab: &Slab) -> impl Iterator<Item = (&Piece, &Piece)> {
        let piece = |c: &Crossing| &self.pieces[c.piece_idx as usize];
        self.crossing_of(slab).chunks_exact(2).map(move |pair| (piece(&pair[0]), piece(&pair[1])))
    }

    /// Width of the slab at `v`, and its area below: trapezoid and circular segments.
    fn measure(&self, slab: &Slab, v: f64) -> (f64, f64) {
        let (mut width, mut segments) = (0.0, 0.0);
        for c in self.crossing_of(slab) {
            let piece = &self.pieces[c.piece_idx as usize];
            let u = piece.u_at(v);
            width += piece.side() * u;
            segments += piece.segment_area([c.u_bottom, slab.bottom], [u, v]);
        }
        let width = f64::max(width, 0.0);
        (width, 0.5 * (slab.width_bottom + width) * (v - slab.bottom) + segments)
    }

    /// Safeguarded Newton steps on area(rise) = missing; the area's derivative is the width.
    fn newton(&self, slab: &Slab, missing: f64, guess: f64) -> f64 {
        let (mut low, mut high) = (0.0, slab.top - slab.bottom);
        let mut rise = guess;
        for _ in 0..80 {
            let (width, area) = self.measure(slab, slab.bottom + rise);
            let error = area - missing;
            if error > 0.0 {
                high = rise
            } else {
                low = rise
            }
            if error.abs() <= 2.0 * f64::EPSILON * missing || high - low <= f64::EPSILON * high {
                break;
            }
            let next = rise - error / width;
            rise = if next > low && next < high { next } else { 0.5 * (low + high) };
        }
        rise
    }
}

/// Puts left and right bounds in turn. The two sides of a slit lie in one place, and in a slab as thin as rounding so
/// may others: their order along u says nothing, but strips cannot overlap.
fn alternate(active: &mut [Active]) {
    for i in 0..active.len() {
        let wants_right = i % 2 == 1;
        // The place itself, where it is right already: nothing turns then.
        if let Some(offset) = active[i..].iter().position(|a| a.piece.is_right == wants_right) {
            active[i..=i + offset].rotate_right(1);
        }
    }
}

/// The piece that goes on upward where piece `i` ends.
fn next_up(pieces: &[Piece], i: usize) -> Option<usize> {
    let next = if pieces[i].is_right { i + 1 } else { i.checked_sub(1)? };
    let goes_on = |p: &Piece| p.is_right == pieces[i].is_right && p.low == pieces[i].high;
    pieces.get(next).is_some_and(goes_on).then_some(next)
}

/// Whether some piece goes on as piece `i`.
fn is_led_to(pieces: &[Piece], i: usize) -> bool {
    let before = if pieces[i].is_right { i.checked_sub(1) } else { Some(i + 1) };
    before.is_some_and(|b| b < pieces.len() && next_up(pieces, b) == Some(i))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn circle() -> Vec<Edge> {
        let (left, right) = (Point::new(-1.0, 1.0), Point::new(1.0, 1.0));
        let half = std::f64::consts::PI;
        vec![Edge { start: left, end: right, sweep: half }, Edge { start: right, end: left, sweep: half }]
    }

    #[test]
    fn a_circle_gives_its_segment_area_in_every_direction() {
        // Segment area of a circle: any mensuration handbook; evaluated here by its closed form.
        for degrees in [0.0_f64, 17.0, 90.0, 135.0, 180.0, 271.0] {
            let (sin, cos) = degrees.to_radians().sin_cos();
            let up = Vec2::new(-sin, cos);
            let low = Sublevel::new(&circle(), up);
            for h in [0.04_f64, 0.5, 1.0, 1.7, 1.96] {
                let want = (1.0 - h).acos() - (1.0 - h) * (2.0 * h - h * h).sqrt();
                let level = up.y - 1.0 + h;
                let got = low.area_below(level);
                assert!((got - want).abs() < 2e-14, "{degrees} deg, h {h}: {got} against {want}");
                let back = low.level_for_area(want);
                assert!((back - level).abs() < 1e-13, "{degrees} deg, h {h}: level {back} against {level}");
            }
        }
    }

    #[test]
    fn a_step_in_the_floor_makes_two_surfaces_until_it_is_covered() {
        let points = [(0.0, 0.0), (1.0, 0.0), (1.0, 0.5), (2.0, 0.5), (2.0, 0.0), (3.0, 0.0), (3.0, 1.0), (0.0, 1.0)];
        let points: Vec<Point> = points.iter().map(|&(s, z)| Point::new(s, z)).collect();
        let low = Sublevel::new(super::super::Path::polygon(&points).edges(), Vec2::new(0.0, 1.0));
        assert_eq!(low.area_below(0.5), 1.0);
        assert!((low.level_for_area(1.6) - 0.7).abs() < 1e-15);
        assert_eq!(low.chords(0.25).len(), 2);
    }
}
