//! Made-up outcomes of plausible size for the tests of this crate: formulas, not solutions.

#![allow(
    clippy::unwrap_used,
    clippy::cast_precision_loss,
    clippy::cast_possible_truncation,
    clippy::cast_sign_loss,
    reason = "made-up data for tests"
)]

use lenzbore_solver::comparison::Verdict;
use lenzbore_solver::outcome::{
    Accuracies, Basis, Caution, DragCurve, DragPoint, Figure, Forces, GridReport, Ledger, Location, Outcome, Regime,
    Stop, Sweeps, Trace, WorkCounters,
};
use lenzbore_solver::problem::{
    Accuracy, Extent, Free, Layer, Mover, Outline, Part, Problem, SnapshotPlan, Travel, Wall,
};
use lenzbore_solver::sources::Source;
use lenzbore_solver::spread::{FigureSpread, Input, Nominal, Reading, Response, Spread, plan_offsets, rank};
use serde_json::{Map, json};

use crate::picture::{ComparedPlot, PlotCurve, PlotPanel, PlotPoint};

pub(crate) use super::demo_fields::fields;
use super::header::{Program, ResultHeader};
use crate::layout::Layout;

/// Low-speed damping coefficient of the made-up brake, N s/m.
pub(crate) const COEFFICIENT: f64 = 3.1;
/// Its critical speed, m/s.
pub(crate) const CRITICAL: f64 = 11.0;

pub(crate) fn header(title: &str) -> ResultHeader {
    let mut record = Map::new();
    record.insert("document".into(), json!("LD-014"));
    record.insert("revision".into(), json!("B"));
    ResultHeader {
        title: title.to_owned(),
        record,
        digest: "3f6c".repeat(16),
        program: Program { name: "lenzbore".into(), version: "0.1.0".into() },
        command: "run",
        case: json!({"toml": "title = \"t\"\n", "files": {}}),
        resolved: json!({"wall": {"length": {"value": 0.12, "source": "case file"}}}),
        geometry: Layout::default(),
        not_modelled: vec!["heating of the wall during the run".into()],
        independent: None,
        spread: None,
        cautions: vec!["Strong magnets pinch.".into()],
    }
}

/// A wall of two layers and a stack of two opposed magnets with a pole gap between them, falling through.
pub(crate) fn free() -> (Problem, Outcome) {
    let problem = Problem {
        wall: Wall {
            slots: 0,
            extent: Extent::Finite { length_m: 0.12 },
            layers: vec![
                layer("liner", 12.5e-3, 13.1e-3, 0.12, 35.0e6),
                layer("sleeve", 13.1e-3, 15.0e-3, 0.12, 58.0e6),
            ],
        },
        mover: Mover {
            parts: vec![magnet("lower", -7e-3, 1.3), magnet("upper", 7e-3, -1.3)],
            mass_kg: Some(0.18),
            recoil: None,
        },
        travel: Travel::Free(Free::let_go(0.16, -0.04, [0.12, 0.0])),
        accuracy: Accuracy::default(),
        snapshots: SnapshotPlan::Automatic,
        stations: Vec::new(),
        warming: None,
    };
    let trace = fall(4.5, 0.18);
    let peak = (0..trace.time_s.len()).max_by(|a, b| trace.drag_newton[*a].total_cmp(&trace.drag_newton[*b])).unwrap();
    let at = Location { r_m: None, z_m: Some(trace.position_m[peak]), t_s: Some(trace.time_s[peak]) };
    let crossing = |z: f64| trace.time_s[trace.position_m.iter().position(|p| *p <= z).unwrap()];
    let event =
        |name: &str, t: f64| figure(name, t, "s", 2e-6 * t, Some(Location { r_m: None, z_m: None, t_s: Some(t) }));
    let figures = vec![
        event("entry_time", crossing(0.12)),
        event("exit_time", crossing(0.0)),
        figure("transit_time", crossing(0.0) - crossing(0.12), "s", 1e-5, None),
        figure("drag_peak", trace.drag_newton[peak], "N", 2e-4, Some(at)),
    ];
    let mut outcome = outcome(figures, Stop::EndOfTravel, trace, None);
    outcome.fields = Some(fields(&problem, &[0.118, 0.03], -0.4));
    (problem, outcome)
}

/// The same brake again and again, its wall warming.
pub(crate) fn duty() -> (Problem, Outcome) {
    let (problem, mut outcome) = free();
    outcome.thermal = Some(super::demo_thermal::thermal());
    (problem, outcome)
}

