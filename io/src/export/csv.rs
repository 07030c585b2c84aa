//! The fields of one snapshot as tables, a row a node or a cell; and the series of the run as they stand.

use std::fmt::Write as _;
use std::path::Path;

use lenzbore_solver::outcome::{Fields, Snapshot};
use serde_json::{Value, json};

use super::fields;
use crate::result::Sheaf;
use crate::result::{IoFault, names};

/// Which snapshot.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Chosen {
    /// The one with the greatest current density.
    Strongest,
    /// The one nearest to this instant, s.
    At(f64),
}

/// Tables of a result that are passed on as they stand.
const SERIES: [&str; 6] =
    [names::TRACE, names::CURVE, names::FREQUENCY, names::ACROSS, names::STROKES, names::SENSITIVITIES];

/// Writes `nodes.csv` and `cells.csv`, and every table of the result.
pub(super) fn write(sheaf: &mut Sheaf<'_>, folder: &Path, chosen: &Chosen) -> Result<Value, IoFault> {
    let mut series = Vec::new();
    for name in SERIES {
        let path = folder.join(name);
        if path.is_file() {
            let bytes = std::fs::read(&path).map_err(|e| IoFault::Unreadable { path, why: e.to_string() })?;
            sheaf.put(name, &bytes)?;
            series.push(name);
        }
    }
    let fields = match fields(folder) {
        Ok(fields) => fields,
        // A curve has no fields, and its tables are an export all the same.
        Err(IoFault::Lacks { .. }) if !series.is_empty() => return Ok(json!({"series": series, "snapshot": null})),
        Err(fault) => return Err(fault),
    };
    let snapshot = choose(&fields, chosen);
    sheaf.put("nodes.csv", nodes(&fields, snapshot).as_bytes())?;
    sheaf.put("cells.csv", cells(&fields, snapshot).as_bytes())?;
    Ok(json!({
        "series": series,
        "snapshot": snapshot.map(|s| json!({"time_s": s.time_s, "mover_position_m": s.mover_position_m})),
        "nodes.csv": "psi at the nodes of the finest grid, r running fastest; columns end in their units",
        "cells.csv": "flux density, current density and heat density at the centres of its cells, r running fastest",
    }))
}

fn choose<'f>(fields: &'f Fields, chosen: &Chosen) -> Option<&'f Snapshot> {
    let strongest = |s: &Snapshot| s.current_density_phi.iter().fold(0.0_f64, |most, j| most.max(j.abs()));
    match *chosen {
        Chosen::Strongest => fields.snapshots.iter().max_by(|a, b| strongest(a).total_cmp(&strongest(b))),
        Chosen::At(t) => fields.snapshots.iter().min_by(|a, b| (a.time_s - t).abs().total_cmp(&(b.time_s - t).abs())),
    }
}

fn nodes(fields: &Fields, snapshot: Option<&Snapshot>) -> String {
    let mut text = "r_m,z_m".to_owned();
    let mut columns: Vec<&[f64]> = Vec::new();
    if let Some(s) = snapshot {
        text.push_str(",psi_total_Wb_per_rad,psi_reaction_Wb_per_rad");
        columns.extend([s.psi_total.as_slice(), &s.psi_reaction]);
    }
    text.push('\n');
    let places = fields.z_m.iter().flat_map(|z| fields.r_m.iter().map(move |r| (*r, *z)));
    for (n, (r, z)) in places.enumerate() {
        // Writing into a string cannot fail.
        let _ = write!(text, "{r:e},{z:e}");
        row(&mut text, &columns, n);
    }
    text
}

fn cells(fields: &Fields, snapshot: Option<&Snapshot>) -> String {
    let mut text = "r_m,z_m,region,conductivity_S_per_m,relative_permeability".to_owned();
    let mut columns = vec![fields.conductivity.as_slice(), &fields.relative_permeability];
    if let Some(s) = snapshot {
        text.push_str(",flux_density_r_T,flux_density_z_T,current_density_phi_A_per_m2,heat_density_W_per_m3");
        columns.extend([s.flux_density_r.as_slice(), &s.flux_density_z, &s.current_density_phi, &s.heat_density]);
    }
    text.push('\n');
    let middles = |line: &[f64]| line.windows(2).map(|w| 0.5 * (w[0] + w[1])).collect::<Vec<f64>>();
    let (r, z) = (middles(&fields.r_m), middles(&fields.z_m));
    let places = z.iter().flat_map(|z| r.iter().map(move |r| (*r, *z)));
    for (n, (r, z)) in places.enumerate() {
        let name = fields.region.get(n).and_then(|k| fields.region_names.get(*k)).map_or("", String::as_str);
        let _ = write!(text, "{r:e},{z:e},{}", quoted(name));
        row(&mut text, &columns, n);
    }
    text
}

fn row(text: &mut String, columns: &[&[f64]], n: usize) {
    for column in columns {
        let _ = write!(text, ",{:e}", column[n] + 0.0);
    }
    text.push('\n');
}

/// A name as a cell of a table.
fn quoted(name: &str) -> String {
    if name.contains([',', '"', '\n']) { format!("\"{}\"", name.replace('"', "\"\"")) } else { name.to_owned() }
}
