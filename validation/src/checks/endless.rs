//! The Fourier-Bessel path against tables computed elsewhere.

use lenzbore_solver::constants::MU0;
use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::problem::{Mover, Wall};

use super::{Check, Verdict};
use crate::endless::{Emitter, Endless, Shape};
use crate::references::{
    cylinder_damping, dipole_drag, half_decimal, half_figure, magnet_speed, moving_loop, permeable_tube, stacks,
    thin_wall,
};
use crate::{Error, cases, endless};

pub(super) const CHECKS: &[Check] = &[
    Check::code_verification(
        "integral-dipole",
        "Fourier-Bessel drag of a dipole in a copper wall at four speeds",
        &dipole_drag::SOURCE,
        dipole,
    ),
    Check::code_verification(
        "integral-cylinders",
        "Fourier-Bessel damping coefficients of cylinder magnets in fifteen walls",
        &cylinder_damping::SOURCE,
        cylinders,
    ),
    Check::code_verification(
        "integral-dipole-coefficient",
        "Fourier-Bessel damping coefficient of a dipole against its closed form in thick walls",
        &cylinder_damping::SOURCE,
        dipole_coefficient,
    ),
    Check::code_verification(
        "integral-stacks",
        "Fourier-Bessel damping coefficients of magnet stacks",
        &stacks::SOURCE,
        stack_coefficients,
    ),
    Check::code_verification(
        "integral-speeds",
        "Fourier-Bessel drag of a magnet from 0.01 to 100 m/s",
        &magnet_speed::SOURCE,
        speeds,
    ),
    Check::code_verification(
        "integral-permeable",
        "Fourier-Bessel drag in tubes of permeability 1, 50 and 200",
        &permeable_tube::SOURCE,
        permeable,
    ),
    Check::code_verification(
        "integral-thin-wall",
        "Fourier-Bessel drag of a dipole in an ever thinner wall against the sheet's universal curve",
        &thin_wall::SOURCE,
        universal,
    ),
    Check::code_verification(
        "integral-moving-loop",
        "Fourier-Bessel flux density of a moving loop inside and outside a tube",
        &moving_loop::SOURCE,
        loop_field,
    ),
];

fn dipole(_: &dyn Monitor) -> Result<Verdict, Error> {
    let wall = cases::endless_tube(dipole_drag::WALL_M, dipole_drag::CONDUCTIVITY_S_PER_M, 1.0);
    let mover = cases::dipole(dipole_drag::MOMENT_A_M2);
    let mut verdict = Verdict::default();
    for (speed, drag) in dipole_drag::DRAG {
        let found = endless::drag(&wall, &mover, speed)?;
        verdict.compare(format!("drag at {speed} m/s"), found.value, drag, half_decimal(9), "N");
    }
    Ok(verdict)
}

fn mm(pair: (f64, f64)) -> (f64, f64) {
    (1e-3 * pair.0, 1e-3 * pair.1)
}

fn cylinders(_: &dyn Monitor) -> Result<Verdict, Error> {
    let mut verdict = Verdict::default();
    for line in cylinder_damping::TABLE {
        let wall = cases::endless_tube(mm(line.wall_mm), cylinder_damping::CONDUCTIVITY_S_PER_M, 1.0);
        let mover = cases::cylinder(cylinder_damping::RADIUS_M, 1e-3 * line.length_mm, cylinder_damping::REMANENCE_T);
        let found = endless::damping_coefficient(&wall, &mover)?.value;
        let what = format!("damping, length {} mm, wall {} to {} mm", line.length_mm, line.wall_mm.0, line.wall_mm.1);
        verdict.compare(what, found, line.damping, half_decimal(cylinder_damping::DECIMALS), "N s/m");
    }
    Ok(verdict)
}

fn dipole_coefficient(_: &dyn Monitor) -> Result<Verdict, Error> {
    let mut verdict = Verdict::default();
    for line in cylinder_damping::TABLE {
        let wall = cases::endless_tube(mm(line.wall_mm), cylinder_damping::CONDUCTIVITY_S_PER_M, 1.0);
        let volume = std::f64::consts::PI * cylinder_damping::RADIUS_M.powi(2) * 1e-3 * line.length_mm;
        let mover = cases::dipole(cylinder_damping::REMANENCE_T / MU0 * volume);
        let found = endless::damping_coefficient(&wall, &mover)?.value;
        let what = format!("damping, length {} mm, wall {} to {} mm", line.length_mm, line.wall_mm.0, line.wall_mm.1);
        verdict.compare(what, found, line.dipole, half_decimal(cylinder_damping::DECIMALS), "N s/m");
    }
    Ok(verdict)
}

fn stack_coefficients(_: &dyn Monitor) -> Result<Verdict, Error> {
    let wall = cases::endless_tube(magnet_speed::WALL_M, magnet_speed::CONDUCTIVITY_S_PER_M, 1.0);
    let mut verdict = Verdict::default();
    for stack in stacks::TABLE {
        let mover = cases::stack(
            magnet_speed::RADIUS_M,
            magnet_speed::LENGTH_M,
            magnet_speed::REMANENCE_T,
            stack.signs,
            1e-3 * stack.spacer_mm,
        );
        let found = endless::damping_coefficient(&wall, &mover)?.value;
        verdict.compare(stack.name, found, stack.damping, half_decimal(stacks::DECIMALS), "N s/m");
    }
    Ok(verdict)
}

