//! Local Lagrange interpolation on node lines: exact at nodes, high order between them.

/// Points of a local stencil.
pub(crate) const POINTS: usize = 6;

/// A stencil: first node, weights of the value and of the derivative.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Stencil {
    pub(crate) first: usize,
    pub(crate) value: [f64; POINTS],
    pub(crate) slope: [f64; POINTS],
}

/// The stencil of the `POINTS` nodes around `s`; `nodes` has at least that many.
pub(crate) fn stencil(nodes: &[f64], s: f64) -> Stencil {
    let above = nodes.partition_point(|&x| x <= s);
    let first = above.saturating_sub(POINTS / 2).min(nodes.len().saturating_sub(POINTS));
    let x = &nodes[first..first + POINTS];
    let (mut value, mut slope) = ([0.0; POINTS], [0.0; POINTS]);
    for k in 0..POINTS {
        let others = || (0..POINTS).filter(move |&m| m != k);
        let scale: f64 = others().map(|m| x[k] - x[m]).product();
        value[k] = others().map(|m| s - x[m]).product::<f64>() / scale;
        slope[k] = others()
            .map(|skip| others().filter(|&m| m != skip).map(|m| s - x[m]).product::<f64>())
            .sum::<f64>()
            / scale;
    }
    Stencil { first, value, slope }
}

/// The greatest |value| of a sampled curve and its place: the parabola through the largest sample and its neighbours,
/// sharpened by the four-point neighbourhood where there is one.
pub(crate) fn peak(positions: &[f64], values: &[f64]) -> (f64, f64) {
    let largest = (0..values.len()).max_by(|&a, &b| values[a].abs().total_cmp(&values[b].abs()));
    let Some(k) = largest else { return (0.0, 0.0) };
    if values.len() < POINTS || k == 0 || k + 1 == values.len() {
        return (positions[k], values[k].abs());
    }
    let sign = values[k].signum();
    let at = |s: f64| {
        let q = stencil(positions, s);
        let sum = |w: &[f64; POINTS]| -> f64 { (0..POINTS).map(|m| w[m] * values[q.first + m]).sum::<f64>() * sign };
        (sum(&q.value), sum(&q.slope))
    };
    // The slope falls from positive to negative within the two cells around the largest sample: bisect it.
    let (mut low, mut high) = (positions[k - 1], positions[k + 1]);
    for _ in 0..60 {
        let middle = 0.5 * (low + high);
        if at(middle).1 > 0.0 {
            low = middle;
        } else {
            high = middle;
        }
    }
    let s = 0.5 * (low + high);
    let refined = at(s).0;
    if refined >= values[k].abs() { (s, refined) } else { (positions[k], values[k].abs()) }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn reproduces_quintics_and_their_slopes() {
        let nodes = [0.0, 0.3, 0.5, 0.9, 1.4, 1.5, 2.2, 3.0];
        for power in 0..6 {
            for s in [0.1, 0.7, 1.45, 2.9] {
                let q = stencil(&nodes, s);
                let sum = |w: &[f64; POINTS]| -> f64 { (0..POINTS).map(|m| w[m] * nodes[q.first + m].powi(power)).sum() };
                approx::assert_relative_eq!(sum(&q.value), s.powi(power), max_relative = 1e-12, epsilon = 1e-12);
                let slope = if power == 0 { 0.0 } else { f64::from(power) * s.powi(power - 1) };
                approx::assert_relative_eq!(sum(&q.slope), slope, max_relative = 1e-11, epsilon = 1e-11);
            }
        }
    }

    #[test]
    fn peak_of_a_smooth_bump() {
        let x: Vec<f64> = (0..40).map(|k| f64::from(k) * 0.1).collect();
        let y: Vec<f64> = x.iter().map(|x| -2.0 * (-(x - 1.234) * (x - 1.234)).exp()).collect();
        let (s, v) = peak(&x, &y);
        assert!((s - 1.234).abs() < 1e-5 && (v - 2.0).abs() < 1e-8, "{s} {v}");
    }
}
