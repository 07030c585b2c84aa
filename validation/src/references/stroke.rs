//! Damping coefficient of small strokes in an endless wall, by this crate's own Fourier-Bessel path.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Partovi, Morris 2006, at one frequency",
    citation: "M. H. Partovi, E. J. Morris, Canadian Journal of Physics 84, 253-271 (2006): their waves in the wall, driven at one frequency \
               instead of at wavenumber times speed (derived here); its limit of low frequency is the published damping coefficient",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "1e-10 of the damping coefficient, the tolerance of its quadrature being 1e-11",
    tolerance: "2e-5 of the force over the speed, |c + k / (i omega)|, of which c is the smaller part at high frequency: the bands are 4e-6 to 2e-5 \
                of it; the ends of a wall 27 bore radii long and the amplitude of 2 um add 1e-6",
};

/// Inner and outer radius, m.
pub const WALL_M: (f64, f64) = (11e-3, 13e-3);
/// Length of the wall, m; the stroke is about its middle.
pub const WALL_LENGTH_M: f64 = 0.3;
/// Conductivity, S/m.
pub const CONDUCTIVITY_S_PER_M: f64 = 58e6;
/// Radius and length of the magnet, m.
pub const MAGNET_M: (f64, f64) = (9e-3, 12e-3);
/// Its remanence, T.
pub const REMANENCE_T: f64 = 1.25;
/// Frequencies, Hz.
pub const FREQUENCIES_HZ: [f64; 5] = [5.0, 50.0, 300.0, 2e3, 2e4];
/// Frequency of the marched stroke, one of them, Hz.
pub const MARCHED_HZ: f64 = 300.0;
/// Its amplitude, m: the next power of it adds (X / 2 mm)^2 / 8, 1e-7.
pub const AMPLITUDE_M: f64 = 2e-6;
