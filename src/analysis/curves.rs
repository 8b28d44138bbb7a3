//! The curves of one load case, for the plots.

use crate::criteria::FreeboardFill;
use crate::geom::Vec2;
use crate::progress::Progress;
use crate::section::{Face, Wall};
use crate::statics::{Carried, Rims, effective_gravity, pressure_at};
use crate::study::ValidStudy;

use super::results::*;

/// The quick curves of one load case, for the plots. Empty where the case index is out of range.
pub fn curves(study: &ValidStudy, results: &Results, case_idx: usize) -> Curves {
    let Some(result) = results.cases.get(case_idx) else { return Curves::default() };
    Curves { tilt: tilt_curve(study, results, case_idx), wall: wall_curve(study, results, result) }
}

fn tilt_curve(study: &ValidStudy, results: &Results, case_idx: usize) -> TiltCurve {
    const N_POINTS: i32 = 96;
    let inputs = study.study();
    let g = inputs.gravity_m_per_s2;
    let accel = results.cases[case_idx].accel;
    let mut along = if accel.norm() > 0.0 { accel.normalize() } else { Vec2::x() };
    // Signed so that the axis reads like the component it follows.
    if along.x < -1e-9 || (along.x.abs() <= 1e-9 && along.y < 0.0) {
        along = -along;
    }
    let axis_words = if along.x > 0.999 {
        "along s"
    } else if along.y.abs() > 0.999 {
        "along z"
    } else {
        "along the case"
    };
    let attitude = inputs.cases[case_idx].attitude;
    let tilt_at = |x: f64| effective_gravity(g, attitude.angle_rad(), along * x).tilt_rad;
    let is_along = |v: Vec2| (v - along * v.dot(&along)).norm() <= 1e-9 * (g + v.norm());
    let signed = |v: Vec2| v.dot(&along);
    let mut others = Vec::new();
    let mut reach = 0.6 * g;
    for (i, case) in results.cases.iter().enumerate() {
        if inputs.cases[i].attitude == attitude && is_along(case.accel) {
            reach = reach.max(1.25 * case.accel.norm());
            if let (true, Some(tilt)) = (i != case_idx, case.gravity.tilt_rad) {
                others.push((i, [signed(case.accel), tilt]));
            }
        }
    }
    let points = (-N_POINTS / 2..=N_POINTS / 2)
        .filter_map(|i| {
            let x = reach * f64::from(2 * i) / f64::from(N_POINTS);
            tilt_at(x).map(|tilt| [x, tilt])
        })
        .collect();
    let contained = results.cases[case_idx].verdicts.iter().find(|v| v.criterion == CONTAINED);
    let spills_at = contained
        .filter(|v| v.demand.is_some_and(|d| d.quantity == crate::units::Quantity::Acceleration))
        .and_then(|v| v.limit)
        .map(|limit| limit.si * signed(accel).signum())
        .filter(|x| x.abs() <= reach);
    let now = results.cases[case_idx].gravity.tilt_rad.map(|tilt| [signed(accel), tilt]);
    TiltCurve { points, now, others, spills_at, axis_words }
}

fn wall_curve(study: &ValidStudy, results: &Results, result: &CaseResult) -> WallCurve {
    let inputs = study.study();
    let gas = inputs.ullage_gage_pa;
    let section = &inputs.section;
    let mut curve = WallCurve::default();
    let rest_weight = inputs.liquid.weight_pa_per_m(inputs.gravity_m_per_s2);
    let now = result.gravity.up.zip(result.settled.as_ref().ok());
    let mut length = 0.0;
    for (i, edge) in section.edges().iter().enumerate() {
        curve.edges.push((length, section.edge_label(i)));
        let n = if edge.is_arc() { 24 } else { 1 };
        let along = |t: f64| length + t * edge.length();
        let mut stops: Vec<f64> = (0..=n).map(|k| f64::from(k) / f64::from(n)).collect();
        stops.extend(edge.crossings(Vec2::y(), results.still.level_z_m));
        for &t in sorted(&mut stops) {
            let liquid = pressure_at(edge.point_at(t), results.still.level_z_m, Vec2::y(), rest_weight).max(0.0);
            curve.at_rest.push([along(t), gas + liquid]);
        }
        let Some((up, settled)) = now else { continue };
        let own = |face: &&Face| matches!(face.wall, Wall::Outline { edge_idx, .. } if edge_idx == i);
        let wet: Vec<(f64, f64, &Pool)> = settled
            .pools
            .iter()
            .flat_map(|pool| pool.wetted.iter().filter(own).map(move |face| (face, pool)))
            .map(|(face, pool)| {
                let (a, b) = (edge.nearest(face.edge.start).0, edge.nearest(face.edge.end).0);
                (a.min(b), a.max(b), pool)
            })
            .collect();
        stops.extend(wet.iter().flat_map(|w| [w.0, w.1]));
        for &t in sorted(&mut stops) {
            let p = edge.point_at(t);
            let liquid = wet
                .iter()
                .filter(|w| w.0 <= t && t <= w.1)
                .map(|w| pressure_at(p, w.2.level_m, up, w.2.weight_pa_per_m))
                .fold(0.0, f64::max);
            curve.points.push([along(t), gas + liquid]);
        }
        length += edge.length();
    }
    curve.peak = curve.points.iter().copied().max_by(|a, b| a[1].total_cmp(&b[1]));
    curve
}

