//! Partition theorems: a section cut by plates holds what its parts hold, and bears what its parts bear, under either
//! bound, on random sections. Expected values are conservation laws, symmetries, and integrals that share nothing with
//! the kernel.

mod ways;

use brimwright::analysis::{Route, Settled};
use brimwright::cases::LoadCase;
use brimwright::geom::{Edge, Path, Point, Vec2, cross};
use brimwright::section::{EdgeKind, Opening, OpeningShape, OutlineEdge, Section, Vertex, Wall, WidthLaw};
use brimwright::statics::{Bound, Pool};
use brimwright::study::Fill;
use proptest::prelude::*;

use crate::support::clip::quadrature;
use crate::support::plated::{Plated, plate, plated, pull};
use crate::support::random::{config, share};
use crate::support::shapes::{circle, rectangle};
use crate::support::states::{State, Tank};
use crate::support::{GRAVITY, WATER, held, judge, settled, study};

const BOUNDS: [Bound; 2] = [Bound::Settled, Bound::Sealed];

/// A section of one of three width laws, some of its plates with an opening.
fn sections() -> impl Strategy<Value = Section> {
    let opening = prop_oneof![Just(None), (0.0..0.7, 0.05..0.3).prop_map(Some)];
    (plated(), proptest::collection::vec(opening, 4), prop_oneof![8 => Just(0_usize), 1 => Just(1), 1 => Just(2)])
        .prop_map(|(plated, openings, law)| {
            let mut section = plated.section();
            for (plate, opening) in section.plates.iter_mut().zip(openings) {
                let length_m = plate.length_m();
                plate.openings =
                    opening.into_iter().map(|(from, share)| open(from, from + share, length_m)).collect();
            }
            section.width = width_law(&plated, law);
            section
        })
}

/// Constant, a round barrel that reaches a little beyond, or a table with two kinks.
fn width_law(plated: &Plated, law: usize) -> WidthLaw {
    let (low, high) = Path::new(plated.outline.clone()).extent(Vec2::y());
    let at = |share: f64| low + share * (high - low);
    match law {
        0 => WidthLaw::Constant { width_m: 1.7 },
        1 => WidthLaw::RoundBarrel { diameter_m: 1.1 * (high - low), bottom_z_m: at(-0.05) },
        _ => WidthLaw::Table(vec![(at(0.0), 0.4), (at(0.35), 1.6), (at(0.7), 1.2), (at(1.0), 0.3)]),
    }
}

fn open(from: f64, to: f64, length_m: f64) -> Opening {
    Opening { name: String::new(), from_m: from * length_m, to_m: to * length_m, shape: OpeningShape::Share(1.0) }
}

/// The same without its openings, or without its plates.
fn without_openings(section: &Section) -> Section {
    let mut section = section.clone();
    section.plates.iter_mut().for_each(|p| p.openings.clear());
    section
}

fn near(got: f64, expected: f64, allowed: f64, what: &str) -> Result<(), TestCaseError> {
    prop_assert!(
        (got - expected).abs() <= allowed,
        "{what}: expected {expected:e}, got {got:e}, off by {:e}, tolerance {allowed:e}",
        got - expected
    );
    Ok(())
}

/// Both bounds of a section under a pull; a way that is lost is a failure.
fn states(tank: &Tank, pull: Vec2) -> Result<[State; 2], TestCaseError> {
    let state = |bound| tank.state(bound, pull * GRAVITY).ok_or_else(|| TestCaseError::fail("the way was lost"));
    Ok([state(BOUNDS[0])?, state(BOUNDS[1])?])
}

#[test]
fn cells_hold_the_pools_and_pools_and_spills_the_whole() {
    proptest!(config(10, 101), |(section in sections(), pull in pull(), share in share())| {
        let tank = Tank::new(section, share);
        let capacity = tank.capacity_m3();
        for State { settled, .. } in states(&tank, pull)? {
            near(settled.volume_m3 + settled.spilled_m3, tank.liquid_m3(), 1e-10 * capacity, "stays and spilled")?;
            near(settled.cells_m3.iter().sum(), settled.volume_m3, 1e-10 * capacity, "sum over cells")?;
            // Drops below a billionth of the largest pool are not listed.
            let pools: f64 = settled.pools.iter().map(|p| p.volume_m3).sum();
            near(pools, settled.volume_m3, 2e-8 * settled.volume_m3 + 1e-12 * capacity, "sum over pools")?;
            let spilled: f64 = settled.spills.iter().map(|s| s.volume_m3).sum();
            near(spilled, settled.spilled_m3, 1e-12 * capacity, "sum over mouths")?;
        }
    });
}

