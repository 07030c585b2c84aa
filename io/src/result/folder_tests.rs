#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, reason = "tests may stop at the first fault")]

use super::*;

fn names_in(folder: &Path) -> Vec<String> {
    let mut names: Vec<String> =
        fs::read_dir(folder).unwrap().map(|e| e.unwrap().file_name().into_string().unwrap()).collect();
    names.sort();
    names
}

#[test]
fn a_result_appears_whole_with_its_parents() {
    let root = tempfile::tempdir().unwrap();
    let target = root.path().join("out/case");
    let pending = PendingFolder::begin(&target, false).unwrap();
    pending.write(names::SUMMARY, b"{}").unwrap();
    assert!(!target.exists(), "nothing under the final name before the commit");
    let place = pending.commit().unwrap();
    assert_eq!(fs::read(place.join(names::SUMMARY)).unwrap(), b"{}");
    assert_eq!(names_in(&root.path().join("out")), ["case"]);
}

#[test]
fn dropping_it_leaves_nothing() {
    let root = tempfile::tempdir().unwrap();
    let pending = PendingFolder::begin(&root.path().join("out/deep/case"), false).unwrap();
    pending.write(names::TRACE, b"time_s\n").unwrap();
    drop(pending);
    assert!(names_in(root.path()).is_empty(), "the parents made for it go too");
}

#[test]
fn a_panic_leaves_nothing() {
    let root = tempfile::tempdir().unwrap();
    let target = root.path().join("case");
    let outcome = std::panic::catch_unwind(|| {
        let pending = PendingFolder::begin(&target, false).unwrap();
        pending.write(names::TRACE, b"half").unwrap();
        panic!("stopped half way");
    });
    assert!(outcome.is_err());
    assert!(names_in(root.path()).is_empty());
}

#[test]
fn an_existing_result_is_refused_and_untouched() {
    let root = tempfile::tempdir().unwrap();
    let target = root.path().join("case");
    fs::create_dir(&target).unwrap();
    fs::write(target.join(names::SUMMARY), "old").unwrap();
    let fault = PendingFolder::begin(&target, false).unwrap_err();
    assert!(matches!(fault, IoFault::Exists { .. }) && fault.is_of_the_input());
    assert_eq!(fs::read_to_string(target.join(names::SUMMARY)).unwrap(), "old");
    assert_eq!(names_in(root.path()), ["case"]);
}

#[test]
fn replacing_swaps_only_at_the_end() {
    let root = tempfile::tempdir().unwrap();
    let target = root.path().join("case");
    fs::create_dir(&target).unwrap();
    fs::write(target.join(names::SUMMARY), "old").unwrap();
    fs::write(target.join(names::TRACE), "old").unwrap();
    let dropped = PendingFolder::begin(&target, true).unwrap();
    dropped.write(names::SUMMARY, b"half").unwrap();
    drop(dropped);
    assert_eq!(fs::read_to_string(target.join(names::SUMMARY)).unwrap(), "old");
    let pending = PendingFolder::begin(&target, true).unwrap();
    pending.write(names::SUMMARY, b"new").unwrap();
    assert_eq!(fs::read_to_string(target.join(names::SUMMARY)).unwrap(), "old");
    pending.commit().unwrap();
    assert_eq!(names_in(&target), [names::SUMMARY], "the old trace is gone");
    assert_eq!(fs::read_to_string(target.join(names::SUMMARY)).unwrap(), "new");
    assert_eq!(names_in(root.path()), ["case"]);
}

#[test]
fn a_folder_that_is_no_result_is_never_replaced() {
    let root = tempfile::tempdir().unwrap();
    fs::write(root.path().join("letters.txt"), "mine").unwrap();
    let fault = PendingFolder::begin(root.path(), true).unwrap_err();
    assert!(matches!(fault, IoFault::NotAResult { .. }));
    assert_eq!(fs::read_to_string(root.path().join("letters.txt")).unwrap(), "mine");
}

