//! Published checks, each beside its source, and independent semi-analytic paths.
