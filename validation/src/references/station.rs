//! What gauges read: search coils around a wall that hardly conducts, and gauges in and around a conducting one.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Faraday's law and Partovi, Morris 2006",
    citation: "Flux of a dipole through a disc, mu0 m a^2 / (2 (a^2 + z^2)^(3/2)), and its rate of change at uniform speed (W. R. Smythe, Static and \
               Dynamic Electricity, 3rd ed. 1968, chapter VII; from memory, derived here again); M. H. Partovi, E. J. Morris, Canadian Journal \
               of Physics 84, 253-271 (2006): potential in and around the wall as an integral over wavenumbers",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "closed form; 1e-9 of the greatest value on its line, the tolerance of the quadrature",
    tolerance: "6e-4 of the greatest reading, and the band at each instant: 2e-5 in and near the wall, 5e-4 a bore radius outside it, where cells grow with 0.4 of their distance from it (measured)",
};

/// Moment of the dipole, A m2.
pub const MOMENT_A_M2: f64 = 1.0;
/// Speed of the dipole, m/s.
pub const DIPOLE_SPEED_M_PER_S: f64 = 3.0;
/// Conductivity of the wall that is as good as none, S/m: its currents add 1e-7.
pub const NO_CONDUCTIVITY_S_PER_M: f64 = 1.0;
/// Turns and radius, m, of the search coil.
pub const COIL: (f64, f64) = (100.0, 14e-3);

/// Inner and outer radius of the wall, m.
pub const WALL_M: (f64, f64) = (11e-3, 13e-3);
/// Length of the wall, m.
pub const LENGTH_M: f64 = 0.3;
/// Conductivity of the wall, S/m.
pub const CONDUCTIVITY_S_PER_M: f64 = 58e6;
/// Radius and length of the magnet, m.
pub const MAGNET_M: (f64, f64) = (9e-3, 12e-3);
/// Its remanence, T.
pub const REMANENCE_T: f64 = 1.25;
/// Speeds of the magnet, m/s.
pub const SPEEDS_M_PER_S: [f64; 2] = [2.0, 20.0];
/// How far the mover may be from the gauge in the middle of the wall, m, where its ends add less than the tolerance.
pub const REACH_M: f64 = 0.045;
