//! Pools and pour-over worked out by hand. Own derivations, plane geometry only: triangles, trapezoids, sectors of a
//! circle. m stands for the slope of the settled surface: with the acceleration a_s to the right, z falls by m = a_s / g
//! for every metre to the right, so that liquid gathers on the left.

use brimwright::geom::{Edge, Point, Vec2};

use super::plated::Plated;
use super::shapes::{polygon, rectangle};

/// A tank of constant width, its liquid, its way, and where the liquid is at the end.
pub struct HandCase {
    pub name: &'static str,
    pub section: Plated,
    /// At rest on one common still level, m2.
    pub liquid: f64,
    /// Accelerations (a_s, a_z) that it goes to one after the other, from rest, each along a straight line; in g.
    pub stops: Vec<(f64, f64)>,
    pub pools: Vec<HandPool>,
    /// m2.
    pub spilled: f64,
    /// Share of the first stop's acceleration at which liquid first leaves.
    pub first_spill: Option<f64>,
}

/// A pool at the end of the way.
pub struct HandPool {
    /// A place well inside it.
    pub inside: Point,
    /// m2.
    pub area: f64,
    /// A place on its surface, or on the surface carried on; none where the pool fills its cell.
    pub surface: Option<Point>,
}

impl HandCase {
    /// Away from effective gravity at a stop; at rest before the first.
    pub fn up(&self, stop: Option<usize>) -> Vec2 {
        let (a_s, a_z) = stop.map_or((0.0, 0.0), |i| self.stops[i]);
        Vec2::new(a_s, 1.0 + a_z).normalize()
    }

    fn pool(mut self, inside: (f64, f64), area: f64, surface: (f64, f64)) -> HandCase {
        let surface = Some(Point::new(surface.0, surface.1));
        self.pools.push(HandPool { inside: Point::new(inside.0, inside.1), area, surface });
        self
    }

    fn full_pool(mut self, inside: (f64, f64), area: f64) -> HandCase {
        self.pools.push(HandPool { inside: Point::new(inside.0, inside.1), area, surface: None });
        self
    }

    fn spills(mut self, area: f64, first_at: f64) -> HandCase {
        (self.spilled, self.first_spill) = (area, Some(first_at));
        self
    }
}

/// All of them.
pub fn hand_cases() -> Vec<HandCase> {
    [
        two_cells(),
        three_cells(),
        trapped(),
        hanging(),
        tight(),
        dividers(),
        steps(),
        standing_clear(),
        round(),
        sinking(),
    ]
    .into_iter()
    .flatten()
    .collect()
}

fn case(name: &'static str, section: Plated, liquid: f64, stops: &[(f64, f64)]) -> HandCase {
    HandCase { name, section, liquid, stops: stops.to_vec(), pools: vec![], spilled: 0.0, first_spill: None }
}

/// A tank 3 by 2 with a plate 0.5 high at s = 1 and a hole in its left wall from z = 0.6 on; liquid 1.65, so 0.55 deep.
///
/// The surface turns about (1.5, 0.55) and comes to the hole at 1.5 m = 0.05. From m = 0.1 on the hole lies below the tip:
/// the right cell keeps what its tip holds, 2 (0.5 - m), and all that goes over it leaves by the hole, which leaves
/// 0.6 - m / 2 in the left one.
fn sinking() -> Vec<HandCase> {
    let holed = polygon(&[(0.0, 0.0), (3.0, 0.0), (3.0, 2.0), (0.0, 2.0), (0.0, 0.9), (0.0, 0.6)]);
    let tank = Plated::tank(holed).with_mouth(4).with_plate(&[(1.0, 0.0), (1.0, 0.5)]);
    let case = case("a hole sinks below a tip", tank, 1.65, &[(0.2, 0.0)]);
    vec![case.pool((0.5, 0.1), 0.5, (0.5, 0.5)).pool((1.5, 0.1), 0.6, (2.0, 0.3)).spills(0.55, 1.0 / 6.0)]
}

