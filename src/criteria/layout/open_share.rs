//! Open share: what upright plates in one plane leave open of the tank's cross-section there, against requirement records:
//! at least, at most. Their openings and the gaps that their free ends leave count alike, so that it does not matter as
//! which of the two a gap is drawn. Source: [LayoutGeometry].

use crate::plates::Divider;
use crate::study::Limit;
use crate::units::{Measure, Phrase, Quantity, number};

use super::{NOTHING, Outcome, Sense, Standing, Verdict, WorkLine, plate};

const NAME: &str = "Open share";

pub(super) fn judge(standing: &Standing) -> Outcome {
    let kind = |limit: &Limit| match *limit {
        Limit::OpenShareAtLeast(share) => Some((share, Sense::AtLeast)),
        Limit::OpenShareAtMost(share) => Some((share, Sense::AtMost)),
        _ => None,
    };
    let verdicts = |limit| standing.dividers.iter().map(|divider| verdict(standing, divider, limit)).collect();
    standing.by_records(NAME, kind, verdicts, NOTHING, || {
        let shares = || standing.dividers.iter().map(|d| Measure::new(Quantity::Share, d.open_share()));
        let by_size = |a: &Measure, b: &Measure| a.si.total_cmp(&b.si);
        match (shares().min_by(by_size), shares().max_by(by_size)) {
            (Some(least), Some(most)) => {
                Phrase::new("no open share is asked; plates leave {} to {} open", [least, most])
            }
            _ => "no open share is asked, and no plate stands upright".into(),
        }
    })
}

fn verdict(standing: &Standing, divider: &Divider, (limit, sense): (f64, Sense)) -> Verdict {
    let share = |share: f64| Measure::new(Quantity::Share, share);
    let (solid, section) = (number(divider.solid_m2, 4), number(divider.cross_section_m2, 4));
    Verdict {
        place: plate(divider.plate_idxs[0]),
        place_words: standing.divider_words(divider),
        at: Some(divider.at),
        working: vec![WorkLine {
            symbols: "open = 1 − A_{solid} / A_{section}".to_owned(),
            numbers: format!("1 − {solid} / {section} m²"),
            result: share(divider.open_share()),
        }],
        ..standing.verdict(NAME, share(divider.open_share()), share(limit), sense)
    }
}
