//! The solver's closed forms of the movers' own fields.

use std::f64::consts::PI;

use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::sources::{AxialField, Source as Field};

use super::field_loop::loop_source;
use super::{Check, Kind, Verdict};
use crate::Error;
use crate::quadrature::GaussRule;
use crate::references::{half_decimal, half_figure, magnet_force, moving_loop, solenoid};

pub(super) const CHECKS: &[Check] = &[
    Check {
        name: "source-solenoid",
        about: "field and vector potential of a uniformly magnetised cylinder",
        kind: Kind::CodeVerification,
        source: &solenoid::SOURCE,
        run: cylinder,
    },
    Check {
        name: "source-force",
        about: "axial force between two coaxial magnets, from the field of one on the currents of the other",
        kind: Kind::CodeVerification,
        source: &magnet_force::SOURCE,
        run: force,
    },
    Check {
        name: "source-loop",
        about: "flux density of a current loop at rest in air, as a coil of small section",
        kind: Kind::CodeVerification,
        source: &moving_loop::SOURCE,
        run: current_loop,
    },
];

/// The rows at rest in a tube of permeability 1 are the loop's own field.
fn current_loop(_: &dyn Monitor) -> Result<Verdict, Error> {
    let source = loop_source();
    let mut verdict = Verdict::default();
    let lines = [
        (moving_loop::INSIDE_RADIUS_M, &moving_loop::INSIDE[0], moving_loop::INSIDE_ERROR_UT),
        (moving_loop::OUTSIDE_RADIUS_M, &moving_loop::OUTSIDE[0], 0.0),
    ];
    for (r, row, error) in lines {
        for (i, z) in moving_loop::HEIGHTS_M.into_iter().enumerate() {
            let pairs = [
                ("B_r", source.flux_density_r(r, z), row.radial_microtesla[i]),
                ("B_z", source.flux_density_z(r, z), row.axial_microtesla[i]),
            ];
            for (name, found, expected) in pairs {
                // The section of the coil changes the field 1 mm away by 2e-5.
                let allowed = half_figure(expected, moving_loop::FIGURES) + error + 2e-5 * expected.abs();
                let place = format!("{name}, r {} mm, z {} mm", 1e3 * r, 1e3 * z);
                verdict.compare(place, 1e6 * found, expected, allowed, "uT");
            }
        }
    }
    Ok(verdict)
}

/// A magnet of radius 1 m whose surface carries 1/mu0 A/m: its field comes in the units of the tables.
fn unit_magnet(length_m: f64) -> Field {
    Field::Magnet { inner_radius_m: 0.0, outer_radius_m: 1.0, length_m, remanence_tesla: 1.0 }
}

fn cylinder(_: &dyn Monitor) -> Result<Verdict, Error> {
    let mut verdict = Verdict::default();
    for (half_length, r, z, radial, axial) in solenoid::FIELD {
        let magnet = unit_magnet(2.0 * half_length);
        let place = format!("b = {half_length}, r = {r}, z = {z}");
        verdict.compare(format!("B_r, {place}"), magnet.flux_density_r(r, z), radial, 2.0 * half_decimal(12), "B0");
        verdict.compare(format!("B_z, {place}"), magnet.flux_density_z(r, z), axial, 2.0 * half_decimal(12), "B0");
    }
    for (half_length, r, z, potential) in solenoid::POTENTIAL {
        let found = unit_magnet(2.0 * half_length).psi(r, z) / r;
        verdict.compare(
            format!("A, b = {half_length}, r = {r}, z = {z}"),
            found,
            potential,
            2.0 * half_decimal(12),
            "B0 a",
        );
    }
    Ok(verdict)
}

fn force(_: &dyn Monitor) -> Result<Verdict, Error> {
    let mut verdict = Verdict::default();
    let rule = GaussRule::new(16);
    for (length, forces) in magnet_force::TABLE {
        let below = unit_magnet(length);
        for (gap, expected) in magnet_force::GAPS.into_iter().zip(forces) {
            // Pull on the sheet above: 2 pi R M integral of B_r over its length, panels doubling away from the gap.
            let (start, end) = (0.5 * length + gap, 1.5 * length + gap);
            let mut pull = 0.0;
            let (mut from, mut width) = (start, 0.5 * gap);
            while from < end {
                let to = end.min(from + width);
                pull += rule.on(from, to).map(|(z, w)| w * below.flux_density_r(1.0, z)).sum::<f64>();
                (from, width) = (to, 2.0 * width);
            }
            // M = 1/mu0 on both, so the unit mu0 M^2 R^2 is 1/mu0.
            let found = 2.0 * PI * pull;
            let what = format!("force, length {length}, gap {gap}");
            verdict.compare(what, found, expected, half_decimal(9), "mu0 M^2 R^2");
        }
    }
    Ok(verdict)
}
