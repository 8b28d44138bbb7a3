//! How much liquid stands in each cell.

use crate::section::{Region, WidthLaw};

use super::pools::{Body, Look};

/// Volume of the bodies' liquid in each cell of the region, m3. `look` is along the bodies' direction, under any bound:
/// cells are cut finer.
pub fn cell_volumes(region: &Region, width: &WidthLaw, look: &Look, bodies: &[Body]) -> Vec<f64> {
    sums(region, &cell_volumes_by_body(region, width, look, bodies))
}

/// The highest level, along the look's direction, of the bodies that stand in each cell, m; none in a dry one.
pub fn cell_levels(region: &Region, width: &WidthLaw, look: &Look, bodies: &[Body]) -> Vec<Option<f64>> {
    let by_body = cell_volumes_by_body(region, width, look, bodies);
    let in_cell = |cell: usize| {
        let standing = bodies.iter().zip(&by_body).filter(|(_, volumes)| volumes[cell] > 0.0);
        standing.map(|(body, _)| look.level_of(body)).reduce(f64::max)
    };
    (0..region.cells().n_parts()).map(in_cell).collect()
}

/// What each cell holds of all bodies, m3.
pub(super) fn sums(region: &Region, by_body: &[Vec<f64>]) -> Vec<f64> {
    (0..region.cells().n_parts()).map(|cell| by_body.iter().map(|body| body[cell]).sum()).collect()
}

/// The same for each body by itself.
pub(super) fn cell_volumes_by_body(region: &Region, width: &WidthLaw, look: &Look, bodies: &[Body]) -> Vec<Vec<f64>> {
    let cells = region.cells();
    if cells.n_parts() == 1 {
        return bodies.iter().map(|b| vec![b.volume_m3]).collect();
    }
    let mut volumes = vec![vec![0.0; cells.n_parts()]; bodies.len()];
    let fine = Look::new(cells, width, look.up);
    let levels: Vec<f64> = bodies.iter().map(|b| look.level_of(b)).collect();
    let owners = look.owners(bodies);
    for strip in fine.basins.strips() {
        let part = cells.part_of(strip.edge_idxs[0]);
        let Some(owner) = look.basins.basin_at(strip.low).and_then(|basin| owners[basin]) else { continue };
        if strip.bottom < levels[owner] {
            volumes[owner][part] += fine.basins.strip_volume_below(&strip, levels[owner]);
        }
    }
    volumes
}
