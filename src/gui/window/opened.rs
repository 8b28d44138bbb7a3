//! The opened verdict by name, so that it stays open when the order of the list changes.

use crate::analysis::{Results, Verdict};
use crate::gui::VerdictAt;
use crate::problem::Place;

/// Which verdict is open, and of which revision its place in the list is.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct OpenVerdict {
    pub(super) revision: u64,
    at: VerdictAt,
    criterion: &'static str,
    place: Place,
}

impl OpenVerdict {
    pub(super) fn of(results: &Results, at: VerdictAt, revision: u64) -> Option<OpenVerdict> {
        let verdict = at.find(results)?;
        Some(OpenVerdict { revision, at, criterion: verdict.criterion, place: verdict.place.clone() })
    }

    /// The same verdict in other results, at the same place if there still is one.
    pub(super) fn find(&self, results: &Results) -> Option<VerdictAt> {
        let verdicts = self.at.list(results);
        let same = |v: &&Verdict| v.criterion == self.criterion;
        let here = verdicts.iter().position(|v| same(&v) && v.place == self.place);
        here.or_else(|| verdicts.iter().position(|v| same(&v))).map(|i| self.at.with_idx(i))
    }
}
