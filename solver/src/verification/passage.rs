//! Order of marched figures: a traverse through a short tube on all five levels, steps refined with the grid.
//!
//! No closed form exists, so the truth is the extrapolation over all five levels. It is good enough to show orders 2
//! and 4; after two extrapolations about as much is left as the truth itself may err.

use super::cases::{answer, figure, finite, layer, magnet, problem, traverse};
use super::order::{Wanted, assert_orders};
use crate::outcome::Outcome;

fn passage() -> Outcome {
    let wall = finite(0.03, vec![layer(8.0, 10.0, 58.0, 1.0)]);
    answer(&problem(wall, vec![magnet(0.0, 5.0, 6.0, 1.2, 0.0)], traverse(3.0, 70.0, -40.0), 5))
}

#[test]
fn marched_figures_converge_with_orders_2_and_4() {
    let outcome = passage();
    for (name, bounds) in [
        ("drag_peak", [2.2e-4, 2.9e-7, 1e-9]),
        ("impulse", [2.7e-4, 3.3e-7, 5e-9]),
        ("dissipated_energy", [2.7e-4, 3.3e-7, 5e-9]),
    ] {
        let figure = figure(&outcome, name);
        assert_orders(name, &figure.levels, figure.value, &Wanted::even_to_four(&bounds));
    }
}
