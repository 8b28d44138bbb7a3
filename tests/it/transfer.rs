//! From the sealed to the settled bound in time, against the closed form for cells that are prisms along effective gravity,
//! and against the states of both bounds.

use brimwright::analysis::{Bound, CaseResult, Transfer};
use brimwright::app::EXAMPLES;
use brimwright::cases::LoadCase;
use brimwright::scenario;
use brimwright::section::{Opening, OpeningShape};
use brimwright::study::{Fill, Study};

use crate::support::plated::Plated;
use crate::support::*;

/// A closed box, 3 m long, with one plate that parts 1 m from 2 m, and an opening of 40 mm at the floor.
fn parted(plate_top_m: f64) -> Study {
    let tank = Plated::tank(shapes::rectangle(3.0, 2.0)).with_plate(&[(1.0, 0.0), (1.0, plate_top_m)]);
    let mut section = tank.section();
    section.plates[0].openings =
        vec![Opening { name: String::new(), from_m: 0.0, to_m: 0.04, shape: OpeningShape::Share(0.5) }];
    study(section, Fill::Share(0.45))
}

/// Held by a_s for a while.
fn lasting(study: &Study, a_s: f64, onset_s: Option<f64>, duration_s: Option<f64>) -> CaseResult {
    judge_case(study, LoadCase { onset_s, duration_s, ..held(a_s, 0.0) })
}

fn transfer(case: &CaseResult) -> &Transfer {
    case.transfer.as_ref().expect("there are two bounds").as_ref().unwrap()
}

/// The closed form for two prisms and a drowned hole: head Δ0 = (L1 + L2) / 2 sin θ along effective gravity g / cos θ, areas of
/// the surfaces A_i = w L_i / cos θ; T = 2 A1 A2 / (A1 + A2) sqrt(Δ0) / (C_d a sqrt(2 |G|)), and what is left goes like the
/// square of the time left. Streeter; Daugherty; Lewitt: time to equalise (from memory; tests/reference/orifice_equalise.csv).
fn closed_form(a_s: f64) -> (f64, f64) {
    let tilt = (a_s / GRAVITY).atan();
    let [area_1, area_2] = [1.0, 2.0].map(|length| length / tilt.cos());
    let head_m = 1.5 * tilt.sin();
    let opening_m2 = 0.5 * 0.04;
    let reduced = area_1 * area_2 / (area_1 + area_2);
    let end_s = 2.0 * reduced * head_m.sqrt() / (0.6 * opening_m2 * (2.0 * GRAVITY / tilt.cos()).sqrt());
    (end_s, reduced * head_m)
}

#[test]
fn two_cells_even_out_as_the_closed_form_says() {
    // Neither floor nor roof is reached: the surfaces cut upright walls only. A full plate, and one that stands free.
    for (plate_top_m, a_s) in [(2.0, 2.0), (2.0, -2.0), (1.9, 2.0_f64)] {
        let (end_s, moved_m3) = closed_form(a_s.abs());
        let case = lasting(&parted(plate_top_m), a_s, None, None);
        let found = transfer(&case);
        let pairs = [
            ("half", found.half_s, end_s * (1.0 - 0.5_f64.sqrt())),
            ("95 %", found.nearly_all_s, end_s * (1.0 - 0.05_f64.sqrt())),
            ("end", found.end_s.expect("it ends"), end_s),
            ("moved", found.moved_m3, moved_m3),
            ("left", found.left_m3, 0.0),
        ];
        for (name, got, want) in pairs {
            // The very end is told from how the last of it goes.
            let near = if name == "end" { 1e-3 } else { 1e-5 } * want;
            assert!(
                (got - want).abs() <= near,
                "plate to {plate_top_m} m, {a_s} m/s2, {name}: got {got}, expected {want}, tolerance {near:e}"
            );
        }
        assert_eq!((found.near, found.moved_share), (Some(Bound::Settled), 1.0), "held for long");
    }
}

