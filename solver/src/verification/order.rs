//! Observed orders of convergence, before and after extrapolation.
//!
//! Where a level's error is sum c_p h^p over even p, extrapolating a run of n neighbouring levels leaves
//! +- c_2n (h_1 h_2 ... h_n)^2: the error falls as the 2n-th power of the geometric mean of their cell sizes. Orders
//! are read between neighbouring runs by that mean.

use lenzbore_mesh::Refinement;

use crate::extrapolate::{even_powers, weights};

/// f = 1, 1.5, 2, ... as numbers.
pub(super) fn factors(levels: usize) -> Vec<f64> {
    Refinement::first(levels).iter().map(|f| f.factor()).collect()
}

/// Relative root-mean-square errors of `levels` (values at the same places) after extrapolating every run of `run`
/// levels.
pub(super) fn field_errors(levels: &[Vec<f64>], exact: &[f64], run: usize) -> Vec<f64> {
    let factors = factors(levels.len());
    let size = exact.iter().map(|x| x * x).sum::<f64>().sqrt();
    let error = |first: usize| {
        let w = weights(&factors[first..first + run], &even_powers(run));
        let value = |place: usize| (0..run).map(|k| w[k] * levels[first + k][place]).sum::<f64>();
        let square: f64 = exact.iter().enumerate().map(|(place, x)| (value(place) - x).powi(2)).sum();
        square.sqrt() / size
    };
    (0..=levels.len() - run).map(error).collect()
}

/// The same for one number a level.
pub(super) fn errors(levels: &[f64], exact: f64, run: usize) -> Vec<f64> {
    let levels: Vec<Vec<f64>> = levels.iter().map(|&v| vec![v]).collect();
    field_errors(&levels, &[exact], run)
}

/// Logarithm of the geometric mean of the refinement in each of `count` runs of `run` levels.
fn finenesses(count: usize, run: usize) -> Vec<f64> {
    let mean = |window: &[f64]| window.iter().map(|f| f.ln()).sum::<f64>() / run as f64;
    factors(count + run - 1).windows(run).map(mean).collect()
}

/// Orders between neighbouring runs of `run` levels.
pub(super) fn orders(errors: &[f64], run: usize) -> Vec<f64> {
    let finer = finenesses(errors.len(), run);
    errors.windows(2).zip(finer.windows(2)).map(|(e, f)| (e[0] / e[1]).ln() / (f[1] - f[0])).collect()
}

/// Order from the first run of `run` levels to the last.
pub(super) fn overall_order(errors: &[f64], run: usize) -> f64 {
    let (finer, last) = (finenesses(errors.len(), run), errors.len() - 1);
    (errors[0] / errors[last]).ln() / (finer[last] - finer[0])
}

/// What must hold after extrapolating runs of `run` levels: the last order within `order`, the last error below
/// `bound`.
pub(super) struct Wanted {
    pub(super) run: usize,
    pub(super) order: std::ops::RangeInclusive<f64>,
    pub(super) bound: f64,
}

impl Wanted {
    /// Orders 2, 4, 6 for runs of 1, 2, 3 levels, with the margins of the requirement (0.1, 0.4 and, for the last,
    /// 0.8).
    pub(super) fn even(bounds: &[f64]) -> Vec<Self> {
        let ranges = [1.9..=2.1, 3.6..=4.4, 5.2..=6.8];
        bounds.iter().zip(ranges).enumerate().map(|(k, (&bound, order))| Self { run: k + 1, order, bound }).collect()
    }

    /// Orders 2 and 4 for runs of 1 and 2 levels, and after runs of 3 a bound alone: where the error is so small
    /// that its next terms, or the boundary, hide the order 6.
    pub(super) fn even_to_four(bounds: &[f64; 3]) -> Vec<Self> {
        let mut wanted = Self::even(bounds);
        wanted[2].order = f64::NEG_INFINITY..=f64::INFINITY;
        wanted
    }
}

/// Asserts rates and bounds of `levels` against `exact`.
pub(super) fn assert_field_orders(what: &str, levels: &[Vec<f64>], exact: &[f64], wanted: &[Wanted]) {
    let observed: Vec<(f64, f64)> = wanted.iter().map(|w| observe(what, levels, exact, w.run)).collect();
    for (w, (order, error)) in wanted.iter().zip(observed) {
        assert!(w.order.contains(&order), "{what}: order {order:.3} after runs of {}", w.run);
        assert!(error < w.bound, "{what}: error {error:.2e} after runs of {}", w.run);
    }
}

/// The last order and the last error after extrapolating runs of `run` levels; prints them all.
fn observe(what: &str, levels: &[Vec<f64>], exact: &[f64], run: usize) -> (f64, f64) {
    let errors = field_errors(levels, exact, run);
    let orders = orders(&errors, run);
    println!("{what}: runs of {run}: errors {}, orders {orders:.2?}", short(&errors));
    (*orders.last().unwrap(), *errors.last().unwrap())
}

/// Errors with two digits, for the printed record.
pub(super) fn short(errors: &[f64]) -> String {
    errors.iter().map(|e| format!("{e:.1e}")).collect::<Vec<_>>().join(" ")
}

/// The same for one number a level.
pub(super) fn assert_orders(what: &str, levels: &[f64], exact: f64, wanted: &[Wanted]) {
    let levels: Vec<Vec<f64>> = levels.iter().map(|&v| vec![v]).collect();
    assert_field_orders(what, &levels, &[exact], wanted);
}

/// On an error of pure even powers the orders come out as they went in, and on odd powers they don't.
#[test]
fn orders_of_a_known_error_are_seen() {
    let of = |f: f64, c: [f64; 3]| 2.0 + c[0] / f.powi(2) + c[1] / f.powi(4) + c[2] / f.powi(6);
    let levels: Vec<f64> = factors(5).iter().map(|&f| of(f, [1e-3, 1e-4, 1e-5])).collect();
    for (run, order) in [(1, 2.0), (2, 4.0), (3, 6.0)] {
        let found = *orders(&errors(&levels, 2.0, run), run).last().unwrap();
        assert!((found - order).abs() < 0.1, "{found} instead of {order}");
    }
    let cubic: Vec<f64> = factors(5).iter().map(|&f| of(f, [1e-3, 1e-4, 1e-5]) + 1e-3 / f.powi(3)).collect();
    assert!(*orders(&errors(&cubic, 2.0, 2), 2).last().unwrap() < 3.4);
}
