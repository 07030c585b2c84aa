//! Direct solves of (K + rate G) psi = right: factored once a step size, solved often.
//!
//! Grids whose materials change along z in a few places (any wall made of a few sections) take the layered solver, which needs
//! a twentieth of the time of a sparse back-solve; others take the sparse Cholesky factor of [`crate::linear`].

mod factor;
mod modes;
mod plan;
mod product;
mod residual;
mod schur;
#[cfg(test)]
mod tests;

use std::sync::Arc;

use crate::fault::SolveFault;
use crate::linear::{Factor, Pattern, check_residual};
use crate::operators::Operators;
use factor::LayeredFactor;
use plan::LayeredPlan;

/// What no step size changes.
#[derive(Debug)]
pub(crate) enum DirectPlan {
    /// Segments along z, each with its radial modes.
    Layered(Arc<LayeredPlan>),
    /// The pattern of a sparse matrix.
    Sparse(Arc<Pattern>),
}

impl DirectPlan {
    /// Chooses the solver for `operators`.
    ///
    /// # Errors
    /// A sparse pattern too large for 32-bit indices.
    pub(crate) fn new(operators: &Operators) -> Result<Self, SolveFault> {
        match LayeredPlan::new(operators) {
            Some(plan) => Ok(Self::Layered(Arc::new(plan))),
            None => Ok(Self::Sparse(Pattern::new(&operators.stiffness)?)),
        }
    }

    /// Bytes that a factor takes, with its workspace.
    pub(crate) fn factor_bytes(&self) -> usize {
        match self {
            Self::Layered(plan) => plan.factor_bytes(),
            Self::Sparse(pattern) => pattern.bytes_per_solve() / 2,
        }
    }

    /// Factors K + `rate` G, rate in 1/s: 2 / dt, or 0 for fields at rest.
    ///
    /// # Errors
    /// The matrix is not numerically positive definite.
    pub(crate) fn factor(&self, operators: &Operators, rate: f64) -> Result<DirectFactor, SolveFault> {
        match self {
            Self::Layered(plan) => Ok(DirectFactor::Layered(Box::new(LayeredFactor::new(Arc::clone(plan), rate)?))),
            Self::Sparse(pattern) => {
                let mut added = vec![0.0; operators.unknowns()];
                for (&u, g) in operators.wall.unknown.iter().zip(&operators.wall.conductance) {
                    added[u] = rate * g;
                }
                let factor = Factor::new(pattern, &operators.stiffness, Some(&added))?;
                Ok(DirectFactor::Sparse { factor, added })
            }
        }
    }
}

/// K + rate G, factored.
#[derive(Debug)]
pub(crate) enum DirectFactor {
    /// By segments and modes.
    Layered(Box<LayeredFactor>),
    /// By a sparse Cholesky factor.
    Sparse {
        /// The factor.
        factor: Factor,
        /// rate G.
        added: Vec<f64>,
    },
}

impl DirectFactor {
    /// Solves in place for one or two right-hand sides stored one after the other, each over all unknowns and zero off the wall's
    /// nodes. Allocates nothing.
    pub(crate) fn solve_in_place(&mut self, columns: &mut [f64]) {
        match self {
            Self::Layered(factor) => factor.solve_in_place(columns),
            Self::Sparse { factor, .. } => factor.solve_in_place(columns),
        }
    }

    /// Relative residual of a solution in the maximum norm.
    ///
    /// # Errors
    /// Not finite, or above `limit`.
    pub(crate) fn check(&mut self, operators: &Operators, x: &[f64], b: &[f64], limit: f64) -> Result<f64, SolveFault> {
        match self {
            Self::Layered(factor) => factor.check(x, b, limit),
            Self::Sparse { added, .. } => check_residual(&operators.stiffness, Some(added), x, b, limit),
        }
    }
}
