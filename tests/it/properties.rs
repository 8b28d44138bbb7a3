//! Properties of the kernel on random sections, fills and directions.

use brimwright::geom::{Edge, Path, Sublevel, Vec2, rotate};
use proptest::prelude::*;

use crate::support::n_pools;
use crate::support::random::{Sample, any, config, direction, share, star};

/// Relative error allowed of an area.
fn precision(sample: &Sample) -> f64 {
    if sample.has_arcs() { 1e-11 } else { 1e-12 }
}

/// Level tolerance: the precision of areas carried over to lengths of the section's size.
fn level_precision(sample: &Sample, up: Vec2) -> f64 {
    let (low, high) = sample.extent(up);
    1e-11 * (high - low).max(low.abs()).max(high.abs())
}

fn close(got: f64, expected: f64, allowed: f64, what: &str) -> Result<(), TestCaseError> {
    prop_assert!(
        (got - expected).abs() <= allowed,
        "{what}: expected {expected:e}, got {got:e}, off by {:e}, tolerance {allowed:e}",
        got - expected
    );
    Ok(())
}

fn level_at(sample: &Sample, up: Vec2, share: f64) -> f64 {
    let (low, high) = sample.extent(up);
    low + share * (high - low)
}

#[test]
fn the_level_of_an_area_holds_that_area() {
    proptest!(config(400, 11), |(sample in any(), up in direction(), share in share())| {
        let sublevel = Sublevel::new(&sample.edges(), up);
        let area = share * sublevel.total_area();
        let got = sublevel.area_below(sublevel.level_for_area(area));
        close(got, area, precision(&sample) * area, "area")?;
    });
}

#[test]
fn the_area_below_a_level_leads_back_to_it() {
    proptest!(config(400, 12), |(sample in any(), up in direction(), share in share())| {
        let sublevel = Sublevel::new(&sample.edges(), up);
        let level = level_at(&sample, up, share);
        let back = sublevel.level_for_area(sublevel.area_below(level));
        // Where the surface is short, an area says little about its level.
        let width: f64 = sublevel.chords(level).iter().map(|c| (c.1 - c.0).norm()).sum();
        let blur = precision(&sample) * sublevel.area_below(level) / width;
        close(back, level, level_precision(&sample, up) + blur, "level")?;
    });
}

#[test]
fn area_only_grows_with_the_level() {
    proptest!(config(200, 13), |(sample in any(), up in direction())| {
        let sublevel = Sublevel::new(&sample.edges(), up);
        let areas: Vec<f64> = (-2..=42).map(|i| sublevel.area_below(level_at(&sample, up, i as f64 / 40.0))).collect();
        let rounding = 1e-15 * sublevel.total_area();
        prop_assert!(areas.windows(2).all(|pair| pair[0] <= pair[1] + rounding), "{areas:?}");
        prop_assert_eq!(areas[0], 0.0);
        prop_assert_eq!(areas[44], sublevel.total_area());
    });
}

#[test]
fn the_whole_area_does_not_depend_on_the_direction() {
    proptest!(config(400, 14), |(sample in any(), up in direction())| {
        let total: f64 = Path::new(sample.outline.clone()).signed_area()
            - sample.obstacles.iter().map(|o| Path::new(o.clone()).signed_area()).sum::<f64>();
        close(Sublevel::new(&sample.edges(), up).total_area(), total, precision(&sample) * total, "whole area")?;
    });
}

#[test]
fn what_is_below_and_what_is_above_make_the_whole() {
    proptest!(config(400, 15), |(sample in any(), up in direction(), share in share())| {
        let (edges, level) = (sample.edges(), level_at(&sample, up, share));
        let (below, above) = (Sublevel::new(&edges, up), Sublevel::new(&edges, -up));
        let sum = below.area_below(level) + above.area_below(-level);
        close(sum, below.total_area(), precision(&sample) * below.total_area(), "below and above")?;
    });
}

#[test]
fn turning_section_and_direction_together_changes_nothing() {
    proptest!(config(300, 16), |(sample in any(), up in direction(), share in share(), angle in -7.0..7.0)| {
        let edges = sample.edges();
        let turned = crate::support::turned(&edges, angle);
        let (before, after) = (Sublevel::new(&edges, up), Sublevel::new(&turned, rotate(up, angle)));
        let level = level_at(&sample, up, share);
        let width: f64 = before.chords(level).iter().map(|c| (c.1 - c.0).norm()).sum();
        let allowed = precision(&sample) * before.total_area() + level_precision(&sample, up) * width;
        close(after.area_below(level), before.area_below(level), allowed, "area")?;
        close(after.total_area(), before.total_area(), precision(&sample) * before.total_area(), "whole area")?;
    });
}

