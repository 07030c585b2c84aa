//! Resistances, inductances and the modes of the rings.

use crate::problem::Wall;
use nalgebra_sparse::na::{DMatrix, DVector, SymmetricEigen};

use super::cell::{Cutting, Lattice, Span, lattices};
use super::inductance::Averager;
use crate::fault::SolveFault;

/// The rings of a wall, in the basis where they decay on their own.
#[derive(Debug, Clone)]
pub struct RingCircuit {
    pub(super) lattices: Vec<Lattice>,
    /// Decay times, s.
    pub(super) tau: DVector<f64>,
    /// Columns R^(-1/2) x of the modes: y = transpose * f gives the drive of every mode by the flux slopes f.
    pub(super) to_modes: DMatrix<f64>,
}

impl RingCircuit {
    /// Cuts a finite wall into rings and finds their modes.
    ///
    /// Cost: N^3 for N rings, some seconds at 1000.
    ///
    /// # Errors
    /// An endless or permeable wall, impossible sizes, or a matrix that is not positive definite.
    pub fn new(wall: &Wall, cutting: Cutting) -> Result<Self, SolveFault> {
        let lattices = lattices(wall, cutting)?;
        let size = lattices.iter().map(Lattice::len).sum();
        let mut matrix = inductances(&lattices, size);
        let roots = root_resistances(&lattices, size);
        for i in 0..size {
            for j in 0..size {
                matrix[(i, j)] /= roots[i] * roots[j];
            }
        }
        let eigen = SymmetricEigen::new(matrix);
        if !eigen.eigenvalues.iter().all(|tau| *tau > 0.0) {
            return Err(SolveFault::Factorisation { unknowns: size });
        }
        let mut to_modes = eigen.eigenvectors;
        for mut column in to_modes.column_iter_mut() {
            for (x, root) in column.iter_mut().zip(roots.iter()) {
                *x /= root;
            }
        }
        Ok(Self { lattices, tau: eigen.eigenvalues, to_modes })
    }

    /// Number of rings.
    #[must_use]
    pub fn rings(&self) -> usize {
        self.tau.len()
    }

    /// Slowest decay of all current patterns, s.
    #[must_use]
    pub fn slowest_decay_s(&self) -> f64 {
        self.tau.max()
    }
}

fn root_resistances(lattices: &[Lattice], size: usize) -> DVector<f64> {
    let mut roots = Vec::with_capacity(size);
    for lattice in lattices {
        for row in 0..lattice.radial.len() {
            roots.extend(std::iter::repeat_n(lattice.resistance(row).sqrt(), lattice.count));
        }
    }
    DVector::from_vec(roots)
}

/// The full inductance matrix; rows of one lattice, or of two with the same pitch and ends, depend on the offset alone.
fn inductances(lattices: &[Lattice], size: usize) -> DMatrix<f64> {
    let averager = Averager::new();
    let mut matrix = DMatrix::zeros(size, size);
    let rows: Vec<(&Lattice, Span, usize)> = rows(lattices);
    for (a, &(lattice_a, ra, start_a)) in rows.iter().enumerate() {
        for &(lattice_b, rb, start_b) in &rows[a..] {
            let aligned = lattice_a.count == lattice_b.count
                && (lattice_a.from - lattice_b.from).abs() + (lattice_a.pitch - lattice_b.pitch).abs()
                    < 1e-12 * lattice_a.pitch;
            let by_offset: Vec<f64> = if aligned {
                let first = lattice_a.axial(0);
                (0..lattice_a.count).map(|n| averager.mutual(ra, lattice_a.axial(n), rb, first)).collect()
            } else {
                Vec::new()
            };
            for i in 0..lattice_a.count {
                for j in 0..lattice_b.count {
                    let value = if aligned {
                        by_offset[i.abs_diff(j)]
                    } else {
                        averager.mutual(ra, lattice_a.axial(i), rb, lattice_b.axial(j))
                    };
                    matrix[(start_a + i, start_b + j)] = value;
                    matrix[(start_b + j, start_a + i)] = value;
                }
            }
        }
    }
    matrix
}

/// Every row of rings: its lattice, its radii, the index of its first ring.
fn rows(lattices: &[Lattice]) -> Vec<(&Lattice, Span, usize)> {
    let mut rows = Vec::new();
    let mut start = 0;
    for lattice in lattices {
        for radial in &lattice.radial {
            rows.push((lattice, *radial, start));
            start += lattice.count;
        }
    }
    rows
}
