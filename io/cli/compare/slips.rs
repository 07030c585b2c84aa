//! Slips that a table that falls short may come from: a sign, a swapped column, a unit, a radius typed for a diameter.

use lenzbore_io::table::Abscissa;
use lenzbore_solver::comparison::{likeness, steady_factor};
use lenzbore_solver::drag_curve;
use lenzbore_solver::ladder::Assumptions;
use lenzbore_solver::problem::{Part, Problem};
use lenzbore_solver::sources::Source;

use super::asked::Asked;
use super::models::by_rings;
use super::solved::{Ask, endless};
use crate::end::End;

/// How close a changed case must come to the table, root mean square.
const CLOSE: f64 = 0.02;
/// How close its estimate by resistive rings must come before it is solved.
const WORTH_SOLVING: f64 = 0.2;
/// How far the factor between table and ours may swing and still be one factor.
const STEADY: f64 = 0.01;
/// With fewer values some changed case fits by chance.
const FEWEST: usize = 3;
/// Highest number taken for a speed in a swapped column, m/s.
const FASTEST: f64 = 1.0e3;

/// Factors that units bring in when one is taken for another.
const UNITS: [(f64, &str); 8] = [
    (1000.0, "a thousand: milli- and whole units, or whole and kilo-"),
    (25.4, "25.4: inches and millimetres"),
    (9.80665, "9.80665: newton and kilogram-force"),
    (4.448_221_6, "4.448: newton and pound-force"),
    (3.6, "3.6: m/s and km/h"),
    (100.0, "a hundred: per cent or centimetres"),
    (1.0e6, "a million: two steps of a thousand"),
    (4.0, "4: twice or half a remanence, which counts with its square"),
];

/// What the table looks like it suffers from, in sentences. `ours` and `scales` go with the cells.
pub fn slips(asked: &Asked<'_>, ours: &[f64], scales: &[f64], field: f64) -> Result<Vec<String>, End> {
    let mut out = Vec::new();
    let table = asked.values();
    if let Some(text) = sign(asked, &table, ours, scales, field) {
        out.push(text);
        return Ok(out);
    }
    if let Some(text) = swapped(asked, &table, ours, scales)? {
        out.push(text);
        return Ok(out);
    }
    if let Some(text) = sizes(asked, &table, ours, scales, field)? {
        out.push(text);
    }
    if let Some(factor) = steady_factor(&table, ours, STEADY) {
        out.push(factor_sentence(factor));
    }
    Ok(out)
}

fn sign(asked: &Asked<'_>, table: &[f64], ours: &[f64], scales: &[f64], field: f64) -> Option<String> {
    for (k, ordinate) in asked.table.ordinates.iter().enumerate() {
        let of = |all: &[f64]| -> Vec<f64> {
            asked.cells.iter().zip(all).filter(|(c, _)| c.ordinate == k).map(|(_, v)| *v).collect()
        };
        let (t, o, s) = (of(table), of(ours), of(scales));
        let turned: Vec<Option<f64>> = o.iter().map(|v| Some(-v)).collect();
        let Some(apart) = likeness(&t, &turned, &s) else { continue };
        let straight = likeness(&t, &o.iter().map(|v| Some(*v)).collect::<Vec<_>>(), &s)?;
        if apart.apart < 0.25 * straight.apart && apart.apart < 0.25 * field.max(straight.apart) {
            let rule = match ordinate.name {
                "velocity" | "position" => "heights and velocities count upward",
                _ => "drag is positive when it opposes the motion",
            };
            return Some(format!(
                "the column '{}' has the opposite sign: turned round it lies within {:.1} % of ours ({rule})",
                ordinate.name,
                100.0 * apart.apart
            ));
        }
    }
    None
}

/// Values under each other's headers.
fn swapped(asked: &Asked<'_>, table: &[f64], ours: &[f64], scales: &[f64]) -> Result<Option<String>, End> {
    let names: Vec<&str> = asked.table.ordinates.iter().map(|o| o.name).collect();
    for a in 0..names.len() {
        for b in a + 1..names.len() {
            let of = |k: usize, all: &[f64]| -> Vec<f64> {
                asked.cells.iter().zip(all).filter(|(c, _)| c.ordinate == k).map(|(_, v)| *v).collect()
            };
            let some = |v: Vec<f64>| -> Vec<Option<f64>> { v.into_iter().map(Some).collect() };
            let crossed = |x: usize, y: usize| likeness(&of(x, table), &some(of(y, ours)), &of(y, scales));
            let straight = |x: usize| likeness(&of(x, table), &some(of(x, ours)), &of(x, scales));
            let (Some(ab), Some(ba), Some(aa)) = (crossed(a, b), crossed(b, a), straight(a)) else { continue };
            if ab.apart.max(ba.apart) < 0.1 && ab.apart < 0.25 * aa.apart {
                return Ok(Some(format!("the columns '{}' and '{}' look swapped", names[a], names[b])));
            }
        }
    }
    swapped_with_speed(asked, table)
}

