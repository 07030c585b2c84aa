//! Fields without sources that the scheme must reproduce to round-off on any grid.

use lenzbore_mesh::Refinement;

use super::chamber::{Chamber, EMPTY, FACES, Filling, at_nodes, at_unknowns};
use crate::operators::Operators;

/// Largest |K psi| relative to the terms summed, over unknowns whose neighbours are unknowns or lie on the axis (psi
/// = 0).
fn rest(operators: &Operators, psi: impl Fn(f64, f64) -> f64) -> f64 {
    let grid = &operators.grid;
    let values = at_unknowns(grid, psi);
    let (columns, rows) = (grid.nr() - 2, grid.nz() - 2);
    let mut worst = 0.0_f64;
    for u in 0..operators.unknowns() {
        let (i, j) = (u % columns, u / columns);
        if i + 1 == columns || j == 0 || j + 1 == rows {
            continue;
        }
        let (sum, size) = product(&operators.stiffness, u, &values);
        worst = worst.max(sum.abs() / size);
    }
    worst
}

/// psi = B0 r^2/2 (uniform axial field) and psi = r^2 z (B_z = 2 z, B_r = -r) make no current: exact identities of
/// the flux-exact scheme, so only round-off may be left.
#[test]
fn a_uniform_field_and_a_linear_one_leave_round_off() {
    let chamber = Chamber::new();
    for refinement in Refinement::first(5) {
        let operators = chamber.operators(refinement, |_| EMPTY);
        for left in [rest(&operators, |r, _| 0.35 * r * r), rest(&operators, |r, z| r * r * z)] {
            assert!(left < 8.0 * f64::EPSILON, "{left:.1e}");
        }
    }
}

/// H_z uniform through a shell of permeability 100: psi = integral of mu H r dr is exact too, because the scheme
/// keeps H_z = (1/mu)(1/r) dpsi/dr as one flux across the faces.
#[test]
fn a_uniform_field_strength_passes_a_permeable_shell() {
    let [inner, outer] = FACES;
    let shell = |r: f64| if r > inner && r < outer { Filling { sigma: 0.0, mu_r: 100.0 } } else { EMPTY };
    let psi = |r: f64, _: f64| {
        let through = r.clamp(inner, outer);
        0.5 * (r * r + 99.0 * (through * through - inner * inner))
    };
    for refinement in Refinement::first(5) {
        let left = rest(&Chamber::new().operators(refinement, shell), psi);
        assert!(left < 8.0 * f64::EPSILON, "{left:.1e}");
    }
}

/// The excess (K - K0), which reads psi at all nodes, is what K and K0 differ by where all neighbours are unknowns.
#[test]
fn the_excess_is_the_difference_of_the_two_stiffnesses() {
    let [inner, outer] = FACES;
    let shell = |r: f64| if r > inner && r < outer { Filling { sigma: 0.0, mu_r: 50.0 } } else { EMPTY };
    let operators = Chamber::new().operators(Refinement::COARSEST, shell);
    let grid = &operators.grid;
    let psi = |r: f64, z: f64| (90.0 * r).sin() * (150.0 * z).sin();
    let (unknowns, nodes) = (at_unknowns(grid, psi), at_nodes(grid, psi));
    let columns = grid.nr() - 2;
    let (first, last) = (columns, operators.unknowns() - columns);
    for u in (first..last).filter(|u| u % columns + 1 < columns) {
        let (whole, size) = product(&operators.stiffness, u, &unknowns);
        let (free, size_free) = product(operators.stiffness_free(), u, &unknowns);
        let (excess, _) = product(operators.excess.as_ref().unwrap(), u, &nodes);
        assert!((excess - (whole - free)).abs() < 8.0 * f64::EPSILON * (size + size_free));
    }
}

/// A row's product with `x`, and the sum of its terms' magnitudes.
fn product(matrix: &sprs::CsMat<f64>, row: usize, x: &[f64]) -> (f64, f64) {
    let entries = matrix.outer_view(row).unwrap();
    let terms = entries.iter().map(|(c, v)| v * x[c]);
    terms.fold((0.0, 0.0), |(sum, size), t| (sum + t, size + t.abs()))
}
