//! A point dipole in an endless copper wall, at four speeds.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Partovi, Morris 2006",
    citation: "M. H. Partovi, E. J. Morris, \"Electrodynamics of a magnet moving through a conducting pipe\", Canadian Journal of Physics 84, \
               253-271 (2006), DOI 10.1139/P06-065: integral over the axial wavenumber",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "half of the ninth decimal, N",
    tolerance: "1e-9 N: the values are printed to nine decimals",
};

/// Moment, A m2.
pub const MOMENT_A_M2: f64 = 1.0;
/// Inner and outer radius of the wall, m.
pub const WALL_M: (f64, f64) = (10.5e-3, 12.5e-3);
/// Conductivity of the wall, S/m.
pub const CONDUCTIVITY_S_PER_M: f64 = 58e6;
/// Speed, m/s, and drag, N.
pub const DRAG: [(f64, f64); 4] =
    [(0.1, 0.047_203_004), (5.0, 2.212_929_281), (20.0, 4.728_058_310), (100.0, 2.574_114_186)];
