//! Whether the wanted accuracy was met, and what would meet it.

use crate::demagnetisation;
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
    matches!(name, "current_density_peak" | demagnetisation::FIELD | demagnetisation::MARGIN) || is_temperature(name)
}

/// A difference that may be as small as it likes says nothing about accuracy, nor does what follows from where heat is left.
fn counts(figure: &Figure) -> bool {
    figure.name != demagnetisation::MARGIN && !is_temperature(&figure.name)
}

/// Figures that follow from where the heat is left: their bands are told, and no level is added for them.
fn is_temperature(name: &str) -> bool {
    name.starts_with("temperature_") || name.starts_with("surface_temperature_")
}

/// Compares every figure's band with the target (a local figure's with a hundred times the target: 1 % by default).
pub(crate) fn verdict(figures: &[Figure], target_relative: f64, levels: usize) -> Accuracies {
    let relative = |f: &Figure| if f.band > 0.0 { f.band / f.value.abs() } else { 0.0 };
    // How many times its own target a band is wide.
    let miss = |f: &Figure| {
        let allowance = if is_local(&f.name) { LOCAL_ALLOWANCE } else { 1.0 };
        relative(f) / (allowance * target_relative)
    };
    let worst = figures.iter().filter(|f| counts(f)).max_by(|a, b| miss(a).total_cmp(&miss(b)));
    let missed = worst.filter(|f| miss(f) > 1.0);
    Accuracies {
        target_relative,
        met: missed.is_none(),
        worst: worst.map(|f| (f.name.clone(), relative(f))),
        advice: missed.map(|f| advice(&f.name, miss(f), target_relative, levels)),
    }
}

fn advice(name: &str, miss: f64, target: f64, levels: usize) -> String {
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
