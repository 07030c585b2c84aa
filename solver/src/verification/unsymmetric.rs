//! K - v C by sparse LU, with its own C: the way to settled fields that shares nothing with the recurrence but K and
//! G.

use faer::linalg::solvers::Solve;
use faer::sparse::linalg::solvers::Lu;
use faer::sparse::{SparseColMat, Triplet};

use crate::operators::Operators;

/// The factorised matrix of one velocity.
pub(crate) struct Unsymmetric {
    lu: Lu<usize, f64>,
    matrix: SparseColMat<usize, f64>,
}

impl Unsymmetric {
    /// Factorises K - v C, C = G d/dz by central differences, psi = 0 outside the unknowns.
    pub(crate) fn new(operators: &Operators, velocity: f64) -> Self {
        let grid = &operators.grid;
        let (columns, n, z) = (grid.nr() - 2, operators.unknowns(), grid.z.nodes());
        let mut entries: Vec<Triplet<usize, usize, f64>> = Vec::new();
        for (row, values) in operators.stiffness.outer_iterator().enumerate() {
            entries.extend(values.iter().map(|(column, &value)| Triplet::new(row, column, value)));
        }
        for (&u, &g) in operators.wall.unknown.iter().zip(&operators.wall.conductance) {
            let j = u / columns + 1;
            let weight = velocity * g / (z[j + 1] - z[j - 1]);
            if u + columns < n {
                entries.push(Triplet::new(u, u + columns, -weight));
            }
            if u >= columns {
                entries.push(Triplet::new(u, u - columns, weight));
            }
        }
        let matrix = SparseColMat::try_new_from_triplets(n, n, &entries).unwrap();
        Self { lu: matrix.sp_lu().unwrap(), matrix }
    }

    /// Solves, with one refinement, and refuses what is not finite or leaves a residual.
    pub(crate) fn solve(&self, right: &[f64]) -> Vec<f64> {
        let b = faer::Mat::from_fn(right.len(), 1, |row, _| right[row]);
        let first = self.lu.solve(&b);
        let rest = &b - &self.matrix * &first;
        let x = &first + self.lu.solve(&rest);
        let left = (&b - &self.matrix * &x).norm_l2() / b.norm_l2();
        assert!(left < 1e-10, "the sparse LU left a residual of {left:.1e}");
        (0..right.len()).map(|row| x[(row, 0)]).collect()
    }
}
