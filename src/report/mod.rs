//! A judgement made readable: text for people, JSON for machines.
//!
//! One model, [`Report`], over a study and its results. It computes nothing, every number comes from
//! [`Results`]; it makes strings and knows neither files nor terminals nor screens.

mod grid;
pub mod json;
mod lines;
pub mod sweep;
pub mod table;

#[cfg(test)]
mod fixture;

use serde::Serialize;

use crate::analysis::{CaseResult, Compartment, Outcome, Results, State, Verdict};
use crate::cases::LoadCase;
use crate::liquid::Liquid;
use crate::problem::Place;
use crate::study::{Limit, Record, Study};
use crate::units::Measure;

/// What every output says at its end.
pub const CAUTION: &str = "A design aid, settled states only: local codes and a licensed engineer decide.";

/// The value of a requirement record, and whether it is a ceiling or a floor; none where the record is a rule without
/// a number.
fn value_of(record: &Record) -> Option<(&'static str, Measure)> {
    let sense = if record.limit.is_ceiling() { "at most" } else { "at least" };
    match record.limit {
        Limit::DrainPath | Limit::VentPath => None,
        limit => Some((sense, limit.measure())),
    }
}

/// A judged study, and which of its load cases are shown.
#[derive(Clone, Debug)]
pub struct Report<'a> {
    /// The file, as the user named it.
    pub file: &'a str,
    /// The inputs.
    pub study: &'a Study,
    /// The results.
    pub results: &'a Results,
    /// Indices of the load cases shown.
    pub case_idxs: Vec<usize>,
    /// Whether the layout of plates is shown, which is judged once for all load cases.
    pub has_layout: bool,
}

/// How many load cases, and how many verdicts in each state.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
pub struct Counts {
    /// Load cases.
    pub n_cases: usize,
    /// Verdicts that fail.
    pub fails: usize,
    /// Verdicts that are not judged.
    pub not_judged: usize,
    /// Verdicts that are close.
    pub close: usize,
    /// Verdicts that hold.
    pub holds: usize,
}

impl<'a> Report<'a> {
    /// A report of everything.
    pub fn new(file: &'a str, study: &'a Study, results: &'a Results) -> Report<'a> {
        Report { file, study, results, case_idxs: (0..results.cases.len()).collect(), has_layout: true }
    }

    /// The load cases shown: number from one, inputs, results.
    pub fn cases(&self) -> impl Iterator<Item = (usize, &'a LoadCase, &'a CaseResult)> {
        self.case_idxs.iter().map(|&i| (i + 1, &self.study.cases[i], &self.results.cases[i]))
    }

    /// Counts of what is shown.
    pub fn counts(&self) -> Counts {
        let count = |state| self.verdicts().filter(|v| v.state == state).count();
        Counts {
            n_cases: self.case_idxs.len(),
            fails: count(State::Fails),
            not_judged: count(State::NotJudged),
            close: count(State::Close),
            holds: count(State::Holds),
        }
    }

    fn verdicts(&self) -> impl Iterator<Item = &'a Verdict> {
        let layout = self.layout().into_iter().flat_map(|layout| &layout.verdicts);
        layout.chain(self.cases().flat_map(|(_, _, case)| &case.verdicts))
    }

    /// The layout of plates, where it is shown.
    fn layout(&self) -> Option<&'a Outcome> {
        self.has_layout.then_some(&self.results.layout)
    }

    /// A place in words, with the name that the user gave it.
    fn place_words(&self, place: &Place) -> String {
        let section = &self.study.section;
        match place {
            Place::Edge(idx) => section.edge_label(*idx),
            Place::Obstacle { obstacle_idx, edge_idx } => {
                let name = section.obstacles.get(*obstacle_idx).map_or("", |o| o.name.as_str());
                match (name, edge_idx) {
                    ("", _) => place.to_string(),
                    (name, None) => name.to_owned(),
                    (name, Some(edge_idx)) => format!("{name}, edge {}", edge_idx + 1),
                }
            }
            Place::Plate { plate_idx, opening_idx: None } => {
                section.plates.get(*plate_idx).map_or_else(|| place.to_string(), |plate| plate.label(*plate_idx))
            }
            _ => place.to_string(),
        }
    }

    /// The name of a cell.
    fn cell_name(&self, idx: usize) -> String {
        self.results.cells.get(idx).map_or_else(|| format!("cell {}", idx + 1), |cell| cell.name.clone())
    }

    /// The name of a compartment.
    fn compartment_name(&self, idx: usize) -> String {
        let found = self.results.compartments.get(idx);
        found.map_or_else(|| format!("compartment {}", idx + 1), |c| c.name.clone())
    }

    /// The name of a mouth.
    fn mouth_name(&self, idx: usize) -> String {
        let mouths = self.study.section.mouths();
        mouths.get(idx).map_or_else(|| format!("mouth {}", idx + 1), |mouth| mouth.name.clone())
    }

    /// The liquid of a compartment.
    fn liquid_of(&self, compartment: &Compartment) -> &'a Liquid {
        let own = compartment.own_idx.and_then(|i| self.study.compartments.get(i)?.liquid.as_ref());
        own.unwrap_or(&self.study.liquid)
    }
}
