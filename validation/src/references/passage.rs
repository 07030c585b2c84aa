//! A magnet carried through a copper tube of finite length at uniform speed.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Maxwell 1873, coupled rings",
    citation: "Coupled rings (J. C. Maxwell, A Treatise on Electricity and Magnetism, art. 701), cut ever finer and extrapolated in even \
               powers of their size",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "what the last extrapolation of the rings moved the figure by, about 2e-6 of it",
    tolerance: "5e-5, and the band; the rings are known to what the last extrapolation moved them by, 2e-6",
};

/// Radius and length of the magnet, m.
pub const MAGNET_M: (f64, f64) = (5e-3, 10e-3);
/// Remanence, T; recoil permeability 1.
pub const REMANENCE_T: f64 = 1.2;
/// Inner and outer radius of the wall, m.
pub const WALL_M: (f64, f64) = (7.5e-3, 9.5e-3);
/// Length of the wall, m.
pub const WALL_LENGTH_M: f64 = 60e-3;
/// Conductivity of the wall, S/m.
pub const CONDUCTIVITY_S_PER_M: f64 = 58e6;
/// Speed, m/s.
pub const SPEED_M_PER_S: f64 = 8.0;
/// Reference point at the start and the end, m: 100 mm clear of the wall.
pub const TRAVEL_M: (f64, f64) = (-100e-3, 160e-3);
