//! How strongly magnets are driven against their magnetisation in settled travel.

use super::levels::Levels;
use crate::band::{self, Ladder};
use crate::demagnetisation::{FIELD, MARGIN, Opposed, Watch};
use crate::fault::SolveFault;
use crate::outcome::{Basis, Figure, Location};
use crate::problem::Problem;

/// The greatest opposing field and what the coercivity leaves; nothing where no coercivity is known.
///
/// # Errors
/// See [`SolveFault`].
pub(super) fn magnet_figures(
    problem: &Problem,
    levels: &mut Levels<'_>,
    velocity: f64,
) -> Result<Vec<Figure>, SolveFault> {
    let Some(watch) = Watch::new(&problem.mover) else { return Ok(Vec::new()) };
    let mut worst: Vec<Opposed> = Vec::with_capacity(levels.levels.len());
    for level in &mut levels.levels {
        let (mut psi, _) = level.reaction(velocity, levels.monitor)?;
        if let Some(fixed) = &level.static_reaction {
            psi.iter_mut().zip(fixed).for_each(|(p, s)| *p += s);
        }
        worst.push(watch.worst(&level.operators.grid, &psi, 0.0));
    }
    let figure = |name: &str, unit, value: fn(&Opposed) -> f64, at: fn(&Opposed) -> (f64, f64)| {
        let ladder = Ladder::new(&levels.factors, worst.iter().map(value).collect());
        let (r, z) = worst.last().map_or((0.0, 0.0), at);
        Figure {
            name: name.to_owned(),
            value: ladder.value,
            unit,
            band: band::local(&ladder, 0.0, levels.residual(ladder.value)),
            basis: Basis::Extrapolated,
            location: Some(Location { r_m: Some(r), z_m: Some(z), t_s: None }),
            levels: ladder.levels,
        }
    };
    Ok(vec![figure(FIELD, "A/m", |o| o.field, |o| o.field_at), figure(MARGIN, "1", |o| o.margin, |o| o.margin_at)])
}
