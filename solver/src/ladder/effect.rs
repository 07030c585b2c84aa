//! What a rung restores: the effects that quick models leave out.

/// One effect, in the order in which the ladder restores them.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Effect {
    /// Nothing yet: the quick rule at the foot of the ladder.
    Foot,
    /// The fields of all magnets act together: sign and distance of neighbours count.
    Neighbours,
    /// Magnets and coils have their size; they are no point dipoles.
    FiniteMagnet,
    /// The wall has a thickness: each depth sees its own field.
    WallThickness,
    /// The wall has ends: the drag grows as the mover enters and fades as it leaves.
    FiniteLength,
    /// The currents have a field of their own (mutual and self-induction, skin effect).
    Induction,
    /// The currents are spread as the field equations say, not evenly over the sections of rings: what is left of the rings.
    Field,
    /// The magnets have their recoil permeability, not 1.
    RecoilPermeability,
    /// Layers of the wall are permeable.
    WallPermeability,
    /// Wall and mover are at their own temperatures, not at 20 degC.
    Temperature,
}

impl Effect {
    /// A short name for tables and pictures.
    #[must_use]
    pub fn word(self) -> &'static str {
        match self {
            Self::Foot => "quick rule",
            Self::Neighbours => "neighbouring magnets",
            Self::FiniteMagnet => "finite magnet",
            Self::WallThickness => "wall thickness",
            Self::FiniteLength => "finite length",
            Self::Induction => "induction",
            Self::Field => "field in the wall",
            Self::RecoilPermeability => "recoil permeability",
            Self::WallPermeability => "wall permeability",
            Self::Temperature => "temperature",
        }
    }

    /// What the model below leaves out, as the end of a sentence that begins "it leaves out ...".
    #[must_use]
    pub fn left_out(self) -> &'static str {
        match self {
            Self::Foot => "nothing",
            Self::Neighbours => "how neighbouring magnets help or oppose one another",
            Self::FiniteMagnet => "the size of the magnets",
            Self::WallThickness => "the thickness of the wall",
            Self::FiniteLength => "the ends of the wall",
            Self::Induction => "the field of the wall's own currents (inductance, skin effect)",
            Self::Field => "the spread of current within a ring",
            Self::RecoilPermeability => "the recoil permeability of the magnets",
            Self::WallPermeability => "the permeability of the wall",
            Self::Temperature => "the temperatures of wall and mover",
        }
    }
}
