//! The mover's flux slope d psi/dz along the wall, by axial wavenumber.
//!
//! f(z) = d psi/dz at radius r is smooth there (the nearest current is a running gap away) and falls with the fourth power of the
//! distance, so the trapezoidal rule over a long stretch gives its Fourier transform, and sums over wavenumbers of that stretch are
//! integrals. Range: radii beyond or within all of the mover's currents. Accuracy: 1e-5 of the integral over wavenumbers of |f|^2.

use std::f64::consts::PI;

use num_complex::Complex64;

use crate::placement::Placement;
use crate::problem::Mover;

/// Stretch on each side of the mover, in outer radii of the wall.
const REACH: f64 = 24.0;
/// Highest wavenumber times the running gap: |f|^2 falls as exp(-2 k gap).
const HIGHEST: f64 = 6.0;
/// Samples a running gap: what is folded back from beyond pi/step is below exp(-2 (2 pi FINENESS - HIGHEST)).
const FINENESS: f64 = 2.5;
/// Thinnest gap that is resolved, in outer radii of the wall: a thinner one is felt only close to the wall's face.
const THINNEST: f64 = 0.02;

/// Amplitudes at evenly spaced wavenumbers from one step up.
#[derive(Debug, Clone)]
pub(super) struct Spectrum {
    /// Step of the wavenumbers, 1/m.
    step: f64,
    /// Amplitudes at each radius, [radius][wavenumber], Wb.
    pub(super) amplitudes: Vec<Vec<Complex64>>,
}

impl Spectrum {
    /// The spectrum of `mover` at `radii` (m), sampled over `reach` times the usual stretch; `outermost` is the largest radius of wall
    /// and mover, m.
    pub(super) fn new(mover: &Mover, placement: &Placement, outermost: f64, radii: &[f64], reach: f64) -> Self {
        let margin = reach * REACH * outermost;
        let (low, length) = (placement.lowest_m - margin, placement.highest_m - placement.lowest_m + 2.0 * margin);
        let gap = placement.gap_m.max(THINNEST * outermost);
        let samples = whole(length * FINENESS / gap);
        let wavenumbers = whole(HIGHEST / gap * length / (2.0 * PI));
        let dz = length / as_float(samples);
        let at_radius = |&r: &f64| {
            let values: Vec<f64> =
                (0..samples).map(|j| dz * mover.jet(r, low + (as_float(j) + 0.5) * dz).slope).collect();
            (1..=wavenumbers).map(|m| transform(&values, as_float(m) / as_float(samples))).collect()
        };
        Self { step: 2.0 * PI / length, amplitudes: radii.iter().map(at_radius).collect() }
    }

    /// Wavenumbers with their indices, 1/m.
    pub(super) fn wavenumbers(&self) -> impl Iterator<Item = (usize, f64)> {
        let count = self.amplitudes.first().map_or(0, Vec::len);
        let step = self.step;
        (0..count).map(move |j| (j, step * as_float(j + 1)))
    }
}

/// Sum of values times exp(-2 pi i j `turns`): the phase turned on from sample to sample.
fn transform(values: &[f64], turns: f64) -> Complex64 {
    let turn = Complex64::cis(-2.0 * PI * turns);
    let (mut phase, mut sum) = (Complex64::new(1.0, 0.0), Complex64::default());
    for value in values {
        sum += phase * value;
        phase *= turn;
    }
    sum
}

#[expect(clippy::cast_precision_loss, reason = "far below 2^52")]
fn as_float(count: usize) -> f64 {
    count as f64
}

#[expect(
    clippy::cast_possible_truncation,
    clippy::cast_sign_loss,
    reason = "positive, and bounded by the thinnest gap"
)]
fn whole(count: f64) -> usize {
    count.ceil().clamp(16.0, 1.0e6) as usize
}
