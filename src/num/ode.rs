//! Ordinary differential equations that are stiff and have kinks: implicit Euler steps, extrapolated, of adaptive length.

use std::ops::ControlFlow;

use nalgebra::DVector;

/// A system dy/dt = f(y) that does not name the time, known by its implicit Euler steps.
pub trait Implicit {
    /// y with y - dt f(y) = `state`; none where it cannot be found: a shorter step is tried.
    fn euler(&self, state: &DVector<f64>, dt: f64) -> Option<DVector<f64>>;
}

/// Where a solution stands after a step.
#[derive(Clone, Debug, PartialEq)]
pub struct Moment {
    /// Time since the start.
    pub time: f64,
    /// y.
    pub state: DVector<f64>,
    /// dy/dt at the end of the step that led here; at the start, zero.
    pub rate: DVector<f64>,
}

/// A solution that came to no end: its steps ran out, or became too small to count.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Stalled {
    /// How far it came.
    pub time: f64,
    /// Steps tried.
    pub n_steps: usize,
}

/// Integrates from `start`, at time 0, until `visit` breaks off. It is called with the start and after every step. The
/// estimated error of a step is at most `tolerance`, component by component, and that of [`between`] its ends a thousand
/// times as much, also where the system comes to rest at a kink on the way; `n_most` steps are tried, the first of `first_dt`.
///
/// Order 4 where the solution is smooth. An implicit Euler step follows what is fast without overshooting, rests where the
/// system rests, and does not mind a kink; all that is extrapolated is such steps.
///
/// Source: Hairer & Wanner, Solving Ordinary Differential Equations II (1996), section IV.9, extrapolation methods (from
/// memory; a test measures the order).
pub fn integrate(
    system: &impl Implicit,
    start: DVector<f64>,
    tolerance: &DVector<f64>,
    first_dt: f64,
    n_most: usize,
    mut visit: impl FnMut(&Moment) -> ControlFlow<()>,
) -> Result<(), Stalled> {
    let mut now = Moment { time: 0.0, rate: DVector::zeros(start.len()), state: start };
    if visit(&now).is_break() {
        return Ok(());
    }
    let (mut dt, mut most_growth) = (first_dt, 5.0);
    for n_steps in 1..=n_most {
        if now.time + dt == now.time {
            return Err(Stalled { time: now.time, n_steps });
        }
        let Some(step) = Step::new(system, &now, dt) else {
            (dt, most_growth) = (0.25 * dt, 1.0);
            continue;
        };
        let share = |error: &DVector<f64>| error.component_div(tolerance).amax();
        let (error, error_between) = (share(&step.error), 1e-3 * share(&step.error_between));
        let growth = (0.9 * error.powf(-0.25)).min(0.9 * error_between.powf(-1.0 / 3.0));
        if error.max(error_between) <= 1.0 {
            now = step.end;
            if visit(&now).is_break() {
                return Ok(());
            }
            (dt, most_growth) = (dt * growth.clamp(0.2, most_growth), 5.0);
        } else {
            // Errors that are no numbers end here too.
            (dt, most_growth) = (dt * growth.clamp(0.2, 0.9), 1.0);
        }
    }
    Err(Stalled { time: now.time, n_steps: n_most })
}

/// The state at a time between two moments: the cubic by their states and rates; after the start, whose rate is not known, the
/// square by the rate of the later one.
pub fn between(a: &Moment, b: &Moment, time: f64) -> DVector<f64> {
    let dt = b.time - a.time;
    let x = (time - a.time) / dt;
    let way = &b.state - &a.state;
    let rate = if a.time > 0.0 { a.rate.clone() } else { &way * (2.0 / dt) - &b.rate };
    &a.state
        + way * (x * x * (3.0 - 2.0 * x))
        + rate * (x * (1.0 - x) * (1.0 - x) * dt)
        + &b.rate * (x * x * (x - 1.0) * dt)
}

/// Euler steps that a step is divided into, one way after the other.
const DIVISIONS: usize = 4;

/// A step, and the estimated errors of its end and of what is between.
struct Step {
    end: Moment,
    error: DVector<f64>,
    error_between: DVector<f64>,
}

