//! Self-inductance of a coil of rectangular section in free space.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Dodd, Deeds 1968",
    citation: "C. V. Dodd, W. E. Deeds, \"Analytical solutions to eddy-current probe-coil problems\", Journal of Applied Physics 39, 2829-2838 \
               (1968): integral over the axial wavenumber for the coil in air (equation from memory)",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "1e-7 uH: the integral to k = 4e5/m, its tail by the asymptotic form, agrees with that to 3e5/m to 1e-10",
    tolerance: "1e-8 of the value: what the quadratures over the section leave",
};

/// Inner and outer radius of the coil, m.
pub const RADII_M: (f64, f64) = (6e-3, 7e-3);
/// Its length, m.
pub const LENGTH_M: f64 = 5e-3;
/// Its turns.
pub const TURNS: f64 = 100.0;
/// Self-inductance, uH. Computed again for this check: a first value, 139.3233586, had cut the tail of the integral off.
pub const INDUCTANCE_UH: f64 = 139.323_457_5;
