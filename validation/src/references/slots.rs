//! A point dipole on the axis of an endless resistive tube with narrow full-length slots: what share of its drag is left.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "strip in space",
    citation: "the strip between two slots solved in space at low speed, without wavenumbers: div(sigma (E - grad Phi)) = 0, E = v x B of \
               a dipole, no current through its faces; finite volumes in r, phi and z on 1, 1.5 and 2 times as many cells, extrapolated \
               (NumPy, SciPy; the thin wall one cell across). The factor of each wavenumber is that of R. L. Russell and K. H. \
               Norsworthy, Proceedings of the IEE 105A, 163-175 (1958), title and number from memory",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "the change by the last term of the extrapolation, at most 4e-6",
    tolerance: "thin wall: 2e-5, four times what the stretch of the volumes cuts off; thick wall: the model band, which claims to hold the \
                truth, and 2e-5",
};

/// Number of slots, thickness over mean radius (0: thin), drag with slots / drag without.
pub const SHARES: [(u32, f64, f64); 10] = [
    (1, 0.0, 0.767602),
    (2, 0.0, 0.582626),
    (4, 0.0, 0.348019),
    (8, 0.0, 0.151498),
    (2, 0.2, 0.588665),
    (4, 0.2, 0.356288),
    (8, 0.2, 0.160127),
    (2, 0.5, 0.613237),
    (4, 0.5, 0.387043),
    (8, 0.5, 0.185578),
];

/// What the figures may be off by.
pub const KNOWN_WITHIN: f64 = 2e-5;
