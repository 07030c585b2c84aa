//! Drag of a cylinder magnet in a tube of linear permeability.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Partovi, Morris 2006",
    citation: "M. H. Partovi, E. J. Morris, Canadian Journal of Physics 84, 253-271 (2006), DOI 10.1139/P06-065, with the permeability of the \
               wall in the interface conditions; cross-checked by an independent one-dimensional finite-element solution in r",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "one unit of the seventh figure",
    tolerance: "one unit of the last of seven figures: some are cut, not rounded",
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
pub const CONDUCTIVITY_S_PER_M: f64 = 5e6;
/// Relative permeabilities of the columns.
pub const PERMEABILITIES: [f64; 3] = [1.0, 50.0, 200.0];
/// Significant figures of the drag.
pub const FIGURES: i32 = 7;

/// Speed, m/s, and drag, N, for each permeability. The last entry was computed again in 30-digit arithmetic (1.337472540): a first
/// value, 1.33743725, had lost its last digits in the quadrature.
pub const DRAG: [(f64, [f64; 3]); 5] = [
    (0.01, [0.0006514252, 0.0006750803, 0.0006664068]),
    (0.1, [0.006514252, 0.006750751, 0.00666341]),
    (1.0, [0.06514138, 0.06745566, 0.06599391]),
    (10.0, [0.65028024, 0.63035849, 0.43966278]),
    (100.0, [5.5538679, 2.43830197, 1.33747254]),
];