/// Speed and drag under each other's headers.
fn swapped_with_speed(asked: &Asked<'_>, table: &[f64]) -> Result<Option<String>, End> {
    let lone = asked.table.ordinates.len() == 1 && asked.asks.first() == Some(&Ask::Settled) && asked.groups.len() == 1;
    if !lone || asked.table.abscissa != Some(Abscissa::Speed) {
        return Ok(None);
    }
    let mut pairs: Vec<(f64, f64)> =
        asked.cells.iter().zip(table).map(|(c, t)| (*t, asked.table.rows[c.row].at.unwrap_or(f64::NAN))).collect();
    if pairs.iter().any(|(speed, drag)| !(*speed > 0.0 && *speed <= FASTEST && *drag > 0.0)) {
        return Ok(None);
    }
    pairs.sort_by(|a, b| a.0.total_cmp(&b.0));
    let mut speeds: Vec<f64> = pairs.iter().map(|p| p.0).collect();
    speeds.dedup_by(|a, b| (*a - *b).abs() <= 1e-12 * a.abs());
    let Some(fastest) = speeds.last() else { return Ok(None) };
    let problem = endless(&asked.groups[0].case.problem, *fastest)?;
    let outcome = drag_curve(&problem, &speeds, asked.monitor)?;
    let points = outcome.curve.map(|c| c.points).unwrap_or_default();
    let drag_at =
        |speed: f64| points.iter().find(|p| (p.speed_m_per_s - speed).abs() <= 1e-9 * speed).map(|p| p.drag_newton);
    let ours: Vec<Option<f64>> = pairs.iter().map(|p| drag_at(p.0)).collect();
    let drags: Vec<f64> = pairs.iter().map(|p| p.1).collect();
    let scales: Vec<f64> = ours.iter().map(|o| o.map_or(1.0, f64::abs)).collect();
    let name = asked.table.ordinates[0].name;
    Ok(likeness(&drags, &ours, &scales).filter(|l| l.apart < 0.1).map(|l| {
        format!(
            "the columns 'speed' and '{name}' look swapped: the other way round the table lies within {:.1} % of ours",
            100.0 * l.apart
        )
    }))
}

fn factor_sentence(factor: f64) -> String {
    for (known, what) in UNITS {
        for value in [known, 1.0 / known] {
            if (factor / value - 1.0).abs() < 0.02 {
                return format!("the table is {factor:.4} times ours throughout, which is the factor of {what}");
            }
        }
    }
    format!(
        "the table is {factor:.4} times ours throughout: a factor, as a remanence {:+.2} % or a conductivity {:+.2} % off would bring at low speed",
        100.0 * (factor.abs().sqrt() - 1.0),
        100.0 * (factor - 1.0)
    )
}

/// One size across taken for another.
struct Slip {
    words: String,
    change: Box<dyn Fn(&Problem) -> Problem + Sync>,
}

/// Ring models that a changed case is tried with.
const RINGS: [Assumptions; 4] =
    [Assumptions::RESISTIVE, Assumptions::RINGS_INNER, Assumptions::RINGS_MEAN, Assumptions::DIPOLE_RULE];

/// A radius typed for a diameter, or the reverse.
fn sizes(asked: &Asked<'_>, table: &[f64], ours: &[f64], scales: &[f64], field: f64) -> Result<Option<String>, End> {
    if table.len() < FEWEST {
        return Ok(None);
    }
    let now: Vec<Problem> = asked.groups.iter().map(|g| g.case.problem.clone()).collect();
    let Some(resistive) = by_rings(asked, &now, Assumptions::RESISTIVE)? else { return Ok(None) };
    let travels = asked.needs.iter().any(|n| n.run);
    let target = CLOSE.min(0.2 * field);
    let close = |values: &[Option<f64>]| likeness(table, values, scales).filter(|l| l.apart < target);
    let mut best: Option<(f64, String)> = None;
    for slip in candidates(&now[0]) {
        let changed: Vec<Problem> = now.iter().map(|p| (slip.change)(p)).collect();
        // A magnet as it is has no place outside its bore; a dipole of the same moment has, and a calculator may not notice.
        let models: &[Assumptions] = match (changed.iter().all(|p| p.faults().is_empty()), travels) {
            (true, _) => &RINGS,
            (false, false) => &RINGS[3..],
            (false, true) => &[],
        };
        for &model in models {
            let Some(values) = by_rings(asked, &changed, model)? else { continue };
            if let Some(l) = close(&values) {
                keep(&mut best, l.apart, format!("{} ({})", slip.words, model.words()));
            }
            // The field of the changed case is solved where its estimate, our value times the change of the rings', comes near.
            let ratio = |((v, r), o): ((&Option<f64>, &Option<f64>), &f64)| Some(o * (*v)? / (*r)?);
            let estimate: Vec<Option<f64>> = values.iter().zip(&resistive).zip(ours).map(ratio).collect();
            let near = likeness(table, &estimate, scales);
            if model == Assumptions::RESISTIVE
                && near.is_some_and(|l| l.apart < WORTH_SOLVING.max(0.5 * field).min(1.0))
                && let Some(values) = asked.changed(&*slip.change)?
                && let Some(l) = close(&values)
            {
                keep(&mut best, l.apart, slip.words.clone());
            }
        }
    }
    Ok(best.map(|(apart, words)| {
        format!(
            "the table fits the case with {words} within {:.1} %: was a radius typed for a diameter, or the reverse?",
            100.0 * apart
        )
    }))
}

