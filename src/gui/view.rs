//! View state, and what panels propose. Nothing here is part of the document.

use crate::analysis::CaseResult;
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
    /// The verdict whose working is open: (case, verdict).
    pub open_verdict: Option<(usize, usize)>,
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
        let open = self.open_verdict.filter(|(case_idx, _)| *case_idx == self.case_idx);
        let verdict = open.and_then(|(_, verdict_idx)| case.verdicts.get(verdict_idx));
        let wishes = [self.stage, verdict.and_then(|v| v.bound).map(Stage::Under)];
        wishes.into_iter().flatten().find(|stage| stage.state(case).is_some()).unwrap_or_default()
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
