//! How much memory the machine has left, and whether a case fits.

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
