//! Freeboard: settled rise at the mouth plus the allowance, against the height of the mouth above the still level.
//!
//! Walls beside a vertical rim are taken as carried on. Where they are not vertical, containment is judged instead.
//! Source: [RigidAcceleration].

use crate::geom::Vec2;
use crate::num::bisect;
use crate::progress::Progress;
use crate::sources::Source;
use crate::statics::{Carried, Rims, Route, Tilted};
use crate::study::ValidStudy;
use crate::units::{Measure, Phrase, Quantity, fixed};

use super::{Absent, Context, Criterion, Outcome, RestsOn, Sense, State, Verdict, View, WorkLine};

pub(super) const CRITERION: Criterion = Criterion { name: NAME, rests_on: RestsOn::Direction, judge };

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
        let Some(rims) = context.settled().rims else {
            outcome.absent.push(absent("effective gravity does not point toward the floor"));
            continue;
        };
        match rims.carried()[mouth_idx] {
            Carried::On => outcome.verdicts.push(context.worse(|view| verdict(context, view, mouth_idx))),
            Carried::Slanted => outcome.absent.push(absent("a wall beside it is not vertical")),
            Carried::Covered => outcome.absent.push(absent("part of the section lies above it")),
            Carried::Sideways => outcome.absent.push(absent("it does not face up")),
        }
    }
    outcome
}

fn verdict(context: &Context, view: &View, mouth_idx: usize) -> Verdict {
    let (allowance, record_idx) = context.study.study().freeboard_allowance_m();
    let place = |verdict: Verdict| {
        let brim = view.rims.map(|r| r.brims()[mouth_idx]);
        Verdict {
            place: brim.map_or(verdict.place.clone(), |b| context.mouth_place(mouth_idx, b)),
            place_words: brim.map_or_else(String::new, |b| context.mouth_words(mouth_idx, b)),
            at: brim,
            source: Source::RigidAcceleration,
            record: record_idx,
            unconfirmed_record: context.unconfirmed(record_idx),
            ..verdict
        }
    };
    let not_judged = |reason: &str| place(context.not_judged(NAME, Sense::AtMost, reason.to_owned()));
    if let Some(reason) = &view.blocked {
        return not_judged(reason);
    }
    let Some(rims) = view.rims else { return not_judged("effective gravity does not point toward the floor") };
    let (Some(_), Some(risen_z_m)) = (context.study.common(), view.risen_z_m[mouth_idx]) else {
        return not_judged("the liquid could not be followed to this case");
    };
    let mouth_z_m = mouth_z_m(context.study, mouth_idx);
    let (required, available) = (risen_z_m - context.still_z_m + allowance, mouth_z_m - context.still_z_m);
    let length = |m: f64| Measure::new(Quantity::Length, m);
    let mut verdict = place(context.verdict(NAME, length(required), length(available), Sense::AtMost));
    if context.is_brief {
        return verdict;
    }
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
            numbers: format!("{} − {} mm", mm(mouth_z_m), mm(context.still_z_m)),
            result: length(available),
        },
    ];
    if verdict.state == State::Fails {
        let fill = FreeboardFill::new(context.study, rims, view.route, mouth_idx, allowance);
        if let Some(volume) = fill.highest_volume_m3(&Progress::default()) {
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
    route: Route,
    tilted: Tilted<'a>,
    still: Option<Tilted<'a>>,
    mouth_idx: usize,
    allowance_m: f64,
}

impl<'a> FreeboardFill<'a> {
    /// For the mouth `mouth_idx`, whose walls are carried on in `rims`.
    pub fn new(
        study: &'a ValidStudy,
        rims: &'a Rims,
        route: Route,
        mouth_idx: usize,
        allowance_m: f64,
    ) -> FreeboardFill<'a> {
        let tilted = rims.tilted();
        let still = study.common().map(|s| s.vessel.tilted(Vec2::y()));
        FreeboardFill { study, rims, route, tilted, still, mouth_idx, allowance_m }
    }

    /// (required, available) freeboard, m, at a volume of the common fill; none where there is none, or where it cannot
    /// be followed.
    pub fn at(&self, volume_m3: f64) -> Option<(f64, f64)> {
        let still_z = self.still.as_ref()?.level_for_volume(volume_m3);
        let (region, width) = (self.study.region(), &self.study.study().section.width);
        let starts = self.study.starts_with(volume_m3);
        let surface_z = self.rims.surface_z_m(&self.tilted, region, width, &starts, self.route, self.mouth_idx)?;
        Some((surface_z - still_z + self.allowance_m, mouth_z_m(self.study, self.mouth_idx) - still_z))
    }

    /// The highest volume at which the available freeboard covers the required one, m3; none where none does.
    /// Fills are sampled in steps of 1/64 of capacity, then the turn is refined; once stopped, what it gives means nothing.
    pub fn highest_volume_m3(&self, progress: &Progress) -> Option<f64> {
        const N_STEPS: u32 = 64;
        let capacity = self.study.common()?.vessel.capacity_m3();
        let fails = |volume: f64| {
            progress.is_stopped() || self.at(volume).is_none_or(|(required, available)| required > available)
        };
        let volume = |i: u32| capacity * f64::from(i) / f64::from(N_STEPS);
        let holds = (1..=N_STEPS).rev().find(|&i| !fails(volume(i)))?;
        if holds == N_STEPS {
            return Some(capacity);
        }
        Some(bisect(volume(holds), volume(holds + 1), 1e-12 * capacity, fails))
    }
}

/// z of a mouth's lowest point, m.
fn mouth_z_m(study: &ValidStudy, mouth_idx: usize) -> f64 {
    study.mouths()[mouth_idx].brim(study.region(), Vec2::y()).0
}
