#![allow(
    clippy::unwrap_used,
    clippy::expect_used,
    clippy::float_cmp,
    clippy::panic,
    reason = "tests may stop at the first fault"
)]

use std::f64::consts::PI;

use super::*;
use crate::problem::{Outline, Part};
use crate::sources::Source;
use crate::verification::cases;

/// A dipole in a tube of mean radius 12 mm.
fn tube(thickness_mm: f64) -> Problem {
    let layer = cases::layer(12.0 - 0.5 * thickness_mm, 12.0 + 0.5 * thickness_mm, 58.0, 1.0);
    let source = Source::Dipole { moment_a_m2: 1.0 };
    let outline = Outline { inner_radius_m: 0.0, outer_radius_m: 0.0, length_m: 0.0 };
    let dipole = Part { name: "dipole".to_owned(), centre_m: 0.0, source, outline, coercivity_a_per_m: None };
    cases::problem(cases::endless(vec![layer]), vec![dipole], Travel::Steady { velocity_m_per_s: 1.0 }, 3)
}

/// The share of a dipole in a thin tube is the mean of 1 - tanh(x)/x with the weight x^4 K1(x)^2, here by the midpoint rule.
fn dipole_share(slots: f64) -> f64 {
    let (mut part, mut whole) = (0.0, 0.0);
    for j in 0..40_000 {
        let ka = (f64::from(j) + 0.5) * 1e-3;
        let weight = ka.powi(4) * puruspe::Kn(1, ka).powi(2);
        part += weight * thin_strip_share(ka * PI / slots);
        whole += weight;
    }
    part / whole
}

#[test]
fn thin_tube_keeps_the_mean_over_wavenumbers() {
    for slots in [1, 2, 4, 12] {
        let share = slot_shares(&tube(1e-3), slots, &[0.0])[0];
        let exact = dipole_share(f64::from(u32::try_from(slots).unwrap()));
        assert!((share.value - exact).abs() < 2e-5 * exact.max(0.01), "{slots}: {share:?} {exact}");
        assert!(share.band < 1e-4 * exact.max(0.01), "{slots}: {share:?}");
    }
}

#[test]
fn one_slot_does_not_remove_the_drag_and_many_do() {
    let problem = tube(1.5);
    let at = |n| slot_shares(&problem, n, &[0.0])[0];
    assert!(at(1).value > 0.7, "{:?}", at(1));
    let shares: Vec<f64> = [1, 2, 4, 8, 16].map(|n| at(n).value).into();
    assert!(shares.windows(2).all(|w| w[1] < w[0]), "{shares:?}");
    assert!(shares[4] < 0.1);
}

/// The band holds both bounds: neither shells by themselves nor radial short circuits lie outside.
#[test]
fn thick_walls_have_wider_bands() {
    let bands: Vec<f64> = [0.5, 2.0, 8.0].map(|w| slot_shares(&tube(w), 6, &[0.0])[0].band).into();
    assert!(bands.windows(2).all(|w| w[1] > w[0]), "{bands:?}");
}

/// Induction weakens an unbroken wall's drag more than a slotted one's: the share rises with speed.
#[test]
fn share_rises_with_speed() {
    let shares = slot_shares(&tube(1.5), 4, &[0.0, 1.0, 10.0, 100.0]);
    assert!(shares.windows(2).all(|w| w[1].value > w[0].value), "{shares:?}");
    assert!(shares.windows(2).all(|w| w[1].band >= w[0].band), "{shares:?}");
}
