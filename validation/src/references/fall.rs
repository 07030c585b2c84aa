//! A magnet that falls through a copper tube of finite length.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Maxwell 1873, coupled rings",
    citation: "Coupled rings: each ring of the wall a circuit with its resistance, self and mutual inductances (J. C. Maxwell, A Treatise on \
               Electricity and Magnetism, art. 701), and the equation of motion",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "2e-4 s and 1e-4 m/s, the spread of two independent methods; refined by rings to 2e-7 s and 1.5e-7 m/s",
    tolerance: "2e-4 s and 1e-4 m/s: the spread of two independent methods, rings and a prototype of a field solution",
};

/// Diameter of the magnet, m.
pub const MAGNET_DIAMETER_M: f64 = 18e-3;
/// Length of the magnet, m.
pub const MAGNET_LENGTH_M: f64 = 12e-3;
/// Remanence, T; recoil permeability 1.
pub const REMANENCE_T: f64 = 1.25;
/// Mass, kg.
pub const MASS_KG: f64 = 60e-3;
/// Inner and outer radius of the wall, m.
pub const WALL_M: (f64, f64) = (11e-3, 13e-3);
/// Length of the wall, m.
pub const WALL_LENGTH_M: f64 = 300e-3;
/// Conductivity of the wall, S/m.
pub const CONDUCTIVITY_S_PER_M: f64 = 58e6;
/// Height of the centre over the upper end at release, m; released at rest.
pub const RELEASE_ABOVE_M: f64 = 30e-3;
/// From the upper to the lower end, s: as first found.
pub const TRANSIT_S: f64 = 2.1288;
/// Tolerance of it, s.
pub const TRANSIT_TOLERANCE_S: f64 = 2e-4;
/// Speed at the lower end, m/s: as first found.
pub const EXIT_SPEED_M_PER_S: f64 = 0.2288;
/// Tolerance of it, m/s.
pub const EXIT_SPEED_TOLERANCE_M_PER_S: f64 = 1e-4;

/// The same by this crate's own rings at steps of 0.25 mm: five cuttings of 200 to 1800 rings extrapolated in even powers of their
/// size (leaving out the coarsest moves it by 7e-8; steps of 0.5 mm give 2.128_820_29), s.
pub const REFINED_TRANSIT_S: f64 = 2.128_820_35;
/// How well that is known, s.
pub const REFINED_TRANSIT_WITHIN_S: f64 = 2e-7;
/// Likewise the speed at the lower end (0.228_765_89; steps of 0.5 mm give 0.228_766_02), m/s.
pub const REFINED_EXIT_SPEED_M_PER_S: f64 = 0.228_765_9;
/// How well that is known, m/s.
pub const REFINED_EXIT_SPEED_WITHIN_M_PER_S: f64 = 1.5e-7;
