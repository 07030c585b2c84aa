//! Damping coefficient at zero speed of stacks of magnets.

use super::{Obtained, Source};

/// Where the values come from.
pub const SOURCE: Source = Source {
    short: "Partovi, Morris 2006",
    citation: "Resistive limit of M. H. Partovi, E. J. Morris, Canadian Journal of Physics 84, 253-271 (2006), magnets superposed with signs",
    obtained: Obtained::ComputedIndependently,
    uncertainty: "half of the sixth decimal, N s/m",
    tolerance: "the last of six printed decimals",
};

/// One stack of equal cylinder magnets (radius 5 mm, length 10 mm, 1.2 T) in a wall of radii 7.5 to 9.5 mm, 58 MS/m.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Stack {
    /// What it is.
    pub name: &'static str,
    /// Signs, bottom to top.
    pub signs: &'static [f64],
    /// Spacer between neighbours, mm, neither magnetic nor conducting.
    pub spacer_mm: f64,
    /// Damping coefficient, N s/m.
    pub damping: f64,
}

/// The table.
pub const TABLE: [Stack; 5] = [
    Stack { name: "one magnet", signs: &[1.0], spacer_mm: 0.0, damping: 0.755_653 },
    Stack { name: "two aiding, touching", signs: &[1.0, 1.0], spacer_mm: 0.0, damping: 1.243_784 },
    Stack { name: "two opposed, touching", signs: &[1.0, -1.0], spacer_mm: 0.0, damping: 1.778_830 },
    Stack { name: "two opposed, 4 mm spacer", signs: &[1.0, -1.0], spacer_mm: 4.0, damping: 2.015_429 },
    Stack {
        name: "four alternating, 4 mm spacers",
        signs: &[1.0, -1.0, 1.0, -1.0],
        spacer_mm: 4.0,
        damping: 4.302_888,
    },
];

/// Decimals of the coefficients.
pub const DECIMALS: i32 = 6;
