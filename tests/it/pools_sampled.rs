//! Pools and pour-over of random sections with plates, against the brute-force sampler; and the sampler against a
//! polygon library, and against itself.

use brimwright::geom::{Edge, Path, Point, Vec2};
use brimwright::section::check;
use brimwright::statics::{Body, LONGEST_STEP, Look, Setting, Stop, settle};
use geo::{Area, BooleanOps, Coord, LineString, MultiPolygon, Polygon};
use proptest::prelude::*;

use crate::support::clip::{geo_below, geo_region};
use crate::support::followed::Followed;
use crate::support::grid::Grid;
use crate::support::grid_pools::{GridPool, PouredOver, components, filled_at_rest, pour_over, turn};
use crate::support::plated::{Plated, plated, pull, straight};
use crate::support::random::{config, direction, share};
use crate::support::shapes::circle;

#[test]
fn random_sections_with_plates_have_no_faults() {
    proptest!(config(200, 81), |(plated in plated())| {
        let problems = check(&plated.section()).err();
        prop_assert!(problems.is_none(), "{problems:?}");
    });
}

#[test]
fn sampled_components_agree_with_a_polygon_library() {
    proptest!(config(60, 82), |(plated in straight(), up in direction(), share in share())| {
        let (low, high) = Path::new(plated.outline.clone()).extent(up);
        let level = low + share * (high - low);
        let mut want: Vec<f64> = parts_below(&plated, up, level).0.iter().map(Area::unsigned_area).collect();
        want.sort_by(|a, b| b.total_cmp(a));
        let grid = Grid::new(&plated, 48);
        let mut got: Vec<f64> = components(&grid, up, level).iter().map(|part| part.area).collect();
        let (n, allowed) = (want.len().max(got.len()), grid.area_tolerance(high - low));
        want.resize(n, 0.0);
        got.resize(n, 0.0);
        let is_near = got.iter().zip(&want).all(|(got, want)| (got - want).abs() <= allowed);
        prop_assert!(is_near, "share {share}: got {got:?}, clipped {want:?}, allowed {allowed:e}");
    });
}

#[test]
fn no_grid_leaks_where_a_plate_ends_on_a_round_wall() {
    // Chords of arcs leave room at the plate's foot: outside the pipe, which bulges into the region.
    let pipe = circle(0.5).into_iter().map(|e| Edge { start: lifted(e.start), end: lifted(e.end), ..e }).collect();
    let plated = Plated::tank(circle(1.0))
        .with_obstacle(pipe)
        .with_plate(&[(0.0, 0.0), (0.0, 0.5)])
        .with_plate(&[(0.3, 1.4), (0.6, 1.8)]);
    for n_across in 16..48 {
        let parts = components(&Grid::new(&plated, n_across), Vec2::y(), 3.0);
        assert_eq!(parts.len(), 2, "{n_across} across: {parts:?}");
    }
}

#[test]
fn the_kernels_parts_agree_with_a_polygon_library() {
    proptest!(config(150, 84), |(plated in straight(), up in direction(), share in share())| {
        let (low, high) = Path::new(plated.outline.clone()).extent(up);
        let level = low + share * (high - low);
        let mut want: Vec<f64> = parts_below(&plated, up, level).0.iter().map(Area::unsigned_area).collect();
        let followed = Followed::new(plated.section(), 0.0);
        let look = followed.look(up);
        let basins = look.basins.all().iter().enumerate();
        let lives = basins.filter(|(_, b)| b.bottom < level && (level <= b.top || b.parent.is_none()));
        let mut got: Vec<f64> = lives.map(|(i, _)| look.basins.volume_below(i, level)).collect();
        // The library's slits have a width, and take a millionth of the section away; what is less may be lost.
        let allowed = 3e-5 * plated.area();
        for areas in [&mut want, &mut got] {
            areas.retain(|area| *area > allowed);
            areas.sort_by(|a, b| b.total_cmp(a));
        }
        let is_near = got.len() == want.len() && got.iter().zip(&want).all(|(a, b)| (a - b).abs() <= allowed);
        prop_assert!(is_near, "share {share}: got {got:?}, clipped {want:?}, allowed {allowed:e}");
    });
}

#[test]
fn the_kernels_pour_over_agrees_with_the_sampler() {
    proptest!(config(40, 85), |(plated in plated(), pull in pull(), share in 0.1..0.7)| {
        let area = share * plated.area();
        let grid = Grid::new(&plated, 40);
        let sampled = sampled(&grid, area, pull, 20);
        let followed = Followed::new(plated.section(), area);
        let traces = followed.along(&[Vec2::y(), -pull.normalize()], LONGEST_STEP);
        prop_assert_eq!(traces[0].lost_at, None);
        let stop = &traces[0].stops[0];
        let look = followed.look(stop.up);
        let left: f64 = stop.spilled.iter().map(|s| s.volume_m3).sum();
        let stays: f64 = stop.bodies.iter().map(|b| b.volume_m3).sum();
        prop_assert!((stays + left - area).abs() <= 1e-10 * plated.area(), "stays {stays}, left {left} of {area}");
        let allowed = grid.area_tolerance(0.0);
        prop_assert!((left - sampled.end.left()).abs() <= allowed, "left {left}, sampled {}", sampled.end.left());
        let got: Vec<GridPool> = stop.bodies.iter().map(|b| as_grid_pool(&followed, &look, b)).collect();
        let want = sampled.end.pools();
        let up = stop.up;
        prop_assert_eq!(unmatched(&got, &want, up, allowed, 2.0 * grid.step), None, "kernel's pools");
        prop_assert_eq!(unmatched(&want, &got, up, allowed, 2.0 * grid.step), None, "sampled pools");
    });
}

