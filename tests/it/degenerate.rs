//! Degenerate cases, each with what it must give. Expected values are elementary geometry.

use std::f64::consts::{FRAC_PI_2, FRAC_PI_4, PI};

use brimwright::analysis::{CaseResult, Results, State};
use brimwright::cases::{Accel, AccelUnit, Attitude, LoadCase};
use brimwright::geom::{Edge, Point, Sublevel, Vec2};
use brimwright::study::{Fill, Study};

use crate::support::n_pools;
use crate::support::shapes::{circle, obstacle, polygon, rectangle, rounded_rectangle, section};
use crate::support::*;

const UP: Vec2 = Vec2::new(0.0, 1.0);

#[track_caller]
fn near(got: f64, expected: f64, allowed: f64) {
    assert!((got - expected).abs() <= allowed, "expected {expected}, got {got}, tolerance {allowed:e}");
}

#[track_caller]
fn near_point(got: Point, expected: (f64, f64), allowed: f64) {
    let off = (got - Point::new(expected.0, expected.1)).norm();
    assert!(off <= allowed, "expected {expected:?}, got {got}, off by {off:e}, tolerance {allowed:e}");
}

/// No number anywhere in the results is NaN.
#[track_caller]
fn no_nan(results: &Results) {
    let words = format!("{results:?}");
    assert!(!words.contains("NaN"), "a NaN in {words}");
}

#[track_caller]
fn judged(study: &Study, a_s: f64, a_z: f64) -> CaseResult {
    let results = judge(&Study { cases: vec![held(a_s, a_z)], ..study.clone() });
    no_nan(&results);
    results.cases.into_iter().next().unwrap()
}

fn tank(length: f64, height: f64, mouths: &[usize], fill: Fill) -> Study {
    study(section(&rectangle(length, height), mouths, 1.0), fill)
}

/// A shut box of 4 m by 2 m with a step in its floor, 1 m high, over the right half.
fn stepped() -> Vec<Edge> {
    polygon(&[(0.0, 0.0), (2.0, 0.0), (2.0, 1.0), (4.0, 1.0), (4.0, 2.0), (0.0, 2.0)])
}

#[test]
fn an_empty_tank_presses_on_nothing() {
    for fill in [Fill::Volume(0.0), Fill::Share(0.0), Fill::Level(0.0), Fill::Ullage(2.0)] {
        let case = judged(&tank(4.0, 2.0, &[2], fill), 3.0, 0.0);
        let settled = settled(&case);
        assert_eq!((settled.volume_m3, settled.spilled_m3), (0.0, 0.0), "{fill:?}");
        assert_eq!(settled.total_force_n, Vec2::zeros(), "{fill:?}");
        assert!(settled.edges.iter().all(|e| e.force_n == Vec2::zeros() && e.peak.is_none()), "{fill:?}");
        assert!(settled.roof.is_none(), "{fill:?}");
    }
}

#[test]
fn a_full_shut_tank_has_its_centroid_in_the_middle_whatever_the_direction() {
    for fill in [Fill::Volume(8.0), Fill::Share(1.0), Fill::Level(2.0), Fill::Ullage(0.0)] {
        for (a_s, a_z) in [(0.0, 0.0), (5.0, 0.0), (-50.0, -20.0), (3.0, -GRAVITY)] {
            let case = judged(&tank(4.0, 2.0, &[], fill), a_s, a_z);
            let settled = settled(&case);
            near(settled.volume_m3, 8.0, 1e-12);
            near_point(settled.centroid, (2.0, 1.0), 1e-12);
            // Along an edge the surface wets but does not press. At a slant the last of the liquid is a corner whose sides go as the root of its area.
            if a_s != 0.0 && a_z != -GRAVITY {
                near(settled.edges.iter().map(|e| e.wetted_length_m).sum(), 12.0, 1e-6);
            }
        }
    }
}

