//! The skew Lanczos recurrence that serves every speed.
//!
//! With A = K^-1 C, C skew: A v_k = beta_(k+1) v_(k+1) - beta_k v_(k-1), (v_k) orthonormal in the K inner product, started
//! from A psi_0 = beta_1 v_1. The settled reaction at speed v is psi = v beta_1 V x with (I - v T) x = e_1, T skew tridiagonal,
//! and the ring currents are K psi = v beta_1 sum x_k (K v_k). (The recurrence for skew-symmetric matrices: C. Greif and
//! J. M. Varah, "Iterative solution of skew-symmetric linear systems", SIAM J. Matrix Anal. Appl. 31, 584-601, 2009;
//! citation from memory.)

use std::ops::Range;

use super::vectors::Vectors;

/// Recurrence residual at which the drag has converged to 2e-11 (measured at 100 m/s).
pub(super) const RECURRENCE_LIMIT: f64 = 1.0e-10;

/// The tridiagonal problem and what its vectors stand for.
#[derive(Debug, Clone)]
pub(crate) struct Recurrence {
    /// Norm of the start vector.
    pub(crate) beta_1: f64,
    /// beta_2, beta_3, ...: one more than there are off-diagonals in use.
    pub(crate) betas: Vec<f64>,
    /// K v_k at the wall nodes.
    pub(super) currents: Vectors,
    /// v_k at the wall nodes.
    pub(super) fluxes: Vectors,
}

impl Recurrence {
    /// Without a vector yet, for `wall_nodes` of them.
    pub(super) fn new(wall_nodes: usize) -> Self {
        let vectors = Vectors::new(wall_nodes);
        Self { beta_1: 0.0, betas: Vec::new(), currents: vectors.clone(), fluxes: vectors }
    }

    /// Makes room for the next vector.
    pub(super) fn make_room(&mut self) {
        self.currents.make_room();
        self.fluxes.make_room();
        self.betas.reserve(1);
    }

    /// Whether the vectors give the reaction at `velocity`.
    pub(super) fn serves(&self, velocity: f64) -> bool {
        self.residual(velocity) < RECURRENCE_LIMIT
    }

    /// Number of vectors.
    pub(crate) fn len(&self) -> usize {
        self.currents.len()
    }

    /// x in (I - v T) x = e_1. The pivots are 1 + (v beta)^2 / previous pivot >= 1, so elimination is stable.
    pub(crate) fn coefficients(&self, velocity: f64) -> Vec<f64> {
        let m = self.len();
        let off = |k: usize| velocity * self.betas[k];
        let mut pivots = vec![1.0; m];
        for k in 1..m {
            pivots[k] = 1.0 + off(k - 1) * off(k - 1) / pivots[k - 1];
        }
        // Row k: -off(k-1) x_(k-1) + x_k + off(k) x_(k+1) = e_1.
        let mut x = vec![0.0; m];
        let mut right = 1.0;
        for k in 0..m {
            x[k] = right / pivots[k];
            right = x[k] * if k + 1 < m { off(k) } else { 0.0 };
        }
        for k in (0..m.saturating_sub(1)).rev() {
            x[k] -= off(k) * x[k + 1] / pivots[k];
        }
        x
    }

    /// Residual of the reaction at `velocity` in the K norm, relative to the start: v beta_(m+1) |x_m|.
    pub(crate) fn residual(&self, velocity: f64) -> f64 {
        let Some((last, between)) =
            self.betas.split_at_checked(self.len().saturating_sub(1)).map(|(b, l)| (l.first(), b))
        else {
            return 0.0;
        };
        // The elimination of `coefficients` alone: it ends at x_m.
        let (mut pivot, mut right) = (1.0, 1.0);
        for beta in between {
            let off = velocity * beta;
            right *= off / pivot;
            pivot = 1.0 + off * off / pivot;
        }
        last.map_or(0.0, |beta| (velocity * beta * right / pivot).abs())
    }

    /// Ring currents at the wall nodes at `velocity`, A.
    pub(crate) fn ring_currents(&self, velocity: f64) -> Vec<f64> {
        self.combine(velocity, &self.currents, 0..self.currents.length())
    }

    /// The reaction psi at the wall nodes in `range` at `velocity`, Wb/rad.
    pub(crate) fn flux(&self, velocity: f64, range: Range<usize>) -> Vec<f64> {
        self.combine(velocity, &self.fluxes, range)
    }

    fn combine(&self, velocity: f64, vectors: &Vectors, range: Range<usize>) -> Vec<f64> {
        let x = self.coefficients(velocity);
        let mut sum = vec![0.0; range.len()];
        for (x, vector) in x.iter().zip(vectors.iter()) {
            let factor = velocity * self.beta_1 * x;
            for (s, v) in sum.iter_mut().zip(&vector[range.clone()]) {
                *s += factor * v;
            }
        }
        sum
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn coefficients_solve_the_skew_tridiagonal_system() {
        let mut recurrence = Recurrence { beta_1: 1.0, betas: vec![0.7, 0.4, 0.9, 0.2], ..Recurrence::new(0) };
        for _ in 0..4 {
            recurrence.currents.push(std::iter::empty());
        }
        let v = 2.5;
        let x = recurrence.coefficients(v);
        let t = |k: usize| v * recurrence.betas[k];
        let rows = [
            x[0] + t(0) * x[1],
            -t(0) * x[0] + x[1] + t(1) * x[2],
            -t(1) * x[1] + x[2] + t(2) * x[3],
            -t(2) * x[2] + x[3],
        ];
        for (row, wanted) in rows.iter().zip([1.0, 0.0, 0.0, 0.0]) {
            approx::assert_relative_eq!(*row, wanted, epsilon = 1e-14);
        }
        approx::assert_relative_eq!(recurrence.residual(v), (t(3) * x[3]).abs(), max_relative = 1e-14);
    }
}
