//! How far long work has come, and whether it is still wanted. Knows no clock, no thread and no work.

use std::sync::atomic::{AtomicBool, AtomicUsize, Ordering};

/// Shared by who works and who waits.
#[derive(Debug, Default)]
pub struct Progress {
    n_done: AtomicUsize,
    n_all: AtomicUsize,
    is_stopped: AtomicBool,
}

impl Progress {
    /// The work has `n_all` steps; none is done yet.
    pub fn begin(&self, n_all: usize) {
        self.n_done.store(0, Ordering::Relaxed);
        self.n_all.store(n_all, Ordering::Relaxed);
    }

    /// `n` more steps are done. Gives whether the work is still wanted.
    pub fn advance(&self, n: usize) -> bool {
        self.n_done.fetch_add(n, Ordering::Relaxed);
        !self.is_stopped()
    }

    /// Share that is done, 0 to 1; 0 before the work has begun.
    pub fn share(&self) -> f64 {
        let n_all = self.n_all.load(Ordering::Relaxed);
        if n_all == 0 { 0.0 } else { (self.n_done.load(Ordering::Relaxed) as f64 / n_all as f64).min(1.0) }
    }

    /// Asks the work to end as soon as it can.
    pub fn stop(&self) {
        self.is_stopped.store(true, Ordering::Relaxed);
    }

    /// Whether the work was asked to end.
    pub fn is_stopped(&self) -> bool {
        self.is_stopped.load(Ordering::Relaxed)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_share_grows_to_one_and_no_further() {
        let progress = Progress::default();
        assert_eq!(progress.share(), 0.0);
        progress.begin(4);
        assert!(progress.advance(1));
        assert_eq!(progress.share(), 0.25);
        progress.stop();
        assert!(!progress.advance(9), "nobody wants it any more");
        assert_eq!(progress.share(), 1.0);
    }
}
