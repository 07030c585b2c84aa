//! Where the models of the rungs are published. Citations from memory unless they say otherwise.

use super::assumptions::{Assumptions, MagnetModel, WallModel};

/// Source of a model of independent rings.
pub(super) fn of_rings(assumptions: Assumptions) -> &'static str {
    match (assumptions.magnet, assumptions.wall) {
        (MagnetModel::LoneDipoles | MagnetModel::Dipoles, WallModel::Thickness) => DIPOLE_THICK,
        (MagnetModel::LoneDipoles | MagnetModel::Dipoles, _) => DIPOLE_THIN,
        (MagnetModel::Finite, WallModel::Thickness) => FINITE_THICK,
        (MagnetModel::Finite, _) => FINITE_THIN,
    }
}

const DIPOLE_THIN: &str = "W. M. Saslow, Am. J. Phys. 60, 693-711 (1992); Y. Levin, F. L. da Silveira, F. B. Rizzato, Am. J. Phys. 74, 815-817 (2006)";
const DIPOLE_THICK: &str = "G. Donoso, C. L. Ladera, P. Martin, Eur. J. Phys. 30, 855-869 (2009)";
const FINITE_THIN: &str = "field of the cylinder: N. Derby, S. Olbert, Am. J. Phys. 78, 229-235 (2010); rings: Y. Levin, F. L. da Silveira, F. B. Rizzato, Am. J. Phys. 74, 815-817 (2006)";
const FINITE_THICK: &str = "field of the cylinder: N. Derby, S. Olbert, Am. J. Phys. 78, 229-235 (2010); thickness: G. Donoso, C. L. Ladera, P. Martin, Eur. J. Phys. 30, 855-869 (2009)";
/// Coupled rings.
pub(super) const COUPLED: &str = "J. C. Maxwell, A Treatise on Electricity and Magnetism, art. 701; E. B. Rosa, F. W. Grover, Bull. Bur. Stand. 8, 1-237 (1912)";
/// The field solution.
pub(super) const FIELD: &str = "the axisymmetric magnetic diffusion equation, solved on several grids (this program)";
