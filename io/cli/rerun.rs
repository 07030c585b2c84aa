//! `lenzbore rerun`: a result folder's case solved again, figure by figure.

use std::fmt::Write;

use lenzbore_io::case::{CaseSource, ResolvedCase, read_case};
use lenzbore_io::result::{Earlier, EarlierFigure, changed_words, read_earlier};
use lenzbore_solver::outcome::Figure;
use serde_json::{Value, json};

use crate::arguments::RerunWords;
use crate::end::End;
use crate::progress::Terminal;
use crate::say;
use crate::solve::{Question, answer};

/// What rounding may change in a figure that has no band, relative.
const ROUNDING: f64 = 1.0e-12;
/// So many changed words are named.
const MOST_NAMED: usize = 12;

/// How a figure came back.
struct Came {
    then: EarlierFigure,
    /// Value and band of now; `None` where the figure is not given any more.
    now: Option<(f64, f64)>,
}

impl Came {
    /// Within the band that the earlier result gave it.
    fn back(&self) -> bool {
        let allowed = self.then.band.max(ROUNDING * self.then.value.abs());
        self.now.is_some_and(|(value, _)| (value - self.then.value).abs() <= allowed)
    }
}

/// Solves again and compares.
pub fn run(words: &RerunWords) -> Result<(), End> {
    let earlier = read_earlier(&words.folder)?;
    let Some(question) = Question::of_command(&earlier.command) else {
        return Err(End::Input(format!(
            "{} holds a result of `{}`; `rerun` solves those of `run` and `curve` again",
            words.folder.display(),
            earlier.command
        )));
    };
    let case = read_case(&CaseSource::Kept(&earlier.case), &[])?;
    let terminal = Terminal::new()?;
    let (_, outcome, _) = answer(&case, question, &terminal)?;
    terminal.finish();
    let figures = matched(&earlier, &outcome.figures);
    let changed = changed_words(&earlier.resolved, &case.resolved.to_json());
    if words.json {
        say::to_standard_output(&format!("{:#}\n", object(&earlier, &case, &figures, &changed)));
    } else {
        say::to_standard_output(&text(&earlier, &figures, &changed));
    }
    let lost = figures.iter().filter(|c| !c.back()).count();
    match lost {
        0 => Ok(()),
        _ => Err(End::No(format!("{lost} of {} figures did not come back within their bands", figures.len()))),
    }
}

fn matched(earlier: &Earlier, figures: &[Figure]) -> Vec<Came> {
    let now = |name: &str| figures.iter().find(|f| f.name == name).map(|f| (f.value, f.band));
    earlier.figures.iter().map(|then| Came { now: now(&then.name), then: then.clone() }).collect()
}

fn text(earlier: &Earlier, figures: &[Came], changed: &[(String, Value, Value)]) -> String {
    let mut text = format!("{}\ncomputed by {}, {}\n\n", earlier.title, earlier.program, earlier.command);
    // Writing into a string cannot fail.
    let _ = writeln!(text, "{:<32}{:>20} {:>20} {:>10} {:>10}", "figure", "then", "now", "apart", "band");
    for came in figures {
        let then = &came.then;
        let verdict = if came.back() { "back" } else { "NOT BACK" };
        let unit = if then.unit == "1" { "" } else { &then.unit };
        let (shown, apart) = match came.now {
            Some((value, _)) => {
                let apart = (value - then.value).abs();
                let apart = if apart > 0.0 { format!("{apart:.1e}") } else { "0".to_owned() };
                (say::with_band(value, then.band).0, apart)
            }
            None => ("not given".to_owned(), "-".to_owned()),
        };
        let before = say::with_band(then.value, then.band).0;
        let line =
            format!("{:<32}{before:>20} {shown:>20} {apart:>10} {:>10.1e} {verdict:<8} {unit}", then.name, then.band);
        let _ = writeln!(text, "{}", line.trim_end());
    }
    if !changed.is_empty() {
        let _ = writeln!(text, "\nwords whose values are others now (a book value or a default has changed):");
        for (word, then, now) in changed.iter().take(MOST_NAMED) {
            let _ = writeln!(text, "  {word}: {then} then, {now} now");
        }
        if changed.len() > MOST_NAMED {
            let _ = writeln!(text, "  and {} more", changed.len() - MOST_NAMED);
        }
    }
    text
}

fn object(earlier: &Earlier, case: &ResolvedCase, figures: &[Came], changed: &[(String, Value, Value)]) -> Value {
    let one = |came: &Came| {
        json!({
            "figure": came.then.name, "unit": came.then.unit, "then": came.then.value, "band_then": came.then.band,
            "now": came.now.map(|n| n.0), "band_now": came.now.map(|n| n.1), "back": came.back(),
        })
    };
    let changes: Vec<Value> =
        changed.iter().map(|(w, then, now)| json!({"word": w, "then": then, "now": now})).collect();
    json!({
        "title": earlier.title,
        "command": earlier.command,
        "digest_then": earlier.digest,
        "digest_now": case.digest,
        "figures": figures.iter().map(one).collect::<Vec<_>>(),
        "all_back": figures.iter().all(Came::back),
        "changed_words": changes,
    })
}
