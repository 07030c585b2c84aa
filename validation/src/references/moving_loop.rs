//! A current loop that moves along a tube: flux density between loop and tube, and outside the tube.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "after Ida 1990",
    citation: "Problem after N. Ida, \"Velocity effects and low level fields in axisymmetric geometries (Problem 9)\", COMPEL 9(3), 169-180 (1990). \
               Its sizes are from memory and its printed results were not at hand: the case is a case of its own, solved exactly",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "half of the fifth figure; on the inner line 2e-4 uT besides, the quadrature error of the table",
    tolerance: "half of the last of five printed figures; on the inner line 2e-4 uT besides (1e-6 of the peak), the quadrature error of the \
                table: its rows at rest differ by 2e-5 uT from the closed form of a loop",
};

/// Radius of the loop, m; it carries 1 A.
pub const LOOP_RADIUS_M: f64 = 12e-3;
/// Inner and outer radius of the tube, m.
pub const TUBE_M: (f64, f64) = (14e-3, 20e-3);
/// Conductivity of the tube, S/m.
pub const CONDUCTIVITY_S_PER_M: f64 = 5e6;
/// Heights from the loop, m, upward positive as the velocity.
pub const HEIGHTS_M: [f64; 11] = [-60e-3, -40e-3, -20e-3, -10e-3, -5e-3, 0.0, 5e-3, 10e-3, 20e-3, 40e-3, 60e-3];
/// Quadrature error of the table on the inner line, uT.
pub const INSIDE_ERROR_UT: f64 = 2e-4;
/// Significant figures of the values.
pub const FIGURES: i32 = 5;

/// Flux density at the eleven heights.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Row {
    /// Relative permeability of the tube.
    pub relative_permeability: f64,
    /// Speed, m/s.
    pub speed_m_per_s: f64,
    /// B_r, microtesla.
    pub radial_microtesla: [f64; 11],
    /// B_z, microtesla.
    pub axial_microtesla: [f64; 11],
}

/// Radius of the line between loop and tube, m.
pub const INSIDE_RADIUS_M: f64 = 13e-3;
/// On that line.
pub const INSIDE: [Row; 8] = [
    Row {
        relative_permeability: 1.0,
        speed_m_per_s: 0.0,
        radial_microtesla: [
            -0.11131, -0.45412, -3.2773, -12.684, -32.104, 0.0, 32.104, 12.684, 3.2773, 0.45412, 0.11131,
        ],
        axial_microtesla: [0.34775, 0.96145, 3.6738, 7.5609, 7.8126, -163.8, 7.8126, 7.5609, 3.6738, 0.96145, 0.34775],
    },
    Row {
        relative_permeability: 1.0,
        speed_m_per_s: 1.0,
        radial_microtesla: [
            -0.11485, -0.46654, -3.3135, -12.694, -32.02, 0.24505, 32.185, 12.671, 3.2404, 0.4419, 0.10789,
        ],
        axial_microtesla: [0.35748, 0.9909, 3.7777, 7.7489, 8.02, -163.81, 7.6007, 7.3717, 3.571, 0.93285, 0.33836],
    },
    Row {
        relative_permeability: 1.0,
        speed_m_per_s: 10.0,
        radial_microtesla: [
            -0.15161, -0.58561, -3.6034, -12.667, -31.138, 2.4241, 32.764, 12.442, 2.8867, 0.34194, 0.081602,
        ],
        axial_microtesla: [0.46171, 1.2947, 4.7536, 9.3628, 9.6599, -164.18, 5.5169, 5.6463, 2.7106, 0.71187, 0.2674],
    },
    Row {
        relative_permeability: 1.0,
        speed_m_per_s: 100.0,
        radial_microtesla: [
            -0.55488, -1.1111, -2.9799, -8.4988, -22.542, 13.11, 28.244, 7.0076, 0.73553, 0.039364, 0.012515,
        ],
        axial_microtesla: [
            2.7841, 5.1459, 9.8769, 12.62, 8.5586, -181.28, -11.895, -3.2726, -0.089259, 0.11701, 0.062969,
        ],
    },
    Row {
        relative_permeability: 50.0,
        speed_m_per_s: 0.0,
        radial_microtesla: [
            -0.0063623, -0.095719, -2.8692, -17.186, -47.528, 0.0, 47.528, 17.186, 2.8692, 0.095719, 0.0063623,
        ],
        axial_microtesla: [
            0.042397, 0.069401, 0.5401, 3.1687, 10.022, -121.34, 10.022, 3.1687, 0.5401, 0.069401, 0.042397,
        ],
    },
    Row {
        relative_permeability: 50.0,
        speed_m_per_s: 1.0,
        radial_microtesla: [
            -0.0068618, -0.1004, -2.9249, -17.268, -47.431, 0.50196, 47.542, 17.079, 2.8212, 0.092126, 0.0059546,
        ],
        axial_microtesla: [
            0.045326, 0.07561, 0.60007, 3.4156, 10.408, -121.41, 9.6153, 2.9582, 0.49487, 0.064196, 0.039686,
        ],
    },
    Row {
        relative_permeability: 50.0,
        speed_m_per_s: 10.0,
        radial_microtesla: [
            -0.027826, -0.18669, -3.149, -17.068, -46.164, 2.7425, 46.865, 16.349, 2.5806, 0.076126, 0.0038431,
        ],
        axial_microtesla: [
            0.10952, 0.26763, 1.3367, 4.6759, 11.479, -123.59, 7.3743, 2.0044, 0.2973, 0.035302, 0.022124,
        ],
    },
    Row {
        relative_permeability: 50.0,
        speed_m_per_s: 100.0,
        radial_microtesla: [
            -0.08563, -0.32974, -3.3677, -16.009, -42.18, 7.7991, 43.756, 14.039, 1.9484, 0.044276, 0.0010512,
        ],
        axial_microtesla: [
            0.4555, 0.8822, 2.7688, 6.7436, 12.434, -132.68, 1.2523, -0.29041, -0.08882, -0.0017089, 0.00037053,
        ],
    },
];

