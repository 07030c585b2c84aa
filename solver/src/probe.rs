//! For whoever wants to solve elsewhere on the same grids, or to measure this machine.
//!
//! The node lines of every grid level, so that another program can answer the same question on the same unknowns; and
//! the time of one back-solve beside the bytes that it has to read, which bounds it from below.

use std::time::Instant;

use lenzbore_mesh::{Refinement, Regions};

use crate::direct::DirectPlan;
use crate::fault::SolveFault;
use crate::grid_rules::GridPlan;
use crate::harmonic;
use crate::linear::{Factor, Pattern, RESIDUAL_LIMIT, check_residual};
use crate::march;
use crate::materials::Materials;
use crate::operators::Operators;
use crate::placement::Placement;
use crate::problem::{Problem, Travel};
use crate::settled;
use crate::target::levels_wanted;

/// Node lines in r and in z, m.
pub type NodeLines = (Vec<f64>, Vec<f64>);

/// Node lines (r, z) of every grid level that [`crate::solve`] begins with, coarse to fine, m.
///
/// With `curve_speed_m_per_s` they are those of [`crate::drag_curve`] up to that speed. Levels have the refinement
/// f = 1, 1.5, 2, ...; r starts on the axis; z is measured from the lower end of a finite wall and from the mover's
/// reference point in an endless one, where the mover travels towards +z at a positive velocity. psi = 0 holds on the axis
/// and on the outer nodes. Every face of the wall lies on a line.
///
/// ```
/// use lenzbore_solver::probe::node_lines;
/// use lenzbore_solver::problem::{
///     Accuracy, Extent, Layer, Mover, Outline, Part, Problem, SnapshotPlan, Travel, Wall,
/// };
/// use lenzbore_solver::sources::Source;
/// let layer = Layer {
///     name: "tube".into(), inner_radius_m: 0.0105, outer_radius_m: 0.0125, from_m: 0.0, to_m: 0.0,
///     conductivity_s_per_m: 58e6, relative_permeability: 1.0,
/// };
/// let outline = Outline { inner_radius_m: 0.0, outer_radius_m: 0.0, length_m: 0.0 };
/// let source = Source::Dipole { moment_a_m2: 1.0 };
/// let problem = Problem {
///     wall: Wall { slots: 0, extent: Extent::Endless, layers: vec![layer] },
///     mover: Mover { parts: vec![Part { name: "M".into(), centre_m: 0.0, source, outline, coercivity_a_per_m: None }], mass_kg: None, recoil: None },
///     travel: Travel::Steady { velocity_m_per_s: 5.0 },
///     accuracy: Accuracy::default(),
///     snapshots: SnapshotPlan::None,
///     stations: Vec::new(),
///     warming: None,
/// };
/// let lines = node_lines(&problem, None)?;
/// assert_eq!(lines.len(), 3);
/// for (r, z) in &lines {
///     assert!(r[0].abs() < 1e-300 && r.iter().any(|r| (r - 0.0105).abs() < 1e-15) && z.len() > r.len());
/// }
/// # Ok::<(), lenzbore_solver::fault::SolveFault>(())
/// ```
///
/// # Errors
/// A grid that cannot be built.
pub fn node_lines(problem: &Problem, curve_speed_m_per_s: Option<f64>) -> Result<Vec<NodeLines>, SolveFault> {
    let plan = plan(problem, curve_speed_m_per_s)?;
    let lines = |refinement: Refinement| {
        let grid = plan.grid(refinement);
        (grid.r.nodes().to_vec(), grid.z.nodes().to_vec())
    };
    Ok(Refinement::first(levels_wanted(&problem.accuracy)).into_iter().map(lines).collect())
}

/// One back-solve with the finest grid's factor, as measured.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct BackSolve {
    /// Unknowns.
    pub unknowns: usize,
    /// Stored entries of the Cholesky factor.
    pub factor_entries: usize,
    /// Bytes of the factor that one back-solve reads: values and row indices, once forward and once backward. Over the
    /// bandwidth of the memory that holds the factor, it is the least time that a back-solve can take.
    pub bytes_read: usize,
    /// Median time of a back-solve for one right-hand side, s.
    pub seconds: f64,
    /// Median time for two right-hand sides at once, as the equation of motion asks, s.
    pub seconds_two_columns: f64,
    /// Median time for one right-hand side with the solver that [`crate::solve`] takes here, s: by radial modes where the wall has few
    /// sections, else the same Cholesky factor.
    pub direct_seconds: f64,
    /// Bytes of that solver's factor, with its workspace.
    pub direct_bytes: usize,
    /// Its factorisation, s.
    pub direct_factorisation_seconds: f64,
    /// Assembly of the operators, s.
    pub assembly_seconds: f64,
    /// Ordering and symbolic factorisation, s.
    pub ordering_seconds: f64,
    /// Numeric factorisation, s.
    pub factorisation_seconds: f64,
    /// Largest relative residual of the solves.
    pub residual: f64,
}