/// A tank 2 by 2 with a plate 0.5 high on the middle of its floor; liquid 1.2, so at rest 0.1 over the plate.
///
/// Joined: for m <= 0.6 the surface turns about (1, 0.6). Then the floor falls dry at the right: a triangle of
/// base b on the floor with m b^2 / 2 = 1.2, which over the plate is m (b - 1) = sqrt(2.4 m) - m deep. That is 0.5 at
/// m^2 - 1.4 m + 0.25 = 0, m = 1.1899: there the right side is left with what stands below the tip.
///
/// Apart: below a surface of slope m through the tip the right cell holds the triangle 0.5^2 / (2 m) (for
/// m >= 0.5), the left one the trapezoid 0.5 + m / 2. The right one's room shrinks as m grows, so it pours to the
/// left, and stands at the tip. Going back, its room grows, and it keeps what it has until the left one reaches the
/// tip: from m = 2 (1.2 - 0.125 / m_max - 0.5) on, the left one stands at the tip.
fn two_cells() -> Vec<HandCase> {
    let tank = || Plated::tank(rectangle(2.0, 2.0)).with_plate(&[(1.0, 0.0), (1.0, 0.5)]);
    let (left, right) = ((0.2, 0.2), (1.03, 0.1));
    let tip = (1.0, 0.5);
    // At m = 1.5: right 0.125 / 1.5 = 0.083333, left 1.116667, its surface in the middle of its cell that deep:
    // 1.866667 at the wall, 0.366667 at the plate, below the tip.
    let apart = |stops| {
        let right_area = 0.125 / 1.5;
        let left_area = 1.2 - right_area;
        case("two cells, fallen apart", tank(), 1.2, stops)
            .pool(left, left_area, (0.5, left_area))
            .pool(right, right_area, tip)
    };
    // From 1.5 back to 1.21, below 2 (0.7 - 0.083333) = 1.2333: left 0.5 + 0.605 = 1.105, at the tip; right
    // 0.095, a triangle as high at the plate as sqrt(2 m 0.095) = 0.479479, below the tip: not joined yet.
    // (On the way there the right one would be 0.125 / 1.21 = 0.103306.)
    let back = case("two cells, nearly joined again", tank(), 1.2, &[(1.5, 0.0), (1.21, 0.0)])
        .pool(left, 1.105, tip)
        .pool(right, 0.095, (1.0, (2.0_f64 * 1.21 * 0.095).sqrt()));
    vec![
        // m = 0.5: the surface turned about (1, 0.6).
        case("two cells, still joined", tank(), 1.2, &[(0.5, 0.0)]).pool(left, 1.2, (1.0, 0.6)),
        apart(&[(1.5, 0.0)]),
        // Half a g downward: m = 0.75 / (1 - 0.5) = 1.5 again.
        apart(&[(0.75, -0.5)]),
        back,
        case("two cells, joined again", tank(), 1.2, &[(1.5, 0.0), (0.0, 0.0)]).pool(left, 1.2, (1.0, 0.6)),
    ]
}

/// A tank 3 by 1, a plate 0.35 high at s = 1 and one 0.4 high at s = 2; liquid 0.6, so 0.2 deep.
///
/// Below a surface through its sill, which is on its left, a cell holds h - m / 2 while m <= h and h^2 / (2 m) from
/// there: the middle one pours from m = 0.3 on, the right one from m = 0.4 on, into the middle one, which is at its
/// sill and passes all of it on. At m = 0.6: right 0.16 / 1.2, middle 0.1225 / 1.2, left the rest, 0.364583, at the
/// first plate 0.064583 deep and thus far from joining the middle one; nor does the middle one, dry at the second
/// plate, join the right one.
fn three_cells() -> Vec<HandCase> {
    let tank = Plated::tank(rectangle(3.0, 1.0))
        .with_plate(&[(1.0, 0.0), (1.0, 0.35)])
        .with_plate(&[(2.0, 0.0), (2.0, 0.4)]);
    let (right, middle) = (0.16 / 1.2, 0.1225 / 1.2);
    let left = 0.6 - right - middle;
    vec![
        case("three cells, over two sills", tank, 0.6, &[(0.6, 0.0)])
            .pool((0.2, 0.1), left, (0.5, left))
            .pool((1.1, 0.1), middle, (1.0, 0.35))
            .pool((2.1, 0.1), right, (2.0, 0.4)),
    ]
}

