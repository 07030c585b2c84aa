//! Free-space amplitudes of groups of coaxial currents.
//!
//! A filament loop of radius R and current I has A_k(r) = (mu0 I R / pi) I1(k r_<) K1(k r_>). Superposing loops gives, at
//! radii beyond all currents, A_k = S_out(k) K1(k r), and within all of them A_k = S_in(k) I1(k r). Over a length L the sum
//! brings the factor 2 sin(kL/2)/k, a centre at z_c the factor exp(-i k z_c). Limit of a small loop: a dipole of moment m has
//! S_out = mu0 m k / (2 pi^2).

use std::f64::consts::PI;

use lenzbore_solver::constants::MU0;
use lenzbore_solver::sources::Source;
use num_complex::Complex64;

use super::bessel::{Scaled, scaled_i1, scaled_k1};
use super::emitter::{Emitter, Shape};
use crate::Error;
use crate::quadrature::GaussRule;

/// Both amplitudes at one k, scaled so that neither over- nor underflows.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Amplitude {
    /// S_out exp(-k outermost).
    pub outward: Complex64,
    /// S_in exp(+k innermost).
    pub inward: Complex64,
}

/// All currents that share one region of air.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Spectrum {
    bands: Vec<Band>,
    rule: GaussRule,
    /// Smallest radius of the currents, m.
    pub innermost: f64,
    /// Largest radius of the currents, m.
    pub outermost: f64,
    /// Lowest and highest end, m.
    pub span: (f64, f64),
}

/// Currents that share a radial profile.
#[derive(Debug, Clone, PartialEq)]
struct Band {
    profile: Profile,
    axial: Vec<Axial>,
}

#[derive(Debug, Clone, Copy, PartialEq)]
enum Profile {
    /// On the axis.
    Point,
    /// On a cylinder of this radius.
    Sheet { radius: f64 },
    /// Spread evenly over these radii.
    Thick { inner: f64, outer: f64 },
}

/// Strength and axial spread: current (A) of a loop where `length` is 0, else current a length (A/m); of a point, its moment.
#[derive(Debug, Clone, Copy, PartialEq)]
struct Axial {
    strength: f64,
    centre: f64,
    length: f64,
}

impl Axial {
    /// strength * integral of exp(-i k z) over the length.
    fn factor(&self, k: f64) -> Complex64 {
        let spread = if self.length > 0.0 { 2.0 * (0.5 * k * self.length).sin() / k } else { 1.0 };
        Complex64::new(0.0, -k * self.centre).exp() * (self.strength * spread)
    }
}

impl Spectrum {
    /// Collects parts; `emitters` must not be empty.
    pub fn of(emitters: &[&Emitter]) -> Self {
        let mut spectrum = Self {
            bands: Vec::new(),
            rule: GaussRule::new(16),
            innermost: f64::INFINITY,
            outermost: 0.0,
            span: (f64::INFINITY, f64::NEG_INFINITY),
        };
        for emitter in emitters {
            let (inner, outer) = emitter.radii();
            spectrum.innermost = spectrum.innermost.min(inner);
            spectrum.outermost = spectrum.outermost.max(outer);
            let half = emitter.half_length();
            spectrum.span.0 = spectrum.span.0.min(emitter.centre_m - half);
            spectrum.span.1 = spectrum.span.1.max(emitter.centre_m + half);
            spectrum.add(emitter);
        }
        spectrum
    }

    fn add(&mut self, emitter: &Emitter) {
        let (centre, length) = (emitter.centre_m, 2.0 * emitter.half_length());
        match emitter.shape {
            Shape::Loop { radius_m, current_a } => {
                self.put(Profile::Sheet { radius: radius_m }, Axial { strength: current_a, centre, length });
            }
            Shape::Source(Source::Dipole { moment_a_m2 }) => {
                self.put(Profile::Point, Axial { strength: moment_a_m2, centre, length });
            }
            Shape::Source(Source::Magnet { inner_radius_m, outer_radius_m, remanence_tesla, .. }) => {
                let strength = remanence_tesla / MU0;
                self.put(Profile::Sheet { radius: outer_radius_m }, Axial { strength, centre, length });
                if inner_radius_m > 0.0 {
                    let strength = -strength;
                    self.put(Profile::Sheet { radius: inner_radius_m }, Axial { strength, centre, length });
                }
            }
            Shape::Source(Source::Coil { inner_radius_m, outer_radius_m, ampere_turns, .. }) => {
                let profile = Profile::Thick { inner: inner_radius_m, outer: outer_radius_m };
                self.put(profile, Axial { strength: ampere_turns / length, centre, length });
            }
        }
    }

