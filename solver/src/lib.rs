//! The axisymmetric magnetic diffusion solver.
//!
//! A [`problem::Problem`] states wall, mover and travel in SI units; [`solve`] and [`drag_curve`] give an
//! [`outcome::Outcome`]: figures with numerical bands, forces by three routes, the energy ledger,
//! the trace and the fields. This crate knows no files.
//!
//! Unknown psi(r, z, t) = r A_phi; B_z = (1/r) dpsi/dr, B_r = -(1/r) dpsi/dz, E_phi = -(1/r) dpsi/dt, J_phi = sigma E_phi:
//!
//!   -d/dr((nu/r) dpsi/dr) - d/dz((nu/r) dpsi/dz) + (sigma/r) dpsi/dt = J_source + curl of (nu mu0 M).
//!
//! Signs: z upward positive, velocities signed, drag positive when it opposes the motion.

pub mod comparison;
pub mod constants;
pub mod cool_down;
pub mod cost;
pub mod extrapolate;
pub mod fault;
pub mod ladder;
pub mod monitor;
pub mod outcome;
pub mod probe;
pub mod problem;
pub mod rings;
pub mod slots;
pub mod sources;
pub mod spread;
pub mod step_field;
pub mod system;

mod band;
mod corner;
mod demagnetisation;
mod direct;
mod fields;
mod force;
mod grid_report;
mod grid_rules;
mod harmonic;
mod interpolate;
mod linear;
mod march;
mod materials;
mod numbering;
mod operators;
mod placement;
mod regime;
mod settled;
mod target;
mod thermal;
#[cfg(test)]
mod verification;
mod wall_nodes;

use fault::SolveFault;
use monitor::Monitor;
use outcome::Outcome;
use problem::{Extent, Problem, Travel};

/// Solves what the problem's law of travel asks.
///
/// A dipole of 1 A m2 at 5 m/s in an endless tube:
///
/// ```
/// use lenzbore_solver::solve;
/// use lenzbore_solver::monitor::Unwatched;
/// use lenzbore_solver::problem::{Accuracy, Extent, Layer, Mover, Outline, Part, Problem, SnapshotPlan, Travel, Wall};
/// use lenzbore_solver::sources::Source;
/// let layer = Layer {
///     name: "tube".into(),
///     inner_radius_m: 10.5e-3,
///     outer_radius_m: 12.5e-3,
///     from_m: 0.0,
///     to_m: 0.0,
///     conductivity_s_per_m: 58e6,
///     relative_permeability: 1.0,
/// };
/// let outline = Outline { inner_radius_m: 0.0, outer_radius_m: 0.0, length_m: 0.0 };
/// let source = Source::Dipole { moment_a_m2: 1.0 };
/// let dipole = Part { name: "D".into(), centre_m: 0.0, source, outline, coercivity_a_per_m: None };
/// let problem = Problem {
///     wall: Wall { slots: 0, extent: Extent::Endless, layers: vec![layer] },
///     mover: Mover { parts: vec![dipole], mass_kg: None, recoil: None },
///     travel: Travel::Steady { velocity_m_per_s: 5.0 },
///     accuracy: Accuracy::default(),
///     snapshots: SnapshotPlan::None,
///     stations: Vec::new(),
///     warming: None,
/// };
/// let outcome = solve(&problem, &Unwatched)?;
/// let drag = outcome.figures.iter().find(|f| f.name == "drag").expect("steady travel has a drag");
/// // The Fourier-Bessel integral, computed independently of this program: 2.212929281 N.
/// assert!((drag.value - 2.212_929_281).abs() < drag.band && drag.band < 1e-5, "{} +/- {}", drag.value, drag.band);
/// # Ok::<(), lenzbore_solver::fault::SolveFault>(())
/// ```
///
/// # Errors
/// See [`SolveFault`].
pub fn solve(problem: &Problem, monitor: &dyn Monitor) -> Result<Outcome, SolveFault> {
    let mut outcome = match &problem.travel {
        Travel::Steady { velocity_m_per_s } => {
            require_endless(problem)?;
            settled::steady(problem, *velocity_m_per_s, monitor)
        }
        Travel::Traverse(_) | Travel::Free(_) | Travel::Sine(_) | Travel::Table(_) => {
            require_finite(problem)?;
            march::march(problem, monitor)
        }
        Travel::Alternating(law) => harmonic::alternating(problem, law, monitor),
    }?;
    slots::add_to(&mut outcome, problem);
    demagnetisation::caution_in(&mut outcome);
    Ok(outcome)
}

