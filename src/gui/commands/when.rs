//! When a command can be used.

use crate::app::{Derived, Document};
use crate::gui::{Selected, Stage, View, plating};

pub(super) fn always(_: &Document, _: &View) -> bool {
    true
}

pub(super) fn can_save(doc: &Document, _: &View) -> bool {
    doc.is_unsaved() || doc.path.is_none()
}

pub(super) fn can_undo(doc: &Document, _: &View) -> bool {
    doc.undo_label().is_some()
}

pub(super) fn can_redo(doc: &Document, _: &View) -> bool {
    doc.redo_label().is_some()
}

pub(super) fn can_delete(doc: &Document, view: &View) -> bool {
    view.selected.is_some_and(|selected| selected.removal(doc.study()).is_some())
}

pub(super) fn has_plate(_: &Document, view: &View) -> bool {
    view.selected.and_then(Selected::plate).is_some()
}

pub(super) fn has_stages(doc: &Document, view: &View) -> bool {
    let Derived::Judged { results, .. } = doc.derived() else { return false };
    results.cases.get(view.case_idx).is_some_and(|case| Stage::of(case).count() > 1)
}

pub(super) fn has_spaced_plates(doc: &Document, _: &View) -> bool {
    plating::equally_spaced(&doc.study().section).is_some()
}

pub(super) fn has_case(doc: &Document, view: &View) -> bool {
    view.case_idx < doc.study().cases.len()
}

pub(super) fn has_cases(doc: &Document, _: &View) -> bool {
    doc.study().cases.len() > 1
}

pub(super) fn has_case_before(doc: &Document, view: &View) -> bool {
    view.case_idx > 0 && has_case(doc, view)
}

pub(super) fn has_case_after(doc: &Document, view: &View) -> bool {
    view.case_idx + 1 < doc.study().cases.len()
}

pub(super) fn is_judged(doc: &Document, view: &View) -> bool {
    matches!(doc.derived(), Derived::Judged { .. }) && has_case(doc, view)
}

pub(super) fn has_acceleration(doc: &Document, view: &View) -> bool {
    let gravity = doc.study().gravity_m_per_s2;
    let case = doc.study().cases.get(view.case_idx);
    is_judged(doc, view) && case.is_some_and(|case| case.accel.to_m_per_s2(gravity).norm() > 0.0)
}
