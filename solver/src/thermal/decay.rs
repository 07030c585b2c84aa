//! How fast the wall cools of itself: the slowest decay of the heat equation, K x = C x / tau, by inverse iteration.

use super::operator::HeatOperator;
use crate::fault::SolveFault;
use crate::linear::Factor;

/// Iterations at most; the next decay is many times as fast in a wall of metal.
const MOST: usize = 500;
/// Relative change of the time constant that ends them.
const ENOUGH: f64 = 1.0e-12;

/// The slowest time constant, s; `None` where part of the wall gives off no heat at all.
///
/// # Errors
/// Not finite.
pub(crate) fn time_constant(operator: &HeatOperator) -> Result<Option<f64>, SolveFault> {
    if operator.film.iter().all(|&f| f <= 0.0) {
        return Ok(None);
    }
    let Ok(mut factor) = Factor::new(&operator.pattern, &operator.conduction, None) else { return Ok(None) };
    let mut x = vec![1.0; operator.len()];
    let mut tau = 0.0;
    for _ in 0..MOST {
        let right: Vec<f64> = x.iter().zip(&operator.capacity).map(|(x, c)| x * c).collect();
        let stored: f64 = right.iter().zip(&x).map(|(b, x)| b * x).sum();
        let mut next = right.clone();
        factor.solve_in_place(&mut next);
        // (x, C x) over (next, C x): Rayleigh's quotient of the inverse.
        let along: f64 = right.iter().zip(&next).map(|(b, y)| b * y).sum();
        let found = along / stored;
        if !found.is_finite() {
            return Err(SolveFault::NotFinite { what: "the time constant of cooling" });
        }
        let scale = next.iter().fold(0.0_f64, |m, y| m.max(y.abs()));
        x = next.into_iter().map(|y| y / scale).collect();
        if (found - tau).abs() <= ENOUGH * found {
            return Ok(Some(found));
        }
        tau = found;
    }
    Ok(Some(tau))
}
