//! Worked examples of the grid convergence index.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Celik et al. 2008",
    citation: "I. B. Celik, U. Ghia, P. J. Roache, C. J. Freitas, H. Coleman, P. E. Raad, \"Procedure for estimation and reporting of \
               uncertainty due to discretization in CFD applications\", ASME Journal of Fluids Engineering 130, 078001 (2008), table 1. \
               The values of the first column were read in a course's program text, those of the others are from memory; what \
               follows from them reproduces when computed",
    obtained: Obtained::FromMemoryAndComputed,
    uncertainty: "half of the last printed figure",
    tolerance: "the last printed figure, and 1e-5 of the values computed again",
};

/// One column of the table.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Column {
    /// What it shows.
    pub name: &'static str,
    /// Values on the finest, middle and coarsest grid.
    pub values: [f64; 3],
    /// Ratios of the cell sizes middle/finest and coarsest/middle.
    pub ratios: [f64; 2],
    /// Observed order, extrapolated value, index: as printed.
    pub printed: [f64; 3],
    /// Half of the last figure of each.
    pub half_figure: [f64; 3],
    /// The same three computed again.
    pub computed: [f64; 3],
}

/// The columns.
pub const TABLE: [Column; 3] = [
    Column {
        name: "steady convergence",
        values: [6.063, 5.972, 5.863],
        ratios: [1.5, 4.0 / 3.0],
        printed: [1.53, 6.1685, 0.022],
        half_figure: [0.005, 5e-5, 5e-4],
        computed: [1.533_969, 6.168_496, 0.021_749_87],
    },
    Column {
        name: "order below 1",
        values: [10.788, 10.725, 10.605],
        ratios: [2.0, 2.143],
        printed: [0.75, 10.8801, 0.011],
        half_figure: [0.005, 5e-5, 5e-4],
        computed: [0.751_744, 10.880_129, 0.010_674_89],
    },
    Column {
        name: "oscillating convergence",
        values: [6.0042, 5.9624, 6.0909],
        ratios: [2.0, 2.143],
        printed: [1.51, 6.0269, 0.005],
        half_figure: [0.005, 5e-5, 5e-4],
        computed: [1.507_591, 6.026_876, 0.004_720_89],
    },
];
