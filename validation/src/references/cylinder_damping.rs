//! Damping coefficient at zero speed of cylinder magnets in copper walls, beside that of a dipole of the same moment.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Partovi, Morris 2006",
    citation: "Resistive limit of M. H. Partovi, E. J. Morris, Canadian Journal of Physics 84, 253-271 (2006); dipole and wall thickness: \
               G. Donoso, C. L. Ladera, P. Martin, \"Magnet fall inside a conductive pipe: motion and the role of the pipe wall thickness\", \
               European Journal of Physics 30, 855-869 (2009)",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "half of the sixth decimal, N s/m",
    tolerance: "the last of six printed decimals",
};

/// Remanence, T; recoil permeability 1.
pub const REMANENCE_T: f64 = 1.2;
/// Radius of the magnet, m.
pub const RADIUS_M: f64 = 5e-3;
/// Conductivity of the wall, S/m.
pub const CONDUCTIVITY_S_PER_M: f64 = 58e6;
/// Decimals of the coefficients.
pub const DECIMALS: i32 = 6;

/// One line of the table.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Cylinder {
    /// Length of the magnet, mm.
    pub length_mm: f64,
    /// Inner and outer radius of the wall, mm.
    pub wall_mm: (f64, f64),
    /// Damping coefficient, N s/m.
    pub damping: f64,
    /// Damping coefficient of a dipole of the same moment, N s/m: (15 mu0^2 m^2 sigma / 1024)(1/a^3 - 1/b^3).
    pub dipole: f64,
}

/// The table.
pub const TABLE: [Cylinder; 15] = [
    Cylinder { length_mm: 5.0, wall_mm: (5.5, 6.5), damping: 0.740511, dipole: 0.446994 },
    Cylinder { length_mm: 5.0, wall_mm: (6.0, 7.0), damping: 0.498451, dipole: 0.323413 },
    Cylinder { length_mm: 5.0, wall_mm: (7.5, 9.5), damping: 0.296973, dipole: 0.227162 },
    Cylinder { length_mm: 5.0, wall_mm: (10.0, 12.0), damping: 0.093041, dipole: 0.079486 },
    Cylinder { length_mm: 10.0, wall_mm: (5.5, 6.5), damping: 1.275595, dipole: 1.787974 },
    Cylinder { length_mm: 10.0, wall_mm: (6.0, 7.0), damping: 0.956005, dipole: 1.293652 },
    Cylinder { length_mm: 10.0, wall_mm: (7.5, 9.5), damping: 0.755653, dipole: 0.908647 },
    Cylinder { length_mm: 10.0, wall_mm: (10.0, 12.0), damping: 0.287553, dipole: 0.317943 },
    Cylinder { length_mm: 20.0, wall_mm: (5.5, 6.5), damping: 1.602305, dipole: 7.151898 },
    Cylinder { length_mm: 20.0, wall_mm: (6.0, 7.0), damping: 1.271588, dipole: 5.174607 },
    Cylinder { length_mm: 20.0, wall_mm: (7.5, 9.5), damping: 1.243784, dipole: 3.634587 },
    Cylinder { length_mm: 20.0, wall_mm: (10.0, 12.0), damping: 0.598778, dipole: 1.271772 },
    Cylinder { length_mm: 40.0, wall_mm: (5.5, 6.5), damping: 1.692383, dipole: 28.607592 },
    Cylinder { length_mm: 40.0, wall_mm: (7.5, 9.5), damping: 1.448999, dipole: 14.538349 },
    Cylinder { length_mm: 40.0, wall_mm: (10.0, 12.0), damping: 0.794289, dipole: 5.087087 },
];
