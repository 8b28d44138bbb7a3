//! Bracketed roots of functions of one variable.

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

/// A root of a continuous `f` between `low` and `high`, to `tolerance`, where f(low) <= 0 < f(high); `low` where it
/// is not below zero there already.
///
/// Source: Chandrupatla (1997), a hybrid of bisection and inverse quadratic interpolation (from memory; tested).
pub fn root(low: f64, high: f64, tolerance: f64, mut f: impl FnMut(f64) -> f64) -> f64 {
    let (at_low, at_high) = (f(low), f(high));
    root_between((low, at_low), (high, at_high), tolerance, f)
}

/// The same where the values at both ends are known.
pub fn root_between(
    (low, at_low): (f64, f64),
    (high, at_high): (f64, f64),
    tolerance: f64,
    mut f: impl FnMut(f64) -> f64,
) -> f64 {
    let (mut a, mut fa, mut b, mut fb) = (high, at_high, low, at_low);
    if fb >= 0.0 {
        return low;
    }
    let (mut c, mut fc);
    // Where the straight line meets zero, unless an end is infinite.
    let straight = fa / (fa - fb);
    let mut share = if straight.is_finite() { straight.clamp(0.05, 0.95) } else { 0.5 };
    for _ in 0..200 {
        let x = a + share * (b - a);
        let fx = f(x);
        if (fx > 0.0) == (fa > 0.0) {
            (c, fc) = (a, fa);
        } else {
            (c, fc, b, fb) = (b, fb, a, fa);
        }
        (a, fa) = (x, fx);
        let best = if fa.abs() < fb.abs() { a } else { b };
        let least = (2.0 * f64::EPSILON * best.abs() + tolerance) / (b - a).abs();
        // Not a number where both ends are one.
        if least.is_nan() || least > 0.5 || fa == 0.0 {
            return best;
        }
        let (xi, phi) = ((a - b) / (c - b), (fa - fb) / (fc - fb));
        let is_smooth = phi * phi < xi && (1.0 - phi) * (1.0 - phi) < 1.0 - xi;
        share = if is_smooth {
            fa / (fb - fa) * fc / (fb - fc) + (c - a) / (b - a) * fa / (fc - fa) * fb / (fc - fb)
        } else {
            0.5
        };
        share = share.clamp(least, 1.0 - least);
    }
    0.5 * (a + b)
}

