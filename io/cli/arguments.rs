//! The words of the command line.
#![allow(
    rustdoc::broken_intra_doc_links,
    reason = "the comments are the help that users read, where a table of a case stands in brackets"
)]

use std::path::PathBuf;

use clap::{Args, CommandFactory, Parser, Subcommand, ValueEnum};
use clap_complete::Shell;

/// Drag, travel, eddy currents and heat of a magnet carrier in a conducting tube, each figure with a numerical band.
#[derive(Debug, Parser)]
#[command(
    version,
    after_help = "Exit status: 0 done; 1 the answer is no; 2 the input is wrong; 3 the computation or a file failed; \
                  4 undecided, or the accuracy target was missed; 130 interrupted.\n\
                  Strong magnets pinch; walls get hot; an eddy-current brake holds nothing at rest. Figures are model \
                  results, not an approval: a life-safety brake is designed and approved by licensed engineers under the local code."
)]
pub struct Arguments {
    /// What to do.
    #[command(subcommand)]
    pub command: Command,
}

/// Name of every command and what it does.
pub fn commands() -> Vec<(String, String)> {
    let about = |c: &clap::Command| c.get_about().map(ToString::to_string).unwrap_or_default();
    Arguments::command().get_subcommands().map(|c| (c.get_name().to_owned(), about(c))).collect()
}

/// The commands.
#[derive(Debug, Subcommand)]
pub enum Command {
    /// Writes a commented starter case: an arrestor, a damper or a coil probe
    New(NewWords),
    /// Reads a case and says what would be solved: parts to scale, clearance, grids, steps, memory and time; solves nothing
    Check(CheckWords),
    /// Solves what the case's law of travel asks
    Run(SolveWords),
    /// Drag against speed, with settled fields in an endless wall
    Curve(SolveWords),
    /// Simplified models one step at a time up to the field solution, and what each step is worth
    Ladder(LadderWords),
    /// Holds a calculator's or a measurement's table against the field solution
    Compare(CompareWords),
    /// Makes the report page of a result folder again
    Report(ReportWords),
    /// The published checks, each labelled code verification, cross-check or validation (experiment)
    Validate(ValidateWords),
    /// The material book, with the source of every number
    Materials(MaterialsWords),
    /// Writes a result in another format: for visualisation programs, spreadsheets or other solvers
    Export(ExportWords),
    /// Solves a result folder's case again and says figure by figure whether it comes back within its band
    Rerun(RerunWords),
    /// The JSON Schema of the case file, for completion and checks in editors
    Schema,
    /// What a word means: of the case file, of a result, of a table, a command; without a word, lists all
    Explain(ExplainWords),
    /// The script that completes commands and options in a shell
    Completions(CompletionsWords),
    /// A command that is not built yet, or none at all
    #[command(external_subcommand)]
    Unbuilt(Vec<String>),
}

/// `lenzbore new`.
#[derive(Debug, Args)]
pub struct NewWords {
    /// File to write; `-` is standard output
    #[arg(default_value = "case.toml")]
    pub path: PathBuf,
    /// What the case is of
    #[arg(long, value_name = "KIND", value_enum, default_value_t = StarterKind::Arrestor)]
    pub kind: StarterKind,
}

/// What a starter is of.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub enum StarterKind {
    /// A carrier that falls through a sleeve and is caught by it
    Arrestor,
    /// Magnets that swing to and fro in a sleeve
    Damper,
    /// A coil with alternating current in a tube
    CoilProbe,
}

/// What names a case.
#[derive(Debug, Args)]
pub struct CaseWords {
    /// Case file (TOML); `-` reads it from standard input
    pub case: PathBuf,
    /// Overrides a word of the case, as wall.sleeve.thickness="2.1 mm"; may be given again
    #[arg(long, value_name = "WORD=VALUE")]
    pub set: Vec<String>,
    /// Prints one JSON object on standard output instead of text
    #[arg(long)]
    pub json: bool,
}

