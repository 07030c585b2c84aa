//! Whether the wanted accuracy was met, and what would meet it.

use crate::outcome::{Accuracies, Figure, Outcome};
use crate::problem::Accuracy;

/// Levels to begin with.
const FIRST_LEVELS: usize = 3;
/// Levels at most.
pub(crate) const MOST_LEVELS: usize = 5;

/// Levels to begin with: the case's own number, or three.
pub(crate) fn levels_wanted(accuracy: &Accuracy) -> usize {
    accuracy.levels.unwrap_or(FIRST_LEVELS).clamp(FIRST_LEVELS, MOST_LEVELS)
}

/// Whether a finer level may be added on our own, up to `most`.
fn may_add_level(accuracy: &Accuracy, count: usize, most: usize) -> bool {
    accuracy.levels.is_none() && count < most
}

/// Answers on more and more levels until every band is within the target, or no level may be added.
///
/// # Errors
/// Those of `answer`.
pub(crate) fn refine<E>(
    accuracy: &Accuracy,
    most: usize,
    mut answer: impl FnMut(usize) -> Result<Outcome, E>,
) -> Result<Outcome, E> {
    let mut count = levels_wanted(accuracy);
    loop {
        let outcome = answer(count)?;
        if outcome.accuracy.met || !may_add_level(accuracy, count, most) {
            return Ok(outcome);
        }
        count += 1;
    }
}

/// How much wider than the target the band of a local figure may be: a peak at one point of the wall converges less
/// evenly than an integral, and nobody needs it as closely.
const LOCAL_ALLOWANCE: f64 = 100.0;

/// Figures that are a field's value at one point.
pub(crate) fn is_local(name: &str) -> bool {
    name == "current_density_peak"
}

/// Compares every figure's band with the target (a local figure's with a hundred times the target: 1 % by default).
pub(crate) fn verdict(figures: &[Figure], target_relative: f64, levels: usize) -> Accuracies {
    let relative = |f: &Figure| {
        let allowance = if is_local(&f.name) { LOCAL_ALLOWANCE } else { 1.0 };
        if f.band > 0.0 { f.band / f.value.abs() / allowance } else { 0.0 }
    };
    let worst = figures.iter().map(|f| (f.name.clone(), relative(f))).max_by(|a, b| a.1.total_cmp(&b.1));
    let met = worst.as_ref().is_none_or(|(_, r)| *r <= target_relative);
    let advice = (!met).then(|| advice(target_relative, worst.as_ref(), levels));
    Accuracies { target_relative, met, worst, advice }
}

fn advice(target: f64, worst: Option<&(String, f64)>, levels: usize) -> String {
    let miss = worst.map_or(1.0, |(_, r)| r / target);
    let name = worst.map_or("a figure", |(n, _)| n.as_str());
    if levels < MOST_LEVELS {
        format!(
            "{name} misses the target by a factor of {miss:.1}: accuracy.levels = {} would meet it or come closer",
            levels + 1
        )
    } else {
        format!(
            "{name} misses the target by a factor of {miss:.1} on the finest levels: raise accuracy.cells_across_wall or accept a target of {:.1e}",
            target * miss
        )
    }
}
