//! The grid convergence index: its worked examples, and what it says of this program's own grids.

use lenzbore_solver::monitor::Monitor;
use lenzbore_solver::problem::Travel;

use super::{Check, Kind, Verdict};
use crate::grid_convergence::GridConvergence;
use crate::references::dipole_drag;
use crate::references::grid_index::{self as reference, Column};
use crate::{Error, cases, endless};

pub(super) const CHECKS: &[Check] = &[Check {
    name: "grid-convergence",
    about: "worked examples of the grid convergence index, and the index of a drag on this program's grid levels",
    kind: Kind::CodeVerification,
    source: &reference::SOURCE,
    run: worked_examples,
}];

fn worked_examples(monitor: &dyn Monitor) -> Result<Verdict, Error> {
    let mut verdict = examples(&reference::TABLE);
    own_levels(&mut verdict, monitor)?;
    Ok(verdict)
}

fn examples(table: &[Column]) -> Verdict {
    let mut verdict = Verdict::default();
    for column in table {
        let Some(found) = GridConvergence::of(column.values, column.ratios) else {
            verdict.compare(format!("{}: an order is found", column.name), f64::NAN, column.printed[0], 0.0, "1");
            continue;
        };
        let found = [found.order, found.extrapolated, found.index];
        for (i, name) in ["observed order", "extrapolated value", "index"].into_iter().enumerate() {
            let what = format!("{}: {name}", column.name);
            verdict.compare(what.as_str(), found[i], column.printed[i], column.half_figure[i], "1");
            let again = column.computed[i];
            verdict.compare(format!("{what}, computed again"), found[i], again, 1e-5 * again, "1");
        }
    }
    verdict
}

/// The drag of a dipole at 5 m/s on levels 1, 1.5, 2: order 2, and the index holds the finest level's error.
fn own_levels(verdict: &mut Verdict, monitor: &dyn Monitor) -> Result<(), Error> {
    let wall = cases::endless_tube(dipole_drag::WALL_M, dipole_drag::CONDUCTIVITY_S_PER_M, 1.0);
    let mover = cases::dipole(dipole_drag::MOMENT_A_M2);
    let (speed, _) = dipole_drag::DRAG[0];
    let exact = endless::drag(&wall, &mover, speed)?.value;
    let outcome =
        lenzbore_solver::solve(&cases::question(wall, mover, Travel::Steady { velocity_m_per_s: speed }), monitor)?;
    let figure = outcome.figures.iter().find(|f| f.name == "drag").ok_or(Error::MissingFigure("drag"))?;
    let &[coarse, middle, fine] = figure.levels.as_slice() else { return Err(Error::MissingFigure("three levels")) };
    let index =
        GridConvergence::of([fine, middle, coarse], [4.0 / 3.0, 1.5]).ok_or(Error::MissingFigure("an order"))?;
    verdict.compare("observed order of a drag on our levels", index.order, 2.0, 0.1, "1");
    verdict.compare("the finest level's drag within the index", fine, exact, index.index * fine, "N");
    Ok(())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn planted_errors_are_seen() {
        assert!(examples(&reference::TABLE).passed());
        let mut table = reference::TABLE;
        table[0].values.swap(0, 1);
        table[1].printed[2] *= 1.2;
        table[2].values[2] = table[2].values[1];
        let verdict = examples(&table);
        for column in table {
            let mut of = verdict.comparisons.iter().filter(|c| c.what.starts_with(column.name));
            assert!(of.any(|c| !c.passes()), "{}", column.name);
        }
    }
}
