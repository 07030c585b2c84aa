//! Where every body of a case stands: what a drawing needs, written into `summary.json` as `geometry` and read back from it.
//!
//! SI units, diameters across, heights upward; parts of the mover count from its reference point, everything else from the
//! wall's lower end.

mod from_case;
mod to_problem;

pub use from_case::layout;

use serde::{Deserialize, Serialize};

/// Wall, mover, and the heights that matter for the travel.
#[derive(Debug, Clone, PartialEq, Default, Serialize, Deserialize)]
pub struct Layout {
    /// The conductor at rest.
    pub wall: WallLayout,
    /// Everything that travels, bottom to top.
    pub mover: Vec<BodyLayout>,
    /// Heights of the gates between which the transit is timed, m; none where nothing travels freely.
    #[serde(default, skip_serializing_if = "Vec::is_empty")]
    pub gates_m: Vec<f64>,
    /// Position of the reference point at the start, m.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub start_m: Option<f64>,
    /// Position of the reference point at the end, m.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub end_m: Option<f64>,
}

/// The wall: length and layers.
#[derive(Debug, Clone, PartialEq, Default, Serialize, Deserialize)]
pub struct WallLayout {
    /// Length, m; none for an endless wall.
    pub length_m: Option<f64>,
    /// Coaxial layers.
    pub layers: Vec<LayerLayout>,
}

/// One layer of the wall.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub struct LayerLayout {
    /// The user's name of it.
    pub name: String,
    /// Its grade in the material book, where one was named.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub material: Option<String>,
    /// Inner diameter, m; 0 for a rod.
    pub inner_diameter_m: f64,
    /// Outer diameter, m.
    pub outer_diameter_m: f64,
    /// Lower end, m; 0 in an endless wall.
    pub from_m: f64,
    /// Upper end, m; 0 in an endless wall.
    pub to_m: f64,
    /// Conductivity in use, S/m.
    #[serde(rename = "conductivity_S_per_m")]
    pub conductivity_s_per_m: f64,
    /// Relative permeability.
    pub relative_permeability: f64,
}

/// One body of the mover, over its coating.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub struct BodyLayout {
    /// The user's name of it.
    pub name: String,
    /// Its grade in the material book, where one was named.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub material: Option<String>,
    /// Inner diameter, m.
    pub inner_diameter_m: f64,
    /// Outer diameter, m; 0 where the case gives none (spacers) and for a dipole.
    pub outer_diameter_m: f64,
    /// Axial length, m; 0 for a dipole.
    pub length_m: f64,
    /// Height of its centre above the reference point, m.
    pub at_m: f64,
    /// What it is.
    #[serde(flatten)]
    pub kind: BodyKind,
}

/// What a body of the mover is; signs upward positive.
#[derive(Debug, Clone, Copy, PartialEq, Serialize, Deserialize)]
#[serde(tag = "kind", rename_all = "snake_case")]
pub enum BodyKind {
    /// A magnet magnetised along the axis.
    Magnet {
        /// Remanence in use, T; negative where its north points down.
        #[serde(rename = "remanence_T")]
        remanence_tesla: f64,
    },
    /// A coil.
    Coil {
        /// Ampere-turns; negative where its north points down.
        #[serde(rename = "ampere_turns_A")]
        ampere_turns: f64,
    },
    /// A point dipole.
    Dipole {
        /// Moment, A m2; negative where it points down.
        #[serde(rename = "moment_A_m2")]
        moment_a_m2: f64,
    },
    /// A body without a field of its own.
    Spacer,
}
