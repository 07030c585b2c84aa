//! `lenzbore check`: what would be solved, without solving it.

use std::fmt::Write;
use std::path::Path;

use lenzbore_io::case::ResolvedCase;
use lenzbore_io::layout::layout;
use lenzbore_io::picture::drawing;
use lenzbore_solver::cost::{Forecast, forecast};
use lenzbore_solver::problem::{Extent, Problem, Travel};
use lenzbore_solver::sources::Source;
use serde_json::{Value, json};

use crate::arguments::CheckWords;
use crate::end::End;
use crate::{job, memory, say, sketch};

/// Reads a case and says what would be solved.
pub fn run(words: &CheckWords) -> Result<(), End> {
    let case = job::read(&words.case)?;
    let mut plans: Vec<(&str, Problem, Forecast)> = Vec::new();
    if case.travel_given {
        memory::require_of(&case, &case.problem, None)?;
        plans.push(("run", case.problem.clone(), forecast(&case.problem, None)?));
    }
    if let (Some(problem), Some(plan)) = (case.curve_problem(), &case.curve) {
        let speeds = Some(plan.speeds_m_per_s.as_slice());
        memory::require_of(&case, &problem, plan.speeds_m_per_s.last().copied())?;
        let cost = forecast(&problem, speeds)?;
        plans.push(("curve", problem, cost));
    }
    if let Some(path) = &words.drawing {
        write_drawing(path, &case)?;
    }
    if words.case.json {
        let costs: serde_json::Map<String, Value> =
            plans.iter().map(|(name, _, cost)| ((*name).to_owned(), forecast_json(cost))).collect();
        let object = json!({
            "title": case.title, "digest": case.digest, "resolved": case.resolved.to_json(),
            "cautions": case.cautions, "not_modelled": case.not_modelled, "forecast": costs,
        });
        say::to_standard_output(&format!("{object:#}\n"));
        return Ok(());
    }
    say::to_standard_output(&report(&case, &plans));
    Ok(())
}

fn report(case: &ResolvedCase, plans: &[(&str, Problem, Forecast)]) -> String {
    let mut text = String::new();
    // Writing into a string cannot fail.
    let _ = writeln!(text, "{}\n", case.title);
    parts(&mut text, &case.problem);
    text.push_str(&sketch::half_section(&case.problem));
    for (name, problem, cost) in plans {
        plan(&mut text, name, problem, cost);
    }
    swept(&mut text, case);
    for (heading, list) in [("cautions", &case.cautions), ("not modelled", &case.not_modelled)] {
        if !list.is_empty() {
            let _ = writeln!(text, "\n{heading}:");
            for item in list {
                let _ = writeln!(text, "  - {item}");
            }
        }
    }
    text
}

/// What the curve sweeps beside speed.
fn swept(text: &mut String, case: &ResolvedCase) {
    let Some(plan) = &case.curve else { return };
    let several = |n: usize, what: &str| format!("{n} {what}{}", if n == 1 { "" } else { "s" });
    let mut lines = Vec::new();
    if !plan.temperatures_k.is_empty() {
        lines.push(format!("drag against speed at {}", several(plan.temperatures_k.len(), "temperature")));
    }
    if !plan.positions_m.is_empty() {
        lines.push(format!(
            "damping coefficient at {}, wall with its ends",
            several(plan.positions_m.len(), "position")
        ));
    }
    if let Some(strokes) = &plan.strokes {
        let (f, a) = (strokes.frequencies_hz.len(), strokes.amplitudes_m.len());
        lines.push(format!(
            "settled strokes: {} and {}",
            several(f, "frequency").replace("ys", "ies"),
            several(a, "amplitude")
        ));
    }
    if !lines.is_empty() {
        let _ = writeln!(text, "\nlenzbore curve, swept beside:");
        lines.iter().for_each(|line| {
            let _ = writeln!(text, "  {line}");
        });
    }
}

fn parts(text: &mut String, problem: &Problem) {
    let mm = |x: f64| 1e3 * x;
    let length = match problem.wall.extent {
        Extent::Endless => "endless".to_owned(),
        Extent::Finite { length_m } => format!("{:.3} mm long", mm(length_m)),
    };
    let _ = writeln!(text, "wall, {length}:");
    for l in &problem.wall.layers {
        let _ = writeln!(
            text,
            "  {:<12} diameter {:.3} to {:.3} mm, thickness {:.3} mm, {:.4} MS/m, relative permeability {}",
            l.name,
            mm(2.0 * l.inner_radius_m),
            mm(2.0 * l.outer_radius_m),
            mm(l.thickness_m()),
            1e-6 * l.conductivity_s_per_m,
            l.relative_permeability
        );
    }
    let mass = problem.mover.mass_kg.map_or(String::new(), |m| format!(", {:.1} g", 1e3 * m));
    let _ = writeln!(text, "mover{mass}, heights from its reference point:");
    for p in &problem.mover.parts {
        let _ = writeln!(text, "  {:<12} centre {:+.3} mm, {}", p.name, mm(p.centre_m), source(&p.source));
    }
}

