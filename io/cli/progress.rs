//! A progress bar with time left, and the request to stop.

use std::sync::atomic::{AtomicBool, Ordering};
use std::sync::{Arc, Mutex, PoisonError};
use std::time::{Duration, Instant};

use indicatif::{ProgressBar, ProgressDrawTarget, ProgressStyle};
use lenzbore_solver::monitor::Monitor;

use crate::end::End;

/// Work shorter than this shows no bar.
const QUIET: Duration = Duration::from_secs(1);
/// Positions of the bar.
const LENGTH: f64 = 1000.0;

/// Watches a computation from the terminal; shows nothing where standard error is no terminal.
pub struct Terminal {
    begin: Instant,
    stop: Arc<AtomicBool>,
    bar: Mutex<Option<ProgressBar>>,
}

impl Terminal {
    /// Installs the handler of Ctrl-C; a second Ctrl-C ends the program at once.
    pub fn new() -> Result<Self, End> {
        let stop = Arc::new(AtomicBool::new(false));
        let flag = Arc::clone(&stop);
        ctrlc::set_handler(move || {
            if flag.swap(true, Ordering::SeqCst) {
                std::process::exit(130);
            }
        })
        .map_err(|e| End::Failed(format!("no handler for Ctrl-C could be installed: {e}")))?;
        Ok(Self { begin: Instant::now(), stop, bar: Mutex::new(None) })
    }

    /// Removes the bar.
    pub fn finish(&self) {
        if let Some(bar) = self.bar.lock().unwrap_or_else(PoisonError::into_inner).take() {
            bar.finish_and_clear();
        }
    }
}

impl Monitor for Terminal {
    fn progress(&self, fraction: f64, doing: &str) {
        if self.begin.elapsed() < QUIET {
            return;
        }
        let mut bar = self.bar.lock().unwrap_or_else(PoisonError::into_inner);
        let bar = bar.get_or_insert_with(|| new_bar(self.begin.elapsed()));
        let position = position(fraction);
        if position > bar.position() {
            bar.set_position(position);
        }
        if bar.message() != doing {
            bar.set_message(doing.to_owned());
        }
    }

    fn cancelled(&self) -> bool {
        self.stop.load(Ordering::Relaxed)
    }
}

fn new_bar(elapsed: Duration) -> ProgressBar {
    let bar = ProgressBar::with_draw_target(Some(position(1.0)), ProgressDrawTarget::stderr()).with_elapsed(elapsed);
    if let Ok(style) = ProgressStyle::with_template("{bar:32} {percent:>3} %  {msg}, {eta} left") {
        bar.set_style(style);
    }
    bar
}

#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "clamped to 0 .. 1000")]
fn position(fraction: f64) -> u64 {
    (LENGTH * fraction.clamp(0.0, 1.0)) as u64
}
