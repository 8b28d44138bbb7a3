//! Cell volume: no cell between walls and plates larger than a requirement record allows, unless it is filled so low or
//! so high that the record lets it be larger. Every upright plate parts cells, however little it covers: what it covers
//! is judged by itself. Source: [LayoutGeometry].

use crate::plates::Cell;
use crate::study::Limit;
use crate::units::{Measure, Phrase, Quantity, number};

use super::{NOTHING, Outcome, Sense, Standing, Verdict, WorkLine};

const NAME: &str = "Cell volume";

/// What a record allows.
#[derive(Clone, Copy)]
struct Band {
    m3: f64,
    empty_to: f64,
    full_from: f64,
}

pub(super) fn judge(standing: &Standing) -> Outcome {
    let kind = |limit: &Limit| match *limit {
        Limit::CellVolume { m3, empty_to, full_from } => Some(Band { m3, empty_to, full_from }),
        _ => None,
    };
    let verdicts = |band| standing.cells.iter().map(|cell| verdict(standing, cell, band)).collect();
    standing.by_records(NAME, kind, verdicts, NOTHING, || {
        let largest = standing.cells.iter().map(|c| c.capacity_m3).fold(0.0, f64::max);
        let largest = Measure::new(Quantity::Volume, largest);
        Phrase::new("no cell volume limit is given; the largest cell holds {}", [largest])
    })
}

/// Rounding of a share.
const ROUNDING: f64 = 1e-9;

fn verdict(standing: &Standing, cell: &Cell, band: Band) -> Verdict {
    let volume = |m3: f64| Measure::new(Quantity::Volume, m3);
    let share = |share: f64| Measure::new(Quantity::Share, share);
    let filled = cell.still_share();
    let by_volume = standing.verdict(NAME, volume(cell.capacity_m3), volume(band.m3), Sense::AtMost);
    let is_small = cell.capacity_m3 <= band.m3 * (1.0 + ROUNDING);
    let larger = format!("larger than {} m³, judged by its fill", number(band.m3, 3));
    let mut verdict = if is_small {
        by_volume
    } else if filled <= band.empty_to + ROUNDING {
        let by_fill = standing.verdict(NAME, share(filled), share(band.empty_to), Sense::AtMost);
        Verdict { remark: larger, ..by_fill }
    } else if filled >= band.full_from - ROUNDING {
        let by_fill = standing.verdict(NAME, share(filled), share(band.full_from), Sense::AtLeast);
        Verdict { remark: larger, ..by_fill }
    } else {
        let bands = [share(band.empty_to), share(band.full_from)];
        let n_parts = (cell.capacity_m3 / band.m3 * (1.0 - ROUNDING)).ceil();
        let mend = vec![
            Phrase::new("To hold, fill it up to {} or from {} on", bands),
            Phrase::new(format!("or part it into {n_parts:.0}"), []),
        ];
        let remark = "larger than the record allows, and filled neither low nor high enough".to_owned();
        Verdict { mend, remark, ..by_volume }
    };
    verdict.working = vec![
        WorkLine {
            symbols: "V_{cell} = ∫ w dA".to_owned(),
            numbers: format!("{} m² of the section", number(cell.area_m2, 4)),
            result: volume(cell.capacity_m3),
        },
        WorkLine {
            symbols: "fill = V_{still} / V_{cell}".to_owned(),
            numbers: format!("{} / {} m³", number(cell.still_m3, 4), number(cell.capacity_m3, 4)),
            result: share(filled),
        },
    ];
    Verdict { place_words: cell.name.clone(), at: Some(cell.inside), ..verdict }
}
