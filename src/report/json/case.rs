//! What the JSON says of a load case.

use serde::Serialize;

use crate::analysis::{CaseResult, EdgeLoad, PointPressure, Pool, RoofContact, Settled};
use crate::cases::LoadCase;
use crate::geom::Vec2;
use crate::problem::Place;

use crate::units::UnitSystem;

use super::super::Report;
use super::verdict::VerdictRow;
use super::{Num, Piece, coordinates, num};

#[derive(Clone, Debug, Serialize)]
pub(super) struct Case {
    name: String,
    note: String,
    origin: String,
    accel_s_m_per_s2: Num,
    accel_z_m_per_s2: Num,
    attitude_rad: Num,
    onset_s: Num,
    effective_gravity: Gravity,
    settled: Option<SettledState>,
    unsettled: Option<String>,
    verdicts: Vec<VerdictRow>,
    absent: Vec<AbsentRow>,
}

impl Case {
    pub(super) fn new(report: &Report, input: &LoadCase, result: &CaseResult) -> Case {
        let gravity = &result.gravity;
        Case {
            name: result.name.clone(),
            note: input.note.clone(),
            origin: input.source.clone(),
            accel_s_m_per_s2: num(result.accel.x),
            accel_z_m_per_s2: num(result.accel.y),
            attitude_rad: num(input.attitude.angle_rad()),
            onset_s: input.onset_s.and_then(num),
            effective_gravity: Gravity {
                s_m_per_s2: num(gravity.vec.x),
                z_m_per_s2: num(gravity.vec.y),
                magnitude_m_per_s2: num(gravity.magnitude),
            },
            settled: result.settled.as_ref().ok().map(|settled| SettledState::new(report, result, settled)),
            unsettled: result.settled.as_ref().err().cloned(),
            verdicts: result.verdicts.iter().map(|v| VerdictRow::new(report, result, v)).collect(),
            absent: result
                .absent
                .iter()
                .map(|a| AbsentRow {
                    criterion: a.criterion,
                    place: a.place_words.clone(),
                    reason: a.reason.text(UnitSystem::Si),
                })
                .collect(),
        }
    }
}

#[derive(Clone, Debug, Serialize)]
struct Gravity {
    s_m_per_s2: Num,
    z_m_per_s2: Num,
    magnitude_m_per_s2: Num,
}

#[derive(Clone, Debug, Serialize)]
struct SettledState {
    volume_m3: Num,
    spilled_m3: Num,
    n_pools: usize,
    pools: Vec<PoolRow>,
    slope: Num,
    tilt_rad: Num,
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
    sides: Load,
    total: Load,
    points: Vec<PointRow>,
    roof: Option<Roof>,
}

impl SettledState {
    fn new(report: &Report, case: &CaseResult, settled: &Settled) -> SettledState {
        let (centroid_s_m, centroid_z_m) = coordinates(Some(settled.centroid));
        let (highest_wetted_s_m, highest_wetted_z_m) = coordinates(Some(settled.highest_wetted));
        let (peak_s_m, peak_z_m) = coordinates(Some(settled.peak_at));
        SettledState {
            volume_m3: num(settled.volume_m3),
            spilled_m3: num(settled.spilled_m3),
            n_pools: settled.pools.len(),
            pools: settled.pools.iter().map(PoolRow::new).collect(),
            slope: case.gravity.slope.and_then(num),
            tilt_rad: case.gravity.tilt_rad.and_then(num),
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
            sides: Load::new(settled.sides_force_n, settled.sides_moment_n_m),
            total: Load::new(settled.total_force_n, settled.total_moment_n_m),
            points: settled.points.iter().map(PointRow::new).collect(),
            roof: settled.roof.as_ref().map(|roof| Roof::new(report, roof)),
        }
    }
}

#[derive(Clone, Debug, Serialize)]
struct PoolRow {
    volume_m3: Num,
    level_m: Num,
    offset_m: Num,
    centroid_s_m: Num,
    centroid_z_m: Num,
    deepest_s_m: Num,
    deepest_z_m: Num,
    surface: Vec<Piece>,
}

impl PoolRow {
    fn new(pool: &Pool) -> PoolRow {
        let (centroid_s_m, centroid_z_m) = coordinates(Some(pool.centroid));
        let (deepest_s_m, deepest_z_m) = coordinates(Some(pool.deepest));
        PoolRow {
            volume_m3: num(pool.volume_m3),
            level_m: num(pool.level_m),
            offset_m: pool.offset_m.and_then(num),
            centroid_s_m,
            centroid_z_m,
            deepest_s_m,
            deepest_z_m,
            surface: pool.surface.iter().map(Piece::new).collect(),
        }
    }
}

#[derive(Clone, Debug, Serialize)]
struct Load {
    force_s_n: Num,
    force_z_n: Num,
    moment_n_m: Num,
}

impl Load {
    fn new(force_n: Vec2, moment_n_m: f64) -> Load {
        Load { force_s_n: num(force_n.x), force_z_n: num(force_n.y), moment_n_m: num(moment_n_m) }
    }
}

#[derive(Clone, Debug, Serialize)]
struct EdgeRow {
    name: String,
    is_wall: bool,
    wetted_length_m: Num,
    #[serde(flatten)]
    load: Load,
    acts_at_s_m: Num,
    acts_at_z_m: Num,
    peak_gage_pa: Num,
    peak_s_m: Num,
    peak_z_m: Num,
}

impl EdgeRow {
    fn new(edge: &EdgeLoad) -> EdgeRow {
        let (acts_at_s_m, acts_at_z_m) = coordinates(edge.acts_at);
        let (peak_s_m, peak_z_m) = coordinates(edge.peak.map(|(_, at)| at));
        EdgeRow {
            name: edge.name.clone(),
            is_wall: edge.is_wall,
            wetted_length_m: num(edge.wetted_length_m),
            load: Load::new(edge.force_n, edge.moment_n_m),
            acts_at_s_m,
            acts_at_z_m,
            peak_gage_pa: edge.peak.and_then(|(pa, _)| num(pa)),
            peak_s_m,
            peak_z_m,
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

#[derive(Clone, Debug, Serialize)]
struct AbsentRow {
    criterion: &'static str,
    place: String,
    reason: String,
}
