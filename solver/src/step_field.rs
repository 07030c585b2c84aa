//! Conductors at rest in a uniform axial field that is switched on at t = 0: a probe of operators and time stepping.
//!
//! No case asks for it; it lets exactly known diffusion problems (rod, tube, sphere) be put to the same operators and the same
//! implicit midpoint rule that a march uses, on node lines and conductivities of the caller's choice. With psi_s = B0 r^2/2
//! the applied field and y = psi_s + psi_r the flux at conducting nodes, y = 0 at the start, a step dt solves
//! (2 G/dt + K) psi_mid = (2 G/dt)(y - psi_s) for the reaction at its middle, and y becomes 2 (psi_s + psi_mid) - y.

use std::sync::Arc;

use lenzbore_mesh::{Grid, NodeLine};

use crate::fault::SolveFault;
use crate::linear::{Factor, Pattern, RESIDUAL_LIMIT, check_residual};
use crate::materials::Materials;
use crate::operators::Operators;

/// A step this small against the time passed changes nothing: it reads the field at an instant.
const INSTANT: f64 = 1e-10;

/// The field after the applied one was switched on.
///
/// A copper rod of 10 mm radius, in air up to 1 m: after mu0 sigma a^2 / 5.78 x ln 4 the greater part of the flux is in.
///
/// ```
/// use lenzbore_solver::step_field::StepField;
/// let r: Vec<f64> = (0..=10).map(|i| 1e-3 * f64::from(i)).chain([0.02, 0.05, 0.1, 0.2, 0.5, 1.0]).collect();
/// let z: Vec<f64> = (-10..=10).map(|j| 0.5 * f64::from(j)).collect();
/// let rod = |cell: usize| if cell % (r.len() - 1) < 10 { 58e6 } else { 0.0 };
/// let sigma: Vec<f64> = (0..(r.len() - 1) * (z.len() - 1)).map(rod).collect();
/// let mut field = StepField::new(&r, &z, &sigma, 1.0)?;
/// for dt in [2e-6, 8e-6, 3e-5, 1e-4] {
///     field.advance(dt, 12)?;
/// }
/// // mu0 sigma a^2 = 7.288 ms; 1 - 4 sum of exp(-j_n^2 t / 7.288 ms) / j_n^2 = 0.8175 at t = 1.68 ms.
/// let mean = field.mean_flux_density()?[10 * r.len() + 10];
/// assert!((field.time_s() - 1.68e-3).abs() < 1e-15 && (mean - 0.8175).abs() < 0.004, "{mean}");
/// # Ok::<(), lenzbore_solver::fault::SolveFault>(())
/// ```
#[derive(Debug)]
pub struct StepField {
    operators: Operators,
    pattern: Arc<Pattern>,
    /// psi_s at the wall's nodes.
    applied: Vec<f64>,
    /// Total flux at the wall's nodes.
    flux: Vec<f64>,
    tesla: f64,
    time_s: f64,
}

