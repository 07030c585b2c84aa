//! The interfaces' own system, once the segments between them are eliminated.

use faer::linalg::matmul::matmul;
use faer::{Accum, Mat, Par, Side};

use super::modes::Modes;
use super::plan::LayeredPlan;

/// Dense Cholesky factor of the Schur complement, the rows of its lower triangle one after the other.
#[derive(Debug, Clone)]
pub(super) struct Schur {
    lower: Vec<f64>,
}

impl Schur {
    /// Eliminates the segments; `None` where the result isn't positive definite.
    pub(super) fn new(plan: &LayeredPlan, modes: &[Modes], rate: f64) -> Option<Self> {
        let (nr, count) = (plan.nr, plan.interfaces.len());
        let mut matrix = Mat::<f64>::zeros(nr * count, nr * count);
        for (i, radial) in plan.interfaces.iter().enumerate() {
            let row = plan.segments[i].rows.end;
            let (a, c) = (plan.inverse_cells[row], plan.inverse_cells[row + 1]);
            let (below, above) = (&plan.segments[i].axial, &plan.segments[i + 1].axial);
            for k in 0..nr {
                let at = i * nr + k;
                matrix[(at, at)] = radial.diagonal[k] + rate * radial.conductance[k] + a * below[k] + c * above[k];
                if k + 1 < nr {
                    matrix[(at + 1, at)] = radial.next[k];
                }
            }
            let (lower, upper) = (&modes[i], &modes[i + 1]);
            subtract(&mut matrix, (i, i), lower, last_row(&lower.from_above, plan.width()), a);
            subtract(&mut matrix, (i, i), upper, &upper.from_below[..plan.width()], c);
            if i + 1 < count {
                let through = last_row(&upper.from_below, plan.width());
                subtract(&mut matrix, (i + 1, i), upper, through, plan.inverse_cells[upper.rows.end]);
            }
        }
        let factor = matrix.llt(Side::Lower).ok()?;
        let lower = factor.L();
        Some(Self { lower: (0..nr * count).flat_map(|i| (0..=i).map(move |k| lower[(i, k)])).collect() })
    }

    /// Solves in place.
    pub(super) fn solve_in_place(&self, x: &mut [f64]) {
        let row = |i: usize| &self.lower[i * (i + 1) / 2..(i + 1) * (i + 2) / 2];
        for i in 0..x.len() {
            let (before, rest) = x.split_at_mut(i);
            let sum: f64 = row(i).iter().zip(&*before).map(|(l, x)| l * x).sum();
            rest[0] = (rest[0] - sum) / row(i)[i];
        }
        for i in (0..x.len()).rev() {
            let (before, rest) = x.split_at_mut(i);
            rest[0] /= row(i)[i];
            before.iter_mut().zip(row(i)).for_each(|(x, l)| *x -= l * rest[0]);
        }
    }
}

fn last_row(shape: &[f64], width: usize) -> &[f64] {
    &shape[shape.len() - width..]
}

/// Block (p, q) of `matrix` less a D Phi diag(ends) (D Phi)^T.
fn subtract(matrix: &mut Mat<f64>, (p, q): (usize, usize), modes: &Modes, ends: &[f64], a: f64) {
    let nr = modes.radii();
    let mut weighted = Mat::<f64>::zeros(nr, nr);
    for k in 0..nr {
        modes.weighted(k).enumerate().for_each(|(i, w)| weighted[(i, k)] = w);
    }
    let scaled = Mat::from_fn(nr, nr, |i, k| a * weighted[(i, k)] * ends[k]);
    let block = matrix.as_mut().submatrix_mut(p * nr, q * nr, nr, nr);
    matmul(block, Accum::Add, &scaled, weighted.transpose(), -1.0, Par::Seq);
}
