//! The opened verdict by name, so that it stays open when the order of the list changes.

use crate::analysis::{Results, Verdict};
use crate::problem::Place;

/// Which verdict is open, and of which revision its place in the list is.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct OpenVerdict {
    pub(super) revision: u64,
    case_idx: usize,
    criterion: &'static str,
    place: Place,
}

impl OpenVerdict {
    pub(super) fn of(
        results: &Results,
        (case_idx, verdict_idx): (usize, usize),
        revision: u64,
    ) -> Option<OpenVerdict> {
        let verdict = results.cases.get(case_idx)?.verdicts.get(verdict_idx)?;
        Some(OpenVerdict { revision, case_idx, criterion: verdict.criterion, place: verdict.place.clone() })
    }

    /// The same verdict in other results, at the same place if there still is one.
    pub(super) fn find(&self, results: &Results) -> Option<(usize, usize)> {
        let verdicts = &results.cases.get(self.case_idx)?.verdicts;
        let same = |v: &&Verdict| v.criterion == self.criterion;
        let here = verdicts.iter().position(|v| same(&v) && v.place == self.place);
        here.or_else(|| verdicts.iter().position(|v| same(&v))).map(|v| (self.case_idx, v))
    }
}