impl StepField {
    /// Switches `flux_density_tesla` along +z on around conductors.
    ///
    /// `r_m` from 0 on the axis and `z_m` are node lines; `conductivity_s_per_m` is one value a cell, `[z][r]`. Permeability is
    /// that of free space. The reaction vanishes on the outermost nodes: they belong far out.
    ///
    /// # Errors
    /// Lines that do not increase, or have fewer than three nodes, a first radius other than 0, a number of conductivities other
    /// than that of the cells, or a value that is negative or not finite.
    pub fn new(
        r_m: &[f64],
        z_m: &[f64],
        conductivity_s_per_m: &[f64],
        flux_density_tesla: f64,
    ) -> Result<Self, SolveFault> {
        let grid = Grid { r: NodeLine::from_nodes(r_m.to_vec())?, z: NodeLine::from_nodes(z_m.to_vec())? };
        if grid.nr() < 3 || grid.nz() < 3 {
            return Err(SolveFault::Unsuited("a node line needs three nodes"));
        }
        if r_m[0].abs() > 0.0 {
            return Err(SolveFault::OutOfRange { what: "first radius, m", found: r_m[0], legal: "0" });
        }
        if conductivity_s_per_m.len() != grid.cells() {
            return Err(SolveFault::Unsuited("the conductivities must be as many as the cells"));
        }
        if let Some(&found) = conductivity_s_per_m.iter().find(|s| !(s.is_finite() && **s >= 0.0)) {
            return Err(SolveFault::OutOfRange { what: "conductivity, S/m", found, legal: "finite and not negative" });
        }
        if !flux_density_tesla.is_finite() {
            let (what, found) = ("flux density, T", flux_density_tesla);
            return Err(SolveFault::OutOfRange { what, found, legal: "finite" });
        }
        let materials = Materials {
            sigma: conductivity_s_per_m.to_vec(),
            mu_r: vec![1.0; grid.cells()],
            region: conductivity_s_per_m.iter().map(|s| usize::from(*s > 0.0)).collect(),
        };
        let operators = Operators::new(grid, materials);
        let pattern = Pattern::new(&operators.stiffness)?;
        let applied: Vec<f64> = operators.wall.radius.iter().map(|r| 0.5 * flux_density_tesla * r * r).collect();
        let flux = vec![0.0; applied.len()];
        Ok(Self { operators, pattern, applied, flux, tesla: flux_density_tesla, time_s: 0.0 })
    }

    /// Time since the field was switched on, s.
    #[must_use]
    pub fn time_s(&self) -> f64 {
        self.time_s
    }

    /// Takes `steps` steps of `step_s` seconds; second order in the step, no step is too long to be stable.
    ///
    /// # Errors
    /// A step that is not positive, or a solve that fails.
    pub fn advance(&mut self, step_s: f64, steps: usize) -> Result<(), SolveFault> {
        if !(step_s > 0.0 && step_s.is_finite()) {
            return Err(SolveFault::OutOfRange { what: "time step, s", found: step_s, legal: "greater than 0" });
        }
        let mut stepper = Stepper::new(self, step_s)?;
        let begin = self.time_s;
        for step in 1..=steps {
            let middle = stepper.middle(self)?;
            for (k, &u) in self.operators.wall.unknown.iter().enumerate() {
                self.flux[k] = 2.0 * (self.applied[k] + middle[u]) - self.flux[k];
            }
            #[expect(clippy::cast_precision_loss, reason = "step counts are far below 2^52")]
            let passed = step as f64 * step_s;
            self.time_s = begin + passed;
        }
        Ok(())
    }

    /// Total psi = r A_phi at all nodes now, `[z][r]`, Wb/rad.
    ///
    /// # Errors
    /// A solve that fails, or no step taken yet.
    pub fn psi(&self) -> Result<Vec<f64>, SolveFault> {
        if self.time_s <= 0.0 {
            return Err(SolveFault::Unsuited("no step has been taken yet"));
        }
        let reaction = Stepper::new(self, INSTANT * self.time_s)?.middle(self)?;
        let mut psi = self.operators.spread(&reaction);
        let radii = self.operators.grid.r.nodes();
        for row in psi.chunks_exact_mut(radii.len()) {
            for (value, r) in row.iter_mut().zip(radii) {
                *value += 0.5 * self.tesla * r * r;
            }
        }
        Ok(psi)
    }

    /// Flux through the disc inside each node over its area, 2 psi / r^2, `[z][r]`, T; on the axis that of the first disc.
    ///
    /// # Errors
    /// As [`StepField::psi`].
    pub fn mean_flux_density(&self) -> Result<Vec<f64>, SolveFault> {
        let mut mean = self.psi()?;
        let radii = self.operators.grid.r.nodes();
        for row in mean.chunks_exact_mut(radii.len()) {
            for (value, r) in row.iter_mut().zip(radii).skip(1) {
                *value *= 2.0 / (r * r);
            }
            row[0] = row[1];
        }
        Ok(mean)
    }
}

/// One size of step, factorised.
struct Stepper {
    /// 2 G/dt at the wall's nodes.
    rate: Vec<f64>,
    /// The same at all unknowns.
    added: Vec<f64>,
    factor: Factor,
}