/// `lenzbore check`.
#[derive(Debug, Args)]
pub struct CheckWords {
    /// The case.
    #[command(flatten)]
    pub case: CaseWords,
    /// Also writes a drawing of the parts to this SVG or PNG file
    #[arg(long, value_name = "FILE")]
    pub drawing: Option<PathBuf>,
}

/// `lenzbore run` and `lenzbore curve`.
#[derive(Debug, Args)]
pub struct SolveWords {
    /// The case.
    #[command(flatten)]
    pub case: CaseWords,
    /// Result folder [default: out/ and the case file's stem, for a curve with -curve behind it]
    #[arg(long, value_name = "FOLDER")]
    pub out: Option<PathBuf>,
    /// Puts the result in the place of an older one
    #[arg(long)]
    pub replace: bool,
    /// The input spread.
    #[command(flatten)]
    pub spread: SpreadWords,
}

/// What is asked of the input spread of a case with [tolerance].
#[derive(Debug, Clone, Copy, Args)]
pub struct SpreadWords {
    /// Leaves the input spread out, although the case has [tolerance]
    #[arg(long)]
    pub no_spread: bool,
    /// Also draws all toleranced inputs at random, so many times
    #[arg(long, value_name = "N", value_parser = clap::value_parser!(u32).range(2..=1_000_000), conflicts_with = "no_spread")]
    pub monte_carlo: Option<u32>,
    /// Seed of the random draws: the same gives the same draws
    #[arg(long, value_name = "S", default_value_t = 1, requires = "monte_carlo")]
    pub seed: u64,
}

/// `lenzbore ladder`.
#[derive(Debug, Args)]
pub struct LadderWords {
    /// The case.
    #[command(flatten)]
    pub case: CaseWords,
    /// Climbs for the drag-speed curve of [curve] instead of the travel
    #[arg(long)]
    pub curve: bool,
    /// Result folder [default: out/ and the case file's stem with -ladder behind it]
    #[arg(long, value_name = "FOLDER")]
    pub out: Option<PathBuf>,
    /// Puts the result in the place of an older one
    #[arg(long)]
    pub replace: bool,
}

/// `lenzbore compare`.
#[derive(Debug, Args)]
pub struct CompareWords {
    /// The case.
    #[command(flatten)]
    pub case: CaseWords,
    /// The table (CSV): a header with units, as speed [m/s];drag [N]; columns may be words of the case
    pub table: PathBuf,
    /// Allowed difference: a share of our value, as "5 %", or in the unit of the table's figure, as "0.2 N"
    #[arg(long, value_name = "SHARE", default_value = "5 %")]
    pub tolerance: String,
    /// Judges one side only: the side on which a difference is dangerous
    #[arg(long = "unsafe", value_name = "SIDE", value_enum)]
    pub dangerous: Option<Side>,
    /// The table is measured: the input spread of [tolerance] counts [default: where it has uncertainties]
    #[arg(long, conflicts_with = "calculated")]
    pub measured: bool,
    /// The table is calculated from the same inputs: their spread does not count [default: where it has no uncertainties]
    #[arg(long)]
    pub calculated: bool,
    /// Result folder [default: out/ and the case file's stem with -compare behind it]
    #[arg(long, value_name = "FOLDER")]
    pub out: Option<PathBuf>,
    /// Puts the result in the place of an older one
    #[arg(long)]
    pub replace: bool,
}

/// A side of the truth.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub enum Side {
    /// A table that says too much is dangerous
    High,
    /// A table that says too little is dangerous
    Low,
}

/// `lenzbore report`.
#[derive(Debug, Args)]
pub struct ReportWords {
    /// Folder that a run has written
    pub folder: PathBuf,
    /// Also makes the folder's pictures so wide on paper, as "170 mm"; letters grow in proportion
    #[arg(long, value_name = "WIDTH", requires = "replace")]
    pub width: Option<String>,
    /// Puts the page in the place of an older one
    #[arg(long)]
    pub replace: bool,
}