/// Drag against speed of the same brake: a curve with one maximum.
pub(crate) fn curve() -> (Problem, Outcome) {
    let (mut problem, _) = free();
    problem.wall.extent = Extent::Endless;
    problem.travel = Travel::Steady { velocity_m_per_s: -2.0 };
    let points = (0..40).map(|i| point(0.05 * 1000.0_f64.powf(f64::from(i) / 39.0))).collect();
    let figures = vec![
        figure("damping_coefficient_zero_speed", COEFFICIENT, "N s/m", 2e-6, None),
        figure("critical_speed", CRITICAL, "m/s", 4e-4, None),
        figure("drag_max", drag(CRITICAL), "N", 3e-5, None),
    ];
    (problem, outcome(figures, Stop::Settled, Trace::default(), Some(DragCurve { points })))
}

pub(crate) fn drag(speed: f64) -> f64 {
    COEFFICIENT * speed / (1.0 + (speed / CRITICAL).powi(2))
}

/// A point dipole in an endless wall at a steady speed.
pub(crate) fn steady() -> (Problem, Outcome) {
    let (mut problem, _) = free();
    problem.wall =
        Wall { slots: 0, extent: Extent::Endless, layers: vec![layer("wall", 10.5e-3, 12.5e-3, 0.0, 58.0e6)] };
    problem.mover.parts = vec![Part {
        name: "dipole".into(),
        centre_m: 0.0,
        source: Source::Dipole { moment_a_m2: 1.0 },
        outline: Outline { inner_radius_m: 0.0, outer_radius_m: 0.0, length_m: 0.0 },
        coercivity_a_per_m: None,
    }];
    problem.travel = Travel::Steady { velocity_m_per_s: -5.0 };
    let place = Location { r_m: Some(10.5e-3), z_m: Some(-4e-3), t_s: None };
    let figures = vec![
        figure("drag", 2.212929281, "N", 3e-5, None),
        figure("current_density_peak", 4.4e7, "A/m2", 2e3, Some(place)),
    ];
    let mut outcome = outcome(figures, Stop::Settled, Trace::default(), None);
    outcome.fields = Some(fields(&problem, &[0.0], -5.0));
    (problem, outcome)
}

fn point(speed: f64) -> DragPoint {
    DragPoint {
        speed_m_per_s: speed,
        drag_newton: drag(speed),
        band_newton: 2e-6 * drag(speed) * (1.0 + speed),
        heat_watt: drag(speed) * speed,
        current_density_peak: 4.1e6 * drag(speed).sqrt(),
        current_density_band: 900.0,
    }
}

fn layer(name: &str, inner: f64, outer: f64, length: f64, conductivity: f64) -> Layer {
    Layer {
        name: name.into(),
        inner_radius_m: inner,
        outer_radius_m: outer,
        from_m: 0.0,
        to_m: length,
        conductivity_s_per_m: conductivity,
        relative_permeability: 1.0,
    }
}

fn magnet(name: &str, centre: f64, remanence: f64) -> Part {
    Part {
        name: name.into(),
        centre_m: centre,
        source: Source::Magnet {
            inner_radius_m: 0.0,
            outer_radius_m: 11.0e-3,
            length_m: 12.0e-3,
            remanence_tesla: remanence,
        },
        outline: Outline { inner_radius_m: 0.0, outer_radius_m: 11.015e-3, length_m: 12.03e-3 },
        coercivity_a_per_m: None,
    }
}

/// Fall with a drag that fades in and out at the ends of the wall, by small explicit steps.
fn fall(coefficient: f64, mass: f64) -> Trace {
    let (mut t, mut z, mut v) = (0.0, 0.16, 0.0_f64);
    let mut trace = Trace::default();
    while z > -0.04 && t < 5.0 {
        let inside = |x: f64| 0.5 * (1.0 + (x / 6e-3).tanh());
        let drag =
            coefficient * v.abs() * inside(z) * inside(0.12 - z) * (1.0 + 0.25 * (-((z - 0.012) / 9e-3).powi(2)).exp());
        trace.time_s.push(t);
        trace.position_m.push(z);
        trace.velocity_m_per_s.push(v);
        trace.drag_newton.push(drag);
        trace.drag_band_newton.push(1e-4 * drag);
        trace.heat_watt.push(drag * v.abs());
        v += 5e-4 * (drag / mass - 9.80665);
        z += 5e-4 * v;
        t += 5e-4;
    }
    trace
}

pub(crate) fn figure(name: &str, value: f64, unit: &'static str, band: f64, location: Option<Location>) -> Figure {
    let levels = vec![value * 1.004, value * 1.0018, value * 1.001];
    Figure { name: name.into(), value, unit, band, basis: Basis::Extrapolated, location, levels }
}

