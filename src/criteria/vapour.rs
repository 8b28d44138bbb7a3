//! Vapour pressure: the lowest absolute pressure in the liquid against its vapour pressure and a margin.
//! Source: [VapourMargin].

use crate::sources::Source;
use crate::units::{Measure, Quantity, number};

use super::{Absent, Context, Criterion, Outcome, RestsOn, Sense, Verdict, WorkLine};

pub(super) const CRITERION: Criterion = Criterion { name: NAME, rests_on: RestsOn::Study, judge };

const NAME: &str = "Vapour pressure";

fn judge(context: &Context) -> Outcome {
    let Some(vapour_pa) = context.study.study().liquid.vapour_pressure_abs_pa else {
        let reason = "the liquid has no vapour pressure in this scenario".into();
        let absent = vec![Absent { criterion: NAME, place_words: "liquid".to_owned(), reason }];
        return Outcome { verdicts: Vec::new(), absent };
    };
    Outcome { verdicts: vec![verdict(context, vapour_pa)], absent: Vec::new() }
}

fn verdict(context: &Context, vapour_pa: f64) -> Verdict {
    let not_judged = |reason: &str| Verdict {
        source: Source::VapourMargin,
        ..context.not_judged(NAME, Sense::AtLeast, reason.to_owned())
    };
    let settled = match context.settled().judged() {
        Ok(settled) => settled,
        Err(reason) => return not_judged(reason),
    };
    let (margin, record_idx) = context.study.study().vapour_margin_pa();
    let pressure = |pa: f64| Measure::new(Quantity::AbsolutePressure, pa);
    let lowest = settled.lowest_abs_pa;
    let study = context.study.study();
    let kpa = |pa: f64| number(pa / 1e3, 4);
    Verdict {
        place_words: "free surface".to_owned(),
        at: settled.main_pool().and_then(|p| p.surface.first()).map(|c| c.left + (c.right - c.left) * 0.5),
        source: Source::VapourMargin,
        record: record_idx,
        unconfirmed_record: context.unconfirmed(record_idx),
        working: vec![
            WorkLine {
                symbols: "lowest = p_{air} + p_{gas}".to_owned(),
                numbers: format!("{} + {} kPa", kpa(study.air_pressure_abs_pa), kpa(study.ullage_gage_pa)),
                result: pressure(lowest),
            },
            WorkLine {
                symbols: "limit = p_v + margin".to_owned(),
                numbers: format!("{} + {} kPa", kpa(vapour_pa), kpa(margin)),
                result: pressure(vapour_pa + margin),
            },
        ],
        ..context.verdict(NAME, pressure(lowest), pressure(vapour_pa + margin), Sense::AtLeast)
    }
}