#[test]
fn an_open_tank_filled_to_its_brim_spills_at_the_first_touch() {
    let brim_full = tank(4.0, 2.0, &[2], Fill::Share(1.0));
    let at_rest = judged(&brim_full, 0.0, 0.0);
    near(settled(&at_rest).spilled_m3, 0.0, 1e-12);
    let pushed = judged(&brim_full, 1e-3, 0.0);
    // A triangle over the whole length: L2 tan theta / 2.
    near(settled(&pushed).spilled_m3, 8.0 * 1e-3 / GRAVITY, 1e-12);
    near(verdict(&pushed, "Contained").unwrap().limit.unwrap().si, 0.0, 1e-9);
}

#[test]
fn a_surface_through_two_vertices() {
    // Unit square, half full, tilted by 45 degrees: the surface is the diagonal.
    let case = judged(&tank(1.0, 1.0, &[], Fill::Share(0.5)), GRAVITY, 0.0);
    let settled = settled(&case);
    near_point(settled.centroid, (1.0 / 3.0, 1.0 / 3.0), 1e-12);
    let surface = chord(settled);
    near_point(surface.left, (0.0, 1.0), 1e-12);
    near_point(surface.right, (1.0, 0.0), 1e-12);
}

#[test]
fn a_level_through_vertices_of_a_saw_tooth() {
    // Teeth from z = 0 to z = 1: five below the level of their tips, each a triangle of base 1 and height 1.
    let mut points = vec![(5.0, 2.0), (0.0, 2.0), (0.0, 1.0)];
    for i in 0..5 {
        points.push((i as f64 + 0.5, 0.0));
        points.push((i as f64 + 1.0, 1.0));
    }
    let teeth = Sublevel::new(&polygon(&points), UP);
    near(teeth.area_below(1.0), 2.5, 1e-14);
    near(teeth.level_for_area(2.5), 1.0, 1e-14);
    assert_eq!((n_pools(&teeth, 0.999), n_pools(&teeth, 1.001)), (5, 1));
    near(teeth.area_below(0.0), 0.0, 0.0);
    near(teeth.area_below(2.0), 7.5, 1e-14);
}

#[test]
fn a_level_along_an_edge() {
    let sublevel = Sublevel::new(&stepped(), UP);
    near(sublevel.area_below(1.0), 2.0, 0.0);
    near(sublevel.level_for_area(2.0), 1.0, 1e-15);
    near(sublevel.area_below(1.0 + 1e-9), 2.0 + 4e-9, 1e-15);
    near(sublevel.area_below(1.0 - 1e-9), 2.0 - 2e-9, 1e-15);
    let case = judged(&study(section(&stepped(), &[], 1.0), Fill::Level(1.0)), 0.0, 0.0);
    near_point(settled(&case).centroid, (1.0, 0.5), 1e-12);
    near(settled(&case).peak_pa, WATER * GRAVITY, 1e-9);
    near(settled(&case).total_force_n.y, -2.0 * WATER * GRAVITY, 1e-8);
}

#[test]
fn a_level_at_the_tangent_point_of_an_arc() {
    // Corners of radius 0.3 m: their arcs leave the floor at z = 0 and reach the walls at z = 0.3 m.
    let rounded = Sublevel::new(&rounded_rectangle(2.0, 1.2, 0.3), UP);
    near(rounded.area_below(0.0), 0.0, 0.0);
    let corners = 2.0 * 0.3 * 0.3 * (1.0 - FRAC_PI_4);
    near(rounded.area_below(0.3), 2.0 * 0.3 - corners, 1e-15);
    near(rounded.level_for_area(2.0 * 0.3 - corners), 0.3, 1e-14);
    near(rounded.area_below(1.2), 2.0 * 1.2 - 2.0 * corners, 1e-14);
    // A round obstacle touched by the level at its foot and at its crown.
    let pipe: Vec<Edge> = circle(0.25).iter().map(|e| shifted(e, 0.0, 0.5).reversed()).rev().collect();
    let tank: Vec<Edge> = rectangle(2.0, 2.0).iter().map(|e| shifted(e, -1.0, 0.0)).chain(pipe).collect();
    let with_pipe = Sublevel::new(&tank, UP);
    near(with_pipe.area_below(0.5), 1.0, 1e-15);
    near(with_pipe.area_below(1.0), 2.0 - PI / 16.0, 1e-14);
    near(with_pipe.level_for_area(2.0 - PI / 16.0), 1.0, 1e-13);
    assert_eq!((with_pipe.chords(0.75).len(), n_pools(&with_pipe, 0.75), n_pools(&with_pipe, 1.5)), (2, 1, 1));
}

