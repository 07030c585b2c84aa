//! Refinement factors f = 1, 1.5, 2, 2.5, 3 relative to the coarsest level.

/// A refinement factor in halves, so that an even cell count times f stays whole.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Refinement {
    halves: usize,
}

impl Refinement {
    /// The coarsest level, f = 1.
    pub const COARSEST: Self = Self { halves: 2 };

    /// The first `count` levels: f = 1, 1.5, 2, ...
    #[must_use]
    pub fn first(count: usize) -> Vec<Self> {
        (0..count).map(|k| Self { halves: 2 + k }).collect()
    }

    /// The factor f.
    #[must_use]
    #[expect(clippy::cast_precision_loss, reason = "small whole numbers")]
    pub fn factor(self) -> f64 {
        self.halves as f64 / 2.0
    }

    /// `count * f` for an even `count`.
    ///
    /// ```
    /// use lenzbore_mesh::Refinement;
    /// let levels = Refinement::first(3);
    /// assert_eq!(levels.iter().map(|f| f.times(4)).collect::<Vec<_>>(), [4, 6, 8]);
    /// ```
    #[must_use]
    pub fn times(self, count: usize) -> usize {
        count * self.halves / 2
    }
}