#[test]
fn a_rival_that_was_quicker_is_not_overwritten() {
    let root = tempfile::tempdir().unwrap();
    let target = root.path().join("case");
    let slow = PendingFolder::begin(&target, false).unwrap();
    let quick = PendingFolder::begin(&target, false).unwrap();
    quick.write(names::SUMMARY, b"quick").unwrap();
    quick.commit().unwrap();
    slow.write(names::SUMMARY, b"slow").unwrap();
    assert!(matches!(slow.commit().unwrap_err(), IoFault::Exists { .. }));
    assert_eq!(fs::read_to_string(target.join(names::SUMMARY)).unwrap(), "quick");
    assert_eq!(names_in(root.path()), ["case"]);
}

#[test]
fn files_in_the_way_are_named() {
    let root = tempfile::tempdir().unwrap();
    let file = root.path().join("notes");
    fs::write(&file, "mine").unwrap();
    assert!(matches!(vet(&file, true).unwrap_err(), IoFault::IsAFile { path } if path == file));
    assert!(matches!(PendingFolder::begin(&file.join("case"), false).unwrap_err(), IoFault::IsAFile { .. }));
    assert!(matches!(vet(&file.join("case"), false).unwrap_err(), IoFault::IsAFile { path } if path == file));
    assert!(matches!(vet(Path::new(""), false).unwrap_err(), IoFault::NoName { .. }));
    assert_eq!(fs::read_to_string(&file).unwrap(), "mine");
}

#[cfg(target_os = "linux")]
#[test]
fn a_full_disk_is_called_that() {
    let fault = write_file(Path::new("/dev/full"), &[0; 8192]).unwrap_err();
    assert!(matches!(fault, IoFault::DiskFull { .. }), "{fault}");
}

#[cfg(unix)]
#[test]
fn others_may_read_the_result() {
    use std::os::unix::fs::PermissionsExt as _;
    let root = tempfile::tempdir().unwrap();
    let plain = root.path().join("plain");
    fs::create_dir(&plain).unwrap();
    let place = PendingFolder::begin(&root.path().join("case"), false).unwrap().commit().unwrap();
    let mode = |p: &Path| fs::metadata(p).unwrap().permissions().mode();
    assert_eq!(mode(&place), mode(&plain));
}

#[cfg(unix)]
#[test]
fn a_link_to_a_result_stays_a_link() {
    let root = tempfile::tempdir().unwrap();
    let (real, link) = (root.path().join("real"), root.path().join("link"));
    fs::create_dir(&real).unwrap();
    fs::write(real.join(names::SUMMARY), "old").unwrap();
    std::os::unix::fs::symlink(&real, &link).unwrap();
    let pending = PendingFolder::begin(&link, true).unwrap();
    pending.write(names::SUMMARY, b"new").unwrap();
    pending.commit().unwrap();
    assert!(fs::symlink_metadata(&link).unwrap().is_symlink());
    assert_eq!(fs::read_to_string(real.join(names::SUMMARY)).unwrap(), "new");
}

#[test]
fn a_trial_leaves_nothing() {
    let root = tempfile::tempdir().unwrap();
    vet(&root.path().join("out/deep/case"), false).unwrap();
    assert!(names_in(root.path()).is_empty());
}

#[test]
fn faults_name_the_folder_that_the_user_gave() {
    let root = tempfile::tempdir().unwrap();
    let target = root.path().join("case");
    let pending = PendingFolder::begin(&target, false).unwrap();
    let fault = IoFault::from_file(&pending.path().join("run.h5"), std::io::Error::from_raw_os_error(28));
    let text = pending.in_users_words(fault).to_string();
    let named = fs::canonicalize(root.path()).unwrap().join("case/run.h5").display().to_string();
    assert!(text.contains(&named) || text.contains(&target.join("run.h5").display().to_string()), "{text}");
}
