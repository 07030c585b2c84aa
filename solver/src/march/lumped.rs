//! A lumped model of the wall's currents for system simulation: c(omega) = sum of c_k / (1 + i omega tau_k).
//!
//! The exact response is such a sum with positive weights over all modes of the currents, so that two or three terms, fitted over the frequencies
//! wanted, go far. In time each is a damper with a spring in series: tau_k dF_k/dt + F_k = -c_k v.

use num_complex::Complex64;

use crate::outcome::{LumpedModel, LumpedTerm, SmallStroke, StrokeResponse};

/// Passes of the fit at most; it has settled long before.
const MOST_PASSES: usize = 200;
/// Change of the logarithms that ends the fit.
const SETTLED: f64 = 1.0e-10;
/// Starting points tried, as spans of the time constants in decades around 1 / omega.
const SPANS: [f64; 3] = [0.5, 1.0, 2.0];

/// Fits `terms` first-order lags to `points`; `None` with fewer points than terms, or none whose damping is positive.
///
/// The fit is least squares of (model - c) / |c| over the points, real and imaginary part, by the method of Levenberg and Marquardt in the
/// logarithms of c_k and tau_k (D. W. Marquardt, J. Soc. Ind. Appl. Math. 11, 431-441, 1963; from memory).
pub(crate) fn lumped_model(points: &[SmallStroke], terms: usize) -> Option<LumpedModel> {
    let data: Vec<(f64, Complex64)> = points.iter().map(response).collect();
    let good = data.iter().all(|(omega, c)| *omega > 0.0 && c.re > 0.0 && c.norm().is_finite());
    if terms == 0 || data.len() < terms || !good {
        return None;
    }
    let fits = SPANS.iter().map(|&span| fit(&data, start(&data, terms, span)));
    let best = fits.min_by(|a, b| cost(&data, a).total_cmp(&cost(&data, b)))?;
    let mut found: Vec<LumpedTerm> =
        best.chunks_exact(2).map(|p| LumpedTerm { damping_n_s_per_m: p[0].exp(), lag_s: p[1].exp() }).collect();
    found.sort_by(|a, b| b.lag_s.total_cmp(&a.lag_s));
    let off = |(omega, c): &(f64, Complex64)| (model(&best, *omega) - c).norm() / c.norm();
    Some(LumpedModel { terms: found, largest_error: data.iter().map(off).fold(0.0, f64::max) })
}

/// Terms tried.
const MOST_TERMS: usize = 3;

/// `points` with lumped models of one term up to three.
pub(crate) fn with_models(points: Vec<SmallStroke>) -> StrokeResponse {
    let lumped = (1..=MOST_TERMS).filter_map(|terms| lumped_model(&points, terms)).collect();
    StrokeResponse { points, lumped }
}

/// Angular frequency and c = damping - i stiffness / omega.
fn response(point: &SmallStroke) -> (f64, Complex64) {
    let omega = std::f64::consts::TAU * point.frequency_hz;
    (omega, Complex64::new(point.damping, -point.stiffness / omega))
}

fn model(parameters: &[f64], omega: f64) -> Complex64 {
    parameters.chunks_exact(2).map(|p| p[0].exp() / Complex64::new(1.0, omega * p[1].exp())).sum()
}

/// Equal shares of the greatest c, time constants spread over `span` decades around the one at which the part in phase is greatest.
fn start(data: &[(f64, Complex64)], terms: usize, span: f64) -> Vec<f64> {
    let most = data.iter().map(|(_, c)| c.norm()).fold(0.0, f64::max);
    let middle = data
        .iter()
        .min_by(|a, b| (a.1.re + a.1.im).abs().total_cmp(&(b.1.re + b.1.im).abs()))
        .map_or(1.0, |(omega, _)| 1.0 / omega);
    let (mut out, count) = (Vec::new(), number(terms));
    for k in 0..terms {
        let place = if terms == 1 { 0.0 } else { number(k) / (count - 1.0) - 0.5 };
        out.extend([(most / count).ln(), middle.ln() - span * place * std::f64::consts::LN_10]);
    }
    out
}

/// Residuals, real and imaginary parts over |c|.
fn residuals(data: &[(f64, Complex64)], parameters: &[f64]) -> Vec<f64> {
    data.iter()
        .flat_map(|(omega, c)| {
            let off = (model(parameters, *omega) - c) / c.norm();
            [off.re, off.im]
        })
        .collect()
}

fn cost(data: &[(f64, Complex64)], parameters: &[f64]) -> f64 {
    residuals(data, parameters).iter().map(|r| r * r).sum()
}

