//! One load case under one bound, with all that is needed to judge it; and the judging.

use crate::cases::LoadCase;
use crate::criteria::{self, Context, Outcome, RestsOn, View};
use crate::plates::{Bearer, PlateResult};
use crate::statics::{Rims, Route};
use crate::study::ValidStudy;

use super::results::Settled;
use super::rims;
use super::ways::{self, Course};

/// What all load cases of a study share.
#[derive(Clone, Copy)]
pub(super) struct Ground<'a> {
    pub study: &'a ValidStudy,
    pub still: StillSurface,
    /// Its plates, ready to be loaded; none where nobody asks what they bear.
    pub bearers: &'a [Bearer<'a>],
}

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
    /// What each plate bears.
    pub plates: Vec<PlateResult>,
    /// Why nothing can be judged.
    pub blocked: Option<String>,
    /// The rims carried on; none where effective gravity does not point toward the floor, or where nobody asks.
    pub rims: Option<Rims>,
    /// For each mouth, z of the settled surface above its brim in them, m.
    pub risen_z_m: Vec<Option<f64>>,
    /// How the liquid comes to the case.
    pub route: Route,
}

impl Sight {
    /// As the course of the case leads to it.
    pub fn of_course(ground: &Ground, course: &Course, bound_idx: usize) -> Sight {
        let study = ground.study;
        let (bound, width) = (ways::bounds(study)[bound_idx], &study.study().section.width);
        let settled = super::settle_case(study, &ways::holder(study, bound), course, bound_idx, true);
        let route = super::route(course, bound_idx);
        let rims = course.gravity.up.and_then(|up| Rims::new(study.region(), bound, width, study.mouths(), up));
        let risen_z_m = rims.as_ref().map_or(Vec::new(), |rims| rims::risen_z_m(study, rims, route));
        Sight { rims, risen_z_m, route, ..Sight::without_rims(ground, course, bound_idx, settled) }
    }

    /// Without what freeboard needs.
    pub fn without_rims(
        ground: &Ground,
        course: &Course,
        bound_idx: usize,
        settled: Result<Settled, String>,
    ) -> Sight {
        let study = ground.study;
        let plates = super::borne(ground.bearers, ways::bounds(study)[bound_idx], &settled);
        let blocked = super::blocked(study, &course.gravity, settled.as_ref().ok(), ground.still.length_m);
        Sight { settled, plates, blocked, rims: None, risen_z_m: Vec::new(), route: Route::One }
    }
}

/// A load case under every bound of the study.
pub(super) struct Sighted<'a> {
    pub ground: &'a Ground<'a>,
    pub case: &'a LoadCase,
    pub course: &'a Course,
    pub sights: &'a [Sight],
}

impl Sighted<'_> {
    /// Judges it. `holds_m3` works out the largest common fill that holds under a bound, m3.
    pub fn judge(&self, holds_m3: &dyn Fn(usize) -> Option<f64>) -> Outcome {
        self.with_context(holds_m3, false, criteria::judge)
    }

    /// States, demands and limits of the criteria that are wanted.
    pub fn judge_briefly(&self, is_wanted: impl Fn(RestsOn) -> bool) -> Outcome {
        let holds_m3 = |b: usize| super::holds(self.ground.study, self.course, b, &self.sights[b].blocked);
        self.with_context(&holds_m3, true, |context| criteria::judge_those(context, is_wanted))
    }

    fn with_context(
        &self,
        holds_m3: &dyn Fn(usize) -> Option<f64>,
        is_brief: bool,
        judge: impl FnOnce(&Context) -> Outcome,
    ) -> Outcome {
        let study = self.ground.study;
        let bounds = ways::bounds(study);
        let holds_under: Vec<_> = (0..bounds.len()).map(|b| move || holds_m3(b)).collect();
        let views = self.sights.iter().enumerate().map(|(b, sight)| View {
            bound: bounds[b],
            way: self.course.ways[b].as_ref(),
            holds_m3: &holds_under[b],
            settled: sight.settled.as_ref().map_err(String::as_str),
            plates: &sight.plates,
            rims: sight.rims.as_ref(),
            route: sight.route,
            risen_z_m: &sight.risen_z_m,
            blocked: sight.blocked.clone(),
        });
        judge(&Context {
            study,
            case: self.case,
            accel: self.course.accel,
            gravity: self.course.gravity,
            still_z_m: self.ground.still.z_m,
            views: views.collect(),
            is_brief,
        })
    }
}
