//! The hold envelope against whole judgements of load cases on both sides of it, and against closed forms.

use std::f64::consts::TAU;

use brimwright::analysis::{CaseResult, End, Holding, State};
use brimwright::cases::Attitude;
use brimwright::geom::Vec2;
use brimwright::progress::Progress;
use brimwright::section::{Opening, OpeningShape};
use brimwright::study::{Fill, Limit, Record, Study};
use proptest::prelude::*;

use crate::support::plated::plated;
use crate::support::random::config;
use crate::support::*;

fn record(limit: Limit) -> Record {
    Record {
        title: format!("{limit:?}"),
        limit,
        clause: String::new(),
        edition: String::new(),
        origin: String::new(),
        confirmed: true,
    }
}

/// A random study with plates, some of them with an opening, and with a limit for everything.
fn limited() -> impl Strategy<Value = Study> {
    let limits = (0.5..4.0, 0.05..1.0, 0.0..0.1);
    let opening = proptest::option::weighted(0.3, 0.1..0.4);
    (plated(), 0.05..0.95, -0.3..0.3, limits, opening).prop_map(
        |(plated, share, heel, (wall, roof, allowance), open)| {
            let mut study = study(plated.section(), Fill::Share(share));
            let size = plated.area().sqrt();
            let weight = WATER * GRAVITY * size;
            let heel = if heel < 0.0 { Attitude::Level } else { Attitude::HeelDeg(30.0 * heel - 5.0) };
            study.cases[0].attitude = heel;
            study.records = vec![
                record(Limit::WallPressure(wall * weight)),
                record(Limit::RoofPressure(roof * weight)),
                record(Limit::FreeboardAllowance(allowance * size)),
            ];
            study.liquid.vapour_pressure_abs_pa = Some(2339.0);
            if let (Some(share), Some(plate)) = (open, study.section.plates.first_mut()) {
                let length = plate.length_m();
                plate.openings = vec![Opening {
                    name: String::new(),
                    from_m: 0.3 * length,
                    to_m: (0.3 + share) * length,
                    shape: OpeningShape::Share(1.0),
                }];
            }
            study
        },
    )
}

/// The worst state of a case.
fn state(case: &CaseResult) -> State {
    case.worst().map_or(State::NotJudged, |v| v.state)
}

fn holds(state: State) -> bool {
    matches!(state, State::Holds | State::Close)
}

#[test]
fn a_case_inside_holds_and_one_outside_does_not() {
    let directions = proptest::collection::vec((0.0..TAU, 0.02..0.98), 6);
    proptest!(config(60, 71), |(study in limited(), directions in directions)| {
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
                case.verdicts.iter().map(|v| (v.criterion, v.state, v.utilisation, v.bound)).collect::<Vec<_>>(),
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
