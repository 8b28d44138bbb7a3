//! The part of a region between slanted levels, cut into strips that can be filled as they are.
//!
//! For drawing only: works on flattened points and never feeds a result. Knows no pressure and no screen.

use crate::geom::{Point, Vec2};

/// A piece of a region between two chains that rise together: `left[i]` and `right[i]` lie on one level, so the
/// quadrilaterals between neighbours fill it without a gap, however hollow the region is.
#[derive(Clone, Debug, PartialEq)]
pub struct Strip {
    /// The left chain, from below upward.
    pub left: Vec<Point>,
    /// The right chain, as many points.
    pub right: Vec<Point>,
}

impl Strip {
    /// The strip as a polygon, counter-clockwise as seen along its levels.
    pub fn polygon(&self) -> Vec<Point> {
        self.right.iter().chain(self.left.iter().rev()).copied().collect()
    }

    /// Its area, not negative.
    pub fn area(&self) -> f64 {
        let polygon = self.polygon();
        let Some(&origin) = polygon.first() else { return 0.0 };
        let n = polygon.len();
        let doubled: f64 =
            (0..n).map(|i| crate::geom::cross(polygon[i] - origin, polygon[(i + 1) % n] - origin)).sum();
        0.5 * doubled.abs()
    }
}

/// Unit vector to the right of `up`: along the levels.
pub fn right_of(up: Vec2) -> Vec2 {
    Vec2::new(up.y, -up.x)
}

/// A straight part of what bounds a region, in either sense.
pub type Side = [Point; 2];

/// The sides of a closed chain.
pub fn sides(points: &[Point]) -> impl Iterator<Item = Side> {
    points.iter().zip(points.iter().cycle().skip(1)).map(|(a, b)| [*a, *b])
}

/// The bands of the region inside `sides` (even-odd: obstacles and plates are sides too; sides along the levels may be
/// left out) between each level `up . p` and the next one; one band fewer than `levels`, which rise.
pub fn bands(sides: &[Side], up: Vec2, levels: &[f64]) -> Vec<Vec<Strip>> {
    let n_bands = levels.len().saturating_sub(1);
    let mut out: Vec<Vec<Strip>> = vec![Vec::new(); n_bands];
    if n_bands == 0 {
        return out;
    }
    let mut flights = flights(sides, up);
    flights.sort_by(|a, b| a.low.v.total_cmp(&b.low.v));
    let (first, last) = (levels[0], levels[n_bands]);
    let mut cuts: Vec<f64> = flights
        .iter()
        .flat_map(|f| [f.low.v, f.high.v])
        .filter(|&v| v > first && v < last)
        .chain(levels.iter().copied())
        .collect();
    cuts.sort_by(f64::total_cmp);
    cuts.dedup();

    let right = right_of(up);
    let place = |u: f64, v: f64| Point::from(right * u + up * v);
    let (mut next, mut active) = (0, Vec::<Flight>::new());
    let mut band_idx = 0;
    // Strips that the next slab may go on with: band, index in it, and where they end.
    let mut open: Vec<(usize, f64, f64)> = Vec::new();
    for slab in cuts.windows(2) {
        let (v0, v1) = (slab[0], slab[1]);
        while v0 >= levels[band_idx + 1] {
            band_idx += 1;
            open.clear();
        }
        active.retain(|f| f.high.v > v0);
        while next < flights.len() && flights[next].low.v <= v0 {
            if flights[next].high.v > v0 {
                active.push(flights[next]);
            }
            next += 1;
        }
        active.sort_by(|a, b| (a.u_at(v0) + a.u_at(v1)).total_cmp(&(b.u_at(v0) + b.u_at(v1))));
        let mut still_open = Vec::with_capacity(open.len());
        for pair in active.chunks_exact(2) {
            let (l0, r0, l1, r1) = (pair[0].u_at(v0), pair[1].u_at(v0), pair[0].u_at(v1), pair[1].u_at(v1));
            let known = open.iter().find(|&&(_, l, r)| l == l0 && r == r0).map(|&(idx, ..)| idx);
            let strips = &mut out[band_idx];
            let idx = known.unwrap_or_else(|| {
                strips.push(Strip { left: vec![place(l0, v0)], right: vec![place(r0, v0)] });
                strips.len() - 1
            });
            strips[idx].left.push(place(l1, v1));
            strips[idx].right.push(place(r1, v1));
            still_open.push((idx, l1, r1));
        }
        open = still_open;
    }
    out
}

/// The pieces of the level `up . p = level` inside `sides`, from left to right.
pub fn chords(sides: &[Side], up: Vec2, level: f64) -> Vec<[Point; 2]> {
    let mut crossings: Vec<f64> =
        flights(sides, up).iter().filter(|f| f.low.v <= level && level < f.high.v).map(|f| f.u_at(level)).collect();
    crossings.sort_by(f64::total_cmp);
    let right = right_of(up);
    let place = |u: f64| Point::from(right * u + up * level);
    crossings.chunks_exact(2).map(|pair| [place(pair[0]), place(pair[1])]).collect()
}

/// Lowest and highest level that the sides reach; none without sides.
pub fn extent(sides: &[Side], up: Vec2) -> Option<(f64, f64)> {
    sides.iter().flatten().map(|p| up.dot(&p.coords)).fold(None, |found, v| match found {
        None => Some((v, v)),
        Some((low, high)) => Some((f64::min(low, v), f64::max(high, v))),
    })
}

