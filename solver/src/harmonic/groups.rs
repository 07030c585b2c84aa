//! Frequencies in groups, each served by one recurrence.

/// Widest ratio of the frequencies of a group: such a recurrence takes some 70 vectors, and another costs a factorisation and 30 at least.
const WIDEST: f64 = 100.0;

/// Angular frequencies that one recurrence serves, rad/s.
#[derive(Debug, Clone, PartialEq)]
pub(crate) struct Group {
    /// Lowest and highest.
    pub(crate) range: (f64, f64),
    /// Its shift: the geometric mean of both.
    pub(crate) shift: f64,
}

/// Groups of equal ratio that cover `omegas` (positive, in any order).
pub(crate) fn groups(omegas: &[f64]) -> Vec<Group> {
    let low = omegas.iter().copied().fold(f64::INFINITY, f64::min);
    let high = omegas.iter().copied().fold(0.0, f64::max);
    let ratio = high / low;
    let count = (ratio.ln() / WIDEST.ln()).ceil().max(1.0);
    let edge = |k: f64| low * ratio.powf(k / count);
    let mut groups = Vec::new();
    let mut k = 0.0;
    while k < count {
        let range = (edge(k), edge(k + 1.0));
        groups.push(Group { range, shift: (range.0 * range.1).sqrt() });
        k += 1.0;
    }
    groups
}

/// The group that `omega` falls into.
pub(crate) fn group_of(groups: &[Group], omega: f64) -> usize {
    groups.partition_point(|g| g.range.1 < omega).min(groups.len().saturating_sub(1))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn one_frequency_makes_one_group_and_a_wide_range_several() {
        let one = groups(&[300.0]);
        assert_eq!(one.len(), 1);
        approx::assert_relative_eq!(one[0].shift, 300.0, max_relative = 1e-14);
        let many = groups(&[1.0, 1e5, 30.0]);
        assert_eq!(many.len(), 3);
        assert!(many.iter().all(|g| g.range.1 / g.range.0 < WIDEST));
        for (omega, wanted) in [(0.9, 0), (1.0, 0), (40.0, 0), (100.0, 1), (1e5, 2), (1.1e5, 2)] {
            assert_eq!(group_of(&many, omega), wanted, "{omega}");
        }
    }
}