fn sorted(stops: &mut [f64]) -> &[f64] {
    stops.sort_unstable_by(f64::total_cmp);
    stops
}

/// Required and available freeboard of one load case against fill. Quick where the liquid stays in one pool; else each
/// point follows it over sills. None where it was asked to end.
pub fn freeboard_curve(study: &ValidStudy, result: &CaseResult, progress: &Progress) -> Option<FreeboardCurve> {
    const N_POINTS: u32 = 48;
    progress.begin(N_POINTS as usize);
    let absent = |reason: String| Some(FreeboardCurve { absent: Some(reason), ..FreeboardCurve::default() });
    // Where the verdict is not judged the curve claims nothing either.
    let verdicts: Vec<&Verdict> = result.verdicts.iter().filter(|v| v.criterion == FREEBOARD).collect();
    if let (Some(first), true) = (verdicts.first(), verdicts.iter().all(|v| v.state == State::NotJudged)) {
        return absent(format!("not judged: {}", first.remark));
    }
    // Under the bound that governs.
    let governing = verdicts.first().and_then(|v| v.bound).unwrap_or(Bound::Settled);
    let (bound, route) =
        result.routes.iter().find(|r| r.0 == governing).copied().unwrap_or((Bound::Settled, Route::One));
    let width = &study.study().section.width;
    let rims = result.gravity.up.and_then(|up| Rims::new(study.region(), bound, width, study.mouths(), up));
    let (Some(rims), Some(common)) = (rims, study.common()) else {
        return absent("freeboard needs effective gravity toward the floor".to_owned());
    };
    let allowance = study.study().freeboard_allowance_m().0;
    let (volume, capacity) = (common.volume_m3, common.vessel.capacity_m3());
    let used = |i: &usize| {
        let at = FreeboardFill::new(study, &rims, route, *i, allowance).at(volume);
        at.map_or(0.0, |(required, available)| if available > 0.0 { required / available } else { f64::MAX })
    };
    let on: Vec<usize> = (0..study.mouths().len()).filter(|&i| rims.carried()[i] == Carried::On).collect();
    let Some(mouth_idx) = on.into_iter().max_by(|a, b| used(a).total_cmp(&used(b))) else {
        return absent(match study.mouths().len() {
            0 => "freeboard waits for a mouth".to_owned(),
            _ => "no mouth stands between vertical walls; Contained is judged instead".to_owned(),
        });
    };
    let fill = FreeboardFill::new(study, &rims, route, mouth_idx, allowance);
    let mut curve = FreeboardCurve { mouth: study.mouths()[mouth_idx].name.clone(), ..FreeboardCurve::default() };
    for i in 1..=N_POINTS {
        let share = f64::from(i) / f64::from(N_POINTS);
        if let Some((required, available)) = fill.at(share * capacity) {
            curve.required.push([share, required]);
            curve.available.push([share, available]);
        }
        if !progress.advance(1) {
            return None;
        }
    }
    curve.now = fill.at(volume).map(|(required, _)| [volume / capacity, required]);
    let highest = fill.highest_volume_m3(progress);
    curve.holds_to = highest.and_then(|v| fill.at(v).map(|(required, _)| [v / capacity, required]));
    (!progress.is_stopped()).then_some(curve)
}
