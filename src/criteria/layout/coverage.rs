//! Plate coverage: the solid area of upright plates in one plane, as a share of the tank's cross-section there, against a
//! requirement record. Of a slanted plate the area seen along s counts. Source: [LayoutGeometry].

use crate::plates::Divider;
use crate::study::Limit;
use crate::units::{Measure, Phrase, Quantity, number};

use super::{Absent, NOTHING, Outcome, Sense, Standing, Verdict, WorkLine, plate};

const NAME: &str = "Plate coverage";

pub(super) fn judge(standing: &Standing) -> Outcome {
    let kind = |limit: &Limit| if let Limit::PlateCoverage(share) = *limit { Some(share) } else { None };
    let verdicts = |least| standing.dividers.iter().map(|divider| verdict(standing, divider, least)).collect();
    let mut outcome = standing.by_records(NAME, kind, verdicts, NOTHING, || {
        match standing.dividers.iter().map(Divider::coverage).reduce(f64::min) {
            Some(least) => {
                let least = Measure::new(Quantity::Share, least);
                Phrase::new("no coverage limit is given; the least that a plate covers is {}", [least])
            }
            None => "no coverage limit is given, and no plate stands upright".into(),
        }
    });
    let lying = |p: &(usize, &crate::section::Placed)| !p.1.is_upright();
    for (plate_idx, _) in standing.study.region().plates().iter().enumerate().filter(lying) {
        let reason = "it lies rather than stands, and covers no cross-section".into();
        outcome.absent.push(Absent { criterion: NAME, place_words: standing.plate_words(plate_idx), reason });
    }
    outcome
}

fn verdict(standing: &Standing, divider: &Divider, least: f64) -> Verdict {
    let share = |share: f64| Measure::new(Quantity::Share, share);
    let mut verdict = standing.verdict(NAME, share(divider.coverage()), share(least), Sense::AtLeast);
    let missing_m2 = least * divider.cross_section_m2 - divider.solid_m2;
    if missing_m2 > 0.0 {
        verdict.mend = vec![Phrase::new("To hold, cover {} more", [Measure::new(Quantity::Area, missing_m2)])];
    }
    Verdict {
        place: plate(divider.plate_idxs[0]),
        place_words: standing.divider_words(divider),
        at: Some(divider.at),
        working: vec![WorkLine {
            symbols: "coverage = A_{solid} / A_{section}".to_owned(),
            numbers: format!("{} / {} m²", number(divider.solid_m2, 4), number(divider.cross_section_m2, 4)),
            result: share(divider.coverage()),
        }],
        ..verdict
    }
}
