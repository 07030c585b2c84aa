//! The residual of a solution, row by row from the plan's own coefficients, so that no matrix has to be read.

use super::plan::{LayeredPlan, Radial};
use crate::fault::SolveFault;

/// Coefficients of the rows of a segment, or of one interface.
#[derive(Debug, Clone)]
struct Rows {
    /// K_r + rate G_r: diagonal, and what couples each unknown to the next, 0 before the first.
    diagonal: Vec<f64>,
    next: Vec<f64>,
    /// D of the cells below and above.
    below: Vec<f64>,
    above: Vec<f64>,
}

/// Takes residuals of K + rate G; allocated once.
#[derive(Debug, Clone)]
pub(super) struct Residual {
    segments: Vec<Rows>,
    interfaces: Vec<Rows>,
    /// Worst and sum of what is off, and largest term, for each radius over the rows so far.
    worst: Vec<f64>,
    sum: Vec<f64>,
    scale: Vec<f64>,
    /// Stands for what lies outside the grid.
    nothing: Vec<f64>,
    /// A row with zeros on both sides.
    halo: Vec<f64>,
}

/// Where a row of unknowns stands.
struct Place<'x> {
    dual: f64,
    cell_below: f64,
    cell_above: f64,
    below: &'x [f64],
    here: &'x [f64],
    above: &'x [f64],
    right: &'x [f64],
}

impl Residual {
    pub(super) fn new(plan: &LayeredPlan, rate: f64) -> Self {
        let rows = |radial: &Radial, below: &[f64], above: &[f64]| Rows {
            diagonal: radial.diagonal.iter().zip(&radial.conductance).map(|(k, g)| k + rate * g).collect(),
            next: std::iter::once(0.0).chain(radial.next.iter().copied()).collect(),
            below: below.to_vec(),
            above: above.to_vec(),
        };
        let meetings = plan.interfaces.iter().zip(plan.segments.windows(2));
        Self {
            segments: plan.segments.iter().map(|s| rows(&s.radial, &s.axial, &s.axial)).collect(),
            interfaces: meetings.map(|(radial, s)| rows(radial, &s[0].axial, &s[1].axial)).collect(),
            worst: vec![0.0; plan.nr],
            sum: vec![0.0; plan.nr],
            scale: vec![0.0; plan.nr],
            nothing: vec![0.0; plan.nr],
            halo: vec![0.0; plan.nr + 2],
        }
    }

    /// `|b - (K + rate G) x|` over the largest diagonal term or right side, in the maximum norm.
    ///
    /// # Errors
    /// Not finite, or above `limit`.
    pub(super) fn check(&mut self, plan: &LayeredPlan, x: &[f64], b: &[f64], limit: f64) -> Result<f64, SolveFault> {
        for of_radius in [&mut self.worst, &mut self.sum, &mut self.scale] {
            of_radius.fill(0.0);
        }
        for (s, segment) in plan.segments.iter().enumerate() {
            for row in segment.rows.clone() {
                self.take(plan, x, b, row, s, false);
            }
            if s < plan.interfaces.len() {
                self.take(plan, x, b, segment.rows.end, s, true);
            }
        }
        // Comparisons pass over what is not a number; sums do not.
        if !self.sum.iter().sum::<f64>().is_finite() {
            return Err(SolveFault::NotFinite { what: "the solution of a linear system" });
        }
        let most = |of_radius: &[f64]| of_radius.iter().copied().fold(0.0, f64::max);
        let (worst, scale) = (most(&self.worst), most(&self.scale));
        let residual = if scale > 0.0 { worst / scale } else { 0.0 };
        if residual > limit { Err(SolveFault::Residual { residual, limit }) } else { Ok(residual) }
    }

    /// Takes one row of unknowns in, of segment `number` or of the interface above it.
    fn take(&mut self, plan: &LayeredPlan, x: &[f64], b: &[f64], row: usize, number: usize, interface: bool) {
        let nr = plan.nr;
        let of = |row: usize| x.get(row * nr..(row + 1) * nr);
        let place = Place {
            dual: if interface { 1.0 } else { plan.duals[row] },
            cell_below: plan.inverse_cells[row],
            cell_above: plan.inverse_cells[row + 1],
            below: row.checked_sub(1).and_then(of).unwrap_or(&self.nothing),
            here: &x[row * nr..(row + 1) * nr],
            above: of(row + 1).unwrap_or(&self.nothing),
            right: &b[row * nr..(row + 1) * nr],
        };
        let rows = if interface { &self.interfaces[number] } else { &self.segments[number] };
        place.take(rows, &mut self.halo, &mut self.worst, &mut self.sum, &mut self.scale);
    }
}

impl Place<'_> {
    /// One plain loop over slices of one length, which the compiler turns into vector instructions.
    fn take(&self, rows: &Rows, halo: &mut [f64], worst: &mut [f64], sum: &mut [f64], scale: &mut [f64]) {
        let n = self.here.len();
        halo[1..=n].copy_from_slice(self.here);
        let (inner, x, outer) = (&halo[..n], &halo[1..=n], &halo[2..n + 2]);
        let (below, above, right) = (&self.below[..n], &self.above[..n], &self.right[..n]);
        let (diagonal, before, next) = (&rows.diagonal[..n], &rows.next[..n], &rows.next[1..=n]);
        let (d_below, d_above) = (&rows.below[..n], &rows.above[..n]);
        let (worst, sum, scale) = (&mut worst[..n], &mut sum[..n], &mut scale[..n]);
        let (dual, cell_below, cell_above) = (self.dual, self.cell_below, self.cell_above);
        for i in 0..n {
            let (p, q) = (cell_below * d_below[i], cell_above * d_above[i]);
            let term = (dual * diagonal[i] + p + q) * x[i];
            let across = dual * (before[i] * inner[i] + next[i] * outer[i]);
            let off = (right[i] - term - across + p * below[i] + q * above[i]).abs();
            let (term, known) = (term.abs(), right[i].abs());
            let size = if term > known { term } else { known };
            sum[i] += off;
            worst[i] = if off > worst[i] { off } else { worst[i] };
            scale[i] = if size > scale[i] { size } else { scale[i] };
        }
    }
}
