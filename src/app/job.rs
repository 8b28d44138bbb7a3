//! Work that would hold the window up, done beside it.
//!
//! Knows no clock and not what is worked out. A job that is dropped is asked to end, and what it still sends goes nowhere.

use std::sync::Arc;
use std::sync::mpsc::{Receiver, TryRecvError, channel};

use crate::progress::Progress;

/// Threads for all jobs: one less than there are cores, so that the window keeps one.
#[derive(Debug)]
pub struct Workers {
    /// None where the system gives no threads; jobs then end at once, without a result.
    pool: Option<rayon::ThreadPool>,
}

impl Default for Workers {
    fn default() -> Workers {
        let n_cores = std::thread::available_parallelism().map_or(1, |n| n.get());
        let builder = rayon::ThreadPoolBuilder::new()
            .num_threads(n_cores.saturating_sub(1).max(1))
            .thread_name(|i| format!("worker {i}"))
            // A job that fails ends without a result; the window lives on.
            .panic_handler(|_| {});
        Workers { pool: builder.build().ok() }
    }
}

impl Workers {
    /// Starts a job. `work` may send better and better results; each is followed by `wake`, and so is the end.
    pub fn start<T: Send + 'static>(
        &self,
        wake: impl Fn() + Send + 'static,
        work: impl FnOnce(&Progress, &dyn Fn(T)) + Send + 'static,
    ) -> Job<T> {
        let progress = Arc::new(Progress::default());
        let (send, results) = channel();
        let shared = progress.clone();
        let run = move || {
            if !shared.is_stopped() {
                work(&shared, &|result| {
                    // Nobody may be waiting any more.
                    let _ = send.send(result);
                    wake();
                });
            }
            drop(send);
            wake();
        };
        if let Some(pool) = &self.pool {
            pool.spawn(run);
        }
        Job { progress, results, is_running: true }
    }
}

/// One piece of work under way.
#[derive(Debug)]
pub struct Job<T> {
    progress: Arc<Progress>,
    results: Receiver<T>,
    is_running: bool,
}

impl<T> Job<T> {
    /// The newest result since it was last asked for.
    pub fn latest(&mut self) -> Option<T> {
        let mut latest = None;
        loop {
            match self.results.try_recv() {
                Ok(result) => latest = Some(result),
                Err(TryRecvError::Empty) => return latest,
                Err(TryRecvError::Disconnected) => {
                    self.is_running = false;
                    return latest;
                }
            }
        }
    }

    /// Whether it was under way when [`Job::latest`] was last asked for.
    pub fn is_running(&self) -> bool {
        self.is_running
    }

    /// Share that is done, 0 to 1.
    pub fn share(&self) -> f64 {
        self.progress.share()
    }
}

impl<T> Drop for Job<T> {
    fn drop(&mut self) {
        self.progress.stop();
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::sync::mpsc::sync_channel;

    /// Asks until the job has ended; gives the last result.
    fn outcome<T>(job: &mut Job<T>) -> Option<T> {
        let mut last = None;
        while job.is_running() {
            last = job.latest().or(last);
            std::thread::yield_now();
        }
        last
    }

    #[test]
    fn better_results_come_one_after_the_other_and_the_last_one_stays() {
        let workers = Workers::default();
        let (next, wait) = sync_channel::<()>(0);
        let mut job = workers.start(
            || {},
            move |progress, send| {
                progress.begin(2);
                progress.advance(1);
                send("coarse");
                let _ = wait.recv();
                progress.advance(1);
                send("fine");
            },
        );
        let coarse = loop {
            if let Some(result) = job.latest() {
                break result;
            }
            std::thread::yield_now();
        };
        assert_eq!((coarse, job.share(), job.is_running()), ("coarse", 0.5, true));
        next.send(()).unwrap();
        assert_eq!(outcome(&mut job), Some("fine"));
        assert_eq!(job.share(), 1.0);
    }

    #[test]
    fn a_dropped_job_is_asked_to_end() {
        let workers = Workers::default();
        let (begun, begin) = channel();
        let (ended, end) = channel();
        let job: Job<()> = workers.start(
            || {},
            move |progress, _| {
                let _ = begun.send(());
                while !progress.is_stopped() {
                    std::thread::yield_now();
                }
                let _ = ended.send(());
            },
        );
        begin.recv().expect("the work began");
        drop(job);
        end.recv().expect("the work saw that nobody wants it");
    }

    #[test]
    fn work_that_panics_ends_without_a_result() {
        let workers = Workers::default();
        let mut job: Job<()> = workers.start(|| {}, |_, _| panic!("on purpose"));
        assert_eq!(outcome(&mut job), None);
        assert_eq!(outcome(&mut workers.start(|| {}, |_, send| send(7))), Some(7), "the threads live on");
    }
}
