//! The states of a load case beside one another: settled, sealed, released; their pools and cells.

use crate::analysis::{CaseResult, Pool, Settled};
use crate::units::Quantity;

use super::super::grid::{Grid, Side};
use super::Table;

/// A number of a state, SI.
type Of = fn(&Settled) -> f64;

/// What is shown of states that stand beside one another, after their cells.
const DIFFERENCES: [(&str, Quantity, Of); 6] = [
    ("spilled", Quantity::Volume, |state| state.spilled_m3),
    ("reaches z", Quantity::Length, |state| state.highest_wetted.y),
    ("highest gage", Quantity::GagePressure, |state| state.peak_pa),
    ("force s", Quantity::Force, |state| state.total_force_n.x),
    ("force z", Quantity::Force, |state| state.total_force_n.y),
    ("moment", Quantity::Moment, |state| state.total_moment_n_m),
];

impl Table<'_> {
    /// The states of a load case that differ in what is shown, with their names.
    pub(super) fn states_of<'c>(&self, case: &'c CaseResult) -> Vec<(&'static str, &'c Settled)> {
        let settled = case.settled.as_ref().ok();
        let sealed = case.sealed.as_ref().and_then(|s| s.as_ref().ok()).filter(|s| !self.reads_as(s, settled));
        let released = case.released.as_ref().and_then(|s| s.as_ref().ok());
        let found = [("settled", settled), ("sealed", sealed), ("released", released)];
        found.into_iter().filter_map(|(name, state)| Some((name, state?))).collect()
    }

    /// Whether nothing that is shown of a state differs from another.
    pub(super) fn reads_as(&self, state: &Settled, other: Option<&Settled>) -> bool {
        let shown = |s: &Settled| -> Vec<String> {
            let nets = s.plates.iter().map(|plate| self.measure(Quantity::Force, plate.net_n));
            let gas = s.gas.iter().map(|pocket| self.measure(Quantity::Volume, pocket.volume_m3));
            self.held(s).into_iter().chain(self.differences(s)).chain(nets).chain(gas).collect()
        };
        other.is_some_and(|other| shown(state) == shown(other))
    }

    /// What a state holds in each cell.
    fn held(&self, state: &Settled) -> Vec<String> {
        state.cells_m3.iter().map(|&m3| self.level(Quantity::Volume, m3)).collect()
    }

    fn differences(&self, state: &Settled) -> Vec<String> {
        DIFFERENCES.iter().map(|(_, quantity, of)| self.measure(*quantity, of(state))).collect()
    }

    /// The pools of every state, where there are several.
    pub(super) fn pools(&mut self, case: &CaseResult) {
        let states = self.states_of(case);
        if states.iter().all(|(_, state)| state.pools.len() < 2) {
            return;
        }
        let has_cells = self.report.results.cells.len() > 1;
        let mut grid = Grid::new(&[
            ("pools", Side::Left),
            ("volume", Side::Right),
            ("level", Side::Right),
            ("surface", Side::Left),
            (if has_cells { "stands in" } else { "" }, Side::Left),
        ]);
        for (name, state) in states {
            for (i, pool) in state.pools.iter().enumerate() {
                let cells: Vec<String> = pool.cell_idxs.iter().map(|&i| self.report.cell_name(i)).collect();
                grid.row([
                    if i == 0 { name.to_owned() } else { String::new() },
                    self.level(Quantity::Volume, pool.volume_m3),
                    self.level(Quantity::Length, pool.level_m),
                    self.surface_span(pool),
                    if has_cells { cells.join(", ") } else { String::new() },
                ]);
            }
        }
        grid.write(&mut self.lines);
    }

    /// From where to where a pool's surface reaches, along the axis that it lies nearest to.
    fn surface_span(&self, pool: &Pool) -> String {
        let (Some(first), Some(last)) = (pool.surface.first(), pool.surface.last()) else { return "–".to_owned() };
        let d = last.right - first.left;
        let (axis, from, to) = if d.x.abs() >= d.y.abs() {
            ("s", first.left.x, last.right.x)
        } else {
            ("z", first.left.y, last.right.y)
        };
        format!("{axis} {} to {}", self.level(Quantity::Length, from), self.level(Quantity::Length, to))
    }

    /// What the cells hold in each state and, where there is more than one state, what differs between them.
    pub(super) fn states(&mut self, case: &CaseResult) {
        let states = self.states_of(case);
        let cells = &self.report.results.cells;
        let has_pool_a_cell = |state: &Settled| {
            let mut stands_in: Vec<usize> = state.pools.iter().flat_map(|p| p.cell_idxs.iter().copied()).collect();
            stands_in.sort_unstable();
            let n = stands_in.len();
            stands_in.dedup();
            n == state.pools.len() && n == stands_in.len()
        };
        // The table of pools says it all already.
        if states.len() < 2 && (cells.len() < 2 || states.iter().all(|(_, state)| has_pool_a_cell(state))) {
            return;
        }
        let mut columns = vec![("state", Side::Left), ("still", Side::Right)];
        columns.extend(states.iter().map(|&(name, _)| (name, Side::Right)));
        let mut grid = Grid::new(&columns);
        let held: Vec<Vec<String>> = states.iter().map(|(_, state)| self.held(state)).collect();
        for (i, cell) in cells.iter().enumerate() {
            let still = self.level(Quantity::Volume, cell.still_m3);
            grid.row([cell.name.clone(), still].into_iter().chain(held.iter().map(|held| held[i].clone())));
        }
        if states.len() > 1 {
            let shown: Vec<Vec<String>> = states.iter().map(|(_, state)| self.differences(state)).collect();
            for (i, (name, ..)) in DIFFERENCES.iter().enumerate() {
                let row = [(*name).to_owned(), String::new()].into_iter();
                grid.row(row.chain(shown.iter().map(|shown| shown[i].clone())));
            }
        }
        grid.write(&mut self.lines);
    }
}
