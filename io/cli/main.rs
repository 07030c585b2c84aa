//! The `lenzbore` command.
fn main() {}