#[test]
fn the_bound_that_is_near_follows_from_how_long_the_case_lasts() {
    let (end_s, _) = closed_form(2.0);
    // 1 - (1 - t/T)^2 of what moves has moved at t.
    let time_for = |share: f64| end_s * (1.0 - (1.0_f64 - share).sqrt());
    for (share, near) in
        [(0.04, Some(Bound::Sealed)), (0.06, None), (0.5, None), (0.94, None), (0.96, Some(Bound::Settled))]
    {
        let lasts_s = time_for(share);
        let case = lasting(&parted(2.0), 2.0, Some(0.25 * lasts_s), Some(0.75 * lasts_s));
        let found = transfer(&case);
        assert!((found.moved_share - share).abs() < 1e-5, "share {share}: {found:?}");
        assert!((found.lasts_s.unwrap() - lasts_s).abs() < 1e-12 * lasts_s, "{found:?}");
        assert_eq!(found.near, near, "share {share}: {found:?}");
        let words = match near {
            Some(Bound::Settled) => "the settled bound is near",
            Some(Bound::Sealed) => "the sealed bound is near",
            None => "neither bound is near",
        };
        assert!(found.words.contains(words), "share {share}: {}", found.words);
    }
}

#[test]
fn a_cell_that_ran_over_its_plate_evens_out_from_the_tip() {
    // The liquid of the short cell ran over until it stands at the tip; the plate parts two pools of one part of the section.
    let case = lasting(&parted(1.0), -5.0, None, None);
    let (settled, sealed) = (case.settled.as_ref().unwrap(), case.sealed.as_ref().unwrap().as_ref().unwrap());
    let found = transfer(&case);
    let up = case.gravity.up.unwrap();
    let tip_m = up.x * 1.0 + up.y * 1.0;
    let [right_m, left_m] = [0, 1].map(|i| sealed.pools[i].level_m);
    assert!((left_m - tip_m).abs() < 1e-12, "the left pool stands at {left_m}, its tip at {tip_m}");
    let moved_m3 = sealed.cells_m3[0] - settled.cells_m3[0];
    let (end_s, _) = closed_form(5.0);
    let end_s = end_s * ((left_m - right_m) / (1.5 * -up.x).abs()).sqrt();
    for (name, got, want) in [("moved", found.moved_m3, moved_m3), ("end", found.end_s.unwrap(), end_s)] {
        let near = if name == "end" { 1e-3 } else { 1e-5 } * want;
        assert!((got - want).abs() < near, "{name}: got {got}, expected {want}, tolerance {near:e}");
    }
}

#[test]
fn at_rest_nothing_moves_and_without_openings_there_is_no_transfer() {
    let case = lasting(&parted(2.0), 0.0, Some(1.0), Some(1.0));
    let found = transfer(&case);
    assert_eq!((found.moved_m3, found.half_s, found.near), (0.0, 0.0, Some(Bound::Settled)));
    let mut shut = parted(2.0);
    shut.section.plates[0].openings.clear();
    assert_eq!(lasting(&shut, 2.0, None, None).transfer, None);
}

#[test]
fn what_moves_in_the_examples_is_what_the_bounds_differ_by() {
    let mut n_moved = 0;
    for example in EXAMPLES {
        let study = scenario::parse(example.text.as_bytes()).unwrap();
        for case in &judge(&study).cases {
            let Some(Ok(found)) = &case.transfer else { continue };
            let (settled, sealed) = (case.settled.as_ref().unwrap(), case.sealed.as_ref().unwrap().as_ref().unwrap());
            let left_m3 = settled.spilled_m3 - sealed.spilled_m3;
            let changes = settled.cells_m3.iter().zip(&sealed.cells_m3).map(|(a, b)| (a - b).abs());
            let moved_m3 = 0.5 * (changes.sum::<f64>() + left_m3);
            let near = 1e-5 * (settled.volume_m3 + settled.spilled_m3);
            let words = format!("{}, {}: {found:?}", example.file_name, case.name);
            assert!((found.moved_m3 - moved_m3).abs() < near, "{words}, expected {moved_m3}, tolerance {near:e}");
            assert!((found.left_m3 - left_m3).abs() < near, "{words}, expected {left_m3}, tolerance {near:e}");
            n_moved += usize::from(found.moved_m3 > 0.0);
        }
    }
    assert!(n_moved >= 8, "only {n_moved} cases have two bounds that differ");
}
