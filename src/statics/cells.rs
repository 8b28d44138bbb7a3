//! How much liquid stands in each cell.

use crate::section::{Region, WidthLaw};

use super::pools::{Body, Look};

/// Volume of the bodies' liquid in each cell of the region, m3. `look` is along the bodies' direction, under any bound:
/// cells are cut finer.
pub fn cell_volumes(region: &Region, width: &WidthLaw, look: &Look, bodies: &[Body]) -> Vec<f64> {
    let cells = region.cells();
    let mut volumes = vec![0.0; cells.n_parts()];
    if cells.n_parts() == 1 {
        volumes[0] = bodies.iter().map(|b| b.volume_m3).sum();
        return volumes;
    }
    let fine = Look::new(cells, width, look.up);
    let levels: Vec<f64> = bodies.iter().map(|b| look.level_of(b)).collect();
    let owners = look.owners(bodies);
    for strip in fine.basins.strips() {
        let part = cells.part_of(strip.edge_idxs[0]);
        let Some(owner) = look.basins.basin_at(strip.low).and_then(|basin| owners[basin]) else { continue };
        if strip.bottom < levels[owner] {
            volumes[part] += fine.basins.strip_volume_below(&strip, levels[owner]);
        }
    }
    volumes
}
