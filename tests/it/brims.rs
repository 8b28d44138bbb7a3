//! What brims hold on the way to a load case. Expected values are elementary geometry.

use brimwright::analysis::State;
use brimwright::cases::Attitude;
use brimwright::geom::{Edge, Point, Vec2};
use brimwright::section::Wall;
use brimwright::study::{Compartment, Fill};
use proptest::prelude::*;

use crate::support::plated::Plated;
use crate::support::random::{any as sections, config, share};
use crate::support::shapes::{polygon, rectangle, section};
use crate::support::*;

#[track_caller]
fn near(got: f64, expected: f64, allowed: f64, what: &str) {
    assert!((got - expected).abs() <= allowed, "{what}: expected {expected}, got {got}, tolerance {allowed:e}");
}

/// Went wrong once: rounding left the case itself off the end of the ramp, for about one acceleration in ten.
#[test]
fn every_acceleration_spills_to_its_own_brim() {
    let (length, height) = (6.0, 2.0);
    let full = study(section(&rectangle(length, height), &[2], 1.0), Fill::Share(1.0));
    for i in 1..=160 {
        let a_s = 0.02 * f64::from(i);
        for a_s in [a_s, -a_s] {
            let case = judge_case(&full, held(a_s, 0.0));
            let spilled = 0.5 * length * length * a_s.abs() / GRAVITY;
            near(settled(&case).spilled_m3, spilled, 1e-10, &format!("spilled at {a_s} m/s2"));
        }
    }
}

/// Went wrong once: the few drops that were left counted as a surface that capillarity rules, and hid the spill.
#[test]
fn a_mouth_that_lies_lowest_on_the_way_empties_the_tank() {
    // A hole in the left wall from z = 0.9 m to 1.1 m; the liquid is thrown to the left and on to the roof.
    let holed = polygon(&[(0.0, 0.0), (4.0, 0.0), (4.0, 2.0), (0.0, 2.0), (0.0, 1.1), (0.0, 0.9)]);
    let study = study(section(&holed, &[4], 1.0), Fill::Level(0.8));
    let (a_s, a_z) = (20.0, -25.0);
    let case = judge_case(&study, held(a_s, a_z));
    near(settled(&case).volume_m3, 0.0, 1e-7, "volume left");
    // First spill: the surface reaches the hole at slope t, 0.8 + 2 t = 0.9; then k a_s = t (g + k a_z).
    let slope = 0.05;
    let share = slope * GRAVITY / (a_s - slope * a_z);
    let limit = verdict(&case, "Contained").unwrap().limit.unwrap().si;
    near(limit, share * a_s.hypot(a_z), 1e-9, "first spill");
}

#[test]
fn what_has_been_spilled_parts_no_more() {
    // The same hole under a roof with two pockets, of which the liquid would fill both, had it not all left before.
    let pockets = polygon(&[(0.0, 0.0), (4.0, 0.0), (4.0, 2.0), (2.0, 1.5), (0.0, 2.0), (0.0, 1.1), (0.0, 0.9)]);
    let case = judge_case(&study(section(&pockets, &[5], 1.0), Fill::Level(0.2)), held(2.0, -25.0));
    near(settled(&case).volume_m3, 0.0, 1e-7, "volume left");
}

#[test]
fn liquid_that_parts_on_the_way_is_judged_pool_by_pool() {
    // A sill in the floor, covered at rest. At a slope of one, what stays on its right is the triangle between the sill's
    // right side, the floor, and the surface through the sill's top: (2, 0.5), (2.1, 0), (2.5, 0); all else has gone over.
    let sill = polygon(&[(0.0, 0.0), (1.9, 0.0), (2.0, 0.5), (2.1, 0.0), (4.0, 0.0), (4.0, 3.0), (0.0, 3.0)]);
    let study = study(section(&sill, &[5], 1.0), Fill::Level(0.55));
    let gentle = judge_case(&study, held(0.5, 0.0));
    assert_eq!(settled(&gentle).pools.len(), 1, "the sill stays covered");
    let hard = judge_case(&study, held(GRAVITY, 0.0));
    let [left, right] = &settled(&hard).pools[..] else { panic!("{:?}", hard.settled) };
    near(right.volume_m3, 0.5 * 0.4 * 0.5, 1e-12, "right of the sill");
    near(left.volume_m3 + right.volume_m3, 4.0 * 0.55 - 0.5 * 0.2 * 0.5, 1e-12, "both");
    assert_eq!(verdict(&hard, "Contained").map(|v| v.state), Some(State::Holds));
}

#[test]
fn the_highest_fill_is_the_one_that_just_holds() {
    let shifted: Vec<Edge> = rectangle(6.0, 2.0)
        .iter()
        .map(|e| Edge::line(e.start + Vec2::new(10.0, 5.0), e.end + Vec2::new(10.0, 5.0)))
        .collect();
    for a_s in [2.4, -2.4] {
        let open = study(section(&shifted, &[2], 2.5), Fill::Share(0.5));
        let results = judge(&brimwright::study::Study { cases: vec![held(a_s, 0.0)], ..open.clone() });
        // Row 1.2 of the published examples: 18.990826 of 30 m3 stay.
        let share = results.still.highest_share.expect("a judged case");
        near(share, 18.990826 / 30.0, 2e-8, "highest share");
        for (factor, state) in [(0.9999, State::Close), (1.0001, State::Fails)] {
            let mut filled = open.clone();
            filled.fill = Fill::Share(share * factor);
            let case = judge_case(&filled, held(a_s, 0.0));
            assert_eq!(verdict(&case, "Contained").map(|v| v.state), Some(state), "fill {factor} of the highest");
        }
    }
}

