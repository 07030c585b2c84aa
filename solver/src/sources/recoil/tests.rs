#![allow(
    clippy::unwrap_used,
    clippy::print_stdout,
    reason = "tests may stop at the first fault and print what they measured"
)]

use super::*;
use crate::problem::Outline;
use crate::sources::Source;
use approx::assert_relative_eq;

fn part(centre_m: f64, (inner, outer, length_m): (f64, f64, f64), remanence_tesla: f64) -> Part {
    let source = Source::Magnet { inner_radius_m: inner, outer_radius_m: outer, length_m, remanence_tesla };
    let outline = Outline { inner_radius_m: inner, outer_radius_m: outer, length_m };
    Part { name: "M".into(), centre_m, source, outline, coercivity_a_per_m: None }
}

fn recoil(parts: &[Part], mu: f64, fineness: Fineness) -> Recoil {
    Recoil::new(parts, &vec![mu; parts.len()], 5e-4, fineness).unwrap()
}

/// Largest change of psi, B_r and B_z at `points` against the largest |B| (psi: |psi|) of the whole mover there.
fn apart(parts: &[Part], a: &Recoil, b: &dyn AxialField, points: &[(f64, f64)]) -> f64 {
    let free = Parts(parts);
    let mut worst = 0.0_f64;
    for &(r, z) in points {
        let size = free.flux_density_r(r, z).hypot(free.flux_density_z(r, z));
        let br = a.flux_density_r(r, z) - b.flux_density_r(r, z);
        let bz = a.flux_density_z(r, z) - b.flux_density_z(r, z);
        worst = worst.max(br.hypot(bz) / size);
        let whole = (-40..40).map(|k| free.psi(r, 1e-3 * f64::from(k)).abs()).fold(0.0, f64::max);
        worst = worst.max((a.psi(r, z) - b.psi(r, z)).abs() / whole);
    }
    worst
}

fn around(radius: f64) -> Vec<(f64, f64)> {
    (-30..=30).map(|k| (radius, 7e-4 * f64::from(k))).collect()
}

fn movers() -> Vec<(&'static str, Vec<Part>)> {
    let disc = (0.0, 11e-3, 12e-3);
    let ring = (3e-3, 11e-3, 10e-3);
    vec![
        ("cylinder", vec![part(0.0, disc, 1.3)]),
        ("ring", vec![part(1e-3, ring, -1.2)]),
        ("opposed, touching", vec![part(-6e-3, disc, 1.3), part(6e-3, disc, -1.3)]),
        ("adhesive between", vec![part(-6e-3, disc, 1.3), part(6.05e-3, disc, -1.3)]),
        ("steps that touch", vec![part(-5e-3, ring, 1.3), part(3e-3, (0.0, 7e-3, 6e-3), 1.1)]),
    ]
}

/// Half the usual panels at the edges, with more nodes, move the field at the clearance by less than 1e-8 of it.
#[test]
fn refinement_moves_the_field_outside_by_less_than_1e_8() {
    for (name, parts) in movers() {
        for mu in [1.05, 8.0] {
            let usual = recoil(&parts, mu, Fineness::USUAL);
            let fine = recoil(&parts, mu, Fineness { nodes: 16, size: 0.5 });
            let off = [11.51e-3, 12.5e-3, 20e-3].map(|r| apart(&parts, &usual, &fine, &around(r)));
            println!("{name} {mu}: {} filaments, off {off:?}", usual.filaments().count());
            // 4e-9 and less are measured.
            assert!(off.iter().all(|o| *o < 1e-8), "{name} {mu}: {off:?}");
        }
    }
}

/// Filaments of every tier against the integral over the panels.
#[test]
fn filaments_stand_for_the_currents_from_their_clearance_on() {
    for (name, parts) in movers() {
        for mu in [1.05, 8.0] {
            let tiers = recoil(&parts, mu, Fineness::USUAL);
            let panels = Recoil::new(&parts, &vec![mu; parts.len()], 1e3, Fineness::USUAL).unwrap();
            let panels = Recoil {
                charged: panels.charged.into_iter().map(|c| Charged { tiers: Vec::new(), ..c }).collect(),
                ..panels
            };
            for r in [11.501e-3, 12.01e-3, 13.01e-3, 15.01e-3, 19.01e-3, 27.01e-3, 0.3] {
                let off = apart(&parts, &tiers, &panels, &around(r));
                // 9e-9 at the clearance from a ring of 8, less elsewhere.
                assert!(off < 1e-8, "{name} {mu} at {r}: {off:.1e}");
            }
        }
    }
}

/// (2a/l, K) of H. Nagaoka's table, as in `sheet.rs`.
const NAGAOKA: [(f64, f64); 4] =
    [(0.2, 0.920_092_670_8), (1.0, 0.688_422_607_3), (2.0, 0.525_510_024_3), (10.0, 0.203_323_517_5)];

/// In first order of mu - 1 the magnetisation changes by (mu - 1) H, H the field of the magnet of permeability 1, so the moment
/// changes by -(mu - 1)(1 - K): the mean of B over a uniformly magnetised cylinder is K Br, K Nagaoka's coefficient of the solenoid
/// (its flux linkage; H. Nagaoka, Journal of the College of Science, Tokyo 27(6) (1909), table as remembered). Two small mu - 1 are
/// extrapolated; tolerance: what the second order leaves of them.
#[test]
fn val_a_weak_recoil_changes_the_moment_by_the_demagnetising_factor() {
    for (diameter_over_length, coefficient) in NAGAOKA {
        let (a, l) = (10e-3, 20e-3 / diameter_over_length);
        let parts = [part(0.0, (0.0, a, l), 1.3)];
        let change = |step: f64| {
            let solved = Recoil::new(&parts, &[1.0 + step], 1e-3, Fineness::USUAL).unwrap();
            let moment: f64 =
                solved.filaments().map(|f| std::f64::consts::PI * f.radius_m.powi(2) * f.tesla_metre).sum();
            moment / (1.3 * std::f64::consts::PI * a * a * l * step)
        };
        let slope = 2.0 * change(1e-4) - change(2e-4);
        assert_relative_eq!(slope, coefficient - 1.0, max_relative = 1e-6);
    }
}

