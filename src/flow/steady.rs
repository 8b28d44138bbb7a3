//! Levels at a rated flow: filling or dumping through the openings of plates.

use nalgebra::{DMatrix, DVector};

use crate::num::newton;

use super::fault::FlowError;
use super::network::{Passage, check_gravity, check_passages};

/// The level of each cell, m, at a steady flow into one cell, out of another one that is held at its level, and through the
/// passages between them, in a row or round about. Cells that no open way joins to the outlet have none. A cell
/// behind a sill that stays dry is told as at the outlet's level. No capacity is asked: compare the levels with the cells.
///
/// What leaves through a passage to the outside is lost on the way. Errors name what has no meaning, or a missing way.
///
/// Source: no cell gains or loses by the flows of [`super::orifice`]; found as the rest of levels that follow their net flows.
pub fn steady_levels(
    n_cells: usize,
    passages: &[Passage],
    inlet: (usize, f64),
    outlet: (usize, f64),
    g_m_per_s2: f64,
) -> Result<Vec<Option<f64>>, FlowError> {
    let ((inlet_idx, flow_m3_per_s), (outlet_idx, outlet_m)) = (inlet, outlet);
    check_gravity(g_m_per_s2)?;
    check_passages(n_cells, passages)?;
    if !(flow_m3_per_s >= 0.0 && flow_m3_per_s.is_finite() && outlet_m.is_finite()) {
        return Err(FlowError::Rated { flow_m3_per_s, level_m: outlet_m });
    }
    let is_joined = joined(n_cells, passages, outlet_idx);
    if !is_joined.get(inlet_idx).is_some_and(|is_joined| *is_joined) {
        return Err(FlowError::NoWay { from_idx: inlet_idx, to_idx: outlet_idx });
    }
    // What is not joined to the outlet stays out of it, and cannot spoil it.
    let passages: Vec<Passage> = passages.iter().filter(|passage| is_joined[passage.from_idx]).copied().collect();
    let still = Rated { passages: &passages, inlet, outlet, g_m_per_s2 };
    // As long as it takes: from levels that have hardly moved to ones that would move no more.
    let mut levels_m = DVector::from_element(n_cells, outlet_m);
    for dt in (-3..=15).map(|power| 10.0_f64.powi(power)) {
        levels_m = still.euler(&levels_m, dt).ok_or(FlowError::NotEnded { time_s: dt, n_steps: 1 })?;
    }
    Ok(levels_m.iter().zip(is_joined).map(|(level, is_joined)| is_joined.then_some(*level)).collect())
}

/// Lesser heads, m, are of the order of rounding.
const SOFT_M: f64 = 1e-12;

/// Cells that an open way joins to one of them.
fn joined(n_cells: usize, passages: &[Passage], to_idx: usize) -> Vec<bool> {
    let mut is_joined: Vec<bool> = (0..n_cells).map(|i| i == to_idx).collect();
    // Every round joins one more cell, or none.
    for _ in 0..n_cells {
        for passage in passages.iter().filter(|passage| passage.opening.is_open()) {
            if let Some(to) = passage.to_idx {
                let either = is_joined[passage.from_idx] || is_joined[to];
                (is_joined[passage.from_idx], is_joined[to]) = (either, either);
            }
        }
    }
    is_joined
}

/// Levels that rise and fall by their net flows, as over a plan area of 1 m2; the outlet's stays.
struct Rated<'a> {
    passages: &'a [Passage],
    inlet: (usize, f64),
    outlet: (usize, f64),
    g_m_per_s2: f64,
}

impl Rated<'_> {
    /// Levels after an implicit Euler step.
    fn euler(&self, levels_m: &DVector<f64>, dt: f64) -> Option<DVector<f64>> {
        let residual = |after: &DVector<f64>| self.residual(after, levels_m, dt);
        let rounding = DVector::from_element(levels_m.len(), 1e-14 * (1.0 + levels_m.amax()));
        newton(levels_m.clone(), &rounding, residual, |after| self.slopes(after, dt))
    }

    fn residual(&self, after_m: &DVector<f64>, before_m: &DVector<f64>, dt: f64) -> DVector<f64> {
        let mut residual = after_m - before_m;
        residual[self.inlet.0] -= dt * self.inlet.1;
        for passage in self.passages {
            let (from_m, to_m) = passage.levels(|cell_idx| after_m[cell_idx]);
            let passes = dt * passage.opening.flow(from_m, to_m, self.g_m_per_s2, SOFT_M);
            residual[passage.from_idx] += passes;
            if let Some(to) = passage.to_idx {
                residual[to] -= passes;
            }
        }
        residual[self.outlet.0] = after_m[self.outlet.0] - self.outlet.1;
        residual
    }

    fn slopes(&self, after_m: &DVector<f64>, dt: f64) -> DMatrix<f64> {
        let n = after_m.len();
        let mut slopes = DMatrix::identity(n, n);
        for passage in self.passages {
            let (from_m, to_m) = passage.levels(|cell_idx| after_m[cell_idx]);
            let by_levels = passage.opening.slopes(from_m, to_m, self.g_m_per_s2, SOFT_M);
            for (side, by_level) in [Some(passage.from_idx), passage.to_idx].into_iter().zip(by_levels) {
                let Some(cell_idx) = side else { continue };
                slopes[(passage.from_idx, cell_idx)] += dt * by_level;
                if let Some(to) = passage.to_idx {
                    slopes[(to, cell_idx)] -= dt * by_level;
                }
            }
        }
        let (outlet_idx, _) = self.outlet;
        slopes.row_mut(outlet_idx).fill(0.0);
        slopes[(outlet_idx, outlet_idx)] = 1.0;
        slopes
    }
}
