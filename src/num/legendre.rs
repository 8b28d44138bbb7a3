//! Finite series of Legendre polynomials on -1..1: they integrate and differentiate into one another exactly.

/// The sum of `c[n] P_n(x)`.
///
/// Source: Abramowitz & Stegun (1964), chapter 22 (recurrences from memory; tested against closed forms).
#[derive(Clone, Debug, PartialEq)]
pub struct LegendreSeries(Vec<f64>);

impl LegendreSeries {
    /// From its coefficients, lowest degree first.
    pub fn new(coefficients: Vec<f64>) -> LegendreSeries {
        LegendreSeries(coefficients)
    }

    /// The single polynomial P_n.
    pub fn polynomial(n: usize) -> LegendreSeries {
        let mut coefficients = vec![0.0; n + 1];
        coefficients[n] = 1.0;
        LegendreSeries(coefficients)
    }

    /// How many coefficients it has.
    pub fn n_coefficients(&self) -> usize {
        self.0.len()
    }

    /// The derivative: P_n' = sum of (2m + 1) P_m over m = n - 1, n - 3, ...
    pub fn derivative(&self) -> LegendreSeries {
        let n = self.0.len();
        let mut out = vec![0.0; n.saturating_sub(1).max(1)];
        // Sums of the coefficients above, one for each parity.
        let mut above = [0.0; 2];
        for m in (0..n.saturating_sub(1)).rev() {
            above[(m + 1) % 2] += self.0[m + 1];
            out[m] = (2 * m + 1) as f64 * above[(m + 1) % 2];
        }
        LegendreSeries(out)
    }

    /// The integral from -1 up to x: that of P_n is (P_(n+1) - P_(n-1)) / (2n + 1), that of P_0 is P_1 + P_0.
    pub fn integral(&self) -> LegendreSeries {
        let mut out = vec![0.0; self.0.len() + 1];
        for (n, c) in self.0.iter().enumerate() {
            let part = c / (2 * n + 1) as f64;
            out[n + 1] += part;
            if n == 0 { out[0] += part } else { out[n - 1] -= part }
        }
        LegendreSeries(out)
    }

    /// The value at x.
    pub fn at(&self, x: f64) -> f64 {
        self.sum(&legendre_polynomials(self.0.len(), x))
    }

    /// The value where P_0, P_1, ... have the given values, at least as many as the series has coefficients.
    pub fn sum(&self, polynomials: &[f64]) -> f64 {
        self.0.iter().zip(polynomials).map(|(c, p)| c * p).sum()
    }

    /// The integral of the product of two series over -1..1, exactly: sum of `2 c[n] d[n] / (2n + 1)`.
    pub fn dot(&self, other: &LegendreSeries) -> f64 {
        let terms = self.0.iter().zip(&other.0).enumerate();
        terms.map(|(n, (c, d))| 2.0 * c * d / (2 * n + 1) as f64).sum()
    }

    /// The mean over -1..1.
    pub fn mean(&self) -> f64 {
        self.0.first().copied().unwrap_or(0.0)
    }
}

/// The values of the first `n` polynomials P_0, P_1, ... at x.
pub fn legendre_polynomials(n: usize, x: f64) -> Vec<f64> {
    let (mut last, mut this) = (0.0, 1.0);
    let mut values = Vec::with_capacity(n);
    for n in (0..n).map(|n| n as f64) {
        values.push(this);
        (last, this) = (this, ((2.0 * n + 1.0) * x * this - n * last) / (n + 1.0));
    }
    values
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn polynomials_have_their_closed_forms() {
        // P_4 = (35 x^4 - 30 x^2 + 3) / 8: Abramowitz & Stegun (1964), table 22.9.
        let p4 = LegendreSeries::polynomial(4);
        for x in [-1.0, -0.3, 0.0, 0.7, 1.0_f64] {
            let closed = [
                (p4.at(x), (35.0 * x.powi(4) - 30.0 * x * x + 3.0) / 8.0),
                (p4.derivative().at(x), (140.0 * x.powi(3) - 60.0 * x) / 8.0),
                (p4.derivative().derivative().at(x), (420.0 * x * x - 60.0) / 8.0),
                (p4.integral().at(x), (7.0 * x.powi(5) - 10.0 * x.powi(3) + 3.0 * x) / 8.0),
                (LegendreSeries::polynomial(0).integral().at(x), 1.0 + x),
            ];
            for (i, (got, want)) in closed.into_iter().enumerate() {
                assert!((got - want).abs() < 1e-14, "form {i} at {x}: {got} against {want}");
            }
        }
        assert_eq!(LegendreSeries::polynomial(0).derivative().at(0.3), 0.0);
    }

    #[test]
    fn integration_undoes_differentiation_and_products_are_exact() {
        let series = LegendreSeries::new(vec![0.3, -1.2, 0.8, 0.0, 2.5]);
        let back = series.integral().derivative();
        for x in [-0.9, 0.1, 0.8] {
            assert!((back.at(x) - series.at(x)).abs() < 1e-14, "at {x}: {} against {}", back.at(x), series.at(x));
        }
        // The product's integral from a rule that is exact for its degree.
        let [by_rule] = crate::num::gauss(1, |t| [2.0 * series.at(2.0 * t - 1.0).powi(2)]);
        assert!((series.dot(&series) - by_rule).abs() < 1e-14 * by_rule, "{} {by_rule}", series.dot(&series));
        assert!((series.mean() - 0.5 * series.integral().at(1.0)).abs() < 1e-15);
    }
}