fn shifted(e: &Edge, s: f64, z: f64) -> Edge {
    let by = Vec2::new(s, z);
    Edge { start: e.start + by, end: e.end + by, sweep: e.sweep }
}

#[test]
fn no_effective_gravity_means_no_settled_surface() {
    let falling = [
        held(0.0, -GRAVITY),
        LoadCase {
            accel: Accel::Polar { magnitude: 1.0, direction_deg: -90.0, unit: AccelUnit::G },
            ..held(0.0, 0.0)
        },
        LoadCase { attitude: Attitude::HeelDeg(90.0), ..held(-GRAVITY, 0.0) },
    ];
    for load_case in falling {
        let results = judge(&Study { cases: vec![load_case.clone()], ..tank(4.0, 2.0, &[2], Fill::Share(0.5)) });
        no_nan(&results);
        let case = &results.cases[0];
        assert!(case.settled.is_err() && case.gravity.up.is_none(), "{load_case:?}: {:?}", case.gravity);
        assert!(case.verdicts.iter().all(|v| v.state == State::NotJudged), "{load_case:?}");
    }
}

#[test]
fn gravity_exactly_sideways_stands_the_liquid_against_the_wall() {
    for (a_s, middle_s) in [(5.0, 0.5), (-5.0, 3.5)] {
        let case = judged(&tank(4.0, 2.0, &[], Fill::Share(0.25)), a_s, -GRAVITY);
        let settled = settled(&case);
        near_point(settled.centroid, (middle_s, 1.0), 1e-12);
        assert_eq!((case.gravity.slope, settled.pools[0].offset_m), (None, None));
        near(case.gravity.tilt_rad.unwrap().abs(), FRAC_PI_2, 1e-15);
        near(settled.total_force_n.x, -a_s * 2.0 * WATER, 1e-8);
        near(settled.total_force_n.y, 0.0, 1e-8);
        near(settled.peak_pa, 5.0 * WATER, 1e-8);
    }
}

#[test]
fn gravity_upward_lays_the_liquid_against_the_roof() {
    // Turned upside down at rest; an acceleration would lead there through free fall.
    let upside_down = LoadCase { attitude: Attitude::HeelDeg(180.0), ..held(0.0, 0.0) };
    let results = judge(&Study { cases: vec![upside_down], ..tank(4.0, 2.0, &[], Fill::Level(0.5)) });
    no_nan(&results);
    let case = &results.cases[0];
    let settled = settled(case);
    near_point(settled.centroid, (2.0, 1.75), 1e-12);
    near(case.gravity.tilt_rad.unwrap().abs(), PI, 1e-15);
    let surface = chord(settled);
    near_point(surface.left, (4.0, 1.5), 1e-12);
    near_point(surface.right, (0.0, 1.5), 1e-12);
    near(settled.total_force_n.y, GRAVITY * 2.0 * WATER, 1e-8);
    let roof = settled.roof.as_ref().expect("the roof is wet");
    near(roof.wetted_length_m, 4.0, 1e-12);
    near(roof.peak_pa, 0.5 * GRAVITY * WATER, 1e-8);
}

