#![allow(clippy::unwrap_used, clippy::float_cmp, reason = "tests may stop at the first fault")]

use hdf5::types::{FixedUnicode, VarLenUnicode};
use lenzbore_solver::monitor::Unwatched;
use ndarray::{Array1, Array2, Array3};

use super::*;
use crate::result::demo;

/// Writes the demo's field file and opens it again.
fn written() -> (tempfile::TempDir, Outcome, File) {
    let folder = tempfile::tempdir().unwrap();
    let (_, outcome) = demo::free();
    let path = folder.path().join("run.h5");
    write_fields(&path, &demo::header("Latch"), &outcome, outcome.fields.as_ref().unwrap(), &Unwatched).unwrap();
    let file = File::open(&path).unwrap();
    (folder, outcome, file)
}

fn attribute(set: &hdf5::Location, name: &str) -> String {
    set.attr(name).unwrap().read_scalar::<VarLenUnicode>().unwrap().to_string()
}

fn data_sets(group: &Group) -> Vec<hdf5::Dataset> {
    let mut sets = group.datasets().unwrap();
    for child in group.groups().unwrap() {
        sets.extend(data_sets(&child));
    }
    sets
}

#[test]
fn every_data_set_says_units_description_and_location() {
    let (_folder, _, file) = written();
    let sets = data_sets(&file);
    assert!(sets.len() >= 20, "{} data sets", sets.len());
    for set in sets {
        let name = set.name();
        for word in ["units", "description", "location"] {
            assert!(!attribute(&set, word).is_empty(), "{name} lacks {word}");
        }
        let location = attribute(&set, "location");
        assert!(["node", "cell", "none"].contains(&location.as_str()), "{name}: {location}");
    }
    assert!(attribute(&file, "stored").contains("finest grid"));
    assert_eq!(attribute(&file, "title"), "Latch");
}

#[test]
fn grid_regions_and_snapshots_read_back_exactly() {
    let (_folder, outcome, file) = written();
    let fields = outcome.fields.unwrap();
    let (nz, nr) = (fields.z_m.len(), fields.r_m.len());
    let radii: Array1<f64> = file.dataset("grid/r_m").unwrap().read().unwrap();
    assert_eq!(radii.to_vec(), fields.r_m);
    let sigma: Array2<f64> = file.dataset("regions/conductivity_S_per_m").unwrap().read().unwrap();
    assert_eq!(sigma.shape(), [nz - 1, nr - 1]);
    let names: Array2<FixedUnicode<16>> = file.dataset("regions/name").unwrap().read().unwrap();
    for (cell, number) in names.iter().zip(&fields.region) {
        assert_eq!(cell.as_str(), fields.region_names[*number]);
    }
    let psi = file.dataset("snapshots/psi_total_Wb_per_rad").unwrap();
    assert_eq!(psi.chunk().unwrap(), [1, nz, nr], "one chunk a snapshot");
    assert_eq!(psi.filters().len(), 2, "shuffle and deflate");
    let psi: Array3<f64> = psi.read().unwrap();
    let heat: Array3<f64> = file.dataset("snapshots/heat_density_W_per_m3").unwrap().read().unwrap();
    let current: Array3<f64> = file.dataset("snapshots/current_density_phi_A_per_m2").unwrap().read().unwrap();
    for (t, snapshot) in fields.snapshots.iter().enumerate() {
        for (z, r) in [(0, 0), (3, 5), (nz - 2, nr - 2)] {
            assert_eq!(psi[[t, z, r]], snapshot.psi_total[z * nr + r]);
            assert_eq!(heat[[t, z, r]], snapshot.heat_density[z * (nr - 1) + r]);
            assert_eq!(current[[t, z, r]], snapshot.current_density_phi[z * (nr - 1) + r]);
        }
    }
    let times: Array1<f64> = file.dataset("snapshots/time_s").unwrap().read().unwrap();
    assert_eq!(times.to_vec(), fields.snapshots.iter().map(|s| s.time_s).collect::<Vec<_>>());
}

