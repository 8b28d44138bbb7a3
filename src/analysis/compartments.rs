//! The compartments of the section, and what an event leaves trapped in its cells.

use crate::geom::Vec2;
use crate::statics::{Bound, Ramp, Settled, cell_volumes};
use crate::study::ValidStudy;

use super::results::{Compartment, Trapped};
use super::ways;

/// Every compartment, with the name that the study gives it, or `compartment 2`.
pub(super) fn compartments(study: &ValidStudy) -> Vec<Compartment> {
    let (open, own) = (study.region().open(), &study.study().compartments);
    let own_parts: Vec<Option<usize>> = own.iter().map(|c| open.part_at(c.at)).collect();
    (0..open.n_parts())
        .map(|part| {
            let own_idx = own_parts.iter().position(|p| *p == Some(part));
            let name = own_idx.map(|i| own[i].name.clone()).filter(|name| !name.is_empty());
            Compartment { name: name.unwrap_or_else(|| format!("compartment {}", part + 1)), own_idx }
        })
        .collect()
}

/// Volumes below this share of the capacity are what rounding leaves of a way there and back.
const LEAST_TRAPPED: f64 = 1e-9;

/// The cells that hold more after the release than at rest before, the tank standing as it does in the case.
pub(super) fn trapped(study: &ValidStudy, ramp: &Ramp, released: &Settled) -> Vec<Trapped> {
    let before = at_rest(study, ramp.direction().up(0.0));
    let more = released.cells_m3.iter().zip(&before).map(|(after, before)| after - before).enumerate();
    let slack = LEAST_TRAPPED * study.capacity_m3();
    more.filter(|more| more.1 > slack).map(|(cell_idx, volume_m3)| Trapped { cell_idx, volume_m3 }).collect()
}

/// What each cell holds at rest along a direction, m3.
fn at_rest(study: &ValidStudy, up: Vec2) -> Vec<f64> {
    let holder = ways::holder(study, Bound::Settled);
    let look = holder.look(up);
    cell_volumes(study.region(), &study.study().section.width, &look, &holder.still(&look))
}