/// The tank of [`two_cells`] with liquid 0.8, so 0.4 deep and 0.1 below the tip.
///
/// The right cell pours from 0.5 - m / 2 = 0.4, m = 0.2 on. At m = 1 it has 0.125 left, and the left one 0.675: at
/// the plate 0.175 deep. Going back, the left one has room for 0.5 + m / 2, so it pours back from m = 0.35 on; at rest
/// it stands at the tip with 0.5, and 0.3 is on the right: more on the left than before.
fn trapped() -> Vec<HandCase> {
    let tank = || Plated::tank(rectangle(2.0, 2.0)).with_plate(&[(1.0, 0.0), (1.0, 0.5)]);
    vec![
        case("a sill at work", tank(), 0.8, &[(1.0, 0.0)]).pool((0.2, 0.2), 0.675, (0.5, 0.675)).pool(
            (1.05, 0.1),
            0.125,
            (1.0, 0.5),
        ),
        case("trapped after release", tank(), 0.8, &[(1.0, 0.0), (0.0, 0.0)]).pool((0.5, 0.2), 0.5, (0.5, 0.5)).pool(
            (1.5, 0.2),
            0.3,
            (1.5, 0.3),
        ),
    ]
}

/// A shut tank 2 by 1 with a plate that hangs from the middle of its roof.
fn hanging() -> Vec<HandCase> {
    let tank = |tip: f64| Plated::tank(rectangle(2.0, 1.0)).with_plate(&[(1.0, 1.0), (1.0, tip)]);
    // Tip at 0.3, liquid 0.5 deep, m = 0.4: the surface turned about (1, 0.5), 0.9 to 0.1; the plate is in it.
    let covered =
        case("hanging plate, tip under water", tank(0.3), 1.0, &[(0.4, 0.0)]).pool((0.3, 0.1), 1.0, (1.0, 0.5));
    // Tip at 0.3, liquid 0.7, so 0.35 deep. From m = 0.35 a triangle of base b = sqrt(1.4 / m), over s = 1
    // sqrt(1.4 m) - m deep: 0.3 at m^2 - 0.8 m + 0.09 = 0, m = 0.66458. At m = 0.7: b = sqrt 2, 0.7 b = 0.98995
    // at the left wall, below the roof; 0.28995 over s = 1, so that the tip is out and one surface is left.
    let bare = case("hanging plate, tip come out", tank(0.3), 0.7, &[(0.7, 0.0)]).pool(
        (0.3, 0.1),
        0.7,
        (0.0, 0.7 * 2.0_f64.sqrt()),
    );
    // Tip at 0.6, liquid 0.6; a = f (0.1, -2) g, up along (0.1 f, 1 - 2 f): past f = 0.5 the liquid lies against the
    // roof, where the plate, 0.4 long, is a sill. With d measured down from the roof and k = 0.1 f / (2 f - 1), the
    // left cell holds the part of it with d < 0.4 + k (1 - s): for k = 0.6 all but two like triangles, 0.7; below that
    // the trapezoid 0.4 + k / 2. It pours from k = 0.4 on. At f = 1, k = 0.1: 0.45 left, 0.15 on the right, there
    // 0.15 deep in the middle, 0.2 at the plate.
    let upside_down = case("hanging plate as a sill against the roof", tank(0.6), 0.6, &[(0.1, -2.0)])
        .pool((0.3, 0.9), 0.45, (1.0, 0.6))
        .pool((1.3, 0.95), 0.15, (1.5, 0.85));
    vec![covered, bare, upside_down]
}

