//! The net load on every plate, state by state.

use crate::analysis::{CaseResult, PlateLoad};
use crate::geom::Point;
use crate::section::Plate;
use crate::units::{Measure, Quantity};

use super::super::grid::{Grid, Side};
use super::Table;

impl Table<'_> {
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
            self.lines.facts("   ", ["+ presses toward the right-hand side of a plate as it is drawn"]);
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
