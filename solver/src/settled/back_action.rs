//! What the wall's currents do to magnets of a recoil permeability: the magnets meshed, in their own frame.
//!
//! With psi = psi_s + psi_r and psi_s the mover's own field (recoil permeability in it), K psi_r - v C (psi_s + psi_r) = 0 holds with the
//! magnets' permeability in K, where it stands still. Solved on one grid with and without it, the heat of the wall tells what leaving it
//! out costs; J x B over the wall would not, for the magnetised magnets pull on the wall too.

use lenzbore_mesh::{Grid, Refinement, Regions};

use super::level::{SettledLevel, Wanted};
use super::levels::plan;
use crate::fault::SolveFault;
use crate::materials::Materials;
use crate::monitor::Monitor;
use crate::operators::Operators;
use crate::placement::{Placement, source_sizes};
use crate::problem::{Extent, Layer, Mover, Problem, Travel, Wall};

/// The relative change of the drag by the wall's back-action on the magnets' permeability, at each speed; settled fields, the
/// coarsest grid.
///
/// # Errors
/// See [`SolveFault`].
pub(crate) fn back_action(problem: &Problem, speeds: &[f64], monitor: &dyn Monitor) -> Result<Vec<f64>, SolveFault> {
    let fastest = speeds.iter().fold(0.0, |m: f64, v| m.max(v.abs()));
    if problem.mover.recoil.is_none() || fastest <= 0.0 {
        return Ok(vec![0.0; speeds.len()]);
    }
    let problem = Problem {
        wall: endless(&problem.wall),
        travel: Travel::Steady { velocity_m_per_s: fastest },
        ..problem.clone()
    };
    let speeds: Vec<f64> = speeds.iter().map(|v| v.abs()).collect();
    changes(&problem, &speeds, Refinement::COARSEST, monitor)
}

/// The relative changes on one grid.
///
/// # Errors
/// See [`SolveFault`].
fn changes(
    problem: &Problem,
    speeds: &[f64],
    refinement: Refinement,
    monitor: &dyn Monitor,
) -> Result<Vec<f64>, SolveFault> {
    let placement = Placement::new(problem);
    let velocity = speeds.iter().copied().fold(0.0, f64::max);
    let plan = plan(problem, &placement, velocity)?;
    let grid = plan.grid(refinement);
    let wall = Materials::new(&problem.wall, &Regions::new(&grid, &plan.rectangles));
    let wanted = Wanted { velocity, speeds, monitor };
    let meshed = Operators::with_magnets(grid.clone(), wall.clone(), &magnets(&grid, &problem.mover));
    let (rigid, yielding) = std::thread::scope(|scope| {
        let beside = scope.spawn(|| SettledLevel::on(problem, meshed, wanted));
        (SettledLevel::on(problem, Operators::new(grid, wall), wanted), beside.join())
    });
    let (rigid, yielding) = (rigid?, yielding.map_err(|_| SolveFault::NotFinite { what: "a level's thread" })??);
    let heat = |level: &SettledLevel, v: f64| -> Result<f64, SolveFault> {
        Ok(level.figures(&problem.mover, v, monitor)?.drag_by_heat)
    };
    let change = |&v: &f64| -> Result<f64, SolveFault> {
        let plain = if v > 0.0 { heat(&rigid, v)? } else { 0.0 };
        if plain > 0.0 { Ok(heat(&yielding, v)? / plain - 1.0) } else { Ok(0.0) }
    };
    speeds.iter().map(change).collect()
}

/// Relative permeability of every cell that lies in a magnet, 1 elsewhere.
pub(super) fn magnets(grid: &Grid, mover: &Mover) -> Vec<f64> {
    let mut mu_r = vec![1.0; grid.cells()];
    let Some(recoil) = &mover.recoil else { return mu_r };
    let middles = |nodes: &[f64]| nodes.windows(2).map(|n| 0.5 * (n[0] + n[1])).collect::<Vec<f64>>();
    let (r, z) = (middles(grid.r.nodes()), middles(grid.z.nodes()));
    for (part, &mu) in mover.parts.iter().zip(recoil.permeability()) {
        let (inner, outer, half) = source_sizes(&part.source);
        for (j, _) in z.iter().enumerate().filter(|(_, z)| (*z - part.centre_m).abs() < half) {
            for (i, _) in r.iter().enumerate().filter(|(_, r)| **r > inner && **r < outer) {
                mu_r[grid.cell(i, j)] = mu;
            }
        }
    }
    mu_r
}

