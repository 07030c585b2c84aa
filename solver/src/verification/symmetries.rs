//! Symmetries and scalings that hold exactly for the equation, hence for every grid that follows them.

use super::cases::{answer, coil, endless, figure, finite, layer, magnet, problem, steady, traverse, value};
use crate::problem::{Part, Problem, Travel};

/// Three magnets of different sizes and senses: no mirror image of itself.
fn lopsided() -> Vec<Part> {
    vec![magnet(0.0, 5.0, 6.0, 1.2, -8.0), magnet(0.0, 4.0, 5.0, -0.9, 0.0), magnet(2.0, 5.0, 4.0, 1.3, 7.0)]
}

fn base(velocity: f64) -> Problem {
    steady(endless(vec![layer(7.0, 8.5, 45.0, 1.0), layer(8.5, 10.0, 5.0, 20.0)]), lopsided(), velocity)
}

/// Relative difference of two drags.
fn apart(a: &Problem, b: &Problem, scale: f64) -> f64 {
    let (a, b) = (value(&answer(a), "drag"), value(&answer(b), "drag"));
    println!("drag {a} and {b} x {scale}");
    (b * scale / a - 1.0).abs()
}

/// The force is quadratic in the mover's field.
#[test]
fn drag_is_even_in_north_and_scales_as_remanence_squared() {
    let original = base(4.0);
    for factor in [-1.0, 1.7] {
        let mut other = original.clone();
        for part in &mut other.mover.parts {
            if let crate::sources::Source::Magnet { remanence_tesla, .. } = &mut part.source {
                *remanence_tesla *= factor;
            }
        }
        assert!(apart(&original, &other, 1.0 / (factor * factor)) < 1e-13);
    }
}

/// The force turns with the velocity: drag, positive against the motion, stays. The mover is no mirror image of
/// itself: in an endless wall the drag depends on the square of its field's axial spectrum alone, which has no sense.
#[test]
fn drag_is_odd_in_speed_even_for_a_lopsided_mover() {
    let (up, down) = (answer(&base(4.0)), answer(&base(-4.0)));
    for name in ["drag", "damping_coefficient", "dissipated_power"] {
        let (up, down) = (figure(&up, name), figure(&down, name));
        println!("{name}: {} +- {:.1e} and {} +- {:.1e}", up.value, up.band, down.value, down.band);
        assert!(up.value > 0.0);
        assert!((up.value - down.value).abs() <= up.band + down.band);
        assert!((up.value / down.value - 1.0).abs() < 1e-7);
    }
}

/// A mover that is its own mirror image: the grids are mirror images too, and little but round-off is left.
#[test]
fn drag_is_odd_in_speed_to_round_off_for_a_symmetric_mover() {
    let wall = || endless(vec![layer(7.0, 8.5, 45.0, 1.0)]);
    for part in [magnet(2.0, 5.0, 6.0, 1.2, 0.0), coil(3.0, 5.0, 8.0, 400.0)] {
        let there = steady(wall(), vec![part.clone()], 4.0);
        let back = steady(wall(), vec![part], -4.0);
        assert!(apart(&there, &back, 1.0) < 1e-12);
    }
}

/// Conductivity and velocity enter as their product alone.
#[test]
fn drag_depends_on_conductivity_times_speed() {
    let original = base(4.0);
    for factor in [0.37, 5.0] {
        let mut other = base(4.0 / factor);
        other.wall.layers.iter_mut().for_each(|l| l.conductivity_s_per_m *= factor);
        assert!(apart(&original, &other, 1.0) < 1e-12);
    }
}

/// All lengths times c at the same remanence, speed divided by c: the flux density stays, the force goes with the
/// area.
#[test]
fn drag_scales_with_the_area_of_similar_assemblies() {
    let (original, c) = (base(4.0), 2.5);
    let mut other = base(4.0 / c);
    for layer in &mut other.wall.layers {
        layer.inner_radius_m *= c;
        layer.outer_radius_m *= c;
    }
    for part in &mut other.mover.parts {
        part.centre_m *= c;
        if let crate::sources::Source::Magnet { inner_radius_m, outer_radius_m, length_m, .. } = &mut part.source {
            *inner_radius_m *= c;
            *outer_radius_m *= c;
            *length_m *= c;
        }
        part.outline = super::cases::part(part.source, 0.0).outline;
    }
    assert!(apart(&original, &other, 1.0 / (c * c)) < 1e-12);
}

/// Upward through the tube instead of downward: the mirror image, in every figure.
#[test]
fn a_traverse_reversed_is_its_mirror_image() {
    let length = 40.0;
    let run = |travel: Travel| {
        let wall = finite(length * 1e-3, vec![layer(8.0, 10.0, 58.0, 1.0)]);
        answer(&problem(wall, vec![magnet(0.0, 5.0, 6.0, 1.2, 0.0)], travel, 3))
    };
    let (down, up) = (run(traverse(3.0, length + 35.0, -20.0)), run(traverse(3.0, -35.0, length + 20.0)));
    for name in ["drag_peak", "impulse", "dissipated_energy", "current_density_peak"] {
        let (down, up) = (value(&down, name), value(&up, name));
        println!("{name}: {down} and {up}");
        assert!((up / down - 1.0).abs() < 1e-11, "{name}");
    }
    let (low, high) = (figure(&down, "drag_peak").location.unwrap(), figure(&up, "drag_peak").location.unwrap());
    assert!((low.z_m.unwrap() + high.z_m.unwrap() - length * 1e-3).abs() < 1e-6);
    for (z_down, z_up) in down.trace.position_m.iter().zip(&up.trace.position_m) {
        assert!((z_down + z_up - length * 1e-3).abs() < 1e-12);
    }
}
