//! The symmetric Lanczos recurrence that serves a range of frequencies.
//!
//! With M = K + s G and A = M^-1 G, A is self-adjoint in the inner product of M: A v_k = a_k v_k + b_k v_(k-1) + b_(k+1) v_(k+1), (v_k)
//! orthonormal in it, started from A psi_0 = b_1 v_1. K + i omega G = M + (i omega - s) G, so the wall's reaction is
//! phi = -i omega b_1 V x with (I + (i omega - s) T) x = e_1, T real, symmetric and tridiagonal.
//!
//! The eigenvalues of A lie in 0 .. 1/s. A shift s in the middle of the frequencies wanted makes the number of vectors
//! independent of wall and grid: the reaction at omega is a function of A with its pole at t = 1 / (s - i omega), and polynomials reach it on
//! 0 .. 1/s by a factor rho a vector, rho the sum of half axes of the ellipse through the pole: 2.4 at omega = s, 1.5 at ten times or a tenth of it (L. N.
//! Trefethen, Approximation Theory and Approximation Practice, 2013, theorem 8.2; from memory). The recurrence itself: C. Lanczos, J. Res.
//! Nat. Bur. Stand. 45, 255-282 (1950), from memory.

use num_complex::Complex64;

use crate::direct::DirectFactor;
use crate::fault::SolveFault;
use crate::linear::RESIDUAL_LIMIT;
use crate::monitor::Monitor;
use crate::operators::Operators;

/// Residual of the tridiagonal problem, relative, at which the reaction has converged.
const CONVERGED: f64 = 1.0e-12;
/// More vectors than this mean that something is wrong: a range of 100 takes some 70.
const MOST_VECTORS: usize = 400;

/// The tridiagonal problem, and the vectors at the wall's nodes.
#[derive(Debug, Clone)]
pub(crate) struct Recurrence {
    /// s, rad/s.
    shift: f64,
    /// b_1, the norm of the start vector.
    first: f64,
    /// a_1, a_2, ...
    diagonal: Vec<f64>,
    /// b_2, b_3, ...: one more than there are off-diagonals in use.
    next: Vec<f64>,
    /// v_k at the wall's nodes.
    vectors: Vec<Vec<f64>>,
    /// Largest relative residual of a solve.
    pub(super) residual: f64,
}

impl Recurrence {
    /// Runs until the reaction at each of `omegas`, rad/s, has converged. `factor` is that of K + `shift` G, `flux` psi_0 at the wall's nodes.
    ///
    /// # Errors
    /// Interrupted; a solve that is not finite or leaves too large a residual; no convergence.
    pub(crate) fn new(
        operators: &Operators,
        factor: &mut DirectFactor,
        flux: &[f64],
        (shift, omegas): (f64, &[f64]),
        monitor: &dyn Monitor,
    ) -> Result<Self, SolveFault> {
        let wall = &operators.wall;
        let mut it = Self { shift, first: 0.0, diagonal: vec![], next: vec![], vectors: vec![], residual: 0.0 };
        // M times the vector under way, and M times the last one: both vanish off the wall's nodes.
        let mut image: Vec<f64> = wall.conductance.iter().zip(flux).map(|(g, p)| g * p).collect();
        let mut before = vec![0.0; image.len()];
        let mut right = vec![0.0; operators.unknowns()];
        let mut vector = right.clone();
        loop {
            if monitor.cancelled() {
                return Err(SolveFault::Interrupted);
            }
            for (&u, &x) in wall.unknown.iter().zip(&image) {
                right[u] = x;
            }
            vector.copy_from_slice(&right);
            factor.solve_in_place(&mut vector);
            it.residual = it.residual.max(factor.check(operators, &vector, &right, RESIDUAL_LIMIT)?);
            let square: f64 = wall.unknown.iter().zip(&image).map(|(&u, x)| x * vector[u]).sum();
            let norm = square.max(0.0).sqrt();
            if it.vectors.is_empty() {
                it.first = norm;
            } else {
                it.next.push(norm);
                if omegas.iter().all(|&omega| it.left(omega) < CONVERGED) {
                    return Ok(it);
                }
            }
            if norm <= f64::MIN_POSITIVE {
                return Ok(it);
            }
            if it.vectors.len() >= MOST_VECTORS {
                let residual = omegas.iter().map(|&omega| it.left(omega)).fold(0.0, f64::max);
                return Err(SolveFault::Residual { residual, limit: CONVERGED });
            }
            image.iter_mut().for_each(|x| *x /= norm);
            let here: Vec<f64> = wall.unknown.iter().map(|&u| vector[u] / norm).collect();
            let own: f64 = wall.conductance.iter().zip(&here).map(|(g, v)| g * v * v).sum();
            let coupling = if it.vectors.is_empty() { 0.0 } else { norm };
            // The next image takes the place of the one before.
            for ((b, x), (g, v)) in before.iter_mut().zip(&image).zip(wall.conductance.iter().zip(&here)) {
                *b = g * v - own * x - coupling * *b;
            }
            std::mem::swap(&mut before, &mut image);
            it.diagonal.push(own);
            it.vectors.push(here);
        }
    }

