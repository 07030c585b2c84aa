//! Builds the parts of a mover from a stack, bottom to top.
//!
//! Lengths run over the coating, as a stack is measured on the bench: total = sum of the items' lengths + (items - 1)
//! gaps. Centres are given from the middle of that total, which is the mover's reference point.

use super::Source;
use crate::problem::{Outline, Part};

/// Which way a part's north points.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum North {
    /// As its source says.
    Up,
    /// Reversed: remanence, moment or ampere-turns change sign.
    Down,
}

/// One item of a stack.
#[derive(Debug, Clone, PartialEq)]
pub enum StackItem {
    /// A part with a field of its own.
    Magnetic {
        /// The user's name of it.
        name: String,
        /// Its field with north up, sizes without coating.
        source: Source,
        /// Its body over the coating.
        outline: Outline,
        /// Which way it is put in.
        north: North,
    },
    /// A length without field.
    Spacer {
        /// Length, m, >= 0.
        length_m: f64,
    },
}

impl StackItem {
    /// Length over the coating, m.
    #[must_use]
    pub fn length_m(&self) -> f64 {
        match self {
            Self::Magnetic { outline, .. } => outline.length_m,
            Self::Spacer { length_m } => *length_m,
        }
    }
}

/// The parts of a built stack.
#[derive(Debug, Clone, PartialEq)]
pub struct Stack {
    /// Magnetic parts, bottom to top, centres from the middle of the whole.
    pub parts: Vec<Part>,
    /// Length of the whole, m.
    pub length_m: f64,
}

impl Stack {
    /// Stacks `items` bottom to top with `gap_m` (>= 0, m) between neighbours; spacers count as neighbours.
    ///
    /// Lengths must be finite; the function itself cannot fail, and an empty list gives an empty stack of length 0.
    ///
    /// ```
    /// use lenzbore_solver::problem::Outline;
    /// use lenzbore_solver::sources::{North, Source, Stack, StackItem};
    /// let magnet = |north| StackItem::Magnetic {
    ///     name: "M".into(),
    ///     source: Source::Magnet { inner_radius_m: 0.0, outer_radius_m: 0.011, length_m: 0.012, remanence_tesla: 1.3 },
    ///     outline: Outline { inner_radius_m: 0.0, outer_radius_m: 0.011, length_m: 0.012 },
    ///     north,
    /// };
    /// let stack = Stack::new(&[magnet(North::Up), StackItem::Spacer { length_m: 0.004 }, magnet(North::Down)], 0.0);
    /// assert!((stack.length_m - 0.028).abs() < 1e-15);
    /// assert!((stack.parts[1].centre_m - 0.008).abs() < 1e-15);
    /// ```
    #[must_use]
    pub fn new(items: &[StackItem], gap_m: f64) -> Self {
        let mut parts = Vec::new();
        let mut top = 0.0;
        for (index, item) in items.iter().enumerate() {
            let bottom = if index == 0 { 0.0 } else { top + gap_m };
            top = bottom + item.length_m();
            if let StackItem::Magnetic { name, source, outline, north } = item {
                let source = if *north == North::Up { *source } else { source.reversed() };
                parts.push(Part {
                    name: name.clone(),
                    centre_m: 0.5 * (bottom + top),
                    source,
                    outline: *outline,
                    coercivity_a_per_m: None,
                });
            }
        }
        for part in &mut parts {
            part.centre_m -= 0.5 * top;
        }
        Self { parts, length_m: top }
    }
}

