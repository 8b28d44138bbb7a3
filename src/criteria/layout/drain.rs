//! Drain path: with the tank level, at rest and emptied slowly, no liquid may stay in any cell, by requirement record. What
//! stays is what stands below sills that do not lead down to the sump. Where no sump is given, or for compartments
//! that it does not lie in, the lowest point counts as one. Source: [LayoutGeometry].

use crate::plates::{Remnant, undrained};
use crate::section::Wall;
use crate::study::Limit;
use crate::units::{Measure, Phrase, Quantity};

use super::{NOTHING, Outcome, Standing, Verdict};

const NAME: &str = "Drain path";

pub(super) fn judge(standing: &Standing) -> Outcome {
    let kind = |limit: &Limit| matches!(limit, Limit::DrainPath).then_some(());
    let study = standing.study.study();
    let remnants = undrained(standing.study.region(), &study.section.width, study.sump);
    standing.by_records(
        NAME,
        kind,
        |()| vec![verdict(standing, &remnants)],
        NOTHING,
        || {
            let left: f64 = remnants.iter().map(|r| r.volume_m3).sum();
            if left > 0.0 {
                let left = Measure::new(Quantity::Volume, left);
                return Phrase::new("no drain path is asked; {} stays behind when the tank is emptied", [left]);
            }
            "no drain path is asked; every cell drains".into()
        },
    )
}

fn verdict(standing: &Standing, remnants: &[Remnant]) -> Verdict {
    let mut verdict = standing.left_behind(NAME, remnants, "V_{stays}", "liquid");
    let mut feet: Vec<usize> = remnants.iter().filter_map(plate_idx).collect();
    feet.sort_unstable();
    feet.dedup();
    if !feet.is_empty() {
        let names: Vec<String> = feet.into_iter().map(|i| standing.plate_words(i)).collect();
        verdict.mend = vec![Phrase::new(format!("To hold, open {} at the foot", names.join(" and ")), [])];
    }
    let n_compartments = standing.study.region().open().n_parts();
    let note = match (standing.study.study().sump, n_compartments) {
        (None, 1) => "no sump is given: emptied at its lowest point",
        (None, _) => "no sump is given: each compartment is emptied at its lowest point",
        (Some(_), 1) => return verdict,
        (Some(_), _) => "compartments without the sump are emptied at their lowest points",
    };
    verdict.remark = format!("{}; {note}", verdict.remark);
    verdict
}

/// The plate that holds liquid back.
fn plate_idx(remnant: &Remnant) -> Option<usize> {
    match remnant.sill?.1 {
        Wall::Plate { plate_idx, .. } => Some(plate_idx),
        _ => None,
    }
}
