//! Pools and pour-over of random sections with plates, against the brute-force sampler; and the sampler against a
//! polygon library, and against itself.

use brimwright::geom::{Edge, Path, Point, Vec2};
use brimwright::section::check;
use geo::{Area, BooleanOps, Coord, LineString, MultiPolygon, Polygon};
use proptest::prelude::*;

use crate::support::clip::{geo_below, geo_region};
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