/// A magnet whose sizes are measured over a coating of `coating_m` a side: the material is smaller by the coating on
/// every face (a bore's radius larger by it), its outline is what was measured.
///
/// `inner_radius_m` 0 is a cylinder, without coating on the axis. Sizes in m, `remanence_tesla` along +z, signed. `None`
/// where the coating leaves no material.
///
/// ```
/// use lenzbore_solver::sources::{Source, coated_magnet};
/// let (source, outline) = coated_magnet(0.0, 0.011, 0.012, 15e-6, 1.3).unwrap();
/// let Source::Magnet { outer_radius_m, length_m, .. } = source else { unreachable!() };
/// assert!((outer_radius_m - 0.010985).abs() < 1e-15 && (length_m - 0.01197).abs() < 1e-15);
/// assert!((outline.length_m - 0.012).abs() < 1e-15);
/// ```
#[must_use]
pub fn coated_magnet(
    inner_radius_m: f64,
    outer_radius_m: f64,
    length_m: f64,
    coating_m: f64,
    remanence_tesla: f64,
) -> Option<(Source, Outline)> {
    let inner = if inner_radius_m > 0.0 { inner_radius_m + coating_m } else { 0.0 };
    let (outer, length) = (outer_radius_m - coating_m, length_m - 2.0 * coating_m);
    let source = Source::Magnet { inner_radius_m: inner, outer_radius_m: outer, length_m: length, remanence_tesla };
    (outer > inner && length > 0.0).then_some((source, Outline { inner_radius_m, outer_radius_m, length_m }))
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, clippy::float_cmp, clippy::panic, reason = "tests may stop at the first fault")]
    use super::*;
    use crate::problem::Mover;
    use crate::sources::AxialField;
    use approx::assert_relative_eq;

    fn item(name: &str, source: Source, outline: Outline, north: North) -> StackItem {
        StackItem::Magnetic { name: name.into(), source, outline, north }
    }

    fn magnet(length_m: f64, coating_m: f64, north: North) -> StackItem {
        let (source, outline) = coated_magnet(0.0, 0.01, length_m, coating_m, 1.2).unwrap();
        item("M", source, outline, north)
    }

    fn remanence(part: &Part) -> f64 {
        let Source::Magnet { remanence_tesla, .. } = part.source else { panic!("not a magnet") };
        remanence_tesla
    }

    #[test]
    fn two_opposed_magnets_and_a_spacer_by_hand() {
        // 10 + 0.1 + 4 + 0.1 + 20 = 34.2 mm; middle 17.1; centres 5 and 24.2 from the bottom.
        let items =
            [magnet(10e-3, 0.0, North::Up), StackItem::Spacer { length_m: 4e-3 }, magnet(20e-3, 0.0, North::Down)];
        let stack = Stack::new(&items, 1e-4);
        assert_relative_eq!(stack.length_m, 34.2e-3, max_relative = 1e-14);
        assert_eq!(stack.parts.len(), 2);
        assert_relative_eq!(stack.parts[0].centre_m, -12.1e-3, max_relative = 1e-14);
        assert_relative_eq!(stack.parts[1].centre_m, 7.1e-3, max_relative = 1e-14);
        assert_eq!((remanence(&stack.parts[0]), remanence(&stack.parts[1])), (1.2, -1.2));
    }

    #[test]
    fn coating_counts_in_the_length_but_not_in_the_material() {
        // Three of 12 mm over 15 um a side, 0.1 mm adhesive: 36.2 mm; centres 12.1 mm apart; material 11.97 mm long.
        let stack = Stack::new(&[0, 1, 2].map(|_| magnet(12e-3, 15e-6, North::Up)), 1e-4);
        assert_relative_eq!(stack.length_m, 36.2e-3, max_relative = 1e-14);
        assert_relative_eq!(stack.parts[2].centre_m, 12.1e-3, max_relative = 1e-13);
        assert_relative_eq!(stack.parts[1].centre_m, 0.0, epsilon = 1e-17);
        let Source::Magnet { length_m, outer_radius_m, .. } = stack.parts[0].source else { panic!("not a magnet") };
        assert_relative_eq!(length_m, 11.97e-3, max_relative = 1e-14);
        assert_relative_eq!(outer_radius_m, 9.985e-3, max_relative = 1e-14);
        assert_eq!(stack.parts[0].outline.outer_radius_m, 0.01);
    }

    #[test]
    fn coating_on_the_bore_of_a_ring_and_too_thick_a_coating() {
        let (source, outline) = coated_magnet(4e-3, 9e-3, 5e-3, 1e-4, -1.0).unwrap();
        let Source::Magnet { inner_radius_m, outer_radius_m, length_m, remanence_tesla } = source else { panic!() };
        assert_relative_eq!(inner_radius_m, 4.1e-3, max_relative = 1e-14);
        assert_relative_eq!(outer_radius_m, 8.9e-3, max_relative = 1e-14);
        assert_relative_eq!(length_m, 4.8e-3, max_relative = 1e-14);
        assert_eq!((remanence_tesla, outline.inner_radius_m), (-1.0, 4e-3));
        assert!(coated_magnet(4e-3, 9e-3, 5e-3, 2.5e-3, 1.0).is_none());
        assert!(coated_magnet(0.0, 9e-3, 5e-3, 2.5e-3, 1.0).is_none());
        assert!(coated_magnet(0.0, f64::NAN, 5e-3, 0.0, 1.0).is_none());
    }

    #[test]
    fn every_kind_is_reversed() {
        let outline = Outline { inner_radius_m: 0.0, outer_radius_m: 0.0, length_m: 0.0 };
        let dipole = item("D", Source::Dipole { moment_a_m2: 0.5 }, outline, North::Down);
        let coil = Source::Coil { inner_radius_m: 0.01, outer_radius_m: 0.02, length_m: 0.01, ampere_turns: 100.0 };
        let body = Outline { inner_radius_m: 0.01, outer_radius_m: 0.02, length_m: 0.01 };
        let stack = Stack::new(&[dipole, item("C", coil, body, North::Down)], 0.0);
        assert_eq!(stack.parts[0].source, Source::Dipole { moment_a_m2: -0.5 });
        for (r, z) in [(0.005, 0.0), (0.03, 0.01)] {
            assert_eq!(stack.parts[1].source.psi(r, z), -coil.psi(r, z));
            assert_eq!(stack.parts[1].source.flux_density_z(r, z), -coil.flux_density_z(r, z));
        }
        assert_eq!(stack.parts[0].centre_m, -5e-3);
    }

    #[test]
    fn spacers_at_the_ends_count_and_nothing_gives_nothing() {
        let items = [StackItem::Spacer { length_m: 2e-3 }, magnet(10e-3, 0.0, North::Up)];
        let stack = Stack::new(&items, 0.5e-3);
        assert_relative_eq!(stack.length_m, 12.5e-3, max_relative = 1e-14);
        assert_relative_eq!(stack.parts[0].centre_m, 1.25e-3, max_relative = 1e-13);
        assert_eq!(Stack::new(&[], 1e-4), Stack { parts: Vec::new(), length_m: 0.0 });
    }

    #[test]
    fn touching_magnets_are_one_longer_magnet() {
        let halves = Stack::new(&[magnet(6e-3, 0.0, North::Up), magnet(6e-3, 0.0, North::Up)], 0.0);
        let mover = Mover { parts: halves.parts, mass_kg: None, recoil: None };
        let whole = Stack::new(&[magnet(12e-3, 0.0, North::Up)], 0.0).parts[0].source;
        for (r, z) in [(0.012, 0.001), (0.003, -0.002), (0.02, 0.03), (1e-6, 0.1)] {
            assert_relative_eq!(mover.psi(r, z), whole.psi(r, z), max_relative = 1e-12);
            assert_relative_eq!(mover.flux_density_r(r, z), whole.flux_density_r(r, z), max_relative = 1e-12);
            assert_relative_eq!(mover.flux_density_z(r, z), whole.flux_density_z(r, z), max_relative = 1e-12);
        }
    }
}
