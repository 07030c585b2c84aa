//! Independent jobs, as many at once as there are cores.

use std::sync::atomic::{AtomicUsize, Ordering};
use std::sync::{Mutex, PoisonError};

use lenzbore_solver::monitor::Monitor;

/// Passes a request to stop on; progress is told by the number of jobs done.
struct Beside<'m>(&'m dyn Monitor);

impl Monitor for Beside<'_> {
    fn progress(&self, _fraction: f64, _doing: &str) {}
    fn cancelled(&self) -> bool {
        self.0.cancelled()
    }
}

/// Does every job, the last of the list first, and gives the results in the list's order.
///
/// `doing` says in a few words what a finished job was. Once the monitor asks to stop no more jobs are begun: `None`.
pub(crate) fn side_by_side<J: Sync, R: Send>(
    jobs: &[J],
    monitor: &dyn Monitor,
    doing: impl Fn(&J) -> String + Sync,
    work: impl Fn(&J, &dyn Monitor) -> R + Sync,
) -> Option<Vec<R>> {
    let cores = std::thread::available_parallelism().map_or(1, usize::from);
    let (begun, done) = (AtomicUsize::new(0), AtomicUsize::new(0));
    let results: Mutex<Vec<(usize, R)>> = Mutex::new(Vec::with_capacity(jobs.len()));
    let beside = Beside(monitor);
    std::thread::scope(|scope| {
        for _ in 0..cores.min(jobs.len()) {
            scope.spawn(|| {
                while !monitor.cancelled() {
                    let k = begun.fetch_add(1, Ordering::Relaxed);
                    let Some(job) = jobs.len().checked_sub(k + 1).and_then(|place| jobs.get(place)) else { break };
                    let result = work(job, &beside);
                    results.lock().unwrap_or_else(PoisonError::into_inner).push((jobs.len() - 1 - k, result));
                    let count = done.fetch_add(1, Ordering::Relaxed) + 1;
                    let share = count as f64 / jobs.len() as f64;
                    monitor.progress(share, &format!("{} ({count} of {})", doing(job), jobs.len()));
                }
            });
        }
    });
    let mut results = results.into_inner().unwrap_or_else(PoisonError::into_inner);
    results.sort_by_key(|(place, _)| *place);
    (results.len() == jobs.len() && !monitor.cancelled()).then(|| results.into_iter().map(|(_, r)| r).collect())
}

#[cfg(test)]
mod tests {
    use std::sync::atomic::AtomicBool;

    use lenzbore_solver::monitor::Unwatched;

    use super::*;

    #[test]
    fn results_come_in_the_order_of_the_jobs() {
        let jobs: Vec<usize> = (0..50).collect();
        let squares = side_by_side(&jobs, &Unwatched, |_| String::new(), |n, _| n * n);
        assert_eq!(squares, Some(jobs.iter().map(|n| n * n).collect()));
        assert_eq!(side_by_side(&[0_u8; 0], &Unwatched, |_| String::new(), |n, _| *n), Some(Vec::new()));
    }

    struct Impatient(AtomicBool);

    impl Monitor for Impatient {
        fn progress(&self, _fraction: f64, _doing: &str) {
            self.0.store(true, Ordering::Relaxed);
        }
        fn cancelled(&self) -> bool {
            self.0.load(Ordering::Relaxed)
        }
    }

    #[test]
    fn a_request_to_stop_ends_it() {
        let begun = AtomicUsize::new(0);
        let count = |_: &u32, _: &dyn Monitor| begun.fetch_add(1, Ordering::Relaxed);
        assert_eq!(side_by_side(&[1; 5000], &Impatient(AtomicBool::new(false)), |_| String::new(), count), None);
        assert!(begun.load(Ordering::Relaxed) < 5000);
    }
}
