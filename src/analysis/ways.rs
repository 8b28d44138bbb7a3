//! The ways from rest to every load case, under both bounds. Cases that turn effective gravity the same way from the
//! same start are followed in one go.

use rayon::prelude::*;

use crate::cases::LoadCase;
use crate::geom::Vec2;
use crate::statics::{
    Bound, EffectiveGravity, Holder, LONGEST_STEP, PourOver, Ramp, Trace, effective_gravity, highest_fill, pour_over,
    trace,
};
use crate::study::ValidStudy;

/// One load case before anything is judged.
pub(super) struct Course {
    pub accel: Vec2,
    pub gravity: EffectiveGravity,
    /// None where the way leads through free fall.
    pub ramp: Option<Ramp>,
    /// One for each bound of the study; none where there is no ramp.
    pub ways: Vec<Option<PourOver>>,
}

/// The bounds that differ: settled alone where no plate has an opening.
pub(super) fn bounds(study: &ValidStudy) -> &'static [Bound] {
    let has_openings = study.study().section.plates.iter().any(|p| !p.openings.is_empty());
    if has_openings { &[Bound::Settled, Bound::Sealed] } else { &[Bound::Settled] }
}

/// What holds the study's liquid under a bound.
pub(super) fn holder(study: &ValidStudy, bound: Bound) -> Holder<'_> {
    Holder::new(study.region(), bound.cut(study.region()), &study.study().section.width, study.starts())
}

/// Effective gravity and ramp of a load case.
pub(super) fn start_of(study: &ValidStudy, case: &LoadCase) -> Course {
    let g = study.study().gravity_m_per_s2;
    let accel = case.accel.to_m_per_s2(g);
    let phi = case.attitude.angle_rad();
    let gravity = effective_gravity(g, phi, accel);
    let is_turn = accel.norm() == 0.0 && phi != 0.0;
    let at_rest = effective_gravity(g, phi, Vec2::zeros()).vec;
    let ramp = if is_turn { Some(Ramp::turn(phi)) } else { Ramp::accelerate(at_rest, accel) };
    Course { accel, gravity, ramp, ways: Vec::new() }
}

/// The ways of all load cases.
pub(super) fn courses(study: &ValidStudy) -> Vec<Course> {
    let mut courses: Vec<Course> = study.study().cases.iter().map(|case| start_of(study, case)).collect();
    let mut groups: Vec<Vec<usize>> = Vec::new();
    for (i, course) in courses.iter().enumerate() {
        let Some(ramp) = course.ramp else { continue };
        let same = |group: &&mut Vec<usize>| {
            courses[group[0]].ramp.is_some_and(|first| first.direction() == ramp.direction())
        };
        match groups.iter_mut().find(same) {
            Some(group) => group.push(i),
            None => groups.push(vec![i]),
        }
    }
    let bounds = bounds(study);
    let jobs: Vec<(usize, &Vec<usize>)> =
        (0..bounds.len()).flat_map(|b| groups.iter().map(move |g| (b, g))).collect();
    let done: Vec<(usize, &Vec<usize>, Vec<PourOver>)> = jobs
        .into_par_iter()
        .map(|(b, group)| {
            let ramps: Vec<Ramp> = group.iter().filter_map(|&i| courses[i].ramp).collect();
            (b, group, pour_over(&holder(study, bounds[b]), study.mouths(), &ramps))
        })
        .collect();
    let mut ways: Vec<Vec<Option<PourOver>>> = courses.iter().map(|_| vec![None; bounds.len()]).collect();
    for (b, group, overs) in done {
        for (&i, over) in group.iter().zip(overs) {
            ways[i][b] = Some(over);
        }
    }
    for (course, ways) in courses.iter_mut().zip(ways) {
        course.ways = ways;
    }
    courses
}

/// The way back to rest from a case under a bound.
pub(super) fn release(study: &ValidStudy, course: &Course, bound_idx: usize) -> Option<Trace> {
    let (ramp, way) = (course.ramp?, course.ways.get(bound_idx)?.as_ref()?);
    let holder = holder(study, bounds(study)[bound_idx]);
    let back = ramp.direction().back_from(ramp.to_case_rad());
    let turned = ramp.to_case_rad();
    Some(trace(&holder, back, way.stop.as_ref(), &[turned], turned, LONGEST_STEP))
}

/// The largest volume of the common fill that leaves no mouth on the way to a case, where several bodies were on it, m3.
pub(super) fn highest(study: &ValidStudy, ramp: &Ramp, bound: Bound) -> f64 {
    let turned = ramp.to_case_rad();
    let room = |starts: &[crate::statics::Start]| {
        let cut = bound.cut(study.region());
        let holder = Holder::new(study.region(), cut, &study.study().section.width, starts);
        let trace = trace(&holder, ramp.direction(), None, &[turned], turned, LONGEST_STEP);
        trace.stops.first().map_or(f64::NEG_INFINITY, |s| s.room_m3)
    };
    highest_fill(&room, study.starts())
}
