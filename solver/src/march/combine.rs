//! Levels' figures to figures with bands.

use super::figures::LevelFigure;
use crate::band::{self, Ladder};
use crate::outcome::{Basis, Caution, Figure};
use crate::target::is_local;

/// What else goes into the bands of a march.
pub(super) struct Margins {
    /// Largest relative residual of a linear solve.
    pub(super) residual: f64,
    /// Relative distance of two force routes at the peak.
    pub(super) apart: f64,
    /// Powers of the cell size at a permeable wall's corners.
    pub(super) corners: Option<Vec<f64>>,
    /// What a stroke that has not settled, or does not close its balance of energy, adds to the figures of these names.
    pub(super) unsettled: Vec<(&'static str, f64)>,
}

/// Figures that all levels have, extrapolated, with bands. The corners of a permeable wall dominate its static pull, which
/// then takes their powers.
pub(super) fn combine(
    factors: &[f64],
    by_level: &[Vec<LevelFigure>],
    cut: Option<&[LevelFigure]>,
    margins: &Margins,
) -> (Vec<Figure>, Vec<Caution>) {
    let (mut figures, mut cautions) = (Vec::new(), Vec::new());
    let Some(finest) = by_level.last() else { return (figures, cautions) };
    for figure in finest {
        let find = |list: &[LevelFigure]| list.iter().find(|f| f.name == figure.name).map(|f| f.value);
        let values: Option<Vec<f64>> = by_level.iter().map(|list| find(list)).collect();
        let Some(values) = values else { continue };
        let coarsest = values[0];
        let ladder = match &margins.corners {
            Some(powers) if figure.name == "static_pull_peak" => Ladder::with_powers(factors, values, powers),
            Some(powers) => Ladder::beside_corners(factors, values, powers),
            None => Ladder::new(factors, values),
        };
        let change = cut.and_then(find).map_or(0.0, |c| c - coarsest);
        let rule = if is_local(figure.name) { band::local } else { band::one_route };
        let apart = if is_force_peak(figure.name) { margins.apart } else { 0.0 };
        let unsettled: f64 =
            margins.unsettled.iter().filter(|(name, _)| *name == figure.name).map(|(_, half)| half).sum();
        let half_width = rule(&ladder, change, (margins.residual + apart) * ladder.value.abs()) + unsettled;
        if !is_local(figure.name) {
            cautions.extend(band::order_caution(figure.name, &ladder));
        }
        figures.push(Figure {
            name: figure.name.to_owned(),
            value: ladder.value,
            unit: figure.unit,
            band: half_width,
            basis: Basis::Extrapolated,
            location: figure.location,
            levels: ladder.levels,
        });
    }
    (figures, cautions)
}

/// Figures that are a peak of the force in time: their band takes the second route in.
fn is_force_peak(name: &str) -> bool {
    matches!(name, "drag_peak" | "deceleration_peak" | "felt_acceleration_peak")
}
