//! The open document: study, file, undo history and results of the present revision.

use std::path::PathBuf;
use std::sync::{Arc, OnceLock};

use crate::analysis::{self, Results, SolvedPanels};
use crate::problem::Problem;
use crate::study::{Study, ValidStudy};

use super::edit::{Edit, apply};
use super::mend::{Mend, mend};

/// How many steps can be undone.
const HISTORY_STEPS: usize = 500;

/// A state in the history and the words for the edit that left it.
#[derive(Clone, Debug)]
pub struct Step {
    /// `Move vertex 3`.
    pub label: String,
    study: Arc<Study>,
}

/// What follows from the study: results, or the faults that prevent them.
#[derive(Clone, Debug)]
pub enum Derived {
    /// Judged.
    Judged {
        /// The study that was judged.
        study: Arc<ValidStudy>,
        /// Its results.
        results: Arc<Results>,
    },
    /// Not judged; the last good results, if any, are stale.
    Faulty {
        /// Every fault and warning.
        problems: Vec<Problem>,
        /// Last results, greyed.
        stale: Option<(Arc<ValidStudy>, Arc<Results>)>,
    },
}

/// The open document.
#[derive(Clone, Debug)]
pub struct Document {
    study: Arc<Study>,
    saved: Arc<Study>,
    /// The file it came from or was saved to.
    pub path: Option<PathBuf>,
    undo: Vec<Step>,
    redo: Vec<Step>,
    gesture: Option<(String, Arc<Study>)>,
    revision: u64,
    derived: Derived,
    panels: SolvedPanels,
    /// One for each problem, worked out when first asked for.
    mends: OnceLock<Vec<Option<Mend>>>,
}

impl Document {
    /// Opens a study, which counts as saved.
    pub fn new(study: Study, path: Option<PathBuf>) -> Document {
        let study = Arc::new(study);
        let mut panels = SolvedPanels::default();
        let derived = derive(&study, None, &mut panels);
        Document {
            saved: study.clone(),
            study,
            path,
            undo: vec![],
            redo: vec![],
            gesture: None,
            revision: 0,
            derived,
            panels,
            mends: OnceLock::new(),
        }
    }

    /// The study as it stands.
    pub fn study(&self) -> &Study {
        &self.study
    }

    /// Counts up with every change; derived things are tagged with it.
    pub fn revision(&self) -> u64 {
        self.revision
    }

    /// Results of the present revision, or its faults.
    pub fn derived(&self) -> &Derived {
        &self.derived
    }

    /// Faults and warnings of the present revision.
    pub fn problems(&self) -> &[Problem] {
        match &self.derived {
            Derived::Judged { results, .. } => &results.warnings,
            Derived::Faulty { problems, .. } => problems,
        }
    }

    /// For each of [`Document::problems`], the one step that mends it, where there is an obvious one.
    pub fn mends(&self) -> &[Option<Mend>] {
        self.mends.get_or_init(|| self.problems().iter().map(|problem| mend(&self.study, problem)).collect())
    }

    /// Whether the study differs from what was last saved or opened.
    pub fn is_unsaved(&self) -> bool {
        *self.study != *self.saved
    }

    /// The present study is now in the file `path`.
    pub fn mark_saved(&mut self, path: PathBuf) {
        self.saved = self.study.clone();
        self.path = Some(path);
    }

    /// Applies an edit. Within a gesture the step is recorded once, when the gesture ends.
    pub fn edit(&mut self, edit: &Edit) {
        let mut next = (*self.study).clone();
        apply(&mut next, edit);
        if next == *self.study {
            return;
        }
        if self.gesture.is_none() {
            self.push_undo(edit.label(), self.study.clone());
        }
        self.set(Arc::new(next));
    }

    /// Starts a gesture: edits until [`Document::end_gesture`] become one step called `label`.
    pub fn begin_gesture(&mut self, label: impl Into<String>) {
        self.end_gesture();
        self.gesture = Some((label.into(), self.study.clone()));
    }

    /// Ends the gesture, if one is under way, and records its step if anything changed.
    pub fn end_gesture(&mut self) {
        if let Some((label, before)) = self.gesture.take()
            && *before != *self.study
        {
            self.push_undo(label, before);
        }
    }

    /// Drops the gesture and what it changed.
    pub fn cancel_gesture(&mut self) {
        if let Some((_, before)) = self.gesture.take()
            && *before != *self.study
        {
            self.set(before);
        }
    }

    /// The label of what undo would take back.
    pub fn undo_label(&self) -> Option<&str> {
        self.undo.last().map(|step| step.label.as_str())
    }

    /// The label of what redo would bring back.
    pub fn redo_label(&self) -> Option<&str> {
        self.redo.last().map(|step| step.label.as_str())
    }

    /// Takes the last step back.
    pub fn undo(&mut self) {
        self.end_gesture();
        if let Some(Step { label, study }) = self.undo.pop() {
            self.redo.push(Step { label, study: self.study.clone() });
            self.set(study);
        }
    }

    /// Brings the last undone step back.
    pub fn redo(&mut self) {
        self.end_gesture();
        if let Some(Step { label, study }) = self.redo.pop() {
            self.undo.push(Step { label, study: self.study.clone() });
            self.set(study);
        }
    }

    fn push_undo(&mut self, label: String, study: Arc<Study>) {
        self.redo.clear();
        self.undo.push(Step { label, study });
        if self.undo.len() > HISTORY_STEPS {
            self.undo.remove(0);
        }
    }

    fn set(&mut self, study: Arc<Study>) {
        self.study = study;
        self.revision += 1;
        let stale = match &self.derived {
            Derived::Judged { study, results } => Some((study.clone(), results.clone())),
            Derived::Faulty { stale, .. } => stale.clone(),
        };
        self.derived = derive(&self.study, stale, &mut self.panels);
        self.mends = OnceLock::new();
    }
}

fn derive(study: &Study, stale: Option<(Arc<ValidStudy>, Arc<Results>)>, panels: &mut SolvedPanels) -> Derived {
    match study.validate() {
        Ok(valid) => {
            let results = Arc::new(analysis::run_again(&valid, panels));
            Derived::Judged { study: Arc::new(valid), results }
        }
        Err(problems) => Derived::Faulty { problems, stale },
    }
}
