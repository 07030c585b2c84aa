//! Long series thinned for a chart: whole rows stay, among them the highest and lowest of every stretch.

/// Rows kept of a series that is to have about `most`: first, last, and of every stretch the least and the greatest of `y`.
pub(super) fn rows(y: &[f64], most: usize) -> Vec<usize> {
    let count = y.len();
    if count <= most || most < 4 {
        return (0..count).collect();
    }
    let stretch = (2 * count).div_ceil(most).max(2);
    let mut kept = vec![0];
    for start in (0..count).step_by(stretch) {
        let inside = start..(start + stretch).min(count);
        let by_value = |a: &usize, b: &usize| y[*a].total_cmp(&y[*b]);
        kept.extend(inside.clone().min_by(by_value));
        kept.extend(inside.max_by(by_value));
    }
    kept.push(count - 1);
    kept.sort_unstable();
    kept.dedup();
    kept
}

/// About `most` rows evenly spread, first and last among them.
pub(super) fn evenly(count: usize, most: usize) -> Vec<usize> {
    if count <= most || most < 2 {
        return (0..count).collect();
    }
    let mut kept: Vec<usize> = (0..most).map(|k| k * (count - 1) / (most - 1)).collect();
    kept.dedup();
    kept
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn extremes_and_ends_stay() {
        let mut y: Vec<f64> = (0..10_000).map(f64::from).map(|x| (0.01 * x).sin()).collect();
        y[4321] = 7.0;
        y[8765] = -7.0;
        let kept = rows(&y, 500);
        assert!(kept.len() <= 520, "{}", kept.len());
        assert!([0, 4321, 8765, 9999].iter().all(|row| kept.contains(row)));
        assert_eq!(rows(&y, 20_000).len(), y.len());
    }

    #[test]
    fn even_rows_reach_both_ends() {
        assert_eq!(evenly(10, 4), [0, 3, 6, 9]);
        assert_eq!(evenly(3, 8), [0, 1, 2]);
    }
}
