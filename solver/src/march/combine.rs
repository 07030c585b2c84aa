//! Levels' figures to figures with bands.

use super::figures::LevelFigure;
use crate::band::{self, Ladder};
use crate::extrapolate::extrapolate;
use crate::outcome::{Basis, Caution, Figure, Location};
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
            location: located(factors, by_level, figure),
            levels: ladder.levels,
        });
    }
    (figures, cautions)
}

/// Where a figure is: instant and height extrapolated over the levels, where that stays within their last step; else as on the finest.
fn located(factors: &[f64], by_level: &[Vec<LevelFigure>], figure: &LevelFigure) -> Option<Location> {
    let finest = figure.location?;
    let read = |of: fn(&Location) -> Option<f64>| -> Option<f64> {
        let last = of(&finest)?;
        let same = |list: &Vec<LevelFigure>| list.iter().find(|f| f.name == figure.name)?.location.and_then(|l| of(&l));
        let values: Option<Vec<f64>> = by_level.iter().map(same).collect();
        let values = values.filter(|v| v.len() > 1).unwrap_or_else(|| vec![last]);
        let step = values.len().checked_sub(2).map_or(0.0, |k| (last - values[k]).abs());
        let value = extrapolate(&factors[factors.len() - values.len()..], &values);
        Some(if (value - last).abs() <= 2.0 * step { value } else { last })
    };
    Some(Location { t_s: read(|l| l.t_s), z_m: read(|l| l.z_m), ..finest })
}

/// Figures that are a peak of the force in time: their band takes the second route in.
fn is_force_peak(name: &str) -> bool {
    matches!(name, "drag_peak" | "deceleration_peak" | "felt_acceleration_peak")
}