/// Drag against speed with settled fields; a finite wall is taken as endless by the caller.
///
/// The dipole of [`solve`], at two speeds:
///
/// ```
/// use lenzbore_solver::drag_curve;
/// # use lenzbore_solver::monitor::Unwatched;
/// # use lenzbore_solver::problem::{Accuracy, Extent, Layer, Mover, Outline, Part, Problem, SnapshotPlan, Travel, Wall};
/// # use lenzbore_solver::sources::Source;
/// # let layer = Layer {
/// #     name: "tube".into(),
/// #     inner_radius_m: 10.5e-3,
/// #     outer_radius_m: 12.5e-3,
/// #     from_m: 0.0,
/// #     to_m: 0.0,
/// #     conductivity_s_per_m: 58e6,
/// #     relative_permeability: 1.0,
/// # };
/// # let outline = Outline { inner_radius_m: 0.0, outer_radius_m: 0.0, length_m: 0.0 };
/// # let source = Source::Dipole { moment_a_m2: 1.0 };
/// # let dipole = Part { name: "D".into(), centre_m: 0.0, source, outline, coercivity_a_per_m: None };
/// # let problem = Problem {
/// #     wall: Wall { slots: 0, extent: Extent::Endless, layers: vec![layer] },
/// #     mover: Mover { parts: vec![dipole], mass_kg: None, recoil: None },
/// #     travel: Travel::Steady { velocity_m_per_s: 5.0 },
/// #     accuracy: Accuracy::default(),
/// #     snapshots: SnapshotPlan::None,
/// #     stations: Vec::new(),
/// #     warming: None,
/// # };
/// let outcome = drag_curve(&problem, &[0.1, 100.0], &Unwatched)?;
/// let curve = outcome.curve.expect("a curve");
/// // The same integral: 0.047203004 N and 2.574114186 N.
/// for (point, exact) in curve.points.iter().zip([0.047_203_004, 2.574_114_186]) {
///     assert!((point.drag_newton - exact).abs() < point.band_newton + 5e-10, "{} {exact}", point.drag_newton);
/// }
/// # Ok::<(), lenzbore_solver::fault::SolveFault>(())
/// ```
///
/// # Errors
/// See [`SolveFault`].
pub fn drag_curve(problem: &Problem, speeds_m_per_s: &[f64], monitor: &dyn Monitor) -> Result<Outcome, SolveFault> {
    require_endless(problem)?;
    let mut outcome = settled::curve(problem, speeds_m_per_s, monitor)?;
    slots::add_to(&mut outcome, problem);
    Ok(outcome)
}

/// What the wall's currents do to the magnets' recoil permeability, which [`solve`] and [`drag_curve`] leave out: the relative change of the
/// settled drag at each speed (m/s), negative where the drag is truly lower. Zeros where no recoil permeability is given.
///
/// The same field is solved with the magnets' permeability in the stiffness, in their frame, and without it. A finite wall is taken as
/// endless, with the layers at the height where most conducts. Coarsest grid: to some 5 % of itself. Cost: about half a coarse curve.
///
/// # Errors
/// See [`SolveFault`].
pub fn recoil_back_action(
    problem: &Problem,
    speeds_m_per_s: &[f64],
    monitor: &dyn Monitor,
) -> Result<Vec<f64>, SolveFault> {
    settled::back_action(problem, speeds_m_per_s, monitor)
}

/// Stiffness and damping coefficient of strokes of vanishing amplitude about `centre_m`, m, in a finite wall, at each of `frequencies_hz`;
/// the static pull of a permeable wall is left out.
///
/// # Errors
/// See [`SolveFault`].
pub fn small_strokes(
    problem: &Problem,
    centre_m: f64,
    frequencies_hz: &[f64],
    monitor: &dyn Monitor,
) -> Result<Vec<outcome::SmallStroke>, SolveFault> {
    require_finite(problem)?;
    march::small_strokes(problem, centre_m, frequencies_hz, monitor)
}

