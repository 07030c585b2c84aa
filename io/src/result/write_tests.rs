#![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

use std::fs;
use std::process::Command;

use lenzbore_solver::monitor::Unwatched;

use super::*;
use crate::result::demo;

fn names_in(folder: &Path) -> Vec<String> {
    let mut names: Vec<String> =
        fs::read_dir(folder).unwrap().map(|e| e.unwrap().file_name().into_string().unwrap()).collect();
    names.sort();
    names
}

fn write_free(folder: &Path, options: &WriteOptions) -> Result<Written, IoFault> {
    let (problem, outcome) = demo::free();
    write(folder, options, &demo::header("Latch damper"), &problem, &outcome, &Unwatched)
}

#[test]
fn everything_that_applies_is_written_and_listed() {
    let root = tempfile::tempdir().unwrap();
    let target = root.path().join("free");
    let written = write_free(&target, &WriteOptions::default()).unwrap();
    let mut listed = written.files.clone();
    listed.sort();
    assert_eq!(names_in(&target), listed);
    for name in [
        "summary.json",
        "trace.csv",
        "run.h5",
        "run.xdmf",
        "section.png",
        "section.svg",
        "travel_position.svg",
        "travel_time.png",
    ] {
        assert!(listed.iter().any(|n| n == name), "{name} is missing");
        assert!(fs::metadata(target.join(name)).unwrap().len() > 100, "{name} is empty");
    }
    assert!(!listed.iter().any(|n| n.starts_with("curve") || n.starts_with("drag_speed")));
}

#[test]
fn a_curve_has_its_own_files() {
    let root = tempfile::tempdir().unwrap();
    let (problem, outcome) = demo::curve();
    let target = root.path().join("curve");
    write(&target, &WriteOptions::default(), &demo::header("Curve"), &problem, &outcome, &Unwatched).unwrap();
    let expected =
        ["curve.csv", "drag_speed.png", "drag_speed.svg", "report.html", "section.png", "section.svg", "summary.json"];
    assert_eq!(names_in(&target), expected);
}

#[test]
fn only_what_is_asked_is_written() {
    let root = tempfile::tempdir().unwrap();
    let target = root.path().join("free");
    let options = WriteOptions { summary: false, fields: false, pictures: false, ..WriteOptions::default() };
    assert_eq!(write_free(&target, &options).unwrap().files, ["trace.csv"]);
    assert!(matches!(write_free(&target, &options), Err(IoFault::Exists { .. })));
    let again = WriteOptions {
        replace: true,
        summary: true,
        trace: false,
        fields: false,
        pictures: false,
        report: false,
        ..WriteOptions::default()
    };
    write_free(&target, &again).unwrap();
    assert_eq!(names_in(&target), ["summary.json"]);
}

#[test]
fn a_fault_on_the_way_leaves_nothing() {
    let root = tempfile::tempdir().unwrap();
    let target = root.path().join("out/free");
    let (problem, mut outcome) = demo::free();
    outcome.fields.as_mut().unwrap().snapshots[1].flux_density_z[0] = f64::NAN;
    let fault = write(&target, &WriteOptions::default(), &demo::header("x"), &problem, &outcome, &Unwatched);
    assert!(matches!(fault, Err(IoFault::NotFinite { .. })));
    assert!(names_in(root.path()).is_empty());
}

#[test]
fn a_stop_at_any_moment_leaves_nothing_and_keeps_the_old_result() {
    use std::sync::atomic::{AtomicUsize, Ordering};
    struct StopsAfter(AtomicUsize);
    impl Monitor for StopsAfter {
        fn progress(&self, _: f64, _: &str) {}
        fn cancelled(&self) -> bool {
            self.0.fetch_update(Ordering::SeqCst, Ordering::SeqCst, |left| left.checked_sub(1)).is_err()
        }
    }
    let root = tempfile::tempdir().unwrap();
    let target = root.path().join("free");
    let small = WriteOptions { fields: false, pictures: false, ..WriteOptions::default() };
    write_free(&target, &small).unwrap();
    let before = fs::read(target.join("summary.json")).unwrap();
    let (problem, outcome) = demo::free();
    let options = WriteOptions { replace: true, pictures: false, ..WriteOptions::default() };
    for looks in 0..16 {
        let monitor = StopsAfter(AtomicUsize::new(looks));
        let fault = write(&target, &options, &demo::header("new"), &problem, &outcome, &monitor);
        assert!(matches!(fault, Err(IoFault::Interrupted)), "stopped after {looks} looks");
        assert_eq!(fs::read(target.join("summary.json")).unwrap(), before);
        assert_eq!(names_in(root.path()), ["free"]);
    }
    let patient = StopsAfter(AtomicUsize::new(1000));
    write(&target, &options, &demo::header("new"), &problem, &outcome, &patient).unwrap();
    assert_ne!(fs::read(target.join("summary.json")).unwrap(), before);
}