impl Step {
    /// None where an Euler step fails.
    fn new(system: &impl Implicit, start: &Moment, dt: f64) -> Option<Step> {
        // Aitken-Neville for a step length of zero, row by row: states, and rates at the end.
        let mut row: Vec<[DVector<f64>; 2]> = vec![];
        let mut middles = vec![];
        for n in 1..=DIVISIONS {
            let h = dt / n as f64;
            let (mut before, mut after) = (start.state.clone(), start.state.clone());
            for i in 1..=n {
                before = std::mem::replace(&mut after, DVector::zeros(0));
                after = system.euler(&before, h)?;
                if 2 * i == n {
                    middles.push(after.clone());
                }
            }
            let mut next = vec![[after.clone(), (after - before) / h]];
            for (k, above) in row.iter().enumerate() {
                let ratio = n as f64 / (n - k - 1) as f64 - 1.0;
                let better = |i: usize| &next[k][i] + (&next[k][i] - &above[i]) / ratio;
                next.push([better(0), better(1)]);
            }
            row = next;
        }
        let [state, rate] = row.pop()?;
        let [less_exact, _] = row.pop()?;
        let end = Moment { time: start.time + dt, state, rate };
        // By one Euler step up to the middle, and by two.
        let middle = middles.pop()? * 2.0 - middles.pop()?;
        let error_between = middle - between(start, &end, start.time + 0.5 * dt);
        Some(Step { error: &end.state - less_exact, error_between, end })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// y' = -y^2 beside a fast z' = -k (z - y): y = 1 / (1 + t).
    struct Pair {
        fast: f64,
    }

    impl Implicit for Pair {
        fn euler(&self, state: &DVector<f64>, dt: f64) -> Option<DVector<f64>> {
            let y = 2.0 * state[0] / (1.0 + (1.0 + 4.0 * dt * state[0]).sqrt());
            let z = (state[1] + dt * self.fast * y) / (1.0 + dt * self.fast);
            Some(DVector::from_vec(vec![y, z]))
        }
    }

    fn start() -> DVector<f64> {
        DVector::from_vec(vec![1.0, 1.0])
    }

    #[test]
    fn a_step_is_of_order_four_and_its_estimates_of_less() {
        // The error of one step goes with one power more.
        let local = |dt: f64| {
            let start = Moment { time: 1.0, state: start() * 0.5, rate: start() * -0.25 };
            let step = Step::new(&Pair { fast: 1.0 }, &start, dt).unwrap();
            let y = 1.0 / (2.0 + dt);
            [step.end.state[0] - y, step.error[0], step.end.rate[0] + y * y, step.error_between[0]].map(f64::abs)
        };
        let orders = local(0.04).into_iter().zip(local(0.02)).map(|(coarse, fine)| (coarse / fine).log2());
        for (order, least) in orders.zip([5.0, 4.0, 4.0, 3.0]) {
            assert!(order > least - 0.25, "expected at least {least}, got {order}");
        }
    }

    #[test]
    fn a_stiff_pair_takes_few_steps_and_keeps_its_tolerance() {
        for fast in [1.0, 1e3, 1e9] {
            let (mut n_steps, mut worst) = (0, 0.0_f64);
            let visit = |now: &Moment| {
                n_steps += 1;
                worst = worst.max((now.state[0] - 1.0 / (1.0 + now.time)).abs());
                if now.time > 100.0 { ControlFlow::Break(()) } else { ControlFlow::Continue(()) }
            };
            integrate(&Pair { fast }, start(), &(start() * 1e-9), 1e-6, 1000, visit).unwrap();
            assert!(worst < 2e-8 && n_steps < 500, "fast {fast}: off by {worst:e} after {n_steps} steps");
        }
    }

    #[test]
    fn steps_that_lead_nowhere_end() {
        /// y' = -1 down to a half, where nothing more is known.
        struct Broken;
        impl Implicit for Broken {
            fn euler(&self, state: &DVector<f64>, dt: f64) -> Option<DVector<f64>> {
                (state[0] - dt >= 0.5).then(|| state.add_scalar(-dt))
            }
        }
        let one = DVector::from_vec(vec![1.0]);
        let on = |_: &Moment| ControlFlow::Continue(());
        let stalled = integrate(&Broken, one.clone(), &(one * 1e-6), 1e-3, 10_000, on).unwrap_err();
        assert!((stalled.time - 0.5).abs() < 1e-3 && stalled.n_steps < 1000, "{stalled:?}");
        let stalled = integrate(&Pair { fast: 1.0 }, start(), &(start() * 1e-6), 1e-6, 20, on).unwrap_err();
        assert_eq!(stalled.n_steps, 20);
    }
}
