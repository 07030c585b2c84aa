//! Where a quick model's drag stays inside 1, 2, 5 and 10 % of the field solution's, one sweep at a time.

use super::outcome::{Inside, Interval, Range, Swept};
use crate::interpolate::sampled;

/// The tolerances.
pub(super) const TOLERANCES: [f64; 4] = [0.01, 0.02, 0.05, 0.10];

/// Reads the intervals off the errors along a sweep; `errors` (value > 0, error) increasing.
pub(super) fn range(swept: Swept, here: f64, errors: Vec<(f64, f64)>) -> Range {
    let inside = TOLERANCES.map(|tolerance| Inside { tolerance, intervals: intervals(&errors, tolerance) });
    Range { swept, here, errors, inside: inside.to_vec() }
}

/// The first value at which the error rises through `level`.
pub(super) fn first_reaching(errors: &[(f64, f64)], level: f64) -> Option<f64> {
    let places: Vec<f64> = errors.iter().map(|e| e.0.ln()).collect();
    let values: Vec<f64> = errors.iter().map(|e| e.1).collect();
    let k = (1..values.len()).find(|&k| values[k - 1] < level && values[k] >= level)?;
    Some(crossing(&places, &values, k, level).exp())
}

/// Intervals with |error| <= tolerance; the error is interpolated over the logarithm of the swept value.
fn intervals(errors: &[(f64, f64)], tolerance: f64) -> Vec<Interval> {
    let places: Vec<f64> = errors.iter().map(|e| e.0.ln()).collect();
    let values: Vec<f64> = errors.iter().map(|e| e.1).collect();
    let mut found = Vec::new();
    // Where an open interval begins, with the sign of the error there; no sign where the sweep itself begins.
    let mut open: Option<(f64, Option<f64>)> = None;
    if let Some(&(value, error)) = errors.first()
        && error.abs() <= tolerance
    {
        open = Some((value, None));
    }
    for k in 1..errors.len() {
        for (place, edge, enters) in edges(&places, &values, k, tolerance) {
            match (enters, open.take()) {
                (true, None) => open = Some((place.exp(), Some(edge))),
                (false, Some((from, came))) => found.push(Interval {
                    from,
                    to: place.exp(),
                    open_below: came.is_none(),
                    open_above: false,
                    by_cancellation: came.is_some_and(|came| came * edge < 0.0),
                }),
                (_, kept) => open = kept,
            }
        }
    }
    if let (Some((from, came)), Some(last)) = (open, errors.last()) {
        let open_below = came.is_none();
        found.push(Interval { from, to: last.0, open_below, open_above: true, by_cancellation: false });
    }
    found
}

/// Where |error| passes the tolerance between the points `k - 1` and `k`: place, sign of the error, whether it comes inside.
fn edges(places: &[f64], values: &[f64], k: usize, tolerance: f64) -> Vec<(f64, f64, bool)> {
    let mut found = Vec::new();
    for edge in [-tolerance, tolerance] {
        let (before, after) = (values[k - 1] - edge, values[k] - edge);
        if before * after < 0.0 || (after.abs() <= 0.0 && before.abs() > 0.0) {
            // Inside lies above the lower edge and below the upper one.
            let enters = (after > before) == (edge < 0.0);
            found.push((crossing(places, values, k, edge), edge, enters));
        }
    }
    found.sort_by(|x, y| x.0.total_cmp(&y.0));
    found
}

/// Bisects the interpolated error for `level` between the points `k - 1` and `k`.
fn crossing(places: &[f64], values: &[f64], k: usize, level: f64) -> f64 {
    let (mut low, mut high) = (places[k - 1], places[k]);
    for _ in 0..50 {
        let middle = 0.5 * (low + high);
        if (sampled(places, values, middle) < level) == (values[k - 1] < level) {
            low = middle;
        } else {
            high = middle;
        }
    }
    0.5 * (low + high)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn sweep(error: impl Fn(f64) -> f64) -> Vec<(f64, f64)> {
        (0..200).map(|k| 1e-2 * 1e4_f64.powf(f64::from(k) / 199.0)).map(|v| (v, error(v))).collect()
    }

    #[test]
    fn a_growing_error_ends_the_range() {
        let found = intervals(&sweep(|v| 0.02 * v * v), 0.05);
        assert_eq!(found.len(), 1);
        assert!(found[0].open_below && !found[0].by_cancellation && !found[0].open_above);
        assert!((found[0].to - 2.5_f64.sqrt()).abs() < 1e-6, "{}", found[0].to);
    }

    #[test]
    fn a_passage_through_zero_is_a_cancellation() {
        let found = intervals(&sweep(|v| 0.3 * (v / 3.0).ln()), 0.05);
        assert_eq!(found.len(), 1);
        assert!(found[0].by_cancellation && !found[0].open_below && !found[0].open_above);
        assert!(found[0].from < 3.0 && found[0].to > 3.0);
        let none = intervals(&sweep(|_| 0.3), 0.05);
        assert!(none.is_empty());
        let all = intervals(&sweep(|_| -0.03), 0.05);
        assert!(all.len() == 1 && all[0].open_below && all[0].open_above);
    }

    #[test]
    fn a_steep_passage_within_one_pair_is_found() {
        let found = intervals(&[(1.0, -0.5), (2.0, 0.5)], 0.01);
        assert!(found.len() == 1 && found[0].by_cancellation, "{found:?}");
        assert!((found[0].from * found[0].to - 2.0).abs() < 1e-9);
    }
}
