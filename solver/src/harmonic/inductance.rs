//! Inductance of the coils without the wall, from the closed form of their field.
//!
//! L = (1 / I^2) sum over the coils of integral (2 pi psi J) dr dz over the section, psi that of all coils. Each section is cut into panels that shrink
//! towards its edges, where psi goes as rho^2 ln rho about a corner, with a Gauss-Legendre rule on each; the error is the difference to a lower order.

use std::f64::consts::PI;

use crate::outcome::Measured;
use crate::problem::Mover;
use crate::sources::gauss::rule;
use crate::sources::{AxialField, Source};

/// Points of the two rules along each side of a panel.
const ORDERS: (usize, usize) = (5, 7);
/// Share of the shorter side that the panel at an edge takes.
const EDGE_SHARE: f64 = 1.0 / 24.0;
/// Growth of panels away from an edge.
const GROWTH: f64 = 3.0;

/// Inductance of all coils of `mover` in series, each with turns = ampere-turns / `current`, H; relative error below 1e-8 and said as the band.
pub(super) fn inductance(mover: &Mover, current: f64) -> Measured {
    let [coarse, fine] = [ORDERS.0, ORDERS.1].map(|order| linkage(mover, order) / (current * current));
    Measured { value: fine, band: (fine - coarse).abs() }
}

/// Sum of ampere-turns times flux linked by a turn, J (twice the energy at one ampere).
fn linkage(mover: &Mover, order: usize) -> f64 {
    let mut sum = 0.0;
    for part in &mover.parts {
        let Source::Coil { inner_radius_m, outer_radius_m, length_m, ampere_turns } = part.source else { continue };
        let density = ampere_turns / (length_m * (outer_radius_m - inner_radius_m));
        let shorter = length_m.min(outer_radius_m - inner_radius_m);
        let across = panels(inner_radius_m, outer_radius_m, shorter);
        let low = part.centre_m - 0.5 * length_m;
        let along = panels(low, low + length_m, shorter);
        for pr in across.windows(2) {
            for pz in along.windows(2) {
                sum += density * panel(mover, (pr[0], pr[1]), (pz[0], pz[1]), order);
            }
        }
    }
    2.0 * PI * sum
}

/// Integral of psi over one panel.
fn panel(mover: &Mover, r: (f64, f64), z: (f64, f64), order: usize) -> f64 {
    let rule = rule(order);
    let (middle_z, half_z) = (0.5 * (z.0 + z.1), 0.5 * (z.1 - z.0));
    rule.integrate(0.5 * (r.0 + r.1), 0.5 * (r.1 - r.0), |r| rule.integrate(middle_z, half_z, |z| mover.psi(r, z)))
}

/// Edges of panels from `from` to `to`, growing from both ends.
fn panels(from: f64, to: f64, shorter: f64) -> Vec<f64> {
    let half = 0.5 * (to - from);
    let mut steps = vec![0.0];
    let mut step = EDGE_SHARE * shorter;
    let mut at = step;
    while at < 0.8 * half {
        steps.push(at);
        step *= GROWTH;
        at += step;
    }
    let upper = steps.iter().rev().map(|s| to - s);
    let middle = from + half;
    steps.iter().map(|s| from + s).chain([middle]).chain(upper).collect()
}

#[cfg(test)]
mod tests {
    #![allow(clippy::print_stdout, reason = "tests print what they measured")]
    use super::*;
    use crate::problem::{Outline, Part};

    fn coil(inner: f64, outer: f64, length: f64, turns: f64, centre_m: f64) -> Part {
        let outline = Outline { inner_radius_m: inner, outer_radius_m: outer, length_m: length };
        let source =
            Source::Coil { inner_radius_m: inner, outer_radius_m: outer, length_m: length, ampere_turns: turns };
        Part { name: "coil".to_owned(), centre_m, source, outline, coercivity_a_per_m: None }
    }

    fn of(parts: Vec<Part>) -> Measured {
        inductance(&Mover { parts, mass_kg: None, recoil: None }, 1.0)
    }

    /// Computed independently with SciPy: Maxwell's mutual inductance of two loops integrated over both sections (panels graded towards the
    /// logarithm, 32 points each; 20 points gave the same to 14 digits).
    #[test]
    fn a_probe_coil_against_loops_over_its_section() {
        let found = of(vec![coil(6e-3, 7e-3, 5e-3, 100.0, 0.0)]);
        println!("{found:?}");
        approx::assert_relative_eq!(found.value, 139.323_457_491_06e-6, max_relative = 1e-11);
        assert!(found.band < 1e-8 * found.value && (found.value - 139.323_457_491_06e-6).abs() < found.band + 1e-18);
    }

    /// A thin long winding is a current sheet: L = mu0 pi a^2 N^2 k / l, Nagaoka's k at 2a/l = 0.2 (H. Nagaoka, 1909; computed from the closed form).
    #[test]
    fn a_thin_winding_has_nagaokas_inductance() {
        let (a, l, t) = (0.01, 0.1, 1e-6);
        let found = of(vec![coil(a - 0.5 * t, a + 0.5 * t, l, 1.0, 0.0)]);
        let sheet = crate::constants::MU0 * PI * a * a * 0.920_092_670_8 / l;
        println!("{found:?} {sheet}");
        // The winding's thickness takes off about mu0 (2 pi a) t / 3 / l of it: 7e-5 of the ratio t / a.
        approx::assert_relative_eq!(found.value, sheet, max_relative = 1e-4);
    }

    #[test]
    fn halves_of_a_coil_in_series_are_the_coil_and_opposed_ones_are_less() {
        let whole = of(vec![coil(6e-3, 8e-3, 6e-3, 100.0, 0.0)]);
        let halves =
            |sign: f64| of(vec![coil(6e-3, 8e-3, 3e-3, 50.0, -1.5e-3), coil(6e-3, 8e-3, 3e-3, sign * 50.0, 1.5e-3)]);
        approx::assert_relative_eq!(halves(1.0).value, whole.value, max_relative = 1e-9);
        assert!(halves(-1.0).value < 0.4 * whole.value && halves(-1.0).value > 0.0);
    }
}
