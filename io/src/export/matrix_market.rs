//! The systems of equations of every grid level as Matrix Market files, so that they can be solved elsewhere.
//!
//! Coordinate format, real, general, indices from 1; vectors as arrays. K is written whole, not its lower triangle.

use std::fmt::Write as _;

use lenzbore_solver::system::{LevelSystem, SparseMatrix};
use serde_json::{Value, json};

use super::Systems;
use crate::result::IoFault;
use crate::result::Sheaf;

/// Writes every level, and says how they belong together.
pub(super) fn write(sheaf: &mut Sheaf<'_>, systems: &Systems) -> Result<Value, IoFault> {
    let mut levels = Vec::new();
    for (k, system) in systems.levels.iter().enumerate() {
        let number = k + 1;
        let mut put = |what: &str, text: String| {
            let name = format!("level-{number}-{what}");
            sheaf.put(&name, text.as_bytes()).map(|()| name)
        };
        let mut files = serde_json::Map::new();
        files.insert("K".to_owned(), json!(put("K.mtx", matrix("K, A rad/Wb", &system.stiffness))?));
        files.insert("G".to_owned(), json!(put("G.mtx", diagonal("G, S", &system.conductance))?));
        if let Some(convection) = &system.convection {
            files.insert("C".to_owned(), json!(put("C.mtx", matrix("C, S/m", convection))?));
        }
        for (key, title, values) in [
            ("source", "psi_0 at the wall's nodes, Wb/rad", &system.source),
            ("slope", "q = d psi_0/dz at the wall's nodes, Wb/(rad m)", &system.slope),
            ("static", "static reaction of a permeable wall, Wb/rad", &system.static_reaction),
        ] {
            files.insert(key.to_owned(), json!(put(&format!("{key}.mtx"), vector(title, values))?));
        }
        files.insert("rows".to_owned(), json!(put("rows.csv", rows(system))?));
        levels.push(json!({
            "level": number, "refinement": system.refinement, "unknowns": system.rows.len(), "files": files,
            "nodes_r": system.r_m.len(), "nodes_z": system.z_m.len(), "static_linkage_A_Wb_per_rad": system.static_linkage,
        }));
    }
    Ok(json!({"drive": systems.drive, "equations": equations(systems), "levels": levels}))
}

/// How matrices and vectors belong together.
fn equations(systems: &Systems) -> Value {
    let moving = systems.levels.iter().any(|l| l.convection.is_some());
    let unknowns = "psi = r A_phi of the wall's reaction, Wb/rad; rows.csv says which node each row is; psi = 0 on axis and boundary";
    if moving {
        json!({
            "unknowns": unknowns,
            "system": "(K - v C) psi = v G slope",
            "currents_A": "I = v (C psi + G slope), in each row's ring",
            "drag_N": "2 pi slope . I for v > 0, positive against the motion",
            "heat_W": "2 pi sum of I^2 / G over rows with G > 0",
            "field": "psi + static + the mover's own field",
        })
    } else {
        json!({
            "unknowns": unknowns,
            "system": "(K + i omega G) psi = -i omega G source; exp(+i omega t), amplitudes zero to peak",
            "currents_A": "I = -i omega G (source + psi), in each row's ring",
            "impedance_change_ohm": "i 2 pi omega / current^2 (source . I + static_linkage)",
            "heat_W": "pi sum of |I|^2 / G over rows with G > 0, the mean of a period",
            "field": "psi + static + the coils' own field",
        })
    }
}

const HEADER: &str = "%%MatrixMarket matrix";

fn matrix(title: &str, matrix: &SparseMatrix) -> String {
    let mut text = format!("{HEADER} coordinate real general\n% {title}\n");
    // Writing into a string cannot fail.
    let _ = writeln!(text, "{} {} {}", matrix.rows, matrix.columns, matrix.values.len());
    for (row, column, value) in matrix.entries() {
        let _ = writeln!(text, "{} {} {value:e}", row + 1, column + 1);
    }
    text
}

fn diagonal(title: &str, values: &[f64]) -> String {
    let entries: Vec<(usize, f64)> = values.iter().copied().enumerate().filter(|(_, v)| v.abs() > 0.0).collect();
    let mut text = format!("{HEADER} coordinate real general\n% {title}\n");
    let _ = writeln!(text, "{} {} {}", values.len(), values.len(), entries.len());
    for (row, value) in entries {
        let _ = writeln!(text, "{} {} {value:e}", row + 1, row + 1);
    }
    text
}

fn vector(title: &str, values: &[f64]) -> String {
    let mut text = format!("{HEADER} array real general\n% {title}\n{} 1\n", values.len());
    for value in values {
        let _ = writeln!(text, "{:e}", value + 0.0);
    }
    text
}

/// Sides of the domain that a node can lie beside.
const SIDES: [&str; 4] = ["axis", "outer", "lower", "upper"];

/// Which node each row is, counted from 1 as the matrices do.
fn rows(system: &LevelSystem) -> String {
    let mut text = "row,node_r,node_z,r_m,z_m,region,beside_boundary\n".to_owned();
    for (k, row) in system.rows.iter().enumerate() {
        let sides: Vec<&str> = SIDES.into_iter().zip(row.beside).filter(|(_, is)| *is).map(|(side, _)| side).collect();
        let region = system.region_names.get(row.region).map_or("", String::as_str).replace(['"', ','], " ");
        let (r, z) = (system.r_m[row.i], system.z_m[row.j]);
        let _ = writeln!(text, "{},{},{},{r:e},{z:e},{region},{}", k + 1, row.i, row.j, sides.join(" "));
    }
    text
}
