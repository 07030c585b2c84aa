//! Writes the folder of a ladder.

use std::path::Path;

use lenzbore_solver::ladder::LadderOutcome;
use lenzbore_solver::monitor::Monitor;

use super::fault::IoFault;
use super::folder::PendingFolder;
use super::header::ResultHeader;
use super::ladder::{ladder_csv, ladder_summary};
use super::names;
use super::write::{WriteOptions, Written};
use crate::{picture, report};

/// Writes `summary.json`, `ladder.csv` and, where asked for, the pictures `waterfall` and `error_map` and the page; whole or not at all.
///
/// # Errors
/// As [`super::write()`].
pub fn write_ladder(
    folder: &Path,
    options: &WriteOptions,
    header: &ResultHeader,
    outcome: &LadderOutcome,
    monitor: &dyn Monitor,
) -> Result<Written, IoFault> {
    let pending = PendingFolder::begin(folder, options.replace)?;
    let mut files = Vec::new();
    let filled = fill(&pending, &mut files, options, header, outcome, monitor);
    if let Err(fault) = filled {
        return Err(pending.in_users_words(fault));
    }
    Ok(Written { folder: pending.commit()?, files })
}

fn fill(
    pending: &PendingFolder,
    files: &mut Vec<String>,
    options: &WriteOptions,
    header: &ResultHeader,
    outcome: &LadderOutcome,
    monitor: &dyn Monitor,
) -> Result<(), IoFault> {
    let mut put = |name: &str, bytes: &[u8]| {
        if monitor.cancelled() {
            return Err(IoFault::Interrupted);
        }
        pending.write(name, bytes)?;
        files.push(name.to_owned());
        Ok(())
    };
    put(names::SUMMARY, format!("{:#}\n", ladder_summary(header, outcome)?).as_bytes())?;
    put(names::LADDER, ladder_csv(outcome)?.as_bytes())?;
    if options.pictures {
        let map = picture::error_map(&header.title, outcome)?;
        for picture in picture::waterfall(&header.title, outcome).into_iter().chain(map) {
            let picture = picture.at_width(options.picture_width_m);
            put(&format!("{}.svg", picture.name), picture.svg.as_bytes())?;
            put(&format!("{}.png", picture.name), &picture.png()?)?;
        }
    }
    if options.report {
        let page = report::build(pending.path())?;
        put(names::REPORT, page.as_bytes())?;
    }
    if monitor.cancelled() { Err(IoFault::Interrupted) } else { Ok(()) }
}
