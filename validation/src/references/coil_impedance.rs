//! What a tube adds to the impedance of a coil in its bore.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Dodd, Deeds 1968",
    citation: "C. V. Dodd, W. E. Deeds, \"Analytical solutions to eddy-current probe-coil problems\", Journal of Applied Physics 39, 2829-2838 \
               (1968): dZ = i omega 8 mu0 n^2 int (sin(k l/2)/k)^2 J(k)^2 Gamma(k) dk for a coil of rectangular section in a tube; citation \
               read, equation derived anew from the interface conditions",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "half of the last of seven figures",
    tolerance: "1e-5 of the impedance change, a tenth of the target that the solver is asked for; the band must hold the value",
};

/// Inner and outer radius of the coil, m.
pub const COIL_M: (f64, f64) = (6e-3, 7e-3);
/// Length of the coil, m.
pub const LENGTH_M: f64 = 5e-3;
/// Turns of the coil.
pub const TURNS: f64 = 100.0;
/// Inner and outer radius of the tube, m.
pub const TUBE_M: (f64, f64) = (7.5e-3, 9.5e-3);
/// Significant figures of the values.
pub const FIGURES: i32 = 7;
/// Inductance of the coil alone, H: Maxwell's mutual inductance of two loops integrated over both sections (computed independently with
/// panels graded towards the logarithm, by two quadratures that agree to 14 digits).
pub const ALONE_H: f64 = 139.323_457_491e-6;

/// One tube.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Tube {
    /// What it is made of.
    pub name: &'static str,
    /// Conductivity, S/m.
    pub conductivity_s_per_m: f64,
    /// Relative permeability.
    pub permeability: f64,
    /// Frequency, Hz; resistance change, ohm; inductance change, H.
    pub changes: [(f64, f64, f64); 4],
}

/// All tubes.
pub const TABLE: [Tube; 3] = [
    Tube {
        name: "copper",
        conductivity_s_per_m: 5.8e7,
        permeability: 1.0,
        changes: [
            (1e2, 0.008_953_589_3, -3.695_271_6e-6),
            (1e3, 0.165_470_78, -5.119_508_6e-5),
            (1e4, 0.723_154_99, -7.494_878_1e-5),
            (1e5, 2.693_588_5, -8.473_684e-5),
        ],
    },
    Tube {
        name: "stainless steel",
        conductivity_s_per_m: 1.389e6,
        permeability: 1.0,
        changes: [
            (1e2, 2.303_703_5e-4, -2.303_415_2e-9),
            (1e3, 0.022_938_375, -2.291_969_9e-7),
            (1e4, 1.647_848_8, -1.560_042_2e-5),
            (1e5, 11.434_903, -6.320_045_1e-5),
        ],
    },
    Tube {
        name: "steel of permeability 50",
        conductivity_s_per_m: 5e6,
        permeability: 50.0,
        changes: [
            (1e2, 6.742_672e-4, 2.799_181_1e-5),
            (1e3, 0.039_406_759, 2.419_316_1e-5),
            (1e4, 0.962_171_4, 9.908_218_3e-6),
            (1e5, 15.153_556, -2.178_895_3e-5),
        ],
    },
];
