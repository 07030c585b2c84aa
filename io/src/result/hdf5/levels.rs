//! The figures of every grid level, and the levels themselves.

use hdf5::File;
use lenzbore_solver::outcome::{Figure, GridReport, Outcome};

use super::dataset::{About, put, text, value};

/// Writes `/levels`: one data set a figure, coarse to fine, with the extrapolated value and its band as attributes.
pub(super) fn write(file: &File, outcome: &Outcome) -> hdf5::Result<()> {
    let group = file.create_group("levels")?;
    let count = outcome.grids.len();
    let pure = |description| About { units: "1", description, location: "none" };
    let refinement: Vec<f64> = outcome.grids.iter().map(|g| g.refinement).collect();
    put(&group, "refinement", &[count], &refinement, &pure("cells of this level for each of the coarsest level's"))?;
    let whole = |pick: fn(&GridReport) -> usize| outcome.grids.iter().map(|g| pick(g) as u64).collect::<Vec<_>>();
    put(&group, "nodes_r", &[count], &whole(|g| g.nodes_r), &pure("nodes along r"))?;
    put(&group, "nodes_z", &[count], &whole(|g| g.nodes_z), &pure("nodes along z"))?;
    put(&group, "steps", &[count], &whole(|g| g.steps), &pure("time steps"))?;
    for figure in outcome.figures.iter().filter(|f| !f.levels.is_empty()) {
        write_figure(&group, figure)?;
    }
    Ok(())
}

fn write_figure(group: &hdf5::Group, figure: &Figure) -> hdf5::Result<()> {
    let about =
        About { units: figure.unit, description: "this figure on each grid level, coarse to fine", location: "none" };
    let set = put(group, &figure.name, &[figure.levels.len()], &figure.levels, &about)?;
    value(&set, "value", figure.value)?;
    value(&set, "band", figure.band)?;
    text(&set, "basis", figure.basis.word())
}