/// Plates from wall to wall: each cell keeps what it has, and tilts by itself.
fn tight() -> Vec<HandCase> {
    let tank = || Plated::tank(rectangle(2.0, 1.0));
    // At s = 1.2, liquid 0.4 deep: 0.48 and 0.32. m = 0.5: surfaces turned about (0.6, 0.4), 0.7 to 0.1, and about
    // (1.6, 0.4), 0.6 to 0.2.
    let upright = tank().with_plate(&[(1.2, 0.0), (1.2, 1.0)]);
    // A shelf at 0.5, liquid up to 0.7: below it 1.0, full; on it 0.4. m = 0.1: turned about (1, 0.7).
    let shelf = tank().with_plate(&[(0.0, 0.5), (2.0, 0.5)]);
    // A hatch over the right half, edge 2 of the outline; tight at s = 1; liquid 0.8 deep in both. m = -0.6, liquid to the
    // right: the right cell spills at (2, 1) and holds 1 - 0.6 / 2 = 0.7; from 1 - m / 2 = 0.8, m = 0.4, a share of
    // 2/3, on. The left one, below the shut roof, keeps 0.8: its gas, 0.2, is the triangle in its top left corner, y high
    // and y / 0.6 long with y^2 / 1.2 = 0.2, y = 0.489898, 0.816497 long.
    let hatch = Plated::tank(polygon(&[(0.0, 0.0), (2.0, 0.0), (2.0, 1.0), (1.0, 1.0), (0.0, 1.0)]))
        .with_mouth(2)
        .with_plate(&[(1.0, 0.0), (1.0, 1.0)]);
    vec![
        case("tight plate", upright, 0.8, &[(0.5, 0.0)]).pool((0.3, 0.1), 0.48, (0.6, 0.4)).pool(
            (1.4, 0.1),
            0.32,
            (1.6, 0.4),
        ),
        case("tight shelf", shelf, 1.4, &[(0.1, 0.0)]).full_pool((1.0, 0.25), 1.0).pool((1.0, 0.6), 0.4, (1.0, 0.7)),
        case("a hatch empties only its own cell", hatch, 1.6, &[(-0.6, 0.0)])
            .pool((0.5, 0.3), 0.8, (0.0, 1.0 - 0.24_f64.sqrt()))
            .pool((1.5, 0.3), 0.7, (2.0, 1.0))
            .spills(0.1, 0.4 / 0.6),
    ]
}

/// An open tank 2 by 1, edge 2 its mouth, with a divider up to the rim line; liquid 0.8 deep.
fn dividers() -> Vec<HandCase> {
    let tank = |s: f64| Plated::tank(rectangle(2.0, 1.0)).with_mouth(2).with_plate(&[(s, 0.0), (s, 1.0)]);
    // At s = 0.8: under its left top corner the left cell holds 0.8 - 0.32 m of its 0.64, the right one, 1.2 long,
    // under the divider's tip 1.2 - 0.72 m of its 0.96. The right one pours from m = 1/3 on, into the left one, which
    // has room up to 0.64 + 0.96 - (1.2 - 0.72 m) = 0.8 - 0.32 m, m = 0.4 / 1.04 = 0.384615. From there on what
    // passes over the tip goes outside. At m = 0.6: left 0.608, right 0.768, gone 0.224.
    let wide_right = |stops, left: (f64, f64), right: (f64, f64)| {
        case("divider up to the rim, the neighbour has room", tank(0.8), 1.6, stops)
            .pool((0.4, 0.3), 0.608, left)
            .pool((1.2, 0.3), 0.768, right)
            .spills(0.224, 0.4 / 1.04 / 0.6)
    };
    // At s = 1.2: the left one, 1.2 long, spills its 0.96 from 1.2 - 0.72 m, m = 1/3, on; the right one pours its 0.64
    // from 0.8 - 0.32 m, m = 0.5, on, into a left one that is full. At m = 0.6: left 0.768, right 0.608.
    let wide_left = case("divider up to the rim, the neighbour is full", tank(1.2), 1.6, &[(0.6, 0.0)])
        .pool((0.6, 0.3), 0.768, (0.0, 1.0))
        .pool((1.5, 0.3), 0.608, (1.2, 1.0))
        .spills(0.224, 1.0 / 3.0 / 0.6);
    vec![
        wide_right(&[(0.6, 0.0)], (0.0, 1.0), (0.8, 1.0)),
        // Back at rest nothing has moved: 0.76 and 0.64 deep.
        wide_right(&[(0.6, 0.0), (0.0, 0.0)], (0.4, 0.76), (1.4, 0.64)),
        wide_left,
    ]
}

