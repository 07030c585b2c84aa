//! One wavenumber through all annuli: surface admittances from both ends, then the waves.
//!
//! In an annulus with radial wavenumber q and eta = q/mu, A = c_i I1(q r) + c_k K1(q r) and H = eta (c_i I0 - c_k K0). Looking
//! outward, the admittance Y = H/A at a face stands for everything beyond it: at the last face Y = -eta K0/K1, and through an
//! annulus c_i/c_k = rho = (eta K0 + Y K1)/(eta I0 - Y I1), taken at its outer face. Looking inward, Y = eta I0/I1 at the
//! first face and c_k/c_i = (eta I0 - Y I1)/(eta K0 + Y K1), taken at the inner face. In the region of the sources, with
//! amplitudes S_out, S_in and both reflections G_o = rho, G_i: total outward wave P = (S_out + G_i S_in)/(1 - G_i G_o), total
//! inward wave Q = (S_in + G_o S_out)/(1 - G_i G_o). By the Wronskian A = P/(r (k I0 - mu0 Y I1)) at the outer face and
//! A = Q/(r (k K0 + mu0 Y K1)) at the inner face: no cancellation anywhere.
//!
//! Every wave is kept relative to the face where it is largest, so only decaying exponentials occur.

use lenzbore_solver::constants::MU0;
use num_complex::Complex64;

use super::bessel::Scaled;
use super::region::Region;
use super::spectrum::Amplitude;
use crate::Error;

/// The waves of one annulus: A(r) = inward exp(-kappa (outer - r)) Ie1(q r) + outward exp(-q (r - inner)) Ke1(q r), kappa = Re q.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Wave {
    /// Coefficient of the wave that decays towards the axis.
    pub inward: Complex64,
    /// Coefficient of the wave that decays away from the axis.
    pub outward: Complex64,
}

impl Wave {
    const NONE: Self = Self { inward: Complex64::ZERO, outward: Complex64::ZERO };
}

/// Bessel functions at both faces of every annulus, at one k and one s.
pub(super) struct Cascade<'a> {
    regions: &'a [Region],
    k: f64,
    q: Vec<Complex64>,
    inner: Vec<Scaled>,
    outer: Vec<Scaled>,
}

impl<'a> Cascade<'a> {
    /// Fields that vary as exp(i k z + s t) in the wall's frame.
    pub fn new(regions: &'a [Region], k: f64, s: Complex64) -> Result<Self, Error> {
        let mut cascade = Self { regions, k, q: Vec::new(), inner: Vec::new(), outer: Vec::new() };
        let none = Scaled { i0: Complex64::ZERO, i1: Complex64::ZERO, k0: Complex64::ZERO, k1: Complex64::ZERO };
        for region in regions {
            let q = region.q(k, s);
            cascade.q.push(q);
            cascade.inner.push(if region.inner > 0.0 { Scaled::at(q * region.inner)? } else { none });
            cascade.outer.push(if region.outer.is_finite() { Scaled::at(q * region.outer)? } else { none });
        }
        Ok(cascade)
    }

    /// Adds to `waves` the response to sources in region `home`; there, only what the wall sends back.
    pub fn respond(&self, home: usize, amplitude: Amplitude, span: (f64, f64), waves: &mut [Wave]) {
        let region = &self.regions[home];
        let beyond = (home + 1 < self.regions.len()).then(|| self.outward_admittance(home));
        let within = (home > 0).then(|| self.inward_admittance(home));
        let k = self.k;
        let back_out = beyond.map_or(Complex64::ZERO, |y| reflect_outer(&self.outer[home], self.eta(home), y));
        let back_in = within.map_or(Complex64::ZERO, |y| reflect_inner(&self.inner[home], self.eta(home), y));
        // exp(-k x) with x the path of each reflected wave.
        let path = |x: f64| if x.is_finite() { (-k * x).exp() } else { 0.0 };
        let loss = 1.0 - back_in * back_out * path(2.0 * (region.outer - region.inner));
        let (innermost, outermost) = span;
        let from_below = path(innermost + outermost - 2.0 * region.inner);
        let from_above = path(2.0 * region.outer - innermost - outermost);
        let total_out = (amplitude.outward + back_in * amplitude.inward * from_below) / loss;
        let total_in = (amplitude.inward + back_out * amplitude.outward * from_above) / loss;
        if let Some(y) = beyond {
            let gap = path(region.outer - outermost);
            waves[home].inward += back_out * total_out * gap;
            let face = &self.outer[home];
            let potential = total_out * gap / (region.outer * (k * face.i0 - MU0 * y * face.i1));
            self.send_outward(home + 1, potential, waves);
        }
        if let Some(y) = within {
            let gap = path(innermost - region.inner);
            waves[home].outward += back_in * total_in * gap;
            let face = &self.inner[home];
            let potential = total_in * gap / (region.inner * (k * face.k0 + MU0 * y * face.k1));
            self.send_inward(home - 1, potential, waves);
        }
    }

    /// Zero waves, one an annulus.
    pub fn silence(&self) -> Vec<Wave> {
        vec![Wave::NONE; self.regions.len()]
    }

    /// A and H at the inner face of annulus `i`.
    pub fn at_inner(&self, i: usize, wave: Wave) -> (Complex64, Complex64) {
        let through = (-self.q[i].re * self.width(i)).exp();
        self.combine(i, &self.inner[i], wave.inward * through, wave.outward)
    }

