//! Settled fields at one speed: (K - v C) psi = right by block elimination along z.
//!
//! The rows of one height couple to those of the heights next to it by diagonal blocks alone, so with S_0 = B_0 and
//! S_j = B_j - L_j S_(j-1)^-1 U_(j-1) one dense inverse of the radial unknowns a height solves the whole: 4 nz nr^3 operations whatever the
//! speed, where the recurrence takes more vectors the faster the mover. The symmetric part of K - v C is positive definite, so
//! the S_j are regular; two sweeps of refinement and a residual check make up for the growth that a strong skew part may bring.

use std::time::Instant;

use faer::dyn_stack::{MemBuffer, MemStack};
use faer::linalg::lu::partial_pivoting::{factor, inverse};
use faer::{Mat, Par, Spec};

use super::level::convect;
use crate::fault::SolveFault;
use crate::linear::RESIDUAL_LIMIT;
use crate::monitor::Monitor;
use crate::operators::Operators;

/// Sweeps of refinement after the first solution.
const REFINEMENTS: usize = 2;

/// K - v C, eliminated.
pub(super) struct Elimination<'o> {
    operators: &'o Operators,
    velocity: f64,
    /// Unknowns along r.
    radii: usize,
    /// S_j^-1.
    inverses: Vec<Mat<f64>>,
    /// Entries of each row with the unknown below and above it.
    below: Vec<f64>,
    above: Vec<f64>,
}

/// Bytes of an elimination on a grid of so many unknowns along r and z.
pub(crate) fn elimination_bytes(radii: usize, heights: usize) -> usize {
    radii * radii * heights * size_of::<f64>()
}

/// Heights timed for a forecast.
const TIMED_HEIGHTS: usize = 8;

/// Seconds that an elimination takes, from a few of its heights.
///
/// # Errors
/// A block without an inverse.
pub(crate) fn elimination_seconds(operators: &Operators) -> Result<f64, SolveFault> {
    let radii = operators.grid.nr() - 2;
    let heights = operators.unknowns() / radii;
    let mut work = Work::new(radii);
    let begin = Instant::now();
    let mut inverse = work.invert(own_block(operators, 0, radii))?;
    for _ in 1..TIMED_HEIGHTS {
        // As dense as those of the elimination, and as well conditioned.
        let mut block = own_block(operators, 0, radii);
        subtract(&mut block, &inverse, |_| 1.0e-9, |_| 1.0e-9);
        inverse = work.invert(block)?;
    }
    #[expect(clippy::cast_precision_loss, reason = "a grid's size")]
    let share = heights as f64 / TIMED_HEIGHTS as f64;
    Ok(share * begin.elapsed().as_secs_f64())
}

impl<'o> Elimination<'o> {
    /// Eliminates K - `velocity` C.
    ///
    /// # Errors
    /// Interrupted, or a block without an inverse.
    pub(super) fn new(operators: &'o Operators, velocity: f64, monitor: &dyn Monitor) -> Result<Self, SolveFault> {
        let radii = operators.grid.nr() - 2;
        let (below, above) = coupling(operators, velocity);
        let mut inverses: Vec<Mat<f64>> = Vec::with_capacity(operators.unknowns() / radii);
        let mut work = Work::new(radii);
        for first in (0..operators.unknowns()).step_by(radii) {
            if monitor.cancelled() {
                return Err(SolveFault::Interrupted);
            }
            let mut block = own_block(operators, first, radii);
            if let Some(before) = inverses.last() {
                subtract(&mut block, before, |i| below[first + i], |k| above[first - radii + k]);
            }
            inverses.push(work.invert(block)?);
        }
        Ok(Self { operators, velocity, radii, inverses, below, above })
    }

    /// psi with (K - v C) psi = `right`, and the relative residual that it leaves.
    ///
    /// # Errors
    /// Not finite, or too large a residual.
    pub(super) fn solve(&self, right: &[f64]) -> Result<(Vec<f64>, f64), SolveFault> {
        let mut psi = right.to_vec();
        self.substitute(&mut psi);
        let mut off = vec![0.0; right.len()];
        for _ in 0..REFINEMENTS {
            self.residual(&psi, right, &mut off);
            self.substitute(&mut off);
            psi.iter_mut().zip(&off).for_each(|(p, o)| *p += o);
        }
        let residual = self.residual(&psi, right, &mut off);
        if !residual.is_finite() {
            return Err(SolveFault::NotFinite { what: "the settled field" });
        }
        if residual > RESIDUAL_LIMIT {
            return Err(SolveFault::Residual { residual, limit: RESIDUAL_LIMIT });
        }
        Ok((psi, residual))
    }

    /// One forward and one backward sweep.
    fn substitute(&self, x: &mut [f64]) {
        let n = self.radii;
        let mut row = vec![0.0; n];
        for j in 1..self.inverses.len() {
            let (before, here) = x.split_at_mut(j * n);
            multiply(&self.inverses[j - 1], &before[(j - 1) * n..], &mut row);
            for ((x, l), r) in here[..n].iter_mut().zip(&self.below[j * n..]).zip(&row) {
                *x -= l * r;
            }
        }
        for j in (0..self.inverses.len()).rev() {
            let (here, after) = x[j * n..].split_at_mut(n);
            for ((x, u), a) in here.iter_mut().zip(&self.above[j * n..]).zip(&*after) {
                *x -= u * a;
            }
            multiply(&self.inverses[j], here, &mut row);
            here.copy_from_slice(&row);
        }
    }

