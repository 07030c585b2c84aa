//! Coils at rest with alternating current against exact solutions.

use std::f64::consts::PI;

use lenzbore_solver::constants::MU0;
use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::outcome::{FrequencyPoint, FrequencyResponse, Outcome};
use lenzbore_solver::problem::{Accuracy, Alternating, Extent, Layer, Mover, Travel, Wall};
use lenzbore_solver::sources::{AxialField, Coil, Source as Field};

use super::{Banded, Check, Limits, Verdict};
use crate::references::{coil_impedance, half_figure, rod_alternating, sphere_alternating, tube_alternating};
use crate::{Error, cases};

pub(super) const CHECKS: &[Check] = &[
    Check::code_verification(
        "alternating-coil",
        "inductance of a coil, and what tubes of permeability 1 and 50 add to its impedance from 100 Hz to 100 kHz",
        &coil_impedance::SOURCE,
        coil,
    ),
    Check::code_verification(
        "alternating-rod",
        "field on the axis of a rod in an axial field",
        &rod_alternating::SOURCE,
        rod,
    ),
    Check::code_verification(
        "alternating-skin-depth",
        "skin depth against handbook figures, and the depth of 1/e read off the current density",
        &rod_alternating::DEPTH_SOURCE,
        depths,
    ),
    Check::code_verification(
        "alternating-tube",
        "field in the bore of a tube in an axial field",
        &tube_alternating::SOURCE,
        tube,
    ),
    Check::code_verification(
        "alternating-sphere",
        "field in the cavity of a hollow sphere, and its loss",
        &sphere_alternating::SOURCE,
        sphere,
    ),
];

/// A coil of ampere-turns N, radii and length in m, centred at the reference point.
fn winding(radii_m: (f64, f64), length_m: f64, ampere_turns: f64) -> Mover {
    let (inner_radius_m, outer_radius_m) = radii_m;
    cases::mover(vec![cases::part("coil", 0.0, Field::Coil { inner_radius_m, outer_radius_m, length_m, ampere_turns })])
}

fn solve(
    wall: Wall,
    mover: Mover,
    law: Alternating,
    monitor: &dyn Monitor,
) -> Result<(Outcome, FrequencyResponse), Error> {
    let mut outcome = lenzbore_solver::solve(&cases::question(wall, mover, Travel::Alternating(law)), monitor)?;
    let response = outcome.frequency.take().ok_or(Error::MissingFigure("frequency"))?;
    Ok((outcome, response))
}

fn coil(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    use coil_impedance as reference;
    let mut verdict = Verdict::default();
    for tube in reference::TABLE {
        let wall = cases::endless_tube(reference::TUBE_M, tube.conductivity_s_per_m, tube.permeability);
        let mover = winding(reference::COIL_M, reference::LENGTH_M, reference::TURNS);
        let law = Alternating::at(0.0, 1.0, tube.changes.map(|c| c.0).to_vec());
        let (_, response) = solve(wall, mover, law, monitor)?;
        let alone = response.inductance_alone;
        let figure = Banded { value: alone.value, band: alone.band };
        let limits = Limits { allowed: 1e-8 * reference::ALONE_H, known_within: 1e-11 * reference::ALONE_H };
        verdict.compare_banded("inductance alone", figure, reference::ALONE_H, limits, "H");
        for ((hertz, resistance, inductance), p) in tube.changes.into_iter().zip(&response.points) {
            let omega = 2.0 * PI * hertz;
            let allowed = 1e-5 * resistance.hypot(omega * inductance);
            let (dr, dx) = (p.resistance_change, p.reactance_change);
            let known_within = half_figure(resistance, reference::FIGURES);
            let figure = Banded { value: dr.value, band: dr.band };
            let what = format!("{}, {hertz} Hz, resistance change", tube.name);
            verdict.compare_banded(what, figure, resistance, Limits { allowed, known_within }, "ohm");
            let known_within = omega * half_figure(inductance, reference::FIGURES);
            let figure = Banded { value: dx.value, band: dx.band };
            let what = format!("{}, {hertz} Hz, reactance change", tube.name);
            verdict.compare_banded(what, figure, omega * inductance, Limits { allowed, known_within }, "ohm");
        }
    }
    Ok(verdict)
}

/// A coil so long that its field is uniform, around radius `around_m`.
fn long_coil(around_m: f64) -> Mover {
    let radii = (1.1 * around_m, 1.2 * around_m);
    winding(radii, 400.0 * radii.1, 1000.0)
}

/// Holds magnitude and phase of the shielding against a table.
fn hold(
    verdict: &mut Verdict,
    p: &FrequencyPoint,
    what: &str,
    (size, degrees): (f64, f64),
    within: f64,
) -> Result<(), Error> {
    let found = p.shielding.ok_or(Error::MissingFigure("shielding_factor"))?;
    verdict.compare(format!("{what}, magnitude"), found.magnitude(), size, within, "1");
    let turns = ((found.phase_rad().to_degrees() - degrees) / 360.0).round();
    let phase = found.phase_rad().to_degrees() - 360.0 * turns;
    verdict.compare(format!("{what}, phase"), phase, degrees, (within / size).to_degrees(), "deg");
    Ok(())
}

fn rod(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    use rod_alternating as reference;
    let radius = reference::RADIUS_M;
    let hertz = |ratio: f64| (ratio / radius).powi(2) / (PI * MU0 * reference::CONDUCTIVITY_S_PER_M);
    let wall = cases::endless_tube((0.0, radius), reference::CONDUCTIVITY_S_PER_M, 1.0);
    let law = Alternating::at(0.0, 1.0, reference::AXIS.map(|(ratio, ..)| hertz(ratio)).to_vec());
    let (_, response) = solve(wall, long_coil(radius), law, monitor)?;
    let mut verdict = Verdict::default();
    for ((ratio, size, degrees), p) in reference::AXIS.into_iter().zip(&response.points) {
        hold(&mut verdict, p, &format!("a/delta {ratio}, field on the axis"), (size, degrees), 2e-5)?;
    }
    Ok(verdict)
}