    /// A and H at the outer face of annulus `i`.
    pub fn at_outer(&self, i: usize, wave: Wave) -> (Complex64, Complex64) {
        let through = (-self.q[i] * self.width(i)).exp();
        self.combine(i, &self.outer[i], wave.inward, wave.outward * through)
    }

    /// A and H at radius r within annulus `i`.
    pub fn at_radius(&self, i: usize, wave: Wave, r: f64) -> Result<(Complex64, Complex64), Error> {
        let (region, q) = (&self.regions[i], self.q[i]);
        let bessel = match (i == 0, region.outer.is_finite()) {
            (true, _) => Scaled::regular(q * r)?,
            (false, false) => Scaled::decaying(q * r)?,
            (false, true) => Scaled::at(q * r)?,
        };
        let inward =
            if region.outer.is_finite() { wave.inward * (-q.re * (region.outer - r)).exp() } else { Complex64::ZERO };
        let outward = if i > 0 { wave.outward * (-q * (r - region.inner)).exp() } else { Complex64::ZERO };
        Ok(self.combine(i, &bessel, inward, outward))
    }

    /// Radial wavenumber of annulus `i`.
    pub fn q(&self, i: usize) -> Complex64 {
        self.q[i]
    }

    fn combine(&self, i: usize, b: &Scaled, inward: Complex64, outward: Complex64) -> (Complex64, Complex64) {
        (inward * b.i1 + outward * b.k1, self.eta(i) * (inward * b.i0 - outward * b.k0))
    }

    fn eta(&self, i: usize) -> Complex64 {
        self.q[i] / self.regions[i].mu
    }

    fn width(&self, i: usize) -> f64 {
        self.regions[i].outer - self.regions[i].inner
    }

    /// Admittance at the outer face of region `home`, looking outward.
    fn outward_admittance(&self, home: usize) -> Complex64 {
        let last = self.regions.len() - 1;
        let mut y = -self.eta(last) * self.inner[last].k0 / self.inner[last].k1;
        for i in (home + 1..last).rev() {
            let rho = reflect_outer(&self.outer[i], self.eta(i), y);
            let there_and_back = (-self.q[i] * self.width(i)).exp() * (-self.q[i].re * self.width(i)).exp();
            let b = &self.inner[i];
            let inward = rho * there_and_back;
            y = self.eta(i) * (inward * b.i0 - b.k0) / (inward * b.i1 + b.k1);
        }
        y
    }

    /// Admittance at the inner face of region `home`, looking inward.
    fn inward_admittance(&self, home: usize) -> Complex64 {
        let mut y = self.eta(0) * self.outer[0].i0 / self.outer[0].i1;
        for i in 1..home {
            let rho = reflect_inner(&self.inner[i], self.eta(i), y);
            let there_and_back = (-self.q[i] * self.width(i)).exp() * (-self.q[i].re * self.width(i)).exp();
            let b = &self.outer[i];
            let outward = rho * there_and_back;
            y = self.eta(i) * (b.i0 - outward * b.k0) / (b.i1 + outward * b.k1);
        }
        y
    }

    /// Passes a potential given at the inner face of annulus `first` on to all annuli beyond.
    fn send_outward(&self, first: usize, potential: Complex64, waves: &mut [Wave]) {
        let last = self.regions.len() - 1;
        let mut at_face = potential;
        for (i, total) in waves.iter_mut().enumerate().take(last).skip(first) {
            let rho = reflect_outer(&self.outer[i], self.eta(i), self.outward_admittance(i));
            let across = (-self.q[i] * self.width(i)).exp();
            let damped = (-self.q[i].re * self.width(i)).exp();
            let outward = at_face / (self.inner[i].k1 + rho * across * damped * self.inner[i].i1);
            let wave = Wave { inward: outward * rho * across, outward };
            at_face = self.at_outer(i, wave).0;
            total.inward += wave.inward;
            total.outward += wave.outward;
        }
        waves[last].outward += at_face / self.inner[last].k1;
    }

    /// Passes a potential given at the outer face of annulus `first` on to all annuli within.
    fn send_inward(&self, first: usize, potential: Complex64, waves: &mut [Wave]) {
        let mut at_face = potential;
        for i in (1..=first).rev() {
            let rho = reflect_inner(&self.inner[i], self.eta(i), self.inward_admittance(i));
            let across = (-self.q[i] * self.width(i)).exp();
            let damped = (-self.q[i].re * self.width(i)).exp();
            let inward = at_face / (self.outer[i].i1 + rho * across * damped * self.outer[i].k1);
            let wave = Wave { inward, outward: inward * rho * damped };
            at_face = self.at_inner(i, wave).0;
            waves[i].inward += wave.inward;
            waves[i].outward += wave.outward;
        }
        waves[0].inward += at_face / self.outer[0].i1;
    }
}

/// c_i/c_k, each relative to the outer face, of a wave that meets admittance `y` there.
fn reflect_outer(b: &Scaled, eta: Complex64, y: Complex64) -> Complex64 {
    (eta * b.k0 + y * b.k1) / (eta * b.i0 - y * b.i1)
}

/// c_k/c_i, each relative to the inner face, of a wave that meets admittance `y` there.
fn reflect_inner(b: &Scaled, eta: Complex64, y: Complex64) -> Complex64 {
    (eta * b.i0 - y * b.i1) / (eta * b.k0 + y * b.k1)
}
