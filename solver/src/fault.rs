//! Why a solve can fail.

use lenzbore_mesh::MeshFault;
use thiserror::Error;

/// A solve that gave no answer.
#[derive(Debug, Clone, PartialEq, Error)]
#[non_exhaustive]
pub enum SolveFault {
    /// The grid cannot be built.
    #[error("the grid cannot be built: {0}")]
    Mesh(#[from] MeshFault),
    /// The matrix was not numerically positive definite.
    #[error(
        "the field could not be computed: its {unknowns} equations have no stable solution; look for sizes, conductivities or \
         permeabilities that lie very many powers of ten apart"
    )]
    Factorisation {
        /// Unknowns.
        unknowns: usize,
    },
    /// A number that is not finite appeared.
    #[error("the computation failed: {what} came out as no finite number")]
    NotFinite {
        /// What.
        what: &'static str,
    },
    /// A linear solve left too large a residual.
    #[error(
        "the field could not be computed: its equations are fulfilled to {residual:.1e} only, where {limit:.1e} is asked; look for sizes, \
         conductivities or permeabilities that lie very many powers of ten apart"
    )]
    Residual {
        /// The residual.
        residual: f64,
        /// The limit.
        limit: f64,
    },
    /// The time stepping gave up.
    #[error("the equation of motion did not converge at t = {time_s} s")]
    Motion {
        /// Instant, s.
        time_s: f64,
    },
    /// The case does not suit the law of travel.
    #[error("{0}")]
    Unsuited(&'static str),
    /// Coupled rings hold for walls of relative permeability 1.
    #[error("layer {layer:?} has relative permeability {found}; coupled rings need 1")]
    PermeableRings {
        /// Name of the layer.
        layer: String,
        /// Relative permeability found.
        found: f64,
    },
    /// A number is out of its range.
    #[error("{what} is {found}; it must be {legal}")]
    OutOfRange {
        /// The quantity.
        what: &'static str,
        /// Its value, SI.
        found: f64,
        /// What is legal.
        legal: &'static str,
    },
    /// The mover did not reach a gate within the time allowed.
    #[error("the mover did not pass z = {gate_m} m within {time_s} s")]
    GateNotReached {
        /// Position of the gate, m.
        gate_m: f64,
        /// Time allowed, s.
        time_s: f64,
    },
    /// More memory would be needed than the machine has.
    #[error("the solve would need {needed_mib} MiB of memory; {available_mib} MiB are available")]
    Memory {
        /// Needed, MiB.
        needed_mib: u64,
        /// Available, MiB.
        available_mib: u64,
    },
    /// Stopped on request.
    #[error("interrupted")]
    Interrupted,
}
