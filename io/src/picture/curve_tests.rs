#![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

use super::*;
use crate::picture::look;
use crate::result::demo;

#[test]
fn it_shows_curve_maximum_and_law() {
    let (_, outcome) = demo::curve();
    let picture = curve("Latch damper: drag against speed", &outcome).unwrap();
    look::keep(&picture);
    let text = look::words(&picture);
    assert!(text.contains("Speed, m/s") && text.contains("Drag, N"));
    assert!(text.contains("narrower than the line"));
    assert!(text.contains("critical speed 11.00000 ± 0.00040 m/s"), "{text}");
    assert!(text.contains("low-speed law: 3.1"));
    assert_eq!(picture.svg, curve("Latch damper: drag against speed", &outcome).unwrap().svg, "the same bytes again");
}

#[test]
fn a_short_range_is_linear_and_a_wide_band_is_shaded() {
    let (_, mut outcome) = demo::curve();
    let points = &mut outcome.curve.as_mut().unwrap().points;
    points.retain(|p| p.speed_m_per_s > 2.0);
    for p in points.iter_mut() {
        p.band_newton = 0.04 * p.drag_newton;
    }
    let mut picture =
        curve("Latch damper with a deliberately coarse grid, to see a band that is wider than its line", &outcome)
            .unwrap();
    assert!(look::words(&picture).contains("at most ± 4 %"));
    picture.name = "drag_speed_linear";
    look::keep(&picture);
}

#[test]
fn without_a_curve_there_is_no_picture() {
    assert!(curve("x", &demo::free().1).is_none());
    let (_, mut outcome) = demo::curve();
    outcome.curve.as_mut().unwrap().points.clear();
    assert!(curve("x", &outcome).is_none());
}

#[test]
fn odd_curves_are_drawn_too() {
    let (_, mut outcome) = demo::curve();
    let points = outcome.curve.as_ref().unwrap().points.clone();
    let mut try_points = |points: Vec<DragPoint>| {
        outcome.curve.as_mut().unwrap().points = points;
        let picture = curve("odd", &outcome).unwrap();
        assert!(!look::has_non_numbers(&picture), "{}", picture.svg);
    };
    try_points(points[..1].to_vec());
    try_points(points[..2].to_vec());
    let mut at_rest = points.clone();
    at_rest[0] = DragPoint { speed_m_per_s: 0.0, drag_newton: 0.0, band_newton: 0.0, ..at_rest[0] };
    try_points(at_rest);
    try_points(points.iter().map(|p| DragPoint { drag_newton: 0.0, band_newton: 0.0, ..*p }).collect());
}
