//! Independent solutions, as many side by side as there are cores and memory for.

use std::sync::atomic::{AtomicUsize, Ordering};
use std::sync::{Mutex, PoisonError};

use lenzbore_solver::cost::rough_memory_bytes;
use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::problem::Problem;

use crate::end::End;
use crate::memory;

/// Passes a request to stop on; progress is told by the number of jobs done.
struct Beside<'m>(&'m dyn Monitor);

impl Monitor for Beside<'_> {
    fn progress(&self, _fraction: f64, _doing: &str) {}
    fn cancelled(&self) -> bool {
        self.0.cancelled()
    }
}

/// Solutions that fit side by side: the cores, fewer where the memory does not last.
fn how_many(problem: &Problem, curve: Option<&[f64]>) -> usize {
    let cores = std::thread::available_parallelism().map_or(1, usize::from);
    let fits = |n: usize| match (
        rough_memory_bytes(problem, curve.and_then(|s| s.last().copied())),
        memory::available_bytes(),
    ) {
        (Ok(needed), Some(available)) => needed * f64::from(u32::try_from(n).unwrap_or(u32::MAX)) <= 0.8 * available,
        _ => true,
    };
    (1..=cores).rev().find(|n| fits(*n)).unwrap_or(1)
}

/// Does every job and gives the results in their order; the first that fails ends it all.
///
/// `size` (a problem and a curve's speeds) says how much memory one job takes.
pub fn side_by_side<J: Sync, R: Send>(
    jobs: &[J],
    size: (&Problem, Option<&[f64]>),
    monitor: &dyn Monitor,
    doing: &str,
    work: &(dyn Fn(&J, &dyn Monitor) -> Result<R, End> + Sync),
) -> Result<Vec<R>, End> {
    let next = AtomicUsize::new(0);
    let done = AtomicUsize::new(0);
    let results: Mutex<Vec<(usize, Result<R, End>)>> = Mutex::new(Vec::with_capacity(jobs.len()));
    let beside = Beside(monitor);
    let total = f64::from(u32::try_from(jobs.len().max(1)).unwrap_or(u32::MAX));
    std::thread::scope(|scope| {
        for _ in 0..how_many(size.0, size.1).min(jobs.len()) {
            scope.spawn(|| {
                loop {
                    let k = next.fetch_add(1, Ordering::Relaxed);
                    let Some(job) = jobs.get(k) else { break };
                    let result = work(job, &beside);
                    if result.is_err() {
                        // Nobody takes another job.
                        next.store(jobs.len(), Ordering::Relaxed);
                    }
                    results.lock().unwrap_or_else(PoisonError::into_inner).push((k, result));
                    let count = done.fetch_add(1, Ordering::Relaxed) + 1;
                    let share = f64::from(u32::try_from(count).unwrap_or(u32::MAX)) / total;
                    monitor.progress(share, &format!("{doing}: {count} of {} solutions", jobs.len()));
                }
            });
        }
    });
    let mut results = results.into_inner().unwrap_or_else(PoisonError::into_inner);
    results.sort_by_key(|(k, _)| *k);
    results.into_iter().map(|(_, r)| r).collect()
}
