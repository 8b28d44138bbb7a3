//! Pressure: peak gage pressure at any wall, gas included, against a requirement record.
//! Source: [RigidAcceleration].

use crate::study::Limit;
use crate::units::{Measure, Phrase, Quantity, fixed, number};

use super::{Absent, Context, Criterion, Outcome, Sense, Verdict, WorkLine};

pub(super) const CRITERION: Criterion = Criterion { name: NAME, judge };

const NAME: &str = "Pressure";

fn judge(context: &Context) -> Outcome {
    let mut outcome = Outcome::default();
    let limits = context.records(|l| if let Limit::WallPressure(pa) = l { Some(*pa) } else { None });
    for (record_idx, limit_pa) in limits {
        outcome.verdicts.push(Verdict {
            unconfirmed_record: context.unconfirmed(Some(record_idx)),
            ..verdict(context, limit_pa)
        });
    }
    if let (true, Ok(settled)) = (outcome.verdicts.is_empty(), context.settled) {
        let peak = Measure::new(Quantity::GagePressure, settled.peak_pa);
        outcome.absent.push(Absent {
            criterion: NAME,
            place_words: "walls".to_owned(),
            reason: Phrase::new("no pressure limit is given; the highest gage pressure is {}", [peak]),
        });
    }
    outcome
}

fn verdict(context: &Context, limit_pa: f64) -> Verdict {
    if let Some(reason) = &context.blocked {
        return context.not_judged(NAME, Sense::AtMost, reason.clone());
    }
    let settled = match context.settled {
        Ok(settled) => settled,
        Err(reason) => return context.not_judged(NAME, Sense::AtMost, reason.to_owned()),
    };
    let pressure = |pa: f64| Measure::new(Quantity::GagePressure, pa);
    let study = context.study.study();
    let weight = study.liquid.density_kg_per_m3 * context.gravity.magnitude;
    let gas = study.ullage_gage_pa;
    let words = settled.edges.iter().find(|e| e.place == settled.peak_place).map(|e| e.name.clone());
    Verdict {
        place: settled.peak_place.clone(),
        place_words: words.unwrap_or_else(|| "walls".to_owned()),
        at: Some(settled.peak_at),
        working: vec![WorkLine {
            symbols: "p = p_{gas} + ρ |G| (v_{surface} − v)".to_owned(),
            numbers: format!(
                "{} kPa + {} Pa/m × {} m",
                number(gas / 1e3, 3),
                number(weight, 4),
                fixed((settled.peak_pa - gas) / weight, 3)
            ),
            result: pressure(settled.peak_pa),
        }],
        ..context.verdict(NAME, pressure(settled.peak_pa), pressure(limit_pa), Sense::AtMost)
    }
}