/// Damping coefficient as the speed vanishes, with the reference point at each of `positions_m`, in a finite wall; the law of travel takes no
/// part in it.
///
/// The dipole of [`solve`] in a wall of 0.6 m: at the end half of the wall is missing, and half of the damping.
///
/// ```
/// use lenzbore_solver::damping_against_position;
/// # use lenzbore_solver::monitor::Unwatched;
/// # use lenzbore_solver::problem::{Accuracy, Extent, Layer, Mover, Outline, Part, Problem, SnapshotPlan, Travel, Wall};
/// # use lenzbore_solver::sources::Source;
/// # let layer = Layer {
/// #     name: "tube".into(),
/// #     inner_radius_m: 10.5e-3,
/// #     outer_radius_m: 12.5e-3,
/// #     from_m: 0.0,
/// #     to_m: 0.6,
/// #     conductivity_s_per_m: 58e6,
/// #     relative_permeability: 1.0,
/// # };
/// # let outline = Outline { inner_radius_m: 0.0, outer_radius_m: 0.0, length_m: 0.0 };
/// # let source = Source::Dipole { moment_a_m2: 1.0 };
/// # let dipole = Part { name: "D".into(), centre_m: 0.0, source, outline, coercivity_a_per_m: None };
/// # let problem = Problem {
/// #     wall: Wall { slots: 0, extent: Extent::Finite { length_m: 0.6 }, layers: vec![layer] },
/// #     mover: Mover { parts: vec![dipole], mass_kg: None, recoil: None },
/// #     travel: Travel::Steady { velocity_m_per_s: 5.0 },
/// #     accuracy: Accuracy::default(),
/// #     snapshots: SnapshotPlan::None,
/// #     stations: Vec::new(),
/// #     warming: None,
/// # };
/// let outcome = damping_against_position(&problem, &[0.3, 0.0], &Unwatched)?;
/// let [middle, end] = outcome.sweeps.positions[..] else { panic!("two positions") };
/// // 0.1 m/s is slow enough for 0.047203004 N / 0.1 m/s within 1e-3; the halves are exact.
/// assert!((middle.damping / 0.472_03 - 1.0).abs() < 1e-3, "{}", middle.damping);
/// assert!((end.damping / middle.damping - 0.5).abs() < 1e-5, "{}", end.damping);
/// # Ok::<(), lenzbore_solver::fault::SolveFault>(())
/// ```
///
/// # Errors
/// See [`SolveFault`].
pub fn damping_against_position(
    problem: &Problem,
    positions_m: &[f64],
    monitor: &dyn Monitor,
) -> Result<Outcome, SolveFault> {
    require_finite(problem)?;
    march::damping_against_position(problem, positions_m, monitor)
}

/// As [`solve`] for strokes of law `sine`, without the small strokes over frequency beside them.
///
/// # Errors
/// See [`SolveFault`].
pub fn settled_stroke(problem: &Problem, monitor: &dyn Monitor) -> Result<Outcome, SolveFault> {
    require_finite(problem)?;
    if !matches!(problem.travel, Travel::Sine(_)) {
        return Err(SolveFault::Unsuited("a settled stroke is of law 'sine'"));
    }
    march::settled_stroke(problem, monitor)
}

/// A wall's currents as `terms` first-order lags, fitted to small strokes over frequency; `None` with fewer points than terms, or where
/// nothing damps.
///
/// ```
/// use lenzbore_solver::lumped_model;
/// use lenzbore_solver::outcome::SmallStroke;
/// // One lag, c = 3 N s/m and tau = 2 ms, in closed form: damping c / (1 + x^2), stiffness omega c x / (1 + x^2), x = omega tau.
/// let at = |frequency_hz: f64| {
///     let omega = std::f64::consts::TAU * frequency_hz;
///     let x = omega * 2e-3;
///     let (damping, stiffness) = (3.0 / (1.0 + x * x), omega * 3.0 * x / (1.0 + x * x));
///     SmallStroke { frequency_hz, stiffness, stiffness_band: 0.0, damping, damping_band: 0.0 }
/// };
/// let model = lumped_model(&[10.0, 50.0, 200.0].map(at), 1).expect("three points suffice");
/// assert!((model.terms[0].damping_n_s_per_m - 3.0).abs() < 1e-6 && (model.terms[0].lag_s - 2e-3).abs() < 1e-9);
/// ```
#[must_use]
pub fn lumped_model(points: &[outcome::SmallStroke], terms: usize) -> Option<outcome::LumpedModel> {
    march::lumped_model(points, terms)
}

fn require_endless(problem: &Problem) -> Result<(), SolveFault> {
    match problem.wall.extent {
        Extent::Endless => Ok(()),
        Extent::Finite { .. } => {
            Err(SolveFault::Unsuited("settled fields need an endless wall; use traverse for a finite one"))
        }
    }
}

fn require_finite(problem: &Problem) -> Result<(), SolveFault> {
    match problem.wall.extent {
        Extent::Finite { .. } => Ok(()),
        Extent::Endless => Err(SolveFault::Unsuited("a motion in time needs the wall's length")),
    }
}
