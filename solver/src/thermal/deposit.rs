//! The heat of an event brought onto the thermal grid, quarter cell by quarter cell, by the share of it that each node's volume overlaps:
//! not a joule is lost.

use super::operator::HeatOperator;
use crate::march::HeatLeft;

/// Heat at the unknowns of `operator`, J.
pub(crate) fn deposit(left: &HeatLeft, operator: &HeatOperator) -> Vec<f64> {
    let grid = &operator.space.grid;
    let mut heat = vec![0.0; operator.len()];
    left.quarters(|quarter| {
        let (across, along) = (shares(grid.r.nodes(), quarter.r), shares(grid.z.nodes(), quarter.z));
        for &(j, along) in &along {
            for &(i, across) in &across {
                if let Some(u) = operator.unknown[grid.node(i, j)] {
                    heat[u] += quarter.heat * across * along;
                }
            }
        }
    });
    heat
}

/// Shares of the interval that fall to nodes, each of which has the line half way to its neighbours; they sum to 1.
fn shares(nodes: &[f64], (from, to): (f64, f64)) -> Vec<(usize, f64)> {
    let bound = |n: usize| 0.5 * (nodes[n] + nodes[n + 1]);
    let last = nodes.len() - 1;
    let first = nodes.partition_point(|&x| x <= from).saturating_sub(1).min(last);
    let mut found = Vec::with_capacity(2);
    for n in first..=last {
        let low = if n == 0 { f64::NEG_INFINITY } else { bound(n - 1) };
        let high = if n == last { f64::INFINITY } else { bound(n) };
        let overlap = to.min(high) - from.max(low);
        if overlap > 0.0 {
            found.push((n, overlap / (to - from)));
        }
        if high >= to {
            break;
        }
    }
    found
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn shares_sum_to_one_and_fall_where_they_overlap() {
        let nodes = [0.0, 1.0, 2.0, 4.0];
        assert_eq!(shares(&nodes, (0.0, 0.5)), [(0, 1.0)]);
        assert_eq!(shares(&nodes, (1.25, 1.75)), [(1, 0.5), (2, 0.5)]);
        assert_eq!(shares(&nodes, (1.5, 3.5)), [(2, 0.75), (3, 0.25)]);
        for interval in [(-1e-13, 0.3), (0.4, 3.9), (3.2, 4.0 + 1e-13)] {
            let sum: f64 = shares(&nodes, interval).iter().map(|s| s.1).sum();
            assert!((sum - 1.0).abs() < 1e-12, "{sum}");
        }
    }
}
