//! Recoil permeability of the mover's own field, by the boundary integral of the solver.

use std::f64::consts::PI;

use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::problem::{Mover, Travel};
use lenzbore_solver::solve;

use super::{Check, Kind, Verdict};
use crate::Error;
use crate::cases;
use crate::endless::Endless;
use crate::references::{nagaoka, recoil};

pub(super) const CHECKS: &[Check] = &[
    Check {
        name: "recoil-moment",
        about: "what a weak recoil permeability does to the moment of cylinders from flat to long",
        kind: Kind::CodeVerification,
        source: &recoil::MOMENT,
        run: moments,
    },
    Check {
        name: "recoil-damping",
        about: "what recoil permeability takes from the damping coefficient, by the integral and by the field",
        kind: Kind::CrossCheck,
        source: &recoil::DAMPER,
        run: damping,
    },
];

fn moments(_: &dyn Monitor) -> Result<Verdict, Error> {
    let mut verdict = Verdict::default();
    for (ratio, coefficient) in nagaoka::TABLE.iter().filter(|(ratio, _)| (0.2..=10.0).contains(ratio)) {
        let (radius, length) = (0.01, 0.02 / ratio);
        let plain = cases::cylinder(radius, length, 1.0);
        let change = |step: f64| -> Result<f64, Error> {
            let mover = plain.clone().with_recoil(&[1.0 + step], 0.1 * radius)?;
            let filaments = mover.recoil.iter().flat_map(|recoil| recoil.filaments());
            let moment: f64 = filaments.map(|f| PI * f.radius_m * f.radius_m * f.tesla_metre).sum();
            Ok(moment / (PI * radius * radius * length * step))
        };
        let found = 2.0 * change(1e-4)? - change(2e-4)?;
        verdict.compare(format!("change of the moment, diameter/length {ratio}"), found, coefficient - 1.0, 2e-6, "1");
    }
    Ok(verdict)
}

fn damping(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let (inner, outer) = recoil::TUBE_M;
    let wall = cases::endless_tube((inner, outer), 58.0e6, 1.0);
    let plain = cases::cylinder(recoil::MAGNET_M.0, recoil::MAGNET_M.1, 1.3);
    let by_integral = |mover: &Mover| Ok::<_, Error>(Endless::of(&wall, mover)?.damping_coefficient()?.value);
    let by_field = |mover: &Mover| -> Result<f64, Error> {
        let problem = cases::question(wall.clone(), mover.clone(), Travel::Steady { velocity_m_per_s: 1.0e-3 });
        let outcome = solve(&problem, monitor)?;
        Ok(outcome.figures.iter().find(|f| f.name == "damping_coefficient").map_or(f64::NAN, |f| f.value))
    };
    let (integral, field) = (by_integral(&plain)?, by_field(&plain)?);
    let mut verdict = Verdict::default();
    for (mu, ratio) in recoil::TOO_HIGH {
        let mover = plain.clone().with_recoil(&[mu], 0.9 * (inner - recoil::MAGNET_M.0))?;
        let what = |how: &str| format!("damping without over with a recoil permeability of {mu}, {how}");
        let (with_integral, with_field) = (by_integral(&mover)?, by_field(&mover)?);
        verdict.compare(what("integral"), integral / with_integral, ratio, 5.0e-4, "1");
        verdict.compare(what("field"), field / with_field, ratio, 5.0e-4, "1");
        verdict.compare(
            format!("field against integral, {mu}"),
            with_field,
            with_integral,
            1.0e-5 * with_integral,
            "N s/m",
        );
    }
    Ok(verdict)
}
