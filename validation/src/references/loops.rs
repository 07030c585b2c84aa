//! Mutual inductance of two coaxial loops, and its gradient.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Maxwell 1873",
    citation: "J. C. Maxwell, A Treatise on Electricity and Magnetism, art. 701; NIST Digital Library of Mathematical Functions, section 19.34. \
               First line: worked example of E. B. Rosa, F. W. Grover, Bulletin of the Bureau of Standards 8, 1-237 (1912), from memory",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "half of the eighth decimal of M in nH, of the ninth figure of dM/dh",
    tolerance: "the last printed figure: the closed form is exact",
};

/// Two loops of one turn.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LoopPair {
    /// Radius of the first, m.
    pub a_m: f64,
    /// Radius of the second, m.
    pub b_m: f64,
    /// Distance of their planes, m.
    pub height_m: f64,
    /// Mutual inductance, nH, to eight decimals.
    pub mutual_nh: f64,
    /// dM/dh, H/m, to nine figures.
    pub gradient_h_per_m: f64,
}

/// The table.
pub const TABLE: [LoopPair; 8] = [
    LoopPair { a_m: 0.25, b_m: 0.25, height_m: 0.01, mutual_nh: 1036.66484928, gradient_h_per_m: -3.13317825e-05 },
    LoopPair { a_m: 0.25, b_m: 0.25, height_m: 0.1, mutual_nh: 337.68471849, gradient_h_per_m: -2.74179666e-06 },
    LoopPair { a_m: 0.25, b_m: 0.25, height_m: 0.25, mutual_nh: 123.51961577, gradient_h_per_m: -7.18365673e-07 },
    LoopPair { a_m: 0.25, b_m: 0.25, height_m: 0.5, mutual_nh: 35.46498155, gradient_h_per_m: -1.52738446e-07 },
    LoopPair { a_m: 0.25, b_m: 0.2, height_m: 0.1, mutual_nh: 248.78735904, gradient_h_per_m: -1.85090472e-06 },
    LoopPair { a_m: 0.2, b_m: 0.25, height_m: 0.2, mutual_nh: 123.9574272, gradient_h_per_m: -8.04826668e-07 },
    LoopPair { a_m: 0.1, b_m: 0.1, height_m: 0.02, mutual_nh: 215.38560079, gradient_h_per_m: -6.01546143e-06 },
    LoopPair { a_m: 0.05, b_m: 0.03, height_m: 0.02, mutual_nh: 28.93301736, gradient_h_per_m: -8.57314662e-07 },
];
