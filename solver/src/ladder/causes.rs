//! What each rung is worth, and small errors that are two large ones.

use super::effect::Effect;
use super::outcome::{Cancelling, Rung, Step};

/// An error counts as cancelled where the errors of both signs behind it are at least this large, relative to the top.
const LARGE: f64 = 0.05;
/// ... and it is itself no larger than this, and no more than a share of the smaller of the two.
const SMALL: f64 = 0.10;
const SMALL_SHARE: f64 = 0.5;
/// Causes below this are not named.
const NEGLIGIBLE: f64 = 0.005;

/// The steps of a figure over rungs that have it, in units of |top|; effects of rungs without it are taken along.
pub(super) fn steps(rungs: &[&Rung], name: &str, top: f64) -> Vec<Step> {
    let mut steps = Vec::new();
    let mut before: Option<f64> = None;
    let mut pending: Vec<Effect> = Vec::new();
    for rung in rungs {
        if before.is_some() {
            pending.push(rung.effect);
        }
        let Some(after) = rung.figure(name) else { continue };
        if let Some(before) = before {
            let worth = (after - before) / top.abs();
            steps.push(Step { effects: std::mem::take(&mut pending), before, after, worth });
        }
        before = Some(after);
    }
    steps
}

/// Index of the step that moves the figure most.
pub(super) fn dominant(steps: &[Step]) -> Option<usize> {
    (0..steps.len()).max_by(|&a, &b| steps[a].worth.abs().total_cmp(&steps[b].worth.abs()))
}

/// Whether an error with these causes is small by cancellation.
pub(super) fn cancelling(error: f64, causes: &[Step]) -> Option<Cancelling> {
    let (mut high_effects, mut low_effects) = (Vec::new(), Vec::new());
    let (mut high, mut low) = (0.0, 0.0);
    for cause in causes.iter().filter(|c| c.worth.abs() >= NEGLIGIBLE) {
        // Leaving an effect out that lowers the figure makes it too high.
        if cause.worth < 0.0 {
            high -= cause.worth;
            high_effects.extend(&cause.effects);
        } else {
            low -= cause.worth;
            low_effects.extend(&cause.effects);
        }
    }
    let smaller = f64::min(high, -low);
    let cancels = smaller >= LARGE && error.abs() <= SMALL.min(SMALL_SHARE * smaller);
    cancels.then_some(Cancelling { high_effects, high, low_effects, low })
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]
    use super::*;

    fn step(effect: Effect, worth: f64) -> Step {
        Step { effects: vec![effect], before: 0.0, after: worth, worth }
    }

    #[test]
    fn two_large_errors_that_cancel_are_named() {
        let causes = [step(Effect::WallThickness, 0.36), step(Effect::Induction, -0.33)];
        let found = cancelling(-0.03, &causes).unwrap();
        assert_eq!(found.high_effects, [Effect::Induction]);
        assert_eq!(found.low_effects, [Effect::WallThickness]);
        assert!((found.high - 0.33).abs() < 1e-12 && (found.low + 0.36).abs() < 1e-12);
        // A large error is no cancellation, nor are two small causes.
        assert!(cancelling(-0.3, &[step(Effect::WallThickness, 0.36), step(Effect::Induction, -0.06)]).is_none());
        assert!(cancelling(0.0, &[step(Effect::WallThickness, 0.03), step(Effect::Induction, -0.03)]).is_none());
    }
}
