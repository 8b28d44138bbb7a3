//! Roof contact: how hard the settled liquid presses on the shut roof, against a requirement record.
//!
//! A wall counts as roof where its outward normal lies within 45 degrees of the tank's z. Without a record there is
//! no limit to judge by, and the contact is reported as it is.

use crate::problem::Place;
use crate::study::Limit;
use crate::units::{Measure, Phrase, Quantity, fixed, number};

use super::{Absent, Context, Criterion, Outcome, RestsOn, Sense, Verdict, View, WorkLine};

pub(super) const CRITERION: Criterion = Criterion { name: NAME, rests_on: RestsOn::Size, judge };

const NAME: &str = "Roof contact";

fn judge(context: &Context) -> Outcome {
    let limit = |l: &Limit| if let Limit::RoofPressure(pa) = l { Some(*pa) } else { None };
    let verdicts = context.by_records(limit, |limit_pa| context.worse(|view| verdict(context, view, limit_pa)));
    if !verdicts.is_empty() {
        return Outcome { verdicts, absent: Vec::new() };
    }
    let contact = context.settled().settled.map(|settled| settled.roof.as_ref());
    let reason = match contact {
        Err(_) => "no roof limit is given".into(),
        Ok(None) => "the settled liquid does not reach the roof".into(),
        Ok(Some(roof)) => Phrase::new(
            "no roof limit is given; the liquid wets {} of roof, at up to {}",
            [
                Measure::new(Quantity::Length, roof.wetted_length_m),
                Measure::new(Quantity::GagePressure, roof.peak_pa),
            ],
        ),
    };
    let section = &context.study.study().section;
    let place_words = match contact {
        Ok(Some(roof)) => section.edge_label(roof.edge_idx),
        _ => "roof".to_owned(),
    };
    Outcome { verdicts, absent: vec![Absent { criterion: NAME, place_words, reason }] }
}

fn verdict(context: &Context, view: &View, limit_pa: f64) -> Verdict {
    let settled = match view.judged() {
        Ok(settled) => settled,
        Err(reason) => return context.not_judged(NAME, Sense::AtMost, reason.to_owned()),
    };
    let pressure = |pa: f64| Measure::new(Quantity::GagePressure, pa);
    let Some(roof) = &settled.roof else {
        return Verdict {
            place_words: "roof".to_owned(),
            remark: "the settled liquid does not reach the roof".to_owned(),
            gravity_used: Context::gravity_used(0.0, limit_pa),
            ..context.verdict(NAME, pressure(0.0), pressure(limit_pa), Sense::AtMost)
        };
    };
    let weight = context.study.study().liquid.weight_pa_per_m(context.gravity.magnitude);
    Verdict {
        place: Place::Edge(roof.edge_idx),
        place_words: context.study.study().section.edge_label(roof.edge_idx),
        at: Some(roof.at),
        gravity_used: Context::gravity_used(roof.peak_pa, limit_pa),
        working: vec![WorkLine {
            symbols: "p = ρ |G| (v_{surface} − v)".to_owned(),
            numbers: format!("{} Pa/m × {} m", number(weight, 4), fixed(roof.peak_pa / weight, 3)),
            result: pressure(roof.peak_pa),
        }],
        ..context.verdict(NAME, pressure(roof.peak_pa), pressure(limit_pa), Sense::AtMost)
    }
}
