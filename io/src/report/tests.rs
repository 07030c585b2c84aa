#![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

use lenzbore_solver::monitor::Unwatched;

use super::*;
use crate::result::{WriteOptions, demo};

const HOSTILE: &str = "</script><script>alert(1)</script><img src=x onerror=\"alert('2')\"> & {{sections}}";

/// A folder with every file, its texts hostile, and the page in it.
fn hostile_folder() -> (tempfile::TempDir, String) {
    let place = tempfile::tempdir().unwrap();
    let folder = place.path().join("run");
    let (problem, outcome) = demo::free();
    let mut header = demo::header(HOSTILE);
    header.record.insert("purpose".into(), HOSTILE.into());
    header.cautions.push(HOSTILE.to_owned());
    header.not_modelled.push(HOSTILE.to_owned());
    let options = WriteOptions { pictures: false, ..WriteOptions::default() };
    crate::result::write(&folder, &options, &header, &problem, &outcome, &Unwatched).unwrap();
    let page = std::fs::read_to_string(folder.join(names::REPORT)).unwrap();
    (place, page)
}

#[test]
fn nothing_of_a_result_can_act_on_the_page() {
    let (_place, page) = hostile_folder();
    assert!(!page.contains("<script>alert") && !page.contains("<img src=x") && !page.contains("onerror=\""));
    assert!(page.contains("&lt;/script&gt;&lt;script&gt;alert(1)"));
    // The library, the page's own script, and data: charts, one of the field, and its arrays.
    let scripts = page.matches("<script").count();
    assert_eq!(scripts, page.matches("</script>").count());
    assert_eq!(page.matches("<script>").count(), 2);
}

#[test]
fn the_page_is_made_again_to_the_same_bytes() {
    let (place, page) = hostile_folder();
    let folder = place.path().join("run");
    assert_eq!(build(&folder).unwrap(), page);
    assert!(matches!(write(&folder, false), Err(IoFault::PageExists { .. })));
    write(&folder, true).unwrap();
    assert_eq!(std::fs::read_to_string(folder.join(names::REPORT)).unwrap(), page);
    assert!(page.len() < 5_000_000, "{} bytes", page.len());
}

#[test]
fn parts_that_no_section_knows_are_shown() {
    let (place, _) = hostile_folder();
    let folder = place.path().join("run");
    let path = folder.join(names::SUMMARY);
    let mut summary: serde_json::Value = serde_json::from_str(&std::fs::read_to_string(&path).unwrap()).unwrap();
    summary["novelty"] = serde_json::json!({"rise": {"value": 12.5, "unit": "N", "band": 0.5}, "<b>": [1, 2]});
    std::fs::write(&path, summary.to_string()).unwrap();
    std::fs::write(folder.join("gauge.csv"), "time_s,coil_V\n0,0\n1,2.5\n2,1\n").unwrap();
    let page = build(&folder).unwrap();
    for part in ["Novelty", "12.5 ± 0.5\u{a0}N", "&lt;b&gt;", "Further results", "Coil"] {
        assert!(page.contains(part), "{part}");
    }
}

#[test]
fn a_folder_without_a_summary_is_told_so() {
    let place = tempfile::tempdir().unwrap();
    assert!(matches!(build(place.path()), Err(IoFault::NoSummary { .. })));
    std::fs::write(place.path().join(names::SUMMARY), "[1").unwrap();
    assert!(matches!(build(place.path()), Err(IoFault::Misread { .. })));
}
