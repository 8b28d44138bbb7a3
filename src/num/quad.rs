//! Quadrature over 0..1.

use std::f64::consts::FRAC_PI_2;
use std::sync::LazyLock;

/// Nodes and weights of 10-point Gauss-Legendre quadrature on 0..1, the nodes as distances from the middle.
///
/// Source: Abramowitz & Stegun (1964), table 25.4, n = 10 (values from memory; a test integrates powers exactly).
const GAUSS_10: [(f64, f64); 5] = [
    (0.148_874_338_981_631_21 / 2.0, 0.295_524_224_714_752_9 / 2.0),
    (0.433_395_394_129_247_2 / 2.0, 0.269_266_719_309_996_36 / 2.0),
    (0.679_409_568_299_024_4 / 2.0, 0.219_086_362_515_982_04 / 2.0),
    (0.865_063_366_688_984_5 / 2.0, 0.149_451_349_150_580_6 / 2.0),
    (0.973_906_528_517_171_7 / 2.0, 0.066_671_344_308_688_14 / 2.0),
];

/// Integrates a vector-valued function over 0..1 in `n_panels` equal panels of 10 points each. Exact to rounding
/// for polynomials up to degree 19 a panel.
pub fn gauss<const N: usize>(n_panels: usize, mut f: impl FnMut(f64) -> [f64; N]) -> [f64; N] {
    let h = 1.0 / n_panels as f64;
    let mut sum = [0.0; N];
    for panel in 0..n_panels {
        let middle = (panel as f64 + 0.5) * h;
        for (node, weight) in GAUSS_10 {
            let (a, b) = (f(middle - node * h), f(middle + node * h));
            for i in 0..N {
                sum[i] += weight * h * (a[i] + b[i]);
            }
        }
    }
    sum
}

/// Integrates a vector-valued function over 0..1 by the tanh-sinh rule: accurate to about 1e-14 also where the
/// function has a root-like singularity at an end.
///
/// Source: Takahasi & Mori (1974), double exponential formulas (from memory; tested against closed forms).
pub fn tanh_sinh<const N: usize>(mut f: impl FnMut(f64) -> [f64; N]) -> [f64; N] {
    let mut sum = [0.0; N];
    for &(x, weight) in TANH_SINH.iter() {
        let value = f(x);
        for i in 0..N {
            sum[i] += weight * value[i];
        }
    }
    sum
}

/// Nodes and weights of the tanh-sinh rule on 0..1.
static TANH_SINH: LazyLock<Vec<(f64, f64)>> = LazyLock::new(|| {
    const STEP: f64 = 1.0 / 7.0;
    const N_STEPS: i32 = 23;
    let node = |k: i32| {
        let t = f64::from(k) * STEP;
        let s = FRAC_PI_2 * t.sinh();
        // x = (1 + tanh s) / 2, written so that it keeps its figures near zero.
        let x = 1.0 / (1.0 + (-2.0 * s).exp());
        (x, STEP * FRAC_PI_2 * t.cosh() * 0.5 / (s.cosh() * s.cosh()))
    };
    (-N_STEPS..=N_STEPS).map(node).filter(|(_, weight)| *weight > 0.0).collect()
});

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn gauss_integrates_powers_exactly() {
        for power in 0..20 {
            let got = gauss(1, |t| [t.powi(power)])[0];
            let want = 1.0 / f64::from(power + 1);
            assert!((got - want).abs() < 4e-16, "power {power}: {got} against {want}");
        }
    }

    #[test]
    fn tanh_sinh_keeps_its_figures_at_a_root() {
        for (power, want) in [(0.5, 2.0 / 3.0), (1.5, 0.4), (0.0, 1.0), (3.0, 0.25)] {
            let got = tanh_sinh(|t| [t.powf(power)])[0];
            assert!((got - want).abs() < 2e-14, "power {power}: {got} against {want}");
        }
    }
}
