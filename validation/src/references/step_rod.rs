//! A uniform axial field switched on around a long solid rod.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Carslaw, Jaeger 1959",
    citation: "H. S. Carslaw, J. C. Jaeger, Conduction of Heat in Solids, 2nd ed. (1959), section 7.6 (sections from memory): series of J0 over \
               the zeros of J0, read for the axial field of a non-magnetic rod",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "half of the ninth decimal",
    tolerance: "series: the last printed decimal; solver: 5e-7 of the applied field, at four grid levels, step and cell refined alongside",
};

/// Radius, m.
pub const RADIUS_M: f64 = 10e-3;
/// Conductivity, S/m.
pub const CONDUCTIVITY_S_PER_M: f64 = 58e6;
/// Decimals of the values.
pub const DECIMALS: i32 = 9;
/// t / (mu0 sigma a^2); then B_z over the applied one on the axis, at half the radius, and its mean over the section.
pub const FIELD: [(f64, [f64; 3]); 8] = [
    (0.02, [0.000_007_315, 0.017_720_795, 0.298_563_909]),
    (0.05, [0.012_900_780, 0.164_457_625, 0.452_120_998]),
    (0.1, [0.151_644_887, 0.389_753_213, 0.605_824_194]),
    (0.2, [0.498_513_139, 0.662_025_665, 0.782_147_553]),
    (0.3, [0.717_512_931, 0.810_657_873, 0.877_971_530]),
    (0.5, [0.911_110_284, 0.940_449_920, 0.961_621_295]),
    (0.8, [0.984_319_098, 0.989_494_897, 0.993_229_695]),
    (1.0, [0.995_067_695, 0.996_695_702, 0.997_870_454]),
];
