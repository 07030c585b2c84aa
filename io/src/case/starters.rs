//! Commented cases that resolve and solve as they stand: what `lenzbore new` writes.

/// A starter.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Starter {
    /// Its kind, as `arrestor`.
    pub kind: &'static str,
    /// The case file.
    pub text: &'static str,
}

/// Every starter; the first is written where no kind is asked for.
pub const STARTERS: [Starter; 3] = [
    Starter { kind: "arrestor", text: STARTER },
    Starter { kind: "damper", text: include_str!("starters/damper.toml") },
    Starter { kind: "coil-probe", text: include_str!("starters/coil-probe.toml") },
];

/// The first of them.
pub const STARTER: &str = include_str!("starters/arrestor.toml");

/// The starter of a kind.
#[must_use]
pub fn starter(kind: &str) -> Option<&'static Starter> {
    STARTERS.iter().find(|s| s.kind == kind)
}
