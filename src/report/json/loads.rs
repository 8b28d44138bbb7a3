//! What the JSON says of loads on walls and plates.

use serde::Serialize;

use crate::analysis::{EdgeLoad, PlateLoad, Stretch};
use crate::geom::Vec2;

use super::{Num, coordinates, num};

#[derive(Clone, Debug, Serialize)]
pub(super) struct Load {
    force_s_n: Num,
    force_z_n: Num,
    moment_n_m: Num,
}

impl Load {
    pub(super) fn new(force_n: Vec2, moment_n_m: f64) -> Load {
        Load { force_s_n: num(force_n.x), force_z_n: num(force_n.y), moment_n_m: num(moment_n_m) }
    }
}

#[derive(Clone, Debug, Serialize)]
pub(super) struct EdgeRow {
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
    pub(super) fn new(edge: &EdgeLoad) -> EdgeRow {
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
pub(super) struct PlateRow {
    name: String,
    net_n: Num,
    #[serde(flatten)]
    load: Load,
    acts_at_s_m: Num,
    acts_at_z_m: Num,
    peak_net_pa: Num,
    peak_s_m: Num,
    peak_z_m: Num,
    highest_gage_pa: Num,
    stretches: Vec<StretchRow>,
}

impl PlateRow {
    pub(super) fn new(plate: &PlateLoad) -> PlateRow {
        let (acts_at_s_m, acts_at_z_m) = coordinates(plate.acts_at);
        let (peak_s_m, peak_z_m) = coordinates(plate.peak.map(|(_, at)| at));
        PlateRow {
            name: plate.name.clone(),
            net_n: num(plate.net_n),
            load: Load::new(plate.force_n, plate.moment_n_m),
            acts_at_s_m,
            acts_at_z_m,
            peak_net_pa: plate.peak.and_then(|(pa, _)| num(pa)),
            peak_s_m,
            peak_z_m,
            highest_gage_pa: plate.highest.and_then(|(pa, _)| num(pa)),
            stretches: plate.stretches.iter().map(StretchRow::new).collect(),
        }
    }
}

#[derive(Clone, Debug, Serialize)]
struct StretchRow {
    from_m: Num,
    to_m: Num,
    from_net_pa: Num,
    to_net_pa: Num,
}

impl StretchRow {
    fn new(stretch: &Stretch) -> StretchRow {
        StretchRow {
            from_m: num(stretch.from_m),
            to_m: num(stretch.to_m),
            from_net_pa: num(stretch.from_pa),
            to_net_pa: num(stretch.to_pa),
        }
    }
}
