//! The cells of the section: what they hold when still.

use crate::geom::Vec2;
use crate::plates::{Cell, cells};
use crate::statics::{Bound, cell_volumes};
use crate::study::ValidStudy;

use super::ways;

/// Every cell, with what it holds standing level and at rest.
pub(super) fn still(study: &ValidStudy) -> Vec<Cell> {
    let width = &study.study().section.width;
    let holder = ways::holder(study, Bound::Settled);
    let look = holder.look(Vec2::y());
    cells(study.region(), width, &cell_volumes(study.region(), width, &look, &holder.still(&look)))
}
