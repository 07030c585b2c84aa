//! What a simplified model takes for granted.

/// How the mover's field is made.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum MagnetModel {
    /// Each part is a point dipole of its moment and brakes alone: drags are added, not fields.
    LoneDipoles,
    /// Each part is a point dipole of its moment at its centre; the fields are added.
    Dipoles,
    /// Each part has its own shape (closed forms of uniformly magnetised cylinders, coils).
    Finite,
}

/// How each layer of the wall carries its current.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum WallModel {
    /// As thin rings at the face towards the mover (a tube's inner radius).
    FacingRadius,
    /// As thin rings at the middle of its thickness.
    MeanRadius,
    /// Integrated over its thickness.
    Thickness,
}

/// How the wall ends.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum EndModel {
    /// The drag of an endless wall while the mover's reference point is between the ends of a layer, nothing beyond.
    Switched,
    /// Only rings between the ends of a layer carry current.
    Gradual,
}

/// A model whose wall is made of independent resistive rings: no ring feels another ring's current, nor its own field.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub struct Assumptions {
    /// The mover.
    pub magnet: MagnetModel,
    /// The wall across.
    pub wall: WallModel,
    /// The wall along.
    pub ends: EndModel,
}

impl Assumptions {
    /// The closed form of a point dipole in a thin tube: the rule of thumb.
    pub const DIPOLE_RULE: Self =
        Self { magnet: MagnetModel::LoneDipoles, wall: WallModel::FacingRadius, ends: EndModel::Switched };
    /// A quick calculator's ring sum with point dipoles, rings at the inner radius.
    pub const DIPOLE_RINGS_INNER: Self =
        Self { magnet: MagnetModel::Dipoles, wall: WallModel::FacingRadius, ends: EndModel::Gradual };
    /// The same, rings at the mean radius.
    pub const DIPOLE_RINGS_MEAN: Self =
        Self { magnet: MagnetModel::Dipoles, wall: WallModel::MeanRadius, ends: EndModel::Gradual };
    /// A quick calculator's ring sum with real magnets, rings at the inner radius.
    pub const RINGS_INNER: Self =
        Self { magnet: MagnetModel::Finite, wall: WallModel::FacingRadius, ends: EndModel::Gradual };
    /// The same, rings at the mean radius.
    pub const RINGS_MEAN: Self =
        Self { magnet: MagnetModel::Finite, wall: WallModel::MeanRadius, ends: EndModel::Gradual };
    /// Everything but induction: independent rings all through the thickness.
    pub const RESISTIVE: Self =
        Self { magnet: MagnetModel::Finite, wall: WallModel::Thickness, ends: EndModel::Gradual };

    /// A name in plain words, for example `ring sum, magnets as they are, mean radius`.
    #[must_use]
    pub fn words(self) -> String {
        let magnet = match self.magnet {
            MagnetModel::LoneDipoles => "each magnet a lone dipole",
            MagnetModel::Dipoles => "dipoles",
            MagnetModel::Finite => "magnets as they are",
        };
        let wall = match self.wall {
            WallModel::FacingRadius => "inner radius",
            WallModel::MeanRadius => "mean radius",
            WallModel::Thickness => "thickness integrated",
        };
        if self.magnet == MagnetModel::LoneDipoles && self.wall == WallModel::FacingRadius {
            return "dipole rule for a thin tube, inner radius".to_owned();
        }
        match self.ends {
            EndModel::Switched => format!("drag of an endless wall: {magnet}, {wall}"),
            EndModel::Gradual => format!("ring sum: {magnet}, {wall}"),
        }
    }
}
