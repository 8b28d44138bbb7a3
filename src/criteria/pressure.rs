//! Pressure: peak gage pressure at any wall, gas included, against a requirement record.
//! Source: [RigidAcceleration].

use crate::problem::Place;
use crate::study::Limit;
use crate::units::{Measure, Phrase, Quantity, fixed, number};

use super::{Absent, Context, Criterion, Outcome, RestsOn, Sense, Verdict, View, WorkLine};

pub(super) const CRITERION: Criterion = Criterion { name: NAME, rests_on: RestsOn::Size, judge };

const NAME: &str = "Pressure";

fn judge(context: &Context) -> Outcome {
    let limit = |l: &Limit| if let Limit::WallPressure(pa) = l { Some(*pa) } else { None };
    let verdicts = context.by_records(limit, |limit_pa| context.worse(|view| verdict(context, view, limit_pa)));
    if !verdicts.is_empty() {
        return Outcome { verdicts, absent: Vec::new() };
    }
    let reason = match context.settled().settled {
        Ok(settled) => {
            let peak = Measure::new(Quantity::GagePressure, settled.peak_pa);
            Phrase::new("no pressure limit is given; the highest gage pressure is {}", [peak])
        }
        Err(_) => "no pressure limit is given".into(),
    };
    Outcome { verdicts, absent: vec![Absent { criterion: NAME, place_words: "walls".to_owned(), reason }] }
}

fn verdict(context: &Context, view: &View, limit_pa: f64) -> Verdict {
    let settled = match view.judged() {
        Ok(settled) => settled,
        Err(reason) => return context.not_judged(NAME, Sense::AtMost, reason.to_owned()),
    };
    let pressure = |pa: f64| Measure::new(Quantity::GagePressure, pa);
    let study = context.study.study();
    let weight = study.liquid.weight_pa_per_m(context.gravity.magnitude);
    let gas = study.ullage_gage_pa;
    let words = match settled.peak_place {
        Place::Plate { plate_idx, .. } => Some(settled.plates[plate_idx].name.clone()),
        _ => settled.edges.iter().find(|e| e.place == settled.peak_place).map(|e| e.name.clone()),
    };
    Verdict {
        place: settled.peak_place.clone(),
        place_words: words.unwrap_or_else(|| "walls".to_owned()),
        at: Some(settled.peak_at),
        gravity_used: Context::gravity_used(settled.peak_pa - gas, limit_pa - gas),
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
