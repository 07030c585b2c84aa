//! `[accuracy]` and `[output]`.

use lenzbore_solver::problem::{Accuracy, Quantity as Number, SensibleRange, SnapshotPlan};

use super::OutputPlan;
use super::measures::LENGTH;
use super::reader::{Reader, Section, Wanted, wanted};
use super::resolved::{Origin, ResolvedValue};
use super::tree::{Node, Value};
use crate::message::{CaseFault, nearest};
use crate::picture::COLUMN_WIDTH_M;
use crate::units::{Kind, read_quantity};

/// Reads `[accuracy]`, or fills its defaults.
pub(super) fn read_accuracy(reader: &mut Reader, section: &Section<'_>) -> Accuracy {
    reader.check_words(section);
    let default = Accuracy::default();
    let target = wanted(Kind::Ratio, Number::TargetRelative);
    let target_relative = reader.quantity_or(section, "target", target, default.target_relative, "0.01 %");
    let levels = reader.count(section, "levels", 3, 5);
    let cells_across_wall = reader.count(section, "cells_across_wall", 4, 200);
    Accuracy { target_relative, levels, cells_across_wall }
}

/// A width on paper.
const PICTURE_WIDTH: Wanted =
    Wanted { kind: Kind::Length, range: SensibleRange { lowest: 0.05, highest: 1.2, zero: false, signed: false } };
const WRITES: [&str; 5] = ["summary", "trace", "fields", "pictures", "report"];
const WRITE_EXAMPLE: &str = "write = [\"summary\", \"trace\", \"fields\", \"pictures\", \"report\"]";
const FIELDS_EXAMPLE: &str = "fields = \"every 20 mm\", \"every 5 ms\", [\"0.1 s\", \"0.2 s\"] or \"none\"";

/// Reads `[output]`, or fills its defaults.
pub(super) fn read_output(reader: &mut Reader, section: &Section<'_>) -> (OutputPlan, SnapshotPlan) {
    reader.check_words(section);
    let plan = write(reader, section);
    let snapshots = snapshots(reader, section, plan.fields);
    let picture_width_m =
        reader.quantity_or(section, "picture_width", PICTURE_WIDTH, COLUMN_WIDTH_M, "one column of a page, 85 mm");
    (OutputPlan { picture_width_m, fields: plan.fields && snapshots != SnapshotPlan::None, ..plan }, snapshots)
}

fn write(reader: &mut Reader, section: &Section<'_>) -> OutputPlan {
    if !section.table.has("write") {
        let list = WRITES.iter().map(|w| ResolvedValue::Text((*w).to_owned())).collect();
        let why = "all that apply".to_owned();
        reader.note(section, "write", ResolvedValue::List(list), "", Origin::Default { why });
        return OutputPlan { trace: true, fields: true, pictures: true, report: true, picture_width_m: COLUMN_WIDTH_M };
    }
    let mut plan =
        OutputPlan { trace: false, fields: false, pictures: false, report: false, picture_width_m: COLUMN_WIDTH_M };
    let Some(nodes) = reader.list(section, "write", WRITE_EXAMPLE) else { return plan };
    let mut noted = Vec::new();
    for node in nodes {
        let Value::Text(text) = &node.value else {
            let why = "it lists names of results";
            reader.fault(node.place.clone(), CaseFault::List { word: "write".to_owned(), why, example: WRITE_EXAMPLE });
            continue;
        };
        match text.trim() {
            "summary" => {}
            "trace" => plan.trace = true,
            "fields" => plan.fields = true,
            "pictures" => plan.pictures = true,
            "report" => plan.report = true,
            other => unknown_result(reader, node, other),
        }
        noted.push(ResolvedValue::Text(text.trim().to_owned()));
    }
    let origin = reader.origin(&section.place_of("write"));
    reader.note(section, "write", ResolvedValue::List(noted), "", origin);
    plan
}

fn unknown_result(reader: &mut Reader, node: &Node, found: &str) {
    let fault = CaseFault::UnknownChoice {
        word: "write".to_owned(),
        found: found.to_owned(),
        choices: WRITES.iter().map(|w| (*w).to_owned()).collect(),
        nearest: nearest(found, WRITES).map(str::to_owned),
    };
    reader.fault(node.place.clone(), fault);
}

fn snapshots(reader: &mut Reader, section: &Section<'_>, written: bool) -> SnapshotPlan {
    let Some(entry) = section.table.entry("fields") else {
        return if written { SnapshotPlan::Automatic } else { SnapshotPlan::None };
    };
    let node = &entry.node;
    let plan = match &node.value {
        Value::Text(text) if text.trim() == "none" => Some(SnapshotPlan::None),
        Value::Text(text) => every(reader, node, text),
        Value::List(nodes) => instants(reader, nodes, node),
        _ => {
            reader.wrong_shape(entry, "how often fields are kept", FIELDS_EXAMPLE);
            None
        }
    };
    if let Some(plan) = &plan {
        let (value, unit) = match plan {
            SnapshotPlan::Instants { times_s } => {
                (ResolvedValue::List(times_s.iter().map(|t| ResolvedValue::Number(*t)).collect()), "s")
            }
            SnapshotPlan::EveryTravel { step_m } => (ResolvedValue::Number(*step_m), "m"),
            SnapshotPlan::EveryTime { step_s } => (ResolvedValue::Number(*step_s), "s"),
            _ => (ResolvedValue::Text("none".to_owned()), ""),
        };
        let origin = reader.origin(&node.place);
        reader.note(section, "fields", value, unit, origin);
    }
    plan.unwrap_or_default()
}

/// `every 20 mm` of travel, `every 5 ms` of time.
fn every(reader: &mut Reader, node: &Node, text: &str) -> Option<SnapshotPlan> {
    let Some(step) = text.trim().strip_prefix("every ") else {
        let fault = CaseFault::UnknownChoice {
            word: "fields".to_owned(),
            found: text.to_owned(),
            choices: ["every 20 mm", "every 5 ms", "none"].map(str::to_owned).to_vec(),
            nearest: None,
        };
        reader.fault(node.place.clone(), fault);
        return None;
    };
    let step_node = Node { value: Value::Text(step.to_owned()), place: node.place.clone() };
    if read_quantity(step, Kind::Time).is_ok() {
        let time = wanted(Kind::Time, Number::Time);
        return reader.value(&step_node, "fields", time).map(|step_s| SnapshotPlan::EveryTime { step_s });
    }
    reader.value(&step_node, "fields", LENGTH).map(|step_m| SnapshotPlan::EveryTravel { step_m })
}

fn instants(reader: &mut Reader, nodes: &[Node], whole: &Node) -> Option<SnapshotPlan> {
    let time = super::reader::Wanted {
        kind: Kind::Time,
        range: lenzbore_solver::problem::SensibleRange { lowest: 1e-12, highest: 1e9, zero: true, signed: false },
    };
    let read: Vec<Option<f64>> = nodes.iter().map(|n| reader.value(n, "fields", time)).collect();
    let times_s: Vec<f64> = read.into_iter().collect::<Option<_>>()?;
    if times_s.is_empty() || times_s.windows(2).any(|w| w[0] >= w[1]) {
        let (word, why) = ("fields".to_owned(), "instants increase, and there is at least one");
        reader.fault(whole.place.clone(), CaseFault::List { word, why, example: FIELDS_EXAMPLE });
        return None;
    }
    Some(SnapshotPlan::Instants { times_s })
}