/// Whether `p` lies inside the sides, as they are seen along `up`.
pub fn contain(sides: &[Side], up: Vec2, p: Point) -> bool {
    let (u, v) = (right_of(up).dot(&p.coords), up.dot(&p.coords));
    let flights = flights(sides, up);
    flights.iter().filter(|f| f.low.v <= v && v < f.high.v && f.u_at(v) > u).count() % 2 == 1
}

/// A vertex along and across the levels.
#[derive(Clone, Copy)]
struct Uv {
    u: f64,
    v: f64,
}

/// A side that is not level, from its lower end to its higher one.
#[derive(Clone, Copy)]
struct Flight {
    low: Uv,
    high: Uv,
}

impl Flight {
    /// Exact at both ends, so that neighbours meet bit for bit.
    fn u_at(&self, v: f64) -> f64 {
        if v <= self.low.v {
            self.low.u
        } else if v >= self.high.v {
            self.high.u
        } else {
            self.low.u + (self.high.u - self.low.u) * ((v - self.low.v) / (self.high.v - self.low.v))
        }
    }
}

fn flights(sides: &[Side], up: Vec2) -> Vec<Flight> {
    let right = right_of(up);
    let uv = |p: Point| Uv { u: right.dot(&p.coords), v: up.dot(&p.coords) };
    let rising = sides.iter().filter_map(|&[from, to]| {
        let (from, to) = (uv(from), uv(to));
        match from.v.total_cmp(&to.v) {
            std::cmp::Ordering::Less => Some(Flight { low: from, high: to }),
            std::cmp::Ordering::Greater => Some(Flight { low: to, high: from }),
            std::cmp::Ordering::Equal => None,
        }
    });
    rising.collect()
}

#[cfg(test)]
mod tests {
    use super::*;
    use proptest::prelude::*;

    fn shape(points: &[(f64, f64)]) -> Vec<Point> {
        points.iter().map(|&(s, z)| Point::new(s, z)).collect()
    }

    fn closed(loops: &[Vec<Point>]) -> Vec<Side> {
        loops.iter().flat_map(|points| sides(points)).collect()
    }

    fn total(bands: &[Vec<Strip>]) -> f64 {
        bands.iter().flatten().map(Strip::area).sum()
    }

    #[test]
    fn a_square_is_cut_in_proportion() {
        let square = shape(&[(0.0, 0.0), (2.0, 0.0), (2.0, 2.0), (0.0, 2.0)]);
        let got = bands(&closed(&[square]), Vec2::new(0.0, 1.0), &[0.0, 0.5, 1.5, 3.0]);
        let areas: Vec<f64> = got.iter().map(|b| b.iter().map(Strip::area).sum()).collect();
        assert_eq!(areas, [1.0, 2.0, 1.0]);
        assert!(got.iter().all(|b| b.len() == 1), "one strip each: {got:?}");
    }

    #[test]
    fn a_hollow_floor_gives_two_pieces_and_an_obstacle_none() {
        // A trough with a step in its floor, and a duct inside.
        let trough =
            shape(&[(0.0, 0.0), (1.0, 0.0), (1.0, 1.0), (2.0, 1.0), (2.0, 0.0), (3.0, 0.0), (3.0, 3.0), (0.0, 3.0)]);
        let duct = shape(&[(1.0, 1.5), (1.0, 2.0), (2.0, 2.0), (2.0, 1.5)]);
        let loops = closed(&[trough, duct]);
        let up = Vec2::new(0.0, 1.0);
        assert_eq!(chords(&loops, up, 0.5).len(), 2);
        assert_eq!(chords(&loops, up, 1.2).len(), 1);
        assert_eq!(chords(&loops, up, 1.7).len(), 2);
        let got = total(&bands(&loops, up, &[0.0, 2.5]));
        assert!((got - (3.0 * 2.5 - 1.0 - 0.5)).abs() < 1e-12, "{got}");
        assert!(contain(&loops, up, Point::new(0.5, 0.5)) && !contain(&loops, up, Point::new(1.5, 0.5)));
    }

    proptest! {
        /// The area that the shoelace formula gives, whatever the direction and however it is cut.
        #[test]
        fn bands_add_up_to_the_polygon(
            radii in prop::collection::vec(0.2..2.0_f64, 3..24),
            angle in 0.0..std::f64::consts::TAU,
            n_cuts in 1..9_usize,
        ) {
            // Star-shaped, so it never crosses itself.
            let n = radii.len();
            let points: Vec<Point> = radii.iter().enumerate().map(|(i, r)| {
                let (sin, cos) = (std::f64::consts::TAU * i as f64 / n as f64).sin_cos();
                Point::new(r * cos, r * sin)
            }).collect();
            let want = crate::geom::Path::polygon(&points).signed_area();
            let up = Vec2::new(angle.sin(), angle.cos());
            let loops = closed(&[points]);
            let (low, high) = extent(&loops, up).unwrap();
            let levels: Vec<f64> =
                (0..=n_cuts).map(|i| low + (high - low) * i as f64 / n_cuts as f64).collect();
            let got = total(&bands(&loops, up, &levels));
            prop_assert!((got - want).abs() < 1e-9 * want, "angle {angle}, cuts {n_cuts}: got {got}, expected {want}");
        }
    }
}
