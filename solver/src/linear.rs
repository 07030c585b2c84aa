//! Sparse symmetric positive definite solves: symbolic once, numeric into an own buffer, no allocation in a solve.
//!
//! The third-party factorisation stays behind this module.

use std::sync::Arc;

use faer::dyn_stack::{MemBuffer, MemStack};
use faer::linalg::cholesky::llt::factor::LltRegularization;
use faer::sparse::linalg::SupernodalThreshold;
use faer::sparse::linalg::cholesky::{
    CholeskySymbolicParams, LltRef, SymbolicCholesky, SymmetricOrdering, factorize_symbolic_cholesky,
};
use faer::sparse::{SparseColMatRef, SymbolicSparseColMatRef};
use faer::{Conj, MatMut, Par, Side, Spec};
use sprs::CsMat;

use crate::fault::SolveFault;

/// Pattern of a symmetric matrix (lower triangle, CSC) and its symbolic Cholesky factorisation.
#[derive(Debug)]
pub(crate) struct Pattern {
    unknowns: usize,
    column_starts: Vec<u32>,
    rows: Vec<u32>,
    /// Position of each stored entry in the full matrix's data.
    source: Vec<usize>,
    /// Position of each diagonal entry among the stored ones.
    diagonal: Vec<usize>,
    symbolic: SymbolicCholesky<u32>,
}

impl Pattern {
    /// Analyses the pattern of the symmetric `matrix` (both triangles stored).
    ///
    /// # Errors
    /// Too large for 32-bit indices, or out of memory.
    pub(crate) fn new(matrix: &CsMat<f64>) -> Result<Arc<Self>, SolveFault> {
        let unknowns = matrix.rows();
        let fail = || SolveFault::Factorisation { unknowns };
        let mut column_starts = vec![0_u32];
        let (mut rows, mut source, mut diagonal) = (Vec::new(), Vec::new(), Vec::new());
        let mut position = 0;
        for (column, entries) in matrix.outer_iterator().enumerate() {
            for (row, _) in entries.iter() {
                if row == column {
                    diagonal.push(rows.len());
                }
                if row >= column {
                    rows.push(u32::try_from(row).map_err(|_| fail())?);
                    source.push(position);
                }
                position += 1;
            }
            column_starts.push(u32::try_from(rows.len()).map_err(|_| fail())?);
        }
        let pattern = SymbolicSparseColMatRef::new_checked(unknowns, unknowns, &column_starts, None, &rows);
        let params = CholeskySymbolicParams {
            supernodal_flop_ratio_threshold: SupernodalThreshold::FORCE_SIMPLICIAL,
            ..Default::default()
        };
        let symbolic =
            factorize_symbolic_cholesky(pattern, Side::Lower, SymmetricOrdering::Amd, params).map_err(|_| fail())?;
        Ok(Arc::new(Self { unknowns, column_starts, rows, source, diagonal, symbolic }))
    }

    /// Stored entries of the factor.
    pub(crate) fn factor_entries(&self) -> usize {
        self.symbolic.len_val()
    }

    /// Bytes that one back-solve reads: the factor's values and row indices, twice.
    pub(crate) fn bytes_per_solve(&self) -> usize {
        2 * self.factor_entries() * (size_of::<f64>() + size_of::<u32>())
    }
}

/// A numeric Cholesky factor with its workspace.
pub(crate) struct Factor {
    pattern: Arc<Pattern>,
    values: Vec<f64>,
    workspace: MemBuffer,
}

impl std::fmt::Debug for Factor {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.debug_struct("Factor").field("unknowns", &self.pattern.unknowns).finish_non_exhaustive()
    }
}

/// Right-hand sides solved at once, at most.
const MOST_COLUMNS: usize = 2;