/// Halving the step changes no volume by more than a millionth of the capacity.
#[test]
fn the_way_does_not_hang_on_its_step() {
    proptest!(config(60, 86), |(plated in plated(), pull in pull(), share in 0.1..0.7)| {
        let area = share * plated.area();
        let followed = Followed::new(plated.section(), area);
        let ups = [Vec2::y(), -pull.normalize()];
        let [long, short] = [LONGEST_STEP, 0.5 * LONGEST_STEP].map(|step| followed.along(&ups, step));
        let volumes = |stop: &Stop| {
            let mut v: Vec<f64> = stop.bodies.iter().map(|b| b.volume_m3).filter(|v| *v > 1e-7 * area).collect();
            v.push(stop.spilled.iter().map(|s| s.volume_m3).sum());
            v.sort_by(|a, b| b.total_cmp(a));
            v
        };
        let (long, short) = (volumes(&long[0].stops[0]), volumes(&short[0].stops[0]));
        let is_near = long.len() == short.len()
            && long.iter().zip(&short).all(|(a, b)| (a - b).abs() <= 1e-6 * plated.area());
        prop_assert!(is_near, "{long:?} against {short:?}");
    });
}

fn as_grid_pool(followed: &Followed, look: &Look, body: &Body) -> GridPool {
    let setting = Setting {
        spills: &[],
        gravity_m_per_s2: 1.0,
        density_kg_per_m3: &|_| 1.0,
        gas_pa: 0.0,
        air_pa: 0.0,
        moment_about: Point::origin(),
        points: &[],
        in_full: true,
    };
    let settled = settle(&followed.section, &followed.region, look, std::slice::from_ref(body), &setting);
    let pool = &settled.pools[0];
    GridPool { area: pool.volume_m3, centroid: pool.centroid, deepest: pool.deepest, level: pool.level_m }
}

fn lifted(p: Point) -> Point {
    p + Vec2::y() * 0.5
}

#[test]
fn a_sampled_pour_over_loses_nothing_and_does_not_hang_on_its_grid() {
    proptest!(config(12, 83), |(plated in plated(), pull in pull(), share in 0.1..0.7)| {
        let area = share * plated.area();
        let grids = [(40, 20), (31, 13)].map(|(n_across, n_steps)| (Grid::new(&plated, n_across), n_steps));
        let [fine, coarse] = grids.each_ref().map(|(grid, n_steps)| sampled(grid, area, pull, *n_steps));
        let allowed: f64 = grids.iter().map(|(grid, _)| grid.area_tolerance(0.0)).sum();
        let stays: f64 = fine.end.pools().iter().map(|pool| pool.area).sum();
        prop_assert!((stays + fine.end.left() - area).abs() <= grids[0].0.cell_area());
        let off = (fine.end.left() - coarse.end.left()).abs();
        prop_assert!(off <= allowed, "gone: off by {off:e}, allowed {allowed:e}");
        let step: f64 = grids.iter().map(|(grid, _)| grid.step).sum();
        let (fine, coarse, up) = (fine.end.pools(), coarse.end.pools(), -pull.normalize());
        prop_assert_eq!(unmatched(&fine, &coarse, up, allowed, step), None);
        prop_assert_eq!(unmatched(&coarse, &fine, up, allowed, step), None);
    });
}

/// The first of `pools` that has no like among `others`: the one with the nearest centroid differs in area, or in moment
/// about its centroid, by more than an area of `allowed` can explain, or in how deep it is by more than `step`.
fn unmatched(pools: &[GridPool], others: &[GridPool], up: Vec2, allowed: f64, step: f64) -> Option<String> {
    pools.iter().filter(|pool| pool.area > allowed).find_map(|pool| {
        let off = |other: &GridPool| (other.centroid - pool.centroid).norm();
        let Some(other) = others.iter().min_by(|a, b| off(a).total_cmp(&off(b))) else {
            return Some(format!("{pool:?} against none"));
        };
        let size = others.iter().chain(pools).map(off).fold(pool.area.sqrt(), f64::max);
        let is_like = (other.area - pool.area).abs() <= allowed
            && off(other) * pool.area <= allowed * size
            && up.dot(&(other.deepest - pool.deepest)).abs() <= step;
        (!is_like).then(|| format!("{pool:?} against {other:?}, allowed {allowed:e} and {step:e}"))
    })
}

/// Liquid that goes from rest to a pull.
fn sampled(grid: &Grid, area: f64, pull: Vec2, n_steps: usize) -> PouredOver<'_> {
    let mut ups = vec![Vec2::y()];
    ups.extend(turn(Vec2::y(), -pull, n_steps));
    pour_over(grid, &filled_at_rest(grid, Vec2::y(), area), &ups)
}

/// The region below a level, cut by the plates, by the library `geo`: a plate is a slit of a millionth of the
/// section's size.
fn parts_below(plated: &Plated, up: Vec2, level: f64) -> MultiPolygon {
    let region = geo_region(&plated.outline, &plated.obstacles);
    let width = 1e-6 * plated.area().sqrt();
    plated.plates.iter().flat_map(|plate| plate.windows(2)).fold(geo_below(&region, up, level), |parts, ends| {
        let along = (ends[1] - ends[0]).normalize() * width;
        let across = Vec2::new(-along.y, along.x);
        let (from, to): (Point, Point) = (ends[0] - along, ends[1] + along);
        let corners = [from - across, to - across, to + across, from + across].map(|p| Coord { x: p.x, y: p.y });
        parts.difference(&Polygon::new(LineString::from(corners.to_vec()), vec![]))
    })
}
