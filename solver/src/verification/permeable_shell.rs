//! Order in space across jumps of the permeability, by the reaction potential as the solver uses it.
//!
//! In a field psi_s = r I1(k r) sin(k z) (no source inside the chamber) a shell of permeability mu_r from r = a to b
//! adds psi_r. In the bore, the shell and outside, A is a combination of I1(k r) and K1(k r); A and (1/mu)(dA/dr +
//! A/r) are continuous at the faces, psi_r is zero on the axis and at r = R. Four coefficients follow from a four by
//! four system (derived here). The pitfall that this guards against is a scheme which splits H_z into two terms and
//! loses the jump of one at the faces: it is right at mu_r = 1 only.

use std::f64::consts::PI;

use lenzbore_mesh::Refinement;

use super::bessel::{i, k};
use super::chamber::{Chamber, EMPTY, FACES, Filling, LENGTH, RADIUS, at_nodes, at_shared_nodes, at_unknowns, solve};
use super::order::{Wanted, assert_field_orders};
use crate::operators::add_product;

/// Exact total A / sin(k z) = bore I1; shell.0 I1 + shell.1 K1; I1 + outside (I1(kr) K1(kR) - K1(kr) I1(kR)).
struct Shell {
    wave: f64,
    bore: f64,
    shell: (f64, f64),
    outside: f64,
}

impl Shell {
    fn new(wave: f64, mu_r: f64) -> Self {
        let [a, b] = FACES.map(|r| wave * r);
        let edge = wave * RADIUS;
        let (i_edge, k_edge) = (i(1, edge), k(1, edge));
        // dA/dr + A/r of I1(kr) is k I0(kr), of K1(kr) is -k K0(kr).
        let out = (i(1, b) * k_edge - k(1, b) * i_edge, i(0, b) * k_edge + k(0, b) * i_edge);
        let rows = vec![
            vec![i(1, a), -i(1, a), -k(1, a), 0.0, 0.0],
            vec![i(0, a), -i(0, a) / mu_r, k(0, a) / mu_r, 0.0, 0.0],
            vec![0.0, i(1, b), k(1, b), -out.0, i(1, b)],
            vec![0.0, i(0, b) / mu_r, -k(0, b) / mu_r, -out.1, i(0, b)],
        ];
        let x = solve_dense(rows);
        Self { wave, bore: x[0], shell: (x[1], x[2]), outside: x[3] }
    }

    /// The shell's own psi.
    fn reaction(&self, r: f64, z: f64) -> f64 {
        let x = self.wave * r;
        let [a, b] = FACES;
        let radial = if r <= a {
            (self.bore - 1.0) * i(1, x)
        } else if r <= b {
            (self.shell.0 - 1.0) * i(1, x) + self.shell.1 * k(1, x)
        } else {
            let edge = self.wave * RADIUS;
            self.outside * (i(1, x) * k(1, edge) - k(1, x) * i(1, edge))
        };
        r * radial * (self.wave * z).sin()
    }
}

/// Gauss-Jordan elimination with row pivoting of a small augmented system.
fn solve_dense(mut rows: Vec<Vec<f64>>) -> Vec<f64> {
    let n = rows.len();
    for c in 0..n {
        let pivot = (c..n).max_by(|&p, &q| rows[p][c].abs().total_cmp(&rows[q][c].abs())).unwrap();
        rows.swap(c, pivot);
        let lead = rows[c].clone();
        for (r, row) in rows.iter_mut().enumerate() {
            let factor = if r == c { 0.0 } else { row[c] / lead[c] };
            row.iter_mut().zip(&lead).for_each(|(x, l)| *x -= factor * l);
        }
    }
    (0..n).map(|c| rows[c][n] / rows[c][c]).collect()
}

fn check(mu_r: f64, bounds: &[f64]) {
    let [inner, outer] = FACES;
    let filling = |r: f64| if r > inner && r < outer { Filling { sigma: 0.0, mu_r } } else { EMPTY };
    let exact = Shell::new(2.0 * PI / LENGTH, mu_r);
    let chamber = Chamber::new();
    let mut levels = Vec::new();
    let mut truth = Vec::new();
    for refinement in Refinement::first(5) {
        let operators = chamber.operators(refinement, filling);
        let grid = &operators.grid;
        let source = at_nodes(grid, |r, z| r * i(1, exact.wave * r) * (exact.wave * z).sin());
        let mut right = vec![0.0; operators.unknowns()];
        add_product(operators.excess.as_ref().unwrap(), &source, -1.0, &mut right);
        levels.push(at_shared_nodes(grid, refinement, &solve(&operators, &right)));
        truth = at_shared_nodes(grid, refinement, &at_unknowns(grid, |r, z| exact.reaction(r, z)));
    }
    assert_field_orders(&format!("shell of mu_r {mu_r}"), &levels, &truth, &Wanted::even(bounds));
}

#[test]
fn a_shell_of_permeability_2_converges_with_orders_2_4_6() {
    check(2.0, &[1.2e-3, 3.6e-6, 9.5e-8]);
}

#[test]
fn a_shell_of_permeability_50_converges_with_orders_2_4_6() {
    check(50.0, &[4.8e-3, 1.5e-5, 5.7e-7]);
}

#[test]
fn a_shell_of_permeability_200_converges_with_orders_2_4_6() {
    check(200.0, &[1.7e-2, 5.6e-5, 2.1e-6]);
}