/// Closes the boundary of a pool: what it wets, and its surface from right to left.
fn boundary(pool: &Pool) -> Vec<Edge> {
    let surface = pool.surface.iter().map(|c| Edge::line(c.right, c.left));
    pool.wetted.iter().map(|f| f.edge).chain(surface).collect()
}

/// Volume of a pool, its centroid, and the load along z on the side walls that a table of widths shapes: exact integrals
/// over bands of z in which the width is linear.
fn by_bands(pool: &Pool, width: &WidthLaw, up: Vec2) -> Option<(f64, Point, f64)> {
    let rows: Vec<(f64, f64)> = match width {
        WidthLaw::Constant { width_m } => vec![(-1e6, *width_m), (1e6, *width_m)],
        WidthLaw::Table(rows) => rows.clone(),
        _ => return None,
    };
    let edges = boundary(pool);
    let below = |z: f64| {
        let below = quadrature(&edges, Vec2::y(), z);
        if below.area == 0.0 { [0.0; 5] } else { moments(&edges, z) }
    };
    let (mut volume, mut moment, mut sides) = (0.0, Vec2::zeros(), 0.0);
    for w in rows.windows(2) {
        let (high, low) = (below(w[1].0), below(w[0].0));
        let [a, s, z, sz, zz] = std::array::from_fn(|i| high[i] - low[i]);
        let slope = (w[1].1 - w[0].1) / (w[1].0 - w[0].0);
        let base = w[0].1 - slope * w[0].0;
        volume += base * a + slope * z;
        moment += Vec2::new(base * s + slope * sz, base * z + slope * zz);
        sides -= slope * pool.weight_pa_per_m * (pool.level_m * a - up.x * s - up.y * z);
    }
    Some((volume, Point::from(moment / volume), sides))
}

/// Integrals of 1, s, z, s z and z2 over what lies below a level, by the boundary: of s, s2/2, s z, s2 z/2, s z2 dz.
fn moments(edges: &[Edge], level_z: f64) -> [f64; 5] {
    let mut sum = [0.0; 5];
    for e in edges {
        for (from, to) in e.parts_below(Vec2::y(), level_z) {
            let part = e.part(from, to);
            let (n, length) = (if part.is_arc() { 12 } else { 1 }, part.length());
            for k in 0..n {
                for (node, weight) in LEGENDRE {
                    let t = (k as f64 + 0.5 + 0.5 * node) / n as f64;
                    let (p, dz) = (part.point_at(t), part.tangent_at(t).y * length * 0.5 * weight / n as f64);
                    let terms = [p.x, 0.5 * p.x * p.x, p.x * p.y, 0.5 * p.x * p.x * p.y, p.x * p.y * p.y];
                    (0..5).for_each(|i| sum[i] += terms[i] * dz);
                }
            }
        }
    }
    sum
}

/// Gauss-Legendre nodes and weights on -1..1, order 5 (Abramowitz & Stegun, table 25.4).
const LEGENDRE: [(f64, f64); 5] = [
    (0.0, 0.568_888_888_888_888_9),
    (-0.538_469_310_105_683_1, 0.478_628_670_499_366_47),
    (0.538_469_310_105_683_1, 0.478_628_670_499_366_47),
    (-0.906_179_845_938_664, 0.236_926_885_056_189_08),
    (0.906_179_845_938_664, 0.236_926_885_056_189_08),
];