/// A root or a jump of `f` between `low` and `high`, where f(low) <= 0 < f(high), as a bracket no wider than `tolerance`:
/// `f` is not above zero at its first end, and is at its second. By Newton steps that bisection guards; `f` gives its
/// value and, where it has one, its slope. Both ends are `low` where it is above zero there already.
pub fn bracket(low: f64, high: f64, tolerance: f64, mut f: impl FnMut(f64) -> (f64, Option<f64>)) -> [f64; 2] {
    let (mut a, mut b) = (low, high);
    // Where Newton would go from either end, and how far that end is off.
    let aim = |x: f64, (fx, slope): (f64, Option<f64>)| slope.filter(|s| *s > 0.0).map(|s| (fx.abs(), x - fx / s));
    let at_low = f(low);
    if at_low.0 > 0.0 {
        return [low; 2];
    }
    let (mut from_a, mut from_b) = (aim(low, at_low), None);
    let (mut width, near) = (b - a, 0.5 * tolerance);
    let mut stride = near;
    for i in 1..200 {
        if b - a <= tolerance {
            break;
        }
        let nearer = [from_a, from_b].into_iter().flatten().min_by(|p, q| p.0.total_cmp(&q.0));
        // At its end Newton lands on the end that it came from, or beyond: just inside, the other side tells. Longer and
        // longer strides, where that is not so just yet.
        let (to_a, to_b) = (|to: f64| to <= a + near, |to: f64| to >= b - near);
        let newton = nearer.map(|(_, to)| {
            if to_a(to) {
                a + stride
            } else if to_b(to) {
                b - stride
            } else {
                to
            }
        });
        let hugs = nearer.is_some_and(|(_, to)| to_a(to) || to_b(to));
        stride = if hugs { 1000.0 * stride } else { near };
        // Every fourth time, bisect if Newton has not quartered the bracket since: its slope may mislead.
        let is_slow = !hugs && i % 4 == 0 && b - a > 0.25 * width;
        if i % 4 == 0 {
            width = b - a;
        }
        let next = newton.filter(|next| *next > a && *next < b && !is_slow).unwrap_or(0.5 * (a + b));
        if next <= a || next >= b {
            break;
        }
        let value = f(next);
        if value.0 > 0.0 {
            (b, from_b) = (next, aim(next, value));
        } else {
            (a, from_a) = (next, aim(next, value));
        }
    }
    [a, b]
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
    fn bracketed_roots_find_what_is_there() {
        let sqrt2 = std::f64::consts::SQRT_2;
        let found = bisect(0.0, 2.0, 1e-14, |x| x * x > 2.0);
        assert!((found - sqrt2).abs() < 1e-13, "{found}");
        for (low, high) in [(0.0, 2.0), (1.0, 1e6), (sqrt2 - 1e-9, 1.5)] {
            let mut n_calls = 0;
            let found = root(low, high, 1e-15, |x| {
                n_calls += 1;
                x * x - 2.0
            });
            assert!((found - sqrt2).abs() < 1e-14 && n_calls < 60, "{found} in {n_calls} calls from {low}..{high}");
        }
        // Ends at which it is infinite, and two ends that are one.
        let jump = |x: f64| if x > sqrt2 { f64::INFINITY } else { f64::NEG_INFINITY };
        assert!((root(0.0, 2.0, 1e-14, jump) - sqrt2).abs() < 1e-13);
        assert!((root(0.0, 2.0, 1e-14, |x| if x > sqrt2 { f64::INFINITY } else { x - sqrt2 }) - sqrt2).abs() < 1e-13);
        assert_eq!(root_between((0.0, -1.0), (0.0, 1.0), 0.0, |_| -1.0), 0.0);
        for (low, high) in [(0.0, 2.0), (1.0, 1e6), (sqrt2 - 1e-9, 1.5)] {
            let mut n_calls = 0;
            let [_, found] = bracket(low, high, 1e-14, |x| {
                n_calls += 1;
                (x * x - 2.0, (x > 0.0).then_some(2.0 * x))
            });
            assert!((found - sqrt2).abs() < 1e-13 && n_calls < 40, "{found} in {n_calls} calls from {low}..{high}");
        }
        assert_eq!(bracket(3.0, 4.0, 1e-15, |x| (x - 2.0, Some(1.0))), [3.0; 2]);
        let [before, jump] = bracket(0.0, 1.0, 1e-14, |x| (if x > 0.3 { 7.0 } else { -1.0 }, None));
        assert!(before <= 0.3 && jump > 0.3 && jump - before <= 1e-14, "round the jump: {before}..{jump}");
        // Without a slope, and with one that misleads.
        for slope in [None, Some(1e-3), Some(1e3), Some(-1.0)] {
            let [found, _] = bracket(0.0, 2.0, 1e-13, |x| (x * x * x - 2.0, slope));
            assert!((found - 2f64.cbrt()).abs() < 1e-9, "{found} with the slope {slope:?}");
        }
        assert_eq!(root(3.0, 4.0, 1e-15, |x| x - 2.0), 3.0);
        assert_eq!(bisect(3.0, 4.0, 1e-14, |x| x > 2.0), 3.0);
    }

    #[test]
    fn golden_section_finds_the_least() {
        let (x, value) = golden_min(0.0, 3.0, 1e-9, |x| (x - 1.25) * (x - 1.25) + 2.0);
        assert!((x - 1.25).abs() < 1e-7 && (value - 2.0).abs() < 1e-12, "{x} {value}");
    }
}
