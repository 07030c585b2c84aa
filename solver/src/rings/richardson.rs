//! The limit of ever finer cuttings.

/// A limit and how far the last extrapolation moved it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Extrapolated {
    /// The limit.
    pub value: f64,
    /// Difference to the limit taken without the coarsest value.
    pub change: f64,
}

/// Limit at zero size of values whose error runs in even powers of the size; `sizes` falling, at least two.
///
/// Neville's scheme in the squares of the sizes.
#[must_use]
pub fn extrapolate(sizes: &[f64], values: &[f64]) -> Extrapolated {
    let squares: Vec<f64> = sizes.iter().map(|h| h * h).collect();
    let value = neville(&squares, values);
    let change =
        if values.len() > 2 { value - neville(&squares[1..], &values[1..]) } else { value - values[values.len() - 1] };
    Extrapolated { value, change }
}

fn neville(x: &[f64], y: &[f64]) -> f64 {
    let mut row = y.to_vec();
    for order in 1..row.len() {
        for i in 0..row.len() - order {
            row[i] = (x[i] * row[i + 1] - x[i + order] * row[i]) / (x[i] - x[i + order]);
        }
    }
    row[0]
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    #[test]
    fn even_powers_are_removed() {
        let sizes = [1.0, 1.0 / 1.5, 0.5];
        let values = sizes.map(|h: f64| 3.0 + 0.2 * h.powi(2) - 0.7 * h.powi(4));
        assert_relative_eq!(extrapolate(&sizes, &values).value, 3.0, max_relative = 1e-14);
    }
}
