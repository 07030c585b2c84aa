//! Field of an ideal solenoid, which is that of a uniformly magnetised cylinder outside it.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Derby, Olbert 2010",
    citation: "N. Derby, S. Olbert, \"Cylindrical magnets and ideal solenoids\", American Journal of Physics 78, 229 (2010), arXiv:0909.3880",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "half of the twelfth decimal",
    tolerance: "one unit of the last of twelve printed decimals: two of them are cut, not rounded (checked in 25-digit arithmetic)",
};

/// Half length b, r, z, B_r, B_z; lengths in radii, flux densities in units of mu0 times the current per length.
pub const FIELD: [(f64, f64, f64, f64, f64); 21] = [
    (1.0, 0.0, 0.0, 0.0, std::f64::consts::FRAC_1_SQRT_2),
    (1.0, 0.5, 0.0, 0.0, 0.739446877768),
    (1.0, 0.9, 0.0, 0.0, 0.803129103832),
    (1.0, 0.0, 1.0, 0.0, 0.4472135955),
    (1.0, 0.5, 1.0, 0.128394173322, 0.450434688974),
    (1.0, 1.2, 0.0, 0.0, -0.143297918091),
    (1.0, 1.2, 0.5, 0.09672978411, -0.144302418933),
    (1.0, 1.2, 1.0, 0.242068408839, -0.037377253437),
    (1.0, 1.5, 1.0, 0.116420410967, -0.031383665299),
    (1.0, 1.5, 2.0, 0.049109656978, 0.030058094976),
    (1.0, 2.0, 0.0, 0.0, -0.051852720002),
    (1.0, 2.0, 3.0, 0.015208147044, 0.011527672972),
    (0.5, 0.0, 0.0, 0.0, 0.4472135955),
    (0.5, 0.5, 0.0, 0.0, 0.50626618263),
    (0.5, 0.5, 0.5, 0.097977879233, 0.369723438884),
    (0.5, 1.2, 0.5, 0.198504670198, -0.071648959046),
    (0.5, 1.5, 1.0, 0.06587522981, 0.007247322072),
    (2.0, 0.5, 0.0, 0.0, 0.900869377948),
    (2.0, 0.5, 2.0, 0.137219072436, 0.485380842828),
    (2.0, 1.2, 2.0, 0.257922627821, -0.013274962179),
    (2.0, 1.5, 4.0, 0.019421336912, 0.025147263478),
];

/// Half length b, r, z and A_phi in units of mu0 times the current per length times the radius.
pub const POTENTIAL: [(f64, f64, f64, f64); 10] = [
    (1.0, 0.5, 0.0, 0.180855966408),
    (1.0, 1.2, 0.0, 0.290536393195),
    (1.0, 1.2, 1.0, 0.181645474162),
    (1.0, 1.5, 2.0, 0.049874123338),
    (1.0, 2.0, 0.0, 0.118961575804),
    (0.5, 0.5, 0.0, 0.118961575804),
    (0.5, 1.2, 0.0, 0.198589971562),
    (0.5, 1.2, 0.5, 0.145268196598),
    (0.5, 1.5, 1.0, 0.061169198404),
    (0.5, 2.0, 0.0, 0.066404775701),
];
