//! The fields of the finest grid, in the wall's frame (endless wall: the mover's reference point is z = 0).

/// One instant. Node arrays are `[z][r]`, row-major, `nz * nr` long; cell arrays `(nz - 1) * (nr - 1)`.
#[derive(Debug, Clone, PartialEq)]
pub struct Snapshot {
    /// Time from the start, s (0 for settled fields).
    pub time_s: f64,
    /// Position of the mover's reference point, m.
    pub mover_position_m: f64,
    /// Total psi = r A_phi at nodes, Wb/rad.
    pub psi_total: Vec<f64>,
    /// Reaction part of psi at nodes, Wb/rad.
    pub psi_reaction: Vec<f64>,
    /// Radial flux density at cell centres, T.
    pub flux_density_r: Vec<f64>,
    /// Axial flux density at cell centres, T.
    pub flux_density_z: Vec<f64>,
    /// Azimuthal current density at cell centres, A/m2.
    pub current_density_phi: Vec<f64>,
    /// Heat density at cell centres, W/m3.
    pub heat_density: Vec<f64>,
}

/// Grid, regions and snapshots.
#[derive(Debug, Clone, PartialEq)]
pub struct Fields {
    /// Node radii, m, increasing from 0.
    pub r_m: Vec<f64>,
    /// Node heights, m, increasing.
    pub z_m: Vec<f64>,
    /// Index into `region_names` for each cell, `[z][r]`.
    pub region: Vec<usize>,
    /// Names of regions; index 0 is free space.
    pub region_names: Vec<String>,
    /// Conductivity of each cell, S/m.
    pub conductivity: Vec<f64>,
    /// Relative permeability of each cell.
    pub relative_permeability: Vec<f64>,
    /// Instants in order.
    pub snapshots: Vec<Snapshot>,
}
