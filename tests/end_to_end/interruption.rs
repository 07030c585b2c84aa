//! Stopped on request or killed: no half-written result under the name that was asked for.

use std::process::{Child, Command, Stdio};
use std::time::{Duration, Instant};

use crate::rig::{Bench, SLOW, entries};

/// A fall that is solved in a second and leaves a field file of some tens of megabytes.
fn many_fields() -> String {
    let short = SLOW.replace("\"15 m\"", "\"20 mm\"").replace("\"15.02 m\"", "\"30 mm\"");
    short
        + "\n[accuracy]\ntarget = \"1 %\"\n\n[output]\nwrite = [\"summary\", \"trace\", \"fields\"]\nfields = \"every 0.1 mm\"\n"
}

fn start(bench: &Bench, words: &[&str]) -> Child {
    bench.command(words).stdout(Stdio::piped()).stderr(Stdio::piped()).spawn().unwrap()
}

fn signal(child: &Child, name: &str) {
    let sent = Command::new("kill").args([name, &child.id().to_string()]).status().unwrap();
    assert!(sent.success());
}

/// Waits until a result is being written beside its place, or until the run has ended.
fn wait_for_writing(bench: &Bench, child: &mut Child) -> bool {
    let begin = Instant::now();
    while child.try_wait().unwrap().is_none() {
        if bench.entries().iter().any(|e| e.starts_with(".result.partial-")) {
            return true;
        }
        assert!(begin.elapsed() < Duration::from_secs(300), "the run takes too long");
        std::thread::sleep(Duration::from_millis(1));
    }
    false
}

#[test]
fn ctrl_c_ends_a_computation_with_130_and_leaves_nothing() {
    let bench = Bench::with("slow.toml", SLOW);
    let child = start(&bench, &["run", "slow.toml", "--out", "deep/result"]);
    std::thread::sleep(Duration::from_millis(1500));
    signal(&child, "-INT");
    let asked = Instant::now();
    let output = child.wait_with_output().unwrap();
    assert_eq!(output.status.code(), Some(130));
    assert!(asked.elapsed() < Duration::from_secs(20), "it took {:?} to stop", asked.elapsed());
    assert_eq!(String::from_utf8_lossy(&output.stderr), "interrupted; nothing was written\n");
    assert_eq!(bench.entries(), ["slow.toml"]);
}

#[test]
fn ctrl_c_while_writing_leaves_all_or_nothing() {
    let bench = Bench::with("case.toml", &many_fields());
    let mut child = start(&bench, &["run", "case.toml", "--out", "result"]);
    assert!(wait_for_writing(&bench, &mut child), "it ended without writing: {:?}", child.wait_with_output());
    signal(&child, "-INT");
    match child.wait().unwrap().code() {
        Some(130) => assert_eq!(bench.entries(), ["case.toml"]),
        Some(0) => assert_eq!(entries(&bench.path("result")), ["run.h5", "run.xdmf", "summary.json", "trace.csv"]),
        other => panic!("exit status {other:?}"),
    }
}

#[test]
fn a_killed_run_leaves_no_half_valid_result() {
    let bench = Bench::with("case.toml", &many_fields());
    let mut child = start(&bench, &["run", "case.toml", "--out", "result"]);
    assert!(wait_for_writing(&bench, &mut child), "it ended without writing: {:?}", child.wait_with_output());
    signal(&child, "-KILL");
    child.wait().unwrap();
    assert!(!bench.path("result").exists(), "the result stands under its name only when it is whole");
    // The next run is not held up by what the killed one left beside.
    bench.succeed(&["run", "case.toml", "--out", "result"]);
    assert_eq!(entries(&bench.path("result")), ["run.h5", "run.xdmf", "summary.json", "trace.csv"]);
}
