//! Extrapolation over grid levels whose error runs in even powers of the cell size (Richardson).
//!
//! L. F. Richardson, "The approximate arithmetical solution by finite differences of physical problems involving
//! differential equations", Phil. Trans. R. Soc. A 210, 307-357 (1911).

/// Weights w with sum(w F(f)) free of the powers `exponents` of 1/f: F(f) = F + sum c_k f^-p_k.
///
/// Solves the small system by Gaussian elimination with partial pivoting; `factors` has one more entry than `exponents`.
#[must_use]
pub fn weights(factors: &[f64], exponents: &[f64]) -> Vec<f64> {
    let n = factors.len();
    debug_assert_eq!(n, exponents.len() + 1, "one level more than powers removed");
    let mut rows: Vec<Vec<f64>> = Vec::with_capacity(n);
    for k in 0..n {
        let power = |f: f64| if k == 0 { 1.0 } else { f.powf(-exponents[k - 1]) };
        let mut row: Vec<f64> = factors.iter().map(|&f| power(f)).collect();
        row.push(if k == 0 { 1.0 } else { 0.0 });
        rows.push(row);
    }
    eliminate(rows)
}

/// Even powers 2, 4, ... for `levels` levels.
#[must_use]
pub fn even_powers(levels: usize) -> Vec<f64> {
    (1..levels).map(|k| 2.0 * f64::from(u32::try_from(k).unwrap_or(u32::MAX))).collect()
}

/// Extrapolates `values` on levels `factors`, removing even powers.
///
/// ```
/// use lenzbore_solver::extrapolate::extrapolate;
/// let f = [1.0, 1.5, 2.0];
/// let values = f.map(|f: f64| 3.0 + 0.2 / f.powi(2) - 0.1 / f.powi(4));
/// assert!((extrapolate(&f, &values) - 3.0).abs() < 1e-14);
/// ```
#[must_use]
pub fn extrapolate(factors: &[f64], values: &[f64]) -> f64 {
    let w = weights(factors, &even_powers(factors.len()));
    w.iter().zip(values).map(|(w, v)| w * v).sum()
}

fn eliminate(mut rows: Vec<Vec<f64>>) -> Vec<f64> {
    let n = rows.len();
    for k in 0..n {
        let pivot = (k..n).max_by(|&a, &b| rows[a][k].abs().total_cmp(&rows[b][k].abs())).unwrap_or(k);
        rows.swap(k, pivot);
        for i in k + 1..n {
            let factor = rows[i][k] / rows[k][k];
            let (upper, lower) = rows.split_at_mut(i);
            for (below, above) in lower[0].iter_mut().zip(&upper[k]).skip(k) {
                *below -= factor * above;
            }
        }
    }
    let mut x = vec![0.0; n];
    for k in (0..n).rev() {
        let known: f64 = (k + 1..n).map(|j| rows[k][j] * x[j]).sum();
        x[k] = (rows[k][n] - known) / rows[k][k];
    }
    x
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn weights_match_hand_arithmetic() {
        // Levels 1 and 2, h^2 removed: (4 F2 - F1) / 3.
        let w = weights(&[1.0, 2.0], &[2.0]);
        approx::assert_relative_eq!(w[0], -1.0 / 3.0, max_relative = 1e-14);
        approx::assert_relative_eq!(w[1], 4.0 / 3.0, max_relative = 1e-14);
    }

    #[test]
    fn odd_powers_are_not_removed() {
        let f = [1.0, 1.5, 2.0];
        let values = f.map(|f: f64| 1.0 + 0.1 / f);
        assert!((extrapolate(&f, &values) - 1.0).abs() > 1e-3);
    }
}
