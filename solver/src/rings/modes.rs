//! The currents over one step, mode by mode: tau dy/dt + y = -u with u quadratic in time, solved exactly.

use nalgebra_sparse::na::DVector;

/// Weights of one step for every mode, at its middle and its end.
pub(super) struct StepWeights {
    dt: f64,
    middle: Vec<[f64; 4]>,
    end: Vec<[f64; 4]>,
}

/// Drive at the start, the middle and the end of a step.
pub(super) struct Drive<'a> {
    pub start: &'a DVector<f64>,
    pub middle: &'a DVector<f64>,
    pub end: &'a DVector<f64>,
}

impl StepWeights {
    /// Weights of a step `dt` for decay times `tau`.
    pub fn new(tau: &DVector<f64>, dt: f64) -> Self {
        let weights = |part: f64| tau.iter().map(|tau| weights(dt / tau, part)).collect();
        Self { dt, middle: weights(0.5), end: weights(1.0) }
    }

    /// How the currents' force at the middle and at the end answers to the speeds at the middle and at the end, N s/m: rows
    /// force, columns speed, for the flux slopes `middle` and `end` there.
    pub fn response(&self, middle: &DVector<f64>, end: &DVector<f64>) -> [[f64; 2]; 2] {
        let mut response = [[0.0; 2]; 2];
        for i in 0..middle.len() {
            let (m, e) = (middle[i], end[i]);
            response[0][0] -= self.middle[i][2] * m * m;
            response[0][1] -= self.middle[i][3] * m * e;
            response[1][0] -= self.end[i][2] * e * m;
            response[1][1] -= self.end[i][3] * e * e;
        }
        response
    }

    /// The step they were made for, s.
    pub fn dt(&self) -> f64 {
        self.dt
    }

    /// Mode amplitudes at the middle and the end from those at the start.
    pub fn advance(&self, y: &DVector<f64>, drive: &Drive<'_>, middle: &mut DVector<f64>, end: &mut DVector<f64>) {
        for i in 0..y.len() {
            let u = [drive.start[i], drive.middle[i], drive.end[i]];
            let sum = |w: &[f64; 4]| w[0] * y[i] - (w[1] * u[0] + w[2] * u[1] + w[3] * u[2]);
            middle[i] = sum(&self.middle[i]);
            end[i] = sum(&self.end[i]);
        }
    }
}

/// Factor of the old amplitude and of the three drive values after the fraction `part` of a step of `x` decay times.
///
/// u(s) = u0 + s c1 + s^2 c2 with c1 = -3 u0 + 4 um - u1, c2 = 2 u0 - 4 um + 2 u1; the integrals are
/// p_j = X integral_0^1 exp(-X (1 - t)) t^j dt with X = part x.
fn weights(x: f64, part: f64) -> [f64; 4] {
    let [p0, p1, p2] = moments(part * x);
    let (p1, p2) = (part * p1, part * part * p2);
    [(-part * x).exp(), p0 - 3.0 * p1 + 2.0 * p2, 4.0 * (p1 - p2), 2.0 * p2 - p1]
}

/// p_0, p_1, p_2 at X.
fn moments(x: f64) -> [f64; 3] {
    if x > 1.0 {
        let p0 = -(-x).exp_m1();
        let p1 = 1.0 - p0 / x;
        return [p0, p1, 1.0 - 2.0 * p1 / x];
    }
    let mut out = [0.0; 3];
    for (j, p) in out.iter_mut().enumerate() {
        // X sum over n of (-X)^n j!/(n + j + 1)!, all terms falling fast.
        let mut term = x / (j as f64 + 1.0);
        let mut n = 1.0;
        while term.abs() > 1e-18 * x {
            *p += term;
            term *= -x / (n + j as f64 + 1.0);
            n += 1.0;
        }
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    #[test]
    fn both_forms_of_the_moments_meet() {
        let (below, above) = (moments(1.0), moments(1.0 + 1e-12));
        for (b, a) in below.iter().zip(above) {
            assert_relative_eq!(*b, a, max_relative = 1e-11);
        }
    }

    #[test]
    fn a_quadratic_drive_is_followed_exactly() {
        // tau y' + y = -(1 + t + t^2), y(0) = 0 with tau = 0.3: y = -(t^2 + (1 - 2 tau) t + 1 - tau + 2 tau^2) + decay.
        let (tau, dt) = (0.3, 0.7);
        let particular = |t: f64| -(t * t + (1.0 - 2.0 * tau) * t + 1.0 - tau + 2.0 * tau * tau);
        let exact = |t: f64| particular(t) - particular(0.0) * (-t / tau).exp();
        let u = |t: f64| DVector::from_element(1, 1.0 + t + t * t);
        let step = StepWeights::new(&DVector::from_element(1, tau), dt);
        let (mut middle, mut end) = (DVector::zeros(1), DVector::zeros(1));
        let drive = Drive { start: &u(0.0), middle: &u(0.5 * dt), end: &u(dt) };
        step.advance(&DVector::zeros(1), &drive, &mut middle, &mut end);
        assert_relative_eq!(middle[0], exact(0.5 * dt), max_relative = 1e-13);
        assert_relative_eq!(end[0], exact(dt), max_relative = 1e-13);
    }
}
