#![allow(clippy::unwrap_used, clippy::float_cmp, reason = "tests may stop at the first fault")]

use super::*;
use crate::result::demo;

#[test]
fn it_holds_every_part_of_the_contract() {
    let (_, outcome) = demo::free();
    let summary = summary(&demo::header("Latch damper"), &outcome).unwrap();
    for name in [
        "title",
        "program",
        "record",
        "digest",
        "figures",
        "forces",
        "ledger",
        "regime",
        "independent",
        "accuracy",
        "grids",
        "work",
        "stop",
        "cautions",
        "not_modelled",
        "resolved",
    ] {
        assert!(summary.get(name).is_some(), "{name} is missing");
    }
    assert!(summary.get("curve").is_none());
    let peak = &summary["figures"]["drag_peak"];
    let source = outcome.figures.iter().find(|f| f.name == "drag_peak").unwrap();
    assert_eq!(peak["value"], source.value);
    assert_eq!(peak["unit"], "N");
    assert_eq!(peak["band"], source.band);
    assert_eq!(peak["basis"], "extrapolated");
    assert_eq!(peak["where"]["t_s"], source.location.unwrap().t_s.unwrap());
    assert!(peak["where"].get("r_m").is_none(), "coordinates that do not apply are left out");
    assert_eq!(summary["grids"].as_array().unwrap().len(), outcome.grids.len());
    assert_eq!(summary["stop"], outcome.stop.word());
    let cautions = summary["cautions"].as_array().unwrap();
    assert_eq!(cautions.len(), demo::header("").cautions.len() + outcome.cautions.len());
}

#[test]
fn it_reads_back_to_the_same_numbers() {
    let (_, outcome) = demo::curve();
    let text = summary_text(&demo::header("Curve"), &outcome).unwrap();
    let read: Value = serde_json::from_str(&text).unwrap();
    let points = read["curve"].as_array().unwrap();
    let source = &outcome.curve.as_ref().unwrap().points;
    assert_eq!(points.len(), source.len());
    for (point, wanted) in points.iter().zip(source) {
        assert_eq!(point["drag_N"].as_f64().unwrap(), wanted.drag_newton);
        assert_eq!(point["current_density_peak_A_per_m2"].as_f64().unwrap(), wanted.current_density_peak);
    }
}

#[test]
fn a_non_number_anywhere_is_a_fault_that_names_it() {
    let header = demo::header("x");
    type Spoil = fn(&mut Outcome);
    let spoil: [(&str, Spoil); 7] = [
        ("drag_peak", |o| o.figures.iter_mut().find(|f| f.name == "drag_peak").unwrap().value = f64::NAN),
        ("band of entry_time", |o| {
            o.figures.iter_mut().find(|f| f.name == "entry_time").unwrap().band = f64::INFINITY;
        }),
        ("imbalance", |o| o.ledger.as_mut().unwrap().imbalance_relative = f64::NAN),
        ("force on the mover", |o| o.forces.as_mut().unwrap().mover_newton = f64::NAN),
        ("depth ratio", |o| o.regime.depth_ratio = Some(f64::NAN)),
        ("residual", |o| o.grids[0].residual = f64::INFINITY),
        ("relative band", |o| o.accuracy.worst = Some(("drag".into(), f64::NAN))),
    ];
    for (name, spoil) in spoil {
        let (_, mut outcome) = demo::free();
        spoil(&mut outcome);
        match summary(&header, &outcome) {
            Err(IoFault::NotFinite { what, .. }) => assert!(what.contains(name), "{what} instead of {name}"),
            other => assert!(other.is_err(), "{name} went through"),
        }
    }
}

#[test]
fn no_depth_limits_the_field_at_rest() {
    let (_, mut outcome) = demo::free();
    outcome.regime.depth_ratio = None;
    assert_eq!(summary(&demo::header("x"), &outcome).unwrap()["regime"]["depth_ratio"], Value::Null);
}
