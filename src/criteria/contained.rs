//! Contained: no liquid leaves a mouth; else how much, when it starts, and the highest fill that holds.
//!
//! The acceleration (or heel) at first spill is the limit; the volume that the brims hold on the way gives what is
//! spilled and the highest fill. Source: [BrimPath].

use crate::sources::Source;
use crate::statics::{Lip, PourOver};
use crate::units::{Measure, Phrase, Quantity, fixed, number};

use super::{Context, Criterion, Outcome, RestsOn, Sense, State, Verdict, View, WorkLine};

pub(super) const CRITERION: Criterion = Criterion { name: NAME, rests_on: RestsOn::Direction, judge };

/// Its name, which the curves look it up by.
pub const NAME: &str = "Contained";

fn judge(context: &Context) -> Outcome {
    Outcome { verdicts: vec![context.worse(|view| verdict(context, view))], absent: Vec::new() }
}

fn verdict(context: &Context, view: &View) -> Verdict {
    let not_judged = |reason: &str| Verdict {
        source: Source::BrimPath,
        ..context.not_judged(NAME, Sense::AtMost, reason.to_owned())
    };
    if let Some(reason) = &view.blocked {
        return not_judged(reason);
    }
    let Some(way) = view.way else {
        return not_judged("the way from rest to this case leads through free fall");
    };
    let Some(stop) = &way.stop else {
        return not_judged("the liquid could not be followed to this case");
    };
    let volume = context.study.common().map_or(0.0, |s| s.volume_m3);
    let by_size = demand_and_limit(context, way);
    let holds_m3 = if by_size.is_some() && context.is_brief { None } else { (view.holds_m3)() };
    let (demand, limit) = match (by_size, holds_m3) {
        (Some(by_size), _) => by_size,
        (None, Some(m3)) => (Measure::new(Quantity::Volume, volume), Some(Measure::new(Quantity::Volume, m3))),
        (None, None) => return not_judged("what the brims hold on the way could not be worked out"),
    };
    let mut verdict = match limit {
        Some(limit) => context.verdict(NAME, demand, limit, Sense::AtMost),
        None => Verdict {
            state: State::Holds,
            demand: Some(demand),
            utilisation: Some(0.0),
            ..context.not_judged(NAME, Sense::AtMost, unlimited(context, way))
        },
    };
    verdict.source = Source::BrimPath;
    let governing = way.first.map(|(_, lip)| lip).or(way.governs);
    if let Some(Lip { mouth_idx, brim }) = governing {
        verdict.place = context.mouth_place(mouth_idx, brim);
        verdict.place_words = context.mouth_words(mouth_idx, brim);
        verdict.at = Some(brim);
    }
    if let (Some(holds_m3), false) = (holds_m3, context.is_brief) {
        let spill = Spill { holds_m3, spilled_m3: stop.spilled.iter().map(|s| s.volume_m3).sum() };
        verdict.working = working(context, &spill, governing, volume);
        if verdict.state == State::Fails {
            verdict.mend = mend(context, &spill, limit);
        }
    }
    verdict
}

/// What the mouths do on the way.
struct Spill {
    holds_m3: f64,
    spilled_m3: f64,
}

/// Acceleration against acceleration at first spill, heel against heel; the limit is none where it never spills.
/// Nothing where volume is to be compared with what the lowest brim holds: at rest on the level, and where nothing is known
/// beyond the case.
fn demand_and_limit(context: &Context, way: &PourOver) -> Option<(Measure, Option<Measure>)> {
    let accel = context.accel.norm();
    let phi = context.case.attitude.angle_rad().abs();
    let (quantity, size) = match (accel > 0.0, phi > 0.0) {
        (true, _) => (Quantity::Acceleration, accel),
        (false, true) => (Quantity::Angle, phi),
        (false, false) => return None,
    };
    if way.is_lost_beyond {
        return None;
    }
    let limit = way.first.map(|(share, _)| share * size).filter(|x| x.is_finite());
    Some((Measure::new(quantity, size), limit.map(|x| Measure::new(quantity, x))))
}

/// Why there is no limit.
fn unlimited(context: &Context, way: &PourOver) -> String {
    if context.study.mouths().is_empty() {
        "the tank has no mouth: nothing can leave".to_owned()
    } else if !way.turns {
        "this acceleration does not turn effective gravity; at free fall and beyond nothing is judged".to_owned()
    } else {
        "no acceleration along this line makes it spill".to_owned()
    }
}

fn working(context: &Context, spill: &Spill, governing: Option<Lip>, volume: f64) -> Vec<WorkLine> {
    let mut lines = Vec::new();
    if let Some(tilt) = context.gravity.tilt_rad {
        let g = context.gravity.vec;
        lines.push(WorkLine {
            symbols: "θ = atan2(G_s, −G_z)".to_owned(),
            numbers: format!("atan2({}, {}) m/s²", number(g.x, 4), number(-g.y, 4)),
            result: Measure::new(Quantity::Angle, tilt),
        });
    }
    if let Some(lip) = governing {
        lines.push(WorkLine {
            symbols: "V_{holds} = min V(v ≤ v_{brim}) over the ramp".to_owned(),
            numbers: format!("brim s {} m, z {} m", fixed(lip.brim.x, 3), fixed(lip.brim.y, 3)),
            result: Measure::new(Quantity::Volume, spill.holds_m3),
        });
    }
    if spill.holds_m3.is_finite() {
        lines.push(WorkLine {
            symbols: "V_{spilled} = max(0, V − V_{holds})".to_owned(),
            numbers: format!("max(0, {} − {}) m³", number(volume, 4), number(spill.holds_m3, 4)),
            result: Measure::new(Quantity::Volume, spill.spilled_m3),
        });
    }
    lines
}

fn mend(context: &Context, spill: &Spill, limit: Option<Measure>) -> Vec<Phrase> {
    let mut lines = vec![context.fill_that_holds(spill.holds_m3)];
    if let Some(limit) = limit.filter(|l| l.si > 0.0) {
        lines.push(Phrase::new("or stay below {}", [limit]));
    }
    lines
}
