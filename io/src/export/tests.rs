//! Exports read back by other readers than the writers' own.

#![allow(clippy::unwrap_used, clippy::float_cmp, reason = "tests may stop at the first fault")]

use std::path::PathBuf;

use base64::Engine as _;
use base64::engine::general_purpose::STANDARD;
use lenzbore_solver::monitor::Unwatched;
use lenzbore_solver::problem::{Problem, Travel};
use lenzbore_solver::system::settled_systems;
use nalgebra_sparse::io::load_coo_from_matrix_market_file;
use nalgebra_sparse::{CooMatrix, CsrMatrix};
use roxmltree::Document;
use serde_json::json;
use tempfile::TempDir;

use super::*;
use crate::result::{WriteOptions, demo, read_earlier, write};

/// A made-up fall, written and ready to be exported.
fn result() -> (TempDir, PathBuf, Fields) {
    let (problem, outcome) = demo::free();
    let folder = TempDir::new().unwrap();
    let path = folder.path().join("result");
    let options = WriteOptions { pictures: false, ..WriteOptions::default() };
    write(&path, &options, &demo::header("Demo"), &problem, &outcome, &Unwatched).unwrap();
    (folder, path, outcome.fields.unwrap())
}

fn exported(path: &Path, what: &Export<'_>) -> (PathBuf, Vec<String>) {
    let target = path.with_extension(what.word());
    let files = export(path, &read_earlier(path).unwrap(), what, (&target, false), &Unwatched).unwrap();
    for file in &files {
        assert!(target.join(file).is_file(), "{file}");
    }
    (target, files)
}

#[test]
fn fields_read_back_are_those_written() {
    let (_folder, path, fields) = result();
    assert_eq!(read_fields(&path.join("run.h5")).unwrap(), fields);
    std::fs::write(path.join("run.h5"), "no HDF5").unwrap();
    assert!(matches!(read_fields(&path.join("run.h5")), Err(IoFault::Unreadable { .. })));
}

/// The numbers of one array of an XML file.
fn numbers(document: &Document<'_>, name: &str) -> Vec<f64> {
    let array = document.descendants().find(|n| n.attribute("Name") == Some(name)).unwrap();
    assert_eq!((array.attribute("type"), array.attribute("format")), (Some("Float64"), Some("binary")));
    let bytes = STANDARD.decode(array.text().unwrap().trim()).unwrap();
    let (count, rest) = bytes.split_first_chunk::<8>().unwrap();
    assert_eq!(u64::from_le_bytes(*count), rest.len() as u64);
    rest.chunks_exact(8).map(|c| f64::from_le_bytes(c.try_into().unwrap())).collect()
}

#[test]
fn every_snapshot_becomes_a_rectilinear_file() {
    let (_folder, path, fields) = result();
    let (target, _) = exported(&path, &Export::Vtk);
    let series = std::fs::read_to_string(target.join("fields.pvd")).unwrap();
    let series = Document::parse(&series).unwrap();
    let sets: Vec<_> = series.descendants().filter(|n| n.has_tag_name("DataSet")).collect();
    assert_eq!(sets.len(), fields.snapshots.len());
    for (set, snapshot) in sets.iter().zip(&fields.snapshots) {
        assert_eq!(set.attribute("timestep").unwrap().parse::<f64>().unwrap(), snapshot.time_s);
        let text = std::fs::read_to_string(target.join(set.attribute("file").unwrap())).unwrap();
        let document = Document::parse(&text).unwrap();
        let piece = document.descendants().find(|n| n.has_tag_name("Piece")).unwrap();
        let extent = format!("0 {} 0 {} 0 0", fields.r_m.len() - 1, fields.z_m.len() - 1);
        assert_eq!(piece.attribute("Extent"), Some(extent.as_str()));
        assert_eq!(numbers(&document, "r_m"), fields.r_m);
        assert_eq!(numbers(&document, "z_m"), fields.z_m);
        assert_eq!(numbers(&document, "psi_total_Wb_per_rad"), snapshot.psi_total);
        assert_eq!(numbers(&document, "heat_density_W_per_m3"), snapshot.heat_density);
        let vectors = numbers(&document, "flux_density_T");
        assert_eq!(vectors.len(), 3 * snapshot.flux_density_z.len());
        assert_eq!(vectors[4], snapshot.flux_density_z[1]);
    }
}

