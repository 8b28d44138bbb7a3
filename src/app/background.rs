//! A result that is kept in step with its inputs by jobs.
//!
//! Whatever belongs to other inputs than those asked for is called off, and shown as old until the new one is there.

use super::job::Job;

/// How long inputs must have stayed as they are before work on them starts, s: not at every step of a drag.
const QUIET_S: f64 = 0.12;

/// What is worked out from inputs `K`, in better and better results `T`.
#[derive(Debug)]
pub struct Background<K, T> {
    wanted: Option<K>,
    since_s: f64,
    found: Option<(K, T)>,
    work: Work<T>,
}

#[derive(Debug)]
enum Work<T> {
    /// Inputs have changed; nothing has been started.
    Waits,
    Runs(Job<T>),
    /// Ended, with or without a result.
    Done,
    /// Called off by the user, at this share.
    Stopped(f64),
}

impl<K, T> Default for Background<K, T> {
    fn default() -> Background<K, T> {
        Background { wanted: None, since_s: 0.0, found: None, work: Work::Done }
    }
}

impl<K: Clone + PartialEq, T> Background<K, T> {
    /// Says what is wanted at a time, s; nothing where there is nothing to work out. `start` starts a job for it. Gives
    /// how soon to ask again, s, where something is about to start.
    pub fn want(&mut self, inputs: Option<K>, now_s: f64, start: impl FnOnce(&K) -> Job<T>) -> Option<f64> {
        if self.wanted != inputs {
            // Dropping a job calls it off.
            self.work = if inputs.is_some() { Work::Waits } else { Work::Done };
            (self.wanted, self.since_s) = (inputs, now_s);
        }
        let wanted = self.wanted.as_ref()?;
        if let Work::Waits = self.work {
            let left = self.since_s + QUIET_S - now_s;
            if left > 0.0 {
                return Some(left);
            }
            self.work = Work::Runs(start(wanted));
        }
        if let Work::Runs(job) = &mut self.work {
            if let Some(result) = job.latest() {
                self.found = Some((wanted.clone(), result));
            }
            if !job.is_running() {
                self.work = Work::Done;
            }
        }
        None
    }

    /// The last result with its inputs.
    pub fn found(&self) -> Option<(&K, &T)> {
        self.found.as_ref().map(|(inputs, result)| (inputs, result))
    }

    /// Whether the last result belongs to other inputs than those that are wanted.
    pub fn is_old(&self) -> bool {
        self.found.as_ref().map(|(inputs, _)| inputs) != self.wanted.as_ref()
    }

    /// Share that is done while work is under way.
    pub fn share(&self) -> Option<f64> {
        if let Work::Runs(job) = &self.work { Some(job.share()) } else { None }
    }

    /// Share at which the user called it off.
    pub fn stopped_at(&self) -> Option<f64> {
        if let Work::Stopped(share) = self.work { Some(share) } else { None }
    }

    /// Takes up what the user called off.
    pub fn start_again(&mut self) {
        if let Work::Stopped(_) = self.work {
            self.work = Work::Waits;
        }
    }

    /// Calls it off until other inputs are wanted, or it is taken up again; what is there stays.
    pub fn stop(&mut self) {
        if let Some(share) = self.share() {
            self.work = Work::Stopped(share);
        }
    }
}

#[cfg(test)]
mod tests {
    use super::super::job::Workers;
    use super::*;

    #[test]
    fn work_starts_when_inputs_rest_and_old_results_are_told_apart() {
        let workers = Workers::default();
        let mut twice: Background<i32, i32> = Background::default();
        let start = |x: &i32| {
            let x = *x;
            workers.start(|| {}, move |_, send| send(2 * x))
        };
        let untouched = |_: &i32| -> Job<i32> { panic!("not yet") };
        assert_eq!(twice.want(Some(1), 0.0, untouched), Some(QUIET_S));
        assert!(twice.want(Some(2), 0.1, untouched).is_some(), "changed again: it starts to rest anew");
        assert!(twice.want(Some(2), 0.2, untouched).is_some_and(|left| left < QUIET_S));
        while twice.found() != Some((&2, &4)) {
            assert_eq!(twice.want(Some(2), 1.0, start), None);
        }
        assert!(!twice.is_old());
        twice.want(Some(3), 2.0, untouched);
        assert_eq!((twice.found(), twice.is_old()), (Some((&2, &4)), true), "old, and said to be");
        twice.want(None, 3.0, untouched);
        assert_eq!((twice.is_old(), twice.share()), (true, None));
    }

    #[test]
    fn what_was_stopped_stays_stopped_until_inputs_change() {
        let workers = Workers::default();
        let mut endless: Background<i32, i32> = Background::default();
        let start = |x: &i32| {
            let x = *x;
            workers.start(
                || {},
                move |progress, send| {
                    progress.begin(4);
                    progress.advance(1);
                    send(x);
                    while !progress.is_stopped() {
                        std::thread::yield_now();
                    }
                },
            )
        };
        endless.want(Some(1), 0.0, start);
        while endless.found().is_none() {
            endless.want(Some(1), 1.0, start);
        }
        endless.stop();
        endless.want(Some(1), 2.0, |_| -> Job<i32> { panic!("stopped is stopped") });
        assert_eq!((endless.stopped_at(), endless.found()), (Some(0.25), Some((&1, &1))));
        endless.start_again();
        endless.want(Some(1), 2.5, start);
        assert_eq!((endless.stopped_at(), endless.share().is_some()), (None, true));
        endless.stop();
        endless.want(Some(2), 3.0, start);
        endless.want(Some(2), 4.0, start);
        assert_eq!((endless.stopped_at(), endless.share().is_some()), (None, true));
    }
}
