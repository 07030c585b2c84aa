//! From the tree of words to the resolved case.

use std::collections::BTreeMap;

use lenzbore_solver::problem::{Accuracy, Extent, Mover, Problem, SnapshotPlan, Travel, Traverse, Wall};
use serde_json::{Map, Value as Json};

use super::alternating::{is_asked, read_alternating};
use super::curve::read_curve;
use super::geometry::{Parts, odd_sizes, place_faults};
use super::kept::{KeptCase, toml_text};
use super::load::Loaded;
use super::mover::{MoverReading, read_mover};
use super::output::{read_accuracy, read_output};
use super::reader::{Reader, Section};
use super::station::read_stations;
use super::stroke::{is_given_motion, read_given_motion};
use super::tolerance::{Tolerance, read_tolerances};
use super::travel::{Surroundings, read_travel};
use super::tree::{Entry, Table};
use super::wall::read_wall;
use super::warming::read_warming;
use super::{CaseSource, CurvePlan, OutputPlan, ResolvedCase};
use crate::message::{CaseFault, Diagnostics, Place};

/// What a recoil permeability still leaves out, as an entry of `not_modelled`.
pub const BACK_ACTION: &str = "the wall's back-action on the magnets' recoil permeability";

static NO_TABLE: Table = Table { entries: Vec::new() };

pub(super) fn resolve(loaded: Loaded, source: &CaseSource<'_>) -> Result<ResolvedCase, Diagnostics> {
    let Loaded { tree, sources, faults, notes, own_materials, kept_files, materials, readable } = loaded;
    if !readable {
        return Err(Diagnostics::new(sources, faults));
    }
    let mut reader = Reader { sources, faults, cautions: notes, own_materials, kept_files, ..Reader::default() };
    let root = Section { table: &tree, kind: "", label: "a case file", path: Vec::new(), place: Place::new(0, 0..0) };
    let read = read_root(&mut reader, &root, source);
    let Reader { sources, faults, cautions, not_modelled, resolved, kept_files, .. } = reader;
    match read {
        Some(read) if faults.is_empty() => Ok(ResolvedCase {
            title: read.title,
            record: read.record,
            problem: read.problem,
            travel_given: read.travel_given,
            curve: read.curve,
            output: read.output,
            tolerances: read.tolerances,
            digest: resolved.digest(),
            kept: kept(&tree, materials, kept_files),
            files: sources.files().map(str::to_owned).collect(),
            resolved,
            cautions,
            not_modelled,
        }),
        _ => Err(Diagnostics::new(sources, faults)),
    }
}

/// The case in one piece; what came from the shell or base files is in the tree already.
fn kept(tree: &Table, materials: Option<Entry>, files: BTreeMap<String, String>) -> KeptCase {
    let mut whole = tree.clone();
    whole.entries.extend(materials);
    KeptCase { toml: toml_text(&whole), files }
}

struct Read {
    title: String,
    record: Map<String, Json>,
    problem: Problem,
    travel_given: bool,
    curve: Option<CurvePlan>,
    output: OutputPlan,
    tolerances: Vec<Tolerance>,
}

fn read_root(reader: &mut Reader, root: &Section<'_>, source: &CaseSource<'_>) -> Option<Read> {
    reader.check_words(root);
    let title = title(reader, root, source);
    let record = record(reader, root);
    let wall = read_wall(reader, root);
    let mover = read_mover(reader, root);
    let around = Surroundings::new(wall.as_ref().map(|w| &w.wall), mover.as_ref().map(|m| m.ends_m));
    let travel_section = reader.table(root, "travel", "[travel] with law = \"free\"");
    let travel = travel_section.as_ref().and_then(|s| {
        if is_asked(s) {
            read_alternating(reader, s, wall.as_ref().map(|w| &w.wall), mover.as_ref())
        } else if is_given_motion(s) {
            read_given_motion(reader, s, around, source)
        } else {
            read_travel(reader, s, around)
        }
    });
    let curve_section = reader.table(root, "curve", "[curve] with speeds = [\"0.01 m/s\", \"50 m/s\"]");
    let curve = curve_section
        .as_ref()
        .and_then(|s| read_curve(reader, s, wall.as_ref(), (travel_section.is_some(), travel.as_ref())));
    if !root.table.has("travel") && !root.table.has("curve") {
        let why = "what is asked: how the mover travels, or a [curve] of drag against speed";
        reader.missing(root, "travel", why, "[travel] with law = \"free\" and release = \"640 mm\"");
    }
    let accuracy_section = optional(reader, root, "accuracy");
    let accuracy = read_accuracy(reader, &accuracy_section);
    let output_section = optional(reader, root, "output");
    let (output, snapshots) = read_output(reader, &output_section);
    let stations = read_stations(reader, &output_section);
    let warming = wall.as_ref().and_then(|w| read_warming(reader, root, w, travel.as_ref()));
    let tolerances = read_tolerances(reader, root);
    let (wall, mover) = (wall?, mover?);
    let mut problem = problem(&wall.wall, &mover.mover, travel.as_ref(), curve.as_ref(), (accuracy, snapshots));
    problem.stations = stations.iter().map(|(station, _)| station.clone()).collect();
    problem.warming = warming;
    let parts = Parts {
        root,
        wall: &wall,
        mover: &mover,
        travel: travel_section.as_ref(),
        accuracy: Some(&accuracy_section),
        output: Some(&output_section),
        stations: stations.iter().map(|(_, section)| section).collect(),
        whole_wall: wall.complete,
        whole_mover: mover.complete,
        whole_travel: travel.is_some(),
    };
    place_faults(reader, problem.faults(), &parts);
    let problem = if reader.faults.is_empty() { with_recoil(reader, problem, &mover)? } else { problem };
    reader.cautions.extend(odd_sizes(&problem));
    if problem.mover.recoil.is_some() {
        reader.not_modelled.push(BACK_ACTION.to_owned());
    }
    if matches!(travel, Some(Travel::Traverse(_) | Travel::Free(_) | Travel::Sine(_) | Travel::Table(_))) {
        let text =
            "currents in the mover's own conducting parts (a sintered magnet conducts about 1 % as well as copper)";
        reader.not_modelled.push(text.to_owned());
    }
    Some(Read { title, record, problem, travel_given: travel_section.is_some(), curve, output, tolerances })
}

