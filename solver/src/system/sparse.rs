//! A sparse matrix that leaves the crate.

use sprs::CsMat;

/// A sparse matrix by compressed rows.
#[derive(Debug, Clone, PartialEq)]
pub struct SparseMatrix {
    /// Number of rows.
    pub rows: usize,
    /// Number of columns.
    pub columns: usize,
    /// Where each row's entries start, and where the last row's end.
    pub row_starts: Vec<usize>,
    /// Column of each entry, increasing within a row.
    pub column_indices: Vec<usize>,
    /// Value of each entry.
    pub values: Vec<f64>,
}

impl SparseMatrix {
    /// From the library's own matrix by rows.
    pub(crate) fn of(matrix: &CsMat<f64>) -> Self {
        let by_rows = matrix.to_csr();
        Self {
            rows: by_rows.rows(),
            columns: by_rows.cols(),
            row_starts: by_rows.indptr().raw_storage().to_vec(),
            column_indices: by_rows.indices().to_vec(),
            values: by_rows.data().to_vec(),
        }
    }

    /// `(row, column, value)` of every entry, row by row.
    pub fn entries(&self) -> impl Iterator<Item = (usize, usize, f64)> {
        self.row_starts.windows(2).enumerate().flat_map(move |(row, ends)| {
            let entries = self.column_indices[ends[0]..ends[1]].iter().zip(&self.values[ends[0]..ends[1]]);
            entries.map(move |(&column, &value)| (row, column, value))
        })
    }

    /// The product with `x`, which has as many entries as there are columns.
    #[must_use]
    pub fn times(&self, x: &[f64]) -> Vec<f64> {
        let mut product = vec![0.0; self.rows];
        for (row, column, value) in self.entries() {
            product[row] += value * x[column];
        }
        product
    }
}
