//! The cells of the section: what they hold when still.

use crate::geom::{Basins, Vec2};
use crate::statics::{Bound, cell_volumes};
use crate::study::ValidStudy;

use super::results::Cell;
use super::ways;

/// Every cell, from left to right and then upward, with what it holds standing level and at rest.
pub(super) fn still(study: &ValidStudy) -> Vec<Cell> {
    let width = &study.study().section.width;
    let holder = ways::holder(study, Bound::Settled);
    let look = holder.look(Vec2::y());
    let still = cell_volumes(study.region(), width, &look, &holder.still(&look));
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
