//! The endless layered wall, solved exactly by its Fourier-Bessel integral.
//!
//! In the frame of a mover that travels at velocity v along +z the settled vector potential is
//! A_phi(r, z) = Re integral_0^inf A_k(r) exp(i k z) dk. In every annulus of conductivity sigma and permeability mu
//! A_k = c_i I1(q r) + c_k K1(q r) with q^2 = k^2 - i mu sigma k v; A_k and H_k = (1/mu) (1/r) d(r A_k)/dr are continuous
//! across faces, and the mover's currents enter through their free-space amplitude. Any number of coaxial annuli, touching or
//! with gaps, of any sigma and mu_r; parts of the mover in the bore, around the wall, or in a gap between two layers.
//!
//! Source of the method: M. H. Partovi, E. J. Morris, "Electrodynamics of a magnet moving through a conducting pipe", Canadian
//! Journal of Physics 84, 253-271 (2006), for one layer; and, for alternating currents and any number of layers, C. V. Dodd,
//! C. C. Cheng, W. E. Deeds, Journal of Applied Physics 45, 638 (1974). Neither text's formulas were at hand in full: the
//! recursion here was derived anew (see `cascade`) and is checked by tables computed independently.

mod bessel;
mod cascade;
mod coefficient;
mod current;
mod drag;
mod emitter;
mod field;
mod region;
mod setup;
mod spectrum;
mod stroke;

pub use coefficient::{LowSpeed, damping_coefficient, low_speed};
pub use current::{CurrentPeak, current_density, current_density_along, current_density_peak};
pub use drag::drag;
pub use emitter::{Emitter, Shape};
pub use field::{FluxDensity, flux_density, flux_density_along};
pub use setup::Endless;
