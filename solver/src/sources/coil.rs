//! The direct-current coil of rectangular section with uniform current density.
//!
//! The coil is a nest of current sheets: field = int_{r1}^{r2} (mu0 N I/(2 b (r2 - r1))) sheet(a) da. As a function of a
//! the sheet's field is analytic but for a jump of a derivative at a = r and branch points at a = r +- i (|z| -+ b). The
//! integral is split at r and halved towards the branch points until each panel lies at least [`CLEARANCE`] half widths
//! from them; the Gauss-Legendre order then follows from that distance and gives 1e-15 a panel (see `gauss.rs`). A point
//! in an end's plane inside the section (branch point on the path, a logarithm) is closed in on by halving to rounding.
//!
//! Principle (sheets in closed form, radius by quadrature): M. W. Garrett, Calculation of fields, forces, and mutual
//! inductances of current systems by elliptic integrals, Journal of Applied Physics 34, 2567-2573 (1963); not read in full.

use super::AxialField;
use super::current_loop::Jet;
use super::gauss::{GaussRule, rule_for_distance};
use super::sheet::CylinderSheet;
use crate::constants::MU0;

/// Least distance of a panel's centre from a branch point, in half widths.
const CLEARANCE: f64 = 1.8;
/// Halvings after which a panel is too narrow to matter (its share is below 2^-48 of the whole, times a logarithm).
const DEEPEST: u32 = 48;

/// A coil of rectangular section, `turns x current` spread evenly over it.
///
/// Accuracy about 1e-13 relative, inside the winding and at its edges too (B_z: relative to |B| near its change of sign).
/// Cost 10 to 100 sheets, most near an edge.
///
/// ```
/// use lenzbore_solver::sources::{AxialField, Coil};
/// use lenzbore_solver::constants::MU0;
/// // On the axis at the middle: B = (mu0 N I/(2 (r2 - r1))) ln((r2 + sqrt(r2^2 + b^2))/(r1 + sqrt(r1^2 + b^2))).
/// let coil = Coil { inner_radius_m: 0.01, outer_radius_m: 0.02, half_length_m: 0.015, ampere_turns: 500.0 };
/// let whole = |a: f64| a + a.hypot(0.015);
/// let exact = MU0 * 500.0 / (2.0 * 0.01) * (whole(0.02) / whole(0.01)).ln();
/// assert!((coil.flux_density_z(0.0, 0.0) / exact - 1.0).abs() < 1e-13);
/// ```
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Coil {
    /// Inner radius, m, >= 0.
    pub inner_radius_m: f64,
    /// Outer radius, m, > inner.
    pub outer_radius_m: f64,
    /// Half of the length, m, > 0.
    pub half_length_m: f64,
    /// Turns times current, A, positive for a moment along +z.
    pub ampere_turns: f64,
}

/// A stretch of radius.
#[derive(Clone, Copy)]
struct Panel {
    centre: f64,
    half: f64,
}

impl Panel {
    fn between(from: f64, to: f64) -> Self {
        Self { centre: 0.5 * (from + to), half: 0.5 * (to - from) }
    }

    fn halves(self) -> [Self; 2] {
        let half = 0.5 * self.half;
        [Self { centre: self.centre - half, half }, Self { centre: self.centre + half, half }]
    }
}

impl Coil {
    /// mu0 times the current density, T/m.
    fn tesla_per_metre(&self) -> f64 {
        MU0 * self.ampere_turns / (2.0 * self.half_length_m * (self.outer_radius_m - self.inner_radius_m))
    }

    fn sheet(&self, radius_m: f64) -> CylinderSheet {
        CylinderSheet { radius_m, half_length_m: self.half_length_m, tesla: 1.0 }
    }