fn speeds(_: &dyn Monitor) -> Result<Verdict, Error> {
    let wall = cases::endless_tube(magnet_speed::WALL_M, magnet_speed::CONDUCTIVITY_S_PER_M, 1.0);
    let mover = cases::cylinder(magnet_speed::RADIUS_M, magnet_speed::LENGTH_M, magnet_speed::REMANENCE_T);
    let mut verdict = Verdict::default();
    for (speed, drag) in magnet_speed::DRAG {
        let found = endless::drag(&wall, &mover, speed)?.value;
        verdict.compare(format!("drag at {speed} m/s"), found, drag, half_decimal(magnet_speed::DECIMALS), "N");
    }
    let found = endless::damping_coefficient(&wall, &mover)?.value;
    verdict.compare("damping coefficient", found, magnet_speed::DAMPING_COEFFICIENT, half_decimal(7), "N s/m");
    Ok(verdict)
}

fn permeable(_: &dyn Monitor) -> Result<Verdict, Error> {
    let mover = cases::cylinder(permeable_tube::RADIUS_M, permeable_tube::LENGTH_M, permeable_tube::REMANENCE_T);
    let mut verdict = Verdict::default();
    for (column, mu) in permeable_tube::PERMEABILITIES.into_iter().enumerate() {
        let wall = cases::endless_tube(permeable_tube::WALL_M, permeable_tube::CONDUCTIVITY_S_PER_M, mu);
        for (speed, drag) in permeable_tube::DRAG {
            let found = endless::drag(&wall, &mover, speed)?.value;
            let expected = drag[column];
            let allowed = 2.0 * half_figure(expected, permeable_tube::FIGURES);
            verdict.compare(format!("drag at {speed} m/s, permeability {mu}"), found, expected, allowed, "N");
        }
    }
    Ok(verdict)
}

/// f of a dipole (a = 10 mm) in a wall of thickness `ratio` a centred on radius a.
fn thin(loss: f64, ratio: f64) -> Result<f64, Error> {
    let (a, sigma, moment) = (10e-3, 58e6, 1.0);
    let wall: Wall = cases::endless_tube((a * (1.0 - 0.5 * ratio), a * (1.0 + 0.5 * ratio)), sigma, 1.0);
    let mover: Mover = cases::dipole(moment);
    let speed = loss / (MU0 * sigma * a * ratio);
    Ok(endless::drag(&wall, &mover, speed)?.value * a.powi(4) / (MU0 * moment * moment))
}

fn universal(_: &dyn Monitor) -> Result<Verdict, Error> {
    let mut verdict = Verdict::default();
    for (loss, drag) in thin_wall::CURVE {
        // The thickness comes in at first order: taken out over two thicknesses.
        let found = 2.0 * thin(loss, 1e-6)? - thin(loss, 2e-6)?;
        let what = format!("drag a^4/(mu0 m^2) at V = {loss}");
        verdict.compare(what, found, drag, half_figure(drag, thin_wall::FIGURES), "1");
    }
    let coefficient = 2.0 * thin(1e-6, 1e-6)? - thin(1e-6, 2e-6)?;
    verdict.compare("slope at V = 0", coefficient / 1e-6, thin_wall::SLOPE, 1e-9, "1");
    Ok(verdict)
}

fn loop_field(_: &dyn Monitor) -> Result<Verdict, Error> {
    let mut verdict = Verdict::default();
    let tables = [
        (moving_loop::INSIDE_RADIUS_M, moving_loop::INSIDE, moving_loop::INSIDE_ERROR_UT),
        (moving_loop::OUTSIDE_RADIUS_M, moving_loop::OUTSIDE, 1e-9),
    ];
    for (radius, rows, error) in tables {
        for row in rows {
            let wall =
                cases::endless_tube(moving_loop::TUBE_M, moving_loop::CONDUCTIVITY_S_PER_M, row.relative_permeability);
            let shape = Shape::Loop { radius_m: moving_loop::LOOP_RADIUS_M, current_a: 1.0 };
            let endless = Endless::new(&wall, vec![Emitter { name: "loop".into(), centre_m: 0.0, shape }])?;
            let found = endless.flux_density_along(row.speed_m_per_s, radius, &moving_loop::HEIGHTS_M)?;
            for (i, z) in moving_loop::HEIGHTS_M.into_iter().enumerate() {
                let place = format!(
                    "r {} mm, z {} mm, {} m/s, permeability {}",
                    1e3 * radius,
                    1e3 * z,
                    row.speed_m_per_s,
                    row.relative_permeability
                );
                let pairs = [
                    ("B_r", found[i].radial.value, row.radial_microtesla[i]),
                    ("B_z", found[i].axial.value, row.axial_microtesla[i]),
                ];
                for (name, value, expected) in pairs {
                    let allowed = half_figure(expected, moving_loop::FIGURES) + error;
                    verdict.compare(format!("{name}, {place}"), 1e6 * value, expected, allowed, "uT");
                }
            }
        }
    }
    Ok(verdict)
}