impl Stepper {
    fn new(field: &StepField, step_s: f64) -> Result<Self, SolveFault> {
        let operators = &field.operators;
        let rate: Vec<f64> = operators.wall.conductance.iter().map(|g| 2.0 * g / step_s).collect();
        let mut added = vec![0.0; operators.unknowns()];
        for (&u, rate) in operators.wall.unknown.iter().zip(&rate) {
            added[u] = *rate;
        }
        let factor = Factor::new(&field.pattern, &operators.stiffness, Some(&added))?;
        Ok(Self { rate, added, factor })
    }

    /// The reaction at the middle of a step from the present flux.
    fn middle(&mut self, field: &StepField) -> Result<Vec<f64>, SolveFault> {
        let mut right = vec![0.0; self.added.len()];
        for (k, &u) in field.operators.wall.unknown.iter().enumerate() {
            right[u] = self.rate[k] * (field.flux[k] - field.applied[k]);
        }
        let mut psi = right.clone();
        self.factor.solve_in_place(&mut psi);
        check_residual(&field.operators.stiffness, Some(&self.added), &psi, &right, RESIDUAL_LIMIT)?;
        Ok(psi)
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use super::*;

    fn sphere(tesla: f64) -> StepField {
        let r: Vec<f64> = (0..=12).map(|i| 0.01 * f64::from(i)).chain([0.2, 0.5, 1.5]).collect();
        let z: Vec<f64> = r.iter().skip(1).rev().map(|r| -r).chain(r.iter().copied()).collect();
        let (columns, rows) = (r.len() - 1, z.len() - 1);
        let middle = |line: &[f64], i: usize| 0.5 * (line[i] + line[i + 1]);
        let inside = |cell: usize| middle(&r, cell % columns).hypot(middle(&z, cell / columns)) < 0.06;
        let sigma: Vec<f64> = (0..columns * rows).map(|c| if inside(c) { 1e7 } else { 0.0 }).collect();
        StepField::new(&r, &z, &sigma, tesla).unwrap()
    }

    /// At first the sphere keeps all flux out, at last it lets all of it through; the field is linear in the applied one and
    /// even about the middle.
    #[test]
    fn the_field_enters_from_nothing_to_all() {
        let (mut one, mut two) = (sphere(1.0), sphere(-2.5));
        let centre = |f: &StepField| f.mean_flux_density().unwrap()[15 * 16 + 1];
        one.advance(1e-6, 1).unwrap();
        assert!(centre(&one).abs() < 1e-3);
        two.advance(1e-6, 1).unwrap();
        for dt in [1e-4, 1e-3, 1e-2, 0.1] {
            one.advance(dt, 8).unwrap();
            two.advance(dt, 8).unwrap();
            approx::assert_relative_eq!(centre(&two), -2.5 * centre(&one), max_relative = 1e-10);
            let psi = one.psi().unwrap();
            approx::assert_relative_eq!(psi[10 * 16 + 3], psi[20 * 16 + 3], max_relative = 1e-10);
        }
        approx::assert_relative_eq!(centre(&one), 1.0, max_relative = 1e-3);
    }

    #[test]
    fn lines_and_values_that_make_no_sense_are_refused() {
        let (r, z) = ([0.0, 1.0, 2.0], [0.0, 1.0, 2.0]);
        let new = |r: &[f64], sigma: &[f64]| StepField::new(r, &z, sigma, 1.0).map(drop);
        assert!(new(&r, &[1.0; 4]).is_ok());
        assert!(matches!(new(&r, &[1.0; 3]), Err(SolveFault::Unsuited(_))));
        assert!(matches!(new(&[0.1, 1.0, 2.0], &[1.0; 4]), Err(SolveFault::OutOfRange { .. })));
        assert!(matches!(new(&[0.0, 2.0, 1.0], &[1.0; 4]), Err(SolveFault::Mesh(_))));
        assert!(matches!(new(&r, &[1.0, f64::NAN, 1.0, 1.0]), Err(SolveFault::OutOfRange { .. })));
        let mut field = StepField::new(&r, &z, &[1.0; 4], 1.0).unwrap();
        assert!(field.psi().is_err() && field.advance(0.0, 1).is_err());
    }
}
