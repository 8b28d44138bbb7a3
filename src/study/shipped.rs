//! The requirement records that the program ships: well-known ones, to be taken over, checked against the text and
//! confirmed by the user. None of them is a fact: each says how the project knows it.

use std::sync::LazyLock;

use serde::Deserialize;

use super::{Limit, Record};

/// How the project knows a record.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Known {
    /// Seen in published text, an extract only.
    Seen,
    /// From memory, believed right.
    Memory,
    /// From memory; the number may be off, or depend on the edition.
    Unsure,
}

impl Known {
    /// The words for it, as they stand in a record's origin.
    pub fn words(self) -> &'static str {
        match self {
            Known::Seen => "seen in published text, an extract only",
            Known::Memory => "from memory, believed right",
            Known::Unsure => "from memory, may be off or depend on the edition",
        }
    }
}

/// A shipped record, and how it is known. Never confirmed.
#[derive(Clone, Debug, PartialEq)]
pub struct Shipped {
    /// Ready to be added to a study.
    pub record: Record,
    /// How the project knows it.
    pub known: Known,
}

/// One row of the asset.
#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Row {
    title: String,
    limit: RowLimit,
    clause: String,
    edition: String,
    known: Known,
    #[serde(default)]
    note: String,
}

#[derive(Clone, Copy, Deserialize)]
#[serde(rename_all = "snake_case", deny_unknown_fields)]
enum RowLimit {
    CellVolume { at_most_m3: f64, or_filled_to_percent: f64, or_from_percent: f64 },
    PlateCoveragePercent(f64),
    PlateSpacingMm(f64),
    DrainPath,
    VentPath,
    RatedFlow { flow_m3_per_s: f64, difference_mm: f64 },
}

static RECORDS: LazyLock<Vec<Shipped>> = LazyLock::new(|| {
    let rows: Vec<Row> =
        ron::from_str(include_str!("../../assets/records.ron")).expect("assets/records.ron is tested to parse");
    rows.into_iter().map(Shipped::from).collect()
});

/// All of them, by trade.
pub fn shipped_records() -> &'static [Shipped] {
    &RECORDS
}

impl From<Row> for Shipped {
    fn from(row: Row) -> Shipped {
        let words = row.known.words();
        let origin = if row.note.is_empty() { words.to_owned() } else { format!("{words}; {}", row.note) };
        let (title, limit, clause, edition) = (row.title, row.limit.into(), row.clause, row.edition);
        Shipped { record: Record { title, limit, clause, edition, origin, confirmed: false }, known: row.known }
    }
}

impl From<RowLimit> for Limit {
    fn from(limit: RowLimit) -> Limit {
        match limit {
            RowLimit::CellVolume { at_most_m3, or_filled_to_percent, or_from_percent } => Limit::CellVolume {
                m3: at_most_m3,
                empty_to: or_filled_to_percent / 100.0,
                full_from: or_from_percent / 100.0,
            },
            RowLimit::PlateCoveragePercent(percent) => Limit::PlateCoverage(percent / 100.0),
            RowLimit::PlateSpacingMm(mm) => Limit::PlateSpacing(mm / 1e3),
            RowLimit::DrainPath => Limit::DrainPath,
            RowLimit::VentPath => Limit::VentPath,
            RowLimit::RatedFlow { flow_m3_per_s, difference_mm } => {
                Limit::RatedFlow { flow_m3_per_s, difference_m: difference_mm / 1e3 }
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use std::collections::BTreeSet;

    use super::*;
    use crate::units::{Quantity, UnitSystem};

    #[test]
    fn every_record_is_unconfirmed_and_says_where_it_comes_from() {
        let titles: BTreeSet<&str> = shipped_records().iter().map(|s| s.record.title.as_str()).collect();
        assert_eq!(titles.len(), shipped_records().len(), "a title is used twice");
        for Shipped { record, known } in shipped_records() {
            assert!(!record.confirmed, "{}", record.title);
            assert!(record.origin.starts_with(known.words()), "{}: {}", record.title, record.origin);
            assert!(!record.clause.is_empty() && !record.edition.is_empty(), "{}", record.title);
        }
    }

    #[test]
    fn inches_and_gallons_are_what_they_are() {
        // An inch is 25.4 mm, a US gallon 231 cubic inches: 1000 gal/min = 0.063090 m3/s.
        let limits: Vec<Limit> = shipped_records().iter().map(|s| s.record.limit).collect();
        for inches in [30.0, 46.0, 48.0, 60.0] {
            let has = |l: &Limit| matches!(l, Limit::PlateSpacing(m) if (m - inches * 0.0254).abs() < 1e-12);
            assert!(limits.iter().any(has), "{inches} in");
        }
        let gallon = Quantity::Flow.unit(UnitSystem::UsCustomary).to_si(1000.0);
        let has =
            |l: &Limit| matches!(l, Limit::RatedFlow { flow_m3_per_s, .. } if (flow_m3_per_s - gallon).abs() < 1e-6);
        assert!(limits.iter().any(has), "1000 gal/min, {gallon} m3/s");
    }
}