    fn put(&mut self, profile: Profile, axial: Axial) {
        match self.bands.iter_mut().find(|b| b.profile == profile) {
            Some(band) => band.axial.push(axial),
            None => self.bands.push(Band { profile, axial: vec![axial] }),
        }
    }

    /// Amplitudes at wavenumber k > 0.
    pub fn at(&self, k: f64) -> Result<Amplitude, Error> {
        let mut sum = Amplitude { outward: Complex64::ZERO, inward: Complex64::ZERO };
        for band in &self.bands {
            let axial: Complex64 = band.axial.iter().map(|a| a.factor(k)).sum();
            let (outward, inward) = band.profile.strength(k, self.innermost, self.outermost, &self.rule)?;
            sum.outward += axial * outward;
            sum.inward += axial * inward;
        }
        Ok(sum)
    }

    /// A_k and (1/r) d(r A_k)/dr of the free-space field at radius r, where no current flows.
    pub fn free(&self, k: f64, r: f64) -> Result<(Complex64, Complex64), Error> {
        let (mut potential, mut curl) = (Complex64::ZERO, Complex64::ZERO);
        for band in &self.bands {
            let axial: Complex64 = band.axial.iter().map(|a| a.factor(k)).sum();
            let (inner, outer) = band.profile.radii();
            let (outward, inward) = band.profile.strength(k, inner, outer, &self.rule)?;
            if r >= outer {
                let b = Scaled::decaying(Complex64::from(k * r))?;
                let wave = axial * (outward * (-k * (r - outer)).exp());
                potential += wave * b.k1;
                curl -= wave * b.k0 * k;
            } else {
                let b = Scaled::regular(Complex64::from(k * r))?;
                let wave = axial * (inward * (-k * (inner - r)).exp());
                potential += wave * b.i1;
                curl += wave * b.i0 * k;
            }
        }
        Ok((potential, curl))
    }

    /// Distance from radius r to the nearest current, negative within a thick band.
    pub fn clearance(&self, r: f64) -> f64 {
        let each = self.bands.iter().map(|b| b.profile.radii()).map(|(inner, outer)| (inner - r).max(r - outer));
        each.fold(f64::INFINITY, f64::min)
    }
}

impl Profile {
    fn radii(self) -> (f64, f64) {
        match self {
            Self::Point => (0.0, 0.0),
            Self::Sheet { radius } => (radius, radius),
            Self::Thick { inner, outer } => (inner, outer),
        }
    }

    /// S_out exp(-k outermost) and S_in exp(k innermost) of a unit strength.
    fn strength(self, k: f64, innermost: f64, outermost: f64, rule: &GaussRule) -> Result<(f64, f64), Error> {
        match self {
            Self::Point => Ok((MU0 * k / (2.0 * PI * PI) * (-k * outermost).exp(), 0.0)),
            Self::Sheet { radius } => ring(k, radius, innermost, outermost),
            Self::Thick { inner, outer } => {
                // 16 points resolve exp(+-12) over a panel to round-off.
                let panels = (k * (outer - inner) / 12.0).ceil().clamp(1.0, 64.0);
                let width = (outer - inner) / panels;
                let mut from = inner;
                let mut sum = (0.0, 0.0);
                while from < outer - 0.5 * width {
                    for (radius, weight) in rule.on(from, from + width) {
                        let (outward, inward) = ring(k, radius, innermost, outermost)?;
                        sum.0 += weight * outward;
                        sum.1 += weight * inward;
                    }
                    from += width;
                }
                Ok((sum.0 / (outer - inner), sum.1 / (outer - inner)))
            }
        }
    }
}

/// Both amplitudes of a unit current loop.
fn ring(k: f64, radius: f64, innermost: f64, outermost: f64) -> Result<(f64, f64), Error> {
    let scale = MU0 * radius / PI;
    let outward = scale * scaled_i1(k * radius)? * (k * (radius - outermost)).exp();
    let inward = scale * scaled_k1(k * radius)? * (k * (innermost - radius)).exp();
    Ok((outward, inward))
}
