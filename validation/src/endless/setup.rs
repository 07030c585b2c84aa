//! Wall and mover made ready: annuli, groups of currents by the region they lie in, and where to split the k axis.

use std::f64::consts::PI;

use lenzbore_solver::problem::{Mover, Wall};
use num_complex::Complex64;

use super::cascade::{Cascade, Wave};
use super::emitter::Emitter;
use super::region::{Region, regions};
use super::spectrum::{Amplitude, Spectrum};
use crate::Error;

/// An endless wall and the currents that travel along it.
///
/// Build it once and ask it for drag, field and current at any speed.
#[derive(Debug, Clone, PartialEq)]
pub struct Endless {
    pub(super) regions: Vec<Region>,
    pub(super) groups: Vec<Group>,
    pub(super) emitters: Vec<Emitter>,
}

/// Currents in one region of air.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Group {
    /// Index of the region.
    pub home: usize,
    /// Their amplitudes.
    pub spectrum: Spectrum,
}

impl Endless {
    /// Prepares wall and parts.
    ///
    /// # Errors
    /// A finite wall, impossible sizes, layers that overlap, a part that reaches into a layer.
    pub fn new(wall: &Wall, emitters: Vec<Emitter>) -> Result<Self, Error> {
        let regions = regions(wall)?;
        let mut homes = Vec::with_capacity(emitters.len());
        for emitter in &emitters {
            emitter.check()?;
            homes.push(home(&regions, emitter)?);
        }
        let mut groups = Vec::new();
        for i in 0..regions.len() {
            let members: Vec<&Emitter> =
                emitters.iter().zip(&homes).filter(|(_, home)| **home == i).map(|(e, _)| e).collect();
            if !members.is_empty() {
                groups.push(Group { home: i, spectrum: Spectrum::of(&members) });
            }
        }
        Ok(Self { regions, groups, emitters })
    }

    /// Prepares wall and mover.
    ///
    /// # Errors
    /// As [`Endless::new`].
    pub fn of(wall: &Wall, mover: &Mover) -> Result<Self, Error> {
        Self::new(wall, Emitter::all_of(mover))
    }

    /// Amplitudes of all groups at wavenumber k.
    pub(super) fn amplitudes(&self, k: f64) -> Result<Vec<Amplitude>, Error> {
        self.groups.iter().map(|g| g.spectrum.at(k)).collect()
    }

    /// Waves in all annuli, driven by `amplitudes`; in a group's own region its free field is left out.
    pub(super) fn waves(&self, cascade: &Cascade<'_>, amplitudes: &[Amplitude]) -> Vec<Wave> {
        let mut waves = cascade.silence();
        for (group, amplitude) in self.groups.iter().zip(amplitudes) {
            let span = (group.spectrum.innermost, group.spectrum.outermost);
            cascade.respond(group.home, *amplitude, span, &mut waves);
        }
        waves
    }

    /// s for settled fields of a mover at velocity v: in the wall's frame they vary as exp(i k (z - v t)).
    pub(super) fn settled(k: f64, velocity: f64) -> Complex64 {
        Complex64::new(0.0, -k * velocity)
    }

    /// Smallest distance between currents and the wall, m; infinite without either.
    pub(super) fn gap(&self) -> f64 {
        let each = self.groups.iter().map(|g| {
            let region = &self.regions[g.home];
            let below = if g.home > 0 { g.spectrum.innermost - region.inner } else { f64::INFINITY };
            below.min(region.outer - g.spectrum.outermost)
        });
        each.fold(f64::INFINITY, f64::min)
    }

    /// Extent of all currents along z, m.
    pub(super) fn length(&self) -> f64 {
        let low = self.groups.iter().map(|g| g.spectrum.span.0).fold(f64::INFINITY, f64::min);
        let high = self.groups.iter().map(|g| g.spectrum.span.1).fold(f64::NEG_INFINITY, f64::max);
        (high - low).max(0.0)
    }

    /// True where there is nothing to drag, or nothing to be dragged by.
    pub(super) fn is_idle(&self) -> bool {
        self.groups.is_empty() || !self.regions.iter().any(Region::conducts)
    }
}

/// Index of the region of air that holds the part with room to spare.
fn home(regions: &[Region], emitter: &Emitter) -> Result<usize, Error> {
    let (inner_m, outer_m) = emitter.radii();
    let fits = |r: &Region| !r.solid && (inner_m > r.inner || r.inner <= 0.0) && outer_m < r.outer;
    regions.iter().position(fits).ok_or_else(|| Error::PartInWall { part: emitter.name.clone(), inner_m, outer_m })
}

/// Where to split 0 < k < 45/decay for an integrand that falls as exp(-decay k) and swings with period 2 pi / length.
///
/// Towards k = 0 the panels shrink by factors of 4 over nine decades: a moving wall's integrand has a fractional power and a
/// logarithm there.
pub(super) fn breaks(decay: f64, length: f64) -> Vec<f64> {
    let top = 45.0 / decay;
    let widest = if length > 0.0 { 6.0 * PI / length } else { f64::INFINITY };
    let mut out = vec![0.0];
    let mut reached = 0.0;
    for i in (0..16).rev() {
        let end = top / 4.0_f64.powi(i);
        let pieces = ((end - reached) / widest).ceil().max(1.0);
        let width = (end - reached) / pieces;
        let mut k = reached + width;
        while k < end - 0.5 * width {
            out.push(k);
            k += width;
        }
        out.push(end);
        reached = end;
    }
    out
}
