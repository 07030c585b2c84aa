//! A long tube in a uniform alternating axial field: the field in its bore.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Bessel functions",
    citation: "H = C J0(k r) + D Y0(k r), k^2 = -i omega mu0 sigma, H(b) = H_0, H'(a) = i omega mu0 sigma (a/2) H(a): the long tube in a uniform \
               axial field with exp(+i omega t), derived from the induction law of the bore (common practice)",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "half of the last digit",
    tolerance: "2e-5: the field of a coil 200 times as long as wide stands for a uniform one, which leaves the square of the ratio",
};

/// Inner and outer radius, m.
pub const TUBE_M: (f64, f64) = (7.5e-3, 9.5e-3);
/// Conductivity, S/m.
pub const CONDUCTIVITY_S_PER_M: f64 = 5.8e7;

/// Frequency, Hz; |H_bore/H_0| and its phase, degrees.
pub const BORE: [(f64, f64, f64); 8] = [
    (50.0, 0.984_090_837_9, -11.041_549),
    (100.0, 0.940_551_721, -21.470_928),
    (200.0, 0.810_544_843_8, -39.080_969),
    (500.0, 0.483_122_409_3, -69.176_728),
    (1000.0, 0.263_152_234_3, -90.810_909),
    (2000.0, 0.129_467_342_8, -114.210_97),
    (5000.0, 0.040_999_719_5, -160.475),
    (10000.0, 0.012_492_117_4, 146.431_75),
];
