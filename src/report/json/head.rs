//! What the JSON says of a file as a whole.

use serde::Serialize;

use crate::sources;
use crate::study::Record;

use super::super::{CAUTION, Counts, Report, value_of};
use super::parts::{CellRow, CompartmentRow, DrawnPlate};
use super::verdict::{AbsentRow, VerdictRow};
use super::{Num, Piece, num, source_key};

#[derive(Clone, Debug, Serialize)]
pub(super) struct Judged {
    title: String,
    author: String,
    revision: String,
    notes: String,
    caution: &'static str,
    gravity_m_per_s2: Num,
    air_pressure_abs_pa: Num,
    ullage_gage_pa: Num,
    capacity_m3: Num,
    liquid: Liquid,
    still: Still,
    cells: Vec<CellRow>,
    compartments: Vec<CompartmentRow>,
    plates: Vec<DrawnPlate>,
    layout: Option<Layout>,
    records: Vec<RecordRow>,
    bibliography: Vec<Entry>,
    counts: Counts,
}

impl Judged {
    pub(super) fn new(report: &Report) -> Judged {
        let (study, results) = (report.study, report.results);
        let still = &results.still;
        Judged {
            title: study.title.clone(),
            author: study.author.clone(),
            revision: study.revision.clone(),
            notes: study.notes.clone(),
            caution: CAUTION,
            gravity_m_per_s2: num(study.gravity_m_per_s2),
            air_pressure_abs_pa: num(study.air_pressure_abs_pa),
            ullage_gage_pa: num(study.ullage_gage_pa),
            capacity_m3: num(results.capacity_m3),
            liquid: Liquid {
                name: study.liquid.name.clone(),
                density_kg_per_m3: num(study.liquid.density_kg_per_m3),
                vapour_pressure_abs_pa: study.liquid.vapour_pressure_abs_pa.and_then(num),
                surface_tension_n_per_m: num(study.liquid.surface_tension()),
            },
            still: Still {
                volume_m3: num(still.volume_m3),
                share: num(still.share),
                level_z_m: num(still.level_z_m),
                ullage_m: num(still.ullage_m),
                depth_m: num(still.depth_m),
                mass_kg: num(still.mass_kg),
                highest_share: still.highest_share.and_then(num),
                surface: still.surface.iter().map(Piece::new).collect(),
            },
            cells: CellRow::all(report),
            compartments: CompartmentRow::all(report),
            plates: DrawnPlate::all(report),
            layout: report.layout().map(|layout| Layout {
                verdicts: layout.verdicts.iter().map(|v| VerdictRow::new(report, None, v)).collect(),
                absent: layout.absent.iter().map(AbsentRow::new).collect(),
            }),
            records: study.records.iter().map(RecordRow::new).collect(),
            bibliography: sources::all()
                .filter(|(key, _)| report.verdicts().any(|v| v.source == *key))
                .map(|(key, entry)| Entry {
                    key: source_key(key),
                    short: &entry.short,
                    full: &entry.full,
                    status: &entry.status,
                })
                .collect(),
            counts: report.counts(),
        }
    }
}

#[derive(Clone, Debug, Serialize)]
struct Liquid {
    name: String,
    density_kg_per_m3: Num,
    vapour_pressure_abs_pa: Num,
    surface_tension_n_per_m: Num,
}

#[derive(Clone, Debug, Serialize)]
struct Still {
    volume_m3: Num,
    share: Num,
    level_z_m: Num,
    ullage_m: Num,
    depth_m: Num,
    mass_kg: Num,
    highest_share: Num,
    surface: Vec<Piece>,
}

#[derive(Clone, Debug, Serialize)]
struct Layout {
    verdicts: Vec<VerdictRow>,
    absent: Vec<AbsentRow>,
}

#[derive(Clone, Debug, Serialize)]
struct RecordRow {
    title: String,
    sense: Option<&'static str>,
    limit: Num,
    unit: Option<&'static str>,
    clause: String,
    edition: String,
    origin: String,
    confirmed: bool,
}

impl RecordRow {
    fn new(record: &Record) -> RecordRow {
        let value = value_of(record);
        RecordRow {
            title: record.title.clone(),
            sense: value.map(|(sense, _)| sense),
            limit: value.and_then(|(_, limit)| num(limit.si)),
            unit: value.map(|(_, limit)| limit.quantity.si_symbol()),
            clause: record.clause.clone(),
            edition: record.edition.clone(),
            origin: record.origin.clone(),
            confirmed: record.confirmed,
        }
    }
}

#[derive(Clone, Debug, Serialize)]
struct Entry {
    key: String,
    short: &'static str,
    full: &'static str,
    status: &'static str,
}