/// A tank 2 by 1 whose floor rises by 0.3 at s = 1; liquid 0.2, all of it in the low half. Liquid runs to the right:
/// a_s < 0, slope m = -a_s / g upward.
///
/// The low half holds 0.3 - m / 2 under the edge of the step while m <= 0.3 and 0.3^2 / (2 m) from there: it pours
/// from m = 0.2 on, into the triangle in the corner between the high floor and the right wall. At m = 0.5 it has 0.09;
/// 0.11 is up there, b^2 m / 2, b = 0.663325 long: not as far as the edge (nor on the way).
/// Going back the triangle grows longer, reaches the edge at m / 2 = 0.11, and pours back: m / 2 is left up there.
fn steps() -> Vec<HandCase> {
    let tank = || Plated::tank(polygon(&[(0.0, 0.0), (1.0, 0.0), (1.0, 0.3), (2.0, 0.3), (2.0, 1.0), (0.0, 1.0)]));
    let (low, high, edge) = ((0.97, 0.05), (1.97, 0.31), (1.0, 0.3));
    vec![
        case("over a step in the floor", tank(), 0.2, &[(-0.5, 0.0)]).pool(low, 0.09, edge).pool(
            high,
            0.11,
            (2.0, 0.3 + (0.22_f64 * 0.5).sqrt()),
        ),
        // m = 0.1: 0.05 up there, at the edge; 0.15 below, turned about (0.5, 0.15).
        case("back over a step in the floor", tank(), 0.2, &[(-0.5, 0.0), (-0.1, 0.0)])
            .pool(low, 0.15, (0.5, 0.15))
            .pool(high, 0.05, edge),
        case("all back over a step in the floor", tank(), 0.2, &[(-0.5, 0.0), (0.0, 0.0)]).pool(low, 0.2, (0.5, 0.2)),
    ]
}

/// Things in the middle of the liquid.
fn standing_clear() -> Vec<HandCase> {
    // A box 0.8 by 0.5, its bottom 0.2 over the floor, in the middle of a tank 2 by 1; 0.5 deep, so liquid 1 - 0.24.
    // m = 0.3: turned about (1, 0.5): 0.8 at the left wall, 0.62 and 0.38 at the box, between its top and bottom, so
    // that box and liquid both keep their areas under the line; 0.2 at the right wall. One pool, round the box.
    let block = polygon(&[(0.6, 0.2), (1.4, 0.2), (1.4, 0.7), (0.6, 0.7)]);
    let pool_round_it = case(
        "round a box that stands clear of the floor",
        Plated::tank(rectangle(2.0, 1.0)).with_obstacle(block),
        0.76,
        &[(0.3, 0.0)],
    )
    .pool((0.1, 0.1), 0.76, (1.0, 0.5));
    // A cup of three plates, 0.4 by 0.4, its bottom 0.1 over the floor, its lips at 0.5, in a tank 2 by 2; 0.6 deep, so
    // liquid 1.2. To the right (a_s < 0): over (1, 0.5), the cup's lower lip, the liquid stands as over the tip of
    // `two_cells`: it falls apart at m = 1.1899. From there the cup, under a line through that lip, holds the
    // triangle 0.4^2 / (2 m), as long as it is no longer than the cup: 0.4 / m <= 0.4. At m = 1.5: 0.16 / 3.
    // The rest is a triangle of base b at the right wall, less what of it is inside the cup: with h = m (b - 1)
    // deep at s = 1, m b^2 / 2 - (h - 0.1)^2 / (2 m) = 1.2 - 0.16 / 3; the squares of b cancel, and b = 1.25.
    // h = 0.375: over the cup's bottom, below its lip; 1.875 at the right wall.
    let cup = Plated::tank(rectangle(2.0, 2.0)).with_plate(&[(0.6, 0.5), (0.6, 0.1), (1.0, 0.1), (1.0, 0.5)]);
    let kept = case("a cup keeps what stands in it", cup, 1.2, &[(-1.5, 0.0)])
        .pool((1.5, 0.2), 1.2 - 0.16 / 3.0, (2.0, 1.875))
        .pool((0.95, 0.2), 0.16 / 3.0, (1.0, 0.5));
    vec![pool_round_it, kept]
}

