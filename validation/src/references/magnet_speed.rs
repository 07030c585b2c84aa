//! Drag against speed of a cylinder magnet in a copper wall.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Partovi, Morris 2006",
    citation: "M. H. Partovi, E. J. Morris, Canadian Journal of Physics 84, 253-271 (2006), DOI 10.1139/P06-065: integral over the axial \
               wavenumber for a uniformly magnetised cylinder",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "half of the sixth decimal, N",
    tolerance: "the last of six printed decimals",
};

/// Remanence, T; recoil permeability 1.
pub const REMANENCE_T: f64 = 1.2;
/// Radius of the magnet, m.
pub const RADIUS_M: f64 = 5e-3;
/// Length of the magnet, m.
pub const LENGTH_M: f64 = 10e-3;
/// Inner and outer radius of the wall, m.
pub const WALL_M: (f64, f64) = (7.5e-3, 9.5e-3);
/// Conductivity of the wall, S/m.
pub const CONDUCTIVITY_S_PER_M: f64 = 58e6;
/// Damping coefficient at zero speed, N s/m, to seven decimals.
pub const DAMPING_COEFFICIENT: f64 = 0.755_653_3;
/// Decimals of the drag.
pub const DECIMALS: i32 = 6;

/// Speed, m/s, and drag, N.
pub const DRAG: [(f64, f64); 14] = [
    (0.01, 0.007557),
    (0.1, 0.075564),
    (0.5, 0.377603),
    (1.0, 0.753867),
    (2.0, 1.49713),
    (3.0, 2.219729),
    (5.0, 3.568232),
    (7.0, 4.745327),
    (10.0, 6.136737),
    (15.0, 7.516443),
    (20.0, 8.045793),
    (30.0, 7.913258),
    (50.0, 6.71432),
    (100.0, 4.906661),
];