fn source(source: &Source) -> String {
    let mm = |x: f64| 1e3 * x;
    let north = |x: f64| if x < 0.0 { "north down" } else { "north up" };
    match *source {
        Source::Dipole { moment_a_m2 } => format!("dipole {moment_a_m2} A m2"),
        Source::Magnet { inner_radius_m, outer_radius_m, length_m, remanence_tesla: b } => format!(
            "magnet, diameter {:.3} to {:.3} mm, length {:.3} mm, {:.4} T, {}",
            mm(2.0 * inner_radius_m),
            mm(2.0 * outer_radius_m),
            mm(length_m),
            b.abs(),
            north(b)
        ),
        Source::Coil { inner_radius_m, outer_radius_m, length_m, ampere_turns } => format!(
            "coil, diameter {:.3} to {:.3} mm, length {:.3} mm, {ampere_turns} A turns",
            mm(2.0 * inner_radius_m),
            mm(2.0 * outer_radius_m),
            mm(length_m)
        ),
    }
}

fn plan(text: &mut String, name: &str, problem: &Problem, cost: &Forecast) {
    let law = match (name, &problem.travel) {
        ("curve", _) => "drag against speed, settled fields, endless wall",
        (_, Travel::Steady { .. }) => "settled fields at uniform speed",
        (_, Travel::Traverse(_)) => "uniform speed through the whole wall",
        (_, Travel::Free(_)) => "equation of motion",
        (_, Travel::Sine(_)) => "strokes to and fro, until they settle",
        (_, Travel::Table(_)) => "motion from a table of positions",
        (_, Travel::Alternating(_)) => "coils at rest with alternating current",
    };
    let _ = writeln!(text, "\nlenzbore {name}: {law}");
    let _ = writeln!(text, "  running clearance of the magnetic parts {:.3} mm", 1e3 * cost.gap_m);
    let r = &cost.regime;
    let depth = r.depth_ratio.map_or(String::new(), |d| format!(", depth/wall {d:.3}"));
    let _ = writeln!(
        text,
        "  regime at {:.3} m/s: wall/bore {:.3}, gap/bore {:.3}, mu0 sigma w v {:.3}{depth}",
        r.speed_m_per_s, r.thickness_ratio, r.gap_ratio, r.magnetic_reynolds
    );
    for g in &cost.grids {
        let deep = g.cells_across_depth.map_or(String::new(), |d| format!(", across the depth {d:.1}"));
        let steps = if g.steps > 0 { format!(", about {} steps", g.steps) } else { String::new() };
        let _ = writeln!(
            text,
            "  grid x {:<3}: {} x {} nodes, cells across the thinnest layer {}{deep}, growth {:.2}, aspect {:.1}{steps}",
            g.refinement, g.nodes_r, g.nodes_z, g.cells_across_wall, g.growth, g.aspect
        );
    }
    let available = memory::available_bytes().map_or(String::new(), |b| format!(" of {:.0} MiB available", b / MIB));
    let _ = writeln!(text, "  about {:.1} s and {:.0} MiB{available}", cost.time_s, cost.memory_bytes / MIB);
}

const MIB: f64 = 1024.0 * 1024.0;

fn forecast_json(cost: &Forecast) -> Value {
    let grids: Vec<Value> = cost
        .grids
        .iter()
        .map(|g| {
            json!({
                "refinement": g.refinement, "nodes_r": g.nodes_r, "nodes_z": g.nodes_z, "growth": g.growth,
                "cells_across_wall": g.cells_across_wall, "cells_across_depth": g.cells_across_depth,
                "aspect": g.aspect, "steps": g.steps,
            })
        })
        .collect();
    json!({
        "grids": grids, "unknowns": cost.unknowns, "solves": cost.solves, "steps": cost.steps,
        "memory_bytes": cost.memory_bytes, "time_s": cost.time_s, "running_clearance_m": cost.gap_m,
    })
}

fn write_drawing(path: &Path, case: &ResolvedCase) -> Result<(), End> {
    if path.exists() {
        return Err(End::Input(format!("{} exists already; name another file", path.display())));
    }
    let picture = drawing(&case.title, &layout(case))?;
    let bytes = match path.extension().and_then(|e| e.to_str()) {
        Some("svg") => picture.svg.into_bytes(),
        Some("png") => picture.png()?,
        _ => return Err(End::Input(format!("{}: the drawing is an .svg or a .png file", path.display()))),
    };
    std::fs::write(path, bytes).map_err(|e| match e.kind() {
        std::io::ErrorKind::NotFound => End::Input(format!("{}: the folder does not exist", path.display())),
        _ => End::Failed(format!("{} cannot be written: {e}", path.display())),
    })
}
