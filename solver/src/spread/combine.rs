//! All inputs together: root sum square, worst case, shares, and what to measure better first.

use super::monte_carlo::MonteCarlo;
use super::{Input, Nominal, Reading, Response};

/// The spread of one figure.
#[derive(Debug, Clone, PartialEq)]
pub struct FigureSpread {
    /// Name.
    pub name: String,
    /// SI unit.
    pub unit: &'static str,
    /// Value at the nominal inputs, and its numerical band.
    pub nominal: Reading,
    /// Response to each input, in the order of the inputs; none where the figure was not had in every run.
    pub responses: Vec<Option<Response>>,
    /// How far below the nominal value 95 % reaches: root sum square of the falls.
    pub minus: f64,
    /// How far above.
    pub plus: f64,
    /// Lowest in the worst case, as a change; the sum of the falls until [`Self::solved_worst`] replaces it.
    pub worst_minus: f64,
    /// Highest, as a change.
    pub worst_plus: f64,
    /// Whether both worst cases were solved with all inputs at their ends, not added up.
    pub worst_solved: bool,
    /// Share of each input in the spread (of its square), 0 to 1.
    pub shares: Vec<f64>,
    /// What the numerical bands may make of the half-width, relative.
    pub numerical: f64,
}

impl FigureSpread {
    /// Combines the responses of a figure.
    #[must_use]
    pub fn new(nominal: &Nominal, inputs: &[Input], responses: Vec<Option<Response>>) -> Self {
        let known = || responses.iter().flatten();
        let root = |of: fn(&Response) -> f64| known().map(|r| of(r).powi(2)).sum::<f64>().sqrt();
        let half = |r: &Response| 0.5 * (r.fall() + r.rise());
        let squares: f64 = known().map(|r| half(r).powi(2)).sum();
        let share = |r: &Option<Response>| match r {
            Some(r) if squares > 0.0 => half(r).powi(2) / squares,
            _ => 0.0,
        };
        let noise: f64 = inputs
            .iter()
            .zip(&responses)
            .filter_map(|(i, r)| r.as_ref().map(|r| (r.slope_band * 0.5 * (i.minus + i.plus)).powi(2)))
            .sum();
        let (minus, plus) = (root(Response::fall), root(Response::rise));
        let half_width = 0.5 * (minus + plus);
        Self {
            name: nominal.name.clone(),
            unit: nominal.unit,
            nominal: nominal.reading,
            minus,
            plus,
            worst_minus: -known().map(Response::fall).sum::<f64>(),
            worst_plus: known().map(Response::rise).sum(),
            worst_solved: false,
            shares: responses.iter().map(share).collect(),
            numerical: if half_width > 0.0 { noise.sqrt() / half_width } else { 0.0 },
            responses,
        }
    }

    /// Half-width at 95 %: the mean of both sides.
    #[must_use]
    pub fn half_width(&self) -> f64 {
        0.5 * (self.minus + self.plus)
    }

    /// Whether every input's response is known.
    #[must_use]
    pub fn complete(&self) -> bool {
        self.responses.iter().all(Option::is_some)
    }

    /// The offsets of all inputs in the worst case on a side (`up` or down); inputs without a visible effect stay.
    #[must_use]
    pub fn corner(&self, inputs: &[Input], up: bool) -> Vec<f64> {
        let sign = if up { 1.0 } else { -1.0 };
        let end = |(input, response): (&Input, &Option<Response>)| match response {
            Some(r) if !r.unseen() && sign * r.low > (sign * r.high).max(0.0) => -input.minus,
            Some(r) if !r.unseen() && sign * r.high > 0.0 => input.plus,
            _ => 0.0,
        };
        inputs.iter().zip(&self.responses).map(end).collect()
    }

    /// Takes the values solved at both corners. A response that bends inside its tolerance may pass a corner, so the
    /// greatest change seen alone still counts.
    pub fn solved_worst(&mut self, lowest: f64, highest: f64) {
        let alone = |of: fn(&Response) -> f64| self.responses.iter().flatten().map(of).fold(0.0, f64::max);
        self.worst_minus = (lowest - self.nominal.value).min(-alone(Response::fall));
        self.worst_plus = (highest - self.nominal.value).max(alone(Response::rise));
        self.worst_solved = true;
    }
}

/// The whole study.
#[derive(Debug, Clone, PartialEq)]
pub struct Spread {
    /// The inputs with tolerances.
    pub inputs: Vec<Input>,
    /// The figures.
    pub figures: Vec<FigureSpread>,
    /// Indices of the inputs, the one to measure better first in front.
    pub ranking: Vec<usize>,
    /// A run of random draws, where one was asked.
    pub monte_carlo: Option<MonteCarlo>,
    /// Solutions that were computed, the nominal one not counted.
    pub solutions: usize,
    /// What a reader must know.
    pub cautions: Vec<String>,
}

impl Spread {
    /// The spread of a figure by its name.
    #[must_use]
    pub fn figure(&self, name: &str) -> Option<&FigureSpread> {
        self.figures.iter().find(|f| f.name == name)
    }

    /// Mean share of an input over all figures that spread at all.
    #[must_use]
    pub fn mean_share(&self, input: usize) -> f64 {
        mean_share(&self.figures, input)
    }
}

fn mean_share(figures: &[FigureSpread], input: usize) -> f64 {
    let moved: Vec<&FigureSpread> = figures.iter().filter(|f| f.half_width() > 0.0).collect();
    let sum: f64 = moved.iter().map(|f| f.shares[input]).sum();
    let count = f64::from(u32::try_from(moved.len()).unwrap_or(u32::MAX));
    if count > 0.0 { sum / count } else { 0.0 }
}

/// Inputs in the order of their mean share in the spread of the figures: what to measure better first.
#[must_use]
pub fn rank(figures: &[FigureSpread], inputs: usize) -> Vec<usize> {
    let mut order: Vec<usize> = (0..inputs).collect();
    order.sort_by(|&a, &b| mean_share(figures, b).total_cmp(&mean_share(figures, a)));
    order
}