/// `lenzbore validate`.
#[derive(Debug, Args)]
pub struct ValidateWords {
    /// Names the checks, with kind and source, and runs none
    #[arg(long, conflicts_with_all = ["coverage", "out", "json"])]
    pub list: bool,
    /// Runs this check; may be given again [default: all]
    #[arg(long, value_name = "NAME")]
    pub only: Vec<String>,
    /// Holds the bands of cases drawn at random against the Fourier-Bessel integral, instead of the checks
    #[arg(long, conflicts_with = "only")]
    pub coverage: bool,
    /// Cases drawn
    #[arg(long, value_name = "N", default_value_t = 200, requires = "coverage", value_parser = clap::value_parser!(u32).range(20..=100_000))]
    pub cases: u32,
    /// Seed of the draws: the same gives the same cases
    #[arg(long, value_name = "S", requires = "coverage")]
    pub seed: Option<u64>,
    /// Prints one JSON object on standard output instead of text
    #[arg(long)]
    pub json: bool,
    /// Also writes Markdown, JSON, one HTML page and pictures into this folder
    #[arg(long, value_name = "FOLDER")]
    pub out: Option<PathBuf>,
    /// Puts the result in the place of an older one
    #[arg(long, requires = "out")]
    pub replace: bool,
}

/// `lenzbore materials`.
#[derive(Debug, Args)]
pub struct MaterialsWords {
    /// Shows this grade with all its numbers and their sources
    pub name: Option<String>,
    /// Lists the grades that have this in their names, family, standards or description
    #[arg(long, value_name = "TEXT", conflicts_with = "name")]
    pub search: Option<String>,
    /// Also reads own materials from this file
    #[arg(long, value_name = "FILE")]
    pub with: Option<PathBuf>,
    /// Prints one JSON object instead of text
    #[arg(long)]
    pub json: bool,
}

/// `lenzbore export`.
#[derive(Debug, Args)]
pub struct ExportWords {
    /// The result folder, of `run` or `curve`
    pub folder: PathBuf,
    /// The format
    #[arg(long, value_name = "FORMAT", value_enum)]
    pub to: ExportFormat,
    /// csv: the snapshot nearest to this instant, as "0.12 s" [default: the one with the greatest current density]
    #[arg(long, value_name = "TIME")]
    pub at: Option<String>,
    /// Folder of the export [default: the result folder with - and the format behind it]
    #[arg(long, value_name = "FOLDER")]
    pub out: Option<PathBuf>,
    /// Puts the export in the place of an older one
    #[arg(long)]
    pub replace: bool,
}

/// A format that results can be written in.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub enum ExportFormat {
    /// One rectilinear XML file a snapshot (.vtr) and their series (.pvd)
    Vtk,
    /// run.h5 with its index run.xdmf
    Xdmf,
    /// The fields of one snapshot as tables, and the series of the run
    Csv,
    /// K, G, C and the source of every grid level: settled and alternating fields
    MatrixMarket,
}

/// `lenzbore rerun`.
#[derive(Debug, Args)]
pub struct RerunWords {
    /// The result folder, of `run` or `curve`
    pub folder: PathBuf,
    /// Prints one JSON object instead of text
    #[arg(long)]
    pub json: bool,
}

/// `lenzbore explain`.
#[derive(Debug, Args)]
pub struct ExplainWords {
    /// The word, as thickness, wall.layer.thickness, drag_peak, steady, "[curve]", run
    pub word: Option<String>,
    /// Prints one JSON object instead of text
    #[arg(long)]
    pub json: bool,
}

/// `lenzbore completions`.
#[derive(Debug, Args)]
pub struct CompletionsWords {
    /// The shell
    #[arg(value_enum)]
    pub shell: Shell,
}