#[test]
fn the_index_names_data_sets_that_exist_with_the_shape_it_says() {
    let root = tempfile::tempdir().unwrap();
    let target = root.path().join("free");
    write_free(&target, &WriteOptions { pictures: false, ..WriteOptions::default() }).unwrap();
    let file = ::hdf5::File::open(target.join("run.h5")).unwrap();
    let index = fs::read_to_string(target.join("run.xdmf")).unwrap();
    let mut seen = 0;
    for line in index.lines().filter(|l| l.contains("run.h5:")) {
        let name = line.split("run.h5:").nth(1).and_then(|t| t.split('<').next()).unwrap();
        let stated = line.split("Dimensions=\"").nth(1).and_then(|t| t.split('"').next()).unwrap();
        let stated: Vec<usize> = stated.split(' ').map(|n| n.parse().unwrap()).collect();
        assert_eq!(file.dataset(name).unwrap().shape(), stated, "{name}");
        seen += 1;
    }
    assert_eq!(seen, 2 * (2 + 3 + 6), "two instants of two coordinates, three regions, six fields");
}

/// What a colleague with Python sees; where Python or its HDF5 package is not installed, the tests beside `hdf5.rs` read
/// the same file back without it.
#[test]
fn python_reads_the_field_file() {
    let have = Command::new("python3").args(["-c", "import h5py"]).output().is_ok_and(|o| o.status.success());
    if !have {
        return;
    }
    let root = tempfile::tempdir().unwrap();
    let target = root.path().join("free");
    write_free(&target, &WriteOptions { pictures: false, ..WriteOptions::default() }).unwrap();
    let script = "
import h5py, sys
with h5py.File(sys.argv[1]) as f:
    z, r = f['grid/z_m'], f['grid/r_m']
    psi = f['snapshots/psi_total_Wb_per_rad']
    assert psi.shape == (2, len(z), len(r)) and psi.chunks == (1, len(z), len(r))
    assert psi.compression == 'gzip' and psi.shuffle
    assert f['regions/name'].asstr()[0, 0] == 'free space'
    assert isinstance(f.attrs['stored'], str)
    def check(name, item):
        if isinstance(item, h5py.Dataset):
            assert all(isinstance(item.attrs[a], str) for a in ('units', 'description', 'location')), name
    f.visititems(check)
    print(f['trace/drag_N'][:].max())
";
    let out = Command::new("python3").args(["-c", script]).arg(target.join("run.h5")).output().unwrap();
    assert!(out.status.success(), "{}", String::from_utf8_lossy(&out.stderr));
    let read: f64 = String::from_utf8_lossy(&out.stdout).trim().parse().unwrap();
    let wanted = demo::free().1.trace.drag_newton.into_iter().fold(0.0, f64::max);
    approx::assert_relative_eq!(read, wanted, max_relative = 1e-12);
}

/// Keeps whole result folders for a look at them: set `LENZBORE_RESULTS` to a folder.
#[test]
fn whole_results_can_be_kept() {
    let root = tempfile::tempdir().unwrap();
    let folder = std::env::var_os("LENZBORE_RESULTS").map_or_else(|| root.path().to_path_buf(), PathBuf::from);
    for (name, (problem, outcome)) in [("free", demo::free()), ("steady", demo::steady()), ("curve", demo::curve())] {
        let options = WriteOptions { replace: true, ..WriteOptions::default() };
        let written = write(&folder.join(name), &options, &demo::header(name), &problem, &outcome, &Unwatched).unwrap();
        assert!(written.files.len() >= 5);
    }
}
