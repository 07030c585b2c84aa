//! How a long computation reports progress and is asked to stop.

/// Watches a computation. Implementations must be cheap: `progress` is called once a step.
pub trait Monitor: Sync {
    /// `fraction` of the whole job is done, 0 to 1, never decreasing; `doing` says what in a few words.
    fn progress(&self, fraction: f64, doing: &str);
    /// True once the computation should stop; it then ends with an `Interrupted` error.
    fn cancelled(&self) -> bool;
}

/// A monitor that shows nothing and never stops.
#[derive(Debug, Clone, Copy, Default)]
pub struct Unwatched;

impl Monitor for Unwatched {
    fn progress(&self, _fraction: f64, _doing: &str) {}
    fn cancelled(&self) -> bool {
        false
    }
}

/// Passes the request to stop on, but reports no progress: for work beside the level that does.
pub(crate) struct Quiet<'m> {
    pub(crate) inner: &'m dyn Monitor,
}

impl Monitor for Quiet<'_> {
    fn progress(&self, _fraction: f64, _doing: &str) {}
    fn cancelled(&self) -> bool {
        self.inner.cancelled()
    }
}
