//! Plate spacing: the widest gap along s between upright plates, or from one to the end of the tank, against a requirement
//! record. Measured from the middle of each plate's height, level to both sides, without taking off thicknesses; every
//! upright plate counts, however little it covers. Source: [LayoutGeometry].

use crate::plates::{Gap, gaps};
use crate::problem::Place;
use crate::study::Limit;
use crate::units::{Measure, Phrase, Quantity, fixed};

use super::{NOTHING, Outcome, Sense, Standing, Verdict, WorkLine, plate};

const NAME: &str = "Plate spacing";

pub(super) fn judge(standing: &Standing) -> Outcome {
    let kind = |limit: &Limit| if let Limit::PlateSpacing(m) = *limit { Some(m) } else { None };
    let gaps = gaps(standing.study.region());
    let verdicts = |most| gaps.iter().map(|gap| verdict(standing, gap, most)).collect();
    standing.by_records(NAME, kind, verdicts, NOTHING, || {
        let widest = gaps.iter().map(Gap::length_m).fold(0.0, f64::max);
        Phrase::new("no spacing limit is given; the widest gap is {}", [Measure::new(Quantity::Length, widest)])
    })
}

fn verdict(standing: &Standing, gap: &Gap, most_m: f64) -> Verdict {
    let length = |m: f64| Measure::new(Quantity::Length, m);
    let mut verdict = standing.verdict(NAME, length(gap.length_m()), length(most_m), Sense::AtMost);
    if gap.length_m() > most_m * (1.0 + ROUNDING) && most_m > 0.0 {
        let n_more = (gap.length_m() / most_m * (1.0 - ROUNDING)).ceil() - 1.0;
        let plates = if n_more > 1.0 { format!("{n_more:.0} plates") } else { "a plate".to_owned() };
        verdict.mend = vec![Phrase::new(format!("To hold, add {plates} here"), [])];
    }
    let name = |side: usize, end: &str| gap.plate_idxs[side].map_or(end.to_owned(), |i| standing.plate_words(i));
    let (left, right) = (gap.left.x * 1e3, gap.right.x * 1e3);
    Verdict {
        place: gap.plate_idxs[0].or(gap.plate_idxs[1]).map_or(Place::Whole, plate),
        place_words: format!("{} to {}", name(0, "left end"), name(1, "right end")),
        at: Some(nalgebra::center(&gap.left, &gap.right)),
        working: vec![WorkLine {
            symbols: "gap = s_{right} − s_{left}".to_owned(),
            numbers: format!("{} − {} mm, at z {} mm", fixed(right, 0), fixed(left, 0), fixed(gap.left.y * 1e3, 0)),
            result: length(gap.length_m()),
        }],
        ..verdict
    }
}

/// Rounding of a count.
const ROUNDING: f64 = 1e-9;
