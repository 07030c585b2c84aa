//! The nearest legal word to one that is not.

/// The candidate nearest to `word`, or `None` where none is near enough to be what was meant.
///
/// Near means: at most a third of the letters differ (insertions, deletions, changes and swaps of neighbours, capitals
/// ignored), or one is the beginning of the other from four letters on.
pub fn nearest<'a>(word: &str, candidates: impl IntoIterator<Item = &'a str>) -> Option<&'a str> {
    let lower = word.to_lowercase();
    let allowed = (lower.chars().count() / 3).max(1);
    candidates
        .into_iter()
        .map(|candidate| (distance(&lower, candidate), candidate))
        .filter(|(distance, candidate)| *distance <= allowed && *distance < candidate.chars().count())
        .min_by_key(|(distance, _)| *distance)
        .map(|(_, candidate)| candidate)
}

fn distance(lower: &str, candidate: &str) -> usize {
    let other = candidate.to_lowercase();
    let beginning = lower.len() >= 4 && other.len() >= 4 && (lower.starts_with(&other) || other.starts_with(lower));
    if beginning && lower != other { 1 } else { strsim::damerau_levenshtein(lower, &other) }
}
