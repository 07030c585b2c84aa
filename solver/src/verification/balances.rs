//! Action = reaction and work = heat + field energy, for every kind of mover and wall.

use super::cases::{answer, coil, dipole, endless, fall, finite, layer, magnet, problem, steady, traverse};
use crate::outcome::{Forces, Outcome};
use crate::problem::{Problem, Travel};

/// Widest band, relative to the force, within which the routes may agree: the default target, so that no band excuses all.
const WIDEST: f64 = 1e-4;

/// Prints how far the routes are apart, and says whether they agree within their band, and that within [`WIDEST`].
fn routes_agree(what: &str, outcome: &Outcome) -> bool {
    let Forces { wall_newton, mover_newton, stress_newton, band_newton, agree, .. } = outcome.forces.unwrap();
    let off = |f: f64| (f - wall_newton).abs();
    println!(
        "{what}: {wall_newton:.6} N, on the mover {:.1e}, by stress {:.1e}, band {:.1e}",
        off(mover_newton) / wall_newton,
        off(stress_newton) / wall_newton,
        band_newton / wall_newton
    );
    let within = off(mover_newton) <= band_newton && off(stress_newton) <= band_newton;
    assert_eq!(within, agree, "{what}: the answer misreports its own routes");
    wall_newton > 0.0 && within && band_newton < WIDEST * wall_newton
}

fn assert_routes(cases: Vec<(String, Problem)>) {
    let apart: Vec<String> = cases
        .into_iter()
        .filter(|(what, problem)| !routes_agree(what, &answer(problem)))
        .map(|(what, _)| what)
        .collect();
    assert!(apart.is_empty(), "routes apart: {apart:?}");
}

/// Movers and walls of every kind, slow and near the greatest drag.
fn settled() -> Vec<(String, Problem)> {
    let tube = || vec![layer(7.0, 8.5, 58.0, 1.0)];
    let stack = || vec![magnet(0.0, 5.0, 6.0, 1.2, -5.0), magnet(0.0, 5.0, 6.0, -1.2, 5.0)];
    let cases = [
        ("dipole", vec![dipole()], tube()),
        ("magnet", vec![magnet(0.0, 5.0, 8.0, 1.2, 0.0)], tube()),
        ("ring", vec![magnet(2.0, 5.5, 8.0, 1.2, 0.0)], tube()),
        ("coil", vec![coil(3.0, 5.0, 10.0, 900.0)], tube()),
        ("stack", stack(), tube()),
        ("two layers", stack(), vec![layer(7.0, 8.0, 58.0, 1.0), layer(9.0, 11.0, 20.0, 1.0)]),
        ("permeable layer", stack(), vec![layer(7.0, 8.0, 58.0, 1.0), layer(8.0, 10.0, 5.0, 100.0)]),
        ("magnets around a rod", vec![magnet(8.0, 12.0, 8.0, 1.2, 0.0)], vec![layer(0.0, 6.0, 58.0, 1.0)]),
    ];
    let wide_tube = endless(vec![layer(10.5, 12.5, 58.0, 1.0)]);
    let mut problems = vec![("dipole at 100 m/s".to_owned(), steady(wide_tube, vec![dipole()], 100.0))];
    for velocity in [0.5, 10.0] {
        for (what, parts, layers) in &cases {
            let problem = steady(endless(layers.clone()), parts.clone(), velocity);
            problems.push((format!("{what} at {velocity} m/s"), problem));
        }
    }
    problems
}

/// Traverses that end inside the wall, where currents still flow.
fn traverses() -> Vec<(String, Problem)> {
    let through = |what: &str, part, layer| {
        let problem = problem(finite(0.04, vec![layer]), vec![part], traverse(6.0, 70.0, 15.0), 3);
        (what.to_owned(), problem)
    };
    vec![
        through("magnet", magnet(0.0, 5.0, 6.0, 1.2, 0.0), layer(8.0, 10.0, 58.0, 1.0)),
        through("magnet around a rod", magnet(8.0, 12.0, 6.0, 1.2, 0.0), layer(0.0, 5.0, 58.0, 1.0)),
    ]
}

/// A fall with every other force at work.
fn resisted_fall() -> Problem {
    let mut law = fall(55.0, -15.0, 40.0);
    law.friction_newton = 0.01;
    law.air_drag_n_s2_per_m2 = 0.002;
    law.push_newton = -0.02;
    law.tilt_rad = 0.3;
    law.friction_coefficient = 0.1;
    law.spring_rate_n_per_m = 0.5;
    let wall = finite(0.04, vec![layer(8.0, 10.0, 58.0, 1.0)]);
    problem(wall, vec![magnet(0.0, 5.0, 6.0, 1.2, 0.0)], Travel::Free(law), 3)
}

/// J x B over the wall, the reaction on the mover, the stress in the gap: one force.
#[test]
fn settled_forces_agree_by_all_routes() {
    assert_routes(settled());
}

/// The same at the greatest drag of a traverse.
#[test]
fn forces_of_a_traverse_agree_by_all_routes() {
    assert_routes(traverses());
}

/// The same at the greatest drag of a fall.
#[test]
fn forces_of_a_fall_agree_by_all_routes() {
    assert_routes(vec![("fall".to_owned(), resisted_fall())]);
}

/// Settled fields: work at the drag = heat in the wall, and the wall's force = that of its reaction on the mover.
#[test]
fn settled_work_is_heat_and_action_is_reaction() {
    for (what, problem) in settled() {
        let outcome = answer(&problem);
        let (forces, left) = (outcome.forces.unwrap(), outcome.ledger.unwrap().imbalance_relative);
        let apart = (forces.mover_newton - forces.wall_newton).abs();
        println!("{what}: {left:.1e} of the work is missing, {:.1e} of the force", apart / forces.wall_newton);
        assert!(left.abs() < 1.5e-6, "{what}");
        assert!(apart <= forces.band_newton && apart < 4e-6 * forces.wall_newton, "{what}");
    }
}

/// A traverse: work = heat + what is still in the field, and the wall's force = that of its reaction on the mover.
#[test]
fn a_traverse_closes_its_ledger_and_action_is_reaction() {
    for (what, problem) in traverses() {
        let outcome = answer(&problem);
        let (forces, ledger) = (outcome.forces.unwrap(), outcome.ledger.unwrap());
        println!("{what}: {ledger:?}");
        assert!((forces.mover_newton - forces.wall_newton).abs() <= forces.band_newton, "{what}");
        assert!(ledger.field_energy > 1e-3 * ledger.work, "{what}: nothing in the field tests nothing");
        assert!(ledger.imbalance_relative.abs() < 1e-7, "{what}");
    }
}

/// A fall: what the mover's mechanical energy loses, less friction and air, = heat + what is still in the field.
#[test]
fn a_fall_closes_its_ledger() {
    let ledger = answer(&resisted_fall()).ledger.unwrap();
    println!("fall: {ledger:?}");
    assert!(ledger.work > 0.0 && ledger.imbalance_relative.abs() < 1e-7);
}
