//! Rims carried on for many directions of one turn, and how high the liquid would stand at the mouths.

use std::sync::Arc;

use crate::geom::Vec2;
use crate::statics::{Bound, Carried, CarriedOn, Followed, Rims, Route, Turn};
use crate::study::ValidStudy;

/// Where effective gravity leans more than this from the tank's z, as a cosine, rims are carried on for it alone: walls high
/// enough for it would cost the others their figures.
const STEEPEST_COSINE: f64 = 0.01;

/// Rims carried on under one bound, once for all directions that do not lean too far.
pub(super) struct SharedRims {
    bound: Bound,
    on: Option<Arc<CarriedOn>>,
    /// Cosine of the direction that leans most.
    least_y: f64,
}

impl SharedRims {
    /// For all of `ups` that do not lean too far.
    pub fn new(study: &ValidStudy, bound: Bound, ups: impl Iterator<Item = Vec2>) -> SharedRims {
        let steepest = ups.filter(|up| up.y > STEEPEST_COSINE).min_by(|a, b| a.y.total_cmp(&b.y));
        let width = &study.study().section.width;
        let on = steepest.and_then(|up| CarriedOn::new(study.region(), bound, width, study.mouths(), up));
        SharedRims { bound, on: on.map(Arc::new), least_y: steepest.map_or(f64::INFINITY, |up| up.y) }
    }

    /// The rims seen along `up`; none where effective gravity does not point toward the floor.
    pub fn seen(&self, study: &ValidStudy, up: Vec2) -> Option<Rims> {
        match &self.on {
            Some(on) if up.y >= self.least_y => Some(Rims::seen(on, study.region(), study.mouths(), up)),
            _ => Rims::new(study.region(), self.bound, &study.study().section.width, study.mouths(), up),
        }
    }

    /// The liquid of `study` followed in them along `turn` to each of `at`, as far as they are high enough.
    pub fn followed<'a>(&'a self, study: &'a ValidStudy, turn: Turn, at: &[f64]) -> Option<Followed<'a>> {
        let on = self.on.as_ref()?;
        let n = at.iter().take_while(|t| turn.up(**t).y >= self.least_y).count();
        let holder = on.holder(study.region(), &study.study().section.width, study.starts());
        Some(Followed::new(holder, turn, &at[..n]))
    }
}

/// z of the settled surface above the brim of each mouth whose walls are carried on, m, each followed by itself.
pub(super) fn risen_z_m(study: &ValidStudy, rims: &Rims, route: Route) -> Vec<Option<f64>> {
    let (tilted, width) = (rims.tilted(), &study.study().section.width);
    over_mouths(rims, |mouth_idx| rims.surface_z_m(&tilted, study.region(), width, study.starts(), route, mouth_idx))
}

/// The same from a way that was followed in the same walls for all.
pub(super) fn risen_z_m_on(followed: &Followed, rims: &Rims, turned: f64) -> Vec<Option<f64>> {
    let Some(stop) = followed.at(turned) else { return vec![None; rims.carried().len()] };
    let look = followed.holder.look(stop.up);
    over_mouths(rims, |mouth_idx| rims.surface_z_m_of(&look, &stop.bodies, mouth_idx))
}

fn over_mouths(rims: &Rims, z_m: impl Fn(usize) -> Option<f64>) -> Vec<Option<f64>> {
    let carried = rims.carried().iter().enumerate();
    carried.map(|(i, carried)| if *carried == Carried::On { z_m(i) } else { None }).collect()
}
