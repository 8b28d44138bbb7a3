//! The states of a load case that the board can show: under each bound, and back at rest.

use crate::analysis::{Bound, CaseResult, Settled};
use crate::geom::Vec2;

/// One of them.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Stage {
    /// At the case, openings open or shut.
    Under(Bound),
    /// Released, back at rest.
    Released,
}

impl Default for Stage {
    fn default() -> Stage {
        Stage::Under(Bound::Settled)
    }
}

impl Stage {
    /// In the order shown.
    pub const ALL: [Stage; 3] = [Stage::Under(Bound::Settled), Stage::Under(Bound::Sealed), Stage::Released];

    /// Those that a case has.
    pub fn of(case: &CaseResult) -> impl Iterator<Item = Stage> {
        Stage::ALL.into_iter().filter(|stage| stage.state(case).is_some())
    }

    /// The state itself, or why there is none.
    pub fn state(self, case: &CaseResult) -> Option<&Result<Settled, String>> {
        match self {
            Stage::Under(bound) => case.state(bound),
            Stage::Released => case.released.as_ref(),
        }
    }

    /// Against effective gravity.
    pub fn up(self, case: &CaseResult) -> Option<Vec2> {
        match self {
            Stage::Under(_) => case.gravity.up,
            Stage::Released => (-(case.gravity.vec + case.accel)).try_normalize(0.0),
        }
    }

    /// The word shown for it.
    pub fn word(self) -> &'static str {
        match self {
            Stage::Under(bound) => bound.word(),
            Stage::Released => "released",
        }
    }

    /// What it is, in a sentence.
    pub fn words(self) -> &'static str {
        match self {
            Stage::Under(Bound::Settled) => "Levels have evened out through the openings",
            Stage::Under(Bound::Sealed) => "Nothing passes the openings during the event",
            Stage::Released => "Back at rest after a slow release: what stays trapped behind sills",
        }
    }
}
