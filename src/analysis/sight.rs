//! One load case under one bound, with all that is needed to judge it; and the judging.

use crate::cases::LoadCase;
use crate::criteria::{self, Context, Outcome, RestsOn, View};
use crate::statics::{Rims, Route};
use crate::study::ValidStudy;

use super::results::Settled;
use super::rims;
use super::ways::{self, Course};

/// The tank standing level and at rest.
#[derive(Clone, Copy, Debug)]
pub(super) struct StillSurface {
    /// z of the surface, m.
    pub z_m: f64,
    /// Its length over all pieces, m.
    pub length_m: f64,
}

impl StillSurface {
    pub fn of(study: &ValidStudy) -> StillSurface {
        let surface = super::surface_at_rest(study);
        StillSurface { z_m: super::still_level_m(study), length_m: super::length_m(surface.iter()) }
    }
}

/// A load case under one bound.
pub(super) struct Sight {
    /// The settled state, or why there is none.
    pub settled: Result<Settled, String>,
    /// The rims carried on; none where effective gravity does not point toward the floor.
    pub rims: Option<Rims>,
    /// For each mouth, z of the settled surface above its brim in them, m.
    pub risen_z_m: Vec<Option<f64>>,
    /// How the liquid comes to the case.
    pub route: Route,
    /// Why nothing can be judged.
    pub blocked: Option<String>,
}

impl Sight {
    /// As the course of the case leads to it.
    pub fn of_course(study: &ValidStudy, course: &Course, bound_idx: usize, still: StillSurface) -> Sight {
        let (bound, width) = (ways::bounds(study)[bound_idx], &study.study().section.width);
        let settled = super::settle_case(study, &ways::holder(study, bound), course, bound_idx, true);
        let route = super::route(course, bound_idx);
        let rims = course.gravity.up.and_then(|up| Rims::new(study.region(), bound, width, study.mouths(), up));
        let risen_z_m = rims.as_ref().map_or(Vec::new(), |rims| rims::risen_z_m(study, rims, route));
        Sight::new(study, course, still, settled, rims, risen_z_m, route)
    }

    pub fn new(
        study: &ValidStudy,
        course: &Course,
        still: StillSurface,
        settled: Result<Settled, String>,
        rims: Option<Rims>,
        risen_z_m: Vec<Option<f64>>,
        route: Route,
    ) -> Sight {
        let blocked = super::blocked(study, &course.gravity, settled.as_ref().ok(), still.length_m);
        Sight { settled, rims, risen_z_m, route, blocked }
    }
}

/// A load case under every bound of the study.
pub(super) struct Sighted<'a> {
    pub study: &'a ValidStudy,
    pub case: &'a LoadCase,
    pub course: &'a Course,
    pub still: StillSurface,
    pub sights: &'a [Sight],
}

impl Sighted<'_> {
    /// Judges it. `holds_m3` works out the largest common fill that holds under a bound, m3.
    pub fn judge(&self, holds_m3: &dyn Fn(usize) -> Option<f64>) -> Outcome {
        self.with_context(holds_m3, false, criteria::judge)
    }

    /// States, demands and limits of the criteria that are wanted.
    pub fn judge_briefly(&self, is_wanted: impl Fn(RestsOn) -> bool) -> Outcome {
        let holds_m3 = |b: usize| super::holds(self.study, self.course, b, &self.sights[b].blocked);
        self.with_context(&holds_m3, true, |context| criteria::judge_those(context, is_wanted))
    }

    fn with_context(
        &self,
        holds_m3: &dyn Fn(usize) -> Option<f64>,
        is_brief: bool,
        judge: impl FnOnce(&Context) -> Outcome,
    ) -> Outcome {
        let bounds = ways::bounds(self.study);
        let holds_under: Vec<_> = (0..bounds.len()).map(|b| move || holds_m3(b)).collect();
        let views = self.sights.iter().enumerate().map(|(b, sight)| View {
            bound: bounds[b],
            way: self.course.ways[b].as_ref(),
            holds_m3: &holds_under[b],
            settled: sight.settled.as_ref().map_err(String::as_str),
            rims: sight.rims.as_ref(),
            route: sight.route,
            risen_z_m: sight.risen_z_m.clone(),
            blocked: sight.blocked.clone(),
        });
        judge(&Context {
            study: self.study,
            case: self.case,
            accel: self.course.accel,
            gravity: self.course.gravity,
            still_z_m: self.still.z_m,
            views: views.collect(),
            is_brief,
        })
    }
}
