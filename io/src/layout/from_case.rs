//! The layout of a resolved case.

use lenzbore_solver::problem::{Extent, Layer, Part, Problem, Travel};
use lenzbore_solver::sources::Source;

use super::{BodyKind, BodyLayout, LayerLayout, Layout, WallLayout};
use crate::case::{Resolved, ResolvedCase, ResolvedValue};

/// Where every body of a case stands.
#[must_use]
pub fn layout(case: &ResolvedCase) -> Layout {
    let (problem, words) = (&case.problem, &case.resolved);
    let mut mover: Vec<BodyLayout> = problem.mover.parts.iter().map(|p| body(p, words)).collect();
    mover.extend(spacers(&problem.mover.parts, words));
    mover.sort_by(|a, b| a.at_m.total_cmp(&b.at_m));
    let gates_m = match &problem.travel {
        Travel::Free(free) => free.gates_m.to_vec(),
        _ => Vec::new(),
    };
    let (start_m, end_m) = ends(problem);
    Layout { wall: wall(problem, words), mover, gates_m, start_m, end_m }
}

/// Positions of the reference point at the beginning and at the end of the travel.
fn ends(problem: &Problem) -> (Option<f64>, Option<f64>) {
    match &problem.travel {
        Travel::Free(free) => (Some(free.release_m), Some(free.until_m)),
        Travel::Traverse(traverse) => (Some(traverse.from_m), Some(traverse.to_m)),
        Travel::Alternating(coils) => (Some(coils.position_m), None),
        _ => (None, None),
    }
}

fn wall(problem: &Problem, words: &Resolved) -> WallLayout {
    let length_m = match problem.wall.extent {
        Extent::Endless => None,
        Extent::Finite { length_m } => Some(length_m),
    };
    let layers = problem.wall.layers.iter().map(|layer| self::layer(layer, words)).collect();
    WallLayout { length_m, layers }
}

fn layer(layer: &Layer, words: &Resolved) -> LayerLayout {
    LayerLayout {
        name: layer.name.clone(),
        material: material(words, "wall", &layer.name),
        inner_diameter_m: 2.0 * layer.inner_radius_m,
        outer_diameter_m: 2.0 * layer.outer_radius_m,
        from_m: layer.from_m,
        to_m: layer.to_m,
        conductivity_s_per_m: layer.conductivity_s_per_m,
        relative_permeability: layer.relative_permeability,
    }
}

fn body(part: &Part, words: &Resolved) -> BodyLayout {
    let kind = match part.source {
        Source::Magnet { remanence_tesla, .. } => BodyKind::Magnet { remanence_tesla },
        Source::Coil { ampere_turns, .. } => BodyKind::Coil { ampere_turns },
        Source::Dipole { moment_a_m2 } => BodyKind::Dipole { moment_a_m2 },
    };
    BodyLayout {
        name: part.name.clone(),
        material: material(words, "mover", &part.name),
        inner_diameter_m: 2.0 * part.outline.inner_radius_m,
        outer_diameter_m: 2.0 * part.outline.outer_radius_m,
        length_m: part.outline.length_m,
        at_m: part.centre_m,
        kind,
    }
}

/// The spacers of a stack, placed between the parts that have a field.
fn spacers(parts: &[Part], words: &Resolved) -> Vec<BodyLayout> {
    let Some(ResolvedValue::List(stack)) = words.get("mover.stack").map(|w| &w.value) else { return Vec::new() };
    let gap = words.number("mover.stack_gap").unwrap_or(0.0);
    let mut magnetic = parts.iter();
    let mut shift = None;
    let mut cursor = 0.0;
    let mut out = Vec::new();
    for entry in stack {
        let ResolvedValue::Text(entry) = entry else { continue };
        let length = match words.number(&format!("mover.{entry}.length")).filter(|_| !ends_in_sign(entry)) {
            Some(length) => {
                out.push(spacer(entry, length, cursor + 0.5 * length));
                length
            }
            None => {
                let Some(part) = magnetic.next() else { continue };
                shift.get_or_insert(part.centre_m - 0.5 * part.outline.length_m - cursor);
                part.outline.length_m
            }
        };
        cursor += length + gap;
    }
    let shift = shift.unwrap_or(0.0);
    out.iter_mut().for_each(|body| body.at_m += shift);
    out
}

fn spacer(name: &str, length_m: f64, at_m: f64) -> BodyLayout {
    let kind = BodyKind::Spacer;
    BodyLayout {
        name: name.to_owned(),
        material: None,
        inner_diameter_m: 0.0,
        outer_diameter_m: 0.0,
        length_m,
        at_m,
        kind,
    }
}

/// Whether an entry of a stack says where a north points, which spacers do not.
fn ends_in_sign(entry: &str) -> bool {
    entry.ends_with(['+', '-', '\u{2212}'])
}

fn material(words: &Resolved, table: &str, name: &str) -> Option<String> {
    match &words.get(&format!("{table}.{name}.material"))?.value {
        ResolvedValue::Text(text) => Some(text.clone()),
        _ => None,
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, clippy::float_cmp, reason = "tests may stop at the first fault")]

    use std::path::Path;

    use approx::assert_relative_eq;

    use super::*;
    use crate::case::{CaseSource, read_case};

    fn of(text: &str) -> Layout {
        layout(&read_case(&CaseSource::Text { name: "case", text, base_dir: Path::new("") }, &[]).unwrap())
    }

    const STACKED: &str = r#"
        [wall]
        length = "200 mm"
        [[wall.layer]]
        name = "sleeve"
        material = "copper Cu-DHP"
        size = "35 x 3 mm"
        [mover]
        mass = "1 kg"
        stack = ["S", "M+", "S", "M-"]
        stack_gap = "1 mm"
        reference = "lower end"
        [[mover.magnet]]
        name = "M"
        material = "NdFeB N42SH"
        outer_diameter = "26 mm"
        length = "12 mm"
        [[mover.spacer]]
        name = "S"
        length = "6 mm"
        [travel]
        law = "free"
        release = "250 mm"
        "#;

    #[test]
    fn spacers_stand_where_the_stack_puts_them() {
        let layout = of(STACKED);
        let centres: Vec<f64> = layout.mover.iter().map(|b| b.at_m).collect();
        for (at, expected) in centres.iter().zip([3e-3, 13e-3, 23e-3, 33e-3]) {
            assert_relative_eq!(*at, expected, max_relative = 1e-12);
        }
        assert!(matches!(layout.mover[0].kind, BodyKind::Spacer));
        assert!(matches!(layout.mover[1].kind, BodyKind::Magnet { remanence_tesla } if remanence_tesla > 1.0));
        assert!(matches!(layout.mover[3].kind, BodyKind::Magnet { remanence_tesla } if remanence_tesla < -1.0));
        assert_eq!(layout.wall.layers[0].material.as_deref(), Some("copper Cu-DHP"));
        assert_eq!(layout.gates_m, [0.2, 0.0]);
        assert_eq!(layout.start_m, Some(0.25));
    }

    #[test]
    fn what_is_written_reads_back() {
        let layout = of(STACKED);
        let text = serde_json::to_string(&layout).unwrap();
        assert!(text.contains("\"remanence_T\"") && text.contains("\"conductivity_S_per_m\""), "{text}");
        assert_eq!(serde_json::from_str::<Layout>(&text).unwrap(), layout);
    }
}
