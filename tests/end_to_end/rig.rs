//! What every test needs: a folder of its own, cases that solve in a blink, and the binary.

use std::path::{Path, PathBuf};
use std::process::{Command, Output, Stdio};

use assert_cmd::cargo::cargo_bin;
use serde_json::Value;
use tempfile::TempDir;

/// The files of a run with settled fields.
pub const SETTLED_FILES: [&str; 8] =
    ["parts.png", "parts.svg", "report.html", "run.h5", "run.xdmf", "section.png", "section.svg", "summary.json"];

/// Settled fields in an endless wall: solves in a tenth of a second.
pub const QUICK: &str = r#"title = "Dipole in a tube"

[wall]
length = "endless"

[[wall.layer]]
name = "tube"
conductivity = "58 MS/m"
inner_diameter = "21 mm"
thickness = "2 mm"

[mover]

[[mover.dipole]]
name = "D"
moment = "1 A m2"

[travel]
law = "steady"
speed = "5 m/s"

[curve]
speeds = ["0.1 m/s", "100 m/s"]
points = 5
"#;

/// A slow fall through a tube 15 m long: takes longer than any test waits for.
pub const SLOW: &str = r#"title = "Long fall"

[wall]
length = "15 m"

[[wall.layer]]
name = "tube"
conductivity = "40 MS/m"
inner_diameter = "20 mm"
thickness = "3 mm"

[mover]
mass = "50 g"

[[mover.magnet]]
name = "M"
remanence = "1.2 T"
recoil_permeability = 1
outer_diameter = "16 mm"
length = "8 mm"

[travel]
law = "free"
release = "15.02 m"
until = "-20 mm"
"#;

/// A folder that is removed at the end of a test, and commands that run in it.
pub struct Bench {
    folder: TempDir,
}

impl Bench {
    pub fn new() -> Self {
        Self { folder: TempDir::new().unwrap() }
    }

    /// A bench with one case file.
    pub fn with(name: &str, text: &str) -> Self {
        let bench = Self::new();
        bench.write(name, text);
        bench
    }

    pub fn path(&self, name: &str) -> PathBuf {
        self.folder.path().join(name)
    }

    pub fn write(&self, name: &str, text: &str) {
        std::fs::write(self.path(name), text).unwrap();
    }

    /// The binary, to be run in this folder with nothing on standard input.
    pub fn command(&self, words: &[&str]) -> Command {
        let mut command = Command::new(cargo_bin!("lenzbore"));
        command.args(words).current_dir(self.folder.path()).stdin(Stdio::null());
        command
    }

    pub fn run(&self, words: &[&str]) -> Ran {
        Ran::of(&self.command(words).output().unwrap())
    }

    /// Runs and wants exit status 0.
    pub fn succeed(&self, words: &[&str]) -> Ran {
        let ran = self.run(words);
        assert_eq!(ran.status, Some(0), "{words:?}: {}", ran.errors);
        ran
    }

    /// Names of all that lies in the folder, hidden ones too, sorted.
    pub fn entries(&self) -> Vec<String> {
        entries(self.folder.path())
    }
}

/// Names of all that lies in a folder, sorted.
pub fn entries(folder: &Path) -> Vec<String> {
    let mut names: Vec<String> =
        std::fs::read_dir(folder).unwrap().map(|e| e.unwrap().file_name().into_string().unwrap()).collect();
    names.sort();
    names
}

/// What a run left on its streams.
#[derive(Debug)]
pub struct Ran {
    pub status: Option<i32>,
    pub output: String,
    pub errors: String,
}

impl Ran {
    pub fn of(output: &Output) -> Self {
        Self {
            status: output.status.code(),
            output: String::from_utf8(output.stdout.clone()).unwrap(),
            errors: String::from_utf8(output.stderr.clone()).unwrap(),
        }
    }

    /// Standard output as the one JSON object that `--json` promises.
    pub fn json(&self) -> Value {
        serde_json::from_str(&self.output).unwrap()
    }
}

/// The value of a figure of a summary.
pub fn figure(summary: &Value, name: &str) -> f64 {
    summary["figures"][name]["value"].as_f64().unwrap_or_else(|| panic!("no figure {name}"))
}

/// The half-width of its band.
pub fn band(summary: &Value, name: &str) -> f64 {
    summary["figures"][name]["band"].as_f64().unwrap_or_else(|| panic!("no band of {name}"))
}

/// Reads a JSON file.
pub fn read_json(path: &Path) -> Value {
    serde_json::from_str(&std::fs::read_to_string(path).unwrap()).unwrap()
}

/// The folder of the package.
pub fn root() -> &'static Path {
    Path::new(env!("CARGO_MANIFEST_DIR"))
}

/// The document `file` shows what this version gives: all figures, in its block behind `marker`.
pub fn check_shown(file: &str, marker: &str, summary: &Value) {
    let shown = count_shown(file, marker, summary);
    assert_eq!(shown, summary["figures"].as_object().unwrap().len(), "{file} shows every figure");
}

/// How many figures the block of `file` behind `marker` shows; each lies within the two bands of the one just computed.
pub fn count_shown(file: &str, marker: &str, summary: &Value) -> usize {
    let text = std::fs::read_to_string(root().join(file)).unwrap();
    let (_, block) = text.split_once(marker).unwrap_or_else(|| panic!("{file} shows no result behind {marker}"));
    let mut shown = 0;
    for line in block.lines().take_while(|l| *l != "```").filter(|l| l.contains(" +/- ")) {
        let (left, right) = line.split_once(" +/- ").unwrap();
        let mut words = left.split_whitespace();
        let (name, printed) = (words.next().unwrap(), words.next().unwrap());
        let value: f64 = printed.parse().unwrap();
        // A figure without a numerical band is as exact as it is printed.
        let decimals = printed.split_once('.').map_or(0, |(_, d)| d.split('e').next().unwrap().len());
        let rounding = 0.51 * 10.0_f64.powi(-i32::try_from(decimals).unwrap());
        let bands = right.split_whitespace().next().unwrap().parse::<f64>().unwrap() + band(summary, name);
        let allowed = if bands > 0.0 { 1.05 * bands } else { rounding };
        let apart = (value - figure(summary, name)).abs();
        assert!(apart <= allowed, "{file} shows {name} = {value}: {apart} away");
        shown += 1;
    }
    shown
}

/// The summary and the result folder of an example that is run with overrides.
pub fn run_example(name: &str, sets: &[&str]) -> (Value, Bench) {
    let bench = Bench::new();
    let case = root().join(format!("examples/{name}.toml"));
    let mut words = vec!["run", case.to_str().unwrap(), "--json", "--out", "result"];
    for set in sets {
        words.extend(["--set", set]);
    }
    let summary = bench.succeed(&words).json();
    assert_eq!(summary, read_json(&bench.path("result/summary.json")));
    crate::words::assert_figures_are_explained(&summary);
    (summary, bench)
}
