//! Bodies that cool from one temperature by films: slab, rod, hollow cylinder.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Carslaw, Jaeger 1959",
    citation: "H. S. Carslaw, J. C. Jaeger, Conduction of Heat in Solids, 2nd ed. (1959), sections 3.11 (slab), 7.7 (rod) and 7.10 \
               (hollow cylinder), all with radiation at the surfaces into a medium at zero (sections from memory): series over the roots of \
               zeta tan zeta = Bi, zeta J1(zeta) = Bi J0(zeta), and of the cross product of J0 and Y0 with both films",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "half of the ninth decimal",
    tolerance: "1e-4 of the initial excess, on three grid levels; and the band must hold the value",
};

/// Thermal conductivity, W/(m K), density, kg/m3, and specific heat, J/(kg K), of all three.
pub const METAL: [f64; 3] = [200.0, 2700.0, 900.0];
/// Decimals of the values.
pub const DECIMALS: i32 = 9;

/// Half-thickness of the slab, m: a rod insulated around, cooled at both ends; film coefficient, W/(m2 K): Bi = h l / k = 0.5.
pub const SLAB: (f64, f64) = (0.05, 2000.0);
/// diffusivity t / l^2; then the excess in the middle, at the surface, and its mean, over the initial one.
pub const SLAB_EXCESS: [(f64, [f64; 3]); 4] = [
    (0.1, [0.996_321_407_9, 0.843_898_567_5, 0.955_376_739_8]),
    (0.5, [0.864_114_129_0, 0.686_881_981_7, 0.804_327_576_7]),
    (2.0, [0.455_778_609_7, 0.361_933_732_4, 0.424_045_108_8]),
    (6.0, [0.082_678_055_08, 0.065_654_632_36, 0.076_921_610_88]),
];

/// Radius of the rod, m, its ends insulated; film coefficient, W/(m2 K): Bi = h a / k = 1.
pub const ROD: (f64, f64) = (0.02, 10_000.0);
/// diffusivity t / a^2; then the excess on the axis, at the surface, and its mean.
pub const ROD_EXCESS: [(f64, [f64; 3]); 3] = [
    (0.1, [0.976_816_513_4, 0.684_564_55, 0.843_265_509_6]),
    (0.5, [0.548_586_203_9, 0.352_785_837_5, 0.447_384_263_6]),
    (2.0, [0.051_520_718_46, 0.033_125_185_59, 0.042_010_574_87]),
];

/// Bore and outer radius of the hollow cylinder, m, its ends insulated.
pub const TUBE_M: [f64; 2] = [0.01, 0.02];
/// Film coefficients of its bore and outside, W/(m2 K).
pub const TUBE_FILMS: [f64; 2] = [4000.0, 12_000.0];
/// Time, s; then the excess at the bore, at the outside, and its mean.
pub const TUBE_EXCESS: [(f64, [f64; 3]); 4] = [
    (0.05, [0.959_246_432_1, 0.870_734_481_8, 0.964_623_947_4]),
    (0.3, [0.849_321_269_8, 0.696_177_252_4, 0.812_655_431]),
    (1.0, [0.532_403_188_5, 0.431_110_971_9, 0.506_000_673_3]),
    (4.0, [0.069_970_457_72, 0.056_656_951_39, 0.066_499_700_66]),
];
