//! The universal curve: a point dipole on the axis of a wall so thin that it is a sheet.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Saslow 1992",
    citation: "W. M. Saslow, \"Maxwell's theory of eddy currents in thin conducting sheets, and applications to electromagnetic shielding \
               and MAGLEV\", American Journal of Physics 60, 693-711 (1992), title from memory; sheet condition with one loss parameter \
               V = mu0 sigma w v",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "half of the seventh figure",
    tolerance: "the last of seven printed figures",
};

/// V = mu0 sigma w v, and f = drag a^4 / (mu0 m^2); the greatest drag is the entry at 2.6932.
pub const CURVE: [(f64, f64); 14] = [
    (0.01, 0.0004394458),
    (0.1, 0.004387228),
    (0.3, 0.0129893),
    (1.0, 0.03776575),
    (2.0, 0.05389929),
    (2.6932, 0.05601025),
    (3.0, 0.05573163),
    (4.0, 0.05249322),
    (5.0, 0.04806772),
    (8.0, 0.03645081),
    (10.0, 0.03097244),
    (20.0, 0.01730816),
    (50.0, 0.007344778),
    (100.0, 0.003739583),
];

/// V and f of the greatest drag; V to four decimals.
pub const GREATEST: (f64, f64) = (2.6932, 0.05601025);

/// Significant figures of f.
pub const FIGURES: i32 = 7;

/// f / V as V goes to 0: 45/1024.
pub const SLOPE: f64 = 45.0 / 1024.0;
