//! `lenzbore schema`: the JSON Schema of the case file.

use lenzbore_io::schema::case_schema;

use crate::end::End;
use crate::say;

/// Prints the schema.
pub fn run() -> Result<(), End> {
    say::to_standard_output(&format!("{:#}\n", case_schema()));
    Ok(())
}
