//! Radial modes of a segment, and the tridiagonal system along z that belongs to each.
//!
//! With Phi^T D Phi = 1 and Phi^T (K_r + rate G_r) Phi = Lambda, psi = Phi t turns the segment's rows into
//! (dz*_j lambda + a_(j-1) + a_j) t_j - a_(j-1) t_(j-1) - a_j t_(j+1) = (Phi^T right)_j for each mode (R. E. Lynch, J. R. Rice,
//! D. H. Thomas, "Direct solution of partial difference equations by tensor product methods", Numerische Mathematik 6,
//! 185-199, 1964; citation from memory).

use std::ops::Range;

use faer::diag::{DiagMut, DiagRef};
use faer::dyn_stack::{MemBuffer, MemStack};
use faer::linalg::evd::{
    ComputeEigenvectors, SelfAdjointEvdParams, self_adjoint_evd_scratch, tridiagonal_self_adjoint_evd,
};
use faer::{Auto, Mat, Par, Spec};

use super::plan::{LayeredPlan, Segment};
use super::product::{Rows, Small, multiply, padded};

/// How far modes may miss their equation, relative to the largest eigenvalue.
const MODE_LIMIT: f64 = 1.0e-12;

/// Share of a mode, or of an interface's amplitude deep inside a segment, that no longer counts. Products of such traces would run into
/// the numbers near the least that exist, which processors treat slowly.
const TRACE: f64 = 1.0e-40;

/// One segment's modes, factored along z.
#[derive(Debug, Clone)]
pub(super) struct Modes {
    pub(super) rows: Range<usize>,
    /// Whether the right side may be nonzero here.
    pub(super) driven: bool,
    /// Phi and its transpose.
    phi: Small,
    modes: Small,
    /// D.
    axial: Vec<f64>,
    /// Amplitudes of a row, padded to whole lanes.
    width: usize,
    /// Inverse pivots of the tridiagonal systems, `[row][mode]`.
    inverse_pivots: Vec<f64>,
    /// Amplitudes for a unit of each mode on the interface below and above, `[row][mode]`; empty at the boundary.
    pub(super) from_below: Vec<f64>,
    pub(super) from_above: Vec<f64>,
}

impl Modes {
    /// The modes of segment `number` of `plan`; `None` where they aren't found or the system isn't positive definite.
    pub(super) fn new(plan: &LayeredPlan, number: usize, rate: f64) -> Option<Self> {
        let segment = &plan.segments[number];
        let (values, phi, transposed) = eigenmodes(segment, rate)?;
        let inverse_pivots = inverse_pivots(plan, segment, &values)?;
        let rows = segment.rows.clone();
        let mut modes = Self {
            rows: rows.clone(),
            driven: segment.wall,
            phi,
            modes: transposed,
            axial: segment.axial.clone(),
            width: padded(plan.nr),
            inverse_pivots,
            from_below: Vec::new(),
            from_above: Vec::new(),
        };
        let (width, size) = (modes.width, rows.len() * modes.width);
        if number > 0 {
            let mut unit = vec![0.0; size];
            unit[..width].fill(plan.inverse_cells[rows.start]);
            modes.along(&plan.inverse_cells, &mut unit);
            modes.from_below = without_traces(unit);
        }
        if number + 1 < plan.segments.len() {
            let mut unit = vec![0.0; size];
            unit[size - width..].fill(plan.inverse_cells[rows.end]);
            modes.along(&plan.inverse_cells, &mut unit);
            modes.from_above = without_traces(unit);
        }
        Some(modes)
    }

    /// Amplitudes of the modes of `right`, both over this segment's rows; `right` is read on the radii of `wall`.
    pub(super) fn analyse(&self, right: &[f64], wall: &Range<usize>, amplitudes: &mut [f64]) {
        let left = Rows { values: right, stride: self.axial.len(), first: wall.start };
        multiply(left, &self.phi, (wall.start, wall.len()), amplitudes, self.width);
    }

    /// The field of `amplitudes`, over this segment's rows.
    pub(super) fn synthesise(&self, amplitudes: &[f64], out: &mut [f64]) {
        let left = Rows { values: amplitudes, stride: self.width, first: 0 };
        multiply(left, &self.modes, (0, self.axial.len()), out, self.axial.len());
    }

    /// Amplitudes of a row of values on an interface, (D Phi)^T values; `values` are lost.
    pub(super) fn amplitudes_of(&self, values: &mut [f64], out: &mut [f64]) {
        values.iter_mut().zip(&self.axial).for_each(|(x, d)| *x *= d);
        self.analyse(values, &(0..self.axial.len()), out);
    }

    /// D Phi amplitudes: what a row of this segment leaves on an interface next to it, by the inverse cell between them.
    pub(super) fn on_interface(&self, amplitudes: &[f64], out: &mut [f64]) {
        self.synthesise(amplitudes, out);
        out.iter_mut().zip(&self.axial).for_each(|(x, d)| *x *= d);
    }

    /// Unknowns along r.
    pub(super) fn radii(&self) -> usize {
        self.axial.len()
    }

    /// Row `k` of the transpose of D Phi.
    pub(super) fn weighted(&self, k: usize) -> impl Iterator<Item = f64> {
        self.modes.row(k).iter().zip(&self.axial).map(|(p, d)| p * d)
    }

