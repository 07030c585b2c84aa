//! How warm the wall gets: the heat of one event, conduction and cooling, and the event again and again.
//!
//! rho c dT/dt = div(k grad T) + heat of the currents, on the wall alone, with Newton's law of cooling at its faces to the air; implicit
//! second-order finite volumes, on three grids, extrapolated. An event's heat falls in at one instant; its drag and its heat follow the
//! temperature that the wall has where the heat falls, taken as uniform for the event.

mod answer;
mod cautions;
mod cooling;
mod decay;
mod deposit;
mod duty;
mod grid;
mod law;
mod operator;
mod step;
mod stops;
#[cfg(test)]
mod verification;

pub(crate) use answer::{Event, warm};
pub(crate) use cooling::{CoolingLevel, Duration};