#[test]
fn gravity_upward_empties_an_open_tank_or_is_not_judged() {
    // The way there leads through free fall: no verdict may say that it holds.
    let case = judged(&tank(4.0, 2.0, &[2], Fill::Level(0.5)), 0.0, -3.0 * GRAVITY);
    assert_ne!(verdict(&case, "Contained").map(|v| v.state), Some(State::Holds));
    if let Ok(settled) = &case.settled {
        near(settled.volume_m3, 0.0, 1e-12);
    }
}

#[test]
fn a_needle_thin_section() {
    for thickness in [1e-3, 1e-5] {
        let study = tank(1.0, thickness, &[], Fill::Share(0.5));
        let at_rest = judge(&study).still;
        near(at_rest.level_z_m / thickness, 0.5, 1e-9);
        let case = judged(&study, 0.0, 0.0);
        near(settled(&case).volume_m3 / thickness, 0.5, 1e-12);
        // Tilted, half of it lies in the rear half but for a wedge as long as the thickness over the slope.
        let tilted = judged(&study, 100.0, 0.0);
        near(settled(&tilted).centroid.x, 0.25, thickness);
    }
    // Seen along its sides it is exact; at a slant its points carry the rounding of its length, 1e-16 m.
    for (up, blur) in [(UP, 1e-22), (Vec2::new(1.0, 0.0), 1e-22), (Vec2::new(0.6, 0.8), 1e-15)] {
        let sublevel = Sublevel::new(&rectangle(1.0, 1e-9), up);
        near(sublevel.total_area(), 1e-9, blur);
        near(sublevel.area_below(sublevel.level_for_area(3e-10)), 3e-10, blur);
    }
}

#[test]
fn scales_from_micrometres_to_kilometres() {
    // Powers of two, so that every size is the same section to the last bit.
    let shapes = [stepped(), rounded_rectangle(2.0, 1.2, 0.3), circle(1.0)];
    for (shape, up) in shapes.iter().flat_map(|s| [UP, Vec2::new(0.6, 0.8), -UP].map(|up| (s, up))) {
        let metre = Sublevel::new(shape, up);
        for exponent in [-20, -10, 10, 20] {
            let factor = 2.0_f64.powi(exponent);
            let edges: Vec<Edge> =
                shape.iter().map(|e| Edge { start: e.start * factor, end: e.end * factor, sweep: e.sweep }).collect();
            let scaled = Sublevel::new(&edges, up);
            for share in [0.01, 0.3, 0.77] {
                let (a, b) = (share * metre.total_area(), share * scaled.total_area());
                let (one, other) = (metre.level_for_area(a), scaled.level_for_area(b) / factor);
                near(other, one, 1e-13);
                assert_eq!(n_pools(&metre, one), n_pools(&scaled, one * factor), "2^{exponent}, share {share}");
            }
        }
    }
    let lake = judged(&tank(4000.0, 2000.0, &[2], Fill::Level(1000.0)), 1.0, 0.0);
    near(settled(&lake).spilled_m3, 0.0, 1e-3);
    near(chord(settled(&lake)).left.y, 1000.0 + 2000.0 / GRAVITY, 1e-8);
}

#[test]
fn capillarity_rules_a_drop() {
    // 10 um of water: density g L2 / surface tension is about 1e-5, far below 10.
    let case = judged(&tank(1e-5, 1e-5, &[2], Fill::Share(0.5)), 1.0, 0.0);
    assert!(case.verdicts.iter().all(|v| v.state == State::NotJudged), "{:?}", case.verdicts);
}

#[test]
fn edges_that_are_nearly_level() {
    for rise in [1e-6, 1e-9, 1e-12, 1e-15] {
        // A floor that rises by `rise` over 4 m: the area below 1 m is 4 - 2 rise.
        let sloped = polygon(&[(0.0, 0.0), (4.0, rise), (4.0, 2.0), (0.0, 2.0 + rise)]);
        let sublevel = Sublevel::new(&sloped, UP);
        near(sublevel.area_below(1.0), 4.0 - 2.0 * rise, 1e-14);
        near(sublevel.total_area(), 8.0, 1e-14);
        near(sublevel.level_for_area(4.0 - 2.0 * rise), 1.0, 1e-14);
        near(sublevel.area_below(rise), 2.0 * rise, 1e-13 * rise + 1e-30);
        near(sublevel.area_below(sublevel.level_for_area(rise)), rise, 1e-12 * rise);
    }
}

