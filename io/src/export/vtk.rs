//! One XML file a snapshot (`.vtr`, rectilinear grid) and their series over time (`.pvd`), for visualisation programs.
//!
//! The half-plane lies with r along x and z along y. Arrays are written as base64 of a 64-bit byte count and little-endian
//! numbers, inline.

use std::fmt::Write as _;

use base64::Engine as _;
use base64::engine::general_purpose::STANDARD;
use lenzbore_solver::outcome::{Fields, Snapshot};
use serde_json::{Value, json};

use crate::result::IoFault;
use crate::result::Sheaf;

/// The series.
const SERIES: &str = "fields.pvd";

/// Writes every snapshot, or the regions alone where none was kept.
pub(super) fn write(sheaf: &mut Sheaf<'_>, fields: &Fields) -> Result<Value, IoFault> {
    let mut series = String::new();
    let snapshots: Vec<Option<&Snapshot>> =
        if fields.snapshots.is_empty() { vec![None] } else { fields.snapshots.iter().map(Some).collect() };
    for (k, snapshot) in snapshots.into_iter().enumerate() {
        let name = format!("fields-{k:04}.vtr");
        sheaf.put(&name, rectilinear(fields, snapshot).as_bytes())?;
        let time = snapshot.map_or(0.0, |s| s.time_s);
        // Writing into a string cannot fail.
        let _ = writeln!(series, "<DataSet timestep=\"{time:?}\" group=\"\" part=\"0\" file=\"{name}\"/>");
    }
    let series = format!(
        "<?xml version=\"1.0\"?>\n<VTKFile type=\"Collection\" version=\"1.0\" byte_order=\"LittleEndian\" \
         header_type=\"UInt64\">\n<Collection>\n{series}</Collection>\n</VTKFile>\n"
    );
    sheaf.put(SERIES, series.as_bytes())?;
    let regions: Value =
        fields.region_names.iter().enumerate().map(|(k, name)| json!({"number": k, "name": name})).collect();
    Ok(json!({
        "open": SERIES,
        "axes": "x is the radius r, y the height z, both in m; time in s",
        "units": "names of arrays end in their units; flux_density_T is the vector (B_r, B_z, 0)",
        "regions": regions,
    }))
}

/// One snapshot as XML.
fn rectilinear(fields: &Fields, snapshot: Option<&Snapshot>) -> String {
    let (nr, nz) = (fields.r_m.len(), fields.z_m.len());
    let extent = format!("0 {} 0 {} 0 0", nr - 1, nz - 1);
    let mut text = format!(
        "<?xml version=\"1.0\"?>\n<VTKFile type=\"RectilinearGrid\" version=\"1.0\" byte_order=\"LittleEndian\" \
         header_type=\"UInt64\">\n<RectilinearGrid WholeExtent=\"{extent}\">\n<Piece Extent=\"{extent}\">\n<Coordinates>\n"
    );
    for (name, values) in [("r_m", fields.r_m.as_slice()), ("z_m", &fields.z_m), ("zero", &[0.0])] {
        text.push_str(&floats(name, 1, values));
    }
    text.push_str("</Coordinates>\n<PointData>\n");
    if let Some(s) = snapshot {
        text.push_str(&floats("psi_total_Wb_per_rad", 1, &s.psi_total));
        text.push_str(&floats("psi_reaction_Wb_per_rad", 1, &s.psi_reaction));
    }
    text.push_str("</PointData>\n<CellData>\n");
    let regions: Vec<i32> = fields.region.iter().map(|n| i32::try_from(*n).unwrap_or(i32::MAX)).collect();
    text.push_str(&array("Int32", "region", 1, &regions.iter().flat_map(|n| n.to_le_bytes()).collect::<Vec<u8>>()));
    text.push_str(&floats("conductivity_S_per_m", 1, &fields.conductivity));
    text.push_str(&floats("relative_permeability", 1, &fields.relative_permeability));
    if let Some(s) = snapshot {
        let vectors: Vec<f64> =
            s.flux_density_r.iter().zip(&s.flux_density_z).flat_map(|(r, z)| [*r, *z, 0.0]).collect();
        text.push_str(&floats("flux_density_T", 3, &vectors));
        text.push_str(&floats("flux_density_r_T", 1, &s.flux_density_r));
        text.push_str(&floats("flux_density_z_T", 1, &s.flux_density_z));
        text.push_str(&floats("current_density_phi_A_per_m2", 1, &s.current_density_phi));
        text.push_str(&floats("heat_density_W_per_m3", 1, &s.heat_density));
    }
    text.push_str("</CellData>\n</Piece>\n</RectilinearGrid>\n</VTKFile>\n");
    text
}

fn floats(name: &str, components: usize, values: &[f64]) -> String {
    array("Float64", name, components, &values.iter().flat_map(|x| x.to_le_bytes()).collect::<Vec<u8>>())
}

/// One array: its byte count and its bytes, encoded together.
fn array(kind: &str, name: &str, components: usize, bytes: &[u8]) -> String {
    let mut whole = u64::try_from(bytes.len()).unwrap_or(u64::MAX).to_le_bytes().to_vec();
    whole.extend_from_slice(bytes);
    format!(
        "<DataArray type=\"{kind}\" Name=\"{name}\" NumberOfComponents=\"{components}\" format=\"binary\">\n{}\n</DataArray>\n",
        STANDARD.encode(whole)
    )
}
