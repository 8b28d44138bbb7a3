//! Requirement records as text.

use crate::study::{Limit, Record};

use super::super::number::{kpa, mm, number, percent};
use super::lines::{Text, quoted};

pub(super) fn write(out: &mut Text, record: &Record) {
    out.open("(");
    out.key("title", &quoted(&record.title));
    out.key("limit", &limit(record.limit));
    out.optional_text("clause", &record.clause);
    out.optional_text("edition", &record.edition);
    out.optional_text("origin", &record.origin);
    out.key("confirmed", &record.confirmed.to_string());
    out.close("),");
}

fn limit(limit: Limit) -> String {
    match limit {
        Limit::WallPressure(pa) => format!("wall_pressure_gage_kpa({})", kpa(pa)),
        Limit::RoofPressure(pa) => format!("roof_pressure_gage_kpa({})", kpa(pa)),
        Limit::FreeboardAllowance(m) => format!("freeboard_allowance_mm({})", mm(m)),
        Limit::VapourMargin(pa) => format!("vapour_margin_kpa({})", kpa(pa)),
        Limit::CellVolume { m3, empty_to, full_from } => format!(
            "cell_volume(at_most_m3: {}, or_filled_to_percent: {}, or_from_percent: {})",
            number(m3),
            percent(empty_to),
            percent(full_from)
        ),
        Limit::PlateCoverage(share) => format!("plate_coverage_percent({})", percent(share)),
        Limit::PlateSpacing(m) => format!("plate_spacing_mm({})", mm(m)),
        Limit::OpenShareAtLeast(share) => format!("open_share_at_least_percent({})", percent(share)),
        Limit::OpenShareAtMost(share) => format!("open_share_at_most_percent({})", percent(share)),
        Limit::DrainPath => "drain_path".to_owned(),
        Limit::VentPath => "vent_path".to_owned(),
        Limit::RatedFlow { flow_m3_per_s, difference_m } => {
            format!("rated_flow(flow_m3_per_s: {}, difference_mm: {})", number(flow_m3_per_s), mm(difference_m))
        }
    }
}