#[test]
fn whatever_is_sound_is_judged_without_nan_and_no_surface_stands_above_a_brim() {
    let accel = (-40.0..40.0, -25.0..25.0, prop_oneof![Just(0.0), -180.0..180.0]);
    proptest!(config(25, 61), |(sample in sections(), share in share(), (a_s, a_z, heel_deg) in accel, mouths in (0..99_usize, 0..99_usize))| {
        let n = sample.outline.len();
        let mouths = [mouths.0 % n, mouths.1 % n];
        let mut study = study(sample.section(&mouths, 1.0), Fill::Share(share));
        let mut load_case = held(a_s, a_z);
        load_case.attitude = Attitude::HeelDeg(heel_deg);
        study.cases = vec![load_case];
        let results = judge(&study);
        prop_assert!(!format!("{results:?}").contains("NaN"), "{results:?}");
        let case = &results.cases[0];
        if let Ok(settled) = &case.settled {
            let up = case.gravity.up.unwrap();
            let (low, high) = sample.extent(up);
            for pool in &settled.pools {
                for face in pool.wetted.iter().filter(|f| matches!(f.wall, Wall::Outline { is_mouth: true, .. })) {
                    let brim = face.edge.extent(up).0.0;
                    prop_assert!(pool.level_m <= brim + 1e-9 * (high - low), "{} above the brim {brim}", pool.level_m);
                }
            }
            let sum = settled.volume_m3 + settled.spilled_m3;
            prop_assert!((sum - results.still.volume_m3).abs() <= 1e-12 * results.capacity_m3, "left and spilled {sum}");
            if settled.spilled_m3 > 1e-9 * results.capacity_m3 {
                let state = verdict(case, "Contained").map(|v| v.state);
                prop_assert!(matches!(state, Some(State::Fails | State::NotJudged)), "spilled, yet {state:?}");
            }
        }
    });
}

/// Went wrong once: where the still level stood above the mouth and the tilt took a little off it, a negative demand
/// was called no demand, and freeboard held.
#[test]
fn a_still_level_above_the_mouth_has_no_freeboard_until_the_tilt_takes_it_below() {
    // A roofed tank, vented high in its left wall, with an open well at the right, joined along the floor; the well's
    // rim lies at z = 0.5 m.
    let well = [(0.0, 0.0), (2.0, 0.0), (2.0, 0.5), (1.5, 0.5), (1.5, 0.2)];
    let corners = [&well[..], &[(1.0, 0.2), (1.0, 1.0), (0.0, 1.0), (0.0, 0.95)]].concat();
    let study = study(section(&polygon(&corners), &[2, 7], 1.0), Fill::Level(0.6));
    for (a_s, want) in [(0.3, State::Fails), (6.0, State::Holds)] {
        let case = judge_case(&study, held(a_s, 0.0));
        let freeboard = verdict(&case, "Freeboard").expect("the well has upright walls");
        let (demand, limit) = (freeboard.demand.unwrap().si, freeboard.limit.unwrap().si);
        assert_eq!(freeboard.state, want, "{demand} m against {limit} m at {a_s} m/s2");
        assert!(demand < 0.0 && limit < 0.0, "{demand} m, {limit} m");
    }
}

#[test]
fn a_compartment_with_its_own_fill_does_not_limit_the_common_one() {
    // Two cells 1 m wide below a mouth each, the left one brim-full for itself. At a slope of 0.2 the right one holds
    // 0.2 / 2 less than its capacity of 1 m3.
    let corners = [(0.0, 0.0), (2.0, 0.0), (2.0, 1.0), (1.1, 1.0), (0.9, 1.0), (0.0, 1.0)];
    let tank = Plated::tank(polygon(&corners)).with_mouth(2).with_mouth(4).with_plate(&[(1.0, 0.0), (1.0, 1.0)]);
    let mut study = study(tank.section(), Fill::Share(0.5));
    let (name, at) = ("full".to_owned(), Point::new(0.5, 0.5));
    study.compartments = vec![Compartment { name, at, liquid: None, fill: Fill::Share(1.0) }];
    study.cases = vec![held(-0.2 * GRAVITY, 0.0)];
    let share = judge(&study).still.highest_share.expect("a judged case");
    near(share, 0.9, 1e-6, "highest share");
}

#[test]
fn the_highest_fill_lies_below_a_fill_that_spills() {
    // Open at its top, 2 by 1; at a slope of 0.2 it holds 2 - 2 x 0.4 / 2 below its brim, 0.8 of its capacity.
    for fill in [0.5, 0.95] {
        let mut study = study(section(&rectangle(2.0, 1.0), &[2], 1.0), Fill::Share(fill));
        study.cases = vec![held(-0.2 * GRAVITY, 0.0)];
        let share = judge(&study).still.highest_share.expect("a judged case");
        near(share, 0.8, 1e-9, &format!("highest share, filled to {fill}"));
    }
}
