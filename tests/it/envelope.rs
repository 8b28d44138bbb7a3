//! The hold envelope against whole judgements of load cases on both sides of it, and against closed forms.

use std::f64::consts::TAU;

use brimwright::analysis::{self, CaseResult, End, Envelope, Holding, State};
use brimwright::app::EXAMPLES;
use brimwright::cases::Attitude;
use brimwright::geom::Vec2;
use brimwright::progress::Progress;
use brimwright::scenario;
use brimwright::study::{Fill, Limit, Study};
use proptest::prelude::*;

use crate::support::limited::{limited, record};
use crate::support::plated::Plated;
use crate::support::random::config;
use crate::support::*;

/// The worst state of a case.
fn state(case: &CaseResult) -> State {
    case.worst().map_or(State::NotJudged, |v| v.state)
}

fn holds(state: State) -> bool {
    matches!(state, State::Holds | State::Close)
}

#[test]
fn a_case_inside_holds_and_one_outside_does_not() {
    let directions = proptest::collection::vec((0.0..TAU, 0.02..0.98), 4);
    proptest!(config(24, 71), |(study in limited(), directions in directions)| {
        let Ok(valid) = study.validate() else { return Ok(()) };
        let attitude = study.cases[0].attitude;
        let progress = Progress::default();
        let holding = Holding::new(&valid, attitude, 30.0, &progress).unwrap();
        for (angle, share) in directions {
            let direction = Vec2::new(angle.cos(), angle.sin());
            let limit = holding.limit(direction);
            let at = |accel: f64| {
                let a = direction * accel;
                let mut case = held(a.x, a.y);
                case.attitude = attitude;
                judge_case(&study, case)
            };
            let words = |accel: f64, case: &CaseResult| format!(
                "{direction:?}: at {accel} m/s2, limit {} by {:?}, spill {:?}, rest {:?}: {:?}\n{study:#?}",
                limit.accel_m_per_s2, limit.end, limit.spill_m_per_s2, holding.at_rest(),
                case.verdicts.iter().map(|v| (v.criterion, v.state, v.utilisation, v.bound, &v.remark)).collect::<Vec<_>>(),
            );
            if limit.accel_m_per_s2 > 0.0 {
                for share in [share, 1.0 - 1e-6] {
                    let accel = share * limit.accel_m_per_s2;
                    let case = at(accel);
                    prop_assert!(holds(state(&case)), "should hold: {}", words(accel, &case));
                }
            }
            let accel = limit.accel_m_per_s2 * (1.0 + 1e-6) + 1e-6;
            let case = at(accel);
            match &limit.end {
                End::Beyond => {}
                End::NotJudged { .. } => {
                    prop_assert!(!holds(state(&case)), "should not be judged: {}", words(accel, &case));
                }
                End::Fails { criterion, .. } => {
                    let fails = case.verdicts.iter().any(|v| v.criterion == *criterion && v.state == State::Fails);
                    prop_assert!(fails, "{criterion} should fail: {}", words(accel, &case));
                }
            }
        }
    });
}

/// An open box, 2 m long and 1 m high, half full.
fn open_box() -> Study {
    study(Plated::tank(shapes::rectangle(2.0, 1.0)).with_mouth(2).section(), Fill::Share(0.5))
}

fn envelope_of(study: &Study, n_directions: usize) -> Envelope {
    let valid = study.validate().unwrap_or_else(|problems| panic!("{problems:?}"));
    analysis::envelope(&valid, study.cases[0].attitude, n_directions, &Progress::default(), &|_| {}).unwrap()
}

#[test]
fn an_open_box_spills_where_the_textbook_slope_reaches_its_rim() {
    // dz/ds = -a_s / (g + a_z) (White, Fluid Mechanics, ch. 2): half a metre over a metre on either side, so on the
    // lines |a_s| = (g + a_z) / 2. Sideways g / 2; straight up never; straight down free fall.
    let envelope = envelope_of(&open_box(), 360);
    assert_eq!((&envelope.at_rest, &envelope.always), (&None, &None));
    for limit in &envelope.limits {
        let (d_s, d_z) = (limit.direction.x, limit.direction.y);
        // On the line: x |d_s| = (g + x d_z) / 2.
        let slope = d_s.abs() - 0.5 * d_z;
        let want = if slope > 0.0 { 0.5 * GRAVITY / slope } else { f64::INFINITY };
        let word = limit.end.word();
        if d_s.abs() < 1e-12 && d_z < 0.0 {
            assert_eq!(word, "not judged", "free fall: {limit:?}");
            assert!((limit.accel_m_per_s2 - GRAVITY).abs() < 1e-2, "capillarity rules just before: {limit:?}");
        } else if want < envelope.most_m_per_s2 {
            let near = 1e-11 * want;
            assert!(
                (limit.accel_m_per_s2 - want).abs() <= near,
                "got {limit:?}, expected {want}, tolerance {near:e}"
            );
            // With walls carried on, freeboard ends at the same place.
            assert!(word == "Contained" || word == "Freeboard", "{limit:?}");
            let spill = limit.spill_m_per_s2.unwrap();
            assert!((spill - want).abs() <= near, "got {spill}, expected {want}, tolerance {near:e}");
        } else {
            assert_eq!((word, limit.accel_m_per_s2), ("beyond", envelope.most_m_per_s2), "{limit:?}");
        }
    }
}

