//! Plate layout: what cells, plates and the ways between them are asked by requirement records. Judged once for the tank
//! standing level and at rest, not once a load case; one rule a file, and the table of them.

mod cell_volume;
mod coverage;
mod drain;
mod open_share;
mod rated_flow;
mod spacing;
mod vent;

use crate::geom::Vec2;
use crate::plates::{Cell, Divider, Remnant};
use crate::problem::Place;
use crate::sources::Source;
use crate::study::{Limit, ValidStudy};
use crate::units::{Measure, Phrase, Quantity};

use super::{Absent, Outcome, Reach, Sense, Trust, Verdict, WorkLine, unconfirmed};

/// The name under which rules are listed together.
pub const NAME: &str = "Plate layout";

/// What a rule may look at.
pub struct Standing<'a> {
    /// The inputs.
    pub study: &'a ValidStudy,
    /// The cells, with what they hold at rest.
    pub cells: &'a [Cell],
    /// Upright plates.
    pub dividers: Vec<Divider>,
}

/// Every rule, in the order in which they are run.
const RULES: &[fn(&Standing) -> Outcome] = &[
    cell_volume::judge,
    coverage::judge,
    open_share::judge,
    spacing::judge,
    drain::judge,
    vent::judge,
    rated_flow::judge,
];

/// Runs every rule; verdicts worst first.
pub fn judge_layout(standing: &Standing) -> Outcome {
    let study = standing.study.study();
    if study.section.plates.is_empty() && !study.records.iter().any(|r| r.limit.is_of_layout()) {
        let reason = "the tank has no plates, and no requirement record asks for any";
        return Outcome { verdicts: Vec::new(), absent: vec![absent(NAME, reason.into())] };
    }
    let mut all = Outcome::default();
    for judge in RULES {
        let outcome = judge(standing);
        all.verdicts.extend(outcome.verdicts);
        all.absent.extend(outcome.absent);
    }
    all.verdicts.sort_by(Verdict::order);
    all
}

impl Standing<'_> {
    /// A verdict from demand and limit.
    fn verdict(&self, rule: &'static str, demand: Measure, limit: Measure, sense: Sense) -> Verdict {
        Verdict { source: Source::LayoutGeometry, ..Verdict::judged(rule, demand, limit, sense, trust()) }
    }

    /// A verdict that is not judged, and why.
    fn not_judged(&self, rule: &'static str, sense: Sense, reason: String) -> Verdict {
        Verdict { source: Source::LayoutGeometry, ..Verdict::not_judged(rule, sense, reason, trust()) }
    }

    /// The worst of several verdicts for each record of a kind, absent for `nothing` where there are none; without a
    /// record, absent for `reason`.
    fn by_records<T>(
        &self,
        rule: &'static str,
        kind: fn(&Limit) -> Option<T>,
        verdicts: impl Fn(T) -> Vec<Verdict>,
        nothing: &str,
        reason: impl Fn() -> Phrase,
    ) -> Outcome {
        let mut outcome = Outcome::default();
        for (i, limit) in self.study.study().records_of(kind) {
            let (record, unconfirmed_record) = (Some(i), unconfirmed(self.study, Some(i)));
            match verdicts(limit).into_iter().min_by(Verdict::order) {
                Some(worst) => outcome.verdicts.push(Verdict { record, unconfirmed_record, ..worst }),
                None => outcome.absent.push(absent(rule, nothing.into())),
            }
        }
        if outcome == Outcome::default() {
            outcome.absent.push(absent(rule, reason()));
        }
        outcome
    }

    /// z of the still level that counts for a cell, m.
    fn still_z_m(&self, cell: usize) -> f64 {
        let compartment = self.cells[cell].compartment;
        let start = self.study.starts().iter().find(|s| s.compartments.contains(&compartment));
        start.map_or(f64::NEG_INFINITY, |s| s.vessel.tilted(Vec2::y()).level_for_volume(s.volume_m3))
    }

    /// The name of a plate.
    fn plate_words(&self, plate_idx: usize) -> String {
        self.study.study().section.plates[plate_idx].label(plate_idx)
    }

    /// The names of the plates of a divider.
    fn divider_words(&self, divider: &Divider) -> String {
        let names: Vec<String> = divider.plate_idxs.iter().map(|&i| self.plate_words(i)).collect();
        names.join(" and ")
    }

    /// What stays behind, as a count of cells against none. `words` say what it is and where it goes.
    fn left_behind(&self, rule: &'static str, remnants: &[Remnant], symbols: &str, fluid: &str) -> Verdict {
        let by_cell = |cell: usize| remnants.iter().map(|r| r.cells_m3[cell]).sum::<f64>();
        let whole: f64 = remnants.iter().map(|r| r.volume_m3).sum();
        let shares: Vec<(usize, f64)> = (0..self.cells.len()).map(|cell| (cell, by_cell(cell))).collect();
        let mut held: Vec<(usize, f64)> = shares.into_iter().filter(|h| h.1 > LEAST_SHARE * whole).collect();
        held.sort_by(|a, b| b.1.total_cmp(&a.1));
        let count = |n: usize| Measure::new(Quantity::Count, n as f64);
        let mut verdict = self.verdict(rule, count(held.len()), count(0), Sense::AtMost);
        let volume = |m3: f64| Measure::new(Quantity::Volume, m3);
        verdict.working = held
            .iter()
            .map(|&(cell, m3)| WorkLine {
                symbols: symbols.to_owned(),
                numbers: self.cells[cell].name.clone(),
                result: volume(m3),
            })
            .collect();
        let Some(&(worst, _)) = held.first() else {
            verdict.remark = format!("{fluid} of every cell gets out");
            return verdict;
        };
        verdict.place_words = self.cells[worst].name.clone();
        verdict.at = Some(self.cells[worst].inside);
        let largest = remnants.iter().max_by(|a, b| a.volume_m3.total_cmp(&b.volume_m3));
        if let Some((at, wall)) = largest.and_then(|r| r.sill) {
            verdict.place = wall.place();
            verdict.at = Some(at);
        }
        let names: Vec<&str> = held.iter().map(|h| self.cells[h.0].name.as_str()).collect();
        verdict.remark = format!("{fluid} stays behind in {}", names.join(", "));
        verdict
    }
}

/// Why a rule about upright plates has nothing to judge.
const NOTHING: &str = "no plate stands upright";

/// Shares of what stays behind below this are rounding.
const LEAST_SHARE: f64 = 1e-9;

fn absent(rule: &'static str, reason: Phrase) -> Absent {
    Absent { criterion: rule, place_words: "tank".to_owned(), reason }
}

/// Geometry at rest leaves no range.
fn trust() -> Vec<Trust> {
    ["rise time", "steepness", "depth to length", "forcing period", "roof or dry floor"]
        .map(|name| Trust {
            name,
            reach: Reach::Inside,
            words: "not used: the tank stands level and at rest".to_owned(),
        })
        .to_vec()
}

/// The place of a plate.
fn plate(plate_idx: usize) -> Place {
    Place::Plate { plate_idx, opening_idx: None }
}
