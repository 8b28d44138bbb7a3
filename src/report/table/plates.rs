//! The net load on every plate, state by state.

use crate::analysis::{CaseResult, PlateLoad};
use crate::geom::Point;
use crate::section::Plate;
use crate::units::{Measure, Quantity};

use super::super::grid::{Grid, Side};
use super::Table;

const SIGN_WORDS: &str = "+ presses toward the right-hand side of a plate as it is drawn";

impl Table<'_> {
    /// The largest loads of every plate over all load cases, where all are shown.
    pub(super) fn plate_peaks(&mut self) {
        let (results, plates) = (self.report.results, &self.report.study.section.plates);
        if self.report.layout().is_none() || results.plate_peaks.is_empty() {
            return;
        }
        let mut grid = Grid::new(&[
            ("plate", Side::Left),
            ("at most", Side::Left),
            ("", Side::Right),
            ("at", Side::Left),
            ("load case", Side::Left),
        ]);
        let mut last = None;
        for peak in &results.plate_peaks {
            let plate = &plates[peak.plate_idx];
            let name = if last == Some(peak.plate_idx) { String::new() } else { plate.label(peak.plate_idx) };
            last = Some(peak.plate_idx);
            grid.row([
                name,
                peak.name.to_owned(),
                self.signed(peak.load.quantity, peak.load.si),
                peak.at.map_or_else(|| "–".to_owned(), |at| self.along(plate, at)),
                format!("{}, {}", results.cases[peak.case_idx].name, peak.bound.word()),
            ]);
        }
        self.lines.gap();
        self.lines.facts("   ", ["Plates, the largest over all load cases and bounds"]);
        grid.write(&mut self.lines);
        self.lines.facts("   ", [SIGN_WORDS]);
        if results.plate_peaks.iter().any(|peak| peak.name.starts_with("weld")) {
            let words = "welds a metre, the larger of a plate whose ends may turn and one whose may not";
            self.lines.facts("   ", [words]);
        }
    }

    /// The net load on every plate in each state.
    pub(super) fn plate_loads(&mut self, case: &CaseResult) {
        let plates = &self.report.study.section.plates;
        let states = self.states_of(case);
        let mut grid = Grid::new(&[
            ("plate", Side::Left),
            ("state", Side::Left),
            ("net load", Side::Right),
            ("acts at", Side::Left),
            ("greatest net pressure", Side::Left),
        ]);
        for (idx, plate) in plates.iter().enumerate() {
            let loads = states.iter().filter_map(|(name, state)| Some((*name, state.plates.get(idx)?)));
            for (i, (state, load)) in loads.enumerate() {
                let name = if i == 0 { plate.label(idx) } else { String::new() };
                grid.row([name].into_iter().chain(self.plate_load(state, plate, load)));
            }
        }
        grid.write(&mut self.lines);
        if !plates.is_empty() && !states.is_empty() {
            self.lines.facts("   ", [SIGN_WORDS]);
        }
    }

    fn plate_load(&self, state: &str, plate: &Plate, load: &PlateLoad) -> [String; 4] {
        let none = || "–".to_owned();
        let peak = load.peak.map(|(pa, at)| (self.signed(Quantity::GagePressure, pa), at));
        let peak = peak.filter(|(pressure, _)| !reads_zero(pressure));
        let net = self.signed(Quantity::Force, load.net_n);
        // What rounding leaves of equal pressures acts nowhere.
        let acts_at = load.acts_at.filter(|_| peak.is_some());
        [
            state.to_owned(),
            net,
            acts_at.map_or_else(none, |at| self.along(plate, at)),
            peak.map_or_else(none, |(pressure, at)| format!("{pressure} at {}", self.along(plate, at))),
        ]
    }

    /// Where on a plate: the coordinate along which it reaches farther.
    fn along(&self, plate: &Plate, at: Point) -> String {
        let span = |of: fn(&Point) -> f64| {
            let all = plate.points.iter().map(of);
            all.clone().fold(f64::NEG_INFINITY, f64::max) - all.fold(f64::INFINITY, f64::min)
        };
        let (axis, m) = if span(|p| p.x) > span(|p| p.y) { ("s", at.x) } else { ("z", at.y) };
        format!("{axis} {}", self.level(Quantity::Length, m))
    }

    /// With a plus where it is above zero.
    fn signed(&self, quantity: Quantity, si: f64) -> String {
        let text = Measure::new(quantity, si).text(self.units);
        if si > 0.0 && !reads_zero(&text) { format!("+{text}") } else { text }
    }
}

/// Whether a measure's text shows no digit but zero.
fn reads_zero(text: &str) -> bool {
    !text.contains(|c| ('1'..='9').contains(&c))
}
