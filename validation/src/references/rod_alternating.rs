//! A rod in a uniform alternating axial field: the field on its axis, and how deep its current reaches.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Kelvin functions",
    citation: "H(r) = H_a J0(k r) / J0(k a), J_phi ~ J1(k r), k = (1 - i) / delta: the long rod in a uniform axial field with exp(+i omega t) \
               (common practice; for instance W. R. Smythe, Static and Dynamic Electricity, from memory)",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "half of the last digit",
    tolerance: "2e-5: the field of a coil 200 times as long as wide stands for a uniform one, which leaves the square of the ratio",
};

/// Radius of the rod, m (any: the values depend on a/delta alone).
pub const RADIUS_M: f64 = 10e-3;
/// Its conductivity, S/m.
pub const CONDUCTIVITY_S_PER_M: f64 = 58e6;

/// a/delta, |H(0)/H_a| and its phase, degrees.
pub const AXIS: [(f64, f64, f64); 5] = [
    (0.5, 0.996_115_233_3, -7.149_593_5),
    (1.0, 0.942_536_103_9, -27.904_382),
    (2.0, 0.561_731_551_9, -89.109_909),
    (3.0, 0.252_183_339_1, -148.100_4),
    (5.0, 0.044_362_726_6, 96.817_782),
];

/// Skin depths of the trade, and what a rod of 50 mm radius makes of them.
pub const DEPTH_SOURCE: Source = Source {
    short: "skin depth tables",
    citation: "delta = sqrt(2 / (omega mu0 sigma)), tabulated in handbooks for copper of 58.0 MS/m (IEC 60028:1925) and other metals (common \
               practice); the depth of 1/e in a rod from |J1(k (a - d)) / J1(k a)| = 1/e, k = (1 - i) / delta",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "half of the last digit",
    tolerance: "5e-6 of the handbook figure (its last digit); 1e-4 of the depth at which the current of the rod has fallen to 1/e: it is \
                read off extrapolated samples, and its band must hold it",
};

/// Radius of the thick rod, m.
pub const THICK_RADIUS_M: f64 = 50e-3;
/// Conductivity, S/m; frequency, Hz; handbook skin depth, m; depth of 1/e in the thick rod, m.
pub const DEPTHS: [(f64, f64, f64, f64); 6] = [
    (58.0e6, 1e3, 2.089_81e-3, 2.134_668_066e-3),
    (58.0e6, 1e4, 0.660_85e-3, 0.665_258_754_2e-3),
    (24.94e6, 1e3, 3.186_93e-3, 3.292_803_241e-3),
    (35.38e6, 1e4, 0.846_14e-3, 0.853_374_481_2e-3),
    (16.24e6, 1e4, 1.248_90e-3, 1.264_745_294e-3),
    (1.389e6, 1e4, 4.270_40e-3, 4.463_398_073e-3),
];
/// What the last digit of a handbook figure leaves open, m.
pub const HANDBOOK_WITHIN_M: f64 = 0.51e-8;
