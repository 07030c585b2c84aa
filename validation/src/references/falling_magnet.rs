//! An experiment: a samarium-cobalt magnet that falls through a copper tube.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Iniguez et al. 2004",
    citation: "J. Iniguez, V. Raposo, A. Hernandez-Lopez, A. G. Flores, M. Zazo, \"Study of the conductivity of a metallic tube by analysing the \
               damped fall of a magnet\", European Journal of Physics 25, 593-604 (2004); sizes, mass and time read in a text that quotes \
               the article, authors and title from memory",
    obtained: Obtained::Read,
    uncertainty: "none is stated in the text at hand, and neither remanence nor conductivity: fall time and mass to the last printed \
                  figure (0.4 % and 0.5 %); drawn copper 55 to 58 MS/m; samarium-cobalt 0.83 to 1.15 T over its grades",
    tolerance: "the remanence that the fall implies must lie in 0.93 to 0.97 T, which is what 55 to 58 MS/m make of the measured drag: within \
                the range of the material, so the experiment is consistent with the model; it cannot tell more closely than 2 %",
};

/// Inner and outer radius of the tube, m.
pub const TUBE_M: (f64, f64) = (6.5e-3, 7.5e-3);
/// Its length, m.
pub const LENGTH_M: f64 = 1.0;
/// Radius and length of the magnet, m.
pub const MAGNET_M: (f64, f64) = (6e-3, 10e-3);
/// Mass of the magnet, kg.
pub const MASS_KG: f64 = 9.3e-3;
/// Time of the fall through the tube, s.
pub const FALL_TIME_S: f64 = 12.3;
/// Its speed, m/s.
pub const SPEED_M_PER_S: f64 = 0.081;
/// Damping coefficient as evaluated there, N s/m.
pub const DAMPING_COEFFICIENT: f64 = 1.12;
/// Range that the implied remanence must lie in, T.
pub const REMANENCE_T: (f64, f64) = (0.93, 0.97);
/// Conductivity of drawn copper, S/m: lowest, middle, highest; and the remanence that the coefficient implies at each, T, by the
/// closed integral for a cylinder magnet at low speed, computed independently.
pub const IMPLIED: [(f64, f64); 3] = [(55e6, 0.9645), (56.5e6, 0.9516), (58e6, 0.9392)];
/// Damping coefficient at 1 T and 58 MS/m by that integral, N s/m.
pub const COEFFICIENT_AT_1_T: f64 = 1.269_730;
