//! All faults of one input, with the texts they point into.

use super::fault::CaseFault;
use super::place::{Place, Position, Sources};

/// One fault and where it stands.
#[derive(Debug, Clone, PartialEq)]
pub struct Diagnostic {
    /// What is wrong.
    pub fault: Box<CaseFault>,
    /// Where; `None` where the input as a whole is meant.
    pub place: Option<Place>,
    /// Other places that belong to it, each with a word of why.
    pub related: Vec<(Place, &'static str)>,
}

impl Diagnostic {
    /// A fault at a place.
    #[must_use]
    pub fn at(place: Place, fault: CaseFault) -> Self {
        Self { fault: Box::new(fault), place: Some(place), related: Vec::new() }
    }

    /// A fault of the input as a whole.
    #[must_use]
    pub fn of_input(fault: CaseFault) -> Self {
        Self { fault: Box::new(fault), place: None, related: Vec::new() }
    }

    /// Adds another place.
    #[must_use]
    pub fn with_related(mut self, place: Place, why: &'static str) -> Self {
        self.related.push((place, why));
        self
    }
}

/// All faults of one input. Its `Display` is the message a user sees, in plain text.
#[derive(Debug, Clone, PartialEq)]
pub struct Diagnostics {
    sources: Sources,
    faults: Vec<Diagnostic>,
}

impl std::error::Error for Diagnostics {}

impl Diagnostics {
    /// Sorts the faults by place and drops repetitions.
    #[must_use]
    pub fn new(sources: Sources, mut faults: Vec<Diagnostic>) -> Self {
        faults.sort_by(|a, b| a.place.cmp(&b.place));
        // A part that stands twice in a stack brings the same fault twice.
        faults.dedup_by(|b, a| a.place == b.place && a.fault.to_string() == b.fault.to_string());
        Self { sources, faults }
    }

    /// One fault of the input as a whole.
    #[must_use]
    pub fn of_input(fault: CaseFault) -> Self {
        Self { sources: Sources::default(), faults: vec![Diagnostic::of_input(fault)] }
    }

    /// Every fault.
    #[must_use]
    pub fn faults(&self) -> &[Diagnostic] {
        &self.faults
    }

    /// The texts that places point into.
    #[must_use]
    pub fn sources(&self) -> &Sources {
        &self.sources
    }

    /// File, line and column of a fault.
    #[must_use]
    pub fn location(&self, diagnostic: &Diagnostic) -> Option<(&str, Position)> {
        let place = diagnostic.place.as_ref()?;
        Some((self.sources.text(place)?.label.as_str(), self.sources.position(place)?))
    }
}
