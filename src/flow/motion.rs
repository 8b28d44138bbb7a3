//! The motion of a network: implicit Euler steps, each the solution of a system that has exactly one.

use nalgebra::{DMatrix, DVector};

use crate::num::{Implicit, newton};

use super::network::{Network, Passage};

/// Rounding of a volume, as a share of the greatest cell.
const ROUNDING_SHARE: f64 = 2e-14;

/// At rest once what is left to move is this many errors of a step.
const REST_ERRORS: f64 = 5.0;

/// A cell that holds less than this share of its capacity holds next to nothing.
const LEAST_SHARE: f64 = 1e-12;

/// A full cell gives way by this share of its capacity under the pressure of its own height.
const GIVE: f64 = 1e-12;

/// Heads below this share of the greatest height of a cell are of the order of rounding.
const SOFT_SHARE: f64 = 1e-10;

/// A network in motion. Its state: what every cell holds; then, of every cell that is full, the head of its pressure over
/// its top.
pub(super) struct Motion<'n> {
    network: &'n Network<'n>,
    /// Error of a step, as a share of what moves.
    error_share: f64,
    /// What one passage alone would let pass, at the start.
    moves_m3: f64,
    soft_m: f64,
}

impl<'n> Motion<'n> {
    pub(super) fn new(network: &'n Network<'n>, error_share: f64) -> Motion<'n> {
        let greatest_m3 = network.cells.iter().map(|cell| cell.capacity_m3).fold(0.0, f64::max);
        let mut motion =
            Motion { network, error_share, moves_m3: ROUNDING_SHARE / error_share * greatest_m3, soft_m: 0.0 };
        let levels = motion.levels(&motion.start());
        let slope = |i: usize| motion.mean_slope(i);
        let moves = network.passages.iter().map(|passage| motion.left(passage, &levels, slope));
        motion.moves_m3 = moves.fold(motion.moves_m3, f64::max);
        let height = |[empty_m, full_m]: &[f64; 2]| full_m - empty_m;
        motion.soft_m = SOFT_SHARE * network.ranges_m.iter().map(height).fold(0.0, f64::max);
        motion
    }

    pub(super) fn start(&self) -> DVector<f64> {
        let mut state = self.network.start_m3();
        state.resize(2 * self.n_cells(), 0.0);
        state.into()
    }

    /// Error allowed a step. Heads follow from the volumes.
    pub(super) fn tolerance(&self) -> DVector<f64> {
        let of = |i: usize| if i < self.n_cells() { self.error_share * self.moves_m3 } else { f64::INFINITY };
        DVector::from_fn(2 * self.n_cells(), |i, _| of(i))
    }

    /// A time in which little moves.
    pub(super) fn first_dt(&self) -> f64 {
        let most = self.network.flows_at_start().into_iter().map(f64::abs).fold(0.0, f64::max);
        if most > 0.0 { 1e-3 * self.moves_m3 / most } else { 1.0 }
    }

    pub(super) fn n_cells(&self) -> usize {
        self.network.cells.len()
    }

    /// The level of every cell; of one that is full, the head of its pressure.
    pub(super) fn levels(&self, state: &DVector<f64>) -> Vec<f64> {
        (0..self.n_cells()).map(|i| self.level(i, state[i]) + state[self.n_cells() + i]).collect()
    }

    /// Whether no passage would let pass any more.
    pub(super) fn is_at_rest(&self, state: &DVector<f64>) -> bool {
        let levels = self.levels(state);
        // A full cell only hands on.
        let is_full = |i: usize| state[self.n_cells() + i] > 0.0;
        let slope = |i: usize| if is_full(i) { 0.0 } else { self.level_slope(i, state[i]) };
        let left = |passage| self.left(passage, &levels, slope);
        self.network.passages.iter().all(|passage| left(passage) <= REST_ERRORS * self.error_share * self.moves_m3)
    }

    /// The volume that a passage alone would let pass before its head is used up, by the slopes of the levels on its two
    /// sides: of the side from which it comes, and of the other one where it is drowned.
    fn left(&self, passage: &Passage, levels: &[f64], slope: impl Fn(usize) -> f64) -> f64 {
        let (from_m, to_m) = passage.levels(|i| levels[i]);
        let counts = |level: f64, other: f64| level >= other || level > passage.opening.low_m;
        let of_from = if counts(from_m, to_m) { slope(passage.from_idx) } else { 0.0 };
        let of_to = passage.to_idx.filter(|_| counts(to_m, from_m)).map_or(0.0, slope);
        let slope = of_from + of_to;
        if passage.opening.is_open() && slope > 0.0 { passage.opening.head(from_m, to_m) / slope } else { 0.0 }
    }

    /// The level of a cell by its fill: what it holds, and beyond its capacity the head of its pressure, as if it went on
    /// upward. Straight while it holds next to nothing, where the slope of a round or sharp bottom has no bound.
    fn level(&self, cell_idx: usize, fill: f64) -> f64 {
        let cell = &self.network.cells[cell_idx];
        let (empty_m, least) = (self.network.ranges_m[cell_idx][0], LEAST_SHARE * cell.capacity_m3);
        if fill < least {
            return empty_m + fill.max(0.0) * self.first_slope(cell_idx) + fill.min(0.0) * self.mean_slope(cell_idx);
        }
        let inside = fill.min(cell.capacity_m3);
        (cell.level_for_volume)(inside) + (fill - inside) * self.mean_slope(cell_idx)
    }

    /// Its derivative, by a difference.
    fn level_slope(&self, cell_idx: usize, fill: f64) -> f64 {
        let capacity = self.network.cells[cell_idx].capacity_m3;
        if fill < LEAST_SHARE * capacity {
            return if fill < 0.0 { self.mean_slope(cell_idx) } else { self.first_slope(cell_idx) };
        }
        let d = (1e-3 * fill.min(capacity - fill)).max(0.1 * LEAST_SHARE * capacity);
        (self.level(cell_idx, fill + d) - self.level(cell_idx, fill - d)) / (2.0 * d)
    }

    fn first_slope(&self, cell_idx: usize) -> f64 {
        let (cell, empty_m) = (&self.network.cells[cell_idx], self.network.ranges_m[cell_idx][0]);
        let least = LEAST_SHARE * cell.capacity_m3;
        ((cell.level_for_volume)(least) - empty_m) / least
    }

    fn mean_slope(&self, cell_idx: usize) -> f64 {
        let [empty_m, full_m] = self.network.ranges_m[cell_idx];
        (full_m - empty_m) / self.network.cells[cell_idx].capacity_m3
    }

    /// What a cell holds at a fill, and the derivative.
    fn held(&self, cell_idx: usize, fill: f64) -> (f64, f64) {
        let over = fill - self.network.cells[cell_idx].capacity_m3;
        if over > 0.0 { (fill - over + GIVE * over, GIVE) } else { (fill, 1.0) }
    }

    /// What is missing in every cell of held = held before + dt (what flows in).
    fn residual(&self, fills: &DVector<f64>, before: &DVector<f64>, dt: f64) -> DVector<f64> {
        let mut residual = DVector::from_fn(self.n_cells(), |i, _| self.held(i, fills[i]).0 - before[i]);
        let levels: Vec<f64> = (0..self.n_cells()).map(|i| self.level(i, fills[i])).collect();
        for passage in &self.network.passages {
            let (from_m, to_m) = passage.levels(|i| levels[i]);
            let passes = dt * passage.opening.flow(from_m, to_m, self.network.g_m_per_s2, self.soft_m);
            residual[passage.from_idx] += passes;
            if let Some(to) = passage.to_idx {
                residual[to] -= passes;
            }
        }
        residual
    }

    /// The derivatives of the residual by the fills.
    fn slopes(&self, fills: &DVector<f64>, dt: f64) -> DMatrix<f64> {
        let n = self.n_cells();
        let mut slopes = DMatrix::from_fn(n, n, |i, j| if i == j { self.held(i, fills[i]).1 } else { 0.0 });
        let levels: Vec<f64> = (0..n).map(|i| self.level(i, fills[i])).collect();
        let level_slopes: Vec<f64> = (0..n).map(|i| self.level_slope(i, fills[i])).collect();
        for passage in &self.network.passages {
            let (from_m, to_m) = passage.levels(|i| levels[i]);
            let by_levels = passage.opening.slopes(from_m, to_m, self.network.g_m_per_s2, self.soft_m);
            for (side, by_level) in [Some(passage.from_idx), passage.to_idx].into_iter().zip(by_levels) {
                let Some(j) = side else { continue };
                let by_fill = dt * by_level * level_slopes[j];
                slopes[(passage.from_idx, j)] += by_fill;
                if let Some(to) = passage.to_idx {
                    slopes[(to, j)] -= by_fill;
                }
            }
        }
        slopes
    }
}

impl Implicit for Motion<'_> {
    /// What a cell holds is a straight function of its fill, so that the last, whole Newton step conserves volume.
    fn euler(&self, state: &DVector<f64>, dt: f64) -> Option<DVector<f64>> {
        let n = self.n_cells();
        let start = DVector::from_fn(n, |i, _| state[i] + state[n + i] / self.mean_slope(i));
        let rounding = DVector::from_fn(n, |i, _| 1e-14 * self.network.cells[i].capacity_m3);
        let residual = |fills: &DVector<f64>| self.residual(fills, state, dt);
        let fills = newton(start, &rounding, residual, |fills| self.slopes(fills, dt))?;
        let head = |i: usize| (fills[i] - self.network.cells[i].capacity_m3).max(0.0) * self.mean_slope(i);
        Some(DVector::from_fn(2 * n, |i, _| if i < n { self.held(i, fills[i]).0 } else { head(i - n) }))
    }
}