    /// Adds up `visit(sheet, weight)` over the winding for a field point (r, z).
    fn over_radius(&self, r: f64, z: f64, visit: &mut impl FnMut(&CylinderSheet, f64)) {
        let height = (z.abs() - self.half_length_m).abs();
        let (inner, outer) = (self.inner_radius_m, self.outer_radius_m);
        if inner < r && r < outer {
            self.panel(Panel::between(inner, r), (r, height), 0, visit);
            self.panel(Panel::between(r, outer), (r, height), 0, visit);
        } else {
            self.panel(Panel::between(inner, outer), (r, height), 0, visit);
        }
    }

    fn panel(&self, panel: Panel, branch: (f64, f64), depth: u32, visit: &mut impl FnMut(&CylinderSheet, f64)) {
        let distance = (panel.centre - branch.0).hypot(branch.1);
        if distance < CLEARANCE * panel.half && depth < DEEPEST {
            for half in panel.halves() {
                self.panel(half, branch, depth + 1, visit);
            }
        } else {
            self.apply(panel, rule_for_distance(distance / panel.half), visit);
        }
    }

    fn apply(&self, panel: Panel, rule: &GaussRule, visit: &mut impl FnMut(&CylinderSheet, f64)) {
        for &(x, w) in &rule.points {
            visit(&self.sheet(panel.centre + panel.half * x), w * panel.half);
        }
    }

    fn integral(&self, r: f64, z: f64, field: impl Fn(&CylinderSheet) -> f64) -> f64 {
        let mut sum = 0.0;
        self.over_radius(r, z, &mut |sheet, weight| sum += weight * field(sheet));
        self.tesla_per_metre() * sum
    }

    pub(crate) fn jet(&self, r: f64, z: f64) -> Jet {
        let mut sum = Jet::default();
        self.over_radius(r, z, &mut |sheet, weight| sum = sum.plus(weight, sheet.jet(r, z)));
        Jet::default().plus(self.tesla_per_metre(), sum)
    }
}

impl AxialField for Coil {
    fn psi(&self, r: f64, z: f64) -> f64 {
        self.integral(r, z, |sheet| sheet.psi(r, z))
    }

    fn flux_density_r(&self, r: f64, z: f64) -> f64 {
        self.integral(r, z, |sheet| sheet.flux_density_r(r, z))
    }