/// A table that may be absent: then an empty one, whose defaults are filled in.
fn optional<'t>(reader: &mut Reader, root: &Section<'t>, word: &'static str) -> Section<'t> {
    let example = if word == "accuracy" { "[accuracy]" } else { "[output]" };
    reader.table(root, word, example).unwrap_or_else(|| Section {
        table: &NO_TABLE,
        kind: word,
        label: example,
        path: vec![word.to_owned()],
        place: root.place.clone(),
    })
}

/// Wall, mover and travel as one problem; a case without `[travel]` asks for a curve, whose wall is endless where speeds are
/// swept. Where the travel could not be read, another stands in for it, so that the faults of wall and mover are found all the same.
fn problem(
    wall: &Wall,
    mover: &Mover,
    travel: Option<&Travel>,
    curve: Option<&CurvePlan>,
    (accuracy, snapshots): (Accuracy, SnapshotPlan),
) -> Problem {
    let mut wall = wall.clone();
    let travel = match (travel, wall.extent) {
        (Some(travel), _) => travel.clone(),
        (None, Extent::Finite { length_m }) if curve.is_none_or(|c| c.speeds_m_per_s.is_empty()) => {
            Travel::Traverse(Traverse { speed_m_per_s: 1.0, from_m: -length_m, to_m: 2.0 * length_m })
        }
        (None, _) => {
            wall.extent = Extent::Endless;
            let velocity_m_per_s = curve.and_then(|c| c.speeds_m_per_s.last().copied()).unwrap_or(1.0);
            Travel::Steady { velocity_m_per_s }
        }
    };
    Problem { wall, mover: mover.clone(), travel, accuracy, snapshots, stations: Vec::new(), warming: None }
}

/// The mover's own field with the recoil permeability of its magnets.
fn with_recoil(reader: &mut Reader, problem: Problem, mover: &MoverReading<'_>) -> Option<Problem> {
    match problem.with_recoil(&mover.recoil) {
        Ok(problem) => Some(problem),
        Err(fault) => {
            let word = "recoil_permeability".to_owned();
            let (found, legal) = (format!("{:?}", mover.recoil), fault.to_string());
            reader.fault(mover.section.place.clone(), CaseFault::Impossible { word, found, legal, mend: None });
            None
        }
    }
}

fn title(reader: &mut Reader, root: &Section<'_>, source: &CaseSource<'_>) -> String {
    if let Some(title) = reader.text(root, "title", "title = \"Arrest sleeve\"") {
        reader.note_text(root, "title", &title);
        return title;
    }
    match source {
        CaseSource::Path(path) => path.file_stem().map(|s| s.to_string_lossy().into_owned()),
        CaseSource::Text { .. } | CaseSource::Kept(_) => None,
    }
    .unwrap_or_else(|| "case".to_owned())
}

fn record(reader: &mut Reader, root: &Section<'_>) -> Map<String, Json> {
    let mut record = Map::new();
    let Some(section) = reader.table(root, "record", "[record]") else { return record };
    reader.check_words(&section);
    for word in ["document", "revision", "purpose", "prepared", "checked"] {
        if let Some(text) = reader.text(&section, word, "revision = \"B\"") {
            reader.note_text(&section, word, &text);
            record.insert(word.to_owned(), Json::String(text));
        }
    }
    record
}