#[test]
fn what_a_pool_wets_and_its_surface_enclose_it() {
    proptest!(config(10, 102), |(section in sections(), pull in pull(), share in share())| {
        let tank = Tank::new(section, share);
        let (capacity, size) = (tank.capacity_m3(), tank.region.diagonal_m());
        let reach = size + tank.region.bounds().0.coords.norm();
        for state in states(&tank, pull)? {
            let up = state.stop.up;
            let mut sides = Some(0.0);
            for pool in &state.settled.pools {
                for c in &pool.surface {
                    for end in [c.left, c.right] {
                        near(up.dot(&end.coords), pool.level_m, 1e-12 * reach, "level of a surface")?;
                    }
                }
                for face in &pool.wetted {
                    let highest = face.edge.extent(up).1.0;
                    prop_assert!(highest <= pool.level_m + 1e-9 * reach, "wet at {highest}, level {}", pool.level_m);
                }
                let bands = by_bands(pool, &tank.section.width, up);
                sides = sides.zip(bands).map(|(sum, b)| sum + b.2);
                let Some((volume, centroid, _)) = bands else { continue };
                near(pool.volume_m3, volume, 1e-9 * capacity, "volume of a pool")?;
                let off = (pool.centroid - centroid).norm() * volume;
                prop_assert!(off <= 1e-8 * capacity * reach, "centroid {} for {centroid}, of {volume} m3", pool.centroid);
            }
            if let Some(want) = sides {
                let scale = capacity * WATER * state.gravity.norm();
                near(state.settled.sides_force_n.y, want, 1e-8 * scale, "side walls along z")?;
            }
        }
    });
}

/// Force and moment of a pool on a straight face 1 m wide, by Simpson's rule, which is exact for them.
fn on_face(e: &Edge, pool: &Pool, up: Vec2, about: Point) -> (Vec2, f64) {
    let outward = Vec2::new(e.chord().y, -e.chord().x);
    [(0.0, 1.0 / 6.0), (0.5, 4.0 / 6.0), (1.0, 1.0 / 6.0)].iter().fold(
        (Vec2::zeros(), 0.0),
        |(f, m), &(t, weight)| {
            let p = e.start + e.chord() * t;
            let part = outward * (weight * pool.weight_pa_per_m * (pool.level_m - up.dot(&p.coords)));
            (f + part, m + cross(p - about, part))
        },
    )
}

/// Mass times effective gravity, at the centroid, is what edges, plates and side walls bear together.
#[test]
fn edges_plates_and_side_walls_bear_mass_times_effective_gravity() {
    proptest!(config(10, 103), |(section in sections(), pull in pull(), share in share())| {
        let tank = Tank::new(section, share);
        let reach = tank.region.diagonal_m() + (tank.region.bounds().0 - tank.about).norm();
        for State { settled, gravity, .. } in states(&tank, pull)? {
            let want = gravity * (WATER * settled.volume_m3);
            let plates = settled.plates.iter().map(|p| (p.force_n, p.moment_n_m));
            let loads: Vec<(Vec2, f64)> =
                settled.edges.iter().map(|e| (e.force_n, e.moment_n_m)).chain(plates).collect();
            let force: Vec2 = loads.iter().map(|l| l.0).sum::<Vec2>() + settled.sides_force_n;
            let moment = loads.iter().map(|l| l.1).sum::<f64>() + settled.sides_moment_n_m;
            let size = want.norm() + loads.iter().map(|l| l.0.norm()).sum::<f64>();
            for (got, what) in [(force, "sum"), (settled.total_force_n, "total")] {
                near(got.x, want.x, 3e-9 * size, &format!("{what} along s"))?;
                near(got.y, want.y, 3e-9 * size, &format!("{what} along z"))?;
            }
            prop_assert_eq!(settled.sides_force_n.x, 0.0);
            let arm = settled.centroid - tank.about;
            near(moment, cross(arm, want), 3e-9 * size * reach, "moment")?;
            near(settled.total_moment_n_m, cross(arm, want), 3e-9 * size * reach, "total moment")?;
            near(settled.mass_kg, WATER * settled.volume_m3, 2e-8 * WATER * settled.volume_m3, "mass")?;
        }
    });
}

