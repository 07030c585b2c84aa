//! The share of the drag that slots leave, over all wavenumbers.
//!
//! At low speed: sum over k of the slotted powers by the sum of the unbroken ones. With induction each wavenumber sees a thin wall
//! of sheet conductance s and radius a whose mean azimuthal current is the slotted share p(k) of an unbroken one's, and whose reaction
//! weakens what drives it: power ~ p / |1 + i mu0 s v k a I1(ka) K1(ka) p|^2.

use crate::constants::MU0;
use crate::outcome::SlotShare;
use crate::placement::Placement;
use crate::problem::Problem;

use super::spectrum::Spectrum;
use super::strip::{Power, Shell, power, shells};

/// Share of the change by induction that counts as band.
const DOUBT_OF_INDUCTION: f64 = 0.5;

/// Powers of a slotted wall by wavenumber.
#[derive(Debug)]
pub(super) struct SlottedWall {
    full: Vec<(f64, Power)>,
    /// The same from half the stretch of samples.
    half: Vec<(f64, Power)>,
    /// Sheet conductance, S, and its mean radius, m.
    sheet: (f64, f64),
}

impl SlottedWall {
    pub(super) fn new(problem: &Problem, slots: usize) -> Self {
        let layers = problem.wall.layers.iter().filter(|l| l.conductivity_s_per_m > 0.0);
        let all: Vec<Shell> =
            layers.flat_map(|l| shells(l.inner_radius_m, l.outer_radius_m, l.conductivity_s_per_m)).collect();
        let conductance: f64 = all.iter().map(|s| s.conductance).sum();
        let moment: f64 = all.iter().map(|s| s.conductance * s.radius).sum();
        let sheet = (conductance, moment / conductance.max(f64::MIN_POSITIVE));
        #[expect(clippy::cast_precision_loss, reason = "a number of slots is small")]
        let slots = slots as f64;
        Self { full: powers(problem, &all, slots, 1.0), half: powers(problem, &all, slots, 0.5), sheet }
    }

    /// The share at `speed`, m/s.
    pub(super) fn share(&self, speed: f64) -> SlotShare {
        let at_rest = self.between(&self.full, 0.0);
        let moving = if speed > 0.0 { self.between(&self.full, speed) } else { at_rest };
        let cut = self.between(&self.half, speed);
        let induction = DOUBT_OF_INDUCTION * (moving.value - at_rest.value).abs();
        SlotShare { value: moving.value, band: moving.band + induction + (moving.value - cut.value).abs() }
    }

    /// Middle and half distance of the two bounds.
    fn between(&self, powers: &[(f64, Power)], speed: f64) -> SlotShare {
        let (mut unbroken, mut least, mut most) = (0.0, 0.0, 0.0);
        for &(k, power) in powers {
            let induced = MU0 * self.sheet.0 * speed * k * self.sheet.1 * bessel_product(k * self.sheet.1);
            let weakened = |p: f64| {
                let share = p / power.unbroken.max(f64::MIN_POSITIVE);
                p / (1.0 + (induced * share).powi(2))
            };
            unbroken += weakened(power.unbroken);
            least += weakened(power.least);
            most += weakened(power.most);
        }
        if unbroken <= 0.0 {
            return SlotShare { value: 1.0, band: 0.0 };
        }
        SlotShare { value: 0.5 * (least + most) / unbroken, band: 0.5 * (most - least).abs() / unbroken }
    }
}

fn powers(problem: &Problem, all: &[Shell], slots: f64, reach: f64) -> Vec<(f64, Power)> {
    let radii: Vec<f64> = all.iter().map(|s| s.radius).collect();
    let placement = Placement::new(problem);
    let outermost = problem.wall.outer_radius_m().max(placement.mover_outer_m);
    let spectrum = Spectrum::new(&problem.mover, &placement, outermost, &radii, reach);
    let at = |(j, k): (usize, f64)| (k, power(all, k, slots, |i| spectrum.amplitudes[i][j]));
    spectrum.wavenumbers().map(at).collect()
}

/// I1(x) K1(x), x > 0; beyond 40 by its expansion for large arguments (NIST Digital Library of Mathematical Functions 10.40.6).
fn bessel_product(x: f64) -> f64 {
    if x > 40.0 {
        let square = x * x;
        return 0.5 / x * (1.0 - (3.0 / 8.0 + 45.0 / 128.0 / square) / square);
    }
    puruspe::In(1, x) * puruspe::Kn(1, x)
}
