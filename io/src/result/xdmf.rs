//! `run.xdmf`: tells general visualisation programs how to read `run.h5`.
//!
//! The (r, z) half-plane is a rectilinear mesh in two dimensions: r across, z up. Dimensions in this format run slowest
//! first, as the arrays `[t, z, r]` do, while the coordinate lists run fastest first: r, z. A mesh in three dimensions of
//! one plane would say the same, but readers then refuse the two-dimensional `/regions`.

use std::fmt::Write as _;

use lenzbore_solver::outcome::Fields;

use super::names::FIELDS;

/// The arrays of a snapshot that are worth colouring, with their place on the grid.
const SNAPSHOT_ARRAYS: [(&str, Centre); 6] = [
    ("psi_total_Wb_per_rad", Centre::Node),
    ("psi_reaction_Wb_per_rad", Centre::Node),
    ("flux_density_r_T", Centre::Cell),
    ("flux_density_z_T", Centre::Cell),
    ("current_density_phi_A_per_m2", Centre::Cell),
    ("heat_density_W_per_m3", Centre::Cell),
];

const REGION_ARRAYS: [(&str, &str); 3] = [
    ("conductivity_S_per_m", "NumberType=\"Float\" Precision=\"8\""),
    ("relative_permeability", "NumberType=\"Float\" Precision=\"8\""),
    ("number", "NumberType=\"UInt\" Precision=\"4\""),
];

const DOUBLE: &str = "NumberType=\"Float\" Precision=\"8\" Format=\"HDF\"";

#[derive(Clone, Copy)]
enum Centre {
    Node,
    Cell,
}

/// The index as text: a series of snapshots, or the regions alone where no snapshot was kept.
#[must_use]
pub fn xdmf(fields: &Fields) -> String {
    let mut text = String::from("<?xml version=\"1.0\" encoding=\"utf-8\"?>\n<Xdmf Version=\"3.0\">\n<Domain>\n");
    if fields.snapshots.is_empty() {
        text.push_str(&format!("<Grid Name=\"regions\" GridType=\"Uniform\">\n{}</Grid>\n", mesh(fields)));
    } else {
        text.push_str("<Grid Name=\"snapshots\" GridType=\"Collection\" CollectionType=\"Temporal\">\n");
        for (t, snapshot) in fields.snapshots.iter().enumerate() {
            let _ = writeln!(text, "<Grid Name=\"snapshot {t}\" GridType=\"Uniform\">");
            let _ = writeln!(text, "<Time Value=\"{:?}\"/>", snapshot.time_s);
            text.push_str(&mesh(fields));
            for (name, centre) in SNAPSHOT_ARRAYS {
                text.push_str(&snapshot_array(fields, t, name, centre));
            }
            text.push_str("</Grid>\n");
        }
        text.push_str("</Grid>\n");
    }
    text.push_str("</Domain>\n</Xdmf>\n");
    text
}

/// Topology, coordinates and regions, the same at every instant.
fn mesh(fields: &Fields) -> String {
    let (nz, nr) = (fields.z_m.len(), fields.r_m.len());
    let mut text = format!(
        "<Topology TopologyType=\"2DRectMesh\" Dimensions=\"{nz} {nr}\"/>\n\
         <Geometry GeometryType=\"VXVY\">\n\
         <DataItem Dimensions=\"{nr}\" {DOUBLE}>{FIELDS}:/grid/r_m</DataItem>\n\
         <DataItem Dimensions=\"{nz}\" {DOUBLE}>{FIELDS}:/grid/z_m</DataItem>\n\
         </Geometry>\n"
    );
    for (name, kind) in REGION_ARRAYS {
        let _ = writeln!(
            text,
            "<Attribute Name=\"region {name}\" AttributeType=\"Scalar\" Center=\"Cell\">\n\
             <DataItem Dimensions=\"{} {}\" {kind} Format=\"HDF\">{FIELDS}:/regions/{name}</DataItem>\n</Attribute>",
            nz - 1,
            nr - 1
        );
    }
    text
}

/// One array at one instant: a slab of `[t, z, r]`, stated as start, stride and count.
fn snapshot_array(fields: &Fields, t: usize, name: &str, centre: Centre) -> String {
    let count = fields.snapshots.len();
    let (word, nz, nr) = match centre {
        Centre::Node => ("Node", fields.z_m.len(), fields.r_m.len()),
        Centre::Cell => ("Cell", fields.z_m.len() - 1, fields.r_m.len() - 1),
    };
    format!(
        "<Attribute Name=\"{name}\" AttributeType=\"Scalar\" Center=\"{word}\">\n\
         <DataItem ItemType=\"HyperSlab\" Dimensions=\"{nz} {nr}\">\n\
         <DataItem Dimensions=\"3 3\" NumberType=\"Int\" Format=\"XML\">{t} 0 0 1 1 1 1 {nz} {nr}</DataItem>\n\
         <DataItem Dimensions=\"{count} {nz} {nr}\" {DOUBLE}>{FIELDS}:/snapshots/{name}</DataItem>\n\
         </DataItem>\n</Attribute>\n"
    )
}

#[cfg(test)]
#[path = "xdmf_tests.rs"]
mod tests;