fn keep(best: &mut Option<(f64, String)>, apart: f64, words: String) {
    if best.as_ref().is_none_or(|(least, _)| apart < *least) {
        *best = Some((apart, words));
    }
}

/// Every diameter at half and at twice its size, alone and all together.
fn candidates(problem: &Problem) -> Vec<Slip> {
    let mut out = Vec::new();
    for (factor, word) in [(0.5, "half"), (2.0, "twice")] {
        for layer in &problem.wall.layers {
            let (name, inner, outer) = (layer.name.clone(), 2.0 * layer.inner_radius_m, 2.0 * layer.outer_radius_m);
            let bore = name.clone();
            if inner > 0.0 {
                out.push(Slip {
                    words: format!(
                        "wall.{name}.inner_diameter = {:.4} mm, {word} of {:.4} mm, at the same thickness",
                        1e3 * factor * inner,
                        1e3 * inner
                    ),
                    change: Box::new(move |p| {
                        let mut p = p.clone();
                        for l in p.wall.layers.iter_mut().filter(|l| l.name == bore) {
                            let thickness = l.thickness_m();
                            l.inner_radius_m *= factor;
                            l.outer_radius_m = l.inner_radius_m + thickness;
                        }
                        p
                    }),
                });
            }
            let both = name.clone();
            out.push(Slip {
                words: format!(
                    "both diameters of '{name}' at {word} their sizes ({:.4} and {:.4} mm)",
                    1e3 * factor * inner,
                    1e3 * factor * outer
                ),
                change: Box::new(move |p| {
                    let mut p = p.clone();
                    for l in p.wall.layers.iter_mut().filter(|l| l.name == both) {
                        l.inner_radius_m *= factor;
                        l.outer_radius_m *= factor;
                    }
                    p
                }),
            });
        }
        let mut names: Vec<(String, f64)> = Vec::new();
        for part in problem.mover.parts.iter().filter(|p| !matches!(p.source, Source::Dipole { .. })) {
            if !names.iter().any(|(n, _)| *n == part.name) {
                names.push((part.name.clone(), 2.0 * part.outline.outer_radius_m));
            }
        }
        for (name, diameter) in names {
            let part = name.clone();
            out.push(Slip {
                words: format!(
                    "mover.{name}.outer_diameter = {:.4} mm, {word} of {:.4} mm",
                    1e3 * factor * diameter,
                    1e3 * diameter
                ),
                change: Box::new(move |p| {
                    let mut p = p.clone();
                    p.mover.parts.iter_mut().filter(|x| x.name == part).for_each(|x| scale(x, factor));
                    solved_again(p)
                }),
            });
        }
        out.push(Slip {
            words: format!("every diameter at {word} its size"),
            change: Box::new(move |p| {
                let mut p = p.clone();
                for l in &mut p.wall.layers {
                    l.inner_radius_m *= factor;
                    l.outer_radius_m *= factor;
                }
                p.mover.parts.iter_mut().for_each(|x| scale(x, factor));
                solved_again(p)
            }),
        });
    }
    out
}

/// The case with the recoil permeability of its parts as they are now; where that fails it stays as it was, and
/// [`Problem::faults`] says so.
fn solved_again(mut problem: Problem) -> Problem {
    let renewed = problem.mover.renew_recoil();
    debug_assert!(renewed.is_ok() || !problem.faults().is_empty());
    problem
}

/// A part with its diameters scaled.
fn scale(part: &mut Part, factor: f64) {
    part.outline.inner_radius_m *= factor;
    part.outline.outer_radius_m *= factor;
    match &mut part.source {
        Source::Magnet { inner_radius_m, outer_radius_m, .. } | Source::Coil { inner_radius_m, outer_radius_m, .. } => {
            *inner_radius_m *= factor;
            *outer_radius_m *= factor;
        }
        Source::Dipole { .. } => {}
    }
}
