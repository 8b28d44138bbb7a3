//! Freeboard: settled rise at the mouth plus the allowance, against the height of the mouth above the still level.
//!
//! Walls beside a vertical rim are taken as carried on. Where they are not vertical, containment is judged instead.
//! Source: [RigidAcceleration].

use crate::geom::Vec2;
use crate::num::bisect;
use crate::sources::Source;
use crate::statics::{Carried, Rims, Tilted};
use crate::study::ValidStudy;
use crate::units::{Measure, Phrase, Quantity, fixed};

use super::{Absent, Context, Criterion, Outcome, Sense, State, Verdict, WorkLine};

pub(super) const CRITERION: Criterion = Criterion { name: NAME, judge };

/// Its name, which the curves look it up by.
pub const NAME: &str = "Freeboard";

fn judge(context: &Context) -> Outcome {
    let mut outcome = Outcome::default();
    for (mouth_idx, mouth) in context.study.mouths().iter().enumerate() {
        let absent = |reason: &str| Absent {
            criterion: NAME,
            place_words: mouth.name.clone(),
            reason: Phrase::new(format!("{reason}; judged by Contained"), []),
        };
        let Some(rims) = context.rims else {
            outcome.absent.push(absent("effective gravity does not point toward the floor"));
            continue;
        };
        match rims.carried()[mouth_idx] {
            Carried::On => outcome.verdicts.push(verdict(context, mouth_idx)),
            Carried::Slanted => outcome.absent.push(absent("a wall beside it is not vertical")),
            Carried::Covered => outcome.absent.push(absent("part of the section lies above it")),
            Carried::Sideways => outcome.absent.push(absent("it does not face up")),
        }
    }
    outcome
}

fn verdict(context: &Context, mouth_idx: usize) -> Verdict {
    let (allowance, record_idx) = context.study.study().freeboard_allowance_m();
    let place = |verdict: Verdict| {
        let brim = context.rims.map(|r| r.brims()[mouth_idx]);
        Verdict {
            place: brim.map_or(verdict.place.clone(), |b| context.mouth_place(mouth_idx, b)),
            place_words: brim.map_or_else(String::new, |b| context.mouth_words(mouth_idx, b)),
            at: brim,
            source: Source::RigidAcceleration,
            unconfirmed_record: context.unconfirmed(record_idx),
            ..verdict
        }
    };
    let not_judged = |reason: &str| place(context.not_judged(NAME, Sense::AtMost, reason.to_owned()));
    if let Some(reason) = &context.blocked {
        return not_judged(reason);
    }
    let Some(rims) = context.rims else { return not_judged("effective gravity does not point toward the floor") };
    let fill = FreeboardFill::new(context.study, rims, mouth_idx, allowance);
    let Some((required, available)) = fill.at(context.study.fill_volume_m3()) else {
        return not_judged("several pools");
    };
    let length = |m: f64| Measure::new(Quantity::Length, m);
    let mut verdict = place(context.verdict(NAME, length(required), length(available), Sense::AtMost));
    let mm = |m: f64| fixed(m * 1e3, 0);
    let rise = required - allowance;
    verdict.working = vec![
        WorkLine {
            symbols: "required = Δz_s + allowance".to_owned(),
            numbers: format!("{} + {} mm", mm(rise), mm(allowance)),
            result: length(required),
        },
        WorkLine {
            symbols: "available = z_{mouth} − z_{still}".to_owned(),
            numbers: format!("{} − {} mm", mm(fill.mouth_z_m()), mm(context.still_z_m)),
            result: length(available),
        },
    ];
    if verdict.state == State::Fails {
        if let Some(volume) = fill.highest_volume_m3() {
            verdict.mend.push(context.fill_that_holds(volume));
        }
        // Rounded up to the millimetre, so that the rim shown holds.
        let short = ((required - available) * 1e3).ceil() / 1e3;
        verdict.mend.push(Phrase::new("or brim {} higher", [length(short)]));
    }
    if context.case.onset_s.is_some() {
        verdict.remark = "settled rise only: a quick onset rises higher".to_owned();
    }
    verdict
}

/// Freeboard at one mouth as a function of the fill, along one direction.
pub struct FreeboardFill<'a> {
    study: &'a ValidStudy,
    rims: &'a Rims,
    tilted: Tilted<'a>,
    still: Tilted<'a>,
    mouth_idx: usize,
    allowance_m: f64,
}

impl<'a> FreeboardFill<'a> {
    /// For the mouth `mouth_idx`, whose walls are carried on in `rims`.
    pub fn new(study: &'a ValidStudy, rims: &'a Rims, mouth_idx: usize, allowance_m: f64) -> FreeboardFill<'a> {
        let tilted = rims.tilted();
        FreeboardFill { study, rims, tilted, still: study.tilted(Vec2::y()), mouth_idx, allowance_m }
    }

    /// (required, available) freeboard, m, at a volume; none where the liquid stands in several pools.
    pub fn at(&self, volume_m3: f64) -> Option<(f64, f64)> {
        let still_z = self.still.level_for_volume(volume_m3);
        let surface_z = self.rims.surface_z_m(&self.tilted, volume_m3, self.mouth_idx)?;
        Some((surface_z - still_z + self.allowance_m, self.mouth_z_m() - still_z))
    }

    /// z of the mouth's lowest point, m.
    pub fn mouth_z_m(&self) -> f64 {
        self.study.mouths()[self.mouth_idx].brim(self.study.region(), Vec2::y()).0
    }

    /// The highest volume at which the available freeboard covers the required one, m3; none where none does.
    /// Fills are sampled in steps of 1/64 of capacity, then the turn is refined.
    pub fn highest_volume_m3(&self) -> Option<f64> {
        const N_STEPS: u32 = 64;
        let capacity = self.study.capacity_m3();
        let fails = |volume: f64| self.at(volume).is_none_or(|(required, available)| required > available);
        let volume = |i: u32| capacity * f64::from(i) / f64::from(N_STEPS);
        let holds = (1..=N_STEPS).rev().find(|&i| !fails(volume(i)))?;
        if holds == N_STEPS {
            return Some(capacity);
        }
        Some(bisect(volume(holds), volume(holds + 1), 1e-12 * capacity, fails))
    }
}
