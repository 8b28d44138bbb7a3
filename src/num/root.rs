//! Bracketed roots and minima of functions of one variable.

/// The point in `low..high` at which `is_beyond` turns from false to true, to `tolerance`; assumes that it does
/// so once. Gives `high` where it never does.
pub fn bisect(mut low: f64, mut high: f64, tolerance: f64, mut is_beyond: impl FnMut(f64) -> bool) -> f64 {
    if is_beyond(low) {
        return low;
    }
    while high - low > tolerance {
        let middle = 0.5 * (low + high);
        if middle <= low || middle >= high {
            break;
        }
        if is_beyond(middle) { high = middle } else { low = middle }
    }
    0.5 * (low + high)
}

/// The point and value of the least of `f` in `low..high`, by golden section, to `tolerance`; a local one where
/// there are several.
///
/// Source: Kiefer (1953) (from memory).
pub fn golden_min(low: f64, high: f64, tolerance: f64, mut f: impl FnMut(f64) -> f64) -> (f64, f64) {
    const SHARE: f64 = 0.618_033_988_749_894_8;
    let (mut a, mut b) = (low, high);
    let (mut x1, mut x2) = (b - SHARE * (b - a), a + SHARE * (b - a));
    let (mut f1, mut f2) = (f(x1), f(x2));
    while b - a > tolerance {
        if f1 <= f2 {
            (b, x2, f2) = (x2, x1, f1);
            x1 = b - SHARE * (b - a);
            f1 = f(x1);
        } else {
            (a, x1, f1) = (x1, x2, f2);
            x2 = a + SHARE * (b - a);
            f2 = f(x2);
        }
        if x1 >= x2 {
            break;
        }
    }
    if f1 <= f2 { (x1, f1) } else { (x2, f2) }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn bisection_and_golden_section_find_what_is_there() {
        let root = bisect(0.0, 2.0, 1e-14, |x| x * x > 2.0);
        assert!((root - std::f64::consts::SQRT_2).abs() < 1e-13, "{root}");
        assert_eq!(bisect(3.0, 4.0, 1e-14, |x| x > 2.0), 3.0);
        let (x, value) = golden_min(0.0, 3.0, 1e-9, |x| (x - 1.25) * (x - 1.25) + 2.0);
        assert!((x - 1.25).abs() < 1e-7 && (value - 2.0).abs() < 1e-12, "{x} {value}");
    }
}