    fn flux_density_z(&self, r: f64, z: f64) -> f64 {
        self.integral(r, z, |sheet| sheet.flux_density_z(r, z))
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::float_cmp, reason = "exact limits are compared exactly")]
    use super::*;
    use crate::sources::quadrature::coil_fields;
    use approx::assert_relative_eq;

    /// mu0 J = 1.
    fn coil(inner_radius_m: f64, outer_radius_m: f64, half_length_m: f64) -> Coil {
        let ampere_turns = 2.0 * half_length_m * (outer_radius_m - inner_radius_m) / MU0;
        Coil { inner_radius_m, outer_radius_m, half_length_m, ampere_turns }
    }

    fn check(section: (f64, f64, f64), r: f64, z: f64) {
        let [psi, br, bz] = coil_fields(section, r, z, 3e-11);
        let c = coil(section.0, section.1, section.2);
        let (e_psi, e_br) = (c.psi(r, z) / (r * r * psi) - 1.0, c.flux_density_r(r, z) - r * br);
        let e_bz = (c.flux_density_z(r, z) - bz) / bz.hypot(r * br);
        let e_br = if z.abs() > 0.0 { e_br / (r * br) } else { e_br };
        let worst = e_psi.abs().max(e_br.abs()).max(e_bz.abs());
        // The use needs 1e-9; the largest difference met is 2e-12, where the references end.
        assert!(worst < 1e-11, "section {section:?} r {r} z {z}: {worst:.1e}");
    }

    #[test]
    fn around_and_in_the_winding_against_quadrature() {
        for r in [1e-9, 0.5, 0.79, 0.9, 1.15, 1.25, 200.0] {
            for z in [1e-4, 0.4, 0.61, 2.0, 200.0] {
                check((0.8, 1.2, 0.6), r, z);
            }
        }
    }

    #[test]
    fn at_edges_faces_and_end_planes_against_quadrature() {
        for (r, z) in
            [(1.0, 0.6), (1.2, 0.3), (0.8, 0.599_99), (1.200_1, 0.6), (1.2, 0.600_01), (0.3, 0.6), (1.0, 0.6 - 1e-7)]
        {
            check((0.8, 1.2, 0.6), r, z);
        }
    }

    #[test]
    fn a_solid_winding_down_to_the_axis() {
        for (r, z) in [(1e-9, 0.2), (1e-3, 0.5), (0.4, 0.1), (1.1, 0.55)] {
            check((0.0, 1.0, 0.5), r, z);
        }
        assert_eq!((coil(0.0, 1.0, 0.5).psi(0.0, 0.2), coil(0.0, 1.0, 0.5).flux_density_r(0.0, 0.2)), (0.0, 0.0));
    }

    #[test]
    fn a_thin_winding_is_a_sheet() {
        let c = coil(1.0 - 5e-6, 1.0 + 5e-6, 0.7);
        let sheet = CylinderSheet { radius_m: 1.0, half_length_m: 0.7, tesla: 1e-5 };
        for (r, z) in [(0.3, 0.2), (1.4, 0.7), (0.9, 1.0)] {
            assert_relative_eq!(c.psi(r, z), sheet.psi(r, z), max_relative = 1e-9);
            assert_relative_eq!(c.flux_density_r(r, z), sheet.flux_density_r(r, z), max_relative = 1e-9);
            assert_relative_eq!(c.flux_density_z(r, z), sheet.flux_density_z(r, z), max_relative = 1e-9);
        }
    }

    #[test]
    fn current_follows_from_the_circulation() {
        // dB_r/dz - dB_z/dr = mu0 J_phi: 1 in the winding, 0 outside.
        let c = coil(0.8, 1.2, 0.6);
        let h = 2e-3;
        let derivative = |f: &dyn Fn(f64) -> f64| (8.0 * (f(h) - f(-h)) - (f(2.0 * h) - f(-2.0 * h))) / (12.0 * h);
        for (r, z, current) in [(1.0, 0.2, 1.0), (0.9, -0.5, 1.0), (0.7, 0.1, 0.0), (1.3, 0.3, 0.0), (1.0, 0.7, 0.0)] {
            let curl = derivative(&|d| c.flux_density_r(r, z + d)) - derivative(&|d| c.flux_density_z(r + d, z));
            assert_relative_eq!(curl, current, epsilon = 1e-6);
        }
    }

    #[test]
    fn jet_repeats_the_fields() {
        let c = coil(0.8, 1.2, 0.6);
        for (r, z) in [(0.3, 0.2), (1.0, 0.3), (1.3, 0.6), (0.5, -9.0), (3.0, 0.1)] {
            let jet = c.jet(r, z);
            assert_relative_eq!(jet.psi, c.psi(r, z), max_relative = 1e-13);
            assert_relative_eq!(jet.slope, -r * c.flux_density_r(r, z), max_relative = 1e-13);
            let h = 1e-3;
            let slope = |dz: f64| c.jet(r, z + dz).slope;
            let richardson = (8.0 * (slope(h) - slope(-h)) - (slope(2.0 * h) - slope(-2.0 * h))) / (12.0 * h);
            assert_relative_eq!(jet.curvature, richardson, epsilon = 1e-8 * jet.curvature.abs().max(jet.psi.abs()));
        }
    }

    #[test]
    fn on_the_corner_and_in_the_end_plane_finite() {
        let c = coil(0.8, 1.2, 0.6);
        for (r, z) in [(0.8, 0.6), (1.2, -0.6), (1.0, 0.6)] {
            assert!(
                c.psi(r, z).is_finite() && c.flux_density_r(r, z).is_finite() && c.flux_density_z(r, z).is_finite()
            );
        }
    }
}
