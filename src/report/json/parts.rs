//! What the JSON says of the parts of a tank: cells, compartments, plates.

use serde::Serialize;

use crate::section::Plate;

use super::super::Report;
use super::bearing::PeakRow;
use super::{Num, coordinates, num};

#[derive(Clone, Debug, Serialize)]
pub(super) struct CellRow {
    name: String,
    compartment: String,
    inside_s_m: Num,
    inside_z_m: Num,
    area_m2: Num,
    capacity_m3: Num,
    still_m3: Num,
    still_z_m: Num,
}

impl CellRow {
    pub(super) fn all(report: &Report) -> Vec<CellRow> {
        let cells = report.results.cells.iter();
        cells
            .map(|cell| {
                let (inside_s_m, inside_z_m) = coordinates(Some(cell.inside));
                CellRow {
                    name: cell.name.clone(),
                    compartment: report.compartment_name(cell.compartment),
                    inside_s_m,
                    inside_z_m,
                    area_m2: num(cell.area_m2),
                    capacity_m3: num(cell.capacity_m3),
                    still_m3: num(cell.still_m3),
                    still_z_m: cell.still_z_m.and_then(num),
                }
            })
            .collect()
    }
}

#[derive(Clone, Debug, Serialize)]
pub(super) struct CompartmentRow {
    name: String,
    has_own_fill: bool,
    liquid: String,
    density_kg_per_m3: Num,
}

impl CompartmentRow {
    pub(super) fn all(report: &Report) -> Vec<CompartmentRow> {
        let compartments = report.results.compartments.iter();
        compartments
            .map(|compartment| {
                let liquid = report.liquid_of(compartment);
                CompartmentRow {
                    name: compartment.name.clone(),
                    has_own_fill: compartment.own_idx.is_some(),
                    liquid: liquid.name.clone(),
                    density_kg_per_m3: num(liquid.density_kg_per_m3),
                }
            })
            .collect()
    }
}

#[derive(Clone, Debug, Serialize)]
pub(super) struct DrawnPlate {
    name: String,
    corners: Vec<Corner>,
    length_m: Num,
    thickness_m: Num,
    corrosion_m: Num,
    material: String,
    solid_share: Num,
    openings: Vec<OpeningRow>,
    peaks: Vec<PeakRow>,
}

impl DrawnPlate {
    pub(super) fn all(report: &Report) -> Vec<DrawnPlate> {
        let plates = report.study.section.plates.iter().enumerate();
        plates.map(|(idx, plate)| DrawnPlate::new(report, idx, plate)).collect()
    }

    fn new(report: &Report, idx: usize, plate: &Plate) -> DrawnPlate {
        let peaks = report.results.plate_peaks.iter().filter(|peak| peak.plate_idx == idx);
        DrawnPlate {
            name: plate.label(idx),
            corners: plate.points.iter().map(|p| Corner { s_m: num(p.x), z_m: num(p.y) }).collect(),
            length_m: num(plate.length_m()),
            thickness_m: num(plate.thickness_m),
            corrosion_m: num(plate.corrosion_m),
            material: plate.material.clone(),
            solid_share: num(plate.solid_share(&report.study.section.width)),
            openings: plate
                .openings
                .iter()
                .map(|o| OpeningRow { name: o.name.clone(), from_m: num(o.from_m), to_m: num(o.to_m) })
                .collect(),
            peaks: peaks.map(|peak| PeakRow::new(report, peak)).collect(),
        }
    }
}

#[derive(Clone, Debug, Serialize)]
struct Corner {
    s_m: Num,
    z_m: Num,
}

#[derive(Clone, Debug, Serialize)]
struct OpeningRow {
    name: String,
    from_m: Num,
    to_m: Num,
}
