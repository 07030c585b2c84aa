//! Motion in time through a finite wall: implicit midpoint on the wall's total flux y = psi_s + psi_r,
//!
//!   (2 G / dt + K) psi_mid = (2 G / dt)(y_n - mean psi_s) - (K - K0) mean psi_s,   y_(n+1) = 2 (psi_mid + mean psi_s) - y_n,
//!
//! mean psi_s the mean of the mover's own field at both ends of the step. The force is a discrete gradient,
//! F dz = 2 pi sum (K0 psi_mid) . (psi_s(z_(n+1)) - psi_s(z_n)), so that work = heat + change of field energy holds step by step.

#[cfg(test)]
mod allocation_tests;
mod answer;
mod combine;
mod course;
mod cycles;
mod event;
mod figures;
mod gauge;
mod heat_figures;
mod heating;
mod level;
mod lines;
mod lumped;
mod motion;
mod pace;
mod path;
mod positions;
mod resample;
mod routes;
mod run;
mod schedule;
mod series;
mod small;
#[cfg(test)]
pub(crate) mod small_test;
mod snapshots;
mod stations;
mod step;
mod transfer;
mod window;

#[cfg(test)]
pub(crate) use answer::{coarsest_both_ways, march_on_whole_grids};
pub(crate) use answer::{march, settled_stroke};
pub(crate) use course::{grids_on_the_way, plan, prescribed_steps};
pub(crate) use event::{CoarseEvent, coarse_events};
pub(crate) use gauge::layer_at;
pub(crate) use heating::HeatLeft;
pub(crate) use lumped::lumped_model;
pub(crate) use positions::damping_against_position;
pub(crate) use small::small_strokes;
