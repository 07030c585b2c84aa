//! Axial force between two equal coaxial cylinder magnets.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Maxwell 1873",
    citation: "Two current sheets, by the mutual inductance of coaxial loops (J. C. Maxwell, A Treatise on Electricity and Magnetism, art. 701) \
               integrated over both lengths",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "half of the ninth decimal",
    tolerance: "the last of nine printed decimals",
};

/// Gap between the near faces, in radii.
pub const GAPS: [f64; 6] = [0.05, 0.1, 0.2, 0.5, 1.0, 2.0];
/// Length in radii, and attraction over mu0 M^2 R^2 at those gaps, magnetised alike.
pub const TABLE: [(f64, [f64; 6]); 2] = [
    (1.0, [0.816799841, 0.712225375, 0.565085798, 0.320282937, 0.146379021, 0.041122657]),
    (0.5, [0.471352356, 0.396343045, 0.299396979, 0.156262720, 0.066115326, 0.016684564]),
];
