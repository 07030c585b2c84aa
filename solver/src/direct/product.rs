//! Products of tall rows with a small dense matrix, without allocation.

use pulp::{Arch, Simd, WithSimd};

/// Rows of the left factor taken together.
const ROWS: usize = 4;
/// Columns taken together; stored rows are padded to a multiple of it.
pub(super) const LANES: usize = 16;

/// `n` up to a whole number of lanes.
pub(super) fn padded(n: usize) -> usize {
    n.next_multiple_of(LANES)
}

/// A small matrix, row by row, each padded with zeros to whole lanes.
#[derive(Debug, Clone)]
pub(super) struct Small {
    rows: usize,
    columns: usize,
    stride: usize,
    values: Vec<f64>,
}

impl Small {
    pub(super) fn from_fn(rows: usize, columns: usize, of: impl Fn(usize, usize) -> f64) -> Self {
        let stride = padded(columns);
        let mut values = vec![0.0; rows * stride];
        for (i, row) in values.chunks_exact_mut(stride).enumerate() {
            row[..columns].iter_mut().enumerate().for_each(|(k, x)| *x = of(i, k));
        }
        Self { rows, columns, stride, values }
    }

    pub(super) fn row(&self, i: usize) -> &[f64] {
        &self.values[i * self.stride..i * self.stride + self.columns]
    }
}

/// Rows of equal length, one after the other.
#[derive(Debug, Clone, Copy)]
pub(super) struct Rows<'x> {
    pub(super) values: &'x [f64],
    pub(super) stride: usize,
    /// First of the entries that are multiplied.
    pub(super) first: usize,
}

/// `out[row] = left[row] * matrix[from..from + used]` for all rows of `out`, each `out_stride` long.
pub(super) fn multiply(
    left: Rows<'_>,
    matrix: &Small,
    (from, used): (usize, usize),
    out: &mut [f64],
    out_stride: usize,
) {
    debug_assert!(from + used <= matrix.rows, "rows of the matrix");
    let right = &matrix.values[from * matrix.stride..(from + used) * matrix.stride];
    // The widest vectors that the processor has.
    Arch::new().dispatch(Product { left, used, right, stride: matrix.stride, out, out_stride });
}

struct Product<'x> {
    left: Rows<'x>,
    used: usize,
    right: &'x [f64],
    stride: usize,
    out: &'x mut [f64],
    out_stride: usize,
}

impl WithSimd for Product<'_> {
    type Output = ();

    #[inline(always)]
    fn with_simd<S: Simd>(self, simd: S) {
        let Self { left, used, right, stride, out, out_stride } = self;
        let mut lefts = left.values.chunks(ROWS * left.stride);
        for out in out.chunks_mut(ROWS * out_stride) {
            let Some(values) = lefts.next() else { return };
            if out.len() == ROWS * out_stride {
                block::<S, ROWS>(simd, Rows { values, ..left }, used, right, stride, out, out_stride);
            } else {
                for (values, out) in values.chunks(left.stride).zip(out.chunks_mut(out_stride)) {
                    block::<S, 1>(simd, Rows { values, ..left }, used, right, stride, out, out_stride);
                }
            }
        }
    }
}

/// `R` rows of the result: two vectors of each at a time.
#[inline(always)]
fn block<S: Simd, const R: usize>(
    simd: S,
    left: Rows<'_>,
    used: usize,
    right: &[f64],
    stride: usize,
    out: &mut [f64],
    out_stride: usize,
) {
    let rows: [&[f64]; R] = std::array::from_fn(|r| &left.values[r * left.stride + left.first..][..used]);
    let (right, _) = S::as_simd_f64s(right);
    let vectors = stride / S::F64_LANES;
    for column in (0..vectors).step_by(2).take_while(|column| column * S::F64_LANES < out_stride) {
        let mut sums = [[simd.splat_f64s(0.0); 2]; R];
        for i in 0..used {
            let pair = &right[i * vectors + column..][..2];
            for r in 0..R {
                let x = simd.splat_f64s(rows[r][i]);
                sums[r][0] = simd.mul_add_e_f64s(x, pair[0], sums[r][0]);
                sums[r][1] = simd.mul_add_e_f64s(x, pair[1], sums[r][1]);
            }
        }
        let from = column * S::F64_LANES;
        for (r, sum) in sums.iter().enumerate() {
            let out = &mut out[r * out_stride..][from..out_stride];
            if let Some(whole) = S::as_mut_simd_f64s(out).0.get_mut(..2) {
                whole.copy_from_slice(sum);
            } else {
                let mut lanes = [0.0; LANES];
                S::as_mut_simd_f64s(&mut lanes[..2 * S::F64_LANES]).0.copy_from_slice(sum);
                out.iter_mut().zip(&lanes).for_each(|(o, l)| *o = *l);
            }
        }
    }
}