    /// `off` = right - (K - v C) psi; gives its maximum relative to the largest sum of terms in a row (NaN where not finite).
    fn residual(&self, psi: &[f64], right: &[f64], off: &mut [f64]) -> f64 {
        let wall = &self.operators.wall;
        let mut carried = vec![0.0; wall.len()];
        convect(self.operators, psi, &mut carried);
        off.copy_from_slice(right);
        for (&u, c) in wall.unknown.iter().zip(&carried) {
            off[u] += self.velocity * c;
        }
        let (mut worst, mut scale) = (0.0_f64, 0.0_f64);
        for (row, entries) in self.operators.stiffness.outer_iterator().enumerate() {
            let (mut sum, mut size) = (0.0, 0.0);
            for (column, value) in entries.iter() {
                let term = value * psi[column];
                sum += term;
                size += term.abs();
            }
            off[row] -= sum;
            let left = off[row].abs();
            worst = if left > worst || left.is_nan() { left } else { worst };
            scale = scale.max(size);
        }
        if scale > 0.0 { worst / scale } else { worst }
    }
}

/// Entries of K - v C with the unknown below and above each: those of K, and the skew ones of the wall.
fn coupling(operators: &Operators, velocity: f64) -> (Vec<f64>, Vec<f64>) {
    let (radii, n) = (operators.grid.nr() - 2, operators.unknowns());
    let (mut below, mut above) = (vec![0.0; n], vec![0.0; n]);
    for (row, entries) in operators.stiffness.outer_iterator().enumerate() {
        for (column, &value) in entries.iter() {
            if column + radii == row {
                below[row] += value;
            } else if column == row + radii {
                above[row] += value;
            }
        }
    }
    let z = operators.grid.z.nodes();
    for (&u, g) in operators.wall.unknown.iter().zip(&operators.wall.conductance) {
        let j = u / radii + 1;
        let skew = velocity * g / (z[j + 1] - z[j - 1]);
        below[u] += skew;
        above[u] -= skew;
    }
    (below, above)
}

/// `block` - diag(left) `inverse` diag(right).
fn subtract(block: &mut Mat<f64>, inverse: &Mat<f64>, left: impl Fn(usize) -> f64, right: impl Fn(usize) -> f64) {
    for (k, (column, from)) in block.col_iter_mut().zip(inverse.col_iter()).enumerate() {
        let factor = right(k);
        for (i, (b, x)) in column.iter_mut().zip(from.iter()).enumerate() {
            *b -= left(i) * x * factor;
        }
    }
}

/// The block of K on the unknowns `first..first + radii`.
fn own_block(operators: &Operators, first: usize, radii: usize) -> Mat<f64> {
    let mut block = Mat::zeros(radii, radii);
    for i in 0..radii {
        let Some(entries) = operators.stiffness.outer_view(first + i) else { continue };
        for (column, &value) in entries.iter() {
            if (first..first + radii).contains(&column) {
                block[(i, column - first)] = value;
            }
        }
    }
    block
}

/// `out = matrix x`.
fn multiply(matrix: &Mat<f64>, x: &[f64], out: &mut [f64]) {
    out.fill(0.0);
    for (column, &x) in matrix.col_iter().zip(x) {
        for (o, m) in out.iter_mut().zip(column.iter()) {
            *o += m * x;
        }
    }
}

/// Workspace of an inversion.
struct Work {
    memory: MemBuffer,
    forward: Vec<usize>,
    backward: Vec<usize>,
}

impl Work {
    fn new(n: usize) -> Self {
        let factoring = factor::lu_in_place_scratch::<usize, f64>(n, n, Par::Seq, Spec::default());
        let inverting = inverse::inverse_scratch::<usize, f64>(n, Par::Seq);
        Self { memory: MemBuffer::new(factoring.or(inverting)), forward: vec![0; n], backward: vec![0; n] }
    }

    /// The inverse of `block`.
    fn invert(&mut self, mut block: Mat<f64>) -> Result<Mat<f64>, SolveFault> {
        let n = block.nrows();
        let (_, permutation) = factor::lu_in_place(
            block.as_mut(),
            &mut self.forward,
            &mut self.backward,
            Par::Seq,
            MemStack::new(&mut self.memory),
            Spec::default(),
        );
        let mut out = Mat::zeros(n, n);
        let (lower, upper) = (block.as_ref(), block.as_ref());
        inverse::inverse(out.as_mut(), lower, upper, permutation, Par::Seq, MemStack::new(&mut self.memory));
        let finite = out.col_iter().all(|c| c.iter().all(|x| x.is_finite()));
        if finite {
            Ok(out)
        } else {
            Err(SolveFault::NotFinite { what: "the inverse of a block of the settled system" })
        }
    }
}
