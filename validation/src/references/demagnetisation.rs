//! The field against a magnet beside another in a conducting tube at uniform speed.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Partovi, Morris 2006",
    citation: "M. H. Partovi and E. J. Morris, Canadian Journal of Physics 84, 253-271 (2006): Fourier-Bessel integral for the settled field in \
               an endless layered wall, extended from the dipole to magnets as current sheets; mu0 H = B - Br within them",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "1e-8 of the field: the quadrature's own estimate",
    tolerance: "2e-4 of the greatest field: a local figure, read from the grid by cubics; the band must hold the integral",
};
