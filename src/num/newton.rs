//! Roots of several functions of several variables.

use nalgebra::{DMatrix, DVector};

use super::root::root;

/// A root of `residual`, whose derivatives are `slopes` (row i, column j: of residual i by variable j), from `start`.
/// Residual i must rise with variable i, and be of its kind, such as the variable less what it should be.
///
/// By Newton's method; a step that does not bring a root nearer is halved until it does. Where that leads no further, at a
/// kink, every residual in turn is solved for its own variable, and Newton's method begins anew. Ends where of every
/// variable its change or its residual is within `tolerance`: slopes may be so small that the variable is uncertain,
/// or so great that the residual is. The last step is taken whole, so that straight residuals, and their straight sums,
/// end at zero to rounding. None where it does not come to an end.
///
/// Source: Deuflhard, Newton Methods for Nonlinear Problems (2004), natural monotonicity test (from memory; tested).
pub fn newton(
    start: DVector<f64>,
    tolerance: &DVector<f64>,
    residual: impl Fn(&DVector<f64>) -> DVector<f64>,
    slopes: impl Fn(&DVector<f64>) -> DMatrix<f64>,
) -> Option<DVector<f64>> {
    let mut at = start;
    for _ in 0..N_ROUNDS {
        match descend(at, tolerance, &residual, &slopes) {
            Ok(found) => return Some(found),
            Err(stuck) => at = one_by_one(stuck, tolerance, &residual),
        }
    }
    None
}

/// Steps of Newton's method that are tried at a time.
const N_STEPS: usize = 40;

/// Times that it begins anew.
const N_ROUNDS: usize = 20;

/// Newton's method; the error is how far it came.
fn descend(
    start: DVector<f64>,
    tolerance: &DVector<f64>,
    residual: &impl Fn(&DVector<f64>) -> DVector<f64>,
    slopes: &impl Fn(&DVector<f64>) -> DMatrix<f64>,
) -> Result<DVector<f64>, DVector<f64>> {
    let distance = |change: &DVector<f64>, left: &DVector<f64>| {
        change.zip_map(left, |change, left| change.abs().min(left.abs())).component_div(tolerance)
    };
    let mut at = start;
    let mut left = residual(&at);
    for _ in 0..N_STEPS {
        let matrix = slopes(&at).lu();
        let Some(change) = matrix.solve(&left).map(|change| -change) else { return Err(at) };
        let far = distance(&change, &left);
        if far.amax() <= 1.0 {
            return Ok(at + change);
        }
        let mut share = 1.0;
        (at, left) = loop {
            let tried = &at + &change * share;
            let then = residual(&tried);
            // Seen with the slopes of here.
            let still = matrix.solve(&then).map_or(f64::INFINITY, |change| distance(&change, &then).sum());
            if still < (1.0 - 0.1 * share) * far.sum() {
                break (tried, then);
            }
            share *= 0.5;
            if share < 1e-6 {
                return Err(at);
            }
        };
    }
    Err(at)
}

/// Every residual solved for its own variable, one after the other.
fn one_by_one(
    mut at: DVector<f64>,
    tolerance: &DVector<f64>,
    residual: &impl Fn(&DVector<f64>) -> DVector<f64>,
) -> DVector<f64> {
    for i in 0..at.len() {
        let here = at[i];
        let mut own = |x: f64| {
            at[i] = x;
            residual(&at)[i]
        };
        let mut step = own(here).abs().max(tolerance[i]);
        let (mut low, mut high) = (here, here);
        while own(low) > 0.0 && step.is_finite() {
            (high, low, step) = (low, low - step, 2.0 * step);
        }
        while own(high) <= 0.0 && step.is_finite() {
            (low, high, step) = (high, high + step, 2.0 * step);
        }
        let found = root(low, high, 0.0, own);
        at[i] = found;
    }
    at
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_circle_meets_a_parabola() {
        // x^2 + y^2 = 2 and y = x^2 at (1, 1).
        let residual =
            |v: &DVector<f64>| DVector::from_vec(vec![v[0] * v[0] + v[1] * v[1] - 2.0, v[1] - v[0] * v[0]]);
        let slopes = |v: &DVector<f64>| DMatrix::from_row_slice(2, 2, &[2.0 * v[0], 2.0 * v[1], -2.0 * v[0], 1.0]);
        for (x, y) in [(0.5, 3.0), (3.0, 0.5), (1.1, 0.0)] {
            let root = newton(DVector::from_vec(vec![x, y]), &DVector::from_element(2, 1e-12), residual, slopes);
            let root = root.unwrap_or_else(|| panic!("none from {x}, {y}"));
            assert!((root.add_scalar(-1.0)).amax() < 1e-14, "from {x}, {y}: {root}");
        }
    }

    #[test]
    fn roots_that_a_whole_step_would_jump_between_are_found() {
        // sign(x) |x|^0.5 = r: from 4 r^2 on, a whole step lands beyond zero, and for r = 0 it goes to and fro for ever.
        let root_of = |r: f64, start: f64| {
            let residual = |v: &DVector<f64>| v.map(|x| x.abs().sqrt().copysign(x) - r);
            let slopes = |v: &DVector<f64>| DMatrix::from_element(1, 1, 0.5 / v[0].abs().max(1e-20).sqrt());
            newton(DVector::from_element(1, start), &DVector::from_element(1, 1e-13), residual, slopes).unwrap()[0]
        };
        for (r, start) in [(0.0_f64, 1.0), (1e-3, 1.0), (1e-3, -5.0), (2.0, 1e-9), (-0.5, 3.0)] {
            let (want, got) = (r * r.abs(), root_of(r, start));
            assert!((got - want).abs() < 1e-12, "r {r} from {start}: {got}, expected {want}");
        }
    }

    #[test]
    fn what_has_no_root_is_none() {
        let residual = |v: &DVector<f64>| v.map(|x| x * x + 1.0);
        let slopes = |v: &DVector<f64>| DMatrix::from_element(1, 1, 2.0 * v[0]);
        assert!(newton(DVector::from_element(1, 3.0), &DVector::from_element(1, 1e-12), residual, slopes).is_none());
    }
}
