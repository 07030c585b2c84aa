//! The wall as rings coupled by mutual and self-inductance: L di/dt + R i = -v df/dz.
//!
//! L by Maxwell's mutual inductance of coaxial loops averaged over both sections (J. C. Maxwell, A Treatise on Electricity and
//! Magnetism, art. 701; E. B. Rosa, F. W. Grover, Bulletin of the Bureau of Standards 8, 1-237 (1912); from memory). Two cuttings of
//! the same proportions are extrapolated over the square of the ring's size. Relative permeability 1 is taken everywhere.

use super::path::{Instant, ModelFigure, Path, Simulated};
use crate::fault::SolveFault;
use crate::monitor::Monitor;
use crate::outcome::Stop;
use crate::placement::Placement;
use crate::problem::{Extent, Problem, Travel, Traverse, Wall};
use crate::rings::{Cutting, Moment, Passage, RingCircuit, extrapolate, follow, pass};

/// The finer cutting's refinement over the coarser.
const FINER: f64 = 1.5;
/// Most rings of the finer cutting: their modes take seconds.
const MOST_RINGS: f64 = 600.0;

/// What coupled rings make of a case.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Coupled {
    /// Series of the finer cutting, figures extrapolated.
    pub simulated: Simulated,
    /// Rings of the finer cutting.
    pub rings: usize,
}

/// Marches the problem's travel among coupled rings.
pub(super) fn coupled(problem: &Problem, monitor: &dyn Monitor) -> Result<Coupled, SolveFault> {
    let placement = Placement::new(problem);
    let wall = unmagnetic(&problem.wall);
    let coarse = cutting(&wall, &placement)?;
    let mut runs = Vec::new();
    for (across, pitch_m) in [coarse, (coarse.0 / 2 * 3, coarse.1 / FINER)] {
        let circuit = RingCircuit::new(&wall, Cutting { across, pitch_m })?;
        let step = 0.5 * placement.wavelength_m.min(pitch_m);
        let path = travel(problem, &circuit, step, monitor)?;
        runs.push((circuit.rings(), path.simulated(problem)));
    }
    let Some((rings, fine)) = runs.pop() else { return Err(SolveFault::Unsuited("no cutting of the wall")) };
    let figures = fine.figures.iter().map(|f| limit(f, runs.first().map(|r| &r.1))).collect();
    Ok(Coupled { simulated: Simulated { figures, ..fine }, rings })
}

/// The limit of ever finer rings, where both cuttings have the figure.
fn limit(fine: &ModelFigure, coarse: Option<&Simulated>) -> ModelFigure {
    let coarse = coarse.and_then(|s| s.figures.iter().find(|f| f.name == fine.name));
    let value = coarse.map_or(fine.value, |c| extrapolate(&[1.0, 1.0 / FINER], &[c.value, fine.value]).value);
    ModelFigure { value, ..fine.clone() }
}

/// The same wall with relative permeability 1.
pub(super) fn unmagnetic(wall: &Wall) -> Wall {
    let mut wall = wall.clone();
    for layer in &mut wall.layers {
        layer.relative_permeability = 1.0;
    }
    wall
}

/// Rings across each layer and their length for the coarser cutting; the finer has half as many again each way.
fn cutting(wall: &Wall, placement: &Placement) -> Result<(usize, f64), SolveFault> {
    let Extent::Finite { .. } = wall.extent else {
        return Err(SolveFault::Unsuited("coupled rings need the wall's length"));
    };
    let conducting = || wall.layers.iter().filter(|l| l.conductivity_s_per_m > 0.0);
    let thickest = conducting().map(|l| l.thickness_m()).fold(0.0, f64::max);
    let across = if thickest > 1.5 * placement.wavelength_m { 4 } else { 2 };
    let length: f64 = conducting().map(|l| l.to_m - l.from_m).sum();
    let rows = FINER * across as f64;
    let pitch = (0.5 * placement.wavelength_m).max(FINER * rows * length / MOST_RINGS);
    Ok((across, pitch))
}

fn travel(problem: &Problem, circuit: &RingCircuit, step: f64, monitor: &dyn Monitor) -> Result<Path, SolveFault> {
    match &problem.travel {
        Travel::Traverse(law) => Ok(passage(law, &pass(circuit, &problem.mover, law, step)?)),
        Travel::Free(law) => {
            let (moments, stop, dissipated) = follow(circuit, &problem.mover, law, step, monitor)?;
            Ok(Path { instants: moments.iter().map(instant).collect(), stop, dissipated })
        }
        Travel::Steady { .. } | Travel::Sine(_) | Travel::Table(_) | Travel::Alternating(_) => {
            Err(SolveFault::Unsuited("coupled rings need a passage"))
        }
    }
}

fn passage(law: &Traverse, found: &Passage) -> Path {
    let speed = law.speed_m_per_s;
    let velocity = speed * (law.to_m - law.from_m).signum();
    let at = |&(z, drag): &(f64, f64)| Instant {
        time: (z - law.from_m).abs() / speed,
        z,
        v: velocity,
        drag,
        heat: drag * speed,
        ..Instant::default()
    };
    let instants = found.drag.iter().map(at).collect();
    Path { instants, stop: Stop::EndOfTravel, dissipated: found.heat_joule + found.field_energy_joule }
}

fn instant(m: &Moment) -> Instant {
    let sense = if m.v.abs() > 0.0 { m.v.signum() } else { 0.0 };
    Instant {
        time: m.time,
        z: m.z,
        v: m.v,
        acceleration: m.a,
        drag: -m.force * sense,
        heat: m.heat_rate,
        current: None,
    }
}