    /// Solves every mode's tridiagonal system along z in place, the interfaces held at zero.
    pub(super) fn along(&self, inverse_cells: &[f64], amplitudes: &mut [f64]) {
        let nr = self.width;
        let cells = &inverse_cells[self.rows.start..=self.rows.end];
        let mut pivots = self.inverse_pivots.chunks_exact(nr);
        let mut rows = amplitudes.chunks_exact_mut(nr);
        let (Some(mut before), Some(mut pivot)) = (rows.next(), pivots.next()) else { return };
        for ((row, next_pivot), a) in rows.zip(pivots).zip(&cells[1..]) {
            for ((t, b), w) in row.iter_mut().zip(&*before).zip(pivot) {
                *t += a * w * b;
            }
            (before, pivot) = (row, next_pivot);
        }
        let mut pivots = self.inverse_pivots.chunks_exact(nr).rev();
        let mut rows = amplitudes.chunks_exact_mut(nr).rev();
        let (Some(mut after), Some(pivot)) = (rows.next(), pivots.next()) else { return };
        after.iter_mut().zip(pivot).for_each(|(t, w)| *t *= w);
        for ((row, pivot), a) in rows.zip(pivots).zip(cells[1..cells.len() - 1].iter().rev()) {
            for ((t, above), w) in row.iter_mut().zip(&*after).zip(pivot) {
                *t = w * (*t + a * above);
            }
            after = row;
        }
    }
}

/// Zero in place of what is too small to count.
fn without_traces(mut shape: Vec<f64>) -> Vec<f64> {
    let least = TRACE * shape.iter().copied().fold(0.0, f64::max);
    shape.iter_mut().filter(|x| x.abs() < least).for_each(|x| *x = 0.0);
    shape
}

/// Lambda, Phi and its transpose of a segment, each checked against its equation.
fn eigenmodes(segment: &Segment, rate: f64) -> Option<(Vec<f64>, Small, Small)> {
    let radial = &segment.radial;
    let root: Vec<f64> = segment.axial.iter().map(|d| d.sqrt()).collect();
    let nr = root.len();
    // D^(-1/2) (K_r + rate G_r) D^(-1/2): symmetric and tridiagonal.
    let diagonal: Vec<f64> =
        (0..nr).map(|i| (radial.diagonal[i] + rate * radial.conductance[i]) / segment.axial[i]).collect();
    let mut next: Vec<f64> = (0..nr - 1).map(|i| radial.next[i] / (root[i] * root[i + 1])).collect();
    next.push(0.0);
    // QL iterations at every size: the divide-and-conquer that the library takes from 128 on missed eigenpairs by 1e-8.
    let params =
        SelfAdjointEvdParams { recursion_threshold: usize::MAX, ..<SelfAdjointEvdParams as Auto<f64>>::auto() };
    let params = Spec::<SelfAdjointEvdParams, f64>::new(params);
    let mut memory = MemBuffer::new(self_adjoint_evd_scratch::<f64>(nr, ComputeEigenvectors::Yes, Par::Seq, params));
    let mut values = vec![0.0; nr];
    let mut vectors = Mat::<f64>::zeros(nr, nr);
    tridiagonal_self_adjoint_evd(
        DiagRef::from_slice(&diagonal),
        DiagRef::from_slice(&next),
        DiagMut::from_slice_mut(&mut values),
        Some(vectors.as_mut()),
        Par::Seq,
        MemStack::new(&mut memory),
        params,
    )
    .ok()?;
    let largest = values.iter().copied().fold(0.0, f64::max);
    let miss = |k: usize| {
        let q = |i: usize| vectors[(i, k)];
        let before = |i: usize| if i > 0 { next[i - 1] * q(i - 1) } else { 0.0 };
        let after = |i: usize| if i + 1 < nr { next[i] * q(i + 1) } else { 0.0 };
        (0..nr).map(|i| (before(i) + (diagonal[i] - values[k]) * q(i) + after(i)).abs()).fold(0.0, f64::max)
    };
    let worst = (0..nr).map(miss).fold(0.0, |worst: f64, m| if m.is_nan() { f64::INFINITY } else { worst.max(m) });
    (worst <= MODE_LIMIT * largest).then(|| {
        // Vectors have length 1.
        let vector = |i: usize, k: usize| if vectors[(i, k)].abs() < TRACE { 0.0 } else { vectors[(i, k)] };
        let phi = Small::from_fn(nr, nr, |i, k| vector(i, k) / root[i]);
        let transposed = Small::from_fn(nr, nr, |k, i| vector(i, k) / root[i]);
        (values, phi, transposed)
    })
}

/// Inverse pivots of the tridiagonal systems; elimination needs no exchange, as they are diagonally dominant.
fn inverse_pivots(plan: &LayeredPlan, segment: &Segment, values: &[f64]) -> Option<Vec<f64>> {
    let width = padded(values.len());
    let mut inverse: Vec<f64> = Vec::with_capacity(segment.rows.len() * width);
    for row in segment.rows.clone() {
        let (before, after) = (plan.inverse_cells[row], plan.inverse_cells[row + 1]);
        for k in 0..width {
            let value = values.get(k).unwrap_or(&0.0);
            let mut pivot = plan.duals[row] * value + before + after;
            if row > segment.rows.start {
                pivot -= before * before * inverse[inverse.len() - width];
            }
            if !(pivot > 0.0 && pivot.is_finite()) {
                return None;
            }
            inverse.push(1.0 / pivot);
        }
    }
    Some(inverse)
}
