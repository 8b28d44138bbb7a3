//! The criteria: one a file, and the table of them. Each turns the physics of one load case into verdicts.
//!
//! Knows no files and no screens.

mod contained;
mod context;
mod freeboard;
mod layout;
mod pressure;
mod roof;
mod strength;
mod vapour;
mod verdict;

pub use contained::NAME as CONTAINED;
pub use context::{Context, View};
pub use freeboard::{FreeboardFill, NAME as FREEBOARD};
pub use layout::{NAME as LAYOUT, Standing, judge_layout};
pub use verdict::*;

use crate::study::{Limit, ValidStudy};

/// What a criterion gives: verdicts, and checks that do not apply with the reason.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Outcome {
    /// Judged, or not judged with the reason.
    pub verdicts: Vec<Verdict>,
    /// Not applicable.
    pub absent: Vec<Absent>,
}

/// What of a load case decides a criterion, the study and how the tank stands being given.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum RestsOn {
    /// Nothing: it reads the same in every load case.
    Study,
    /// The direction of effective gravity and the way to it, not its size.
    Direction,
    /// Its size too. Along one direction, what no longer holds does not hold under more either.
    Size,
}

/// One criterion.
pub struct Criterion {
    /// Its name, as shown.
    pub name: &'static str,
    /// What decides it.
    pub rests_on: RestsOn,
    /// Judges one load case.
    pub judge: fn(&Context) -> Outcome,
}

/// Every criterion, in the order in which they are run.
pub const CRITERIA: &[Criterion] = &[
    contained::CRITERION,
    freeboard::CRITERION,
    roof::CRITERION,
    pressure::CRITERION,
    strength::CRITERION,
    vapour::CRITERION,
];

/// Runs every criterion; verdicts worst first.
pub fn judge(context: &Context) -> Outcome {
    judge_those(context, |_| true)
}

/// Runs the criteria that rest on something `is_wanted`; verdicts worst first.
pub fn judge_those(context: &Context, is_wanted: impl Fn(RestsOn) -> bool) -> Outcome {
    let mut all = Outcome::default();
    for criterion in CRITERIA.iter().filter(|c| is_wanted(c.rests_on)) {
        let outcome = (criterion.judge)(context);
        all.verdicts.extend(outcome.verdicts);
        all.absent.extend(outcome.absent);
    }
    all.verdicts.sort_by(Verdict::order);
    all
}

/// One verdict for each requirement record of a kind, from the record's value.
fn by_records<T>(study: &ValidStudy, kind: fn(&Limit) -> Option<T>, verdict: impl Fn(T) -> Verdict) -> Vec<Verdict> {
    let by_record = |(i, limit)| {
        let (record, unconfirmed_record) = (Some(i), unconfirmed(study, Some(i)));
        Verdict { record, unconfirmed_record, ..verdict(limit) }
    };
    study.study().records_of(kind).map(by_record).collect()
}

/// The index of a record when it is not confirmed.
fn unconfirmed(study: &ValidStudy, record_idx: Option<usize>) -> Option<usize> {
    record_idx.filter(|&i| !study.study().records[i].confirmed)
}
