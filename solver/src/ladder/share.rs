//! A part of a longer job, as its monitor sees it.

use crate::monitor::Monitor;

/// Passes progress on as a share of the whole.
pub(super) struct Share<'m> {
    pub inner: &'m dyn Monitor,
    pub from: f64,
    pub to: f64,
    pub doing: &'static str,
}

impl Monitor for Share<'_> {
    fn progress(&self, fraction: f64, _doing: &str) {
        self.inner.progress(self.from + (self.to - self.from) * fraction, self.doing);
    }

    fn cancelled(&self) -> bool {
        self.inner.cancelled()
    }
}