#[test]
fn an_obstacle_that_the_liquid_does_not_reach_changes_nothing() {
    let plain = tank(4.0, 2.0, &[2], Fill::Volume(4.0));
    let mut with_pipe = plain.clone();
    let pipe: Vec<Edge> = circle(0.2).iter().map(|e| shifted(e, 3.0, 1.5)).collect();
    with_pipe.section.obstacles = vec![obstacle(&pipe)];
    let (a, b) = (judged(&plain, 1.0, 0.0), judged(&with_pipe, 1.0, 0.0));
    let (a, b) = (settled(&a), settled(&b));
    near(b.pools[0].level_m, a.pools[0].level_m, 1e-14);
    near_point(b.centroid, (a.centroid.x, a.centroid.y), 1e-13);
    near(b.total_force_n.y, a.total_force_n.y, 1e-9);
    assert!(b.edges[4..].iter().all(|e| e.force_n == Vec2::zeros() && e.wetted_length_m == 0.0));
}

#[test]
fn an_obstacle_under_water_floats_by_what_it_displaces() {
    let mut study = tank(4.0, 2.0, &[2], Fill::Level(1.5));
    let pipe: Vec<Edge> = circle(0.2).iter().map(|e| shifted(e, 3.0, 0.5)).collect();
    study.section.obstacles = vec![obstacle(&pipe)];
    let results = judge(&study);
    near(results.still.volume_m3, 6.0 - PI * 0.04, 1e-13);
    // Archimedes: weight of the displaced liquid, upward.
    let case = judged(&study, 0.0, 0.0);
    let lift: Vec2 = settled(&case).edges[4..].iter().map(|e| e.force_n).sum();
    near(lift.y, PI * 0.04 * WATER * GRAVITY, 1e-8);
    near(lift.x, 0.0, 1e-9);
}

#[test]
fn a_mouth_on_the_floor_lets_everything_out() {
    let case = judged(&tank(4.0, 2.0, &[0], Fill::Level(1.0)), 1.0, 0.0);
    let settled = settled(&case);
    near(settled.volume_m3, 0.0, 1e-12);
    near(settled.spilled_m3, 4.0, 1e-12);
    let contained = verdict(&case, "Contained").unwrap();
    assert_eq!(contained.state, State::Fails);
    near(contained.limit.unwrap().si, 0.0, 1e-12);
}

#[test]
fn a_fill_beyond_capacity_or_below_nothing_is_refused() {
    for fill in [
        Fill::Volume(8.1),
        Fill::Volume(-0.1),
        Fill::Share(1.01),
        Fill::Share(-0.01),
        Fill::Level(2.1),
        Fill::Level(-0.1),
        Fill::Ullage(2.1),
        Fill::Ullage(-0.1),
        Fill::Volume(f64::NAN),
        Fill::Share(f64::INFINITY),
    ] {
        assert!(tank(4.0, 2.0, &[2], fill).validate().is_err(), "{fill:?} was let in");
    }
}

#[test]
fn the_four_ways_of_giving_a_fill_agree() {
    let fills = [Fill::Volume(3.0), Fill::Share(0.375), Fill::Level(0.75), Fill::Ullage(1.25)];
    for fill in fills {
        let still = judge(&tank(4.0, 2.0, &[2], fill)).still;
        near(still.volume_m3, 3.0, 1e-12);
        near(still.share, 0.375, 1e-13);
        near(still.level_z_m, 0.75, 1e-13);
        near(still.ullage_m, 1.25, 1e-13);
        near(still.depth_m, 0.75, 1e-13);
        near(still.mass_kg, 3000.0, 1e-9);
    }
}
