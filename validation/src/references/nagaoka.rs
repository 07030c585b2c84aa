//! Nagaoka's coefficient: self-inductance of a solenoid over that of an endless one, L = K mu0 pi a^2 N^2 / l.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Nagaoka 1909",
    citation: "H. Nagaoka, \"The inductance coefficients of solenoids\", Journal of the College of Science, Tokyo 27(6) (1909); E. B. Rosa, \
               F. W. Grover, Bulletin of the Bureau of Standards 8 (1912), table 20. Printed values at 0.5, 1, 2, 5, 10 agree, from memory",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "half of the tenth decimal",
    tolerance: "1e-7: sections of two small thicknesses stand in for the sheet",
};

/// Diameter over length, and K.
pub const TABLE: [(f64, f64); 24] = [
    (0.01, 0.995768368),
    (0.05, 0.9790917433),
    (0.1, 0.9588071242),
    (0.2, 0.9200926708),
    (0.3, 0.8838029087),
    (0.4, 0.8498534349),
    (0.5, 0.8181357519),
    (0.6, 0.7885246322),
    (0.7, 0.7608852065),
    (0.8, 0.7350790635),
    (0.9, 0.71096903),
    (1.0, 0.6884226073),
    (1.2, 0.647526503),
    (1.5, 0.5950458847),
    (2.0, 0.5255100243),
    (2.5, 0.4718647794),
    (3.0, 0.429198617),
    (4.0, 0.3654318974),
    (5.0, 0.3198254678),
    (6.0, 0.2854100927),
    (8.0, 0.2365824358),
    (10.0, 0.2033235175),
    (20.0, 0.1236148097),
    (50.0, 0.0610976062),
];
