//! A uniform field switched on around a hollow sphere: the field in its cavity.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "after Emson 1990",
    citation: "Problem after C. R. I. Emson, \"Summary of results for hollow conducting sphere in uniform transiently varying magnetic \
               field\", COMPEL 9(3), 191-203 (1990). Its sizes are from memory and its printed results were not at hand: the case is a \
               case of its own, solved exactly by two inversions of the Laplace transform that agree to eight digits",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "half of the sixth decimal",
    tolerance: "series: the last printed decimal; solver: the errors of a curved rim on a rectangular grid, 0.5 % of the applied field for \
                steps by cell centres and 0.2 % for shares of cells, at an eighth of the shell's thickness",
};

/// Inner and outer radius, m.
pub const SHELL_M: (f64, f64) = (50e-3, 55e-3);
/// Conductivity, S/m.
pub const CONDUCTIVITY_S_PER_M: f64 = 5e8;
/// Decimals of the values.
pub const DECIMALS: i32 = 6;
/// Time, s, and the field in the cavity over the applied one.
pub const CAVITY: [(f64, f64); 12] = [
    (2e-3, 0.005_642),
    (5e-3, 0.047_931),
    (10e-3, 0.132_573),
    (20e-3, 0.283_060),
    (30e-3, 0.407_493),
    (50e-3, 0.595_317),
    (80e-3, 0.771_574),
    (100e-3, 0.843_985),
    (150e-3, 0.939_852),
    (200e-3, 0.976_812),
    (300e-3, 0.996_554),
    (500e-3, 0.999_924),
];
