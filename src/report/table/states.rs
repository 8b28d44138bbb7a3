//! The states of a load case beside one another: settled, sealed, released; their pools and cells.

use crate::analysis::{CaseResult, Pool, Settled};
use crate::units::Quantity;

use super::super::grid::{Grid, Side};
use super::Table;

/// The states that a load case has, with their names.
pub(super) fn states_of(case: &CaseResult) -> Vec<(&'static str, &Settled)> {
    let found =
        [("settled", Some(&case.settled)), ("sealed", case.sealed.as_ref()), ("released", case.released.as_ref())];
    found.into_iter().filter_map(|(name, state)| Some((name, state?.as_ref().ok()?))).collect()
}

/// What is shown of states that stand beside one another, after their cells.
const DIFFERENCES: [(&str, Quantity, fn(&Settled) -> f64); 6] = [
    ("spilled", Quantity::Volume, |state| state.spilled_m3),
    ("reaches z", Quantity::Length, |state| state.highest_wetted.y),
    ("peak gage", Quantity::GagePressure, |state| state.peak_pa),
    ("force s", Quantity::Force, |state| state.total_force_n.x),
    ("force z", Quantity::Force, |state| state.total_force_n.y),
    ("moment", Quantity::Moment, |state| state.total_moment_n_m),
];

impl Table<'_> {
    /// The pools of every state, where there are several.
    pub(super) fn pools(&mut self, case: &CaseResult) {
        let states = states_of(case);
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
        let states = states_of(case);
        let cells = &self.report.results.cells;
        if states.is_empty() || (cells.len() < 2 && states.len() < 2) {
            return;
        }
        let mut columns = vec![("state", Side::Left), ("still", Side::Right)];
        columns.extend(states.iter().map(|&(name, _)| (name, Side::Right)));
        let mut grid = Grid::new(&columns);
        for (i, cell) in cells.iter().enumerate() {
            let held = states.iter().map(|(_, state)| state.cells_m3[i]);
            let all = [cell.still_m3].into_iter().chain(held);
            grid.row([cell.name.clone()].into_iter().chain(all.map(|m3| self.level(Quantity::Volume, m3))));
        }
        if states.len() > 1 {
            for (name, quantity, of) in DIFFERENCES {
                let shown = states.iter().map(|(_, state)| self.measure(quantity, of(state)));
                grid.row([name.to_owned(), String::new()].into_iter().chain(shown));
            }
        }
        grid.write(&mut self.lines);
    }
}
