//! `lenzbore new`: writes a commented starter case.

use std::fs::OpenOptions;
use std::io::{ErrorKind, Write};

use lenzbore_io::case::{STARTER, starter};

use crate::arguments::{NewWords, StarterKind};
use crate::end::End;
use crate::say;

/// Writes the starter; an existing file is never overwritten.
pub fn run(words: &NewWords) -> Result<(), End> {
    let path = &words.path;
    let kind = match words.kind {
        StarterKind::Arrestor => "arrestor",
        StarterKind::Damper => "damper",
        StarterKind::CoilProbe => "coil-probe",
    };
    let text = starter(kind).map_or(STARTER, |s| s.text);
    if path.as_os_str() == "-" {
        say::to_standard_output(text);
        return Ok(());
    }
    let mut file = OpenOptions::new().write(true).create_new(true).open(path).map_err(|e| match e.kind() {
        ErrorKind::AlreadyExists => End::Input(format!("{} exists already; name another file", path.display())),
        ErrorKind::NotFound => End::Input(format!("{}: the folder does not exist", path.display())),
        _ => End::Failed(format!("{} cannot be written: {e}", path.display())),
    })?;
    file.write_all(text.as_bytes()).map_err(|e| End::Failed(format!("{} cannot be written: {e}", path.display())))?;
    let shown = path.display();
    say::to_standard_output(&format!("wrote {shown}\nnext: lenzbore check {shown}, then lenzbore run {shown}\n"));
    Ok(())
}
