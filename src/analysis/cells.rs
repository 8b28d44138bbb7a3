//! The cells and compartments of the section: what they hold at rest.

use crate::geom::{Basins, Vec2};
use crate::statics::{Bound, Ramp, Settled, cell_volumes};
use crate::study::ValidStudy;

use super::results::{Cell, Compartment, Trapped};
use super::ways;

/// Every cell, from left to right and then upward, with what it holds standing level and at rest.
pub(super) fn still(study: &ValidStudy) -> Vec<Cell> {
    let width = &study.study().section.width;
    let still = at_rest(study, Vec2::y());
    let cut = study.region().cells();
    let plain = crate::section::WidthLaw::Constant { width_m: 1.0 };
    (0..cut.n_parts())
        .map(|part| {
            let (edges, _) = cut.edges_of(part);
            let volume = |depth| {
                let basins = Basins::new(&edges, Vec2::y(), depth, &|_| false);
                let roots = basins.all().iter().filter(|b| b.parent.is_none());
                roots.map(|b| b.volume_at_top).sum::<f64>()
            };
            let inside = cut.inside(part);
            Cell {
                name: format!("cell {}", part + 1),
                inside,
                compartment: study.region().open().part_at(inside).unwrap_or_default(),
                area_m2: volume(&plain),
                capacity_m3: volume(width),
                still_m3: still[part],
            }
        })
        .collect()
}

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
    let bodies = cell_volumes(study.region(), &study.study().section.width, &look, &holder.still(&look));
    (0..study.region().cells().n_parts()).map(|cell| bodies.iter().map(|body| body[cell]).sum()).collect()
}
