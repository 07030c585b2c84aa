//! The conductor at rest: coaxial layers, each with an axial extent.

/// Axial extent of the whole wall.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Extent {
    /// No ends: z = 0 is the mover's reference point.
    Endless,
    /// From z = 0 to z = `length_m`.
    Finite {
        /// Length of the wall, m.
        length_m: f64,
    },
}

/// One coaxial layer (or a section of one) of homogeneous material.
#[derive(Debug, Clone, PartialEq)]
pub struct Layer {
    /// The user's name of it.
    pub name: String,
    /// Inner radius, m; 0 makes it a rod.
    pub inner_radius_m: f64,
    /// Outer radius, m.
    pub outer_radius_m: f64,
    /// Lower end, m (ignored by an endless wall).
    pub from_m: f64,
    /// Upper end, m (ignored by an endless wall).
    pub to_m: f64,
    /// Electrical conductivity, S/m; may be 0.
    pub conductivity_s_per_m: f64,
    /// Relative permeability, linear, >= 1 in practice, > 0 in any case.
    pub relative_permeability: f64,
}

impl Layer {
    /// Radial thickness, m.
    #[must_use]
    pub fn thickness_m(&self) -> f64 {
        self.outer_radius_m - self.inner_radius_m
    }
}

/// The wall: its extent and its layers.
#[derive(Debug, Clone, PartialEq)]
pub struct Wall {
    /// Axial extent.
    pub extent: Extent,
    /// Number of narrow slots along the whole wall, evenly round it; 0 for an unbroken wall. The field has none: they enter as a factor on
    /// its drag, see [`crate::slots`].
    pub slots: usize,
    /// One or more layers in any order; they may touch or leave gaps, never overlap.
    pub layers: Vec<Layer>,
}

impl Wall {
    /// Length, m, or `None` for an endless wall.
    #[must_use]
    pub fn length_m(&self) -> Option<f64> {
        match self.extent {
            Extent::Endless => None,
            Extent::Finite { length_m } => Some(length_m),
        }
    }

    /// Smallest inner radius of all layers, m.
    #[must_use]
    pub fn inner_radius_m(&self) -> f64 {
        self.layers.iter().map(|l| l.inner_radius_m).fold(f64::INFINITY, f64::min)
    }

    /// Largest outer radius of all layers, m.
    #[must_use]
    pub fn outer_radius_m(&self) -> f64 {
        self.layers.iter().map(|l| l.outer_radius_m).fold(0.0, f64::max)
    }

    /// True where any layer's permeability differs from that of free space.
    #[must_use]
    pub fn is_permeable(&self) -> bool {
        self.layers.iter().any(|l| (l.relative_permeability - 1.0).abs() > 0.0)
    }
}