/// A round bottom of radius 1 about (0, 1) with walls above it, and a plate 0.5 high on its lowest point.
///
/// At rest 0.4 deep: the segment of height 0.4, acos 0.6 - 0.6 * 0.8, half of it on each side.
/// The surface is tilted by theta, to the left. Through the tip, it is 0.5 cos theta off the centre: its ends lie
/// beta = acos(0.5 cos theta) to both sides of effective gravity, which itself is theta to the left of the plate. So the
/// right cell's part of the circle is phi = beta - theta long, the left one's beta + theta. Either holds the sector
/// phi / 2 less the triangle between centre, tip and the surface's end, sin(phi) / 4. At 20 degrees: 0.199119 on
/// the right, less than the 0.223648 that were there; 0.467853 would have room on the left, where 0.248176 are.
/// Going back neither reaches the tip (0.307093 below it at rest): 20 degrees have moved 0.024528 for good.
fn round() -> Vec<HandCase> {
    let half_turn = std::f64::consts::PI;
    let (left, right) = (Point::new(-1.0, 1.0), Point::new(1.0, 1.0));
    let mut outline = vec![Edge { start: left, end: right, sweep: half_turn }];
    let top = [right, Point::new(1.0, 2.0), Point::new(-1.0, 2.0), left];
    outline.extend(top.windows(2).map(|p| Edge::line(p[0], p[1])));
    let tank = || Plated::tank(outline.clone()).with_plate(&[(0.0, 0.0), (0.0, 0.5)]);
    let theta = 20.0_f64.to_radians();
    let liquid = 0.6_f64.acos() - 0.48;
    let phi = (0.5 * theta.cos()).acos() - theta;
    let right = phi / 2.0 - phi.sin() / 4.0;
    let left = liquid - right;
    // Where the surface of a left pool of this area meets the plate's line: x below the centre instead of 0.5, with
    // sector less triangle, phi / 2 - x sin(phi) / 2, phi = acos(x cos theta) + theta; by bisection.
    let meets_plate = |area: f64, theta: f64| {
        let (mut low, mut high) = (0.5, 1.0);
        for _ in 0..60 {
            let x: f64 = 0.5 * (low + high);
            let phi = (x * theta.cos()).acos() + theta;
            if (phi - x * phi.sin()) / 2.0 > area { low = x } else { high = x }
        }
        (0.0, 1.0 - low)
    };
    vec![
        case("round bottom with a sill", tank(), liquid, &[(theta.tan(), 0.0)])
            .pool((-0.3, 0.15), left, meets_plate(left, theta))
            .pool((0.2, 0.1), right, (0.0, 0.5)),
        case("round bottom with a sill, released", tank(), liquid, &[(theta.tan(), 0.0), (0.0, 0.0)])
            .pool((-0.1, 0.1), left, meets_plate(left, 0.0))
            .pool((0.1, 0.1), right, meets_plate(right, 0.0)),
    ]
}
