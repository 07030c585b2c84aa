//! A uniform axial field switched on around a long tube: the field in its bore.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Carslaw, Jaeger 1959",
    citation: "Series of Bessel functions after H. S. Carslaw, J. C. Jaeger, Conduction of Heat in Solids, 2nd ed. (1959), section 7 (from \
               memory), with the condition dH/dr = mu0 sigma (a/2) dH/dt at the bore, derived for this table",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "half of the eighth decimal; 1e-5 at 50 us, where fourteen terms were summed; time constants to seven figures",
    tolerance: "series: the last printed figure; solver: 5e-7 of the applied field, at four grid levels, step and cell refined alongside",
};

/// Inner and outer radius, m.
pub const WALL_M: (f64, f64) = (7.5e-3, 9.5e-3);
/// Conductivity, S/m.
pub const CONDUCTIVITY_S_PER_M: f64 = 58e6;
/// Time constants of the four slowest modes, us, and the significant figures of each.
pub const TIME_CONSTANTS_US: [(f64, i32); 4] = [(573.9657, 7), (26.75779, 7), (7.194_276, 7), (3.243_807, 7)];
/// Time, s, the field in the bore over the applied one, and how well it is known.
pub const BORE: [(f64, f64, f64); 6] = [
    (50e-6, 0.022_595_59, 1e-5),
    (100e-6, 0.091_868_35, 5e-9),
    (200e-6, 0.235_040_54, 5e-9),
    (500e-6, 0.546_397_59, 5e-9),
    (1e-3, 0.810_177_60, 5e-9),
    (2e-3, 0.966_757_65, 5e-9),
];
