//! Functions in which a panel's deflection is written along one of its sides: second integrals of Legendre
//! polynomials. They meet the supports at both ends of the side, and their second derivatives are orthogonal.

use nalgebra::{DMatrix, DVector};

use crate::num::{LegendreSeries, legendre_polynomials};

/// How the two ends of a side are held.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Ends {
    Simple,
    Clamped,
    Free,
    SimpleFree,
    ClampedFree,
}

/// The functions on -1..1, each with its first three derivatives.
#[derive(Clone, Debug)]
pub(super) struct Basis {
    orders: [Vec<LegendreSeries>; 4],
}

/// Values of a basis at given points, one row a point: of the functions and their first three derivatives.
pub(super) type Samples = [DMatrix<f64>; 4];

impl Basis {
    /// The first `n` functions for these ends.
    pub fn new(ends: Ends, n: usize) -> Basis {
        Basis::of((0..n).map(|i| function(ends, i)))
    }

    /// The first `n` functions that are alike left and right; both ends must be held alike.
    pub fn even(ends: Ends, n: usize) -> Basis {
        Basis::of((0..n).map(|i| function(ends, 2 * i)))
    }

    fn of(functions: impl Iterator<Item = LegendreSeries>) -> Basis {
        let functions: Vec<_> = functions.collect();
        let derived = |of: &[LegendreSeries]| of.iter().map(LegendreSeries::derivative).collect::<Vec<_>>();
        let first = derived(&functions);
        let second = derived(&first);
        let third = derived(&second);
        Basis { orders: [functions, first, second, third] }
    }

    /// How many functions there are.
    pub fn len(&self) -> usize {
        self.orders[0].len()
    }

    /// The functions themselves.
    pub fn functions(&self) -> &[LegendreSeries] {
        &self.orders[0]
    }

    /// Integrals over -1..1 of the p-th derivative of each function times the q-th of each.
    pub fn products(&self, p: usize, q: usize) -> DMatrix<f64> {
        DMatrix::from_fn(self.len(), self.len(), |i, j| self.orders[p][i].dot(&self.orders[q][j]))
    }

    /// Values at points.
    pub fn samples(&self, points: &[f64]) -> Samples {
        let n = self.functions().iter().map(LegendreSeries::n_coefficients).max().unwrap_or(0);
        let polynomials: Vec<_> = points.iter().map(|x| legendre_polynomials(n, *x)).collect();
        self.orders.each_ref().map(|functions| {
            DMatrix::from_fn(points.len(), self.len(), |point, i| functions[i].sum(&polynomials[point]))
        })
    }

    /// Means over -1..1 of the functions' derivatives of an order.
    pub fn means(&self, order: usize) -> DVector<f64> {
        DVector::from_iterator(self.len(), self.orders[order].iter().map(LegendreSeries::mean))
    }
}

/// The i-th function for these ends; where both are held alike, even in x for an even i, odd for an odd one.
fn function(ends: Ends, i: usize) -> LegendreSeries {
    // From k = 2 on, value and slope vanish at both ends; below, at the lower end only.
    let bubble = |k| LegendreSeries::polynomial(k).integral().integral();
    match (ends, i) {
        (Ends::Simple, 0) => LegendreSeries::new(vec![-1.0, 0.0, 1.0]),
        (Ends::Simple, 1) => LegendreSeries::new(vec![0.0, -1.0, 0.0, 1.0]),
        (Ends::Simple | Ends::ClampedFree, i) => bubble(i),
        (Ends::Free, i @ (0 | 1)) => LegendreSeries::polynomial(i),
        (Ends::Free, i) => function(Ends::Simple, i - 2),
        (Ends::Clamped, i) => bubble(i + 2),
        (Ends::SimpleFree, 0) => LegendreSeries::polynomial(0).integral(),
        (Ends::SimpleFree, i) => bubble(i - 1),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn functions_meet_their_supports() {
        // Value and slope at the lower and at the upper end: whether they must vanish.
        for (ends, must_vanish) in [
            (Ends::Simple, [true, false, true, false]),
            (Ends::Clamped, [true, true, true, true]),
            (Ends::Free, [false, false, false, false]),
            (Ends::SimpleFree, [true, false, false, false]),
            (Ends::ClampedFree, [true, true, false, false]),
        ] {
            let [values, slopes, ..] = Basis::new(ends, 9).samples(&[-1.0, 1.0]);
            let found = [values.row(0), slopes.row(0), values.row(1), slopes.row(1)];
            for (what, (row, must)) in found.iter().zip(must_vanish).enumerate() {
                let largest = row.amax();
                assert_eq!(largest < 1e-13, must, "{ends:?}, condition {what}: largest {largest}");
            }
        }
    }

    #[test]
    fn even_functions_are_even() {
        for ends in [Ends::Simple, Ends::Clamped, Ends::Free] {
            let [values, ..] = Basis::even(ends, 6).samples(&[-0.37, 0.37]);
            let difference = (values.row(0) - values.row(1)).amax();
            assert!(difference < 1e-15, "{ends:?}: {difference}");
        }
    }
}
