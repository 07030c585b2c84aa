//! A wall that cools from one temperature, and nothing else.
//!
//! No case asks for it; it lets exactly known conduction problems (slab, rod, tube) be put to the same heat equation, grids and steps
//! that a case's temperatures come from.

use lenzbore_mesh::Refinement;

use crate::band::{Ladder, local, one_route};
use crate::fault::SolveFault;
use crate::outcome::Measured;
use crate::problem::{LayerHeat, Wall, Warming};
use crate::thermal::{CoolingLevel, Duration};

/// Grid levels.
const LEVELS: usize = 3;

/// A place of a wall, m; read at the node nearest to it, of which faces, ends and the middle of an even stretch are some.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Place {
    /// Radius, m.
    pub r_m: f64,
    /// Height, m.
    pub z_m: f64,
}

/// Temperature at each of `places` and, last, its mean by heat capacity, all over the ambient and as a share of what it was at the start:
/// (T - ambient) / (start - ambient), with bands; one list for each of `times_s`, increasing.
///
/// The wall is all at `warming.start_k` at t = 0 and cools by `warming.cooling`; its ends are at finite heights.
///
/// # Errors
/// No cooling, a layer without thermal conductivity, and those of the heat equation.
pub fn cool_down(
    wall: &Wall,
    warming: &Warming,
    places: &[Place],
    times_s: &[f64],
) -> Result<Vec<Vec<Measured>>, SolveFault> {
    if warming.cooling.is_none() || !warming.layers.iter().all(conducts) {
        return Err(SolveFault::Unsuited("a wall cools by films, and heat has to get to them"));
    }
    let mut by_level = Vec::new();
    for refinement in Refinement::first(LEVELS) {
        let mut level = CoolingLevel::new(wall, warming, refinement)?;
        let mut rows = Vec::new();
        let mut reached = 0.0;
        for &time in times_s {
            level.cool(Duration { length_s: time - reached, passed_s: reached })?;
            reached = time;
            rows.push(level.read(places.iter().map(|p| (p.r_m, p.z_m))));
        }
        by_level.push(rows);
    }
    let factors: Vec<f64> = Refinement::first(LEVELS).iter().map(|f| f.factor()).collect();
    let ladders = |row: usize| -> Vec<Ladder> {
        (0..=places.len())
            .map(|column| Ladder::new(&factors, by_level.iter().map(|rows| rows[row][column]).collect()))
            .collect()
    };
    Ok((0..times_s.len()).map(|row| banded(ladders(row))).collect())
}

/// Readings of one instant, the mean last. At one place two extrapolations may agree by accident: no band is narrower than the widest step
/// of the instant.
fn banded(ladders: Vec<Ladder>) -> Vec<Measured> {
    let least = ladders.iter().map(|l| one_route(l, 0.0, 0.0)).fold(0.0, f64::max);
    let last = ladders.len() - 1;
    let rule = |column: usize| if column < last { local } else { one_route };
    let reading =
        |(column, l): (usize, Ladder)| Measured { value: l.value, band: rule(column)(&l, 0.0, 0.0).max(least) };
    ladders.into_iter().enumerate().map(reading).collect()
}

fn conducts(layer: &LayerHeat) -> bool {
    layer.thermal_conductivity_w_per_m_k.is_some_and(|k| k > 0.0)
}