#[test]
fn pressure_ends_where_the_formula_says() {
    // Held straight up the surface stays level: p = rho (g + a) depth, with depth 0.5 m. Lengthwise, before it spills,
    // the deepest corner is 0.5 + a / g deep along z: p = rho (0.5 g + a). Own derivation.
    let limit_pa = 6000.0;
    let study = Study { records: vec![record(Limit::WallPressure(limit_pa))], ..open_box() };
    let valid = study.validate().unwrap();
    let progress = Progress::default();
    let holding = Holding::new(&valid, Attitude::Level, 30.0, &progress).unwrap();
    for (direction, want) in [
        (Vec2::new(0.0, 1.0), limit_pa / (WATER * 0.5) - GRAVITY),
        (Vec2::new(1.0, 0.0), limit_pa / WATER - 0.5 * GRAVITY),
        (Vec2::new(-1.0, 0.0), limit_pa / WATER - 0.5 * GRAVITY),
    ] {
        let limit = holding.limit(direction);
        assert_eq!(limit.end.word(), "Pressure", "{limit:?}");
        let (got, near) = (limit.accel_m_per_s2, 1e-8 * want);
        assert!((got - want).abs() < near, "{direction:?}: got {got}, expected {want}, tolerance {near:e}");
    }
}

#[test]
fn a_tank_that_fails_at_rest_has_no_inside_and_says_what_fails() {
    let study = Study { records: vec![record(Limit::WallPressure(1000.0))], ..open_box() };
    let envelope = envelope_of(&study, 12);
    assert_eq!(envelope.at_rest.as_ref().map(End::word), Some("Pressure"));
    assert!(envelope.limits.iter().all(|limit| limit.accel_m_per_s2 == 0.0));
}

#[test]
fn what_fails_in_every_case_is_said_beside_the_curve() {
    let mut study = open_box();
    study.liquid.vapour_pressure_abs_pa = Some(150_000.0);
    let envelope = envelope_of(&study, 12);
    assert_eq!(envelope.always.as_ref().map(End::word), Some("Vapour pressure"));
    assert!(envelope.limits.iter().all(|limit| limit.accel_m_per_s2 > 0.0), "the curve shows what else there is");
}

#[test]
fn every_case_of_the_examples_is_on_the_side_of_the_curve_that_its_verdicts_say() {
    for example in EXAMPLES {
        let study = scenario::parse(example.text.as_bytes()).unwrap();
        let results = judge(&study);
        let valid = study.validate().unwrap();
        let progress = Progress::default();
        for (case, result) in study.cases.iter().zip(&results.cases) {
            let size = result.accel.norm();
            if size == 0.0 {
                continue;
            }
            let holding = Holding::new(&valid, case.attitude, 2.0 * size, &progress).unwrap();
            let limit = holding.limit(result.accel / size);
            let is_inside = size <= limit.accel_m_per_s2 && holding.always().is_none();
            // Nothing fails before the first failure along a direction.
            let words = format!("{}, {}: {size} m/s2, {limit:?}", example.file_name, case.name);
            assert!(!is_inside || holds(state(result)), "{words}: {:?}", state(result));
            // The liquid that an example spills once does not come back, and pressure grows with the acceleration.
            assert!(is_inside || !holds(state(result)), "{words}: {:?}", state(result));
        }
    }
}

#[test]
fn coarse_directions_come_first_and_stay() {
    let study = scenario::parse(EXAMPLES[0].text.as_bytes()).unwrap().validate().unwrap();
    let partial = std::cell::RefCell::new(Vec::new());
    let attitude = study.study().cases[0].attitude;
    let sink = |envelope: &Envelope| partial.borrow_mut().push(envelope.clone());
    let whole = analysis::envelope(&study, attitude, 40, &Progress::default(), &sink).unwrap();
    let partial = partial.into_inner();
    assert_eq!((partial.len(), partial[0].limits.len(), whole.limits.len()), (1, 5, 41));
    for limit in &partial[0].limits {
        assert!(whole.limits.contains(limit), "{limit:?} is gone");
    }
}
