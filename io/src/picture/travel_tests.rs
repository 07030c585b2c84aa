#![allow(clippy::unwrap_used, clippy::cast_precision_loss, reason = "tests may stop at the first fault")]

use super::*;
use crate::picture::look;
use crate::result::demo;

#[test]
fn it_shows_gates_wall_and_peak_both_ways() {
    let (problem, outcome) = demo::free();
    let pictures = travel("Latch damper, fall through the sleeve", &problem, &outcome);
    assert_eq!(pictures.len(), 2);
    for picture in &pictures {
        look::keep(picture);
        let text = look::words(picture);
        for words in ["Drag, N", "Speed, m/s", "gate 1", "gate 2", " wall ", "greatest drag", "narrower than the line"]
        {
            assert!(text.contains(words), "{words} is missing from {}", picture.name);
        }
    }
    assert!(pictures[0].svg.contains("Position of the reference point, mm (travel \u{2190})"));
    assert!(pictures[1].svg.contains("Time from the start, "));
}

#[test]
fn a_bouncing_mover_shows_signed_velocity_and_every_pass() {
    let (problem, mut outcome) = demo::free();
    let times: Vec<f64> = (0..800).map(|i| f64::from(i) * 1e-3).collect();
    let phase = |t: f64| 9.0 * t;
    outcome.trace = Trace {
        position_m: times.iter().map(|t| 0.06 + 0.08 * phase(*t).cos()).collect(),
        velocity_m_per_s: times.iter().map(|t| -0.72 * phase(*t).sin()).collect(),
        drag_newton: times.iter().map(|t| 1.4 * phase(*t).sin().abs()).collect(),
        drag_band_newton: times.iter().map(|t| 0.1 * phase(*t).sin().abs()).collect(),
        heat_watt: times.iter().map(|t| phase(*t).sin().powi(2)).collect(),
        time_s: times,
    };
    let mut pictures = travel("Spring-backed mover", &problem, &outcome);
    for (picture, name) in pictures.iter_mut().zip(["bounce_position", "bounce_time"]) {
        picture.name = name;
        look::keep(picture);
        assert!(picture.svg.contains("Velocity (up positive), m/s"));
        assert!(look::words(picture).contains("numerical band, at most"));
    }
    let passes = crossings(&outcome.trace, 0.12);
    assert!(passes.len() >= 3, "{passes:?}");
    for t in passes {
        approx::assert_abs_diff_eq!(0.06 + 0.08 * phase(t).cos(), 0.12, epsilon = 1e-5);
    }
}

#[test]
fn no_series_no_picture() {
    let (problem, outcome) = demo::curve();
    assert!(travel("x", &problem, &outcome).is_empty());
}

#[test]
fn odd_series_are_drawn_too() {
    let (problem, mut outcome) = demo::free();
    let at = |value: f64| vec![value; 3];
    outcome.trace = Trace {
        time_s: vec![0.0, 0.1, 0.2],
        position_m: at(0.05),
        velocity_m_per_s: at(0.0),
        drag_newton: at(0.0),
        drag_band_newton: at(0.0),
        heat_watt: at(0.0),
    };
    for picture in travel("at rest", &problem, &outcome) {
        assert!(!look::has_non_numbers(&picture), "{}", picture.svg);
    }
}
