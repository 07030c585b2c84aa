//! Integrals over an interval: Gauss-Legendre rules and an adaptive Gauss-Kronrod pair.

mod adaptive;
mod gauss;
mod kronrod;

pub use adaptive::{Integral, integrate};
pub use gauss::GaussRule;

/// A number and how far it may be from the truth, by the method's own account.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Estimate {
    /// The value.
    pub value: f64,
    /// Bound on its error, same unit.
    pub error: f64,
}

impl Estimate {
    /// Both numbers times a constant.
    #[must_use]
    pub fn scaled(self, factor: f64) -> Self {
        Self { value: self.value * factor, error: self.error * factor.abs() }
    }
}