pub(crate) fn outcome(figures: Vec<Figure>, stop: Stop, trace: Trace, curve: Option<DragCurve>) -> Outcome {
    let settled = stop == Stop::Settled;
    Outcome {
        figures,
        forces: Some(Forces {
            wall_newton: 2.2129291,
            mover_newton: 2.2129294,
            stress_newton: 2.2129288,
            band_newton: 1e-5,
            agree: true,
            time_s: 0.31,
        }),
        ledger: Some(Ledger {
            work: 0.352,
            heat: 0.3519,
            field_energy: 0.0001,
            imbalance_relative: 3e-7,
            unit: if settled { "W" } else { "J" },
        }),
        regime: Regime {
            thickness_ratio: 0.2,
            gap_ratio: 0.12,
            magnetic_reynolds: 0.34,
            depth_ratio: Some(4.2),
            speed_m_per_s: 2.0,
        },
        grids: [1.0, 1.5, 2.0].iter().map(|f| grid(*f, settled)).collect(),
        counters: WorkCounters { factorisations: 3, solves: 1234, steps: 600, recurrence: 24 },
        cautions: vec![Caution { text: "The wall is taken as endless.".into() }],
        stop,
        accuracy: Accuracies {
            target_relative: 1e-4,
            met: true,
            worst: Some(("drag_peak".into(), 3e-5)),
            advice: None,
        },
        trace,
        curve,
        frequency: None,
        strokes: None,
        sweeps: Sweeps::default(),
        stations: Vec::new(),
        thermal: None,
        slotted: None,
        fields: None,
    }
}

fn grid(refinement: f64, settled: bool) -> GridReport {
    GridReport {
        refinement,
        nodes_r: (45.0 * refinement) as usize,
        nodes_z: (160.0 * refinement) as usize,
        cells_across_wall: (4.0 * refinement) as usize,
        cells_across_depth: Some(16.0 * refinement),
        growth: 1.09,
        aspect: 6.0,
        steps: if settled { 0 } else { (400.0 * refinement) as usize },
        residual: 3e-13,
    }
}

/// A made-up study of tolerances: powers of two inputs, with a speed that answers the other way.
pub(crate) fn study() -> Spread {
    let input = |path: &str, written: &str, value: f64, half: f64| Input {
        path: path.to_owned(),
        unit: "m",
        value,
        minus: half,
        plus: half,
        written: written.to_owned(),
        stays: vec!["outer_diameter".to_owned()],
        follows: vec!["inner_diameter".to_owned()],
    };
    let inputs = vec![
        input("wall.sleeve.thickness", "10 %", 1.5e-3, 1.5e-4),
        input("mover.M.outer_diameter", "0.1 mm", 0.022, 1e-4),
    ];
    let powers = [
        ("drag", "N", 33.0, 1.4, 4.0),
        ("damping_coefficient", "N s/m", 11.0, 1.4, 4.0),
        ("exit_speed", "m/s", 0.25, -1.1, -3.6),
    ];
    let figures: Vec<FigureSpread> = powers
        .into_iter()
        .map(|(name, unit, value, first, second)| {
            let reading = |x: f64| Reading { value: x, band: 1e-6 * value };
            let response = |input: &Input, power: f64| {
                let plan = plan_offsets(input);
                let found: Vec<(f64, Reading)> =
                    plan.stencil.iter().map(|x| (*x, reading(value * (1.0 + x / input.value).powf(power)))).collect();
                Response::new(input, reading(value), plan.step, &found)
            };
            let nominal = Nominal { name: name.to_owned(), unit, reading: reading(value) };
            FigureSpread::new(&nominal, &inputs, vec![response(&inputs[0], first), response(&inputs[1], second)])
        })
        .collect();
    let ranking = rank(&figures, 2);
    Spread { inputs, figures, ranking, monte_carlo: None, solutions: 12, cautions: Vec::new() }
}

/// A made-up comparison: a table that is right at low speed and too high at high speed.
pub(crate) fn compared() -> ComparedPlot {
    let point = |x: f64| {
        let ours = COEFFICIENT * x / (1.0 + (x / CRITICAL).powi(2)) * 2.0;
        let share = 0.03 + 0.02 * x;
        let verdict = match share {
            s if s < 0.045 => Verdict::Passes,
            s if s < 0.07 => Verdict::Undecided,
            _ => Verdict::FallsShort,
        };
        PlotPoint {
            x,
            table: ours * (1.0 + share),
            table_half: 0.01 * ours,
            ours,
            ours_half: 0.02 * ours,
            share,
            share_half: 0.0224,
            share_allowed: 0.06,
            verdict,
        }
    };
    let points = [0.1, 0.3, 1.0, 2.0, 5.0, 10.0, 20.0].map(point).to_vec();
    ComparedPlot {
        heading: "Latch damper".into(),
        verdict: "falls short".into(),
        x_name: "speed".into(),
        x_unit: "m/s",
        judged: (true, true),
        panels: vec![PlotPanel { name: "drag".into(), unit: "N", curves: vec![PlotCurve { points }] }],
    }
}
