//! The report page from outside.

use crate::rig::{Bench, QUICK, entries};

#[test]
fn the_page_is_made_again_of_its_folder() {
    let bench = Bench::with("case.toml", QUICK);
    bench.succeed(&["curve", "case.toml"]);
    let page = std::fs::read(bench.path("out/case-curve/report.html")).unwrap();
    let text = String::from_utf8_lossy(&page);
    for part in
        ["Dipole in a tube", "Drag against speed", "Numerical band", "no tolerances given", "holds nothing at rest"]
    {
        assert!(text.contains(part), "{part} lacks");
    }
    assert!(page.len() < 5_000_000, "{} bytes", page.len());

    let ran = bench.run(&["report", "out/case-curve"]);
    assert_eq!(ran.status, Some(2));
    assert!(ran.errors.contains("--replace"), "{}", ran.errors);
    std::fs::write(bench.path("out/case-curve/report.html"), "old").unwrap();
    let ran = bench.succeed(&["report", "out/case-curve", "--replace"]);
    assert!(ran.output.contains("out/case-curve/report.html"), "{}", ran.output);
    assert!(
        std::fs::read(bench.path("out/case-curve/report.html")).unwrap() == page,
        "the same folder gives the same page"
    );
}

#[test]
fn pictures_come_in_the_width_that_is_asked() {
    let bench = Bench::with("case.toml", QUICK);
    bench.succeed(&["curve", "case.toml", "--set", "output.picture_width=\"170 mm\""]);
    let wide = |name: &str| std::fs::read_to_string(bench.path(name)).unwrap();
    let before = wide("out/case-curve/drag_speed.svg");
    assert!(before.contains(" width=\"170mm\""));
    let files = entries(&bench.path("out/case-curve"));
    bench.succeed(&["report", "out/case-curve", "--replace", "--width", "85 mm"]);
    assert!(wide("out/case-curve/drag_speed.svg").contains(" width=\"85mm\""));
    assert_eq!(entries(&bench.path("out/case-curve")), files);
    let png = |name: &str| std::fs::read(bench.path(name)).unwrap();
    // 85 mm at 600 dots an inch: 2008 dots.
    assert_eq!(png("out/case-curve/drag_speed.png")[16..20], 2008_u32.to_be_bytes());
    bench.succeed(&["report", "out/case-curve", "--replace", "--width", "170 mm"]);
    assert_eq!(wide("out/case-curve/drag_speed.svg"), before, "the way there and back changes nothing");
    let ran = bench.run(&["report", "out/case-curve", "--replace", "--width", "3 m"]);
    assert_eq!(ran.status, Some(2));
    assert!(ran.errors.contains("50 mm to 1.2 m"), "{}", ran.errors);
}

#[test]
fn a_folder_without_a_result_has_no_page() {
    let bench = Bench::with("case.toml", QUICK);
    for folder in [".", "nowhere", "case.toml"] {
        let ran = bench.run(&["report", folder]);
        assert_eq!(ran.status, Some(2), "{folder}: {}", ran.errors);
        assert!(ran.errors.contains("holds no summary.json"), "{}", ran.errors);
    }
    assert_eq!(bench.entries(), ["case.toml"]);
}
