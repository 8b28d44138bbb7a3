//! View state, and what panels propose. Nothing here is part of the document.

use crate::analysis::{CaseResult, Results, Verdict};
use crate::app::Edit;
use crate::geom::Point;
use crate::units::UnitSystem;

use super::{Command, Selected, Stage};

/// What is chosen, how it is shown. Panels may change it in place.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct View {
    /// The load case on the board.
    pub case_idx: usize,
    /// What is chosen.
    pub selected: Option<Selected>,
    /// The verdict whose working is open.
    pub open_verdict: Option<VerdictAt>,
    /// The state of the case that the board shows; none: that of the open verdict's bound, else the settled one.
    pub stage: Option<Stage>,
    /// Units shown.
    pub units: UnitSystem,
    /// Board camera: points a metre, and the section point in the middle; none until first fitted.
    pub camera: Option<Camera>,
    /// The pen that draws a plate, while the user holds it.
    pub pen: Option<Pen>,
    /// What the status line says at the left: position under the pointer, or why something snapped.
    pub status: String,
}

impl View {
    /// The state that the board shows of a case.
    pub fn stage_of(&self, case: &CaseResult) -> Stage {
        let verdict = match self.open_verdict {
            Some(VerdictAt::Case(case_idx, i)) if case_idx == self.case_idx => case.verdicts.get(i),
            _ => None,
        };
        let wishes = [self.stage, verdict.and_then(|v| v.bound).map(Stage::Under)];
        wishes.into_iter().flatten().find(|stage| stage.state(case).is_some()).unwrap_or_default()
    }
}

/// Where in the results a verdict stands.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum VerdictAt {
    /// Of a load case: (case, verdict).
    Case(usize, usize),
    /// Of the layout of plates, judged once for the tank standing level and at rest.
    Layout(usize),
}

impl VerdictAt {
    /// The load case that it is of.
    pub fn case_idx(self) -> Option<usize> {
        match self {
            VerdictAt::Case(case_idx, _) => Some(case_idx),
            VerdictAt::Layout(_) => None,
        }
    }

    /// The verdicts among which it stands; none where there is no such case.
    pub fn list(self, results: &Results) -> &[Verdict] {
        match self {
            VerdictAt::Case(case_idx, _) => results.cases.get(case_idx).map_or(&[], |case| &case.verdicts),
            VerdictAt::Layout(_) => &results.layout.verdicts,
        }
    }

    /// The verdict itself.
    pub fn find(self, results: &Results) -> Option<&Verdict> {
        let (VerdictAt::Case(_, i) | VerdictAt::Layout(i)) = self;
        self.list(results).get(i)
    }

    /// Another one of the same list.
    pub fn with_idx(self, idx: usize) -> VerdictAt {
        match self {
            VerdictAt::Case(case_idx, _) => VerdictAt::Case(case_idx, idx),
            VerdictAt::Layout(_) => VerdictAt::Layout(idx),
        }
    }
}

/// The pen that draws a plate.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Pen {
    /// Where the plate begins, once that is set.
    pub from: Option<Point>,
}

/// Where the board looks.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Camera {
    /// Screen points a metre.
    pub points_per_m: f32,
    /// Section point (s, z) in the middle of the board, metres.
    pub center_m: [f64; 2],
}

/// What a panel proposes; applied in one place at the end of the frame.
#[derive(Clone, Debug)]
pub enum Proposal {
    /// Change the document.
    Edit(Edit),
    /// Carry out a command.
    Run(Command),
    /// A drag starts: edits until its end are one step with these words.
    BeginGesture(String),
    /// The drag ends.
    EndGesture,
    /// The drag is called off.
    CancelGesture,
}
