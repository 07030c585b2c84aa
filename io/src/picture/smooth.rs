//! A smooth line through computed points that adds no wiggle of its own.

use super::ribbon::Banded;
use super::scale::{Kind, Scale};

/// Points put between two computed ones.
const BETWEEN: i32 = 12;

/// The curve through the same points, refined by monotone cubics (Fritsch and Carlson, SIAM J. Numer. Anal. 17, 1980)
/// on the axes as drawn; the band follows linearly.
#[must_use]
pub(super) fn smooth(curve: &Banded, x: &Scale, y: &Scale) -> Banded {
    let (u, v) = (along(&curve.x, x), along(&curve.y, y));
    if u.len() < 3 || u.windows(2).any(|w| w[1] <= w[0]) || v.iter().any(|v| !v.is_finite()) {
        return curve.clone();
    }
    let slopes = slopes(&u, &v);
    let mut out = Banded::default();
    for i in 0..u.len() - 1 {
        for step in 0..BETWEEN {
            let t = f64::from(step) / f64::from(BETWEEN);
            out.x.push(back(u[i] + t * (u[i + 1] - u[i]), x));
            out.y.push(back(hermite(&u, &v, &slopes, i, t), y));
            out.band.push(curve.band[i] + t * (curve.band[i + 1] - curve.band[i]));
        }
    }
    let last = curve.x.len() - 1;
    out.x.push(curve.x[last]);
    out.y.push(curve.y[last]);
    out.band.push(curve.band[last]);
    out
}

fn along(values: &[f64], scale: &Scale) -> Vec<f64> {
    values.iter().map(|v| if scale.kind == Kind::Log { v.ln() } else { *v }).collect()
}

fn back(value: f64, scale: &Scale) -> f64 {
    if scale.kind == Kind::Log { value.exp() } else { value }
}

/// Slopes at the points: weighted harmonic means of the neighbouring chords, zero at extremes.
fn slopes(u: &[f64], v: &[f64]) -> Vec<f64> {
    let chord: Vec<f64> = (0..u.len() - 1).map(|i| (v[i + 1] - v[i]) / (u[i + 1] - u[i])).collect();
    let inner = |i: usize| {
        let (before, after) = (chord[i - 1], chord[i]);
        if before * after <= 0.0 {
            return 0.0;
        }
        let (h0, h1) = (u[i] - u[i - 1], u[i + 1] - u[i]);
        let (w0, w1) = (2.0 * h1 + h0, h1 + 2.0 * h0);
        (w0 + w1) / (w0 / before + w1 / after)
    };
    (0..u.len())
        .map(|i| match i {
            0 => chord[0],
            i if i == u.len() - 1 => chord[i - 1],
            i => inner(i),
        })
        .collect()
}

fn hermite(u: &[f64], v: &[f64], slope: &[f64], i: usize, t: f64) -> f64 {
    let h = u[i + 1] - u[i];
    let (t2, t3) = (t * t, t * t * t);
    (2.0 * t3 - 3.0 * t2 + 1.0) * v[i]
        + (t3 - 2.0 * t2 + t) * h * slope[i]
        + (3.0 * t2 - 2.0 * t3) * v[i + 1]
        + (t3 - t2) * h * slope[i + 1]
}

#[cfg(test)]
mod tests {
    use super::*;

    fn scale(kind: Kind) -> Scale {
        Scale { kind, low: 0.1, high: 100.0, start: 0.0, end: 1.0 }
    }

    #[test]
    fn it_passes_through_the_points_and_never_beyond() {
        let x: Vec<f64> = (0..12).map(|i| 0.1 * 2.0_f64.powi(i)).collect();
        let y: Vec<f64> = x.iter().map(|v| v / (1.0 + v * v / 9.0)).collect();
        let curve = Banded { band: vec![0.0; x.len()], x, y };
        let fine = smooth(&curve, &scale(Kind::Log), &scale(Kind::Log));
        let per = fine.x.len() / (curve.x.len() - 1);
        for (i, y) in curve.y.iter().enumerate() {
            approx::assert_relative_eq!(fine.y[i * per], *y, max_relative = 1e-12);
        }
        let top = curve.y.iter().copied().fold(0.0, f64::max);
        assert!(fine.y.iter().all(|v| *v <= top * (1.0 + 1e-12)));
        for (x, y) in fine.x.iter().zip(&fine.y) {
            approx::assert_relative_eq!(*y, x / (1.0 + x * x / 9.0), max_relative = 0.05);
        }
    }

    #[test]
    fn two_points_stay_a_straight_line() {
        let curve = Banded { x: vec![1.0, 2.0], y: vec![1.0, 3.0], band: vec![0.1, 0.1] };
        assert_eq!(smooth(&curve, &scale(Kind::Linear), &scale(Kind::Linear)), curve);
    }
}