/// Both sides of every face: the tangential H and the normal B go through.
#[test]
fn tangential_h_is_continuous_across_the_faces() {
    let parts = [part(0.0, (3e-3, 11e-3, 10e-3), -1.2)];
    let mu = 3.0;
    let mover =
        Mover { parts: parts.to_vec(), mass_kg: None, recoil: Some(Arc::new(recoil(&parts, mu, Fineness::USUAL))) };
    // Values on the face from two points on one side.
    let limit = |f: &dyn Fn(f64) -> f64, sign: f64| 2.0 * f(sign * 1e-6) - f(sign * 2e-6);
    for (radius, inward) in [(11e-3, -1.0), (3e-3, 1.0)] {
        for z in [0.0, 2.5e-3, -4.5e-3] {
            let b = |d: f64| mover.flux_density_z(radius + d, z);
            let inside = (limit(&b, inward) + 1.2) / mu;
            assert_relative_eq!(inside, limit(&b, -inward), epsilon = 2e-6);
        }
    }
    for r in [3.2e-3, 7e-3, 10.8e-3] {
        let b = |d: f64| mover.flux_density_r(r, 5e-3 + d);
        assert_relative_eq!(limit(&b, -1.0) / mu, limit(&b, 1.0), epsilon = 2e-6);
        let b = |d: f64| mover.flux_density_z(r, 5e-3 + d);
        assert_relative_eq!(limit(&b, -1.0), limit(&b, 1.0), epsilon = 2e-6);
    }
}

#[test]
fn two_halves_that_touch_are_one_magnet_and_all_scales_alike() {
    let whole = [part(0.0, (0.0, 11e-3, 12e-3), 1.3)];
    let halves = [part(-3e-3, (0.0, 11e-3, 6e-3), 1.3), part(3e-3, (0.0, 11e-3, 6e-3), 1.3)];
    let rings = [part(0.0, (0.0, 6e-3, 12e-3), 1.3), part(0.0, (6e-3, 11e-3, 12e-3), 1.3)];
    let one = recoil(&whole, 1.2, Fineness::USUAL);
    for parts in [&halves, &rings] {
        let two = recoil(parts, 1.2, Fineness::USUAL);
        let off = apart(&whole, &one, &two, &around(12e-3));
        assert!(off < 1e-9, "{off:.1e}");
    }
    let large = [part(0.0, (0.0, 1.1, 1.2), -1.3)];
    let large = Recoil::new(&large, &[1.2], 0.05, Fineness::USUAL).unwrap();
    for (r, z) in [(12e-3, 1e-3), (15e-3, -9e-3), (0.0, 9e-3), (4e-3, 1e-3)] {
        assert_relative_eq!(large.flux_density_z(100.0 * r, 100.0 * z), -one.flux_density_z(r, z), max_relative = 1e-7);
    }
}

#[test]
fn jet_repeats_the_fields() {
    let parts = [part(0.0, (3e-3, 11e-3, 10e-3), -1.2)];
    let solved = recoil(&parts, 1.1, Fineness::USUAL);
    for (r, z) in [(12e-3, 1e-3), (11.2e-3, 5e-3), (20e-3, -30e-3), (1e-3, 0.0)] {
        let jet = solved.jet(r, z);
        assert_relative_eq!(jet.psi, solved.psi(r, z), max_relative = 1e-12);
        assert_relative_eq!(jet.slope, -r * solved.flux_density_r(r, z), max_relative = 1e-11, epsilon = 1e-16);
        let h = 1e-5;
        let slope = |dz: f64| solved.jet(r, z + dz).slope;
        let richardson = (8.0 * (slope(h) - slope(-h)) - (slope(2.0 * h) - slope(-2.0 * h))) / (12.0 * h);
        assert_relative_eq!(jet.curvature, richardson, max_relative = 1e-5);
    }
}

#[test]
fn permeabilities_out_of_range_or_missing_are_refused() {
    let mover = Mover { parts: vec![part(0.0, (0.0, 11e-3, 12e-3), 1.3)], mass_kg: None, recoil: None };
    assert!(mover.clone().with_recoil(&[0.9], 1e-3).is_err());
    assert!(mover.clone().with_recoil(&[1.05, 1.05], 1e-3).is_err());
    assert!(mover.clone().with_recoil(&[f64::NAN], 1e-3).is_err());
    assert!(mover.clone().with_recoil(&[1.05], f64::NAN).is_err());
    assert_eq!(mover.clone().with_recoil(&[1.0], 1e-3).unwrap(), mover);
    let mut changed = mover.with_recoil(&[1.05], 1e-3).unwrap();
    changed.parts[0].centre_m = 1e-3;
    assert!(!changed.recoil.as_ref().unwrap().belongs_to(&changed.parts));
    changed.renew_recoil().unwrap();
    assert!(changed.recoil.as_ref().unwrap().belongs_to(&changed.parts));
}