#[test]
fn series_and_level_figures_are_there() {
    let (_folder, outcome, file) = written();
    for column in trace_columns(&outcome.trace).unwrap() {
        let set = file.dataset(&format!("trace/{}", column.name)).unwrap();
        assert_eq!(set.read_raw::<f64>().unwrap(), column.values.to_vec());
        assert_eq!(attribute(&set, "units"), column.unit);
    }
    for figure in &outcome.figures {
        let set = file.dataset(&format!("levels/{}", figure.name)).unwrap();
        assert_eq!(set.read_raw::<f64>().unwrap(), figure.levels);
        assert_eq!(set.attr("value").unwrap().read_scalar::<f64>().unwrap(), figure.value);
        assert_eq!(set.attr("band").unwrap().read_scalar::<f64>().unwrap(), figure.band);
    }
}

#[test]
fn long_and_odd_names_survive() {
    let folder = tempfile::tempdir().unwrap();
    let (_, outcome) = demo::steady();
    let mut fields = outcome.fields.clone().unwrap();
    fields.region_names[1] = format!("Hülse {}", "ä".repeat(200));
    let path = folder.path().join("run.h5");
    write_fields(&path, &demo::header("NUL \0 inside"), &outcome, &fields, &Unwatched).unwrap();
    let file = File::open(&path).unwrap();
    let names: Array2<FixedUnicode<256>> = file.dataset("regions/name").unwrap().read().unwrap();
    let wall = names.iter().find(|n| n.as_str() != "free space").unwrap();
    assert!(fields.region_names[1].starts_with(wall.as_str()) && wall.len() > 250, "cut at a whole letter");
    assert_eq!(attribute(&file, "title"), "NUL   inside");
}

#[test]
fn misfits_are_refused_before_anything_is_written() {
    let folder = tempfile::tempdir().unwrap();
    let (_, outcome) = demo::steady();
    let path = folder.path().join("run.h5");
    let attempt = |spoil: fn(&mut Fields)| {
        let mut fields = outcome.fields.clone().unwrap();
        spoil(&mut fields);
        write_fields(&path, &demo::header("x"), &outcome, &fields, &Unwatched).unwrap_err()
    };
    let short = attempt(|f| f.snapshots[0].psi_total.truncate(5));
    assert!(matches!(short, IoFault::Length { what, .. } if what.starts_with("psi_total")));
    let spoilt = attempt(|f| f.snapshots[0].heat_density[7] = f64::NAN);
    assert!(matches!(spoilt, IoFault::NotFinite { what, .. } if what == "heat_density_W_per_m3 [7]"));
    assert!(!path.exists());
}

#[test]
fn a_stop_is_heard_between_arrays() {
    struct Stopped;
    impl Monitor for Stopped {
        fn progress(&self, _: f64, _: &str) {}
        fn cancelled(&self) -> bool {
            true
        }
    }
    let folder = tempfile::tempdir().unwrap();
    let (_, outcome) = demo::steady();
    let path = folder.path().join("run.h5");
    let fault = write_fields(&path, &demo::header("x"), &outcome, outcome.fields.as_ref().unwrap(), &Stopped);
    assert!(matches!(fault, Err(IoFault::Interrupted)));
}

#[test]
fn no_folder_to_write_to_is_a_fault() {
    let (_, outcome) = demo::steady();
    let fields = outcome.fields.as_ref().unwrap();
    let fault = write_fields(Path::new("/nowhere/run.h5"), &demo::header("x"), &outcome, fields, &Unwatched);
    assert!(matches!(fault, Err(IoFault::FieldFile { .. })));
}

#[test]
fn the_same_run_gives_the_same_bytes() {
    let (first, _, file) = written();
    drop(file);
    let (second, _, file) = written();
    drop(file);
    let bytes = |folder: &tempfile::TempDir| std::fs::read(folder.path().join("run.h5")).unwrap();
    assert_eq!(bytes(&first), bytes(&second));
}
