//! Vent path: with the tank level, at rest and filled slowly from below, no gas may stay in any cell, by requirement
//! record. What stays is what stands above the lowest edge over which gas would get to a mouth. Source: [LayoutGeometry].

use crate::plates::unvented;
use crate::study::Limit;
use crate::units::{Measure, Phrase, Quantity};

use super::{NOTHING, Outcome, Sense, Standing};

const NAME: &str = "Vent path";

pub(super) fn judge(standing: &Standing) -> Outcome {
    let kind = |limit: &Limit| matches!(limit, Limit::VentPath).then_some(());
    if standing.study.mouths().is_empty() {
        let reason = || "the tank has no mouth that gas could get out by";
        let verdict = |()| vec![standing.not_judged(NAME, Sense::AtMost, reason().to_owned())];
        return standing.by_records(NAME, kind, verdict, NOTHING, || reason().into());
    }
    let remnants = unvented(standing.study.region(), &standing.study.study().section.width);
    let verdict = |()| vec![standing.left_behind(NAME, &remnants, "V_{gas}", "gas")];
    standing.by_records(NAME, kind, verdict, NOTHING, || {
        let left: f64 = remnants.iter().map(|r| r.volume_m3).sum();
        if left > 0.0 {
            let left = Measure::new(Quantity::Volume, left);
            return Phrase::new("no vent path is asked; {} of gas stays in when the tank is filled", [left]);
        }
        "no vent path is asked; the gas of every cell gets out".into()
    })
}