    /// Number of vectors.
    pub(super) fn len(&self) -> usize {
        self.vectors.len()
    }

    /// Elimination of (I + (i omega - s) T) x = e_1 downwards: pivots and right sides. I - s T is positive definite and omega T too, so the
    /// pivots stay away from zero.
    fn eliminate(&self, omega: f64) -> Vec<(Complex64, Complex64)> {
        let rate = Complex64::new(-self.shift, omega);
        let mut rows: Vec<(Complex64, Complex64)> = Vec::with_capacity(self.len());
        for (k, &own) in self.diagonal.iter().enumerate() {
            let row = match rows.last() {
                None => (1.0 + rate * own, Complex64::ONE),
                Some(&(pivot, right)) => {
                    let off = rate * self.next[k - 1];
                    (1.0 + rate * own - off * off / pivot, -off * right / pivot)
                }
            };
            rows.push(row);
        }
        rows
    }

    /// x at angular frequency `omega`, rad/s.
    fn coefficients(&self, omega: f64) -> Vec<Complex64> {
        let rate = Complex64::new(-self.shift, omega);
        let rows = self.eliminate(omega);
        let mut x = vec![Complex64::ZERO; rows.len()];
        for (k, &(pivot, right)) in rows.iter().enumerate().rev() {
            let above = x.get(k + 1).map_or(Complex64::ZERO, |next| rate * self.next[k] * next);
            x[k] = (right - above) / pivot;
        }
        x
    }

    /// Residual at `omega` in the norm of M, relative to the start: |i omega - s| b_(m+1) |x_m|.
    pub(super) fn left(&self, omega: f64) -> f64 {
        let rows = self.eliminate(omega);
        let (Some((pivot, right)), Some(beyond)) = (rows.last(), self.next.get(rows.len().wrapping_sub(1))) else {
            return 0.0;
        };
        self.shift.hypot(omega) * beyond * (right / pivot).norm()
    }

    /// The reaction phi at the wall's nodes at `omega`, Wb/rad.
    pub(super) fn flux(&self, omega: f64) -> Vec<Complex64> {
        let scale = Complex64::new(0.0, -omega * self.first);
        let mut sum = vec![Complex64::ZERO; self.vectors.first().map_or(0, Vec::len)];
        for (x, vector) in self.coefficients(omega).iter().zip(&self.vectors) {
            let factor = scale * x;
            for (s, v) in sum.iter_mut().zip(vector) {
                *s += factor * v;
            }
        }
        sum
    }

    /// psi_0^T G phi at `omega` from the tridiagonal problem alone: -i omega b_1^2 x_1.
    pub(crate) fn linked(&self, omega: f64) -> Complex64 {
        let x = self.coefficients(omega).first().copied().unwrap_or(Complex64::ZERO);
        Complex64::new(0.0, -omega * self.first * self.first) * x
    }
}
