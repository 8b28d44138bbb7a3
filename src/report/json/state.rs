//! What the JSON says of a settled state, whatever the bound.

use serde::Serialize;

use crate::analysis::{GasPocket, PointPressure, Pool, RoofContact, Settled};
use crate::problem::Place;

use super::super::Report;
use super::loads::{EdgeRow, Load, PlateRow};
use super::{Num, Piece, coordinates, num};

#[derive(Clone, Debug, Serialize)]
pub(super) struct State {
    volume_m3: Num,
    spilled_m3: Num,
    spills: Vec<SpillRow>,
    mass_kg: Num,
    n_pools: usize,
    pools: Vec<PoolRow>,
    cells_m3: Vec<Num>,
    gas_pockets: Vec<GasRow>,
    centroid_s_m: Num,
    centroid_z_m: Num,
    highest_wetted_s_m: Num,
    highest_wetted_z_m: Num,
    peak_gage_pa: Num,
    peak_place: String,
    peak_s_m: Num,
    peak_z_m: Num,
    lowest_abs_pa: Num,
    edges: Vec<EdgeRow>,
    plates: Vec<PlateRow>,
    sides: Load,
    total: Load,
    points: Vec<PointRow>,
    roof: Option<Roof>,
}

impl State {
    pub(super) fn new(report: &Report, settled: &Settled) -> State {
        let (centroid_s_m, centroid_z_m) = coordinates(Some(settled.centroid));
        let (highest_wetted_s_m, highest_wetted_z_m) = coordinates(Some(settled.highest_wetted));
        let (peak_s_m, peak_z_m) = coordinates(Some(settled.peak_at));
        State {
            volume_m3: num(settled.volume_m3),
            spilled_m3: num(settled.spilled_m3),
            spills: settled
                .spills
                .iter()
                .map(|s| SpillRow { mouth: report.mouth_name(s.mouth_idx), volume_m3: num(s.volume_m3) })
                .collect(),
            mass_kg: num(settled.mass_kg),
            n_pools: settled.pools.len(),
            pools: settled.pools.iter().map(|pool| PoolRow::new(report, pool)).collect(),
            cells_m3: settled.cells_m3.iter().map(|&m3| num(m3)).collect(),
            gas_pockets: settled.gas.iter().map(|pocket| GasRow::new(report, pocket)).collect(),
            centroid_s_m,
            centroid_z_m,
            highest_wetted_s_m,
            highest_wetted_z_m,
            peak_gage_pa: num(settled.peak_pa),
            peak_place: report.place_words(&settled.peak_place),
            peak_s_m,
            peak_z_m,
            lowest_abs_pa: num(settled.lowest_abs_pa),
            edges: settled.edges.iter().map(EdgeRow::new).collect(),
            plates: settled.plates.iter().map(PlateRow::new).collect(),
            sides: Load::new(settled.sides_force_n, settled.sides_moment_n_m),
            total: Load::new(settled.total_force_n, settled.total_moment_n_m),
            points: settled.points.iter().map(PointRow::new).collect(),
            roof: settled.roof.as_ref().map(|roof| Roof::new(report, roof)),
        }
    }
}

#[derive(Clone, Debug, Serialize)]
struct SpillRow {
    mouth: String,
    volume_m3: Num,
}

#[derive(Clone, Debug, Serialize)]
struct PoolRow {
    volume_m3: Num,
    level_m: Num,
    offset_m: Num,
    surface: Vec<Piece>,
    deepest_s_m: Num,
    deepest_z_m: Num,
    centroid_s_m: Num,
    centroid_z_m: Num,
    compartment: String,
    cells: Vec<String>,
}

impl PoolRow {
    fn new(report: &Report, pool: &Pool) -> PoolRow {
        let (centroid_s_m, centroid_z_m) = coordinates(Some(pool.centroid));
        let (deepest_s_m, deepest_z_m) = coordinates(Some(pool.deepest));
        PoolRow {
            volume_m3: num(pool.volume_m3),
            level_m: num(pool.level_m),
            offset_m: pool.offset_m.and_then(num),
            surface: pool.surface.iter().map(Piece::new).collect(),
            deepest_s_m,
            deepest_z_m,
            centroid_s_m,
            centroid_z_m,
            compartment: report.compartment_name(pool.compartment),
            cells: pool.cell_idxs.iter().map(|&i| report.cell_name(i)).collect(),
        }
    }
}

#[derive(Clone, Debug, Serialize)]
struct GasRow {
    volume_m3: Num,
    s_m: Num,
    z_m: Num,
    compartment: String,
    cell: String,
}

impl GasRow {
    fn new(report: &Report, pocket: &GasPocket) -> GasRow {
        GasRow {
            volume_m3: num(pocket.volume_m3),
            s_m: num(pocket.at.x),
            z_m: num(pocket.at.y),
            compartment: report.compartment_name(pocket.compartment),
            cell: report.cell_name(pocket.cell_idx),
        }
    }
}

#[derive(Clone, Debug, Serialize)]
struct PointRow {
    name: String,
    s_m: Num,
    z_m: Num,
    gage_pa: Num,
    wet: bool,
}

impl PointRow {
    fn new(point: &PointPressure) -> PointRow {
        let (s_m, z_m) = coordinates(Some(point.at));
        PointRow { name: point.name.clone(), s_m, z_m, gage_pa: num(point.gage_pa), wet: point.wet }
    }
}

#[derive(Clone, Debug, Serialize)]
struct Roof {
    wetted_length_m: Num,
    peak_gage_pa: Num,
    peak_place: String,
    peak_s_m: Num,
    peak_z_m: Num,
}

impl Roof {
    fn new(report: &Report, roof: &RoofContact) -> Roof {
        let (peak_s_m, peak_z_m) = coordinates(Some(roof.at));
        Roof {
            wetted_length_m: num(roof.wetted_length_m),
            peak_gage_pa: num(roof.peak_pa),
            peak_place: report.place_words(&Place::Edge(roof.edge_idx)),
            peak_s_m,
            peak_z_m,
        }
    }
}