#[test]
fn the_two_faces_of_a_plate_differ_by_its_net_load() {
    proptest!(config(10, 104), |(section in sections(), pull in pull(), share in share())| {
        let tank = Tank::new(Section { width: WidthLaw::Constant { width_m: 1.0 }, ..section }, share);
        for State { settled, stop, .. } in states(&tank, pull)? {
            for (i, load) in settled.plates.iter().enumerate() {
                let plate = &tank.section.plates[i];
                let (mut force, mut moment, mut net, mut size) = (Vec2::zeros(), 0.0, 0.0, 0.0);
                let mut wet_m = [0.0; 2];
                for pool in &settled.pools {
                    for face in &pool.wetted {
                        let Wall::Plate { plate_idx, is_left, .. } = face.wall else { continue };
                        if plate_idx != i {
                            continue;
                        }
                        let (f, m) = on_face(&face.edge, pool, stop.up, tank.about);
                        force += f;
                        moment += m;
                        net += if is_left { f.norm() } else { -f.norm() };
                        size += f.norm();
                        wet_m[usize::from(is_left)] += face.edge.length();
                    }
                }
                let allowed = 1e-7 * size + 1e-9 * settled.total_force_n.norm();
                let reach = tank.region.diagonal_m() + (tank.region.bounds().0 - tank.about).norm();
                near((load.force_n - force).norm(), 0.0, allowed, "net force")?;
                near(load.moment_n_m, moment, allowed * reach, "net moment")?;
                near(load.net_n, net, allowed, "net along the normal")?;
                // Net pressures are linear between their ends: they sum up to the net load.
                let summed: f64 =
                    load.stretches.iter().map(|s| 0.5 * (s.from_pa + s.to_pa) * (s.to_m - s.from_m)).sum();
                near(load.net_n, summed, allowed, "net pressures")?;
                let most = load.stretches.iter().flat_map(|s| [s.from_pa, s.to_pa]).fold(0.0_f64, |a, p| a.max(p.abs()));
                let peak = load.peak.map_or(0.0, |p| p.0.abs());
                near(peak, most, 1e-9 * most, "peak")?;
                if let Some((pa, at)) = load.acts_at.map(|at| (force, at)) {
                    near(cross(at - tank.about, pa), moment, allowed * reach, "line of action")?;
                }
                let solid_m = plate.length_m() - plate.openings.iter().map(Opening::length_m).sum::<f64>();
                prop_assert!(wet_m.iter().all(|w| *w <= plate.length_m() * (1.0 + 1e-9)), "{wet_m:?} of {solid_m}");
            }
        }
    });
}

#[test]
fn a_plate_inside_one_pool_bears_nothing() {
    proptest!(config(13, 105), |(section in sections(), pull in pull(), share in 0.4..0.95)| {
        let tank = Tank::new(without_openings(&section), share);
        let Some(State { settled, .. }) = tank.state(Bound::Settled, pull * GRAVITY) else {
            return Err(TestCaseError::fail("the way was lost"));
        };
        for (i, load) in settled.plates.iter().enumerate() {
            let length_m = tank.section.plates[i].length_m();
            let is_own = |wall: &Wall| matches!(*wall, Wall::Plate { plate_idx, .. } if plate_idx == i);
            let wet_m = |pool: &Pool| -> f64 {
                pool.wetted.iter().filter(|f| is_own(&f.wall)).map(|f| f.edge.length()).sum()
            };
            if settled.pools.iter().any(|pool| wet_m(pool) > 2.0 * length_m * (1.0 - 1e-9)) {
                prop_assert_eq!(load.force_n, Vec2::zeros());
                prop_assert_eq!((load.net_n, load.peak, load.acts_at), (0.0, None, None));
                prop_assert!(load.stretches.iter().all(|s| s.from_pa == 0.0 && s.to_pa == 0.0), "{:?}", load.stretches);
                near(load.moment_n_m, 0.0, 1e-9 * settled.total_force_n.norm() * tank.region.diagonal_m(), "moment")?;
            }
        }
    });
}

/// That two states are the same: `flip` is -1 for a mirrored one, `scale` how much longer the second one's lengths are.
fn same(
    a: &Settled,
    b: &Settled,
    flip: f64,
    scale: f64,
    capacity_m3: f64,
    allowed: f64,
) -> Result<(), TestCaseError> {
    let cube = scale.powi(3);
    let allowed_m3 = allowed * capacity_m3;
    near(b.volume_m3 / cube, a.volume_m3, allowed_m3, "volume")?;
    near(b.spilled_m3 / cube, a.spilled_m3, allowed_m3, "spilled")?;
    let volumes = |s: &Settled, cube: f64| -> Vec<f64> {
        s.pools.iter().map(|p| p.volume_m3 / cube).filter(|v| *v > 100.0 * allowed_m3).collect()
    };
    let (one, other) = (volumes(a, 1.0), volumes(b, cube));
    let is_near =
        one.len() == other.len() && one.iter().zip(&other).all(|(a, b)| (a - b).abs() <= 100.0 * allowed_m3);
    prop_assert!(is_near, "pools {one:?} against {other:?}");
    let moment = |s: &Settled| s.centroid.coords * s.volume_m3;
    let (one, other) = (moment(a), moment(b) / (cube * scale));
    let size = capacity_m3.cbrt().max(a.centroid.coords.norm());
    near(other.x, flip * one.x, 100.0 * allowed_m3 * size, "first moment along s")?;
    near(other.y, one.y, 100.0 * allowed_m3 * size, "first moment along z")?;
    let force = a.total_force_n.norm() + a.edges.iter().map(|e| e.force_n.norm()).sum::<f64>();
    near(b.peak_pa / scale, a.peak_pa, 1e-5 * a.peak_pa.abs(), "peak pressure")?;
    for (one, other) in a.plates.iter().zip(&b.plates) {
        // The force on a thin film is the root of its volume.
        near(other.force_n.x / cube, flip * one.force_n.x, 1e-4 * force, "load on a plate along s")?;
        near(other.force_n.y / cube, one.force_n.y, 1e-4 * force, "load on a plate along z")?;
        near(other.net_n / cube, flip * one.net_n, 1e-4 * force, "net load on a plate")?;
    }
    Ok(())
}

