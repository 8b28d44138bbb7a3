//! The cells of the section: what they hold when still.

use crate::geom::Vec2;
use crate::plates::{Cell, cells};
use crate::statics::{Bound, cell_levels, cell_volumes};
use crate::study::ValidStudy;

use super::ways;

/// Every cell, with what it holds standing level and at rest.
pub(super) fn still(study: &ValidStudy) -> Vec<Cell> {
    let width = &study.study().section.width;
    let holder = ways::holder(study, Bound::Settled);
    let look = holder.look(Vec2::y());
    let (region, bodies) = (study.region(), holder.still(&look));
    let still_m3 = cell_volumes(region, width, &look, &bodies);
    let still_z_m = cell_levels(region, width, &look, &bodies);
    cells(region, width, &still_m3, &still_z_m)
}
