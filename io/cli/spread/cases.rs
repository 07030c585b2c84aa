//! Varied cases: the case read again with its toleranced words moved, so that the rule of which size follows holds.

use lenzbore_io::case::ResolvedCase;
use lenzbore_io::message::Diagnostics;
use lenzbore_solver::problem::SnapshotPlan;
use lenzbore_solver::spread::Input;

use crate::end::End;
use crate::job::CaseInput;

/// The case and what of it may be off.
pub struct Variable<'a> {
    input: &'a CaseInput,
    case: &'a ResolvedCase,
}

impl<'a> Variable<'a> {
    pub const fn new(input: &'a CaseInput, case: &'a ResolvedCase) -> Self {
        Self { input, case }
    }

    pub fn count(&self) -> usize {
        self.case.tolerances.len()
    }

    /// The case with every toleranced word set, each moved by its offset; no fields are kept.
    pub fn at(&self, offsets: &[f64]) -> Result<ResolvedCase, Diagnostics> {
        let sets: Vec<String> = self.case.tolerances.iter().zip(offsets).map(|(t, o)| t.setting(*o)).collect();
        let mut case = self.input.read(&sets)?;
        case.problem.snapshots = SnapshotPlan::None;
        Ok(case)
    }

    /// The same with one word moved alone.
    pub fn alone(&self, which: usize, offset: f64) -> Result<ResolvedCase, Diagnostics> {
        let mut offsets = vec![0.0; self.count()];
        offsets[which] = offset;
        self.at(&offsets)
    }

    /// The inputs, each with the sizes that stay and follow when it is varied.
    pub fn inputs(&self) -> Result<Vec<Input>, End> {
        let one = |(i, t): (usize, &lenzbore_io::case::Tolerance)| {
            let end = if t.plus > 0.0 { t.plus } else { -t.minus };
            let varied = self.alone(i, end).map_err(|f| self.impossible(i, end, &f))?;
            let (stays, follows) = t.companions(&self.case.resolved, &varied.resolved);
            Ok(Input {
                path: t.path.clone(),
                unit: t.unit,
                value: t.value,
                minus: t.minus,
                plus: t.plus,
                written: t.written.clone(),
                stays,
                follows,
            })
        };
        self.case.tolerances.iter().enumerate().map(one).collect()
    }

    /// What to say where the case cannot be at an end of a tolerance.
    pub fn impossible(&self, which: usize, offset: f64, faults: &Diagnostics) -> End {
        let t = &self.case.tolerances[which];
        let unit = if t.unit.is_empty() { String::new() } else { format!(" {}", t.unit) };
        End::Input(format!(
            "{}: the tolerance of {} reaches {:.6}{unit}, where the case cannot be:\n{faults}",
            t.place,
            t.path,
            t.value + offset
        ))
    }
}
