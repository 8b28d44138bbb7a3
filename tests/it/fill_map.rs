//! The fill map against whole judgements of the same fill and acceleration.

use brimwright::analysis::{self, NoFillMap, State};
use brimwright::app::EXAMPLES;
use brimwright::cases::{Accel, AccelUnit, LoadCase};
use brimwright::progress::Progress;
use brimwright::scenario;
use brimwright::study::{Fill, Study};

use crate::support::limited::limited;
use crate::support::random::config;
use crate::support::*;
use proptest::prelude::*;

/// Points of a map that a whole judgement agrees with: state, criterion, utilisation to rounding.
fn compare(study: &Study, case_idx: usize, n: usize, at: &[(usize, usize)]) -> Result<(), TestCaseError> {
    let Ok(valid) = study.validate() else { return Ok(()) };
    let map = match analysis::fill_map(&valid, case_idx, n, n, &Progress::default(), &|_| {}) {
        Ok(map) => map,
        Err(why) => {
            prop_assert!(matches!(why, NoFillMap::AtRest | NoFillMap::NoCommonFill), "{why}");
            return Ok(());
        }
    };
    for &(i, j) in at {
        let accel = map.accel(j);
        let accel = Accel::Components { a_s: accel.x, a_z: accel.y, unit: AccelUnit::MPerS2 };
        let case = LoadCase { accel, ..study.cases[case_idx].clone() };
        let one = Study { fill: Fill::Share(map.shares[i]), cases: vec![case], ..study.clone() };
        let judged = judge(&one).cases.remove(0);
        let want = judged.worst().expect("something is judged");
        let got = map.point(i, j).expect("the map is complete");
        let used = |u: Option<f64>| u.unwrap_or(0.0).min(1e6);
        let apart = (used(got.utilisation) - used(want.utilisation)).abs();
        // Two criteria may be used alike; a utilisation within rounding of a limit may fall on either side.
        let is_near = apart <= 1e-7 * (1.0 + used(want.utilisation));
        prop_assert!(
            is_near && (got.state == want.state || (used(want.utilisation) - 1.0).abs() < 1e-7),
            "fill {}, {} m/s2: got {got:?}, expected {:?} {:?} {:?} {}\n{study:#?}",
            map.shares[i],
            map.accels_m_per_s2[j],
            want.criterion,
            want.state,
            want.utilisation,
            want.remark,
        );
    }
    Ok(())
}

#[test]
fn every_point_is_what_a_whole_judgement_gives() {
    proptest!(config(24, 72), |(mut study in limited(), a_s in -12.0..12.0, a_z in -8.0..8.0)| {
        study.cases = vec![LoadCase { attitude: study.cases[0].attitude, ..held(a_s, a_z) }];
        compare(&study, 0, 9, &[(0, 0), (0, 5), (1, 1), (2, 7), (3, 3), (4, 8), (5, 2), (6, 5), (7, 4), (8, 6), (5, 0)])?;
    });
}

#[test]
fn the_examples_agree_at_points_of_every_grid() {
    for example in EXAMPLES {
        let study = scenario::parse(example.text.as_bytes()).unwrap();
        for case_idx in 0..study.cases.len().min(2) {
            let checked = compare(&study, case_idx, 17, &[(0, 3), (5, 11), (8, 8), (13, 16), (15, 1)]);
            checked.unwrap_or_else(|why| panic!("{}, case {case_idx}: {why}", example.file_name));
        }
    }
}

#[test]
fn coarse_maps_come_first_and_agree_with_the_whole_one() {
    let study = scenario::parse(EXAMPLES[0].text.as_bytes()).unwrap().validate().unwrap();
    let maps = std::cell::RefCell::new(Vec::new());
    let progress = Progress::default();
    let whole = analysis::fill_map(&study, 2, 12, 20, &progress, &|map| maps.borrow_mut().push(map.clone())).unwrap();
    let maps = maps.into_inner();
    assert_eq!(progress.share(), 1.0);
    assert!(maps.len() > 2, "{} maps", maps.len());
    let n_known: Vec<usize> = maps.iter().map(|map| map.points.iter().flatten().count()).collect();
    assert!(n_known.is_sorted() && n_known[0] < 20, "{n_known:?}");
    assert_eq!(maps.last(), Some(&whole));
    for map in &maps {
        for (part, all) in map.points.iter().zip(&whole.points) {
            assert!(part.is_none() || part == all, "a point changed from {part:?} to {all:?}");
        }
    }
}

#[test]
fn pictures_are_the_same_bit_for_bit_on_one_thread_and_on_several() {
    let study = scenario::parse(EXAMPLES[0].text.as_bytes()).unwrap().validate().unwrap();
    let attitude = study.study().cases[0].attitude;
    let on = |n: usize| {
        let pool = rayon::ThreadPoolBuilder::new().num_threads(n).build().unwrap();
        pool.install(|| {
            let progress = Progress::default();
            let map = analysis::fill_map(&study, 2, 9, 9, &progress, &|_| {}).unwrap();
            (map, analysis::envelope(&study, attitude, 36, &progress, &|_| {}).unwrap())
        })
    };
    assert!(on(1) == on(4), "the count of threads changed a result");
}

#[test]
fn stopped_work_gives_nothing() {
    let study = scenario::parse(EXAMPLES[0].text.as_bytes()).unwrap().validate().unwrap();
    let progress = Progress::default();
    progress.stop();
    assert_eq!(analysis::fill_map(&study, 2, 9, 9, &progress, &|_| {}), Err(NoFillMap::Stopped));
    assert_eq!(analysis::envelope(&study, study.study().cases[0].attitude, 36, &progress, &|_| {}), None);
}

#[test]
fn a_case_at_rest_has_no_map_and_says_so() {
    let mut study = scenario::parse(EXAMPLES[0].text.as_bytes()).unwrap();
    study.cases = vec![held(0.0, 0.0)];
    let valid = study.validate().unwrap();
    let map = |case_idx| analysis::fill_map(&valid, case_idx, 5, 5, &Progress::default(), &|_| {}).map(|_| ());
    assert_eq!((map(0), map(7)), (Err(NoFillMap::AtRest), Err(NoFillMap::NoCase)));
}

#[test]
fn an_empty_tank_holds_and_a_full_one_does_not_move() {
    // A box with an open top, water: at rest 100 % holds to the brim, any tilt spills it.
    let tank = crate::support::plated::Plated::tank(shapes::rectangle(2.0, 1.0)).with_mouth(2);
    let study = Study { cases: vec![held(2.0, 0.0)], ..study(tank.section(), Fill::Share(0.5)) };
    let map = analysis::fill_map(&study.validate().unwrap(), 0, 5, 5, &Progress::default(), &|_| {}).unwrap();
    let states: Vec<State> = (0..5).map(|j| map.point(0, j).unwrap().state).collect();
    assert!(states.iter().all(|s| *s == State::Holds), "empty: {states:?}");
    let states: Vec<State> = (0..5).map(|j| map.point(4, j).unwrap().state).collect();
    assert!(states.iter().all(|s| *s == State::Fails), "full: {states:?}");
    // Half full, 2 m long, 0.5 m of freeboard: it spills at a slope of 1/2, so at g / 2.
    let j = 2;
    let used = map.point(2, j).unwrap().utilisation.unwrap();
    let want = map.accels_m_per_s2[j] / (0.5 * GRAVITY);
    assert!((used - want).abs() < 1e-12 * want, "got {used}, expected {want} from the textbook slope a / g");
}
