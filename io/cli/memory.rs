//! How much memory the machine has left, and whether a case fits.

use lenzbore_io::case::{Origin, ResolvedCase};
use lenzbore_solver::cost::rough_memory_bytes;
use lenzbore_solver::fault::SolveFault;
use lenzbore_solver::problem::Problem;

use crate::end::End;

const MIB: f64 = 1024.0 * 1024.0;

/// Refuses a case that would need more memory than is available, before anything large is built.
pub fn require(problem: &Problem, curve_speed_m_per_s: Option<f64>) -> Result<(), End> {
    let needed = rough_memory_bytes(problem, curve_speed_m_per_s)?;
    match available_bytes() {
        Some(available) if needed > available => Err(too_large(needed, available)),
        _ => Ok(()),
    }
}

/// Words that make a case large, the likeliest first.
const LARGE: [&str; 8] = [
    "output.fields",
    "accuracy.levels",
    "accuracy.cells_across_wall",
    "curve.speeds",
    "travel.until",
    "travel.to",
    "travel.speed",
    "travel.law",
];

/// As [`require`], with the place of the word of the case that most likely makes it too large.
pub fn require_of(case: &ResolvedCase, problem: &Problem, curve_speed_m_per_s: Option<f64>) -> Result<(), End> {
    require(problem, curve_speed_m_per_s).map_err(|end| match (end, place(case, curve_speed_m_per_s.is_some())) {
        (End::Input(text), Some(place)) => End::Input(format!("{place}: {text}")),
        (end, _) => end,
    })
}

/// Where the first such word was written that the question reads.
fn place(case: &ResolvedCase, curve: bool) -> Option<String> {
    let of_other = |word: &str| word.starts_with(if curve { "travel." } else { "curve." });
    LARGE.iter().filter(|word| !of_other(word)).find_map(|word| match &case.resolved.get(word)?.origin {
        Origin::Given { place, .. } => Some(place.clone()),
        Origin::Override { text } => Some(format!("--set {text}")),
        _ => None,
    })
}

fn too_large(needed: f64, available: f64) -> End {
    let fault = SolveFault::Memory { needed_mib: whole(needed / MIB), available_mib: whole(available / MIB) };
    End::Input(format!(
        "{fault}\nfewer snapshots ([output] fields), a shorter sweep, a wider gap or fewer accuracy.levels need less"
    ))
}

#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "a positive size; saturates when absurd")]
fn whole(x: f64) -> u64 {
    x.ceil() as u64
}

/// Memory that can be had without swapping, bytes, where the system says so (`MemAvailable` of /proc/meminfo).
pub fn available_bytes() -> Option<f64> {
    let text = std::fs::read_to_string("/proc/meminfo").ok()?;
    let line = text.lines().find_map(|l| l.strip_prefix("MemAvailable:"))?;
    let kib: f64 = line.split_whitespace().next()?.parse().ok()?;
    Some(kib * 1024.0)
}