#[test]
fn the_mirror_image_holds_the_same() {
    proptest!(config(300, 17), |(sample in any(), up in direction(), share in share())| {
        // Mirrored in the z axis, every edge runs the other way round.
        let mirror = |e: &Edge| {
            let flip = |p: brimwright::geom::Point| brimwright::geom::Point::new(-p.x, p.y);
            Edge { start: flip(e.end), end: flip(e.start), sweep: e.sweep }
        };
        let edges = sample.edges();
        let mirrored: Vec<Edge> = edges.iter().map(mirror).collect();
        let (before, after) = (Sublevel::new(&edges, up), Sublevel::new(&mirrored, Vec2::new(-up.x, up.y)));
        let area = share * before.total_area();
        close(after.total_area(), before.total_area(), precision(&sample) * before.total_area(), "whole area")?;
        let (level, image) = (before.level_for_area(area), after.level_for_area(area));
        let width: f64 = before.chords(level).iter().map(|c| (c.1 - c.0).norm()).sum();
        close(image, level, level_precision(&sample, up) + precision(&sample) * area / width, "level")?;
        prop_assert_eq!(n_pools(&before, level), n_pools(&after, image));
    });
}

#[test]
fn splitting_an_edge_changes_nothing() {
    proptest!(config(300, 18), |(sample in any(), up in direction(), share in share(), at in 0.05..0.95, which in 0..999_usize)| {
        let edges = sample.edges();
        let mut split = edges.clone();
        let idx = which % edges.len();
        split.splice(idx..=idx, [edges[idx].part(0.0, at), edges[idx].part(at, 1.0)]);
        let (before, after) = (Sublevel::new(&edges, up), Sublevel::new(&split, up));
        let level = level_at(&sample, up, share);
        close(after.area_below(level), before.area_below(level), precision(&sample) * before.total_area(), "area")?;
        prop_assert_eq!(n_pools(&after, level), n_pools(&before, level));
    });
}

#[test]
fn the_order_of_the_edges_changes_nothing() {
    proptest!(config(200, 19), |(sample in any(), up in direction(), share in share(), first in 0..999_usize)| {
        let edges = sample.edges();
        let mut shuffled = edges.clone();
        shuffled.rotate_left(first % edges.len());
        let level = level_at(&sample, up, share);
        let (before, after) = (Sublevel::new(&edges, up), Sublevel::new(&shuffled, up));
        close(after.area_below(level), before.area_below(level), precision(&sample) * before.total_area(), "area")?;
    });
}

#[test]
fn the_parts_of_a_section_add_up() {
    proptest!(config(300, 20), |(sample in star(6..=30, true), up in direction(), share in share(),
                                 cuts in (0.1..0.9, 0.1..0.9), which in 0..999_usize)| {
        // Cut through the centre, which sees every point of a star: from a point on one edge to one on another.
        let outline = &sample.outline;
        let n = outline.len();
        let (first, second) = (which % n, (which + n / 2) % n);
        let center = sample.center;
        let side = |from: usize, from_t: f64, to: usize, to_t: f64| {
            let mut part = vec![outline[from].part(from_t, 1.0)];
            let mut i = (from + 1) % n;
            while i != to {
                part.push(outline[i]);
                i = (i + 1) % n;
            }
            part.push(outline[to].part(0.0, to_t));
            let (start, end) = (part[0].start, part[part.len() - 1].end);
            part.extend([Edge::line(end, center), Edge::line(center, start)]);
            Sublevel::new(&part, up)
        };
        let (a, b) = (side(first, cuts.0, second, cuts.1), side(second, cuts.1, first, cuts.0));
        let whole = Sublevel::new(outline, up);
        let level = level_at(&sample, up, share);
        let allowed = precision(&sample) * whole.total_area();
        close(a.area_below(level) + b.area_below(level), whole.area_below(level), allowed, "two parts")?;
    });
}

#[test]
fn the_surface_is_the_slope_of_the_area() {
    proptest!(config(300, 21), |(sample in any(), up in direction(), share in share())| {
        let sublevel = Sublevel::new(&sample.edges(), up);
        let level = level_at(&sample, up, share);
        let (low, high) = sample.extent(up);
        // Between vertices and turning points a central difference over a short span is good to its square.
        let span = 1e-6 * (high - low);
        let bends = sample.edges().iter().any(|e| {
            let ((a, _), (b, _)) = e.extent(up);
            [a, b].iter().any(|v| (v - level).abs() < 300.0 * span)
        });
        prop_assume!(!bends);
        let width: f64 = sublevel.chords(level).iter().map(|c| (c.1 - c.0).norm()).sum();
        let slope = (sublevel.area_below(level + span) - sublevel.area_below(level - span)) / (2.0 * span);
        close(width, slope, 1e-6 * (high - low), "surface length")?;
    });
}
