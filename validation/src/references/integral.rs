//! This crate's own Fourier-Bessel path as the reference for cases without a table.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Partovi, Morris 2006",
    citation: "M. H. Partovi, E. J. Morris, Canadian Journal of Physics 84, 253-271 (2006), extended to any number of layers, movers and \
               permeabilities; itself held to six tables and to closed forms",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "1e-10 of the drag, the tolerance of its quadrature being 1e-11",
    tolerance: "bands: at least 95 % hold the truth, the median band at most 30 times the median error",
};