/// Radius of the line outside the tube, m.
pub const OUTSIDE_RADIUS_M: f64 = 24e-3;
/// On that line.
pub const OUTSIDE: [Row; 8] = [
    Row {
        relative_permeability: 1.0,
        speed_m_per_s: 0.0,
        radial_microtesla: [-0.16248, -0.53874, -2.168, -3.5319, -2.8715, 0.0, 2.8715, 3.5319, 2.168, 0.53874, 0.16248],
        axial_microtesla: [
            0.25906, 0.53625, 0.62226, -1.1403, -3.2159, -4.5144, -3.2159, -1.1403, 0.62226, 0.53625, 0.25906,
        ],
    },
    Row {
        relative_permeability: 1.0,
        speed_m_per_s: 1.0,
        radial_microtesla: [
            -0.16606, -0.5488, -2.1839, -3.5148, -2.814, 0.082347, 2.9277, 3.5476, 2.1515, 0.52876, 0.15899,
        ],
        axial_microtesla: [
            0.26107, 0.53729, 0.60209, -1.1872, -3.2572, -4.5136, -3.1736, -1.0931, 0.64192, 0.53503, 0.25704,
        ],
    },
    Row {
        relative_permeability: 1.0,
        speed_m_per_s: 10.0,
        radial_microtesla: [
            -0.20184, -0.64188, -2.2965, -3.2988, -2.2495, 0.81119, 3.3704, 3.6227, 1.9799, 0.44411, 0.13111,
        ],
        axial_microtesla: [
            0.27792, 0.53791, 0.40115, -1.5934, -3.5703, -4.4276, -2.7479, -0.66833, 0.79432, 0.51722, 0.23848,
        ],
    },
    Row {
        relative_permeability: 1.0,
        speed_m_per_s: 100.0,
        radial_microtesla: [
            -0.51124, -0.90224, -1.165, 0.14819, 1.85, 3.1532, 2.7201, 1.6674, 0.54565, 0.10489, 0.035987,
        ],
        axial_microtesla: [
            0.15997, 0.0081968, -1.0565, -2.3584, -2.3752, -0.99645, 0.5416, 1.0144, 0.72361, 0.26017, 0.11967,
        ],
    },
    Row {
        relative_permeability: 50.0,
        speed_m_per_s: 0.0,
        radial_microtesla: [
            -0.11467, -0.17512, -0.31229, -0.37247, -0.27594, 0.0, 0.27594, 0.37247, 0.31229, 0.17512, 0.11467,
        ],
        axial_microtesla: [
            0.032395, 0.033349, -0.028661, -0.22267, -0.40458, -0.51252, -0.40458, -0.22267, -0.028661, 0.033349,
            0.032395,
        ],
    },
    Row {
        relative_permeability: 50.0,
        speed_m_per_s: 1.0,
        radial_microtesla: [
            -0.11928, -0.18378, -0.32556, -0.33965, -0.18008, 0.12197, 0.33955, 0.38056, 0.29642, 0.16707, 0.11024,
        ],
        axial_microtesla: [
            0.031732, 0.030198, -0.056044, -0.28905, -0.45819, -0.49238, -0.33345, -0.16313, -0.00899, 0.035602,
            0.03285,
        ],
    },
    Row {
        relative_permeability: 50.0,
        speed_m_per_s: 10.0,
        radial_microtesla: [
            -0.15475, -0.19432, -0.043702, 0.22084, 0.31893, 0.33198, 0.29586, 0.25236, 0.18455, 0.11262, 0.07696,
        ],
        axial_microtesla: [
            -0.0028863, -0.079217, -0.27871, -0.27676, -0.18085, -0.074729, -0.0080783, 0.024281, 0.043523, 0.039961,
            0.03182,
        ],
    },
    Row {
        relative_permeability: 50.0,
        speed_m_per_s: 100.0,
        radial_microtesla: [
            0.050674, 0.038678, 0.02156, 0.016155, 0.014178, 0.012543, 0.01117, 0.010004, 0.008134, 0.0056035,
            0.0040172,
        ],
        axial_microtesla: [
            0.0047189, 0.01565, 0.015566, 0.01325, 0.012145, 0.011135, 0.010225, 0.0094073, 0.0080141, 0.005955,
            0.0045444,
        ],
    },
];
