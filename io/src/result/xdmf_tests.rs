#![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

use super::*;
use crate::result::demo;

#[test]
fn every_instant_refers_to_its_slab() {
    let fields = demo::free().1.fields.unwrap();
    let text = xdmf(&fields);
    let (nz, nr) = (fields.z_m.len(), fields.r_m.len());
    assert_eq!(text.matches("<Time Value=").count(), fields.snapshots.len());
    assert_eq!(text.matches(&format!("Dimensions=\"{nz} {nr}\"/>")).count(), fields.snapshots.len());
    for t in 0..fields.snapshots.len() {
        assert_eq!(text.matches(&format!(">{t} 0 0 1 1 1 1 {nz} {nr}<")).count(), 2, "two node arrays at instant {t}");
        assert_eq!(text.matches(&format!(">{t} 0 0 1 1 1 1 {} {}<", nz - 1, nr - 1)).count(), 4, "four cell arrays");
    }
}

#[test]
fn its_tags_close() {
    let mut fields = demo::free().1.fields.unwrap();
    for snapshots in [2, 0] {
        fields.snapshots.truncate(snapshots);
        let text = xdmf(&fields);
        for tag in ["Xdmf", "Domain", "Grid", "Geometry", "Attribute"] {
            let opened = text.matches(&format!("<{tag} ")).count() + text.matches(&format!("<{tag}>")).count();
            assert!(opened > 0 && opened == text.matches(&format!("</{tag}>")).count(), "{tag}");
        }
    }
}
