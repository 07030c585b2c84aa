//! A hollow sphere in a uniform alternating field: the field in its cavity and its loss.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "after Emson 1988",
    citation: "Problem after C. R. I. Emson, \"Results for a hollow sphere in uniform field (benchmark problem 6)\", COMPEL 7(1-2), 89-101 (1988), \
               citation and sizes from memory; its printed results were not at hand. Exact: A_phi = sin(theta) (C r in the cavity, P i1(q r) + Q \
               k1(q r) in the shell, q^2 = i omega mu0 sigma, B0 r/2 + E/r^2 outside), A and dA/dr continuous",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "half of the last digit",
    tolerance: "0.1 % of the applied field in the cavity and 2 % of the loss: the wall's layers have straight sides, so the sphere is a stack of 64 \
                stepped rings whose rims differ from it by up to half a step",
};

/// Inner and outer radius of the shell, m.
pub const SHELL_M: (f64, f64) = (50e-3, 55e-3);

/// Conductivity, S/m; frequency, Hz; field in the cavity over the applied one, real and imaginary; loss at 1 T zero to peak, W.
pub const TABLE: [(f64, f64, (f64, f64), f64); 2] = [
    (5e8, 50.0, (-0.034_918_175_9, -0.041_499_116_5), 10_061.50),
    (5.8e7, 50.0, (0.176_007_16, -0.427_978_64), 49_451.55),
];