#[test]
fn both_bounds_agree_where_no_plate_has_an_opening() {
    proptest!(config(5, 106), |(section in sections(), pull in pull(), share in share())| {
        let tank = Tank::new(without_openings(&section), share);
        let [open, shut] = states(&tank, pull)?;
        prop_assert_eq!(&open.settled, &shut.settled);
        prop_assert_eq!(&open.stop.spilled, &shut.stop.spilled);
    });
}

#[test]
fn a_plate_that_is_open_all_along_is_no_plate() {
    proptest!(config(6, 107), |(section in sections(), pull in pull(), share in share())| {
        let mut opened = section.clone();
        for plate in &mut opened.plates {
            plate.openings = vec![open(0.0, 1.0, plate.length_m())];
        }
        let bare = Section { plates: vec![], ..section };
        let [opened, bare] = [Tank::new(opened, share), Tank::new(bare, share)];
        let gravity = pull * GRAVITY;
        let (a, b) = (bare.state(Bound::Settled, gravity), opened.state(Bound::Settled, gravity));
        let (Some(a), Some(b)) = (a, b) else { return Err(TestCaseError::fail("the way was lost")) };
        same(&a.settled, &b.settled, 1.0, 1.0, bare.capacity_m3(), 1e-10)?;
        prop_assert!(b.settled.plates.iter().all(|p| p.force_n == Vec2::zeros() && p.highest.is_none()));
    });
}

fn moved(section: &Section, flip: f64, scale: f64) -> Section {
    let at = |p: Point| Point::new(flip * p.x, p.y) * scale;
    let image = |e: &Edge| if flip < 0.0 { (at(e.end), e.sweep) } else { (at(e.start), e.sweep) };
    let mut moved = section.clone();
    let mut outline: Vec<(EdgeKind, (Point, f64))> =
        section.edges().iter().zip(&section.outline).map(|(e, o)| (o.kind, image(e))).collect();
    if flip < 0.0 {
        outline.reverse();
    }
    let edge = |(kind, (start, sweep_rad))| OutlineEdge { name: String::new(), kind, start, sweep_rad };
    moved.outline = outline.into_iter().map(edge).collect();
    for obstacle in &mut moved.obstacles {
        let mut edges: Vec<(Point, f64)> = obstacle.edges().iter().map(image).collect();
        if flip < 0.0 {
            edges.reverse();
        }
        obstacle.vertices = edges.into_iter().map(|(start, sweep_rad)| Vertex { start, sweep_rad }).collect();
    }
    for plate in &mut moved.plates {
        plate.points.iter_mut().for_each(|p| *p = at(*p));
        plate.openings.iter_mut().for_each(|o| (o.from_m, o.to_m) = (scale * o.from_m, scale * o.to_m));
    }
    moved.width = match &section.width {
        WidthLaw::Constant { width_m } => WidthLaw::Constant { width_m: scale * width_m },
        WidthLaw::RoundBarrel { diameter_m, bottom_z_m } => {
            WidthLaw::RoundBarrel { diameter_m: scale * diameter_m, bottom_z_m: scale * bottom_z_m }
        }
        WidthLaw::Table(rows) => WidthLaw::Table(rows.iter().map(|(z, w)| (scale * z, scale * w)).collect()),
        law => law.clone(),
    };
    moved
}
