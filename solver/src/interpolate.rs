//! Local Lagrange interpolation on node lines: exact at nodes, high order between them.

/// Points of the usual local stencil.
pub(crate) const POINTS: usize = 6;

/// A stencil of `N` points: first node, weights of the value and of the derivative.
#[derive(Debug, Clone, Copy)]
pub(crate) struct Stencil<const N: usize> {
    pub(crate) first: usize,
    pub(crate) value: [f64; N],
    pub(crate) slope: [f64; N],
}

impl<const N: usize> Stencil<N> {
    /// The stencil of the `N` nodes around `s`; `nodes` has at least that many.
    pub(crate) fn at(nodes: &[f64], s: f64) -> Self {
        let above = nodes.partition_point(|&x| x <= s);
        let first = above.saturating_sub(N / 2).min(nodes.len().saturating_sub(N));
        Self { first, ..Self::over(&nodes[first..first + N], s) }
    }

    /// The stencil over exactly these `N` nodes, for samples counted from the first of them.
    pub(crate) fn over(x: &[f64], s: f64) -> Self {
        let (mut value, mut slope) = ([0.0; N], [0.0; N]);
        for k in 0..N {
            let others = || (0..N).filter(move |&m| m != k);
            let scale: f64 = others().map(|m| x[k] - x[m]).product();
            value[k] = others().map(|m| s - x[m]).product::<f64>() / scale;
            let without = |skip: usize| others().filter(|&m| m != skip).map(|m| s - x[m]).product::<f64>();
            slope[k] = others().map(without).sum::<f64>() / scale;
        }
        Self { first: 0, value, slope }
    }

    /// The interpolated value of `samples` at the nodes.
    pub(crate) fn value_of(&self, samples: &[f64]) -> f64 {
        self.value.iter().zip(&samples[self.first..]).map(|(w, y)| w * y).sum()
    }

    /// The interpolated derivative of `samples` at the nodes.
    pub(crate) fn slope_of(&self, samples: &[f64]) -> f64 {
        self.slope.iter().zip(&samples[self.first..]).map(|(w, y)| w * y).sum()
    }
}

/// Value of a sampled curve at `s`: six points, or linear where there are fewer.
pub(crate) fn sampled(positions: &[f64], values: &[f64], s: f64) -> f64 {
    match positions.len() {
        0 => 0.0,
        1 => values[0],
        n if n < POINTS => Stencil::<2>::at(positions, s).value_of(values),
        _ => Stencil::<POINTS>::at(positions, s).value_of(values),
    }
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
        let q = Stencil::<POINTS>::at(positions, s);
        (q.value_of(values) * sign, q.slope_of(values) * sign)
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

/// The greatest |f| near node `k` of `positions`, with its place: golden section over the two cells around the node.
pub(crate) fn peak_near(positions: &[f64], k: usize, f: impl Fn(f64) -> f64) -> (f64, f64) {
    let (low, high) = (positions[k.saturating_sub(1)], positions[(k + 1).min(positions.len() - 1)]);
    let s = greatest(|s| f(s).abs(), low, high, 1.0e-6 * (high - low));
    (s, f(s).abs())
}

/// Points of the stencil for fields along the wall, whose cells may be as long as 3/4 of the gap.
pub(crate) const ALONG_POINTS: usize = 10;

/// Place of the single maximum of `f` in (low, high) by golden section, to `within` (J. Kiefer, "Sequential minimax search
/// for a maximum", Proc. Am. Math. Soc. 4, 502-506, 1953).
pub(crate) fn greatest(f: impl Fn(f64) -> f64, mut low: f64, mut high: f64, within: f64) -> f64 {
    let ratio = 0.5 * (5.0_f64.sqrt() - 1.0);
    let (mut a, mut b) = (high - ratio * (high - low), low + ratio * (high - low));
    let (mut fa, mut fb) = (f(a), f(b));
    while high - low > within {
        if fa < fb {
            (low, a, fa) = (a, b, fb);
            b = low + ratio * (high - low);
            fb = f(b);
        } else {
            (high, b, fb) = (b, a, fa);
            a = high - ratio * (high - low);
            fa = f(a);
        }
    }
    0.5 * (low + high)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn reproduces_quintics_and_their_slopes() {
        let nodes = [0.0, 0.3, 0.5, 0.9, 1.4, 1.5, 2.2, 3.0];
        for power in 0..6 {
            for s in [0.1, 0.7, 1.45, 2.9] {
                let q = Stencil::<POINTS>::at(&nodes, s);
                let samples = nodes.map(|x: f64| x.powi(power));
                approx::assert_relative_eq!(q.value_of(&samples), s.powi(power), max_relative = 1e-12, epsilon = 1e-12);
                let slope = if power == 0 { 0.0 } else { f64::from(power) * s.powi(power - 1) };
                approx::assert_relative_eq!(q.slope_of(&samples), slope, max_relative = 1e-11, epsilon = 1e-11);
            }
        }
    }

    #[test]
    fn peak_of_a_smooth_bump() {
        let x: Vec<f64> = (0..40).map(|k| f64::from(k) * 0.1).collect();
        let y: Vec<f64> = x.iter().map(|x| -2.0 * (-(x - 1.234) * (x - 1.234)).exp()).collect();
        let (s, v) = peak(&x, &y);
        // Six points: |f^(6)| h^6 225 / (64 720), f^(6) up to 240 for this bump and h = 0.1, is 1.2e-6.
        assert!((s - 1.234).abs() < 1e-4 && (v - 2.0).abs() < 1.2e-6, "{s} {v}");
    }
}