/// Times back-solves, factorisation and assembly on the finest grid that [`node_lines`] gives.
///
/// Each back-solve is timed alone, `repeats` times (at least once); `before_each` runs before every one and isn't timed: it
/// may clear the caches, or do nothing for the time inside a row of steps. The Cholesky factor is the yardstick against the
/// bandwidth of memory; [`crate::solve`] itself takes it only where its faster solver doesn't suit the wall.
///
/// # Errors
/// A grid that cannot be built, or a factorisation or solve that fails.
pub fn back_solve(
    problem: &Problem,
    curve_speed_m_per_s: Option<f64>,
    repeats: usize,
    mut before_each: impl FnMut(),
) -> Result<BackSolve, SolveFault> {
    let plan = plan(problem, curve_speed_m_per_s)?;
    let refinements = Refinement::first(levels_wanted(&problem.accuracy));
    let finest = refinements.last().copied().unwrap_or(Refinement::COARSEST);
    let grid = plan.grid(finest);
    let materials = Materials::new(&problem.wall, &Regions::new(&grid, &plan.rectangles));
    let (operators, assembly_seconds) = timed(|| Operators::new(grid, materials));
    let (pattern, ordering_seconds) = timed(|| Pattern::new(&operators.stiffness));
    let pattern = pattern?;
    let (factor, factorisation_seconds) = timed(|| Factor::new(&pattern, &operators.stiffness, None));
    let mut factor = factor?;
    let unknowns = operators.unknowns();
    let mut right = vec![0.0; 2 * unknowns];
    for (&u, g) in operators.wall.unknown.iter().zip(&operators.wall.conductance) {
        (right[u], right[unknowns + u]) = (*g, -0.5 * g);
    }
    let mut seconds = [0.0; 2];
    let mut residual = 0.0_f64;
    for (columns, seconds) in (1..).zip(&mut seconds) {
        let right = &right[..columns * unknowns];
        let mut solution = right.to_vec();
        *seconds = median(repeats, &mut before_each, right, &mut solution, |x| factor.solve_in_place(x));
        for (x, b) in solution.chunks_exact(unknowns).zip(right.chunks_exact(unknowns)) {
            residual = residual.max(check_residual(&operators.stiffness, None, x, b, RESIDUAL_LIMIT)?);
        }
    }
    let (direct, direct_factorisation_seconds) = timed(|| {
        let plan = DirectPlan::new(&operators)?;
        Ok::<_, SolveFault>((plan.factor_bytes(), plan.factor(&operators, 0.0)?))
    });
    let (direct_bytes, mut direct) = direct?;
    let right = &right[..unknowns];
    let mut solution = right.to_vec();
    let direct_seconds = median(repeats, &mut before_each, right, &mut solution, |x| direct.solve_in_place(x));
    residual = residual.max(direct.check(&operators, &solution, right, RESIDUAL_LIMIT)?);
    Ok(BackSolve {
        unknowns,
        factor_entries: pattern.factor_entries(),
        bytes_read: pattern.bytes_per_solve(),
        seconds: seconds[0],
        seconds_two_columns: seconds[1],
        direct_seconds,
        direct_bytes,
        direct_factorisation_seconds,
        assembly_seconds,
        ordering_seconds,
        factorisation_seconds,
        residual,
    })
}

fn plan(problem: &Problem, curve_speed: Option<f64>) -> Result<GridPlan, SolveFault> {
    let placement = Placement::new(problem);
    match (curve_speed, &problem.travel) {
        (Some(speed), _) => settled::plan(problem, &placement, speed),
        (None, Travel::Steady { velocity_m_per_s }) => settled::plan(problem, &placement, *velocity_m_per_s),
        (None, Travel::Alternating(law)) => Ok(harmonic::plan(problem, law)?.0),
        (None, _) => Ok(march::plan(problem, &placement)?.0),
    }
}

/// Median seconds of `solve` from `right`, timed alone each time; `solution` holds the last one's.
fn median(
    repeats: usize,
    before_each: &mut impl FnMut(),
    right: &[f64],
    solution: &mut [f64],
    mut solve: impl FnMut(&mut [f64]),
) -> f64 {
    let mut times = Vec::with_capacity(repeats.max(1));
    for _ in 0..repeats.max(1) {
        solution.copy_from_slice(right);
        before_each();
        times.push(timed(|| solve(solution)).1);
    }
    times.sort_by(f64::total_cmp);
    times[times.len() / 2]
}

/// What `work` gives, and the seconds that it took.
fn timed<T>(work: impl FnOnce() -> T) -> (T, f64) {
    let begin = Instant::now();
    let result = work();
    (result, begin.elapsed().as_secs_f64())
}
