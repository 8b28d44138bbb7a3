//! Requirement records in a version 1 file.

use serde::Deserialize;

use crate::study;

use super::super::number::Num;

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
pub(super) struct Record {
    title: String,
    limit: Limit,
    #[serde(default)]
    clause: String,
    #[serde(default)]
    edition: String,
    #[serde(default)]
    origin: String,
    #[serde(default)]
    confirmed: bool,
}

#[derive(Deserialize)]
#[serde(rename_all = "snake_case", deny_unknown_fields)]
enum Limit {
    WallPressureGageKpa(Num),
    RoofPressureGageKpa(Num),
    FreeboardAllowanceMm(Num),
    VapourMarginKpa(Num),
    CellVolume { at_most_m3: Num, or_filled_to_percent: Num, or_from_percent: Num },
    PlateCoveragePercent(Num),
    PlateSpacingMm(Num),
    OpenShareAtLeastPercent(Num),
    OpenShareAtMostPercent(Num),
    DrainPath,
    VentPath,
    RatedFlow { flow_m3_per_s: Num, difference_mm: Num },
}

impl From<Record> for study::Record {
    fn from(record: Record) -> study::Record {
        study::Record {
            title: record.title,
            limit: record.limit.into(),
            clause: record.clause,
            edition: record.edition,
            origin: record.origin,
            confirmed: record.confirmed,
        }
    }
}

impl From<Limit> for study::Limit {
    fn from(limit: Limit) -> study::Limit {
        match limit {
            Limit::WallPressureGageKpa(v) => study::Limit::WallPressure(v.kpa()),
            Limit::RoofPressureGageKpa(v) => study::Limit::RoofPressure(v.kpa()),
            Limit::FreeboardAllowanceMm(v) => study::Limit::FreeboardAllowance(v.mm()),
            Limit::VapourMarginKpa(v) => study::Limit::VapourMargin(v.kpa()),
            Limit::CellVolume { at_most_m3, or_filled_to_percent, or_from_percent } => study::Limit::CellVolume {
                m3: at_most_m3.si(),
                empty_to: or_filled_to_percent.percent(),
                full_from: or_from_percent.percent(),
            },
            Limit::PlateCoveragePercent(v) => study::Limit::PlateCoverage(v.percent()),
            Limit::PlateSpacingMm(v) => study::Limit::PlateSpacing(v.mm()),
            Limit::OpenShareAtLeastPercent(v) => study::Limit::OpenShareAtLeast(v.percent()),
            Limit::OpenShareAtMostPercent(v) => study::Limit::OpenShareAtMost(v.percent()),
            Limit::DrainPath => study::Limit::DrainPath,
            Limit::VentPath => study::Limit::VentPath,
            Limit::RatedFlow { flow_m3_per_s, difference_mm } => {
                study::Limit::RatedFlow { flow_m3_per_s: flow_m3_per_s.si(), difference_m: difference_mm.mm() }
            }
        }
    }
}
