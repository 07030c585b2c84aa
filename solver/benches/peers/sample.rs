//! Medians and spreads of repeated timings.

use std::time::Instant;

/// Median; the mean of the two middle values of an even number.
pub(crate) fn median(values: &[f64]) -> f64 {
    let mut sorted = values.to_vec();
    sorted.sort_by(f64::total_cmp);
    match sorted.len() {
        0 => f64::NAN,
        n if n % 2 == 1 => sorted[n / 2],
        n => 0.5 * (sorted[n / 2 - 1] + sorted[n / 2]),
    }
}

/// Lowest and highest.
pub(crate) fn range(values: &[f64]) -> (f64, f64) {
    values.iter().fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), &v| (low.min(v), high.max(v)))
}

/// Seconds that each of `repeats` runs of `work` takes, with the last result.
pub(crate) fn times<T, E>(repeats: usize, mut work: impl FnMut() -> Result<T, E>) -> Result<(T, Vec<f64>), E> {
    let timed = |work: &mut dyn FnMut() -> Result<T, E>| {
        let begin = Instant::now();
        let result = work()?;
        Ok((result, begin.elapsed().as_secs_f64()))
    };
    let (mut result, first) = timed(&mut work)?;
    let mut seconds = vec![first];
    for _ in 1..repeats {
        let (again, time) = timed(&mut work)?;
        result = again;
        seconds.push(time);
    }
    Ok((result, seconds))
}

/// The exponent p in time ~ size^p by least squares of the logarithms.
pub(crate) fn exponent(sizes: &[f64], times: &[f64]) -> f64 {
    let mean = |v: &[f64]| v.iter().map(|x| x.ln()).sum::<f64>() / count(v.len());
    let (x, y) = (mean(sizes), mean(times));
    let across: f64 = sizes.iter().zip(times).map(|(s, t)| (s.ln() - x) * (t.ln() - y)).sum();
    across / sizes.iter().map(|s| (s.ln() - x).powi(2)).sum::<f64>()
}

/// A whole number as a float.
#[expect(clippy::cast_precision_loss, reason = "sizes stay far below 2^52")]
pub(crate) fn count(n: usize) -> f64 {
    n as f64
}

/// What was asked of a figure and whether it came out.
pub(crate) fn verdict(ok: bool) -> &'static str {
    if ok { "met" } else { "MISSED" }
}