fn tube(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    use tube_alternating as reference;
    let wall = cases::endless_tube(reference::TUBE_M, reference::CONDUCTIVITY_S_PER_M, 1.0);
    let law = Alternating::at(0.0, 1.0, reference::BORE.map(|(hertz, ..)| hertz).to_vec());
    let (_, response) = solve(wall, long_coil(reference::TUBE_M.1), law, monitor)?;
    let mut verdict = Verdict::default();
    for ((hertz, size, degrees), p) in reference::BORE.into_iter().zip(&response.points) {
        hold(&mut verdict, p, &format!("{hertz} Hz, field in the bore"), (size, degrees), 2e-5)?;
    }
    Ok(verdict)
}

fn depths(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    use rod_alternating as reference;
    let mut verdict = Verdict::default();
    for (conductivity, hertz, handbook, depth) in reference::DEPTHS {
        let wall = cases::endless_tube((0.0, reference::THICK_RADIUS_M), conductivity, 1.0);
        let law = Alternating::at(0.0, 1.0, vec![hertz]);
        let (_, response) = solve(wall, long_coil(reference::THICK_RADIUS_M), law, monitor)?;
        let point = response.points.first().ok_or(Error::MissingFigure("frequency"))?;
        let what = format!("{:.2} MS/m, {hertz} Hz", 1e-6 * conductivity);
        let skin = point.skin_depth_m.ok_or(Error::MissingFigure("skin_depth"))?;
        verdict.compare(format!("{what}, skin depth"), skin, handbook, reference::HANDBOOK_WITHIN_M, "m");
        let read = point.current_depth.ok_or(Error::MissingFigure("current_depth"))?;
        let figure = Banded { value: read.value, band: read.band };
        let limits = Limits { allowed: 1e-4 * depth, known_within: 2e-5 * depth };
        verdict.compare_banded(format!("{what}, depth of 1/e"), figure, depth, limits, "m");
    }
    Ok(verdict)
}

/// Rings that stand for half of the sphere.
const RINGS: u32 = 32;

/// The shell as a stack of rings, equal in latitude, each with the shell's mean squared radii over its height; the equator at half the length.
fn stepped_shell(conductivity_s_per_m: f64) -> Wall {
    let (inner, outer) = sphere_alternating::SHELL_M;
    let edge = |k: u32| outer * (0.5 * PI * f64::from(k) / f64::from(RINGS)).sin();
    // Mean of max(0, radius^2 - z^2) over a height.
    let mean = |radius: f64, (from, to): (f64, f64)| {
        let integral = |z: f64| radius * radius * z - z * z * z / 3.0;
        let high = to.min(radius);
        if high > from { (integral(high) - integral(from)) / (to - from) } else { 0.0 }
    };
    let mut layers = Vec::new();
    for k in 0..RINGS {
        let span = (edge(k), edge(k + 1));
        let radii = (mean(inner, span).sqrt(), mean(outer, span).sqrt());
        let ring = cases::layer(&format!("upper {k}"), radii, conductivity_s_per_m, 1.0);
        layers.push(Layer { name: format!("lower {k}"), from_m: outer - span.1, to_m: outer - span.0, ..ring.clone() });
        layers.push(Layer { from_m: outer + span.0, to_m: outer + span.1, ..ring });
    }
    Wall { slots: 0, extent: Extent::Finite { length_m: 2.0 * outer }, layers }.with_faces_joined()
}

fn sphere(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    use sphere_alternating as reference;
    let mut verdict = Verdict::default();
    for (conductivity, hertz, (real, imaginary), loss) in reference::TABLE {
        let coil = long_coil(reference::SHELL_M.1);
        let law = Alternating::at(reference::SHELL_M.1, 1.0, vec![hertz]);
        let mut question = cases::question(stepped_shell(conductivity), coil.clone(), Travel::Alternating(law));
        question.accuracy = Accuracy { levels: Some(3), ..Accuracy::default() };
        let outcome = lenzbore_solver::solve(&question, monitor)?;
        let response = outcome.frequency.as_ref().ok_or(Error::MissingFigure("frequency"))?;
        let point = response.points.first().ok_or(Error::MissingFigure("frequency"))?;
        let found = point.shielding.ok_or(Error::MissingFigure("shielding_factor"))?;
        let what = format!("{:.0} MS/m, {hertz} Hz", 1e-6 * conductivity);
        verdict.compare(format!("{what}, field in the cavity, real"), found.real, real, 1e-3, "1");
        verdict.compare(format!("{what}, field in the cavity, imaginary"), found.imaginary, imaginary, 1e-3, "1");
        let power = super::field_fall::figure(&outcome, "dissipated_power")?;
        let applied = centre_field(&coil);
        let (watt, within) = (power.value / (applied * applied), 0.02 * loss);
        verdict.compare(format!("{what}, loss at 1 T"), watt, loss, within, "W");
    }
    Ok(verdict)
}

/// Flux density of the coils in their middle, T.
fn centre_field(coils: &Mover) -> f64 {
    let one = |source: &Field| match *source {
        Field::Coil { inner_radius_m, outer_radius_m, length_m, ampere_turns } => {
            let half_length_m = 0.5 * length_m;
            Coil { inner_radius_m, outer_radius_m, half_length_m, ampere_turns }.flux_density_z(0.0, 0.0)
        }
        _ => 0.0,
    };
    coils.parts.iter().map(|p| one(&p.source)).sum()
}