impl Factor {
    /// Factorises `matrix + diag(added)`, both triangles of `matrix` stored in the analysed pattern.
    ///
    /// # Errors
    /// The matrix is not numerically positive definite.
    pub(crate) fn new(pattern: &Arc<Pattern>, matrix: &CsMat<f64>, added: Option<&[f64]>) -> Result<Self, SolveFault> {
        let fail = SolveFault::Factorisation { unknowns: pattern.unknowns };
        let data = matrix.data();
        let mut entries: Vec<f64> = pattern.source.iter().map(|&k| data[k]).collect();
        if let Some(added) = added {
            for (&k, a) in pattern.diagonal.iter().zip(added) {
                entries[k] += a;
            }
        }
        if entries.iter().any(|x| !x.is_finite()) {
            return Err(SolveFault::NotFinite { what: "an entry of the system matrix" });
        }
        let n = pattern.unknowns;
        let structure = SymbolicSparseColMatRef::new_checked(n, n, &pattern.column_starts, None, &pattern.rows);
        let lower = SparseColMatRef::new(structure, entries.as_slice());
        let symbolic = &pattern.symbolic;
        let mut values = vec![0.0; symbolic.len_val()];
        let mut memory = MemBuffer::new(symbolic.factorize_numeric_llt_scratch::<f64>(Par::Seq, Spec::default()));
        symbolic
            .factorize_numeric_llt(
                &mut values,
                lower,
                Side::Lower,
                LltRegularization::default(),
                Par::Seq,
                MemStack::new(&mut memory),
                Spec::default(),
            )
            .map_err(|_| fail.clone())?;
        if values.iter().any(|x| !x.is_finite()) {
            return Err(fail);
        }
        let workspace = MemBuffer::new(symbolic.solve_in_place_scratch::<f64>(MOST_COLUMNS, Par::Seq));
        Ok(Self { pattern: Arc::clone(pattern), values, workspace })
    }

    /// Solves in place for one column, or two stored one after the other. Allocates nothing.
    pub(crate) fn solve_in_place(&mut self, columns: &mut [f64]) {
        let n = self.pattern.unknowns;
        let count = columns.len() / n;
        debug_assert!(count <= MOST_COLUMNS && columns.len() == count * n, "one or two whole columns");
        let rhs = MatMut::from_column_major_slice_mut(columns, n, count);
        LltRef::new(&self.pattern.symbolic, &self.values).solve_in_place_with_conj(
            Conj::No,
            rhs,
            Par::Seq,
            MemStack::new(&mut self.workspace),
        );
    }
}

/// `|b - A x| / |b|` in the maximum norm, and an error where it is not finite or above `limit`.
///
/// # Errors
/// Not finite, or too large.
pub(crate) fn check_residual(
    matrix: &CsMat<f64>,
    added: Option<&[f64]>,
    x: &[f64],
    b: &[f64],
    limit: f64,
) -> Result<f64, SolveFault> {
    let (mut worst, mut scale) = (0.0_f64, 0.0_f64);
    let starts = matrix.indptr();
    let (starts, columns, values) = (starts.raw_storage(), matrix.indices(), matrix.data());
    for (row, ends) in starts.windows(2).enumerate() {
        let diagonal = added.map_or(0.0, |a| a[row] * x[row]);
        let (mut ax, mut size) = (diagonal, diagonal.abs());
        for (&column, value) in columns[ends[0]..ends[1]].iter().zip(&values[ends[0]..ends[1]]) {
            let term = value * x[column];
            ax += term;
            size += term.abs();
        }
        let off = (b[row] - ax).abs();
        // A NaN fails both comparisons of max: it must not slip through.
        worst = if off > worst || off.is_nan() { off } else { worst };
        scale = scale.max(size);
    }
    if !worst.is_finite() {
        return Err(SolveFault::NotFinite { what: "the solution of a linear system" });
    }
    let residual = if scale > 0.0 { worst / scale } else { 0.0 };
    if residual > limit { Err(SolveFault::Residual { residual, limit }) } else { Ok(residual) }
}

/// Limit on the relative residual after a solve (backward error; eps times the matrix's growth is far below it).
pub(crate) const RESIDUAL_LIMIT: f64 = 1.0e-11;
