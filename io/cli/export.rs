//! `lenzbore export`: a result in other formats.

use std::path::{Path, PathBuf};

use lenzbore_io::case::{CaseSource, ResolvedCase, read_case};
use lenzbore_io::export::{Chosen, Export, Systems, export};
use lenzbore_io::result::{Earlier, folder, read_earlier};
use lenzbore_io::units::{Kind, read_quantity};
use lenzbore_solver::problem::Travel;
use lenzbore_solver::system::{alternating_systems, settled_systems};
use serde_json::json;

use crate::arguments::{ExportFormat, ExportWords};
use crate::end::End;
use crate::progress::Terminal;
use crate::say;
use crate::solve::Question;

/// Writes the export.
pub fn run(words: &ExportWords) -> Result<(), End> {
    let earlier = read_earlier(&words.folder)?;
    let target = words.out.clone().unwrap_or_else(|| beside(&words.folder, words.to));
    folder::vet(&target, words.replace)?;
    let chosen = chosen(words)?;
    let terminal = Terminal::new()?;
    let systems;
    let what = match words.to {
        ExportFormat::Vtk => Export::Vtk,
        ExportFormat::Xdmf => Export::Xdmf,
        ExportFormat::Csv => Export::Csv(chosen),
        ExportFormat::MatrixMarket => {
            systems = assembled(&earlier, &terminal)?;
            Export::MatrixMarket(&systems)
        }
    };
    let files = export(&words.folder, &earlier, &what, (&target, words.replace), &terminal)?;
    terminal.finish();
    say::to_standard_output(&format!("written to {}: {}\n", target.display(), shown(&files)));
    Ok(())
}

/// The folder of an export beside its result.
fn beside(folder: &Path, format: ExportFormat) -> PathBuf {
    let ending = match format {
        ExportFormat::Vtk => "vtk",
        ExportFormat::Xdmf => "xdmf",
        ExportFormat::Csv => "csv",
        ExportFormat::MatrixMarket => "matrix-market",
    };
    // `.` and `..` have no name of their own.
    let whole = folder.canonicalize().ok().filter(|_| folder.file_name().is_none());
    let mut name = whole.as_deref().unwrap_or(folder).as_os_str().to_string_lossy().trim_end_matches('/').to_owned();
    name.push('-');
    name.push_str(ending);
    PathBuf::from(name)
}

/// Which snapshot the tables are to hold.
fn chosen(words: &ExportWords) -> Result<Chosen, End> {
    match &words.at {
        None => Ok(Chosen::Strongest),
        Some(_) if words.to != ExportFormat::Csv => {
            Err(End::Input("--at chooses the snapshot of --to csv; the other formats hold all".to_owned()))
        }
        Some(text) => match read_quantity(text, Kind::Time) {
            Ok(time) => Ok(Chosen::At(time.si)),
            Err(fault) => Err(End::Input(format!("--at \"{text}\": {fault}\n  for example: --at \"0.12 s\""))),
        },
    }
}

/// The systems of equations of the result's case, on as many levels as it was solved on.
fn assembled(earlier: &Earlier, terminal: &Terminal) -> Result<Systems, End> {
    let case = read_case(&CaseSource::Kept(&earlier.case), &[])?;
    let count = earlier.levels;
    match (Question::of_command(&earlier.command), &case.problem.travel) {
        (Some(Question::Curve), _) => curve(&case, count, terminal),
        (Some(Question::Travel), Travel::Steady { velocity_m_per_s: v }) => {
            let levels = settled_systems(&case.problem, *v, count, terminal)?;
            Ok(Systems { levels, drive: json!({"law": "steady", "velocity_m_per_s": v}) })
        }
        (Some(Question::Travel), Travel::Alternating(law)) => {
            let levels = alternating_systems(&case.problem, law, count, terminal)?;
            let drive = json!({
                "law": "alternating", "frequencies_Hz": law.frequencies_hz,
                "omega_rad_per_s": law.angular_frequencies(), "current_A": law.current_ampere,
            });
            Ok(Systems { levels, drive })
        }
        _ => Err(End::Input(
            "systems of equations are written for settled fields (law \"steady\", `curve`) and alternating fields; a motion in time \
             has one at every step, and its grid may travel\n  for the fields themselves: --to vtk, xdmf or csv"
                .to_owned(),
        )),
    }
}

fn curve(case: &ResolvedCase, count: usize, terminal: &Terminal) -> Result<Systems, End> {
    let asked = case.curve_problem().zip(case.curve.as_ref());
    let Some((problem, plan)) = asked else {
        return Err(End::Input(
            "the curve has no speeds: it has no settled fields whose equations could be written".to_owned(),
        ));
    };
    let fastest = plan.speeds_m_per_s.iter().copied().fold(0.0, f64::max);
    let levels = settled_systems(&problem, fastest, count, terminal)?;
    let drive = json!({"law": "steady", "velocities_m_per_s": plan.speeds_m_per_s, "grid_for_m_per_s": fastest});
    Ok(Systems { levels, drive })
}

/// So many names of files are shown.
const MOST_SHOWN: usize = 12;

fn shown(files: &[String]) -> String {
    let more = files.len().saturating_sub(MOST_SHOWN);
    let first = files.iter().take(MOST_SHOWN).map(String::as_str).collect::<Vec<_>>().join(", ");
    if more > 0 { format!("{first} and {more} more") } else { first }
}