/// Derivatives of the residuals by ln c_k and ln tau_k, a row a residual.
fn slopes(data: &[(f64, Complex64)], parameters: &[f64]) -> Vec<Vec<f64>> {
    let mut rows = Vec::new();
    for (omega, c) in data {
        let (mut real, mut imaginary) = (Vec::new(), Vec::new());
        for p in parameters.chunks_exact(2) {
            let i_x = Complex64::new(0.0, omega * p[1].exp());
            let term = p[0].exp() / (1.0 + i_x);
            let by_lag = -term * i_x / (1.0 + i_x);
            for d in [term / c.norm(), by_lag / c.norm()] {
                real.push(d.re);
                imaginary.push(d.im);
            }
        }
        rows.extend([real, imaginary]);
    }
    rows
}

fn fit(data: &[(f64, Complex64)], mut parameters: Vec<f64>) -> Vec<f64> {
    let (mut damped, mut before) = (1.0e-2, cost(data, &parameters));
    for _ in 0..MOST_PASSES {
        let shift = step(&slopes(data, &parameters), &residuals(data, &parameters), damped);
        let tried: Vec<f64> = parameters.iter().zip(&shift).map(|(p, s)| p + s.clamp(-1.0, 1.0)).collect();
        let after = cost(data, &tried);
        if after < before {
            let change = shift.iter().fold(0.0_f64, |m, s| m.max(s.abs()));
            (parameters, before, damped) = (tried, after, damped / 4.0);
            if change < SETTLED {
                break;
            }
        } else {
            damped *= 4.0;
            if damped > 1.0e12 {
                break;
            }
        }
    }
    parameters
}

/// (J^T J + damped diag) step = -J^T r, by Cholesky: the matrix is positive definite and at most six by six.
fn step(rows: &[Vec<f64>], residuals: &[f64], damped: f64) -> Vec<f64> {
    let n = rows.first().map_or(0, Vec::len);
    let mut a = vec![vec![0.0; n]; n];
    let mut b = vec![0.0; n];
    for (row, r) in rows.iter().zip(residuals) {
        for i in 0..n {
            b[i] -= row[i] * r;
            for j in 0..=i {
                a[i][j] += row[i] * row[j];
            }
        }
    }
    for (i, row) in a.iter_mut().enumerate() {
        row[i] = row[i] * (1.0 + damped) + f64::MIN_POSITIVE;
    }
    for i in 0..n {
        for j in 0..=i {
            let sum: f64 = a[i][j] - (0..j).map(|k| a[i][k] * a[j][k]).sum::<f64>();
            a[i][j] = if i == j { sum.max(f64::MIN_POSITIVE).sqrt() } else { sum / a[j][j] };
        }
    }
    for i in 0..n {
        b[i] = (b[i] - (0..i).map(|k| a[i][k] * b[k]).sum::<f64>()) / a[i][i];
    }
    for i in (0..n).rev() {
        b[i] = (b[i] - (i + 1..n).map(|k| a[k][i] * b[k]).sum::<f64>()) / a[i][i];
    }
    b
}

#[expect(clippy::cast_precision_loss, reason = "a handful of terms")]
fn number(n: usize) -> f64 {
    n as f64
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use super::*;

    fn points(of: impl Fn(f64) -> Complex64) -> Vec<SmallStroke> {
        (0..30)
            .map(|k| {
                let frequency_hz = 10.0_f64.powf(f64::from(k) / 8.0);
                let omega = std::f64::consts::TAU * frequency_hz;
                let c = of(omega);
                let (stiffness, damping) = (-omega * c.im, c.re);
                SmallStroke { frequency_hz, stiffness, stiffness_band: 0.0, damping, damping_band: 0.0 }
            })
            .collect()
    }

    #[test]
    fn three_lags_are_found_again() {
        let truth = [(4.0, 2e-3), (2.0, 4e-4), (0.5, 6e-5)];
        let of = |omega: f64| truth.iter().map(|(c, tau)| c / Complex64::new(1.0, omega * tau)).sum::<Complex64>();
        let found = lumped_model(&points(of), 3).unwrap();
        for (term, (c, tau)) in found.terms.iter().zip(truth) {
            approx::assert_relative_eq!(term.damping_n_s_per_m, c, max_relative = 1e-6);
            approx::assert_relative_eq!(term.lag_s, tau, max_relative = 1e-6);
        }
        assert!(found.largest_error < 1e-8, "{found:?}");
    }

    #[test]
    fn more_terms_fit_better_and_a_layer_needs_more_than_one() {
        // tanh(x)/x, the response of a layer with skin effect.
        let of = |omega: f64| {
            let x = Complex64::new(0.0, omega * 1e-3).sqrt();
            x.tanh() / x
        };
        let errors: Vec<f64> = (1..=3).map(|n| lumped_model(&points(of), n).unwrap().largest_error).collect();
        assert!(errors[0] > 2.0 * errors[1] && errors[1] > 2.0 * errors[2] && errors[2] < 0.1, "{errors:?}");
        assert!(lumped_model(&points(of)[..1], 2).is_none());
    }
}
