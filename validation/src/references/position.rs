//! Zero-speed damping coefficient of a dipole at places in a wall with ends, and of a magnet far from them.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Saslow 1992, with ends",
    citation: "W. M. Saslow, Maxwell's theory of eddy currents in thin conducting sheets, American Journal of Physics 60, 693-711 (1992): the \
               currents of a slow dipole in a tube, J = sigma v B_r; here their heat over v^2 summed over a wall of finite thickness and length, \
               c = 2 pi sigma integral of r B_r^2 over r and z, B_r = 3 mu0 m r z / (4 pi (r^2 + z^2)^(5/2)) (citation from memory, formula derived \
               here)",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "1e-10 N s/m: 20-point Gauss rules on 24 and on 48 panels agree to 1e-15",
    tolerance: "1e-4 of the value, the target of the bands: far from the wall the grid's few cells across the dipole's steep field leave 3e-5",
};

/// Moment of the dipole, A m2.
pub const MOMENT_A_M2: f64 = 1.0;
/// Inner and outer radius of the wall, m.
pub const WALL_M: (f64, f64) = (10.5e-3, 12.5e-3);
/// Length of the wall, m.
pub const LENGTH_M: f64 = 60e-3;
/// Conductivity, S/m.
pub const CONDUCTIVITY_S_PER_M: f64 = 58e6;
/// Position of the dipole above the wall's lower end, m, and damping coefficient, N s/m.
pub const DAMPING: [(f64, f64); 7] = [
    (-0.02, 0.0036651278),
    (-0.01, 0.0554671073),
    (-0.004, 0.1962266434),
    (0.0, 0.2360168942),
    (0.006, 0.3287636548),
    (0.012, 0.4399759173),
    (0.03, 0.4712771035),
];
/// Length of the wall in which the cylinder magnet of the speed table is as if it were endless, m: 20 bore radii each way, beyond
/// which the field leaves (1/20)^7 of the heat.
pub const LONG_M: f64 = 0.3;
