//! Cells and the openings between them.

use std::fmt;

use super::fault::FlowError;
use super::opening::{Opening, orifice};

/// A body of liquid with one level.
#[derive(Clone, Copy)]
pub struct Cell<'a> {
    /// Most that it holds.
    pub capacity_m3: f64,
    /// What it holds at the start.
    pub volume_m3: f64,
    /// Its level for a volume from zero to its capacity, along effective gravity; continuous, never falling.
    pub level_for_volume: &'a (dyn Fn(f64) -> f64 + Sync),
}

/// An opening and what it joins. Flow is positive from the first to the second.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Passage {
    /// A cell.
    pub from_idx: usize,
    /// Another cell; none for the outside, where what leaves falls away freely and does not come back.
    pub to_idx: Option<usize>,
    /// The opening between them.
    pub opening: Opening,
}

/// Cells joined by openings, under one effective gravity that does not change.
///
/// Vents keep the gas over every cell at one pressure. A cell that is full is shut by its walls: it takes no more than it
/// hands on, and carries the pressure that this needs.
pub struct Network<'a> {
    pub(super) cells: Vec<Cell<'a>>,
    pub(super) passages: Vec<Passage>,
    pub(super) g_m_per_s2: f64,
    /// Levels of the cells empty and full.
    pub(super) ranges_m: Vec<[f64; 2]>,
}

impl<'a> Network<'a> {
    /// The network, if it has a meaning. Errors name the first cell or passage that has none.
    pub fn new(cells: Vec<Cell<'a>>, passages: Vec<Passage>, g_m_per_s2: f64) -> Result<Network<'a>, FlowError> {
        check_gravity(g_m_per_s2)?;
        let mut ranges_m = vec![];
        for (cell_idx, cell) in cells.iter().enumerate() {
            let Cell { capacity_m3, volume_m3, .. } = *cell;
            if !(capacity_m3 > 0.0 && capacity_m3.is_finite()) {
                return Err(FlowError::Capacity { cell_idx, capacity_m3 });
            }
            if !(0.0..=capacity_m3).contains(&volume_m3) {
                return Err(FlowError::Volume { cell_idx, volume_m3, capacity_m3 });
            }
            let [empty_m, now_m, full_m] = [0.0, volume_m3, capacity_m3].map(|v| (cell.level_for_volume)(v));
            let is_ordered = empty_m < full_m && (empty_m..=full_m).contains(&now_m);
            if !(is_ordered && empty_m.is_finite() && full_m.is_finite()) {
                return Err(FlowError::Levels { cell_idx, empty_m, now_m, full_m });
            }
            ranges_m.push([empty_m, full_m]);
        }
        check_passages(cells.len(), &passages)?;
        for (passage_idx, passage) in passages.iter().enumerate() {
            for cell_idx in [Some(passage.from_idx), passage.to_idx].into_iter().flatten() {
                let ([bottom_m, full_m], low_m) = (ranges_m[cell_idx], passage.opening.low_m);
                // A sill at the bottom may be rounded below it.
                if low_m < bottom_m - 1e-9 * (full_m - bottom_m) {
                    return Err(FlowError::Below { passage_idx, cell_idx, low_m, bottom_m });
                }
            }
        }
        Ok(Network { cells, passages, g_m_per_s2, ranges_m })
    }

    /// The flow through every passage at the start, m3/s.
    pub fn flows_at_start(&self) -> Vec<f64> {
        let level = |i: usize| (self.cells[i].level_for_volume)(self.cells[i].volume_m3);
        let flow = |passage: &Passage| {
            let (from_m, to_m) = passage.levels(level);
            orifice(&passage.opening, from_m, to_m, self.g_m_per_s2)
        };
        self.passages.iter().map(flow).collect()
    }

    /// What the cells hold at the start.
    pub(super) fn start_m3(&self) -> Vec<f64> {
        self.cells.iter().map(|cell| cell.volume_m3).collect()
    }
}

impl fmt::Debug for Network<'_> {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.debug_struct("Network").field("passages", &self.passages).field("ranges_m", &self.ranges_m).finish()
    }
}

impl Passage {
    /// The levels on its two sides; the outside stands at the sill.
    pub(super) fn levels(&self, level: impl Fn(usize) -> f64) -> (f64, f64) {
        (level(self.from_idx), self.to_idx.map_or(self.opening.low_m, level))
    }
}

/// Effective gravity must be there.
pub(super) fn check_gravity(g_m_per_s2: f64) -> Result<(), FlowError> {
    if g_m_per_s2 > 0.0 && g_m_per_s2.is_finite() { Ok(()) } else { Err(FlowError::Gravity { g_m_per_s2 }) }
}

/// Every passage must join two cells that there are, or a cell and the outside, through an opening that has a meaning.
pub(super) fn check_passages(n_cells: usize, passages: &[Passage]) -> Result<(), FlowError> {
    for (passage_idx, passage) in passages.iter().enumerate() {
        let Passage { from_idx, to_idx, opening } = *passage;
        if from_idx >= n_cells || to_idx.is_some_and(|to| to >= n_cells || to == from_idx) {
            return Err(FlowError::Ends { passage_idx, n_cells });
        }
        let Opening { low_m, high_m, area_m2, c_d } = opening;
        let is_finite = [low_m, high_m, area_m2, c_d].iter().all(|x| x.is_finite());
        if !(is_finite && low_m <= high_m && area_m2 >= 0.0 && c_d >= 0.0) {
            return Err(FlowError::Opening { passage_idx, opening });
        }
    }
    Ok(())
}