/// The wall without ends: a wall of sections by the layers at the height where most conducts.
fn endless(wall: &Wall) -> Wall {
    let mut heights: Vec<f64> = wall.layers.iter().flat_map(|l| [l.from_m, l.to_m]).collect();
    heights.sort_by(f64::total_cmp);
    let at = |z: f64| -> Vec<_> {
        let through = |l: &&Layer| wall.extent == Extent::Endless || (l.from_m < z && z < l.to_m);
        wall.layers.iter().filter(through).cloned().collect()
    };
    let sheet = |layers: &[Layer]| -> f64 { layers.iter().map(|l| l.conductivity_s_per_m * l.thickness_m()).sum() };
    let sections = heights.windows(2).map(|h| at(0.5 * (h[0] + h[1])));
    let mut layers = sections.max_by(|a, b| sheet(a).total_cmp(&sheet(b))).unwrap_or_default();
    for layer in &mut layers {
        (layer.from_m, layer.to_m) = (0.0, 0.0);
    }
    Wall { extent: Extent::Endless, layers, ..wall.clone() }
}

#[cfg(test)]
mod tests {
    #![allow(
        clippy::unwrap_used,
        clippy::print_stdout,
        reason = "tests may stop at the first fault and print what they measured"
    )]
    use super::*;
    use crate::direct::DirectPlan;
    use crate::extrapolate::extrapolate;
    use crate::linear::Pattern;
    use crate::monitor::Unwatched;
    use crate::operators::add_product;
    use crate::problem::{Accuracy, Outline, Part, SnapshotPlan};
    use crate::sources::{AxialField, Source};
    use approx::assert_relative_eq;

    /// Copper tube 25/28 mm, 58 MS/m, magnet 22 x 12 mm: the damper of an independent study.
    fn problem(mu: f64) -> Problem {
        let layer = Layer {
            name: "tube".to_owned(),
            inner_radius_m: 12.5e-3,
            outer_radius_m: 14e-3,
            from_m: 0.0,
            to_m: 0.0,
            conductivity_s_per_m: 58e6,
            relative_permeability: 1.0,
        };
        let (outer_radius_m, length_m) = (11e-3, 12e-3);
        let source = Source::Magnet { inner_radius_m: 0.0, outer_radius_m, length_m, remanence_tesla: 1.3 };
        let outline = Outline { inner_radius_m: 0.0, outer_radius_m, length_m };
        let part = Part { name: "M".to_owned(), centre_m: 0.0, source, outline, coercivity_a_per_m: None };
        let problem = Problem {
            wall: Wall { slots: 0, extent: Extent::Endless, layers: vec![layer] },
            mover: Mover { parts: vec![part], mass_kg: None, recoil: None },
            travel: Travel::Steady { velocity_m_per_s: 1.0 },
            accuracy: Accuracy::default(),
            snapshots: SnapshotPlan::None,
            stations: Vec::new(),
            warming: None,
        };
        problem.with_recoil(&[mu]).unwrap()
    }

    /// The zero-speed damping coefficient with the magnet meshed and its recoil permeability in K alone:
    /// K psi_r = -(K - K0)(psi_1 - Br r^2/2), psi_1 the closed form of recoil permeability 1, Br r^2/2 its remanence inside.
    fn by_grid(problem: &Problem, refinement: Refinement) -> f64 {
        let plan = plan(problem, &Placement::new(problem), 0.0).unwrap();
        let grid = plan.grid(refinement);
        let wall = Materials::new(&problem.wall, &Regions::new(&grid, &plan.rectangles));
        let mu_r = magnets(&grid, &problem.mover);
        let excess = crate::operators::excess(&grid, &mu_r);
        let operators = Operators::with_magnets(grid, wall, &mu_r);
        let (grid, plain) = (&operators.grid, problem.mover.without_recoil());
        let mut driving = vec![0.0; grid.nodes()];
        for (j, &z) in grid.z.nodes().iter().enumerate().filter(|(_, z)| z.abs() < 7e-3) {
            for (i, &r) in grid.r.nodes().iter().enumerate().filter(|(_, r)| **r < 12e-3) {
                driving[grid.node(i, j)] = plain.psi(r, z) - 0.5 * 1.3 * r * r;
            }
        }
        let mut psi = vec![0.0; operators.unknowns()];
        add_product(&excess, &driving, -1.0, &mut psi);
        // The layered solver is made for currents in the wall.
        let pattern = Pattern::new(&operators.stiffness).unwrap();
        let mut factor = DirectPlan::Sparse(pattern).factor(&operators, 0.0).unwrap();
        factor.solve_in_place(&mut psi);
        let (psi, z) = (operators.spread(&psi), grid.z.nodes());
        let mut damping = 0.0;
        for row in &operators.wall.rows {
            let r = grid.r.nodes()[row.i];
            for k in 0..row.count {
                let j = row.j + k;
                let added = (psi[grid.node(row.i, j + 1)] - psi[grid.node(row.i, j - 1)]) / (z[j + 1] - z[j - 1]);
                let slope = added - r * plain.flux_density_r(r, z[j]);
                damping += operators.wall.conductance[row.start + k] * slope * slope;
            }
        }
        2.0 * std::f64::consts::PI * damping
    }

    /// The same by the boundary integral.
    fn by_integral(problem: &Problem, refinement: Refinement) -> f64 {
        let plan = plan(problem, &Placement::new(problem), 0.0).unwrap();
        let wanted = Wanted { velocity: 0.0, speeds: &[0.0], monitor: &Unwatched };
        SettledLevel::new(problem, &plan, plan.grid(refinement), wanted).unwrap().damping_coefficient()
    }

    #[test]
    fn permeability_in_the_stiffness_gives_what_the_boundary_integral_gives() {
        // Differences measured 5.5e-7, 3.7e-6 and 2e-4: the corners of a magnet break the grid's even powers the more the higher mu.
        for (mu, allowed) in [(1.05, 2e-6), (1.2, 1e-5), (4.0, 5e-4)] {
            let problem = problem(mu);
            let refinements = Refinement::first(4);
            let factors: Vec<f64> = refinements.iter().map(|f| f.factor()).collect();
            let grid: Vec<f64> = refinements.iter().map(|&f| by_grid(&problem, f)).collect();
            let integral: Vec<f64> = refinements.iter().map(|&f| by_integral(&problem, f)).collect();
            let off: Vec<f64> = grid.iter().zip(&integral).map(|(g, i)| g / i - 1.0).collect();
            let (a, b) = (extrapolate(&factors, &grid), extrapolate(&factors, &integral));
            println!("{mu}: {a} and {b} N s/m, off {:.1e}; by level {off:?}", a / b - 1.0);
            assert_relative_eq!(a, b, max_relative = allowed);
        }
    }

    /// 1.05: what leaving it out adds at 5 and 30 m/s, 0.1 % and 1.5 % (an independent study of this damper, its magnet meshed;
    /// tolerance: the digits given).
    #[test]
    fn val_the_back_action_of_a_known_damper() {
        let problem = problem(1.05);
        let found = back_action(&problem, &[0.01, 5.0, 30.0], &Unwatched).unwrap();
        let high: Vec<f64> = found.iter().map(|f| 1.0 / (1.0 + f) - 1.0).collect();
        println!("{high:?}");
        assert!(high[0].abs() < 1e-6, "{high:?}");
        assert_relative_eq!(high[1], 0.001, epsilon = 5e-4);
        assert_relative_eq!(high[2], 0.015, epsilon = 5e-4);
        // The coarsest grid gives 1 % less than the next.
        let next = changes(&problem, &[30.0], Refinement::first(3)[1], &Unwatched).unwrap();
        assert_relative_eq!(found[2], next[0], max_relative = 0.03);
    }
}
