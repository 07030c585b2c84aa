//! Recoil permeability: what it does to a magnet's moment and to a damper.

use super::{Obtained, Source};

/// Where the first-order change of the moment comes from.
pub const MOMENT: Source = Source {
    short: "Nagaoka 1909",
    citation: "In first order of mu_rec - 1 the moment changes by -(mu_rec - 1)(1 - K): the mean flux density of a uniformly magnetised cylinder is K Br, \
               K the coefficient of H. Nagaoka, \"The inductance coefficients of solenoids\", Journal of the College of Science, Tokyo 27(6) (1909)",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "half of the tenth decimal",
    tolerance: "2e-6: what the second order leaves of mu_rec - 1 = 1e-4 and 2e-4 after extrapolation",
};

/// Where the ratios come from.
pub const DAMPER: Source = Source {
    short: "independent study",
    citation: "An independent study of one damper, its magnet meshed: copper tube 25/28 mm, magnet 22 x 12 mm. Leaving the recoil permeability out \
               gives a zero-speed damping coefficient 3.7 % (1.05) and 14.9 % (1.20) too high",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "half of the last digit: 0.05 %",
    tolerance: "0.0005, half of the last digit",
};

/// Bore and outer radius of the tube, m; 58 MS/m.
pub const TUBE_M: (f64, f64) = (12.5e-3, 14.0e-3);
/// Radius and length of the magnet, m.
pub const MAGNET_M: (f64, f64) = (11.0e-3, 12.0e-3);
/// Recoil permeability, and the damping coefficient without it over that with it.
pub const TOO_HIGH: [(f64, f64); 2] = [(1.05, 1.037), (1.20, 1.149)];
