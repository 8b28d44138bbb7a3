//! What every panel is handed: the document to read, the view to change, and the list of what it proposes.

use std::sync::Arc;

use crate::analysis::{CaseResult, Results};
use crate::app::{Derived, Document, Edit};
use crate::study::{Study, ValidStudy};
use crate::units::{Measure, Quantity, Unit, UnitSystem};

use super::{Command, Look, Proposal, View};

/// What a panel works on. Nothing is changed in the document before the end of the frame.
pub struct Desk<'a> {
    /// The open document.
    pub doc: &'a Document,
    /// What is chosen and how it is shown.
    pub view: &'a mut View,
    /// Colours of the theme in use.
    pub look: &'static Look,
    /// What panels propose.
    pub out: &'a mut Vec<Proposal>,
}

impl<'a> Desk<'a> {
    /// The study as it stands.
    pub fn study(&self) -> &'a Study {
        self.doc.study()
    }

    /// The last results, and whether they are of an older, faultless state of the study.
    pub fn judged(&self) -> Option<Judged<'a>> {
        match self.doc.derived() {
            Derived::Judged { study, results } => Some(Judged { study, results, is_stale: false }),
            Derived::Faulty { stale: Some((study, results)), .. } => Some(Judged { study, results, is_stale: true }),
            Derived::Faulty { stale: None, .. } => None,
        }
    }

    /// The chosen case, judged.
    pub fn case(&self) -> Option<&'a CaseResult> {
        self.judged()?.results.cases.get(self.view.case_idx)
    }

    /// Proposes a change of the document.
    pub fn edit(&mut self, edit: Edit) {
        self.out.push(Proposal::Edit(edit));
    }

    /// Proposes a command.
    pub fn run(&mut self, command: Command) {
        self.out.push(Proposal::Run(command));
    }

    /// Units shown.
    pub fn units(&self) -> UnitSystem {
        self.view.units
    }

    /// The shown unit of a quantity.
    pub fn unit(&self, quantity: Quantity) -> Unit {
        quantity.unit(self.view.units)
    }

    /// The unit for one value alone: a smaller one where it would read as a row of zeros.
    pub fn unit_near(&self, quantity: Quantity, si: f64) -> Unit {
        quantity.unit_near(self.view.units, si)
    }

    /// A measure for reading.
    pub fn text(&self, measure: Measure) -> String {
        measure.text(self.view.units)
    }
}

/// Results and the study they are of.
#[derive(Clone, Copy)]
pub struct Judged<'a> {
    /// The study that was judged.
    pub study: &'a Arc<ValidStudy>,
    /// Its results.
    pub results: &'a Arc<Results>,
    /// The study has been changed since, and has faults now.
    pub is_stale: bool,
}
