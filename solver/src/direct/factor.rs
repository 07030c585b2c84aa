//! The factored system of one rate, and its solution.

use std::ops::Range;
use std::sync::Arc;

use super::modes::Modes;
use super::plan::LayeredPlan;
use super::residual::Residual;
use super::schur::Schur;
use crate::fault::SolveFault;

/// K + rate G by segments and modes.
#[derive(Debug, Clone)]
pub(crate) struct LayeredFactor {
    plan: Arc<LayeredPlan>,
    residual: Residual,
    modes: Vec<Modes>,
    schur: Schur,
    /// Amplitudes of the modes, `[row][mode]`.
    amplitudes: Vec<f64>,
    /// Values on the interfaces, `[interface][r]`.
    interface: Vec<f64>,
    /// One row of values, and its amplitudes.
    row: Vec<f64>,
    ends: Vec<f64>,
}

impl LayeredFactor {
    /// Factors K + `rate` G.
    ///
    /// # Errors
    /// The modes aren't found, or the matrix is not numerically positive definite.
    pub(super) fn new(plan: Arc<LayeredPlan>, rate: f64) -> Result<Self, SolveFault> {
        let (nr, unknowns) = (plan.nr, plan.unknowns());
        let fail = || SolveFault::Factorisation { unknowns };
        let modes: Option<Vec<Modes>> = (0..plan.segments.len()).map(|s| Modes::new(&plan, s, rate)).collect();
        let modes = modes.ok_or_else(fail)?;
        let schur = Schur::new(&plan, &modes, rate).ok_or_else(fail)?;
        let interface = vec![0.0; plan.interfaces.len() * nr];
        let (amplitudes, ends) = (vec![0.0; plan.width() * plan.duals.len()], vec![0.0; plan.width()]);
        let residual = Residual::new(&plan, rate);
        Ok(Self { plan, residual, modes, schur, amplitudes, interface, row: vec![0.0; nr], ends })
    }

    /// See [`super::DirectFactor::solve_in_place`].
    pub(super) fn solve_in_place(&mut self, columns: &mut [f64]) {
        for column in columns.chunks_exact_mut(self.plan.unknowns()) {
            self.eliminate(column);
            self.solve_interfaces(column);
            self.substitute(column);
        }
    }

    /// See [`super::DirectFactor::check`].
    pub(super) fn check(&mut self, x: &[f64], b: &[f64], limit: f64) -> Result<f64, SolveFault> {
        self.residual.check(&self.plan, x, b, limit)
    }

    /// Solves within the segments, the interfaces held at zero.
    fn eliminate(&mut self, column: &[f64]) {
        let (nr, width) = (self.plan.nr, self.plan.width());
        for modes in &self.modes {
            let amplitudes = &mut self.amplitudes[of_rows(&modes.rows, width)];
            if modes.driven {
                modes.analyse(&column[of_rows(&modes.rows, nr)], &self.plan.wall, amplitudes);
                modes.along(&self.plan.inverse_cells, amplitudes);
            } else {
                amplitudes.fill(0.0);
            }
        }
    }

    /// Solves for the interfaces, from the right side there and what the segments leave on them.
    fn solve_interfaces(&mut self, column: &mut [f64]) {
        let (nr, width, cells) = (self.plan.nr, self.plan.width(), &self.plan.inverse_cells);
        for (pair, out) in self.modes.windows(2).zip(self.interface.chunks_exact_mut(nr)) {
            let row = pair[0].rows.end;
            out.copy_from_slice(&column[row * nr..(row + 1) * nr]);
            for (modes, next, cell) in [(&pair[0], row - 1, row), (&pair[1], row + 1, row + 1)] {
                if modes.driven {
                    modes.on_interface(&self.amplitudes[next * width..(next + 1) * width], &mut self.row);
                    out.iter_mut().zip(&self.row).for_each(|(x, w)| *x += cells[cell] * w);
                }
            }
        }
        self.schur.solve_in_place(&mut self.interface);
        for (modes, values) in self.modes.iter().zip(self.interface.chunks_exact(nr)) {
            column[modes.rows.end * nr..(modes.rows.end + 1) * nr].copy_from_slice(values);
        }
    }

    /// Adds what the interfaces make of the segments.
    fn substitute(&mut self, column: &mut [f64]) {
        let (nr, width) = (self.plan.nr, self.plan.width());
        let values = |interface: usize| interface * nr..(interface + 1) * nr;
        for (s, modes) in self.modes.iter().enumerate() {
            let amplitudes = &mut self.amplitudes[of_rows(&modes.rows, width)];
            if s > 0 {
                self.row.copy_from_slice(&self.interface[values(s - 1)]);
                modes.amplitudes_of(&mut self.row, &mut self.ends);
                add_scaled(amplitudes, &modes.from_below, &self.ends);
            }
            if s + 1 < self.modes.len() {
                self.row.copy_from_slice(&self.interface[values(s)]);
                modes.amplitudes_of(&mut self.row, &mut self.ends);
                add_scaled(amplitudes, &modes.from_above, &self.ends);
            }
            modes.synthesise(amplitudes, &mut column[of_rows(&modes.rows, nr)]);
        }
    }
}

/// Places of the entries of `rows` of the given length.
fn of_rows(rows: &Range<usize>, length: usize) -> Range<usize> {
    rows.start * length..rows.end * length
}

/// `amplitudes[row] += shape[row] * factors`, mode by mode.
fn add_scaled(amplitudes: &mut [f64], shape: &[f64], factors: &[f64]) {
    for (row, shape) in amplitudes.chunks_exact_mut(factors.len()).zip(shape.chunks_exact(factors.len())) {
        for ((t, s), f) in row.iter_mut().zip(shape).zip(factors) {
            *t += s * f;
        }
    }
}