#[test]
fn tables_hold_the_snapshot_that_was_chosen() {
    let (_folder, path, fields) = result();
    let strongest = |s: &&lenzbore_solver::outcome::Snapshot| {
        s.current_density_phi.iter().fold(0.0_f64, |most, j| most.max(j.abs()))
    };
    let chosen = fields.snapshots.iter().max_by(|a, b| strongest(a).total_cmp(&strongest(b))).unwrap();
    let (target, files) = exported(&path, &Export::Csv(Chosen::Strongest));
    assert_eq!(files[0], "trace.csv");
    let mut reader = ::csv::Reader::from_path(target.join("cells.csv")).unwrap();
    let headers: Vec<String> = reader.headers().unwrap().iter().map(str::to_owned).collect();
    assert_eq!(headers[..3], ["r_m", "z_m", "region"]);
    let column = headers.iter().position(|h| h == "current_density_phi_A_per_m2").unwrap();
    let rows: Vec<::csv::StringRecord> = reader.records().map(Result::unwrap).collect();
    let read: Vec<f64> = rows.iter().map(|r| r[column].parse().unwrap()).collect();
    assert_eq!(read, chosen.current_density_phi);
    assert!(rows.iter().any(|r| &r[2] == "sleeve"));
    let nodes = std::fs::read_to_string(target.join("nodes.csv")).unwrap();
    assert_eq!(nodes.lines().count(), 1 + fields.r_m.len() * fields.z_m.len());
    let last = fields.snapshots.last().unwrap().time_s;
    std::fs::remove_dir_all(&target).unwrap();
    let (target, _) = exported(&path, &Export::Csv(Chosen::At(last + 1.0)));
    let about: Value = serde_json::from_str(&std::fs::read_to_string(target.join("export.json")).unwrap()).unwrap();
    assert_eq!(about["about"]["snapshot"]["time_s"], last);
}

#[test]
fn nothing_is_overwritten_unasked_and_no_fields_are_a_plain_fault() {
    let (_folder, path, _) = result();
    let (target, _) = exported(&path, &Export::Xdmf);
    let earlier = read_earlier(&path).unwrap();
    let again = |replace| export(&path, &earlier, &Export::Xdmf, (&target, replace), &Unwatched);
    assert!(matches!(again(false), Err(IoFault::Exists { .. })));
    assert!(again(true).is_ok());
    std::fs::remove_file(path.join("run.h5")).unwrap();
    let fault = again(true).unwrap_err();
    assert!(fault.to_string().contains("does not hold fields (run.h5)") && fault.is_of_the_input(), "{fault}");
    assert!(target.join("run.h5").is_file(), "the older export stays");
}

/// The demo's wall with a dipole, endless.
fn settled() -> Problem {
    let (mut problem, _) = demo::steady();
    problem.travel = Travel::Steady { velocity_m_per_s: 3.0 };
    problem
}

#[test]
fn matrices_read_back_by_another_reader_are_those_assembled() {
    let (_folder, path, _) = result();
    let levels = settled_systems(&settled(), 3.0, 1, &Unwatched).unwrap();
    let systems = Systems { levels, drive: json!({"velocity_m_per_s": 3.0}) };
    let (target, files) = exported(&path, &Export::MatrixMarket(&systems));
    assert_eq!(files.len(), 8, "{files:?}");
    let level = &systems.levels[0];
    let read = |name: &str| -> CsrMatrix<f64> {
        let coo: CooMatrix<f64> = load_coo_from_matrix_market_file(target.join(name)).unwrap();
        CsrMatrix::from(&coo)
    };
    for (name, matrix) in [("level-1-K.mtx", &level.stiffness), ("level-1-C.mtx", level.convection.as_ref().unwrap())] {
        let read = read(name);
        assert_eq!((read.nrows(), read.ncols()), (matrix.rows, matrix.columns));
        assert_eq!(read.values(), matrix.values);
        assert_eq!(read.col_indices(), matrix.column_indices);
    }
    let conductance = read("level-1-G.mtx");
    let total: f64 = conductance.values().iter().sum();
    approx::assert_relative_eq!(total, level.conductance.iter().sum::<f64>(), max_relative = 1e-14);
    let slope: Vec<f64> = std::fs::read_to_string(target.join("level-1-slope.mtx"))
        .unwrap()
        .lines()
        .skip(3)
        .map(|l| l.parse().unwrap())
        .collect();
    assert_eq!(slope, level.slope);
    let rows = std::fs::read_to_string(target.join("level-1-rows.csv")).unwrap();
    let first = rows.lines().nth(1).unwrap();
    assert!(first.starts_with("1,1,1,") && first.ends_with(",free space,axis lower"), "{first}");
    assert_eq!(rows.lines().count(), 1 + level.rows.len());
}
